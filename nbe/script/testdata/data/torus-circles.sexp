; HoTT Book, exercise 6.3 (and Sojakova, "The equivalence of the torus and the
; product of two circles in homotopy type theory", ACM TOCL 2016): the torus is
; the product of two circles. Both maps and both round trips, each by a constant path.
(data Torus () (point corner ())
  (path across () (i) ((or (= i 0) (= i 1)) corner))
  (path along () (j) ((or (= j 0) (= j 1)) corner))
  (path square () (i j) ((or (= i 0) (= i 1)) (along j)) ((or (= j 0) (= j 1)) (across i))))
(def C2 (U 0) (* Circle Circle))
(def to (-> Torus C2) (lam (t) (elim (_ C2) t (corner (pair base base)) ((across i) (pair (loop i) base)) ((along j) (pair base (loop j))) ((square i j) (pair (loop i) (loop j))))))
(def from2 (-> Circle Circle Torus) (lam (x) (elim (_ (-> Circle Torus)) x
  (base (lam (y) (elim (_ Torus) y (base corner) ((loop j) (along j)))))
  ((loop i) (lam (y) (elim (_ Torus) y (base (across i)) ((loop j) (square i j))))))))
(def from (-> C2 Torus) (lam (p) (from2 (fst p) (snd p))))
(def from-to (Pi ((t Torus)) (Path Torus (from (to t)) t)) (lam (t) (elim (t (Path Torus (from (to t)) t)) t
  (corner (line (_) corner)) ((across i) (line (_) (across i))) ((along j) (line (_) (along j))) ((square i j) (line (_) (square i j))))))
(def to-from2 (Pi ((x Circle) (y Circle)) (Path C2 (to (from2 x y)) (pair x y)))
  (lam (x) (elim (x (Pi ((y Circle)) (Path C2 (to (from2 x y)) (pair x y)))) x
    (base (lam (y) (elim (y (Path C2 (to (from2 base y)) (pair base y))) y (base (line (_) (pair base base))) ((loop j) (line (_) (pair base (loop j)))))))
    ((loop i) (lam (y) (elim (y (Path C2 (to (from2 (loop i) y)) (pair (loop i) y))) y
      (base (line (_) (pair (loop i) base))) ((loop j) (line (_) (pair (loop i) (loop j))))))))))
(def to-from (Pi ((p C2)) (Path C2 (to (from p)) p)) (lam (p) (to-from2 (fst p) (snd p))))
(normal (ann (line (k) (from (to (square k (rev k))))) (Path Torus corner corner)) (line (k) (square k (rev k))))
(reject (def wrong (-> Circle Circle Torus) (lam (x) (elim (_ (-> Circle Torus)) x
  (base (lam (y) (elim (_ Torus) y (base corner) ((loop j) (across j)))))
  ((loop i) (lam (y) (elim (_ Torus) y (base (across i)) ((loop j) (square i j)))))))))
