package eval

import (
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// dimensionCode is an interval expression over levels, with the slots where
// they stand.
type dimensionCode struct {
	dim     interval.Dim
	names   []interval.Name
	slots   []int
	literal bool // a single literal, not negated
	negated bool // a single negated literal
}

func (c *dimensionCode) eval(f Frame) interval.Dim {
	switch {
	case len(c.slots) == 0:
		return c.dim
	case c.literal:
		return f[c.slots[0]].(*value.Dimension).Dim
	case c.negated:
		return f[c.slots[0]].(*value.Dimension).Dim.Rev()
	}
	return c.dim.Subst(gather(c.names, c.slots, f))
}

// faceCode is a face over levels, with the slots where they stand.
type faceCode struct {
	face  interval.Face
	names []interval.Name
	slots []int
	end   faceEnd
}

// faceEnd says that a face is one dimension at one end, which most are.
type faceEnd int8

const (
	otherFace faceEnd = iota
	atZero
	atOne
)

func endOf(f interval.Face) faceEnd {
	if names := f.Names(); len(names) == 1 {
		switch {
		case f.Equal(interval.Eq0(names[0])):
			return atZero
		case f.Equal(interval.Eq1(names[0])):
			return atOne
		}
	}
	return otherFace
}

func (c *faceCode) eval(f Frame) interval.Face {
	if len(c.slots) == 0 {
		return c.face
	}
	switch c.end {
	case atZero:
		return f[c.slots[0]].(*value.Dimension).Is0()
	case atOne:
		return f[c.slots[0]].(*value.Dimension).Is1()
	}
	return c.face.Subst(gather(c.names, c.slots, f))
}

func gather(names []interval.Name, slots []int, f Frame) *interval.Subst {
	if len(names) == 1 {
		return interval.Assign(names[0], f[slots[0]].(*value.Dimension).Dim)
	}
	dims := make([]interval.Dim, len(slots))
	for k, slot := range slots {
		dims[k] = f[slot].(*value.Dimension).Dim
	}
	return interval.NewSubst(names, dims)
}
