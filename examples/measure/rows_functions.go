package main

import (
	"fmt"
	"math/big"
	"math/rand/v2"
	"slices"
	"strings"

	"example.com/boxwright/examples/measure/gauge"
	"example.com/boxwright/nbe/term"
)

// Function calls and recursion, against the same recursions as Go closures.

const functionsText = `
(def Church (U 1) (Pi ((A (U 0))) (-> (-> A A) A A)))
(def two Church (lam (A f x) (f (f x))))
(def times-church (-> Church Church Church) (lam (m n A f) (m A (n A f))))
(def square (-> Church Church) (lam (m) (times-church m m)))
(def n16 Church (square (square (square (square two)))))

(def ackermann (-> Nat Nat Nat)
  (lam (m) (elim (x (-> Nat Nat)) m
    (zero (lam (n) (suc n)))
    ((suc k h) (lam (n) (elim (y Nat) n (zero (h 1)) ((suc l g) (h g))))))))

(def plus (-> Nat Nat Nat) (lam (m n) (elim (x Nat) m (zero n) ((suc k h) (suc h)))))
(def times (-> Nat Nat Nat) (lam (m n) (elim (x Nat) m (zero 0) ((suc k h) (plus n h)))))
(def factorial (-> Nat Nat) (lam (n) (elim (x Nat) n (zero 1) ((suc k h) (times (suc k) h)))))
(def fibonacci (-> Nat Nat)
  (lam (n) (fst (elim (x (* Nat Nat)) n
    (zero (pair 0 1))
    ((suc k h) (pair (snd h) (plus (fst h) (snd h))))))))
(def binomial (-> Nat Nat Nat)
  (lam (n) (elim (x (-> Nat Nat)) n
    (zero (lam (k) (elim (y Nat) k (zero 1) ((suc l g) 0))))
    ((suc m h) (lam (k) (elim (y Nat) k (zero 1) ((suc l g) (plus (h l) (h (suc l))))))))))

(data List () (point nil ()) (point cons ((head Nat) (tail List))))
(def at-most (-> Nat Nat Bool)
  (lam (m) (elim (x (-> Nat Bool)) m
    (zero (lam (n) true))
    ((suc k h) (lam (n) (elim (y Bool) n (zero false) ((suc l g) (h l))))))))
(def insert (-> Nat List List)
  (lam (x l) (elim (y List) l
    (nil (cons x nil))
    ((cons y ys h) (elim (z List) (at-most x y) (true (cons x (cons y ys))) (false (cons y h)))))))
(def sort (-> List List) (lam (l) (elim (y List) l (nil nil) ((cons x xs h) (insert x h)))))

(def then (-> (-> Nat Nat) (-> Nat Nat) (-> Nat Nat)) (lam (f g x) (f (g x))))
(def composite (-> Nat (-> Nat Nat))
  (lam (n) (elim (x (-> Nat Nat)) n (zero (lam (x) x)) ((suc k h) (then (lam (x) (suc x)) h)))))
`

// evaluating is the row of a term of functionsText against a baseline.
func evaluating(name string, target float64, size int, text, answer string, base func()) gauge.Row {
	return gauge.Row{Group: "Function calls and recursion", Name: name, Kind: gauge.Ratio, Sizes: []int{size}, Target: target, Baseline: "the same in Go closures",
		Prepare: func(int) (*gauge.Case, error) {
			h, err := newHost(functionsText)
			if err != nil {
				return nil, err
			}
			c := h.normalising(nil, text, answer)
			c.Base = base
			return c, nil
		}}
}

// check ends the run where a baseline computes something else than the engine.
func check(got *big.Int, want string) {
	if got.String() != want {
		panic("the baseline gives " + got.String())
	}
}

func functionRows() []gauge.Row {
	factorial := new(big.Int).MulRange(1, 200).String()
	fibonacci := nativeFibonacci(10_000).String()
	binomial := new(big.Int).Binomial(16, 8).String()
	return []gauge.Row{
		evaluating("Church numeral 2^16 at successor and zero", 4, 1<<16, "(n16 Nat (lam (x) (suc x)) 0)", "65536", nativeChurch()),
		evaluating("Ackermann A(2,300) by the recursor", 5, 300, "(ackermann 2 300)", "603", nativeAckermann(2, 300, 603)),
		evaluating("Ackermann A(3,7) by the recursor", 5, 7, "(ackermann 3 7)", "1021", nativeAckermann(3, 7, 1021)),
		evaluating("factorial 200", 4, 200, "(factorial 200)", factorial, func() { check(nativeFactorial(200), factorial) }),
		evaluating("Fibonacci 10,000 by pairs", 4, 10_000, "(fibonacci 10000)", fibonacci, func() { check(nativeFibonacci(10_000), fibonacci) }),
		evaluating("binomial 16 over 8", 4, 16, "(binomial 16 8)", binomial, func() { check(nativeBinomial(16, 8), binomial) }),
		sortRow(1000),
		evaluating("function composition at depth 10^6", 6, 1_000_000, "(composite 1000000 0)", "1000000", func() {
			if call(nativeComposite(1_000_000), 0).(int) != 1_000_000 {
				panic("composite")
			}
		}),
	}
}

// crates are n numbers below 16, the same ones each time.
func crates(n int) []int {
	random := rand.New(rand.NewPCG(16, 1))
	out := make([]int, n)
	for k := range out {
		out[k] = random.IntN(16)
	}
	return out
}

func sortRow(n int) gauge.Row {
	return gauge.Row{Group: "Function calls and recursion", Name: "insertion sort of numbers below 16", Kind: gauge.Ratio, Sizes: []int{n}, Target: 4, Baseline: "the same in Go closures",
		Prepare: func(n int) (*gauge.Case, error) {
			h, err := newHost(functionsText)
			if err != nil {
				return nil, err
			}
			numbers := crates(n)
			list, native := term.Name("nil"), universe(nil)
			for k := n - 1; k >= 0; k-- {
				list = term.Apply(term.Name("cons"), term.Numeral(uint64(numbers[k])), list)
				native = &cons{numbers[k], native}
			}
			if err := h.e.Define(background, "crates", term.Name("List"), list, h.options...); err != nil {
				return nil, err
			}
			slices.Sort(numbers)
			var b strings.Builder
			for _, x := range numbers {
				fmt.Fprintf(&b, "(cons %d ", x)
			}
			answer := b.String() + "nil" + strings.Repeat(")", n)
			c := h.normalising(nil, "(sort crates)", answer)
			c.Base = func() {
				l := nativeSort(native)
				for _, x := range numbers {
					c := l.(*cons)
					if c.head.(int) != x {
						panic("sort")
					}
					l = c.tail
				}
			}
			return c, nil
		}}
}
