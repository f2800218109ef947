package script_test

// The account of a declaration: what it says of each rule, and that what it
// writes as an equation is one.

import (
	"context"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
)

const accounts = `
(data List ((A (U 0))) (point nil ()) (point cons ((x A) (xs (List A)))))
(data Pushout ((A (U 0)) (B (U 0)) (C (U 0)) (f (-> C A)) (g (-> C B)))
  (point left ((a A))) (point right ((b B))) (path push ((c C)) (i) ((= i 0) (left (f c))) ((= i 1) (right (g c)))))
(data Trunc ((A (U 0))) (point some ((a A))) (path squash ((x (Trunc A)) (y (Trunc A))) (i) ((= i 0) x) ((= i 1) y)))
(data SetTrunc ((A (U 0))) (point elt ((a A)))
  (path fill-square ((x (SetTrunc A)) (y (SetTrunc A)) (p (Path (SetTrunc A) x y)) (q (Path (SetTrunc A) x y))) (i j)
    ((= i 0) (at p j)) ((= i 1) (at q j)) ((= j 0) x) ((= j 1) y)))
(data Rose ((A (U 0)) (B (-> A (U 0)))) (point rose ((a A) (f (-> (B a) (Rose A B))))))
(data Large () (point large ((A (U 1)) (a A))))
(data Formal () (composition formal) (point only ()))
(data Slack () (point coiled ()) (path loose () (i) (top coiled)))
(data Strict () (composition strict) (point only-strict ()))
(data Rigging () (point knot ()) (point end ((n Nat) (x Rigging)))
  (path rope ((n Nat) (x Rigging)) (i) ((= i 0) (end n x)) ((= i 1) knot))
  (path sheet ((m Nat) (y Rigging)) (i j) ((= i 0) (rope m y j)) ((= i 1) (rope m y j)))
  (path corner ((_ Nat)) (i j) ((and (= i 0) (= j 1)) knot)))
`

func accountOf(t *testing.T, name string) *nbe.Account {
	t.Helper()
	e, err := nbe.New()
	require.NoError(t, err)
	s := &script.Session{Engine: e, Report: func(r script.Result) { require.NoError(t, r.Err) }}
	require.NoError(t, s.Source(context.Background(), []byte(accounts), "given"))
	a, err := e.Account(context.Background(), name)
	require.NoError(t, err)
	return a
}

func TestAccountSaysTheRules(t *testing.T) {
	for name, lines := range map[string][]string{
		"List": {
			"List, a data type in (U 0), composition strict",
			"  (List A) : (U 0)", "    for A : (U 0)",
			"  (cons x xs) : (List A)", "    for xs : (List A), recursive",
			"  ((cons x xs hxs) u), u : (P (cons x xs))", "    for hxs : (P xs), the hypothesis of xs",
			"  (hcomp (List A) (cons (x 0) (xs 0)) ((= k 0) (j) (cons (x j) (xs j)))) = (cons (hcomp A (x 0) ((= k 0) (j) (x j))) (hcomp (List A) (xs 0) ((= k 0) (j) (xs j))))",
			"  (transp (i (List (A i))) bot (cons x xs)) = (cons (transp (i (A i)) bot x) (transp (i (List (A i))) bot xs))",
		},
		"Pushout": {
			"Pushout, a data type in (U 0), composition formal",
			"    on (= i 0) it is (left (f c))", "    on (= i 1) it is (right (g c))",
			"    on (= i 0) it must be (left-case (f c))", "    on (= i 1) it must be (right-case (g c))",
			"    push is corrected by a composite: its boundary is built from more than arguments, dimensions and constructors that commute",
		},
		"Trunc": {
			"    on (= i 0) it must be hx", "    on (= i 1) it must be hy",
			"    squash commutes with transport: its boundary is built from arguments, dimensions and such constructors alone",
		},
		"SetTrunc": {"    for hp : (PathOver (i (P (at p i))) hx hy), the hypothesis of p", "    on (= i 0) it must be (at hp j)"},
		"Rose":     {"    for hf : (Pi ((y (B a))) (P (f y))), the hypothesis of f"},
		"Large":    {"Large, a data type in (U 2), composition strict", "  Large : (U 2)", "  (transp (i Large) φ a) = a"},
		"Formal":   {"Formal, a data type in (U 0), composition formal"},
		"Strict":   {"Strict, a data type in (U 0), composition strict"},
		"Slack":    {"    on top it is coiled", "    on top it must be coiled-case"},
		"Rigging": {
			"    on (= i 0) it is (end n x)", "    on (and (= i 0) (= j 1)) it is knot",
			"    on (= i 0) it must be (end-case n x hx)", "    on (= i 0) it must be (rope-case m y hy j)", "    on (and (= i 0) (= j 1)) it must be knot-case",
		},
		"Nat":   {"  (suc n) : Nat", "  ((suc n hn) u), u : (P (suc n))", "  (hcomp Nat 0 ((= k 0) (j) 0)) = 0"},
		"Empty": {"  none"},
	} {
		all := strings.Split(accountOf(t, name).String(), "\n")
		for _, line := range lines {
			require.Contains(t, all, line, "%s:\n%s", name, strings.Join(all, "\n"))
		}
	}
}

