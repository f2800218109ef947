; Binary trees with a label at each node: which crate hangs where in a load.
(data Tree ((A (U 0))) (point leaf ()) (point node ((l (Tree A)) (a A) (r (Tree A)))))

(def size (Pi ((A (U 0))) (-> (Tree A) Nat))
  (lam (A t) (elim (_ Nat) t (leaf 0)
    ((node l a r hl hr) (elim (_ Nat) hl (zero (suc hr)) ((suc _ h) (suc h)))))))
(def mirror (Pi ((A (U 0))) (-> (Tree A) (Tree A)))
  (lam (A t) (elim (_ (Tree A)) t (leaf leaf) ((node l a r hl hr) (node hr a hl)))))
(def fold (Pi ((A (U 0)) (B (U 0))) (-> B (-> B A B B) (Tree A) B))
  (lam (A B z f t) (elim (_ B) t (leaf z) ((node l a r hl hr) (f hl a hr)))))

(def cargo (Tree Nat) (node (node leaf 1 leaf) 2 (node leaf 3 (node leaf 4 leaf))))
(normal (size Nat cargo) 4)
(normal (mirror Nat cargo) (node (node (node leaf 4 leaf) 3 leaf) 2 (node leaf 1 leaf)))
(same (Tree Nat) (mirror Nat (mirror Nat cargo)) cargo)
(differ (Tree Nat) (mirror Nat cargo) cargo)
(normal (fold Nat Nat 0 (lam (l a r) a) cargo) 2)

; to mirror twice is the identity, by a path that elimination finds
(def mirror-mirror (Pi ((A (U 0)) (t (Tree A))) (Path (Tree A) (mirror A (mirror A t)) t))
  (lam (A t) (elim (s (Path (Tree A) (mirror A (mirror A s)) s)) t
    (leaf (line (_) leaf))
    ((node l a r hl hr) (line (i) (node (at hl i) a (at hr i)))))))
(normal (mirror-mirror Nat cargo) (line (_) (node (node leaf 1 leaf) 2 (node leaf 3 (node leaf 4 leaf)))))
(assume A (U 0)) (assume t (Tree A))
(differ (Tree A) (mirror A (mirror A t)) t)
(reject (def wrong (Pi ((t (Tree A))) (Path (Tree A) (mirror A t) t)) (lam (t) (elim (s (Path (Tree A) (mirror A s) s)) t
    (leaf (line (_) leaf))
    ((node l a r hl hr) (line (i) (node (at hl i) a (at hr i))))))))

; both subtrees and the label are composed
(assume a A) (assume b A) (assume p (Path A a b)) (assume q (Path (Tree A) t leaf))
(def moved (-> I (Tree A)) (lam (k) (hcomp (Tree A) (node t a leaf) ((= k 1) (i) (node (at q i) (at p i) leaf)))))
(normal moved (lam (k) (node (hcomp (Tree A) t ((= k 1) (i) (at q i))) (hcomp A a ((= k 1) (i) (at p i))) leaf)))
(normal (moved 1) (node leaf b leaf))
(reject (def mixed (-> I (Tree A)) (lam (k) (hcomp (Tree A) (node t a leaf) ((= k 1) (i) leaf)))))
