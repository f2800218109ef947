package nbe_test

import (
	"context"
	"errors"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
)

// Wrong input of every kind in the notation: the kind of error, the place of
// the smallest form at fault, what was expected and what was found. In each
// text « stands before the form that must be blamed, and is not part of it.

// quayside is in scope of every case.
const quayside = `
(assume A (U 0)) (assume B (U 0)) (assume a A) (assume b A) (assume p (Path A a b))
(assume f (-> A B)) (assume g (-> I A)) (assume q (* A B)) (assume n Nat)
(assume s (Path Nat 0 0)) (assume F (-> A (U 0))) (assume T (Path (U 0) A B)) (assume e (Equiv A B))
(data Drum ((X (U 0))) (point empty ()) (point wound ((x X) (rest (Drum X)))))
(data Rail () (point west ()) (point east ()) (path rail () (i) ((= i 0) west) ((= i 1) east)))
`

type fault struct {
	text  string
	kind  term.ErrorKind
	says  string // a part of the message
	want  string // a part of what was expected
	found string // a part of what was found
}

const (
	malformed      = term.Malformed
	notFound       = term.NotFound
	duplicate      = term.Duplicate
	illTyped       = term.IllTyped
	disagreement   = term.Disagreement
	badDeclaration = term.BadDeclaration
	unequal        = term.Unequal
	tooMuch        = term.OutOfBudget
)

