package prims

import (
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// What authors of formers share with the built-in ones, beside the operations
// of kan.go: composites and transports that cannot compute, and how they are
// read back and compared. The operators hcomp and transp of core terms are the
// same for every type.

// StuckHcomp is the neutral composite of a type whose former waits for
// something in base or walls. waits and faces are what it waits for: dimensions
// that may unstick it when they go to an end, and dimensions whose
// identification may; the faces of the walls are added to both. When one of
// them changes, the composite is computed again, by the rule of its type.
func StuckHcomp(a, base value.Value, walls value.System, waits, faces value.Support) value.Value {
	return stuckHcomp(a, base, walls, waits, faces)
}

// ReadHcomp reads a composite in a back as the operator hcomp: what a former
// whose composites are canonical does with them.
func ReadHcomp(q value.Quoter, a, base value.Value, walls value.System) value.Core {
	return readHcomp(q, a, base, walls)
}

// SameHcomp compares two composites in a.
func SameHcomp(c value.Comparer, a, base value.Value, walls value.System, base2 value.Value, walls2 value.System) bool {
	return sameHcomp(c, a, base, walls, base2, walls2)
}

// ReadTransp reads a transport along the line i.a back as the operator transp:
// what a former whose transports are canonical does with them.
func ReadTransp(q value.Quoter, i value.Name, a value.Value, phi interval.Face, v value.Value) value.Core {
	return readTransp(q, i, a, phi, v)
}

// SameTransp compares two transports.
func SameTransp(c value.Comparer, i value.Name, a value.Value, phi interval.Face, v value.Value, j value.Name, b value.Value, psi interval.Face, w value.Value) bool {
	return sameLine(c, i, a, j, b) && sameFace(c, phi, psi) &&
		c.Terms("what is transported", c.Run().At(a, i, interval.Zero()), v, w)
}

// TransportFrame is a transport along the line i.a, the identity on phi, that
// waits for an element of a type whose transport looks at its element.
func TransportFrame(i value.Name, a value.Value, phi interval.Face) value.Frame {
	return &transpFrame{i, a, phi}
}
