package term_test

import (
	"errors"
	"fmt"
	"math/big"
	"runtime/debug"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value/interval"
)

// The laws of writing: what is written resolves, by the names alone, to the
// levels it came from; it reads back as the same tree; it is short.

func TestWrittenNamesCaptureNothing(t *testing.T) {
	words, err := notation.NewWords(term.Shape{Word: "crate", Slots: []term.Slot{{}, {Binds: oneDim}, {Sort: term.FaceSort}, {Rest: true}}})
	require.NoError(t, err)
	law := func(t require.TestingT, g generator, depth int) {
		names := term.Names{Taken: words.Taken}
		if g.upTo(1) == 1 {
			names.Variables = []string{"x", "y", "x", "x1"}
			names.Dimensions = []string{"i", "y"}
		}
		c := g.core(len(names.Variables), len(names.Dimensions), depth)
		w, err := term.Write(c, names)
		require.NoError(t, err)
		resolver{t, words}.core(c, w, scopeOf(t, c, names))
		back, err := notation.ReadTerm(w.String(), "", words)
		require.NoError(t, err, "%s", w)
		require.True(t, back.Same(w), "%s\n%s", w, back)
	}
	rapid.Check(t, func(t *rapid.T) { law(t, drawn(t), rapid.IntRange(0, 4).Draw(t, "depth")) })
	for seed := range uint64(500) {
		law(t, even(seed), 5)
	}
}

func TestWrittenForms(t *testing.T) {
	i, j, k := interval.Var(0), interval.Var(1), interval.Var(2)
	a, f := global("a"), global("f")
	for _, c := range []struct {
		term term.Core
		want string
	}{
		{lam("x", lam("y", app(f, variable(1), variable(0)))), "(lam (x y) (f y x))"},
		{op(lamDimSig, body(lam("x", app(f, term.Dimension{Dim: i.Rev()})), "i")), "(lam (i x) (f (rev i)))"},
		{pi("x", a, pi("y", a, global("B"))), "(-> a a B)"},
		{pi("x", a, pi("y", a, app(f, variable(0)))), "(Pi ((x a)) (-> a (f x)))"},
		{pi("x", a, pi("y", variable(0), app(f, variable(1)))), "(Pi ((x a) (y x)) (f y))"},
		{op(piDimSig, body(a, "i")), "(-> I a)"},
		{op(piDimSig, body(app(f, term.Dimension{Dim: i}), "i")), "(Pi ((i I)) (f i))"},
		{op(sigmaSig, a, body(op(sigmaSig, a, body(global("B"), "y")), "x")), "(* a a B)"},
		{op(sigmaSig, a, body(app(f, variable(0)), "x")), "(Sigma ((x a)) (f x))"},
		{pair(a, pair(f, a)), "(pair a f a)"},
		{op(pathOverSig, body(a, "i"), a, f), "(Path a a f)"},
		{op(pathOverSig, body(at(a, i), "i"), a, f), "(PathOver (i (at a i)) a f)"},
		{line("i", line("j", at(at(a, i), j))), "(line (i j) (at a i j))"},
		{op(lamDimSig, body(op(lamDimSig, body(op(lamDimSig, body(at(a, i.Min(j.Rev()).Max(k)), "k")), "j")), "i")), "(lam (i j k) (at a (max (min i (rev j)) k)))"},
		{at(a, interval.One()), "(at a 1)"},
		{op(unitSig), "Unit"},
		{op(universeSig, term.Level(3)), "(U 3)"},
		{data("Nat"), "Nat"},
		{data("Sum", a, data("Nat")), "(Sum a Nat)"},
		{con("zero"), "zero"},
		{con("loop", term.Dimension{Dim: interval.Zero()}), "(loop 0)"},
		{app(con("zero"), a), "((zero) a)"},
		{app(data("Nat"), a), "((Nat) a)"},
		{app(con("suc", a), a), "((suc a) a)"},
		{app(op(unitSig), a), "((Unit) a)"},
		{numeral(7), "7"},
		{lam("n", op(elimSig, term.Reference{}, term.Rows{}, body(data("Nat"), "x"), variable(0), term.Rows{
			{term.Reference{Name: "zero", Target: berths{}}, body(numeral(2))},
			{term.Reference{Name: "suc", Target: berths{}}, body(con("suc", variable(2)), "k", "h")},
		})), "(lam (n) (elim (x Nat) n (zero 2) ((suc k h) (suc h))))"},
		{op(elimSig, term.Reference{}, term.Rows{}, body(data("Circle"), "x"), a, term.Rows{
			{term.Reference{Name: "loop", Index: 1, Target: berths{}}, body(con("loop", term.Dimension{Dim: i}), "i")},
		}), "(elim (x Circle) a ((loop i) (loop i)))"},
		{line("i", op(transpSig, body(at(a, j), "j"), face(i.Is0()), f)), "(line (i) (transp (j (at a j)) (= i 0) f))"},
		{line("i", line("j", op(hcompSig, a, f, term.Rows{
			{face(i.Is0().And(j.Is1()).Or(i.Is1())), body(at(f, k), "k")}, {face(interval.Bot()), body(a, "l")}, {face(interval.Top()), body(a, "")},
		}))), "(line (i j) (hcomp a f ((or (and (= i 0) (= j 1)) (= i 1)) (k) (at f k)) (bot (l) a) (top (_) a)))"},
		{op(glueTypeSig, a, term.Rows{{face(interval.Top()), f, a}}), "(Glue a (top f a))"},
		{op(unglueSig, a, term.Rows{{f}}, f), "(unglue a)"},
		{op(letSig, a, f, body(op(letSig, variable(0), a, body(variable(1), "y")), "x")), "(let ((x a f) (y x a)) y)"},
		{op(crateSig, a, body(at(f, i), "i"), face(interval.Top()), a, f), "(crate a (i (at f i)) top a f)"},
	} {
		w, err := term.Write(c.term, term.Names{})
		require.NoError(t, err)
		assert.Equal(t, c.want, w.String())
	}
}

