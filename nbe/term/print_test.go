package term_test

import (
	"math/big"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
)

// What hosts build has the text the notation gives it, and that text reads
// back as what they built.
func TestBuiltTerms(t *testing.T) {
	n := term.Name
	for _, c := range []struct {
		built *term.Written
		want  string
	}{
		{n("crane"), "crane"},
		{term.Numeral(12), "12"},
		{term.BigNumeral(new(big.Int).Lsh(big.NewInt(1), 70)), "1180591620717411303424"},
		{term.Lam(term.Apply(n("f"), n("x"), n("y")), "x", "y"), "(lam (x y) (f x y))"},
		{term.Pi("x", n("A"), term.Pi("i", term.Interval(), n("B"))), "(Pi ((x A) (i I)) B)"},
		{term.Arrow(n("A"), term.Interval(), n("B")), "(-> A I B)"},
		{term.Arrow(n("A")), "A"},
		{term.Arrow(term.Arrow(n("A"), n("B")), n("C")), "(-> (-> A B) C)"},
		{term.Sigma("x", n("A"), term.Sigma("y", n("B"), n("C"))), "(Sigma ((x A) (y B)) C)"},
		{term.Product(n("A"), n("B"), n("C")), "(* A B C)"},
		{term.Pair(term.Pair(n("a"), n("b")), n("c"), n("d")), "(pair (pair a b) c d)"},
		{term.Fst(term.Snd(n("p"))), "(fst (snd p))"},
		{term.Path(n("A"), n("a"), n("b")), "(Path A a b)"},
		{term.PathOver("i", n("A"), n("a"), n("b")), "(PathOver (i A) a b)"},
		{term.Line(term.At(n("p"), n("i"), term.Rev(n("j"))), "i", "j"), "(line (i j) (at p i (rev j)))"},
		{term.Universe(1), "(U 1)"},
		{term.Pair(term.UnitType(), term.UnitElement()), "(pair Unit unit)"},
		{term.Elim("x", n("Nat"), n("m"), term.Case("zero", n("n")), term.Case("suc", n("h"), "k", "h")), "(elim (x Nat) m (zero n) ((suc k h) h))"},
		{term.Elim("x", n("Nat"), n("m")), "(elim (x Nat) m)"},
		{term.Transp("i", n("A"), term.Bot(), n("a")), "(transp (i A) bot a)"},
		{term.Hcomp(n("A"), n("a"), term.Wall(term.Eq(n("i"), 0), "j", n("b"))), "(hcomp A a ((= i 0) (j) b))"},
		{term.Hcomp(n("A"), n("a")), "(hcomp A a)"},
		{term.Comp("i", n("A"), n("a"), term.Wall(term.Top(), "j", n("b"))), "(comp (i A) a (top (j) b))"},
		{term.Hfill(n("A"), n("a"), n("r"), term.Wall(term.Top(), "j", n("b"))), "(hfill A a r (top (j) b))"},
		{term.Fill("i", n("A"), n("a"), term.Numeral(1)), "(fill (i A) a 1)"},
		{term.Tfill("i", n("A"), term.Top(), n("a"), n("r")), "(tfill (i A) top a r)"},
		{term.Glue(n("A"), term.GlueType(term.Or(term.Eq(n("i"), 0), term.And(term.Eq(n("i"), 1), term.Top())), n("T"), n("e"))), "(Glue A ((or (= i 0) (and (= i 1) top)) T e))"},
		{term.GlueElement(n("a"), term.GluePart(term.Top(), n("t"))), "(glue a (top t))"},
		{term.Unglue(n("b")), "(unglue b)"},
		{term.Equiv(n("A"), n("B")), "(Equiv A B)"},
		{term.Ann(n("t"), n("T")), "(ann t T)"},
		{term.Let("x", n("T"), n("t"), term.Let("y", n("S"), n("x"), n("y"))), "(let ((x T t) (y S x)) y)"},
		{term.At(n("p"), term.Min(n("i"), term.Max(n("j"), n("k")))), "(at p (min i (max j k)))"},
		{term.Apply(term.Apply(n("f"), n("a")), n("b")), "((f a) b)"},
		{term.Apply(n("f")), "f"},
		{term.Form("crate", term.Plain(n("a")), term.Under(n("b"), "i", "j")), "(crate a (i j b))"},
		{term.Form("shelf", term.RowsPart(term.Row{term.Plain(n("a")), term.Under(n("b"), "i", "j")})), "(shelf (a (i j) b))"},
	} {
		assert.Equal(t, c.want, c.built.String())
		words, err := notation.NewWords(
			term.Shape{Word: "crate", Slots: []term.Slot{{}, {Binds: []term.Sort{term.TermSort, term.DimensionSort}}}},
			term.Shape{Word: "shelf", Slots: []term.Slot{{Rows: []term.Slot{{}, {Binds: []term.Sort{term.TermSort, term.TermSort}}}}}},
		)
		require.NoError(t, err)
		back, err := notation.ReadTerm(c.want, "", words)
		require.NoError(t, err)
		assert.True(t, back.Same(c.built), c.want)
	}
}

