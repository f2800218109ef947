package main

import (
	"fmt"
	"math/big"
	"math/bits"
	"math/rand/v2"
	"reflect"
	"strings"

	"example.com/boxwright/examples/measure/gauge"
	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
)

// Reading back and comparing. The large values are balanced trees of pairs with
// functions at the leaves, each leaf another one, so that nothing is shared, and
// doublings, where everything is.

const readingText = `
(def doubled (-> Nat Nat) (lam (n) (elim (x Nat) n (zero 0) ((suc k h) (suc (suc h))))))
(def Tree (-> Nat (U 0)) (lam (n) (elim (x (U 0)) n (zero (-> Nat Nat Nat)) ((suc k h) (* h h)))))
(def tree (Pi ((n Nat)) (-> Nat (Tree n)))
  (lam (n) (elim (x (-> Nat (Tree x))) n
    (zero (lam (m x y) m))
    ((suc k h) (lam (m) (pair (h (doubled m)) (h (suc (doubled m)))))))))
(def another-tree (Pi ((n Nat)) (-> Nat (Tree n)))
  (lam (n) (elim (x (-> Nat (Tree x))) n
    (zero (lam (m x y) m))
    ((suc k h) (lam (m) (pair (h (doubled m)) (h (suc (doubled m)))))))))
(def Doubling (-> Nat (U 0)) (lam (n) (elim (x (U 0)) n (zero Nat) ((suc k h) (* h h)))))
(def doubling (Pi ((n Nat)) (-> Nat (Doubling n)))
  (lam (n) (elim (x (-> Nat (Doubling x))) n
    (zero (lam (m) m))
    ((suc k h) (lam (m) (let ((x (Doubling k) (h m))) (pair x x)))))))
(def another-doubling (Pi ((n Nat)) (-> Nat (Doubling n)))
  (lam (n) (elim (x (-> Nat (Doubling x))) n
    (zero (lam (m) m))
    ((suc k h) (lam (m) (let ((x (Doubling k) (h m))) (pair x x)))))))
(assume cargo Nat)
`

const readingGroup = "Reading back and comparing"

// depthOf is the depth of a tree of the given number of nodes, four for each leaf.
func depthOf(nodes int) int { return bits.Len(uint(nodes)/4) - 1 }

// builder makes the term nodes that reading a tree back makes.
type builder struct {
	pair, lam, numeral *term.Signature
	nat                term.Arg
}

// newBuilder takes the signatures from the form of a tree of one pair.
func newBuilder(c term.Core) *builder {
	pair := c.(*term.Op)
	lam := pair.Args[0].(*term.Op)
	numeral := lam.Args[0].(*term.Bound).Body.(*term.Op).Args[0].(*term.Bound).Body.(*term.Op)
	return &builder{pair.Sig, lam.Sig, numeral.Sig, numeral.Args[1]}
}

func (b *builder) tree(depth int, m int64) term.Core {
	if depth > 0 {
		return &term.Op{Sig: b.pair, Args: []term.Arg{b.tree(depth-1, 2*m), b.tree(depth-1, 2*m+1)}}
	}
	var c term.Core = &term.Op{Sig: b.numeral, Args: []term.Arg{term.Number{Int: big.NewInt(m)}, b.nat}}
	for _, hint := range []string{"y", "x"} {
		c = &term.Op{Sig: b.lam, Args: []term.Arg{&term.Bound{Hints: []string{hint}, Body: c}}}
	}
	return c
}

var sinkCore term.Core

func readBackRow() gauge.Row {
	return gauge.Row{Group: readingGroup, Name: "reading back pairs of functions, 10^6 nodes", Kind: gauge.Ratio, Sizes: []int{1 << 20}, Unit: "nodes", Target: 4, Baseline: "building the same term nodes",
		Prepare: func(n int) (*gauge.Case, error) {
			h, err := newHost(readingText)
			if err != nil {
				return nil, err
			}
			small, err := h.infer(nil, "(tree 1 0)")
			if err != nil {
				return nil, err
			}
			form, err := h.normal(small)
			if err != nil {
				return nil, err
			}
			b := newBuilder(form.Term)
			t, err := h.infer(nil, fmt.Sprintf("(tree %d 0)", depthOf(n)))
			if err != nil {
				return nil, err
			}
			form, err = h.normal(t) // evaluates it
			if err != nil {
				return nil, err
			}
			if !term.Same(form.Term, b.tree(depthOf(n), 0)) {
				return nil, fmt.Errorf("the baseline builds another tree")
			}
			c := gauge.Always(func() error { _, err := h.normal(t); return err })
			c.Base = func() { sinkCore = b.tree(depthOf(n), 0) }
			return c, nil
		}}
}

