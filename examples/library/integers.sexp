; The integers, with successor as an equivalence (HoTT Book 8.1). pos n is n and
; negsuc n is -1-n, so that every integer is written once.
(load "univalence.sexp")

(data Int () (point pos ((n Nat))) (point negsuc ((n Nat))))

(def successor (-> Int Int)
  (lam (z) (elim (x Int) z
    ((pos n) (pos (suc n)))
    ((negsuc n) (elim (x Int) n (zero (pos 0)) ((suc m h) (negsuc m)))))))

(def predecessor (-> Int Int)
  (lam (z) (elim (x Int) z
    ((pos n) (elim (x Int) n (zero (negsuc 0)) ((suc m h) (pos m))))
    ((negsuc n) (negsuc (suc n))))))

(def successor-predecessor (Pi ((z Int)) (Path Int (successor (predecessor z)) z))
  (lam (z) (elim (x (Path Int (successor (predecessor x)) x)) z
    ((pos n) (elim (m (Path Int (successor (predecessor (pos m))) (pos m))) n
      (zero (line (i) (pos 0))) ((suc m h) (line (i) (pos (suc m))))))
    ((negsuc n) (line (i) (negsuc n))))))

(def predecessor-successor (Pi ((z Int)) (Path Int (predecessor (successor z)) z))
  (lam (z) (elim (x (Path Int (predecessor (successor x)) x)) z
    ((pos n) (line (i) (pos n)))
    ((negsuc n) (elim (m (Path Int (predecessor (successor (negsuc m))) (negsuc m))) n
      (zero (line (i) (negsuc 0))) ((suc m h) (line (i) (negsuc (suc m)))))))))

(def successor-equivalence (Equiv Int Int)
  (quasi-inverse Int Int successor predecessor successor-predecessor predecessor-successor))

; Turning by one: the path of types from Int to Int along the successor.
(def turn (Path (U 0) Int Int) (ua Int Int successor-equivalence))

(def negate (-> Int Int)
  (lam (z) (elim (x Int) z
    ((pos n) (elim (x Int) n (zero (pos 0)) ((suc m h) (negsuc m))))
    ((negsuc n) (pos (suc n))))))

(def add (-> Int Int Int)
  (lam (a b) (elim (x Int) b
    ((pos n) (elim (m Int) n (zero a) ((suc m h) (successor h))))
    ((negsuc n) (elim (m Int) n (zero (predecessor a)) ((suc m h) (predecessor h)))))))

(def multiply (-> Int Int Int)
  (lam (a b) (elim (x Int) b
    ((pos n) (elim (m Int) n (zero (pos 0)) ((suc m h) (add h a))))
    ((negsuc n) (elim (m Int) n (zero (negate a)) ((suc m h) (add h (negate a))))))))
