package prims

import (
	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
)

// Eliminating numerals. A step suc^c h into naturals gives b + c·n at once,
// which is what n steps would give. A step that demands its hypothesis first is
// taken from zero upwards, so that it does not nest.

// stepRule is what compiling found out about the successor's case.
type stepRule struct {
	affine bool    // the family is constantly the naturals and the step is suc^count h
	count  natural // of an affine step
}

type stepPayload struct {
	term.Level
	*stepRule
}

// Prepare looks at an elimination when it is compiled.
func (elimOp) Prepare(c *term.Op, variables int) (term.Arg, bool) {
	d, ok := c.Args[0].(term.Reference).Target.(*Data)
	if !ok || !d.Numerals {
		return nil, false
	}
	var step *term.Bound
	for _, row := range c.Args[4].(term.Rows) {
		if row[0].(term.Reference).Index == 1 {
			step = row[1].(*term.Bound)
		}
	}
	if step == nil {
		return nil, false
	}
	h := variables + 1 // the predecessor, then the hypothesis
	rule := &stepRule{}
	if family, ok := c.Args[2].(*term.Bound).Body.(*term.Op); ok && family.Sig == dataSig && family.Args[0].(term.Reference).Target == any(d) {
		body := step.Body
		for {
			con, ok := body.(*term.Op)
			if !ok || con.Sig != conSig || con.Args[0].(term.Reference).Target != any(d.Constructors[1]) {
				break
			}
			body = con.Args[2].(term.Core)
			rule.count.small++
		}
		v, ok := body.(*term.Variable)
		rule.affine = ok && v.Level == h
	}
	if !rule.affine {
		return nil, false
	}
	return stepPayload{0, rule}, true
}

// Demands are what an elimination by an affine step evaluates besides what it
// eliminates: the case of zero.
func (elimOp) Demands(args []eval.Arg) []*eval.Arg {
	if len(args) > 5 && args[5].Payload.(stepPayload).affine {
		for _, row := range args[4].Rows {
			if row[0].Payload.(term.Reference).Index == 0 {
				return []*eval.Arg{&row[1]}
			}
		}
	}
	return nil
}

// affine eliminates a number by an affine step, without making an eliminator.
func (o elimOp) affine(run *value.Run, f eval.Frame, args []eval.Arg, v *Number) (value.Value, bool) {
	step := args[5].Payload.(stepPayload).stepRule
	zero := bodyOf(args, v.data.Constructors[0])
	if !step.affine || zero == nil || run.Plain.NoNumerals {
		return nil, false
	}
	var back value.Back // what the run came from, where it is traced
	if run.Traced() {
		back = run.InElimination(v.data.label)
	}
	run.Take(value.StepNumeral)
	return run.Left(back, step.repeated(run, v.data, v.n, zero.Enter(run, zero.Frame(run, f)))), true
}

// repeated is an affine step taken n times from a base, which is forced: sums of
// sums are to be numbers, not chains.
func (r *stepRule) repeated(run *value.Run, d *Data, n natural, base value.Value) value.Value {
	return successors(run, d, r.count.times(run, n), run.Force(base))
}

// numeral eliminates a number; ok is false where the step does not demand its
// hypothesis and the number is to be taken apart by one.
func (e *Eliminator) numeral(run *value.Run, v *Number) (value.Value, bool) {
	if e.step != nil && e.step.affine && !run.Plain.NoNumerals {
		run.Take(value.StepNumeral)
		return e.step.repeated(run, e.data, v.n, e.cases[0].ApplyAll(run, nil)), true
	}
	if v.n.big != nil || v.n.small < 2 || run.Plain.NoNumerals {
		return nil, false
	}
	step := e.cases[1]
	if !step.StrictIn(run, 1) {
		return nil, false
	}
	h := run.Force(e.cases[0].ApplyAll(run, nil))
	frame := step.Enter(run)
	frame[0] = v // where the step does not look at it
	counts := step.Uses(0)
	// The case is entered once, and each time is counted.
	var back value.Back // what the run came from, where it is traced
	for k := range v.n.small {
		run.Take(value.StepEliminate)
		if run.Traced() && !run.Followed() {
			if k == 0 {
				back = run.In(value.SiteOf(step))
			} else {
				run.Again(back)
			}
		}
		if counts {
			frame[0] = newNumber(run, e.data, natural{small: k})
		}
		frame[1] = h
		h = run.Force(step.Eval(run, frame))
	}
	run.Release(len(frame))
	return run.Left(back, h), true
}
