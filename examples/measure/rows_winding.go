package main

import (
	"fmt"
	"math/big"
	"math/rand/v2"

	"example.com/boxwright/examples/measure/gauge"
	"example.com/boxwright/nbe/term"
)

// Winding numbers, composites of ua, degrees on the sphere and carried addition:
// the scripts of the library at work.

const windingText = `
(load "circle.sexp")
(def balanced-turns (-> Nat Nat Loops)
  (lam (n) (elim (x (-> Nat Loops)) n
    (zero (lam (m) turn-once))
    ((suc k h) (lam (m) (then (h m) (h (suc m))))))))
(data Word () (point stop ()) (point forward ((w Word))) (point back-one ((w Word))))
(def walked (-> Word Loops)
  (lam (w) (elim (x Loops) w (stop rest) ((forward v h) (then h turn-once)) ((back-one v h) (then h turn-back)))))
(def turned (-> Nat (Path (U 0) Int Int))
  (lam (n) (elim (x (Path (U 0) Int Int)) n (zero turn) ((suc k h) (compose (U 0) Int Int Int h turn)))))
`

// windingRows are the growth rows of a shape of loops, and with ratio the rows of
// one turn.
func windingRow(name string, kind gauge.Kind, sizes []int, unit string, target float64, term func(n int) (any, string)) gauge.Row {
	return gauge.Row{Group: dimensionGroup, Name: name, Kind: kind, Sizes: sizes, Unit: unit, Target: target,
		Prepare: func(n int) (*gauge.Case, error) {
			h, err := newHost(windingText)
			if err != nil {
				return nil, err
			}
			t, answer := term(n)
			c := h.normalising(nil, t, answer)
			c.Parts = float64(n)
			return c, nil
		}}
}

// word is a random word of turns and the integer it turns by.
func word(n int) (any, string) {
	random := rand.New(rand.NewPCG(3, 1))
	w, sum := term.Name("stop"), 0
	for range n {
		if random.IntN(2) == 0 {
			w = term.Apply(term.Name("forward"), w)
			sum++
		} else {
			w = term.Apply(term.Name("back-one"), w)
			sum--
		}
	}
	return term.Apply(term.Name("winding"), term.Apply(term.Name("walked"), w)), integer(sum)
}

func integer(z int) string {
	if z < 0 {
		return fmt.Sprintf("(negsuc %d)", -z-1)
	}
	return fmt.Sprintf("(pos %d)", z)
}

const sphereText = `
(load "suspension.sexp")
(def Loop2 (U 0) (Path (Path Sphere2 north north) (meridian-loop base) (meridian-loop base)))
(def surface Loop2 (line (j) (meridian-loop (loop j))))
(def surfaces (-> Nat Loop2)
  (lam (n) (elim (x Loop2) n (zero (line (j) (meridian-loop base)))
    ((suc k h) (compose (Path Sphere2 north north) (meridian-loop base) (meridian-loop base) (meridian-loop base) h surface)))))
(def bundle-degree (-> Loop2 Int)
  (lam (q)
    (winding (compose Circle base (hopf-transport base base) base
      (inverse Circle (hopf-transport base base) base (hopf-rotates base base))
      (compose Circle (hopf-transport base base) (hopf-transport base base) base
        (line (j) (transp (i (hopf (at (at q j) i))) bot base))
        (hopf-rotates base base))))))
`

// base4 is a number as an element of Quaternary: the last digit outermost.
func base4(n *big.Int) *term.Written {
	digits := n.Text(4)
	w := term.Name("lead" + digits[:1])
	for _, d := range digits[1:] {
		w = term.Apply(term.Name("digit"+string(d)), w)
	}
	return w
}

// digits is a random number of n digits in base 4.
func digits(random *rand.Rand, n int) *big.Int {
	out := big.NewInt(int64(1 + random.IntN(3)))
	for range n - 1 {
		out.Mul(out, big.NewInt(4)).Add(out, big.NewInt(int64(random.IntN(4))))
	}
	return out
}

func carriedCase(n int) (*gauge.Case, error) {
	h, err := newHost(`(load "numerals.sexp")`)
	if err != nil {
		return nil, err
	}
	random := rand.New(rand.NewPCG(4, 2))
	a, b := digits(random, n), digits(random, n)
	sum := base4(new(big.Int).Add(a, b)).Text(1 << 30)
	return h.normalising(nil, term.Apply(term.Name("quaternary-plus"), base4(a), base4(b)), sum), nil
}

func windingRows() []gauge.Row {
	turns := func(n int) (any, string) { return fmt.Sprintf("(winding (turns (pos %d)))", n), integer(n) }
	balanced := func(n int) (any, string) {
		return fmt.Sprintf("(winding (balanced-turns %d 0))", log2(n)), integer(n)
	}
	links := func(n int) (any, string) {
		return fmt.Sprintf("(transp (i (at (turned %d) i)) bot (pos 0))", n-1), integer(n)
	}
	return []gauge.Row{
		windingRow("winding number of loop^n", gauge.Growth, longSizes, "turns", 1.15, turns),
		windingRow("winding number of a balanced tree of loops", gauge.Growth, powerSizes, "turns", 1.15, balanced),
		windingRow("winding number of a random word", gauge.Growth, longSizes, "turns", 1.15, word),
		windingRow("winding number, one turn", gauge.Ratio, []int{10_000}, "turns", 500, turns),
		windingRow("winding number, live heap of a turn", gauge.Heap, []int{100_000}, "turns", 4096, turns),
		windingRow("transport along n-fold composites of ua", gauge.Growth, longSizes, "links", 1.15, links),
		windingRow("transport along composites of ua, one link", gauge.Ratio, []int{10_000}, "links", 400, links),
		{Group: dimensionGroup, Name: "degree of n-fold loops of the sphere", Kind: gauge.Growth, Sizes: []int{1, 3, 10, 32, 100}, Unit: "surfaces", Target: 1.15,
			Prepare: func(n int) (*gauge.Case, error) {
				h, err := newHost(sphereText)
				if err != nil {
					return nil, err
				}
				return h.normalising(nil, fmt.Sprintf("(bundle-degree (surfaces %d))", n), integer(n)), nil
			}},
		{Group: dimensionGroup, Name: "addition carried from base 2 to base 4", Kind: gauge.Growth, Sizes: []int{41, 128, 410, 1296, 4096}, Unit: "digits", Target: 1.3, Prepare: carriedCase},
	}
}
