package prims

import (
	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Functions Π(x:A)B, with η (CCHM 2, 4.5; CHM 2).
//
//	hcomp (Π(x:A)B) f [φ ↦ i.u] = λx. hcomp B(x) (f x) [φ ↦ i. u x]
//	transp (i. Π(x:A)B) φ f     = λ(x:A(1)). transp (i. B(i, x̂(i))) φ (f x̂(0)),
//	    x̂(i) = transp (j. A(i ∨ ~j)) (φ ∨ (i=1)) x

// Pi is the type of functions from Domain, as a value.
type Pi struct {
	Domain   value.Value
	Codomain value.Closure
}

// Lam is a function as a value, over a type or over the interval.
type Lam = value.Lam

// Support is the union of the parts'.
func (p *Pi) Support() value.Support { return p.Domain.Support() | p.Codomain.Support() }

// Substitute delays s over the parts.
func (p *Pi) Substitute(run *value.Run, s *value.Subst) value.Value {
	return &Pi{run.Substitute(p.Domain, s), p.Codomain.Substitute(run, s)}
}

// Hcomp is a function that composes pointwise.
func (p *Pi) Hcomp(run *value.Run, f value.Value, walls value.System) value.Value {
	return &Lam{Body: value.NewCaptured(run, value.Captured{Rule: hcompPi, Values: []value.Value{p, f}, Walls: walls})}
}

var hcompPi = &value.Rule{Name: "x", Apply: hcompPiRule}

func hcompPiRule(run *value.Run, c *value.Captured, x value.Value) value.Value {
	p, f := run.Force(c.Values[0]).(*Pi), c.Values[1]
	walls := c.Walls.Map(run, x.Support(), 0, func(run *value.Run, _ value.Name, u value.Value, cut *value.Subst) value.Value {
		return Apply(run, u, run.Substitute(x, cut))
	})
	return Hcomp(run, p.Codomain.Open(run, x), LaterApply(run, f, x), walls)
}

// Transp is a function that transports its argument back and its value forth.
func (p *Pi) Transp(run *value.Run, i value.Name, phi interval.Face, f value.Value) value.Value {
	return &Lam{Body: value.NewCaptured(run, value.Captured{Rule: transpPi, Values: []value.Value{f}, Face: phi, I: i, Line: []value.Value{p}})}
}

var transpPi = &value.Rule{Name: "x", Apply: transpPiRule}

func transpPiRule(run *value.Run, c *value.Captured, x value.Value) value.Value {
	p, f := run.Force(c.Line[0]).(*Pi), c.Values[0]
	back := Backfill(run, c.I, p.Domain, c.Face, x)
	start := Backward(run, c.I, p.Domain, c.Face, x)
	return Transp(run, c.I, p.Codomain.Open(run, back), c.Face, LaterApply(run, f, start))
}

// Apply is f x, on demand; the result may be lazy.
func Apply(run *value.Run, f, x value.Value) value.Value {
	switch f := run.Force(f).(type) {
	case *Lam:
		return beta(run, f, x)
	case *value.Neutral:
		return f.Eliminate(run, &applyFrame{x})
	default:
		run.Fault("application of %T, which is no function", f)
		return nil
	}
}

// beta is f x by β.
func beta(run *value.Run, f *Lam, x value.Value) value.Value {
	run.Take(value.StepApply)
	if run.Traced() && run.Calls() {
		return betaFollowed(run, f, x)
	}
	return f.Body.Apply(run, x)
}

// LaterApply is Apply in a cell.
func LaterApply(run *value.Run, f, x value.Value) value.Value {
	if c, ok := value.Peek(f).(*Lam); ok {
		if c, ok := c.Body.(value.Constant); ok {
			return c.V
		}
	}
	return run.LaterOf(f.Support()|x.Support(), Apply, f, x)
}

// open is f x without doing the work of the body, so that a definition at its
// head stays folded; f is forced.
func open(run *value.Run, f, x value.Value) value.Value {
	if l, ok := f.(*Lam); ok {
		return l.Body.Open(run, x)
	}
	return Apply(run, f, x)
}

type applyFrame struct{ arg value.Value }

func (f *applyFrame) Support() value.Support                    { return f.arg.Support() }
func (f *applyFrame) Frontier() (frontier, faces value.Support) { return 0, 0 }
func (f *applyFrame) Relabel(run *value.Run, s *value.Subst) value.Frame {
	return &applyFrame{run.Substitute(f.arg, s)}
}
func (f *applyFrame) Resume(run *value.Run, head value.Value) value.Value {
	return Apply(run, head, f.arg)
}

func (f *applyFrame) Type(run *value.Run, t value.Value, _ *value.Neutral) value.Value {
	switch t := run.Force(t).(type) {
	case *Pi:
		return t.Codomain.Open(run, f.arg)
	case *PiDimension:
		return t.Codomain.Open(run, f.arg)
	default:
		run.Fault("a neutral of type %T is applied", t)
		return nil
	}
}

func (f *applyFrame) ReadBack(q value.Quoter, head value.Core, t value.Value) value.Core {
	if r, ok := f.arg.(*value.Dimension); ok {
		return op(applySig, head, term.Dimension{Dim: r.Dim})
	}
	return op(applySig, head, q.Term(q.Run().Force(t).(*Pi).Domain, f.arg))
}

func (f *applyFrame) Same(c value.Comparer, other value.Frame, t value.Value) bool {
	o, ok := other.(*applyFrame)
	if !ok {
		return false
	}
	if r, ok := f.arg.(*value.Dimension); ok {
		return sameDimension(c, r, o.arg.(*value.Dimension))
	}
	return c.Terms("the argument", c.Run().Force(t).(*Pi).Domain, f.arg, o.arg)
}

func sameDimension(c value.Comparer, r, s *value.Dimension) bool {
	return r.Equal(s.Dim) || c.Differ("the dimension", r.String(), s.String())
}

// ReadBack reads domain and codomain.
func (p *Pi) ReadBack(q value.Quoter) value.Core {
	return op(piSig, q.Type(p.Domain), q.Variable(p.Codomain.Hint(), p.Domain, func(x value.Value) value.Core {
		return q.Type(p.Codomain.Open(q.Run(), x))
	}))
}

// SameType: equal domains, codomains in the comparison's direction.
func (p *Pi) SameType(c value.Comparer, other value.Type) bool {
	o, ok := other.(*Pi)
	return ok && c.EqualTypes("the domain", p.Domain, o.Domain) &&
		c.Variable(hint(p.Codomain.Hint(), o.Codomain.Hint()), p.Domain, func(x value.Value) bool {
			return c.Types("the codomain", p.Codomain.Open(c.Run(), x), o.Codomain.Open(c.Run(), x))
		})
}

// ReadBackElement is η.
func (p *Pi) ReadBackElement(q value.Quoter, v value.Value) value.Core {
	name := p.Codomain.Hint()
	if l, ok := v.(*Lam); ok {
		name = hint(l.Body.Hint(), name)
	}
	return op(lamSig, q.Variable(name, p.Domain, func(x value.Value) value.Core {
		return q.Term(p.Codomain.Open(q.Run(), x), open(q.Run(), v, x))
	}))
}

// SameElement is η.
func (p *Pi) SameElement(c value.Comparer, a, b value.Value) bool {
	return c.Variable(p.Codomain.Hint(), p.Domain, func(x value.Value) bool {
		run := c.Run()
		return c.Terms("the function's value", p.Codomain.Open(run, x), open(run, a, x), open(run, b, x))
	})
}

var (
	piSig    = &term.Signature{Name: "Pi", Word: "Pi", Slots: []term.CoreSlot{plainSlot, boundSlot}}
	lamSig   = &term.Signature{Name: "lam", Word: "lam", Slots: []term.CoreSlot{boundSlot}}
	applySig = &term.Signature{Name: "app", Slots: []term.CoreSlot{plainSlot, plainSlot}}
)

type piOp struct{}

func (piOp) Canonical([]eval.Arg) bool { return true }
func (piOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return &Pi{args[0].Delay(run, f), args[1].Family(run, f)}
}

type lamOp struct{}

func (lamOp) Body() int { return 0 }

func (lamOp) Canonical([]eval.Arg) bool { return true }
func (lamOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return args[0].Lambda(run, f)
}

type applyOp struct{}

func (applyOp) Principal() int { return 0 }
func (applyOp) Argument() int  { return 1 }

// Call is application where it is not compiled code that is called.
func (applyOp) Call(run *value.Run, fn, x value.Value) value.Value { return Apply(run, fn, x) }

// Eval evaluates the argument where the function will do so anyway.
func (applyOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	fn := run.Force(args[0].Eval(run, f))
	if l, ok := fn.(*Lam); ok && l.Strict(run) {
		return beta(run, l, run.Force(args[1].Eval(run, f)))
	}
	return Apply(run, fn, args[1].Delay(run, f))
}
func (applyOp) Frame(run *value.Run, f eval.Frame, args []eval.Arg) value.Frame {
	return &applyFrame{args[1].Delay(run, f)}
}

func piFormer() Former {
	return Former{
		Name: "functions", Version: 1,
		Words: []Word{
			word("Pi", inferPi, nil),
			word("->", inferPi, nil),
			word("lam", nil, checkLam),
		},
		Operators: []Operator{{piSig, piOp{}}, {lamSig, lamOp{}}, {applySig, applyOp{}}},
	}
}

// inferPi types Pi and ->, whose domain may be the interval.
func inferPi(c value.Checker, w *term.Written) (value.Core, value.Value) {
	name := term.Binder{Name: "_"}
	if len(w.Parts[1].Binders) > 0 {
		name = binder(w, 1)
	}
	if d := part(w, 0); d.Kind == term.FormKind && d.Word == "I" {
		level := 0
		b := c.Dimensioned(name, func(value.Name) (body value.Core) {
			body, level = c.Type(part(w, 1))
			return body
		})
		return op(piDimensionSig, b), NewUniverse(level)
	}
	domain, m := c.Type(part(w, 0))
	n := 0
	b := c.Variable(name, c.Value(domain), func(value.Value) (body value.Core) {
		body, n = c.Type(part(w, 1))
		return body
	})
	return op(piSig, domain, b), NewUniverse(max(m, n))
}

func checkLam(c value.Checker, w *term.Written, want value.Value) value.Core {
	run := c.Run()
	switch t := run.Force(want).(type) {
	case *Pi:
		return op(lamSig, c.Variable(binder(w, 0), t.Domain, func(x value.Value) value.Core {
			return c.Check(part(w, 0), t.Codomain.Open(run, x))
		}))
	case *PiDimension:
		return op(lamDimensionSig, c.Dimensioned(binder(w, 0), func(i value.Name) value.Core {
			return c.Check(part(w, 0), t.Codomain.Open(run, value.DimensionName(i)))
		}))
	default:
		c.Fail(w, term.IllTyped, "a function does not have this type", c.ShowType(t), "a function")
		return nil
	}
}

// ElaborateApply types an application.
func (p *Pi) ElaborateApply(c value.Checker, f value.Core, arg *term.Written) (value.Core, value.Value) {
	a := c.Check(arg, p.Domain)
	return op(applySig, f, a), p.Codomain.Open(c.Run(), c.Value(a))
}
