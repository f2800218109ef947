; The circle's universal cover, winding numbers, and its loops as the integers
; (HoTT Book 8.1.9, 8.1.10; Licata and Shulman, "Calculating the Fundamental
; Group of the Circle in Homotopy Type Theory", LICS 2013). On the quay, base is
; a cable drum at rest and loop is one turn forward.
(load "integers.sexp")

(def Loops (U 0) (Path Circle base base))

(def turn-once Loops (line (i) (loop i)))
(def turn-back Loops (line (i) (loop (rev i))))
(def rest Loops (line (i) base))

; p, then q.
(def then (-> Loops Loops Loops) (lam (p q) (compose Circle base base base p q)))
(def back (-> Loops Loops) (lam (p) (inverse Circle base base p)))

(def cover (-> Circle (U 0))
  (lam (x) (elim (y (U 0)) x (base Int) ((loop i) (at turn i)))))

(def encode (Pi ((x Circle)) (-> (Path Circle base x) (cover x)))
  (lam (x p) (transp (i (cover (at p i))) bot (pos 0))))

(def winding (-> Loops Int) (encode base))

; n turns, for any integer n.
(def turns (-> Int Loops)
  (lam (z) (elim (x Loops) z
    ((pos n) (elim (m Loops) n (zero rest) ((suc m h) (then h turn-once))))
    ((negsuc n) (elim (m Loops) n (zero turn-back) ((suc m h) (then h turn-back)))))))

; The square between the turns of z+1 and of z, one turn along its right side.
(def turns-square
  (Pi ((z Int)) (PathOver (k (Path Circle base (loop (rev k)))) (turns (successor z)) (turns z)))
  (lam (z) (elim (x (PathOver (k (Path Circle base (loop (rev k)))) (turns (successor x)) (turns x))) z
    ((pos n) (line (k j) (hfill Circle (at (turns (pos n)) j) (rev k)
       ((= j 0) (l) base) ((= j 1) (l) (loop l)))))
    ((negsuc n) (elim (m (PathOver (k (Path Circle base (loop (rev k))))
          (turns (successor (negsuc m))) (turns (negsuc m)))) n
      (zero (line (k j) (loop (rev (min j k)))))
      ((suc m h) (line (k j) (hfill Circle (at (turns (negsuc m)) j) k
        ((= j 0) (l) base) ((= j 1) (l) (loop (rev l)))))))))))

(def decode (Pi ((x Circle)) (-> (cover x) (Path Circle base x)))
  (lam (x) (elim (y (-> (cover y) (Path Circle base y))) x
    (base turns)
    ((loop i) (lam (y) (line (j)
      (hcomp Circle (at (turns (unglue y)) j)
        ((= j 0) (k) base)
        ((= j 1) (k) (loop (max i (rev k))))
        ((= i 0) (k) (at (at (turns-square y) k) j))
        ((= i 1) (k) (at (turns y) j)))))))))

; One more turn adds one, and one turn back takes one away.
(def winding-forward
  (Pi ((p Loops)) (Path Int (winding (then p turn-once)) (successor (winding p))))
  (lam (p)
    (compose Int (winding (then p turn-once))
      (transp (i (at turn i)) bot (winding p)) (successor (winding p))
      (inverse Int (transp (i (at turn i)) bot (winding p)) (winding (then p turn-once))
        (transport-composite Circle cover base base base p turn-once (pos 0)))
      (ua-transport Int Int successor-equivalence (winding p)))))

(def winding-back
  (Pi ((p Loops)) (Path Int (winding (then p turn-back)) (predecessor (winding p))))
  (lam (p)
    (compose Int (winding (then p turn-back))
      (transp (i (at turn (rev i))) bot (winding p)) (predecessor (winding p))
      (inverse Int (transp (i (at turn (rev i))) bot (winding p)) (winding (then p turn-back))
        (transport-composite Circle cover base base base p turn-back (pos 0)))
      (ua-transport-back Int Int successor-equivalence (winding p)))))

(def winding-turns (Pi ((z Int)) (Path Int (winding (turns z)) z))
  (lam (z) (elim (x (Path Int (winding (turns x)) x)) z
    ((pos n) (elim (m (Path Int (winding (turns (pos m))) (pos m))) n
      (zero (line (i) (pos 0)))
      ((suc m h)
        (compose Int (winding (turns (pos (suc m)))) (successor (winding (turns (pos m)))) (pos (suc m))
          (winding-forward (turns (pos m)))
          (line (i) (successor (at h i)))))))
    ((negsuc n) (elim (m (Path Int (winding (turns (negsuc m))) (negsuc m))) n
      (zero (line (i) (negsuc 0)))
      ((suc m h)
        (compose Int (winding (turns (negsuc (suc m)))) (predecessor (winding (turns (negsuc m)))) (negsuc (suc m))
          (winding-back (turns (negsuc m)))
          (line (i) (predecessor (at h i))))))))))

(def decode-encode (Pi ((x Circle) (p (Path Circle base x))) (Path (Path Circle base x) (decode x (encode x p)) p))
  (path-induction Circle base
    (lam (x p) (Path (Path Circle base x) (decode x (encode x p)) p))
    (line (j i) base)))

; The loops of the circle are the integers (Book 8.1.9, 8.1.10).
(def loops-integers (Equiv Loops Int)
  (quasi-inverse Loops Int winding turns winding-turns (decode-encode base)))

; A map of the circle that turns n times, and the degree of a map that keeps base.
(def wrap (Pi ((n Int)) (-> Circle Circle))
  (lam (n x) (elim (y Circle) x (base base) ((loop i) (at (turns n) i)))))
(def degree (Pi ((f (-> Circle Circle)) (p (Path Circle (f base) base))) Int)
  (lam (f p)
    (winding (compose Circle base (f base) base (inverse Circle (f base) base p)
      (compose Circle (f base) (f base) base (line (i) (f (loop i))) p)))))

(def wrap-degree (-> Int Int) (lam (n) (degree (wrap n) (line (i) base))))

; Loop spaces (Book 2.1.8): of a type at a point, and of its loop space again.
(def loop-space (Pi ((A (U 2))) (-> A (U 2))) (lam (A a) (Path A a a)))
(def second-loop-space (Pi ((A (U 2))) (-> A (U 2)))
  (lam (A a) (loop-space (loop-space A a) (line (i) a))))
