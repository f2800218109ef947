; Gluing, rule by rule (CCHM 2015, section 6; the operations in the form of CHM,
; LICS 2018): each right side is written out from the paper's rule.
(load "equivalences.sexp")

(assume A (U 0)) (assume T (U 0)) (assume e (Equiv T A))
(assume R (U 0)) (assume d (Equiv R A))
(assume t T) (assume a A)

; Glue A [top ↦ (T, e)] = T; with face bot nothing is glued on, but it is not A.
(same (U 0) (Glue A (top T e)) T)
(same (U 0) (Glue A (bot T e)) (Glue A))
(differ (U 0) (Glue A) A)
(same (Pi ((i I)) (U 0)) (lam (i) (Glue A ((= i 0) T e) ((and (= i 0) (= i 1)) R d))) (lam (i) (Glue A ((= i 0) T e))))

; On one end: T there, and a glued type elsewhere.
(def one-end (-> I (U 0)) (lam (i) (Glue A ((= i 0) T e))))
(same (U 0) (one-end 0) T)
(same (U 0) (one-end 1) (Glue A))
; On two.
(def two-ends (-> I (U 0)) (lam (i) (Glue A ((= i 0) T e) ((= i 1) R d))))
(same (U 0) (two-ends 0) T)
(same (U 0) (two-ends 1) R)
(differ (-> I (U 0)) two-ends one-end)
(differ (-> I (U 0)) two-ends (lam (i) (two-ends (rev i))))

; The order of the parts and redundant parts do not matter.
(same (-> I (U 0)) two-ends (lam (i) (Glue A ((= i 1) R d) ((= i 0) T e))))
(same (-> I I (U 0)) (lam (i j) (Glue A ((= i 0) T e))) (lam (i j) (Glue A ((= i 0) T e) ((and (= i 0) (= j 1)) T e))))
; Parts must agree where their faces meet, and equivalences be equivalences with the base.
(reject (def wrong (-> I I (U 0)) (lam (i j) (Glue A ((= i 0) T e) ((= j 0) R d)))))
(reject (def wrong (-> I (U 0)) (lam (i) (Glue A ((= i 0) A e)))))
(reject (def wrong (-> I (U 0)) (lam (i) (Glue T ((= i 0) T e)))))

; glue and unglue: on the face glue a [φ ↦ t] is t and unglue b is e.1 b; unglue (glue a [φ ↦ t]) = a.
(def element (Pi ((i I)) (one-end i)) (lam (i) (glue ((fst e) t) ((= i 0) t))))
(same T (element 0) t)
(same (-> I A) (lam (i) (unglue (element i))) (lam (i) ((fst e) t)))
(def forget (Pi ((i I)) (-> (one-end i) A)) (lam (i b) (unglue b)))
(same (-> T A) (forget 0) (fst e))
(reject (def wrong (Pi ((i I)) (one-end i)) (lam (i) (glue a ((= i 0) t)))))
(reject (def wrong (Pi ((i I)) (one-end i)) (lam (i) (glue ((fst e) t)))))
(reject (def wrong (Pi ((i I)) (one-end i)) (lam (i) (glue ((fst e) t) ((= i 0) t) ((= i 1) t)))))
; η: b = glue (unglue b) [φ ↦ b].
(assume b (Pi ((i I)) (one-end i)))
(same (Pi ((i I)) (one-end i)) b (lam (i) (glue (unglue (b i)) ((= i 0) (b 0)))))
(normal b (lam (i) (glue (unglue (b i)) ((= i 0) (b 0)))))
(same (Glue A) (glue (unglue (b 1))) (b 1))
; An element is not determined by its base alone: only the part on the face and the base together.
(assume b1 (Pi ((i I)) (one-end i)))
(differ (Pi ((i I)) (one-end i)) b b1)
(differ (-> I A) (lam (i) (unglue (b i))) (lam (i) (unglue (b1 i))))

