package nbe_test

import "testing"

// Paths, over a constant type and over a line of types.

const paths = lines + `
	(assume a A) (assume b A) (assume c A)
	(assume p (Path A a b)) (assume p2 (Path A a b)) (assume q (Path (Path A a b) p p2))
	(assume m0 (LA 0)) (assume m1 (LA 1))
	(assume o (PathOver (i (LA i)) m0 m1)) (assume o2 (PathOver (i (LA i)) m0 m1)) (assume oq (Path (PathOver (i (LA i)) m0 m1) o o2))
	(assume e0 (Pi ((i I)) (M i 0))) (assume e1 (Pi ((i I)) (M i 1)))
	(assume mp (PathOver (j (M 0 j)) (e0 0) (e1 0)))
`

func TestRulePathEnds(t *testing.T) {
	const source = "CCHM 2015, 3: p @ 0 = a and p @ 1 = b, also for a variable p; η"
	holds(t, paths,
		law{name: "at 0", source: source, ty: "A", left: "(at p 0)", right: "a"},
		law{name: "at 1", source: source, ty: "A", left: "(at p 1)", right: "b"},
		law{name: "at an expression that is an end on the faces", source: source, dims: "k l", ty: "A",
			left: "(at p (max (min k l) (min l k)))", right: "(at p (min l k))"},
		law{name: "a square at an end", source: source, dims: "k", ty: "A", left: "(at q 0 k)", right: "(at p k)"},
		law{name: "a square at the other end", source: source, dims: "k", ty: "A", left: "(at q k 1)", right: "b"},
		law{name: "over a line", source: source, ty: "(LA 1)", left: "(at o 1)", right: "m1"},
		law{name: "eta", source: source, ty: "(Path A a b)", left: "(line (i) (at p i))", right: "p"},
		law{name: "eta over a line", source: source, ty: "(PathOver (i (LA i)) m0 m1)", left: "(line (i) (at o i))", right: "o"},
		law{name: "beta", source: source, dims: "k l", ty: "A", left: "(at (ann (line (i) (at p (rev i))) (Path A b a)) (min k l))", right: "(at p (max (rev k) (rev l)))"},
		law{name: "the interval is not Boolean", source: "CCHM 2015, 3.1", dims: "k", ty: "A", differ: true, left: "(at p (min k (rev k)))", right: "a"},
		law{name: "two paths", source: source, ty: "(Path A a b)", differ: true, left: "p", right: "p2"},
	)
}

func TestRuleHcompPath(t *testing.T) {
	const source = "CCHM 2015, 4.5; CHM 2018, 2"
	holds(t, paths,
		law{name: "not over", source: source, dims: "k", ty: "(Path A a b)",
			left:  "(hcomp (Path A a b) p ((= k 0) (i) (at q i)))",
			right: `(line (j) (hcomp A (at p j) ((= k 0) (i) (at q i j)) ((= j 0) (_) a) ((= j 1) (_) b)))`},
		law{name: "over a line", source: source, dims: "k", ty: "(PathOver (i (LA i)) m0 m1)",
			left:  "(hcomp (PathOver (i (LA i)) m0 m1) o ((= k 1) (i) (at oq i)))",
			right: `(line (j) (hcomp (LA j) (at o j) ((= k 1) (i) (at oq i j)) ((= j 0) (_) m0) ((= j 1) (_) m1)))`},
		law{name: "no wall keeps the ends", source: source, ty: "(Path A a b)",
			left: "(hcomp (Path A a b) p)", right: "(line (j) (hcomp A (at p j) ((= j 0) (_) a) ((= j 1) (_) b)))"},
		law{name: "no wall is not the base", source: "no regularity", ty: "(Path A a b)", differ: true,
			left: "(hcomp (Path A a b) p)", right: "p"},
		law{name: "at the dimension of the wall's face", source: source, dims: "k", ty: "A",
			left:  "(at (hcomp (Path A a b) p ((= k 0) (i) (at q i))) k)",
			right: "(hcomp A (at p k) ((= k 0) (_) a) ((= k 1) (_) b))"},
		law{name: "the ends mention the dimension of the face", source: source, dims: "k", ty: "(Path A (at p k) (at p k))",
			left:  "(hcomp (Path A (at p k) (at p k)) (line (_) (at p k)) ((= k 1) (i) (line (_) b)))",
			right: "(line (j) (hcomp A (at p k) ((= k 1) (_) b) ((= j 0) (_) (at p k)) ((= j 1) (_) (at p k))))"},
		law{name: "squares", source: source, dims: "k", ty: "(Path (Path A a b) p p2)",
			given: "(assume z (Path (Path (Path A a b) p p2) q q))",
			left:  "(hcomp (Path (Path A a b) p p2) q ((= k 0) (i) (at z i)))",
			right: `(line (j l) (hcomp A (at q j l) ((= l 0) (_) a) ((= l 1) (_) b)
				((= j 0) (_) (at p l)) ((= j 1) (_) (at p2 l)) ((= k 0) (i) (at z i j l))))`},
	)
}

func TestRuleTranspPath(t *testing.T) {
	const source = "CCHM 2015, 4.5; CHM 2018, 2"
	holds(t, paths,
		law{name: "over a line, moving ends", source: source, ty: "(PathOver (j (M 1 j)) (e0 1) (e1 1))",
			left:  "(transp (i (PathOver (j (M i j)) (e0 i) (e1 i))) bot mp)",
			right: `(line (j) (comp (i (M i j)) (at mp j) ((= j 0) (i) (e0 i)) ((= j 1) (i) (e1 i))))`},
		law{name: "constant on a face", source: source, dims: "k", ty: "(PathOver (j (M k j)) (e0 k) (e1 k))",
			left: "(transp (i (PathOver (j (M (min i k) j)) (e0 (min i k)) (e1 (min i k)))) (= k 0) mp)",
			right: `(line (j) (comp (i (M (min i k) j)) (at mp j)
				((= k 0) (_) (at mp j)) ((= j 0) (i) (e0 (min i k))) ((= j 1) (i) (e1 (min i k)))))`},
		law{name: "a path that depends on the face", source: source, dims: "k", ty: "(Path A (at r k) b)", given: "(assume r (Path A a c))",
			left:  "(transp (i (Path A (at r (min i k)) b)) (= k 0) (at q k))",
			right: `(line (j) (comp (_ A) (at q k j) ((= k 0) (_) (at p j)) ((= j 0) (i) (at r (min i k))) ((= j 1) (_) b)))`},
		law{name: "not over", source: source, ty: "(Path A c b)", given: "(assume r (Path A a c))",
			left:  "(transp (i (Path A (at r i) b)) bot p)",
			right: "(line (j) (comp (_ A) (at p j) ((= j 0) (i) (at r i)) ((= j 1) (_) b)))"},
		law{name: "along a constant line it is not the identity", source: "no regularity", ty: "(Path A a b)", differ: true,
			left: "(transp (_ (Path A a b)) bot p)", right: "p"},
		law{name: "at an expression of the line's dimension", source: source, dims: "k", ty: "A", given: "(assume r (Path A a c))",
			left:  "(at (transp (i (Path A (at r (min i k)) b)) (= k 0) p) (rev k))",
			right: "(comp (_ A) (at p (rev k)) ((= k 0) (_) b) ((= k 1) (i) (at r i)))"},
	)
}
