package nbe_test

import (
	"context"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/value/interval"
)

// What is neutral, and normal forms: the order of walls, what a substitution
// may not skip, and what the comparison may not remember.

func TestRuleWallsInOrder(t *testing.T) {
	const source = "CCHM 2015, 4.1: faces are a distributive lattice, and walls agree where they meet"
	const given = `
		(assume A (U 0)) (assume a A) (assume s (Path (Path A a a) (line (_) a) (line (_) a)))
		(assume p (Path A a a)) (assume q (Path A a a))
	`
	holds(t, given,
		law{name: "any order", source: source, dims: "k l", ty: "A",
			left:  "(hcomp A a ((and (= k 0) (= l 1)) (i) (at p i)) ((and (= k 1) (= l 0)) (i) (at q i)))",
			right: "(hcomp A a ((and (= l 0) (= k 1)) (i) (at q i)) ((and (= l 1) (= k 0)) (i) (at p i)))"},
		law{name: "a face in parts", source: source, dims: "k l", ty: "A",
			left:  "(hcomp A a ((or (= k 0) (= l 0)) (i) (at p i)))",
			right: "(hcomp A a ((= l 0) (i) (at p i)) ((= k 0) (i) (at p i)))"},
		law{name: "an implied wall", source: source, dims: "k l", ty: "A",
			left:  "(hcomp A a ((and (= k 0) (= l 0)) (i) (at p i)) ((= k 0) (i) (at p i)))",
			right: "(hcomp A a ((= k 0) (i) (at p i)))"},
		law{name: "a face twice", source: source, dims: "k", ty: "A",
			left: "(hcomp A a ((= k 0) (i) (at p i)) ((= k 0) (i) (at p i)))", right: "(hcomp A a ((= k 0) (i) (at p i)))"},
		law{name: "walls that come to the same face", source: source, dims: "k", ty: "A",
			left:  "((ann (lam (k l) (hcomp A a ((= k 0) (i) (at p i)) ((= l 0) (i) (at p i)))) (-> I I A)) k k)",
			right: "(hcomp A a ((= k 0) (i) (at p i)))"},
		law{name: "a wall that comes to be implied", source: source, dims: "k l", ty: "A",
			left:  "((ann (lam (k l) (hcomp A a ((= k 0) (i) (at p i)) ((= l 0) (i) (at p i)))) (-> I I A)) (min k l) k)",
			right: "(hcomp A a ((= k 0) (i) (at p i)) ((= l 0) (i) (at p i)))"},
		law{name: "a derived face", source: source, dims: "k l", ty: "A",
			left:  "(hcomp A a ((= (min k (rev l)) 1) (i) (at p i)) ((= (max k (rev l)) 0) (i) (at q i)))",
			right: "(hcomp A a ((and (= k 0) (= l 1)) (i) (at q i)) ((and (= k 1) (= l 0)) (i) (at p i)))"},
		law{name: "both ends are not the whole", source: source, dims: "k", ty: "A", differ: true,
			left: "(hcomp A a ((or (= k 0) (= k 1)) (i) (at p i)))", right: "(hcomp A a (top (i) (at p i)))"},
		law{name: "each wall under its own face", source: source, dims: "k l", ty: "A",
			left: "(hcomp A a ((= k 0) (i) (at s (max k i) l)))", right: "(hcomp A a ((= k 0) (i) (at s i l)))"},
		law{name: "faces of transport", source: source, dims: "k l", ty: "A",
			left: "(transp (_ A) (or (= k 0) (and (= k 0) (= l 1)) (= l 0)) a)", right: "(transp (_ A) (or (= l 0) (= k 0)) a)"},
	)
	// what must be refused, each beside the same with one thing changed that is taken
	accepted(t, given+`
		(assume b A) (assume r (Path A b a)) (assume L (-> I (U 0)))
		(def agree (-> I I A) (lam (k l) (hcomp A a ((= k 0) (i) (at p i)) ((= l 0) (i) (at p i)))))
		(reject (def disagree (-> I I A) (lam (k l) (hcomp A a ((= k 0) (i) (at p i)) ((= l 0) (i) (at q i))))))
		(reject (def twice (-> I A) (lam (k) (hcomp A a ((= k 0) (i) (at p i)) ((= k 0) (i) (at q i))))))
		(def apart (-> I A) (lam (k) (hcomp A a ((= k 0) (i) (at p i)) ((= k 1) (i) (at q i)))))
		(def stands (-> I A) (lam (k) (hcomp A b ((= k 0) (i) (at r i)))))
		(reject (def floats (-> I A) (lam (k) (hcomp A a ((= k 0) (i) (at r i))))))
		(reject (def floats (-> I (L 1)) (lam (k) (comp (i (L i)) (transp (_ (L 0)) bot a) ((= k 0) (i) a)))))
		(def moves (-> (L 0) (L 1)) (lam (x) (transp (i (L i)) bot x)))
		(reject (def still (-> (L 0) (L 1)) (lam (x) (transp (i (L i)) top x))))
		(def half (Pi ((k I)) (-> (L 0) (L k))) (lam (k x) (transp (i (L (min i k))) (= k 0) x)))
		(reject (def half2 (Pi ((k I)) (-> (L 0) (L k))) (lam (k x) (transp (i (L (min i k))) (= k 1) x))))`)
}

