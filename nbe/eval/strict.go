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

// Caller is an Operation that calls one argument with another.
type Caller interface {
	Operation
	Called() (function, argument int)
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
		if e, ok := c.op.(Eliminator); ok {
			if d := demandOfArg(&c.args[e.Principal()], slot, nodes); d != nil {
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
		if o, ok := c.op.(Caller); ok {
			f, x := o.Called()
			if g, ok := c.args[f].code.(slotCode); ok {
				if d := demandOfArg(&c.args[x], slot, nodes); d != nil {
					return &demand{append([]int{int(g)}, d.conditions...)}
				}
			}
		}
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
	if k == c.abs.arity-1 {
		if s := c.strict.state.Load(); s != unknown {
			return s == strict
		}
	}
	verdict := lazy
	decided := false
	run.Down(func() { decided = c.decide(run, d) })
	if decided {
		verdict = strict
	}
	if k == c.abs.arity-1 {
		c.strict.state.Store(verdict)
	}
	return verdict == strict
}

func (c *closure) decide(run *value.Run, d *demand) bool {
	for _, slot := range d.conditions {
		if slot < c.abs.arity {
			return false // a function that comes as an argument
		}
		f, ok := run.Force(c.env[slot-c.abs.arity]).(value.Function)
		if !ok || !f.Strict(run) {
			return false
		}
	}
	return true
}
