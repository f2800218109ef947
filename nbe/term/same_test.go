package term_test

import (
	"math/big"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value/interval"
)

// copyOf copies c node by node, with other hints; change, if not negative,
// counts the nodes down and the one at 0 is made another.
func copyOf(a term.Arg, change *int) term.Arg {
	switch a := a.(type) {
	case *term.Variable:
		*change--
		if *change == -1 {
			return &term.Variable{Level: a.Level + 1}
		}
		return &term.Variable{Level: a.Level}
	case *term.Global:
		*change--
		if *change == -1 {
			return &term.Global{Name: a.Name + "'"}
		}
		return &term.Global{Name: a.Name}
	case *term.Op:
		*change--
		if *change == -1 {
			return op(fstSig, a)
		}
		out := &term.Op{Sig: a.Sig}
		for _, b := range a.Args {
			out.Args = append(out.Args, copyOf(b, change))
		}
		return out
	case *term.Bound:
		out := &term.Bound{Body: copyOf(a.Body, change).(term.Core)}
		for range a.Hints {
			out.Hints = append(out.Hints, "other")
		}
		return out
	case term.Rows:
		out := term.Rows{}
		for _, row := range a {
			copied := []term.Arg{}
			for _, b := range row {
				copied = append(copied, copyOf(b, change))
			}
			out = append(out, copied)
		}
		return out
	case term.Dimension:
		*change--
		if *change == -1 {
			return term.Dimension{Dim: a.Min(interval.Var(70))}
		}
		return term.Dimension{Dim: a.Max(interval.Zero())}
	case *term.Face:
		*change--
		if *change == -1 {
			return face(a.And(interval.Eq1(70)))
		}
		return face(a.Or(interval.Bot()))
	}
	return a
}

func TestSameIgnoresHintsAndAnnotationsAndNothingElse(t *testing.T) {
	for seed := range uint64(300) {
		c := even(seed).core(2, 2, 4)
		nodes := 1 << 30
		d := copyOf(c, &nodes).(term.Core)
		nodes = 1<<30 - nodes
		require.True(t, term.Same(c, c))
		require.True(t, term.Same(c, d) && term.Same(d, c))
		for k := 0; k < nodes; k += 1 + nodes/20 {
			change := k
			e := copyOf(c, &change).(term.Core)
			// 0 and bot do not change when something is put before them.
			if changed(c, e) {
				require.False(t, term.Same(c, e) || term.Same(e, c), "seed %d node %d", seed, k)
			}
		}
	}
}

// changed compares by walking both trees.
func changed(a, b term.Arg) bool {
	switch a := a.(type) {
	case *term.Variable:
		b, ok := b.(*term.Variable)
		return !ok || a.Level != b.Level
	case *term.Global:
		b, ok := b.(*term.Global)
		return !ok || a.Name != b.Name
	case *term.Op:
		b, ok := b.(*term.Op)
		if !ok || a.Sig != b.Sig {
			return true
		}
		for k := range a.Args {
			if !a.Sig.SlotOf(k).Silent && changed(a.Args[k], b.Args[k]) {
				return true
			}
		}
		return false
	case *term.Bound:
		return changed(a.Body, b.(*term.Bound).Body)
	case term.Rows:
		for j, row := range a {
			for k := range row {
				if changed(row[k], b.(term.Rows)[j][k]) {
					return true
				}
			}
		}
	case term.Dimension:
		return !a.Equal(b.(term.Dimension).Dim)
	case *term.Face:
		return !a.Equal(b.(*term.Face).Face)
	}
	return false
}

func TestSameSeesPayloads(t *testing.T) {
	for _, c := range [][2]term.Core{
		{numeral(3), numeral(4)},
		{op(universeSig, term.Level(0)), op(universeSig, term.Level(1))},
		{data("Nat"), data("Bool")},
		{op(dataSig, term.Reference{Name: "c", Index: 0}), op(dataSig, term.Reference{Name: "c", Index: 1})},
		{op(hcompSig, global("A"), global("a"), term.Rows{}), op(hcompSig, global("A"), global("a"), term.Rows{{face(interval.Top()), body(global("a"), "i")}})},
		{data("D", global("a")), data("D", global("a"), global("a"))},
		{lam("x", global("a")), op(lamSig, body(global("a"), "x", "y"))},
		{app(global("f"), global("a")), app(global("f"), term.Dimension{})},
		{global("a"), variable(0)}, {global("a"), nil}, {nil, global("a")}, {op(fstSig, nil), op(fstSig, global("a"))},
	} {
		assert.False(t, term.Same(c[0], c[1]))
	}
	assert.True(t, term.Same(nil, nil))
	assert.True(t, term.Same(numeral(3), numeral(3)))
}

func TestSharedDoublings(t *testing.T) {
	const n = 10_000
	a, b, other := doubling(n, global("a")), doubling(n, global("a")), doubling(n, global("b"))
	assert.True(t, term.Same(a, b))
	assert.False(t, term.Same(a, other))
	tree, nodes := term.Size(a)
	want := new(big.Int).Lsh(big.NewInt(1), n+1)
	want.Sub(want, big.NewInt(1))
	assert.Zero(t, want.Cmp(tree))
	assert.Equal(t, n+1, nodes)

	// The same tree from another graph: each level has two nodes.
	left, right := term.Core(global("a")), term.Core(global("a"))
	for range n {
		left, right = pair(left, right), pair(right, left)
	}
	assert.True(t, term.Same(a, left))
	tree, nodes = term.Size(left)
	assert.Zero(t, want.Cmp(tree))
	assert.Equal(t, 2*n+1, nodes)
}

func TestSizeStopsCountingWhereNumbersGrowLarge(t *testing.T) {
	tree, nodes := term.Size(doubling(200_000, global("a")))
	assert.Zero(t, new(big.Int).Lsh(big.NewInt(1), 1<<14).Cmp(tree))
	assert.Equal(t, 200_001, nodes)
}

func TestDeepTermsAreComparedAndMeasured(t *testing.T) {
	smallStack(t)
	const n = 100_000
	layer := func(_ int, c term.Core) term.Core { return lam("x", pair(c, global("b"))) }
	a, b := deep(n, layer), deep(n, layer)
	assert.True(t, term.Same(a, b))
	assert.False(t, term.Same(a, lam("x", b)))
	tree, nodes := term.Size(a)
	assert.Equal(t, int64(3*n+1), tree.Int64())
	assert.Equal(t, 3*n+1, nodes)
}

func TestSizeCountsTheTree(t *testing.T) {
	for seed := range uint64(200) {
		c := even(seed).core(2, 2, 4)
		var count func(a term.Arg) int64
		count = func(a term.Arg) (n int64) {
			switch a := a.(type) {
			case *term.Variable, *term.Global:
				return 1
			case *term.Op:
				return 1 + count(term.Rows{a.Args})
			case *term.Bound:
				return count(a.Body)
			case term.Rows:
				for _, row := range a {
					for _, b := range row {
						n += count(b)
					}
				}
			case term.Dimension:
				size, _ := term.Size(op(fstSig, a))
				return size.Int64() - 1
			case *term.Face:
				size, _ := term.Size(op(fstSig, a))
				return size.Int64() - 1
			}
			return n
		}
		size, nodes := term.Size(c)
		require.Equal(t, count(c), size.Int64())
		require.LessOrEqual(t, int64(nodes), size.Int64())
	}
	size, nodes := term.Size(nil)
	assert.Zero(t, size.Sign())
	assert.Zero(t, nodes)
}
