package term

import (
	"errors"
	"fmt"
	"strings"
)

// ErrorKind says what sort of thing went wrong. An ErrorKind is itself an
// error, so errors.Is(err, term.IllTyped) asks for it.
type ErrorKind uint8

const (
	// Malformed: text that cannot be read, or a term built with the wrong shape.
	Malformed ErrorKind = iota + 1
	// NotFound: a name that nothing in scope has.
	NotFound
	// Duplicate: a name that is declared already, or a word that is taken.
	Duplicate
	// IllTyped: a term that does not have the type it should, or whose type cannot be inferred.
	IllTyped
	// Disagreement: two elements that must be equal on a face are not: walls, bases, boundaries, ends.
	Disagreement
	// BadDeclaration: a data declaration or an elimination that the theory refuses.
	BadDeclaration
	// Unequal: two terms were to be equal (or different) by definition and are not.
	Unequal
	// Unsupported: something that is right but that the engine does not do.
	Unsupported
	// OutOfBudget: a limit of the call was reached.
	OutOfBudget
	// Cancelled: the context of the call ended; the error wraps its cause.
	Cancelled
	// WrongScope: values or terms of one scope or engine were handed to another.
	WrongScope
	// Unreadable: a file that cannot be opened or read.
	Unreadable
	// Internal: a fault of the engine or of a host's former; the error holds what was thrown.
	Internal
)

var kindNames = [...]string{"", "malformed", "not found", "declared twice", "ill-typed", "disagreement", "bad declaration", "unequal", "not supported", "out of budget", "cancelled", "wrong scope", "unreadable", "internal fault"}

// String is the kind in words.
func (k ErrorKind) String() string {
	if int(k) < len(kindNames) {
		return kindNames[k]
	}
	return "unknown kind"
}

// Error makes a kind an error, as the target of errors.Is.
func (k ErrorKind) Error() string { return k.String() }

// Error is every error of this module. Its text is only one rendering of it:
// "PLACE: MESSAGE: expected WANT, found GOT".
type Error struct {
	Kind              ErrorKind
	Place             Place
	Message           string   // what is wrong, a phrase without the terms
	Want              *Written // what was expected, if it is a term
	Got               *Written // what was found, if it is a term
	WantText, GotText string   // the same where it is no term
	Face              string   // the face under which it went wrong, as text; empty for top
	Cause             error    // what this error wraps: a context's cause, an I/O error, a host's error
	Detail            any      // more, by kind: *Difference of the comparison, what a budget was spent on
}

// Is reports whether target is e's kind.
func (e *Error) Is(target error) bool {
	k, ok := target.(ErrorKind)
	return ok && k == e.Kind
}

// Unwrap returns the cause.
func (e *Error) Unwrap() error { return e.Cause }

// Where is the place as text, "file:line:col", or empty.
func (p Place) String() string {
	switch {
	case p.Line > 0:
		file := p.File
		if file == "" {
			file = "-"
		}
		return fmt.Sprintf("%s:%d:%d", file, p.Line, p.Column)
	case p.File != "":
		return p.File
	case p.Tag != nil:
		return fmt.Sprintf("[%v]", p.Tag)
	}
	return ""
}

// maxErrorText is where a term in an error's text is cut off, in bytes; the error itself holds it whole.
const maxErrorText = 1 << 16

// cutOff is s, or its beginning where it is very long.
func cutOff(s string) string {
	if len(s) <= maxErrorText {
		return s
	}
	return strings.ToValidUTF8(s[:maxErrorText], "") + "…"
}

// Error renders the error in one line; very long terms, names and texts are cut off.
func (e *Error) Error() string {
	var b strings.Builder
	if where := cutOff(e.Place.String()); where != "" {
		b.WriteString(where)
		b.WriteString(": ")
	}
	b.WriteString(cutOff(e.Message))
	if e.Message == "" {
		b.WriteString(e.Kind.String())
	}
	if e.Face != "" {
		b.WriteString(" on the face " + cutOff(e.Face))
	}
	want, got := cutOff(e.WantText), cutOff(e.GotText)
	if e.Want != nil {
		want = e.Want.Text(maxErrorText)
	}
	if e.Got != nil {
		got = e.Got.Text(maxErrorText)
	}
	if want != "" {
		b.WriteString(": expected " + want)
	}
	if got != "" {
		if want != "" {
			b.WriteString(", found " + got)
		} else {
			b.WriteString(": found " + got)
		}
	}
	if e.Cause != nil {
		b.WriteString(": " + cutOff(e.Cause.Error()))
	}
	return b.String()
}

// KindOf returns the kind of the first *Error in err's chain, 0 if there is none.
func KindOf(err error) ErrorKind {
	var e *Error
	if errors.As(err, &e) {
		return e.Kind
	}
	return 0
}
