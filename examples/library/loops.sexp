; Loop spaces of the circle (HoTT Book 2.1.8, 7.1, 8.1): its loops are a set,
; carried from the integers along the path that the winding number makes; the
; circle is a groupoid; its second loop space is a proposition.
(load "decidable.sexp")
(load "circle.sexp")

(def loops-set (set Loops)
  (transp (i (set (at (ua Int Loops (inverse-equivalence Loops Int loops-integers)) i))) bot int-set))

; A family of propositions over the circle is inhabited where base is.
(def circle-connected
  (Pi ((B (-> Circle (U 2))) (h (Pi ((x Circle)) (proposition (B x)))) (b (B base)) (x Circle)) (B x))
  (lam (B h b x) (elim (y (B y)) x
    (base b)
    ((loop i) (at (proposition-over Circle B h base base turn-once b b) i)))))

(def circle-groupoid (groupoid Circle)
  (circle-connected (lam (x) (Pi ((y Circle)) (set (Path Circle x y))))
    (lam (x) (proposition-product Circle (lam (y) (set (Path Circle x y)))
      (lam (y) (proposition-of-set (Path Circle x y)))))
    (circle-connected (lam (y) (set (Path Circle base y)))
      (lam (y) (proposition-of-set (Path Circle base y)))
      loops-set)))

(def second-loops-proposition (proposition (second-loop-space Circle base))
  (loops-set rest rest))