// The order is by binding, outermost first, free dimensions in the order of
// their context, whatever the names are called.
func TestRuleOrderIsByBinding(t *testing.T) {
	accepted(t, `
		(assume A (U 0)) (assume a A) (assume p (Path A a a)) (assume q (Path A a a))
		(def box (-> I I A) (lam (l k) (hcomp A a ((and (= k 0) (= l 1)) (i) (at p i)) ((and (= k 1) (= l 0)) (i) (at q i)))))
		(normal (ann (lam (z y) (box z y)) (-> I I A))
			(lam (z y) (hcomp A a ((and (= z 0) (= y 1)) (i) (at q i)) ((and (= z 1) (= y 0)) (i) (at p i)))))
		(normal (ann (lam (z y) (box y z)) (-> I I A))
			(lam (z y) (hcomp A a ((and (= z 0) (= y 1)) (i) (at p i)) ((and (= z 1) (= y 0)) (i) (at q i)))))
		(normal (ann (lam (k) (box k k)) (-> I A)) (lam (k) (hcomp A a)))
		(normal (ann (lam (i j) (at p (max (rev j) (min i j)))) (-> I I A)) (lam (j i) (at p (max (min j i) (rev i)))))`)
}

const stuckCounts = `
	(assume s (Path (Path Nat 0 0) (line (_) 0) (line (_) 0))) (assume e (Path Nat 0 0)) (assume x Nat)
	(assume C (U 0)) (assume c C) (assume d C)
`

