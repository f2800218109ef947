; The Hopf fibration (HoTT Book 6.5, 8.5).
(load "suspension.sexp")

; The fibers over the suspended circle are circles;
; walking around the meridians turns the fiber once.
(same (U 0) (hopf north) Circle)
(same (U 0) (hopf south) Circle)
(same (Pi ((a Circle)) (-> I (U 0))) (lam (a i) (hopf (merid a i))) (lam (a i) (at (ua Circle Circle (rotate-equivalence a)) i)))
(same (-> Circle Circle) (rotate base) (lam (b) b))
(normal hopf-degree (pos 1))
(normal (winding (line (i) (rotate (loop i) base))) (pos 1))
(normal (winding (line (i) (rotate base (loop i)))) (pos 1))
(normal (winding (line (i) (rotate (loop i) (loop i)))) (pos 2))
(normal (winding (line (i) (rotate (loop i) (loop (rev i))))) (pos 0))
