; Cable drums: the turns of a drum are loops of a circle, and winding counts them.
(load "../library/circle.sexp")

(def two-on Loops (then turn-once turn-once))
(def one-off Loops (back turn-once))
(normal (winding two-on) (pos 2))
(normal (winding (then two-on (then one-off one-off))) (pos 0))
(normal (winding (turns (pos 25))) (pos 25))
(normal (winding (back (turns (pos 3)))) (negsuc 2))

; Turning on and off again is not standing still by definition, but by a path.
(differ Loops (then turn-once one-off) rest)
(same Circle (at two-on 0) base)
(same Circle (at two-on 1) base)

; A drum whose cable is marked: a data type of our own, with a path constructor
; for the moment where the mark passes, and a count of how often it has passed.
(data Drum ((Mark (U 0)))
  (point still ())
  (path passing ((m Mark)) (i) ((or (= i 0) (= i 1)) still)))
(show Drum)
(def marks-to-circle (Pi ((M (U 0))) (-> (Drum M) Circle))
  (lam (M d) (elim (x Circle) d (still base) ((passing m i) (loop i)))))
(def passed (-> (Path (Drum Nat) still still) Int)
  (lam (p) (winding (line (i) (marks-to-circle Nat (at p i))))))
(normal (passed (line (i) (passing 7 i))) (pos 1))
(normal (passed (line (i) (passing 7 (rev i)))) (negsuc 0))

; A drum cannot be asked for both ways of composing.
(reject (data Jammed () (composition strict) (point stopped ()) (path slip () (i) ((or (= i 0) (= i 1)) stopped))))
