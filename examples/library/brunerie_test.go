package library

import (
	"context"
	"fmt"
	"testing"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/script"
)

// The degree of a map of the join of two circles that is the join of two maps of
// the circle is the product of their degrees (common practice).
//
// A letter with base is nothing, which draws in the sides on which it is not so
// by definition.
func TestDegreesOfJoinsMultiply(t *testing.T) {
	e := withLibrary(t, "brunerie")
	s := e.Scope()
	for m := -2; m <= 2; m++ {
		for n := -2; n <= 2; n++ {
			src := fmt.Sprintf(`(square-degree (line (j i)
				(hcomp James (shift-forth (wrap %s (loop i)) (wrap %s (loop j)) empty-word)
					((or (= i 0) (= i 1)) (k) empty-word)
					((or (= j 0) (= j 1)) (k) (at (shift-at-base (wrap %[1]s (loop i))) k)))))`, intTerm(m), intTerm(n))
			if got := integer(t, normal(t, s, e, src)); got != m*n {
				t.Errorf("the join of maps of degrees %d and %d has degree %d", m, n, got)
			}
		}
	}
}

// Ljungström and Mörtberg (LICS 2023) report -2 for their simplified number; that
// the fourth homotopy group of the 3-sphere is Z/2 is classical (Freudenthal 1937),
// and asks for 2 up to sign.
func TestBrunerieNumber(t *testing.T) {
	e := withLibrary(t, "brunerie")
	if got := integer(t, normal(t, e.Scope(), e, "brunerie-number")); got != -2 {
		t.Errorf("the Brunerie number is %d", got)
	}
}

// The same degrees where the words are carried by transport; -v tells what they
// cost. BOXWRIGHT_LONG=1 asks for those that take half a minute of processor time.
func TestDegreesByTransport(t *testing.T) {
	e := newEngine(t)
	if err := session(e, func(r script.Result) {
		if r.Err != nil {
			t.Fatal(shortened(r.Err))
		}
	}).File(context.Background(), "transports.sexp"); err != nil {
		t.Fatal(err)
	}
	for _, stage := range []struct {
		src  string
		want int
		long bool
	}{
		{"(square-degree whitehead-square)", -2, false}, // for comparison, by equivalences
		{"(degree-once (line (j i) (moved (loop i) (loop j) base)))", 1, false},
		{"(degree-once back-square)", -1, false},
		{"(degree-once inverse-square)", 2, true},
		{"(degree-twice product-square)", -2, true},
	} {
		if stage.long && !long {
			continue
		}
		var stats nbe.Stats
		got := integer(t, normal(t, e.Scope(), e, stage.src, nbe.Within(nbe.Limits{Depth: 150_000}), nbe.Count(&stats)))
		if got != stage.want {
			t.Errorf("%s is %d", stage.src, got)
		}
		t.Logf("%s: %d steps, %d MB charged, %d levels deep", stage.src, stats.Steps, stats.Memory>>20, stats.Deepest)
	}
}
