; Levels of the circle (HoTT Book 8.1.10 and 7.2: its loops are a set, as the
; integers are), and loop spaces (2.1.8).
(load "loops.sexp")
(def statement-loops-set (Pi ((p (Path Circle base base)) (q (Path Circle base base)) (a (Path (Path Circle base base) p q)) (b (Path (Path Circle base base) p q)))
  (Path (Path (Path Circle base base) p q) a b)) loops-set)
(def statement-circle (Pi ((x Circle) (y Circle)) (set (Path Circle x y))) circle-groupoid)
(def statement-second (Pi ((a (Path (Path Circle base base) (line (i) base) (line (i) base)))
    (b (Path (Path Circle base base) (line (i) base) (line (i) base)))) (Path (second-loop-space Circle base) a b)) second-loops-proposition)
(same (U 2) (loop-space Circle base) (Path Circle base base))
(same (U 2) (second-loop-space Circle base) (Path (Path Circle base base) rest rest))
; The joining paths keep their ends: winding numbers read them off.
(same (Path Circle base base)
  (at (at (loops-set (turns (pos 2)) (turns (pos 2)) (line (k) (turns (pos 2))) (line (k) (turns (pos 2)))) 0) 1)
  (turns (pos 2)))
