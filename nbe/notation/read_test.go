package notation_test

import (
	"errors"
	"runtime/debug"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
)

// What the reader makes of texts: the tree of each form, and what it refuses,
// with the exact place.

func TestMalformedTerms(t *testing.T) {
	words := hostWords(t)
	for _, c := range []struct {
		text         string
		line, column int
		want, got    string
	}{
		{"", 1, 1, "a term", "the end of the text"},
		{" ; only a comment", 1, 18, "a term", "the end of the text"},
		{"()", 1, 1, "a term", "()"},
		{"(f ())", 1, 4, "a term or a dimension", "()"},
		{"(f (g x)", 1, 1, ")", "the end of the text"},
		{"(f (g x", 1, 4, ")", "the end of the text"},
		{"(f x))", 1, 6, "a form", ")"},
		{")", 1, 1, "a form", ")"},
		{"x y", 1, 3, "the end of the text", "y"},
		{"x\n  (y)", 2, 3, "the end of the text", "(y)"},
		{"007", 1, 1, "a numeral without leading zeros", "007"},
		{"(f 00)", 1, 4, "a numeral without leading zeros", "00"},
		{"\"x\"", 1, 1, "a term", `"x"`},
		{"(f \"x)", 1, 4, `"`, "the end of the text"},
		{"(f \"x\n\")", 1, 4, `"`, "the end of the line"},
		{"(é \xff)", 1, 4, "a character in UTF-8", "the byte 0xFF"},
		{"x ; \xc3\n", 1, 5, "a character in UTF-8", "the byte 0xC3"},
		{"(f \"\xe2\x82\")", 1, 5, "a character in UTF-8", "the byte 0xE2"},
		{"ab\xed\xa0\x80", 1, 3, "a character in UTF-8", "the byte 0xED"},
		{"lam", 1, 1, "(lam (x y …) t)", "lam"},
		{"(lam x x)", 1, 6, "a list of names", "x"},
		{"(lam () x)", 1, 6, "a list of names", "()"},
		{"(lam (x))", 1, 1, "(lam (x y …) t)", "(lam (x))"},
		{"(lam (x) y z)", 1, 1, "(lam (x y …) t)", "(lam (x) y z)"},
		{"(lam (x min) x)", 1, 9, "a name", "min"},
		{"(lam (x 3) x)", 1, 9, "a name", "3"},
		{"(lam (x (y)) x)", 1, 9, "a name", "(y)"},
		{"(lam (def) x)", 1, 7, "a name", "def"},
		{"(line (crate) x)", 1, 8, "a name", "crate"},
		{"(Pi () B)", 1, 5, "a list of (x A)", "()"},
		{"(Pi ((x)) B)", 1, 6, "(x A)", "(x)"},
		{"(Pi (x A) B)", 1, 6, "(x A)", "x"},
		{"(Pi ((x A)))", 1, 1, "(Pi ((x A) (y B) …) C)", "(Pi ((x A)))"},
		{"(Pi ((I A)) B)", 1, 7, "a name", "I"},
		{"(Pi ((x (I))) B)", 1, 9, "I", "(I)"},
		{"(Pi ((x A)) I)", 1, 13, "a term", "I"},
		{"(Sigma ((x I)) B)", 1, 12, "a term", "I"},
		{"(-> A I)", 1, 7, "a term", "I"},
		{"(-> A)", 1, 1, "(-> A B … C)", "(-> A)"},
		{"(->)", 1, 1, "(-> A B … C)", "(->)"},
		{"(* I A)", 1, 4, "a term", "I"},
		{"(* A)", 1, 1, "(* A B … C)", "(* A)"},
		{"(pair a)", 1, 1, "(pair a b … c)", "(pair a)"},
		{"(f I)", 1, 4, "a term or a dimension", "I"},
		{"I", 1, 1, "a term", "I"},
		{"(fst)", 1, 1, "(fst a)", "(fst)"},
		{"(fst p q)", 1, 1, "(fst a)", "(fst p q)"},
		{"(Path A a)", 1, 1, "(Path a b c)", "(Path A a)"},
		{"(PathOver A a b)", 1, 11, "(i A)", "A"},
		{"(PathOver (i j A) a b)", 1, 11, "(i A)", "(i j A)"},
		{"(at p)", 1, 1, "(at p r s …)", "(at p)"},
		{"(at p 2)", 1, 7, "a dimension", "2"},
		{"(at p (f i))", 1, 7, "a dimension", "(f i)"},
		{"(at p (min))", 1, 7, "(min r …)", "(min)"},
		{"(at p (rev i j))", 1, 7, "(rev r)", "(rev i j)"},
		{"(at p (min i (= j 0)))", 1, 14, "a dimension", "(= j 0)"},
		{"(at (min i j) 0)", 1, 5, "a term", "(min i j)"},
		{"(at p top)", 1, 7, "a dimension", "top"},
		{"(top)", 1, 1, "a term", "(top)"},
		{"(U x)", 1, 4, "a level", "x"},
		{"(U (f))", 1, 4, "a level", "(f)"},
		{"(U 01)", 1, 4, "a numeral without leading zeros", "01"},
		{"(Unit x)", 1, 1, "Unit", "(Unit x)"},
		{"(elim (x C))", 1, 1, "(elim (x C) t CASE …)", "(elim (x C))"},
		{"(elim C t)", 1, 7, "(x A)", "C"},
		{"(elim (x C) t zero)", 1, 15, "(c t) or ((c x …) t)", "zero"},
		{"(elim (x C) t (zero))", 1, 15, "(c t) or ((c x …) t)", "(zero)"},
		{"(elim (x C) t (((c)) t))", 1, 17, "a constructor's name", "(c)"},
		{"(elim (x C) t ((c 1) t))", 1, 19, "a name", "1"},
		{"(elim (x C) t (7 t))", 1, 16, "a name", "7"},
		{"(elim (x C) t (fst t))", 1, 16, "a name", "fst"},
		{"(transp (i A) phi a)", 1, 15, "a face", "phi"},
		{"(transp (i A) 1 a)", 1, 15, "a face", "1"},
		{"(transp (i A) (= i 2) a)", 1, 20, "0 or 1", "2"},
		{"(transp (i A) (= i j) a)", 1, 20, "0 or 1", "j"},
		{"(transp (i A) (= i (rev j)) a)", 1, 20, "0 or 1", "(rev j)"},
		{"(transp (i A) (= i) a)", 1, 15, "(= r 0) or (= r 1)", "(= i)"},
		{"(transp (i A) (and) a)", 1, 15, "(and φ …)", "(and)"},
		{"(transp (i A) (or top i) a)", 1, 23, "a face", "i"},
		{"(transp (i A) (f i) a)", 1, 15, "a face", "(f i)"},
		{"(hcomp A a (top b))", 1, 12, "(φ (i) t)", "(top b)"},
		{"(hcomp A a (top () b))", 1, 17, "(i)", "()"},
		{"(hcomp A a (top i b))", 1, 17, "(i)", "i"},
		{"(hcomp A a (top (i j) b))", 1, 17, "(i)", "(i j)"},
		{"(hcomp A a top)", 1, 12, "(φ (i) t)", "top"},
		{"(hcomp A)", 1, 1, "(hcomp a b (φ (i) t) …)", "(hcomp A)"},
		{"(Glue A (top T))", 1, 9, "(φ a b)", "(top T)"},
		{"(glue a (top T e))", 1, 9, "(φ a)", "(top T e)"},
		{"(let ((x T)) u)", 1, 7, "(x T t)", "(x T)"},
		{"(let () u)", 1, 6, "a list of (x T t)", "()"},
		{"(let ((x I t)) u)", 1, 10, "a term", "I"},
		{"(def x T t)", 1, 1, "a term", "(def x T t)"},
		{"(f point)", 1, 4, "a term or a dimension", "point"},
		{"((f))", 1, 1, "a term", "((f))"},
		{"(3)", 1, 1, "a term", "(3)"},
		{"((min i) x)", 1, 2, "a term", "(min i)"},
		{"(mark x)", 1, 1, "mark", "(mark x)"},
		{"(crate a (x i b) top)", 1, 1, "(crate a (x i A) φ r …)", "(crate a (x i b) top)"},
		{"(crate a (x b) top 0)", 1, 10, "(x i A)", "(x b)"},
		{"(crate a (x i b) top 0 1 2)", 1, 26, "a dimension", "2"},
		{"(stack 1 (c (x) t u))", 1, 13, "(x y)", "(x)"},
		{"(stack 1 (c (x y) t))", 1, 10, "(NAME (x y) t a …)", "(c (x y) t)"},
		// The first in the text counts, and the smallest form at fault.
		{"(pair (fst a b) (at p 2))", 1, 7, "(fst a)", "(fst a b)"},
		{"(pair (fst (at p 2)) (snd))", 1, 18, "a dimension", "2"},
		{"(fst (at p 2)\n (snd))", 1, 1, "(fst a)", "(fst (at p 2) (snd))"},
		{"(f (at p 3)))", 1, 10, "a dimension", "3"},
		// Columns count characters, lines end with either line end.
		{"(pair λ é\t荷 (fst))", 1, 13, "(fst a)", "(fst)"},
		{"(pair a\r\n\r\n  b (fst))", 3, 5, "(fst a)", "(fst)"},
		{"(pair a ; ( comment\n b (fst))", 2, 4, "(fst a)", "(fst)"},
		{"\u00a0\u2003(fst)", 1, 3, "(fst a)", "(fst)"},
	} {
		_, err := notation.ReadTerm(c.text, "f", words)
		var e *term.Error
		if assert.True(t, errors.As(err, &e), "%q", c.text) {
			assert.Equal(t, term.Malformed, e.Kind, "%q", c.text)
			assert.Equal(t, term.Place{File: "f", Line: c.line, Column: c.column}, e.Place, "%q", c.text)
			assert.Equal(t, c.want, e.WantText, "%q", c.text)
			assert.Equal(t, c.got, e.GotText, "%q", c.text)
		}
	}
}