; Nor is it by the part on the face: over Unit the bases are equal, and the parts count.
(assume z (Equiv T Unit)) (assume s T)
(differ (Pi ((i I)) (Glue Unit ((= i 0) T z))) (lam (i) (glue unit ((= i 0) t))) (lam (i) (glue unit ((= i 0) s))))
; Nor by the part alone: off the face the bases count.
(assume a2 A)
(differ (Glue A) (glue a) (glue a2))
(differ (Pi ((i I)) (one-end i)) element
  (lam (i) (glue (hcomp A ((fst e) t) ((= i 0) (k) ((fst e) t))) ((= i 0) t))))
; Types glued along different equivalences differ, as do different types.
(assume c (Equiv T A))
(differ (-> I (U 0)) one-end (lam (i) (Glue A ((= i 0) T c))))
(differ (-> I (U 0)) one-end (lam (i) (Glue A ((= i 1) T e))))

; hcomp in Glue A [φ ↦ (T, e)], φ = (i = 0), with one wall:
; glue (hcomp A (unglue u0) [ψ ↦ unglue u] [φ ↦ e.1 t(k)]) [φ ↦ t(1)],  t = hfill T u0 [ψ ↦ u].
(assume u (Pi ((i I) (k I)) (one-end i)))
(same (Pi ((i I) (j I)) (one-end i))
  (lam (i j) (hcomp (one-end i) (u i 0) ((= j 0) (k) (u i k))))
  (lam (i j)
    (glue
      (hcomp A (unglue (u i 0)) ((= j 0) (k) (unglue (u i k)))
        ((= i 0) (k) ((fst e) (hfill T (u 0 0) k ((= j 0) (l) (u 0 l))))))
      ((= i 0) (hcomp T (u 0 0) ((= j 0) (k) (u 0 k)))))))
; The same with no wall, two parts, and a wall on the face of a part.
(same (Pi ((i I)) (one-end i))
  (lam (i) (hcomp (one-end i) (b i)))
  (lam (i) (glue (hcomp A (unglue (b i)) ((= i 0) (k) ((fst e) (hfill T (b 0) k)))) ((= i 0) (hcomp T (b 0))))))
(assume v (Pi ((i I) (k I)) (two-ends i)))
(same (Pi ((i I) (j I)) (two-ends i))
  (lam (i j) (hcomp (two-ends i) (v i 0) ((= j 1) (k) (v i k))))
  (lam (i j)
    (glue
      (hcomp A (unglue (v i 0)) ((= j 1) (k) (unglue (v i k)))
        ((= i 0) (k) ((fst e) (hfill T (v 0 0) k ((= j 1) (l) (v 0 l)))))
        ((= i 1) (k) ((fst d) (hfill R (v 1 0) k ((= j 1) (l) (v 1 l))))))
      ((= i 0) (hcomp T (v 0 0) ((= j 1) (k) (v 0 k))))
      ((= i 1) (hcomp R (v 1 0) ((= j 1) (k) (v 1 k)))))))
(same (Pi ((i I)) (one-end i))
  (lam (i) (hcomp (one-end i) (u i 0) ((= i 0) (k) (u 0 k))))
  (lam (i)
    (glue (hcomp A (unglue (u i 0)) ((= i 0) (k) ((fst e) (u 0 k)))) ((= i 0) (u 0 1)))))

; transp along a line of glued types. First the faces that mention the line's
; dimension: δ = ∀i.φ is bot.
; φ = (i = 0): the map, then a composite without walls.
(same (Glue A) (transp (i (one-end i)) bot t)
  (glue (hcomp A (comp (i A) ((fst e) t)))))
; φ = (i = 1): the center of the fiber.
(assume g (Glue A))
(def back-base A (comp (i A) (unglue g)))
(same T (transp (i (one-end (rev i))) bot g)
  (fst (hcomp (fiber T A (fst e) back-base) (fst ((snd e) back-base)))))
; Both ends.
(def base-there A (comp (i A) ((fst e) t)))
(same R (transp (i (two-ends i)) bot t)
  (fst (hcomp (fiber R A (fst d) base-there) (fst ((snd d) base-there)))))

