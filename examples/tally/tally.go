// Package tally adds a cost-annotated type to the engine, from outside: what a
// berth hands over together with the charges that are still due on it.
//
//	(Tally A)                what is handed over, with its charges
//	(settled a)              nothing is due on a
//	(due t)                  one more charge than t
//	(waive t r)              a waiver: at 0 it is (due t), at 1 it is t
//	(audit (x C) t (a s) (u h d) (u h i w))
//	                         elimination into the family x.C: s over the element
//	                         a; d over a tally u and its audit h; w over u, h
//	                         and the dimension i of the waiver, which is d at 0
//	                         and h at 1
//
// It is positive, and its waivers are paths, so its composites are formal: one
// more canonical element, into which no constructor is pushed, and with which
// audit commutes (Coquand, Huber, Mörtberg, "On Higher Inductive Types in Cubical
// Type Theory", LICS 2018, 3):
//
//	audit (hcomp (Tally A) u0 [φ ↦ i.u]) = comp (i. C(h(i))) (audit u0) [φ ↦ i. audit u],  h the filler
//
// Transport along i. Tally A commutes with everything canonical, since the
// boundary of a waiver is built from constructors and its argument alone:
//
//	transp φ (settled a) = settled (transp (i.A) φ a)      transp φ (due t) = due (transp φ t)
//	transp φ (waive t r) = waive (transp φ t) r            transp φ (hcomp …) = hcomp of transports
package tally

import (
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Type is Tally A, as a value.
type Type struct{ Of value.Value }

// Settled, Due and Waive are the constructors as values; no end of a waiver holds.
type (
	Settled struct{ A value.Value }
	Due     struct{ Rest value.Value }
	Waive   struct {
		Rest value.Value
		At   interval.Dim
	}
)

// Composite is a formal composite, no face of it being top, as a value.
type Composite struct {
	Type  *Type
	Base  value.Value
	Walls value.System
}

// NewWaive is a waiver: one of its ends, where the dimension is there.
func NewWaive(rest value.Value, at interval.Dim) value.Value {
	switch {
	case at.IsZero():
		return &Due{rest}
	case at.IsOne():
		return rest
	}
	return &Waive{rest, at}
}

// Support is the type's below.
func (t *Type) Support() value.Support { return t.Of.Support() }

// Substitute delays s over the type below.
func (t *Type) Substitute(run *value.Run, s *value.Subst) value.Value {
	return &Type{run.Substitute(t.Of, s)}
}

// Support is the element's.
func (v *Settled) Support() value.Support { return v.A.Support() }

// Substitute delays s over the element.
func (v *Settled) Substitute(run *value.Run, s *value.Subst) value.Value {
	return &Settled{run.Substitute(v.A, s)}
}

// Support is that of the tally below.
func (v *Due) Support() value.Support { return v.Rest.Support() }

// Substitute delays s over the tally below.
func (v *Due) Substitute(run *value.Run, s *value.Subst) value.Value {
	return &Due{run.Substitute(v.Rest, s)}
}

// Support is that of the tally below and of the dimension.
func (v *Waive) Support() value.Support { return v.Rest.Support() | v.At.Support() }

// Substitute may bring the waiver to one of its ends.
func (v *Waive) Substitute(run *value.Run, s *value.Subst) value.Value {
	return NewWaive(run.Substitute(v.Rest, s), v.At.Subst(s))
}

// Support is the union of the parts'.
func (c *Composite) Support() value.Support {
	return c.Type.Support() | c.Base.Support() | c.Walls.Support()
}

// Substitute composes again: a face may hold now.
func (c *Composite) Substitute(run *value.Run, s *value.Subst) value.Value {
	return prims.Hcomp(run, run.Substitute(c.Type, s), run.Substitute(c.Base, s), c.Walls.Substitute(run, s))
}

// Hcomp is formal.
func (t *Type) Hcomp(_ *value.Run, base value.Value, walls value.System) value.Value {
	return &Composite{t, base, walls}
}

// Transp commutes with constructors and composites, and waits for a neutral.
func (t *Type) Transp(run *value.Run, i value.Name, phi interval.Face, v value.Value) value.Value {
	switch v := run.Force(v).(type) {
	case *Settled:
		return &Settled{prims.LaterTransp(run, i, t.Of, phi, v.A)}
	case *Due:
		return &Due{prims.LaterTransp(run, i, t, phi, v.Rest)}
	case *Waive:
		return NewWaive(prims.LaterTransp(run, i, t, phi, v.Rest), v.At)
	case *Composite:
		// a wall must not bind i, and what is brought under it is cut to its face
		walls := v.Walls.Map(run, t.Support().Without(i)|phi.Support(), interval.Single(i),
			func(run *value.Run, _ value.Name, u value.Value, cut *value.Subst) value.Value {
				return prims.Transp(run, i, run.Substitute(t, cut), phi.Subst(cut), u)
			})
		return prims.Hcomp(run, run.At(t, i, interval.One()), prims.LaterTransp(run, i, t, phi, v.Base), walls)
	case *value.Neutral:
		return v.Eliminate(run, prims.TransportFrame(i, t, phi))
	default:
		run.Fault("transport of %T in a type of tallies", v)
		return nil
	}
}
