package notation

import (
	"fmt"
	"math"
	"strings"

	"example.com/boxwright/nbe/term"
)

// Tokens to lists. A list is closed when its parenthesis comes, from a stack of
// open ones, so a million nested parentheses are no deeper for Go than one.

// MaxNesting is how deep parentheses may nest in a text. Reading a text that
// nests deeper is OutOfBudget; the limit bounds memory, not the stack.
const MaxNesting = 4_000_000

// nodeKind tells words, quoted texts and lists apart.
type nodeKind uint8

const (
	wordNode nodeKind = iota
	textNode
	listNode
)

// node is a word, a quoted text or a list, as it stands in the text.
type node struct {
	text      string // of a word or a quotation
	items     []node // of a list
	line, col int32
	width     int32 // in characters, on one line
	kind      nodeKind
}

// lists reads the lists of a text one after the other.
type lists struct {
	lexer *lexer
	done  []node // items of the lists that are still open
	open  []opened
}

// opened is a list that is still open: where it starts and where its items start in done.
type opened struct {
	items     int
	line, col int32
}

// next returns the next word, quotation or list of the text; ok is false at the end.
func (l *lists) next() (n node, ok bool, err error) {
	for {
		t, err := l.lexer.next()
		if err != nil {
			return node{}, false, err
		}
		switch t.kind {
		case endToken:
			if len(l.open) == 0 {
				return node{}, false, nil
			}
			o := l.open[len(l.open)-1]
			return node{}, false, l.fault(term.Malformed, o.line, o.col, "a parenthesis is not closed", ")", "the end of the text")
		case openToken:
			if len(l.open) >= MaxNesting {
				return node{}, false, l.fault(term.OutOfBudget, t.line, t.col, "parentheses nest too deep",
					fmt.Sprintf("at most %d open parentheses", MaxNesting), "one more")
			}
			l.open = append(l.open, opened{len(l.done), t.line, t.col})
			continue
		case closeToken:
			if len(l.open) == 0 {
				return node{}, false, l.fault(term.Malformed, t.line, t.col, "a parenthesis closes nothing", "a form", ")")
			}
			n = l.close()
			l.lexer.watch.Ended(len(n.items))
		default:
			n = node{text: t.text, line: t.line, col: t.col, width: t.characters}
			if t.kind == textToken {
				n.kind = textNode
			}
		}
		if len(l.open) == 0 {
			return n, true, nil
		}
		l.done = append(l.done, n)
	}
}

// close makes the innermost open list a node.
func (l *lists) close() node {
	o := l.open[len(l.open)-1]
	l.open = l.open[:len(l.open)-1]
	n := node{kind: listNode, line: o.line, col: o.col, items: append([]node(nil), l.done[o.items:]...)}
	clear(l.done[o.items:])
	l.done = l.done[:o.items]
	width := int64(2 + max(0, len(n.items)-1))
	for k := range n.items {
		width += int64(n.items[k].width)
	}
	n.width = int32(min(width, math.MaxInt32))
	return n
}

func (l *lists) fault(kind term.ErrorKind, line, col int32, message, want, got string) error {
	return &term.Error{Kind: kind, Place: l.lexer.place(line, col), Message: message, WantText: want, GotText: got}
}

// maxFound is about how long the text of what was found may be in a message, in bytes.
const maxFound = 80

// brief is the text of n on one line, cut off where it grows long.
func brief(n *node) string {
	var b strings.Builder
	type rest struct {
		n    *node
		next int
	}
	var open []rest
	for {
		switch {
		case b.Len() > maxFound:
			b.WriteString(" …")
			return b.String()
		case n.kind == listNode:
			b.WriteString("(")
			open = append(open, rest{n, 0})
		case n.kind == textNode:
			b.WriteString(`"` + cut(n.text) + `"`)
		default:
			b.WriteString(cut(n.text))
		}
		for {
			if len(open) == 0 {
				return b.String()
			}
			top := &open[len(open)-1]
			if top.next < len(top.n.items) {
				if top.next > 0 {
					b.WriteString(" ")
				}
				n = &top.n.items[top.next]
				top.next++
				break
			}
			b.WriteString(")")
			open = open[:len(open)-1]
		}
	}
}

// cut is a word or a quotation, cut off where it is long.
func cut(s string) string {
	if len(s) <= maxFound {
		return s
	}
	k := maxFound
	for k > 0 && s[k]&0xC0 == 0x80 {
		k--
	}
	return s[:k] + "…"
}
