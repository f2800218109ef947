// Package script handles scripts in the notation: a list of forms that define,
// assume, declare, compare, normalise and show. It uses nothing but what any
// host can: an engine, its empty scope, and the reader.
//
// A [Session] handles the forms of a text in order, on one engine. A form either
// does what it says or gives an error, which is reported with the place of the
// form and ends nothing: the forms after it are handled on what the engine holds.
// Only text that cannot be read ends a session, with an [Unreadable].
//
// A form (reject FORM) is handled on a fork of the engine, so that nothing of it
// is added whatever happens.
package script

import (
	"context"
	"errors"
	"fmt"
	"maps"
	"os"
	"path/filepath"
	"strings"
	"time"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
)

// Session is a script under way: an engine, what has been loaded, what has been
// reported. Not safe for concurrent use.
type Session struct {
	Engine *nbe.Engine
	// Begin is called before each form is handled, in order. May be nil.
	Begin func(*notation.Form)
	// Report is called after each form, in order. May be nil.
	Report func(Result)
	// Options are given to every call of the engine.
	Options []nbe.CallOption
	// ReadFile reads a script's file. If nil, files are read up to MaxFile bytes,
	// without waiting for the writer of a named pipe.
	ReadFile func(name string) ([]byte, error)

	loaded map[string]bool
}

// Result is the outcome of one form.
type Result struct {
	Form    *notation.Form
	Text    string // what the form reports, empty for those that only add
	Err     error  // what went wrong, nil if the form did what it should
	Elapsed time.Duration
}

// Unreadable is the error of text that cannot be read: the run ends with it.
type Unreadable struct{ Err error }

// Error is the error of the text.
func (u *Unreadable) Error() string { return u.Err.Error() }

// Unwrap is the error of the text.
func (u *Unreadable) Unwrap() error { return u.Err }

// File handles the script in the file name. It is read whole before its first
// form is handled. The error is an *Unreadable; what forms do wrong, they report.
func (s *Session) File(ctx context.Context, name string) error {
	key, err := identity(name)
	if err == nil && s.loaded[key] {
		return nil
	}
	read := s.ReadFile
	if read == nil {
		read = func(name string) ([]byte, error) { return readFile(ctx, name) }
	}
	src, err := read(name)
	if term.KindOf(err) == term.Cancelled {
		return &Unreadable{err}
	}
	if err != nil {
		return &Unreadable{&term.Error{Kind: term.Unreadable, Place: term.Place{File: name}, Message: "the file cannot be read", Cause: withoutPath(err)}}
	}
	if s.loaded == nil {
		s.loaded = map[string]bool{}
	}
	s.loaded[key] = true
	return s.Source(ctx, src, name)
}

// identity is one name for a file, however its path is spelled.
func identity(name string) (string, error) {
	full, err := filepath.Abs(name)
	if err != nil {
		return name, err
	}
	if real, err := filepath.EvalSymlinks(full); err == nil {
		full = real
	}
	return full, nil
}

// withoutPath is the cause of a path error: the place says the path.
func withoutPath(err error) error {
	var p *os.PathError
	if errors.As(err, &p) {
		return p.Err
	}
	return err
}

// Source handles a script's text.
func (s *Session) Source(ctx context.Context, src []byte, name string) error {
	forms, err := notation.ReadScriptContext(ctx, src, name, s.Engine.Words())
	if err != nil {
		return &Unreadable{err}
	}
	for k := range forms {
		f := &forms[k]
		if f.Kind == notation.Load {
			if err := s.load(ctx, f, name); err != nil {
				return err
			}
			continue
		}
		if s.Begin != nil {
			s.Begin(f)
		}
		begin := time.Now()
		text, err := s.handle(ctx, s.Engine, f)
		if isUnreadable(err) {
			return err
		}
		if s.Report != nil {
			s.Report(Result{f, text, err, time.Since(begin)})
		}
		if term.KindOf(err) == term.Cancelled {
			return nil
		}
	}
	return nil
}

