; Contractible types, fibers and equivalences (HoTT Book 3.11, 4.2, 4.4; CCHM
; 2015, section 5).
(load "paths.sexp")

(def contractible (-> (U 2) (U 2)) (lam (X) (Sigma ((x X)) (Pi ((y X)) (Path X x y)))))

(def fiber (Pi ((T (U 2)) (A (U 2)) (f (-> T A)) (y A)) (U 2))
  (lam (T A f y) (Sigma ((x T)) (Path A y (f x)))))

(def is-equivalence (Pi ((T (U 2)) (A (U 2)) (f (-> T A))) (U 2))
  (lam (T A f) (Pi ((y A)) (contractible (fiber T A f y)))))

(def identity-equivalence (Pi ((A (U 2))) (Equiv A A))
  (lam (A)
    (pair (lam (x) x)
      (lam (y)
        (pair (pair y (line (i) y))
          (lam (p) (line (i) (pair (at (snd p) i) (line (j) (at (snd p) (min i j)))))))))))

; Two elements of a fiber of a map with a quasi-inverse are joined (Book 4.2.3
; with 4.4.5): sides joins g y to x, base-path joins x0 to x1 across, and the
; square of A over it, mapped by f and corrected by the homotopy s, is the path
; between the second parts.
(def quasi-inverse-fibers
  (Pi ((A (U 2)) (B (U 2)) (f (-> A B)) (g (-> B A))
      (s (Pi ((y B)) (Path B (f (g y)) y))) (t (Pi ((x A)) (Path A (g (f x)) x)))
      (y B) (u (fiber A B f y)) (v (fiber A B f y)))
    (Path (fiber A B f y) u v))
  (lam (A B f g s t y u v)
    (let ((side0 (Path A (g y) (fst u))
            (line (i) (hcomp A (g (at (snd u) i)) ((= i 0) (k) (g y)) ((= i 1) (k) (at (t (fst u)) k)))))
          (side1 (Path A (g y) (fst v))
            (line (i) (hcomp A (g (at (snd v) i)) ((= i 0) (k) (g y)) ((= i 1) (k) (at (t (fst v)) k)))))
          (base-path (Path A (fst u) (fst v))
            (line (i) (hcomp A (g y) ((= i 0) (k) (at side0 k)) ((= i 1) (k) (at side1 k)))))
          (square (PathOver (i (Path A (g y) (g (f (at base-path i)))))
                    (line (j) (g (at (snd u) j))) (line (j) (g (at (snd v) j))))
            (line (i j)
              (hcomp A (hfill A (g y) j ((= i 0) (k) (at side0 k)) ((= i 1) (k) (at side1 k)))
                ((= i 0) (k) (hfill A (g (at (snd u) j)) (rev k)
                               ((= j 0) (l) (g y)) ((= j 1) (l) (at (t (fst u)) l))))
                ((= i 1) (k) (hfill A (g (at (snd v) j)) (rev k)
                               ((= j 0) (l) (g y)) ((= j 1) (l) (at (t (fst v)) l))))
                ((= j 0) (k) (g y))
                ((= j 1) (k) (at (t (at base-path i)) (rev k)))))))
      (line (i)
        (pair (at base-path i)
          (line (j)
            (hcomp B (f (at (at square i) j))
              ((= i 0) (k) (at (s (at (snd u) j)) k))
              ((= i 1) (k) (at (s (at (snd v) j)) k))
              ((= j 0) (k) (at (s y) k))
              ((= j 1) (k) (at (s (f (at base-path i))) k)))))))))

; An equivalence from a map with inverse and two homotopies (Book 4.2.3 with 4.4).
(def quasi-inverse
  (Pi ((A (U 2)) (B (U 2)) (f (-> A B)) (g (-> B A))
      (s (Pi ((y B)) (Path B (f (g y)) y))) (t (Pi ((x A)) (Path A (g (f x)) x))))
    (Equiv A B))
  (lam (A B f g s t)
    (pair f
      (lam (y)
        (pair (pair (g y) (line (i) (at (s y) (rev i))))
          (lam (z)
            (quasi-inverse-fibers A B f g s t y
              (pair (g y) (line (i) (at (s y) (rev i)))) z)))))))

; The inverse map of an equivalence, and the two homotopies.
(def inverse-map (Pi ((A (U 2)) (B (U 2)) (e (Equiv A B))) (-> B A))
  (lam (A B e y) (fst (fst ((snd e) y)))))

(def section (Pi ((A (U 2)) (B (U 2)) (e (Equiv A B)) (y B)) (Path B ((fst e) (inverse-map A B e y)) y))
  (lam (A B e y) (line (i) (at (snd (fst ((snd e) y))) (rev i)))))

(def retraction (Pi ((A (U 2)) (B (U 2)) (e (Equiv A B)) (x A)) (Path A (inverse-map A B e ((fst e) x)) x))
  (lam (A B e x)
    (line (i) (fst (at ((snd ((snd e) ((fst e) x))) (pair x (line (j) ((fst e) x)))) i)))))

(def inverse-equivalence (Pi ((A (U 2)) (B (U 2)) (e (Equiv A B))) (Equiv B A))
  (lam (A B e)
    (quasi-inverse B A (inverse-map A B e) (fst e) (retraction A B e) (section A B e))))

; e, then d.
(def compose-equivalences (Pi ((A (U 2)) (B (U 2)) (C (U 2)) (e (Equiv A B)) (d (Equiv B C))) (Equiv A C))
  (lam (A B C e d)
    (quasi-inverse A C (lam (x) ((fst d) ((fst e) x)))
      (lam (z) (inverse-map A B e (inverse-map B C d z)))
      (lam (z)
        (compose C ((fst d) ((fst e) (inverse-map A B e (inverse-map B C d z))))
          ((fst d) (inverse-map B C d z)) z
          (line (i) ((fst d) (at (section A B e (inverse-map B C d z)) i)))
          (section B C d z)))
      (lam (x)
        (compose A (inverse-map A B e (inverse-map B C d ((fst d) ((fst e) x))))
          (inverse-map A B e ((fst e) x)) x
          (line (i) (inverse-map A B e (at (retraction B C d ((fst e) x)) i)))
          (retraction A B e x))))))