func TestMalformedScripts(t *testing.T) {
	for _, c := range []struct {
		text         string
		line, column int
		want, got    string
	}{
		{"(def x T t)\nx", 2, 1, "a form of a script", "x"},
		{"(f x)", 1, 1, "a form of a script", "(f x)"},
		{"()", 1, 1, "a form of a script", "()"},
		{"\"x\"", 1, 1, "a form of a script", `"x"`},
		{"(point c ())", 1, 1, "a form of a script", "(point c ())"},
		{"(lam (x) x)", 1, 1, "a form of a script", "(lam (x) x)"},
		{"(def x T)", 1, 1, "(def NAME T t)", "(def x T)"},
		{"(def x T t u)", 1, 1, "(def NAME T t)", "(def x T t u)"},
		{"(def 3 T t)", 1, 6, "a name", "3"},
		{"(def fst T t)", 1, 6, "a name", "fst"},
		{"(def (x) T t)", 1, 6, "a name", "(x)"},
		{"(def \"x\" T t)", 1, 6, "a name", `"x"`},
		{"(def x I t)", 1, 8, "a term", "I"},
		{"(assume x)", 1, 1, "(assume NAME T)", "(assume x)"},
		{"(same T a)", 1, 1, "(same T a b)", "(same T a)"},
		{"(differ T a b c)", 1, 1, "(differ T a b)", "(differ T a b c)"},
		{"(normal t)", 1, 1, "(normal t n)", "(normal t)"},
		{"(show)", 1, 1, "(show t)", "(show)"},
		{"(show a b)", 1, 1, "(show t)", "(show a b)"},
		{"(blocked)", 1, 1, "(blocked t)", "(blocked)"},
		{"(reject)", 1, 1, "(reject FORM)", "(reject)"},
		{"(reject x)", 1, 9, "a form of a script", "x"},
		{"(reject (show))", 1, 9, "(show t)", "(show)"},
		{"(reject (reject (show (fst))))", 1, 23, "(fst a)", "(fst)"},
		{"(load x)", 1, 7, "a file's path in double quotes", "x"},
		{"(load \"x\" \"y\")", 1, 1, `(load "FILE")`, `(load "x" "y")`},
		{"(load \"x\")\n(load \"x)", 2, 7, `"`, "the end of the text"},
		{"(show \"x\")", 1, 7, "a term", `"x"`},
		{"(data D)", 1, 1, "(data NAME (PARAM …) CLAUSE …)", "(data D)"},
		{"(data D x)", 1, 9, "a list of (x A)", "x"},
		{"(data D (x))", 1, 10, "(x A)", "x"},
		{"(data D ((x)))", 1, 10, "(x A)", "(x)"},
		{"(data D ((x I)))", 1, 13, "a term", "I"},
		{"(data max ())", 1, 7, "a name", "max"},
		{"(data D () c)", 1, 12, "a point or a path clause", "c"},
		{"(data D () (c ()))", 1, 12, "a point or a path clause", "(c ())"},
		{"(data D () (point c))", 1, 12, "(point c ((x T) …))", "(point c)"},
		{"(data D () (point c () (i)))", 1, 12, "(point c ((x T) …))", "(point c () (i))"},
		{"(data D () (point 0 ()))", 1, 19, "a name", "0"},
		{"(data D () (path c ()))", 1, 12, "(path c ((x T) …) (i …) (φ e) …)", "(path c ())"},
		{"(data D () (path c () ()))", 1, 23, "a list of dimensions", "()"},
		{"(data D () (path c () i))", 1, 23, "a list of dimensions", "i"},
		{"(data D () (path c () (i) top))", 1, 27, "(φ e)", "top"},
		{"(data D () (path c () (i) (top e f)))", 1, 27, "(φ e)", "(top e f)"},
		{"(data D () (path c () (i) (i e)))", 1, 28, "a face", "i"},
		{"(data D () (composition loose))", 1, 12, "(composition strict) or (composition formal)", "(composition loose)"},
		{"(data D () (composition))", 1, 12, "(composition strict) or (composition formal)", "(composition)"},
		{"(data D () (point c ()) (composition strict))", 1, 25, "a point or a path clause", "(composition strict)"},
		{"(show x)\n(show (fst))\n)", 2, 7, "(fst a)", "(fst)"},
		{"(show x)\n\xff(show (fst))", 2, 1, "a character in UTF-8", "the byte 0xFF"},
		{"(show x", 1, 1, ")", "the end of the text"},
	} {
		forms, err := notation.ReadScript([]byte(c.text), "s.sexp", nil)
		assert.Empty(t, forms)
		var e *term.Error
		if assert.True(t, errors.As(err, &e), "%q", c.text) {
			assert.Equal(t, term.Malformed, e.Kind, "%q", c.text)
			assert.Equal(t, term.Place{File: "s.sexp", Line: c.line, Column: c.column}, e.Place, "%q", c.text)
			assert.Equal(t, c.want, e.WantText, "%q", c.text)
			assert.Equal(t, c.got, e.GotText, "%q", c.text)
		}
	}
}

