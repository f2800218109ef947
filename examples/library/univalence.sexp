; Univalence as a theorem (CCHM 2015, section 7; HoTT Book 2.10).
(load "propositions.sexp")

; An equivalence makes a path of types (CCHM 6, example of gluing).
(def ua (Pi ((A (U 0)) (B (U 0)) (e (Equiv A B))) (Path (U 0) A B))
  (lam (A B e) (line (i) (Glue B ((= i 0) A e) ((= i 1) B (identity-equivalence B))))))

; Transport along it is the equivalence's map, up to a path.
(def ua-transport
  (Pi ((A (U 0)) (B (U 0)) (e (Equiv A B)) (x A))
    (Path B (transp (i (at (ua A B e) i)) bot x) ((fst e) x)))
  (lam (A B e x)
    (path-from (lam (i) (at (ua A B e) i)) x ((fst e) x)
      (line (i) (glue ((fst e) x) ((= i 0) x) ((= i 1) ((fst e) x)))))))

; The canonical map from paths of types to equivalences (Book 2.10.1).
(def path-equivalence (Pi ((A (U 0)) (B (U 0)) (p (Path (U 0) A B))) (Equiv A B))
  (lam (A B p) (transp (i (Equiv A (at p i))) bot (identity-equivalence A))))

; ua of the identity is the constant path.
(def ua-identity (Pi ((A (U 0))) (Path (Path (U 0) A A) (ua A A (identity-equivalence A)) (line (i) A)))
  (lam (A)
    (line (j i)
      (Glue A ((or (= i 0) (= i 1) (= j 1)) A (identity-equivalence A))))))

(def path-equivalence-constant
  (Pi ((A (U 0))) (Path (Equiv A A) (path-equivalence A A (line (i) A)) (identity-equivalence A)))
  (lam (A) (transport-constant (Equiv A A) (identity-equivalence A))))

; The map of the canonical equivalence is transport, up to a path.
(def path-equivalence-map
  (Pi ((A (U 0)) (B (U 0)) (p (Path (U 0) A B)) (x A))
    (Path B ((fst (path-equivalence A B p)) x) (transp (i (at p i)) bot x)))
  (lam (A B p x)
    (line (k) (transp (i (at p i)) bot (transp (i A) (= k 1) x)))))

(def univalence-section
  (Pi ((A (U 0)) (B (U 0)) (e (Equiv A B))) (Path (Equiv A B) (path-equivalence A B (ua A B e)) e))
  (lam (A B e)
    (equal-equivalences A B (path-equivalence A B (ua A B e)) e
      (line (i) (lam (x)
        (at (compose B ((fst (path-equivalence A B (ua A B e))) x)
              (transp (i (at (ua A B e) i)) bot x) ((fst e) x)
              (path-equivalence-map A B (ua A B e) x)
              (ua-transport A B e x)) i))))))

(def univalence-retraction
  (Pi ((A (U 0)) (B (U 0)) (p (Path (U 0) A B)))
    (Path (Path (U 0) A B) (ua A B (path-equivalence A B p)) p))
  (lam (A)
    (path-induction (U 0) A
      (lam (B p) (Path (Path (U 0) A B) (ua A B (path-equivalence A B p)) p))
      (compose (Path (U 0) A A) (ua A A (path-equivalence A A (line (i) A)))
        (ua A A (identity-equivalence A)) (line (i) A)
        (line (k) (ua A A (at (path-equivalence-constant A) k)))
        (ua-identity A)))))

; The canonical map is an equivalence (Book 2.10.3).
(def univalence (Pi ((A (U 0)) (B (U 0))) (Equiv (Path (U 0) A B) (Equiv A B)))
  (lam (A B)
    (quasi-inverse (Path (U 0) A B) (Equiv A B) (path-equivalence A B) (ua A B)
      (univalence-section A B) (univalence-retraction A B))))

; Transport back along ua is the inverse map, up to a path.
(def ua-transport-back
  (Pi ((A (U 0)) (B (U 0)) (e (Equiv A B)) (y B))
    (Path A (transp (i (at (ua A B e) (rev i))) bot y) (inverse-map A B e y)))
  (lam (A B e y)
    (path-from (lam (i) (at (ua A B e) (rev i))) y (inverse-map A B e y)
      (line (i) (glue (at (section A B e y) (rev i)) ((= i 1) (inverse-map A B e y)) ((= i 0) y))))))

; The types that are equivalent to a type, with their equivalences, are
; contractible (CCHM 7.2): any of them is joined to the type itself by gluing,
; with unglue for the equivalence's map.
(def equivalences-contractible (Pi ((A (U 0))) (contractible (Sigma ((X (U 0))) (Equiv X A))))
  (lam (A)
    (pair (pair A (identity-equivalence A))
      (lam (v)
        (let ((glued (-> I (U 0))
                (lam (i) (Glue A ((= i 0) A (identity-equivalence A)) ((= i 1) (fst v) (snd v)))))
              (base (Pi ((i I)) (-> (glued i) A)) (lam (i b) (unglue b))))
          (line (i)
            (pair (glued i)
              (pair (base i)
                (at (proposition-line (lam (k) (is-equivalence (glued k) A (base k)))
                      (proposition-is-equivalence (fst v) A (fst (snd v)))
                      (snd (identity-equivalence A)) (snd (snd v))) i)))))))))
