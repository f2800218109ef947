package script_test

// Lemmas of the HoTT Book ("Homotopy Type Theory: Univalent Foundations of
// Mathematics", 2013), chapters 2 and 3, as checked definitions: each file under
// testdata/book is a script all of whose forms must do what they should, in the
// engine as it is, in the plain evaluator and with names drawn at random. The
// numbers beside the definitions are the Book's, written from memory.

import (
	"context"
	"os"
	"path/filepath"
	"regexp"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/value"
)

// numbered are the lemmas that must be there.
var numbered = []string{
	"2.1.1", "2.1.2", "2.1.4", "2.1.6", "2.2.1", "2.2.2",
	"2.3.1", "2.3.2", "2.3.4", "2.3.5", "2.3.6", "2.3.7", "2.3.8", "2.3.9", "2.3.10",
	"2.6.2", "2.7.2", "2.9.3", "2.11.2", "2.12.5", "2.13.1", "3.11.8",
}

func TestBook(t *testing.T) {
	files, err := filepath.Glob("testdata/book/*.sexp")
	require.NoError(t, err)
	builds := map[string]struct {
		options []nbe.Option
		call    []nbe.CallOption
	}{
		"fast":         {},
		"plain":        {options: []nbe.Option{nbe.WithPlain(value.Plain{NoSupport: true, Eager: true, NoFrontier: true, NoNumerals: true})}},
		"random names": {call: []nbe.CallOption{nbe.DrawNames(3)}},
	}
	all := ""
	for _, file := range files {
		text, err := os.ReadFile(file)
		require.NoError(t, err)
		all += string(text)
		t.Run(filepath.Base(file), func(t *testing.T) {
			for name, b := range builds {
				e, err := nbe.New(b.options...)
				require.NoError(t, err)
				forms := 0
				s := &script.Session{Engine: e, Options: b.call, Report: func(r script.Result) {
					forms++
					require.NoError(t, r.Err, "%s, %s: %.200s", name, r.Form.Place, r.Form)
				}}
				require.NoError(t, s.File(context.Background(), file))
				require.NotZero(t, forms)
			}
		})
	}
	for _, n := range numbered {
		require.Regexp(t, regexp.MustCompile(`; [^\n]*\b`+regexp.QuoteMeta(n)+`\b`), all, "lemma %s is missing", n)
	}
}