func compareRow() gauge.Row {
	return gauge.Row{Group: readingGroup, Name: "comparing two equal values built apart, 10^6 nodes", Kind: gauge.Ratio, Sizes: []int{1 << 20}, Unit: "nodes", Target: 3, Baseline: "reflect.DeepEqual on their terms",
		Prepare: func(n int) (*gauge.Case, error) {
			h, err := newHost(readingText)
			if err != nil {
				return nil, err
			}
			text := fmt.Sprintf("(tree %d 0)", depthOf(n))
			// By another definition, so that the folded forms do not answer.
			c, err := h.comparing(nil, text, fmt.Sprintf("(another-tree %d 0)", depthOf(n)), true, nbe.Equal)
			if err != nil {
				return nil, err
			}
			var terms [2]term.Core
			for k := range terms {
				t, err := h.infer(nil, text)
				if err != nil {
					return nil, err
				}
				form, err := h.normal(t)
				if err != nil {
					return nil, err
				}
				terms[k] = form.Term
			}
			c.Base = func() {
				if !reflect.DeepEqual(terms[0], terms[1]) {
					panic("DeepEqual")
				}
			}
			return c, nil
		}}
}

var fiveSizes = []int{100, 316, 1000, 3162, 10_000}

func doublingRow() gauge.Row {
	return gauge.Row{Group: readingGroup, Name: "comparing shared n-fold doublings", Kind: gauge.Growth, Sizes: fiveSizes, Unit: "doublings", Target: 1.15,
		Prepare: func(n int) (*gauge.Case, error) {
			h, err := newHost(readingText)
			if err != nil {
				return nil, err
			}
			return h.comparing(nil, fmt.Sprintf("(doubling %d 5)", n), fmt.Sprintf("(another-doubling %d 5)", n), false, nbe.Equal)
		}}
}

var treeSizes = []int{1 << 12, 1 << 14, 1 << 16, 1 << 18, 1 << 20}

func differentPairsRow() gauge.Row {
	return gauge.Row{Group: readingGroup, Name: "comparing (0, d) and (1, e), d and e large definitions", Kind: gauge.Growth, Sizes: treeSizes, Unit: "nodes", Target: 0.1,
		Prepare: func(n int) (*gauge.Case, error) {
			k := depthOf(n)
			h, err := newHost(readingText + fmt.Sprintf("(def d (Tree %d) (tree %d 0)) (def e (Tree %d) (tree %d 1))", k, k, k, k))
			if err != nil {
				return nil, err
			}
			pair := "(ann (pair %d %s) (* Nat (Tree %d)))"
			return h.comparing(nil, fmt.Sprintf(pair, 0, "d", k), fmt.Sprintf(pair, 1, "e", k), false, nbe.Different)
		}}
}

func foldedRow() gauge.Row {
	return gauge.Row{Group: readingGroup, Name: "comparing (0, d a) and (0, d a) built apart, d a large definition", Kind: gauge.Growth, Sizes: treeSizes, Unit: "nodes", Target: 0.1,
		Prepare: func(n int) (*gauge.Case, error) {
			k := depthOf(n)
			h, err := newHost(readingText + fmt.Sprintf("(def d (-> Nat (Tree %d)) (lam (a) (tree %d a)))", k, k))
			if err != nil {
				return nil, err
			}
			pair := fmt.Sprintf("(ann (pair 0 (d cargo)) (* Nat (Tree %d)))", k)
			return h.comparing(nil, pair, pair, false, nbe.Equal)
		}}
}

