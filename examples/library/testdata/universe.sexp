; Composition and transport of types (CCHM 2015, section 7.1).
(load "booleans.sexp")
(load "integers.sexp")

; transp (i. U n) φ A = A.
(assume A (U 0))
(same (U 0) (transp (i (U 0)) bot A) A)
(same (-> I (U 0)) (lam (j) (transp (i (U 0)) (= j 0) A)) (lam (j) A))

; The equivalence along a line of types, with the proof that its fibers are
; contractible by filling in both directions: v is the filler from the far end,
; b joins it to the image of its start; w and alpha do the same along p.
(def line-equivalence (Pi ((L (-> I (U 0)))) (Equiv (L 0) (L 1)))
  (lam (L)
    (pair (lam (x) (transp (i (L i)) bot x))
      (lam (y)
        (let ((v (Pi ((i I)) (L i)) (lam (i) (transp (j (L (max i (rev j)))) (= i 1) y)))
              (b (Pi ((l I) (i I)) (L i))
                (lam (l i) (fill (j (L j)) (v 0) i
                  ((= l 0) (j) (v j))
                  ((= l 1) (j) (tfill (k (L k)) bot (v 0) j))))))
          (pair (pair (v 0) (line (l) (b l 1)))
            (lam (z)
              (let ((w (Pi ((k I) (i I)) (L (rev i)))
                      (lam (k i) (fill (j (L (rev j))) (at (snd z) k) i
                        ((= k 0) (j) (v (rev j)))
                        ((= k 1) (j) (tfill (m (L m)) bot (fst z) (rev j))))))
                    (alpha (-> I (L 0)) (lam (k) (w k 1))))
                (line (k)
                  (pair (alpha k)
                    (line (l) (comp (i (L i)) (alpha (min k l))
                      ((= l 0) (i) (v i))
                      ((= l 1) (i) (tfill (m (L m)) bot (alpha k) i))
                      ((= k 0) (i) (b l i))
                      ((= k 1) (i) (w l (rev i)))))))))))))))

; hcomp (U n) A [φ ↦ i. E] = Glue A [φ ↦ (E(1), e)], e along E backwards: on 0
; faces, on 1, on 2, on 3, and on a face that holds.
(assume E (-> I (U 0)))
(same (U 0) (hcomp (U 0) A) (Glue A))
(same (-> I (U 0))
  (lam (j) (hcomp (U 0) (E 0) ((= j 0) (i) (E i))))
  (lam (j) (Glue (E 0) ((= j 0) (E 1) (line-equivalence (lam (i) (E (rev i))))))))
(assume F (-> I I (U 0)))
(same (-> I (U 0))
  (lam (j) (hcomp (U 0) (F j 0) ((= j 0) (i) (F 0 i)) ((= j 1) (i) (F 1 i))))
  (lam (j) (Glue (F j 0)
    ((= j 0) (F 0 1) (line-equivalence (lam (i) (F 0 (rev i)))))
    ((= j 1) (F 1 1) (line-equivalence (lam (i) (F 1 (rev i))))))))
(assume G (-> I I I (U 0)))
(same (-> I I (U 0))
  (lam (j k) (hcomp (U 0) (G j k 0) ((= j 0) (i) (G 0 k i)) ((= j 1) (i) (G 1 k i)) ((= k 1) (i) (G j 1 i))))
  (lam (j k) (Glue (G j k 0)
    ((= j 0) (G 0 k 1) (line-equivalence (lam (i) (G 0 k (rev i)))))
    ((= j 1) (G 1 k 1) (line-equivalence (lam (i) (G 1 k (rev i)))))
    ((= k 1) (G j 1 1) (line-equivalence (lam (i) (G j 1 (rev i))))))))
(same (U 0) (hcomp (U 0) (E 0) (top (i) (E i))) (E 1))
(differ (U 0) (hcomp (U 0) A) A)
; Universes of every level.
(same (-> I (U 1)) (lam (j) (hcomp (U 1) (E 0) ((= j 0) (i) (E i)))) (lam (j) (hcomp (U 0) (E 0) ((= j 0) (i) (E i)))))
(reject (same (U 0) (hcomp (U 1) A) A))

