; HoTT Book, section 6.2. Lemma 6.2.5: for a point a with a loop p there is a
; function from the circle with f(base) = a and f's action on loop equal to p.
; Both hold by definition here.
(def rec (Pi ((A (U 0)) (a A) (p (Path A a a))) (-> Circle A))
  (lam (A a p x) (elim (_ A) x (base a) ((loop i) (at p i)))))
(assume A (U 0)) (assume a A) (assume p (Path A a a))
(same A (rec A a p base) a)
(same (Path A a a) (line (i) (rec A a p (loop i))) p)
(differ (Path A a a) p (line (_) a))
; Lemma 6.2.8: functions that agree at base and along loop are equal
(def unique (Pi ((A (U 0)) (f (-> Circle A)) (g (-> Circle A)) (b (Path A (f base) (g base)))
                 (l (PathOver (i (Path A (f (loop i)) (g (loop i)))) b b)) (x Circle)) (Path A (f x) (g x)))
  (lam (A f g b l x) (elim (x (Path A (f x) (g x))) x (base b) ((loop i) (at l i)))))
; Lemma 6.2.9: (S1 -> A) is equivalent to the points with a loop: both maps, both round trips
(def Loops (-> (U 0) (U 0)) (lam (A) (Sigma ((a A)) (Path A a a))))
(def to (Pi ((A (U 0))) (-> (-> Circle A) (Loops A))) (lam (A f) (pair (f base) (line (i) (f (loop i))))))
(def from (Pi ((A (U 0))) (-> (Loops A) (-> Circle A))) (lam (A l) (rec A (fst l) (snd l))))
(def to-from (Pi ((A (U 0)) (l (Loops A))) (Path (Loops A) (to A (from A l)) l)) (lam (A l) (line (_) l)))
(def from-to (Pi ((A (U 0)) (f (-> Circle A))) (Path (-> Circle A) (from A (to A f)) f))
  (lam (A f) (line (k) (lam (x) (at (elim (x (Path A (from A (to A f) x) (f x))) x (base (line (_) (f base))) ((loop i) (line (_) (f (loop i))))) k)))))
(assume f (-> Circle A))
(differ (-> Circle A) (from A (to A f)) f)
