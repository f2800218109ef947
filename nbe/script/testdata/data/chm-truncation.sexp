; CHM, "On Higher Inductive Types in Cubical Type Theory" (LICS 2018), section 3,
; propositional truncation, a recursive declaration, rule by rule (subsections
; cited from memory).
(data Trunc ((A (U 0))) (point some ((a A))) (path squash ((x (Trunc A)) (y (Trunc A))) (i) ((= i 0) x) ((= i 1) y)))
(assume A (-> I (U 0))) (assume a (A 0)) (assume x (Trunc (A 0))) (assume y (Trunc (A 0))) (assume w (-> I (Trunc (A 0))))
(def T (-> I (U 0)) (lam (i) (Trunc (A i))))
; squash x y 0 = x, squash x y 1 = y
(same (T 0) (squash x y 0) x)
(same (T 0) (squash x y 1) y)
(differ (-> I (T 0)) (lam (i) (squash x x i)) (lam (i) x))
(differ (-> I (T 0)) (lam (i) (squash x y (rev i))) (lam (i) (squash y x i)))
; elimination gets the eliminations of x and y as hypotheses
(assume D (-> (T 0) (U 0))) (assume d (Pi ((a (A 0))) (D (some a))))
(assume s (Pi ((x (T 0)) (y (T 0)) (u (D x)) (v (D y))) (PathOver (i (D (squash x y i))) u v)))
(def e (Pi ((x (T 0))) (D x)) (lam (t) (elim (x (D x)) t ((some a) (d a)) ((squash x y hx hy i) (at (s x y hx hy) i)))))
(same (D (some a)) (e (some a)) (d a))
(same (PathOver (i (D (squash x y i))) (e x) (e y)) (line (i) (e (squash x y i))) (s x y (e x) (e y)))
(same (PathOver (i (D (squash (some a) y i))) (d a) (e y)) (line (i) (e (squash (some a) y i))) (s (some a) y (d a) (e y)))
(reject (def e2 (Pi ((x (T 0))) (D x)) (lam (t) (elim (x (D x)) t ((some a) (d a)) ((squash x y hx hy i) (at (s x x hx hx) i))))))
; composites: canonical; eliminators commute
(def h (-> I (T 0)) (lam (k) (hcomp (T 0) (w 0) ((= k 0) (j) (w j)))))
(same (Pi ((k I)) (D (h k))) (lam (k) (e (h k)))
  (lam (k) (comp (j (D (hfill (T 0) (w 0) j ((= k 0) (j) (w j))))) (e (w 0)) ((= k 0) (j) (e (w j))))))
(differ (T 0) (hcomp (T 0) (some a)) (some (hcomp (A 0) a)))
; transport: through the arguments, recursive ones too; squash commutes with it, without a correction
(same (T 1) (transp (i (T i)) bot (some a)) (some (transp (i (A i)) bot a)))
(normal (ann (lam (k) (transp (i (T i)) bot (ann (squash x y k) (T 0)))) (-> I (T 1)))
  (lam (k) (squash (transp (i (Trunc (A i))) bot x) (transp (i (Trunc (A i))) bot y) k)))
(same (-> I (T 1)) (lam (k) (transp (i (T i)) bot (ann (squash (some a) y k) (T 0)))) (lam (k) (squash (some (transp (i (A i)) bot a)) (transp (i (T i)) bot y) k)))
(same (-> I (T 1)) (lam (k) (transp (i (T i)) bot (h k))) (lam (k) (hcomp (T 1) (transp (i (T i)) bot (w 0)) ((= k 0) (j) (transp (i (T i)) bot (w j))))))
(same (T 0) (transp (i (T 0)) top x) x)
(differ (T 0) (transp (i (T 0)) bot x) x)
(normal (transp (i (T i)) bot x) (transp (i (Trunc (A i))) bot x))
; suspension: its meridians commute as well
(data Susp ((X (U 0))) (point north ()) (point south ()) (path merid ((x X)) (i) ((= i 0) north) ((= i 1) south)))
(normal (ann (lam (k) (transp (i (Susp (A i))) bot (ann (merid a k) (Susp (A 0))))) (-> I (Susp (A 1)))) (lam (k) (merid (transp (i (A i)) bot a) k)))