var faults = []fault{
	// Text that cannot be read.
	{"«(show 1", malformed, "not closed", ")", "the end"},
	{"(show 1)«)", malformed, "closes nothing", "a form", ")"},
	{"«crane", malformed, "cannot be read", "a form of a script", "crane"},
	{"«(hoist 1)", malformed, "cannot be read", "a form of a script", "(hoist 1)"},
	{"«()", malformed, "cannot be read", "a form of a script", "()"},
	{"«(show)", malformed, "cannot be read", "(show t)", "(show)"},
	{"«(show 1 2)", malformed, "cannot be read", "(show t)", "(show 1 2)"},
	{"«(def x Nat)", malformed, "cannot be read", "(def NAME T t)", "(def x Nat)"},
	{"«(same Nat 1)", malformed, "cannot be read", "(same T a b)", "(same Nat 1)"},
	{"(def «7 Nat 7)", malformed, "cannot be read", "a name", "7"},
	{"(def «(x) Nat 7)", malformed, "cannot be read", "a name", "(x)"},
	{"(def «lam Nat 7)", malformed, "cannot be read", "a name", "lam"},
	{"(assume «composition Nat)", malformed, "cannot be read", "a name", "composition"},
	{"(load «drum)", malformed, "cannot be read", "double quotes", "drum"},
	{"(load «\"drum)", malformed, "not closed", `"`, "the end"},
	{"(show «\"drum\")", malformed, "cannot be read", "a term", `"drum"`},
	{"(show «007)", malformed, "starts with 0", "without leading zeros", "007"},
	{"(show (f «()))", malformed, "cannot be read", "a term or a dimension", "()"},
	{"(show «(5))", malformed, "nothing is applied", "a term", "(5)"},
	{"(show «((f a)))", malformed, "nothing is applied", "a term", "((f a))"},
	{"(show (lam «x a))", malformed, "cannot be read", "a list of names", "x"},
	{"(show (lam «() a))", malformed, "cannot be read", "a list of names", "()"},
	{"(show (lam («3) a))", malformed, "cannot be read", "a name", "3"},
	{"(show «(lam (x)))", malformed, "cannot be read", "(lam (x y …) t)", "(lam (x))"},
	{"(show (Pi («x A) B))", malformed, "cannot be read", "(x A)", "x"},
	{"(show (Pi ((x A) «y) B))", malformed, "cannot be read", "(x A)", "y"},
	{"(show (let («(x A)) x))", malformed, "cannot be read", "(x T t)", "(x A)"},
	{"(show «(-> A))", malformed, "cannot be read", "(-> A B … C)", "(-> A)"},
	{"(show «(* A))", malformed, "cannot be read", "(* A B … C)", "(* A)"},
	{"(show «(pair a))", malformed, "cannot be read", "(pair a b … c)", "(pair a)"},
	{"(show «(fst))", malformed, "cannot be read", "(fst", "(fst)"},
	{"(show «(snd q q))", malformed, "cannot be read", "(snd", "(snd q q)"},
	{"(show «(Path A a))", malformed, "cannot be read", "(Path", "(Path A a)"},
	{"(show (PathOver «A a b))", malformed, "cannot be read", "(i A)", "A"},
	{"(show «(at p))", malformed, "cannot be read", "(at p r s …)", "(at p)"},
	{"(show (at p «2))", malformed, "cannot be read", "a dimension", "2"},
	{"(show (at p «(suc 0)))", malformed, "cannot be read", "a dimension", "(suc 0)"},
	{"(show (at p «(= 0 0)))", malformed, "cannot be read", "a dimension", "(= 0 0)"},
	{"(show (at p «(min)))", malformed, "cannot be read", "(min", "(min)"},
	{"(show (at p «(rev 0 1)))", malformed, "cannot be read", "(rev", "(rev 0 1)"},
	{"(show «U)", malformed, "cannot be read", "(U", "U"},
	{"(show (U «n))", malformed, "cannot be read", "a level", "n"},
	{"(show «I)", malformed, "cannot be read", "a term", "I"},
	{"(show (Path «I 0 1))", malformed, "cannot be read", "a term", "I"},
	{"(show «top)", malformed, "cannot be read", "a term", "top"},
	{"(show «(min 0 1))", malformed, "cannot be read", "a term", "(min 0 1)"},
	{"(show (transp «A bot a))", malformed, "cannot be read", "(i A)", "A"},
	{"(show (transp (i A) «0 a))", malformed, "cannot be read", "a face", "0"},
	{"(show (transp (i A) (= i «2) a))", malformed, "cannot be read", "0 or 1", "2"},
	{"(show (transp (i A) «(= i) a))", malformed, "cannot be read", "(=", "(= i)"},
	{"(show (transp (i A) (and «a) a))", malformed, "cannot be read", "a face", "a"},
	{"(show (hcomp A a «(bot a)))", malformed, "cannot be read", "(φ (i) t)", "(bot a)"},
	{"(show (hcomp A a («i (i) a)))", malformed, "cannot be read", "a face", "i"},
	{"(show «(hcomp A))", malformed, "cannot be read", "(hcomp", "(hcomp A)"},
	{"(show (hcomp A a (bot «i a)))", malformed, "cannot be read", "(i)", "i"},
	{"(show (elim «Nat n))", malformed, "cannot be read", "(x", "Nat"},
	{"(show (elim (x Nat) n «zero))", malformed, "cannot be read", "(c t)", "zero"},
	{"(show (elim (x Nat) n ((«(suc)) 0)))", malformed, "cannot be read", "a constructor's name", "(suc)"},
	{"(show (elim (x Nat) n («5 0)))", malformed, "cannot be read", "a name", "5"},
	{"(show (Glue A «(top B)))", malformed, "cannot be read", "(φ a b)", "(top B)"},
	{"«(data D)", malformed, "cannot be read", "(data NAME", "(data D)"},
	{"(data D «x)", malformed, "cannot be read", "a list of (x A)", "x"},
	{"(data D («x))", malformed, "cannot be read", "(x A)", "x"},
	{"(data D () «c)", malformed, "cannot be read", "a point or a path clause", "c"},
	{"(data D () «(point c))", malformed, "cannot be read", "(point c", "(point c)"},
	{"(data D () «(path c () ))", malformed, "cannot be read", "(path c", "(path c ())"},
	{"(data D () (path c () «()))", malformed, "cannot be read", "a list of dimensions", "()"},
	{"(data D () (path c () (i) «west))", malformed, "cannot be read", "(φ e)", "west"},
	{"(data D () «(composition loose))", malformed, "cannot be read", "(composition strict)", "(composition loose)"},
	{"(reject «1)", malformed, "cannot be read", "a form of a script", "1"},
	{"(reject «(show 1 2))", malformed, "cannot be read", "(show t)", "(show 1 2)"},

	// names
	{"(show «crane)", notFound, "nothing of this name", "", "crane"},
	{"(show (f «crane))", notFound, "nothing of this name", "", "crane"},
	{"(show (at p «i))", notFound, "no dimension of this name", "", "i"},
	{"(show (transp (i A) (= «j 0) a))", notFound, "no dimension of this name", "", "j"},
	{"(show (transp (i A) (= «i 0) a))", notFound, "no dimension of this name", "", "i"},
	{"(show (hcomp A a (bot (i) «crane)))", notFound, "nothing of this name", "", "crane"},
	{"(show «(lam (x) y))", illTyped, "cannot be inferred", "a known type", "(lam (x) y)"},
	{"(def h (-> A A) (lam (x) «y))", notFound, "nothing of this name", "", "y"},
	{"(def h («K) A)", notFound, "nothing of this name", "", "K"},
	{"(show (elim (x Nat) n (zero 0) ((«sux k h) h)))", badDeclaration, "no constructor of Nat", "a constructor of Nat", "sux"},
	{"(def «n Nat 0)", duplicate, "declared already", "", "n"},
	{"(assume «A (U 0))", duplicate, "declared already", "", "A"},
	{"(def «west Nat 0)", duplicate, "declared already", "", "west"},
	{"(def «zero Nat 0)", duplicate, "declared already", "", "zero"},
	{"(data «n ())", duplicate, "declared already", "", "n"},
	{"(data D () «(point east ()))", duplicate, "declared already", "", "east"},
	{"(data D () (point c ()) «(point c ()))", duplicate, "stands twice", "", "c"},

	// types that are another
	{"(def h Nat «unit)", illTyped, "the type is another", "Nat", "Unit"},
	{"(def h «3 3)", illTyped, "no type", "a type", "Nat"},
	{"(def h «a a)", illTyped, "no type", "a type", "A"},
	{"(assume h «n)", illTyped, "no type", "a type", "Nat"},
	{"(show (f «n))", illTyped, "the type is another", "A", "Nat"},
	{"(show (f a «a))", illTyped, "only a function", "a function", "B"},
	{"(show (n «n))", illTyped, "only a function", "a function", "Nat"},
	{"(show (f «0))", illTyped, "the type is another", "A", "Nat"},
	{"(show (g «a))", illTyped, "a dimension", "a dimension", "a"},
	{"(show (g «n))", illTyped, "a dimension", "a dimension", "n"},
	{"(def h (-> I A) (lam (i) «i))", illTyped, "a dimension stands where a term", "a term", "i"},
	{"(def h (-> I A) (lam (i) (f «i)))", illTyped, "a dimension stands where a term", "a term", "i"},
	{"(def h (-> A I A) (lam (x i) (g «x)))", illTyped, "a term stands where a dimension", "a dimension", "x"},
	{"(def h Nat «(lam (x) x))", illTyped, "a function does not", "Nat", "a function"},
	{"(def h (-> A A) «n)", illTyped, "the type is another", "(-> A A)", "Nat"},
	{"(def h (-> A A) «(lam (x y) x))", illTyped, "a function does not", "A", "a function"},
	{"(show «(lam (x) x))", illTyped, "cannot be inferred", "a known type", "(lam (x) x)"},
	{"(show «(pair a a))", illTyped, "cannot be inferred", "a known type", "(pair a a)"},
	{"(show «(line (i) a))", illTyped, "cannot be inferred", "a known type", "(line (i) a)"},
	{"(show «empty)", illTyped, "cannot be inferred", "a known type", "empty"},
	{"(show «(wound a (ann empty (Drum A))))", illTyped, "cannot be inferred", "a known type", "wound"},
	{"(def h Nat «(pair 1 2))", illTyped, "a pair does not", "Nat", "a pair"},
	{"(def h (* A A) (pair a «n))", illTyped, "the type is another", "A", "Nat"},
	{"(def h (Sigma ((x A)) (F x)) (pair a «a))", illTyped, "the type is another", "(F a)", "A"},
	{"(show (fst «n))", illTyped, "only a pair", "a pair", "Nat"},
	{"(show (snd «f))", illTyped, "only a pair", "a pair", "(-> A B)"},
	{"(show (at «n 0))", illTyped, "only a path", "a path", "Nat"},
	{"(def h Nat «(line (i) 1))", illTyped, "a path does not", "Nat", "a path"},
	{"(def h (Path A a b) «(line (i) a))", disagreement, "ends elsewhere at 1", "b", "a"},
	{"(def h (Path A a b) «(line (i) b))", disagreement, "ends elsewhere at 0", "a", "b"},
	{"(def h (Path A b a) «p)", illTyped, "the type is another", "(Path A b a)", "(Path A a b)"},
	{"(def h (Path A a b) (line (i) «n))", illTyped, "the type is another", "A", "Nat"},
	{"(show (Path A a «n))", illTyped, "the type is another", "A", "Nat"},
	{"(show (Path «a a a))", illTyped, "no type", "a type", "A"},
	{"(def h (PathOver (i (at T i)) a «a) p)", illTyped, "the type is another", "B", "A"},
	{"(show (-> A «a))", illTyped, "no type", "a type", "A"},
	{"(show (Pi ((x «n)) A))", illTyped, "no type", "a type", "Nat"},
	{"(show (Sigma ((x A)) «x))", illTyped, "no type", "a type", "A"},
	{"(def h (U 0) «(U 0))", illTyped, "the type is another", "(U 0)", "(U 1)"},
	{"(def h (U 0) «(-> (U 0) A))", illTyped, "the type is another", "(U 0)", "(U 1)"},
	{"(show (U «99999999999999999999))", malformed, "universe level", "a numeral up to", "99999999999999999999"},
	{"(show (ann «n A))", illTyped, "the type is another", "A", "Nat"},
	{"(show (let ((x A «n)) x))", illTyped, "the type is another", "A", "Nat"},
	{"(show (let ((x «n n)) x))", illTyped, "no type", "a type", "Nat"},
	{"(show «(f))", illTyped, "in parentheses", "an argument", "none"},

	// dimensions and faces
	{"(def h (-> I A) (lam (i) (at p (min i «a))))", illTyped, "a term stands where a dimension", "a dimension", "a"},
	{"(show (transp (i A) (= «a 0) a))", illTyped, "a term stands where a dimension", "a dimension", "a"},

	// composites and transports
	{"(show (transp (i «n) bot a))", illTyped, "no type", "a type", "Nat"},
	{"(show (transp (i A) bot «n))", illTyped, "the type is another", "A", "Nat"},
	{"(show (transp (i (at T i)) bot «(f a)))", illTyped, "the type is another", "A", "B"},
	{"(show (transp (i «(at T i)) top a))", disagreement, "not constant", "A", "(at T i)"},
	{"(def h (-> I B) (lam (k) (transp (i «(at T i)) (= k 0) a)))", disagreement, "not constant", "A", "(at T i)"},
	{"(show (hcomp A «n))", illTyped, "the type is another", "A", "Nat"},
	{"(show (hcomp «n a))", illTyped, "no type", "a type", "Nat"},
	{"(def h (-> I A) (lam (k) (hcomp A a ((= k 0) (i) «n))))", illTyped, "the type is another", "A", "Nat"},
	{"(def h (-> I A) (lam (k) (hcomp A a ((= k 0) (i) «b))))", disagreement, "does not stand on the base", "a", "b"},
	{"(def h (-> I I A) (lam (k l) (hcomp A a ((= k 0) (i) a) ((= l 0) (i) «(at p i)))))", disagreement, "disagree where", "a", "(at p i)"},
	{"(show (comp (i (at T i)) «(f a)))", illTyped, "the type is another", "A", "B"},
	{"(def h (-> I B) (lam (k) (comp (i (at T i)) a ((= k 0) (i) «a))))", illTyped, "the type is another", "(at T i)", "A"},
	{"(show (hfill A a «a))", illTyped, "a dimension", "a dimension", "a"},
	{"(show (tfill (i A) bot a «n))", illTyped, "a dimension", "a dimension", "n"},

	// data
	{"(show «(Drum))", illTyped, "with its parameters", "1", "0"},
	{"(def h (U 0) «Drum)", illTyped, "with its parameters", "1 parameter", "0"},
	{"(show «(Drum A A))", illTyped, "with its parameters", "1", "2"},
	{"(show (Drum «a))", illTyped, "the type is another", "(U 0)", "A"},
	{"(show «suc)", illTyped, "stands with all its arguments", "1 argument", "0"},
	{"(show «(suc 1 2))", illTyped, "stands with all its arguments", "1 argument", "2"},
	{"(show (suc «west))", illTyped, "does not make", "Nat", "an element of Rail"},
	{"(def h Nat «west)", illTyped, "does not make", "Nat", "Rail"},
	{"(def h (Drum A) (wound «n empty))", illTyped, "the type is another", "A", "Nat"},
	{"(def h (Drum A) (wound a «west))", illTyped, "does not make", "(Drum A)", "Rail"},
	{"(show «rail)", illTyped, "stands with all its arguments", "1 dimension", "0"},
	{"(show (rail «a))", illTyped, "a dimension", "a dimension", "a"},
	{"(show (elim (x Nat) «a (zero 0) ((suc k h) h)))", illTyped, "only elements of data types", "data type", "A"},
	{"(show (elim (x «n) n (zero 0) ((suc k h) h)))", illTyped, "no type", "a type", "Nat"},
	{"(show «(elim (x Nat) n (zero 0)))", badDeclaration, "a case is missing", "suc", "none"},
	{"(show (elim (x Nat) n (zero 0) («zero 1) ((suc k h) h)))", badDeclaration, "stands twice", "", ""},
	{"(show (elim (x Nat) n (zero 0) ((suc k h) h) («west 0)))", badDeclaration, "no constructor of Nat", "a constructor", "west"},
	{"(show (elim (x Nat) n (zero 0) ((«suc k) k)))", badDeclaration, "wrong number of names", "1 hypotheses", "1"},
	{"(show (elim (x Nat) n (zero «unit) ((suc k h) h)))", illTyped, "the type is another", "Nat", "Unit"},
	{"(show (elim (x Nat) n (zero 0) ((suc k h) «unit)))", illTyped, "the type is another", "Nat", "Unit"},
	{"(show (elim (x Nat) west (west 0) (east 0) ((rail i) «unit)))", illTyped, "the type is another", "Nat", "Unit"},
	{"(show (elim (x Nat) west (west 0) (east 1) ((rail i) «0)))", disagreement, "disagrees with the elimination of its boundary", "1", "0"},
	{"(data D () (point c ((x «n))))", illTyped, "no type", "a type", "Nat"},
	{"(data D () (point c ((x «(-> D Nat)))))", badDeclaration, "", "", ""},
	{"(data D ((X «n)))", illTyped, "no type", "a type", "Nat"},
	{"(data D () (path c () (i) ((= i 0) «west)))", illTyped, "does not make", "D", "Rail"},
	{"(data D () (point u ()) (point v ()) (path c () (i j) ((= i 0) u) ((= j 0) «v)))", disagreement, "boundary", "u", "v"},
	{"(data D () (path c () (i) ((= i 0) («c 1))))", notFound, "nothing of this name", "", "c"},
	{"«(data D () (composition strict) (point u ()) (path c () (i)))", badDeclaration, "formal composites", "(composition formal)", "(composition strict)"},
	{"«(data D () (composition strict) (composition formal) (point u ()))", badDeclaration, "both treatments", "one", "2"},
	{"(data D () (point u ()) (path c ((x D)) (i) ((= i 0) «(elim (y D) x (u u)))))", badDeclaration, "may not eliminate", "", ""},

	// gluing
	{"(show (Glue A (top B «f)))", illTyped, "the type is another", "(Sigma ((f (-> B A)))", "(-> A B)"},
	{"(show (Glue A (top «n e)))", illTyped, "no type", "a type", "Nat"},
	{"(show (Glue «n (top B e)))", illTyped, "no type", "a type", "Nat"},
	{"(def h A «(glue a))", illTyped, "glue", "A", "glue"},
	{"(show (unglue «a))", illTyped, "unglue", "a Glue type", "A"},

	// places: other lines, characters of several bytes, nested binders
	{"; the crane\n(def h Nat\n  (suc\n    «unit))", illTyped, "the type is another", "Nat", "Unit"},
	{"(def höhe Nat 3) (show (suc «unit))", illTyped, "the type is another", "Nat", "Unit"},
	{"\r\n\t(show «crane)", notFound, "nothing of this name", "", "crane"},
	{"(def h (-> A A A) (lam (x y) «n))", illTyped, "the type is another", "A", "Nat"},
	{"(def h (Sigma ((x A) (y A)) (F y)) (pair a b «a))", illTyped, "the type is another", "(F b)", "A"},
	{"(show «(at p 0 0))", illTyped, "only a path", "a path", "A"},
	{"(def h (Pi ((x A)) (Path A x x)) (lam (x) (line (i) «n)))", illTyped, "the type is another", "A", "Nat"},
	{"(def h (Pi ((x A)) (Path A x x)) (lam (A) «p))", illTyped, "the type is another", "(Path A", "(Path A"},
	{"(def h (-> I I A) (lam (k l) (transp (i A) (and (= k 0) (= «x 1)) a)))", notFound, "no dimension of this name", "", "x"},

	// outcomes
	{"«(same Nat 3 4)", unequal, "not equal", "3", "4"},
	{"«(same A a b)", unequal, "not equal", "a", "b"},
	{"«(same (-> A B) f (lam (x) (f a)))", unequal, "not equal", "", ""},
	{"«(differ Nat 3 3)", unequal, "are equal", "3", "3"},
	{"«(differ (-> A B) f (lam (x) (f x)))", unequal, "are equal", "f", ""},
	{"«(normal (suc 1) 3)", unequal, "normal form is another", "3", "2"},
	{"(normal (suc 1) «unit)", illTyped, "the type is another", "Nat", "Unit"},
	{"(same Nat 3 «a)", illTyped, "the type is another", "Nat", "A"},
	{"(same «n 3 3)", illTyped, "no type", "a type", "Nat"},
	{"«(reject (show 3))", unequal, "was to be refused", "", "accepted"},
	{"«(reject (reject (show crane)))", unequal, "was to be refused", "", "refused"},
}

