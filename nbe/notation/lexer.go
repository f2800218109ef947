package notation

import (
	"fmt"
	"strings"
	"unicode"
	"unicode/utf8"

	"example.com/boxwright/nbe/internal/watch"
	"example.com/boxwright/nbe/term"
)

// Characters to tokens. Lines end with a line feed, with or without a carriage
// return before it; columns count characters from 1. A byte order mark at the
// very start is skipped. The lexer reads each character once and stops at the
// first fault.

// tokenKind tells the tokens apart.
type tokenKind uint8

const (
	endToken tokenKind = iota
	openToken
	closeToken
	wordToken
	textToken // text in double quotes
)

// token is a token with its text (without the quotes) and where it starts.
type token struct {
	kind       tokenKind
	text       string
	offset     int // of its first byte
	line, col  int32
	characters int32
}

// lexer stands before the character at pos.
type lexer struct {
	src, file string
	pos       int
	line, col int32
	watch     *watch.Watch
}

// ended counts n units of work and returns the error of a context that has ended.
func (l *lexer) ended(n int) error {
	if l.watch.Ended(n) {
		return &term.Error{Kind: term.Cancelled, Place: l.place(l.line, l.col), Message: "cancelled", Cause: l.watch.Cause()}
	}
	return nil
}

func newLexer(src, file string) *lexer {
	l := &lexer{src: src, file: file, line: 1, col: 1}
	l.pos = len(src) - len(strings.TrimPrefix(src, "\ufeff"))
	return l
}

// place is a place of the text.
func (l *lexer) place(line, col int32) term.Place {
	return term.Place{File: l.file, Line: int(line), Column: int(col)}
}

// peek returns the character at pos and its length in bytes, 0 at the end.
func (l *lexer) peek() (c rune, size int, err error) {
	if l.pos >= len(l.src) {
		return 0, 0, nil
	}
	if b := l.src[l.pos]; b < utf8.RuneSelf {
		return rune(b), 1, nil
	}
	c, size = utf8.DecodeRuneInString(l.src[l.pos:])
	if c == utf8.RuneError && size == 1 {
		return 0, 0, &term.Error{
			Kind: term.Malformed, Place: l.place(l.line, l.col), Message: "the text is not UTF-8",
			WantText: "a character in UTF-8", GotText: fmt.Sprintf("the byte 0x%02X", l.src[l.pos]),
		}
	}
	return c, size, nil
}

// advance goes past the character c of the given length.
func (l *lexer) advance(c rune, size int) {
	l.pos += size
	if c == '\n' {
		l.line++
		l.col = 1
	} else {
		l.col++
	}
}

// next returns the next token.
func (l *lexer) next() (token, error) {
	comment := false
	for {
		c, size, err := l.peek()
		if err == nil {
			err = l.ended(1)
		}
		switch {
		case err != nil:
			return token{}, err
		case size == 0:
			return token{kind: endToken, offset: l.pos, line: l.line, col: l.col}, nil
		case c == '\n':
			comment = false
		case comment || unicode.IsSpace(c):
		case c == ';':
			comment = true
		default:
			return l.token(c)
		}
		l.advance(c, size)
	}
}

// token returns the token that starts with c, the character at pos.
func (l *lexer) token(c rune) (token, error) {
	t := token{offset: l.pos, line: l.line, col: l.col}
	switch c {
	case '(', ')':
		t.kind = openToken
		if c == ')' {
			t.kind = closeToken
		}
		t.text, t.characters = l.src[l.pos:l.pos+1], 1
		l.advance(c, 1)
		return t, nil
	case '"':
		return l.quoted(t)
	}
	t.kind = wordToken
	for {
		c, size, err := l.peek()
		if err == nil {
			err = l.ended(1)
		}
		if err != nil {
			return t, err
		}
		if size == 0 || !term.IsWordRune(c) {
			break
		}
		l.advance(c, size)
		t.characters++
	}
	t.text = l.src[t.offset:l.pos]
	return t, nil
}

// quoted returns the text in double quotes that starts at pos; it ends on its line.
func (l *lexer) quoted(t token) (token, error) {
	l.advance('"', 1)
	t.kind = textToken
	for {
		c, size, err := l.peek()
		if err == nil {
			err = l.ended(1)
		}
		if err != nil {
			return t, err
		}
		if size == 0 || c == '\n' {
			found := "the end of the line"
			if size == 0 {
				found = "the end of the text"
			}
			return t, &term.Error{
				Kind: term.Malformed, Place: l.place(t.line, t.col), Message: "a quotation is not closed",
				WantText: `"`, GotText: found,
			}
		}
		l.advance(c, size)
		if c == '"' {
			t.text = l.src[t.offset+1 : l.pos-1]
			t.characters = l.col - t.col
			return t, nil
		}
	}
}
