package prims

import (
	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Functions over the interval Π(i:I)B, with η: both operations are pointwise.

// PiDimension is the type of functions from the interval, as a value.
type PiDimension struct{ Codomain value.Closure }

// Support is the closure's.
func (p *PiDimension) Support() value.Support { return p.Codomain.Support() }

// Substitute delays s over the closure.
func (p *PiDimension) Substitute(run *value.Run, s *value.Subst) value.Value {
	return &PiDimension{p.Codomain.Substitute(run, s)}
}

// Hcomp composes at each dimension.
func (p *PiDimension) Hcomp(run *value.Run, f value.Value, walls value.System) value.Value {
	return &Lam{Body: value.NewCaptured(run, value.Captured{Rule: hcompPiDimension, Values: []value.Value{p, f}, Walls: walls})}
}

var hcompPiDimension = &value.Rule{Name: "i", Apply: hcompPiDimensionRule}

func hcompPiDimensionRule(run *value.Run, c *value.Captured, r value.Value) value.Value {
	p, f := run.Force(c.Values[0]).(*PiDimension), c.Values[1]
	walls := c.Walls.Map(run, r.Support(), 0, func(run *value.Run, _ value.Name, u value.Value, cut *value.Subst) value.Value {
		return Apply(run, u, run.Substitute(r, cut))
	})
	return Hcomp(run, p.Codomain.Open(run, r), LaterApply(run, f, r), walls)
}

// Transp transports at each dimension.
func (p *PiDimension) Transp(run *value.Run, i value.Name, phi interval.Face, f value.Value) value.Value {
	return &Lam{Body: value.NewCaptured(run, value.Captured{Rule: transpPiDimension, Values: []value.Value{f}, Face: phi, I: i, Line: []value.Value{p}})}
}

var transpPiDimension = &value.Rule{Name: "i", Apply: transpPiDimensionRule}

func transpPiDimensionRule(run *value.Run, c *value.Captured, r value.Value) value.Value {
	p, f := run.Force(c.Line[0]).(*PiDimension), c.Values[0]
	return Transp(run, c.I, p.Codomain.Open(run, r), c.Face, LaterApply(run, f, r))
}

// ReadBack reads the codomain.
func (p *PiDimension) ReadBack(q value.Quoter) value.Core {
	return op(piDimensionSig, q.Dimension(p.Codomain.Hint(), func(i value.Name) value.Core {
		return q.Type(p.Codomain.Open(q.Run(), value.DimensionName(i)))
	}))
}

// SameType compares the codomains in the comparison's direction.
func (p *PiDimension) SameType(c value.Comparer, other value.Type) bool {
	o, ok := other.(*PiDimension)
	return ok && c.Dimension(p.Codomain.Hint(), func(i value.Name) bool {
		d := value.DimensionName(i)
		return c.Types("the codomain", p.Codomain.Open(c.Run(), d), o.Codomain.Open(c.Run(), d))
	})
}

// ReadBackElement is η.
func (p *PiDimension) ReadBackElement(q value.Quoter, v value.Value) value.Core {
	name := p.Codomain.Hint()
	if l, ok := v.(*Lam); ok {
		name = hint(l.Body.Hint(), name)
	}
	return op(lamDimensionSig, q.Dimension(name, func(i value.Name) value.Core {
		d := value.DimensionName(i)
		return q.Term(p.Codomain.Open(q.Run(), d), open(q.Run(), v, d))
	}))
}

// SameElement is η.
func (p *PiDimension) SameElement(c value.Comparer, a, b value.Value) bool {
	return c.Dimension(p.Codomain.Hint(), func(i value.Name) bool {
		run, d := c.Run(), value.DimensionName(i)
		return c.Terms("the function's value", p.Codomain.Open(run, d), open(run, a, d), open(run, b, d))
	})
}

// ElaborateApply types an application to a dimension.
func (p *PiDimension) ElaborateApply(c value.Checker, f value.Core, arg *term.Written) (value.Core, value.Value) {
	r := c.Dimension(arg)
	return op(applySig, f, term.Dimension{Dim: r}), p.Codomain.Open(c.Run(), value.DimensionOf(r))
}

var (
	piDimensionSig  = &term.Signature{Name: "PiDim", Word: "Pi", Slots: []term.CoreSlot{lineSlot}}
	lamDimensionSig = &term.Signature{Name: "lamDim", Word: "lam", Slots: []term.CoreSlot{lineSlot}}
)

type piDimensionOp struct{}

func (piDimensionOp) Canonical([]eval.Arg) bool { return true }
func (piDimensionOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return &PiDimension{args[0].Family(run, f)}
}

func piDimensionFormer() Former {
	return Former{
		Name: "functions over the interval", Version: 1,
		Operators: []Operator{{piDimensionSig, piDimensionOp{}}, {lamDimensionSig, lamOp{}}},
	}
}
