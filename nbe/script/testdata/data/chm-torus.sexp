; CHM, "On Higher Inductive Types in Cubical Type Theory" (LICS 2018), section 3,
; the circle and the torus, rule by rule (subsections cited from memory).
(data Torus () (point corner ())
  (path across () (i) ((or (= i 0) (= i 1)) corner))
  (path along () (j) ((or (= j 0) (= j 1)) corner))
  (path square () (i j) ((or (= i 0) (= i 1)) (along j)) ((or (= j 0) (= j 1)) (across i))))
(def Tr (U 0) Torus)
; boundaries, at ends and at what goes to an end
(same Circle (loop 0) base) (same Circle (loop 1) base)
(same (-> I Torus) (lam (j) (square 0 j)) (lam (j) (along j)))
(same (-> I Torus) (lam (j) (square 1 j)) (lam (j) (along j)))
(same (-> I Torus) (lam (i) (square i 0)) (lam (i) (across i)))
(same (-> I Torus) (lam (i) (square i 1)) (lam (i) (across i)))
(same (-> I Torus) (lam (k) (square 0 1)) (lam (k) corner))
(same (-> I Torus) (lam (k) (square (max k 1) k)) (lam (k) (along k)))
(differ (-> I I Torus) (lam (i j) (square i j)) (lam (i j) (square j i)))
(differ (-> I I Torus) (lam (i j) (square (min i (rev i)) j)) (lam (i j) (along j))) ; min i (rev i) is no end
; elimination: one case for each constructor, on each side the case of the side
(assume D (-> Torus (U 0))) (assume d (D corner))
(assume p (PathOver (i (D (across i))) d d)) (assume q (PathOver (j (D (along j))) d d))
(assume s (PathOver (i (PathOver (j (D (square i j))) (at p i) (at p i))) q q))
(def e (Pi ((x Torus)) (D x)) (lam (x) (elim (x (D x)) x (corner d) ((across i) (at p i)) ((along j) (at q j)) ((square i j) (at s i j)))))
(same (D corner) (e corner) d)
(same (PathOver (i (D (across i))) d d) (line (i) (e (across i))) p)
(same (PathOver (j (D (along j))) d d) (line (j) (e (along j))) q)
(same (PathOver (i (PathOver (j (D (square i j))) (at p i) (at p i))) q q) (line (i j) (e (square i j))) s)
(reject (def e2 (Pi ((x Torus)) (D x)) (lam (x) (elim (x (D x)) x (corner d) ((across i) (at p i)) ((along j) (at q j)) ((square i j) (at s j i))))))
; composites are canonical and eliminators commute with them
(assume w (-> I Torus))
(def h (-> I Torus) (lam (k) (hcomp Torus (w 0) ((= k 1) (j) (w j)))))
(same (Pi ((k I)) (D (h k))) (lam (k) (e (h k)))
  (lam (k) (comp (j (D (hfill Torus (w 0) j ((= k 1) (j) (w j))))) (e (w 0)) ((= k 1) (j) (e (w j))))))
(differ Torus (hcomp Torus corner) corner)
(normal (ann (lam (k) (hcomp Torus (across k) ((= k 0) (j) (along j)))) (-> I Torus)) (lam (k) (hcomp Torus (across k) ((= k 0) (j) (along j)))))
; a type without parameters is transported by the identity
(assume x Torus)
(same Torus (transp (i Torus) bot x) x)
(same (-> I Torus) (lam (k) (transp (i Torus) (= k 0) (h k))) h)
(same (-> I I Torus) (lam (i j) (transp (k Torus) bot (square i j))) (lam (i j) (square i j)))
