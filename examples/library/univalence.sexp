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
