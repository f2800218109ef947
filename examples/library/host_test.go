package library

import (
	"context"
	"fmt"
	"math/big"
	"strings"
	"testing"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
)

// What the tests need of a host: reading a term, its normal form, and the
// numbers that normal forms of integers and numerals stand for.

func written(t testing.TB, e *nbe.Engine, src string) *term.Written {
	t.Helper()
	w, err := notation.ReadTerm(src, "test", e.Words())
	if err != nil {
		t.Fatalf("%v in %s", err, clip(src))
	}
	return w
}

// normal is the normal form of a term in a scope.
func normal(t testing.TB, s *nbe.Scope, e *nbe.Engine, src string, options ...nbe.CallOption) string {
	t.Helper()
	ctx := context.Background()
	x, err := s.Infer(ctx, written(t, e, src), options...)
	if err != nil {
		t.Fatalf("%v in %s", clip(err), clip(src))
	}
	forms, err := s.Normal(ctx, x, options...)
	if err != nil {
		t.Fatalf("%v in %s", clip(err), clip(src))
	}
	return forms[0].String()
}

// rechecks requires the normal form of a term to check at its type, to be its own
// normal form, and to be equal to the term.
func rechecks(t testing.TB, s *nbe.Scope, e *nbe.Engine, src string) {
	t.Helper()
	if ok, err := checksAgain(s, written(t, e, src), nbe.Limits{}); !ok {
		t.Fatalf("%v: %s", clip(err), clip(src))
	}
}

func clip(x any) string {
	text := fmt.Sprint(x)
	if len(text) > 500 {
		text = text[:500] + " …"
	}
	return text
}

// integer is the integer of a normal form of Int.
func integer(t testing.TB, text string) int {
	t.Helper()
	var n int
	if _, err := fmt.Sscanf(text, "(pos %d)", &n); err == nil {
		return n
	}
	if _, err := fmt.Sscanf(text, "(negsuc %d)", &n); err == nil {
		return -1 - n
	}
	t.Fatalf("%s is no integer", clip(text))
	return 0
}

// intTerm is an integer as a term.
func intTerm(n int) string {
	if n < 0 {
		return fmt.Sprintf("(negsuc %d)", -1-n)
	}
	return fmt.Sprintf("(pos %d)", n)
}

// digits builds a positional numeral from the most significant digit on.
func digits(leading string, rest []string) string {
	var b strings.Builder
	for k := len(rest) - 1; k >= 0; k-- {
		b.WriteString("(" + rest[k] + " ")
	}
	b.WriteString(leading)
	b.WriteString(strings.Repeat(")", len(rest)))
	return b.String()
}

// binaryTerm is a positive number as a term of Binary.
func binaryTerm(n *big.Int) string {
	var rest []string
	for k := n.BitLen() - 2; k >= 0; k-- {
		rest = append(rest, []string{"double", "double-one"}[n.Bit(k)])
	}
	return digits("one", rest)
}

// quaternaryTerm is a positive number as a term of Quaternary.
func quaternaryTerm(n *big.Int) string {
	text := n.Text(4)
	var rest []string
	for _, d := range text[1:] {
		rest = append(rest, "digit"+string(d))
	}
	return digits("lead"+text[:1], rest)
}

// positional is the number of a normal form of Binary, Numeral or Quaternary.
func positional(t testing.TB, text string) *big.Int {
	t.Helper()
	words := strings.FieldsFunc(text, func(c rune) bool { return c == '(' || c == ')' || c == ' ' || c == '\n' })
	n := new(big.Int)
	for k := len(words) - 1; k >= 0; k-- {
		base, digit := int64(0), int64(0)
		switch w := words[k]; w {
		case "nought", "positive":
			base = 1
		case "one", "lead1":
			digit = 1
		case "lead2", "lead3":
			digit = int64(w[4] - '0')
		case "double", "double-one":
			base, digit = 2, int64(len(w)/10)
		case "digit0", "digit1", "digit2", "digit3":
			base, digit = 4, int64(w[5]-'0')
		default:
			t.Fatalf("%s is no numeral", clip(text))
		}
		n.Mul(n, big.NewInt(base)).Add(n, big.NewInt(digit))
	}
	return n
}