func (s *Session) load(ctx context.Context, f *notation.Form, from string) error {
	path := f.File
	if !filepath.IsAbs(path) {
		path = filepath.Join(filepath.Dir(from), path)
	}
	err := s.File(ctx, path)
	// A file that is not there is a fault of the form that names it.
	var e *term.Error
	if errors.As(err, &e) && e.Kind == term.Unreadable && e.Place.Line == 0 {
		e.Place, e.GotText = f.FilePlace, fmt.Sprintf("%q", f.File)
	}
	return err
}

func isUnreadable(err error) bool {
	var u *Unreadable
	return errors.As(err, &u)
}

// handle does what a form says on an engine. Every error has a place: that of
// the form, where the engine knows none nearer.
func (s *Session) handle(ctx context.Context, e *nbe.Engine, f *notation.Form) (string, error) {
	text, err := s.do(ctx, e, f)
	if err == nil || isUnreadable(err) {
		return text, err
	}
	if f.NamePlace.Known() {
		err = blame(f, err)
	}
	return text, at(f.Place, err)
}

func (s *Session) do(ctx context.Context, e *nbe.Engine, f *notation.Form) (string, error) {
	scope := e.Scope()
	switch f.Kind {
	case notation.Define:
		// A host may put a definition in the place of an assumption; a script declares a name once.
		if e.Global(f.Name) != nil {
			return "", &term.Error{Kind: term.Duplicate, Message: "this name is declared already", GotText: f.Name}
		}
		return "", e.Define(ctx, f.Name, f.Type, f.Term, s.Options...)
	case notation.Assume:
		return "", e.Assume(ctx, f.Name, f.Type, s.Options...)
	case notation.Declare:
		return "", e.Declare(ctx, f.Declaration, s.Options...)
	case notation.Equal, notation.Differ:
		c, err := scope.CompareAt(ctx, f.Type, f.Term, f.Other, s.Options...)
		switch {
		case err != nil:
			return "", err
		case f.Kind == notation.Equal && c.Verdict == nbe.Equal:
			return "equal", nil
		case f.Kind == notation.Differ && c.Verdict == nbe.Different:
			return "different: " + c.Difference.String(), nil
		}
		return "", unequal(f, c)
	case notation.Normal:
		return s.normal(ctx, scope, f)
	case notation.Show:
		return s.show(ctx, e, scope, f)
	case notation.Blocked:
		t, err := scope.Infer(ctx, f.Term, s.Options...)
		if err != nil {
			return "", err
		}
		report, err := scope.Blocked(ctx, t, s.Options...)
		if err != nil {
			return "", err
		}
		return report.String(), nil
	case notation.Reject:
		return s.reject(ctx, e, f)
	}
	return "", &term.Error{Kind: term.Internal, Message: "a form of a script of no known kind", GotText: f.Kind.String()}
}

// at gives an error the place p if it has none.
func at(p term.Place, err error) error {
	var e *term.Error
	if errors.As(err, &e) && !e.Place.Known() {
		c := *e
		c.Place = p
		return &c
	}
	return err
}

// blame puts the error of a name that is declared twice on the name itself,
// unless it is that of a constructor, which has a place of its own.
func blame(f *notation.Form, err error) error {
	var e *term.Error
	if errors.As(err, &e) && e.Kind == term.Duplicate && (f.Kind != notation.Declare || e.Place == f.Place) {
		c := *e
		c.Place = f.NamePlace
		return &c
	}
	return err
}

// shown is how long a term inside a message may be, in bytes.
const shown = 1 << 12

// unequal is the error of a comparison with another verdict than the form says.
func unequal(f *notation.Form, c nbe.Comparison) error {
	err := &term.Error{Kind: term.Unequal, Place: f.Place, Want: f.Term, Got: f.Other}
	switch {
	case c.Verdict == nbe.Undecided:
		err.Message = "it depends on the hole " + c.Hole
	case f.Kind == notation.Differ:
		err.Message = "the two are equal by definition"
		err.Want, err.WantText = nil, "something that differs from "+f.Term.Text(shown)
	default:
		err.Message = "not equal by definition, " + c.Difference.String()
	}
	err.Detail = c.Difference
	return err
}

