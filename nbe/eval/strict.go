package eval

import (
	"sync/atomic"

	"example.com/boxwright/value"
)

// Strictness. A function that is going to evaluate its argument anyway gets it
// evaluated, instead of a delayed cell: that saves the cell, and with it the
// nesting that laziness makes of programs that are shallow otherwise.
//
// What a body demands is found once, when it is compiled. Where it depends on a
// captured function being strict itself, as in λx. f (f x), that is decided
// when the closure is first called: the body demands f then in any case.

// Demander is an Operation that evaluates more of its arguments than the
// principal one, whatever else happens.
type Demander interface {
	Operation
	Demands(args []Arg) []*Arg
}

// Caller is an Eliminator that calls its principal argument with another.
type Caller interface {
	Eliminator
	// Argument is what it calls it with.
	Argument() int
	// Call calls the function fn, which is forced and no compiled λ.
	Call(run *value.Run, fn, x value.Value) value.Value
}

// demand says that a body demands one of its slots, provided the functions in
// the slots of conditions are strict; they are demanded by the body in order.
type demand struct {
	conditions []int
}

// demandNodes is how many nodes of a body are looked at for a demand; what is
// found later is not certain. It bounds the stack, the lists of conditions and
// the time, a body being a graph.
const demandNodes = 200

// demandOf is how the code demands a slot, nil if that is not certain.
func demandOf(c Code, slot int, nodes *int) *demand {
	if *nodes--; *nodes < 0 {
		return nil
	}
	switch c := c.(type) {
	case slotCode:
		if int(c) == slot {
			return &demand{}
		}
	case *opCode:
		if c.principal != nil {
			if d := demandOfArg(c.principal, slot, nodes); d != nil {
				return d
			}
		}
		if o, ok := c.op.(Demander); ok {
			for _, a := range o.Demands(c.args) {
				if d := demandOfArg(a, slot, nodes); d != nil {
					return d
				}
			}
		}
		if c.caller != nil {
			return c.demandOfCall(slot, nodes)
		}
	}
	return nil
}

// Binder is an Operation whose value is the function with one of its arguments
// as the body.
type Binder interface {
	Operation
	Body() int
}

// Compiled is a global whose code is known: what a definition demands of its
// arguments is known with it.
type Compiled interface {
	value.Global
	Code() *Abstraction // nil for an assumption
}

// demandOfCall is how a call demands a slot through one of its arguments.
func (c *opCode) demandOfCall(slot int, nodes *int) *demand {
	var args []*Arg // the last first
	var head Code = c
	for {
		o, ok := head.(*opCode)
		if !ok || o.caller == nil {
			break
		}
		args = append(args, o.argument)
		head = o.principal.code
	}
	for k, a := range args {
		var d *demand
		switch h := head.(type) {
		case slotCode:
			if len(args) == 1 {
				d = &demand{[]int{int(h)}}
			}
		case globalCode:
			d = demandOfGlobal(h.g, args, len(args)-1-k, nodes)
		}
		if d == nil {
			continue
		}
		if e := demandOfArg(a, slot, nodes); e != nil {
			return &demand{append(d.conditions, e.conditions...)}
		}
	}
	return nil
}

// demandOfGlobal is how a definition, called with all of args, the last of which
// stands first, demands the argument k. Where it needs an argument to be a strict
// function, that has to stand in a slot of the caller's.
func demandOfGlobal(g value.Global, args []*Arg, k int, nodes *int) *demand {
	compiled, ok := g.(Compiled)
	if !ok {
		return nil
	}
	code := compiled.Code()
	if code == nil {
		return nil
	}
	body := code.body
	given := map[int]int{} // the arguments by slot
	for n := range args {
		o, ok := body.(*opCode)
		if !ok {
			return nil
		}
		b, ok := o.op.(Binder)
		if !ok {
			return nil
		}
		abs := o.args[b.Body()].abs
		inner := map[int]int{0: n}
		for at, from := range abs.captures {
			if m, ok := given[from]; ok {
				inner[abs.arity+at] = m
			}
		}
		body, given = abs.body, inner
	}
	for slot, n := range given {
		if n != k {
			continue
		}
		d := demandOf(body, slot, nodes)
		if d == nil {
			return nil
		}
		out := &demand{}
		for _, c := range d.conditions {
			n, ok := given[c]
			if !ok {
				return nil
			}
			f, ok := args[len(args)-1-n].code.(slotCode)
			if !ok {
				return nil
			}
			out.conditions = append(out.conditions, int(f))
		}
		return out
	}
	return nil
}

func demandOfArg(a *Arg, slot int, nodes *int) *demand {
	if a.code != nil {
		return demandOf(a.code, slot, nodes)
	}
	if a.abs == nil || a.abs.arity > 0 {
		return nil
	}
	for k, from := range a.abs.captures {
		if from != slot {
			continue
		}
		d := demandOf(a.abs.body, k, nodes)
		if d == nil {
			return nil
		}
		out := &demand{}
		for _, c := range d.conditions {
			out.conditions = append(out.conditions, a.abs.captures[c])
		}
		return out
	}
	return nil
}

// strictness is what has been found out about a closure: nothing, or a verdict.
type strictness struct{ state atomic.Uint32 }

const (
	unknown uint32 = iota
	strict
	lazy
)

// Strict reports whether the body demands its argument.
func (c *closure) Strict(run *value.Run) bool { return c.StrictIn(run, 0) }

// StrictIn reports whether the body demands its argument k. It is asked when
// the closure is called and may evaluate captured functions that the body
// evaluates in any case.
func (c *closure) StrictIn(run *value.Run, k int) bool {
	if k >= len(c.abs.demands) {
		return false
	}
	d := c.abs.demands[k]
	if d == nil {
		return false
	}
	if len(d.conditions) == 0 {
		return true
	}
	if s := c.strict.state.Load(); s != unknown && k == c.abs.arity-1 {
		return s == strict
	}
	return c.strictBelow(run, k, d)
}

func (c *closure) strictBelow(run *value.Run, k int, d *demand) bool {
	verdict := lazy
	decided := false
	if run.Enter() {
		decided = c.decideHop(run, d)
	} else {
		decided = c.decide(run, d)
	}
	run.Leave()
	if decided {
		verdict = strict
	}
	if k == c.abs.arity-1 {
		c.strict.state.Store(verdict)
	}
	return verdict == strict
}

//go:noinline
func (c *closure) decideHop(run *value.Run, d *demand) (decided bool) {
	run.Hop(func() { decided = c.decide(run, d) })
	return decided
}

func (c *closure) decide(run *value.Run, d *demand) bool {
	for _, slot := range d.conditions {
		if slot < c.abs.arity {
			return false // a function that comes as an argument
		}
		f, ok := run.Force(c.env[slot-c.abs.arity]).(*value.Lam)
		if !ok || !f.Strict(run) {
			return false
		}
	}
	return true
}
