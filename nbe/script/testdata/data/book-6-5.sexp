; HoTT Book, section 6.5. Lemma 6.5.1: the suspension of the two-element type
; and the circle are equivalent: both maps and both round trips as paths.
(data Susp ((A (U 0))) (point north ()) (point south ()) (path merid ((a A)) (i) ((= i 0) north) ((= i 1) south)))
(def S1s (U 0) (Susp Bool))
(def to (-> S1s Circle) (lam (x) (elim (_ Circle) x (north base) (south base)
  ((merid b i) (at (elim (_ (Path Circle base base)) b (true (line (i) (loop i))) (false (line (_) base))) i)))))
(def from (-> Circle S1s) (lam (x) (elim (_ S1s) x (base north)
  ((loop i) (hcomp S1s (merid true i) ((= i 0) (k) north) ((= i 1) (k) (merid false (rev k))))))))
(def to-from (Pi ((x Circle)) (Path Circle (to (from x)) x))
  (lam (x) (elim (x (Path Circle (to (from x)) x)) x (base (line (_) base))
    ((loop i) (line (j) (hcomp Circle (loop i) ((= i 0) (k) base) ((= i 1) (k) base) ((= j 1) (k) (loop i))))))))
(def from-to (Pi ((x S1s)) (Path S1s (from (to x)) x))
  (lam (x) (elim (x (Path S1s (from (to x)) x)) x
    (north (line (_) north)) (south (line (j) (merid false j)))
    ((merid b i) (at ((ann (lam (b) (elim
        (b (PathOver (i (Path S1s (from (to (merid b i))) (merid b i))) (line (_) north) (line (j) (merid false j)))) b
        (true (line (i j) (hcomp S1s (merid true i) ((= i 0) (k) north) ((= i 1) (k) (merid false (max (rev k) j))) ((= j 1) (k) (merid true i)))))
        (false (line (i j) (merid false (min i j))))))
      (Pi ((b Bool)) (PathOver (i (Path S1s (from (to (merid b i))) (merid b i))) (line (_) north) (line (j) (merid false j))))) b) i)))))
(normal (ann (line (i) (to (from (loop i)))) (Path Circle base base))
  (line (i) (hcomp Circle (loop i) ((or (= i 0) (= i 1)) (k) base))))
(differ (Path Circle base base) (line (i) (to (from (loop i)))) (line (i) (loop i)))
(normal (at (from-to north) 0) north)
(reject (def wrong (Pi ((x S1s)) (Path S1s (from (to x)) x))
  (lam (x) (elim (x (Path S1s (from (to x)) x)) x
    (north (line (_) north)) (south (line (j) (merid true j))) ((merid b i) (line (j) (merid b (min i j))))))))
; Lemma 6.5.4: maps out of a suspension are two points and a family of paths: both maps, both round trips
(def Data (-> (U 0) (U 0) (U 0)) (lam (A X) (Sigma ((n X) (s X)) (-> A (Path X n s)))))
(def pieces (Pi ((A (U 0)) (X (U 0))) (-> (-> (Susp A) X) (Data A X)))
  (lam (A X f) (pair (f north) (f south) (lam (a) (line (i) (f (merid a i)))))))
(def whole (Pi ((A (U 0)) (X (U 0))) (-> (Data A X) (Susp A) X))
  (lam (A X d x) (elim (_ X) x (north (fst d)) (south (fst (snd d))) ((merid a i) (at ((snd (snd d)) a) i)))))
(def pieces-whole (Pi ((A (U 0)) (X (U 0)) (d (Data A X))) (Path (Data A X) (pieces A X (whole A X d)) d)) (lam (A X d) (line (_) d)))
(def whole-pieces (Pi ((A (U 0)) (X (U 0)) (f (-> (Susp A) X))) (Path (-> (Susp A) X) (whole A X (pieces A X f)) f))
  (lam (A X f) (line (k) (lam (x) (at (elim (x (Path X (whole A X (pieces A X f) x) (f x))) x
    (north (line (_) (f north))) (south (line (_) (f south))) ((merid a i) (line (_) (f (merid a i))))) k)))))
