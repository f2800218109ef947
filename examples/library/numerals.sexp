; Numerals in unary, binary and base 4, equivalences between them, and addition
; carried along the paths of types that they make. Counts of crates on the quay
; are kept in any of them.
(load "univalence.sexp")

(def plus (-> Nat Nat Nat) (lam (m n) (elim (x Nat) m (zero n) ((suc k h) (suc h)))))
(def doubled (-> Nat Nat) (lam (n) (elim (x Nat) n (zero 0) ((suc k h) (suc (suc h))))))

; Positive binary numerals, the last digit outermost: 1, 2p, 2p+1.
(data Binary () (point one ()) (point double ((p Binary))) (point double-one ((p Binary))))

(def binary-successor (-> Binary Binary)
  (lam (p) (elim (x Binary) p
    (one (double one)) ((double q h) (double-one q)) ((double-one q h) (double h)))))

(def binary-value (-> Binary Nat)
  (lam (p) (elim (x Nat) p
    (one 1) ((double q h) (doubled h)) ((double-one q h) (suc (doubled h))))))

; p+q, and p+q+1 for the carry.
(def binary-sums (-> Binary (* (-> Binary Binary) (-> Binary Binary)))
  (lam (p) (elim (x (* (-> Binary Binary) (-> Binary Binary))) p
    (one (pair binary-successor (lam (q) (binary-successor (binary-successor q)))))
    ((double r h) (pair
      (lam (q) (elim (x Binary) q
        (one (double-one r)) ((double s g) (double ((fst h) s))) ((double-one s g) (double-one ((fst h) s)))))
      (lam (q) (elim (x Binary) q
        (one (double (binary-successor r))) ((double s g) (double-one ((fst h) s))) ((double-one s g) (double ((snd h) s)))))))
    ((double-one r h) (pair
      (lam (q) (elim (x Binary) q
        (one (double (binary-successor r))) ((double s g) (double-one ((fst h) s))) ((double-one s g) (double ((snd h) s)))))
      (lam (q) (elim (x Binary) q
        (one (double-one (binary-successor r))) ((double s g) (double ((snd h) s))) ((double-one s g) (double-one ((snd h) s))))))))))

(def binary-plus (-> Binary Binary Binary) (lam (p q) ((fst (binary-sums p)) q)))

; Binary numerals with zero, and their equivalence with the unary ones.
(data Numeral () (point nought ()) (point positive ((p Binary))))

(def numeral-successor (-> Numeral Numeral)
  (lam (n) (elim (x Numeral) n (nought (positive one)) ((positive p) (positive (binary-successor p))))))
(def numeral-double (-> Numeral Numeral)
  (lam (n) (elim (x Numeral) n (nought nought) ((positive p) (positive (double p))))))
(def numeral-plus (-> Numeral Numeral Numeral)
  (lam (m n) (elim (x Numeral) m (nought n)
    ((positive p) (elim (x Numeral) n (nought (positive p)) ((positive q) (positive (binary-plus p q))))))))
(def numeral-value (-> Numeral Nat)
  (lam (n) (elim (x Nat) n (nought 0) ((positive p) (binary-value p)))))
(def numeral (-> Nat Numeral)
  (lam (n) (elim (x Numeral) n (zero nought) ((suc k h) (numeral-successor h)))))

(def binary-successor-value (Pi ((p Binary)) (Path Nat (binary-value (binary-successor p)) (suc (binary-value p))))
  (lam (p) (elim (x (Path Nat (binary-value (binary-successor x)) (suc (binary-value x)))) p
    (one (line (i) 2))
    ((double q h) (line (i) (suc (doubled (binary-value q)))))
    ((double-one q h) (line (i) (doubled (at h i)))))))

(def numeral-successor-value (Pi ((n Numeral)) (Path Nat (numeral-value (numeral-successor n)) (suc (numeral-value n))))
  (lam (n) (elim (x (Path Nat (numeral-value (numeral-successor x)) (suc (numeral-value x)))) n
    (nought (line (i) 1)) ((positive p) (binary-successor-value p)))))