func TestHintsStayWhereNothingIsCaptured(t *testing.T) {
	use := func(levels ...int) term.Core {
		c := global("f")
		for _, l := range levels {
			c = app(c, variable(l))
		}
		return c
	}
	for _, c := range []struct {
		term term.Core
		want string
	}{
		{lam("x", lam("x", use(1))), "(lam (x x) (f x))"},
		{lam("x", lam("x", use(0))), "(lam (x x1) (f x))"},
		{lam("x", lam("x", use(0, 1))), "(lam (x x1) (f x x1))"},
		{lam("x", lam("x", lam("x", use(0, 1, 2)))), "(lam (x x1 x2) (f x x1 x2))"},
		{lam("x", lam("x1", lam("x", use(0, 1, 2)))), "(lam (x x1 x2) (f x x1 x2))"},
		{lam("x", app(lam("x", use(1)), lam("x", use(0)))), "(lam (x) ((lam (x) (f x)) (lam (x1) (f x))))"},
		{lam("f", use(0)), "(lam (f1) (f f1))"},
		{lam("f", global("g")), "(lam (f) g)"},
		{lam("_", global("g")), "(lam (_) g)"},
		{lam("", lam("", use(1))), "(lam (_ x) (f x))"},
		{lam("_", lam("_", lam("_", lam("_", use(0, 1, 2, 3))))), "(lam (x y z x1) (f x y z x1))"},
		{lam("lam", use(0)), "(lam (lam1) (f lam1))"},
		{lam("def", use(0)), "(lam (def1) (f def1))"},
		{lam("strict", use(0)), "(lam (strict) (f strict))"},
		{lam("a b", use(0)), "(lam (x) (f x))"},
		{lam("12", use(0)), "(lam (x) (f x))"},
		{lam("\xff", use(0)), "(lam (x) (f x))"},
		{lam("x9", lam("x9", use(0, 1))), "(lam (x9 x1) (f x9 x1))"},
		{line("", line("i", at(at(global("p"), interval.Var(0)), interval.Var(1)))), "(line (i i1) (at p i i1))"},
		{line("", at(global("p"), interval.Var(0))), "(line (i) (at p i))"},
		{pi("x", global("A"), pi("x", use(0), use(0))), "(Pi ((x A)) (-> (f x) (f x)))"},
		{lam("zero", pair(con("zero"), variable(0))), "(lam (zero1) (pair zero zero1))"},
		{lam("x", line("x", pair(variable(0), at(global("p"), interval.Var(0))))), "(lam (x) (line (x1) (pair x (at p x1))))"},
		{op(elimSig, term.Reference{}, term.Rows{}, body(global("N"), "_"), global("n"), term.Rows{
			{term.Reference{Name: "suc", Target: berths{}}, body(global("n"), "k", "k")},
			{term.Reference{Name: "suc", Target: berths{}}, body(global("n"), "_", "_")},
			{term.Reference{Name: "suc", Target: berths{}}, body(use(1), "_", "_")},
		}), "(elim (_ N) n ((suc k k1) n) ((suc _ _) n) ((suc _ x) (f x)))"},
	} {
		w, err := term.Write(c.term, term.Names{})
		require.NoError(t, err)
		assert.Equal(t, c.want, w.String())
	}
}