func (s *Session) normal(ctx context.Context, scope *nbe.Scope, f *notation.Form) (string, error) {
	t, err := scope.Infer(ctx, f.Term, s.Options...)
	if err != nil {
		return "", err
	}
	n, err := scope.CheckLike(ctx, f.Other, t, s.Options...)
	if err != nil {
		return "", err
	}
	forms, err := scope.Normal(ctx, t, s.Options...)
	if err != nil {
		return "", err
	}
	same, err := term.SameContext(ctx, forms[0].Term, n.Core())
	if err != nil {
		return "", err
	}
	if !same {
		got, err := forms[0].WrittenContext(ctx)
		if err != nil {
			return "", err
		}
		return "", &term.Error{Kind: term.Unequal, Place: f.Place, Message: "the normal form is another", Want: f.Other, Got: got}
	}
	return forms[0].String(), nil
}

func (s *Session) show(ctx context.Context, e *nbe.Engine, scope *nbe.Scope, f *notation.Form) (string, error) {
	if f.Term.Kind == term.NameKind {
		account, err := e.Account(ctx, f.Term.Word, s.Options...)
		if term.KindOf(err) != term.NotFound {
			return account.String(), err
		}
	}
	t, err := scope.Infer(ctx, f.Term, s.Options...)
	if err != nil {
		return "", err
	}
	forms, err := scope.Normal(ctx, t, s.Options...)
	if err != nil {
		return "", err
	}
	w, err := forms[0].WrittenContext(ctx)
	if err != nil {
		return "", err
	}
	ty, err := forms[0].WrittenTypeContext(ctx)
	if err != nil {
		return "", err
	}
	text, err := notation.FormatContext(ctx, w, 96)
	if err != nil {
		return "", err
	}
	kind, err := notation.FormatContext(ctx, ty, 96)
	if err != nil {
		return "", err
	}
	return text + " : " + kind, nil
}

// refusal reports whether an error says that a form is wrong. Running out of a
// budget, being cancelled and what is not supported say nothing about the form.
func refusal(err error) bool {
	switch term.KindOf(err) {
	case term.NotFound, term.Duplicate, term.IllTyped, term.Disagreement, term.BadDeclaration, term.Unequal, term.Malformed:
		return true
	}
	return false
}

// reject handles a form on a fork, which is dropped. Of a rejection of a
// rejection only the innermost form is handled: the others turn its outcome.
func (s *Session) reject(ctx context.Context, e *nbe.Engine, f *notation.Form) (string, error) {
	inner, odd := f.Inner, true
	for inner.Kind == notation.Reject {
		inner, odd = inner.Inner, !odd
	}
	var text string
	var err error
	if fork := e.Fork(); inner.Kind == notation.Load {
		err = s.trial(ctx, fork, inner)
	} else {
		text, err = s.handle(ctx, fork, inner)
	}
	switch refused := err != nil; {
	case refused && (isUnreadable(err) || !refusal(err)):
		return "", err
	case refused == odd && refused:
		return "refused: " + strings.TrimSpace(withoutPlace(err)), nil
	case refused == odd:
		return "accepted", nil
	case refused:
		return "", &term.Error{Kind: term.Unequal, Place: f.Place, Message: "the rejection was to be refused", GotText: "the form was refused: " + withoutPlace(err)}
	}
	got := "it was accepted"
	if text != "" {
		got += ": " + text
	}
	return "", &term.Error{Kind: term.Unequal, Place: f.Place, Message: "the form was to be refused", GotText: got}
}

// trial handles a file on an engine that is dropped, up to its first failure.
func (s *Session) trial(ctx context.Context, fork *nbe.Engine, f *notation.Form) error {
	inside, stop := context.WithCancel(ctx)
	defer stop()
	var first error
	t := &Session{Engine: fork, Options: s.Options, ReadFile: s.ReadFile, loaded: maps.Clone(s.loaded)}
	t.Report = func(r Result) {
		if first == nil && r.Err != nil {
			first = r.Err
			stop()
		}
	}
	if err := t.load(inside, f, f.FilePlace.File); err != nil {
		return err
	}
	return first
}

func withoutPlace(err error) string {
	var e *term.Error
	if errors.As(err, &e) {
		c := *e
		c.Place = term.Place{}
		return c.Error()
	}
	return err.Error()
}
