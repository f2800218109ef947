package notation

import (
	"context"
	"strings"
	"unicode/utf8"

	"example.com/boxwright/nbe/internal/watch"
	"example.com/boxwright/nbe/term"
)

// Text for people: line breaks and indentation.
//
// The layout is one rule. A list that fits on what is left of its line stays
// on it. Otherwise its items follow the head on the same line as long as they
// fit, and from the first one that does not each item has a line of its own,
// two columns in. The text is laid out from the tokens of the one-line text, so
// every form, a host's too, is laid out alike. Indentation stops growing at
// half the width, or a deep term would need a text quadratic in its depth.

// Format returns w with line breaks, in lines of at most width characters where
// that can be done; a width of 0 or less means one line. It reads back as the
// same tree. Cost: linear in the text.
func Format(w *term.Written, width int) string { return layout(w.String(), width) }

// FormatContext is [Format] in a context, whose end is the error Cancelled.
func FormatContext(ctx context.Context, w *term.Written, width int) (string, error) {
	text, err := w.TextContext(ctx)
	if err != nil {
		return "", err
	}
	return layoutContext(ctx, text, width)
}

// FormatForm is [Format] for a form of a script.
func FormatForm(f *Form, width int) string { return layout(f.String(), width) }

// pending is what remains to be laid out: a node, or a text when there is no node.
type pending struct {
	n      *node
	text   string
	indent int // of its line, should it begin one
	closes int // parentheses that follow it on its line
	fresh  bool
}

// layout lays the one-line text of something out. Text that does not read, as
// one that was cut off, is left as it is.
func layout(text string, width int) string {
	text, _ = layoutContext(context.Background(), text, width)
	return text
}

func layoutContext(ctx context.Context, text string, width int) (string, error) {
	if width <= 0 || utf8.RuneCountInString(text) <= width {
		return text, nil
	}
	l := &lists{lexer: newLexer(text, "")}
	l.lexer.watch = watch.Of(ctx)
	n, ok, err := l.next()
	if term.KindOf(err) == term.Cancelled {
		return "", err
	}
	if err != nil || !ok {
		return text, nil
	}
	var b strings.Builder
	column := 0
	write := func(s string) {
		b.WriteString(s)
		column += utf8.RuneCountInString(s)
	}
	todo := []pending{{n: &n}}
	for len(todo) > 0 {
		p := todo[len(todo)-1]
		todo = todo[:len(todo)-1]
		if err := l.lexer.ended(1); err != nil {
			return "", err
		}
		if p.n == nil {
			write(p.text)
			continue
		}
		if p.fresh {
			b.WriteString("\n" + strings.Repeat(" ", p.indent))
			column = p.indent
		}
		if p.n.kind != listNode || column+int(p.n.width)+p.closes <= width {
			todo = p.n.flat(write, todo)
			continue
		}
		write("(")
		start := column - 1
		items := p.n.items
		// What follows the head on this line.
		together := 0
		for at := column; together < len(items); together++ {
			closes := 0
			if together == len(items)-1 {
				closes = p.closes + 1
			}
			if together > 0 {
				at++
			}
			if at += int(items[together].width); at+closes > width && together > 0 {
				break
			}
			if together == 0 && items[0].kind == listNode && at > width {
				break
			}
		}
		indent := min(start+2, width/2)
		todo = append(todo, pending{text: ")"})
		for k := len(items) - 1; k >= 0; k-- {
			q := pending{n: &items[k], indent: indent, fresh: k >= together && k > 0}
			if k == len(items)-1 {
				q.closes = p.closes + 1
			}
			todo = append(todo, q)
			if k > 0 && !q.fresh {
				todo = append(todo, pending{text: " "})
			}
		}
	}
	return b.String(), nil
}

// flat writes n on the line at hand, its lists' items by way of todo.
func (n *node) flat(write func(string), todo []pending) []pending {
	first := len(todo)
	todo = append(todo, pending{n: n})
	for len(todo) > first {
		p := todo[len(todo)-1]
		todo = todo[:len(todo)-1]
		switch {
		case p.n == nil:
			write(p.text)
		case p.n.kind == listNode:
			write("(")
			todo = append(todo, pending{text: ")"})
			for k := len(p.n.items) - 1; k >= 0; k-- {
				todo = append(todo, pending{n: &p.n.items[k]})
				if k > 0 {
					todo = append(todo, pending{text: " "})
				}
			}
		case p.n.kind == textNode:
			write(`"` + p.n.text + `"`)
		default:
			write(p.n.text)
		}
	}
	return todo
}
