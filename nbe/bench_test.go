package nbe_test

// How the cost of three pieces of work grows: a path concatenated n times and taken
// at a face, transport through n nested pairs, and comparing doublings that share.
// The metrics divide by the size, so that linear work shows the same figure at each.

import (
	"context"
	"fmt"
	"strconv"
	"strings"
	"testing"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
)

var benchLimits = nbe.Within(nbe.Limits{Depth: nbe.MaxDepth, Steps: 1 << 40, Memory: 1 << 40})

func benchTerm(b *testing.B, s *nbe.Scope, text string) *nbe.Term {
	b.Helper()
	w, err := notation.ReadTerm(text, "bench", nil)
	if err != nil {
		b.Fatal(err)
	}
	t, err := s.Infer(context.Background(), w, benchLimits)
	if err != nil {
		b.Fatal(err)
	}
	return t
}

// benchSizes runs one operation at each size on a term that is elaborated anew for
// each operation, outside the clock.
func benchSizes(b *testing.B, given string, sizes []int, term func(n int) string, op func(t *nbe.Term, stats *nbe.Stats) error) {
	for _, n := range sizes {
		b.Run(strconv.Itoa(n), func(b *testing.B) {
			s := builds()[0].engine(b, given).Scope()
			text := term(n)
			var stats nbe.Stats
			b.ReportAllocs()
			for b.Loop() {
				b.StopTimer()
				t := benchTerm(b, s, text)
				b.StartTimer()
				if err := op(t, &stats); err != nil {
					b.Fatal(err)
				}
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/float64(n), "ns/part")
			b.ReportMetric(float64(stats.Steps)/float64(n), "steps/part")
		})
	}
}

func benchNormal(t *nbe.Term, stats *nbe.Stats) error {
	_, err := t.Scope().Normal(context.Background(), t, benchLimits, nbe.Count(stats))
	return err
}

func BenchmarkConcatenation(b *testing.B) {
	const given = `
(assume Quay (U 0)) (assume crane Quay) (assume round (Path Quay crane crane))
(def then (-> (Path Quay crane crane) (Path Quay crane crane) (Path Quay crane crane))
  (lam (p q) (line (i) (hcomp Quay (at p i) ((= i 0) (j) crane) ((= i 1) (j) (at q j))))))
(def left (-> Nat (Path Quay crane crane))
  (lam (n) (elim (x (Path Quay crane crane)) n (zero round) ((suc k h) (then h round)))))
(def right (-> Nat (Path Quay crane crane))
  (lam (n) (elim (x (Path Quay crane crane)) n (zero round) ((suc k h) (then round h)))))`
	for _, shape := range []string{"left", "right"} {
		b.Run(shape+"/face", func(b *testing.B) {
			benchSizes(b, given, []int{100, 1000, 10_000}, func(n int) string { return fmt.Sprintf("(at (%s %d) 1)", shape, n) }, benchNormal)
		})
		b.Run(shape+"/whole", func(b *testing.B) {
			benchSizes(b, given, []int{100, 1000, 10_000}, func(n int) string { return fmt.Sprintf("(%s %d)", shape, n) }, benchNormal)
		})
	}
}

// Each type is a family over the component before it, which is a closed number.
func BenchmarkTransportOfNestedPairs(b *testing.B) {
	const given = `
(def plus (-> Nat Nat Nat) (lam (m n) (elim (x Nat) m (zero n) ((suc k h) (suc h)))))
(def Berth (-> I Nat (U 0)) (lam (i n) (elim (x (U 0)) n (zero Nat) ((suc k h) h))))
(def number (Pi ((i I) (n Nat)) (-> (Berth i n) Nat))
  (lam (i n) (elim (x (-> (Berth i x) Nat)) n (zero (lam (y) y)) ((suc k h) h))))
(def berth (Pi ((i I) (n Nat)) (-> Nat (Berth i n)))
  (lam (i n) (elim (x (-> Nat (Berth i x))) n (zero (lam (y) y)) ((suc k h) h))))
(def Pairs (Pi ((i I)) (-> Nat Nat (U 0)))
  (lam (i n) (elim (x (-> Nat (U 0))) n (zero (lam (m) Unit))
    ((suc k h) (lam (m) (Sigma ((y (Berth i m))) (h (number i m y))))))))
(def pairs (Pi ((n Nat) (m Nat)) (Pairs 0 n m))
  (lam (n) (elim (x (Pi ((m Nat)) (Pairs 0 x m))) n (zero (lam (m) unit))
    ((suc k h) (lam (m) (pair (berth 0 m 1) (h (number 0 m (berth 0 m 1)))))))))
(def summed (Pi ((n Nat) (m Nat)) (-> (Pairs 1 n m) Nat))
  (lam (n) (elim (x (Pi ((m Nat)) (-> (Pairs 1 x m) Nat))) n (zero (lam (m p) 0))
    ((suc k h) (lam (m p) (plus (number 1 m (fst p)) (h (number 1 m (fst p)) (snd p))))))))`
	benchSizes(b, given, []int{10, 100, 1000}, func(n int) string {
		return fmt.Sprintf("(summed %d 1 (transp (i (Pairs i %d 1)) bot (pairs %d 1)))", n, n, n)
	}, benchNormal)
}

// writtenDoublings is n names, each the pair of the one before with itself, written out.
func writtenDoublings(n int) string {
	var t strings.Builder
	t.WriteString("(let ((T0 (U 0) Nat) (x0 T0 7)")
	for k := 1; k <= n; k++ {
		fmt.Fprintf(&t, " (T%d (U 0) (* T%d T%d)) (x%d T%d (pair x%d x%d))", k, k-1, k-1, k, k, k-1, k-1)
	}
	fmt.Fprintf(&t, ") x%d)", n)
	return t.String()
}

func BenchmarkComparingDoublings(b *testing.B) {
	for _, n := range []int{10, 100, 1000} {
		b.Run(strconv.Itoa(n), func(b *testing.B) {
			e, err := nbe.New()
			if err != nil {
				b.Fatal(err)
			}
			s := e.Scope()
			text := writtenDoublings(n)
			b.ReportAllocs()
			for b.Loop() {
				b.StopTimer()
				x, y := benchTerm(b, s, text), benchTerm(b, s, text)
				b.StartTimer()
				c, err := s.Compare(context.Background(), x, y, benchLimits)
				if err != nil || c.Verdict != nbe.Equal {
					b.Fatal(err, c.Verdict)
				}
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/float64(n), "ns/part")
		})
	}
}
