; Propositions, sets and groupoids (HoTT Book 3.1, 3.3, 7.1), and what is a
; proposition: contractibility, being an equivalence.
(load "equivalences.sexp")

(def proposition (-> (U 2) (U 2)) (lam (A) (Pi ((a A) (b A)) (Path A a b))))
(def set (-> (U 2) (U 2)) (lam (A) (Pi ((a A) (b A)) (proposition (Path A a b)))))
(def groupoid (-> (U 2) (U 2)) (lam (A) (Pi ((a A) (b A)) (set (Path A a b)))))

(def contractible-proposition (Pi ((A (U 2)) (c (contractible A))) (proposition A))
  (lam (A c a b)
    (line (i) (hcomp A (fst c) ((= i 0) (k) (at ((snd c) a) k)) ((= i 1) (k) (at ((snd c) b) k))))))

; A proposition is a set (Book 3.3.4).
(def proposition-set (Pi ((A (U 2)) (h (proposition A))) (set A))
  (lam (A h a b p q)
    (line (i j)
      (hcomp A a
        ((= i 0) (k) (at (h a (at p j)) k))
        ((= i 1) (k) (at (h a (at q j)) k))
        ((= j 0) (k) (at (h a a) k))
        ((= j 1) (k) (at (h a b) k))))))

(def set-groupoid (Pi ((A (U 2)) (h (set A))) (groupoid A))
  (lam (A h a b) (proposition-set (Path A a b) (h a b))))

; Over a line of types that ends in a proposition any two ends are joined.
(def proposition-line
  (Pi ((L (-> I (U 2))) (h (proposition (L 1))) (a (L 0)) (b (L 1))) (PathOver (i (L i)) a b))
  (lam (L h a b) (path-over L a b (h (transp (i (L i)) bot a) b))))

(def proposition-over
  (Pi ((A (U 2)) (B (-> A (U 2))) (h (Pi ((x A)) (proposition (B x))))
      (a A) (b A) (p (Path A a b)) (u (B a)) (v (B b)))
    (PathOver (i (B (at p i))) u v))
  (lam (A B h a b p u v)
    (proposition-line (lam (i) (B (at p i))) (h b) u v)))

(def proposition-contractible (Pi ((A (U 2))) (proposition (contractible A)))
  (lam (A c d)
    (line (i)
      (pair (at ((snd c) (fst d)) i)
        (lam (y)
          (line (j)
            (hcomp A (fst c)
              ((= i 0) (k) (at ((snd c) (at ((snd c) y) j)) k))
              ((= i 1) (k) (at ((snd c) (at ((snd d) y) j)) k))
              ((= j 0) (k) (at ((snd c) (at ((snd c) (fst d)) i)) k))
              ((= j 1) (k) (at ((snd c) y) k)))))))))

(def proposition-product
  (Pi ((A (U 2)) (B (-> A (U 2))) (h (Pi ((x A)) (proposition (B x))))) (proposition (Pi ((x A)) (B x))))
  (lam (A B h f g) (line (i) (lam (x) (at (h x (f x) (g x)) i)))))

(def proposition-is-equivalence (Pi ((A (U 2)) (B (U 2)) (f (-> A B))) (proposition (is-equivalence A B f)))
  (lam (A B f)
    (proposition-product B (lam (y) (contractible (fiber A B f y)))
      (lam (y) (proposition-contractible (fiber A B f y))))))

; Equivalences with equal maps are equal.
(def equal-equivalences
  (Pi ((A (U 2)) (B (U 2)) (e (Equiv A B)) (d (Equiv A B)) (p (Path (-> A B) (fst e) (fst d))))
    (Path (Equiv A B) e d))
  (lam (A B e d p)
    (line (i)
      (pair (at p i)
        (at (proposition-over (-> A B) (is-equivalence A B) (proposition-is-equivalence A B)
              (fst e) (fst d) p (snd e) (snd d)) i)))))

; Being a proposition and being a set are propositions (Book 3.3.5).
(def proposition-proposition (Pi ((A (U 2))) (proposition (proposition A)))
  (lam (A h g) (line (i) (lam (a b) (at (proposition-set A h a b (h a b) (g a b)) i)))))

(def proposition-of-set (Pi ((A (U 2))) (proposition (set A)))
  (lam (A h g)
    (line (i) (lam (a b p q) (at (set-groupoid A h a b p q (h a b p q) (g a b p q)) i)))))

; Products of sets are sets (Book 7.1.9).
(def set-product
  (Pi ((A (U 2)) (B (-> A (U 2))) (h (Pi ((x A)) (set (B x))))) (set (Pi ((x A)) (B x))))
  (lam (A B h f g p q)
    (line (i j) (lam (x)
      (at (at (h x (f x) (g x) (line (k) ((at p k) x)) (line (k) ((at q k) x))) i) j)))))

; Over a line of sets two paths with the same ends are equal.
(def set-line
  (Pi ((L (-> I (U 2))) (h (set (L 1))) (a (L 0)) (b (L 1))) (proposition (PathOver (i (L i)) a b)))
  (lam (L h a b u v)
    (line (k i)
      (comp (j (L (max i (rev j))))
        (at (h (transp (i (L i)) bot a) b
          (line (i) (transp (m (L (max i m))) (= i 1) (at u i)))
          (line (i) (transp (m (L (max i m))) (= i 1) (at v i)))) k i)
        ((= k 0) (j) (transp (m (L (max i (min m (rev j))))) (or (= i 1) (= j 1)) (at u i)))
        ((= k 1) (j) (transp (m (L (max i (min m (rev j))))) (or (= i 1) (= j 1)) (at v i)))
        ((= i 0) (j) (transp (m (L (min m (rev j)))) (= j 1) a))
        ((= i 1) (j) b)))))

; A square of propositions over a square that stands still on its sides.
(def proposition-square
  (Pi ((A (U 2)) (B (-> A (U 2))) (a A) (h (proposition (B a)))
      (p (Path (Path A a a) (line (i) a) (line (i) a))) (b (B a)))
    (PathOver (j (PathOver (i (B (at p j i))) b b)) (line (i) b) (line (i) b)))
  (lam (A B a h p b)
    (proposition-line (lam (j) (PathOver (i (B (at p j i))) b b))
      (proposition-set (B a) h b b) (line (i) b) (line (i) b))))
