; The quotient of a type by a relation, as a set (Book 6.10).
(data Quotient ((A (U 0)) (R (-> A A (U 0)))) (point class ((a A)))
  (path related ((a A) (b A) (r (R a b))) (i) ((= i 0) (class a)) ((= i 1) (class b)))
  (path set ((x (Quotient A R)) (y (Quotient A R)) (p (Path (Quotient A R) x y)) (q (Path (Quotient A R) x y))) (i j)
    ((= i 0) (at p j)) ((= i 1) (at q j)) ((= j 0) x) ((= j 1) y)))

(def isSet (-> (U 0) (U 0)) (lam (X) (Pi ((x X) (y X) (p (Path X x y)) (q (Path X x y))) (Path (Path X x y) p q))))
(def from (Pi ((A (U 0)) (R (-> A A (U 0))) (X (U 0)) (s (isSet X)) (f (-> A X)) (h (Pi ((a A) (b A)) (-> (R a b) (Path X (f a) (f b))))))
            (-> (Quotient A R) X))
  (lam (A R X s f h t) (elim (_ X) t ((class a) (f a)) ((related a b r i) (at (h a b r) i))
    ((set x y p q hx hy hp hq i j) (at (s hx hy hp hq) i j)))))

; berths up to the side of the crane they lie on: every second one
(def even (-> Nat Bool) (lam (n) (elim (_ Bool) n (zero true) ((suc k h) (elim (_ Bool) h (true false) (false true))))))
(def SameSide (-> Nat Nat (U 0)) (lam (m n) (Path Bool (even m) (even n))))
(def Side (U 0) (Quotient Nat SameSide))
(def two-four (Path Side (class 2) (class 4)) (line (i) (related 2 4 (line (_) true) i)))
(reject (def two-three (Path Side (class 2) (class 3)) (line (i) (related 2 3 (line (_) true) i))))
(assume bool-set (isSet Bool))
(def side (-> Side Bool) (from Nat SameSide Bool bool-set even (lam (a b r) r)))
(normal (side (class 7)) false)
(normal (ann (line (i) (side (at two-four i))) (Path Bool true true)) (line (_) true))
(same Bool (side (related 2 4 (line (_) true) 1)) true)
(differ Side (class 2) (class 4))
(reject (def number (-> Side Nat) (lam (t) (elim (_ Nat) t ((class a) a) ((related a b r i) a) ((set x y p q hx hy hp hq i j) hx)))))

; related commutes with transport, set does not
(assume A (-> I (U 0))) (assume R (Pi ((i I)) (-> (A i) (A i) (U 0)))) (assume a (A 0)) (assume b (A 0)) (assume r (R 0 a b))
(def moved (-> I (Quotient (A 1) (R 1))) (lam (k) (transp (i (Quotient (A i) (R i))) bot (ann (related a b r k) (Quotient (A 0) (R 0))))))
(same (-> I (Quotient (A 1) (R 1))) moved (lam (k) (related (transp (i (A i)) bot a) (transp (i (A i)) bot b)
  (transp (i (R i (tfill (i (A i)) bot a i) (tfill (i (A i)) bot b i))) bot r) k)))
