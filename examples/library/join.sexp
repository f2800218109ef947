; Joins (HoTT Book 6.8) and the Hopf construction: the join of two circles, which
; is the 3-sphere, over the suspended circle, which is the 2-sphere (8.5).
(load "suspension.sexp")
(load "loops.sexp")

(data Join ((A (U 0)) (B (U 0))) (point left ((a A))) (point right ((b B)))
  (path bridge ((a A) (b B)) (k) ((= k 0) (left a)) ((= k 1) (right b))))

(def Circle-join (U 0) (Join Circle Circle))

; The circle is a commutative group: rotate is its product, base its unit.
(def opposite (-> Circle Circle) (lam (x) (elim (_ Circle) x (base base) ((loop i) (loop (rev i))))))

(def rotate-commutes (Pi ((a Circle) (b Circle)) (Path Circle (rotate a b) (rotate b a)))
  (lam (a) (elim (x (Pi ((b Circle)) (Path Circle (rotate x b) (rotate b x)))) a
    (base (lam (b) (elim (y (Path Circle y (rotate y base))) b
      (base (line (_) base)) ((loop j) (line (_) (loop j))))))
    ((loop i) (lam (b) (elim (y (Path Circle (rotate (loop i) y) (rotate y (loop i)))) b
      (base (line (_) (loop i))) ((loop j) (line (_) (rotate (loop i) (loop j))))))))))

(def rotate-associates (Pi ((a Circle) (b Circle) (c Circle)) (Path Circle (rotate a (rotate b c)) (rotate (rotate a b) c)))
  (lam (a)
    (let ((along (-> Circle Circle (U 2))
            (lam (b c) (PathOver (i (Path Circle (rotate (loop i) (rotate b c)) (rotate (rotate (loop i) b) c)))
              (line (_) (rotate b c)) (line (_) (rotate b c)))))
          (one-way (Pi ((b Circle) (c Circle)) (proposition (along b c)))
            (lam (b c) (set-line (lam (i) (Path Circle (rotate (loop i) (rotate b c)) (rotate (rotate (loop i) b) c)))
              (circle-groupoid (rotate b c) (rotate b c)) (line (_) (rotate b c)) (line (_) (rotate b c)))))
          (filled (Pi ((b Circle) (c Circle)) (along b c))
            (circle-connected (lam (b) (Pi ((c Circle)) (along b c)))
              (lam (b) (proposition-product Circle (along b) (one-way b)))
              (circle-connected (along base) (one-way base) (line (i _) (loop i))))))
    (elim (x (Pi ((b Circle) (c Circle)) (Path Circle (rotate x (rotate b c)) (rotate (rotate x b) c)))) a
      (base (lam (b c) (line (_) (rotate b c))))
      ((loop i) (lam (b c) (at (filled b c) i)))))))

(def opposite-cancels (Pi ((x Circle)) (Path Circle (rotate (opposite x) x) base))
  (lam (x) (elim (y (Path Circle (rotate (opposite y) y) base)) x
    (base (line (_) base))
    ((loop i) (line (m) (hcomp Circle base ((or (= i 0) (= i 1) (= m 1)) (k) base)))))))

(def rotate-back (Pi ((x Circle) (y Circle)) (Path Circle (rotate (opposite x) (rotate x y)) y))
  (lam (x y)
    (compose Circle (rotate (opposite x) (rotate x y)) (rotate (rotate (opposite x) x) y) y
      (rotate-associates (opposite x) x y)
      (line (m) (rotate (at (opposite-cancels x) m) y)))))

(def rotate-forth (Pi ((x Circle) (y Circle)) (Path Circle (rotate x (rotate (opposite x) y)) y))
  (lam (x y)
    (compose Circle (rotate x (rotate (opposite x) y)) (rotate (rotate x (opposite x)) y) y
      (rotate-associates x (opposite x) y)
      (compose Circle (rotate (rotate x (opposite x)) y) (rotate (rotate (opposite x) x) y) y
        (line (m) (rotate (at (rotate-commutes x (opposite x)) m) y))
        (line (m) (rotate (at (opposite-cancels x) m) y))))))

; The angle from x to y.
(def angle (-> Circle Circle Circle) (lam (x y) (rotate (opposite x) y)))

; The Hopf construction: a bridge lies over the meridian of its angle.
(def hopf-construction (-> Circle-join Sphere2)
  (lam (p) (elim (_ Sphere2) p
    ((left x) north) ((right y) south) ((bridge x y k) (merid (angle x y) k)))))

; The total space of the Hopf fibration and the join of two circles, back and forth
; (Book 8.5.7): a bridge is a path of the total space over the meridian of its angle.
(def angle-turns (Pi ((x Circle) (y Circle)) (Path Circle (rotate (angle x y) x) y))
  (lam (x y)
    (compose Circle (rotate (angle x y) x) (rotate x (angle x y)) y
      (rotate-commutes (angle x y) x) (rotate-forth x y))))

(def join-total (-> Circle-join hopf-total)
  (lam (p) (elim (_ hopf-total) p
    ((left x) (pair north x)) ((right y) (pair south y))
    ((bridge x y k) (pair (merid (angle x y) k)
      (glue (at (angle-turns x y) k) ((= k 0) x) ((= k 1) y)))))))

(def total-join (-> hopf-total Circle-join)
  (lam (p)
    ((elim (z (-> (hopf z) Circle-join)) (fst p)
      (north (lam (x) (left x))) (south (lam (y) (right y)))
      ((merid a k) (lam (y)
        (hcomp Circle-join (bridge (angle a (unglue y)) (unglue y) k)
          ((= k 0) (l) (left (at (rotate-back a y) l)))
          ((= k 1) (l) (right y))))))
    (snd p))))

; The one lies over the 2-sphere as the Hopf construction does.
(def join-total-over (Pi ((p Circle-join)) (Path Sphere2 (hopf-map (join-total p)) (hopf-construction p)))
  (lam (p) (elim (q (Path Sphere2 (hopf-map (join-total q)) (hopf-construction q))) p
    ((left x) (line (_) north)) ((right y) (line (_) south))
    ((bridge x y k) (line (_) (merid (angle x y) k))))))

; From the join to the total space and back is the identity, up to a path.
(def total-join-total (Pi ((p Circle-join)) (Path Circle-join (total-join (join-total p)) p))
  (lam (p) (elim (q (Path Circle-join (total-join (join-total q)) q)) p
    ((left x) (line (_) (left x))) ((right y) (line (_) (right y)))
    ((bridge x y k)
      (let ((a Circle (angle x y)) (turned-back (Path Circle (angle a (rotate a x)) x) (rotate-back a x)))
        (line (m)
          (hcomp Circle-join
            (bridge
              (hcomp Circle (at turned-back m)
                ((= m 0) (l) (angle a (at (angle-turns x y) (min k l))))
                ((= m 1) (l) x)
                ((= k 0) (l) (at turned-back m)))
              (at (angle-turns x y) (max k m)) k)
            ((= k 0) (l) (left (at turned-back (max m l))))
            ((= k 1) (l) (right y))
            ((= m 1) (l) (bridge x y k)))))))))