func TestTheTreesOfTexts(t *testing.T) {
	n := term.Name
	lone := func(s string) *term.Written {
		return &term.Written{Kind: term.ApplyKind, Parts: []term.Part{{Body: n(s)}}}
	}
	for text, want := range map[string]*term.Written{
		"(Unit)":                         term.UnitType(),
		"(unit)":                         term.UnitElement(),
		"(zero)":                         lone("zero"),
		"(f (zero))":                     term.Apply(n("f"), lone("zero")),
		"((Unit) x)":                     term.Apply(term.UnitType(), n("x")),
		"(f 0 (min i 1))":                term.Apply(n("f"), term.Numeral(0), term.Min(n("i"), term.Numeral(1))),
		"((lam (x) x) y)":                term.Apply(term.Lam(n("x"), "x"), n("y")),
		"(3 x)":                          term.Apply(term.Numeral(3), n("x")),
		"(lam (x x) x)":                  term.Lam(n("x"), "x", "x"),
		"(Pi ((i I)) A)":                 term.Pi("i", term.Interval(), n("A")),
		"(-> I I A)":                     term.Arrow(term.Interval(), term.Interval(), n("A")),
		"(elim (x C) t ((c) a))":         term.Elim("x", n("C"), n("t"), term.Case("c", n("a"))),
		"strict":                         n("strict"),
		"(formal strict)":                term.Apply(n("formal"), n("strict")),
		"-1":                             n("-1"),
		"1+":                             n("1+"),
		"٣":                              n("٣"),
		"a;b\n":                          n("a"),
		"0":                              term.Numeral(0),
		"(transp (i A) (= (rev i) 1) a)": term.Transp("i", n("A"), term.Eq(term.Rev(n("i")), 1), n("a")),
	} {
		w, err := notation.ReadTerm(text, "", nil)
		require.NoError(t, err, text)
		assert.True(t, w.Same(want), text)
	}
}