// randomScript is a script of n definitions of numbers, functions, pairs and
// paths, each built from earlier ones: the same one each time.
func randomScript(n int) string {
	g := &scriptGenerator{random: rand.New(rand.NewPCG(7, 7))}
	for g.n = 0; g.n < n; g.n++ {
		name := fmt.Sprintf("q%d", g.n)
		switch g.random.IntN(4) {
		case 0:
			fmt.Fprintf(&g.out, "(def %s Nat %s)\n", name, g.number(3, ""))
			g.numbers = append(g.numbers, name)
		case 1:
			fmt.Fprintf(&g.out, "(def %s (-> Nat Nat) (lam (x) %s))\n", name, g.number(3, "x"))
			g.functions = append(g.functions, name)
		case 2:
			fmt.Fprintf(&g.out, "(def %s (* Nat (-> Nat Nat)) (pair %s (lam (y) %s)))\n", name, g.number(2, ""), g.number(2, "y"))
			g.pairs = append(g.pairs, name)
		default:
			t := g.number(1, "z")
			fmt.Fprintf(&g.out, "(def %s (Pi ((z Nat)) (Path Nat %s %s)) (lam (z) (line (i) %s)))\n", name, t, t, t)
		}
	}
	return g.out.String()
}

type scriptGenerator struct {
	random                    *rand.Rand
	out                       strings.Builder
	n                         int
	numbers, functions, pairs []string
}

// recent is one of the last few names, so that scripts of all lengths look alike.
func (g *scriptGenerator) recent(names []string) string {
	return names[len(names)-1-g.random.IntN(min(len(names), 20))]
}

func (g *scriptGenerator) number(depth int, variable string) string {
	if depth > 0 {
		switch k := g.random.IntN(6); {
		case k == 0:
			return fmt.Sprintf("(suc %s)", g.number(depth-1, variable))
		case k == 1:
			return fmt.Sprintf("(elim (w Nat) %s (zero %s) ((suc k h) (suc h)))", g.number(depth-1, variable), g.number(depth-1, variable))
		case k == 2 && len(g.functions) > 0:
			return fmt.Sprintf("(%s %s)", g.recent(g.functions), g.number(depth-1, variable))
		case k == 3 && len(g.pairs) > 0:
			return fmt.Sprintf("((snd %s) %s)", g.recent(g.pairs), g.number(depth-1, variable))
		case k == 4 && len(g.pairs) > 0:
			return fmt.Sprintf("(fst %s)", g.recent(g.pairs))
		}
	}
	switch k := g.random.IntN(3); {
	case k == 0 && len(g.numbers) > 0:
		return g.recent(g.numbers)
	case k == 1 && variable != "":
		return variable
	}
	return fmt.Sprint(g.random.IntN(100))
}

// scriptCase checks a random script of n definitions, against reading its text.
func scriptCase(n int) (*gauge.Case, error) {
	text := []byte(randomScript(n))
	empty, err := newHost("")
	if err != nil {
		return nil, err
	}
	return &gauge.Case{
		Fresh: func() (func() error, error) {
			h := &host{e: empty.e.Fork()}
			forms, err := notation.ReadScript(text, "random.sexp", h.e.Words())
			if err != nil {
				return nil, err
			}
			return func() error {
				for _, f := range forms {
					if err := h.e.Define(background, f.Name, f.Type, f.Term); err != nil {
						return err
					}
				}
				return nil
			}, nil
		},
		Base: func() {
			if _, err := notation.ReadScript(text, "random.sexp", empty.e.Words()); err != nil {
				panic(err)
			}
		},
	}, nil
}

func readingRows() []gauge.Row {
	return []gauge.Row{
		readBackRow(), compareRow(), doublingRow(), differentPairsRow(), foldedRow(),
		{Group: readingGroup, Name: "checking a script of random definitions", Kind: gauge.Growth, Sizes: fiveSizes, Unit: "definitions", Target: 1.15, Baseline: "reading its text", Prepare: scriptCase},
		{Group: readingGroup, Name: "checking a script of random definitions, against reading it", Kind: gauge.Ratio, Sizes: []int{10_000}, Unit: "definitions", Target: 5, Baseline: "reading its text", Prepare: scriptCase},
	}
}