; Transport in composites of types, with ground results.
; On 0 faces.
(normal (unglue (transp (i (hcomp (U 0) (at negation i))) bot (ann (glue true) (Glue Bool)))) false)
; On 1 face: from the wall's end back along the wall.
(def box1 (-> I (U 0)) (lam (j) (hcomp (U 0) Int ((= j 0) (i) (at turn i)))))
(normal (unglue (transp (j (box1 j)) bot (pos 7))) (pos 6))
(normal (transp (j (box1 (rev j))) bot (ann (glue (pos 7)) (box1 1))) (pos 8))
; On 2 faces: back along one wall, forth along the other.
(def box2 (-> I (U 0)) (lam (j) (hcomp (U 0) Int ((= j 0) (i) (at turn i)) ((= j 1) (i) (at turn (rev i))))))
(reject (def wrong (-> I (U 0)) (lam (j) (hcomp (U 0) Int ((= j 0) (i) (at turn i)) ((= j 0) (i) Int)))))
(normal (transp (j (box2 j)) bot (pos 7)) (pos 5))
(normal (transp (j (box2 (rev j))) bot (pos 7)) (pos 9))
; On 3 faces; on the third, k = 0, the type is the line of negation itself.
(def box3 (-> I I (U 0))
  (lam (j k) (hcomp (U 0) Bool
    ((= j 0) (i) Bool) ((= j 1) (i) (at negation i)) ((= k 0) (i) (at negation (min i j))))))
(same (-> I (U 0)) (lam (j) (box3 j 0)) (lam (j) (at negation j)))
(normal (transp (j (box3 j 0)) bot true) false)
(normal (transp (j (box3 j 1)) bot true) false)
(same (-> I Bool) (lam (k) (transp (j (box3 j k)) bot true)) (lam (k) false))
(same (-> I Bool) (lam (k) (transp (j (box3 (rev j) k)) bot true)) (lam (k) false))
; The third face moves an element that is not known on the two others.
(assume unknown Bool)
(differ (-> I Bool) (lam (k) (transp (j (box3 j k)) bot unknown))
  (lam (k) (transp (j (hcomp (U 0) Bool ((= j 0) (i) Bool) ((= j 1) (i) (at negation i)))) bot unknown)))
; The base moves along its own line.
(assume unknown-line (Path (U 0) Bool Bool))
(differ Bool (transp (j (hcomp (U 0) (at unknown-line j) ((= j 0) (i) Bool) ((= j 1) (i) Bool))) bot true) true)
; Transport in k: at j = 0 nothing happens, and nothing has to at j = 1.
(normal (transp (k (box3 0 k)) bot true) true)
(normal (transp (k (box3 1 k)) bot true) true)
; A composite of composites, and one over a glued type.
(normal (transp (j (hcomp (U 0) (box2 j) ((= j 0) (i) (at turn i)) ((= j 1) (i) (at turn i)))) bot (pos 7)) (pos 5))
(normal (transp (j (hcomp (U 0) (at turn j) ((= j 0) (i) (at turn i)) ((= j 1) (i) (at turn i)))) bot (pos 7)) (pos 8))
; hcomp in a composite of types.
(normal (unglue (hcomp (hcomp (U 0) Bool) (ann (glue true) (Glue Bool)))) true)
(normal (hcomp (box2 0) (pos 3)) (pos 3))

; What is glued on may be a glued type itself: where its face holds, unglue is the
; equivalence's map, not the base of the element.
(def negated-base (Equiv (Glue Bool) Bool)
  (quasi-inverse (Glue Bool) Bool (lam (b) (not (unglue b))) (lam (b) (glue (not b)))
    not-not (lam (g) (line (i) (glue (at (not-not (unglue g)) i))))))
(def on-glued (-> I (U 0)) (lam (i) (Glue Bool ((= i 0) (Glue Bool) negated-base))))
(normal (unglue (transp (i (on-glued i)) bot (ann (glue true) (Glue Bool)))) false)
(normal (unglue (transp (i (on-glued (rev i))) bot (ann (glue true) (Glue Bool)))) false)
(normal (unglue (hcomp (on-glued 0) (ann (glue true) (Glue Bool)))) true)
