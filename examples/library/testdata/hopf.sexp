; The Hopf fibration (HoTT Book 6.5, 8.5).
(load "join.sexp")

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
; The total space and the join of two circles: points go back and forth unchanged,
; and a bridge goes to a path over the meridian of its angle.
(same (-> Circle Circle-join) (lam (x) (total-join (join-total (left x)))) (lam (x) (left x)))
(same (-> Circle Circle-join) (lam (y) (total-join (join-total (right y)))) (lam (y) (right y)))
(same (-> Circle hopf-total) (lam (x) (join-total (total-join (pair north x)))) (lam (x) (pair north x)))
(same (-> Circle hopf-total) (lam (y) (join-total (total-join (pair south y)))) (lam (y) (pair south y)))
(same (-> Circle Circle I Sphere2) (lam (x y k) (hopf-map (join-total (bridge x y k)))) (lam (x y k) (merid (angle x y) k)))
(normal (degree (lam (x) (angle base x)) (line (_) base)) (pos 1))
(normal (degree (lam (x) (angle x base)) (line (_) base)) (negsuc 0))
(def statement-retract (Pi ((p (Join Circle Circle))) (Path (Join Circle Circle) (total-join (join-total p)) p)) total-join-total)
