; The join of two types (Book 6.8): their points, and a path from each of the
; one to each of the other. Its boundary is constructors of variables: transport commutes.
(data Join ((A (U 0)) (B (U 0))) (point of-left ((a A))) (point of-right ((b B)))
  (path bridge ((a A) (b B)) (i) ((= i 0) (of-left a)) ((= i 1) (of-right b))))

(def turn (Pi ((A (U 0)) (B (U 0))) (-> (Join A B) (Join B A)))
  (lam (A B x) (elim (_ (Join B A)) x ((of-left a) (of-right a)) ((of-right b) (of-left b)) ((bridge a b i) (bridge b a (rev i))))))
(def turn-turn (Pi ((A (U 0)) (B (U 0)) (x (Join A B))) (Path (Join A B) (turn B A (turn A B x)) x))
  (lam (A B x) (elim (x (Path (Join A B) (turn B A (turn A B x)) x)) x
    ((of-left a) (line (_) (of-left a))) ((of-right b) (line (_) (of-right b))) ((bridge a b i) (line (_) (bridge a b i))))))
; the join with the unit type is contractible
(def cone (Pi ((A (U 0)) (x (Join A Unit))) (Path (Join A Unit) (of-right unit) x))
  (lam (A x) (elim (x (Path (Join A Unit) (of-right unit) x)) x
    ((of-left a) (line (j) (bridge a unit (rev j)))) ((of-right u) (line (_) (of-right u)))
    ((bridge a u i) (line (j) (bridge a u (max i (rev j))))))))
(assume A (-> I (U 0))) (assume B (-> I (U 0))) (assume a (A 0)) (assume b (B 0))
(normal (ann (line (k) (transp (i (Join (A i) (B i))) bot (ann (bridge a b k) (Join (A 0) (B 0)))))
             (Path (Join (A 1) (B 1)) (of-left (transp (i (A i)) bot a)) (of-right (transp (i (B i)) bot b))))
  (line (k) (bridge (transp (i (A i)) bot a) (transp (i (B i)) bot b) k)))
(differ (Join (A 0) (B 0)) (of-left a) (of-right b))
(same (Join (B 0) (A 0)) (turn (A 0) (B 0) (of-left a)) (of-right a))
(reject (def straight (Pi ((A (U 0)) (B (U 0))) (-> (Join A B) (Join B A)))
  (lam (A B x) (elim (_ (Join B A)) x ((of-left a) (of-right a)) ((of-right b) (of-left b)) ((bridge a b i) (bridge b a i))))))
