; The pushout of f and g (Book 6.8, CHM 3): the boundary of push applies f and g,
; which do not commute with transport by definition, so a composite corrects it.
(data Pushout ((A (U 0)) (B (U 0)) (C (U 0)) (f (-> C A)) (g (-> C B)))
  (point left ((a A))) (point right ((b B))) (path push ((c C)) (i) ((= i 0) (left (f c))) ((= i 1) (right (g c)))))
(show Pushout)

(def out (Pi ((A (U 0)) (B (U 0)) (C (U 0)) (f (-> C A)) (g (-> C B)) (X (U 0)) (h (-> A X)) (k (-> B X))
              (p (Pi ((c C)) (Path X (h (f c)) (k (g c)))))) (-> (Pushout A B C f g) X))
  (lam (A B C f g X h k p x) (elim (_ X) x ((left a) (h a)) ((right b) (k b)) ((push c i) (at (p c) i)))))

; two stretches of the quay that share the berths between them
(def Shared (U 0) (Pushout Nat Nat Bool (lam (c) (elim (_ Nat) c (true 7) (false 8))) (lam (c) (elim (_ Nat) c (true 0) (false 1)))))
(def add7 (-> Nat Nat) (lam (n) (elim (_ Nat) n (zero 7) ((suc k h) (suc h)))))
(def number (-> Shared Nat) (lam (x) (elim (_ Nat) x ((left a) a) ((right b) (add7 b))
  ((push c i) (at (elim (c (Path Nat (elim (_ Nat) c (true 7) (false 8)) (add7 (elim (_ Nat) c (true 0) (false 1))))) c (true (line (_) 7)) (false (line (_) 8))) i)))))
(normal (number (right 3)) 10)
(def crossing (Path Shared (left 8) (right 1)) (line (i) (push false i)))
(normal (ann (line (i) (number (at crossing i))) (Path Nat 8 8)) (line (_) 8))
(differ Shared (left 8) (right 1))

; transport of push along a line of spans: the correction is visible
(assume A (-> I (U 0))) (assume B (-> I (U 0))) (assume C (-> I (U 0)))
(assume f (Pi ((i I)) (-> (C i) (A i)))) (assume g (Pi ((i I)) (-> (C i) (B i)))) (assume c (C 0))
(def carried (Path (Pushout (A 1) (B 1) (C 1) (f 1) (g 1)) (left (transp (i (A i)) bot (f 0 c))) (right (transp (i (B i)) bot (g 0 c))))
  (line (k) (transp (i (Pushout (A i) (B i) (C i) (f i) (g i))) bot (ann (push c k) (Pushout (A 0) (B 0) (C 0) (f 0) (g 0))))))
(normal carried (line (k) (hcomp (Pushout (A 1) (B 1) (C 1) (lam (x) (f 1 x)) (lam (x) (g 1 x)))
  (push (transp (i (C i)) bot c) k)
  ((= k 0) (j) (left (transp (i (A (max i (rev j)))) (= j 0) (f (rev j) (tfill (i (C i)) bot c (rev j))))))
  ((= k 1) (j) (right (transp (i (B (max i (rev j)))) (= j 0) (g (rev j) (tfill (i (C i)) bot c (rev j)))))))))
(differ (-> I (Pushout (A 1) (B 1) (C 1) (f 1) (g 1))) (lam (k) (at carried k)) (lam (k) (push (transp (i (C i)) bot c) k)))
(reject (def other (Path (Pushout (A 1) (B 1) (C 1) (f 1) (g 1)) (left (f 1 (transp (i (C i)) bot c))) (right (g 1 (transp (i (C i)) bot c))))
  (line (k) (transp (i (Pushout (A i) (B i) (C i) (f i) (g i))) bot (ann (push c k) (Pushout (A 0) (B 0) (C 0) (f 0) (g 0)))))))
(reject (def swapped (Pi ((A (U 0)) (B (U 0)) (C (U 0)) (f (-> C A)) (g (-> C B))) (-> (Pushout A B C f g) (Pushout B A C g f)))
  (lam (A B C f g x) (elim (_ (Pushout B A C g f)) x ((left a) (right a)) ((right b) (left b)) ((push c i) (push c i))))))
(def swap (Pi ((A (U 0)) (B (U 0)) (C (U 0)) (f (-> C A)) (g (-> C B))) (-> (Pushout A B C f g) (Pushout B A C g f)))
  (lam (A B C f g x) (elim (_ (Pushout B A C g f)) x ((left a) (right a)) ((right b) (left b)) ((push c i) (push c (rev i))))))
