package counted

import (
	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
)

// How counted functions are written, typed, read back and compared. The core
// term of the type holds the type of counts in a slot that is not written: it
// is what "Nat" stands for where the type is checked.

var (
	plain = term.CoreSlot{}
	under = term.CoreSlot{Slot: term.Slot{Binds: []term.Sort{term.TermSort}}}

	typeSig     = &term.Signature{Name: "Counted", Word: "Counted", Slots: []term.CoreSlot{{Silent: true}, plain, under}}
	countingSig = &term.Signature{Name: "counting", Word: "counting", Slots: []term.CoreSlot{under, under}}
	liftsSig    = &term.Signature{Name: "lifts", Word: "lifts", Slots: []term.CoreSlot{plain, plain}}
	liftedSig   = &term.Signature{Name: "lifted", Word: "lifted", Slots: []term.CoreSlot{plain, plain}}
)

// Former is counted functions as an engine registers them.
func Former() prims.Former {
	two := []term.Slot{{}, {}}
	return prims.Former{
		Name: "counted functions", Version: 1,
		Words: []prims.Word{
			{Shape: term.Shape{Word: "Counted", Slots: []term.Slot{{}, under.Slot}}, Infer: inferType},
			{Shape: term.Shape{Word: "counting", Slots: []term.Slot{under.Slot, under.Slot}}, Check: checkCounting},
			{Shape: term.Shape{Word: "lifts", Slots: two}, Infer: inferLifts},
			{Shape: term.Shape{Word: "lifted", Slots: two}, Infer: inferLifted},
		},
		Operators: []prims.Operator{
			{Sig: typeSig, Op: typeOp{}}, {Sig: countingSig, Op: countingOp{}},
			{Sig: liftsSig, Op: useOp{}}, {Sig: liftedSig, Op: useOp{value: true}},
		},
	}
}

func op(sig *term.Signature, args ...term.Arg) value.Core { return &term.Op{Sig: sig, Args: args} }

func inferType(c value.Checker, w *term.Written) (value.Core, value.Value) {
	count, _ := c.Type(term.Name("Nat").At(w.Place))
	domain, m := c.Type(w.Parts[0].Body)
	n := 0
	codomain := c.Variable(w.Parts[1].Binders[0], c.Value(domain), func(value.Value) (body value.Core) {
		body, n = c.Type(w.Parts[1].Body)
		return body
	})
	return op(typeSig, count, domain, codomain), prims.NewUniverse(max(m, n))
}

func checkCounting(c value.Checker, w *term.Written, want value.Value) value.Core {
	run := c.Run()
	t, ok := run.Force(want).(*Type)
	if !ok {
		c.Fail(w, term.IllTyped, "a counted function does not have this type", c.ShowType(want), "a counted function")
	}
	lifts := c.Variable(w.Parts[0].Binders[0], t.Domain, func(value.Value) value.Core { return c.Check(w.Parts[0].Body, t.Count) })
	lifted := c.Variable(w.Parts[1].Binders[0], t.Domain, func(x value.Value) value.Core {
		return c.Check(w.Parts[1].Body, t.Codomain.Open(run, x))
	})
	return op(countingSig, lifts, lifted)
}

func inferUse(c value.Checker, w *term.Written) (f, a value.Core, t *Type) {
	f, ft := c.Infer(w.Parts[0].Body)
	t, ok := c.Run().Force(ft).(*Type)
	if !ok {
		c.Fail(w.Parts[0].Body, term.IllTyped, "this is no counted function", "a counted function", c.ShowType(ft))
	}
	return f, c.Check(w.Parts[1].Body, t.Domain), t
}

func inferLifts(c value.Checker, w *term.Written) (value.Core, value.Value) {
	f, a, t := inferUse(c, w)
	return op(liftsSig, f, a), t.Count
}

func inferLifted(c value.Checker, w *term.Written) (value.Core, value.Value) {
	f, a, t := inferUse(c, w)
	return op(liftedSig, f, a), t.Codomain.Open(c.Run(), c.Value(a))
}