func TestScopeNamesAreTold(t *testing.T) {
	names := term.Names{Variables: []string{"x", "y", "x", "def", "g"}, Dimensions: []string{"i", "y"}}
	w, err := term.Write(app(global("g"), variable(0), variable(1), variable(2), variable(3), variable(4), term.Dimension{Dim: interval.Var(0)}, term.Dimension{Dim: interval.Var(1)}), names)
	require.NoError(t, err)
	assert.Equal(t, "(g x1 y1 x def1 g1 i y)", w.String())
	w, err = term.Write(lam("y", app(variable(2), variable(5), term.Dimension{Dim: interval.Var(1)})), names)
	require.NoError(t, err)
	assert.Equal(t, "(lam (y2) (x y2 y))", w.String())
}

func TestWriteRefusesWhatIsOutOfScope(t *testing.T) {
	for _, c := range []term.Core{variable(0), variable(-1), lam("x", variable(1)), at(global("p"), interval.Var(0)), op(transpSig, body(global("A"), "i"), face(interval.Eq0(0)), global("a"))} {
		_, err := term.Write(c, term.Names{})
		assert.ErrorIs(t, err, term.WrongScope)
	}
}

func TestWriteRefusesBadOperators(t *testing.T) {
	for _, c := range []term.Core{
		nil, op(nil), op(appSig), op(lamSig, global("x")), op(lamSig, body(nil, "x")), op(conSig, global("c"), term.Rows{}), op(numeralSig, term.Number{}),
		op(elimSig, term.Reference{}, term.Rows{}, body(global("a"), "x"), global("a"), term.Rows{{global("c")}}), op(unitSig, global("a")), op(dataSig, global("D")),
		op(fstSig, nil), op(hcompSig, global("A"), global("a"), term.Rows{{face(interval.Top()), body(global("a"), "i"), global("b")}}),
		op(appSig, term.Level(1), global("a")), op(elimSig, term.Reference{}, term.Rows{}, body(global("a"), "x"), global("a"), global("b")),
	} {
		_, err := term.Write(c, term.Names{})
		assert.ErrorIs(t, err, term.Internal)
	}
}

// doubling is a graph of n+1 nodes, a tree of 2^(n+1)-1.
func doubling(n int, leaf term.Core) term.Core {
	c := leaf
	for range n {
		c = pair(c, c)
	}
	return c
}

func TestWriteSaysHowLargeTheTreeIs(t *testing.T) {
	for _, n := range []int{10, 70, 300, 20000} {
		c := doubling(n, global("a"))
		_, err := term.Write(c, term.Names{Size: 1000})
		require.ErrorIs(t, err, term.OutOfBudget)
		var e *term.Error
		require.True(t, errors.As(err, &e))
		want := new(big.Int).Lsh(big.NewInt(1), uint(min(n+1, 1<<14)))
		if n < 1<<14 {
			want.Sub(want, big.NewInt(1))
		}
		assert.Zero(t, want.Cmp(e.Detail.(*big.Int)), "%d", n)
		assert.Less(t, len(err.Error()), 200)
	}
	// The limit is exact: 2^(8+1)-1 nodes fit into as many, and not into one less.
	_, err := term.Write(doubling(8, global("a")), term.Names{Size: 511})
	assert.NoError(t, err)
	_, err = term.Write(doubling(8, global("a")), term.Names{Size: 510})
	assert.ErrorIs(t, err, term.OutOfBudget)
}

