; Transport along paths made by univalence (CCHM 2015, sections 6.2 and 7; HoTT
; Book 2.10), with ground results.
(load "booleans.sexp")
(load "integers.sexp")

; Negation, successor, swap; along inverses and composites (Book 2.1).
(normal (transp (i (at negation i)) bot true) false)
(normal (transp (i (at negation i)) bot false) true)
(normal (transp (i (at negation (rev i))) bot true) false)
(normal (transp (i (at turn i)) bot (pos 3)) (pos 4))
(normal (transp (i (at turn i)) bot (negsuc 0)) (pos 0))
(normal (transp (i (at turn (rev i))) bot (pos 0)) (negsuc 0))
(def swap (Pi ((A (U 0)) (B (U 0))) (Equiv (* A B) (* B A)))
  (lam (A B) (quasi-inverse (* A B) (* B A)
    (lam (p) (pair (snd p) (fst p))) (lam (p) (pair (snd p) (fst p)))
    (lam (p) (line (i) p)) (lam (p) (line (i) p)))))
(def swapped (Path (U 0) (* Bool Int) (* Int Bool)) (ua (* Bool Int) (* Int Bool) (swap Bool Int)))
(normal (transp (i (at swapped i)) bot (pair true (pos 3))) (pair (pos 3) true))
(normal (transp (i (at swapped (rev i))) bot (pair (pos 3) true)) (pair true (pos 3)))

(def twice (Path (U 0) Int Int) (compose (U 0) Int Int Int turn turn))
(normal (transp (i (at twice i)) bot (pos 3)) (pos 5))
(normal (transp (i (at twice (rev i))) bot (pos 3)) (pos 1))
(normal (transp (i (at (compose (U 0) Int Int Int twice (compose (U 0) Int Int Int turn twice)) i)) bot (negsuc 1)) (pos 3))
(normal (transp (i (at (compose (U 0) Int Int Int turn (inverse (U 0) Int Int turn)) i)) bot (pos 3)) (pos 3))
(normal (transp (i (at (ua Int Int (compose-equivalences Int Int Int successor-equivalence successor-equivalence)) i)) bot (pos 3)) (pos 5))
(normal (transp (i (at (ua Int Int (inverse-equivalence Int Int successor-equivalence)) i)) bot (pos 3)) (pos 2))
; Applications: a function on types applied to the path.
(normal (transp (i (at (image (U 0) (U 0) (lam (X) (* X X)) Int Int turn) i)) bot (pair (pos 0) (negsuc 4))) (pair (pos 1) (negsuc 3)))
; Connections and reversals of the path.
(normal (transp (i (at turn (min i (rev i)))) bot (pos 3)) (pos 3))
(same (-> I Int) (lam (j) (transp (i (at turn (max i j))) (= j 1) (transp (i (at turn (min i j))) (= j 0) (pos 3)))) (lam (j) (pos 4)))

; Pairs, dependent pairs, functions, dependent functions.
(normal (transp (i (* (at negation i) (at turn i))) bot (pair true (pos 2))) (pair false (pos 3)))
(normal (transp (i (Sigma ((X (U 0))) (at turn i))) bot (pair Bool (pos 2))) (pair Bool (pos 3)))
(def crane (-> Bool (U 0)) (lam (b) (elim (x (U 0)) b (true Int) (false Nat))))
(def crane-turned (Path (-> Bool (U 0)) crane crane)
  (line (i) (lam (b) (elim (x (U 0)) b (true (at turn i)) (false Nat)))))
(normal (transp (i (Sigma ((b Bool)) ((at crane-turned i) b))) bot (ann (pair true (pos 2)) (Sigma ((b Bool)) (crane b)))) (pair true (pos 3)))
(normal (transp (i (Sigma ((b Bool)) ((at crane-turned i) b))) bot (ann (pair false 2) (Sigma ((b Bool)) (crane b)))) (pair false 2))
(normal ((transp (i (-> (at turn i) (at turn i))) bot (lam (z) (add z z))) (pos 5)) (pos 9))
(normal ((transp (i (-> (at negation i) (at turn i))) bot (lam (b) (elim (x Int) b (true (pos 10)) (false (pos 20))))) true) (pos 21))
(normal ((transp (i (-> (at turn i) (at turn i) (at turn i))) bot add) (pos 5) (pos 7)) (pos 11))
(normal ((transp (i (Pi ((b Bool)) ((at crane-turned i) b))) bot
  (ann (lam (b) (elim (x (crane x)) b (true (pos 4)) (false 4))) (Pi ((b Bool)) (crane b)))) true) (pos 5))
(normal ((transp (i (-> I (at turn i))) bot (ann (lam (j) (pos 4)) (-> I Int))) 0) (pos 5))

; Data: sums and lists.
(data List ((A (U 0))) (point nil ()) (point cons ((x A) (xs (List A)))))
(normal (transp (i (Sum (at negation i) (at turn i))) bot (ann (inl true) (Sum Bool Int))) (inl false))
(normal (transp (i (Sum (at negation i) (at turn i))) bot (ann (inr (pos 2)) (Sum Bool Int))) (inr (pos 3)))
(normal (transp (i (List (at turn i))) bot (ann (cons (pos 1) (cons (negsuc 0) nil)) (List Int)))
  (cons (pos 2) (cons (pos 0) nil)))
(normal (transp (i (List (List (at turn i)))) bot (ann (cons (cons (pos 1) nil) nil) (List (List Int))))
  (cons (cons (pos 2) nil) nil))

; Paths, between the ends that move along.
(normal (transp (i (Path (at negation i) (tfill (j (at negation j)) bot true i) (tfill (j (at negation j)) bot true i)))
    bot (line (k) true))
  (line (k) false))
(def counted (-> I Int) (lam (k) (pos 3)))
(normal (transp (i (Path (at turn i) (tfill (j (at turn j)) bot (pos 3) i) (tfill (j (at turn j)) bot (pos 3) i)))
    bot (line (k) (counted k)))
  (line (k) (pos 4)))
(normal (transp (i (at (transp (i (Path (U 0) Int (at turn i))) bot turn) i)) bot (pos 0)) (pos 2))

; Composites of elements in the types of the line.
(normal (transp (i (at turn i)) bot (hcomp Int (pos 3))) (pos 4))
(normal (comp (i (at turn i)) (pos 3)) (pos 4))
(same (-> I Int) (lam (j) (comp (i (at turn i)) (pos 3) ((= j 0) (i) (tfill (i (at turn i)) bot (pos 3) i)))) (lam (j) (pos 4)))
(normal (comp (i (* (at turn i) (at negation i))) (pair (pos 3) true)) (pair (pos 4) false))

; Negation is of order two (2-torsion): the square of types, at its sides and inside.
(same (-> I (U 0)) (lam (i) (at (at negation-torsion 0) i)) (lam (i) (at (compose (U 0) Bool Bool Bool negation negation) i)))
(same (-> I (U 0)) (lam (i) (at (at negation-torsion 1) i)) (lam (i) Bool))
(same (-> I (U 0)) (lam (j) (at (at negation-torsion j) 0)) (lam (j) Bool))
(same (-> I (U 0)) (lam (j) (at (at negation-torsion j) 1)) (lam (j) Bool))
(normal (transp (i (at (at negation-torsion 0) i)) bot true) true)
(normal (transp (i (at (at negation-torsion i) i)) bot true) true)
(normal (transp (i (at (at negation-torsion (rev i)) i)) bot false) false)
(differ (-> I (U 0)) (lam (i) (at negation i)) (lam (i) Bool))
(reject (same (Path (U 0) Bool Bool) negation (line (i) Bool)))
