package eval

import (
	"sync/atomic"

	"example.com/boxwright/value"
)

// Abstraction is a compiled body with its own frame: first the arguments, then
// the captured slots of the surrounding frame, exactly those it uses.
type Abstraction struct {
	captures []int // slots of the surrounding frame
	arity    int
	hints    []string
	body     Code
	demands  []*demand   // by argument
	first    uint32      // how it demands the first one: strict, lazy, or unknown as it depends
	unused   []bool      // by argument; nil: all are used
	site     *value.Site // the definition or term it was compiled for; may be nil
}

func (a *Abstraction) capture(to, from Frame) {
	for k, slot := range a.captures {
		to[k] = from[slot]
	}
}

func (a *Abstraction) support(f Frame) (sup value.Support) {
	for _, slot := range a.captures {
		sup |= f[slot].Support()
	}
	return sup
}

// closure is an abstraction with what it captured.
type closure struct {
	abs     *Abstraction
	env     []value.Value
	support value.Support
	strict  strictness
}

func (a *Abstraction) close(run *value.Run, f Frame) *closure {
	c := newClosure(len(a.captures))
	c.close(run, a, f)
	return c
}

// newClosure is room for a closure of n values, if there are few in one object.
func newClosure(n int) *closure {
	switch n {
	case 0:
		return new(closure)
	case 1:
		c := new(struct {
			closure
			few [1]value.Value
		})
		c.env = c.few[:]
		return &c.closure
	case 2:
		c := new(struct {
			closure
			few [2]value.Value
		})
		c.env = c.few[:]
		return &c.closure
	}
	return &closure{env: make([]value.Value, n)}
}

// lambda is the function with the body a.
func (a *Abstraction) lambda(run *value.Run, f Frame) *value.Lam {
	var l *value.Lam
	var c *closure
	switch len(a.captures) { // function and closure in one object
	case 1:
		x := new(struct {
			value.Lam
			closure
			few [1]value.Value
		})
		l, c = &x.Lam, &x.closure
		c.env = x.few[:]
	case 2:
		x := new(struct {
			value.Lam
			closure
			few [2]value.Value
		})
		l, c = &x.Lam, &x.closure
		c.env = x.few[:]
	default:
		l, c = new(value.Lam), newClosure(len(a.captures))
	}
	c.close(run, a, f)
	l.Body = c
	return l
}

func (c *closure) close(run *value.Run, a *Abstraction, f Frame) {
	run.Charge(value.PriceClosure)
	c.abs = a
	for k, slot := range a.captures {
		v := value.Peek(f[slot])
		c.env[k] = v
		c.support |= v.Support()
	}
}

// Support is the union over what is captured.
func (c *closure) Support() value.Support { return c.support }

func (c *closure) substitute(run *value.Run, s *value.Subst) *closure {
	if !run.Plain.NoSupport && c.support&s.Domain() == 0 {
		return c
	}
	run.Charge(value.PriceClosure)
	d := &closure{abs: c.abs, env: make([]value.Value, len(c.env))}
	for k, v := range c.env {
		v = run.Substitute(v, s)
		d.env[k] = v
		d.support |= v.Support()
	}
	return d
}

// Substitute delays s over what is captured.
func (c *closure) Substitute(run *value.Run, s *value.Subst) value.Closure {
	return c.substitute(run, s)
}

// Apply evaluates the body in a frame of the run's.
func (c *closure) Apply(run *value.Run, arg value.Value) value.Value {
	var back value.Back // what the run came from, where it is traced
	if run.Traced() {
		back = run.Called(c.abs.site)
	}
	n := 1 + len(c.env)
	f := run.Frame(n)
	f[0] = arg
	copy(f[1:], c.env)
	v := c.abs.body.Eval(run, f)
	run.Release(n)
	return run.Left(back, v)
}

// Open is the body in a cell.
func (c *closure) Open(run *value.Run, arg value.Value) value.Value {
	return c.OpenAll(run, []value.Value{arg})
}

// Hint is the host's name of the variable.
func (c *closure) Hint() string { return c.HintAt(0) }

// ApplyAll evaluates the body under all its arguments.
func (c *closure) ApplyAll(run *value.Run, args []value.Value) value.Value {
	var back value.Back
	if run.Traced() {
		back = run.In(c.abs.site)
	}
	n := len(args) + len(c.env)
	f := run.Frame(n)
	copy(f, args)
	copy(f[len(args):], c.env)
	v := c.abs.body.Eval(run, f)
	run.Release(n)
	return run.Left(back, v)
}

