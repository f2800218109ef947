package eval

import "example.com/boxwright/value"

// Compiled code in a run that is traced: the same code, at the site of the
// definition or term it was compiled for.

func (c *closure) applyTraced(run *value.Run, arg value.Value) value.Value {
	back := run.Called(c.abs.site)
	n := 1 + len(c.env)
	f := run.Frame(n)
	f[0] = arg
	copy(f[1:], c.env)
	v := c.abs.body.Eval(run, f)
	run.Release(n)
	run.Out(back)
	return v
}

func (c *closure) applyAllTraced(run *value.Run, args []value.Value) value.Value {
	back := run.In(c.abs.site)
	n := len(args) + len(c.env)
	f := run.Frame(n)
	copy(f, args)
	copy(f[len(args):], c.env)
	v := c.abs.body.Eval(run, f)
	run.Release(n)
	run.Out(back)
	return v
}

func (t *thunk) doTraced(run *value.Run) value.Value {
	back := run.In(t.code.(*opCode).site)
	v := t.code.Eval(run, t.env)
	run.Out(back)
	return v
}

func (c caseClosure) evalTraced(run *value.Run, frame []value.Value) value.Value {
	back := run.In(c.abs.site)
	v := c.abs.body.Eval(run, frame)
	run.Out(back)
	return v
}

// Site is the definition or term whose code it is.
func (t *thunk) Site() *value.Site { return t.code.(*opCode).site }
