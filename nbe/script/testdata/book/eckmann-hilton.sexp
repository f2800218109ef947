; HoTT Book, 2.1.6 (Eckmann and Hilton): loops of dimension two commute. Two
; loops are put beside each other and slid past one another; both units are the
; same square at the constant loop, so the ends may slide along it.
(load "paths.sexp")

(def Loop (Pi ((A (U 0)) (a A)) (U 0)) (lam (A a) (Path A a a)))
(def Loop2 (Pi ((A (U 0)) (a A)) (U 0)) (lam (A a) (Path (Loop A a) (line (_) a) (line (_) a))))

(def ring (Pi ((A (U 0)) (a A)) (-> I (Loop A a))) (lam (A a k) (at (right-unit A a a (line (_) a)) k)))
(same (Pi ((A (U 0)) (a A)) (-> I (Loop A a))) ring (lam (A a k) (at (left-unit A a a (line (_) a)) k)))

(def first-then-second (Pi ((A (U 0)) (a A) (s (Loop2 A a)) (t (Loop2 A a)) (k I)) (Path (Loop A a) (ring A a k) (ring A a k)))
  (lam (A a s t k) (concat (Loop A a) (ring A a k) (ring A a k) (ring A a k)
    (line (i) (at (right-unit A a a (at s i)) k)) (line (i) (at (left-unit A a a (at t i)) k)))))
(def second-then-first (Pi ((A (U 0)) (a A) (s (Loop2 A a)) (t (Loop2 A a)) (k I)) (Path (Loop A a) (ring A a k) (ring A a k)))
  (lam (A a s t k) (concat (Loop A a) (ring A a k) (ring A a k) (ring A a k)
    (line (i) (at (left-unit A a a (at t i)) k)) (line (i) (at (right-unit A a a (at s i)) k)))))

(def side-by-side (Pi ((A (U 0)) (a A)) (-> (Loop A a) (Loop A a) (Loop A a))) (lam (A a) (concat A a a a)))
(def slide (Pi ((A (U 0)) (a A) (s (Loop2 A a)) (t (Loop2 A a)))
             (Path (Path (Loop A a) (ring A a 1) (ring A a 1)) (first-then-second A a s t 1) (second-then-first A a s t 1)))
  (lam (A a s t) (line (m) (concat (Loop A a) (ring A a 1) (side-by-side A a (at s (rev m)) (at t m)) (ring A a 1)
    (line (j) (side-by-side A a (at s (min (rev m) j)) (at t (min m j))))
    (line (j) (side-by-side A a (at s (max (rev m) j)) (at t (max m j))))))))

(def eckmann-hilton (Pi ((A (U 0)) (a A) (s (Loop2 A a)) (t (Loop2 A a)))
                      (Path (Loop2 A a)
                        (concat (Loop A a) (line (_) a) (line (_) a) (line (_) a) s t)
                        (concat (Loop A a) (line (_) a) (line (_) a) (line (_) a) t s)))
  (lam (A a s t) (line (m) (comp (k (Path (Loop A a) (ring A a (rev k)) (ring A a (rev k)))) (at (slide A a s t) m)
    ((= m 0) (k) (first-then-second A a s t (rev k))) ((= m 1) (k) (second-then-first A a s t (rev k)))))))
