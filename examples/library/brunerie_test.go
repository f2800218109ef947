package library

import (
	"fmt"
	"testing"
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
