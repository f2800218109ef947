package notation

import (
	"context"
	"fmt"
	"math/big"
	"strings"

	"example.com/boxwright/nbe/internal/watch"
	"example.com/boxwright/nbe/term"
)

// Lists to written terms, by the shapes of head words.
//
// What stands at a place follows from the form around it: a term, a dimension,
// a face, a level, a name. An argument of an application may be a term or a
// dimension, and which of them a name there is, the reader cannot tell; the
// checker does. Every part is put on a list of work with the address it goes
// to. A part that cannot be read is noted and left out, and of all faults of a
// form the first in the text is reported.

// MaxDigits is how many digits a numeral in a text may have; a longer one is OutOfBudget.
const MaxDigits = term.MaxDigits

// ReadTerm reads src, which must hold one term and nothing else, of the words
// w (nil: those of the notation). Places carry file. The errors are
// [*term.Error] with a place: Malformed with what was expected and what was
// found, OutOfBudget for text beyond [MaxNesting] or [MaxDigits]. Cost: linear
// in src, but for the conversion of long numerals. Safe for concurrent use.
func ReadTerm(src, file string, w *Words) (*term.Written, error) {
	return ReadTermContext(context.Background(), src, file, w)
}

// ReadTermContext is [ReadTerm] in a context, whose end is the error Cancelled.
func ReadTermContext(ctx context.Context, src, file string, w *Words) (*term.Written, error) {
	r := newReader(ctx, src, file, w)
	n, ok, err := r.lists.next()
	if err != nil {
		return nil, err
	}
	if !ok {
		l := r.lists.lexer
		return nil, r.lists.fault(term.Malformed, l.line, l.col, unreadable, "a term", "the end of the text")
	}
	var out *term.Written
	r.put(&n, termHere, &out)
	if err := r.run(); err != nil {
		return nil, err
	}
	n, ok, err = r.lists.next()
	if err != nil {
		return nil, err
	}
	if ok {
		r.fault(&n, "the end of the text")
		return nil, r.first
	}
	return out, nil
}

// unreadable is the message of a fault that is said by what was expected and what was found.
const unreadable = "this cannot be read"

// position is what may stand at a place.
type position uint8

const (
	termHere position = iota
	argumentHere
	domainHere
	dimensionHere
	endHere
	faceHere
	levelHere
	nameHere
)

var positionTexts = [...]string{
	"a term", "a term or a dimension", "a type or I", "a dimension", "0 or 1", "a face", "a level", "a name",
}

func (p position) String() string { return positionTexts[p] }

// holdsTerms reports whether a term may stand at p.
func (p position) holdsTerms() bool { return p <= domainHere }

// positionOf is what stands in a slot.
func positionOf(s term.Slot) position {
	switch s.Sort {
	case term.DimensionSort:
		return dimensionHere
	case term.FaceSort:
		return faceHere
	case term.LevelSort:
		return levelHere
	case term.NameSort:
		return nameHere
	}
	return termHere
}

// fits reports whether a form of the head word may stand at p.
func (p position) fits(word string) bool {
	switch word {
	case "I":
		return p == domainHere
	case "min", "max", "rev":
		return p == dimensionHere || p == argumentHere
	case "top", "bot", "=", "and", "or":
		return p == faceHere
	}
	return p.holdsTerms()
}

// reader holds what remains to be read of one form and the first fault so far.
type reader struct {
	words *Words
	lists *lists
	todo  []task
	first *term.Error
	names map[string]string // one copy of each name, so that no term keeps the text alive
}

// task is a node to be read as what may stand at a position.
type task struct {
	n    *node
	here position
	dst  **term.Written
}

func newReader(ctx context.Context, src, file string, w *Words) *reader {
	l := newLexer(src, file)
	l.watch = watch.Of(ctx)
	return &reader{words: w.orBuiltin(), lists: &lists{lexer: l}, names: map[string]string{}}
}

func (r *reader) place(n *node) term.Place { return r.lists.lexer.place(n.line, n.col) }

func (r *reader) name(s string) string {
	if own, ok := r.names[s]; ok {
		return own
	}
	own := strings.Clone(s)
	r.names[own] = own
	return own
}

// fault notes that n is not what was expected.
func (r *reader) fault(n *node, want string) { r.note(n, term.Malformed, unreadable, want, brief(n)) }

func (r *reader) note(n *node, kind term.ErrorKind, message, want, got string) {
	if f := r.first; f != nil && (f.Place.Line < int(n.line) || f.Place.Line == int(n.line) && f.Place.Column <= int(n.col)) {
		return
	}
	r.first = &term.Error{Kind: kind, Place: r.place(n), Message: message, WantText: want, GotText: got}
}

// put puts n on the list of work.
func (r *reader) put(n *node, here position, dst **term.Written) {
	r.todo = append(r.todo, task{n, here, dst})
}

