; Which path constructors commute with transport (CHM, "On Higher Inductive Types
; in Cubical Type Theory", LICS 2018, section 3): those whose boundary is built
; from arguments, dimensions and constructors that commute themselves. It is
; decided on the declaration, and either way the ends are the transports of the ends.
(data List ((X (U 0))) (point nil ()) (point cons ((x X) (xs (List X)))))
(assume A (-> I (U 0))) (assume a (A 0)) (assume n Nat) (assume l (List Nat)) (assume m (List (A 0)))

; constructors of other types, where transport goes through them
(data Tag ((A (U 0))) (point tag ((n Nat) (b Bool) (u Unit) (a A)))
  (path same-tag ((a A) (n Nat)) (i) ((= i 0) (tag n true unit a)) ((= i 1) (tag (suc n) false unit a))))
(def tags (-> I (Tag (A 1))) (lam (k) (transp (i (Tag (A i))) bot (ann (same-tag a n k) (Tag (A 0))))))
(normal tags (lam (k) (same-tag (transp (i (A i)) bot a) n k)))
(same (Tag (A 1)) (tags 0) (transp (i (Tag (A i))) bot (ann (tag n true unit a) (Tag (A 0)))))
(same (Tag (A 1)) (tags 1) (transp (i (Tag (A i))) bot (ann (tag (suc n) false unit a) (Tag (A 0)))))
(data Heap ((A (U 0))) (point put ((l (List A)))) (path add ((x A) (l (List A))) (i) ((= i 0) (put (cons x l))) ((= i 1) (put l))))
(def heaps (-> I (Heap (A 1))) (lam (k) (transp (i (Heap (A i))) bot (ann (add a m k) (Heap (A 0))))))
(normal heaps (lam (k) (add (transp (i (A i)) bot a) (transp (i (List (A i))) bot m) k)))
(same (Heap (A 1)) (heaps 0) (transp (i (Heap (A i))) bot (ann (put (cons a m)) (Heap (A 0)))))

; a constructor of a type without parameters stays as it is under transport, what
; it holds does not when it stands alone: here the correction is needed
(data Crate () (point crate ((l (List Nat)))))
(data Stack ((A (U 0))) (point on ((c Crate) (a A))) (path shift ((l (List Nat)) (a A)) (i) ((= i 0) (on (crate l) a)) ((= i 1) (on (crate nil) a))))
(def stacks (-> I (Stack (A 1))) (lam (k) (transp (i (Stack (A i))) bot (ann (shift l a k) (Stack (A 0))))))
(same (Stack (A 1)) (stacks 0) (transp (i (Stack (A i))) bot (ann (on (crate l) a) (Stack (A 0)))))
(same (Stack (A 1)) (stacks 0) (on (crate l) (transp (i (A i)) bot a)))
(differ (Stack (A 1)) (on (crate l) (transp (i (A i)) bot a)) (on (crate (transp (i (List Nat)) bot l)) (transp (i (A i)) bot a)))
(differ (-> I (Stack (A 1))) stacks (lam (k) (shift (transp (i (List Nat)) bot l) (transp (i (A i)) bot a) k)))

; the η-expansion of an argument counts as the argument
(data Fun ((A (U 0))) (point fn ((f (-> Nat A)) (p (* Nat A)) (q (* Unit A))))
  (path turn ((f (-> Nat A)) (p (* Nat A)) (q (* Unit A))) (i)
    ((= i 0) (fn (lam (n) (f n)) (pair (fst p) (snd p)) q)) ((= i 1) (fn f p (pair unit (snd q))))))
(assume f (-> Nat (A 0))) (assume p (* Nat (A 0))) (assume q (* Unit (A 0)))
(normal (ann (lam (k) (transp (i (Fun (A i))) bot (ann (turn f p q k) (Fun (A 0))))) (-> I (Fun (A 1))))
  (lam (k) (turn (lam (n) (transp (i (A i)) bot (f n))) (pair (fst p) (transp (i (A i)) bot (snd p))) (pair unit (transp (i (A i)) bot (snd q))) k)))

; each of these selects the correction: an application, a path at a dimension, an
; elimination, a composite, a parameter, an earlier constructor that is corrected
(data E1 ((X (U 0)) (g (-> X X))) (point e1 ((x X))) (path p1 ((x X)) (i) ((or (= i 0) (= i 1)) (e1 (g x)))))
(data E2 ((X (U 0))) (point e2 ((x X))) (path p2 ((x X) (y X) (r (Path X x y))) (i j) ((= i 0) (e2 (at r j)))))
(data E3 ((X (U 0))) (point e3 ((x X))) (path p3 ((x X) (y X) (b Bool)) (i) ((= i 0) (e3 (elim (_ X) b (true x) (false y))))))
(data E4 ((X (U 0))) (point e4 ((x X))) (path p4 ((x X)) (i) ((= i 0) (hcomp (E4 X) (e4 x)))))
(data E5 ((X (U 0)) (x0 X)) (point e5 ((x X))) (path p5 () (i) ((= i 0) (e5 x0))))
(data E6 ((X (U 0)) (g (-> X X))) (point e6 ((x X))) (path p6 ((x X)) (i) ((= i 0) (e6 (g x)))) (path r6 ((x X)) (i j) ((= i 0) (p6 x j))))
(assume g (Pi ((i I)) (-> (A i) (A i)))) (assume b (A 0)) (assume r (Path (A 0) a b)) (assume a0 (Pi ((i I)) (A i)))
(def t (Pi ((D (-> I (U 0)))) (-> (-> I I (D 0)) (-> I I (D 1)))) (lam (D d k l) (transp (i (D i)) bot (d k l))))
(differ (-> I I (E1 (A 1) (g 1))) (t (lam (i) (E1 (A i) (g i))) (lam (k l) (p1 a k))) (lam (k l) (p1 (transp (i (A i)) bot a) k)))
(differ (-> I I (E2 (A 1))) (t (lam (i) (E2 (A i))) (lam (k l) (p2 a b r k l)))
  (lam (k l) (p2 (transp (i (A i)) bot a) (transp (i (A i)) bot b) (transp (i (Path (A i) (tfill (i (A i)) bot a i) (tfill (i (A i)) bot b i))) bot r) k l)))
(differ (-> I I (E3 (A 1))) (t (lam (i) (E3 (A i))) (lam (k l) (p3 a b true k))) (lam (k l) (p3 (transp (i (A i)) bot a) (transp (i (A i)) bot b) true k)))
(differ (-> I I (E4 (A 1))) (t (lam (i) (E4 (A i))) (lam (k l) (p4 a k))) (lam (k l) (p4 (transp (i (A i)) bot a) k)))
(differ (-> I I (E5 (A 1) (a0 1))) (t (lam (i) (E5 (A i) (a0 i))) (lam (k l) (p5 k))) (lam (k l) (p5 k)))
(differ (-> I I (E6 (A 1) (g 1))) (t (lam (i) (E6 (A i) (g i))) (lam (k l) (r6 a k l))) (lam (k l) (r6 (transp (i (A i)) bot a) k l)))
; and its ends are right
(same (-> I (E1 (A 1) (g 1))) (t (lam (i) (E1 (A i) (g i))) (lam (k l) (p1 a k)) 0) (lam (_) (transp (i (E1 (A i) (g i))) bot (ann (e1 (g 0 a)) (E1 (A 0) (g 0))))))
(same (-> I (E2 (A 1))) (t (lam (i) (E2 (A i))) (lam (k l) (p2 a b r k l)) 0) (lam (l) (transp (i (E2 (A i))) bot (ann (e2 (at r l)) (E2 (A 0))))))
(same (-> I (E3 (A 1))) (t (lam (i) (E3 (A i))) (lam (k l) (p3 a b true k)) 0) (lam (_) (e3 (transp (i (A i)) bot a))))
(same (-> I (E4 (A 1))) (t (lam (i) (E4 (A i))) (lam (k l) (p4 a k)) 0) (lam (_) (hcomp (E4 (A 1)) (e4 (transp (i (A i)) bot a)))))
(same (-> I (E5 (A 1) (a0 1))) (t (lam (i) (E5 (A i) (a0 i))) (lam (k l) (p5 k)) 0) (lam (_) (e5 (transp (i (A i)) bot (a0 0)))))
(same (-> I (E6 (A 1) (g 1))) (t (lam (i) (E6 (A i) (g i))) (lam (k l) (r6 a k l)) 0) (lam (l) (transp (i (E6 (A i) (g i))) bot (ann (p6 a l) (E6 (A 0) (g 0))))))