// TestAccountEquationsHold puts the equations of an account back to the engine.
func TestAccountEquationsHold(t *testing.T) {
	for name, given := range map[string]string{
		"List":     "(assume A (-> I (U 0))) (assume x (A 0)) (assume xs (List (A 0)))",
		"Pushout":  "(assume A (-> I (U 0))) (assume B (-> I (U 0))) (assume C (-> I (U 0))) (assume f (Pi ((i I)) (-> (C i) (A i)))) (assume g (Pi ((i I)) (-> (C i) (B i)))) (assume a (A 0)) (assume b (B 0)) (assume c (C 0))",
		"Trunc":    "(assume A (-> I (U 0))) (assume a (A 0)) (assume x (Trunc (A 0))) (assume y (Trunc (A 0)))",
		"SetTrunc": "(assume A (-> I (U 0))) (assume a (A 0)) (assume x (SetTrunc (A 0))) (assume y (SetTrunc (A 0))) (assume p (Path (SetTrunc (A 0)) x y)) (assume q (Path (SetTrunc (A 0)) x y))",
		"Rose":     "(assume A (-> I (U 0))) (assume B (Pi ((i I)) (-> (A i) (U 0)))) (assume a (A 0)) (assume f (-> (B 0 a) (Rose (A 0) (B 0))))",
	} {
		a := accountOf(t, name)
		types := map[string]string{"List": "(List (A 1))", "Pushout": "(Pushout (A 1) (B 1) (C 1) (f 1) (g 1))", "Trunc": "(Trunc (A 1))", "SetTrunc": "(SetTrunc (A 1))", "Rose": "(Rose (A 1) (B 1))"}
		sources := map[string]string{"List": "(List (A 0))", "Pushout": "(Pushout (A 0) (B 0) (C 0) (f 0) (g 0))", "Trunc": "(Trunc (A 0))", "SetTrunc": "(SetTrunc (A 0))", "Rose": "(Rose (A 0) (B 0))"}
		section := a.Sections[len(a.Sections)-1]
		held := 0
		for _, rule := range section.Rules {
			left, right, equation := strings.Cut(rule[0], " = ")
			if !equation || strings.Contains(left, "φ") {
				continue
			}
			// what is transported is a constructor: its type must be given, its dimensions bound
			open := strings.LastIndex(left, " bot ") + len(" bot ")
			left = left[:open] + "(ann " + strings.TrimSuffix(left[open:], ")") + " " + sources[name] + "))"
			text := "(same (-> I I " + types[name] + ") (lam (i j) " + left + ") (lam (i j) " + right + "))"
			results := ran(t, accounts+given+text)
			require.NoError(t, results[len(results)-1].Err, "%s", text)
			held++
		}
		require.NotZero(t, held)
	}
}

func TestAccountOfWhatIsNoDataType(t *testing.T) {
	e, err := nbe.New()
	require.NoError(t, err)
	for _, name := range []string{"suc", "nothing", ""} {
		_, err := e.Account(context.Background(), name)
		require.Equal(t, term.NotFound, term.KindOf(err))
	}
	_, err = e.Account(context.Background(), "Nat", nbe.Within(nbe.Limits{Steps: 1}))
	require.Equal(t, term.OutOfBudget, term.KindOf(err))
	results := ran(t, "(show Nat) (show suc)")
	require.Contains(t, results[0].Text, "a data type in (U 0)")
	require.Error(t, results[1].Err)
}

func TestDataRefusalsThroughTheAPI(t *testing.T) {
	e, err := nbe.New()
	require.NoError(t, err)
	for name, d := range map[string]*term.Declaration{
		"a path constructor without dimensions": {Name: "D", Constructors: []term.Constructor{{Name: "p", Path: true}}},
		"an unknown treatment":                  {Name: "D", Composition: "lax", Compositions: 1},
		"strict with paths": {Name: "D", Composition: "strict", Compositions: 1, Constructors: []term.Constructor{
			{Name: "p", Path: true, Dims: []term.Binder{{Name: "i"}}}}},
	} {
		require.Equal(t, term.BadDeclaration, term.KindOf(e.Declare(context.Background(), d)), name)
	}
	for name, d := range map[string]*term.Declaration{
		"no declaration":     nil,
		"no name":            {},
		"no type":            {Name: "D", Params: []term.Param{{Name: "A"}}},
		"no face":            {Name: "D", Constructors: []term.Constructor{{Name: "p", Path: true, Dims: []term.Binder{{Name: "i"}}, Boundary: []term.BoundaryWall{{}}}}},
		"no element":         {Name: "D", Constructors: []term.Constructor{{Name: "p", Path: true, Dims: []term.Binder{{Name: "i"}}, Boundary: []term.BoundaryWall{{Face: term.Eq(term.Name("i"), 0)}}}}},
		"a head word":        {Name: "hcomp"},
		"a bad name of dims": {Name: "D", Constructors: []term.Constructor{{Name: "p", Path: true, Dims: []term.Binder{{Name: "("}}}}},
	} {
		err := e.Declare(context.Background(), d)
		require.Error(t, err, name)
		require.NotEqual(t, term.Internal, term.KindOf(err), "%s: %v", name, err)
	}
	require.NoError(t, e.Declare(context.Background(), &term.Declaration{Name: "D"}))
}
