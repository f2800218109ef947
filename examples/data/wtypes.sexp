; W-types: trees whose branching a family says (Book 5.3). The naturals are one
; of them, up to a path.
(data W ((A (U 0)) (B (-> A (U 0)))) (point sup ((a A) (f (-> (B a) (W A B))))))

(def Branch (-> Bool (U 0)) (lam (b) (elim (_ (U 0)) b (true Unit) (false Empty))))
(def NatW (U 0) (W Bool Branch))
(def zeroW NatW (sup false (lam (e) (elim (_ NatW) e))))
(def sucW (-> NatW NatW) (lam (n) (sup true (lam (_) n))))

(def from (-> NatW Nat)
  (lam (w) (elim (_ Nat) w ((sup a f h)
    ((elim (b (-> (-> (Branch b) Nat) Nat)) a (true (lam (h) (suc (h unit)))) (false (lam (h) 0))) h)))))
(def to (-> Nat NatW) (lam (n) (elim (_ NatW) n (zero zeroW) ((suc k h) (sucW h)))))
(normal (from (sucW (sucW zeroW))) 2)
(same NatW (to 2) (sucW (sucW zeroW)))
(differ NatW (to 2) (sucW zeroW))

(def from-to (Pi ((n Nat)) (Path Nat (from (to n)) n))
  (lam (n) (elim (n (Path Nat (from (to n)) n)) n (zero (line (_) 0)) ((suc k h) (line (i) (suc (at h i)))))))
(normal (from-to 5) (line (_) 5))

; a function out of Empty need not be the canonical one by definition, but is by a path
(def to-from (Pi ((w NatW)) (Path NatW (to (from w)) w))
  (lam (w) (elim (w (Path NatW (to (from w)) w)) w ((sup a f h)
    ((elim (b (Pi ((f (-> (Branch b) NatW)) (h (Pi ((y (Branch b))) (Path NatW (to (from (f y))) (f y)))))
                (Path NatW (to (from (sup b f))) (sup b f)))) a
      (true (lam (f h) (line (i) (sup true (lam (u) (at (h unit) i))))))
      (false (lam (f h) (line (i) (sup false (lam (e) (at (elim (e (Path NatW (elim (_ NatW) e) (f e))) e) i)))))))
     f h)))))
(same NatW (at (to-from (sucW zeroW)) 0) (sucW zeroW))

; transport goes under the function, and back along the branching
(assume A (-> I (U 0))) (assume B (Pi ((i I)) (-> (A i) (U 0)))) (assume a (A 0)) (assume f (-> (B 0 a) (W (A 0) (B 0))))
(normal (transp (i (W (A i) (B i))) bot (sup a f))
  (sup (transp (i (A i)) bot a)
       (lam (x) (transp (i (W (A i) (lam (y) (B i y)))) bot (f (transp (i (B (rev i) (tfill (i (A i)) bot a (rev i)))) bot x))))))
(reject (data V ((A (U 0)) (B (-> A (U 0)))) (point vsup ((a A) (f (-> (B a) (V A (lam (x) Unit))))))))
; the η-expansion of a parameter counts as the parameter
(data V2 ((A (U 0)) (B (-> A (U 0)))) (point v2sup ((a A) (f (-> (B a) (V2 A (lam (x) (B x))))))))
