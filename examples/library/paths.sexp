; Paths: inverses, composites, images under functions, transport, and paths over
; a line of types (HoTT Book 2.1 to 2.3; CCHM 2015, section 3). Statements are at
; (U 2); by cumulativity they serve all smaller universes too.

(def inverse (Pi ((A (U 2)) (a A) (b A) (p (Path A a b))) (Path A b a))
  (lam (A a b p) (line (i) (at p (rev i)))))

; p, then q. At 0 the composite stands still, at 1 it follows q.
(def compose (Pi ((A (U 2)) (a A) (b A) (c A) (p (Path A a b)) (q (Path A b c))) (Path A a c))
  (lam (A a b c p q)
    (line (i) (hcomp A (at p i) ((= i 0) (j) a) ((= i 1) (j) (at q j))))))

; The square that fills the composite: p at k = 0, the composite at k = 1.
(def compose-square
  (Pi ((A (U 2)) (a A) (b A) (c A) (p (Path A a b)) (q (Path A b c)))
    (PathOver (k (Path A a (at q k))) p (compose A a b c p q)))
  (lam (A a b c p q)
    (line (k i) (hfill A (at p i) k ((= i 0) (j) a) ((= i 1) (j) (at q j))))))

; The image of a path under a function.
(def image (Pi ((A (U 2)) (B (U 2)) (f (-> A B)) (a A) (b A) (p (Path A a b))) (Path B (f a) (f b)))
  (lam (A B f a b p) (line (i) (f (at p i)))))

; Functions that agree everywhere are equal (Book 2.9, here a theorem).
(def pointwise
  (Pi ((A (U 2)) (B (-> A (U 2))) (f (Pi ((x A)) (B x))) (g (Pi ((x A)) (B x)))
      (h (Pi ((x A)) (Path (B x) (f x) (g x)))))
    (Path (Pi ((x A)) (B x)) f g))
  (lam (A B f g h) (line (i) (lam (x) (at (h x) i)))))

(def transport (Pi ((A (U 2)) (B (-> A (U 2))) (a A) (b A) (p (Path A a b))) (-> (B a) (B b)))
  (lam (A B a b p x) (transp (i (B (at p i))) bot x)))

; Path induction (Book 1.12.1).
(def path-induction
  (Pi ((A (U 2)) (a A) (C (Pi ((x A)) (-> (Path A a x) (U 2)))) (c (C a (line (i) a)))
      (x A) (p (Path A a x)))
    (C x p))
  (lam (A a C c x p) (transp (i (C (at p i) (line (j) (at p (min i j))))) bot c)))

; Its computation rule holds up to a path.
(def path-induction-constant
  (Pi ((A (U 2)) (a A) (C (Pi ((x A)) (-> (Path A a x) (U 2)))) (c (C a (line (i) a))))
    (Path (C a (line (i) a)) (path-induction A a C c a (line (i) a)) c))
  (lam (A a C c) (line (k) (transp (i (C a (line (j) a))) (= k 1) c))))

; A path over a line of types is a path from what is transported (Book 2.3; CCHM 4.5).
(def path-over
  (Pi ((L (-> I (U 2))) (a (L 0)) (b (L 1))
      (p (Path (L 1) (transp (i (L i)) bot a) b)))
    (PathOver (i (L i)) a b))
  (lam (L a b p)
    (line (i) (hcomp (L i) (tfill (i (L i)) bot a i) ((= i 0) (j) a) ((= i 1) (j) (at p j))))))

; And back.
(def path-from
  (Pi ((L (-> I (U 2))) (a (L 0)) (b (L 1)) (p (PathOver (i (L i)) a b)))
    (Path (L 1) (transp (i (L i)) bot a) b))
  (lam (L a b p)
    (line (k) (transp (i (L (max i k))) (= k 1) (at p k)))))

; Transport along a composite is the composite of the transports (Book 2.3.9).
(def transport-composite
  (Pi ((A (U 2)) (B (-> A (U 2))) (a A) (b A) (c A) (p (Path A a b)) (q (Path A b c)) (x (B a)))
    (Path (B c) (transport A B b c q (transport A B a b p x))
      (transport A B a c (compose A a b c p q) x)))
  (lam (A B a b c p q x)
    (path-from (lam (k) (B (at q k)))
      (transport A B a b p x) (transport A B a c (compose A a b c p q) x)
      (line (k) (transp (i (B (at (at (compose-square A a b c p q) k) i))) bot x)))))

; Transport where nothing varies is the identity up to a path; there is no regularity.
(def transport-constant (Pi ((A (U 2)) (x A)) (Path A (transp (i A) bot x) x))
  (lam (A x) (line (k) (transp (i A) (= k 1) x))))
