package nbe_test

import "testing"

// Functions, dependent and not, and functions over the interval.

const functions = lines + `
	(def D (U 0) (Pi ((x A)) (B x)))
	(assume f D) (assume g D) (assume h D) (assume q (Path D f g)) (assume r (Path D f h))
	(def N (U 0) (-> A C))
	(assume nf N) (assume ng N) (assume nq (Path N nf ng))
	(assume LD (Pi ((i I)) (Pi ((x (LA i))) (LB i x))))
	(assume LN (Pi ((i I)) (-> (LA i) (LC i))))
`

func TestRuleHcompPi(t *testing.T) {
	const source = "CCHM 2015, 4.5; CHM 2018, 2"
	holds(t, functions,
		law{name: "dependent", source: source, dims: "k", ty: "D",
			left:  "(hcomp D f ((= k 0) (i) (at q i)))",
			right: "(lam (x) (hcomp (B x) (f x) ((= k 0) (i) ((at q i) x))))"},
		law{name: "two walls", source: source, dims: "k l", ty: "D",
			left:  "(hcomp D f ((= k 0) (i) (at q i)) ((and (= k 1) (= l 0)) (i) (at r i)))",
			right: "(lam (x) (hcomp (B x) (f x) ((= k 0) (i) ((at q i) x)) ((and (= k 1) (= l 0)) (i) ((at r i) x))))"},
		law{name: "no wall", source: source, ty: "D",
			left: "(hcomp D f)", right: "(lam (x) (hcomp (B x) (f x)))"},
		law{name: "no wall is not the base", source: source + "; no regularity", ty: "D", differ: true,
			left: "(hcomp D f)", right: "f"},
		law{name: "not dependent", source: source, dims: "k", ty: "N",
			left:  "(hcomp N nf ((or (= k 0) (= k 1)) (i) (at nq i)))",
			right: "(lam (x) (hcomp C (nf x) ((= k 0) (i) ((at nq i) x)) ((= k 1) (i) ((at nq i) x))))"},
		law{name: "an argument that depends on the face", source: source, given: "(assume x0 A) (assume x1 A) (assume px (Path A x0 x1))", dims: "k", ty: "C",
			left:  "((hcomp N nf ((= k 0) (i) (at nq i))) (at px k))",
			right: "(hcomp C (nf (at px k)) ((= k 0) (i) ((at nq i) x0)))"},
		law{name: "walls that are alike, and an argument that each face cuts", source: source, given: "(assume x0 A) (assume x1 A) (assume px (Path A x0 x1))", dims: "k", ty: "C",
			left:  "((hcomp N nf ((or (= k 0) (= k 1)) (_) nf)) (at px k))",
			right: "(hcomp C (nf (at px k)) ((= k 0) (_) (nf x0)) ((= k 1) (_) (nf x1)))"},
		law{name: "the wall's value depends on its face", source: source, given: "(assume s (Path (Path D f f) (line (_) f) (line (_) f)))", dims: "k l", ty: "D",
			left:  "(hcomp D f ((= k 0) (i) (at s (min i l) (max i k))))",
			right: "(lam (x) (hcomp (B x) (f x) ((= k 0) (i) ((at s (min i l) i) x))))"},
	)
}

func TestRuleTranspPi(t *testing.T) {
	const source = "CCHM 2015, 4.5; CHM 2018, 2"
	holds(t, functions,
		law{name: "dependent", source: source, ty: "(Pi ((x (LA 1))) (LB 1 x))",
			left: "(transp (i (Pi ((x (LA i))) (LB i x))) bot (LD 0))",
			right: `(lam (x) (transp (i (LB i (transp (j (LA (max i (rev j)))) (= i 1) x))) bot
				(LD 0 (transp (j (LA (rev j))) bot x))))`},
		law{name: "constant on a face", source: source, dims: "k", ty: "(Pi ((x (LA k))) (LB k x))",
			left: "(transp (i (Pi ((x (LA (min i k)))) (LB (min i k) x))) (= k 0) (LD 0))",
			right: `(lam (x) (transp (i (LB (min i k) (transp (j (LA (min (max i (rev j)) k))) (or (= k 0) (= i 1)) x))) (= k 0)
				(LD 0 (transp (j (LA (min (rev j) k))) (= k 0) x))))`},
		law{name: "not dependent", source: source, dims: "k", ty: "(-> (LA (rev k)) (LC 1))",
			left: "(transp (i (-> (LA (rev (min i k))) (LC (max i (rev k))))) (= k 0) (lam (x) (LN (rev k) (transp (m (LA (max (rev k) (rev m)))) (= k 0) x))))",
			right: `(lam (x) (transp (i (LC (max i (rev k)))) (= k 0)
				(LN (rev k) (transp (m (LA (max (rev k) (rev m)))) (= k 0) (transp (j (LA (rev (min (rev j) k)))) (= k 0) x)))))`},
		law{name: "along a constant line it is not the identity", source: source + "; no regularity", ty: "D", differ: true,
			left: "(transp (_ D) bot f)", right: "f"},
		law{name: "on top it is the identity", source: "CHM 2018, 2", ty: "D",
			left: "(transp (_ D) top f)", right: "f"},
		law{name: "the argument mentions the line's name", source: source, given: "(assume a (Pi ((i I)) (LA i)))", dims: "i", ty: "(LC 1)",
			left:  "((transp (i (-> (LA 1) (LC i))) bot LN2) (transp (j (LA (max i j))) (= i 1) (a i)))",
			right: "(transp (i (LC i)) bot (LN2 (transp (j (LA 1)) bot (transp (j (LA (max i j))) (= i 1) (a i)))))"}.with("(assume LN2 (-> (LA 1) (LC 0)))"),
	)
}

