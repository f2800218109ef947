; The degrees of maps of the join of two circles (the 3-sphere), up to the
; Whitehead product of the identity of the 2-sphere with itself.
(load "brunerie.sexp")

; The identity of S1*S1 has degree 1, and a square walked the other way -1.
(def identity-square James-squares (line (j i) (shift-forth (loop i) (loop j) empty-word)))
(normal (square-degree (line (j i) empty-word)) (pos 0))
(normal (square-degree identity-square) (pos 1))
(normal (square-degree (line (j i) (shift-forth (loop j) (loop i) empty-word))) (negsuc 0))
(normal (square-degree (line (j i) (shift-forth (loop (rev i)) (loop (rev j)) empty-word))) (pos 1))
; Words of several letters: the degrees of the letters add up, a shift back undoes one.
(normal (square-degree (line (j i) (shift-forth (loop i) (loop j) (shift-forth (loop i) (loop j) empty-word)))) (pos 2))
(normal (square-degree (line (j i) (shift-back (loop i) (loop j) empty-word))) (negsuc 0))
(normal (square-degree (line (j i) (shift-forth (loop i) (loop j) (shift-back (loop i) (loop j) empty-word)))) (pos 0))

; Once around by a, then by b, which is null: it lifts to bridges of degree 0.
(def null-square James-squares
  (line (j i)
    (hcomp James (carried (loop (rev i)) base base base base (loop j) (loop j) (loop j))
      ((or (= i 0) (= i 1)) (k)
        (let ((b Circle (loop j)) (z Circle (loop (min j (rev k))))) (carried base base base base base b b z)))
      ((or (= j 0) (= j 1)) (k) empty-word))))
(normal (square-degree null-square) (pos 0))

; Once around by b and then against a, a Whitehead product with an inverse: here
; the lift needs two bridges, and its degree is the negative of the number.
(def inverse-square James-squares
  (line (j i)
    (let ((a Circle (loop i)) (b Circle (loop j)))
      (hcomp James (shift-back b (rotate a b) (shift-forth a (rotate a b) empty-word))
        ((or (= i 0) (= i 1)) (k) (shift-back (loop (min j (rev k))) b empty-word))
        ((or (= j 0) (= j 1)) (k) (shift-forth (loop (min i (rev k))) a empty-word))))))
(normal (square-degree inverse-square) (pos 2))

; The number: -2 (Ljungström and Mörtberg, LICS 2023; the fourth homotopy group of
; the 3-sphere is Z/2). The sign is that of the orientation in which the identity has degree 1.
(normal brunerie-number (negsuc 1))
