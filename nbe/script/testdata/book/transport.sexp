; HoTT Book, sections 2.2 and 2.3. The numbers are the Book's.
(load "paths.sexp")

; 2.2.1
(def ap (Pi ((A (U 0)) (B (U 0)) (f (-> A B)) (x A) (y A) (p (Path A x y))) (Path B (f x) (f y)))
  (lam (A B f x y p) (line (i) (f (at p i)))))

; 2.2.2 (i)
(def ap-concat (Pi ((A (U 0)) (B (U 0)) (f (-> A B)) (x A) (y A) (z A) (p (Path A x y)) (q (Path A y z)))
                 (Path (Path B (f x) (f z)) (ap A B f x z (concat A x y z p q))
                   (concat B (f x) (f y) (f z) (ap A B f x y p) (ap A B f y z q))))
  (lam (A B f x y z p q) (line (k i)
    (hcomp B (f (at p i)) ((= i 0) (_) (f x)) ((= i 1) (j) (f (at q j)))
      ((= k 0) (j) (f (hfill A (at p i) j ((= i 0) (_) x) ((= i 1) (j) (at q j)))))))))
; 2.2.2 (ii), (iii), (iv), by definition
(same (Pi ((A (U 0)) (B (U 0)) (f (-> A B)) (x A) (y A) (p (Path A x y))) (Path B (f y) (f x)))
  (lam (A B f x y p) (ap A B f y x (inv A x y p))) (lam (A B f x y p) (inv B (f x) (f y) (ap A B f x y p))))
(same (Pi ((A (U 0)) (B (U 0)) (C (U 0)) (f (-> A B)) (g (-> B C)) (x A) (y A) (p (Path A x y))) (Path C (g (f x)) (g (f y))))
  (lam (A B C f g x y p) (ap B C g (f x) (f y) (ap A B f x y p))) (lam (A B C f g x y p) (ap A C (lam (x) (g (f x))) x y p)))
(same (Pi ((A (U 0)) (x A) (y A) (p (Path A x y))) (Path A x y))
  (lam (A x y p) (ap A A (lam (x) x) x y p)) (lam (A x y p) p))

; 2.3.1
(def transport (Pi ((A (U 0)) (P (-> A (U 0))) (x A) (y A) (p (Path A x y))) (-> (P x) (P y)))
  (lam (A P x y p u) (transp (i (P (at p i))) bot u)))

; 2.3.2, path lifting, with what lies under it
(def lift (Pi ((A (U 0)) (P (-> A (U 0))) (x A) (y A) (p (Path A x y)) (u (P x)))
            (Path (Sigma ((x A)) (P x)) (pair x u) (pair y (transport A P x y p u))))
  (lam (A P x y p u) (line (i) (pair (at p i) (tfill (i (P (at p i))) bot u i)))))
(same (Pi ((A (U 0)) (P (-> A (U 0))) (x A) (y A) (p (Path A x y)) (u (P x))) (Path A x y))
  (lam (A P x y p u) (line (i) (fst (at (lift A P x y p u) i)))) (lam (A P x y p u) p))

; 2.3.4
(def apd (Pi ((A (U 0)) (P (-> A (U 0))) (f (Pi ((x A)) (P x))) (x A) (y A) (p (Path A x y)))
           (Path (P y) (transport A P x y p (f x)) (f y)))
  (lam (A P f x y p) (line (j) (transp (i (P (at p (max i j)))) (= j 1) (f (at p j))))))

; 2.3.5
(def transport-const (Pi ((A (U 0)) (B (U 0)) (x A) (y A) (p (Path A x y)) (b B)) (Path B (transport A (lam (_) B) x y p b) b))
  (lam (A B x y p b) (line (j) (transp (_ B) (= j 1) b))))
(differ (Pi ((A (U 0)) (B (U 0)) (x A) (y A) (p (Path A x y)) (b B)) B)
  (lam (A B x y p b) (transport A (lam (_) B) x y p b)) (lam (A B x y p b) b))

; 2.3.6 and 2.3.7
(def to-over-const (Pi ((A (U 0)) (B (U 0)) (f (-> A B)) (x A) (y A) (p (Path A x y)))
                     (-> (Path B (f x) (f y)) (Path B (transport A (lam (_) B) x y p (f x)) (f y))))
  (lam (A B f x y p q) (concat B (transp (_ B) bot (f x)) (f x) (f y) (transport-const A B x y p (f x)) q)))
(def from-over-const (Pi ((A (U 0)) (B (U 0)) (f (-> A B)) (x A) (y A) (p (Path A x y)))
                       (-> (Path B (transport A (lam (_) B) x y p (f x)) (f y)) (Path B (f x) (f y))))
  (lam (A B f x y p q) (concat B (f x) (transp (_ B) bot (f x)) (f y) (inv B (transp (_ B) bot (f x)) (f x) (transport-const A B x y p (f x))) q)))

; 2.3.8
(def apd-const (Pi ((A (U 0)) (B (U 0)) (f (-> A B)) (x A) (y A) (p (Path A x y)))
                 (Path (Path B (transport A (lam (_) B) x y p (f x)) (f y))
                   (apd A (lam (_) B) f x y p)
                   (concat B (transp (_ B) bot (f x)) (f x) (f y) (transport-const A B x y p (f x)) (ap A B f x y p))))
  (lam (A B f x y p) (line (k i)
    (hcomp B (transp (_ B) (= i 1) (f x))
      ((= i 0) (_) (transp (_ B) bot (f x)))
      ((= i 1) (j) (f (at p j)))
      ((= k 0) (j) (transp (_ B) (= i 1) (f (at p (min i j)))))))))

; 2.3.9
(def transport-concat (Pi ((A (U 0)) (P (-> A (U 0))) (x A) (y A) (z A) (p (Path A x y)) (q (Path A y z)) (u (P x)))
                        (Path (P z) (transport A P y z q (transport A P x y p u)) (transport A P x z (concat A x y z p q) u)))
  (lam (A P x y z p q u)
    (let ((square (-> I I A) (lam (i j) (hfill A (at p i) j ((= i 0) (_) x) ((= i 1) (j) (at q j))))))
      (line (k) (transp (j (P (square 1 (max j k)))) (= k 1) (transp (i (P (square i k))) bot u))))))

; 2.3.10, by definition
(same (Pi ((A (U 0)) (B (U 0)) (f (-> A B)) (P (-> B (U 0))) (x A) (y A) (p (Path A x y)) (u (P (f x)))) (P (f y)))
  (lam (A B f P x y p u) (transport A (lam (x) (P (f x))) x y p u))
  (lam (A B f P x y p u) (transport B P (f x) (f y) (ap A B f x y p) u)))

; 2.3.11
(def transport-natural (Pi ((A (U 0)) (P (-> A (U 0))) (Q (-> A (U 0))) (f (Pi ((x A)) (-> (P x) (Q x)))) (x A) (y A) (p (Path A x y)) (u (P x)))
                         (Path (Q y) (transport A Q x y p (f x u)) (f y (transport A P x y p u))))
  (lam (A P Q f x y p u) (line (j) (transp (i (Q (at p (max i j)))) (= j 1) (f (at p j) (tfill (i (P (at p i))) bot u j))))))
