; Berths left and right of the crane, and re-labelling them.
(load "../library/univalence.sexp")

(def Berth (U 0) (Sum Nat Nat))
(def across (-> Berth Berth)
  (lam (b) (elim (x Berth) b ((inl n) (inr n)) ((inr n) (inl n)))))
(def across-twice (Pi ((b Berth)) (Path Berth (across (across b)) b))
  (lam (b) (elim (x (Path Berth (across (across x)) x)) b
    ((inl n) (line (i) (inl n)))
    ((inr n) (line (i) (inr n))))))
(def crossing (Equiv Berth Berth)
  (quasi-inverse Berth Berth across across across-twice across-twice))
(def relabel (Path (U 0) Berth Berth) (ua Berth Berth crossing))

; Once over, back, and over again.
(def twice (Path (U 0) Berth Berth) (compose (U 0) Berth Berth Berth relabel relabel))
(normal (transp (i (at relabel i)) bot (inl 1)) (inr 1))
(normal (transp (i (at twice i)) bot (inl 1)) (inl 1))
(normal (transp (i (at relabel (rev i))) bot (inr 7)) (inl 7))

; A lamp at every berth: what is known of the berths moves with them.
(def Lamps (-> (U 0) (U 0)) (lam (B) (-> B Bool)))
(def left-lit (Lamps Berth) (lam (b) (elim (x Bool) b ((inl n) true) ((inr n) false))))
(def right-lit (Lamps Berth) (transp (i (Lamps (at relabel i))) bot left-lit))
(normal (right-lit (inr 4)) true)
(normal (right-lit (inl 4)) false)

; Left is never right.
(def side (-> Berth (U 0)) (lam (b) (elim (x (U 0)) b ((inl n) Unit) ((inr n) Empty))))
(def left-is-not-right (Pi ((m Nat) (n Nat)) (-> (Path Berth (inl m) (inr n)) Empty))
  (lam (m n p) (transp (i (side (at p i))) bot unit)))
(show left-is-not-right)
(reject (def mixed (Path Berth (inl 0) (inr 0)) (line (i) (inl 0))))
