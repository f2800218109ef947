; Lists, a strict data type with a parameter: composition is pushed through
; constructors, transport goes through them argument by argument.
(data List ((A (U 0))) (point nil ()) (point cons ((x A) (xs (List A)))))

(def append (Pi ((A (U 0))) (-> (List A) (List A) (List A)))
  (lam (A xs ys) (elim (_ (List A)) xs (nil ys) ((cons x xs h) (cons x h)))))
(def length (Pi ((A (U 0))) (-> (List A) Nat))
  (lam (A xs) (elim (_ Nat) xs (nil 0) ((cons x xs h) (suc h)))))
(def map (Pi ((A (U 0)) (B (U 0))) (-> (-> A B) (List A) (List B)))
  (lam (A B f xs) (elim (_ (List B)) xs (nil nil) ((cons x xs h) (cons (f x) h)))))
(def reverse (Pi ((A (U 0))) (-> (List A) (List A)))
  (lam (A xs) (elim (_ (List A)) xs (nil nil) ((cons x xs h) (append A h (cons x nil))))))

; the crates that stand at three berths
(def berths (List Nat) (cons 4 (cons 0 (cons 9 nil))))
(normal (length Nat berths) 3)
(normal (append Nat berths (cons 1 nil)) (cons 4 (cons 0 (cons 9 (cons 1 nil)))))
(normal (map Nat Nat (lam (n) (suc n)) berths) (cons 5 (cons 1 (cons 10 nil))))
(normal (reverse Nat berths) (cons 9 (cons 0 (cons 4 nil))))
(same (List Nat) (append Nat nil berths) berths)

; to append nothing is the identity up to a path, not by definition
(assume xs (List Nat))
(differ (List Nat) (append Nat xs nil) xs)
(def append-nil (Pi ((A (U 0)) (xs (List A))) (Path (List A) (append A xs nil) xs))
  (lam (A xs) (elim (l (Path (List A) (append A l nil) l)) xs
    (nil (line (i) nil))
    ((cons x xs h) (line (i) (cons x (at h i)))))))
(def append-assoc (Pi ((A (U 0)) (xs (List A)) (ys (List A)) (zs (List A)))
                    (Path (List A) (append A (append A xs ys) zs) (append A xs (append A ys zs))))
  (lam (A xs ys zs) (elim (l (Path (List A) (append A (append A l ys) zs) (append A l (append A ys zs)))) xs
    (nil (line (i) (append A ys zs)))
    ((cons x xs h) (line (i) (cons x (at h i)))))))
(normal (append-nil Nat berths) (line (_) (cons 4 (cons 0 (cons 9 nil)))))
(reject (def wrong (Pi ((A (U 0)) (xs (List A))) (Path (List A) (append A xs nil) xs)) (lam (A xs) (line (_) xs))))

; composition is pushed through the constructor that base and wall share
(assume A (U 0)) (assume a A) (assume b A) (assume p (Path A a b))
(def pushed (-> I (List A)) (lam (k) (hcomp (List A) (cons a nil) ((= k 0) (i) (cons (at p i) nil)))))
(normal pushed (lam (k) (cons (hcomp A a ((= k 0) (i) (at p i))) nil)))
(normal (pushed 0) (cons b nil))
; a composite of what is no constructor waits
(assume q (Path (List A) nil nil))
(def waiting (-> I (List A)) (lam (k) (hcomp (List A) nil ((= k 0) (i) (at q i)))))
(normal waiting (lam (k) (hcomp (List A) nil ((= k 0) (i) (at q i)))))
(normal (waiting 0) nil)

; transport, also along a line that does not vary
(assume B (U 0)) (assume r (Path (U 0) A B))
(normal (transp (i (List (at r i))) bot (cons a nil)) (cons (transp (i (at r i)) bot a) nil))
(normal (transp (i (List A)) bot (cons a nil)) (cons (transp (i A) bot a) nil))
(differ (List A) (transp (i (List A)) bot (cons a nil)) (cons a nil))
(assume as (List A))
(normal (transp (i (List (at r i))) bot as) (transp (i (List (at r i))) bot as))
(normal (transp (i (List Nat)) bot (cons 3 nil)) (cons 3 nil))

; the head of a list is asked for with something else to give
(def first (-> (List Nat) Nat) (lam (xs) (elim (_ Nat) xs (nil 0) ((cons x xs h) x))))
(normal (first berths) 4)
(reject (normal (first berths) 0))
(reject (def bad (-> (List Nat) Nat) (lam (xs) (elim (_ Nat) xs (nil 0)))))
(reject (data Bush ((A (U 0))) (point bush ((a A) (bs (Bush (Bush A)))))))
