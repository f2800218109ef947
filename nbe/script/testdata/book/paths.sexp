; HoTT Book, chapter 2: paths, functors, transport. The numbers are the Book's.

(def refl (Pi ((A (U 0)) (x A)) (Path A x x)) (lam (A x) (line (_) x)))

; 1.12.1, based path induction
(def J (Pi ((A (U 0)) (a A) (C (Pi ((x A)) (-> (Path A a x) (U 0)))) (d (C a (line (_) a))) (x A) (p (Path A a x))) (C x p))
  (lam (A a C d x p) (transp (i (C (at p i) (line (j) (at p (min i j))))) bot d)))

; its computation rule holds up to a path and not by definition
(def J-computes (Pi ((A (U 0)) (a A) (C (Pi ((x A)) (-> (Path A a x) (U 0)))) (d (C a (line (_) a))))
                  (Path (C a (line (_) a)) (J A a C d a (line (_) a)) d))
  (lam (A a C d) (line (i) (transp (_ (C a (line (_) a))) (= i 1) d))))
(differ (Pi ((A (U 0)) (a A) (C (Pi ((x A)) (-> (Path A a x) (U 0)))) (d (C a (line (_) a)))) (C a (line (_) a)))
  (lam (A a C d) (J A a C d a (line (_) a)))
  (lam (A a C d) d))

; 2.1.1
(def inv (Pi ((A (U 0)) (x A) (y A) (p (Path A x y))) (Path A y x))
  (lam (A x y p) (line (i) (at p (rev i)))))
(same (Pi ((A (U 0)) (x A)) (Path A x x)) (lam (A x) (inv A x x (refl A x))) refl)

; 2.1.2
(def concat (Pi ((A (U 0)) (x A) (y A) (z A) (p (Path A x y)) (q (Path A y z))) (Path A x z))
  (lam (A x y z p q) (line (i) (hcomp A (at p i) ((= i 0) (_) x) ((= i 1) (j) (at q j))))))

; 2.1.4 (i)
(def right-unit (Pi ((A (U 0)) (x A) (y A) (p (Path A x y))) (Path (Path A x y) p (concat A x y y p (refl A y))))
  (lam (A x y p) (line (k i) (hfill A (at p i) k ((= i 0) (_) x) ((= i 1) (_) y)))))
(def left-unit (Pi ((A (U 0)) (x A) (y A) (p (Path A x y))) (Path (Path A x y) p (concat A x x y (refl A x) p)))
  (lam (A x y p) (line (k i) (hcomp A x ((= i 0) (_) x) ((= i 1) (j) (at p j)) ((= k 0) (j) (at p (min i j)))))))
(differ (Pi ((A (U 0)) (x A) (y A) (p (Path A x y))) (Path A x y)) (lam (A x y p) p) (lam (A x y p) (concat A x y y p (refl A y))))

; 2.1.4 (ii)
(def inv-right (Pi ((A (U 0)) (x A) (y A) (p (Path A x y))) (Path (Path A x x) (concat A x y x p (inv A x y p)) (refl A x)))
  (lam (A x y p) (line (k i) (hcomp A (at p (min i (rev k)))
    ((= i 0) (_) x) ((= i 1) (j) (at p (min (rev j) (rev k)))) ((= k 1) (_) x)))))
(def inv-left (Pi ((A (U 0)) (x A) (y A) (p (Path A x y))) (Path (Path A y y) (concat A y x y (inv A x y p) p) (refl A y)))
  (lam (A x y p) (inv-right A y x (inv A x y p))))

; 2.1.4 (iii), by definition
(same (Pi ((A (U 0)) (x A) (y A) (p (Path A x y))) (Path A x y)) (lam (A x y p) (inv A y x (inv A x y p))) (lam (A x y p) p))
(def inv-inv (Pi ((A (U 0)) (x A) (y A) (p (Path A x y))) (Path (Path A x y) (inv A y x (inv A x y p)) p))
  (lam (A x y p) (line (_) p)))

; 2.1.4 (iv)
(def assoc (Pi ((A (U 0)) (x A) (y A) (z A) (w A) (p (Path A x y)) (q (Path A y z)) (r (Path A z w)))
             (Path (Path A x w) (concat A x y w p (concat A y z w q r)) (concat A x z w (concat A x y z p q) r)))
  (lam (A x y z w p q r) (line (k i)
    (hcomp A (hfill A (at p i) k ((= i 0) (_) x) ((= i 1) (j) (at q j)))
      ((= i 0) (_) x)
      ((= i 1) (j) (hcomp A (at q (max j k)) ((= j 0) (m) (at q k)) ((= j 1) (m) (at r m)) ((= k 1) (m) (at r (min j m)))))))))
