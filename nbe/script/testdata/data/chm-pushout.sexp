; CHM, "On Higher Inductive Types in Cubical Type Theory" (LICS 2018), section 3,
; pushouts, rule by rule (subsections cited from memory).
(data Pushout ((A (U 0)) (B (U 0)) (C (U 0)) (f (-> C A)) (g (-> C B)))
  (point left ((a A))) (point right ((b B))) (path push ((c C)) (i) ((= i 0) (left (f c))) ((= i 1) (right (g c)))))
; a line of spans
(assume A (-> I (U 0))) (assume B (-> I (U 0))) (assume C (-> I (U 0)))
(assume f (Pi ((i I)) (-> (C i) (A i)))) (assume g (Pi ((i I)) (-> (C i) (B i))))
(def P (-> I (U 0)) (lam (i) (Pushout (A i) (B i) (C i) (f i) (g i))))
(assume a (A 0)) (assume b (B 0)) (assume c (C 0)) (assume u (P 0)) (assume w (-> I (P 0)))

; push c 0 = left (f c), push c 1 = right (g c)
(same (P 0) (push c 0) (left (f 0 c)))
(same (P 0) (push c 1) (right (g 0 c)))
(differ (-> I (P 0)) (lam (i) (push c i)) (lam (i) (push c (rev i))))

; hcomp is a constructor: canonical, equal to the wall where a face holds, never pushed
(def h (-> I (P 0)) (lam (k) (hcomp (P 0) (w 0) ((= k 0) (j) (w j)))))
(same (P 0) (h 0) (w 1))
(differ (-> I (P 0)) h (lam (k) (w 0)))
(differ (P 0) (hcomp (P 0) (left a)) (left a))
(differ (P 0) (hcomp (P 0) (left a)) (left (hcomp (A 0) a)))

; elimination: computes on points and on push, commutes with composites over the filler
(assume D (-> (P 0) (U 0))) (assume dl (Pi ((a (A 0))) (D (left a)))) (assume dr (Pi ((b (B 0))) (D (right b))))
(assume dp (Pi ((c (C 0))) (PathOver (i (D (push c i))) (dl (f 0 c)) (dr (g 0 c)))))
(def e (Pi ((x (P 0))) (D x)) (lam (x) (elim (x (D x)) x ((left a) (dl a)) ((right b) (dr b)) ((push c i) (at (dp c) i)))))
(same (D (left a)) (e (left a)) (dl a))
(same (D (right b)) (e (right b)) (dr b))
(same (PathOver (i (D (push c i))) (dl (f 0 c)) (dr (g 0 c))) (line (i) (e (push c i))) (dp c))
(same (Pi ((k I)) (D (h k))) (lam (k) (e (h k)))
  (lam (k) (comp (j (D (hfill (P 0) (w 0) j ((= k 0) (j) (w j))))) (e (w 0)) ((= k 0) (j) (e (w j))))))
(reject (same (Pi ((k I)) (D (h k))) (lam (k) (e (h k))) (lam (k) (e (w 0)))))

; transport: on points through the argument; top is the identity; on composites inside
(same (P 1) (transp (i (P i)) bot (left a)) (left (transp (i (A i)) bot a)))
(same (P 1) (transp (i (P i)) bot (right b)) (right (transp (i (B i)) bot b)))
(same (P 0) (transp (i (P 0)) top u) u)
(same (-> I (P 1)) (lam (k) (transp (i (P i)) bot (h k)))
  (lam (k) (hcomp (P 1) (transp (i (P i)) bot (w 0)) ((= k 0) (j) (transp (i (P i)) bot (w j))))))
