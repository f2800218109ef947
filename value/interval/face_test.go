// Laws of faces and cubes.

package interval

import (
	"testing"

	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"
)

// Faces are the distributive lattice on (i=0) and (i=1) with nothing but
// (i=0) and (i=1) together bot (CCHM 4.1): entailment under that exclusion.
func TestFaceAgreesWithASolver(t *testing.T) {
	names := []Name{0, 1, 2, 3, 31}
	equal := 0
	rapid.Check(t, func(t *rapid.T) {
		e := drawFaceExpr(t, names, 3)
		f := drawFaceExpr(t, names, 3)
		switch pick(t, 3) {
		case 0:
			// e = e or (e and f), by absorption.
			f = &faceExpr{op: '|', l: e, r: &faceExpr{op: '&', l: e, r: f}}
		case 1:
			f = &faceExpr{op: '|', l: f, r: e}
		}
		c := newCircuit()
		x, y := e.circuit(c), f.circuit(c)
		up, down := c.follows(x, y, true), c.follows(y, x, true)
		g, h := e.face(same), f.face(same)
		requireForm(t, g.form, true)
		require.Equal(t, up, g.Entails(h), "%v and %v", g, h)
		require.Equal(t, down, h.Entails(g), "%v and %v", g, h)
		require.Equal(t, up && down, g.Equal(h), "%v and %v", g, h)
		require.Equal(t, up && down, g.Compare(h) == 0)
		if up && down {
			equal++
		}
	})
	require.Positive(t, equal, "no equal pair was drawn")
}

func TestFaceQuestions(t *testing.T) {
	names := []Name{0, 5, 31, 32, 63, 1000}
	rapid.Check(t, func(t *rapid.T) {
		f := drawFace(t, pickFrom(t, [][]Name{names, {0, 5, 31}}), 4)
		requireForm(t, f.form, true)
		require.Equal(t, f.Equal(Bot()), f.IsBot())
		require.Equal(t, f.Equal(Top()), f.IsTop())
		require.Equal(t, Face{}, Bot())
		rebuilt := Bot()
		seen := map[Name]bool{}
		for k := range f.Len() {
			c := f.Cube(k)
			rebuilt = c.Face().Or(rebuilt)
			for _, n := range names {
				_, ok := c.Get(n)
				seen[n] = seen[n] || ok
			}
		}
		require.True(t, rebuilt.Equal(f))
		count := 0
		for _, n := range names {
			require.Equal(t, seen[n], f.Mentions(n))
			if seen[n] {
				count++
				require.True(t, f.Support().Has(n))
			}
		}
		require.Len(t, f.Names(), count)
	})
	require.False(t, Eq0(1).Or(Eq1(1)).IsTop())
	require.True(t, Eq0(1).And(Eq1(1)).IsBot())
	require.True(t, Eq0(40).And(Eq1(40)).IsBot())
}

// A face without n entails f exactly when it entails f without n (CCHM 4.1).
func TestForallIsAdjoint(t *testing.T) {
	for _, names := range [][]Name{{0, 1, 2}, {30, 31, 32, 33}} {
		rapid.Check(t, func(t *rapid.T) {
			f := drawFace(t, names, 3)
			n := pickFrom(t, names)
			all := f.Forall(n)
			requireForm(t, all.form, true)
			require.False(t, all.Mentions(n))
			require.True(t, all.Entails(f))
			var others []Name
			for _, m := range names {
				if m != n {
					others = append(others, m)
				}
			}
			g := drawFace(t, others, 3)
			require.Equal(t, g.Entails(f), g.Entails(all), "%v and %v", g, f)
			require.True(t, g.Forall(n).Equal(g))
		})
	}
}

// A face is decided by the cubes that entail it, and (r=e) by the cubes under
// which r becomes e.
func TestEndsOfDimensions(t *testing.T) {
	for _, names := range [][]Name{{0, 1, 2}, {31, 32, 70}} {
		rapid.Check(t, func(t *rapid.T) {
			d := drawDim(t, names, 3)
			requireForm(t, d.Is0().form, true)
			requireForm(t, d.Is1().form, true)
			everywhere(names, 3, func(at func(Name) uint8) bool {
				var as []Assignment
				for _, n := range names {
					if at(n) > 0 {
						as = append(as, Assignment{n, at(n) == 2})
					}
				}
				c, ok := CubeOf(as...)
				require.True(t, ok)
				under := d.Subst(c.Restriction())
				require.Equal(t, under.IsZero(), c.Face().Entails(d.Is0()), "%v under %v", d, c)
				require.Equal(t, under.IsOne(), c.Face().Entails(d.Is1()), "%v under %v", d, c)
				require.Equal(t, under.IsZero(), d.Is0().Subst(c.Restriction()).IsTop())
				return true
			})
		})
	}
}

