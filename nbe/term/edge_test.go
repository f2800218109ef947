package term_test

import (
	"math/big"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value/interval"
)

// What stands at the edge of each function here: kinds that there are none of,
// walks that are stopped, terms too deep for the stack, operators of no shape
// that the writer knows.

func TestKindsThatThereAreNoneOfHaveAName(t *testing.T) {
	names := map[string]bool{}
	for k := term.ErrorKind(1); k <= term.Internal; k++ {
		names[k.String()] = true
	}
	assert.Len(t, names, int(term.Internal), "no two kinds have one name")
	for _, k := range []term.ErrorKind{term.Internal + 1, 255} {
		assert.NotEmpty(t, k.String())
		assert.False(t, names[k.String()], "%d", k)
	}
}

func TestAPlaceWithoutALineIsCalledByItsTag(t *testing.T) {
	assert.Contains(t, term.Place{Tag: "crane 7"}.String(), "crane 7")
	assert.Empty(t, term.Place{}.String())
}

// A walk visits each node of a graph once, however often it is shared, and goes
// no further than the visitor wants, whatever kind of node it is at.
func TestWalksStopWhereTheyAreTold(t *testing.T) {
	shared := lam("x", pair(variable(0), global("a")))
	c := op(hcompSig, pair(shared, shared), numeral(3), term.Rows{{face(interval.Top()), body(global("b"), "i")}})
	var all int
	seen := map[term.Arg]int{}
	term.Walk(c, func(a term.Arg) bool {
		all++
		if o, ok := a.(*term.Op); ok {
			seen[o]++
		}
		return true
	})
	for o, n := range seen {
		assert.Equal(t, 1, n, "%v", o)
	}
	require.Greater(t, all, 8)
	for last := 1; last <= all; last++ {
		visited := 0
		term.Walk(c, func(term.Arg) bool { visited++; return visited < last })
		assert.Equal(t, last, visited)
	}
}

// A term of any depth is moved, with everything charged, and a charge that
// panics leaves by the caller's own stack.
func TestDeepTermsAreMoved(t *testing.T) {
	const n = 50_000
	of := func(level int) term.Core {
		return deep(n, func(_ int, c term.Core) term.Core { return pair(c, variable(level)) })
	}
	charged := 0
	move := term.Move{Variables: 1, MoreVariables: 3, Each: func() { charged++ }}
	assert.True(t, term.Same(of(4), move.Apply(of(1))))
	assert.Equal(t, n, charged)
	charged = 0
	move.Each = func() {
		if charged++; charged == n {
			panic("spent")
		}
	}
	assert.PanicsWithValue(t, "spent", func() { move.Apply(of(1)) })
}

func TestSameSeesShapes(t *testing.T) {
	wall := term.Rows{{face(interval.Top()), body(global("a"), "i")}}
	for _, c := range [][2]term.Arg{
		{body(global("a"), "x"), global("a")},                    // under a binder and not
		{wall, term.Rows{{face(interval.Top())}}},                // rows of other lengths
		{wall, term.Rows{{global("a"), body(global("a"), "i")}}}, // other things in a row
		{wall, global("a")}, {face(interval.Top()), global("a")}, // rows, a face, a term
		{term.Level(0), term.Dimension{Dim: interval.Zero()}},        // numbers of different sorts
		{term.Number{Int: big.NewInt(0)}, term.Level(0)},             //
		{term.Reference{Name: "a", Index: -1}, global("a")},          // a declaration and a definition
		{term.Dimension{Dim: interval.Zero()}, face(interval.Bot())}, // an end and a face
	} {
		for _, way := range [][2]term.Arg{c, {c[1], c[0]}} {
			assert.False(t, term.Same(op(crateSig, way[0]), op(crateSig, way[1])), "%v and %v", way[0], way[1])
		}
		assert.True(t, term.Same(op(crateSig, c[0]), op(crateSig, c[0])))
	}
	one := term.Form("lam", term.Under(term.Name("a"), "x"))
	two := term.Form("lam", term.Under(term.Name("a"), "x", "y"))
	assert.False(t, one.Same(two))
	assert.False(t, two.Same(one))
}

// A node that is missing counts nothing, as it is not written.
func TestSizeOfWhatIsMissing(t *testing.T) {
	with, _ := term.Size(op(crateSig, global("a"), nil))
	without, _ := term.Size(op(crateSig, global("a")))
	assert.Zero(t, with.Cmp(without))
}

// An operator that has no word is written by its own name, with each argument
// by its sort.
func TestOperatorsOfOtherShapesAreWritten(t *testing.T) {
	wordless := sig("hoist", "", open, open, term.CoreSlot{Slot: term.Slot{Sort: term.NameSort}})
	w, err := term.Write(op(wordless, global("a"), term.Number{Int: big.NewInt(12)}, term.Reference{Name: "Berth", Index: -1}), term.Names{})
	require.NoError(t, err)
	assert.Equal(t, "(hoist a 12 Berth)", w.String())
}

// A name of a scope that is no name is replaced by one, whatever is left of it
// without its digits.
func TestScopeNamesThatAreNoNames(t *testing.T) {
	for _, bad := range []string{"", "7", "(", "(7", "a b"} {
		w, err := term.Write(variable(0), term.Names{Variables: []string{bad}})
		require.NoError(t, err)
		assert.True(t, term.IsName(w.Word), "%q for %q", w.Word, bad)
	}
}

func TestNumbersTooLongForTheNotationAreCutOff(t *testing.T) {
	long := new(big.Int).Lsh(big.NewInt(1), term.MaxDigits*4)
	text := (&term.Written{Kind: term.NumeralKind, Number: long}).String()
	assert.Less(t, len(text), 100)
	assert.True(t, strings.Contains(text, "…"), text)
}
