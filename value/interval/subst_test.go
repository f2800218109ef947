// Laws of substitutions.

package interval

import (
	"testing"

	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"
)

// nameSets are names that stay in one word, that do not, and both.
var nameSets = [][]Name{{0, 1, 2, 31}, {32, 40, 62, 63, 90}, {0, 31, 32, 64}}

// Substitution is the algebra map that the images of the names determine.
func TestSubstIsAnAlgebraMap(t *testing.T) {
	for _, names := range nameSets {
		rapid.Check(t, func(t *rapid.T) {
			d, e := drawDim(t, names, 4), drawDim(t, names, 4)
			s := drawSubst(t, names, pickFrom(t, nameSets))
			put := d.Subst(s)
			requireForm(t, put.form, false)
			require.True(t, d.Min(e).Subst(s).Equal(put.Min(e.Subst(s))))
			require.True(t, d.Max(e).Subst(s).Equal(put.Max(e.Subst(s))))
			require.True(t, d.Rev().Subst(s).Equal(put.Rev()))
			require.True(t, Zero().Subst(s).IsZero())
			require.True(t, One().Subst(s).IsOne())
			require.True(t, d.Is0().Subst(s).Equal(put.Is0()), "%v", d)
			require.True(t, d.Is1().Subst(s).Equal(put.Is1()), "%v", d)
			for _, n := range names {
				image, ok := s.Lookup(n)
				if !ok {
					image = Var(n)
				}
				require.True(t, Var(n).Subst(s).Equal(image))
				require.True(t, Lit(n, true).Subst(s).Equal(image.Rev()))
			}
			for _, n := range put.Names() {
				require.True(t, s.Image().Has(n) || d.Mentions(n))
			}
		})
	}
}

func TestFaceSubstIsALatticeMap(t *testing.T) {
	for _, names := range nameSets {
		rapid.Check(t, func(t *rapid.T) {
			f, g := drawFace(t, names, 3), drawFace(t, names, 3)
			s := drawSubst(t, names, pickFrom(t, nameSets))
			put := f.Subst(s)
			requireForm(t, put.form, true)
			require.True(t, f.And(g).Subst(s).Equal(put.And(g.Subst(s))))
			require.True(t, f.Or(g).Subst(s).Equal(put.Or(g.Subst(s))))
			require.True(t, Top().Subst(s).IsTop())
			require.True(t, Bot().Subst(s).IsBot())
			for _, n := range names {
				require.True(t, Eq0(n).Subst(s).Equal(Var(n).Subst(s).Is0()))
				require.True(t, Eq1(n).Subst(s).Equal(Var(n).Subst(s).Is1()))
			}
			joined := Bot()
			for k := range f.Len() {
				joined = joined.Or(f.Cube(k).Subst(s))
			}
			require.True(t, joined.Equal(put))
		})
	}
}

// The four-element algebra sees a substitution as a change of the assignment.
func TestSubstAgreesWithTheFourElementAlgebra(t *testing.T) {
	names := []Name{0, 1, 2}
	rapid.Check(t, func(t *rapid.T) {
		e := drawExpr(t, names, 3)
		s := drawSubst(t, names, names)
		put := e.dim(same).Subst(s)
		everywhere(names, 4, func(at func(Name) uint8) bool {
			require.Equal(t, fourOf(put, at), e.four(func(n Name) uint8 {
				if image, ok := s.Lookup(n); ok {
					return fourOf(image, at)
				}
				return at(n)
			}))
			return true
		})
	})
}

func TestCompose(t *testing.T) {
	for _, names := range nameSets {
		rapid.Check(t, func(t *rapid.T) {
			d := drawDim(t, names, 3)
			f := drawFace(t, names, 2)
			s, u := drawSubst(t, names, names), drawSubst(t, names, names)
			both := s.Compose(u)
			require.True(t, d.Subst(both).Equal(d.Subst(s).Subst(u)))
			require.True(t, f.Subst(both).Equal(f.Subst(s).Subst(u)))
			requireSubst(t, both, names, func(n Name) Dim { return Var(n).Subst(s).Subst(u) })
			require.Same(t, s, s.Compose(nil))
			require.Same(t, s, (*Subst)(nil).Compose(s))
		})
	}
}

// requireSubst checks every question about s, given what it does to the names.
func requireSubst(t *rapid.T, s *Subst, names []Name, want func(n Name) Dim) {
	changed, ends := 0, true
	for _, n := range names {
		image, ok := s.Lookup(n)
		require.Equal(t, !want(n).Equal(Var(n)), ok, "%v", n)
		require.True(t, Var(n).Subst(s).Equal(want(n)))
		if !ok {
			require.True(t, n >= 63 || !s.Domain().Has(n))
			continue
		}
		require.True(t, image.Equal(want(n)))
		require.True(t, s.Domain().Has(n))
		require.Zero(t, image.Support()&^s.Image())
		k := changed
		changed++
		require.Less(t, k, s.Len())
		at, dim := s.At(k)
		require.Equal(t, n, at)
		require.True(t, dim.Equal(image))
		ends = ends && image.IsEnd()
	}
	require.Equal(t, changed, s.Len())
	require.Equal(t, changed == 0, s.Domain() == 0)
	require.True(t, changed > 0 || s.Image() == 0)
	require.Equal(t, ends, s.IsEnds())
	require.Equal(t, changed == 0, s == nil, "the identity is nil")
}

