package prims

import (
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Transp of a Glue type (CCHM 6.2 with CHM's operations), the receiver at i:
//
//	transp (i. Glue A [φ ↦ (T,e)]) ψ u0 = glue a1' [φ(1) ↦ t1]
//	    δ   = ∀i.φ
//	    t   = tfill (i.T) ψ u0                                                      (under δ)
//	    a1  = comp (i.A) (unglue u0) [ψ ↦ i. unglue_i u0] [δ ↦ i. e(i).1 t(i)]
//	    (t1, α) = extend, under φ(1), of the contractible fiber of e(1).1 over a1, with [δ ↦ (t(1), constant path)]
//	    a1' = hcomp A(1) a1 [φ(1) ↦ j. α @ j] [ψ ↦ _. a1]
//
// Every part has its own δ; the contraction extends over all of them.
func (g *GlueType) Transp(run *value.Run, i value.Name, psi interval.Face, u0 value.Value) value.Value {
	if from, to, ok := g.across(run, i, psi); ok {
		return transpAcross(run, i, g, from, to, u0)
	}
	if g.bare(run, psi) {
		return transpBare(run, i, g, u0)
	}
	parts := glueParts(g.Parts)
	start, end := interval.Assign(i, interval.Zero()), interval.Assign(i, interval.One())

	// unglue at i = 0 for the base, and unglue_i under ψ
	base := LaterUnglue(run, parts.substitute(run, start), u0)
	var sides value.System
	for k := range psi.Len() {
		cube := psi.Cube(k)
		cut := cube.Restriction()
		ps, u := parts.substitute(run, cut), run.Substitute(u0, cut)
		sides = append(sides, value.Wall{Cube: cube, I: i, Body: run.Later(ps.support()|u.Support(), func(run *value.Run) value.Value { return Unglue(run, ps, u) })})
	}
	// t and e(i).1 t(i) under each δ; what of it stands at 1
	var done []GlueValue
	for _, p := range parts {
		if p.Cube.Support().Has(i) {
			if _, mentions := p.Cube.Get(i); mentions {
				continue
			}
		}
		cut := p.Cube.Restriction()
		under, u := psi.Subst(cut), run.Substitute(u0, cut)
		t := Tfill(run, i, p.T, under, u)
		sides = append(sides, value.Wall{Cube: p.Cube, I: i, Body: mapAlong(run, p.E, t)})
		done = append(done, GlueValue{p.Cube, LaterTransp(run, i, p.T, under, u)})
	}
	a1 := LaterComp(run, i, g.A, base, sides)

	parts1 := parts.substitute(run, end)
	for _, p := range parts1 {
		if p.Cube.IsTop() { // the result is t1; nobody looks at a1'
			return extendFirst(run, p, a1, done)
		}
	}
	a := run.Substitute(g.A, end)
	glued := make([]GlueValue, len(parts1))
	j := run.Fresh(g.support | u0.Support() | psi.Support() | interval.Single(i))
	var corrections value.System
	for k, p := range parts1 {
		cut := p.Cube.Restriction()
		under := run.Substitute(a1, cut)
		t1 := run.Later(p.T.Support()|p.E.Support()|under.Support()|supportOfParts(done), func(run *value.Run) value.Value { return extendFirst(run, p, under, done) })
		glued[k] = GlueValue{p.Cube, t1}
		fiber := extendFiber(run, p, run.Substitute(a, cut), under, done)
		path := run.Later(fiber.Support(), func(run *value.Run) value.Value { return Second(run, fiber) })
		corrections = append(corrections, value.Wall{Cube: p.Cube, I: j, Body: LaterAt(run, path, interval.Var(j))})
	}
	corrections = corrections.Constant(run, psi, a1)
	return NewGlueElement(LaterHcomp(run, a, a1, corrections), glued)
}

// extendFiber is, on the cube of p and with everything but done restricted to
// it, an element of the fiber of p's map over a1 that is (t, constant path) on
// each of done:
//
//	extend: for c : Contr X and a partial element p of X on φ,  hcomp X c.1 [φ ↦ i. (c.2 p) @ i]
func extendFiber(run *value.Run, p GluePart, a, a1 value.Value, done []GlueValue) value.Value {
	c := run.Later(p.E.Support()|a1.Support(), func(run *value.Run) value.Value { return Apply(run, Second(run, p.E), a1) })
	f := run.Later(p.E.Support(), func(run *value.Run) value.Value { return First(run, p.E) })
	return LaterHcomp(run, FiberType(run, p.T, a, f, a1), LaterFirst(run, c), contracted(run, p, c, a1, done))
}

// extendFirst is the first part of extendFiber, which composes apart from the second.
func extendFirst(run *value.Run, p GluePart, a1 value.Value, done []GlueValue) value.Value {
	var walls value.System
	if len(done) > 0 {
		c := run.Later(p.E.Support()|a1.Support(), func(run *value.Run) value.Value { return Apply(run, Second(run, p.E), a1) })
		walls = contracted(run, p, c, a1, done).Map(run, 0, 0, func(run *value.Run, _ value.Name, u value.Value, _ *value.Subst) value.Value { return First(run, u) })
	}
	base := run.LaterOf(p.E.Support()|a1.Support(), center, p.E, a1)
	return Hcomp(run, p.T, base, walls)
}

// contracted are the walls on done by which the contraction c moves the center to them.
func contracted(run *value.Run, p GluePart, c, a1 value.Value, done []GlueValue) (walls value.System) {
	cut := p.Cube.Restriction()
	for _, d := range done {
		face := d.Cube.Subst(cut)
		for k := range face.Len() {
			cube := face.Cube(k)
			t := run.Restrict(run.Substitute(d.T, cut), cube)
			here, center := run.Restrict(a1, cube), run.Restrict(c, cube)
			point := NewPair(t, &PathLam{Body: value.Constant{V: here}})
			i := run.Fresh(center.Support() | point.Support() | cube.Support())
			walls = append(walls, value.Wall{Cube: cube, I: i, Body: run.Later(center.Support()|point.Support()|interval.Single(i), func(run *value.Run) value.Value {
				return At(run, Apply(run, Second(run, center), point), interval.Var(i))
			})})
		}
	}
	return walls
}

func supportOfParts(parts []GlueValue) (sup value.Support) {
	for _, p := range parts {
		sup |= p.Cube.Support() | p.T.Support()
	}
	return sup
}
