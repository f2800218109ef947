package main

import (
	"fmt"

	"example.com/boxwright/examples/measure/gauge"
	"example.com/boxwright/nbe/term"
)

// A path concatenated n times: of neutral paths at a point, taken at an end and
// read back as a whole; and cubes with all their walls.

const pathsText = `
(assume Quay (U 0)) (assume crane Quay) (assume round (Path Quay crane crane))
(def Tour (U 0) (Path Quay crane crane))
(def then (-> Tour Tour Tour)
  (lam (p q) (line (i) (hcomp Quay (at p i) ((= i 0) (j) crane) ((= i 1) (j) (at q j))))))
(def left (-> Nat Tour) (lam (n) (elim (x Tour) n (zero round) ((suc k h) (then h round)))))
(def right (-> Nat Tour) (lam (n) (elim (x Tour) n (zero round) ((suc k h) (then round h)))))
(def balanced (-> Nat Nat Tour)
  (lam (n) (elim (x (-> Nat Tour)) n
    (zero (lam (m) round))
    ((suc k h) (lam (m) (then (h m) (h (suc m))))))))
`

var (
	longSizes  = []int{1000, 3162, 10_000, 31_623, 100_000}
	powerSizes = []int{1 << 10, 1 << 12, 1 << 14, 1 << 15, 1 << 17}
)

// concatenated is the term of an n-fold concatenation of a shape.
func concatenated(shape string, n int) string {
	if shape == "balanced" {
		return fmt.Sprintf("(balanced %d 0)", log2(n))
	}
	return fmt.Sprintf("(%s %d)", shape, n-1)
}

func log2(n int) (k int) {
	for ; n > 1; n /= 2 {
		k++
	}
	return k
}

func pathRows() []gauge.Row {
	var out []gauge.Row
	for _, shape := range []string{"left", "right", "balanced"} {
		sizes := longSizes
		if shape == "balanced" {
			sizes = powerSizes
		}
		row := func(what string, term func(n int) string) {
			out = append(out, gauge.Row{Group: dimensionGroup, Name: "path concatenated n times, " + shape + ", " + what, Kind: gauge.Growth, Sizes: sizes, Unit: "paths", Target: 1.15,
				Prepare: func(n int) (*gauge.Case, error) {
					h, err := newHost(pathsText)
					if err != nil {
						return nil, err
					}
					return h.normalising(nil, term(n), ""), nil
				}})
		}
		row("at a face", func(n int) string { return fmt.Sprintf("(at %s 1)", concatenated(shape, n)) })
		row("read back", func(n int) string { return concatenated(shape, n) })
	}
	return append(out, gauge.Row{Group: dimensionGroup, Name: "cube with all walls at a closed natural", Kind: gauge.Growth, Sizes: []int{1, 2, 4, 8, 12}, Unit: "dimensions", Target: 1.15,
		Prepare: func(n int) (*gauge.Case, error) {
			h, err := newHost("")
			if err != nil {
				return nil, err
			}
			s, err := h.dimensions(n)
			if err != nil {
				return nil, err
			}
			var walls []term.Row
			for k := range n {
				for end := range uint64(2) {
					walls = append(walls, term.Wall(term.Eq(term.Name(fmt.Sprintf("i%d", k)), end), "j", term.Numeral(5)))
				}
			}
			return h.normalising(s, term.Hcomp(term.Name("Nat"), term.Numeral(5), walls...), "5"), nil
		}})
}
