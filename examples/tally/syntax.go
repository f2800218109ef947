package tally

import (
	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// How tallies are written, typed, read back and compared.

var (
	v, d  = term.TermSort, term.DimensionSort
	slots = []term.Slot{{Binds: []term.Sort{v}}, {}, {Binds: []term.Sort{v}}, {Binds: []term.Sort{v, v}}, {Binds: []term.Sort{v, v, d}}}

	typeSig    = &term.Signature{Name: "Tally", Word: "Tally", Slots: coreSlots(term.Slot{})}
	settledSig = &term.Signature{Name: "settled", Word: "settled", Slots: coreSlots(term.Slot{})}
	dueSig     = &term.Signature{Name: "due", Word: "due", Slots: coreSlots(term.Slot{})}
	waiveSig   = &term.Signature{Name: "waive", Word: "waive", Slots: coreSlots(term.Slot{}, term.Slot{Sort: d})}
	auditSig   = &term.Signature{Name: "audit", Word: "audit", Slots: coreSlots(slots...)}
)

func coreSlots(slots ...term.Slot) []term.CoreSlot {
	out := make([]term.CoreSlot, len(slots))
	for k, s := range slots {
		out[k].Slot = s
	}
	return out
}

// Former is tallies as an engine registers them.
func Former() prims.Former {
	one := []term.Slot{{}}
	return prims.Former{
		Name: "tallies", Version: 1,
		Words: []prims.Word{
			{Shape: term.Shape{Word: "Tally", Slots: one}, Infer: inferType},
			{Shape: term.Shape{Word: "settled", Slots: one}, Check: checkSettled},
			{Shape: term.Shape{Word: "due", Slots: one}, Infer: inferDue, Check: checkDue},
			{Shape: term.Shape{Word: "waive", Slots: []term.Slot{{}, {Sort: d}}}, Infer: inferWaive, Check: checkWaive},
			{Shape: term.Shape{Word: "audit", Slots: slots}, Infer: inferAudit},
		},
		Operators: []prims.Operator{
			{Sig: typeSig, Op: typeOp{}}, {Sig: settledSig, Op: settledOp{}}, {Sig: dueSig, Op: dueOp{}},
			{Sig: waiveSig, Op: waiveOp{}}, {Sig: auditSig, Op: auditOp{}},
		},
	}
}

func op(sig *term.Signature, args ...term.Arg) value.Core { return &term.Op{Sig: sig, Args: args} }

func inferType(c value.Checker, w *term.Written) (value.Core, value.Value) {
	a, level := c.Type(w.Parts[0].Body)
	return op(typeSig, a), prims.NewUniverse(level)
}

func wanted(c value.Checker, w *term.Written, want value.Value) *Type {
	t, ok := c.Run().Force(want).(*Type)
	if !ok {
		c.Fail(w, term.IllTyped, "a tally does not have this type", c.ShowType(want), "a tally")
	}
	return t
}

func inferred(c value.Checker, w *term.Written) (value.Core, *Type) {
	core, t := c.Infer(w)
	ty, ok := c.Run().Force(t).(*Type)
	if !ok {
		c.Fail(w, term.IllTyped, "this is no tally", "a tally", c.ShowType(t))
	}
	return core, ty
}

func checkSettled(c value.Checker, w *term.Written, want value.Value) value.Core {
	return op(settledSig, c.Check(w.Parts[0].Body, wanted(c, w, want).Of))
}

func inferDue(c value.Checker, w *term.Written) (value.Core, value.Value) {
	u, t := inferred(c, w.Parts[0].Body)
	return op(dueSig, u), t
}

func checkDue(c value.Checker, w *term.Written, want value.Value) value.Core {
	return op(dueSig, c.Check(w.Parts[0].Body, wanted(c, w, want)))
}

func inferWaive(c value.Checker, w *term.Written) (value.Core, value.Value) {
	u, t := inferred(c, w.Parts[0].Body)
	return op(waiveSig, u, term.Dimension{Dim: c.Dimension(w.Parts[1].Body)}), t
}

func checkWaive(c value.Checker, w *term.Written, want value.Value) value.Core {
	u := c.Check(w.Parts[0].Body, wanted(c, w, want))
	return op(waiveSig, u, term.Dimension{Dim: c.Dimension(w.Parts[1].Body)})
}

// written makes the checker's binders with the names that are written.
type written struct {
	b     value.CheckerBinding
	names []term.Binder
	next  int
}

func (n *written) Variable(_ string, t value.Value) value.Value {
	n.next++
	return n.b.Variable(n.names[n.next-1], t)
}

func (n *written) Dimension(string) value.Name {
	n.next++
	return n.b.Dimension(n.names[n.next-1])
}

// inferAudit types the cases in their order; a waiver's must be the case of a
// charge at 0 and the audit itself at 1.
func inferAudit(c value.Checker, w *term.Written) (value.Core, value.Value) {
	run := c.Run()
	t, ty := inferred(c, w.Parts[1].Body)
	family := c.Variable(w.Parts[0].Binders[0], ty, func(value.Value) value.Core {
		core, _ := c.Type(w.Parts[0].Body)
		return core
	})
	e := &Audit{Family: c.Case(family, []term.Sort{v}).AsClosure()}
	args := []term.Arg{family, t}
	var cases [3]value.Case
	for k := range cases {
		p := w.Parts[k+2]
		b := c.Binders(func(b value.CheckerBinding) value.Core {
			_, of := e.binders(run, ty, k, &written{b: b, names: p.Binders})
			return c.Check(p.Body, of)
		})
		if k == 2 {
			b.Dimensions = 1
		}
		cases[k] = c.Case(b, slots[k+2].Binds)
		args = append(args, b)
	}
	e.Settled, e.Due, e.Waive = cases[0], cases[1], cases[2]
	at := w.Parts[4].Body
	c.Binders(func(b value.CheckerBinding) value.Core {
		u := b.Variable(term.Binder{Name: "u"}, ty)
		h := b.Variable(term.Binder{Name: "h"}, e.Family.Open(run, u))
		c.Same(e.Family.Open(run, &Due{u}), e.Due.OpenAll(run, []value.Value{u, h}), e.Waive.OpenAll(run, []value.Value{u, h, value.Zero()}),
			&term.Error{Kind: term.Disagreement, Place: at.Place, Message: "the case of a waiver is not the case of a charge at 0"})
		c.Same(e.Family.Open(run, u), h, e.Waive.OpenAll(run, []value.Value{u, h, value.One()}),
			&term.Error{Kind: term.Disagreement, Place: at.Place, Message: "the case of a waiver is not the audit of the rest at 1"})
		return nil
	})
	return op(auditSig, args...), e.Family.Open(run, c.Value(t))
}

type typeOp struct{}

func (typeOp) Canonical([]eval.Arg) bool { return true }
func (typeOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return &Type{args[0].Delay(run, f)}
}

type settledOp struct{}

func (settledOp) Canonical([]eval.Arg) bool { return true }
func (settledOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return &Settled{args[0].Delay(run, f)}
}

type dueOp struct{}

func (dueOp) Canonical([]eval.Arg) bool { return true }
func (dueOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return &Due{args[0].Delay(run, f)}
}

type waiveOp struct{}

func (waiveOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return NewWaive(args[0].Delay(run, f), args[1].Dimension(f))
}

type auditOp struct{}

func (auditOp) Principal() int { return 1 }
func (auditOp) audit(run *value.Run, f eval.Frame, args []eval.Arg) *Audit {
	return &Audit{args[0].Close(run, f), args[2].CloseAll(run, f), args[3].CloseAll(run, f), args[4].CloseAll(run, f)}
}
func (o auditOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	t := args[1].Eval(run, f)
	return o.audit(run, f, args).Resume(run, t)
}
func (o auditOp) Frame(run *value.Run, f eval.Frame, args []eval.Arg) value.Frame {
	return o.audit(run, f, args)
}

// ReadBack reads the type below.
func (t *Type) ReadBack(q value.Quoter) value.Core { return op(typeSig, q.Type(t.Of)) }

// SameType compares the types below.
func (t *Type) SameType(c value.Comparer, other value.Type) bool {
	o, ok := other.(*Type)
	return ok && c.EqualTypes("what is handed over", t.Of, o.Of)
}

// ReadBackElement reads constructors and composites.
func (t *Type) ReadBackElement(q value.Quoter, x value.Value) value.Core {
	switch x := x.(type) {
	case *Settled:
		return op(settledSig, q.Term(t.Of, x.A))
	case *Due:
		return op(dueSig, q.Term(t, x.Rest))
	case *Waive:
		return op(waiveSig, q.Term(t, x.Rest), term.Dimension{Dim: x.At})
	case *Composite:
		return prims.ReadHcomp(q, t, x.Base, x.Walls)
	case *value.Neutral:
		return q.Neutral(x)
	}
	q.Run().Fault("%T stands in a type of tallies", x)
	return nil
}

// SameElement compares constructors and composites.
func (t *Type) SameElement(c value.Comparer, a, b value.Value) bool {
	switch x := a.(type) {
	case *Settled:
		y, ok := b.(*Settled)
		return ok && c.Terms("what is settled", t.Of, x.A, y.A)
	case *Due:
		y, ok := b.(*Due)
		return ok && c.Terms("the rest", t, x.Rest, y.Rest)
	case *Waive:
		y, ok := b.(*Waive)
		return ok && c.Terms("the rest", t, x.Rest, y.Rest) && sameDimension(c, x.At, y.At)
	case *Composite:
		y, ok := b.(*Composite)
		return ok && prims.SameHcomp(c, t, x.Base, x.Walls, y.Base, y.Walls)
	case *value.Neutral:
		y, ok := b.(*value.Neutral)
		return ok && c.Neutrals(x, y)
	}
	return false
}

func sameDimension(c value.Comparer, r, s interval.Dim) bool {
	return r.Equal(s) || c.Differ("the dimension of the waiver", r.String(), s.String())
}
