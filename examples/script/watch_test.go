package main

import (
	"bytes"
	"context"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/google/pprof/profile"
	"github.com/stretchr/testify/require"
)

const berths = `
(def add (-> Nat Nat Nat) (lam (m n) (elim (x Nat) m (zero n) ((suc k h) (suc h)))))
(def pick (-> (Sum Nat Nat) Nat) (lam (s) (elim (x Nat) s ((inl n) (add n 1)) ((inr n) n))))
(show (pick (inl 3)))
`

// -profile writes what the library of those who made the format reads.
func TestProfileFlag(t *testing.T) {
	dir := t.TempDir()
	src, out := filepath.Join(dir, "berths.sexp"), filepath.Join(dir, "work.pb.gz")
	require.NoError(t, os.WriteFile(src, []byte(berths), 0o600))
	var stdout, stderr bytes.Buffer
	require.Equal(t, good, run(context.Background(), []string{"-profile", out, src}, nil, &stdout, &stderr), "%s", stderr.String())
	f, err := os.Open(out)
	require.NoError(t, err)
	defer f.Close()
	p, err := profile.Parse(f)
	require.NoError(t, err)
	require.NoError(t, p.CheckValid())
	lines := map[string]int64{}
	for _, fn := range p.Function {
		if fn.Filename == src {
			lines[fn.Name] = fn.StartLine
		}
	}
	require.EqualValues(t, 2, lines["add"])
	require.EqualValues(t, 3, lines["pick"])

	// a place that cannot be written is an error
	require.Equal(t, unreadable, run(context.Background(), []string{"-profile", filepath.Join(dir, "no", "place"), src}, nil, &stdout, &stderr))
}

// -follow prints the rules that the filter wants, and no more than the limit.
func TestFollowFlag(t *testing.T) {
	src := filepath.Join(t.TempDir(), "berths.sexp")
	require.NoError(t, os.WriteFile(src, []byte(berths), 0o600))
	followed := func(args ...string) []string {
		var stdout, stderr bytes.Buffer
		require.Equal(t, good, run(context.Background(), append(args, src), nil, &stdout, &stderr), "%s", stderr.String())
		var lines []string
		for _, l := range strings.Split(stdout.String(), "\n") {
			if strings.HasPrefix(l, "#") {
				lines = append(lines, l)
			}
		}
		return lines
	}
	require.Equal(t, "#1 elim Sum, in pick: (elim (_ …) (inl 3) ((inl n) …))", followed("-follow", "elim Sum")[0])
	for _, l := range followed("-follow", "add") {
		if !strings.Contains(l, " = ") {
			require.Contains(t, l, ", in add: ")
		}
	}
	all := followed("-follow", "all", "-follow-limit", "3")
	require.Contains(t, all, "#… no further rules: -follow-limit is 3")
	require.NotContains(t, strings.Join(all, "\n"), "#4")
	require.Empty(t, followed("-follow", "transp"))
}
