; A morning on the cargo quay: one script that exercises each type.
; Run it with: go run ./examples/script examples/quay/quay.sexp
(load "../library/circle.sexp")

; -- Crates are counted by natural numbers -----------------------------------
; (add and multiply of the library are those of the integers.)
(def put (-> Nat Nat Nat)
  (lam (m n) (elim (x Nat) m (zero n) ((suc k h) (suc h)))))
(def stack (-> Nat Nat Nat)
  (lam (rows columns) (elim (x Nat) rows (zero 0) ((suc k h) (put columns h)))))
(normal (stack 12 (put 3 4)) 84)
(same Nat (put 1000000 1) 1000001)

; Adding no crates on the right changes nothing: by definition only for a count
; that is known, and by a path for every count.
(assume crates Nat)
(differ Nat (put crates 0) crates)
(def put-none (Pi ((n Nat)) (Path Nat (put n 0) n))
  (lam (n) (elim (x (Path Nat (put x 0) x)) n
    (zero (line (i) 0))
    ((suc k h) (line (i) (suc (at h i)))))))
(blocked (put crates 0))

; -- Berths lie left or right of the crane: a sum ----------------------------
(def Berth (U 0) (Sum Nat Nat))
(def left (-> Nat Berth) (lam (n) (inl n)))
(def right (-> Nat Berth) (lam (n) (inr n)))
(def across (-> Berth Berth)
  (lam (b) (elim (x Berth) b ((inl n) (inr n)) ((inr n) (inl n)))))
(same Berth (across (left 2)) (right 2))
(def across-twice (Pi ((b Berth)) (Path Berth (across (across b)) b))
  (lam (b) (elim (x (Path Berth (across (across x)) x)) b
    ((inl n) (line (i) (inl n)))
    ((inr n) (line (i) (inr n))))))

; -- A load is a pair: where it stands, and how many crates it has -----------
(def Load (U 0) (* Berth Nat))
(def swing (-> Load Load) (lam (l) (pair (across (fst l)) (snd l))))
(normal (swing (pair (ann (inl 4) Berth) 30)) (pair (inr 4) 30))
(same (-> Load Load) (lam (l) l) (lam (l) (pair (fst l) (snd l))))   ; η

; -- Re-labelling the berths is a path between types -------------------------
; Crossing over is its own inverse, so it is an equivalence, and univalence
; makes a path of it. Transport along the path re-labels.
(def crossing (Equiv Berth Berth)
  (quasi-inverse Berth Berth across across across-twice across-twice))
(def relabel (Path (U 0) Berth Berth) (ua Berth Berth crossing))
(normal (transp (i (at relabel i)) bot (left 3)) (inr 3))
; What is built from berths is re-labelled with them: here a load, and a plan
; that says for each berth how many crates to put there.
(normal (transp (i (* (at relabel i) Nat)) bot (pair (left 3) 12)) (pair (inr 3) 12))
(def plan (-> Berth Nat) (lam (b) (elim (x Nat) b ((inl n) n) ((inr n) (stack 2 n)))))
(normal ((transp (i (-> (at relabel i) Nat)) bot plan) (left 5)) 10)

; -- A cable drum is a circle: turns of the drum are its loops ---------------
(def unwound Loops (then (then turn-once turn-once) (back turn-once)))
(normal (winding unwound) (pos 1))
(differ Loops unwound turn-once)                   ; equal up to a path only
(normal (winding (turns (negsuc 2))) (negsuc 2))
(same Circle (at unwound 1) base)

; -- Truth values and the type with one element ------------------------------
(def heavy (-> Nat Bool) (lam (n) (elim (x Bool) n (zero false) ((suc k h) true))))
(same Bool (heavy 3) true)
(assume checked Unit)
(same Unit checked unit)                           ; η: there is only one
(def nothing-in-an-empty-hold (-> Empty Load) (lam (e) (elim (x Load) e)))

; -- Composites and transports, with a face that decides later ---------------
(assume A (U 0)) (assume a A)
(differ A (transp (i A) bot a) a)                  ; no regularity
(def halted (-> I A) (lam (k) (transp (i A) (= k 1) a)))
(same A (halted 1) a)
(blocked (halted 0))
(def closed (-> I I Nat)
  (lam (k l) (hcomp Nat 7 ((= k 0) (j) 7) ((= l 1) (j) 7))))
(same Nat (closed 0 0) 7)

; -- Functions are equal when they agree everywhere (HoTT Book 2.9.3) --------
(def agree-everywhere
  (Pi ((f (-> Nat Nat)) (g (-> Nat Nat)) (h (Pi ((n Nat)) (Path Nat (f n) (g n))))) (Path (-> Nat Nat) f g))
  (lam (f g h) (line (i) (lam (n) (at (h n) i)))))
(show (agree-everywhere (lam (n) (put n 0)) (lam (n) n) put-none))

; -- Universes ---------------------------------------------------------------
(same (U 2) (U 1) (U 1))
(show (-> Berth (U 0)))

; -- What must be refused ----------------------------------------------------
(reject (def lost Nat (left 2)))
(reject (same Nat (put 2 2) 5))
(reject (def torn (Path Nat 0 1) (line (i) 0)))
