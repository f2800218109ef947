package main

import (
	"fmt"
	"strings"

	"example.com/boxwright/examples/measure/gauge"
)

// Transport and composition through n nested formers. Berth n is Nat at every
// closed n, but only its evaluation shows that, so that each type needs the value
// of the component before it on the whole line; the first component is an integer
// that turns along the line of types of its successor. With "all", the type of a
// component depends on the sum of all the components before it.

const formersText = `
(def plus (-> Nat Nat Nat) (lam (m n) (elim (x Nat) m (zero n) ((suc k h) (suc h)))))
(def Berth (-> Nat (U 0)) (lam (n) (elim (x (U 0)) n (zero Nat) ((suc k h) h))))
(def number (Pi ((n Nat)) (-> (Berth n) Nat))
  (lam (n) (elim (x (-> (Berth x) Nat)) n (zero (lam (y) y)) ((suc k h) h))))
(def berth (Pi ((n Nat)) (-> Nat (Berth n)))
  (lam (n) (elim (x (-> Nat (Berth x))) n (zero (lam (y) y)) ((suc k h) h))))

(def Pairs (-> Nat Nat (U 0))
  (lam (n) (elim (x (-> Nat (U 0))) n (zero (lam (m) Unit))
    ((suc k h) (lam (m) (Sigma ((y (Berth m))) (h (number m y))))))))
(def pairs (Pi ((n Nat) (m Nat)) (Pairs n m))
  (lam (n) (elim (x (Pi ((m Nat)) (Pairs x m))) n (zero (lam (m) unit))
    ((suc k h) (lam (m) (pair (berth m 1) (h (number m (berth m 1)))))))))
(def summed (Pi ((n Nat) (m Nat)) (-> (Pairs n m) Nat))
  (lam (n) (elim (x (Pi ((m Nat)) (-> (Pairs x m) Nat))) n (zero (lam (m p) 0))
    ((suc k h) (lam (m p) (plus (number m (fst p)) (h (number m (fst p)) (snd p))))))))
(def Functions (-> Nat Nat (U 0))
  (lam (n) (elim (x (-> Nat (U 0))) n (zero (lam (m) Nat))
    ((suc k h) (lam (m) (Pi ((y (Berth m))) (h (number m y))))))))
(def functions (Pi ((n Nat) (m Nat)) (Functions n m))
  (lam (n) (elim (x (Pi ((m Nat)) (Functions x m))) n (zero (lam (m) m))
    ((suc k h) (lam (m y) (h (number m y)))))))
(def applied (Pi ((n Nat) (m Nat)) (-> (Functions n m) Nat))
  (lam (n) (elim (x (Pi ((m Nat)) (-> (Functions x m) Nat))) n (zero (lam (m f) f))
    ((suc k h) (lam (m f) (h (number m (berth m 1)) (f (berth m 1))))))))

(data List () (point nil ()) (point cons ((head Nat) (tail List))))
(def sum (-> List Nat) (lam (l) (elim (x Nat) l (nil 0) ((cons y ys h) (plus y h)))))
(def PairsAll (-> Nat List (U 0))
  (lam (n) (elim (x (-> List (U 0))) n (zero (lam (l) Unit))
    ((suc k h) (lam (l) (Sigma ((y (Berth (sum l)))) (h (cons (number (sum l) y) l))))))))
(def pairsAll (Pi ((n Nat) (l List)) (PairsAll n l))
  (lam (n) (elim (x (Pi ((l List)) (PairsAll x l))) n (zero (lam (l) unit))
    ((suc k h) (lam (l) (pair (berth (sum l) 1) (h (cons (number (sum l) (berth (sum l) 1)) l))))))))
(def summedAll (Pi ((n Nat) (l List)) (-> (PairsAll n l) Nat))
  (lam (n) (elim (x (Pi ((l List)) (-> (PairsAll x l) Nat))) n (zero (lam (l p) 0))
    ((suc k h) (lam (l p) (plus (number (sum l) (fst p)) (h (cons (number (sum l) (fst p)) l) (snd p))))))))
(def FunctionsAll (-> Nat List (U 0))
  (lam (n) (elim (x (-> List (U 0))) n (zero (lam (l) Nat))
    ((suc k h) (lam (l) (Pi ((y (Berth (sum l)))) (h (cons (number (sum l) y) l))))))))
(def functionsAll (Pi ((n Nat) (l List)) (FunctionsAll n l))
  (lam (n) (elim (x (Pi ((l List)) (FunctionsAll x l))) n (zero (lam (l) (sum l)))
    ((suc k h) (lam (l y) (h (cons (number (sum l) y) l)))))))
(def appliedAll (Pi ((n Nat) (l List)) (-> (FunctionsAll n l) Nat))
  (lam (n) (elim (x (Pi ((l List)) (-> (FunctionsAll x l) Nat))) n (zero (lam (l f) f))
    ((suc k h) (lam (l f) (h (cons (number (sum l) (berth (sum l) 1)) l) (f (berth (sum l) 1))))))))

(def two (Path Nat 2 2) (line (i) (hcomp Nat 2 ((= i 0) (j) 2) ((= i 1) (j) 2))))
`