func TestWriteLimitCountsWhatIsWritten(t *testing.T) {
	for seed := range uint64(200) {
		c := even(seed).core(0, 0, 4)
		size, _ := term.Size(c)
		_, err := term.Write(c, term.Names{Size: int(size.Int64())})
		assert.NoError(t, err)
		if size.Int64() == 1 {
			continue
		}
		_, err = term.Write(c, term.Names{Size: 1})
		var e *term.Error
		if !errors.As(err, &e) {
			continue // all but one node is silent
		}
		written := int(e.Detail.(*big.Int).Int64())
		assert.LessOrEqual(t, written, int(size.Int64()))
		_, err = term.Write(c, term.Names{Size: written})
		assert.NoError(t, err)
		_, err = term.Write(c, term.Names{Size: written - 1})
		assert.ErrorIs(t, err, term.OutOfBudget)
	}
}

// deep is a nest of n layers around a global.
func deep(n int, layer func(level int, c term.Core) term.Core) term.Core {
	c := global("a")
	for k := n - 1; k >= 0; k-- {
		c = layer(k, c)
	}
	return c
}

// smallStack makes a stack of more than a megabyte fatal while a test runs, so
// that nesting which costs stack is found without nesting very deep.
func smallStack(t *testing.T) {
	old := debug.SetMaxStack(1 << 20)
	t.Cleanup(func() { debug.SetMaxStack(old) })
}

func TestDeepTermsAreWritten(t *testing.T) {
	smallStack(t)
	const n = 20_000
	for name, layer := range map[string]func(int, term.Core) term.Core{
		"pairs to the right": func(_ int, c term.Core) term.Core { return pair(global("a"), c) },
		"pairs to the left":  func(_ int, c term.Core) term.Core { return pair(c, global("a")) },
		"spine":              func(_ int, c term.Core) term.Core { return app(c, global("a")) },
		"arguments":          func(_ int, c term.Core) term.Core { return app(global("f"), c) },
		"constructors":       func(_ int, c term.Core) term.Core { return con("suc", c) },
		"unused names":       func(_ int, c term.Core) term.Core { return lam("x", c) },
		"blank names":        func(_ int, c term.Core) term.Core { return lam("", c) },
		"used names":         func(k int, c term.Core) term.Core { return lam("x", pair(variable(k), c)) },
		"used blank names":   func(k int, c term.Core) term.Core { return lam("", pair(variable(k), c)) },
		"functions":          func(k int, c term.Core) term.Core { return pi("x", global("A"), c) },
		"lines":              func(k int, c term.Core) term.Core { return line("i", at(c, interval.Var(interval.Name(k)))) },
		"walls": func(_ int, c term.Core) term.Core {
			return op(hcompSig, global("A"), global("a"), term.Rows{{face(interval.Top()), body(c, "i")}})
		},
		"lets": func(_ int, c term.Core) term.Core { return op(letSig, global("A"), global("a"), body(c, "x")) },
	} {
		t.Run(name, func(t *testing.T) {
			w, err := term.Write(deep(n, layer), term.Names{})
			require.NoError(t, err)
			back, err := notation.ReadTerm(w.String(), "", nil)
			require.NoError(t, err)
			assert.True(t, back.Same(w))
		})
	}
}

func TestDeepNamesAreAllDifferent(t *testing.T) {
	// Every name is used innermost, so that no two may be the same.
	const n = 20_000
	c := global("f")
	for k := range n {
		c = app(c, variable(k))
	}
	for k := n - 1; k >= 0; k-- {
		c = lam([]string{"x", "", "x7"}[k%3], c)
	}
	w, err := term.Write(c, term.Names{})
	require.NoError(t, err)
	seen := map[string]int{}
	for w.Word == "lam" {
		seen[w.Parts[0].Binders[0].Name] = len(seen)
		w = w.Parts[0].Body
	}
	require.Len(t, seen, n)
	for k, p := range w.Parts[1:] {
		require.Equal(t, k, seen[p.Body.Word], fmt.Sprint(k))
	}
}