// OpenAll is the body under all its arguments, in a cell.
func (c *closure) OpenAll(run *value.Run, args []value.Value) value.Value {
	switch body := c.abs.body.(type) {
	case slotCode:
		if int(body) < len(args) {
			return args[body]
		}
		return c.env[int(body)-len(args)]
	case *opCode:
		if body.cheap > 0 {
			return c.ApplyAll(run, args)
		}
	default:
		return delay(run, body, nil)
	}
	run.Charge(int64(len(args)+len(c.env)) * value.PriceSlot)
	env := make([]value.Value, len(args)+len(c.env))
	copy(env, args)
	for k := range c.abs.unused { // a dimension that is not looked at is not in the support
		if _, ok := env[k].(*value.Dimension); ok && c.abs.unused[k] {
			env[k] = value.Zero()
		}
	}
	copy(env[len(args):], c.env)
	return newThunk(run, c.abs.body, env)
}

// Arity is the number of arguments.
func (c *closure) Arity() int { return c.abs.arity }

// HintAt is the host's name of argument k.
func (c *closure) HintAt(k int) string {
	if k < len(c.abs.hints) {
		return c.abs.hints[k]
	}
	return "_"
}

// family is a closure that does not look at its argument and is opened often, as
// the second part of a type is: once is enough.
type family struct {
	*closure
	opened atomic.Pointer[value.Value]
}

// Substitute delays s over what is captured.
func (c *family) Substitute(run *value.Run, s *value.Subst) value.Closure {
	if d := c.closure.substitute(run, s); d != c.closure {
		return &family{closure: d}
	}
	return c
}

// Open is the body in a cell, the same one each time.
func (c *family) Open(run *value.Run, arg value.Value) value.Value {
	if run.Plain.NoSharing || run.Restrained() {
		return c.closure.Open(run, arg)
	}
	if v := c.opened.Load(); v != nil {
		return *v
	}
	v := c.closure.Open(run, arg)
	c.opened.Store(&v)
	return v
}

type caseClosure struct{ *closure }

// SubstituteCase delays s over what is captured.
func (c caseClosure) SubstituteCase(run *value.Run, s *value.Subst) value.Case {
	return caseClosure{c.closure.substitute(run, s)}
}

// Uses reports whether the body mentions argument k.
func (c *closure) Uses(k int) bool { return c.abs.uses(k) }

func (a *Abstraction) uses(k int) bool { return k >= len(a.unused) || !a.unused[k] }

// Enter is a frame for the arguments, with what is captured in its place.
func (c caseClosure) Enter(run *value.Run) []value.Value {
	f := run.Frame(c.abs.arity + len(c.env))
	copy(f[c.abs.arity:], c.env)
	return f
}

// Eval evaluates the body in a frame of Enter's.
func (c caseClosure) Eval(run *value.Run, frame []value.Value) value.Value {
	if run.Traced() {
		back := run.In(c.abs.site)
		return run.Left(back, c.abs.body.Eval(run, frame))
	}
	return c.abs.body.Eval(run, frame)
}

// Site is the definition or term that it stands in.
func (c caseClosure) Site() *value.Site { return c.abs.site }

// AsClosure is a case of one argument as a closure.
func (c caseClosure) AsClosure() value.Closure { return c.closure }

// thunk is the body, with one argument before the captured slots if arg is not
// nil, as a cell.
func (a *Abstraction) thunk(run *value.Run, f Frame, arg value.Value) value.Value {
	if slot, ok := a.body.(slotCode); ok {
		if arg == nil {
			return f[a.captures[slot]]
		}
		if slot == 0 {
			return arg
		}
		return f[a.captures[slot-1]]
	}
	w := &thunk{}
	n := len(a.captures)
	if arg != nil {
		n++
	}
	env := w.few[:]
	if n > len(env) {
		env = make([]value.Value, n)
	}
	env = env[:n]
	if arg != nil {
		env[0] = arg
		a.capture(env[1:], f)
	} else {
		a.capture(env, f)
	}
	return w.cell(run, a.body, env)
}

// thunk is a compiled term waiting in its environment; a small environment
// stands in the object itself.
type thunk struct {
	value.Pending
	code Code
	env  []value.Value
	few  [3]value.Value
}

// Do evaluates the term. The environment is the frame.
func (t *thunk) Do(run *value.Run) value.Value {
	if run.Traced() {
		back := run.In(t.Site())
		return run.Left(back, t.code.Eval(run, t.env))
	}
	return t.code.Eval(run, t.env)
}

// Site is the definition or term whose code it is.
func (t *thunk) Site() *value.Site { return t.code.(*opCode).level.Site }

func newThunk(run *value.Run, code Code, env []value.Value) value.Value {
	return (&thunk{}).cell(run, code, env)
}

func (t *thunk) cell(run *value.Run, code Code, env []value.Value) value.Value {
	op, ok := code.(*opCode)
	if !ok {
		return delay(run, code, env)
	}
	if op.cheap > 0 || op.ready != nil && op.ready.Ready(env, op.args) {
		return op.Eval(run, env)
	}
	var support value.Support
	for k, v := range env {
		v = value.Peek(v)
		env[k] = v
		support |= v.Support()
	}
	t.code, t.env = code, env
	if op.folds {
		return run.FoldLater(support, t)
	}
	return run.NewLazy(support, &t.Pending, t)
}