// Asking for both treatments of composition is no fault of the text: the
// declaration is refused later, and can be the form of reject.
func TestSeveralCompositionClausesAreRead(t *testing.T) {
	forms, err := notation.ReadScript([]byte("(data D () (composition strict) (composition formal) (point c ()))(data E ((A (U 0))))"), "", nil)
	require.NoError(t, err)
	assert.Equal(t, 2, forms[0].Declaration.Compositions)
	assert.Equal(t, "strict", forms[0].Declaration.Composition)
	assert.Equal(t, 0, forms[1].Declaration.Compositions)
	assert.Equal(t, "", forms[1].Declaration.Composition)
	forms, err = notation.ReadScript(nil, "", nil)
	require.NoError(t, err)
	assert.Empty(t, forms)
}

func TestWordsOfHosts(t *testing.T) {
	kindOf := func(s term.Shape) error { _, err := notation.NewWords(s); return err }
	for _, word := range []string{"lam", "I", "=", "def", "point", "composition"} {
		assert.ErrorIs(t, kindOf(term.Shape{Word: word}), term.Duplicate, word)
	}
	for _, word := range []string{"", "12", "a b", "(", "\xff"} {
		assert.ErrorIs(t, kindOf(term.Shape{Word: word}), term.Malformed, word)
	}
	_, err := notation.NewWords(term.Shape{Word: "crate"}, term.Shape{Word: "crate"})
	assert.ErrorIs(t, err, term.Duplicate)
	for _, slots := range [][]term.Slot{
		{{Rest: true}, {}}, {{Rows: []term.Slot{{}}}, {}}, {{Many: true}}, {{Rows: []term.Slot{{Sort: term.NameSort}, {Many: true}}}},
		{{Rows: []term.Slot{}}}, {{Sort: term.FaceSort, Binds: []term.Sort{term.TermSort}}}, {{Rows: []term.Slot{{}}, Rest: true}},
		{{Rows: []term.Slot{{}}, Binds: []term.Sort{term.TermSort}}}, {{Rows: []term.Slot{{Rest: true}, {}}}},
	} {
		assert.ErrorIs(t, kindOf(term.Shape{Word: "crate", Slots: slots}), term.Malformed)
	}
	words := hostWords(t)
	assert.True(t, words.Taken("crate") && words.Taken("def") && !words.Taken("x"))
	s, ok := words.Shape("crate")
	assert.True(t, ok && len(s.Slots) == 4)
	_, ok = (*notation.Words)(nil).Shape("crate")
	assert.False(t, ok)
}