(def value-of-numeral (Pi ((n Nat)) (Path Nat (numeral-value (numeral n)) n))
  (lam (n) (elim (x (Path Nat (numeral-value (numeral x)) x)) n
    (zero (line (i) 0))
    ((suc k h) (compose Nat (numeral-value (numeral (suc k))) (suc (numeral-value (numeral k))) (suc k)
      (numeral-successor-value (numeral k)) (line (i) (suc (at h i))))))))

(def numeral-two-more (Pi ((n Numeral))
    (Path Numeral (numeral-successor (numeral-successor (numeral-double n))) (numeral-double (numeral-successor n))))
  (lam (n) (elim (x (Path Numeral (numeral-successor (numeral-successor (numeral-double x))) (numeral-double (numeral-successor x)))) n
    (nought (line (i) (positive (double one))))
    ((positive p) (line (i) (positive (double (binary-successor p))))))))

(def numeral-doubled (Pi ((n Nat)) (Path Numeral (numeral (doubled n)) (numeral-double (numeral n))))
  (lam (n) (elim (x (Path Numeral (numeral (doubled x)) (numeral-double (numeral x)))) n
    (zero (line (i) nought))
    ((suc k h) (compose Numeral (numeral (doubled (suc k)))
      (numeral-successor (numeral-successor (numeral-double (numeral k))))
      (numeral-double (numeral (suc k)))
      (line (i) (numeral-successor (numeral-successor (at h i))))
      (numeral-two-more (numeral k)))))))

(def numeral-of-binary (Pi ((p Binary)) (Path Numeral (numeral (binary-value p)) (positive p)))
  (lam (p) (elim (x (Path Numeral (numeral (binary-value x)) (positive x))) p
    (one (line (i) (positive one)))
    ((double q h) (compose Numeral (numeral (doubled (binary-value q)))
      (numeral-double (numeral (binary-value q))) (positive (double q))
      (numeral-doubled (binary-value q)) (line (i) (numeral-double (at h i)))))
    ((double-one q h) (compose Numeral (numeral (suc (doubled (binary-value q))))
      (numeral-successor (numeral-double (numeral (binary-value q)))) (positive (double-one q))
      (line (i) (numeral-successor (at (numeral-doubled (binary-value q)) i)))
      (line (i) (numeral-successor (numeral-double (at h i)))))))))

(def numeral-of-value (Pi ((n Numeral)) (Path Numeral (numeral (numeral-value n)) n))
  (lam (n) (elim (x (Path Numeral (numeral (numeral-value x)) x)) n
    (nought (line (i) nought)) ((positive p) (numeral-of-binary p)))))

(def unary-binary (Equiv Nat Numeral)
  (quasi-inverse Nat Numeral numeral numeral-value numeral-of-value value-of-numeral))

(def unary-is-binary (Path (U 0) Nat Numeral) (ua Nat Numeral unary-binary))

; Addition carried from unary to binary numerals, and back.
(def carried-plus (-> Numeral Numeral Numeral)
  (transp (i (-> (at unary-is-binary i) (at unary-is-binary i) (at unary-is-binary i))) bot plus))

(def carried-numeral-plus (-> Nat Nat Nat)
  (transp (i (-> (at unary-is-binary (rev i)) (at unary-is-binary (rev i)) (at unary-is-binary (rev i)))) bot numeral-plus))

; Addition with a proof that it is commutative, carried together.
(def plus-zero (Pi ((n Nat)) (Path Nat n (plus n 0)))
  (lam (n) (elim (x (Path Nat x (plus x 0))) n (zero (line (i) 0)) ((suc k h) (line (i) (suc (at h i)))))))
(def plus-successor (Pi ((m Nat) (n Nat)) (Path Nat (suc (plus m n)) (plus m (suc n))))
  (lam (m n) (elim (x (Path Nat (suc (plus x n)) (plus x (suc n)))) m
    (zero (line (i) (suc n))) ((suc k h) (line (i) (suc (at h i)))))))
(def plus-commutes (Pi ((m Nat) (n Nat)) (Path Nat (plus m n) (plus n m)))
  (lam (m n) (elim (x (Path Nat (plus x n) (plus n x))) m
    (zero (plus-zero n))
    ((suc k h) (compose Nat (suc (plus k n)) (suc (plus n k)) (plus n (suc k))
      (line (i) (suc (at h i))) (plus-successor n k))))))

