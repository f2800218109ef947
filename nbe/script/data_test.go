package script_test

// Data declarations as scripts: the worked examples, statements of the HoTT Book
// (2013), chapter 6, and the rules of CHM ("On Higher Inductive Types in Cubical
// Type Theory", LICS 2018, section 3), each beside its source in its file. Every
// form must do what it should: `same`, `differ`, `normal` and `reject` decide.

import (
	"context"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
)

// evaluators are the engine as it is and its plain forms, which must agree.
var evaluators = map[string]struct {
	options []nbe.Option
	call    []nbe.CallOption
}{
	"fast":         {},
	"plain":        {options: []nbe.Option{nbe.WithPlain(value.Plain{NoSupport: true, Eager: true, NoFrontier: true, NoNumerals: true})}},
	"frontier":     {options: []nbe.Option{nbe.WithPlain(value.Plain{NoFrontier: true})}},
	"random names": {call: []nbe.CallOption{nbe.DrawNames(7)}},
}

func TestDataScripts(t *testing.T) {
	var files []string
	for _, pattern := range []string{"testdata/data/*.sexp", "../../examples/data/*.sexp"} {
		some, err := filepath.Glob(pattern)
		require.NoError(t, err)
		files = append(files, some...)
	}
	require.GreaterOrEqual(t, len(files), 24)
	for _, file := range files {
		t.Run(filepath.Base(file), func(t *testing.T) {
			text, err := os.ReadFile(file)
			require.NoError(t, err)
			require.True(t, strings.HasPrefix(string(text), ";"), "a script begins with what it is about")
			decides := 0
			for name, b := range evaluators {
				e, err := nbe.New(b.options...)
				require.NoError(t, err)
				s := &script.Session{Engine: e, Options: b.call, Report: func(r script.Result) {
					require.NoError(t, r.Err, "%s, %s", name, r.Form.Place)
					if r.Text != "" {
						decides++
					}
				}}
				require.NoError(t, s.File(context.Background(), file))
			}
			require.NotZero(t, decides)
		})
	}
}

// ran handles a script and returns what its forms reported.
func ran(t testing.TB, text string) []script.Result {
	t.Helper()
	e, err := nbe.New()
	require.NoError(t, err)
	var out []script.Result
	s := &script.Session{Engine: e, Report: func(r script.Result) { out = append(out, r) }}
	require.NoError(t, s.Source(context.Background(), []byte(text), "given"))
	return out
}

// refusal is a form that is refused: text holds one '@' before the smallest part
// at fault, says are parts of the message.
type refused struct {
	name string
	kind term.ErrorKind
	text string
	says []string
}

const carriers = `(data Susp ((A (U 0))) (point north ()) (point south ()) (path merid ((a A)) (i) ((= i 0) north) ((= i 1) south)))
(data List ((A (U 0))) (point nil ()) (point cons ((x A) (xs (List A)))))
(data Square () (point corner ()) (path side () (i) ((or (= i 0) (= i 1)) corner)) (path top2 () (i j) ((or (= i 0) (= i 1)) (side j)) ((or (= j 0) (= j 1)) (side i))))
(assume P (U 0)) (assume F (-> (U 0) (U 0))) (assume G (-> Nat (U 0)))
`