// run does the work on the list and returns the first fault.
func (r *reader) run() error {
	for len(r.todo) > 0 {
		t := r.todo[len(r.todo)-1]
		r.todo = r.todo[:len(r.todo)-1]
		if err := r.lists.lexer.ended(1 + len(t.n.items)); err != nil {
			return err
		}
		switch t.n.kind {
		case textNode:
			r.fault(t.n, t.here.String())
		case wordNode:
			*t.dst = r.word(t.n, t.here)
		case listNode:
			r.list(t)
		}
	}
	if r.first != nil {
		return r.first
	}
	return nil
}

// isDigits reports whether s is made of decimal digits.
func isDigits(s string) bool {
	for k := range len(s) {
		if s[k] < '0' || s[k] > '9' {
			return false
		}
	}
	return s != ""
}

// word reads a word on its own.
func (r *reader) word(n *node, here position) *term.Written {
	switch {
	case isDigits(n.text):
		return r.numeral(n, here)
	case r.words.Taken(n.text):
		s, ok := r.words.Shape(n.text)
		if !ok || !here.fits(n.text) {
			r.fault(n, here.String())
			return nil
		}
		if len(s.Slots) > 0 {
			r.fault(n, usageOf(s))
			return nil
		}
		return &term.Written{Kind: term.FormKind, Word: s.Word, Place: r.place(n)}
	case here == faceHere || here == levelHere || here == endHere:
		r.fault(n, here.String())
		return nil
	}
	return &term.Written{Kind: term.NameKind, Word: r.name(n.text), Place: r.place(n)}
}

func (r *reader) numeral(n *node, here position) *term.Written {
	switch {
	case len(n.text) > 1 && n.text[0] == '0':
		r.note(n, term.Malformed, "a numeral starts with 0", "a numeral without leading zeros", cut(n.text))
		return nil
	case len(n.text) > MaxDigits:
		r.note(n, term.OutOfBudget, "a numeral is too long", fmt.Sprintf("at most %d digits", MaxDigits), fmt.Sprintf("%d digits", len(n.text)))
		return nil
	case here == faceHere || here == nameHere,
		(here == dimensionHere || here == endHere) && n.text != "0" && n.text != "1":
		r.fault(n, here.String())
		return nil
	}
	r.lists.lexer.watch.Ended(len(n.text)) // the conversion takes longer than other words
	number, _ := new(big.Int).SetString(n.text, 10)
	return &term.Written{Kind: term.NumeralKind, Number: number, Place: r.place(n)}
}

// binder reads a name that is bound here.
func (r *reader) binder(n *node) term.Binder {
	if n.kind != wordNode || isDigits(n.text) || r.words.Taken(n.text) {
		r.fault(n, nameHere.String())
		return term.Binder{}
	}
	return term.Binder{Name: r.name(n.text), Place: r.place(n)}
}

func (r *reader) binders(items []node) []term.Binder {
	out := make([]term.Binder, len(items))
	for k := range items {
		out[k] = r.binder(&items[k])
	}
	return out
}

// list reads a form or an application.
func (r *reader) list(t task) {
	n := t.n
	if len(n.items) == 0 {
		r.fault(n, t.here.String())
		return
	}
	head := &n.items[0]
	if head.kind == wordNode && r.words.Taken(head.text) {
		s, ok := r.words.Shape(head.text)
		if !ok || !t.here.fits(head.text) {
			r.fault(n, t.here.String())
			return
		}
		*t.dst = r.form(n, s)
		return
	}
	if !t.here.holdsTerms() {
		r.fault(n, t.here.String())
		return
	}
	if len(n.items) == 1 && (head.kind != wordNode || isDigits(head.text)) {
		r.note(n, term.Malformed, "nothing is applied to anything here", t.here.String(), brief(n))
		return
	}
	w := &term.Written{Kind: term.ApplyKind, Parts: make([]term.Part, len(n.items)), Place: r.place(n)}
	r.put(head, termHere, &w.Parts[0].Body)
	for k := 1; k < len(n.items); k++ {
		r.put(&n.items[k], argumentHere, &w.Parts[k].Body)
	}
	*t.dst = w
}

// form reads the form of a head word.
func (r *reader) form(n *node, s term.Shape) *term.Written {
	items := n.items[1:]
	var w *term.Written
	switch s.Word {
	case "lam", "line":
		w = r.nestedNames(n, items, s.Word)
	case "Pi":
		w = r.nestedBindings(n, items, s.Word, domainHere)
	case "Sigma":
		w = r.nestedBindings(n, items, s.Word, termHere)
	case "let":
		w = r.nestedBindings(n, items, s.Word, termHere, termHere)
	case "->":
		w = r.nestedRight(n, items, s.Word, domainHere)
	case "*", "pair":
		w = r.nestedRight(n, items, s.Word, termHere)
	case "at":
		w = r.nestedAt(n, items)
	case "elim":
		w = r.elim(n, items)
	default:
		w = &term.Written{Kind: term.FormKind, Word: s.Word, Place: r.place(n)}
		if len(s.Slots) == 0 && (len(items) > 0 || !termHere.fits(s.Word)) || !r.slots(&w.Parts, items, s.Slots, false) {
			w = nil
		} else if s.Word == "=" {
			// The second part is on the list last.
			r.todo[len(r.todo)-1].here = endHere
		}
	}
	if w == nil {
		r.fault(n, usageOf(s))
	}
	return w
}
