; The James construction on the 2-sphere (James, Annals of Mathematics 1955;
; Brunerie's thesis of 2016, chapter 3): words of points of the 2-sphere. It is the
; loop space of the 3-sphere, and the fiber of a family over the join of two circles.
(load "join.sexp")

; A 2-sphere is attached to each word: its points are the letters put before it.
(data James () (point empty-word ())
  (path attach ((w James)) (i j) ((or (= i 0) (= i 1) (= j 0) (= j 1)) w)))

(def James-identity (Equiv James James) (identity-equivalence James))

(def shift-square
  (Path (Path (Equiv James James) James-identity James-identity) (line (i) James-identity) (line (i) James-identity))
  (line (j i)
    (pair (lam (w) (attach w i j))
      (at (proposition-square (-> James James) (is-equivalence James James) (lam (w) w)
        (proposition-is-equivalence James James (lam (w) w))
        (line (j i) (lam (w) (attach w i j))) (snd James-identity)) j i))))

; Two points of the circle give one of the 2-sphere, to be put before a word;
; where either is base, it gives nothing.
(def shift-loop (-> Circle (Path (Equiv James James) James-identity James-identity))
  (lam (y) (elim (_ (Path (Equiv James James) James-identity James-identity)) y
    (base (line (i) James-identity))
    ((loop j) (at shift-square j)))))

(def shift (-> Circle Circle (Equiv James James))
  (lam (x y) (elim (_ (Equiv James James)) x
    (base James-identity)
    ((loop i) (at (shift-loop y) i)))))

(def shift-forth (-> Circle Circle James James) (lam (x y) (fst (shift x y))))
(def shift-at-base (Pi ((x Circle)) (Path James (shift-forth x base empty-word) empty-word))
  (lam (x) (elim (y (Path James (shift-forth y base empty-word) empty-word)) x
    (base (line (_) empty-word)) ((loop i) (line (_) empty-word)))))
(def shift-back (-> Circle Circle James James) (lam (x y) (inverse-map James James (shift x y))))

; The family over the join whose fibers are shifted along the bridges.
(def words (-> Circle-join (U 0))
  (lam (p) (elim (_ (U 0)) p
    ((left x) James) ((right y) James)
    ((bridge x y k) (at (ua James James (shift x y)) k)))))

(def word-transport (Pi ((p Circle-join) (q Circle-join)) (-> (Path Circle-join p q) (words p) (words q)))
  (lam (p q s) (transport Circle-join words p q s)))

; Over a bridge and back over another, transport shifts forth and back.
(def bridges (Pi ((x Circle) (y Circle) (z Circle)) (Path Circle-join (left x) (left z)))
  (lam (x y z) (compose Circle-join (left x) (right y) (left z)
    (line (k) (bridge x y k)) (line (k) (bridge z y (rev k))))))

(def bridges-shift
  (Pi ((x Circle) (y Circle) (z Circle) (w James))
    (Path James (word-transport (left x) (left z) (bridges x y z) w) (shift-back z y (shift-forth x y w))))
  (lam (x y z w)
    (let ((forth (-> James James) (word-transport (left x) (right y) (line (k) (bridge x y k))))
          (back (-> James James) (word-transport (right y) (left z) (line (k) (bridge z y (rev k))))))
      (compose James (word-transport (left x) (left z) (bridges x y z) w) (back (forth w)) (shift-back z y (shift-forth x y w))
        (inverse James (back (forth w)) (word-transport (left x) (left z) (bridges x y z) w)
          (transport-composite Circle-join words (left x) (right y) (left z)
            (line (k) (bridge x y k)) (line (k) (bridge z y (rev k))) w))
        (compose James (back (forth w)) (back (shift-forth x y w)) (shift-back z y (shift-forth x y w))
          (line (k) (back (at (ua-transport James James (shift x y) w) k)))
          (ua-transport-back James James (shift z y) (shift-forth x y w)))))))
