; A Brunerie number in a simplified form, which computes. Brunerie (thesis, 2016)
; shows that the fourth homotopy group of the 3-sphere is Z/n, n being the Hopf
; invariant of the Whitehead product of the identity of the 2-sphere with itself:
; of whitehead-map, S1*S1 to S2. That map lifts through the Hopf construction
; to whitehead-lift, S1*S1 to itself (whitehead-lifts proves it), and since the
; Hopf construction is an isomorphism of third homotopy groups, n is the degree
; of the lift, up to sign. The degree is read off as follows. Over S1*S1 stands
; the family of words; along a bridge of a and b the lift carries the empty word
; to the word of a and b (word-is-transport proves it), which is a map of the torus.
; Made constant on the sides of the square, it is a square of words, whose degree
; is how often the circles over it turn. The identity has degree 1 this way.
; Ljungström and Mörtberg (LICS 2023) reduce the number to the degree of such a
; map of S1*S1, and report that it is -2.
(load "rotations.sexp")

; The Whitehead product of the identity with itself: once around by b, then by a.
(def whitehead-map (-> Circle-join Sphere2)
  (lam (p) (elim (_ Sphere2) p
    ((left a) north) ((right b) north)
    ((bridge a b k) (at (compose Sphere2 north north north (meridian-loop b) (meridian-loop a)) k)))))

; Its lift crosses four bridges, of the angles b, base, a and base.
(def whitehead-bridges (Pi ((a Circle) (b Circle)) (Path Circle-join (left (opposite a)) (left b)))
  (lam (a b)
    (compose Circle-join (left (opposite a)) (left (angle a b)) (left b)
      (bridges (opposite a) (angle a b) (angle a b))
      (bridges (angle a b) b b))))

(def whitehead-lift (-> Circle-join Circle-join)
  (lam (p) (elim (_ Circle-join) p
    ((left a) (left (opposite a))) ((right b) (left b))
    ((bridge a b k) (at (whitehead-bridges a b) k)))))

(def first-angle (Pi ((a Circle) (b Circle)) (Path Circle (angle (opposite a) (angle a b)) b))
  (lam (a b) (rotate-back (opposite a) b)))

(def third-angle (Pi ((a Circle) (b Circle)) (Path Circle (angle (angle a b) b) a))
  (lam (a b)
    (compose Circle (angle (angle a b) b) (angle (angle a b) (rotate (angle a b) a)) a
      (line (m) (angle (angle a b)
        (at (compose Circle (rotate (angle a b) a) (rotate a (angle a b)) b
              (rotate-commutes (angle a b) a) (rotate-forth a b)) (rev m))))
      (rotate-back (angle a b) a))))

(def whitehead-lifts (Pi ((p Circle-join)) (Path Sphere2 (hopf-construction (whitehead-lift p)) (whitehead-map p)))
  (lam (p) (elim (q (Path Sphere2 (hopf-construction (whitehead-lift q)) (whitehead-map q))) p
    ((left a) (line (_) north)) ((right b) (line (_) north))
    ((bridge a b k) (line (m)
      (at (compose Sphere2 north north north
        (compose Sphere2 north south north
          (line (l) (merid (at (first-angle a b) m) l))
          (line (l) (merid (at (opposite-cancels (angle a b)) m) (rev l))))
        (compose Sphere2 north south north
          (line (l) (merid (at (third-angle a b) m) l))
          (line (l) (merid (at (opposite-cancels b) m) (rev l))))) k))))))

; The empty word carried over bridges forth, back, forth and back.
(def carried (-> Circle Circle Circle Circle Circle Circle Circle Circle James)
  (lam (x y z t u v p q) (shift-back p q (shift-forth u v (shift-back z t (shift-forth x y empty-word))))))

(def word (-> Circle Circle James)
  (lam (a b) (carried (opposite a) (angle a b) (angle a b) (angle a b) (angle a b) b b b)))

(def word-is-transport
  (Pi ((a Circle) (b Circle))
    (Path James (transp (k (words (whitehead-lift (bridge a b k)))) bot empty-word) (word a b)))
  (lam (a b)
    (let ((c Circle (angle a b))
          (start James (shift-back c c (shift-forth (opposite a) c empty-word)))
          (first (-> James James) (word-transport (left (opposite a)) (left c) (bridges (opposite a) c c)))
          (second (-> James James) (word-transport (left c) (left b) (bridges c b b)))
          (both James (word-transport (left (opposite a)) (left b) (whitehead-bridges a b) empty-word)))
      (compose James both (second (first empty-word)) (word a b)
        (inverse James (second (first empty-word)) both
          (transport-composite Circle-join words (left (opposite a)) (left c) (left b)
            (bridges (opposite a) c c) (bridges c b b) empty-word))
        (compose James (second (first empty-word)) (second start) (word a b)
          (line (k) (second (at (bridges-shift (opposite a) c c empty-word) k)))
          (bridges-shift c b b start))))))

; Where a or b is base, the word is carried back to the empty one, by drawing in
; the ends of the bridges. Both pairs of opposite sides are drawn in alike.
(def whitehead-square James-squares
  (line (j i)
    (hcomp James (word (loop i) (loop j))
      ((or (= i 0) (= i 1)) (k)
        (let ((b Circle (loop j)) (z Circle (loop (min j (rev k)))))
          (carried base b b z b z b z)))
      ((or (= j 0) (= j 1)) (k)
        (let ((a Circle (loop (rev i))) (z Circle (loop (rev (min i (rev k))))))
          (carried a z a z a base base base))))))

(def brunerie-number Int (square-degree whitehead-square))
