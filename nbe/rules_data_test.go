package nbe_test

import "testing"

// Data types: strict and formal composites, transport, elimination.

const counts = `
	(assume x Nat) (assume y Nat) (assume e (Path Nat 0 0)) (assume n (Path Nat x x)) (assume xy (Path Nat x y))
	(assume A (U 0)) (assume a A) (assume C (U 0)) (assume LA (-> I (U 0))) (assume LC (-> I (U 0)))
`

func TestRuleStrictHcomp(t *testing.T) {
	const source = "CCHM 2015, 4.5: composition of naturals"
	holds(t, counts,
		law{name: "zero", source: source, dims: "k", ty: "Nat", left: "(hcomp Nat 0 ((= k 0) (_) 0))", right: "0"},
		law{name: "no wall", source: source, ty: "Nat", left: "(hcomp Nat 7)", right: "7"},
		law{name: "equal numerals", source: source, dims: "k l", ty: "Nat", left: "(hcomp Nat 30 ((or (= k 0) (= l 1)) (_) 30))", right: "30"},
		law{name: "successor", source: source, dims: "k", ty: "Nat",
			left: "(hcomp Nat (suc x) ((= k 0) (i) (suc (at xy i))))", right: "(suc (hcomp Nat x ((= k 0) (i) (at xy i))))"},
		law{name: "several successors, of which some are common", source: source, dims: "k", ty: "Nat", given: "(assume f (-> Nat Nat)) (assume z (Path Nat (f 0) (f 0)))",
			left: "(hcomp Nat (suc (suc (f 0))) ((= k 0) (i) (suc (suc (at z i)))))", right: "(suc (suc (hcomp Nat (f 0) ((= k 0) (i) (at z i)))))"},
		law{name: "as many successors as all show", source: source, dims: "k", ty: "Nat", given: "(assume z (Path Nat 1 1))",
			left: "(hcomp Nat 2 ((= k 0) (i) (suc (at z i))))", right: "(suc (hcomp Nat 1 ((= k 0) (i) (at z i))))"},
		law{name: "a variable alone is not the base", source: "no regularity", ty: "Nat", differ: true, left: "(hcomp Nat x)", right: "x"},
		law{name: "what is pushed stays a composite below", source: source, dims: "k", ty: "Nat", differ: true,
			left: "(hcomp Nat (suc x) ((= k 0) (_) (suc x)))", right: "(suc x)"},
		law{name: "a wall that does not show the constructor", source: source, dims: "k", ty: "Nat", differ: true,
			left: "(hcomp Nat 0 ((= k 0) (i) (at e i)))", right: "0"},
		law{name: "booleans", source: source, dims: "k", ty: "Bool", left: "(hcomp Bool true ((= k 0) (_) true))", right: "true"},
		law{name: "each wall under its own face", source: source, dims: "k", ty: "Nat", given: "(assume s (Path (Path Nat 0 0) (line (_) 0) (line (_) 0)))",
			left: "(hcomp Nat 0 ((= k 0) (i) (at s k i)) ((= k 1) (i) (at s k i)))", right: "0"},
	)
}