// with is the law with more given.
func (l law) with(more string) law {
	l.given += "\n" + more
	return l
}

func TestRuleHcompPiDimension(t *testing.T) {
	const source = "CHM 2018, 2, pointwise"
	const given = lines + `
		(def F (U 0) (Pi ((i I)) (LA i)))
		(assume f F) (assume g F) (assume q (Path F f g))
		(def N (U 0) (-> I A)) (assume nf N) (assume ng N) (assume nq (Path N nf ng))
	`
	holds(t, given,
		law{name: "dependent", source: source, dims: "k", ty: "F",
			left:  "(hcomp F f ((= k 1) (i) (at q i)))",
			right: "(lam (j) (hcomp (LA j) (f j) ((= k 1) (i) ((at q i) j))))"},
		law{name: "not dependent", source: source, dims: "k", ty: "N",
			left:  "(hcomp N nf ((= k 0) (i) (at nq i)))",
			right: "(lam (j) (hcomp A (nf j) ((= k 0) (i) ((at nq i) j))))"},
		law{name: "at the dimension of a wall's face", source: source, dims: "k", ty: "(LA k)",
			left:  "((hcomp F f ((= k 1) (i) (at q i))) k)",
			right: "(hcomp (LA k) (f k) ((= k 1) (i) ((at q i) 1)))"},
		law{name: "at an expression", source: source, dims: "k l", ty: "(LA (min k (rev l)))",
			left:  "((hcomp F f ((= k 1) (i) (at q (min i l)))) (min k (rev l)))",
			right: "(hcomp (LA (min k (rev l))) (f (min k (rev l))) ((= k 1) (i) ((at q (min i l)) (rev l))))"},
		law{name: "no wall is not the base", source: "no regularity", ty: "F", differ: true,
			left: "(hcomp F f)", right: "f"},
	)
}

func TestRuleTranspPiDimension(t *testing.T) {
	const source = "CHM 2018, 2, pointwise"
	const given = lines + `
		(assume f (Pi ((i I)) (M 0 i)))
	`
	holds(t, given,
		law{name: "dependent", source: source, ty: "(Pi ((j I)) (M 1 j))",
			left:  "(transp (i (Pi ((j I)) (M i j))) bot f)",
			right: "(lam (j) (transp (i (M i j)) bot (f j)))"},
		law{name: "constant on a face", source: source, dims: "k", ty: "(Pi ((j I)) (M k j))",
			left:  "(transp (i (Pi ((j I)) (M (min i k) j))) (= k 0) f)",
			right: "(lam (j) (transp (i (M (min i k) j)) (= k 0) (f j)))"},
		law{name: "at a dimension named as the line", source: source, dims: "i", ty: "(M 1 i)",
			left:  "((transp (i (Pi ((j I)) (M i j))) bot f) i)",
			right: "(transp (k (M k i)) bot (f i))"},
		law{name: "not dependent", source: source, ty: "(-> I (LA 1))", given: "(assume g (-> I (LA 0)))",
			left:  "(transp (i (-> I (LA i))) bot g)",
			right: "(lam (j) (transp (i (LA i)) bot (g j)))"},
		law{name: "along a constant line it is not the identity", source: "no regularity", ty: "(Pi ((i I)) (M 0 i))", differ: true,
			left: "(transp (_ (Pi ((i I)) (M 0 i))) bot f)", right: "f"},
	)
}

func TestRuleEtaFunctions(t *testing.T) {
	const source = "CCHM 2015, 2: β and η"
	holds(t, functions,
		law{name: "eta", source: source, ty: "D", left: "(lam (x) (f x))", right: "f"},
		law{name: "beta", source: source, given: "(assume a A)", ty: "(B a)", left: "((ann (lam (x) (f x)) D) a)", right: "(f a)"},
		law{name: "eta over the interval", source: source, ty: "(Pi ((i I) (x (LA i))) (LB i x))", left: "(lam (i x) (LD i x))", right: "LD"},
		law{name: "beta over the interval", source: source, dims: "k", ty: "(-> (LA (min k (rev k))) (LC (min k (rev k))))",
			left: "((ann (lam (i) (LN i)) (Pi ((i I)) (-> (LA i) (LC i)))) (min k (rev k)))", right: "(LN (min (rev k) k))"},
		law{name: "two functions", source: source, ty: "D", left: "f", right: "g", differ: true},
	)
}
