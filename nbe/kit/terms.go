package kit

import (
	"context"
	"fmt"
	"strings"
	"testing"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
)

// Terms as tests write them, and the scopes they stand in.
//
// Wherever a function of this package takes a term as "any", it takes text in
// the notation, a *term.Written, or an *nbe.Term of the scope at hand.
// Invariant: a term that cannot be read ends the test at once, since nothing
// that follows would mean anything.

// Engine returns an engine with the given options that has handled a script,
// every form of which must do what it says; otherwise the test ends.
func Engine(t testing.TB, text string, options ...nbe.Option) *nbe.Engine {
	t.Helper()
	e, err := engine(text, options)
	if err != nil {
		t.Fatalf("kit: %v", err)
	}
	return e
}

func engine(text string, options []nbe.Option) (*nbe.Engine, error) {
	e, err := nbe.New(options...)
	if err != nil {
		return nil, err
	}
	var first error
	s := &script.Session{Engine: e, Report: func(r script.Result) {
		if r.Err != nil && first == nil {
			first = fmt.Errorf("%s: %w", r.Form, r.Err)
		}
	}}
	if err := s.Source(context.Background(), []byte(text), "script"); err != nil {
		return nil, err
	}
	return e, first
}

// Scope returns a scope of e. Each entry is a dimension, written as its name,
// a variable, written "NAME : TYPE", or an assumption, written as a face: a
// text that begins with "(". They are added in order.
func Scope(t testing.TB, e *nbe.Engine, entries ...string) *nbe.Scope {
	t.Helper()
	s := e.Scope()
	for _, entry := range entries {
		var err error
		name, ty, variable := strings.Cut(entry, " : ")
		switch {
		case strings.HasPrefix(entry, "("):
			s, err = s.Assume(context.Background(), Read(t, e, entry))
		case variable:
			s, err = s.Variable(context.Background(), strings.TrimSpace(name), Read(t, e, ty))
		default:
			s, err = s.Dimension(strings.TrimSpace(entry))
		}
		if err != nil {
			t.Fatalf("kit: the scope entry %q: %v", entry, err)
		}
	}
	return s
}

// Read reads one term with e's head words; text that cannot be read ends the test.
func Read(t testing.TB, e *nbe.Engine, text string) *term.Written {
	t.Helper()
	w, err := notation.ReadTerm(text, "test", e.Words())
	if err != nil {
		t.Fatalf("kit: %v", err)
	}
	return w
}

// written is a term as tests write it, as a written term.
func written(t testing.TB, s *nbe.Scope, x any) *term.Written {
	t.Helper()
	switch x := x.(type) {
	case string:
		return Read(t, s.Engine(), x)
	case *term.Written:
		return x
	}
	t.Fatalf("kit: %T is no term", x)
	return nil
}

// checked is a term of s at the type ty, or at its own where ty is nil.
func checked(t testing.TB, s *nbe.Scope, x, ty any) (*nbe.Term, error) {
	t.Helper()
	if x, ok := x.(*nbe.Term); ok {
		return x, nil
	}
	w := written(t, s, x)
	if ty == nil {
		return s.Infer(context.Background(), w)
	}
	if ty, ok := ty.(*nbe.Term); ok {
		return s.CheckAt(context.Background(), w, ty)
	}
	return s.Check(context.Background(), w, written(t, s, ty))
}
