package library

import (
	"fmt"
	"math/rand/v2"
	"strings"
	"testing"
)

// Winding numbers (HoTT Book 8.1; Licata and Shulman, LICS 2013) against the
// sum that Go computes.

// word is a random composite of n turns forward and back, with their sum. lean
// says how it is nested: to the left, to the right, balanced, or at random.
func word(r *rand.Rand, n int, lean int) (string, int) {
	switch n {
	case 0:
		return "rest", 0
	case 1:
		if r.IntN(2) == 0 {
			return "turn-once", 1
		}
		return "turn-back", -1
	}
	if lean < 2 { // without nesting Go's own stack
		var open, text strings.Builder
		sum := 0
		for k := range n {
			turn, by := word(r, 1, lean)
			sum += by
			switch {
			case lean == 0 && k == 0:
				text.WriteString(turn)
			case lean == 0:
				text.WriteString(" " + turn + ")")
				open.WriteString("(then ")
			case k < n-1:
				text.WriteString("(then " + turn + " ")
			default:
				text.WriteString(turn + strings.Repeat(")", n-1))
			}
		}
		return open.String() + text.String(), sum
	}
	at := n / 2
	if lean == 3 {
		at = 1 + r.IntN(n-1)
	}
	a, m := word(r, at, lean)
	b, k := word(r, n-at, lean)
	if lean == 3 && r.IntN(4) == 0 {
		return "(then (back " + a + ") " + b + ")", k - m
	}
	return "(then " + a + " " + b + ")", m + k
}

func TestWindingNumbersAreSums(t *testing.T) {
	e := withLibrary(t, "circle")
	s := e.Scope()
	for _, n := range []int{0, 1, 2, 10, 100, 1000, -1, -2, -10, -100, -1000} {
		if got := integer(t, normal(t, s, e, "(winding (turns "+intTerm(n)+"))")); got != n {
			t.Errorf("the winding number of %d turns is %d", n, got)
		}
	}
	r := rand.New(rand.NewPCG(8, 1))
	for _, n := range []int{0, 1, 2, 3, 4, 5, 8, 13, 30, 100, 300, 1000} {
		for lean := range 4 {
			w, want := word(r, n, lean)
			if got := integer(t, normal(t, s, e, "(winding "+w+")")); got != want {
				t.Errorf("the winding number of %s is %d, the sum of its turns %d", clip(w), got, want)
			}
			if n <= 8 {
				rechecks(t, s, e, "(winding "+w+")")
				rechecks(t, s, e, w)
			}
		}
	}
}

// The loops of the circle are the integers in both directions (Book 8.1.9), and
// composition is addition (8.1.10).
func TestTurnsAndWindingAreInverse(t *testing.T) {
	e := withLibrary(t, "circle")
	s := e.Scope()
	r := rand.New(rand.NewPCG(8, 2))
	for range 20 {
		m, n := r.IntN(41)-20, r.IntN(41)-20
		src := fmt.Sprintf("(winding (then (turns %s) (back (turns %s))))", intTerm(m), intTerm(n))
		if got := integer(t, normal(t, s, e, src)); got != m-n {
			t.Errorf("%s is %d", src, got)
		}
		src = fmt.Sprintf("(at (winding-turns %s) 0)", intTerm(m))
		if got := integer(t, normal(t, s, e, src)); got != m {
			t.Errorf("%s is %d", src, got)
		}
	}
}

// The degree of a composite is the product of the degrees (Book, exercise 8.5 and
// common practice).
func TestDegreesMultiply(t *testing.T) {
	e := withLibrary(t, "circle")
	s := e.Scope()
	r := rand.New(rand.NewPCG(8, 3))
	for k := range 24 {
		m, n := r.IntN(19)-9, r.IntN(19)-9
		if k == 0 {
			m, n = 17, -23
		}
		src := fmt.Sprintf("(degree (lam (x) (wrap %s (wrap %s x))) (line (i) base))", intTerm(m), intTerm(n))
		if got := integer(t, normal(t, s, e, src)); got != m*n {
			t.Errorf("a map of degree %d after one of degree %d has degree %d", m, n, got)
		}
	}
	src := "(degree (lam (x) (wrap (pos 3) (wrap (negsuc 1) (wrap (pos 4) x)))) (line (i) base))"
	if got := integer(t, normal(t, s, e, src)); got != 3*-2*4 {
		t.Errorf("%s is %d", src, got)
	}
}

func BenchmarkWinding(b *testing.B) {
	e := withLibrary(b, "circle")
	s := e.Scope()
	for _, shape := range []struct {
		name string
		lean int
	}{{"left", 0}, {"right", 1}, {"balanced", 2}} {
		for _, n := range []int{1000, 2000, 4000, 8000} {
			w, want := word(rand.New(rand.NewPCG(8, 4)), n, shape.lean)
			b.Run(fmt.Sprintf("%s/%d", shape.name, n), func(b *testing.B) {
				b.ReportAllocs()
				for b.Loop() {
					if got := integer(b, normal(b, s, e, "(winding "+w+")")); got != want {
						b.Fatal(got, want)
					}
				}
			})
		}
	}
	for _, n := range []int{1000, 4000, 16_000} {
		b.Run(fmt.Sprintf("power/%d", n), func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				if got := integer(b, normal(b, s, e, "(winding (turns "+intTerm(n)+"))")); got != n {
					b.Fatal(got)
				}
			}
		})
	}
}

// Transport along an n-fold composite of paths made by univalence.
func BenchmarkTransportComposite(b *testing.B) {
	e := withLibrary(b, "integers")
	s := e.Scope()
	for _, n := range []int{100, 200, 400, 800} {
		src := strings.Repeat("(compose (U 0) Int Int Int ", n-1) + "turn" + strings.Repeat(" turn)", n-1)
		src = "(transp (i (at " + src + " i)) bot (pos 0))"
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				if got := integer(b, normal(b, s, e, src)); got != n {
					b.Fatal(got)
				}
			}
		})
	}
}