(def Commutative (-> (U 0) (U 0))
  (lam (N) (Sigma ((f (-> N N N))) (Pi ((m N) (n N)) (Path N (f m n) (f n m))))))

(def commutative-plus (Commutative Nat) (pair plus plus-commutes))
(def carried-commutative-plus (Commutative Numeral)
  (transp (i (Commutative (at unary-is-binary i))) bot commutative-plus))

; Positive numerals in base 4: a leading digit, then 4p, 4p+1, 4p+2, 4p+3.
(data Quaternary ()
  (point lead1 ()) (point lead2 ()) (point lead3 ())
  (point digit0 ((p Quaternary))) (point digit1 ((p Quaternary)))
  (point digit2 ((p Quaternary))) (point digit3 ((p Quaternary))))

(def binary-of-quaternary (-> Quaternary Binary)
  (lam (q) (elim (x Binary) q
    (lead1 one) (lead2 (double one)) (lead3 (double-one one))
    ((digit0 p h) (double (double h))) ((digit1 p h) (double-one (double h)))
    ((digit2 p h) (double (double-one h))) ((digit3 p h) (double-one (double-one h))))))

; p, 2p and 2p+1 in base 4 at once: two binary digits make one.
(def quaternary-three (-> Binary (* Quaternary Quaternary Quaternary))
  (lam (p) (elim (x (* Quaternary Quaternary Quaternary)) p
    (one (pair lead1 lead2 lead3))
    ((double q h) (pair (fst (snd h)) (digit0 (fst h)) (digit1 (fst h))))
    ((double-one q h) (pair (snd (snd h)) (digit2 (fst h)) (digit3 (fst h)))))))

(def quaternary (-> Binary Quaternary) (lam (p) (fst (quaternary-three p))))

(def quaternary-of-binary (Pi ((q Quaternary)) (Path Quaternary (quaternary (binary-of-quaternary q)) q))
  (lam (q) (elim (x (Path Quaternary (quaternary (binary-of-quaternary x)) x)) q
    (lead1 (line (i) lead1)) (lead2 (line (i) lead2)) (lead3 (line (i) lead3))
    ((digit0 p h) (line (i) (digit0 (at h i)))) ((digit1 p h) (line (i) (digit1 (at h i))))
    ((digit2 p h) (line (i) (digit2 (at h i)))) ((digit3 p h) (line (i) (digit3 (at h i)))))))

; The same for p, 2p and 2p+1 at once.
(def binary-three
  (Pi ((p Binary))
    (* (Path Binary (binary-of-quaternary (fst (quaternary-three p))) p)
       (Path Binary (binary-of-quaternary (fst (snd (quaternary-three p)))) (double p))
       (Path Binary (binary-of-quaternary (snd (snd (quaternary-three p)))) (double-one p))))
  (lam (p) (elim (x (* (Path Binary (binary-of-quaternary (fst (quaternary-three x))) x)
       (Path Binary (binary-of-quaternary (fst (snd (quaternary-three x)))) (double x))
       (Path Binary (binary-of-quaternary (snd (snd (quaternary-three x)))) (double-one x)))) p
    (one (pair (line (i) one) (line (i) (double one)) (line (i) (double-one one))))
    ((double q h) (pair (fst (snd h))
      (line (i) (double (double (at (fst h) i)))) (line (i) (double-one (double (at (fst h) i))))))
    ((double-one q h) (pair (snd (snd h))
      (line (i) (double (double-one (at (fst h) i)))) (line (i) (double-one (double-one (at (fst h) i)))))))))

(def binary-quaternary (Equiv Binary Quaternary)
  (quasi-inverse Binary Quaternary quaternary binary-of-quaternary quaternary-of-binary
    (lam (p) (fst (binary-three p)))))

(def binary-is-quaternary (Path (U 0) Binary Quaternary) (ua Binary Quaternary binary-quaternary))

(def quaternary-plus (-> Quaternary Quaternary Quaternary)
  (transp (i (-> (at binary-is-quaternary i) (at binary-is-quaternary i) (at binary-is-quaternary i))) bot binary-plus))