// quaysideEngine is a fresh engine with what is on the quayside.
func quaysideEngine(t *testing.T) *nbe.Engine {
	t.Helper()
	e, err := nbe.New()
	require.NoError(t, err)
	s := &script.Session{Engine: e, Report: func(r script.Result) { require.NoError(t, r.Err) }}
	require.NoError(t, s.Source(context.Background(), []byte(quayside), "quayside.sexp"))
	return e
}

// lift takes the mark out of a text and returns the line and the column it stood at.
func lift(t *testing.T, text string) (plain string, line, column int) {
	t.Helper()
	before, after, ok := strings.Cut(text, "«")
	require.True(t, ok, "no mark in %s", text)
	line = 1 + strings.Count(before, "\n")
	column = 1 + len([]rune(before[strings.LastIndex(before, "\n")+1:]))
	return before + after, line, column
}

// firstError handles a text and returns the first error in it.
func firstError(e *nbe.Engine, text string, options ...nbe.CallOption) (first error) {
	s := &script.Session{Engine: e, Options: options, Report: func(r script.Result) {
		if first == nil {
			first = r.Err
		}
	}}
	if err := s.Source(context.Background(), []byte(text), "case.sexp"); err != nil {
		return err
	}
	return first
}

func TestFaults(t *testing.T) {
	require.GreaterOrEqual(t, len(faults), 80)
	engine := quaysideEngine(t)
	for _, f := range faults {
		t.Run(f.text, func(t *testing.T) {
			text, line, column := lift(t, f.text)
			err := firstError(engine.Fork(), text)
			var e *term.Error
			require.True(t, errors.As(err, &e), "no error, or one without structure: %v", err)
			assert.ErrorIs(t, err, f.kind, "%v", err)
			assert.Equal(t, term.Place{File: "case.sexp", Line: line, Column: column}, e.Place, "%v", err)
			assert.Contains(t, e.Message, f.says)
			want, got := e.WantText, e.GotText
			if e.Want != nil {
				want = e.Want.String()
			}
			if e.Got != nil {
				got = e.Got.String()
			}
			assert.Contains(t, want, f.want, "%v", err)
			assert.Contains(t, got, f.found, "%v", err)
		})
	}
}
