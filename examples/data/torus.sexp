; The torus (Book 6.6, CHM 3): a point, two circles and a square between them.
(data Torus () (point corner ())
  (path across () (i) ((or (= i 0) (= i 1)) corner))
  (path along () (j) ((or (= j 0) (= j 1)) corner))
  (path square () (i j) ((or (= i 0) (= i 1)) (along j)) ((or (= j 0) (= j 1)) (across i))))

(normal (ann (line (j) (square 0 j)) (Path Torus corner corner)) (line (j) (along j)))
(same Torus (square 1 0) corner)
(def swap (-> Torus Torus) (lam (t) (elim (_ Torus) t (corner corner) ((across i) (along i)) ((along j) (across j)) ((square i j) (square j i)))))
(def swap-swap (Pi ((t Torus)) (Path Torus (swap (swap t)) t)) (lam (t) (elim (t (Path Torus (swap (swap t)) t)) t
  (corner (line (_) corner)) ((across i) (line (_) (across i))) ((along j) (line (_) (along j))) ((square i j) (line (_) (square i j))))))
(def diagonal (Path Torus corner corner) (line (k) (square k k)))
(differ (Path Torus corner corner) diagonal (line (k) (across k)))
(def to-across (-> Torus Circle) (lam (t) (elim (_ Circle) t (corner base) ((across i) (loop i)) ((along j) base) ((square i j) (loop i)))))
(normal (ann (line (k) (to-across (at diagonal k))) (Path Circle base base)) (line (k) (loop k)))
(reject (def bad (-> Torus Circle) (lam (t) (elim (_ Circle) t (corner base) ((across i) (loop i)) ((along j) base) ((square i j) (loop j))))))
; sides that do not meet in a corner are refused
(reject (data Open () (point c0 ()) (point c1 ()) (path p0 () (i) ((= i 0) c0) ((= i 1) c1))
  (path s0 () (i j) ((= i 0) (p0 j)) ((= j 0) (p0 (rev i))))))
; the Klein bottle differs in the direction of one side alone
(data Klein () (point k0 ()) (path ka () (i) ((or (= i 0) (= i 1)) k0)) (path kb () (j) ((or (= j 0) (= j 1)) k0))
  (path ks () (i j) ((= i 0) (kb j)) ((= i 1) (kb (rev j))) ((or (= j 0) (= j 1)) (ka i))))
(same (Path Klein k0 k0) (line (j) (ks 1 j)) (line (j) (kb (rev j))))
(reject (def straight (-> Klein Torus) (lam (t) (elim (_ Torus) t (k0 corner) ((ka i) (across i)) ((kb j) (along j)) ((ks i j) (square i j))))))
