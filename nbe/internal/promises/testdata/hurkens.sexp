; Girard's paradox as made shorter by Hurkens, "A simplification of Girard's
; paradox" (TLCA 1995): with a universe in itself there is a type of all
; well-founded things, which is well-founded itself, and so Empty is inhabited.
; Its proof reduces for ever.
(def Power (-> (U 0) (U 0)) (lam (S) (-> S (U 0))))
(def Uni (U 0) (Pi ((X (U 0))) (-> (-> (Power (Power X)) X) (Power (Power X)))))
(def tau (-> (Power (Power Uni)) Uni) (lam (t X f p) (t (lam (x) (p (f (x X f)))))))
(def sigma (-> Uni (Power (Power Uni))) (lam (s) (s Uni tau)))
(def Delta (Power Uni)
  (lam (y) (-> (Pi ((p (Power Uni))) (-> (sigma y p) (p (tau (sigma y))))) Empty)))
(def Omega Uni (tau (lam (p) (Pi ((x Uni)) (-> (sigma x p) (p x))))))
(def Founded (U 0) (Pi ((p (Power Uni))) (-> (Pi ((x Uni)) (-> (sigma x p) (p x))) (p Omega))))
(def founded Founded (lam (p h) (h Omega (lam (x) (h (tau (sigma x)))))))
(def unfounded (-> Founded Empty)
  (lam (z)
    (z Delta
       (lam (x h k) (k Delta h (lam (p) (k (lam (y) (p (tau (sigma y))))))))
       (lam (p) (z (lam (y) (p (tau (sigma y)))))))))
(def paradox Empty (unfounded founded))
