; HoTT Book, section 6.4: circles and spheres, as far as it needs no univalence.
; Lemma 6.4.1, the step before univalence: were loop equal to the constant path,
; every loop in every type would be
(def collapse (-> (Path (Path Circle base base) (line (i) (loop i)) (line (_) base))
                  (Pi ((A (U 0)) (a A) (p (Path A a a))) (Path (Path A a a) p (line (_) a))))
  (lam (r A a p) (line (k i) (elim (_ A) (at r k i) (base a) ((loop j) (at p j))))))
; Lemma 6.4.2: an element of (x : S1) -> x = x that is loop at base
(def around (Pi ((x Circle)) (Path Circle x x))
  (lam (x) (elim (x (Path Circle x x)) x
    (base (line (j) (loop j)))
    ((loop i) (line (j) (hcomp Circle base
      ((= i 0) (k) (loop (max j (rev k)))) ((= i 1) (k) (loop (min j k)))
      ((= j 0) (k) (loop (max i (rev k)))) ((= j 1) (k) (loop (min i k)))))))))
(same (Path Circle base base) (around base) (line (i) (loop i)))
(differ (Pi ((x Circle)) (Path Circle x x)) around (lam (x) (line (_) x)))
; Lemma 6.4.4: functions act on paths between paths
(def ap2 (Pi ((A (U 0)) (B (U 0)) (f (-> A B)) (x A) (y A) (p (Path A x y)) (q (Path A x y)) (r (Path (Path A x y) p q)))
           (Path (Path B (f x) (f y)) (line (i) (f (at p i))) (line (i) (f (at q i)))))
  (lam (A B f x y p q r) (line (k i) (f (at r k i)))))
; Lemma 6.4.5: transport along equal paths
(def transport2 (Pi ((A (U 0)) (P (-> A (U 0))) (x A) (y A) (p (Path A x y)) (q (Path A x y)) (r (Path (Path A x y) p q)) (u (P x)))
                  (Path (P y) (transp (i (P (at p i))) bot u) (transp (i (P (at q i))) bot u)))
  (lam (A P x y p q r u) (line (k) (transp (i (P (at r k i))) bot u))))
; Lemma 6.4.6: dependent functions act on paths between paths
(def apd2 (Pi ((A (U 0)) (P (-> A (U 0))) (f (Pi ((x A)) (P x))) (x A) (y A) (p (Path A x y)) (q (Path A x y)) (r (Path (Path A x y) p q)))
            (PathOver (k (PathOver (i (P (at r k i))) (f x) (f y))) (line (i) (f (at p i))) (line (i) (f (at q i)))))
  (lam (A P f x y p q r) (line (k i) (f (at r k i)))))
; the recursion principle of the 2-sphere: a point and a path from its constant path to itself
(data S2 () (point pole ()) (path surface () (i j) ((or (= i 0) (= i 1) (= j 0) (= j 1)) pole)))
(def rec (Pi ((A (U 0)) (a A) (s (Path (Path A a a) (line (_) a) (line (_) a)))) (-> S2 A))
  (lam (A a s x) (elim (_ A) x (pole a) ((surface i j) (at s i j)))))
(assume A (U 0)) (assume a A) (assume s (Path (Path A a a) (line (_) a) (line (_) a)))
(same (Path (Path A a a) (line (_) a) (line (_) a)) (ap2 S2 A (rec A a s) pole pole (line (_) pole) (line (_) pole) (line (i j) (surface i j))) s)
