package streams

import (
	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
)

// How streams are written, typed, read back and compared.

var (
	plain     = term.CoreSlot{}
	typeSig   = &term.Signature{Name: "Stream", Word: "Stream", Slots: []term.CoreSlot{plain}}
	unfoldSig = &term.Signature{Name: "unfold", Word: "unfold", Slots: []term.CoreSlot{plain, plain, plain}}
	headSig   = &term.Signature{Name: "head", Word: "head", Slots: []term.CoreSlot{plain}}
	tailSig   = &term.Signature{Name: "tail", Word: "tail", Slots: []term.CoreSlot{plain}}
)

// Former is streams as an engine registers them.
func Former() prims.Former {
	one, three := []term.Slot{{}}, []term.Slot{{}, {}, {}}
	return prims.Former{
		Name: "streams", Version: 1,
		Words: []prims.Word{
			{Shape: term.Shape{Word: "Stream", Slots: one}, Infer: inferType},
			{Shape: term.Shape{Word: "head", Slots: one}, Infer: inferHead},
			{Shape: term.Shape{Word: "tail", Slots: one}, Infer: inferTail},
			{Shape: term.Shape{Word: "unfold", Slots: three}, Check: checkUnfold},
		},
		Operators: []prims.Operator{
			{Sig: typeSig, Op: typeOp{}}, {Sig: unfoldSig, Op: unfoldOp{}},
			{Sig: headSig, Op: projectionOp{headFrame}}, {Sig: tailSig, Op: projectionOp{tailFrame}},
		},
	}
}

func op(sig *term.Signature, args ...term.Arg) value.Core { return &term.Op{Sig: sig, Args: args} }

func inferType(c value.Checker, w *term.Written) (value.Core, value.Value) {
	a, level := c.Type(w.Parts[0].Body)
	return op(typeSig, a), prims.NewUniverse(level)
}

func inferStream(c value.Checker, w *term.Written) (value.Core, *Type) {
	s, t := c.Infer(w.Parts[0].Body)
	st, ok := c.Run().Force(t).(*Type)
	if !ok {
		c.Fail(w.Parts[0].Body, term.IllTyped, "only a stream has a head and a tail", "a stream", c.ShowType(t))
	}
	return s, st
}

func inferHead(c value.Checker, w *term.Written) (value.Core, value.Value) {
	s, t := inferStream(c, w)
	return op(headSig, s), t.Element
}

func inferTail(c value.Checker, w *term.Written) (value.Core, value.Value) {
	s, t := inferStream(c, w)
	return op(tailSig, s), t
}

func checkUnfold(c value.Checker, w *term.Written, want value.Value) value.Core {
	t, ok := c.Run().Force(want).(*Type)
	if !ok {
		c.Fail(w, term.IllTyped, "an unfolding does not have this type", c.ShowType(want), "a stream")
	}
	seeds, _ := c.Type(w.Parts[0].Body)
	s := c.Value(seeds)
	step := c.Check(w.Parts[1].Body, stepType(s, t.Element))
	return op(unfoldSig, seeds, step, c.Check(w.Parts[2].Body, s))
}

// stepType is S → A × S.
func stepType(seeds, element value.Value) value.Value {
	next := &prims.Sigma{First: element, Second: value.Constant{V: seeds}}
	return &prims.Pi{Domain: seeds, Codomain: value.Constant{V: next}}
}

type typeOp struct{}

func (typeOp) Canonical([]eval.Arg) bool { return true }
func (typeOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return &Type{args[0].Delay(run, f)}
}

type unfoldOp struct{}

func (unfoldOp) Canonical([]eval.Arg) bool { return true }
func (unfoldOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return &Unfold{args[0].Delay(run, f), args[1].Delay(run, f), args[2].Delay(run, f)}
}

type projectionOp struct{ frame *projection }

func (projectionOp) Principal() int { return 0 }
func (o projectionOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return o.frame.Resume(run, args[0].Eval(run, f))
}
func (o projectionOp) Frame(*value.Run, eval.Frame, []eval.Arg) value.Frame { return o.frame }

// projection is head or tail, waiting on a neutral.
type projection struct{ tail bool }

var headFrame, tailFrame = &projection{false}, &projection{true}

func (p *projection) Support() value.Support                       { return 0 }
func (p *projection) Frontier() (frontier, faces value.Support)    { return 0, 0 }
func (p *projection) Relabel(*value.Run, *value.Subst) value.Frame { return p }

func (p *projection) Resume(run *value.Run, s value.Value) value.Value {
	if p.tail {
		return Tail(run, s)
	}
	return Head(run, s)
}

func (p *projection) Type(run *value.Run, t value.Value, _ *value.Neutral) value.Value {
	st, ok := run.Force(t).(*Type)
	if !ok {
		run.Fault("a neutral of type %T has a head or a tail", t)
	}
	if p.tail {
		return st
	}
	return st.Element
}

func (p *projection) ReadBack(_ value.Quoter, s value.Core, _ value.Value) value.Core {
	if p.tail {
		return op(tailSig, s)
	}
	return op(headSig, s)
}

func (p *projection) Same(_ value.Comparer, other value.Frame, _ value.Value) bool {
	return other == value.Frame(p)
}

// ReadBack reads the element type.
func (t *Type) ReadBack(q value.Quoter) value.Core { return op(typeSig, q.Type(t.Element)) }

// SameType compares element types, also at ≤ for equality: a stream is invariant.
func (t *Type) SameType(c value.Comparer, other value.Type) bool {
	o, ok := other.(*Type)
	return ok && c.EqualTypes("the element type", t.Element, o.Element)
}

// ReadBackElement reads what is canonical by its parts.
func (t *Type) ReadBackElement(q value.Quoter, v value.Value) value.Core {
	switch v := v.(type) {
	case *Unfold:
		return op(unfoldSig, q.Type(v.Seeds), q.Term(stepType(v.Seeds, t.Element), v.Step), q.Term(v.Seeds, v.Seed))
	case *Composite:
		return prims.ReadHcomp(q, t, v.Base, v.Walls)
	case *Transport:
		return prims.ReadTransp(q, v.I, v.Line, v.Face, v.Base)
	case *value.Neutral:
		return q.Neutral(v)
	}
	q.Run().Fault("%T stands in a type of streams", v)
	return nil
}

// SameElement compares what is canonical by its parts.
func (t *Type) SameElement(c value.Comparer, a, b value.Value) bool {
	switch x := a.(type) {
	case *Unfold:
		y, ok := b.(*Unfold)
		return ok && c.EqualTypes("the type of seeds", x.Seeds, y.Seeds) &&
			c.Terms("the step", stepType(x.Seeds, t.Element), x.Step, y.Step) && c.Terms("the seed", x.Seeds, x.Seed, y.Seed)
	case *Composite:
		y, ok := b.(*Composite)
		return ok && prims.SameHcomp(c, t, x.Base, x.Walls, y.Base, y.Walls)
	case *Transport:
		y, ok := b.(*Transport)
		return ok && prims.SameTransp(c, x.I, x.Line, x.Face, x.Base, y.I, y.Line, y.Face, y.Base)
	case *value.Neutral:
		y, ok := b.(*value.Neutral)
		return ok && c.Neutrals(x, y)
	}
	return false
}
