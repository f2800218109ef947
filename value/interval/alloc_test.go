// What must not allocate, does not.

package interval

import (
	"testing"

	"github.com/stretchr/testify/require"
)

func TestNothingIsAllocated(t *testing.T) {
	i, j, k, l := Var(0), Var(1), Var(2), Lit(31, true)
	two := i.Min(j).Max(k)
	four := i.Min(j).Max(i.Rev().Min(k)).Max(j.Rev().Min(l)).Max(k.Rev().Min(l.Rev()))
	pair := i.Min(j).Max(k.Min(l))
	face := Eq0(0).And(Eq1(1)).Or(Eq0(2))
	wall := Eq0(3).Or(Eq1(31))
	cube, _ := CubeOf(Assignment{3, true})
	large, _ := CubeOf(Assignment{0, true}, Assignment{5, false})
	rename, connect := Rename(0, 7), Assign(0, Var(7).Min(Var(8)))
	join := Assign(2, Var(9).Max(Var(10)))
	many := NewSubst([]Name{0, 1, 2}, []Dim{j, i.Rev(), One()})
	for name, f := range map[string]func(){
		"variables": func() { sinkDim = Var(3).Min(Lit(4, true)).Max(Zero()).Min(One()) },
		"meet":      func() { sinkDim = pair.Min(two) },
		"join":      func() { sinkDim = two.Max(i.Min(l)).Max(k.Rev()) },
		"reversal":  func() { sinkDim = pair.Rev(); sinkDim = four.Max(One()).Rev(); sinkDim = i.Min(l).Rev() },
		"questions": func() {
			sinkBool = four.Equal(pair) || four.AtMost(pair) || four.Mentions(9) || four.IsEnd()
			sinkSup = four.Support() | face.Support() | cube.Support() | many.Domain() | many.Image()
			_, _, sinkBool = i.Literal()
			sinkBool = four.Compare(pair) == 0 || face.Compare(wall) == 0
		},
		"ends": func() { sinkFace = two.Is0(); sinkFace = pair.Is1(); sinkFace = pair.Is0() },
		"faces": func() {
			sinkFace = face.And(wall)
			sinkFace = face.Or(wall)
			sinkFace = face.Forall(0)
			sinkBool = face.Entails(wall) || face.Mentions(4)
		},
		"cubes": func() {
			c := face.Cube(1)
			d, _ := c.And(cube)
			sinkBool = d.Implies(c) || d.Equal(large)
			sinkFace = d.Without(3).Face()
			sinkFace = large.Subst(connect)
			_, sinkBool = d.Get(3)
		},
		"restriction": func() { sinkDim = two.Subst(cube.Restriction()) },
		"assignment":  func() { sinkDim = four.Subst(Assign(0, One())); sinkFace = face.Subst(Assign(62, Zero())) },
		"substitution": func() {
			for _, s := range [...]*Subst{rename, many, nil} {
				sinkDim = two.Subst(s)
				sinkDim = four.Subst(s)
				sinkFace = face.Subst(s)
			}
			sinkDim = two.Subst(join)
			sinkDim = two.Subst(connect)
			sinkDim = two.Rev().Subst(connect)
		},
		"skipping": func() {
			sinkBool = many.Skippable(6, 2, 15)
			sinkBool = many.RestrictTo(15) == many
			_, sinkBool = many.Lookup(1)
		},
	} {
		require.Zero(t, testing.AllocsPerRun(20, f), name)
	}
}
