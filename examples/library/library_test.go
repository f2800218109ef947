package library

import (
	"context"
	"fmt"
	"io/fs"
	"os"
	"path"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/value"
)

// The library and what stands in testdata, whose sources stand beside each
// check, hold with the fast evaluator, with the plain one, and with the names
// of dimensions drawn at random.

// modes are the evaluators that everything must hold with. The slow ones leave
// out the scripts that they do not finish in seconds.
var modes = []struct {
	name    string
	engine  []nbe.Option
	options []nbe.CallOption
	without string // scripts left out
}{
	{name: "fast"},
	{name: "random names", options: []nbe.CallOption{nbe.DrawNames(1)}},
	{name: "other random names", options: []nbe.CallOption{nbe.DrawNames(77)}},
	{name: "no support", engine: []nbe.Option{nbe.WithPlain(value.Plain{NoSupport: true})},
		without: "univalence booleans integers decidable circle loops suspension join james rotations brunerie numerals universe levels transport theorems hopf degrees transports"},
	{name: "no frontier", engine: []nbe.Option{nbe.WithPlain(value.Plain{NoFrontier: true})}},
	{name: "eager, no numerals", engine: []nbe.Option{nbe.WithPlain(value.Plain{Eager: true, NoNumerals: true})}, without: "hopf levels degrees transports"},
}

func leaves(without, file string) bool {
	return slices.Contains(strings.Fields(without), strings.TrimSuffix(filepath.Base(file), ".sexp"))
}

func newEngine(t testing.TB, options ...nbe.Option) *nbe.Engine {
	t.Helper()
	e, err := nbe.New(options...)
	if err != nil {
		t.Fatal(err)
	}
	return e
}

// withLibrary is an engine that holds the named scripts.
func withLibrary(t testing.TB, names ...string) *nbe.Engine {
	t.Helper()
	e := newEngine(t)
	if err := Load(context.Background(), e, names...); err != nil {
		t.Fatal(err)
	}
	return e
}

func TestEveryScriptOfTheLibraryChecks(t *testing.T) {
	files, err := fs.Glob(Files, "*.sexp")
	if err != nil || len(files) == 0 {
		t.Fatal("no scripts", err)
	}
	for _, m := range modes {
		t.Run(m.name, func(t *testing.T) {
			s := session(newEngine(t, m.engine...), func(r script.Result) {
				if r.Err != nil {
					t.Error(shortened(r.Err))
				}
			}, m.options...)
			for _, name := range files {
				if leaves(m.without, name) {
					continue
				}
				if err := s.File(context.Background(), name); err != nil {
					t.Fatal(err)
				}
			}
		})
	}
}

// session reads testdata's scripts from there and the library's from the library.
func session(e *nbe.Engine, report func(script.Result), options ...nbe.CallOption) *script.Session {
	return &script.Session{Engine: e, Report: report, Options: options, ReadFile: func(name string) ([]byte, error) {
		if b, err := os.ReadFile(filepath.Join("testdata", path.Base(name))); err == nil {
			return b, nil
		}
		return ReadFile(name)
	}}
}

func TestRules(t *testing.T) {
	files, err := filepath.Glob("testdata/*.sexp")
	if err != nil || len(files) == 0 {
		t.Fatal("no scripts", err)
	}
	for _, file := range files {
		for _, m := range modes {
			if leaves(m.without, file) {
				continue
			}
			t.Run(strings.TrimSuffix(filepath.Base(file), ".sexp")+"/"+m.name, func(t *testing.T) {
				checks := 0
				s := session(newEngine(t, m.engine...), func(r script.Result) {
					if r.Text != "" {
						checks++
					}
					if r.Err != nil {
						t.Error(shortened(r.Err))
					}
				}, m.options...)
				if err := s.File(context.Background(), filepath.Base(file)); err != nil {
					t.Fatal(err)
				}
				if checks < 3 {
					t.Errorf("only %d checks were made", checks)
				}
			})
		}
	}
}

func shortened(err error) string {
	text := fmt.Sprint(err)
	if len(text) > 2000 {
		text = text[:2000] + " …"
	}
	return text
}
