; HoTT Book, section 6.9: truncations (statements numbered from memory).
(data Trunc ((A (U 0))) (point some ((a A))) (path squash ((x (Trunc A)) (y (Trunc A))) (i) ((= i 0) x) ((= i 1) y)))
(data SetTrunc ((A (U 0))) (point elt ((a A)))
  (path fill-square ((x (SetTrunc A)) (y (SetTrunc A)) (p (Path (SetTrunc A) x y)) (q (Path (SetTrunc A) x y))) (i j)
    ((= i 0) (at p j)) ((= i 1) (at q j)) ((= j 0) x) ((= j 1) y)))
(def isProp (-> (U 0) (U 0)) (lam (X) (Pi ((x X) (y X)) (Path X x y))))
(def isSet (-> (U 0) (U 0)) (lam (X) (Pi ((x X) (y X) (p (Path X x y)) (q (Path X x y))) (Path (Path X x y) p q))))

; paths over a line of sets are propositions
(def over-prop (Pi ((C (-> I (U 0))) (s (Pi ((j I)) (isSet (C j)))) (b0 (C 0)) (b1 (C 1))
                    (u (PathOver (j (C j)) b0 b1)) (v (PathOver (j (C j)) b0 b1))) (Path (PathOver (j (C j)) b0 b1) u v))
  (lam (C s b0 b1 u v) (line (k j) (hcomp (C j)
    (fill (j (C j)) b0 j ((= k 0) (j) (at u j)) ((= k 1) (j) (at v j)))
    ((= k 0) (l) (at u j)) ((= k 1) (l) (at v j)) ((= j 0) (l) b0)
    ((= j 1) (l) (at (s 1 b1 b1 (line (k) (comp (j (C j)) b0 ((= k 0) (j) (at u j)) ((= k 1) (j) (at v j)))) (line (_) b1)) l k))))))
; two elements at the ends of a line of propositions are joined over it
(def over-line (Pi ((T (-> I (U 0))) (h (Pi ((i I)) (isProp (T i)))) (a (T 0)) (b (T 1))) (PathOver (i (T i)) a b))
  (lam (T h a b) (line (i) (hcomp (T i) (tfill (i (T i)) bot a i) ((= i 0) (k) a) ((= i 1) (k) (at (h 1 (transp (i (T i)) bot a) b) k))))))

; 6.9.1: induction for the set truncation into families of sets, computing on elements
(def ind (Pi ((A (U 0)) (B (-> (SetTrunc A) (U 0))) (s (Pi ((x (SetTrunc A))) (isSet (B x)))) (g (Pi ((a A)) (B (elt a)))) (x (SetTrunc A))) (B x))
  (lam (A B s g x) (elim (x (B x)) x ((elt a) (g a))
    ((fill-square x y p q hx hy hp hq i j)
      (at (over-line (lam (i) (PathOver (j (B (fill-square x y p q i j))) hx hy))
                     (lam (i) (over-prop (lam (j) (B (fill-square x y p q i j))) (lam (j) (s (fill-square x y p q i j))) hx hy))
                     hp hq) i j)))))
(assume A (U 0)) (assume B (-> (SetTrunc A) (U 0))) (assume s (Pi ((x (SetTrunc A))) (isSet (B x)))) (assume g (Pi ((a A)) (B (elt a)))) (assume a A)
(same (B (elt a)) (ind A B s g (elt a)) (g a))

; 6.9.2: composition with elt is an equivalence of (SetTrunc A -> X) and (A -> X) for a set X: both round trips
(def truncated-set (Pi ((A (U 0))) (isSet (SetTrunc A))) (lam (A x y p q) (line (i j) (fill-square x y p q i j))))
(def extend (Pi ((A (U 0)) (X (U 0)) (s (isSet X))) (-> (-> A X) (SetTrunc A) X)) (lam (A X s f x) (ind A (lam (_) X) (lam (_) s) f x)))
(def restrict (Pi ((A (U 0)) (X (U 0))) (-> (-> (SetTrunc A) X) A X)) (lam (A X f a) (f (elt a))))
(def restrict-extend (Pi ((A (U 0)) (X (U 0)) (s (isSet X)) (f (-> A X))) (Path (-> A X) (restrict A X (extend A X s f)) f)) (lam (A X s f) (line (_) f)))
(def prop-set (Pi ((X (U 0))) (-> (isProp X) (isSet X)))
  (lam (X h x y p q) (line (i j) (hcomp X x ((= i 0) (k) (at (h x (at p j)) k)) ((= i 1) (k) (at (h x (at q j)) k))
                                         ((= j 0) (k) (at (h x x) k)) ((= j 1) (k) (at (h x y) k))))))
(def paths-set (Pi ((X (U 0)) (s (isSet X)) (x X) (y X)) (isSet (Path X x y))) (lam (X s x y) (prop-set (Path X x y) (s x y))))
(def extend-restrict (Pi ((A (U 0)) (X (U 0)) (s (isSet X)) (f (-> (SetTrunc A) X))) (Path (-> (SetTrunc A) X) (extend A X s (restrict A X f)) f))
  (lam (A X s f) (line (k) (lam (x) (at (ind A (lam (x) (Path X (extend A X s (restrict A X f) x) (f x)))
    (lam (x) (paths-set X s (extend A X s (restrict A X f) x) (f x))) (lam (a) (line (_) (f (elt a)))) x) k)))))

; 6.9.3: the truncation of a set is that set: both maps, both round trips
(def down (Pi ((X (U 0)) (s (isSet X))) (-> (SetTrunc X) X)) (lam (X s) (extend X X s (lam (x) x))))
(def down-up (Pi ((X (U 0)) (s (isSet X)) (x X)) (Path X (down X s (elt x)) x)) (lam (X s x) (line (_) x)))
(def up-down (Pi ((X (U 0)) (s (isSet X)) (t (SetTrunc X))) (Path (SetTrunc X) (elt (down X s t)) t))
  (lam (X s t) (ind X (lam (t) (Path (SetTrunc X) (elt (down X s t)) t))
    (lam (t) (paths-set (SetTrunc X) (truncated-set X) (elt (down X s t)) t)) (lam (x) (line (_) (elt x))) t)))

; the same for propositions: recursion, and its uniqueness
(def rec (Pi ((A (U 0)) (P (U 0))) (-> (isProp P) (-> A P) (Trunc A) P))
  (lam (A P h f t) (elim (_ P) t ((some a) (f a)) ((squash x y hx hy i) (at (h hx hy) i)))))
(def prop-ind (Pi ((A (U 0)) (B (-> (Trunc A) (U 0))) (h (Pi ((x (Trunc A))) (isProp (B x)))) (g (Pi ((a A)) (B (some a)))) (x (Trunc A))) (B x))
  (lam (A B h g x) (elim (x (B x)) x ((some a) (g a))
    ((squash x y hx hy i) (at (over-line (lam (i) (B (squash x y i))) (lam (i) (h (squash x y i))) hx hy) i)))))
(def twice (Pi ((A (U 0))) (-> (Trunc (Trunc A)) (Trunc A))) (lam (A) (rec (Trunc A) (Trunc A) (lam (x y) (line (i) (squash x y i))) (lam (x) x))))
(normal (twice A (some (some a))) (some a))