// Substitutions that send no dimension of the frontier to an end and still
// unstick a composite: the values are made by a rule at a generic dimension,
// looked at there, and then substituted.
func TestRuleFrontier(t *testing.T) {
	const source = "Sterling and Angiuli, LICS 2021, and CCHM 2015, 4.1: two dimensions that become one let faces meet or be impossible"
	holds(t, stuckCounts,
		law{name: "a wall moves to another face", source: source, dims: "l", ty: "Nat",
			left: "((ann (lam (k) (hcomp Nat 0 ((= k 0) (i) (at s l i)))) (-> I Nat)) l)", right: "0"},
		law{name: "a face becomes bot", source: source, dims: "i2", ty: "Nat",
			left: "((ann (lam (k) (hcomp Nat 0 ((= k 1) (i) (at e i)))) (-> I Nat)) (min i2 (rev i2)))", right: "0"},
		law{name: "a wall becomes impossible", source: source, dims: "k", ty: "Nat",
			left: "((ann (lam (k l) (hcomp Nat 0 ((and (= k 0) (= l 1)) (i) (at e i)))) (-> I I Nat)) k k)", right: "0"},
		law{name: "a wall becomes impossible by reversal", source: source, dims: "k", ty: "Nat",
			left: "((ann (lam (k l) (hcomp Nat 0 ((and (= k 0) (= l 0)) (i) (at e i)))) (-> I I Nat)) k (rev k))", right: "0"},
		law{name: "a wall of a path's composite, at its own dimension", source: source, dims: "l", ty: "(* (-> I Nat) Nat)",
			left: `(let ((q (Path Nat 0 0) (hcomp (Path Nat 0 0) (line (_) 0) ((= l 0) (i) (at s i)))))
				(pair (lam (j) (at q j)) (at q l)))`,
			right: "(pair (lam (j) (hcomp Nat 0 ((= l 0) (i) (at s i j)) ((or (= j 0) (= j 1)) (_) 0))) 0)"},
		law{name: "inside a path's composite, a dimension that becomes the face's", source: source, dims: "l", ty: "(* T (FN 0))",
			given: `(assume FN (-> Nat (U 0))) (assume fN (Pi ((n Nat)) (FN n)))
				(def n (-> I I Nat) (lam (l j) (hcomp Nat 0 ((= l 0) (u) (at s j u)))))`,
			left:  "(let ((q T (hcomp T (line (j) (fN (n l j)))))) (pair q (at q l)))",
			right: "(pair (hcomp T (line (j) (fN (n l j)))) (hcomp (FN 0) (fN 0) ((or (= l 0) (= l 1)) (_) (fN 0))))"}.
			where("T", "(PathOver (j (FN (n l j))) (fN 0) (fN 0))"),
		law{name: "a formal composite's face becomes another's", source: source, dims: "k", ty: "Circle",
			left:  "((ann (lam (k l) (hcomp Circle base ((and (= k 0) (= l 1)) (i) (loop i)) ((and (= k 1) (= l 1)) (i) (loop i)))) (-> I I Circle)) k k)",
			right: "(hcomp Circle base ((= k 1) (i) (loop i)))"},
		law{name: "inside an elimination", source: source, dims: "k", ty: "C",
			left: "(elim (_ C) ((ann (lam (k l) (hcomp Nat 0 ((and (= k 0) (= l 1)) (i) (at e i)))) (-> I I Nat)) k k) (zero c) ((suc n h) d))", right: "c"},
		law{name: "what is inside a strict composite", source: source, dims: "k", ty: "Nat",
			left: `((ann (lam (k l m) (hcomp Nat (hcomp Nat 0 ((and (= k 0) (= l 1)) (i) (at e i))) ((= m 0) (i) (hcomp Nat 0 ((and (= k 0) (= l 1)) (i) (at e i)))))) (-> I I I Nat)) k k (max k (rev k)))`, right: "0"},
		law{name: "a transport's face", source: source, dims: "k", ty: "C",
			left: "((ann (lam (k l) (transp (_ C) (or (and (= k 0) (= l 1)) (and (= k 1) (= l 0))) c)) (-> I I C)) k k)", right: "(transp (_ C) bot c)"},
	)
}