; transport of push: push of the transport, corrected at both ends so that they are the
; transports of left (f c) and right (g c); the correction stands in the normal form
(def carried (-> I (P 1)) (lam (k) (transp (i (P i)) bot (ann (push c k) (P 0)))))
(normal carried (lam (k) (hcomp (Pushout (A 1) (B 1) (C 1) (lam (x) (f 1 x)) (lam (x) (g 1 x)))
  (push (transp (i (C i)) bot c) k)
  ((= k 0) (j) (left (transp (i (A (max i (rev j)))) (= j 0) (f (rev j) (transp (i (C (min i (rev j)))) (= j 1) c)))))
  ((= k 1) (j) (right (transp (i (B (max i (rev j)))) (= j 0) (g (rev j) (transp (i (C (min i (rev j)))) (= j 1) c))))))))
(same (P 1) (carried 0) (left (transp (i (A i)) bot (f 0 c))))
(same (P 1) (carried 1) (right (transp (i (B i)) bot (g 0 c))))
(differ (P 1) (carried 0) (left (f 1 (transp (i (C i)) bot c))))
; with a face on which the line is constant there is one more wall
(def carried-on (-> I I (P 1)) (lam (l k) (transp (i (P (max i l))) (= l 1) (ann (push (transp (i (C (min i l))) (= l 0) c) k) (P l)))))
(same (-> I (P 1)) (carried-on 1) (lam (k) (push (transp (i (C i)) bot c) k)))
(same (-> I (P 1)) (carried-on 0) carried)
(same (-> I (P 1)) (lam (l) (carried-on l 0)) (lam (l) (left (transp (i (A (max i l))) (= l 1) (f l (transp (i (C (min i l))) (= l 0) c))))))
(normal carried-on (lam (l k) (hcomp (Pushout (A 1) (B 1) (C 1) (lam (x) (f 1 x)) (lam (x) (g 1 x)))
  (push (transp (i (C (max i l))) (= l 1) (transp (i (C (min i l))) (= l 0) c)) k)
  ((= l 1) (j) (push (transp (i (C i)) bot c) k))
  ((= k 0) (j) (left (transp (i (A (max i (rev j) l))) (or (= l 1) (= j 0)) (f (max (rev j) l)
    (transp (i (C (max (min i (rev j)) l))) (or (= l 1) (= j 1)) (transp (i (C (min i l))) (= l 0) c))))))
  ((= k 1) (j) (right (transp (i (B (max i (rev j) l))) (or (= l 1) (= j 0)) (g (max (rev j) l)
    (transp (i (C (max (min i (rev j)) l))) (or (= l 1) (= j 1)) (transp (i (C (min i l))) (= l 0) c)))))))))
; also along a line that does not vary: nothing is regular
(differ (-> I (P 0)) (lam (k) (transp (_ (P 0)) bot (ann (push c k) (P 0)))) (lam (k) (push c k)))
; the correction does not depend on what f happens to be, only on the declaration
(data Same ((X (U 0))) (point one ((x X))) (path loops ((x X)) (i) ((= i 0) (one x)) ((= i 1) (one x))))
(data Ident ((X (U 0)) (k (-> X X))) (point uno ((x X))) (path laps ((x X)) (i) ((= i 0) (uno x)) ((= i 1) (uno (k x)))))
(def id (Pi ((X (U 0))) (-> X X)) (lam (X x) x))
(normal (ann (lam (k) (transp (i (Same (A i))) bot (ann (loops a k) (Same (A 0))))) (-> I (Same (A 1)))) (lam (k) (loops (transp (i (A i)) bot a) k)))
(normal (ann (lam (k) (transp (i (Ident (A i) (id (A i)))) bot (ann (laps a k) (Ident (A 0) (id (A 0)))))) (-> I (Ident (A 1) (id (A 1)))))
  (lam (k) (hcomp (Ident (A 1) (lam (x) x)) (laps (transp (i (A i)) bot a) k)
    ((= k 0) (j) (uno (transp (i (A (max i (rev j)))) (= j 0) (transp (i (A (min i (rev j)))) (= j 1) a))))
    ((= k 1) (j) (uno (transp (i (A (max i (rev j)))) (= j 0) (transp (i (A (min i (rev j)))) (= j 1) a)))))))
