// Package counted adds functions that record a count with each application to
// the engine, from outside: what a crane lifts for a berth, and how many lifts
// it took. A count is a natural number, and may depend on the argument.
//
//	(Counted A (x B))        functions from A to B(x) with their counts
//	(counting (x n) (x b))   x ↦ b, at the count n
//	(lifts f a)              the count of f at a
//	(lifted f a)             the value of f at a
//
// The type is negative and has η: f = counting (x. lifts f x) (x. lifted f x).
// So every operation is what it is at each application, as for functions (CHM
// 2018, 2), and the argument of a transport is transported back:
//
//	lifts (hcomp F f [φ ↦ i.u]) x  = hcomp Nat (lifts f x) [φ ↦ i. lifts u x]
//	lifted (hcomp F f [φ ↦ i.u]) x = hcomp B(x) (lifted f x) [φ ↦ i. lifted u x]
//	lifts (transp (i.F) φ f) x     = transp (i.Nat) φ (lifts f x̂(0))
//	lifted (transp (i.F) φ f) x    = transp (i. B(i, x̂(i))) φ (lifted f x̂(0)),
//	    x̂(i) = transp (j. A(i ∨ ~j)) (φ ∨ (i=1)) x
package counted

import (
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Type is the type of counted functions, as a value. Count is the type of
// counts, which the former does not know itself.
type Type struct {
	Count, Domain value.Value
	Codomain      value.Closure
}

// Counting is a counted function as a value.
type Counting struct{ Lifts, Lifted value.Closure }

// Support is the union of the parts'.
func (t *Type) Support() value.Support {
	return t.Count.Support() | t.Domain.Support() | t.Codomain.Support()
}

// Substitute delays s over the parts.
func (t *Type) Substitute(run *value.Run, s *value.Subst) value.Value {
	return &Type{run.Substitute(t.Count, s), run.Substitute(t.Domain, s), t.Codomain.Substitute(run, s)}
}

// Support is the union of the parts'.
func (f *Counting) Support() value.Support { return f.Lifts.Support() | f.Lifted.Support() }

// Substitute delays s over the parts.
func (f *Counting) Substitute(run *value.Run, s *value.Subst) value.Value {
	return &Counting{f.Lifts.Substitute(run, s), f.Lifted.Substitute(run, s)}
}

// Lifts is the count of f at a, on demand.
func Lifts(run *value.Run, f, a value.Value) value.Value {
	switch f := run.Force(f).(type) {
	case *Counting:
		run.Step()
		return f.Lifts.Apply(run, a)
	case *value.Neutral:
		return f.Eliminate(run, &use{arg: a})
	default:
		run.Fault("the count of %T", f)
		return nil
	}
}

// Lifted is the value of f at a, on demand.
func Lifted(run *value.Run, f, a value.Value) value.Value {
	switch f := run.Force(f).(type) {
	case *Counting:
		run.Step()
		return f.Lifted.Apply(run, a)
	case *value.Neutral:
		return f.Eliminate(run, &use{arg: a, value: true})
	default:
		run.Fault("application of %T", f)
		return nil
	}
}

func later(run *value.Run, of func(run *value.Run, f, a value.Value) value.Value, f, a value.Value) value.Value {
	return run.Later(f.Support()|a.Support(), func(run *value.Run) value.Value { return of(run, f, a) })
}

// Hcomp composes at each application.
func (t *Type) Hcomp(run *value.Run, f value.Value, walls value.System) value.Value {
	box := value.Captured{Values: []value.Value{t, f}, Walls: walls}
	lifts, lifted := box, box
	lifts.Rule, lifted.Rule = hcompLifts, hcompLifted
	return &Counting{value.NewCaptured(run, lifts), value.NewCaptured(run, lifted)}
}

var (
	hcompLifts = &value.Rule{Name: "x", Apply: func(run *value.Run, c *value.Captured, x value.Value) value.Value {
		t := run.Force(c.Values[0]).(*Type)
		return prims.Hcomp(run, t.Count, later(run, Lifts, c.Values[1], x), at(run, Lifts, c.Walls, x))
	}}
	hcompLifted = &value.Rule{Name: "x", Apply: func(run *value.Run, c *value.Captured, x value.Value) value.Value {
		t := run.Force(c.Values[0]).(*Type)
		return prims.Hcomp(run, t.Codomain.Open(run, x), later(run, Lifted, c.Values[1], x), at(run, Lifted, c.Walls, x))
	}}
)

// at is the walls at an argument, which is cut to the face of each.
func at(run *value.Run, of func(run *value.Run, f, a value.Value) value.Value, walls value.System, x value.Value) value.System {
	return walls.Map(run, x.Support(), 0, func(run *value.Run, _ value.Name, u value.Value, cut *value.Subst) value.Value {
		return of(run, u, run.Substitute(x, cut))
	})
}

// Transp transports the argument back and count and value forth.
func (t *Type) Transp(run *value.Run, i value.Name, phi interval.Face, f value.Value) value.Value {
	line := value.Captured{Values: []value.Value{f}, Face: phi, I: i, Line: []value.Value{t}}
	lifts, lifted := line, line
	lifts.Rule, lifted.Rule = transpLifts, transpLifted
	return &Counting{value.NewCaptured(run, lifts), value.NewCaptured(run, lifted)}
}

var (
	transpLifts = &value.Rule{Name: "x", Apply: func(run *value.Run, c *value.Captured, x value.Value) value.Value {
		t := run.Force(c.Line[0]).(*Type)
		back := prims.Backward(run, c.I, t.Domain, c.Face, x)
		return prims.Transp(run, c.I, t.Count, c.Face, later(run, Lifts, c.Values[0], back))
	}}
	transpLifted = &value.Rule{Name: "x", Apply: func(run *value.Run, c *value.Captured, x value.Value) value.Value {
		t := run.Force(c.Line[0]).(*Type)
		fill := prims.Backfill(run, c.I, t.Domain, c.Face, x) // at I
		back := run.At(fill, c.I, interval.Zero())
		return prims.Transp(run, c.I, t.Codomain.Open(run, fill), c.Face, later(run, Lifted, c.Values[0], back))
	}}
)
