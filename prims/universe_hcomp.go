package prims

import (
	"example.com/boxwright/value"
)

// Hcomp of a universe glues on the ends of the walls, along the equivalences
// that their lines make (CCHM 7.1):
//
//	hcomp (U n) A [φ ↦ i. E] = Glue A [φ ↦ (E(1), e)],   e : Equiv E(1) E(0) along E(~i)
func (u *Universe) Hcomp(run *value.Run, a value.Value, walls value.System) value.Value {
	parts := make([]GluePart, len(walls))
	for k, w := range walls {
		parts[k] = GluePart{w.Cube, w.End(run), &lineEquivalence{w.I, w.Body}}
	}
	return NewGlue(a, parts)
}