// nestedText has the lines of types, their elements, and what is asked of an
// element at 1.
const nestedText = `
(load "integers.sexp")
` + formersText + `
(def start (Pi ((i I)) (-> (at turn i) Nat))
  (lam (i z) (elim (x Nat) (unglue z) ((pos n) n) ((negsuc n) n))))
(def first (Pi ((i I)) (at turn i))
  (lam (i) (glue (pos 2) ((= i 0) (pos 1)) ((= i 1) (pos 2)))))

; The lines of types, their elements, and what is asked of an element at 1.
(def P (-> I Nat (U 0)) (lam (i n) (Sigma ((z (at turn i))) (Pairs n (start i z)))))
(def p (Pi ((i I) (n Nat)) (P i n)) (lam (i n) (pair (first i) (pairs n (start i (first i))))))
(def askP (Pi ((n Nat)) (-> (P 1 n) Nat)) (lam (n p) (summed n (start 1 (fst p)) (snd p))))
(def F (-> I Nat (U 0)) (lam (i n) (Pi ((z (at turn i))) (Functions n (start i z)))))
(def f (Pi ((i I) (n Nat)) (F i n)) (lam (i n z) (functions n (start i z))))
(def askF (Pi ((n Nat)) (-> (F 1 n) Nat)) (lam (n f) (applied n (start 1 (pos 2)) (f (pos 2)))))
(def PA (-> I Nat (U 0)) (lam (i n) (Sigma ((z (at turn i))) (PairsAll n (cons (start i z) nil)))))
(def pA (Pi ((i I) (n Nat)) (PA i n)) (lam (i n) (pair (first i) (pairsAll n (cons (start i (first i)) nil)))))
(def askPA (Pi ((n Nat)) (-> (PA 1 n) Nat)) (lam (n p) (summedAll n (cons (start 1 (fst p)) nil) (snd p))))
(def FA (-> I Nat (U 0)) (lam (i n) (Pi ((z (at turn i))) (FunctionsAll n (cons (start i z) nil)))))
(def fA (Pi ((i I) (n Nat)) (FA i n)) (lam (i n z) (functionsAll n (cons (start i z) nil))))
(def askFA (Pi ((n Nat)) (-> (FA 1 n) Nat)) (lam (n f) (appliedAll n (cons (start 1 (pos 2)) nil) (f (pos 2)))))
` + quaysText

// quaysText has n nested path types over a line, with the constant path of
// constant paths.
const quaysText = `
(assume Quay (-> I (U 0))) (assume crane (Pi ((i I)) (Quay i)))
(def Nested (-> Nat (Pi ((i I)) (Sigma ((A (U 0))) A)))
  (lam (n) (elim (x (Pi ((i I)) (Sigma ((A (U 0))) A))) n
    (zero (lam (i) (pair (Quay i) (crane i))))
    ((suc k h) (lam (i) (let ((q (Sigma ((A (U 0))) A) (h i)))
      (pair (Path (fst q) (snd q) (snd q)) (line (j) (snd q)))))))))
`

var (
	nestedSizes = []int{10, 32, 100, 316, 1000}
	squareSizes = []int{4, 13, 40, 126, 400}
)

// nestedRow is a row of a term in a scope with the dimension i0 and more.
func nestedRow(name string, sizes []int, target float64, dimensions func(n int) int, term func(n int) string, answer func(n int) string) gauge.Row {
	return gauge.Row{Group: dimensionGroup, Name: name, Kind: gauge.Growth, Sizes: sizes, Unit: "formers", Target: target,
		Prepare: func(n int) (*gauge.Case, error) {
			h, err := newHost(nestedText)
			if err != nil {
				return nil, err
			}
			s, err := h.dimensions(dimensions(n))
			if err != nil {
				return nil, err
			}
			return h.normalising(s, term(n), answer(n)), nil
		}}
}

func one(int) int { return 1 }

func none(int) string { return "" }

// nestedPath is the transport or composite at n nested paths, at the dimensions.
func nestedPath(composite bool, n int, at string) string {
	k := fmt.Sprintf("(transp (i (fst (Nested %d i))) bot (snd (Nested %d 0)))", n, n)
	if composite {
		k = fmt.Sprintf("(comp (i (fst (Nested %d i))) (snd (Nested %d 0)) ((= i0 0) (i) (snd (Nested %d i))))", n, n, n)
	}
	return fmt.Sprintf("(at %s %s)", k, at)
}

