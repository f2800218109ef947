; Universes of data types (Book 1.3, 9.9; CHM 3): a data type lives where its
; arguments' types do, itself counting 0 and parameters not counting.
(data Phantom ((A (U 5))) (point ghost ()))
(def small (U 0) (Phantom (U 4)))
(data Box ((A (U 1))) (point box ((x A))))
(def box-level (U 1) (Box Nat))
(reject (def box-small (U 0) (Box Nat)))
(def open (-> (Box (U 0)) (U 0)) (lam (b) (elim (_ (U 0)) b ((box x) x))))
(same (U 0) (open (box Nat)) Nat)
(data Tower () (point ground ((A (U 2)))) (point above ((A (U 0)) (f (-> A Tower)))))
(def tower-level (U 3) Tower)
(reject (def tower-small (U 2) Tower))
; an argument of a Path between types counts as the types do
(data Ways () (point way ((A (U 0)) (B (U 0)) (p (Path (U 0) A B)))))
(def ways-level (U 1) Ways)
(reject (def ways-small (U 0) Ways))
; path constructors and their boundaries at a level above 0
(data Types ((A (U 1))) (point none ()) (point also ((X (U 0)) (t (Types A)))) (path again ((X (U 0)) (x (Types A))) (i) ((= i 0) (also X (also X x))) ((= i 1) (also X x))))
(def types-level (U 1) (Types (U 0)))
(same (-> I (Types Nat)) (lam (k) (again Bool none k)) (lam (k) (again Bool none k)))
(normal (ann (lam (k) (transp (i (Types Nat)) bot (ann (again Bool none k) (Types Nat)))) (-> I (Types Nat))) (lam (k) (again Bool none k)))
; what it is too large for, it does not hold as an element, in a boundary or an end either
(reject (data Itself () (point held ((X (U 0)))) (path back () (i) ((= i 0) (held Itself)) ((= i 1) (held Nat)))))
(reject (data Bad () (point bad ((X (U 0)))) (point worse ((d (Path Bad (bad Bad) (bad Bad)))))))
(def Id (-> (U 0) (U 0)) (lam (X) X))
(data Fine () (point fine ((x (Id Fine)))))
(reject (data Coarse () (point coarse ((X (U 0)))) (point again2 ((x (Id Coarse))))))
; recursion into a universe gives families, at any level
(def Family (-> Nat (U 1)) (lam (n) (elim (_ (U 1)) n (zero (U 0)) ((suc k h) (-> (U 0) h)))))
(def three (Family 2) (lam (A B) (* A B)))
