package prims

import (
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
	strict bool    // the step demands the hypothesis before anything else
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
	rule := &stepRule{strict: demands(step.Body, h)}
	if family, ok := c.Args[2].(*term.Bound).Body.(*term.Op); ok && family.Sig == dataSig && family.Args[0].(term.Reference).Target == any(d) {
		body := step.Body
		for {
			con, ok := body.(*term.Op)
			if !ok || con.Sig != conSig || con.Args[0].(term.Reference).Target != any(d.Constructors[1]) {
				break
			}
			body = con.Args[2].(term.Core)
			rule.count = rule.count.plus(natural{small: 1})
		}
		v, ok := body.(*term.Variable)
		rule.affine = ok && v.Level == h
	}
	if !rule.affine && !rule.strict {
		return nil, false
	}
	return stepPayload{0, rule}, true
}

// demands reports whether evaluating c forces the variable first.
func demands(c term.Core, level int) bool {
	for {
		switch x := c.(type) {
		case *term.Variable:
			return x.Level == level
		case *term.Op:
			switch x.Sig {
			case applySig, firstSig, secondSig, atSig:
				c = x.Args[0].(term.Core)
			case elimSig:
				c = x.Args[3].(term.Core)
			default:
				return false
			}
		default:
			return false
		}
	}
}

// numeral eliminates a number by the rule that compiling found.
func (e *Eliminator) numeral(run *value.Run, v *Number) value.Value {
	if e.step.affine {
		run.Step()
		n := e.step.count.times(v.n)
		run.Charge(n.price())
		// the base is forced, so that sums of sums are numbers and no chains
		return successors(e.data, n, run.Force(e.cases[0].ApplyAll(run, nil)))
	}
	if v.n.big != nil || v.n.small == 0 {
		// from a number that large nothing is reached step by step
		c, args, _ := shown(run, v)
		return e.onCase(run, c, args, nil)
	}
	h := run.Force(e.cases[0].ApplyAll(run, nil))
	for k := range v.n.small {
		run.Step()
		h = run.Force(e.cases[1].ApplyAll(run, []value.Value{&Number{e.data, natural{small: k}}, h}))
	}
	return h
}
