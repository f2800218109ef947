; Counting crates: arithmetic on natural numbers, and laws of it as paths.
(def put (-> Nat Nat Nat)
  (lam (m n) (elim (x Nat) m (zero n) ((suc k h) (suc h)))))
(def stack (-> Nat Nat Nat)
  (lam (m n) (elim (x Nat) m (zero 0) ((suc k h) (put n h)))))

; Large counts cost their digits, not their size.
(same Nat (put 999999999 1) 1000000000)
(normal (stack 1000 1000) 1000000)

; A crane that lifts one crate at a time leaves what is below.
(def lift (-> Nat Nat) (lam (n) (elim (x Nat) n (zero 0) ((suc k h) k))))
(normal (lift 1000000) 999999)
(same (-> Nat Nat) (lam (n) (lift (suc n))) (lam (n) n))

; Putting crates down in another order gives the same count.
(def put-suc (Pi ((m Nat) (n Nat)) (Path Nat (put m (suc n)) (suc (put m n))))
  (lam (m n) (elim (x (Path Nat (put x (suc n)) (suc (put x n)))) m
    (zero (line (i) (suc n)))
    ((suc k h) (line (i) (suc (at h i)))))))
(def put-none (Pi ((n Nat)) (Path Nat (put n 0) n))
  (lam (n) (elim (x (Path Nat (put x 0) x)) n
    (zero (line (i) 0))
    ((suc k h) (line (i) (suc (at h i)))))))
(def either-order (Pi ((m Nat) (n Nat)) (Path Nat (put m n) (put n m)))
  (lam (m n) (elim (x (Path Nat (put x n) (put n x))) m
    (zero (line (i) (at (put-none n) (rev i))))
    ((suc k h) (line (i)
      (hcomp Nat (suc (at h i))
        ((= i 0) (j) (suc (put k n)))
        ((= i 1) (j) (at (put-suc n k) (rev j)))))))))
(show (either-order 2 3))
(same (Path Nat 5 5) (either-order 2 3) (line (i) 5))

; It is a path, and no equality by definition, for counts that are not known.
(assume m Nat) (assume n Nat)
(differ Nat (put m n) (put n m))
(blocked (put m n))
