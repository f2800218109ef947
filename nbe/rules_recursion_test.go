package nbe_test

import "testing"

// Induction hypotheses for recursive arguments: of functions pointwise, of paths
// along the path; and path constructors with recursive arguments.

func TestRuleHypotheses(t *testing.T) {
	const source = "HoTT Book 2013, 5.3 and 6.13; CHM 2018, 3"
	const given = lines + `
		(data Tree ((A (U 0)) (B (-> A (U 0)))) (point node ((a A) (f (-> (B a) (Tree A B))))))
		(assume a A) (assume f (-> (B a) (Tree A B))) (assume y (B a))
		(assume T (-> (Tree A B) (U 0))) (assume step (Pi ((a A) (f (-> (B a) (Tree A B))) (h (Pi ((y (B a))) (T (f y))))) (T (node a f))))
		(def walk (Pi ((t (Tree A B))) (T t)) (lam (t) (elim (t (T t)) t ((node a f h) (step a f h)))))

		(data Coil () (point rest ()) (point wind ((f (-> I Coil)))))
		(assume K (-> Coil (U 0))) (assume kr (K rest)) (assume kw (Pi ((f (-> I Coil)) (h (Pi ((i I)) (K (f i))))) (K (wind f))))
		(def unwind (Pi ((c Coil)) (K c)) (lam (c) (elim (c (K c)) c (rest kr) ((wind f h) (kw f h)))))
		(assume cf (-> I Coil))

		(data Trunc ((A (U 0))) (point in ((a A))) (path squash ((x (Trunc A)) (y (Trunc A))) (i) ((= i 0) x) ((= i 1) y)))
		(assume P (U 0)) (assume prop (Pi ((x P) (y P)) (Path P x y))) (assume g (-> A P))
		(def out (-> (Trunc A) P) (lam (t) (elim (_ P) t ((in a) (g a)) ((squash x y hx hy i) (at (prop hx hy) i)))))
		(assume s (Trunc A)) (assume t (Trunc A)) (assume st (Path (Trunc A) s t))

		(data Loops () (point o ()) (point turned ((x Loops) (p (Path Loops x o)))))
		(assume Q (-> Loops (U 0))) (assume qo (Q o)) (assume qt (Pi ((x Loops) (p (Path Loops x o)) (hx (Q x)) (hp (PathOver (i (Q (at p i))) hx qo))) (Q (turned x p))))
		(def round (Pi ((x Loops)) (Q x)) (lam (x) (elim (x (Q x)) x (o qo) ((turned x p hx hp) (qt x p hx hp)))))
		(assume x0 Loops) (assume p0 (Path Loops x0 o))
	`
	holds(t, given,
		law{name: "functions", source: source, ty: "(T (node a f))", left: "(walk (node a f))", right: "(step a f (lam (y) (walk (f y))))"},
		law{name: "functions over the interval", source: source, ty: "(K (wind cf))", left: "(unwind (wind cf))", right: "(kw cf (lam (i) (unwind (cf i))))"},
		law{name: "paths", source: source, ty: "(Q (turned x0 p0))", left: "(round (turned x0 p0))", right: "(qt x0 p0 (round x0) (line (i) (round (at p0 i))))"},
		law{name: "a path constructor", source: source, dims: "k", ty: "P", left: "(out (squash s t k))", right: "(at (prop (out s) (out t)) k)"},
		law{name: "a path constructor inside another", source: source, dims: "k l", ty: "P",
			left: "(out (squash s (squash t s l) k))", right: "(at (prop (out s) (at (prop (out t) (out s)) l)) k)"},
		law{name: "a composite", source: source, dims: "k", ty: "P",
			left: "(out (hcomp (Trunc A) s ((= k 0) (i) (at st i))))", right: "(comp (_ P) (out s) ((= k 0) (i) (out (at st i))))"},
		law{name: "a path constructor's boundary", source: source, dims: "k", ty: "(Trunc A)", left: "(squash (in (hcomp A a)) (squash s t k) 1)", right: "(squash s t k)"},
		law{name: "transport of a recursive path constructor", source: "CHM 2018, 3.4: it commutes, its boundary being its arguments", dims: "k m", ty: "(Trunc (LA m))",
			given: "(assume l0 (LA 0)) (assume z (Trunc (LA 0)))",
			left:  "(transp (i (Trunc (LA (min i m)))) (= m 0) (squash (in l0) z k))",
			right: "(squash (in (transp (i (LA (min i m))) (= m 0) l0)) (transp (i (Trunc (LA (min i m)))) (= m 0) z) k)"},
	)
	accepted(t, `
		(data Trunc ((A (U 0))) (point in ((a A))) (path squash ((x (Trunc A)) (y (Trunc A))) (i) ((= i 0) x) ((= i 1) y)))
		(assume A (U 0)) (assume P (U 0)) (assume g (-> A P)) (assume prop (Pi ((x P) (y P)) (Path P x y)))
		(reject (def out (-> (Trunc A) P) (lam (t) (elim (_ P) t ((in a) (g a)) ((squash x y hx hy i) hx)))))
		(def out (-> (Trunc A) P) (lam (t) (elim (_ P) t ((in a) (g a)) ((squash x y hx hy i) (at (prop hx hy) i)))))
		(reject (data Bad () (point bad ((f (-> Bad Nat))))))
		(reject (data Bad2 ((A (U 0))) (point bad2 ((l (Bad2 (Sum A A)))))))`)
}

// One end of a path may be an argument transported, which has no hypothesis: at
// the other end, an argument itself, the path's hypothesis is that argument's.
func TestHypothesesAtTransportedEnds(t *testing.T) {
	const source = "HoTT Book 2013, 6.2; CHM 2018, 3"
	const given = `
		(data Slide ((A (U 0))) (point berth ((a A))) (point moved ((x (Slide A)) (p (Path (Slide A) x (transp (k (Slide A)) bot x))))))
		(assume A (U 0)) (assume P (U 0)) (assume b (-> A P)) (assume m (-> P P))
		(assume x (Slide A)) (assume p (Path (Slide A) x (transp (k (Slide A)) bot x)))
		(def from (-> (Slide A) P) (lam (z) (elim (_ P) z ((berth a) (b a)) ((moved x p hx hp) (m (at hp 0))))))`
	holds(t, given,
		law{name: "the start is the hypothesis", source: source, ty: "P", left: "(from (moved x p))", right: "(m (from x))"},
	)
}
