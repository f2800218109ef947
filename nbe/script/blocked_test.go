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
	require.Equal(t, []string{"the face (or (= i 0) (= i 1))", "a definition of steps"}, p.Release)
}

func blocked(ctx context.Context, x *nbe.Term, options ...nbe.CallOption) (*nbe.Blockage, error) {
	return x.Scope().Blocked(ctx, x, options...)
}