// The same on values: the term is evaluated and read, and only then are
// dimensions put into its value.
func TestRuleFrontierOfValues(t *testing.T) {
	k, l, m := interval.Var(0), interval.Var(1), interval.Var(2)
	put := func(pairs ...any) *interval.Subst {
		var names []interval.Name
		var dims []interval.Dim
		for n := 0; n < len(pairs); n += 2 {
			names, dims = append(names, interval.Name(pairs[n].(int))), append(dims, pairs[n+1].(interval.Dim))
		}
		return interval.NewSubst(names, dims)
	}
	const stuck = "(hcomp Nat 0 ((and (= k 0) (= l 1)) (i) (at e i)))"
	for _, c := range []struct {
		name, ty, term string
		s              *interval.Subst
		want           string
	}{
		{"a wall moves to another face", "Nat", "(hcomp Nat 0 ((= k 0) (i) (at s l i)))", put(0, l), "0"},
		{"a dimension of a wall moves to its face", "Nat", "(hcomp Nat 0 ((= k 0) (i) (at s l i)))", put(1, k), "0"},
		{"an end inside a wall", "Nat", "(hcomp Nat 0 ((= k 0) (i) (at s l i)))", put(1, interval.One()), "0"},
		{"a face becomes bot", "Nat", "(hcomp Nat 0 ((= k 1) (i) (at e i)))", put(0, l.Min(l.Rev())), "0"},
		{"a wall becomes impossible", "Nat", stuck, put(1, k), "0"},
		{"a wall becomes impossible, the other way", "Nat", stuck, put(0, l), "0"},
		{"a wall becomes impossible, both to a third", "Nat", stuck, put(0, m, 1, m), "0"},
		{"a wall becomes impossible by reversal", "Nat", "(hcomp Nat 0 ((and (= k 0) (= l 0)) (i) (at e i)))", put(1, k.Rev()), "0"},
		{"an exchange leaves it stuck", "Nat", stuck, put(0, l, 1, k), "(hcomp Nat 0 ((and (= k 1) (= l 0)) (i) (at e i)))"},
		{"inside the base", "Nat", "(hcomp Nat " + stuck + " ((= m 0) (_) " + stuck + "))", put(1, k), "0"},
		{"inside a successor", "Nat", "(suc " + stuck + ")", put(1, k), "1"},
		{"inside an elimination", "C", "(elim (_ C) " + stuck + " (zero c) ((suc n h) d))", put(1, k), "c"},
		{"inside the argument of a variable", "C", "(f " + stuck + ")", put(1, k), "(f 0)"},
		{"inside a path", "(Path Nat 0 0)", "(hcomp (Path Nat 0 0) (line (_) 0) ((and (= k 0) (= l 1)) (i) (at s i)))", put(1, k), "(line (_) 0)"},
		{"the face of a transport", "C", "(transp (_ C) (and (= k 0) (= l 1)) c)", put(1, k), "(transp (_ C) bot c)"},
		{"the face of a transport holds", "C", "(transp (_ C) (and (= k 0) (= l 1)) c)", put(0, interval.Zero(), 1, interval.One()), "c"},
		{"the face of a formal composite", "Circle", "(hcomp Circle base ((and (= k 0) (= l 1)) (i) (loop i)))", put(1, k), "(hcomp Circle base)"},
		{"a constructor at an end", "Circle", "(loop k)", put(0, interval.One()), "base"},
		{"a constructor at an expression", "Circle", "(loop (max k (min l m)))", put(0, m, 1, m.Rev()), "(loop (max m (min m (rev m))))"},
		{"walls that come to the same face", "C", "(hcomp C c ((= k 0) (i) (at q i)) ((= l 0) (i) (at q i)))", put(1, k), "(hcomp C c ((= k 0) (i) (at q i)))"},
		{"walls in another order", "C", "(hcomp C c ((and (= k 0) (= l 1)) (i) (at q i)) ((and (= k 1) (= l 0)) (i) (at r i)))", put(0, l, 1, k), "(hcomp C c ((and (= k 0) (= l 1)) (i) (at r i)) ((and (= k 1) (= l 0)) (i) (at q i)))"},
		{"a path at an end", "C", "(at q (max k l))", put(0, l, 1, interval.One()), "c"},
	} {
		t.Run(c.name, func(t *testing.T) {
			for _, b := range builds() {
				e := b.engine(t, stuckCounts+"(assume f (-> Nat C)) (assume q (Path C c c)) (assume r (Path C c c))")
				p := &prover{t: t, s: scopeOf(t, e), call: b.call, what: b.name}
				x := p.check(read(t, c.term), read(t, c.ty))
				want := p.normal(p.check(read(t, c.want), read(t, c.ty)))
				p.normal(x)
				y, err := p.s.SubstituteValue(context.Background(), x, c.s, b.call...)
				require.NoError(t, err)
				p.same(want, p.normal(y), c.term)
				require.True(t, p.equal(y, p.check(read(t, c.want), read(t, c.ty))))
			}
		})
	}
}

