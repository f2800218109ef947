; The integers in two ways: with two signs that share no zero, a strict type, and
; with two zeros and a path between them, which makes composites formal.
(data Integer () (point below ((n Nat))) (point from ((n Nat)))) ; below n is -(n+1)

(def succ (-> Integer Integer) (lam (z) (elim (_ Integer) z
  ((below n) (elim (_ Integer) n (zero (from 0)) ((suc k _) (below k)))) ((from n) (from (suc n))))))
(def pred (-> Integer Integer) (lam (z) (elim (_ Integer) z
  ((below n) (below (suc n))) ((from n) (elim (_ Integer) n (zero (below 0)) ((suc k _) (from k)))))))
(def succ-pred (Pi ((z Integer)) (Path Integer (succ (pred z)) z)) (lam (z) (elim (z (Path Integer (succ (pred z)) z)) z
  ((below n) (line (_) (below n)))
  ((from n) (elim (n (Path Integer (succ (pred (from n))) (from n))) n (zero (line (_) (from 0))) ((suc k _) (line (_) (from (suc k)))))))))
(def pred-succ (Pi ((z Integer)) (Path Integer (pred (succ z)) z)) (lam (z) (elim (z (Path Integer (pred (succ z)) z)) z
  ((from n) (line (_) (from n)))
  ((below n) (elim (n (Path Integer (pred (succ (below n))) (below n))) n (zero (line (_) (below 0))) ((suc k _) (line (_) (below (suc k)))))))))
(normal (succ (succ (below 0))) (from 1))
(normal (pred (from 0)) (below 0))
(assume z Integer)
(differ Integer (succ (pred z)) z)
(def add (-> Integer Integer Integer) (lam (a b) (elim (_ Integer) a
  ((from n) (elim (_ Integer) n (zero b) ((suc k h) (succ h))))
  ((below n) (elim (_ Integer) n (zero (pred b)) ((suc k h) (pred h)))))))
(normal (add (from 7) (below 9)) (below 2))
(normal (add (below 3) (from 10)) (from 6))

; two zeros and a path: the height of the crane's hook above and below the quay
(data Height () (point up ((n Nat))) (point down ((n Nat))) (path quay () (i) ((= i 0) (up 0)) ((= i 1) (down 0))))
(def raise (-> Height Height) (lam (h) (elim (_ Height) h
  ((up n) (up (suc n)))
  ((down n) (elim (_ Height) n (zero (up 1)) ((suc k _) (down k))))
  ((quay i) (up 1)))))
(normal (raise (quay 0)) (up 1))
(normal (raise (down 3)) (down 2))
(def raised (Path Height (up 1) (up 1)) (line (i) (raise (quay i))))
(normal raised (line (_) (up 1)))
(def opposite (-> Height Height) (lam (h) (elim (_ Height) h ((up n) (down n)) ((down n) (up n)) ((quay i) (quay (rev i))))))
(def opposite-opposite (Pi ((h Height)) (Path Height (opposite (opposite h)) h)) (lam (h) (elim (h (Path Height (opposite (opposite h)) h)) h
  ((up n) (line (_) (up n))) ((down n) (line (_) (down n))) ((quay i) (line (_) (quay i))))))
(def sign (-> Height Integer) (lam (h) (elim (_ Integer) h ((up n) (from n)) ((down n) (elim (_ Integer) n (zero (from 0)) ((suc k _) (below k)))) ((quay i) (from 0)))))
(normal (sign (down 4)) (below 3))
; composites of heights are canonical
(normal (ann (hcomp Height (up 2)) Height) (hcomp Height (up 2)))
(differ Height (hcomp Height (up 2)) (up 2))
(normal (sign (hcomp Height (up 2))) (from 2)) ; composition in the integers is strict
(differ Height (up 0) (down 0))
(reject (def wrong (-> Height Nat) (lam (h) (elim (_ Nat) h ((up n) n) ((down n) (suc n)) ((quay i) 0)))))
(reject (data Strictly () (composition strict) (point up2 ((n Nat))) (path zero2 () (i) ((= i 0) (up2 0)) ((= i 1) (up2 1)))))
