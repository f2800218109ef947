package term

import (
	"context"
	"math/big"
	"strings"

	"example.com/boxwright/nbe/internal/watch"
)

// The text of a written term on one line.
//
// Nested forms that the notation writes as one are merged: (lam (x y) t), (->
// A B C), (at p r s). What is printed reads back as the same tree. The printer
// keeps its own stack, so that nesting costs no Go stack, and stops at a limit,
// since a shared tree may be exponentially larger as text than in memory.

// MaxText is the length in bytes at which [Written.String] cuts a term off.
const MaxText = 64 << 20

// cutMark stands at the end of a text that was cut off. Such a text does not
// read back, its parentheses being open.
const cutMark = " …"

// String returns w on one line, in the notation. A text longer than [MaxText]
// is cut off and ends in "…". Cost: linear in the text.
func (w *Written) String() string { return w.Text(MaxText) }

// Text is [Written.String] with a limit of its own, for messages: the text is
// cut off soon after limit bytes.
func (w *Written) Text(limit int) string {
	p := printer{limit: limit}
	p.push(w)
	p.run()
	return p.out.String()
}

// TextContext is [Written.String] in a context, whose end is the error Cancelled.
func (w *Written) TextContext(ctx context.Context) (string, error) {
	p := printer{limit: MaxText, watch: watch.Of(ctx)}
	p.push(w)
	if p.run(); p.watch.Cause() != nil {
		return "", ended(p.watch)
	}
	return p.out.String(), nil
}

// piece is what remains to be printed: a text, a term, or the rest of a nest
// that is written as one form. The rest is not taken apart before its turn
// comes: in a shared graph every nest may hold further ones.
type piece struct {
	text string
	w    *Written
	rest string // the head word of the nest
}

// printer holds the text so far and the pieces to come, the next one last.
type printer struct {
	out    strings.Builder
	limit  int
	watch  *watch.Watch
	todo   []piece
	pieces []piece // of the form at hand, in order
}

func (p *printer) push(w *Written)   { p.todo = append(p.todo, piece{w: w}) }
func (p *printer) text(s string)     { p.pieces = append(p.pieces, piece{text: s}) }
func (p *printer) term(w *Written)   { p.pieces = append(p.pieces, piece{w: w}) }
func (p *printer) spaced(w *Written) { p.text(" "); p.term(w) }
func (p *printer) rest(word string, w *Written) {
	p.pieces = append(p.pieces, piece{w: w, rest: word})
}

func (p *printer) namesAfter(before string, binders []Binder) {
	for _, b := range binders {
		p.text(before)
		p.text(b.Name)
		before = " "
	}
}

// run prints the pieces until none is left or the limit is passed.
func (p *printer) run() {
	for len(p.todo) > 0 && !p.watch.Ended(1) {
		next := p.todo[len(p.todo)-1]
		p.todo = p.todo[:len(p.todo)-1]
		if p.out.Len() > p.limit {
			p.out.WriteString(cutMark)
			return
		}
		if next.w == nil {
			p.out.WriteString(next.text)
			continue
		}
		p.pieces = p.pieces[:0]
		if next.rest != "" {
			p.follow(next.rest, next.w)
		} else {
			p.expand(next.w)
		}
		for k := len(p.pieces) - 1; k >= 0; k-- {
			p.todo = append(p.todo, p.pieces[k])
		}
	}
}

// number prints n; one that the notation has no room for is cut off.
func (p *printer) number(n *big.Int) {
	if tooLong(n) {
		p.text("(" + cutMark + ")")
		return
	}
	p.text(n.String())
	p.watch.Ended(n.BitLen() / 8)
}

// missing stands for a part that a badly built term lacks; it does not read back.
const missing = "()"

// expand puts the pieces of w into p.pieces.
func (p *printer) expand(w *Written) {
	switch w.Kind {
	case NameKind:
		p.text(w.Word)
	case NumeralKind:
		if w.Number == nil {
			p.text(missing)
			return
		}
		p.number(w.Number)
	case ApplyKind:
		p.application(w)
	case FormKind:
		p.form(w)
	}
}

func (p *printer) application(w *Written) {
	p.text("(")
	for k, part := range w.Parts {
		if k > 0 {
			p.text(" ")
		}
		// A head word without parts would read as the head of its own form here.
		if k == 0 && part.Body != nil && part.Body.Kind == FormKind && len(part.Body.Parts) == 0 {
			p.text("(" + part.Body.Word + ")")
			continue
		}
		p.part(part)
	}
	p.text(")")
}