// drawCube draws a cube.
func drawCube(t *rapid.T, names []Name) (Cube, map[Name]bool) {
	ends := map[Name]bool{}
	var as []Assignment
	for _, n := range names {
		if k := pick(t, 3); k > 0 {
			ends[n] = k == 2
			as = append(as, Assignment{n, k == 2})
		}
	}
	c, ok := CubeOf(rapid.Permutation(as).Draw(t, "order")...)
	require.True(t, ok)
	return c, ends
}

// Cubes are partial functions from names to ends.
func TestCubes(t *testing.T) {
	names := []Name{0, 1, 31, 32, 33, 62, 63, 64}
	rapid.Check(t, func(t *rapid.T) {
		c, ends := drawCube(t, names)
		d, others := drawCube(t, names)
		if pick(t, 2) == 1 {
			d, others = c, map[Name]bool{}
			for _, n := range names {
				if one, ok := ends[n]; ok && pick(t, 2) == 1 {
					others[n] = one
				} else {
					d = d.Without(n)
				}
			}
		}
		require.Equal(t, len(ends), c.Len())
		require.Equal(t, len(ends) == 0, c.IsTop())
		require.Len(t, c.Assignments(), len(ends))
		for k, a := range c.Assignments() {
			require.Equal(t, ends[a.Name], a.One)
			require.True(t, k == 0 || c.Assignments()[k-1].Name < a.Name)
			require.True(t, c.Support().Has(a.Name))
		}
		sameEnds, more, clash := len(ends) == len(others), true, false
		for _, n := range names {
			one, ok := c.Get(n)
			want, given := ends[n]
			require.Equal(t, given, ok)
			require.Equal(t, want, one)
			other, there := others[n]
			sameEnds = sameEnds && given == there && want == other
			more = more && (!there || given && want == other)
			clash = clash || given && there && want != other
		}
		require.Equal(t, sameEnds, c.Equal(d))
		require.Equal(t, sameEnds, c.Compare(d) == 0)
		require.Equal(t, c.Compare(d), -d.Compare(c))
		require.Equal(t, more, c.Implies(d))
		require.Equal(t, more, c.Face().Entails(d.Face()))
		both, ok := c.And(d)
		require.Equal(t, !clash, ok)
		require.Equal(t, clash, c.Face().And(d.Face()).IsBot())
		if ok {
			require.True(t, both.Face().Equal(c.Face().And(d.Face())))
		}
		r := c.Restriction()
		require.Equal(t, len(ends), r.Len())
		require.True(t, r.IsEnds())
		require.True(t, c.Subst(r).IsTop())
		require.Equal(t, clash, d.Subst(r).IsBot())
		for _, n := range names {
			image, ok := r.Lookup(n)
			one, given := ends[n]
			require.Equal(t, given, ok)
			if ok {
				require.True(t, image.Equal(end(one)))
			}
		}
	})
	_, ok := CubeOf(Assignment{4, true}, Assignment{40, false}, Assignment{4, false})
	require.False(t, ok)
	_, ok = CubeOf(Assignment{40, true}, Assignment{4, false}, Assignment{40, false})
	require.False(t, ok)
	_, ok = CubeOf(Assignment{40, true}, Assignment{4, false}, Assignment{40, true})
	require.True(t, ok)
}

// To work under a face is to work under the restrictions of its cubes.
func TestRestrictionUnderAFace(t *testing.T) {
	names := []Name{0, 1, 2, 40}
	rapid.Check(t, func(t *rapid.T) {
		f := drawFace(t, names, 3)
		g := drawFace(t, names, 3)
		holds := true
		for k := range f.Len() {
			c := f.Cube(k)
			holds = holds && g.Subst(c.Restriction()).IsTop()
			require.True(t, c.Face().And(g).Equal(c.Face().And(g.Subst(c.Restriction()))))
		}
		require.Equal(t, holds, f.Entails(g))
	})
}
