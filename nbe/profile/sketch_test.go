package profile_test

import (
	"context"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
)

// Whatever a script computes can be followed: each rule tells what it is applied
// to and what it gave, in the few levels that a sketch has, and the script does
// what it does when nobody looks.
func TestScriptsAreFollowed(t *testing.T) {
	seen := map[string]bool{}
	for _, pattern := range []string{"../script/testdata/data/*.sexp", "../script/testdata/book/*.sexp"} {
		files, err := filepath.Glob(pattern)
		require.NoError(t, err)
		require.NotEmpty(t, files)
		for _, file := range files {
			e, err := nbe.New()
			require.NoError(t, err)
			var begun, done int
			follow := &nbe.Follow{Limit: 1 << 20, Results: true, Event: func(ev *nbe.Event) {
				seen[strings.SplitN(ev.Rule, " at ", 2)[0]] = true
				w := ev.Before()
				if ev.Done {
					done++
					w = ev.After()
				} else {
					begun++
				}
				require.NotNil(t, w, "%s in %s", ev.Rule, file)
				require.Less(t, nodes(w), 4000, "%s in %s", ev.Rule, file)
			}}
			s := script.Session{Engine: e, Options: []nbe.CallOption{nbe.Following(follow)}, Report: func(r script.Result) {
				require.NoError(t, r.Err, "%s", r.Form.Place)
			}}
			require.NoError(t, s.File(context.Background(), file))
			require.NotZero(t, begun)
			require.LessOrEqual(t, done, begun)
		}
	}
	for _, rule := range []string{"function applied", "path", "hcomp", "transp"} {
		require.Contains(t, seen, rule)
	}
}

func nodes(w *term.Written) int { return strings.Count(w.String(), " ") + 1 }

// before follows a computation and returns what rules named rule were applied to.
func before(t *testing.T, given, text, rule string) (out []string) {
	e, err := nbe.New()
	require.NoError(t, err)
	load(t, e, given)
	_, _, err = normal(t, e, text, nbe.Following(&nbe.Follow{Event: func(ev *nbe.Event) {
		if strings.HasPrefix(ev.Rule, rule) {
			out = append(out, ev.Before().String())
		}
	}}))
	require.NoError(t, err)
	return out
}

// An argument that is a dimension stands in a sketch as what it is.
func TestSketchesShowDimensions(t *testing.T) {
	const given = "(assume A (U 0)) (assume f (-> I A)) (def turned (-> (-> I A) (-> I A)) (lam (g i) (g (rev i))))"
	for text, want := range map[string]string{"(turned f 0)": "0", "(turned f 1)": "1"} {
		var found bool
		for _, w := range before(t, given, text, "function applied") {
			found = found || strings.HasSuffix(w, " "+want+")")
		}
		require.True(t, found, "%s: %v", text, before(t, given, text, "function applied"))
	}
	for _, w := range before(t, given, "(turned f 1)", "unfolding turned") {
		require.Contains(t, w, "turned")
	}
}

// Sums of numbers are one elimination, which is followed as such.
func TestSumsAreFollowed(t *testing.T) {
	const given = "(def add (-> Nat Nat Nat) (lam (m n) (elim (_ Nat) m (zero n) ((suc k h) (suc h)))))"
	require.Equal(t, []string{"(elim (_ …) 30 (zero …) ((suc k h) …))"}, before(t, given, "(add 30 4)", "elim Nat"))
}

// What is unglued stands under its unglue.
func TestUngluedIsSketched(t *testing.T) {
	const given = `(assume A (-> I (U 0))) (assume T (U 0)) (assume e (Equiv T (A 0))) (assume g (Pi ((i I)) (Glue (A i) ((= i 0) T e))))
		(def same-again (Pi ((i I)) (-> (A i) (A i))) (lam (i a) a))`
	found := strings.Join(before(t, given, "(ann (lam (i) (same-again i (unglue (g i)))) (Pi ((i I)) (A i)))", "function applied"), " ")
	require.Contains(t, found, "(unglue (g i")
}

// An event, a trace and a rule of no computation have nothing to show.
func TestNothingToFollow(t *testing.T) {
	var ev nbe.Event
	require.Equal(t, "…", ev.Before().String())
	require.Equal(t, "…", ev.After().String())
	require.Empty(t, ev.Path())
	var trace value.Trace
	trace.End()
	for range trace.Root().Below {
		t.Fatal("a path of no run")
	}
	require.Equal(t, "unknown", value.StepKind(value.StepKinds).String())
}
