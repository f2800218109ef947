// Counting: the sizes of free algebras, which a wrong normal form would miss.

package interval

import (
	"slices"
	"testing"

	"github.com/stretchr/testify/require"
)

// closure returns all elements that the generators make under the operations,
// one operand of the binary ones always being a generator.
func closure[T any](generators []T, compare func(a, b T) int, unary func(T) T, binary ...func(a, b T) T) []T {
	var found []T
	var queue []T
	add := func(x T) {
		if k, ok := slices.BinarySearchFunc(found, x, compare); !ok {
			found = slices.Insert(found, k, x)
			queue = append(queue, x)
		}
	}
	for _, g := range generators {
		add(g)
	}
	for len(queue) > 0 {
		x := queue[len(queue)-1]
		queue = queue[:len(queue)-1]
		if unary != nil {
			add(unary(x))
		}
		for _, g := range generators {
			for _, op := range binary {
				add(op(x, g))
			}
		}
	}
	return found
}

// algebra returns the De Morgan algebra that the generators make.
func algebra(generators []Dim) []Dim {
	for {
		all := closure(generators, Dim.Compare, Dim.Rev, Dim.Min, Dim.Max)
		if len(all) == len(generators) {
			return all
		}
		generators = all
	}
}

// The free De Morgan algebra on n generators has M(2n) elements, M the Dedekind
// numbers: 2, 3, 6, 20, 168, 7581, 7828354 (OEIS A000372).
func TestDimensionCounts(t *testing.T) {
	for n, want := range []int{2, 6, 168} {
		generators := []Dim{Zero(), One()}
		for k := range n {
			generators = append(generators, Var(Name(k)))
		}
		require.Len(t, algebra(generators), want, "%d dimensions", n)
	}
}

// Every element over literals x, ... is g or (x and h) for exactly one pair
// g <= h of elements without x, so M(6) is the number of comparable pairs among
// the M(5) elements on the five other literals.
func TestThreeDimensionsByComparablePairs(t *testing.T) {
	if testing.Short() {
		t.Skip("57 million comparisons")
	}
	cubes := []Dim{One()}
	for _, l := range []Dim{Var(0), Lit(0, true), Var(1), Lit(1, true), Var(2)} {
		for _, c := range slices.Clone(cubes) {
			cubes = append(cubes, c.Min(l))
		}
	}
	all := closure(append(cubes, Zero()), Dim.Compare, nil, Dim.Max)
	require.Len(t, all, 7581)
	pairs := 0
	for _, g := range all {
		for _, h := range all {
			if g.AtMost(h) {
				pairs++
			}
		}
	}
	require.Equal(t, 7828354, pairs)
}

// bruteFaces counts the face lattice on n dimensions as the sets of partial
// assignments that are closed under assigning more.
func bruteFaces(n int) int {
	cubes := 1
	for range n {
		cubes *= 3
	}
	above := make([]uint32, cubes) // the cubes that assign more
	for a := range cubes {
		for b := range cubes {
			more := true
			for x, y, k := a, b, 0; k < n; x, y, k = x/3, y/3, k+1 {
				more = more && (x%3 == 0 || x%3 == y%3)
			}
			if more {
				above[a] |= 1 << b
			}
		}
	}
	count := 0
	for set := range 1 << cubes {
		closed := true
		for a := range cubes {
			if set>>a&1 == 1 && uint32(set)&above[a] != above[a] {
				closed = false
				break
			}
		}
		if closed {
			count++
		}
	}
	return count
}

// allFaces returns the face lattice on n dimensions.
func allFaces(n int) []Face {
	cubes := []Face{Top()}
	for k := range n {
		for _, c := range slices.Clone(cubes) {
			cubes = append(cubes, c.And(Eq0(Name(k))), c.And(Eq1(Name(k))))
		}
	}
	return closure(append(cubes, Bot()), Face.Compare, nil, Face.Or)
}

// A face f on n+1 dimensions is what it is at i=0, at i=1, and without i, where
// the third entails the other two; so each count is the sum of the squares of
// the numbers of elements above, over the lattice before.
func TestFaceCounts(t *testing.T) {
	lattice := allFaces(0)
	require.Len(t, lattice, 2)
	for n := 1; n <= 3; n++ {
		squares := 0
		for _, f := range lattice {
			above := 0
			for _, g := range lattice {
				if f.Entails(g) {
					above++
				}
			}
			squares += above * above
		}
		lattice = allFaces(n)
		require.Len(t, lattice, squares, "%d dimensions", n)
		if n <= 2 {
			require.Len(t, lattice, bruteFaces(n), "%d dimensions", n)
		}
	}
	for _, f := range allFaces(2) {
		for _, g := range allFaces(2) {
			require.Contains(t, allFaces(2), f.And(g))
		}
	}
}
