; Decidable equality and Hedberg's theorem (HoTT Book 7.2.5), with the sets that
; it gives: booleans, naturals, integers.
(load "integers.sexp")

(def refutation (-> (U 0) (U 0)) (lam (A) (-> A Empty)))
(def decision (-> (U 0) (U 0)) (lam (A) (Sum A (refutation A))))
(def discrete (-> (U 0) (U 0)) (lam (A) (Pi ((a A) (b A)) (decision (Path A a b)))))

(def absurd (Pi ((A (U 2))) (-> Empty A)) (lam (A e) (elim (x A) e)))

(def decision-image (Pi ((A (U 0)) (B (U 0)) (f (-> A B)) (g (-> B A))) (-> (decision A) (decision B)))
  (lam (A B f g d) (elim (x (decision B)) d ((inl a) (inl (f a))) ((inr n) (inr (lam (b) (n (g b))))))))

; An inverse undoes a path.
(def inverse-compose
  (Pi ((A (U 2)) (a A) (b A) (p (Path A a b)))
    (Path (Path A b b) (compose A b a b (inverse A a b p) p) (line (i) b)))
  (lam (A a b p)
    (line (j i) (hcomp A (at p (max (rev i) j))
      ((= i 0) (k) b) ((= i 1) (k) (at p (max k j))) ((= j 1) (k) b)))))

; What a decision makes of a path does not depend on the path.
(def decided (Pi ((A (U 0)) (d (decision A))) (-> A A))
  (lam (A d a) (elim (x A) d ((inl b) b) ((inr n) (absurd A (n a))))))

(def decided-constant (Pi ((A (U 0)) (d (decision A)) (a A) (b A)) (Path A (decided A d a) (decided A d b)))
  (lam (A d a b)
    (elim (x (Path A (decided A x a) (decided A x b))) d
      ((inl c) (line (i) c))
      ((inr n) (absurd (Path A (decided A (inr n) a) (decided A (inr n) b)) (n a))))))

(def hedberg-normal
  (Pi ((A (U 0)) (h (discrete A)) (a A) (b A) (p (Path A a b)))
    (Path (Path A a b)
      (compose A a a b
        (inverse A a a (decided (Path A a a) (h a a) (line (i) a)))
        (decided (Path A a b) (h a b) p)) p))
  (lam (A h a)
    (path-induction A a
      (lam (b p) (Path (Path A a b)
        (compose A a a b
          (inverse A a a (decided (Path A a a) (h a a) (line (i) a)))
          (decided (Path A a b) (h a b) p)) p))
      (inverse-compose A a a (decided (Path A a a) (h a a) (line (i) a))))))

(def hedberg (Pi ((A (U 0)) (h (discrete A))) (set A))
  (lam (A h a b p q)
    (let ((through (-> (Path A a b) (Path A a b))
            (lam (r) (compose A a a b
              (inverse A a a (decided (Path A a a) (h a a) (line (i) a))) r))))
      (compose (Path A a b) p (through (decided (Path A a b) (h a b) p)) q
        (inverse (Path A a b) (through (decided (Path A a b) (h a b) p)) p (hedberg-normal A h a b p))
        (compose (Path A a b) (through (decided (Path A a b) (h a b) p)) (through (decided (Path A a b) (h a b) q)) q
          (line (i) (through (at (decided-constant (Path A a b) (h a b) p q) i)))
          (hedberg-normal A h a b q))))))

; Booleans.
(def true-not-false (refutation (Path Bool true false))
  (lam (p) (transp (i (elim (x (U 0)) (at p i) (true Unit) (false Empty))) bot unit)))

(def bool-discrete (discrete Bool)
  (lam (a) (elim (x (Pi ((b Bool)) (decision (Path Bool x b)))) a
    (true (lam (b) (elim (y (decision (Path Bool true y))) b
      (true (inl (line (i) true))) (false (inr true-not-false)))))
    (false (lam (b) (elim (y (decision (Path Bool false y))) b
      (true (inr (lam (p) (true-not-false (line (i) (at p (rev i))))))) (false (inl (line (i) false)))))))))

(def bool-set (set Bool) (hedberg Bool bool-discrete))

; Naturals.
(def zero-not-successor (Pi ((n Nat)) (refutation (Path Nat zero (suc n))))
  (lam (n p) (transp (i (elim (x (U 0)) (at p i) (zero Unit) ((suc k h) Empty))) bot unit)))

(def nat-predecessor (-> Nat Nat) (lam (n) (elim (x Nat) n (zero zero) ((suc k h) k))))

(def nat-discrete (discrete Nat)
  (lam (m) (elim (x (Pi ((n Nat)) (decision (Path Nat x n)))) m
    (zero (lam (n) (elim (y (decision (Path Nat zero y))) n
      (zero (inl (line (i) zero)))
      ((suc k h) (inr (zero-not-successor k))))))
    ((suc j h) (lam (n) (elim (y (decision (Path Nat (suc j) y))) n
      (zero (inr (lam (p) (zero-not-successor j (line (i) (at p (rev i)))))))
      ((suc k g) (decision-image (Path Nat j k) (Path Nat (suc j) (suc k))
        (lam (p) (line (i) (suc (at p i))))
        (lam (p) (line (i) (nat-predecessor (at p i)))) (h k)))))))))

(def nat-set (set Nat) (hedberg Nat nat-discrete))

; Integers.
(def magnitude (-> Int Nat) (lam (z) (elim (x Nat) z ((pos n) n) ((negsuc n) n))))

(def pos-not-negsuc (Pi ((m Nat) (n Nat)) (refutation (Path Int (pos m) (negsuc n))))
  (lam (m n p) (transp (i (elim (x (U 0)) (at p i) ((pos k) Unit) ((negsuc k) Empty))) bot unit)))

(def int-discrete (discrete Int)
  (lam (a) (elim (x (Pi ((b Int)) (decision (Path Int x b)))) a
    ((pos m) (lam (b) (elim (y (decision (Path Int (pos m) y))) b
      ((pos n) (decision-image (Path Nat m n) (Path Int (pos m) (pos n))
        (lam (p) (line (i) (pos (at p i)))) (lam (p) (line (i) (magnitude (at p i)))) (nat-discrete m n)))
      ((negsuc n) (inr (pos-not-negsuc m n))))))
    ((negsuc m) (lam (b) (elim (y (decision (Path Int (negsuc m) y))) b
      ((pos n) (inr (lam (p) (pos-not-negsuc n m (line (i) (at p (rev i)))))))
      ((negsuc n) (decision-image (Path Nat m n) (Path Int (negsuc m) (negsuc n))
        (lam (p) (line (i) (negsuc (at p i)))) (lam (p) (line (i) (magnitude (at p i)))) (nat-discrete m n)))))))))

(def int-set (set Int) (hedberg Int int-discrete))
