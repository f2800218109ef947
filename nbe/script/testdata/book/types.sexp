; HoTT Book, sections 2.6 to 2.11: paths in pairs, in functions, in paths. The
; numbers are the Book's; equivalences are maps with contractible fibres (4.4.1).
(load "transport.sexp")

; 2.6.2
(def split (Pi ((A (U 0)) (B (U 0)) (x (* A B)) (y (* A B)) (r (Path (* A B) x y))) (* (Path A (fst x) (fst y)) (Path B (snd x) (snd y))))
  (lam (A B x y r) (pair (line (i) (fst (at r i))) (line (i) (snd (at r i))))))
(def join (Pi ((A (U 0)) (B (U 0)) (x (* A B)) (y (* A B)) (r (* (Path A (fst x) (fst y)) (Path B (snd x) (snd y))))) (Path (* A B) x y))
  (lam (A B x y r) (line (i) (pair (at (fst r) i) (at (snd r) i)))))
(def paths-in-products (Pi ((A (U 0)) (B (U 0)) (x (* A B)) (y (* A B)))
                         (Equiv (Path (* A B) x y) (* (Path A (fst x) (fst y)) (Path B (snd x) (snd y)))))
  (lam (A B x y) (pair (split A B x y) (lam (r)
    (pair (pair (join A B x y r) (line (_) r))
      (lam (z) (line (k) (pair (join A B x y (at (snd z) k)) (line (l) (at (snd z) (min k l)))))))))))

; 2.6.4, transport in a product is by parts
(same (Pi ((Z (U 0)) (A (-> Z (U 0))) (B (-> Z (U 0))) (z Z) (w Z) (p (Path Z z w)) (x (* (A z) (B z)))) (* (A w) (B w)))
  (lam (Z A B z w p x) (transport Z (lam (z) (* (A z) (B z))) z w p x))
  (lam (Z A B z w p x) (pair (transport Z A z w p (fst x)) (transport Z B z w p (snd x)))))

; a path over p and a path from the transported end are the same thing
(def over-to-transported (Pi ((A (U 0)) (P (-> A (U 0))) (x A) (y A) (p (Path A x y)) (u (P x)) (v (P y)))
                           (-> (PathOver (i (P (at p i))) u v) (Path (P y) (transport A P x y p u) v)))
  (lam (A P x y p u v q) (line (j) (transp (i (P (at p (max i j)))) (= j 1) (at q j)))))
(def transported-to-over (Pi ((A (U 0)) (P (-> A (U 0))) (x A) (y A) (p (Path A x y)) (u (P x)) (v (P y)))
                           (-> (Path (P y) (transport A P x y p u) v) (PathOver (i (P (at p i))) u v)))
  (lam (A P x y p u v q) (line (j) (hcomp (P (at p j)) (tfill (i (P (at p i))) bot u j) ((= j 0) (_) u) ((= j 1) (k) (at q k))))))

; 2.7.2, with paths over the first path, and to and from the Book's form
(def paths-in-sums (Pi ((A (U 0)) (P (-> A (U 0))) (x (Sigma ((a A)) (P a))) (y (Sigma ((a A)) (P a))))
                     (Equiv (Path (Sigma ((a A)) (P a)) x y) (Sigma ((p (Path A (fst x) (fst y)))) (PathOver (i (P (at p i))) (snd x) (snd y)))))
  (lam (A P x y) (pair (lam (r) (pair (line (i) (fst (at r i))) (line (i) (snd (at r i))))) (lam (r)
    (pair (pair (line (i) (pair (at (fst r) i) (at (snd r) i))) (line (_) r))
      (lam (z) (line (k) (pair (line (i) (pair (at (fst (at (snd z) k)) i) (at (snd (at (snd z) k)) i))) (line (l) (at (snd z) (min k l)))))))))))
(def from-pair-of-paths (Pi ((A (U 0)) (P (-> A (U 0))) (x (Sigma ((a A)) (P a))) (y (Sigma ((a A)) (P a)))
                             (r (Sigma ((p (Path A (fst x) (fst y)))) (Path (P (fst y)) (transport A P (fst x) (fst y) p (snd x)) (snd y)))))
                          (Path (Sigma ((a A)) (P a)) x y))
  (lam (A P x y r) (line (i) (pair (at (fst r) i) (at (transported-to-over A P (fst x) (fst y) (fst r) (snd x) (snd y) (snd r)) i)))))
(def to-pair-of-paths (Pi ((A (U 0)) (P (-> A (U 0))) (x (Sigma ((a A)) (P a))) (y (Sigma ((a A)) (P a))) (r (Path (Sigma ((a A)) (P a)) x y)))
                        (Sigma ((p (Path A (fst x) (fst y)))) (Path (P (fst y)) (transport A P (fst x) (fst y) p (snd x)) (snd y))))
  (lam (A P x y r) (pair (line (i) (fst (at r i)))
    (over-to-transported A P (fst x) (fst y) (line (i) (fst (at r i))) (snd x) (snd y) (line (i) (snd (at r i)))))))

