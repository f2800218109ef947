package nbe_test

import "testing"

// Pairs, dependent and not, and the unit type.

const pairs = lines + `
	(def S (U 0) (Sigma ((x A)) (B x)))
	(assume p S) (assume p2 S) (assume q (Path S p p2))
	(def N (U 0) (* A C))
	(assume np N) (assume np2 N) (assume nq (Path N np np2))
	(assume sp (Sigma ((x (LA 0))) (LB 0 x)))
`

func TestRuleHcompSigma(t *testing.T) {
	const source = "CCHM 2015, 4.5; CHM 2018, 2"
	holds(t, pairs,
		law{name: "dependent", source: source, dims: "k", ty: "S",
			left: "(hcomp S p ((= k 0) (i) (at q i)))",
			right: `(pair (hcomp A (fst p) ((= k 0) (i) (fst (at q i))))
				(comp (i (B (hfill A (fst p) i ((= k 0) (i) (fst (at q i)))))) (snd p) ((= k 0) (i) (snd (at q i)))))`},
		law{name: "two walls", source: source, dims: "k l", ty: "S", given: "(assume s (Path (Path S p p) (line (_) p) (line (_) p)))",
			left: "(hcomp S p ((= k 0) (i) (at s i l)) ((= l 1) (i) (at s (min i k) i)))",
			right: `(pair (hcomp A (fst p) ((= k 0) (i) (fst (at s i l))) ((= l 1) (i) (fst (at s (min i k) i))))
				(comp (i (B (hfill A (fst p) i ((= k 0) (i) (fst (at s i l))) ((= l 1) (i) (fst (at s (min i k) i))))))
					(snd p) ((= k 0) (i) (snd (at s i l))) ((= l 1) (i) (snd (at s (min i k) i)))))`},
		law{name: "no wall", source: source, ty: "S",
			left: "(hcomp S p)", right: "(pair (hcomp A (fst p)) (comp (i (B (hfill A (fst p) i))) (snd p)))"},
		law{name: "not dependent", source: source, dims: "k", ty: "N",
			left: "(hcomp N np ((or (= k 0) (= k 1)) (i) (at nq i)))",
			right: `(pair (hcomp A (fst np) ((= k 0) (i) (fst (at nq i))) ((= k 1) (i) (fst (at nq i))))
				(comp (_ C) (snd np) ((= k 0) (i) (snd (at nq i))) ((= k 1) (i) (snd (at nq i)))))`},
		law{name: "not dependent, still by comp and not by hcomp", source: source, dims: "k", ty: "C", differ: true,
			left: "(snd (hcomp N np ((= k 0) (i) (at nq i))))", right: "(hcomp C (snd np) ((= k 0) (i) (snd (at nq i))))"},
		law{name: "no wall is not the base", source: "no regularity", ty: "S", differ: true,
			left: "(hcomp S p)", right: "p"},
	)
}

func TestRuleTranspSigma(t *testing.T) {
	const source = "CCHM 2015, 4.5; CHM 2018, 2"
	holds(t, pairs,
		law{name: "dependent", source: source, ty: "(Sigma ((x (LA 1))) (LB 1 x))",
			left: "(transp (i (Sigma ((x (LA i))) (LB i x))) bot sp)",
			right: `(pair (transp (i (LA i)) bot (fst sp))
				(transp (i (LB i (tfill (i (LA i)) bot (fst sp) i))) bot (snd sp)))`},
		law{name: "constant on a face", source: source, dims: "k", ty: "(Sigma ((x (LA k))) (LB k x))",
			left: "(transp (i (Sigma ((x (LA (min i k)))) (LB (min i k) x))) (= k 0) sp)",
			right: `(pair (transp (i (LA (min i k))) (= k 0) (fst sp))
				(transp (i (LB (min i k) (tfill (i (LA (min i k))) (= k 0) (fst sp) i))) (= k 0) (snd sp)))`},
		law{name: "not dependent", source: source, dims: "k", ty: "(* (LA k) (LC 1))", given: "(assume a (LA 0)) (assume c (Pi ((i I)) (LC i)))",
			left:  "(transp (i (* (LA (min i k)) (LC (max i (rev k))))) (= k 0) (pair a (c (rev k))))",
			right: "(pair (transp (i (LA (min i k))) (= k 0) a) (transp (i (LC (max i (rev k)))) (= k 0) (c (rev k))))"},
		law{name: "along a constant line it is not the identity", source: "no regularity", ty: "N", differ: true,
			left: "(transp (_ N) bot np)", right: "np"},
	)
}

func TestRuleEtaPairs(t *testing.T) {
	const source = "CCHM 2015, 2: β and η"
	holds(t, pairs,
		law{name: "eta", source: source, ty: "S", left: "(pair (fst p) (snd p))", right: "p"},
		law{name: "first", source: source, given: "(assume a A) (assume b (B a))", ty: "A", left: "(fst (ann (pair a b) S))", right: "a"},
		law{name: "second", source: source, given: "(assume a A) (assume b (B a))", ty: "(B a)", left: "(snd (ann (pair a b) S))", right: "b"},
		law{name: "the same first part alone", source: source, ty: "N", given: "(assume c C)", differ: true,
			left: "np", right: "(pair (fst np) c)"},
	)
}

func TestRuleUnit(t *testing.T) {
	const source = "HoTT Book 2013, 1.5 and 2.8: one element, with η"
	const given = "(assume x Unit) (assume y Unit) (assume q (Path Unit x y)) (assume A (U 0)) (assume f (-> Unit A))"
	holds(t, given,
		law{name: "eta", source: source, ty: "Unit", left: "x", right: "unit"},
		law{name: "two variables", source: source, ty: "Unit", left: "x", right: "y"},
		law{name: "hcomp", source: source, dims: "k", ty: "Unit", left: "(hcomp Unit x ((= k 0) (i) (at q i)))", right: "unit"},
		law{name: "transp", source: source, ty: "Unit", left: "(transp (_ Unit) bot x)", right: "unit"},
		law{name: "paths in it", source: source, ty: "(Path Unit x y)", left: "q", right: "(line (_) unit)"},
		law{name: "under an application", source: source, ty: "A", left: "(f x)", right: "(f y)"},
		law{name: "pairs of it", source: source, ty: "(* Unit Unit)", left: "(pair x y)", right: "(pair y x)"},
		law{name: "functions into it", source: source, given: "(assume g (-> A Unit))", ty: "(-> A Unit)", left: "g", right: "(lam (_) x)"},
	)
}
