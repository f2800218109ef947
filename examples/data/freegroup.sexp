; The free group on a type, with paths for both inverses, and the integers as the
; one with a single generator (Book 6.10, 6.11). Its boundaries are constructors
; of arguments, so transport commutes with all of them.
(data Free ((A (U 0))) (point one ()) (point times ((a A) (w (Free A)))) (point back ((a A) (w (Free A))))
  (path undo ((a A) (w (Free A))) (i) ((= i 0) (times a (back a w))) ((= i 1) w))
  (path redo ((a A) (w (Free A))) (i) ((= i 0) (back a (times a w))) ((= i 1) w)))

(def multiply (Pi ((A (U 0))) (-> (Free A) (Free A) (Free A)))
  (lam (A v w) (elim (_ (Free A)) v (one w) ((times a v h) (times a h)) ((back a v h) (back a h))
    ((undo a v h i) (undo a h i)) ((redo a v h i) (redo a h i)))))
(assume A (U 0)) (assume a A) (assume b A)
(normal (multiply A (times a (back b one)) (times a one)) (times a (back b (times a one))))
(def right-one (Pi ((A (U 0)) (w (Free A))) (Path (Free A) (multiply A w one) w))
  (lam (A w) (elim (w (Path (Free A) (multiply A w one) w)) w
    (one (line (_) one)) ((times a v h) (line (j) (times a (at h j)))) ((back a v h) (line (j) (back a (at h j))))
    ((undo a v h i) (line (j) (undo a (at h j) i))) ((redo a v h i) (line (j) (redo a (at h j) i))))))
(def cancelled (Path (Free A) (times a (back a (times b one))) (times b one)) (line (i) (undo a (times b one) i)))
(differ (Free A) (times a (back a one)) one)

(assume L (-> I (U 0))) (assume l (L 0)) (assume w (Free (L 0)))
(normal (ann (line (k) (transp (i (Free (L i))) bot (ann (undo l w k) (Free (L 0)))))
    (Path (Free (L 1)) (times (transp (i (L i)) bot l) (back (transp (i (L i)) bot l) (transp (i (Free (L i))) bot w))) (transp (i (Free (L i))) bot w)))
  (line (k) (undo (transp (i (L i)) bot l) (transp (i (Free (L i))) bot w) k)))

; the integers: moves of the crane by one berth, either way
(data Moves () (point stay ()) (point forth ((z Moves))) (point aft ((z Moves)))
  (path forth-aft ((z Moves)) (i) ((= i 0) (forth (aft z))) ((= i 1) z))
  (path aft-forth ((z Moves)) (i) ((= i 0) (aft (forth z))) ((= i 1) z)))
(def opposite (-> Moves Moves) (lam (z) (elim (_ Moves) z (stay stay) ((forth z h) (aft h)) ((aft z h) (forth h))
  ((forth-aft z h i) (aft-forth h i)) ((aft-forth z h i) (forth-aft h i)))))
(def opposite-opposite (Pi ((z Moves)) (Path Moves (opposite (opposite z)) z))
  (lam (z) (elim (z (Path Moves (opposite (opposite z)) z)) z (stay (line (_) stay))
    ((forth z h) (line (j) (forth (at h j)))) ((aft z h) (line (j) (aft (at h j))))
    ((forth-aft z h i) (line (j) (forth-aft (at h j) i))) ((aft-forth z h i) (line (j) (aft-forth (at h j) i))))))
(normal (opposite (forth (forth (aft stay)))) (aft (aft (forth stay))))
; a drum's turns as moves: the loop followed by its reverse is undone by a square
(def winding (-> Moves (Path Circle base base)) (lam (z) (elim (_ (Path Circle base base)) z
  (stay (line (_) base))
  ((forth z h) (line (k) (hcomp Circle (at h k) ((= k 0) (j) base) ((= k 1) (j) (loop j)))))
  ((aft z h) (line (k) (hcomp Circle (at h k) ((= k 0) (j) base) ((= k 1) (j) (loop (rev j))))))
  ((forth-aft z h i) (line (k) (hcomp Circle
    (hfill Circle (at h k) (rev i) ((= k 0) (j) base) ((= k 1) (j) (loop (rev j))))
    ((= k 0) (j) base) ((= k 1) (j) (loop (max j i))) ((= i 1) (j) (at h k)))))
  ((aft-forth z h i) (line (k) (hcomp Circle
    (hfill Circle (at h k) (rev i) ((= k 0) (j) base) ((= k 1) (j) (loop j)))
    ((= k 0) (j) base) ((= k 1) (j) (loop (min (rev j) (rev i)))) ((= i 1) (j) (at h k))))))))
(same (Path Circle base base) (winding (forth-aft stay 1)) (line (_) base))
(reject (def count (-> Moves Nat) (lam (z) (elim (_ Nat) z (stay 0) ((forth z h) (suc h)) ((aft z h) (suc h)) ((forth-aft z h i) h) ((aft-forth z h i) h)))))
