package prims

import (
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Transp of a Glue type without parts, which is what a composite of types
// without walls makes, and a transport that goes nowhere (CCHM 6.2):
//
//	transp (i. Glue A []) bot u0 = glue (hcomp A(1) (hcomp A(1) (transp (i.A) bot (unglue u0)) []) []) []
//
// Composites at such a type are made below its glue, so that where they nest, n
// deep, each level would look through all below it. Here all of them are made
// at the type below the last; where they look at their base in any case, one after
// the other, so that they do not nest.

// bare reports whether g has no parts and transport may go through the nest at once:
// a run that keeps no results, or one that somebody follows, takes the general rule.
func (g *GlueType) bare(run *value.Run, psi interval.Face) bool {
	return len(g.Parts) == 0 && psi.IsBot() && !run.Plain.NoSharing && !(run.Traced() && run.Observed())
}

func transpBare(run *value.Run, i value.Name, g *GlueType, u0 value.Value) value.Value {
	depth, a := 1, run.Force(g.A)
	for v, ok := a.(*GlueType); ok && len(v.Parts) == 0; v, ok = a.(*GlueType) {
		depth++
		run.Transport(v)
		a = run.Force(v.A)
	}
	u := u0
	for range depth {
		u = LaterUnglue(run, nil, u)
	}
	end := run.At(a, i, interval.One())
	if looksAtBase(run, a) {
		below := u
		u = run.Later(a.Support().Without(i)|u.Support(), func(run *value.Run) value.Value {
			v := run.Force(Transp(run, i, a, interval.Bot(), below))
			for range 2 * depth {
				v = run.Force(Hcomp(run, end, v, nil))
			}
			return v
		})
	} else {
		u = LaterTransp(run, i, a, interval.Bot(), u)
		for range 2 * depth {
			u = LaterHcomp(run, end, u, nil)
		}
	}
	for range depth {
		u = NewGlueElement(u, nil)
	}
	return u
}
