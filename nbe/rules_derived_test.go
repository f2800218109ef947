package nbe_test

import "testing"

// The universe, the operations at neutral types, and those that are derived.

const boxes = lines + `
	(assume a A) (assume b A) (assume p (Path A a b)) (assume s (Path (Path A a a) (line (_) a) (line (_) a)))
	(assume l0 (LA 0)) (assume lu (Pi ((i I)) (LA i)))
`

func TestRuleTopAndBot(t *testing.T) {
	const source = "CHM 2018, 2: on top a composite is its wall and a transport the identity; a wall on bot is dropped"
	holds(t, boxes,
		law{name: "a wall on top", source: source, ty: "A", left: "(hcomp A a (top (i) (at p i)))", right: "b"},
		law{name: "a wall on top beside another", source: source, dims: "k", ty: "A",
			left: "(hcomp A a ((= k 0) (i) (at p i)) (top (i) (at p i)))", right: "b"},
		law{name: "a wall on bot", source: source, dims: "k", ty: "A",
			left: "(hcomp A a ((and (= k 0) (= k 1)) (i) (at p i)))", right: "(hcomp A a)"},
		law{name: "transport on top", source: source, ty: "A", left: "(transp (_ A) top a)", right: "a"},
		law{name: "no wall is not the base", source: "no regularity", ty: "A", differ: true, left: "(hcomp A a)", right: "a"},
		law{name: "transport along a constant line", source: "no regularity", ty: "A", differ: true, left: "(transp (_ A) bot a)", right: "a"},
		law{name: "a constant wall is not the base", source: "no regularity", dims: "k", ty: "A", differ: true, left: "(hcomp A a ((= k 0) (_) a))", right: "a"},
		law{name: "two transports are not one", source: "no regularity", ty: "A", differ: true, left: "(transp (_ A) bot (transp (_ A) bot a))", right: "(transp (_ A) bot a)"},
		law{name: "another face is another transport", source: "no regularity", dims: "k", ty: "A", differ: true, left: "(transp (_ A) (= k 0) a)", right: "(transp (_ A) bot a)"},
		law{name: "another wall is another composite", source: source, dims: "k", ty: "A", given: "(assume p2 (Path A a b))", differ: true,
			left: "(hcomp A a ((= k 0) (i) (at p i)))", right: "(hcomp A a ((= k 0) (i) (at p2 i)))"},
		law{name: "another face is another composite", source: source, dims: "k", ty: "A", differ: true,
			left: "(hcomp A a ((= k 0) (i) (at p i)))", right: "(hcomp A a ((= k 1) (i) (at p i)))"},
	)
}

func TestRuleTranspUniverse(t *testing.T) {
	const source = "CCHM 2015, 7.1: transport along a constant universe is the identity"
	holds(t, lines,
		law{name: "at bot", source: source, ty: "(U 0)", left: "(transp (_ (U 0)) bot A)", right: "A"},
		law{name: "on a face", source: source, dims: "k", ty: "(U 1)", left: "(transp (_ (U 1)) (= k 0) (U 0))", right: "(U 0)"},
		law{name: "a family", source: source, ty: "(-> A (U 0))", left: "(transp (_ (-> A (U 0))) bot B)", right: "(lam (x) (B (transp (_ A) bot x)))"},
		law{name: "a path of types", source: source, given: "(assume E (Path (U 0) A C))", ty: "(U 0)", dims: "k",
			left: "(at (transp (_ (Path (U 0) A C)) bot E) k)", right: "(hcomp (U 0) (at E k) ((= k 0) (_) A) ((= k 1) (_) C))"},
	)
}

func TestRuleComp(t *testing.T) {
	const source = "CCHM 2015, 4.4; CHM 2018, 2"
	holds(t, boxes,
		law{name: "definition", source: source, dims: "k", ty: "(LA 1)",
			left:  "(comp (i (LA i)) (lu 0) ((= k 0) (i) (lu i)))",
			right: "(hcomp (LA 1) (transp (i (LA i)) bot (lu 0)) ((= k 0) (i) (transp (j (LA (max i j))) (= i 1) (lu i))))"},
		law{name: "the line mentions the face's dimension", source: source, dims: "k", ty: "(M 1 k)", given: "(assume mu (Pi ((i I) (j I)) (M i j)))",
			left: "(comp (i (M i k)) (mu 0 k) ((= k 0) (i) (mu i k)) ((= k 1) (i) (mu i k)))",
			right: `(hcomp (M 1 k) (transp (i (M i k)) bot (mu 0 k))
				((= k 0) (i) (transp (j (M (max i j) 0)) (= i 1) (mu i 0)))
				((= k 1) (i) (transp (j (M (max i j) 1)) (= i 1) (mu i 1))))`},
		law{name: "at a wall", source: source, ty: "(LA 1)", left: "(comp (i (LA i)) (lu 0) (top (i) (lu i)))", right: "(lu 1)"},
		law{name: "along a constant line it is not hcomp", source: "no regularity", dims: "k", ty: "A", differ: true,
			left: "(comp (_ A) a ((= k 0) (i) (at p i)))", right: "(hcomp A a ((= k 0) (i) (at p i)))"},
	)
}

