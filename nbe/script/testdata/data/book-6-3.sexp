; HoTT Book, section 6.3: the interval as a data type.
(data Interval () (point left ()) (point right ()) (path segment () (i) ((= i 0) left) ((= i 1) right)))
; Lemma 6.3.1: the interval is contractible
(def contractible (Sigma ((c Interval)) (Pi ((x Interval)) (Path Interval c x)))
  (pair right (lam (x) (elim (x (Path Interval right x)) x
    (left (line (j) (segment (rev j)))) (right (line (_) right)) ((segment i) (line (j) (segment (max i (rev j)))))))))
(same (Path Interval right right) ((snd contractible) right) (line (_) right))
; Lemma 6.3.2: function extensionality follows from the interval
(def funext (Pi ((A (U 0)) (B (U 0)) (f (-> A B)) (g (-> A B)) (h (Pi ((x A)) (Path B (f x) (g x))))) (Path (-> A B) f g))
  (lam (A B f g h) (line (i) ((ann (lam (t x) (elim (_ B) t (left (f x)) (right (g x)) ((segment j) (at (h x) j)))) (-> Interval A B)) (segment i)))))
(assume A (U 0)) (assume B (U 0)) (assume f (-> A B)) (assume g (-> A B)) (assume h (Pi ((x A)) (Path B (f x) (g x))))
(same (Path (-> A B) f g) (funext A B f g h) (line (i) (lam (x) (at (h x) i))))
(reject (same (Path (-> A B) f f) (funext A B f g h) (line (i) f)))
