package prims

import (
	"sync/atomic"

	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Paths Path (j.A) a b, with η; p @ 0 = a and p @ 1 = b also for neutral p
// (CCHM 3, 4.5; CHM 2).
//
//	hcomp (Path (j.A) a b) p [φ ↦ i.u] = ⟨j⟩ hcomp A(j) (p @ j) [φ ↦ i. u @ j] [(j=0) ↦ _.a] [(j=1) ↦ _.b]
//	transp (i. Path (j.A) a b) φ p     = ⟨j⟩ comp (i. A(i,j)) (p @ j) [φ ↦ _. p @ j] [(j=0) ↦ i. a(i)] [(j=1) ↦ i. b(i)]

// Path is the type of paths over a line of types, as a value.
type Path struct {
	Line   value.Closure
	A0, A1 value.Value // the ends
}

// PathLam is a path as a value.
type PathLam struct {
	Body value.Closure
	seen atomic.Pointer[pathPoint] // where the path was last looked at, if it is closed
}

// pathPoint is what a path is at the dimension i.
type pathPoint struct {
	i value.Name
	v value.Value
}

// Support is the union of the parts'.
func (t *Path) Support() value.Support {
	return t.Line.Support() | t.A0.Support() | t.A1.Support()
}

// Substitute delays s over the parts.
func (t *Path) Substitute(run *value.Run, s *value.Subst) value.Value {
	a0 := run.Substitute(t.A0, s)
	if t.A0 == t.A1 {
		return &Path{t.Line.Substitute(run, s), a0, a0}
	}
	return &Path{t.Line.Substitute(run, s), a0, run.Substitute(t.A1, s)}
}

// Support is the closure's.
func (p *PathLam) Support() value.Support { return p.Body.Support() }

// Substitute delays s over the closure.
func (p *PathLam) Substitute(run *value.Run, s *value.Subst) value.Value {
	return &PathLam{Body: p.Body.Substitute(run, s)}
}

// over is the path ⟨j⟩ body.
func over(j value.Name, body value.Value) value.Value {
	return &PathLam{Body: &value.Line{I: j, Body: body, Name: "j"}}
}

// Hcomp composes at each dimension, between the ends.
func (t *Path) Hcomp(run *value.Run, p value.Value, walls value.System) value.Value {
	j := run.Fresh(t.Support() | p.Support() | walls.Support())
	us := walls.Map(run, interval.Single(j), 0, func(run *value.Run, _ value.Name, u value.Value, _ *value.Subst) value.Value {
		return At(run, u, interval.Var(j))
	})
	us = us.Constant(run, interval.Eq0(j), t.A0)
	us = us.Constant(run, interval.Eq1(j), t.A1)
	a := t.Line.Open(run, value.DimensionName(j))
	return over(j, LaterHcomp(run, a, LaterAt(run, p, interval.Var(j)), us))
}

// Transp composes at each dimension, between the ends' own lines.
func (t *Path) Transp(run *value.Run, i value.Name, phi interval.Face, p value.Value) value.Value {
	j := run.Fresh(t.Support() | p.Support() | phi.Support() | interval.Single(i))
	pj := LaterAt(run, p, interval.Var(j))
	us := make(value.System, 0, phi.Len()+2).Constant(run, phi, pj)
	us = us.Line(run, interval.Eq0(j), i, t.A0)
	us = us.Line(run, interval.Eq1(j), i, t.A1)
	return over(j, LaterComp(run, i, t.Line.Open(run, value.DimensionName(j)), pj, us))
}

// At is p @ r, on demand.
func At(run *value.Run, p value.Value, r interval.Dim) value.Value {
	switch p := run.Force(p).(type) {
	case *PathLam:
		run.Take(value.StepAt)
		if run.Traced() && run.Calls() {
			return atFollowed(run, p, r)
		}
		return p.at(run, r)
	case *value.Neutral:
		if r.IsEnd() {
			t, ok := run.Force(value.TypeOf(run, p)).(*Path)
			if !ok {
				run.Fault("a neutral that is no path stands at a dimension")
			}
			if r.IsZero() {
				return t.A0
			}
			return t.A1
		}
		return p.Eliminate(run, &atFrame{r})
	default:
		run.Fault("%T, which is no path, stands at a dimension", p)
		return nil
	}
}

// at is the path at r. A closed one is asked again and again at the lowest name,
// by whatever goes along it, and remembers the answer.
func (p *PathLam) at(run *value.Run, r interval.Dim) value.Value {
	i, negated, ok := r.Literal()
	if !ok || negated || p.Support() != 0 || run.Plain.NoSharing {
		return p.Body.Apply(run, value.DimensionOf(r))
	}
	if point := p.seen.Load(); point != nil && point.i == i {
		return point.v
	}
	v := p.Body.Apply(run, value.DimensionOf(r))
	p.seen.Store(&pathPoint{i, v})
	return v
}

// LaterAt is At in a cell.
func LaterAt(run *value.Run, p value.Value, r interval.Dim) value.Value {
	if p, ok := value.Peek(p).(*PathLam); ok {
		return p.Body.Open(run, value.DimensionOf(r))
	}
	return run.LaterOf(p.Support()|r.Support(), atValue, p, value.DimensionOf(r))
}

func atValue(run *value.Run, p, r value.Value) value.Value {
	return At(run, p, r.(*value.Dimension).Dim)
}

// openAt is p @ r without doing the work of the body; p is forced.
func openAt(run *value.Run, p value.Value, r interval.Dim) value.Value {
	if l, ok := p.(*PathLam); ok {
		return l.Body.Open(run, value.DimensionOf(r))
	}
	return At(run, p, r)
}

type atFrame struct{ r interval.Dim }

func (f *atFrame) Support() value.Support                    { return f.r.Support() }
func (f *atFrame) Frontier() (frontier, faces value.Support) { return f.r.Support(), 0 }
func (f *atFrame) Relabel(_ *value.Run, s *value.Subst) value.Frame {
	return &atFrame{f.r.Subst(s)}
}
func (f *atFrame) Resume(run *value.Run, head value.Value) value.Value { return At(run, head, f.r) }

func (f *atFrame) Type(run *value.Run, t value.Value, _ *value.Neutral) value.Value {
	return run.Force(t).(*Path).Line.Open(run, value.DimensionOf(f.r))
}

func (f *atFrame) ReadBack(_ value.Quoter, head value.Core, _ value.Value) value.Core {
	return op(atSig, head, term.Dimension{Dim: f.r})
}

func (f *atFrame) Same(c value.Comparer, other value.Frame, _ value.Value) bool {
	o, ok := other.(*atFrame)
	return ok && (f.r.Equal(o.r) || c.Differ("the dimension", f.r.String(), o.r.String()))
}

// ReadBack reads the line of types and the ends.
func (t *Path) ReadBack(q value.Quoter) value.Core {
	run := q.Run()
	line := q.Dimension(hint(t.Line.Hint(), "i"), func(i value.Name) value.Core {
		return q.Type(t.Line.Open(run, value.DimensionName(i)))
	})
	return op(pathSig, line, q.Term(t.Line.Open(run, value.Zero()), t.A0), q.Term(t.Line.Open(run, value.One()), t.A1))
}

// SameType is equality, also where the comparison is at ≤.
func (t *Path) SameType(c value.Comparer, other value.Type) bool {
	o, ok := other.(*Path)
	run := c.Run()
	return ok && c.Dimension(t.Line.Hint(), func(i value.Name) bool {
		d := value.DimensionName(i)
		return c.EqualTypes("the line of types", t.Line.Open(run, d), o.Line.Open(run, d))
	}) && c.Terms("the end at 0", t.Line.Open(run, value.Zero()), t.A0, o.A0) &&
		c.Terms("the end at 1", t.Line.Open(run, value.One()), t.A1, o.A1)
}

// ReadBackElement is η.
func (t *Path) ReadBackElement(q value.Quoter, v value.Value) value.Core {
	name := "i"
	if p, ok := v.(*PathLam); ok {
		name = hint(p.Body.Hint(), name)
	}
	return op(pathLamSig, q.Dimension(name, func(i value.Name) value.Core {
		return q.Term(t.Line.Open(q.Run(), value.DimensionName(i)), openAt(q.Run(), v, interval.Var(i)))
	}))
}

// SameElement is η.
func (t *Path) SameElement(c value.Comparer, a, b value.Value) bool {
	return c.Dimension(hint(t.Line.Hint(), "i"), func(i value.Name) bool {
		run := c.Run()
		return c.Terms("the path's points", t.Line.Open(run, value.DimensionName(i)), openAt(run, a, interval.Var(i)), openAt(run, b, interval.Var(i)))
	})
}

var (
	pathSig    = &term.Signature{Name: "PathOver", Word: "PathOver", Slots: []term.CoreSlot{lineSlot, plainSlot, plainSlot}}
	pathLamSig = &term.Signature{Name: "line", Word: "line", Slots: []term.CoreSlot{lineSlot}}
	atSig      = &term.Signature{Name: "at", Word: "at", Slots: []term.CoreSlot{plainSlot, dimSlot}}
)

type pathOp struct{}

func (pathOp) Canonical([]eval.Arg) bool { return true }
func (pathOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	a0 := args[1].Delay(run, f)
	if args[1].Shares(&args[2]) {
		return &Path{args[0].Family(run, f), a0, a0}
	}
	return &Path{args[0].Family(run, f), a0, args[2].Delay(run, f)}
}

type pathLamOp struct{}

func (pathLamOp) Canonical([]eval.Arg) bool { return true }
func (pathLamOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return &PathLam{Body: args[0].Close(run, f)}
}

type atOp struct{}

func (atOp) Principal() int { return 0 }
func (atOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return At(run, args[0].Eval(run, f), args[1].Dimension(f))
}
func (atOp) Frame(_ *value.Run, f eval.Frame, args []eval.Arg) value.Frame {
	return &atFrame{args[1].Dimension(f)}
}

func pathFormer() Former {
	return Former{
		Name: "paths", Version: 1,
		Words: []Word{
			word("Path", inferPath, nil),
			word("PathOver", inferPathOver, nil),
			word("line", nil, checkLine),
			word("at", inferAt, nil),
		},
		Operators: []Operator{{pathSig, pathOp{}}, {pathLamSig, pathLamOp{}}, {atSig, atOp{}}},
	}
}

func inferPath(c value.Checker, w *term.Written) (value.Core, value.Value) {
	level := 0
	line := c.Dimensioned(term.Binder{Name: "_"}, func(value.Name) (a value.Core) {
		a, level = c.Type(part(w, 0))
		return a
	})
	return endsOf(c, w, line, level)
}

func inferPathOver(c value.Checker, w *term.Written) (value.Core, value.Value) {
	level := 0
	line := c.Dimensioned(binder(w, 0), func(value.Name) (a value.Core) {
		a, level = c.Type(part(w, 0))
		return a
	})
	return endsOf(c, w, line, level)
}

func endsOf(c value.Checker, w *term.Written, line *term.Bound, level int) (value.Core, value.Value) {
	run := c.Run()
	a := c.Case(line, dimensions).ApplyAll
	a0 := c.Check(part(w, 1), a(run, []value.Value{value.Zero()}))
	a1 := c.Check(part(w, 2), a(run, []value.Value{value.One()}))
	if identical(a0, a1, identicalDepth) {
		a1 = a0 // one cell for both, and one wall where the path is composed or transported
	}
	return op(pathSig, line, a0, a1), NewUniverse(level)
}

const identicalDepth = 8

// identical reports whether two small terms are made of the same variables,
// definitions and eliminations; where there is anything else in them, such as
// annotations, which may differ in terms that are written alike, it says no.
func identical(a, b value.Core, depth int) bool {
	switch a := a.(type) {
	case *term.Variable:
		b, ok := b.(*term.Variable)
		return ok && a.Level == b.Level
	case *term.Global:
		b, ok := b.(*term.Global)
		return ok && a.Name == b.Name
	case *term.Op:
		b, ok := b.(*term.Op)
		if !ok || a.Sig != b.Sig || len(a.Args) != len(b.Args) || depth == 0 {
			return false
		}
		for k := range a.Args {
			x, ok1 := a.Args[k].(value.Core)
			y, ok2 := b.Args[k].(value.Core)
			if !ok1 || !ok2 || !identical(x, y, depth-1) {
				return false
			}
		}
		return true
	}
	return false
}

var dimensions = []term.Sort{term.DimensionSort}

func checkLine(c value.Checker, w *term.Written, want value.Value) value.Core {
	t, ok := c.Run().Force(want).(*Path)
	if !ok {
		c.Fail(w, term.IllTyped, "a path does not have this type", c.ShowType(want), "a path")
	}
	body := c.Dimensioned(binder(w, 0), func(i value.Name) value.Core {
		return c.Check(part(w, 0), t.Line.Open(c.Run(), value.DimensionName(i)))
	})
	path := c.Case(body, dimensions)
	for _, end := range []struct {
		at   *value.Dimension
		want value.Value
		name string
	}{{value.Zero(), t.A0, "0"}, {value.One(), t.A1, "1"}} {
		c.Same(t.Line.Open(c.Run(), end.at), end.want, path.OpenAll(c.Run(), []value.Value{end.at}),
			&term.Error{Kind: term.Disagreement, Place: w.Place, Message: "the path ends elsewhere at " + end.name})
	}
	return op(pathLamSig, body)
}

func inferAt(c value.Checker, w *term.Written) (value.Core, value.Value) {
	p, t := c.Infer(part(w, 0))
	path, ok := c.Run().Force(t).(*Path)
	if !ok {
		c.Fail(part(w, 0), term.IllTyped, "only a path stands at a dimension", "a path", c.ShowType(t))
	}
	r := c.Dimension(part(w, 1))
	return op(atSig, p, term.Dimension{Dim: r}), path.Line.Open(c.Run(), value.DimensionOf(r))
}