func TestRuleHfill(t *testing.T) {
	const source = "CCHM 2015, 4.4; CHM 2018, 2"
	const fill = "(hfill A a r ((= k 0) (i) (at s i l)) ((and (= k 1) (= l 0)) (i) (at p i)))"
	holds(t, boxes,
		law{name: "definition", source: source, dims: "k r", ty: "A",
			left:  "(hfill A a r ((= k 0) (i) (at p i)))",
			right: "(hcomp A a ((= k 0) (j) (at p (min r j))) ((= r 0) (_) a))"},
		law{name: "at 0 the base", source: source, dims: "k l", ty: "A",
			left: "(hfill A a 0 ((= k 0) (i) (at s i l)) ((and (= k 1) (= l 0)) (i) (at p i)))", right: "a"},
		law{name: "at 1 the composite", source: source, dims: "k l", ty: "A",
			left:  "(hfill A a 1 ((= k 0) (i) (at s i l)) ((and (= k 1) (= l 0)) (i) (at p i)))",
			right: "(hcomp A a ((= k 0) (i) (at s i l)) ((and (= k 1) (= l 0)) (i) (at p i)))"},
		law{name: "on a wall the wall", source: source, dims: "r l", ty: "A",
			left: "((ann (lam (k) " + fill + ") (-> I A)) 0)", right: "(at s r l)"},
		law{name: "on the other wall", source: source, dims: "r", ty: "A",
			left: "((ann (lam (k l) " + fill + ") (-> I I A)) 1 0)", right: "(at p r)"},
		law{name: "at an expression of the face's dimension", source: source, dims: "k r", ty: "A",
			left: "(hfill A a (max k r) ((= k 0) (i) (at p i)))", right: "(hcomp A a ((= k 0) (j) (at p (min r j))) ((and (= k 0) (= r 0)) (_) a))"},
	)
}

func TestRuleFill(t *testing.T) {
	const source = "CCHM 2015, 4.4; CHM 2018, 2"
	holds(t, boxes,
		law{name: "definition", source: source, dims: "k r", ty: "(LA r)",
			left:  "(fill (i (LA i)) (lu 0) r ((= k 0) (i) (lu i)))",
			right: "(comp (j (LA (min r j))) (lu 0) ((= k 0) (j) (lu (min r j))) ((= r 0) (_) (lu 0)))"},
		law{name: "at 0 the base", source: source, dims: "k", ty: "(LA 0)", left: "(fill (i (LA i)) l0 0)", right: "l0"},
		law{name: "at 1 the composite", source: source, dims: "k", ty: "(LA 1)",
			left: "(fill (i (LA i)) (lu 0) 1 ((= k 0) (i) (lu i)))", right: "(comp (i (LA i)) (lu 0) ((= k 0) (i) (lu i)))"},
		law{name: "on a wall the wall", source: source, dims: "r", ty: "(LA r)",
			left: "((ann (lam (k) (fill (i (LA i)) (lu 0) r ((= k 0) (i) (lu i)))) (-> I (LA r))) 0)", right: "(lu r)"},
		law{name: "on a wall the wall, at an expression", source: source, dims: "r l", ty: "(LA (min r (rev l)))",
			left: "((ann (lam (k) (fill (i (LA i)) (lu 0) (min r (rev l)) ((= k 0) (i) (lu i)))) (-> I (LA (min r (rev l))))) 0)", right: "(lu (min r (rev l)))"},
	)
}

func TestRuleTfill(t *testing.T) {
	const source = "CHM 2018, 2"
	holds(t, boxes,
		law{name: "definition", source: source, dims: "k r", ty: "(LA (min r k))",
			left:  "(tfill (i (LA (min i k))) (= k 0) l0 r)",
			right: "(transp (j (LA (min (min r j) k))) (or (= k 0) (= r 0)) l0)"},
		law{name: "at 0 what is transported", source: source, dims: "k", ty: "(LA 0)", left: "(tfill (i (LA i)) bot l0 0)", right: "l0"},
		law{name: "at 1 the transport", source: source, dims: "k", ty: "(LA k)",
			left: "(tfill (i (LA (min i k))) (= k 0) l0 1)", right: "(transp (i (LA (min i k))) (= k 0) l0)"},
		law{name: "on its face what is transported", source: source, dims: "r", ty: "(LA 0)",
			left: "((ann (lam (k) (tfill (i (LA (min i k))) (= k 0) l0 r)) (Pi ((k I)) (LA (min r k)))) 0)", right: "l0"},
	)
}