// A term of the wrong shape has a text too, if only for the error about it.
func TestBadlyBuiltTermsArePrinted(t *testing.T) {
	for _, w := range []*term.Written{
		nil, {}, {Kind: term.NumeralKind}, {Kind: term.ApplyKind}, term.Form("lam", term.Part{}), term.Form("lam", term.Plain(term.Name("x"))),
		term.Form("Pi", term.Plain(nil), term.Under(nil, "x")), term.Form("->", term.Plain(nil), term.Plain(nil)), term.Form("at", term.Plain(nil)),
		term.Elim("x", nil, nil, term.Row{}, term.Row{{}, {}}, term.Row{{Rows: []term.Row{{}}}}), term.Hcomp(nil, nil, nil), {Kind: 9},
		term.Form("let", term.Under(nil, "a"), term.Under(nil, "b"), term.Under(nil, "c")), term.Apply(term.Form("lam"), nil),
		{Kind: term.ApplyKind, Parts: []term.Part{{Rows: []term.Row{nil}}}},
	} {
		assert.NotPanics(t, func() { _ = w.String() })
	}
}

func TestTextIsCutOffAtTheLimit(t *testing.T) {
	for name, double := range map[string]func(w *term.Written) *term.Written{
		"pair": func(w *term.Written) *term.Written { return term.Pair(w, w) },
		"Pi":   func(w *term.Written) *term.Written { return term.Pi("x", w, w) },
		"let":  func(w *term.Written) *term.Written { return term.Let("x", w, w, w) },
		"at":   func(w *term.Written) *term.Written { return term.At(term.Pair(w, w), term.Name("i")) },
		"lam":  func(w *term.Written) *term.Written { return term.Lam(term.Apply(w, w), "x") },
		"elim": func(w *term.Written) *term.Written { return term.Elim("x", w, w, term.Case("c", w)) },
	} {
		w, v := term.Name("a"), term.Name("a")
		for range 10_000 {
			w, v = double(w), double(v)
		}
		text := w.Text(1000)
		assert.Less(t, len(text), 1100, name)
		assert.True(t, strings.HasSuffix(text, "…"))
		_, err := notation.ReadTerm(text, "", nil)
		assert.ErrorIs(t, err, term.Malformed)
		assert.Less(t, len((&term.Error{Kind: term.IllTyped, Want: w, Got: w}).Error()), 1<<18)
		assert.True(t, w.Same(v), name)
	}
}

func TestSameTreesOfWrittenTerms(t *testing.T) {
	n := term.Name
	a := term.Lam(term.Apply(n("f"), term.Numeral(1)), "x")
	assert.True(t, a.Same(a.At(term.Place{Line: 3}).Tagged("tag")))
	for _, b := range []*term.Written{
		nil, n("x"), term.Lam(term.Apply(n("f"), term.Numeral(1)), "y"), term.Lam(term.Apply(n("f"), term.Numeral(2)), "x"),
		term.Lam(term.Apply(n("g"), term.Numeral(1)), "x"), term.Line(term.Apply(n("f"), term.Numeral(1)), "x"),
		term.Lam(term.Apply(n("f"), term.Numeral(1), n("a")), "x"), term.Lam(term.Apply(n("f"), n("a")), "x"),
	} {
		assert.False(t, a.Same(b))
		assert.False(t, b.Same(a))
	}
	wall := func(w *term.Written) *term.Written { return term.Hcomp(n("A"), n("a"), term.Wall(term.Top(), "i", w)) }
	assert.True(t, wall(n("b")).Same(wall(n("b"))))
	assert.False(t, wall(n("b")).Same(wall(n("c"))))
	assert.False(t, wall(n("b")).Same(term.Hcomp(n("A"), n("a"))))
}

func TestNames(t *testing.T) {
	for _, s := range []string{"x", "é", "x'", "-1", "+", "λ", "strict", "formal", "a[b]", "1x", "0x", "�", "a\u200bb"} {
		assert.True(t, term.IsName(s), s)
	}
	for _, s := range []string{"", "0", "12", "007", "a b", "a\tb", "(", "a)", "a;b", `"`, "\xff", "a\xc3", "a\u00a0b", "lam", "I", "=", "def", "point", "path", "composition", "->"} {
		assert.False(t, term.IsName(s), s)
	}
}