func TestRuleStrictHcompArguments(t *testing.T) {
	const source = "CCHM 2015, 4.5: arguments from left to right, by hcomp or, where the declared type mentions an earlier argument, by comp"
	const given = counts + `
		(data Crate ((A (U 0)) (B (-> A (U 0)))) (point crate ((a A) (b (B a)))))
		(data Two ((A (U 0)) (B (U 0))) (point two ((a A) (b B))))
		(assume B (-> A (U 0))) (assume b (B a)) (assume s (Path (Path A a a) (line (_) a) (line (_) a)))
		(assume a2 A) (assume p (Path A a a2)) (assume b2 (B a2)) (assume pb (PathOver (i (B (at p i))) b b2))
		(assume c C) (assume c2 C) (assume pc (Path C c c2))
	`
	holds(t, given,
		law{name: "left injection", source: source, dims: "k", ty: "(Sum A C)",
			left:  "(hcomp (Sum A C) (inl a) ((= k 0) (i) (inl (at p i))))",
			right: "(inl (hcomp A a ((= k 0) (i) (at p i))))"},
		law{name: "right injection", source: source, dims: "k l", ty: "(Sum A C)",
			left:  "(hcomp (Sum A C) (inr c) ((= k 0) (i) (inr (at pc (min i l)))))",
			right: "(inr (hcomp C c ((= k 0) (i) (at pc (min i l)))))"},
		law{name: "a dependent argument by comp over the filler", source: source, dims: "k", ty: "(Crate A B)",
			left: "(hcomp (Crate A B) (crate a b) ((= k 0) (i) (crate (at p i) (at pb i))))",
			right: `(crate (hcomp A a ((= k 0) (i) (at p i)))
				(comp (i (B (hfill A a i ((= k 0) (i) (at p i))))) b ((= k 0) (i) (at pb i))))`},
		law{name: "an argument over two earlier ones", source: source, dims: "k", ty: "(Nest A B D)",
			given: `(data Nest ((A (U 0)) (B (-> A (U 0))) (D (Pi ((a A)) (-> (B a) (U 0))))) (point nest ((a A) (b (B a)) (d (D a b)))))
				(assume D (Pi ((a A)) (-> (B a) (U 0)))) (assume d (D a b)) (assume d2 (D a2 b2)) (assume pd (PathOver (i (D (at p i) (at pb i))) d d2))`,
			left: "(hcomp (Nest A B D) (nest a b d) ((= k 0) (i) (nest (at p i) (at pb i) (at pd i))))",
			right: `(nest (hcomp A a ((= k 0) (i) (at p i)))
				(comp (i (B (hfill A a i ((= k 0) (i) (at p i))))) b ((= k 0) (i) (at pb i)))
				(comp (i (D (hfill A a i ((= k 0) (i) (at p i))) (fill (i (B (hfill A a i ((= k 0) (i) (at p i))))) b i ((= k 0) (i) (at pb i))))) d
					((= k 0) (i) (at pd i))))`},
		law{name: "an argument that mentions none by hcomp", source: source, dims: "k", ty: "(Two A C)",
			left:  "(hcomp (Two A C) (two a c) ((= k 0) (i) (two (at p i) (at pc i))))",
			right: "(two (hcomp A a ((= k 0) (i) (at p i))) (hcomp C c ((= k 0) (i) (at pc i))))"},
		law{name: "the choice is the declaration's, not the instance's", source: source, dims: "k", ty: "(Crate A (lam (_) C))",
			left:  "(hcomp (Crate A (lam (_) C)) (crate a c) ((= k 0) (i) (crate (at p i) (at pc i))))",
			right: `(crate (hcomp A a ((= k 0) (i) (at p i))) (comp (_ C) c ((= k 0) (i) (at pc i))))`},
	)
}

func TestRuleFormalHcomp(t *testing.T) {
	const source = "CHM 2018, 3: a composite of a higher inductive type is one more canonical element"
	const given = counts + `
		(data Tally () (composition formal) (point none ()) (point more ((t Tally))))
		(assume t Tally) (assume u Tally) (assume tu (Path Tally t u))
	`
	holds(t, given,
		law{name: "the circle's constant box", source: source, dims: "k", ty: "Circle", differ: true, left: "(hcomp Circle base ((= k 0) (_) base))", right: "base"},
		law{name: "the circle's empty box", source: source, ty: "Circle", differ: true, left: "(hcomp Circle base)", right: "base"},
		law{name: "no constructor is pushed", source: source, dims: "k", ty: "Tally", differ: true,
			left: "(hcomp Tally (more t) ((= k 0) (i) (more (at tu i))))", right: "(more (hcomp Tally t ((= k 0) (i) (at tu i))))"},
		law{name: "on its face it is its wall", source: source, ty: "Circle", left: "(hcomp Circle base (top (i) (loop i)))", right: "base"},
		law{name: "order and redundancy of walls", source: source, dims: "k l", ty: "Circle",
			left:  "(hcomp Circle base ((= l 0) (i) (loop i)) ((= k 0) (i) (loop i)))",
			right: "(hcomp Circle base ((and (= k 0) (= l 0)) (i) (loop i)) ((or (= k 0) (= l 0)) (i) (loop i)))"},
	)
}

