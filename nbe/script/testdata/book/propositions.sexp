; HoTT Book, chapter 3: sets, propositions, contractible types. The numbers are the Book's.

; 3.1.1, 3.3.1, 3.11.1
(def isSet (-> (U 0) (U 0)) (lam (A) (Pi ((x A) (y A) (p (Path A x y)) (q (Path A x y))) (Path (Path A x y) p q))))
(def isProp (-> (U 0) (U 0)) (lam (A) (Pi ((x A) (y A)) (Path A x y))))
(def isContr (-> (U 0) (U 0)) (lam (A) (Sigma ((c A)) (Pi ((x A)) (Path A c x)))))

; 3.1.2
(def unit-is-a-set (isSet Unit) (lam (x y p q) (line (_) p)))

; 3.1.5
(def product-of-sets (Pi ((A (U 0)) (B (U 0)) (a (isSet A)) (b (isSet B))) (isSet (* A B)))
  (lam (A B a b x y p q) (line (k i) (pair
    (at (a (fst x) (fst y) (line (i) (fst (at p i))) (line (i) (fst (at q i)))) k i)
    (at (b (snd x) (snd y) (line (i) (snd (at p i))) (line (i) (snd (at q i)))) k i)))))

; 3.1.6
(def functions-into-sets (Pi ((A (U 0)) (B (-> A (U 0))) (b (Pi ((x A)) (isSet (B x))))) (isSet (Pi ((x A)) (B x))))
  (lam (A B b f g p q) (line (k i) (lam (x) (at (b x (f x) (g x) (line (i) ((at p i) x)) (line (i) ((at q i) x))) k i)))))

; 3.3.2
(def inhabited-proposition-is-contractible (Pi ((A (U 0)) (f (isProp A)) (a A)) (isContr A)) (lam (A f a) (pair a (f a))))

; 3.3.4
(def prop-is-set (Pi ((A (U 0)) (f (isProp A))) (isSet A))
  (lam (A f x y p q) (line (i j) (hcomp A x
    ((= j 0) (k) (at (f x x) k)) ((= j 1) (k) (at (f x y) k))
    ((= i 0) (k) (at (f x (at p j)) k)) ((= i 1) (k) (at (f x (at q j)) k))))))

; 3.3.5
(def isProp-is-prop (Pi ((A (U 0))) (isProp (isProp A)))
  (lam (A f g) (line (i) (lam (x y) (at (prop-is-set A f x y (f x y) (g x y)) i)))))
(def isSet-is-prop (Pi ((A (U 0))) (isProp (isSet A)))
  (lam (A f g) (line (i) (lam (x y p q)
    (at (prop-is-set (Path A x y) (f x y) p q (f x y p q) (g x y p q)) i)))))

; 3.6.2
(def functions-into-propositions (Pi ((A (U 0)) (B (-> A (U 0))) (b (Pi ((x A)) (isProp (B x))))) (isProp (Pi ((x A)) (B x))))
  (lam (A B b f g) (line (i) (lam (x) (at (b x (f x) (g x)) i)))))

; 3.11.4
(def isContr-is-prop (Pi ((A (U 0))) (isProp (isContr A)))
  (lam (A c d) (line (i) (pair (at ((snd c) (fst d)) i) (lam (y) (line (j) (hcomp A (fst c)
    ((= i 0) (k) (at ((snd c) (at ((snd c) y) j)) k))
    ((= i 1) (k) (at ((snd c) (at ((snd d) y) j)) k))
    ((= j 0) (k) (at ((snd c) (at ((snd c) (fst d)) i)) k))
    ((= j 1) (k) (at ((snd c) y) k)))))))))

; 3.11.6
(def functions-into-contractible (Pi ((A (U 0)) (P (-> A (U 0))) (c (Pi ((x A)) (isContr (P x))))) (isContr (Pi ((x A)) (P x))))
  (lam (A P c) (pair (lam (x) (fst (c x))) (lam (f) (line (i) (lam (x) (at ((snd (c x)) (f x)) i)))))))

; 3.11.8, contractible singletons
(def singletons (Pi ((A (U 0)) (a A)) (isContr (Sigma ((x A)) (Path A a x))))
  (lam (A a) (pair (pair a (line (_) a)) (lam (z) (line (i) (pair (at (snd z) i) (line (j) (at (snd z) (min i j)))))))))
(same (Pi ((A (U 0)) (a A)) (Sigma ((x A)) (Path A a x))) (lam (A a) (fst (singletons A a))) (lam (A a) (pair a (line (_) a))))