; Faces that do not mention it: δ = φ, and on φ the result is transport in T.
(assume TL (-> I (U 0))) (assume AL (-> I (U 0)))
(assume eL (Pi ((i I)) (Equiv (TL i) (AL i))))
(def along (-> I I (U 0)) (lam (j i) (Glue (AL i) ((= j 0) (TL i) (eL i)))))
(assume w (Pi ((j I)) (along j 0)))
(def along-base (Pi ((j I)) (AL 1))
  (lam (j) (comp (i (AL i)) (unglue (w j)) ((= j 0) (i) ((fst (eL i)) (tfill (i (TL i)) bot (w 0) i))))))
(same (Pi ((j I)) (along j 1))
  (lam (j) (transp (i (along j i)) bot (w j)))
  (lam (j) (glue (hcomp (AL 1) (along-base j) ((= j 0) (k) (along-base 0)))
    ((= j 0) (transp (i (TL i)) bot (w 0))))))
(same (TL 1) (transp (i (along 0 i)) bot (w 0)) (transp (i (TL i)) bot (w 0)))

; Both kinds: φ = (j = 0) ∨ (i = 1), where the contraction must extend what
; stands on δ = (j = 0).
(def mixed (-> I I (U 0))
  (lam (j i) (Glue (AL i) ((= j 0) (TL i) (eL i)) ((= i 1) (TL 1) (eL 1)))))
(assume m (Pi ((j I)) (mixed j 0)))
(def mixed-base (Pi ((j I)) (AL 1))
  (lam (j) (comp (i (AL i)) (unglue (m j)) ((= j 0) (i) ((fst (eL i)) (tfill (i (TL i)) bot (m 0) i))))))
(same (-> I (TL 1))
  (lam (j) (transp (i (mixed j i)) bot (m j)))
  (lam (j) (fst (hcomp (fiber (TL 1) (AL 1) (fst (eL 1)) (mixed-base j)) (fst ((snd (eL 1)) (mixed-base j)))
    ((= j 0) (k) (at ((snd ((snd (eL 1)) (mixed-base 0)))
      (pair (transp (i (TL i)) bot (m 0)) (line (l) (mixed-base 0)))) k))))))

; With ψ: where the line is constant, transport is the identity and the base has a wall there.
(assume E2 (-> I (Equiv T A)))
(def still (-> I I (U 0)) (lam (k i) (Glue A ((= i 0) T (E2 0)) ((= i 1) T (E2 k)))))
(def kept (-> I I I (U 0)) (lam (k j i) (Glue A ((= j 0) T (E2 (min i k))))))
(assume n (Pi ((k I) (j I)) (kept k j 0)))
(def kept-base (Pi ((k I) (j I)) A)
  (lam (k j) (comp (i A) (unglue (n k j))
    ((= k 0) (i) (unglue (n 0 j)))
    ((= j 0) (i) ((fst (E2 (min i k))) (tfill (i T) (= k 0) (n k 0) i))))))
(same (Pi ((k I) (j I)) (kept k j 1))
  (lam (k j) (transp (i (kept k j i)) (= k 0) (n k j)))
  (lam (k j) (glue
    (hcomp A (kept-base k j) ((= j 0) (l) (kept-base k 0)) ((= k 0) (l) (kept-base 0 j)))
    ((= j 0) (transp (i T) (= k 0) (n k 0))))))
(same (Pi ((j I)) (kept 0 j 1)) (lam (j) (transp (i (kept 0 j i)) (= 0 0) (n 0 j))) (lam (j) (n 0 j)))
(reject (def wrong (Pi ((k I) (j I)) (kept k j 1)) (lam (k j) (transp (i (kept k j i)) (= k 1) (n k j)))))

