package main

import (
	"errors"
	"fmt"
	"io"
	"strings"
	"time"

	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
)

// From outcomes to lines. A line begins with the place of its form, in the way
// that editors and terminals make a link of, then the form and what it reports.

// reporter prints outcomes and counts them.
type reporter struct {
	out      io.Writer
	set      *settings
	progress *progress
	forms    int
	failed   int
	unread   int
	// cancelled says that a form ended with the context, cause what ended that.
	cancelled bool
	cause     error
}

// begin is told of each form before it is handled.
func (r *reporter) begin(f *notation.Form) {
	r.progress.show(fmt.Sprintf("%s: form %d: %s", f.Place, r.forms+1, what(f)))
}

// report is told of each form's outcome.
func (r *reporter) report(o script.Result) {
	r.forms++
	line := ""
	switch {
	case o.Err != nil:
		r.failed++
		r.cancelled = errors.Is(o.Err, term.Cancelled)
		line = o.Err.Error()
	case o.Text != "" || r.set.verbose:
		line = fmt.Sprintf("%s: %s", o.Form.Place, what(o.Form))
		if o.Text != "" {
			line += ": " + o.Text
		}
	default:
		return
	}
	if r.set.times {
		line += fmt.Sprintf(" [%v]", o.Elapsed.Round(10*time.Microsecond))
	}
	r.progress.clear()
	fmt.Fprintln(r.out, line)
}

// stopped notes what ended the run before its end.
func (r *reporter) stopped(cause error) { r.cause = cause }

// summary is the last line.
func (r *reporter) summary() {
	r.progress.clear()
	verdict := "each did what it should"
	if r.failed > 0 {
		verdict = fmt.Sprintf("of which %d did not do what %s should", r.failed, plural(r.failed))
	}
	fmt.Fprintf(r.out, "%s, %s\n", count(r.forms, "form"), verdict)
	if r.unread > 0 {
		fmt.Fprintf(r.out, "%s could not be read to the end\n", count(r.unread, "script"))
	}
	if r.cause != nil {
		fmt.Fprintf(r.out, "stopped before the end: %v\n", r.cause)
	}
}

func count(n int, word string) string {
	if n == 1 {
		return "1 " + word
	}
	return fmt.Sprintf("%d %ss", n, word)
}

func plural(n int) string {
	if n == 1 {
		return "it"
	}
	return "they"
}

// what says in a few words what a form is about.
func what(f *notation.Form) string {
	switch f.Kind {
	case notation.Define, notation.Assume, notation.Declare:
		return f.Kind.String() + " " + f.Name
	case notation.Equal, notation.Differ:
		return fmt.Sprintf("%s %s and %s", f.Kind, short(f.Term), short(f.Other))
	case notation.Normal, notation.Show, notation.Blocked:
		return f.Kind.String() + " " + short(f.Term)
	case notation.Reject:
		times, inner := 1, f.Inner
		for ; inner.Kind == notation.Reject; times++ {
			inner = inner.Inner
		}
		return strings.Repeat("reject ", min(times, 3)) + what(inner)
	case notation.Load:
		return fmt.Sprintf("load %q", f.File)
	}
	return f.Kind.String()
}

// shortest is how long a term in a line may be before it is cut off, in bytes.
const shortest = 60

// short is a term, cut off where it grows long.
func short(w *term.Written) string { return strings.TrimSpace(w.Text(shortest)) }
