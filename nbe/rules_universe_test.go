package nbe_test

import "testing"

// Universes: what lies in which, and ≤. Each refusal stands beside the same form
// with one thing changed that is taken.

func TestRuleUniverseLevels(t *testing.T) {
	// HoTT Book 2013, 1.3: U n : U (n+1), and types go up
	accepted(t, `
		(def u (U 1) (U 0)) (def u2 (U 5) (U 0)) (def u3 (U 2) (U 1))
		(reject (def v (U 0) (U 0))) (reject (def v (U 1) (U 1)))
		(def pi (U 1) (-> (U 0) Nat)) (reject (def pi0 (U 0) (-> (U 0) Nat)))
		(def pi2 (U 1) (-> Nat (U 0))) (reject (def pi3 (U 0) (-> Nat (U 0))))
		(def sigma (U 2) (Sigma ((A (U 1))) Nat)) (reject (def sigma0 (U 1) (Sigma ((A (U 1))) Nat)))
		(def path1 (U 1) (Path (U 0) Nat Nat)) (reject (def path0 (U 0) (Path (U 0) Nat Nat)))
		(def interval (U 0) (-> I Nat)) (def unit-type (U 0) Unit) (def circle (U 0) Circle)
		(data Label () (point label ((A (U 0)) (a A))))
		(def labels (U 1) Label) (reject (def labels0 (U 0) Label))
		(data Berth ((A (U 1))) (point berth ((n Nat))))
		(def berths (U 0) (Berth (U 0)))`)
}

func TestRuleUniverseInclusion(t *testing.T) {
	// functions: equal domains and ≤ codomains; pairs: ≤ on both; elsewhere equality
	accepted(t, `
		(assume A (U 0)) (assume F (-> A (U 0))) (assume p (* A (U 0))) (assume E (Path (U 0) A A)) (assume G (-> (U 1) A))
		(assume H (-> I (U 0))) (assume q (Sigma ((X (U 0))) X))
		(def functions (-> A (U 1)) F) (def over-interval (-> I (U 2)) H)
		(def pairs (* A (U 1)) p) (def first (Sigma ((X (U 1))) A) (ann (pair A (snd (ann (pair A (snd (ann (pair Nat (fst p)) (* (U 0) A)))) (* (U 0) A)))) (* (U 0) A)))
		(reject (def paths (Path (U 1) A A) E))
		(def paths2 (Path (U 1) A A) (line (i) (at E i)))
		(reject (def domains (-> (U 0) A) G)) (def domains2 (-> (U 0) A) (lam (X) (G X)))
		(reject (def down (-> A (U 0)) (ann F (-> A (U 1)))))
		(reject (def list (Sum A (U 1)) (ann (inl (fst p)) (Sum A (U 0)))))
		; one elimination into families at two levels is two neutrals
		(assume n Nat)
		(differ (U 1) (elim (_ (U 0)) n (zero Nat) ((suc k h) h)) (elim (_ (U 1)) n (zero Nat) ((suc k h) h)))`)
}
