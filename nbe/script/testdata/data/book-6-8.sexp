; HoTT Book, section 6.8. Lemma 6.8.2: maps out of a pushout are cocones: both
; maps and both round trips.
(data Pushout ((A (U 0)) (B (U 0)) (C (U 0)) (f (-> C A)) (g (-> C B)))
  (point left ((a A))) (point right ((b B))) (path push ((c C)) (i) ((= i 0) (left (f c))) ((= i 1) (right (g c)))))
(def Cocone (Pi ((A (U 0)) (B (U 0)) (C (U 0)) (f (-> C A)) (g (-> C B))) (-> (U 0) (U 0)))
  (lam (A B C f g E) (Sigma ((h (-> A E)) (k (-> B E))) (Pi ((c C)) (Path E (h (f c)) (k (g c)))))))
(assume A (U 0)) (assume B (U 0)) (assume C (U 0)) (assume f (-> C A)) (assume g (-> C B)) (assume E (U 0))
(def P (U 0) (Pushout A B C f g))
(def K (U 0) (Cocone A B C f g E))
(def to (-> (-> P E) K) (lam (t) (pair (lam (a) (t (left a))) (lam (b) (t (right b))) (lam (c) (line (i) (t (push c i)))))))
(def from (-> K (-> P E)) (lam (k x) (elim (_ E) x ((left a) ((fst k) a)) ((right b) ((fst (snd k)) b)) ((push c i) (at ((snd (snd k)) c) i)))))
(def to-from (Pi ((k K)) (Path K (to (from k)) k)) (lam (k) (line (_) k)))
(def from-to (Pi ((t (-> P E))) (Path (-> P E) (from (to t)) t))
  (lam (t) (line (j) (lam (x) (at (elim (x (Path E (from (to t) x) (t x))) x
    ((left a) (line (_) (t (left a)))) ((right b) (line (_) (t (right b)))) ((push c i) (line (_) (t (push c i))))) j)))))
(assume t (-> P E)) (assume k K)
(same K (to (from k)) k)
(differ (-> P E) (from (to t)) t)
(reject (def crossed (-> K (-> P E)) (lam (k x) (elim (_ E) x ((left a) ((fst k) a)) ((right b) ((fst (snd k)) b)) ((push c i) (at ((snd (snd k)) c) (rev i)))))))
