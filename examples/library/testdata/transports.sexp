; Degrees as in degrees.sexp, the words being carried by transport over the paths
; of the lift itself, not by the equivalences that it amounts to. There is no
; regularity: each bridge leaves composites without walls, which make these
; degrees costly.
(load "brunerie.sexp")

(def moved (Pi ((x Circle) (y Circle) (z Circle)) James)
  (lam (x y z) (word-transport (left x) (left z) (bridges x y z) empty-word)))
(def moved-twice (Pi ((x Circle) (y Circle) (z Circle) (t Circle) (u Circle)) James)
  (lam (x y z t u) (word-transport (left x) (left u)
    (compose Circle-join (left x) (left z) (left u) (bridges x y z) (bridges z t u)) empty-word)))
(same James (moved base base base)
  (hcomp James (hcomp James (hcomp James (hcomp James (hcomp James (hcomp James empty-word)))))))
(same (-> Circle Circle James) (lam (a b) (moved-twice (opposite a) (angle a b) (angle a b) b b))
  (lam (a b) (transp (k (words (whitehead-lift (bridge a b k)))) bot empty-word)))

; The circles over such composites are glued along nothing, once for each; with
; base in them, and their points in the circle.
(def Pointed (U 1) (Sigma ((X (U 0))) (* X (-> X Circle))))
(def glued (-> Nat Pointed)
  (lam (n) (elim (_ Pointed) n
    (zero (pair Circle base (lam (x) x)))
    ((suc m h) (pair (Glue (fst h)) (glue (fst (snd h))) (lam (x) ((snd (snd h)) (unglue x))))))))

; Composites of base without walls, and their paths to base.
(def settled (-> Nat (Sigma ((w Circle)) (Path Circle w base)))
  (lam (n) (elim (_ (Sigma ((w Circle)) (Path Circle w base))) n
    (zero (pair base (line (_) base)))
    ((suc m h) (pair (hcomp Circle (fst h)) (line (k) (hcomp Circle (at (snd h) k) ((= k 1) (l) base))))))))
(def settled-degree (Pi ((n Nat) (p (Path Circle (fst (settled n)) (fst (settled n))))) Int)
  (lam (n p) (winding (line (j) (hcomp Circle (at p j) ((or (= j 0) (= j 1)) (k) (at (snd (settled n)) k)))))))

(def squares-at (-> James (U 0)) (lam (w) (Path (Path James w w) (line (_) w) (line (_) w))))
(def degree-once (-> (squares-at (moved base base base)) Int)
  (lam (g) (settled-degree 12
    (line (j) ((snd (snd (glued 6))) (transp (i (fst (circles (at g j i)))) bot (fst (snd (glued 6)))))))))
(def degree-twice (-> (squares-at (moved-twice base base base base base)) Int)
  (lam (g) (settled-degree 28
    (line (j) ((snd (snd (glued 14))) (transp (i (fst (circles (at g j i)))) bot (fst (snd (glued 14)))))))))

(normal (degree-once (line (_ _) (moved base base base))) (pos 0))
(normal (degree-once (line (j i) (moved (loop i) (loop j) base))) (pos 1))
(normal (degree-twice (line (j i) (moved-twice (loop i) (loop j) base base base))) (pos 1))

; For the long test: back over a bridge, the product with an inverse, the
; product itself.
(def back-square (squares-at (moved base base base)) (line (j i) (moved base (loop j) (loop i))))
(def inverse-square (squares-at (moved base base base))
  (line (j i)
    (let ((a Circle (loop i)) (b Circle (loop j)))
      (hcomp James (moved a (rotate a b) b)
        ((or (= i 0) (= i 1)) (k) (moved base b (loop (min j (rev k)))))
        ((or (= j 0) (= j 1)) (k) (moved (loop (min i (rev k))) a base))))))
(def product-square (squares-at (moved-twice base base base base base))
  (line (j i)
    (let ((c Circle (angle (loop i) (loop j))))
      (hcomp James (moved-twice (opposite (loop i)) c c (loop j) (loop j))
        ((or (= i 0) (= i 1)) (k)
          (let ((b Circle (loop j)) (z Circle (loop (min j (rev k))))) (moved-twice base z b z b)))
        ((or (= j 0) (= j 1)) (k)
          (let ((a Circle (loop (rev i))) (z Circle (loop (rev (min i (rev k)))))) (moved-twice a z a base base)))))))