func (p *printer) form(w *Written) {
	if len(w.Parts) == 0 {
		p.text(w.Word)
		return
	}
	p.text("(" + w.Word)
	switch {
	case w.isChain("lam", 1, 0), w.isChain("line", 1, 0):
		p.nestedNames(w)
	case w.isChain("Pi", 2, 1), w.isChain("Sigma", 2, 1), w.isChain("let", 3, 2):
		p.text(" (")
		p.binding(w)
	case w.isPlain("->"), w.isPlain("*"), w.isPlain("pair"):
		p.spaced(w.Parts[0].Body)
		p.rest(w.Word, w.Parts[1].Body)
	case w.isPlain("at"):
		p.nestedAt(w)
	default:
		for _, part := range w.Parts {
			if part.Rows != nil || part.Body == nil && part.Binders == nil {
				p.rows(w.Word == "elim", part.Rows)
				continue
			}
			p.text(" ")
			p.part(part)
		}
	}
	p.text(")")
}

// isChain reports whether w is a form of word with n parts, of which only part
// k binds, and one name.
func (w *Written) isChain(word string, n, k int) bool {
	if w == nil || w.Kind != FormKind || w.Word != word || len(w.Parts) != n {
		return false
	}
	for j, part := range w.Parts {
		if part.Body == nil || (len(part.Binders) != 0) != (j == k) || len(part.Binders) > 1 {
			return false
		}
	}
	return true
}

// isPlain reports whether w is a form of word with two parts that bind nothing.
func (w *Written) isPlain(word string) bool {
	return w != nil && w.Kind == FormKind && w.Word == word && len(w.Parts) == 2 &&
		w.Parts[0].Body != nil && w.Parts[1].Body != nil && len(w.Parts[0].Binders)+len(w.Parts[1].Binders) == 0
}

func (p *printer) nestedNames(w *Written) {
	word, before := w.Word, " ("
	// Every piece is a character or more: beyond the limit nothing is printed,
	// and a host may have tied a term into a knot.
	for w.isChain(word, 1, 0) && len(p.pieces) <= p.limit && !p.watch.Ended(1) {
		p.text(before)
		p.text(w.Parts[0].Binders[0].Name)
		before, w = " ", w.Parts[0].Body
	}
	p.text(") ")
	p.term(w)
}

// binding prints the first binding of w and then what follows.
func (p *printer) binding(w *Written) {
	last := len(w.Parts) - 1
	p.text("(" + w.Parts[last].Binders[0].Name)
	for _, part := range w.Parts[:last] {
		p.spaced(part.Body)
	}
	p.text(")")
	p.rest(w.Word, w.Parts[last].Body)
}

// follow prints what follows in a nest of word: one more part or binding, or the last part.
func (p *printer) follow(word string, w *Written) {
	switch word {
	case "->", "*", "pair":
		p.text(" ")
		if !w.isPlain(word) {
			p.term(w)
			return
		}
		p.term(w.Parts[0].Body)
		p.rest(word, w.Parts[1].Body)
	default:
		last := 1
		if word == "let" {
			last = 2
		}
		if !w.isChain(word, last+1, last) {
			p.text(") ")
			p.term(w)
			return
		}
		p.text(" ")
		p.binding(w)
	}
}

func (p *printer) nestedAt(w *Written) {
	var dimensions []*Written
	for w.isPlain("at") && len(dimensions) <= p.limit && !p.watch.Ended(1) {
		dimensions = append(dimensions, w.Parts[1].Body)
		w = w.Parts[0].Body
	}
	p.spaced(w)
	for k := len(dimensions) - 1; k >= 0; k-- {
		p.spaced(dimensions[k])
	}
}

// part prints a part that is no list of rows: "t" or "(i … t)".
func (p *printer) part(part Part) {
	switch {
	case part.Body == nil:
		p.text(missing)
	case len(part.Binders) == 0:
		p.term(part.Body)
	default:
		p.text("(")
		p.namesAfter("", part.Binders)
		p.spaced(part.Body)
		p.text(")")
	}
}

// rows prints rows, each with a space before it; the rows of cases put the
// bound names behind the constructor.
func (p *printer) rows(cases bool, rows [][]Part) {
	for _, row := range rows {
		p.text(" (")
		if cases && len(row) == 2 && row[0].Body != nil && row[0].Body.Kind == NameKind && row[1].Body != nil {
			p.caseRow(row)
			continue
		}
		for k, part := range row {
			if k > 0 {
				p.text(" ")
			}
			switch {
			case part.Rows != nil:
				p.rows(false, part.Rows)
			case part.Body == nil:
				p.text(missing)
			case len(part.Binders) > 0:
				p.text("(")
				p.namesAfter("", part.Binders)
				p.text(") ")
				p.term(part.Body)
			default:
				p.term(part.Body)
			}
		}
		p.text(")")
	}
}

func (p *printer) caseRow(row []Part) {
	if len(row[1].Binders) == 0 {
		p.text(row[0].Body.Word)
	} else {
		p.text("(" + row[0].Body.Word)
		p.namesAfter(" ", row[1].Binders)
		p.text(")")
	}
	p.spaced(row[1].Body)
	p.text(")")
}