; Nested: a glued type glued on a glued type.
(def inner (-> I (U 0)) (lam (i) (Glue A ((= i 0) T e))))
(assume h (Pi ((i I)) (Equiv R (inner i))))
(def nested (-> I I (U 0)) (lam (i j) (Glue (inner i) ((= j 0) R (h i)))))
(same (U 0) (nested 0 0) R)
(same (U 0) (nested 1 0) R)
(same (U 0) (nested 0 1) (Glue T))
(same (-> I (U 0)) (lam (j) (nested 0 j)) (lam (j) (Glue T ((= j 0) R (h 0)))))
(assume o (Pi ((i I) (j I)) (nested i j)))
(normal o (lam (i j)
  (glue (glue (unglue (unglue (o i j))) ((= i 0) (unglue (o 0 j)))) ((= j 0) (o i 0)))))
(same (-> I A) (lam (i) (unglue ((fst (h i)) (o i 0)))) (lam (i) (unglue ((fst (h i)) (o i 0)))))
(same (Pi ((j I)) (nested 1 j))
  (lam (j) (transp (i (nested i j)) bot (o 0 j)))
  (lam (j) (glue
    (hcomp (inner 1)
      (comp (i (inner i)) (unglue (o 0 j)) ((= j 0) (i) ((fst (h i)) (tfill (i R) bot (o 0 0) i))))
      ((= j 0) (k) (comp (i (inner i)) ((fst (h 0)) (o 0 0)) (top (i) ((fst (h i)) (tfill (i R) bot (o 0 0) i))))))
    ((= j 0) (transp (i R) bot (o 0 0))))))

; Glued along nothing, over and over: below each glue two composites without walls,
; those of the outer ones after those of the inner ones.
(assume bare (-> I (U 0))) (assume within (bare 0))
(same (Glue (bare 1)) (transp (i (Glue (bare i))) bot (glue within))
  (glue (hcomp (bare 1) (hcomp (bare 1) (transp (i (bare i)) bot within)))))
(same (Glue (Glue (Glue (bare 1)))) (transp (i (Glue (Glue (Glue (bare i))))) bot (glue (glue (glue within))))
  (glue (glue (glue (hcomp (bare 1) (hcomp (bare 1) (hcomp (bare 1) (hcomp (bare 1) (hcomp (bare 1) (hcomp (bare 1)
    (transp (i (bare i)) bot within)))))))))))
(assume flag Bool)
(same (Glue (Glue Bool)) (transp (i (Glue (Glue Bool))) bot (glue (glue flag)))
  (glue (glue (hcomp Bool (hcomp Bool (hcomp Bool (hcomp Bool flag)))))))
(differ (Glue (Glue Bool)) (transp (i (Glue (Glue Bool))) bot (glue (glue flag))) (glue (glue (hcomp Bool (hcomp Bool flag)))))
(same (Glue (Glue Bool)) (transp (i (Glue (Glue Bool))) bot (glue (glue true))) (glue (glue true)))
(assume wide (Pi ((k I)) (Glue (Glue (Glue A ((= k 0) T e))))))
(same (Pi ((k I)) (Glue (Glue (Glue A ((= k 0) T e)))))
  (lam (k) (transp (i (Glue (Glue (Glue A ((= k 0) T e))))) bot (wide k)))
  (lam (k) (glue (hcomp (Glue (Glue A ((= k 0) T e))) (comp (i (Glue (Glue A ((= k 0) T e)))) (unglue (wide k)))))))
; Where nothing moves on a face, that face is a wall.
(same (Pi ((k I)) (Glue (Glue A)))
  (lam (k) (transp (i (Glue (Glue A))) (= k 0) (unglue (wide 1))))
  (lam (k) (glue (hcomp (Glue A) (comp (i (Glue A)) (unglue (unglue (wide 1))) ((= k 0) (i) (unglue (unglue (wide 1)))))
    ((= k 0) (l) (unglue (unglue (wide 1))))))))

; Levels: a glued type lives where its parts do.
(reject (def wrong (U 0) (Glue (U 0))))
(same (U 1) (Glue (U 0)) (Glue (U 0)))
