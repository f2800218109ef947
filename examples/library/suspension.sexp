; Suspensions (HoTT Book 6.5), the product of the circle with itself as a group,
; and the Hopf fibration over the suspended circle, the 2-sphere (8.5).
(load "circle.sexp")

(data Susp ((A (U 0))) (point north ()) (point south ())
  (path merid ((a A)) (i) ((= i 0) north) ((= i 1) south)))

(def Sphere2 (U 0) (Susp Circle))
(def Sphere3 (U 0) (Susp Sphere2))

; Every point of the circle has a loop that turns it once around (8.5.8): the
; square has loop on all four sides.
(def around (Pi ((x Circle)) (Path Circle x x))
  (lam (x) (elim (y (Path Circle y y)) x
    (base (line (i) (loop i)))
    ((loop j) (line (i)
      (hcomp Circle base
        ((= i 0) (k) (loop (max j (rev k))))
        ((= i 1) (k) (loop (min j k)))
        ((= j 0) (k) (loop (max i (rev k))))
        ((= j 1) (k) (loop (min i k)))))))))

(def rotate (-> Circle Circle Circle)
  (lam (a b) (elim (x Circle) a (base b) ((loop i) (at (around b) i)))))

; Rotating is an equivalence: at base it is the identity, and the circle is one piece.
(def rotate-is-equivalence (Pi ((a Circle)) (is-equivalence Circle Circle (rotate a)))
  (lam (a) (elim (x (is-equivalence Circle Circle (rotate x))) a
    (base (snd (identity-equivalence Circle)))
    ((loop i)
      (at (proposition-over Circle (lam (x) (is-equivalence Circle Circle (rotate x)))
            (lam (x) (proposition-is-equivalence Circle Circle (rotate x)))
            base base turn-once
            (snd (identity-equivalence Circle)) (snd (identity-equivalence Circle))) i)))))

(def rotate-equivalence (-> Circle (Equiv Circle Circle))
  (lam (a) (pair (rotate a) (rotate-is-equivalence a))))

; The Hopf fibration: its fibers are circles, rotated along the meridians.
(def hopf (-> Sphere2 (U 0))
  (lam (x) (elim (y (U 0)) x
    (north Circle) (south Circle)
    ((merid a i) (at (ua Circle Circle (rotate-equivalence a)) i)))))

; Its total space with the projection is the Hopf map.
(def hopf-total (U 0) (Sigma ((x Sphere2)) (hopf x)))
(def hopf-map (-> hopf-total Sphere2) (lam (p) (fst p)))

; Walking the meridian of a and back that of base rotates the fiber by a.
(def meridian-loop (-> Circle (Path Sphere2 north north))
  (lam (a) (compose Sphere2 north south north (line (i) (merid a i)) (line (i) (merid base (rev i))))))

(def hopf-transport (-> Circle Circle Circle)
  (lam (a b) (transp (i (hopf (at (meridian-loop a) i))) bot b)))

; That is rotation, up to a path.
(def hopf-rotates (Pi ((a Circle) (b Circle)) (Path Circle (hopf-transport a b) (rotate a b)))
  (lam (a b)
    (compose Circle (hopf-transport a b)
      (transp (i (hopf (merid base (rev i)))) bot (transp (i (hopf (merid a i))) bot b))
      (rotate a b)
      (inverse Circle
        (transp (i (hopf (merid base (rev i)))) bot (transp (i (hopf (merid a i))) bot b))
        (hopf-transport a b)
        (transport-composite Sphere2 hopf north south north
          (line (i) (merid a i)) (line (i) (merid base (rev i))) b))
      (compose Circle
        (transp (i (hopf (merid base (rev i)))) bot (transp (i (hopf (merid a i))) bot b))
        (transp (i (hopf (merid base (rev i)))) bot (rotate a b))
        (rotate a b)
        (line (k) (transp (i (hopf (merid base (rev i)))) bot
          (at (ua-transport Circle Circle (rotate-equivalence a) b) k)))
        (ua-transport-back Circle Circle (rotate-equivalence base) (rotate a b))))))

; Once around the meridians the fiber is turned once: the degree of the Hopf map.
(def hopf-degree Int (degree (lam (a) (hopf-transport a base)) (hopf-rotates base base)))
