; What the library proves, each statement written out where the source has it,
; and what its proofs compute to.
(load "booleans.sexp")
(load "decidable.sexp")
(load "circle.sexp")

; HoTT Book 2.10.3; CCHM 7.2: the canonical map from paths of types to
; equivalences, which transports the identity, is an equivalence.
(def canonical (Pi ((A (U 0)) (B (U 0))) (-> (Path (U 0) A B) (Equiv A B)))
  (lam (A B p) (transp (i (Equiv A (at p i))) bot (identity-equivalence A))))
(def statement-univalence
  (Pi ((A (U 0)) (B (U 0)))
    (Pi ((e (Equiv A B))) (contractible (fiber (Path (U 0) A B) (Equiv A B) (canonical A B) e))))
  (lam (A B) (snd (univalence A B))))
(def statement-contractible
  (Pi ((A (U 0))) (contractible (Sigma ((X (U 0))) (Equiv X A)))) equivalences-contractible)
(normal (transp (i (at (inverse-map (Path (U 0) Bool Bool) (Equiv Bool Bool) (univalence Bool Bool) not-equivalence) i)) bot true) false)
(normal ((fst ((fst (univalence Bool Bool)) negation)) true) false)

; Book 3.3.4, 3.3.5, 7.1: propositions are sets, sets are groupoids.
(def statement-levels
  (Pi ((A (U 0)) (h (Pi ((a A) (b A)) (Path A a b)))) (Pi ((a A) (b A) (p (Path A a b)) (q (Path A a b))) (Path (Path A a b) p q)))
  (lam (A) (proposition-set A)))
(def statement-groupoid (Pi ((A (U 0))) (-> (set A) (groupoid A))) (lam (A) (set-groupoid A)))

; Book 7.2.5 (Hedberg) and its instances.
(def statement-hedberg
  (Pi ((A (U 0)) (h (Pi ((a A) (b A)) (Sum (Path A a b) (-> (Path A a b) Empty))))) (set A)) hedberg)
(def statement-nat (Pi ((a Nat) (b Nat) (p (Path Nat a b)) (q (Path Nat a b))) (Path (Path Nat a b) p q)) nat-set)
(def statement-int (Pi ((a Int) (b Int) (p (Path Int a b)) (q (Path Int a b))) (Path (Path Int a b) p q)) int-set)
(def statement-bool (Pi ((a Bool) (b Bool) (p (Path Bool a b)) (q (Path Bool a b))) (Path (Path Bool a b) p q)) bool-set)
(def decides (Pi ((A (U 0))) (-> (decision A) Bool)) (lam (A d) (elim (x Bool) d ((inl p) true) ((inr n) false))))
(normal (decides (Path Nat 30 30) (nat-discrete 30 30)) true)
(normal (decides (Path Nat 30 31) (nat-discrete 30 31)) false)
(normal (decides (Path Int (negsuc 4) (negsuc 4)) (int-discrete (negsuc 4) (negsuc 4))) true)
(normal (decides (Path Int (negsuc 4) (pos 4)) (int-discrete (negsuc 4) (pos 4))) false)
(same (Path (Path Nat 2 2) (line (i) 2) (line (i) 2)) (nat-set 2 2 (line (i) 2) (line (i) 2)) (nat-set 2 2 (line (i) 2) (line (i) 2)))

; Book 8.1.9, 8.1.10; Licata and Shulman, LICS 2013: the loops of the circle are
; the integers, by the winding number and the powers of the loop.
(def statement-loops (Equiv (Path Circle base base) Int) loops-integers)
(same (-> (Path Circle base base) Int) (fst loops-integers) winding)
(same (-> Int (Path Circle base base)) (inverse-map (Path Circle base base) Int loops-integers) turns)
(same (U 0) (cover base) Int)
(same (Path (U 0) Int Int) (line (i) (cover (loop i))) turn)
(normal (winding rest) (pos 0))
(normal (winding turn-once) (pos 1))
(normal (winding turn-back) (negsuc 0))
(normal (winding (then turn-once (then turn-once (back turn-once)))) (pos 1))
(normal (at (winding-turns (pos 3)) 0) (pos 3))
(reject (same (Path Circle base base) (then turn-once turn-back) rest))
