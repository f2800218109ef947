package prims

import (
	"fmt"
	"slices"
	"strings"

	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// The account of a declaration for people: which rules it got. What can be
// computed is computed by the rules themselves on variables and read back, so
// the account cannot say anything else than what evaluation does. Rules that
// hold for every system of walls are written as schemes, with φ for a face.

// Account tells the rules of a data type, section by section.
type Account struct {
	Name     string
	Level    int  // of the universe it lives in
	Formal   bool // composites are canonical; otherwise constructors are pushed through them
	Sections []AccountSection
}

// AccountSection is a part of an account: formation, constructors,
// elimination, composition or transport. Each rule is one or more lines in the
// written notation, the first of them the rule, the others its conditions.
type AccountSection struct {
	Title string
	Rules [][]string
}

// String is the account as text: titles, rules below them, conditions below rules.
func (a *Account) String() string {
	if a == nil {
		return ""
	}
	var b strings.Builder
	fmt.Fprintf(&b, "%s, a data type in (U %d), composition %s", a.Name, a.Level, treatmentName(a.Formal))
	for _, s := range a.Sections {
		b.WriteString("\n" + s.Title)
		for _, r := range s.Rules {
			for k, line := range r {
				indent := "\n  "
				if k > 0 {
					indent = "\n    "
				}
				b.WriteString(indent + line)
			}
		}
	}
	return b.String()
}

func treatmentName(formal bool) string {
	if formal {
		return "formal"
	}
	return "strict"
}

// Account tells the rules of d. newQuoter returns a quoter of an empty scope
// that keeps definitions folded; write writes a core term of a scope with the
// given names. Cost: linear in the declaration and in the normal forms of its
// rules on variables.
func (d *Data) Account(newQuoter func() value.Quoter, write func(c term.Core, variables, dimensions []string) string) *Account {
	a := &Account{Name: d.Name, Level: d.Level, Formal: d.Formal}
	for _, tell := range []func(*accountant) AccountSection{
		(*accountant).formation, (*accountant).constructors, (*accountant).elimination, (*accountant).composition, (*accountant).transport,
	} {
		q := newQuoter()
		x := &accountant{q: q, run: q.Run(), d: d, write: write, taken: map[string]bool{d.Name: true}}
		for _, k := range d.Constructors {
			x.taken[k.Name] = true
		}
		q.Binders(func(b value.Binding) value.Core {
			x.b = b
			a.Sections = append(a.Sections, tell(x))
			return nil
		})
	}
	return a
}

// accountant is a scope in which rules are computed and written.
type accountant struct {
	q                     value.Quoter
	b                     value.Binding
	run                   *value.Run
	d                     *Data
	write                 func(c term.Core, variables, dimensions []string) string
	variables, dimensions []string
	taken                 map[string]bool // names that a new one must not be
}

// Variable binds a variable under a name of its own.
func (x *accountant) Variable(hint string, t value.Value) value.Value {
	hint = x.unused(hint)
	x.variables = append(x.variables, hint)
	return x.b.Variable(hint, t)
}

// Dimension binds a dimension under a name of its own.
func (x *accountant) Dimension(hint string) value.Name {
	hint = x.unused(hint)
	x.dimensions = append(x.dimensions, hint)
	return x.b.Dimension(hint)
}

func (x *accountant) unused(name string) string {
	if name == "" || name == "_" {
		name = "x"
	}
	for x.taken[name] {
		name += "'"
	}
	x.taken[name] = true
	return name
}

// under runs body and takes back what it has bound.
func (x *accountant) under(body func()) {
	v, d, b := len(x.variables), len(x.dimensions), x.b
	x.q.Binders(func(inner value.Binding) value.Core {
		x.b = inner
		body()
		return nil
	})
	for _, name := range append(slices.Clone(x.variables[v:]), x.dimensions[d:]...) {
		delete(x.taken, name)
	}
	x.variables, x.dimensions, x.b = x.variables[:v], x.dimensions[:d], b
}

func (x *accountant) typeText(t value.Value) string {
	return x.write(x.q.Type(t), x.variables, x.dimensions)
}

func (x *accountant) text(t, v value.Value) string {
	return x.write(x.q.Term(t, v), x.variables, x.dimensions)
}

// own is the data type at its parameters, which are bound first, as text.
func (x *accountant) own() string {
	return applied(x.d.Name, x.variables[:len(x.d.Params)]...)
}

// last is the name that was bound last.
func (x *accountant) last() string { return x.variables[len(x.variables)-1] }

func applied(head string, args ...string) string {
	if len(args) == 0 {
		return head
	}
	return "(" + head + " " + strings.Join(args, " ") + ")"
}

// params binds the parameters, as they are or as lines of them, and says so.
func (x *accountant) params() (params []value.Value, says []string) {
	for n := range x.d.Params {
		t := x.d.Params[n].At(x.run, params, nil)
		says = append(says, "for ")
		params = append(params, x.Variable(x.d.Params[n].Name, t))
		says[n] += x.last() + " : " + x.typeText(t)
	}
	return params, says
}

// lines binds a line for each entry of a telescope and returns their values at
// the dimension i, which is free in no result's type.
func (x *accountant) lines(telescope []Argument, i value.Name, at func(entry *Argument, earlier []value.Value) value.Value) (lines, values []value.Value) {
	for n := range telescope {
		t := at(&telescope[n], values)
		line := x.Variable(telescope[n].Name, &PiDimension{&value.Line{I: i, Body: t, Name: "i"}})
		lines = append(lines, line)
		values = append(values, LaterApply(x.run, line, value.DimensionName(i)))
	}
	return lines, values
}

func (x *accountant) formation() AccountSection {
	_, says := x.params()
	return AccountSection{"formation", [][]string{append([]string{x.own() + " : " + fmt.Sprintf("(U %d)", x.d.Level)}, says...)}}
}

// arguments binds arguments and dimensions of k.
func (x *accountant) arguments(k *Constructor, params []value.Value) (args []value.Value, dims []interval.Dim, says []string) {
	for n := range k.Args {
		t := k.Args[n].At(x.run, params, args)
		text := x.typeText(t)
		args = append(args, x.Variable(k.Args[n].Name, t))
		says = append(says, "for "+x.last()+" : "+text)
	}
	return args, x.dims(k), says
}

func (x *accountant) dims(k *Constructor) (dims []interval.Dim) {
	for _, name := range k.Dims {
		dims = append(dims, interval.Var(x.Dimension(name)))
	}
	return dims
}

func (x *accountant) faceText(k *Constructor, c interval.Cube) string {
	names := x.dimensions[len(x.dimensions)-len(k.Dims):]
	var parts []string
	for _, a := range c.Assignments() {
		end := "0"
		if a.One {
			end = "1"
		}
		parts = append(parts, "(= "+names[a.Name]+" "+end+")")
	}
	if len(parts) == 0 {
		return "top"
	}
	if len(parts) == 1 {
		return parts[0]
	}
	return applied("and", parts...)
}

// elements calls yield with each face of the boundary of k and its element there.
func (x *accountant) elements(k *Constructor, params, args []value.Value, dims []interval.Dim, yield func(face string, cut *value.Subst, element value.Value)) {
	s := dimensionSubst(dims)
	for _, wall := range k.Boundary {
		face := wall.Cube.Subst(s)
		cut := face.Cube(0).Restriction()
		under := make([]interval.Dim, len(dims))
		for n, d := range dims {
			under[n] = d.Subst(cut)
		}
		yield(x.faceText(k, wall.Cube), cut, wall.Element.OpenAll(x.run, environment(params, args, under)))
	}
}

func (x *accountant) constructors() AccountSection {
	out := AccountSection{Title: "constructors"}
	params, _ := x.params()
	t := NewDataType(x.d, params)
	for _, k := range x.d.Constructors {
		x.under(func() {
			args, dims, says := x.arguments(k, params)
			rule := []string{k.form(x, len(k.Args)) + " : " + x.own()}
			for n, a := range k.Args {
				if a.Recursive != nil {
					says[n] += ", recursive"
				}
			}
			rule = append(rule, says...)
			for n := range k.Dims {
				rule = append(rule, "for "+x.dimensions[len(x.dimensions)-len(k.Dims)+n]+" : I")
			}
			x.elements(k, params, args, dims, func(face string, _ *value.Subst, e value.Value) {
				rule = append(rule, "on "+face+" it is "+x.text(t, e))
			})
			out.Rules = append(out.Rules, rule)
		})
	}
	if len(x.d.Constructors) == 0 {
		out.Rules = append(out.Rules, []string{"none"})
	}
	return out
}

// others are the constructors that the boundary of k, and the ends of the paths
// among its arguments, come down to, in the order of the declaration.
func (k *Constructor) others() (out []*Constructor) {
	seen := map[*Constructor]bool{k: true}
	work := []*Constructor{k}
	for len(work) > 0 {
		c := work[len(work)-1]
		work = work[:len(work)-1]
		visit := func(a term.Arg) bool {
			if r, ok := a.(term.Reference); ok {
				if other, ok := r.Target.(*Constructor); ok && other.Data == k.Data && !seen[other] {
					seen[other] = true
					out = append(out, other)
					work = append(work, other)
				}
			}
			return true
		}
		for _, b := range c.Boundary {
			term.Walk(b.Core, visit)
		}
		for _, a := range c.Args {
			term.Walk(a.Core, visit)
		}
	}
	slices.SortFunc(out, func(a, b *Constructor) int { return a.Index - b.Index })
	return out
}

// binds is how many names the case of k binds.
func (k *Constructor) binds() int {
	n := len(k.Args) + len(k.Dims)
	for _, a := range k.Args {
		if a.Recursive != nil {
			n++
		}
	}
	return n
}

// form is the constructor at the variables and dimensions bound last.
func (k *Constructor) form(x *accountant, variables int) string {
	args := append([]string(nil), x.variables[len(x.variables)-variables:]...)
	return applied(k.Name, append(args, x.dimensions[len(x.dimensions)-len(k.Dims):]...)...)
}

// valueOfCase is a case that is a variable of the scope, a function of what it takes.
type valueOfCase struct {
	f     value.Value
	arity int
}

func (c valueOfCase) Support() value.Support { return c.f.Support() }
func (c valueOfCase) SubstituteCase(run *value.Run, s *value.Subst) value.Case {
	return valueOfCase{run.Substitute(c.f, s), c.arity}
}
func (c valueOfCase) ApplyAll(run *value.Run, args []value.Value) value.Value {
	v := c.f
	for _, a := range args {
		v = Apply(run, v, a)
	}
	return v
}
func (c valueOfCase) OpenAll(run *value.Run, args []value.Value) value.Value {
	return c.ApplyAll(run, args)
}
func (c valueOfCase) Arity() int               { return c.arity }
func (c valueOfCase) HintAt(int) string        { return "_" }
func (c valueOfCase) AsClosure() value.Closure { return value.Constant{V: c.f} }

func (x *accountant) elimination() AccountSection {
	params, _ := x.params()
	t := NewDataType(x.d, params)
	family := x.Variable("P", &Pi{t, value.Constant{V: NewUniverse(x.d.Level)}})
	p := x.last()
	scheme := "(elim (x (" + p + " x))"
	rule := []string{scheme + " t CASE …) : (" + p + " t), for t : " + x.own()}
	if len(x.d.Constructors) > 0 {
		rule = append(rule, "with a CASE for each constructor; at the constructor it is the case at the arguments, the eliminations of the recursive ones, and the dimensions")
	}
	out := AccountSection{"elimination into any family " + p + " of types over " + x.own(), [][]string{rule}}

	e := newEliminator(x.d, &value.Captured{Rule: applyFamily, Values: []value.Value{family}}, make([]value.Case, len(x.d.Constructors)), nil)
	for _, k := range x.d.Constructors {
		var rule []string
		x.under(func() {
			// what the boundary does with other cases is written as functions of their names
			others := k.others()
			for _, c := range others {
				f := x.Variable(c.Name+"-case", x.caseType(e, c, params, nil))
				e.cases[c.Index] = valueOfCase{f, c.binds()}
			}
			defer func() {
				for _, c := range others {
					e.cases[c.Index] = nil
				}
			}()
			first := len(x.variables)
			args, _, _ := x.argumentsOnly(k, params)
			at, hypotheses := e, []string{}
			for m, a := range k.Args {
				if a.Recursive == nil {
					continue
				}
				ht := at.hypothesisType(x.run, a.Recursive, a.At(x.run, params, args), args[m])
				text := x.typeText(ht)
				h := x.Variable("h"+k.Args[m].Name, ht)
				hypotheses = append(hypotheses, "for "+x.last()+" : "+text+", the hypothesis of "+x.variables[first+m])
				at = at.assuming(args[m], h)
			}
			dims := x.dims(k)
			rule = append(rule, fmt.Sprintf("(%s u), u : %s", k.form(x, len(args)+len(hypotheses)), x.typeText(e.family.Open(x.run, NewCon(x.run, k, params, args, dims)))))
			rule = append(rule, hypotheses...)
			x.elements(k, params, args, dims, func(face string, cut *value.Subst, element value.Value) {
				here := at
				if cut != nil {
					here = at.substitute(x.run, cut)
				}
				rule = append(rule, "on "+face+" it must be "+x.text(e.family.Open(x.run, element), here.Eliminate(x.run, element)))
			})
		})
		out.Rules = append(out.Rules, rule)
	}
	return out
}

var applyFamily = &value.Rule{Name: "x", Apply: applyFamilyRule}

func applyFamilyRule(run *value.Run, c *value.Captured, v value.Value) value.Value {
	return Apply(run, c.Values[0], v)
}

// argumentsOnly binds the arguments of k without its dimensions.
func (x *accountant) argumentsOnly(k *Constructor, params []value.Value) (args []value.Value, dims []interval.Dim, says []string) {
	short := *k
	short.Dims = nil
	return x.arguments(&short, params)
}

// caseType is the type of the case of k as a function: of the arguments, the
// hypotheses and the dimensions, of which the first ones are given.
func (x *accountant) caseType(e *Eliminator, k *Constructor, params, given []value.Value) value.Value {
	rest := &value.Captured{Rule: &value.Rule{Name: "x", Apply: func(_ *value.Run, c *value.Captured, v value.Value) value.Value {
		return x.caseType(e, k, params, append(slices.Clone(c.Values), v))
	}}, Values: given}
	n := len(given)
	if n < len(k.Args) {
		return &Pi{k.Args[n].At(x.run, params, given), value.NewCaptured(x.run, *rest)}
	}
	args := given[:len(k.Args)]
	n -= len(args)
	for m, a := range k.Args {
		if a.Recursive == nil {
			continue
		}
		if n == 0 {
			return &Pi{e.hypothesisType(x.run, a.Recursive, a.At(x.run, params, args), args[m]), value.NewCaptured(x.run, *rest)}
		}
		n--
	}
	if n < len(k.Dims) {
		return &PiDimension{value.NewCaptured(x.run, *rest)}
	}
	dims := make([]interval.Dim, n)
	for m, d := range given[len(given)-n:] {
		dims[m] = d.(*value.Dimension).Dim
	}
	return e.family.Open(x.run, NewCon(x.run, k, params, args, dims))
}
