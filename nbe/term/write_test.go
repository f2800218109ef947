package term_test

import (
	"errors"
	"fmt"
	"math/big"
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

// resolver reads a written term beside the core term it came from, looking
// names up as a reader of the text would: the latest binding of a name counts.
type resolver struct {
	t     require.TestingT
	words *notation.Words
}

// named is one name in scope; a name that was left out is empty.
type named struct {
	name      string
	dimension bool
	level     int
}

type environment []named

func (e environment) find(name string) (named, bool) {
	for k := len(e) - 1; k >= 0; k-- {
		if e[k].name == name {
			return e[k], true
		}
	}
	return named{}, false
}

func (e environment) bind(name string, dimension bool) environment {
	level := 0
	for _, n := range e {
		if n.dimension == dimension {
			level++
		}
	}
	return append(e[:len(e):len(e)], named{name, dimension, level})
}

func (r resolver) dimension(w *term.Written, e environment) interval.Dim {
	switch {
	case w.Kind == term.NumeralKind && w.Number.Sign() == 0:
		return interval.Zero()
	case w.Kind == term.NumeralKind:
		return interval.One()
	case w.Kind == term.NameKind:
		n, ok := e.find(w.Word)
		require.True(r.t, ok && n.dimension, "%s is no dimension", w)
		return interval.Var(interval.Name(n.level))
	case w.Word == "rev":
		return r.dimension(w.Parts[0].Body, e).Rev()
	}
	out := r.dimension(w.Parts[0].Body, e)
	for _, p := range w.Parts[1:] {
		if w.Word == "min" {
			out = out.Min(r.dimension(p.Body, e))
		} else {
			out = out.Max(r.dimension(p.Body, e))
		}
	}
	return out
}

func (r resolver) face(w *term.Written, e environment) interval.Face {
	switch w.Word {
	case "top":
		return interval.Top()
	case "bot":
		return interval.Bot()
	case "=":
		d := r.dimension(w.Parts[0].Body, e)
		if w.Parts[1].Body.Number.Sign() == 0 {
			return d.Is0()
		}
		return d.Is1()
	}
	out := r.face(w.Parts[0].Body, e)
	for _, p := range w.Parts[1:] {
		if w.Word == "and" {
			out = out.And(r.face(p.Body, e))
		} else {
			out = out.Or(r.face(p.Body, e))
		}
	}
	return out
}

// under resolves a body; dimensions says how many of its names, the last, are dimensions.
func (r resolver) under(b *term.Bound, p term.Part, dimensions int, e environment) {
	for k := range b.Hints {
		name := ""
		if len(p.Binders) > 0 {
			name = p.Binders[k].Name
			assert.True(r.t, term.IsName(name) && !r.words.Taken(name), "%q is no name", name)
		}
		e = e.bind(name, k >= len(b.Hints)-dimensions)
	}
	r.core(b.Body, p.Body, e)
}

func (r resolver) arg(a term.Arg, p term.Part, e environment) {
	switch a := a.(type) {
	case term.Dimension:
		assert.True(r.t, a.Equal(r.dimension(p.Body, e)), "%v is written %s", a.Dim, p.Body)
	case *term.Face:
		assert.True(r.t, a.Equal(r.face(p.Body, e)), "%v is written %s", a.Face, p.Body)
	case *term.Bound:
		r.under(a, p, 1, e)
	case term.Rows:
		require.Len(r.t, p.Rows, len(a))
		for j := range a {
			for k := range a[j] {
				r.arg(a[j][k], p.Rows[j][k], e)
			}
		}
	case term.Core:
		r.core(a, p.Body, e)
	}
}

func (r resolver) global(name string, w *term.Written, e environment) {
	require.Equal(r.t, term.NameKind, w.Kind)
	assert.Equal(r.t, name, w.Word)
	_, captured := e.find(name)
	assert.False(r.t, captured, "%s is captured", name)
}

func (r resolver) args(args []term.Arg, parts []term.Part, e environment) {
	require.Len(r.t, parts, len(args))
	for k, a := range args {
		r.arg(a, parts[k], e)
	}
}

func (r resolver) core(c term.Core, w *term.Written, e environment) {
	switch c := c.(type) {
	case *term.Variable:
		n, ok := e.find(w.Word)
		require.True(r.t, ok && w.Kind == term.NameKind, "%s is not in scope", w)
		assert.Equal(r.t, named{w.Word, false, c.Level}, n)
	case *term.Global:
		r.global(c.Name, w, e)
	case *term.Op:
		r.operator(c, w, e)
	}
}

func (r resolver) operator(c *term.Op, w *term.Written, e environment) {
	switch c.Sig {
	case lamSig:
		r.under(c.Args[0].(*term.Bound), w.Parts[0], 0, e)
	case piSig, sigmaSig:
		r.core(c.Args[0].(term.Core), w.Parts[0].Body, e)
		r.under(c.Args[1].(*term.Bound), w.Parts[1], 0, e)
		assert.Equal(r.t, len(w.Parts[1].Binders) == 1, w.Word == c.Sig.Word)
	case piDimSig:
		assert.Equal(r.t, "I", w.Parts[0].Body.Word)
		r.under(c.Args[0].(*term.Bound), w.Parts[1], 1, e)
	case letSig:
		r.args(c.Args[:2], w.Parts[:2], e)
		r.under(c.Args[2].(*term.Bound), w.Parts[2], 0, e)
	case appSig:
		last := len(w.Parts) - 1
		r.arg(c.Args[1], w.Parts[last], e)
		if last == 1 {
			r.core(c.Args[0].(term.Core), w.Parts[0].Body, e)
		} else {
			rest := *w
			rest.Parts = w.Parts[:last]
			r.core(c.Args[0].(term.Core), &rest, e)
		}
	case dataSig, conSig:
		args := c.Args[1:]
		if c.Sig == conSig {
			args = c.Args[2:]
		}
		if w.Kind == term.ApplyKind {
			r.args(args, w.Parts[1:], e)
			w = w.Parts[0].Body
		} else {
			assert.Empty(r.t, args)
		}
		r.global(c.Args[0].(term.Reference).Name, w, e)
	case numeralSig:
		assert.Equal(r.t, term.NumeralKind, w.Kind)
		assert.Zero(r.t, c.Args[0].(term.Number).Cmp(w.Number))
	case elimSig:
		r.under(c.Args[2].(*term.Bound), w.Parts[0], 0, e)
		r.core(c.Args[3].(term.Core), w.Parts[1].Body, e)
		cases := c.Args[4].(term.Rows)
		require.Len(r.t, w.Parts[2].Rows, len(cases))
		for k, row := range cases {
			reference := row[0].(term.Reference)
			r.global(reference.Name, w.Parts[2].Rows[k][0].Body, e)
			r.under(row[1].(*term.Bound), w.Parts[2].Rows[k][1], reference.Index, e)
		}
	case atSig:
		r.args(c.Args[:2], w.Parts, e)
	default:
		r.args(c.Args, w.Parts, e)
	}
}

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

// scopeOf is the environment of names beside the term c: what each of them is
// called is found out by writing it next to c.
func scopeOf(t require.TestingT, c term.Core, names term.Names) environment {
	e := environment{}
	seen := map[string]bool{}
	add := func(only term.Core, dimension bool, level int) {
		both, err := term.Write(app(global("f"), only, c), names)
		require.NoError(t, err)
		w := both.Parts[1].Body
		if dimension {
			w = w.Parts[1].Body
		}
		require.False(t, seen[w.Word], "two names of the scope are %s", w)
		seen[w.Word] = true
		e = append(e, named{w.Word, dimension, level})
	}
	for k := range names.Variables {
		add(variable(k), false, k)
	}
	for k := range names.Dimensions {
		add(at(global("f"), interval.Var(interval.Name(k))), true, k)
	}
	return e
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

func TestDeepTermsAreWritten(t *testing.T) {
	const n = 100_000
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
