// Package quay holds the demo scripts: a cargo quay with cable drums, berths,
// crates and re-labellings. Each is run by its test, and by hand with
// "go run ./examples/script examples/quay/quay.sexp".
package quay

import (
	"context"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/script"
)

func TestScripts(t *testing.T) {
	files, err := filepath.Glob("*.sexp")
	require.NoError(t, err)
	require.NotEmpty(t, files)
	for _, file := range files {
		t.Run(file, func(t *testing.T) {
			engine, err := nbe.New()
			require.NoError(t, err)
			reported := 0
			s := &script.Session{Engine: engine, Report: func(r script.Result) {
				assert.NoError(t, r.Err)
				if r.Text != "" {
					reported++
				}
			}}
			require.NoError(t, s.File(context.Background(), file))
			assert.Positive(t, reported)
		})
	}
}

// The script that the README runs first exercises every type that it says is supported.
func TestTheFirstScriptHasEveryType(t *testing.T) {
	text, err := os.ReadFile("quay.sexp")
	require.NoError(t, err)
	for _, word := range []string{
		"Nat", "Bool", "Unit", "Empty", "Sum", "Circle", "(-> I ", "(Pi ", "(* ", "(Path ", "(U ", "(Equiv ", "(ua ",
		"transp", "hcomp", "(normal ", "(same ", "(differ ", "(show ", "(blocked ", "(reject ", "(load ", "(assume ",
	} {
		assert.Contains(t, strings.ReplaceAll(string(text), "\n", " "), word)
	}
}
