package script_test

import (
	"context"
	"flag"
	"fmt"
	"os"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/value/interval"
)

var updateBlocked = flag.Bool("update-blocked", false, "write the golden file of what is stuck anew")

// What keeps each of the terms in testdata/blocked/stuck.sexp from computing is
// what stuck.golden says: variables, assumptions, holes, definitions kept folded,
// faces; each elimination, transports, composites, Glue.
func TestBlocked(t *testing.T) {
	const source, golden = "testdata/blocked/stuck.sexp", "testdata/blocked/stuck.golden"
	ctx := context.Background()
	e, err := nbe.New()
	require.NoError(t, err)
	var out strings.Builder
	count := 0
	s := script.Session{Engine: e, Report: func(r script.Result) {
		require.NoError(t, r.Err)
		if r.Form.Kind == notation.Blocked {
			count++
			fmt.Fprintf(&out, "%s\n%s\n\n", r.Form.Term, indent(r.Text))
		}
	}}
	require.NoError(t, s.File(ctx, source))

	// what only a host can bring about
	read := func(text string) *nbe.Term {
		w, err := notation.ReadTerm(text, "host.sexp", e.Words())
		require.NoError(t, err)
		x, err := e.Scope().Infer(ctx, w)
		require.NoError(t, err)
		return x
	}
	nat, err := notation.ReadTerm("Nat", "host.sexp", e.Words())
	require.NoError(t, err)
	require.NoError(t, e.Hole(ctx, "unknown", nat))
	for _, c := range []struct {
		text    string
		options []nbe.CallOption
	}{
		{"(add unknown 1)", nil},
		{"(multiply (add unknown 1) crates)", nil},
		{"(add (multiply 2 3) 1)", []nbe.CallOption{nbe.Opaque("multiply")}},
		{"(add crates (multiply 2 3))", []nbe.CallOption{nbe.Opaque("add")}},
	} {
		count++
		b, err := blocked(ctx, read(c.text), c.options...)
		require.NoError(t, err)
		fmt.Fprintf(&out, "%s\n%s\n\n", c.text, indent(b.String()))
	}
	require.GreaterOrEqual(t, count, 30)
	if *updateBlocked {
		require.NoError(t, os.WriteFile(golden, []byte(out.String()), 0o644))
	}
	want, err := os.ReadFile(golden)
	require.NoError(t, err)
	require.Equal(t, string(want), out.String())
}

func indent(text string) string { return "  " + strings.ReplaceAll(text, "\n", "\n  ") }

// The account is a value: what a host reads off it without parsing text.
func TestBlockedIsAValue(t *testing.T) {
	ctx := context.Background()
	e, err := nbe.New()
	require.NoError(t, err)
	s := script.Session{Engine: e, Report: func(r script.Result) { require.NoError(t, r.Err) }}
	require.NoError(t, s.File(ctx, "testdata/blocked/stuck.sexp"))
	w, err := notation.ReadTerm("(ann (lam (i) (add (at steps i) 1)) (-> I Nat))", "host.sexp", e.Words())
	require.NoError(t, err)
	x, err := e.Scope().Infer(ctx, w)
	require.NoError(t, err)
	_, err = x.Scope().Normal(ctx, x) // what another call has evaluated makes no difference
	require.NoError(t, err)
	b, err := blocked(ctx, x)
	require.NoError(t, err)
	require.Len(t, b.Parts, 1)
	p := b.Parts[0]
	require.Equal(t, nbe.HeadAssumption, p.Head)
	require.Equal(t, "steps", p.Name)
	require.Len(t, p.Waiting, 2)
	require.Equal(t, "a path at a dimension", p.Waiting[0].Operation)
	require.Empty(t, p.Waiting[0].Definition)
	require.Equal(t, "an elimination of Nat", p.Waiting[1].Operation)
	require.Equal(t, "add", p.Waiting[1].Definition)
	require.Equal(t, 3, p.Waiting[1].Place.Line)
	require.Len(t, p.Release, 2)
	require.Equal(t, nbe.ReleaseFace, p.Release[0].Kind)
	require.True(t, p.Release[0].Face.Equal(interval.Eq0(0).Or(interval.Eq1(0))), "i is dimension 0")
	require.Equal(t, "the face (or (= i 0) (= i 1))", p.Release[0].String())
	require.Equal(t, nbe.ReleaseDefinition, p.Release[1].Kind)
	require.Equal(t, "steps", p.Release[1].Name)

	w, err = notation.ReadTerm("(ann (lam (k i) (hcomp Nat 3 ((= i 0) (j) (at steps j)))) (-> I I Nat))", "host.sexp", e.Words())
	require.NoError(t, err)
	x, err = e.Scope().Infer(ctx, w)
	require.NoError(t, err)
	b, err = blocked(ctx, x)
	require.NoError(t, err)
	p = b.Parts[0]
	require.Equal(t, nbe.HeadComposite, p.Head)
	require.Len(t, p.Walls, 1)
	require.Equal(t, nbe.ObstacleWall, p.Walls[0].Kind)
	require.True(t, p.Walls[0].Face.Equal(interval.Eq0(1)), "i is dimension 1")
	require.Equal(t, "(at steps j)", p.Walls[0].Term.String())
	require.Equal(t, []string{"", "3"}, []string{p.Walls[0].Shows, p.Walls[0].Wanted})
	require.Equal(t, nbe.ReleaseFace, p.Release[0].Kind)
	require.True(t, p.Release[0].Face.Equal(interval.Eq0(1)))
}

func blocked(ctx context.Context, x *nbe.Term, options ...nbe.CallOption) (*nbe.Blockage, error) {
	return x.Scope().Blocked(ctx, x, options...)
}

// A composite of constructors waits for the wall that shows none, and its base
// says which is wanted; a part that stands in many places is told once.
func TestBlockedTellsWhatIsWantedAndEachPartOnce(t *testing.T) {
	ctx := context.Background()
	e, err := nbe.New()
	require.NoError(t, err)
	s := script.Session{Engine: e, Report: func(r script.Result) { require.NoError(t, r.Err) }}
	require.NoError(t, s.Source(ctx, []byte(`(assume crates Nat) (assume lamp (Path Bool true true))
(def add (-> Nat Nat Nat) (lam (m n) (elim (x Nat) m (zero n) ((suc k h) (suc h)))))
(def both (Pi ((A (U 0))) (-> A (* A A))) (lam (A a) (pair a a)))`), "quay.sexp"))
	read := func(text string) *nbe.Blockage {
		w, err := notation.ReadTerm(text, "host.sexp", e.Words())
		require.NoError(t, err)
		x, err := e.Scope().Infer(ctx, w)
		require.NoError(t, err)
		b, err := blocked(ctx, x)
		require.NoError(t, err)
		return b
	}
	b := read("(ann (lam (i) (hcomp Bool true ((= i 0) (j) (at lamp j)))) (-> I Bool))")
	require.NotEmpty(t, b.Parts)
	require.Len(t, b.Parts[0].Walls, 1)
	require.Equal(t, nbe.ObstacleWall, b.Parts[0].Walls[0].Kind)
	require.Equal(t, "true", b.Parts[0].Walls[0].Wanted)
	require.Empty(t, b.Parts[0].Walls[0].Shows)

	once := read("(add crates 1)")
	require.Len(t, once.Parts, 1)
	many := read("(both (* Nat Nat) (both Nat (add crates 1)))")
	require.Len(t, many.Parts, 1)
	require.Equal(t, once.Parts[0].Part.String(), many.Parts[0].Part.String())
}