func TestRuleFormalElim(t *testing.T) {
	const source = "CHM 2018, 3: eliminators commute with composites"
	const given = counts + `
		(data Tally () (composition formal) (point none ()) (point more ((t Tally))))
		(assume t Tally) (assume u Tally) (assume tu (Path Tally t u))
		(assume F (-> Tally (U 0))) (assume z (F none)) (assume s (Pi ((t Tally)) (-> (F t) (F (more t)))))
		(def count (Pi ((t Tally)) (F t)) (lam (t) (elim (x (F x)) t (none z) ((more k h) (s k h)))))
		(assume P (-> Circle (U 0))) (assume pb (P base)) (assume pl (PathOver (i (P (loop i))) pb pb))
		(def turn (Pi ((c Circle)) (P c)) (lam (c) (elim (x (P x)) c (base pb) ((loop i) (at pl i)))))
	`
	holds(t, given,
		law{name: "dependent", source: source, dims: "k", ty: "(F (hcomp Tally t ((= k 0) (i) (at tu i))))",
			left:  "(count (hcomp Tally t ((= k 0) (i) (at tu i))))",
			right: "(comp (i (F (hfill Tally t i ((= k 0) (i) (at tu i))))) (count t) ((= k 0) (i) (count (at tu i))))"},
		law{name: "of the circle, into a family", source: source, dims: "k", ty: "(P (hcomp Circle base ((= k 1) (i) (loop i))))",
			left:  "(turn (hcomp Circle base ((= k 1) (i) (loop i))))",
			right: "(comp (i (P (hfill Circle base i ((= k 1) (i) (loop i))))) pb ((= k 1) (i) (at pl i)))"},
		law{name: "not dependent, by comp", source: source, dims: "k", ty: "A", given: "(assume w (Path A a a))",
			left:  "(elim (_ A) (hcomp Circle base ((= k 1) (i) (loop i))) (base a) ((loop i) (at w i)))",
			right: "(comp (_ A) a ((= k 1) (i) (at w i)))"},
		law{name: "point constructor", source: source, ty: "(F (more none))", left: "(count (more none))", right: "(s none z)"},
		law{name: "path constructor", source: source, dims: "k", ty: "(P (loop k))", left: "(turn (loop k))", right: "(at pl k)"},
		law{name: "path constructor at an expression", source: source, dims: "k l", ty: "(P (loop (min k (rev l))))", left: "(turn (loop (min k (rev l))))", right: "(at pl (min k (rev l)))"},
	)
}

func TestRuleElim(t *testing.T) {
	const source = "HoTT Book 2013, 5.1: computation rules of elimination"
	const given = counts + `
		(assume F (-> Nat (U 0))) (assume z (F 0)) (assume s (Pi ((n Nat)) (-> (F n) (F (suc n)))))
		(def rec (Pi ((n Nat)) (F n)) (lam (n) (elim (x (F x)) n (zero z) ((suc k h) (s k h)))))
		(assume f (-> A Nat)) (assume g (-> C Nat)) (assume c C)
	`
	holds(t, given,
		law{name: "zero", source: source, ty: "(F 0)", left: "(rec 0)", right: "z"},
		law{name: "successor", source: source, ty: "(F (suc x))", left: "(rec (suc x))", right: "(s x (rec x))"},
		law{name: "a numeral", source: source, ty: "(F 3)", left: "(rec 3)", right: "(s 2 (s 1 (s 0 z)))"},
		law{name: "left", source: source, ty: "Nat", left: "(elim (_ Nat) (ann (inl a) (Sum A C)) ((inl u) (f u)) ((inr v) (g v)))", right: "(f a)"},
		law{name: "right", source: source, ty: "Nat", left: "(elim (_ Nat) (ann (inr c) (Sum A C)) ((inl u) (f u)) ((inr v) (g v)))", right: "(g c)"},
		law{name: "cases in any order", source: source, ty: "Nat", left: "(elim (_ Nat) (ann (inr c) (Sum A C)) ((inr v) (g v)) ((inl u) (f u)))", right: "(g c)"},
		law{name: "of a stuck composite it waits", source: "CCHM 2015, 4.5", dims: "k", ty: "A", given: "(assume w (Path A a a))", differ: true,
			left:  "(elim (_ A) (hcomp Nat 0 ((= k 0) (i) (at e i))) (zero a) ((suc m h) a))",
			right: "(comp (_ A) a ((= k 0) (i) (elim (_ A) (at e i) (zero a) ((suc m h) a))))"},
	)
	accepted(t, `
		(assume q Empty) (assume A (U 0))
		(show (elim (_ A) q))
		(reject (show (elim (_ A) 0 (zero 1))))
		(reject (def odd (-> Circle Nat) (lam (c) (elim (_ Nat) c (base 0) ((loop i) 1)))))
		(reject (def odd (-> Circle Circle) (lam (c) (elim (_ Circle) c (base base) ((loop i) (hcomp Circle base))))))`)
}

