package notation_test

import (
	"errors"
	"os"
	"path/filepath"
	"testing"

	"github.com/google/go-cmp/cmp"
	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
)

// Any text is read or refused: with a place inside the text, as malformed or
// over a limit. What is read prints, and reads back.

func refusedWell(t *testing.T, err error) {
	var e *term.Error
	require.True(t, errors.As(err, &e))
	require.True(t, e.Kind == term.Malformed || e.Kind == term.OutOfBudget)
	require.True(t, e.Place.Line > 0 && e.Place.Column > 0 && e.Place.File == "f")
	require.NotEmpty(t, e.WantText)
	require.NotEmpty(t, e.GotText)
}

var seeds = []string{
	"x", "12", "(lam (x y) (f x y))", "(Pi ((x A) (i I)) (-> I A B))", "(elim (x Nat) m (zero n) ((suc k h) (suc h)))", "(let ((x T t)) (at p 0 (min i (rev j))))",
	"(hcomp A a ((or (= i 0) (and (= j 1) top)) (k) b))", "(Glue A (bot T e))", "((Unit) (c))", "; c\r\n(\"", "\xff", "(crate a (x i b) top 0)", "(shelf ((0) (i)) ())", "mark", "007", "(f", ")",
}

func FuzzReadTerm(f *testing.F) {
	for _, s := range seeds {
		f.Add(s)
	}
	words := hostWords(f)
	f.Fuzz(func(t *testing.T, text string) {
		w, err := notation.ReadTerm(text, "f", words)
		if err != nil {
			refusedWell(t, err)
			return
		}
		for _, printed := range []string{notation.Print(w), notation.Format(w, 20)} {
			back, err := notation.ReadTerm(printed, "f", words)
			require.NoError(t, err)
			require.True(t, back.Same(w))
		}
	})
}

func FuzzReadScript(f *testing.F) {
	for _, s := range seeds {
		f.Add([]byte("(show " + s + ")"))
	}
	for _, s := range []string{
		"(def add (-> Nat Nat Nat) (lam (m n) m))", "(assume A (U 0)) (differ A a b) (same A a a)", "(reject (load \"a b\"))", "(normal a b)(blocked c)",
		"(data Susp ((A (U 0))) (composition formal) (point north ()) (path merid ((a A)) (i) ((= i 0) north)))", "(data D () (composition strict) (composition formal))",
	} {
		f.Add([]byte(s))
	}
	words := hostWords(f)
	f.Fuzz(func(t *testing.T, text []byte) {
		forms, err := notation.ReadScript(text, "f", words)
		if err != nil {
			refusedWell(t, err)
			return
		}
		printed := ""
		for k := range forms {
			printed += notation.FormatForm(&forms[k], 30) + "\n"
		}
		back, err := notation.ReadScript([]byte(printed), "f", words)
		require.NoError(t, err)
		require.Empty(t, cmp.Diff(forms, back, formsAgree))
	})
}

// The seeds that fuzzing found worth keeping stand under testdata; they must stay readable files.
func TestKeptSeedsAreThere(t *testing.T) {
	for _, target := range []string{"FuzzReadTerm", "FuzzReadScript"} {
		kept, err := filepath.Glob(filepath.Join("testdata", "fuzz", target, "*"))
		require.NoError(t, err)
		require.NotEmpty(t, kept)
		for _, file := range kept {
			info, err := os.Stat(file)
			require.NoError(t, err)
			require.NotZero(t, info.Size())
		}
	}
}