func TestMakingSubstitutions(t *testing.T) {
	for _, names := range nameSets {
		rapid.Check(t, func(t *rapid.T) {
			s := drawSubst(t, names, names)
			old := func(n Name) Dim { return Var(n).Subst(s) }
			requireSubst(t, s, names, old)
			n := pickFrom(t, names)
			d := drawDim(t, names, 1)
			at := func(n Name, d Dim, others func(Name) Dim) func(Name) Dim {
				return func(m Name) Dim {
					if m == n {
						return d
					}
					return others(m)
				}
			}
			requireSubst(t, Assign(n, d), names, at(n, d, Var))
			requireSubst(t, s.Extend(n, d), names, at(n, d, old))
			requireSubst(t, s.Without(n), names, at(n, Var(n), old))
			m := pickFrom(t, names)
			requireSubst(t, Rename(n, m), names, at(n, Var(m), Var))
			requireSubst(t, NewSubst([]Name{m, n, m}, []Dim{One(), d, Zero()}), names, at(m, Zero(), at(n, d, Var)))
			sup := Support(0)
			for _, n := range names {
				if pick(t, 2) == 1 {
					sup |= Single(n)
				}
			}
			kept := s.RestrictTo(sup)
			requireSubst(t, kept, names, func(n Name) Dim {
				if sup.Has(n) {
					return old(n)
				}
				return Var(n)
			})
			if kept.Len() == s.Len() {
				require.Same(t, s, kept)
			}
			requireSubst(t, s, names, old)
		})
	}
	require.Same(t, Assign(3, One()), Assign(3, One()), "ends come from a table")
	c, _ := CubeOf(Assignment{3, true})
	require.Same(t, Assign(3, One()), c.Restriction())
}

// skippable is the definition, on exact sets.
func skippable(s *Subst, frontier, faces, sup map[Name]bool) bool {
	image := func(n Name) Dim { return Var(n).Subst(s) }
	for n := range frontier {
		if image(n).IsEnd() {
			return false
		}
	}
	for n := range faces {
		m, _, ok := image(n).Literal()
		if !ok {
			return false
		}
		for other := range sup {
			if other != n && image(other).Mentions(m) {
				return false
			}
		}
	}
	return true
}

func TestSkippable(t *testing.T) {
	answers := map[bool]int{}
	for _, names := range nameSets {
		rapid.Check(t, func(t *rapid.T) {
			into := append([]Name{5, 33, 70}, names...)
			if names[len(names)-1] < 63 {
				into = append([]Name{5}, names...)
			}
			// Mostly renamings, or the answer is always no.
			s := drawSubst(t, names, into)
			for _, n := range names {
				if pick(t, 3) > 0 {
					s = s.Extend(n, Lit(pickFrom(t, into), pick(t, 2) == 1))
				}
			}
			var sets [3]map[Name]bool
			var sups [3]Support
			for k := range sets {
				sets[k] = map[Name]bool{}
				for _, n := range into {
					in := pick(t, 3) == 0
					if in {
						sups[k] |= Single(n)
					}
					// Frontier and faces count as part of the support.
					if in || k == 2 && (sets[0][n] || sets[1][n]) {
						sets[k][n] = true
					}
				}
			}
			want := skippable(s, sets[0], sets[1], sets[2])
			got := s.Skippable(sups[0], sups[1], sups[2])
			if names[len(names)-1] < 63 {
				require.Equal(t, want, got)
			} else if got {
				require.True(t, want, "a wrong yes")
			}
			answers[got]++
		})
	}
	require.Positive(t, answers[true])
	require.Positive(t, answers[false])
	require.True(t, (*Subst)(nil).Skippable(1, 1, 1))
}

// The two composites on which a weaker test goes wrong: a face that a renaming
// makes the same as another dimension, and a face that a connection empties.
func TestSkippableNoticesFaces(t *testing.T) {
	k, l := Name(0), Name(1)
	both := Single(k) | Single(l)
	require.False(t, Rename(k, l).Skippable(0, Single(k), both))
	require.True(t, Rename(k, l).Skippable(0, Single(k), Single(k)))
	require.False(t, Assign(k, Var(2).Min(Lit(2, true))).Skippable(0, Single(k), both))
	require.True(t, NewSubst([]Name{k, l}, []Dim{Var(l), Lit(k, true)}).Skippable(both, both, both))
	require.False(t, Assign(k, One()).Skippable(Single(k), 0, both))
	require.True(t, Assign(k, One()).Skippable(Single(l), 0, both))
}
