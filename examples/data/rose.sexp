; Rose trees. The children are a function from a finite type, which recursion on
; their number makes: the data type stands under a function, where it is positive.
(def Fin (-> Nat (U 0)) (lam (n) (elim (_ (U 0)) n (zero Empty) ((suc k h) (Sum Unit h)))))
(data Rose ((A (U 0))) (point rose ((a A) (n Nat) (children (-> (Fin n) (Rose A))))))

; the functions from a finite type, by cases
(def none (Pi ((X (U 0))) (-> (Fin 0) X)) (lam (X e) (elim (_ X) e)))
(def more (Pi ((X (U 0)) (n Nat)) (-> X (-> (Fin n) X) (Fin (suc n)) X))
  (lam (X n x f k) (elim (_ X) k ((inl u) x) ((inr k) (f k)))))
(def sum (Pi ((n Nat)) (-> (-> (Fin n) Nat) Nat))
  (lam (n) (elim (n (-> (-> (Fin n) Nat) Nat)) n
    (zero (lam (f) 0))
    ((suc k h) (lam (f) (elim (_ Nat) (f (inl unit)) (zero (h (lam (i) (f (inr i))))) ((suc _ s) (suc s))))))))
(normal (sum 3 (more Nat 2 4 (more Nat 1 5 (more Nat 0 6 (none Nat))))) 15)

; drums that hang below drums on the crane, with the turns on each
(def drum (-> Nat (Rose Nat)) (lam (k) (rose k 0 (none (Rose Nat)))))
(def crane (Rose Nat) (rose 1 2 (more (Rose Nat) 1 (drum 10) (more (Rose Nat) 0 (rose 20 1 (more (Rose Nat) 0 (drum 30) (none (Rose Nat)))) (none (Rose Nat))))))
(def turns (-> (Rose Nat) Nat)
  (lam (t) (elim (_ Nat) t ((rose a n c h) (elim (_ Nat) a (zero (sum n h)) ((suc _ s) (suc s)))))))
(normal (turns crane) 61)
(def count (Pi ((A (U 0))) (-> (Rose A) Nat)) (lam (A t) (elim (_ Nat) t ((rose a n c h) (suc (sum n h))))))
(normal (count Nat crane) 4)

; the type of the children mentions their number, so they are composed over the
; filler of that: by comp, also where the number does not vary
(assume A (U 0)) (assume a A) (assume c (-> I (Fin 2) (Rose A)))
(def composed (-> I (Rose A)) (lam (k) (hcomp (Rose A) (rose a 2 (c 0)) ((= k 0) (i) (rose a 2 (c i))))))
(normal composed (lam (k) (rose (hcomp A a ((= k 0) (i) a)) 2
  (lam (x) (hcomp (Rose A) (transp (i (Rose A)) bot (c 0 (transp (i (Sum Unit (Sum Unit Empty))) bot x)))
                           ((= k 0) (j) (transp (i (Rose A)) (= j 1) (c j (transp (i (Sum Unit (Sum Unit Empty))) (= j 1) x)))))))))
(same (Rose A) (composed 0) (rose a 2 (c 1)))
(reject (data Both ((A (U 0))) (point both ((a A) (children (-> (Both A) Nat))))))
(reject (data Loose ((A (U 0))) (point loose ((a A) (children (-> (-> (Loose A) A) (Loose A)))))))
