; Suspensions (Book 6.5): two points and a meridian for each point of A. The
; meridian's boundary is built from constructors alone, so transport commutes with it.
(data Susp ((A (U 0))) (point north ()) (point south ())
  (path merid ((a A)) (i) ((= i 0) north) ((= i 1) south)))

(def flip (Pi ((A (U 0))) (-> (Susp A) (Susp A)))
  (lam (A x) (elim (_ (Susp A)) x (north south) (south north) ((merid a i) (merid a (rev i))))))
(def flip-flip (Pi ((A (U 0)) (x (Susp A))) (Path (Susp A) (flip A (flip A x)) x))
  (lam (A x) (elim (x (Path (Susp A) (flip A (flip A x)) x)) x
    (north (line (_) north)) (south (line (_) south)) ((merid a i) (line (_) (merid a i))))))
(def map (Pi ((A (U 0)) (B (U 0))) (-> (-> A B) (Susp A) (Susp B)))
  (lam (A B f x) (elim (_ (Susp B)) x (north north) (south south) ((merid a i) (merid (f a) i)))))

(assume A (U 0)) (assume B (U 0)) (assume l (Path (U 0) A B)) (assume a A)
(normal (ann (line (k) (merid a k)) (Path (Susp A) north south)) (line (k) (merid a k)))
(def moved (Path (Susp B) north south) (line (k) (transp (i (Susp (at l i))) bot (merid a k))))
(normal moved (line (k) (merid (transp (i (at l i)) bot a) k)))
(same (Susp B) (transp (i (Susp (at l i))) bot north) north)
(same (Path (Susp A) south north) (line (k) (flip A (merid a k))) (line (k) (merid a (rev k))))
(differ (Susp A) north south)
(reject (def bad (-> (Susp A) Bool) (lam (x) (elim (_ Bool) x (north true) (south false) ((merid a i) true)))))

; the suspension of nothing has two points, that of the point is an interval
(def contract (Pi ((x (Susp Unit))) (Path (Susp Unit) north x))
  (lam (x) (elim (x (Path (Susp Unit) north x)) x
    (north (line (_) north)) (south (line (j) (merid unit j))) ((merid u i) (line (j) (merid u (min i j)))))))
; a case that gives no path between its ends is refused, also where there is nothing to eliminate
(reject (def two (-> (Susp Empty) Bool) (lam (x) (elim (_ Bool) x (north true) (south false) ((merid e i) (elim (_ Bool) e))))))
(def two (-> (Susp Empty) Bool) (lam (x) (elim (_ Bool) x (north true) (south false)
  ((merid e i) (at (elim (e (Path Bool true false)) e) i)))))
(normal (two south) false)
; transport of a composite composes the transports
(assume x (Susp A)) (assume q (Path (Susp A) x north))
(def transported (-> I (Susp B)) (lam (k) (transp (i (Susp (at l i))) bot (hcomp (Susp A) x ((= k 0) (j) (at q j))))))
(normal transported (lam (k) (hcomp (Susp B) (transp (i (Susp (at l i))) bot x) ((= k 0) (j) (transp (i (Susp (at l i))) bot (at q j))))))
(normal (transported 0) north)