; 2.8.1
(def paths-in-unit (Pi ((x Unit) (y Unit)) (Equiv (Path Unit x y) Unit))
  (lam (x y) (pair (lam (_) unit) (lam (u) (pair (pair (line (_) unit) (line (_) u)) (lam (z) (line (k) (pair (line (_) unit) (line (l) (at (snd z) (min k l)))))))))))

; 2.9.2 and 2.9.3, function extensionality: happly is an equivalence
(def happly (Pi ((A (U 0)) (B (-> A (U 0))) (f (Pi ((x A)) (B x))) (g (Pi ((x A)) (B x))) (p (Path (Pi ((x A)) (B x)) f g)) (x A)) (Path (B x) (f x) (g x)))
  (lam (A B f g p x) (line (i) ((at p i) x))))
(def funext (Pi ((A (U 0)) (B (-> A (U 0))) (f (Pi ((x A)) (B x))) (g (Pi ((x A)) (B x))) (h (Pi ((x A)) (Path (B x) (f x) (g x))))) (Path (Pi ((x A)) (B x)) f g))
  (lam (A B f g h) (line (i) (lam (x) (at (h x) i)))))
(def function-extensionality (Pi ((A (U 0)) (B (-> A (U 0))) (f (Pi ((x A)) (B x))) (g (Pi ((x A)) (B x))))
                               (Equiv (Path (Pi ((x A)) (B x)) f g) (Pi ((x A)) (Path (B x) (f x) (g x)))))
  (lam (A B f g) (pair (happly A B f g) (lam (h)
    (pair (pair (funext A B f g h) (line (_) h))
      (lam (z) (line (k) (pair (funext A B f g (at (snd z) k)) (line (l) (at (snd z) (min k l)))))))))))
(same (Pi ((A (U 0)) (B (-> A (U 0))) (f (Pi ((x A)) (B x))) (g (Pi ((x A)) (B x))) (p (Path (Pi ((x A)) (B x)) f g))) (Path (Pi ((x A)) (B x)) f g))
  (lam (A B f g p) (funext A B f g (happly A B f g p))) (lam (A B f g p) p))

; 2.9.4, transport of functions
(def transport-functions (Pi ((X (U 0)) (A (-> X (U 0))) (B (-> X (U 0))) (x X) (y X) (p (Path X x y)) (f (-> (A x) (B x))))
                           (Path (-> (A y) (B y)) (transport X (lam (x) (-> (A x) (B x))) x y p f)
                             (lam (a) (transport X B x y p (f (transport X A y x (inv X x y p) a))))))
  (lam (X A B x y p f) (line (_) (lam (a) (transport X B x y p (f (transport X A y x (inv X x y p) a)))))))

; 2.11.1 is not needed here; 2.11.2, by path induction
(def still (Pi ((A (U 0)) (a A)) (Path A (transp (_ A) bot a) a)) (lam (A a) (line (j) (transp (_ A) (= j 1) a))))
(def transport-end (Pi ((A (U 0)) (a A) (x A) (q (Path A a x)) (y A) (p (Path A x y)))
                     (Path (Path A a y) (transp (i (Path A a (at p i))) bot q) (concat A a x y q p)))
  (lam (A a x q y p)
    (J A x (lam (y p) (Path (Path A a y) (transp (i (Path A a (at p i))) bot q) (concat A a x y q p)))
      (concat (Path A a x) (transp (_ (Path A a x)) bot q) q (concat A a x x q (line (_) x)) (still (Path A a x) q) (right-unit A a x q)) y p)))
(def transport-start (Pi ((A (U 0)) (a A) (x A) (q (Path A x a)) (y A) (p (Path A x y)))
                       (Path (Path A y a) (transp (i (Path A (at p i) a)) bot q) (concat A y x a (inv A x y p) q)))
  (lam (A a x q y p)
    (J A x (lam (y p) (Path (Path A y a) (transp (i (Path A (at p i) a)) bot q) (concat A y x a (inv A x y p) q)))
      (concat (Path A x a) (transp (_ (Path A x a)) bot q) q (concat A x x a (line (_) x) q) (still (Path A x a) q) (left-unit A x a q)) y p)))
(def transport-loop (Pi ((A (U 0)) (x A) (q (Path A x x)) (y A) (p (Path A x y)))
                      (Path (Path A y y) (transp (i (Path A (at p i) (at p i))) bot q)
                        (concat A y x y (inv A x y p) (concat A x x y q p))))
  (lam (A x q y p)
    (J A x (lam (y p) (Path (Path A y y) (transp (i (Path A (at p i) (at p i))) bot q) (concat A y x y (inv A x y p) (concat A x x y q p))))
      (concat (Path A x x) (transp (_ (Path A x x)) bot q) q (concat A x x x (line (_) x) (concat A x x x q (line (_) x))) (still (Path A x x) q)
        (concat (Path A x x) q (concat A x x x q (line (_) x)) (concat A x x x (line (_) x) (concat A x x x q (line (_) x)))
          (right-unit A x x q) (left-unit A x x (concat A x x x q (line (_) x))))) y p)))
