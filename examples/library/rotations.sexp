; Types whose points can be turned around, and with them a family of circles over
; the James construction, whose turning counts 2-spheres.
(load "james.sexp")

; A rotation takes every point around, back to itself.
(def rotation (-> (U 0) (U 0)) (lam (X) (Pi ((x X)) (Path X x x))))

; Going around twice is a square, of which either side may come first.
(def square-over (Pi ((X (U 0)) (r (rotation X)) (x X)) (U 0))
  (lam (X r x) (PathOver (j (Path X (at (r x) j) (at (r x) j))) (r x) (r x))))
(def square-along (Pi ((X (U 0)) (r (rotation X)) (x X)) (square-over X r x))
  (lam (X r x) (line (j t) (at (r (at (r x) j)) t))))
(def square-across (Pi ((X (U 0)) (r (rotation X)) (x X)) (square-over X r x))
  (lam (X r x) (line (j t) (at (r (at (r x) t)) j))))

(def commuting (Pi ((X (U 0)) (r (rotation X))) (U 0))
  (lam (X r) (Pi ((x X)) (Path (square-over X r x) (square-along X r x) (square-across X r x)))))

(def Rotation (U 1) (Sigma ((X (U 0))) (rotation X)))
(def Rotatable (U 2)
  (Sigma ((X (U 0)) (r (rotation X)) (c (commuting X r))) (proposition (commuting X r))))

; On the circle, a groupoid, the two are equal in one way.
(def commuting-proposition (Pi ((X (U 0)) (r (rotation X)) (g (groupoid X)) (x X))
    (proposition (Path (square-over X r x) (square-along X r x) (square-across X r x))))
  (lam (X r g x)
    (proposition-set (square-over X r x)
      (set-line (lam (j) (Path X (at (r x) j) (at (r x) j))) (g x x) (r x) (r x))
      (square-along X r x) (square-across X r x))))

(def around-commutes (commuting Circle around)
  (circle-connected
    (lam (x) (Path (square-over Circle around x) (square-along Circle around x) (square-across Circle around x)))
    (commuting-proposition Circle around circle-groupoid)
    (line (_) (square-along Circle around base))))

(def circle-rotatable Rotatable
  (pair Circle around around-commutes
    (proposition-product Circle
      (lam (x) (Path (square-over Circle around x) (square-along Circle around x) (square-across Circle around x)))
      (commuting-proposition Circle around circle-groupoid))))

; A rotation is a loop of the identity equivalence, and so a square of types.
(def rotation-loop
  (Pi ((X (U 0)) (r (rotation X))) (Path (Equiv X X) (identity-equivalence X) (identity-equivalence X)))
  (lam (X r)
    (equal-equivalences X X (identity-equivalence X) (identity-equivalence X) (line (j) (lam (x) (at (r x) j))))))

(def turned (Pi ((X (U 0)) (r (rotation X))) (Path (Path (U 0) X X) (line (i) X) (line (i) X)))
  (lam (X r) (line (j i)
    (Glue X ((= i 0) X (at (rotation-loop X r) j)) ((or (= i 1) (= j 0) (= j 1)) X (identity-equivalence X))))))

; The rotation over that square: where it is turned, its square is gone around
; the other way.
(def turned-rotation
  (Pi ((X (U 0)) (r (rotation X)) (c (commuting X r)))
    (PathOver (j (PathOver (i (rotation (at (turned X r) j i))) r r)) (line (i) r) (line (i) r)))
  (lam (X r c) (line (j i) (lam (x) (line (t)
    (glue
      (hcomp X (at (r (unglue x)) t)
        ((= i 0) (k) (at (c x) k j t))
        ((or (= i 1) (= j 0) (= j 1)) (k) (at (r x) t))
        ((or (= t 0) (= t 1)) (k) (unglue x)))
      ((or (= i 0) (= i 1) (= j 0) (= j 1)) (at (r x) t))))))))

(def turn-rotatable (Pi ((s Rotatable)) (Path (Path Rotatable s s) (line (i) s) (line (i) s)))
  (lam (s)
    (let ((X (U 0) (fst s)) (r (rotation X) (fst (snd s))) (c (commuting X r) (fst (snd (snd s))))
          (h (proposition (commuting X r)) (snd (snd (snd s))))
          (turned-pair (Path (Path Rotation (pair X r) (pair X r)) (line (i) (pair X r)) (line (i) (pair X r)))
            (line (j i) (pair (at (turned X r) j i) (at (turned-rotation X r c) j i)))))
      (line (j i)
        (pair (at (turned X r) j i) (at (turned-rotation X r c) j i)
          (at (proposition-square Rotation (lam (z) (commuting (fst z) (snd z))) (pair X r) h turned-pair c) j i)
          (at (proposition-square Rotation (lam (z) (proposition (commuting (fst z) (snd z)))) (pair X r)
            (proposition-proposition (commuting X r)) turned-pair h) j i))))))

; Each attached 2-sphere turns the circle once.
(def circles (-> James Rotatable)
  (lam (w) (elim (_ Rotatable) w
    (empty-word circle-rotatable)
    ((attach v s i j) (at (turn-rotatable s) j i)))))

(def James-squares (U 0)
  (Path (Path James empty-word empty-word) (line (i) empty-word) (line (i) empty-word)))

; How often the circles turn over a square of words: the isomorphism from the
; second homotopy group of the James construction to the integers.
(def square-degree (-> James-squares Int)
  (lam (s) (winding (line (j) (transp (i (fst (circles (at s j i)))) bot base)))))