// The refusals are those of CCHM 4.5 and CHM 3 for declarations and their
// eliminations: strict positivity, universes, agreement on faces.
var refusals = []refused{
	// positivity
	{"in a domain", term.BadDeclaration, "(data D () (point c ((f @(-> D Nat)))))", []string{"not positive", "(-> D Nat)"}},
	{"in a domain of a domain", term.BadDeclaration, "(data D () (point c ((f @(-> (-> D Nat) Nat)))))", []string{"not positive"}},
	{"in a domain below the data type", term.BadDeclaration, "(data D () (point c ((f @(-> (-> D Nat) D)))))", []string{"not positive"}},
	{"in the domain of a path's line", term.BadDeclaration, "(data D () (point c ((x D) (p @(Path (-> D D) (lam (y) x) (lam (y) x))))))", []string{"not positive"}},
	{"under an unknown family", term.BadDeclaration, "(data D () (point c ((x @(F D)))))", []string{"not known to be positive"}},
	{"in a pair", term.BadDeclaration, "(data D () (point c ((x @(* D Nat)))))", []string{"not known to be positive", "(* D Nat)"}},
	{"in the parameters of another data type", term.BadDeclaration, "(data D () (point c ((xs @(List D)))))", []string{"inside the parameters of another data type"}},
	{"in a sum", term.BadDeclaration, "(data D () (point c ((xs @(Sum Nat D)))))", []string{"inside the parameters of another data type"}},
	{"in the ends of a path of types", term.BadDeclaration, "(data D () (point c ((p @(Path (U 0) D D)))))", []string{"not known to be positive"}},
	{"at another parameter", term.BadDeclaration, "(data D ((A (U 0))) (point c ((x @(D Nat)))))", []string{"own parameters", "expected A, found Nat"}},
	{"at parameters in another order", term.BadDeclaration, "(data D ((A (U 0)) (B (U 0))) (point c ((x @(D B A)))))", []string{"own parameters"}},
	{"nested in itself", term.BadDeclaration, "(data D ((A (U 0))) (point c ((x @(D (D A))))))", []string{"own parameters"}},
	{"at a changed function parameter", term.BadDeclaration, "(data D ((A (U 0)) (f (-> A A))) (point c ((x @(D A (lam (a) (f (f a))))))))", []string{"own parameters"}},
	{"an index", term.BadDeclaration, "(data D ((n Nat)) (point c ((x @(D (suc n))))))", []string{"indexed families"}},
	{"through a definition", term.BadDeclaration, "(def Not (-> (U 0) (U 0)) (lam (X) (-> X Empty))) (data D () (point c ((f @(Not D)))))", []string{"not positive"}},
	// universes
	{"too large for the universe it is used at", term.IllTyped, "(data D () (point c ((A (U 0))))) (def d (U 0) @D)", []string{"expected (U 0), found (U 1)"}},
	{"an argument of no type", term.IllTyped, "(data D () (point c ((x @0))))", []string{"no type"}},
	{"a parameter of no type", term.IllTyped, "(data D ((x @zero)) (point c ()))", []string{"no type"}},
	{"an element of a universe that it is too large for", term.IllTyped, "(data D () (point c ((A (U 0)))) (path p () (i) ((= i 0) (c @D)) ((= i 1) (c Nat))))", []string{"expected (U 0), found (U 1)", "on the face (= i 0)"}},
	{"itself in the type of a parameter", term.NotFound, "(data D ((x @D)) (point c ()))", []string{"found D"}},
	{"itself at a parameter in the type of another", term.NotFound, "(data D ((A (U 0)) (x (@D A))) (point c ((B (U 0)))))", []string{"found D"}},
	// boundaries
	{"an element of another type", term.IllTyped, "(data D () (point c ()) (path p () (i) ((= i 0) @true)))", []string{"expected D, found an element of Bool", "on the face (= i 0)"}},
	{"a constructor of another type", term.IllTyped, "(data D ((A (U 0))) (point c ()) (path p () (i) ((= i 0) @nil)))", []string{"does not make an element of this type"}},
	{"a later constructor", term.NotFound, "(data D () (path p () (i) ((= i 0) @c)) (point c ()))", []string{"found c"}},
	{"the constructor itself", term.NotFound, "(data D () (point c ()) (path p () (i) ((= i 0) (@p i))))", []string{"found p"}},
	{"a later constructor where nothing stands", term.NotFound, "(data D () (path p () (i) (bot @c)) (point c ()))", []string{"found c"}},
	{"disagreement on an overlap", term.Disagreement, "(data D () (point c ()) (point d ()) (path p () (i j) ((= i 0) c) ((= j 1) @d)))", []string{"on the face (and (= i 0) (= j 1))", "expected c, found d"}},
	{"disagreement of sides in a corner", term.Disagreement, "(data D () (point c ()) (point d ()) (path e () (i) ((= i 0) c) ((= i 1) d)) (path p () (i j) ((= i 0) (e j)) ((= j 0) @(e (rev i)))))", []string{"on the face (and (= i 0) (= j 0))", "expected c, found d"}},
	{"disagreement with an argument", term.Disagreement, "(data D () (path p ((x D) (y D)) (i j) ((= i 0) x) ((or (= i 0) (= j 1)) @y)))", []string{"on the face (= i 0)", "expected x, found y"}},
	{"an elimination of what is being declared", term.BadDeclaration, "(data D () (point c ()) (point d ((x D))) (path p ((x D)) (i) ((= i 0) @(elim (_ D) x (c c) ((d y h) h)))))", []string{"may not eliminate it"}},
	{"a face of no dimension", term.NotFound, "(data D () (point c ()) (path p () (i) ((= @j 0) c)))", []string{"found j"}},
	// the form of declarations
	{"both treatments", term.BadDeclaration, "@(data D () (composition strict) (composition formal) (point c ()))", []string{"both treatments", "not be stable under substitution"}},
	{"strict with a path constructor", term.BadDeclaration, "@(data D () (composition strict) (point c ()) (path p () (i) ((or (= i 0) (= i 1)) c)))", []string{"need formal composites", "not be stable under substitution"}},
	{"a constructor twice", term.Duplicate, "(data D () (point c ()) @(point c ()))", []string{"stands twice"}},
	{"a constructor called as the type", term.Duplicate, "(data D () @(point D ()))", []string{"stands twice"}},
	{"a constructor of another type again", term.Duplicate, "(data D () @(point cons ()))", []string{"declared already"}},
	// uses
	{"too few parameters", term.IllTyped, "(def d (U 0) @List)", []string{"stands with its parameters"}},
	{"too few arguments", term.IllTyped, "(def d (List Nat) @(cons 1))", []string{"2 arguments and 0 dimensions", "1 in all"}},
	{"too many dimensions", term.IllTyped, "(def d (-> I Circle) (lam (i) @(loop i i)))", []string{"0 arguments and 1 dimensions"}},
	{"no type to infer", term.IllTyped, "(def d Nat (elim (_ Nat) @nil (nil 0) ((cons x xs h) 0)))", []string{"cannot be inferred"}},
	// eliminations
	{"a case is missing", term.BadDeclaration, "(def f (-> (List Nat) Nat) (lam (l) @(elim (_ Nat) l (nil 0))))", []string{"a case of cons"}},
	{"a case stands twice", term.BadDeclaration, "(def f (-> Bool Nat) (lam (b) (elim (_ Nat) b (true 0) (@true 1) (false 0))))", []string{"stands twice"}},
	{"a case of another type", term.BadDeclaration, "(def f (-> Bool Nat) (lam (b) (elim (_ Nat) b (true 0) (false 1) (@nil 0))))", []string{"no constructor of Bool"}},
	{"too few names", term.BadDeclaration, "(def f (-> (List Nat) Nat) (lam (l) (elim (_ Nat) l (nil 0) ((@cons x xs) 0))))", []string{"2 arguments, 1 hypotheses and 0 dimensions", "2 names"}},
	{"too many names", term.BadDeclaration, "(def f (-> Circle Nat) (lam (l) (elim (_ Nat) l (base 0) ((@loop x i) 0))))", []string{"0 arguments, 0 hypotheses and 1 dimensions"}},
	{"what is no data", term.IllTyped, "(def f (-> (-> Nat Nat) Nat) (lam (g) (elim (_ Nat) @g (zero 0) ((suc n h) 0))))", []string{"only elements of data types"}},
	{"a case of the wrong type", term.IllTyped, "(def f (-> Bool Nat) (lam (b) (elim (_ Nat) b (true 0) (false @false))))", []string{"expected Nat, found an element of Bool"}},
	{"a dependent case of the wrong instance", term.IllTyped, "(assume g (Pi ((n Nat)) (G n))) (def f (Pi ((n Nat)) (G n)) (lam (n) (elim (x (G x)) n (zero (g 0)) ((suc n h) @h))))", []string{"expected (G (suc n)), found (G n)"}},
	{"a path case with a wrong face", term.Disagreement, "(def f (-> Circle Circle) (lam (x) (elim (_ Circle) x (base base) ((loop i) @(hcomp Circle (loop i))))))", []string{"the case of loop", "on the face (= i 0)", "expected base, found (hcomp Circle base)"}},
	{"a path case with one wrong face", term.Disagreement, "(def f (-> (Susp P) Nat) (lam (x) (elim (_ Nat) x (north 4) (south 5) ((merid a i) @4))))", []string{"the case of merid", "on the face (= i 1)", "expected 5, found 4"}},
	{"a square case on a side", term.Disagreement, "(def f (-> Square Circle) (lam (x) (elim (_ Circle) x (corner base) ((side i) (loop i)) ((top2 i j) @(loop i)))))", []string{"on the face (= i 0)", "expected (loop j), found base"}},
	{"a dependent path case", term.Disagreement, "(assume Q (-> Circle (U 0))) (assume q (Q base)) (assume r (PathOver (i (Q (loop i))) q q)) (assume q2 (Q base)) (assume r2 (PathOver (i (Q (loop i))) q2 q)) (def f (Pi ((x Circle)) (Q x)) (lam (x) (elim (x (Q x)) x (base q) ((loop k) @(at r2 k)))))", []string{"on the face (= k 0)", "expected q, found q2"}},
	{"hypotheses that are swapped", term.Disagreement, "(data T ((A (U 0))) (point in ((a A))) (path sq ((x (T A)) (y (T A))) (i) ((= i 0) x) ((= i 1) y))) (def f (-> (Pi ((x P) (y P)) (Path P x y)) (T P) P) (lam (h t) (elim (_ P) t ((in a) a) ((sq x y hx hy k) @(at (h hy hx) k)))))", []string{"the case of sq", "on the face (= k 0)", "expected (elim (_ P) x ((in a) a)), found (elim (_ P) y ((in a) a))"}},
	{"a family of no types", term.IllTyped, "(def f (-> Bool Nat) (lam (b) (elim (x @x) b (true 0) (false 0))))", []string{"no type"}},
}