// E : Path (U 0) Nat Unit. The walls of the two composites are equal, at Unit;
// the bases are the same two values and are not equal, at E @ i.
func TestNotEqualByMemory(t *testing.T) {
	const given = `
		(assume E (Path (U 0) Nat Unit)) (assume i0 (-> (Pi ((i I)) (at E i)) Nat))
		(assume x (Pi ((i I)) (at E i))) (assume y (Pi ((i I)) (at E i)))
	`
	const source = "what has been proved equal is equal at its type and face alone"
	holds(t, given,
		law{name: "as bases they differ", source: source, dims: "i", ty: "(at E i)", differ: true, left: "(x i)", right: "(y i)"},
		law{name: "at Unit they are equal", source: source, ty: "Unit", left: "(x 1)", right: "(y 1)"},
		law{name: "composites with equal walls", source: source, dims: "i", ty: "(at E i)", differ: true,
			left: "(hcomp (at E i) (x i) ((= i 1) (_) (x i)))", right: "(hcomp (at E i) (y i) ((= i 1) (_) (y i)))"},
		law{name: "pairs, the walls first", source: source, dims: "i", ty: "(* Unit (at E i))", differ: true,
			left: "(pair (x 1) (x i))", right: "(pair (y 1) (y i))"},
		law{name: "functions of the two", source: source, ty: "(* (-> Unit Unit) (Pi ((i I)) (at E i)))", differ: true,
			left: "(pair (lam (_) (x 1)) x)", right: "(pair (lam (_) (y 1)) y)"},
		law{name: "composites of bound variables, the same values in base and wall", source: source, ty: "(Pi ((i I) (x (at E i)) (y (at E i))) (at E i))", differ: true,
			left: "(lam (i x y) (hcomp (at E i) x ((= i 1) (_) x)))", right: "(lam (i x y) (hcomp (at E i) y ((= i 1) (_) y)))"},
		law{name: "composites of two walls, one of them at Unit", source: source, ty: "(Pi ((i I) (k I) (x (at E i)) (y (at E i))) (at E i))", differ: true,
			left:  "(lam (i k x y) (hcomp (at E i) (hcomp (at E i) x ((= i 1) (_) x)) ((= i 1) (_) unit) ((= k 0) (_) (hcomp (at E i) x ((= i 1) (_) x)))))",
			right: "(lam (i k x y) (hcomp (at E i) (hcomp (at E i) y ((= i 1) (_) y)) ((= i 1) (_) unit) ((= k 0) (_) (hcomp (at E i) y ((= i 1) (_) y)))))"},
		law{name: "a composite at the face where its type is Unit", source: source, ty: "Unit",
			left: "(hcomp (at E 1) (x 1))", right: "(y 1)"},
	)
}

// A type that becomes Unit on a wall's face has one normal form there.
func TestRuleWallsAtTheirType(t *testing.T) {
	const given = `
		(assume E (Path (U 0) Nat Unit)) (assume x (Pi ((i I)) (at E i))) (assume u (Pi ((k I) (i I)) (at E k)))
	`
	holds(t, given,
		law{name: "two walls at Unit", source: "CCHM 2015, 4.1", dims: "k", ty: "(at E k)",
			left: "(hcomp (at E k) (x k) ((= k 1) (i) (u 1 i)))", right: "(hcomp (at E k) (x k) ((= k 1) (i) unit))"},
	)
}