// With both treatments at once, putting the constant path for e would give base
// by one order and a formal composite of base by the other.
func TestStrictAndFormalClash(t *testing.T) {
	const given = counts + `
		(def box (Pi ((x (Path Nat 0 0))) (-> I Nat)) (lam (x k) (hcomp Nat 0 ((= k 0) (i) (at x i)))))
		(def into (-> Nat Circle) (lam (m) (elim (_ Circle) m (zero base) ((suc k h) base))))
	`
	const source = "CHM 2018, 3, and CCHM 2015, 4.5: never both"
	holds(t, given,
		law{name: "the constant path first", source: source, dims: "k", ty: "Circle", left: "(into (box (line (_) 0) k))", right: "base"},
		law{name: "a variable first, and then the constant path", source: source, dims: "k", ty: "Circle",
			left: "((ann (lam (x) (into (box x k))) (-> (Path Nat 0 0) Circle)) (line (_) 0))", right: "base"},
		law{name: "with a variable it waits", source: source, dims: "k", ty: "Circle", differ: true,
			left: "(into (box e k))", right: "(comp (_ Circle) base ((= k 0) (i) (into (at e i))))"},
	)
	accepted(t, `
		(reject (data Both () (composition strict) (composition formal) (point none ())))
		(reject (data Turn () (composition strict) (point base2 ()) (path turn () (i) ((or (= i 0) (= i 1)) base2))))
		(data Turn () (composition formal) (point base2 ()) (path turn () (i) ((or (= i 0) (= i 1)) base2)))`)
}

func TestRuleTranspData(t *testing.T) {
	const source = "CHM 2018, 3.4"
	const given = counts + `
		(data List ((A (U 0))) (point nil ()) (point cons ((a A) (l (List A)))))
		(data Crate ((A (U 0)) (B (-> A (U 0)))) (point crate ((a A) (b (B a)))))
		(data Bag ((A (U 0))) (composition formal) (point empty ()) (point put ((a A) (b (Bag A)))))
		(assume l0 (LA 0)) (assume c0 (LC 0)) (assume LB (Pi ((i I) (x (LA i))) (U 0))) (assume b0 (LB 0 l0))
		(assume rest (List (LA 0))) (assume s (Sum (LA 0) (LC 0)))
		(assume bag (Bag (LA 0))) (assume bags (Path (Bag (LA 0)) bag bag)) (assume c Circle)
		(assume ua (Path A a a)) (assume stuck (List A)) (assume sp (Path (List A) stuck stuck))
	`
	holds(t, given,
		law{name: "no parameters: naturals", source: source, ty: "Nat", left: "(transp (_ Nat) bot x)", right: "x"},
		law{name: "no parameters: a stuck composite", source: source, dims: "k", ty: "Nat", left: "(transp (_ Nat) bot (hcomp Nat 0 ((= k 0) (i) (at e i))))", right: "(hcomp Nat 0 ((= k 0) (i) (at e i)))"},
		law{name: "no parameters: the circle", source: source, dims: "k", ty: "Circle", left: "(transp (_ Circle) (= k 0) c)", right: "c"},
		law{name: "no parameters: the circle's loop", source: source, dims: "k", ty: "Circle", left: "(transp (_ Circle) bot (loop k))", right: "(loop k)"},
		law{name: "a point constructor", source: source, dims: "k", ty: "(Sum (LA k) (LC k))",
			left:  "(transp (i (Sum (LA (min i k)) (LC (min i k)))) (= k 0) (inl l0))",
			right: "(inl (transp (i (LA (min i k))) (= k 0) l0))"},
		law{name: "a recursive argument", source: source, ty: "(List (LA 1))",
			left:  "(transp (i (List (LA i))) bot (cons l0 (cons l0 rest)))",
			right: "(cons (transp (i (LA i)) bot l0) (cons (transp (i (LA i)) bot l0) (transp (i (List (LA i))) bot rest)))"},
		law{name: "an argument over the filler of an earlier one", source: source, dims: "k", ty: "(Crate (LA k) (LB k))",
			left:  "(transp (i (Crate (LA (min i k)) (LB (min i k)))) (= k 0) (crate l0 b0))",
			right: "(crate (transp (i (LA (min i k))) (= k 0) l0) (transp (i (LB (min i k) (tfill (i (LA (min i k))) (= k 0) l0 i))) (= k 0) b0))"},
		law{name: "parameters that do not vary", source: source, ty: "(List A)",
			left: "(transp (_ (List A)) bot (cons a nil))", right: "(cons (transp (_ A) bot a) nil)"},
		law{name: "parameters that do not vary: not the identity", source: source, ty: "(List A)", differ: true,
			left: "(transp (_ (List A)) bot (cons a nil))", right: "(cons a nil)"},
		law{name: "a variable is stuck", source: source, ty: "(List A)", differ: true, left: "(transp (_ (List A)) bot stuck)", right: "stuck"},
		law{name: "a stuck strict composite stays", source: source, dims: "k", ty: "(List A)", differ: true,
			left:  "(transp (_ (List A)) bot (hcomp (List A) stuck ((= k 0) (i) (at sp i))))",
			right: "(hcomp (List A) (transp (_ (List A)) bot stuck) ((= k 0) (i) (transp (_ (List A)) bot (at sp i))))"},
		law{name: "a formal composite commutes", source: source, dims: "k m", ty: "(Bag (LA m))",
			left:  "(transp (i (Bag (LA (min i m)))) (= m 0) (hcomp (Bag (LA 0)) bag ((= k 0) (i) (at bags i))))",
			right: "(hcomp (Bag (LA m)) (transp (i (Bag (LA (min i m)))) (= m 0) bag) ((= k 0) (j) (transp (i (Bag (LA (min i m)))) (= m 0) (at bags j))))"},
		law{name: "as a constant path of types does it", source: source + "; the reason for the rule", ty: "(List A)", given: "(assume q (Path (U 0) A A))",
			left:  "((ann (lam (q) (transp (i (List (at q i))) bot (cons a nil))) (-> (Path (U 0) A A) (List A))) (line (_) A))",
			right: "(transp (_ (List A)) bot (cons a nil))"},
	)
}

