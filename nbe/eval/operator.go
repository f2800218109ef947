package eval

import "example.com/boxwright/value"

// Evaluating operators. What a function's body or a chosen case ends in is
// evaluated by the same loop, so that tail calls neither nest the run nor keep
// frames: only the last one's frame is there.

// opCode is an operator with compiled arguments.
type opCode struct {
	op        Operation
	args      []Arg
	principal *Arg    // of an eliminator
	caller    Caller  // nil for what calls nothing
	argument  *Arg    // what a caller calls its principal argument with
	matcher   Matcher // nil for what matches nothing
	ready     Ready   // the operation, if it is one
	folds     bool    // its principal argument ends in a global
	cheap     int     // 0: not cheap; otherwise 1 + how deep cheap operators nest in it
	level     value.Level
}

// found looks once at what the operation can do.
func (c *opCode) found() {
	if e, ok := c.op.(Eliminator); ok {
		c.principal = &c.args[e.Principal()]
	}
	if o, ok := c.op.(Caller); ok {
		c.caller, c.argument = o, &c.args[o.Argument()]
	}
	c.matcher, _ = c.op.(Matcher)
	c.ready, _ = c.op.(Ready)
}

func (c *opCode) Eval(run *value.Run, f Frame) (v value.Value) {
	if run.EnterAt(&c.level) {
		return c.hop(run, f)
	}
	var mark value.Mark // below the frame of the last tail call
	var back value.Back // what the run came from, where it is traced
	framed := false
	for {
		var body Code
		var g Frame
		switch {
		case c.caller != nil && !run.Followed():
			var fn value.Value
			if slot, ok := c.principal.code.(slotCode); ok {
				fn = run.Force(f[slot])
			} else {
				fn = run.Force(c.principal.code.Eval(run, f))
			}
			l, ok := fn.(*value.Lam)
			if !ok {
				v = c.caller.Call(run, fn, c.argument.Delay(run, f))
				break
			}
			k, ok := l.Body.(*closure)
			if !ok {
				v = c.caller.Call(run, fn, c.argument.Delay(run, f))
				break
			}
			var x value.Value
			demands := k.abs.first
			if demands == unknown {
				if demands = k.strict.state.Load(); demands == unknown && k.StrictIn(run, 0) {
					demands = strict
				}
			}
			if demands == strict {
				x = run.Force(c.argument.Eval(run, f))
			} else {
				x = c.argument.Delay(run, f)
			}
			run.Take(value.StepApply)
			if run.Traced() && !run.IsIn(k.abs.site) {
				back = run.TailCalled(back, k.abs.site)
			}
			if !framed {
				mark, framed = run.Mark(), true
			}
			g = run.Frame(1 + len(k.env))
			g[0] = x
			for n, v := range k.env {
				g[n+1] = v
			}
			body = k.abs.body
		case c.matcher != nil && !run.Followed():
			w := run.Force(c.principal.code.Eval(run, f))
			before := run.Mark()
			var a *Arg
			if a, g = c.matcher.Match(run, f, c.args, w); a == nil {
				v = c.matcher.Eliminate(run, f, c.args, w)
				break
			}
			if !framed {
				mark, framed = before, true
			}
			if run.Traced() {
				back = run.Tail(back, c.matcher.Label(c.args).Elimination())
			}
			run.Take(value.StepEliminate)
			if run.Traced() && !run.IsIn(a.abs.site) {
				run.Tail(back, a.abs.site)
			}
			body = a.abs.body
		default:
			v = c.op.Eval(run, f, c.args)
		}
		if body == nil {
			break
		}
		if next, ok := body.(*opCode); ok {
			run.Continue(&next.level)
			c, f = next, run.Slide(mark, g)
			continue
		}
		v = body.Eval(run, g)
		break
	}
	if framed {
		run.Reset(mark)
	}
	run.Leave()
	return run.Left(back, v)
}

// hop is apart so that the result of Eval need not live on the heap.
//
//go:noinline
func (c *opCode) hop(run *value.Run, f Frame) (v value.Value) {
	run.HopAt(&c.level, func() {
		run.Leave() // Eval enters this level again, on the new stack
		v = c.Eval(run, f)
		run.Enter()
	})
	run.Leave()
	return v
}

// Frame is a call frame for the arguments of a body under binders, with what it
// captures in its place.
func (a *Arg) Frame(run *value.Run, f Frame) Frame {
	g := run.Frame(a.abs.arity + len(a.abs.captures))
	a.abs.capture(g[a.abs.arity:], f)
	return g
}

// Enter evaluates a body under binders in a frame of [Arg.Frame], which it gives back.
func (a *Arg) Enter(run *value.Run, g Frame) value.Value {
	var back value.Back
	if run.Traced() {
		back = run.In(a.abs.site)
	}
	v := a.abs.body.Eval(run, g)
	run.Release(len(g))
	return run.Left(back, v)
}

// Uses reports whether a body under binders mentions its argument k.
func (a *Arg) Uses(k int) bool { return a.abs.uses(k) }

// Closed reports whether a body under binders mentions nothing else.
func (a *Arg) Closed() bool { return len(a.abs.captures) == 0 }

// Hints are the host's names of the arguments of a body under binders.
func (a *Arg) Hints() []string { return a.abs.hints }
