// Package streams adds streams over a type to the engine, from outside: a
// negative type whose elements are what head and tail make of them.
//
//	(Stream A)        the streams over A
//	(head s) (tail s) the first element, and the rest
//	(unfold S f x)    the stream that the seed x of S makes by f : S → A × S
//
// An unfolding is canonical:
//
//	head (unfold S f x) = (f x).1        tail (unfold S f x) = unfold S f (f x).2
//
// and two unfoldings are equal when their seeds and steps are. There is no η: a
// stream is not unfolded to be compared, so normal forms are finite.
//
// Composites and transports are canonical too, whatever is in them, and head
// and tail compute on them:
//
//	head (hcomp (Stream A) s [φ ↦ i.u]) = hcomp A (head s) [φ ↦ i. head u]
//	tail (hcomp (Stream A) s [φ ↦ i.u]) = hcomp (Stream A) (tail s) [φ ↦ i. tail u]
//	head (transp (i. Stream A) φ s) = transp (i.A) φ (head s)
//	tail (transp (i. Stream A) φ s) = transp (i. Stream A) φ (tail s)
//
// They are never pushed into an unfolding, also where base and walls all show
// one: that rule beside these would not be stable under substitution.
package streams

import (
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Type is Stream A, as a value.
type Type struct{ Element value.Value }

// Unfold is an unfolding, as a value.
type Unfold struct{ Seeds, Step, Seed value.Value }

// Composite is a composite of streams, no face of it being top, as a value.
type Composite struct {
	Of    *Type
	Base  value.Value
	Walls value.System
}

// Transport is a transport along i.Line, its face not being top, as a value.
type Transport struct {
	I    value.Name
	Line *Type // at I
	Face interval.Face
	Base value.Value
}

// Support is the element type's.
func (t *Type) Support() value.Support { return t.Element.Support() }

// Substitute delays s over the element type.
func (t *Type) Substitute(run *value.Run, s *value.Subst) value.Value {
	return &Type{run.Substitute(t.Element, s)}
}

// Support is the union of the parts'.
func (u *Unfold) Support() value.Support {
	return u.Seeds.Support() | u.Step.Support() | u.Seed.Support()
}

// Substitute delays s over the parts.
func (u *Unfold) Substitute(run *value.Run, s *value.Subst) value.Value {
	return &Unfold{run.Substitute(u.Seeds, s), run.Substitute(u.Step, s), run.Substitute(u.Seed, s)}
}

// Support is the union of the parts'.
func (c *Composite) Support() value.Support {
	return c.Of.Support() | c.Base.Support() | c.Walls.Support()
}

// Substitute composes again: a face may hold now.
func (c *Composite) Substitute(run *value.Run, s *value.Subst) value.Value {
	return prims.Hcomp(run, run.Substitute(c.Of, s), run.Substitute(c.Base, s), c.Walls.Substitute(run, s))
}

// Support is the union of the parts', without the line's own dimension.
func (t *Transport) Support() value.Support {
	return t.Line.Support().Without(t.I) | t.Face.Support() | t.Base.Support()
}

// Substitute transports again: the face may be top now.
func (t *Transport) Substitute(run *value.Run, s *value.Subst) value.Value {
	face, base := t.Face.Subst(s), run.Substitute(t.Base, s)
	i, under := run.Under(t.I, t.Line.Support(), s, face.Support()|base.Support())
	return prims.Transp(run, i, run.Substitute(t.Line, under), face, base)
}

// Hcomp is canonical.
func (t *Type) Hcomp(_ *value.Run, base value.Value, walls value.System) value.Value {
	return &Composite{t, base, walls}
}

// Transp is canonical.
func (t *Type) Transp(_ *value.Run, i value.Name, face interval.Face, base value.Value) value.Value {
	return &Transport{i, t, face, base}
}

// Head is the first element of a stream, on demand.
func Head(run *value.Run, s value.Value) value.Value {
	switch s := run.Force(s).(type) {
	case *Unfold:
		run.Step()
		return prims.LaterFirst(run, prims.LaterApply(run, s.Step, s.Seed))
	case *Composite:
		run.Step()
		return prims.LaterHcomp(run, s.Of.Element, laterHead(run, s.Base), s.Walls.Map(run, 0, 0, each(Head)))
	case *Transport:
		run.Step()
		return prims.LaterTransp(run, s.I, s.Line.Element, s.Face, laterHead(run, s.Base))
	case *value.Neutral:
		return s.Eliminate(run, headFrame)
	default:
		run.Fault("head of %T, which is no stream", s)
		return nil
	}
}

// Tail is the rest of a stream, on demand.
func Tail(run *value.Run, s value.Value) value.Value {
	switch s := run.Force(s).(type) {
	case *Unfold:
		run.Step()
		return &Unfold{s.Seeds, s.Step, prims.LaterSecond(run, prims.LaterApply(run, s.Step, s.Seed))}
	case *Composite:
		run.Step()
		return prims.LaterHcomp(run, s.Of, laterTail(run, s.Base), s.Walls.Map(run, 0, 0, each(Tail)))
	case *Transport:
		run.Step()
		return prims.LaterTransp(run, s.I, s.Line, s.Face, laterTail(run, s.Base))
	case *value.Neutral:
		return s.Eliminate(run, tailFrame)
	default:
		run.Fault("tail of %T, which is no stream", s)
		return nil
	}
}

func laterHead(run *value.Run, s value.Value) value.Value {
	return run.Later(s.Support(), func(run *value.Run) value.Value { return Head(run, s) })
}

func laterTail(run *value.Run, s value.Value) value.Value {
	return run.Later(s.Support(), func(run *value.Run) value.Value { return Tail(run, s) })
}

// each is a projection of the walls of a system.
func each(f func(*value.Run, value.Value) value.Value) func(*value.Run, value.Name, value.Value, *value.Subst) value.Value {
	return func(run *value.Run, _ value.Name, u value.Value, _ *value.Subst) value.Value { return f(run, u) }
}
