package prims

import (
	"example.com/boxwright/value"
)

// Hcomp of a Glue type (CCHM 6.2 with CHM's operations):
//
//	hcomp (Glue A [φ ↦ (T,e)]) u0 [ψ ↦ i.u] = glue a1 [φ ↦ t(1)]
//	    t  = hfill T u0 [ψ ↦ i.u]                                                   (under φ)
//	    a1 = hcomp A (unglue u0) [ψ ↦ i. unglue u] [φ ↦ i. e.1 t(i)]
func (g *GlueType) Hcomp(run *value.Run, u0 value.Value, walls value.System) value.Value {
	parts := glueParts(g.Parts)
	i := run.Fresh(g.support | u0.Support() | walls.Support())
	sides := walls.Map(run, parts.support(), 0, func(run *value.Run, _ value.Name, u value.Value, cut *value.Subst) value.Value {
		return Unglue(run, parts.substitute(run, cut), u)
	})
	glued := make([]GlueValue, len(parts))
	for k, p := range parts {
		cut := p.Cube.Restriction()
		base, us := run.Substitute(u0, cut), walls.Substitute(run, cut)
		t := Hfill(run, i, p.T, base, us)
		sides = append(sides, value.Wall{Cube: p.Cube, I: i, Body: mapAlong(run, p.E, t)})
		glued[k] = GlueValue{p.Cube, LaterHcomp(run, p.T, base, us)}
	}
	return NewGlueElement(LaterHcomp(run, g.A, LaterUnglue(run, parts, u0), sides), glued)
}

// mapAlong is e.1 t, in a cell.
func mapAlong(run *value.Run, e, t value.Value) value.Value {
	return run.LaterOf(e.Support()|t.Support(), mapped, e, t)
}
