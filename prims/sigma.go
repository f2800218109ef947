package prims

import (
	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Pairs Σ(x:A)B, with η (CCHM 2, 4.5; CHM 2).
//
//	hcomp (Σ(x:A)B) p [φ ↦ i.u] = (a(1), comp (i. B(a(i))) p.2 [φ ↦ i. u.2]),   a = hfill A p.1 [φ ↦ i. u.1]
//	transp (i. Σ(x:A)B) φ p     = (transp (i.A) φ p.1, transp (i. B(i, a(i))) φ p.2),   a = tfill (i.A) φ p.1

// Sigma is the type of pairs, as a value.
type Sigma struct {
	First  value.Value
	Second value.Closure
}

// Pair is a pair as a value. Its support is found once, from its parts': pairs of
// pairs that share are large as trees.
type Pair struct {
	A, B    value.Value
	support value.Support
}

// NewPair is the pair of a and b.
func NewPair(a, b value.Value) *Pair { return &Pair{a, b, a.Support() | b.Support()} }

// Support is the union of the parts'.
func (t *Sigma) Support() value.Support { return t.First.Support() | t.Second.Support() }

// Substitute delays s over the parts.
func (t *Sigma) Substitute(run *value.Run, s *value.Subst) value.Value {
	return &Sigma{run.Substitute(t.First, s), t.Second.Substitute(run, s)}
}

// Support is the union of the parts'.
func (p *Pair) Support() value.Support { return p.support }

// Substitute delays s over the parts.
func (p *Pair) Substitute(run *value.Run, s *value.Subst) value.Value {
	return NewPair(run.Substitute(p.A, s), run.Substitute(p.B, s))
}

// Hcomp composes the second parts over the filler of the first, also where the
// second type happens not to vary.
func (t *Sigma) Hcomp(run *value.Run, p value.Value, walls value.System) value.Value {
	firsts := walls.Map(run, 0, 0, func(run *value.Run, _ value.Name, u value.Value, _ *value.Subst) value.Value { return First(run, u) })
	seconds := walls.Map(run, 0, 0, func(run *value.Run, _ value.Name, u value.Value, _ *value.Subst) value.Value { return Second(run, u) })
	p1, p2 := LaterFirst(run, p), LaterSecond(run, p)
	i := run.Fresh(t.Support() | p.Support() | walls.Support())
	a := Hfill(run, i, t.First, p1, firsts)
	return NewPair(LaterHcomp(run, t.First, p1, firsts), LaterComp(run, i, t.Second.Open(run, a), p2, seconds))
}

// Transp transports the second part over the filler of the first.
func (t *Sigma) Transp(run *value.Run, i value.Name, phi interval.Face, p value.Value) value.Value {
	p1, p2 := LaterFirst(run, p), LaterSecond(run, p)
	a := Tfill(run, i, t.First, phi, p1)
	return NewPair(LaterTransp(run, i, t.First, phi, p1), LaterTransp(run, i, t.Second.Open(run, a), phi, p2))
}

// latePair is a pair whose parts are made when they are asked for.
type latePair interface {
	first(run *value.Run) value.Value
	second(run *value.Run) value.Value
}

// First is p.1, on demand.
func First(run *value.Run, p value.Value) value.Value {
	switch p := run.Force(p).(type) {
	case *Pair:
		run.Take(value.StepProject)
		if run.Followed() {
			return projectFollowed(run, p, firstFrame, p.A)
		}
		return p.A
	case latePair:
		run.Take(value.StepProject)
		return p.first(run)
	case *value.Neutral:
		return p.Eliminate(run, firstFrame)
	default:
		run.Fault("projection of %T, which is no pair", p)
		return nil
	}
}

// Second is p.2, on demand.
func Second(run *value.Run, p value.Value) value.Value {
	switch p := run.Force(p).(type) {
	case *Pair:
		run.Take(value.StepProject)
		if run.Followed() {
			return projectFollowed(run, p, secondFrame, p.B)
		}
		return p.B
	case latePair:
		run.Take(value.StepProject)
		return p.second(run)
	case *value.Neutral:
		return p.Eliminate(run, secondFrame)
	default:
		run.Fault("projection of %T, which is no pair", p)
		return nil
	}
}

// LaterFirst is First in a cell.
func LaterFirst(run *value.Run, p value.Value) value.Value {
	if p, ok := value.Peek(p).(*Pair); ok {
		return p.A
	}
	return run.LaterOf(p.Support(), first, p, nil)
}

// LaterSecond is Second in a cell.
func LaterSecond(run *value.Run, p value.Value) value.Value {
	if p, ok := value.Peek(p).(*Pair); ok {
		return p.B
	}
	return run.LaterOf(p.Support(), second, p, nil)
}

func first(run *value.Run, p, _ value.Value) value.Value  { return First(run, p) }
func second(run *value.Run, p, _ value.Value) value.Value { return Second(run, p) }

type projection struct{ second bool }

var firstFrame, secondFrame = &projection{false}, &projection{true}

func (f *projection) Support() value.Support                       { return 0 }
func (f *projection) Frontier() (frontier, faces value.Support)    { return 0, 0 }
func (f *projection) Relabel(*value.Run, *value.Subst) value.Frame { return f }
func (f *projection) Resume(run *value.Run, head value.Value) value.Value {
	if f.second {
		return Second(run, head)
	}
	return First(run, head)
}

func (f *projection) Type(run *value.Run, t value.Value, n *value.Neutral) value.Value {
	s, ok := run.Force(t).(*Sigma)
	if !ok {
		run.Fault("a neutral of type %T is projected", t)
	}
	if !f.second {
		return s.First
	}
	return s.Second.Open(run, n.Eliminate(run, firstFrame))
}

func (f *projection) ReadBack(_ value.Quoter, head value.Core, _ value.Value) value.Core {
	if f.second {
		return op(secondSig, head)
	}
	return op(firstSig, head)
}

func (f *projection) Same(_ value.Comparer, other value.Frame, _ value.Value) bool {
	return other == value.Frame(f)
}

// ReadBack reads both types.
func (t *Sigma) ReadBack(q value.Quoter) value.Core {
	return op(sigmaSig, q.Type(t.First), q.Variable(t.Second.Hint(), t.First, func(x value.Value) value.Core {
		return q.Type(t.Second.Open(q.Run(), x))
	}))
}

// SameType compares both types in the comparison's direction.
func (t *Sigma) SameType(c value.Comparer, other value.Type) bool {
	o, ok := other.(*Sigma)
	return ok && c.Types("the first type", t.First, o.First) &&
		c.Variable(hint(t.Second.Hint(), o.Second.Hint()), t.First, func(x value.Value) bool {
			return c.Types("the second type", t.Second.Open(c.Run(), x), o.Second.Open(c.Run(), x))
		})
}

// ReadBackElement is η.
func (t *Sigma) ReadBackElement(q value.Quoter, v value.Value) value.Core {
	run := q.Run()
	a := LaterFirst(run, v)
	return op(pairSig, q.Term(t.First, a), q.Term(t.Second.Open(run, a), LaterSecond(run, v)))
}

// SameElement is η.
func (t *Sigma) SameElement(c value.Comparer, a, b value.Value) bool {
	run := c.Run()
	a1 := LaterFirst(run, a)
	return c.Terms("the first part", t.First, a1, LaterFirst(run, b)) &&
		c.Terms("the second part", t.Second.Open(run, a1), LaterSecond(run, a), LaterSecond(run, b))
}

var (
	sigmaSig  = &term.Signature{Name: "Sigma", Word: "Sigma", Slots: []term.CoreSlot{plainSlot, boundSlot}}
	pairSig   = &term.Signature{Name: "pair", Word: "pair", Slots: []term.CoreSlot{plainSlot, plainSlot}}
	firstSig  = &term.Signature{Name: "fst", Word: "fst", Slots: []term.CoreSlot{plainSlot}}
	secondSig = &term.Signature{Name: "snd", Word: "snd", Slots: []term.CoreSlot{plainSlot}}
)

type sigmaOp struct{}

func (sigmaOp) Canonical([]eval.Arg) bool { return true }
func (sigmaOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return &Sigma{args[0].Delay(run, f), args[1].Family(run, f)}
}

type pairOp struct{}

func (pairOp) Canonical([]eval.Arg) bool { return true }
func (pairOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	a := args[0].Delay(run, f)
	if args[0].Shares(&args[1]) {
		return NewPair(a, a)
	}
	return NewPair(a, args[1].Delay(run, f))
}

type projectionOp struct{ frame *projection }

func (projectionOp) Principal() int { return 0 }
func (o projectionOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return o.frame.Resume(run, args[0].Eval(run, f))
}
func (o projectionOp) Frame(*value.Run, eval.Frame, []eval.Arg) value.Frame { return o.frame }

func sigmaFormer() Former {
	return Former{
		Name: "pairs", Version: 1,
		Words: []Word{
			word("Sigma", inferSigma, nil),
			word("*", inferSigma, nil),
			word("pair", nil, checkPair),
			word("fst", inferFirst, nil),
			word("snd", inferSecond, nil),
		},
		Operators: []Operator{{sigmaSig, sigmaOp{}}, {pairSig, pairOp{}}, {firstSig, projectionOp{firstFrame}}, {secondSig, projectionOp{secondFrame}}},
	}
}

func inferSigma(c value.Checker, w *term.Written) (value.Core, value.Value) {
	name := term.Binder{Name: "_"}
	if len(w.Parts[1].Binders) > 0 {
		name = binder(w, 1)
	}
	first, m := c.Type(part(w, 0))
	n := 0
	b := c.Variable(name, c.Value(first), func(value.Value) (body value.Core) {
		body, n = c.Type(part(w, 1))
		return body
	})
	return op(sigmaSig, first, b), NewUniverse(max(m, n))
}

func checkPair(c value.Checker, w *term.Written, want value.Value) value.Core {
	t, ok := c.Run().Force(want).(*Sigma)
	if !ok {
		c.Fail(w, term.IllTyped, "a pair does not have this type", c.ShowType(want), "a pair")
	}
	a := c.Check(part(w, 0), t.First)
	return op(pairSig, a, c.Check(part(w, 1), t.Second.Open(c.Run(), c.Value(a))))
}

func inferFirst(c value.Checker, w *term.Written) (value.Core, value.Value) {
	p, t := inferPair(c, w)
	return op(firstSig, p), t.First
}

func inferSecond(c value.Checker, w *term.Written) (value.Core, value.Value) {
	p, t := inferPair(c, w)
	return op(secondSig, p), t.Second.Open(c.Run(), c.Value(op(firstSig, p)))
}

func inferPair(c value.Checker, w *term.Written) (value.Core, *Sigma) {
	p, t := c.Infer(part(w, 0))
	s, ok := c.Run().Force(t).(*Sigma)
	if !ok {
		c.Fail(part(w, 0), term.IllTyped, "only a pair has parts", "a pair", c.ShowType(t))
	}
	return p, s
}
