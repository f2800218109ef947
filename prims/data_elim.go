package prims

import (
	"slices"

	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Elimination of data types into a family x.C: one case for each constructor,
// taking its arguments, an induction hypothesis for each recursive argument,
// and its dimensions. Eliminators commute with formal composites (CHM 3):
//
//	elim (x.C) cases (hcomp D u0 [φ ↦ i.u]) =
//	  comp (i. C(h(i))) (elim … u0) [φ ↦ i. elim … u],     h = hfill D u0 [φ ↦ i.u]

// Recursion says how a data type occurs in the type of a recursive argument:
// R ::= D | Π(y:B) R | Π(i:I) R | Path (i.R) a b.
type Recursion struct {
	shape recursionShape
	inner *Recursion
	// the rules that make the hypothesis and its type under Π
	hypothesis, hypothesisType *value.Rule
}

type recursionShape uint8

const (
	recursionSelf recursionShape = iota
	recursionPi
	recursionDimension
	recursionPath
)

func newRecursion(shape recursionShape, inner *Recursion) *Recursion {
	r := &Recursion{shape: shape, inner: inner}
	r.hypothesis = &value.Rule{Name: "y", Apply: func(run *value.Run, c *value.Captured, y value.Value) value.Value {
		return run.Force(c.Values[0]).(*Eliminator).hypothesis(run, inner, LaterApply(run, c.Values[1], y))
	}}
	r.hypothesisType = &value.Rule{Name: "y", Apply: func(run *value.Run, c *value.Captured, y value.Value) value.Value {
		return run.Force(c.Values[0]).(*Eliminator).hypothesisType(run, inner, codomainAt(run, c.Values[1], y), LaterApply(run, c.Values[2], y))
	}}
	return r
}

// hasPath reports whether a path stands on the way to the data type.
func (r *Recursion) hasPath() bool {
	for ; r != nil; r = r.inner {
		if r.shape == recursionPath {
			return true
		}
	}
	return false
}

// codomainAt is the type of the values at y of functions of type t.
func codomainAt(run *value.Run, t, y value.Value) value.Value {
	switch t := run.Force(t).(type) {
	case *Pi:
		return t.Codomain.Open(run, y)
	case *PiDimension:
		return t.Codomain.Open(run, y)
	default:
		run.Fault("%T is no type of a recursive argument", t)
		return nil
	}
}

// Eliminator is an elimination without what it eliminates. It is a value, so
// that closures can capture it.
type Eliminator struct {
	data    *Data
	family  value.Closure
	cases   []value.Case // by constructor; nil for those that are not given yet
	step    *stepRule    // for numerals
	assumed *assumption  // under the binders of a case, for the types of later hypotheses, the last one first
	checked *Eliminator  // the elimination being checked that this one comes from, nil when it has all its cases
	support value.Support
}

// assumption says what the elimination of an argument is under the binders of a
// case, where it has a name: its hypothesis.
type assumption struct {
	level      int // of the argument's variable
	hypothesis value.Value
	before     *assumption
}

// Support is the union of the parts'.
func (e *Eliminator) Support() value.Support { return e.support }

func newEliminator(d *Data, family value.Closure, cases []value.Case, step *stepRule) *Eliminator {
	e := &Eliminator{data: d, family: family, cases: cases, step: step, support: family.Support()}
	for _, c := range cases {
		if c != nil {
			e.support |= c.Support()
		}
	}
	return e
}

// Substitute delays s over family and cases.
func (e *Eliminator) Substitute(run *value.Run, s *value.Subst) value.Value {
	return e.substitute(run, s)
}

func (e *Eliminator) substitute(run *value.Run, s *value.Subst) *Eliminator {
	if e.support&s.Domain() == 0 && !run.Plain.NoSupport {
		return e
	}
	cases := make([]value.Case, len(e.cases))
	for k, c := range e.cases {
		if c != nil {
			cases[k] = c.SubstituteCase(run, s)
		}
	}
	out := newEliminator(e.data, e.family.Substitute(run, s), cases, e.step)
	out.checked = e.checked
	var assumed []*assumption
	for a := e.assumed; a != nil; a = a.before {
		assumed = append(assumed, a)
	}
	for _, a := range slices.Backward(assumed) {
		run.Charge(value.PriceNode)
		out.assume(a.level, run.Substitute(a.hypothesis, s))
	}
	return out
}

func (e *Eliminator) assume(level int, hypothesis value.Value) {
	e.assumed = &assumption{level, hypothesis, e.assumed}
	e.support |= hypothesis.Support()
}

// assuming is e where the elimination of the variable x is the hypothesis h.
func (e *Eliminator) assuming(x, h value.Value) *Eliminator {
	out := *e
	out.assume(x.(*value.Neutral).Head().(*value.VariableHead).Level, h)
	return &out
}

// hypothesisOf is the elimination of a neutral that is an argument with a
// hypothesis, at the values of functions and along paths.
func (e *Eliminator) hypothesisOf(run *value.Run, n *value.Neutral) (value.Value, bool) {
	x, ok := n.Head().(*value.VariableHead)
	if !ok {
		return nil, false
	}
	for a := e.assumed; a != nil; a = a.before {
		if a.level != x.Level {
			continue
		}
		h := a.hypothesis
		for _, f := range n.Frames() {
			switch f := f.(type) {
			case *applyFrame:
				h = Apply(run, h, f.arg)
			case *atFrame:
				h = At(run, h, f.r)
			default:
				return nil, false
			}
		}
		return h, true
	}
	return nil, false
}

// Eliminate eliminates v, on demand; the result may be lazy.
func (e *Eliminator) Eliminate(run *value.Run, v value.Value) value.Value {
	v = run.Force(v)
	var back value.Back // what the run came from, where it is traced
	if run.Traced() {
		if run.Followed() && !run.Reporting() {
			return e.followed(run, v)
		}
		back = run.InElimination(e.data.label)
	}
	switch v := v.(type) {
	case *value.Neutral:
		if e.assumed != nil {
			if h, ok := e.hypothesisOf(run, v); ok {
				return run.Left(back, h)
			}
		}
		return run.Left(back, v.Eliminate(run, &elimFrame{e}))
	case *Formal:
		return run.Left(back, e.composite(run, v))
	case *Number:
		if w, ok := e.numeral(run, v); ok {
			return run.Left(back, w)
		}
	case *Successors:
		if e.step != nil && e.step.affine && !run.Plain.NoNumerals {
			run.Take(value.StepNumeral)
			n, rest := counted(run, v) // all at once, since successors of successors nest
			if rest == nil {
				rest = newNumber(run, e.data, natural{})
			}
			return run.Left(back, e.step.repeated(run, e.data, n, e.Eliminate(run, rest)))
		}
	}
	var one [1]value.Value
	c, args, ok := shown(run, v, &one)
	if !ok {
		run.Fault("elimination of %T", v)
	}
	var dims []interval.Dim
	if con, ok := v.(*Con); ok {
		dims = con.Dims
	}
	return run.Left(back, e.onCase(run, c, args, dims))
}

func (e *Eliminator) onCase(run *value.Run, c *Constructor, args []value.Value, dims []interval.Dim) value.Value {
	run.Take(value.StepEliminate)
	if e.cases[c.Index] == nil {
		run.Fault("the case of %s is not there yet", c.Name)
	}
	body := e.cases[c.Index]
	env := body.Enter(run)
	at := copy(env, args)
	for k, a := range c.Args {
		if a.Recursive == nil {
			continue
		}
		if body.Uses(at) {
			env[at] = e.hypothesis(run, a.Recursive, args[k])
		} else {
			env[at] = args[k] // an unused hypothesis costs nothing
		}
		at++
	}
	for _, d := range dims {
		env[at] = value.DimensionOf(d)
		at++
	}
	v := body.Eval(run, env)
	run.Release(len(env))
	return v
}

// Later is Eliminate in a cell.
func (e *Eliminator) Later(run *value.Run, v value.Value) value.Value {
	w := &laterElimination{e: e, v: v, site: run.Running()}
	return run.NewLazy(e.support|v.Support(), &w.Pending, w)
}

type laterElimination struct {
	value.Pending
	e    *Eliminator
	v    value.Value
	site *value.Site // of the code that it stands in, where the run is traced
}

// Do eliminates.
func (w *laterElimination) Do(run *value.Run) value.Value {
	if !run.Traced() {
		return w.e.Eliminate(run, w.v)
	}
	back := run.Resume(w.site)
	return run.Left(back, w.e.Eliminate(run, w.v))
}

// composite commutes the elimination with a formal composite.
func (e *Eliminator) composite(run *value.Run, v *Formal) value.Value {
	run.Take(value.StepEliminate)
	i := run.Fresh(e.support | v.support)
	h := value.Value(v) // where the family does not look, as good as the filler
	if value.Uses(e.family) {
		h = Hfill(run, i, v.Type, v.Base, v.Walls)
	}
	walls := v.Walls.Map(run, e.support, 0, func(run *value.Run, _ value.Name, u value.Value, cut *value.Subst) value.Value {
		if cut == nil {
			return e.Eliminate(run, u)
		}
		return e.substitute(run, cut).Eliminate(run, u)
	})
	return Comp(run, i, e.family.Open(run, h), e.Later(run, v.Base), walls)
}

// hypothesis is the induction hypothesis for an argument: its elimination, at
// each value of a function, along a path.
func (e *Eliminator) hypothesis(run *value.Run, r *Recursion, v value.Value) value.Value {
	switch r.shape {
	case recursionSelf:
		return e.Later(run, v)
	case recursionPath:
		i := run.Fresh(e.support | v.Support())
		return over(i, e.hypothesis(run, r.inner, LaterAt(run, v, interval.Var(i))))
	default:
		return &Lam{Body: value.NewCaptured(run, value.Captured{Rule: r.hypothesis, Values: []value.Value{e, v}})}
	}
}

// hypothesisType is the type of the hypothesis for v, an argument of type t.
func (e *Eliminator) hypothesisType(run *value.Run, r *Recursion, t, v value.Value) value.Value {
	if r.shape == recursionSelf {
		return e.family.Open(run, v)
	}
	switch t := run.Force(t).(type) {
	case *Pi:
		return &Pi{t.Domain, value.NewCaptured(run, value.Captured{Rule: r.hypothesisType, Values: []value.Value{e, t, v}})}
	case *PiDimension:
		return &PiDimension{value.NewCaptured(run, value.Captured{Rule: r.hypothesisType, Values: []value.Value{e, t, v}})}
	case *Path:
		i := run.Fresh(e.support | t.Support() | v.Support())
		line := e.hypothesisType(run, r.inner, t.Line.Open(run, value.DimensionName(i)), LaterAt(run, v, interval.Var(i)))
		return &Path{&value.Line{I: i, Body: line, Name: "i"}, e.hypothesis(run, r.inner, t.A0), e.hypothesis(run, r.inner, t.A1)}
	default:
		run.Fault("%T is no type of a recursive argument", t)
		return nil
	}
}

// binding makes variables and dimensions one after the other: the reader-back's,
// the comparer's or the checker's.
type binding interface {
	Variable(hint string, t value.Value) value.Value
	Dimension(hint string) value.Name
}

// caseBinders binds what the case of c takes, at the given parameters, and
// returns it together with the family at the constructor. name gives the hints.
func (e *Eliminator) caseBinders(run *value.Run, b binding, c *Constructor, params []value.Value, name func(k int, standard string) string) (env []value.Value, t value.Value) {
	args := make([]value.Value, len(c.Args))
	k := 0
	for n := range c.Args {
		args[n] = b.Variable(name(k, c.Args[n].Name), c.Args[n].At(run, params, args))
		k++
	}
	env = append(env, args...)
	// The ends of a path's hypothesis are eliminations of terms over earlier
	// arguments, whose eliminations have names here.
	at := e
	for n := range c.Args {
		if r := c.Args[n].Recursive; r != nil {
			h := b.Variable(name(k, "h"), at.hypothesisType(run, r, c.Args[n].At(run, params, args), args[n]))
			if c.ends {
				at = at.assuming(args[n], h)
			}
			env = append(env, h)
			k++
		}
	}
	dims := make([]interval.Dim, len(c.Dims))
	for n := range c.Dims {
		i := b.Dimension(name(k, c.Dims[n]))
		dims[n] = interval.Var(i)
		env = append(env, value.DimensionName(i))
		k++
	}
	return env, e.family.Open(run, NewCon(run, c, params, args, dims))
}

type elimFrame struct{ *Eliminator }

func (f *elimFrame) Frontier() (frontier, faces value.Support) { return 0, 0 }
func (f *elimFrame) Relabel(run *value.Run, s *value.Subst) value.Frame {
	return &elimFrame{f.substitute(run, s)}
}
func (f *elimFrame) Resume(run *value.Run, head value.Value) value.Value {
	return f.Eliminate(run, head)
}
func (f *elimFrame) Type(run *value.Run, _ value.Value, n *value.Neutral) value.Value {
	return f.family.Open(run, n)
}

func (f *elimFrame) ReadBack(q value.Quoter, head value.Core, t value.Value) value.Core {
	run := q.Run()
	d := run.Force(t).(*DataType)
	family := q.Variable(f.family.Hint(), d, func(x value.Value) value.Core { return q.Type(f.family.Open(run, x)) })
	rows := term.Rows{}
	for k, c := range f.cases {
		if c == nil {
			continue // the elimination is being checked and stands in a message
		}
		con := f.data.Constructors[k]
		b := q.Binders(func(b value.Binding) value.Core {
			env, t := f.caseBinders(run, b, con, d.Params, func(k int, standard string) string { return hint(c.HintAt(k), standard) })
			return q.Term(t, c.OpenAll(run, env))
		})
		b.Dimensions = len(con.Dims)
		rows = append(rows, []term.Arg{con.reference, b})
	}
	return op(elimSig, f.data.eliminator, term.Rows{}, family, head, rows)
}

func (f *elimFrame) Same(c value.Comparer, other value.Frame, t value.Value) bool {
	o, ok := other.(*elimFrame)
	if !ok || o.data != f.data || o.checked != f.checked {
		return false
	}
	run := c.Run()
	d := run.Force(t).(*DataType)
	if !c.Variable(f.family.Hint(), d, func(x value.Value) bool {
		return c.EqualTypes("the family", f.family.Open(run, x), o.family.Open(run, x))
	}) {
		return false
	}
	for k := range f.cases {
		if f.cases[k] == nil && o.cases[k] == nil {
			continue // both come from the one elimination that is being checked
		}
		con := f.data.Constructors[k]
		if !c.Binders(func(b value.Binding) bool {
			env, t := f.caseBinders(run, b, con, d.Params, func(k int, standard string) string { return standard })
			return c.Terms("the case of "+con.Name, t, f.cases[k].OpenAll(run, env), o.cases[k].OpenAll(run, env))
		}) {
			return false
		}
	}
	return true
}
