; HoTT Book, 2.12.5 and 2.13.1: paths in sums of types and in the naturals, by
; encoding and decoding, with both round trips as far as a family into U 0 that
; is made by elimination goes.
(load "types.sexp")

; 2.12.5
(def Code (Pi ((A (U 0)) (B (U 0)) (a0 A)) (-> (Sum A B) (U 0)))
  (lam (A B a0 x) (elim (_ (U 0)) x ((inl a) (Path A a0 a)) ((inr b) Empty))))
(def encode (Pi ((A (U 0)) (B (U 0)) (a0 A) (x (Sum A B))) (-> (Path (Sum A B) (inl a0) x) (Code A B a0 x)))
  (lam (A B a0 x p) (transp (i (Code A B a0 (at p i))) bot (ann (line (_) a0) (Path A a0 a0)))))
(def decode (Pi ((A (U 0)) (B (U 0)) (a0 A) (x (Sum A B))) (-> (Code A B a0 x) (Path (Sum A B) (inl a0) x)))
  (lam (A B a0 x)
    (elim (x (-> (Code A B a0 x) (Path (Sum A B) (inl a0) x))) x
      ((inl a) (lam (c) (line (i) (inl (at c i)))))
      ((inr b) (lam (c) (elim (_ (Path (Sum A B) (inl a0) (inr b))) c))))))
(def decode-encode (Pi ((A (U 0)) (B (U 0)) (a0 A) (x (Sum A B)) (p (Path (Sum A B) (inl a0) x)))
                     (Path (Path (Sum A B) (inl a0) x) (decode A B a0 x (encode A B a0 x p)) p))
  (lam (A B a0 x p)
    (J (Sum A B) (inl a0) (lam (x p) (Path (Path (Sum A B) (inl a0) x) (decode A B a0 x (encode A B a0 x p)) p))
      (line (k i) (inl (at (ann (transp (_ (Path A a0 a0)) (= k 1) (line (_) a0)) (Path A a0 a0)) i))) x p)))
(def encode-decode (Pi ((A (U 0)) (B (U 0)) (a0 A) (x (Sum A B)) (c (Code A B a0 x)))
                     (Path (Code A B a0 x) (encode A B a0 x (decode A B a0 x c)) c))
  (lam (A B a0 x)
    (elim (x (Pi ((c (Code A B a0 x))) (Path (Code A B a0 x) (encode A B a0 x (decode A B a0 x c)) c))) x
      ((inl a) (lam (c) (line (k) (transp (i (Path A a0 (at c (max i k)))) (= k 1) (line (j) (at c (min j k)))))))
      ((inr b) (lam (c) (elim (c (Path Empty (encode A B a0 (inr b) (decode A B a0 (inr b) c)) c)) c))))))
; its three readings
(def inl-injective (Pi ((A (U 0)) (B (U 0)) (a A) (b A)) (-> (Path (Sum A B) (inl a) (inl b)) (Path A a b)))
  (lam (A B a b) (encode A B a (inl b))))
(def inl-is-not-inr (Pi ((A (U 0)) (B (U 0)) (a A) (b B)) (-> (Path (Sum A B) (inl a) (inr b)) Empty))
  (lam (A B a b) (encode A B a (inr b))))

; 2.13.1
(def NatCode (-> Nat Nat (U 0))
  (lam (m) (elim (_ (-> Nat (U 0))) m
    (zero (lam (n) (elim (_ (U 0)) n (zero Unit) ((suc k h) Empty))))
    ((suc m code) (lam (n) (elim (_ (U 0)) n (zero Empty) ((suc k h) (code k))))))))
(def same-code (Pi ((n Nat)) (NatCode n n)) (lam (n) (elim (n (NatCode n n)) n (zero unit) ((suc k h) h))))
(def nat-encode (Pi ((m Nat) (n Nat)) (-> (Path Nat m n) (NatCode m n)))
  (lam (m n p) (transp (i (NatCode m (at p i))) bot (same-code m))))
(def nat-decode (Pi ((m Nat) (n Nat)) (-> (NatCode m n) (Path Nat m n)))
  (lam (m) (elim (m (Pi ((n Nat)) (-> (NatCode m n) (Path Nat m n)))) m
    (zero (lam (n) (elim (n (-> (NatCode 0 n) (Path Nat 0 n))) n
      (zero (lam (_) (line (_) 0))) ((suc k h) (lam (c) (elim (_ (Path Nat 0 (suc k))) c))))))
    ((suc m dec) (lam (n) (elim (n (-> (NatCode (suc m) n) (Path Nat (suc m) n))) n
      (zero (lam (c) (elim (_ (Path Nat (suc m) 0)) c)))
      ((suc k h) (lam (c) (line (i) (suc (at (dec k c) i)))))))))))
(def decode-same (Pi ((n Nat)) (Path (Path Nat n n) (nat-decode n n (same-code n)) (line (_) n)))
  (lam (n) (elim (n (Path (Path Nat n n) (nat-decode n n (same-code n)) (line (_) n))) n
    (zero (line (_ _) 0)) ((suc k h) (line (j i) (suc (at h j i)))))))
(def nat-decode-encode (Pi ((m Nat) (n Nat) (p (Path Nat m n))) (Path (Path Nat m n) (nat-decode m n (nat-encode m n p)) p))
  (lam (m n p)
    (J Nat m (lam (n p) (Path (Path Nat m n) (nat-decode m n (nat-encode m n p)) p))
      (concat (Path Nat m m) (nat-decode m m (nat-encode m m (line (_) m))) (nat-decode m m (same-code m)) (line (_) m)
        (line (k) (nat-decode m m (transp (_ (NatCode m m)) (= k 1) (same-code m)))) (decode-same m)) n p)))
(def nat-encode-decode (Pi ((m Nat) (n Nat) (c (NatCode m n))) (Path (NatCode m n) (nat-encode m n (nat-decode m n c)) c))
  (lam (m) (elim (m (Pi ((n Nat) (c (NatCode m n))) (Path (NatCode m n) (nat-encode m n (nat-decode m n c)) c))) m
    (zero (lam (n) (elim (n (Pi ((c (NatCode 0 n))) (Path (NatCode 0 n) (nat-encode 0 n (nat-decode 0 n c)) c))) n
      (zero (lam (c) (line (_) unit)))
      ((suc k h) (lam (c) (elim (c (Path Empty (nat-encode 0 (suc k) (nat-decode 0 (suc k) c)) c)) c))))))
    ((suc m there) (lam (n) (elim (n (Pi ((c (NatCode (suc m) n))) (Path (NatCode (suc m) n) (nat-encode (suc m) n (nat-decode (suc m) n c)) c))) n
      (zero (lam (c) (elim (c (Path Empty (nat-encode (suc m) 0 (nat-decode (suc m) 0 c)) c)) c)))
      ((suc k h) (lam (c) (there k c)))))))))
; 2.13.2 and 2.13.3
(def zero-is-no-successor (Pi ((n Nat)) (-> (Path Nat (suc n) 0) Empty)) (lam (n) (nat-encode (suc n) 0)))
(def suc-injective (Pi ((m Nat) (n Nat)) (-> (Path Nat (suc m) (suc n)) (Path Nat m n)))
  (lam (m n p) (nat-decode m n (nat-encode (suc m) (suc n) p))))
(normal (nat-encode 3 3 (line (_) 3)) unit)
(same (Path Nat 2 2) (suc-injective 2 2 (line (_) 3)) (line (_) 2))
