; The interval as a data type (Book 6.3): two ends and a segment between them.
(data Interval () (point left ()) (point right ()) (path segment () (i) ((= i 0) left) ((= i 1) right)))

(def seg (Path Interval left right) (line (i) (segment i)))
(def into (Pi ((A (U 0)) (a A) (b A)) (-> (Path A a b) Interval A))
  (lam (A a b p x) (elim (_ A) x (left a) (right b) ((segment i) (at p i)))))
(assume A (U 0)) (assume a A) (assume b A) (assume p (Path A a b))
(same A (into A a b p left) a)
(same (Path A a b) (line (i) (into A a b p (at seg i))) p)
(differ Interval left right)

; contractible: every point is joined to the left end
(def center (Pi ((x Interval)) (Path Interval left x))
  (lam (x) (elim (x (Path Interval left x)) x
    (left (line (_) left)) (right seg) ((segment i) (line (j) (segment (min i j)))))))
(normal (center right) (line (j) (segment j)))
(reject (def center2 (Pi ((x Interval)) (Path Interval left x))
  (lam (x) (elim (x (Path Interval left x)) x
    (left (line (_) left)) (right seg) ((segment i) (line (j) (segment (max i j))))))))

; composites are canonical, and eliminators commute with them
(def short (Path Interval left left) (line (k) (hcomp Interval (segment k) ((= k 0) (j) left) ((= k 1) (j) (segment (rev j))))))
(normal short (line (k) (hcomp Interval (segment k) ((= k 0) (j) left) ((= k 1) (j) (segment (rev j))))))
(normal (ann (line (k) (into A a b p (at short k))) (Path A a a))
  (line (k) (hcomp A (transp (_ A) bot (at p k)) ((= k 0) (j) (transp (_ A) (= j 1) a)) ((= k 1) (j) (transp (_ A) (= j 1) (at p (rev j)))))))
(reject (def apart (-> Interval Nat) (lam (x) (elim (_ Nat) x (left 0) (right 1) ((segment i) 0)))))