type typeOp struct{}

func (typeOp) Canonical([]eval.Arg) bool { return true }
func (typeOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return &Type{args[0].Delay(run, f), args[1].Delay(run, f), args[2].Close(run, f)}
}

type countingOp struct{}

func (countingOp) Canonical([]eval.Arg) bool { return true }
func (countingOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return &Counting{args[0].Close(run, f), args[1].Close(run, f)}
}

type useOp struct{ value bool }

func (useOp) Principal() int { return 0 }
func (o useOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return (&use{args[1].Delay(run, f), o.value}).Resume(run, args[0].Eval(run, f))
}
func (o useOp) Frame(run *value.Run, f eval.Frame, args []eval.Arg) value.Frame {
	return &use{args[1].Delay(run, f), o.value}
}

// use is an application, of the count or of the value, that waits on a neutral.
type use struct {
	arg   value.Value
	value bool
}

func (u *use) Support() value.Support                    { return u.arg.Support() }
func (u *use) Frontier() (frontier, faces value.Support) { return 0, 0 }
func (u *use) Relabel(run *value.Run, s *value.Subst) value.Frame {
	return &use{run.Substitute(u.arg, s), u.value}
}

func (u *use) Resume(run *value.Run, f value.Value) value.Value {
	if u.value {
		return Lifted(run, f, u.arg)
	}
	return Lifts(run, f, u.arg)
}

func (u *use) Type(run *value.Run, t value.Value, _ *value.Neutral) value.Value {
	ct := run.Force(t).(*Type)
	if u.value {
		return ct.Codomain.Open(run, u.arg)
	}
	return ct.Count
}

func (u *use) ReadBack(q value.Quoter, f value.Core, t value.Value) value.Core {
	sig := liftsSig
	if u.value {
		sig = liftedSig
	}
	return op(sig, f, q.Term(q.Run().Force(t).(*Type).Domain, u.arg))
}

func (u *use) Same(c value.Comparer, other value.Frame, t value.Value) bool {
	o, ok := other.(*use)
	return ok && o.value == u.value && c.Terms("the argument", c.Run().Force(t).(*Type).Domain, u.arg, o.arg)
}

// ReadBack reads the types.
func (t *Type) ReadBack(q value.Quoter) value.Core {
	return op(typeSig, q.Type(t.Count), q.Type(t.Domain), q.Variable(t.Codomain.Hint(), t.Domain, func(x value.Value) value.Core {
		return q.Type(t.Codomain.Open(q.Run(), x))
	}))
}

// SameType: equal domains, codomains in the comparison's direction.
func (t *Type) SameType(c value.Comparer, other value.Type) bool {
	o, ok := other.(*Type)
	return ok && c.EqualTypes("the type of counts", t.Count, o.Count) && c.EqualTypes("the domain", t.Domain, o.Domain) &&
		c.Variable(t.Codomain.Hint(), t.Domain, func(x value.Value) bool {
			return c.Types("the codomain", t.Codomain.Open(c.Run(), x), o.Codomain.Open(c.Run(), x))
		})
}

// ReadBackElement is η.
func (t *Type) ReadBackElement(q value.Quoter, f value.Value) value.Core {
	run := q.Run()
	return op(countingSig,
		q.Variable("x", t.Domain, func(x value.Value) value.Core { return q.Term(t.Count, later(run, Lifts, f, x)) }),
		q.Variable("x", t.Domain, func(x value.Value) value.Core {
			return q.Term(t.Codomain.Open(run, x), later(run, Lifted, f, x))
		}))
}

// SameElement is η.
func (t *Type) SameElement(c value.Comparer, f, g value.Value) bool {
	run := c.Run()
	return c.Variable("x", t.Domain, func(x value.Value) bool {
		return c.Terms("the count", t.Count, later(run, Lifts, f, x), later(run, Lifts, g, x)) &&
			c.Terms("the value", t.Codomain.Open(run, x), later(run, Lifted, f, x), later(run, Lifted, g, x))
	})
}
