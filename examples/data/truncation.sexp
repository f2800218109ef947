; Propositional and set truncation (Book 6.9, CHM 3).
(data Trunc ((A (U 0))) (point some ((a A))) (path squash ((x (Trunc A)) (y (Trunc A))) (i) ((= i 0) x) ((= i 1) y)))

(def isProp (-> (U 0) (U 0)) (lam (X) (Pi ((x X) (y X)) (Path X x y))))
(def isSet (-> (U 0) (U 0)) (lam (X) (Pi ((x X) (y X) (p (Path X x y)) (q (Path X x y))) (Path (Path X x y) p q))))
(def trunc-prop (Pi ((A (U 0))) (isProp (Trunc A))) (lam (A x y) (line (i) (squash x y i))))
(def into (Pi ((A (U 0)) (P (U 0))) (-> (isProp P) (-> A P) (Trunc A) P))
  (lam (A P h f t) (elim (_ P) t ((some a) (f a)) ((squash x y hx hy i) (at (h hx hy) i)))))
(assume A (U 0)) (assume P (U 0)) (assume h (isProp P)) (assume f (-> A P)) (assume a A) (assume b A)
(same P (into A P h f (some a)) (f a))
(same (Path P (f a) (f b)) (line (i) (into A P h f (squash (some a) (some b) i))) (h (f a) (f b)))
(differ (Trunc A) (some a) (some b))
(reject (def out (-> (Trunc A) A) (lam (t) (elim (_ A) t ((some a) a) ((squash x y hx hy i) hx)))))

; transport commutes with squash: its boundary is variables
(assume L (-> I (U 0))) (assume x (Trunc (L 0))) (assume y (Trunc (L 0)))
(normal (ann (line (k) (transp (i (Trunc (L i))) bot (ann (squash x y k) (Trunc (L 0)))))
             (Path (Trunc (L 1)) (transp (i (Trunc (L i))) bot x) (transp (i (Trunc (L i))) bot y)))
  (line (k) (squash (transp (i (Trunc (L i))) bot x) (transp (i (Trunc (L i))) bot y) k)))

; set truncation: a square for each two parallel paths, whose boundary takes
; paths at a dimension, so that a composite corrects its transport
(data SetTrunc ((A (U 0))) (point elt ((a A)))
  (path fill-square ((x (SetTrunc A)) (y (SetTrunc A)) (p (Path (SetTrunc A) x y)) (q (Path (SetTrunc A) x y))) (i j)
    ((= i 0) (at p j)) ((= i 1) (at q j)) ((= j 0) x) ((= j 1) y)))
(def trunc-set (Pi ((A (U 0))) (isSet (SetTrunc A))) (lam (A x y p q) (line (i j) (fill-square x y p q i j))))
; the hypotheses of p and q are paths between the hypotheses of x and y
(def into-set (Pi ((A (U 0)) (X (U 0))) (-> (isSet X) (-> A X) (SetTrunc A) X))
  (lam (A X h f t) (elim (_ X) t ((elt a) (f a)) ((fill-square x y p q hx hy hp hq i j) (at (h hx hy hp hq) i j)))))
(assume X (U 0)) (assume s (isSet X)) (assume m (-> A X))
(same X (into-set A X s m (elt a)) (m a))
(assume r (Path (SetTrunc A) (elt a) (elt b)))
(same (Path X (m a) (m b)) (line (j) (into-set A X s m (fill-square (elt a) (elt b) r r 0 j))) (line (j) (into-set A X s m (at r j))))
(reject (def wrong-set (Pi ((A (U 0)) (X (U 0))) (-> (isSet X) (-> A X) (SetTrunc A) X))
  (lam (A X h f t) (elim (_ X) t ((elt a) (f a)) ((fill-square x y p q hx hy hp hq i j) (at (h hx hy hq hp) i j))))))
(def moved-set (-> (SetTrunc (L 0)) (SetTrunc (L 1))) (lam (t) (transp (i (SetTrunc (L i))) bot t)))
(assume u (SetTrunc (L 0))) (assume v (SetTrunc (L 0))) (assume d (Path (SetTrunc (L 0)) u v)) (assume e (Path (SetTrunc (L 0)) u v))
(same (Path (SetTrunc (L 1)) (moved-set u) (moved-set v)) (line (j) (moved-set (fill-square u v d e 0 j))) (line (j) (moved-set (at d j))))
(same (Path (SetTrunc (L 1)) (moved-set u) (moved-set u)) (line (i) (moved-set (fill-square u v d e i 0))) (line (_) (moved-set u)))
