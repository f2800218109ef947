// Laws of the interval: the free De Morgan algebra, against two models.

package interval

import (
	"testing"

	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"
)

// An equation holds in every De Morgan algebra exactly when it holds in the
// four-element one (Kalman, "Lattices with involution", Transactions of the AMS
// 1958). So do inequalities, being equations about meets.
func TestDimAgreesWithTheFourElementAlgebra(t *testing.T) {
	names := []Name{0, 1, 2}
	equal := 0
	rapid.Check(t, func(t *rapid.T) {
		e := drawExpr(t, names, 4)
		f := drawExpr(t, names, 4)
		if pick(t, 2) == 1 {
			f = drawLike(t, e, names)
		}
		same4, below4 := true, true
		everywhere(names, 4, func(at func(Name) uint8) bool {
			x, y := e.four(at), f.four(at)
			same4 = same4 && x == y
			below4 = below4 && x&y == x
			return below4
		})
		d, g := e.dim(same), f.dim(same)
		requireForm(t, d.form, false)
		require.Equal(t, same4, d.Equal(g), "%v and %v", e, f)
		require.Equal(t, same4, d.Compare(g) == 0)
		require.Equal(t, below4, d.AtMost(g), "%v and %v", e, f)
		if same4 {
			equal++
		}
		everywhere(names, 4, func(at func(Name) uint8) bool {
			require.Equal(t, e.four(at), fourOf(d, at))
			return true
		})
	})
	require.Positive(t, equal, "no equal pair was drawn")
}

// On the literals the free De Morgan algebra is the free distributive lattice,
// where order is entailment of monotone formulas.
func TestDimAgreesWithASolver(t *testing.T) {
	names := []Name{0, 1, 2, 3, 31}
	rapid.Check(t, func(t *rapid.T) {
		e := drawExpr(t, names, 4)
		f := drawExpr(t, names, 4)
		switch pick(t, 3) {
		case 0:
			f = drawLike(t, e, names)
		case 1:
			f = &expr{op: '|', l: drawLike(t, e, names), r: f}
		}
		c := newCircuit()
		x, y := e.circuit(c, false), f.circuit(c, false)
		up, down := c.follows(x, y, false), c.follows(y, x, false)
		d, g := e.dim(same), f.dim(same)
		require.Equal(t, up, d.AtMost(g), "%v and %v", e, f)
		require.Equal(t, down, g.AtMost(d), "%v and %v", e, f)
		require.Equal(t, up && down, d.Equal(g), "%v and %v", e, f)
	})
}

// The interval is not Boolean (CCHM 3.1).
func TestDimIsNotBoolean(t *testing.T) {
	i := Var(3)
	require.False(t, i.Min(i.Rev()).IsZero())
	require.False(t, i.Max(i.Rev()).IsOne())
	require.True(t, Zero().Rev().IsOne())
	require.True(t, One().Rev().IsZero())
	require.Equal(t, Dim{}, Zero())
}

func TestDimQuestions(t *testing.T) {
	names := []Name{0, 5, 31, 32, 62, 63, 64, 1000}
	rapid.Check(t, func(t *rapid.T) {
		d := drawDim(t, pickFrom(t, [][]Name{names, {0, 1, 5}}), 4)
		requireForm(t, d.form, false)
		require.Equal(t, d.Equal(Zero()), d.IsZero())
		require.Equal(t, d.Equal(One()), d.IsOne())
		require.Equal(t, d.IsZero() || d.IsOne(), d.IsEnd())
		seen := map[Name]bool{}
		rebuilt := Zero()
		for k := range d.Len() {
			meet := One()
			for _, l := range d.Conjunction(k) {
				seen[l.Name] = true
				meet = meet.Min(Lit(l.Name, l.Negated))
			}
			rebuilt = rebuilt.Max(meet)
		}
		require.True(t, rebuilt.Equal(d))
		require.Len(t, d.Names(), len(seen))
		for _, n := range append(names, 1, 33, 65, 1001) {
			require.Equal(t, seen[n], d.Mentions(n), "%v in %v", n, d)
			if seen[n] {
				require.True(t, d.Support().Has(n))
			} else if n < 63 {
				require.False(t, d.Support().Has(n))
			}
		}
		n, negated, ok := d.Literal()
		require.Equal(t, d.Len() == 1 && len(d.Conjunction(0)) == 1, ok)
		if ok {
			require.True(t, d.Equal(Lit(n, negated)))
			require.True(t, d.Equal(Var(n)) != negated)
		}
	})
}

func TestSupport(t *testing.T) {
	names := rapid.Custom(func(t *rapid.T) Name { return Name(rapid.IntRange(0, 70).Draw(t, "name")) })
	rapid.Check(t, func(t *rapid.T) {
		in := rapid.SliceOf(names).Draw(t, "in")
		s := Support(0)
		has := map[Name]bool{}
		for _, n := range in {
			s |= Single(n)
			has[min(n, 63)] = true
		}
		for n := range Name(80) {
			require.Equal(t, has[min(n, 63)], s.Has(n))
			require.True(t, s.Has(n) || s.Without(n) == s)
			require.Equal(t, n >= 63 && s.Has(n), s.Without(n).Has(n))
			require.Equal(t, s, s.Without(n)|s&Single(n))
		}
		fresh, ok := s.Lowest()
		require.True(t, ok)
		require.False(t, s.Has(fresh))
		for n := range fresh {
			require.True(t, s.Has(n))
		}
	})
	_, ok := (1<<63 - 1 | Support(1)<<63).Lowest()
	require.False(t, ok)
	_, ok = Support(1<<63 - 1).Lowest()
	require.False(t, ok)
	n, ok := Support(1<<62 - 1).Lowest()
	require.True(t, ok)
	require.Equal(t, Name(62), n)
}

// Compare is a total order in which order-preserving renaming changes nothing.
func TestCompareIsATotalOrder(t *testing.T) {
	names := []Name{0, 1, 2}
	rapid.Check(t, func(t *rapid.T) {
		a, b, c := drawExpr(t, names, 3), drawExpr(t, names, 3), drawExpr(t, names, 3)
		shift := pickFrom(t, []Name{0, 7, 30, 31, 40, 62})
		up := func(n Name) Name { return n + shift }
		x, y, z := a.dim(same), b.dim(same), c.dim(same)
		require.Equal(t, x.Equal(y), x.Compare(y) == 0)
		require.Equal(t, x.Compare(y), -y.Compare(x))
		if x.Compare(y) <= 0 && y.Compare(z) <= 0 {
			require.LessOrEqual(t, x.Compare(z), 0)
		}
		require.Equal(t, x.Compare(y), a.dim(up).Compare(b.dim(up)))
	})
}

// Conjunctions stand outermost name first, i before ~i, literal by literal.
func TestCanonicalOrder(t *testing.T) {
	i, j, k := Var(0), Var(1), Var(40)
	for _, want := range [][]Dim{
		{i.Min(j), i.Min(k), i.Rev()},
		{i.Min(i.Rev()), i.Min(j.Rev()), i.Min(k), i.Rev().Min(j)},
		{j, j.Rev(), k, k.Rev()},
	} {
		d := Zero()
		for n := range want {
			d = want[len(want)-1-n].Max(d)
		}
		require.Equal(t, len(want), d.Len())
		for n, conjunction := range want {
			require.Equal(t, conjunction.Conjunction(0), d.Conjunction(n))
		}
	}
}