func TestDataRefusals(t *testing.T) {
	require.GreaterOrEqual(t, len(refusals), 40)
	for _, r := range refusals {
		t.Run(r.name, func(t *testing.T) {
			before, after, marked := strings.Cut(r.text, "@")
			require.True(t, marked)
			results := ran(t, carriers+before+after)
			last := results[len(results)-1]
			for _, earlier := range results[:len(results)-1] {
				require.NoError(t, earlier.Err, "%s", earlier.Form)
			}
			require.Error(t, last.Err)
			require.Equal(t, r.kind, term.KindOf(last.Err), "%s", last.Err)
			e := last.Err.(*term.Error)
			require.Equal(t, strings.Count(carriers, "\n")+1, e.Place.Line, "%s", e)
			require.Equal(t, len([]rune(before))+1, e.Place.Column, "%s", e)
			for _, part := range r.says {
				require.Contains(t, e.Error(), part)
			}
			if r.kind == term.Disagreement {
				require.NotEmpty(t, e.Face)
				require.NotNil(t, e.Want)
				require.NotNil(t, e.Got)
			}
			// nothing of it is added
			if e.Kind != term.Duplicate {
				more := ran(t, carriers+"(reject "+lastForm(before+after)+")\n(data D () (point c ()))")
				require.NoError(t, more[len(more)-1].Err)
			}
		})
	}
}

// lastForm is the last top form of a line of forms.
func lastForm(text string) string {
	depth, start := 0, 0
	for k, c := range text {
		switch c {
		case '(':
			if depth == 0 {
				start = k
			}
			depth++
		case ')':
			depth--
		}
	}
	return text[start:]
}
