package nbe_test

import (
	"context"
	"errors"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
)

// Any text as a script, through reader, checker, evaluator, readback and
// printer: it gives answers or errors, never a fault of the engine, and the
// same ones on a second engine. Limits are small, so that each text takes
// moments.
func FuzzScript(f *testing.F) {
	for _, c := range faults {
		f.Add(strings.Replace(c.text, "«", "", 1))
	}
	files, _ := filepath.Glob("../examples/quay/*.sexp")
	for _, file := range files {
		text, err := os.ReadFile(file)
		if err != nil {
			f.Fatal(err)
		}
		// One form each: a whole script is too long to be changed with profit.
		for _, form := range strings.Split(string(text), "\n(") {
			if !strings.Contains(form, "load ") {
				f.Add("(" + form)
			}
		}
	}
	base, err := nbe.New()
	if err != nil {
		f.Fatal(err)
	}
	if err := firstError(base, quayside); err != nil {
		f.Fatal(err)
	}
	limits := nbe.Within(nbe.Limits{Steps: 100_000, Depth: 5000, Memory: 1 << 26, Output: 100_000, Text: 100_000})
	f.Fuzz(func(t *testing.T, text string) {
		// What does not look at its context hangs; a panic makes the fuzzer keep the text.
		watch := time.AfterFunc(time.Minute, func() { panic("this hangs: " + text) })
		defer watch.Stop()
		run := func() (out []string) {
			ctx, stop := context.WithTimeout(context.Background(), 20*time.Second)
			defer stop()
			note := func(err error) {
				if errors.Is(err, term.Internal) || errors.Is(err, term.Cancelled) {
					t.Fatalf("%s\n%v", text, err)
				}
				out = append(out, err.Error())
			}
			s := &script.Session{
				Engine: base.Fork(), Options: []nbe.CallOption{limits},
				ReadFile: func(string) ([]byte, error) { return nil, os.ErrNotExist },
				Report: func(r script.Result) {
					out = append(out, r.Text)
					if r.Err != nil {
						note(r.Err)
					}
				},
			}
			if err := s.Source(ctx, []byte(text), "fuzz.sexp"); err != nil {
				note(err)
			}
			return out
		}
		first, second := run(), run()
		if strings.Join(first, "\n") != strings.Join(second, "\n") {
			t.Fatalf("%s\nfirst %q\nthen %q", text, first, second)
		}
	})
}
