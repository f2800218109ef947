package nbe_test

import (
	"context"
	"errors"
	"fmt"
	"os"
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
)

// Deep input. In Go a stack overflow ends the whole process, so every text here
// must get an answer or an error, by default limits and by small ones. The
// context ends a run that has become quadratic; it is no timing test, since
// everything here takes a second or so.

const deep = 100_000

func nested(before, inner, after string, n int) string {
	return strings.Repeat(before, n) + inner + strings.Repeat(after, n)
}

// deepTexts are texts that nest n levels, or have n parts, by what nests; what
// each gives is in its name's second half: an answer, or a kind of error.
func deepTexts(n int) map[string]struct {
	text string
	kind term.ErrorKind // 0: an answer
} {
	type c = struct {
		text string
		kind term.ErrorKind
	}
	concatenation := `
(def then (Pi ((A (U 0)) (a A) (b A) (c A) (p (Path A a b)) (q (Path A b c))) (Path A a c))
  (lam (A a b c p q) (line (i) (hcomp A (at p i) ((= i 0) (j) a) ((= i 1) (j) (at q j))))))
(def turn (Path Circle base base) (line (i) (loop i)))
(def drum (Path Circle base base) %s)
(same Circle (at drum 1) base)`
	return map[string]c{
		"parenthesis":            {"(show " + nested("(", "0", ")", n) + ")", malformed},
		"open parenthesis":       {strings.Repeat("(", n), malformed},
		"application":            {"(assume f (-> Nat Nat)) (show " + nested("(f ", "0", ")", n) + ")", 0},
		"application, to left":   {"(def f (-> " + strings.Repeat("Nat ", n) + "Nat) (lam (" + strings.Repeat("x ", n) + ") x)) (same Nat " + nested("(", "f", " 0)", n) + " 0)", 0},
		"application, in a row":  {"(def f (-> " + strings.Repeat("Nat ", n) + "Nat) (lam (" + strings.Repeat("x ", n) + ") x)) (same Nat (f " + strings.Repeat("0 ", n) + ") 0)", 0},
		"application of nothing": {"(show " + nested("(", "crane", " 0)", n) + ")", notFound},
		"lam":                    {"(def f (-> " + strings.Repeat("Nat ", n) + "Nat) " + nested("(lam (x) ", "x", ")", n) + ") (same " + nested("(-> Nat ", "Nat", ")", n) + " f f)", 0},
		"lam at a number":        {"(def f Nat " + nested("(lam (x) ", "x", ")", n) + ")", illTyped},
		"let":                    {"(same Nat " + nested("(let ((x Nat 0)) ", "x", ")", n) + " 0)", 0},
		"let, each of the last":  {"(same Nat (let ((x Nat 0) " + strings.Repeat("(x Nat (suc x)) ", n) + ") x) " + fmt.Sprint(n) + ")", 0},
		"let, to left":           {"(same Nat " + nested("(let ((x Nat ", "0", ")) x)", n) + " 0)", 0},
		"pair":                   {"(def p (* " + strings.Repeat("Nat ", n) + "Nat) " + nested("(pair 0 ", "0", ")", n) + ") (same (* " + strings.Repeat("Nat ", n) + "Nat) p p)", 0},
		"pair, to left":          {"(def p " + nested("(* ", "Nat", " Nat)", n) + " " + nested("(pair ", "0", " 0)", n) + ")", 0},
		"pair, its type unknown": {"(show " + nested("(pair 0 ", "0", ")", n) + ")", illTyped},
		"fst":                    {"(assume p (* Nat Nat)) (show " + nested("(fst ", "p", ")", n) + ")", illTyped},
		"snd":                    {"(assume p (* " + strings.Repeat("Nat ", n) + "Nat)) (show " + nested("(snd ", "p", ")", n) + ")", 0},
		"->":                     {"(show " + nested("(-> Nat ", "Nat", ")", n) + ")", 0},
		"->, to left":            {"(show " + nested("(-> ", "Nat", " Nat)", n) + ")", 0},
		"Pi":                     {"(show (Pi (" + strings.Repeat("(x Nat) ", n) + ") Nat))", 0},
		"Sigma, to left":         {"(show " + nested("(Sigma ((x ", "Nat", ")) Nat)", n) + ")", 0},
		"Path":                   {"(assume a Nat) (show " + nested("(Path Nat a ", "a", ")", n) + ")", illTyped},
		"line":                   {"(def p Nat " + nested("(line (i) ", "0", ")", n) + ")", illTyped},
		"at":                     {"(assume p (Path Nat 0 0)) (show " + nested("(at ", "p", " 0)", n) + ")", illTyped},
		"ann":                    {"(same Nat " + nested("(ann ", "0", " Nat)", n) + " 0)", 0},
		"suc":                    {"(same Nat " + nested("(suc ", "0", ")", n) + " " + fmt.Sprint(n) + ")", 0},
		"elim":                   {"(same Nat " + nested("(elim (x Nat) ", "0", " (zero 0) ((suc k h) h))", n) + " 0)", 0},
		"min":                    {"(def g (-> I Nat) (lam (i) 0)) (def h (-> I Nat) (lam (i) (g " + nested("(min i ", "i", ")", n) + ")))", 0},
		"max, in a row":          {"(def g (-> I Nat) (lam (i) 0)) (def h (-> I Nat) (lam (i) (g (max " + strings.Repeat("i ", n) + "))))", 0},
		"rev":                    {"(def g (-> I Nat) (lam (i) 0)) (same (-> I Nat) (lam (i) (g " + nested("(rev ", "i", ")", n) + ")) g)", 0},
		"and":                    {"(assume A (U 0)) (assume a A) (def g (-> I A) (lam (i) (transp (j A) " + nested("(and top ", "(= i 0)", ")", n) + " a)))", 0},
		"or":                     {"(assume A (U 0)) (assume a A) (def g (-> I A) (lam (i) (transp (j A) " + nested("(or bot ", "(= i 0)", ")", n) + " a)))", 0},
		"transp":                 {"(assume A (U 0)) (assume a A) (show " + nested("(transp (i A) bot ", "a", ")", n) + ")", 0},
		"transp at Nat":          {"(same Nat " + nested("(transp (i Nat) bot ", "0", ")", n) + " 0)", 0},
		"hcomp":                  {"(assume A (U 0)) (assume a A) (show " + nested("(hcomp A ", "a", ")", n) + ")", 0},
		"a wall on bot":          {"(show " + nested("(hcomp Nat 0 (bot (i) ", "0", "))", n) + ")", 0},
		"comp":                   {"(same Nat " + nested("(comp (i Nat) ", "0", ")", n) + " 0)", 0},
		"concatenation, right":   {fmt.Sprintf(concatenation, nested("(then Circle base base base turn ", "turn", ")", n)), 0},
		"concatenation, left":    {fmt.Sprintf(concatenation, nested("(then Circle base base base ", "turn", " turn)", n)), 0},
		"reject":                 {nested("(reject ", "(show 0)", ")", n), 0},
		"a name":                 {"(show " + strings.Repeat("x", n) + ")", notFound},
		"a numeral":              {"(show " + strings.Repeat("9", n) + ")", 0},
	}
}

