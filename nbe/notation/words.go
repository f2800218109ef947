// Package notation reads and prints the text of terms and scripts: symbolic
// expressions with one meaning for each head word and no precedence.
//
// Reading and printing are inverse on the written tree: what [Print] gives for
// a term that was read, or built with the shapes of its head words, [ReadTerm]
// reads back as the same tree. Reading goes in three steps, each with a list of
// work of its own, so that nesting costs heap and never the stack: characters
// to tokens (lexer.go), tokens to lists (list.go), lists to written terms by
// the shapes of head words (read.go) and to the forms of scripts (script.go).
// Every text that is refused is refused with a [*term.Error] that has the place
// of the smallest list or word at fault, what was expected and what was found.
//
// This file holds the table of head words that a reader goes by.
package notation

import (
	"strings"

	"example.com/boxwright/nbe/term"
)

// Words is a table of head words with the shapes of their forms: those of the
// notation and those that host formers bring. A nil *Words holds those of the
// notation only. It is immutable and safe for concurrent use.
type Words struct {
	shapes map[string]term.Shape
	extra  map[string]bool
}

// builtin holds the words of the notation; it is never written after initialisation.
var builtin = func() *Words {
	w := &Words{shapes: map[string]term.Shape{}}
	for _, s := range term.Words() {
		w.shapes[s.Word] = s
	}
	return w
}()

// NewWords returns the words of the notation together with those of the given
// shapes. The errors are [*term.Error]: Duplicate for a word that is one
// already, Malformed for a word that cannot be one or a shape that text cannot
// show (rows or a repeated slot that do not come last; a slot for any number of
// names, which is for the cases of elim alone).
func NewWords(extra ...term.Shape) (*Words, error) {
	w := &Words{shapes: map[string]term.Shape{}, extra: map[string]bool{}}
	for word, s := range builtin.shapes {
		w.shapes[word] = s
	}
	for _, s := range extra {
		if !term.IsWord(s.Word) {
			return nil, &term.Error{Kind: term.Malformed, Message: "this cannot be a head word", WantText: "a run of characters without white space, parentheses, semicolons and double quotes that is no number", GotText: s.Word}
		}
		if _, ok := w.shapes[s.Word]; ok || term.IsHeadWord(s.Word) {
			return nil, &term.Error{Kind: term.Duplicate, Message: "the word " + s.Word + " is a head word already"}
		}
		if fault := shapeFault(s.Slots); fault != "" {
			return nil, &term.Error{Kind: term.Malformed, Message: "the shape of " + s.Word + " has no text: " + fault}
		}
		w.shapes[s.Word] = s
		w.extra[s.Word] = true
	}
	return w, nil
}

// shapeFault says why slots cannot be read, or nothing. It recurs on the shape
// of a former, which is the host's program and not its input.
func shapeFault(slots []term.Slot) string {
	for k, s := range slots {
		last := k == len(slots)-1
		switch {
		case s.Many:
			return "a slot binds any number of names"
		case (s.Rest || s.Rows != nil) && !last:
			return "a slot after the repeated one"
		case s.Rest && s.Rows != nil:
			return "a repeated slot that holds rows"
		case s.Rows != nil && len(s.Binds) > 0:
			return "a slot that holds rows and binds"
		case s.Sort != term.TermSort && len(s.Binds) > 0:
			return "a slot that binds and holds no term"
		case s.Rows != nil && len(s.Rows) == 0:
			return "rows without slots"
		case s.Rows != nil:
			if fault := shapeFault(s.Rows); fault != "" {
				return fault
			}
		}
	}
	return ""
}

// orBuiltin is w, or the words of the notation for nil.
func (w *Words) orBuiltin() *Words {
	if w == nil {
		return builtin
	}
	return w
}

// Shape returns the shape of the form that word heads; ok is false when word is no head word of a term.
func (w *Words) Shape(word string) (s term.Shape, ok bool) {
	s, ok = w.orBuiltin().shapes[word]
	return s, ok
}

// Taken reports whether s is a head word, of a term or of a script, which no name can be.
func (w *Words) Taken(s string) bool {
	return term.IsHeadWord(s) || w != nil && w.extra[s]
}

// usage holds the forms that their shapes do not show; it is never written after initialisation.
var usage = map[string]string{
	"lam":   "(lam (x y …) t)",
	"line":  "(line (i j …) t)",
	"Pi":    "(Pi ((x A) (y B) …) C)",
	"Sigma": "(Sigma ((x A) …) C)",
	"let":   "(let ((x T t) …) u)",
	"->":    "(-> A B … C)",
	"*":     "(* A B … C)",
	"pair":  "(pair a b … c)",
	"at":    "(at p r s …)",
	"U":     "(U n)",
	"=":     "(= r 0) or (= r 1)",
	"elim":  "(elim (x C) t CASE …)",
}

// usageOf is the form that a head word heads, for messages.
func usageOf(s term.Shape) string {
	if text, ok := usage[s.Word]; ok {
		return text
	}
	if len(s.Slots) == 0 {
		return s.Word
	}
	return "(" + s.Word + " " + slotsText(s.Slots, false) + ")"
}

// rowText is the text of a row of the given slots, for messages.
func rowText(slots []term.Slot) string { return "(" + slotsText(slots, true) + ")" }

// slotsText shows the slots of a form or of a row with letters of the kind of each.
func slotsText(slots []term.Slot, row bool) string {
	const letters = "abcdefgh"
	var texts []string
	terms := 0
	for _, s := range slots {
		text := ""
		switch {
		case s.Rows != nil:
			text = rowText(s.Rows)
		case len(s.Binds) > 0 && row:
			text = namesText(s.Binds, ")") + " t"
		case len(s.Binds) > 0:
			text = namesText(s.Binds, " A)")
		case s.Sort == term.DimensionSort:
			text = "r"
		case s.Sort == term.FaceSort:
			text = "φ"
		case s.Sort == term.LevelSort:
			text = "n"
		case s.Sort == term.NameSort:
			text = "NAME"
		default:
			text = letters[terms%len(letters) : terms%len(letters)+1]
			terms++
		}
		if s.Rest || s.Rows != nil {
			text += " …"
		}
		texts = append(texts, text)
	}
	return strings.Join(texts, " ")
}

// namesText shows the names that a slot binds, and what follows them.
func namesText(binds []term.Sort, end string) string {
	next := map[term.Sort]int{}
	var names []string
	for _, sort := range binds {
		letters := "xyzuvw"
		if sort == term.DimensionSort {
			letters = "ijklmn"
		}
		k := next[sort] % len(letters)
		names = append(names, letters[k:k+1])
		next[sort]++
	}
	return "(" + strings.Join(names, " ") + end
}
