package interval

import (
	"testing"

	"github.com/stretchr/testify/require"
)

// A disjunction of k conjunctions of n names each, all different, has n^k
// conjunctions in its dual: De Morgan's laws, where the dual outgrows the inline
// form and the block on the stack.
func TestDualsOutgrowTheirBlock(t *testing.T) {
	for _, c := range []struct{ conjunctions, names, want int }{{1, 3, 3}, {2, 4, 16}, {3, 3, 27}, {4, 2, 16}, {3, 4, 64}, {4, 3, 81}} {
		d, dual := Zero(), One()
		for k := range c.conjunctions {
			meet, join := One(), Zero()
			for n := range c.names {
				x := Var(Name(k*c.names + n))
				meet, join = meet.Min(x), join.Max(x.Rev())
			}
			d, dual = d.Max(meet), dual.Min(join)
		}
		require.Equal(t, c.want, d.Rev().Len())
		require.True(t, d.Rev().Equal(dual))
		require.True(t, d.Rev().Rev().Equal(d))
		require.Equal(t, c.want, d.Is0().Len())
	}
}
