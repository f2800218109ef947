; Booleans: negation is an equivalence, and with it the path of types that swaps
; two berths of the quay (CCHM 2015, section 7; HoTT Book 2.12, 3.1.9).
(load "univalence.sexp")

(def not (-> Bool Bool) (lam (b) (elim (x Bool) b (true false) (false true))))

(def not-not (Pi ((b Bool)) (Path Bool (not (not b)) b))
  (lam (b) (elim (x (Path Bool (not (not x)) x)) b (true (line (i) true)) (false (line (i) false)))))

(def not-equivalence (Equiv Bool Bool) (quasi-inverse Bool Bool not not not-not not-not))

(def negation (Path (U 0) Bool Bool) (ua Bool Bool not-equivalence))

; Negation twice is the identity, as maps, as equivalences and as paths of types.
(def not-twice (Path (Equiv Bool Bool)
    (compose-equivalences Bool Bool Bool not-equivalence not-equivalence) (identity-equivalence Bool))
  (equal-equivalences Bool Bool (compose-equivalences Bool Bool Bool not-equivalence not-equivalence)
    (identity-equivalence Bool)
    (line (i) (lam (b) (at (not-not b) i)))))

; A path of types along which transport is the map of an equivalence is ua of it.
(def ua-unique
  (Pi ((A (U 0)) (B (U 0)) (e (Equiv A B)) (p (Path (U 0) A B))
      (h (Pi ((x A)) (Path B (transp (i (at p i)) bot x) ((fst e) x)))))
    (Path (Path (U 0) A B) p (ua A B e)))
  (lam (A B e p h)
    (compose (Path (U 0) A B) p (ua A B (path-equivalence A B p)) (ua A B e)
      (inverse (Path (U 0) A B) (ua A B (path-equivalence A B p)) p (univalence-retraction A B p))
      (line (k) (ua A B
        (at (equal-equivalences A B (path-equivalence A B p) e
              (line (l) (lam (x)
                (at (compose B ((fst (path-equivalence A B p)) x) (transp (i (at p i)) bot x) ((fst e) x)
                      (path-equivalence-map A B p x) (h x)) l)))) k))))))

; Transport along a composite of two such paths applies one map after the other.
(def ua-transport-composite
  (Pi ((A (U 0)) (B (U 0)) (C (U 0)) (e (Equiv A B)) (d (Equiv B C)) (x A))
    (Path C (transp (i (at (compose (U 0) A B C (ua A B e) (ua B C d)) i)) bot x) ((fst d) ((fst e) x))))
  (lam (A B C e d x)
    (compose C
      (transp (i (at (compose (U 0) A B C (ua A B e) (ua B C d)) i)) bot x)
      (transp (i (at (ua B C d) i)) bot (transp (i (at (ua A B e) i)) bot x))
      ((fst d) ((fst e) x))
      (inverse C
        (transp (i (at (ua B C d) i)) bot (transp (i (at (ua A B e) i)) bot x))
        (transp (i (at (compose (U 0) A B C (ua A B e) (ua B C d)) i)) bot x)
        (transport-composite (U 0) (lam (X) X) A B C (ua A B e) (ua B C d) x))
      (compose C
        (transp (i (at (ua B C d) i)) bot (transp (i (at (ua A B e) i)) bot x))
        (transp (i (at (ua B C d) i)) bot ((fst e) x))
        ((fst d) ((fst e) x))
        (line (m) (transp (i (at (ua B C d) i)) bot (at (ua-transport A B e x) m)))
        (ua-transport B C d ((fst e) x))))))

; ua sends composites to composites (Book 2.10).
(def ua-composite
  (Pi ((A (U 0)) (B (U 0)) (C (U 0)) (e (Equiv A B)) (d (Equiv B C)))
    (Path (Path (U 0) A C) (compose (U 0) A B C (ua A B e) (ua B C d)) (ua A C (compose-equivalences A B C e d))))
  (lam (A B C e d)
    (ua-unique A C (compose-equivalences A B C e d) (compose (U 0) A B C (ua A B e) (ua B C d))
      (ua-transport-composite A B C e d))))

; The square of negation is the identity path: 2-torsion, as a square of types.
(def negation-torsion
  (Path (Path (U 0) Bool Bool) (compose (U 0) Bool Bool Bool negation negation) (line (i) Bool))
  (compose (Path (U 0) Bool Bool)
    (compose (U 0) Bool Bool Bool negation negation)
    (ua Bool Bool (compose-equivalences Bool Bool Bool not-equivalence not-equivalence))
    (line (i) Bool)
    (ua-composite Bool Bool Bool not-equivalence not-equivalence)
    (compose (Path (U 0) Bool Bool)
      (ua Bool Bool (compose-equivalences Bool Bool Bool not-equivalence not-equivalence))
      (ua Bool Bool (identity-equivalence Bool))
      (line (i) Bool)
      (line (k) (ua Bool Bool (at not-twice k)))
      (ua-identity Bool))))
