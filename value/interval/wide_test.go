// The narrow and the wide algebra agree, and hostile sizes stop with an error.

package interval

import (
	"testing"

	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"
)

// spreads send the names 0..3 upwards, order kept, across and beyond the word.
var spreads = []func(Name) Name{
	func(n Name) Name { return n + 40 },
	func(n Name) Name { return n + 30 },
	func(n Name) Name { return n + 61 },
	func(n Name) Name { return n * 11 },
	func(n Name) Name { return n*n*n*100 + 3 },
}

// renaming returns the substitution that sends the names by the map, and back.
func renaming(names []Name, to func(Name) Name) (there, back *Subst) {
	var ups, downs []Dim
	var high []Name
	for _, n := range names {
		high = append(high, to(n))
		ups, downs = append(ups, Var(to(n))), append(downs, Var(n))
	}
	return NewSubst(names, ups), NewSubst(high, downs)
}

// Names do not matter: an operation on renamed operands is the renamed result,
// in the same order of conjunctions.
func TestNarrowAndWideAgree(t *testing.T) {
	names := []Name{0, 1, 2, 3}
	rapid.Check(t, func(t *rapid.T) {
		to := pickFrom(t, spreads)
		there, back := renaming(names, to)
		e := drawExpr(t, names, 4)
		d, high := e.dim(same), e.dim(to)
		requireForm(t, high.form, false)
		require.True(t, d.Subst(there).Equal(high))
		require.True(t, high.Subst(back).Equal(d))
		require.True(t, high.Is0().Subst(back).Equal(d.Is0()))
		require.Equal(t, d.Len(), high.Len())
		for k := range d.Len() {
			var want []Literal
			for _, l := range d.Conjunction(k) {
				want = append(want, Literal{to(l.Name), l.Negated})
			}
			require.Equal(t, want, high.Conjunction(k))
		}

		other := drawExpr(t, names, 3)
		require.Equal(t, d.AtMost(other.dim(same)), high.AtMost(other.dim(to)))
		require.Equal(t, d.Equal(other.dim(same)), high.Equal(other.dim(to)))
		s := drawSubst(t, names, names)
		highSubst := back.Compose(s).Compose(there)
		require.True(t, high.Subst(highSubst).Equal(d.Subst(s).Subst(there)))

		f := drawFaceExpr(t, names, 3)
		low, wide := f.face(same), f.face(to)
		requireForm(t, wide.form, true)
		require.True(t, low.Subst(there).Equal(wide))
		require.True(t, wide.Subst(back).Equal(low))
		g := drawFaceExpr(t, names, 3)
		require.Equal(t, low.Entails(g.face(same)), wide.Entails(g.face(to)))
		require.Equal(t, low.Compare(g.face(same)), wide.Compare(g.face(to)))
		n := pickFrom(t, names)
		require.True(t, wide.Forall(to(n)).Subst(back).Equal(low.Forall(n)))
		require.True(t, wide.Subst(highSubst).Equal(low.Subst(s).Subst(there)))
	})
}

// clauses returns the meet of n joins of two names each, whose normal form has
// 2^n conjunctions.
func clauses(n int, first Name) Dim {
	d := One()
	for k := range Name(n) {
		d = d.Min(Var(first + 2*k).Max(Var(first + 2*k + 1)))
	}
	return d
}

func TestSizesAreBounded(t *testing.T) {
	var largest Dim
	require.Nil(t, sizeErrorOf(t, func() { largest = clauses(11, 0) }))
	require.Equal(t, MaxConjunctions, largest.Len())
	pairs := Zero() // its reversal has 2^12 conjunctions
	for k := range Name(12) {
		pairs = pairs.Max(Var(2 * k).Min(Var(2*k + 1)))
	}
	for _, explode := range []func(){
		func() { clauses(12, 0) },
		func() { largest.Max(Var(30)).Max(Var(31)) },
		func() { clauses(9, 0).Subst(Assign(1, clauses(4, 40))) },
		func() { largest.Is1().And(Eq0(31).Or(Eq1(31))) },
		func() { pairs.Rev() },
		func() { pairs.Is0() },
		func() { Lit(40, true).Subst(Assign(40, pairs)) },
		func() { Eq0(31).Subst(Assign(31, pairs)) },
	} {
		err := sizeErrorOf(t, explode)
		require.NotNil(t, err)
		require.Equal(t, err.Conjunctions > MaxConjunctions, err.Error() == (&SizeError{Conjunctions: MaxConjunctions + 1}).Error())
		require.True(t, err.Conjunctions > MaxConjunctions || err.Comparisons > maxWork)
		require.LessOrEqual(t, err.Conjunctions, MaxConjunctions+1)
	}
}

// Large joins do not depend on the order in which they are built.
func TestLargeJoins(t *testing.T) {
	names := []Name{0, 1, 2, 3, 4, 5, 6, 7}
	largest := 0
	rapid.Check(t, func(t *rapid.T) {
		parts := make([][3]Literal, 24)
		for k := range parts {
			for j := range parts[k] {
				parts[k][j] = Literal{pickFrom(t, names), pick(t, 2) == 1}
			}
		}
		build := func(parts [][3]Literal, to func(Name) Name) Dim {
			join := Zero()
			for _, part := range parts {
				meet := One()
				for _, l := range part {
					meet = meet.Min(Lit(to(l.Name), l.Negated))
				}
				join = join.Max(meet)
			}
			return join
		}
		d := build(parts, same)
		largest = max(largest, d.Len())
		other := rapid.Permutation(parts).Draw(t, "order")
		for _, to := range append(spreads, same) {
			e := build(other, to)
			requireForm(t, e.form, false)
			there, back := renaming(names, to)
			require.True(t, e.Subst(back).Equal(d))
			require.True(t, d.Subst(there).Equal(e))
			require.True(t, e.Is1().Subst(back).Equal(d.Is1()))
			half := build(other[:12], to).Max(build(other[12:], to))
			require.True(t, half.Equal(e))
		}
	})
	require.Greater(t, largest, smallChain)
}

// What is written for debugging tells elements apart.
func TestStringsAreDistinct(t *testing.T) {
	seen := map[string]bool{}
	for _, d := range algebra([]Dim{Zero(), One(), Var(1), Var(40)}) {
		require.False(t, seen[d.String()])
		seen[d.String()] = true
	}
	faces := allFaces(2)
	for _, f := range faces {
		require.False(t, seen["face "+f.String()])
		seen["face "+f.String()] = true
	}
	require.Equal(t, 168+len(faces), len(seen))
	require.Equal(t, "i1∧~i40 ∨ ~i1", Var(1).Min(Lit(40, true)).Max(Lit(1, true)).String())
	require.Equal(t, "(i1=0)(i40=1) ∨ (i1=1)", Eq0(1).And(Eq1(40)).Or(Eq1(1)).String())
}