// named are those that every run of the tests takes at full depth; the others
// are ten times shallower unless the environment asks for more.
var named = map[string]bool{
	"parenthesis": true, "open parenthesis": true, "application": true, "concatenation, right": true,
	"pair": true, "lam": true, "let": true, "min": true, "suc": true, "fst": true, "at": true, "reject": true,
}

func TestDeepInput(t *testing.T) {
	whole, shallow := deepTexts(deep), deepTexts(deep/10)
	for name, c := range whole {
		if !named[name] && os.Getenv("BOXWRIGHT_LONG") == "" || testing.Short() {
			c = shallow[name]
		}
		t.Run(name, func(t *testing.T) {
			err := answer(t, c.text, nbe.Limits{})
			if c.kind == 0 {
				require.True(t, err == nil || errors.Is(err, tooMuch), "%.300v", err)
				return
			}
			if !errors.Is(err, tooMuch) {
				assert.ErrorIs(t, err, c.kind, "%.300v", err)
			}
		})
	}
}

// The same under limits that are hit on the way: an error each time, and never
// another one than that.
func TestDeepInputUnderLimits(t *testing.T) {
	for name, c := range deepTexts(deep / 100) {
		for _, l := range []nbe.Limits{{Steps: 1000}, {Depth: 300}, {Memory: 20_000}, {Output: 200}, {Text: 200}} {
			err := answer(t, c.text, l)
			if err != nil && !errors.Is(err, tooMuch) {
				assert.ErrorIs(t, err, c.kind, "%s under %+v: %.300v", name, l, err)
			}
		}
	}
}

// answer handles a text on a fresh engine and returns the first error in it.
func answer(t *testing.T, text string, l nbe.Limits) (first error) {
	t.Helper()
	e, err := nbe.New()
	require.NoError(t, err)
	ctx, stop := context.WithTimeout(background, 2*time.Minute)
	defer stop()
	s := &script.Session{Engine: e, Options: []nbe.CallOption{nbe.Within(l)}, Report: func(r script.Result) {
		if first == nil {
			first = r.Err
		}
	}}
	if err := s.Source(ctx, []byte(text), "deep.sexp"); err != nil {
		first = err
	}
	require.NotErrorIs(t, first, term.Cancelled, "this takes too long")
	require.NotErrorIs(t, first, term.Internal, "%.300v", first)
	if first != nil {
		assert.Less(t, len(first.Error()), 1<<20)
	}
	return first
}