func TestLimitsOfTexts(t *testing.T) {
	digits := strings.Repeat("7", notation.MaxDigits)
	w, err := notation.ReadTerm(digits, "", nil)
	require.NoError(t, err)
	assert.Equal(t, digits, w.Number.String())
	_, err = notation.ReadTerm("(f\n "+digits+"7)", "", nil)
	var e *term.Error
	require.True(t, errors.As(err, &e))
	assert.Equal(t, term.OutOfBudget, e.Kind)
	assert.Equal(t, term.Place{Line: 2, Column: 2}, e.Place)
	assert.Less(t, len(e.Error()), 300)

	_, err = notation.ReadTerm(strings.Repeat("(", notation.MaxNesting+1), "", nil)
	require.True(t, errors.As(err, &e))
	assert.Equal(t, term.OutOfBudget, e.Kind)
	assert.Equal(t, notation.MaxNesting+1, e.Place.Column)
	_, err = notation.ReadTerm(strings.Repeat("(", 1_000_000), "", nil)
	assert.ErrorIs(t, err, term.Malformed)
}

func TestDeepAndWideTexts(t *testing.T) {
	// A stack of more than a megabyte is fatal here, so nesting must not cost any.
	old := debug.SetMaxStack(1 << 20)
	defer debug.SetMaxStack(old)
	const n = 20_000
	for name, text := range map[string]string{
		"arguments":    strings.Repeat("(f ", n) + "x" + strings.Repeat(")", n),
		"heads":        strings.Repeat("(", n) + "f" + strings.Repeat(" x)", n),
		"functions":    strings.Repeat("(lam (x) (f ", n/2) + "x" + strings.Repeat("))", n/2),
		"walls":        strings.Repeat("(hcomp A a ((= i 0) (j) ", n/4) + "x" + strings.Repeat("))", n/4),
		"dimensions":   "(at p " + strings.Repeat("(rev ", n) + "i" + strings.Repeat("))", n)[:n+1],
		"faces":        "(transp (i A) " + strings.Repeat("(or ", n) + "top" + strings.Repeat(")", n) + " a)",
		"many names":   "(lam (" + strings.Repeat("x ", n) + "x) x)",
		"many domains": "(-> " + strings.Repeat("A ", n) + "A)",
		"many ends":    "(at p" + strings.Repeat(" i", n) + ")",
		"many args":    "(f" + strings.Repeat(" x", 1_000_000) + ")",
		"long name":    strings.Repeat("é", 1_000_000),
		"long comment": ";" + strings.Repeat("(", 1_000_000) + "\nx",
	} {
		t.Run(name, func(t *testing.T) {
			w, err := notation.ReadTerm(text, "", nil)
			require.NoError(t, err)
			if name != "long comment" && name != "many names" {
				require.True(t, w.String() == text)
			}
			back, err := notation.ReadTerm(notation.Format(w, 60), "", nil)
			require.NoError(t, err)
			assert.True(t, back.Same(w))
		})
	}
	rejects := strings.Repeat("(reject ", n) + "(show x)" + strings.Repeat(")", n)
	forms, err := notation.ReadScript([]byte(rejects), "", nil)
	require.NoError(t, err)
	assert.True(t, forms[0].String() == rejects)
	// The message about a huge form is short.
	_, err = notation.ReadTerm("(fst"+strings.Repeat(" (g x)", n)+")", "", nil)
	require.ErrorIs(t, err, term.Malformed)
	assert.Less(t, len(err.Error()), 300)
}
