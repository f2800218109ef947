package prims

import (
	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Eliminations as compiled code. A constructor whose case uses no hypothesis
// takes that case alone, in the place of the elimination; everything else makes
// an Eliminator.

// elimOp has the eliminator where that is closed, and so always the same.
type elimOp struct{ closed *Eliminator }

// Special makes a closed eliminator once.
func (o elimOp) Special(run *value.Run, args []eval.Arg) eval.Operation {
	closed := args[2].Closed()
	for _, row := range args[4].Rows {
		closed = closed && row[1].Closed()
	}
	if closed {
		o.closed = o.eliminator(run, nil, args)
	}
	return o
}

func (elimOp) Principal() int { return 3 }

func (o elimOp) eliminator(run *value.Run, f eval.Frame, args []eval.Arg) *Eliminator {
	if o.closed != nil {
		return o.closed
	}
	d := args[0].Payload.(term.Reference).Target.(*Data)
	cases := make([]value.Case, len(d.Constructors))
	for _, row := range args[4].Rows {
		cases[row[0].Payload.(term.Reference).Index] = row[1].CloseAll(run, f)
	}
	var step *stepRule
	if len(args) > 5 {
		step = args[5].Payload.(stepPayload).stepRule
	}
	return newEliminator(d, args[2].Close(run, f), cases, step)
}

// Eval eliminates the principal argument.
func (o elimOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return o.Eliminate(run, f, args, run.Force(args[3].Eval(run, f)))
}

// Match finds the case of a constructor whose hypotheses are not used: that
// case is all it takes, however many there are.
func (elimOp) Match(run *value.Run, f eval.Frame, args []eval.Arg, v value.Value) (*eval.Arg, eval.Frame) {
	var few [1]value.Value
	var c *Constructor
	var vs []value.Value
	var dims []interval.Dim
	switch v := v.(type) {
	case *Con:
		c, vs, dims = v.Of, v.Args, v.Dims
	case *Number:
		if len(args) > 5 && args[5].Payload.(stepPayload).affine && !run.Plain.NoNumerals {
			return nil, nil
		}
		if v.isZero() {
			c = v.data.Constructors[0]
		} else if c = v.data.Constructors[1]; bodyOf(args, c) != nil && !bodyOf(args, c).Uses(1) {
			few[0] = v.predecessor(run)
			vs = few[:]
		}
	default:
		return nil, nil
	}
	body := bodyOf(args, c)
	if body == nil {
		return nil, nil
	}
	if c.recursive {
		at := len(c.Args)
		for _, a := range c.Args {
			if a.Recursive != nil {
				if body.Uses(at) {
					return nil, nil
				}
				at++
			}
		}
	}
	env := body.Frame(run, f)
	at := copy(env, vs)
	for k, a := range c.Args {
		if a.Recursive != nil {
			env[at] = vs[k] // not used
			at++
		}
	}
	for k, d := range dims {
		env[at+k] = value.DimensionOf(d)
	}
	return body, env
}

// Label is the data type's name.
func (elimOp) Label(args []eval.Arg) *value.Label {
	return args[0].Payload.(term.Reference).Target.(*Data).label
}

// bodyOf is the case of a constructor, nil where it does not stand in order.
func bodyOf(args []eval.Arg, c *Constructor) *eval.Arg {
	rows := args[4].Rows
	if k := c.Index; k < len(rows) && rows[k][0].Payload.(term.Reference).Index == k {
		return &rows[k][1]
	}
	return nil
}

// Eliminate is Eval for what the principal argument has given.
func (o elimOp) Eliminate(run *value.Run, f eval.Frame, args []eval.Arg, v value.Value) value.Value {
	if run.Followed() {
		if body, env := o.Match(run, f, args, v); body != nil {
			return matchFollowed(run, o.Label(args), v, body, env)
		}
	} else if n, ok := v.(*Number); ok && len(args) > 5 {
		if w, ok := o.affine(run, f, args, n); ok {
			return w
		}
	}
	return o.eliminator(run, f, args).Eliminate(run, v)
}

func (o elimOp) Frame(run *value.Run, f eval.Frame, args []eval.Arg) value.Frame {
	return &elimFrame{o.eliminator(run, f, args)}
}