func TestRuleTranspPathConstructor(t *testing.T) {
	const source = "CHM 2018, 3.4"
	const given = counts + `
		(data Susp ((A (U 0))) (point north ()) (point south ()) (path merid ((a A)) (i) ((= i 0) north) ((= i 1) south)))
		(data Push ((A (U 0)) (B (U 0)) (f (-> A B))) (point at-b ((b B))) (path glued ((a A)) (i) ((= i 0) (at-b (f a))) ))
		(assume l0 (LA 0)) (assume LF (Pi ((i I)) (-> (LA i) (LC i))))
	`
	holds(t, given,
		law{name: "one that commutes", source: source, dims: "k m", ty: "(Susp (LA m))",
			left:  "(transp (i (Susp (LA (min i m)))) (= m 0) (merid l0 k))",
			right: "(merid (transp (i (LA (min i m))) (= m 0) l0) k)"},
		law{name: "one that needs correcting", source: source, dims: "k m", ty: "(Push (LA m) (LC m) (LF m))",
			left: "(transp (i (Push (LA (min i m)) (LC (min i m)) (LF (min i m)))) (= m 0) (glued l0 k))",
			right: `(hcomp (Push (LA m) (LC m) (LF m)) (glued (transp (i (LA (min i m))) (= m 0) l0) k)
				((= m 0) (_) (glued l0 k))
				((= k 0) (j) (transp (i (Push (LA (min (max i (rev j)) m)) (LC (min (max i (rev j)) m)) (LF (min (max i (rev j)) m)))) (or (= m 0) (= j 0))
					(at-b (LF (min (rev j) m) (tfill (i (LA (min i m))) (= m 0) l0 (rev j)))))))`},
		law{name: "one that needs correcting, of an argument that depends on the face", source: source, dims: "k m", ty: "(Push (LA m) (LC m) (LF m))",
			given: "(assume l1 (LA 0)) (assume pl (Path (LA 0) l0 l1))",
			left:  "(transp (i (Push (LA (min i m)) (LC (min i m)) (LF (min i m)))) (= m 0) (glued (at pl m) k))",
			right: `(hcomp (Push (LA m) (LC m) (LF m)) (glued (transp (i (LA (min i m))) (= m 0) (at pl m)) k)
				((= m 0) (_) (glued l0 k))
				((= k 0) (j) (transp (i (Push (LA (min (max i (rev j)) m)) (LC (min (max i (rev j)) m)) (LF (min (max i (rev j)) m)))) (or (= m 0) (= j 0))
					(at-b (LF (min (rev j) m) (tfill (i (LA (min i m))) (= m 0) (at pl m) (rev j)))))))`},
	)
}