func nestedRows() []gauge.Row {
	var out []gauge.Row
	type kind struct{ name, ty, element, ask string }
	pairs, functions := kind{"pairs", "P", "p", "askP"}, kind{"functions", "F", "f", "askF"}
	sumOf := func(k kind) func(n int) string {
		return func(n int) string {
			switch k.ty {
			case "P", "PA":
				return fmt.Sprint(n)
			case "F":
				return "1"
			}
			return fmt.Sprint(n + 2)
		}
	}
	transp := func(k kind, on string, sizes []int, target float64) gauge.Row {
		return nestedRow("transp at n nested "+k.name+", each on "+on, sizes, target, one, func(n int) string {
			return fmt.Sprintf("(%s %d (transp (i (%s i %d)) bot (%s 0 %d)))", k.ask, n, k.ty, n, k.element, n)
		}, sumOf(k))
	}
	comp := func(k kind, on string, sizes []int, target float64) gauge.Row {
		return nestedRow("comp at n nested "+k.name+", each on "+on, sizes, target, one, func(n int) string {
			return fmt.Sprintf("(%s %d (comp (i (%s i %d)) (%s 0 %d) ((= i0 0) (i) (%s i %d))))", k.ask, n, k.ty, n, k.element, n, k.element, n)
		}, sumOf(k))
	}
	all := func(k kind) kind { return kind{k.name, k.ty + "A", k.element + "A", k.ask + "A"} }
	out = append(out,
		transp(pairs, "the one before", nestedSizes, 1.2), transp(functions, "the one before", nestedSizes, 1.2), comp(functions, "the one before", nestedSizes, 1.2),
		comp(pairs, "the one before", nestedSizes, 2.1), transp(all(pairs), "all before", squareSizes, 2.1), transp(all(functions), "all before", squareSizes, 2.1), comp(all(functions), "all before", squareSizes, 2.1),
	)
	for _, composite := range []bool{false, true} {
		word := "transp"
		if composite {
			word = "comp"
		}
		out = append(out, nestedRow(word+" at n nested paths, at an end", []int{2, 6, 20, 63, 200}, 1.2, one, func(n int) string {
			return nestedPath(composite, n, "0"+strings.Repeat(" i0", n-1))
		}, none), nestedRow(word+" at n nested paths, at one generic dimension and the last at an end", []int{2, 6, 20, 63, 200}, 2.1, one, func(n int) string {
			return nestedPath(composite, n, strings.Repeat("i0 ", n-1)+"0")
		}, none))
		generic := func(name string, target float64, quantity string) gauge.Row {
			return gauge.Row{Group: dimensionGroup, Name: name, Kind: gauge.Growth, Sizes: []int{1, 2, 3, 4, 5}, Unit: "formers", Target: target, Quantity: quantity,
				Prepare: func(n int) (*gauge.Case, error) {
					h, err := newHost(nestedText)
					if err != nil {
						return nil, err
					}
					s, err := h.dimensions(n)
					if err != nil {
						return nil, err
					}
					var at []string
					for k := range n {
						at = append(at, fmt.Sprintf("i%d", k))
					}
					return h.measuring(s, nestedPath(composite, n, strings.Join(at, " ")))
				}}
		}
		out = append(out, generic(word+" at n nested paths, at generic dimensions", 2.1, ""),
			generic(word+" at n nested paths, at generic dimensions, nodes as a shared graph", 2.1, "nodes"))
	}
	return append(out, towerRow())
}

// towerText is the line of types of the tower at the end or dimension i: a point,
// a path from it to itself, a path from that to itself, and so on.
func towerText(n int, i string) string {
	b, ty := strings.Builder{}, "(Yard "+i+")"
	fmt.Fprintf(&b, "(Sigma ((x0 %s)", ty)
	for k := 1; k < n; k++ {
		ty = fmt.Sprintf("(Path %s x%d x%d)", ty, k-1, k-1)
		fmt.Fprintf(&b, " (x%d %s)", k, ty)
	}
	fmt.Fprintf(&b, ") (Path %s x%d x%d))", ty, n-1, n-1)
	return b.String()
}

func towerRow() gauge.Row {
	return gauge.Row{Group: dimensionGroup, Name: "tower of paths over paths, the last of it transported", Kind: gauge.Factor, Sizes: []int{1, 2, 3, 4, 5}, Unit: "levels", Target: 3, Quantity: "steps",
		Prepare: func(n int) (*gauge.Case, error) {
			h, err := newHost(fmt.Sprintf("(assume Yard (-> I (U 0))) (assume cargo %s)", towerText(n, "0")))
			if err != nil {
				return nil, err
			}
			s, err := h.dimensions(n)
			if err != nil {
				return nil, err
			}
			text := fmt.Sprintf("(transp (i %s) bot cargo)", towerText(n, "i"))
			var at []string
			for k := range n {
				text, at = "(snd "+text+")", append(at, fmt.Sprintf("i%d", k))
			}
			return h.measuring(s, fmt.Sprintf("(at %s %s)", text, strings.Join(at, " ")))
		}}
}
