package script_test

// Growth: what large declarations, wide and deep constructors and long lists
// cost, in steps, charged memory and bytes allocated, which are counts and no
// times. Twice as much may cost little more than twice as much.

import (
	"context"
	"fmt"
	"runtime"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/script"
)

func repeated(n int, each func(k int) string) string {
	var b strings.Builder
	for k := range n {
		b.WriteString(each(k))
	}
	return b.String()
}

const list = `(data List ((A (U 0))) (point nil ()) (point cons ((x A) (xs (List A)))))
(def build (-> Nat (List Nat)) (lam (n) (elim (_ (List Nat)) n (zero nil) ((suc k h) (cons k h)))))
(def length (-> (List Nat) Nat) (lam (l) (elim (_ Nat) l (nil 0) ((cons x xs h) (suc h)))))
(def copy (-> (List Nat) (List Nat)) (lam (l) (elim (_ (List Nat)) l (nil nil) ((cons x xs h) (cons x h)))))
`

// growing are scripts by size; the last form of each is what is measured, the
// others are handled before.
var growing = map[string]struct {
	size int // the one that is required
	text func(n int) string
}{
	"a declaration of n points": {10_000, func(n int) string {
		return "(data D () " + repeated(n, func(k int) string { return fmt.Sprintf("(point c%d ((n Nat)))", k) }) + ")"
	}},
	"a declaration of n paths": {10_000, func(n int) string {
		return "(data D () (point c ()) " + repeated(n, func(k int) string {
			return fmt.Sprintf("(path p%d ((x D)) (i) ((= i 0) c) ((= i 1) x))", k)
		}) + ")"
	}},
	"a declaration of n points with a parameter, in a higher universe": {10_000, func(n int) string {
		return "(data D ((B (U 0))) " + repeated(n, func(k int) string { return fmt.Sprintf("(point c%d ((A (U 0)) (x (D B))))", k) }) + ")"
	}},
	"an elimination of n cases": {10_000, func(n int) string {
		return "(data D () " + repeated(n, func(k int) string { return fmt.Sprintf("(point c%d ((n Nat)))", k) }) + ")\n" +
			"(def f (-> D Nat) (lam (d) (elim (_ Nat) d " + repeated(n, func(k int) string { return fmt.Sprintf("((c%d n) (suc n))", k) }) + ")))"
	}},
	"an elimination of n path cases": {10_000, func(n int) string {
		return "(data D () (point c ()) " + repeated(n, func(k int) string {
			return fmt.Sprintf("(path p%d () (i) ((= i 0) c) ((= i 1) c))", k)
		}) + ")\n(def f (-> D Circle) (lam (d) (elim (_ Circle) d (c base) " + repeated(n, func(k int) string {
			return fmt.Sprintf("((p%d i) (loop i))", k)
		}) + ")))"
	}},
	"the account of n constructors": {10_000, func(n int) string {
		return "(data D () " + repeated(n, func(k int) string { return fmt.Sprintf("(point c%d ((x D)))", k) }) + ")\n(show D)"
	}},
	"a constructor of n recursive arguments": {1_000, func(n int) string {
		return "(data D () (point c ()) (point d (" + repeated(n, func(k int) string { return fmt.Sprintf("(x%d D)", k) }) + ")))"
	}},
	"an elimination of n recursive arguments": {1_000, func(n int) string {
		return "(data D () (point c ()) (point d (" + repeated(n, func(k int) string { return fmt.Sprintf("(x%d D)", k) }) + ")))\n" +
			"(def f (-> D D) (lam (t) (elim (_ D) t (c c) ((d" + repeated(n, func(k int) string { return fmt.Sprintf(" x%d", k) }) + repeated(n, func(k int) string { return fmt.Sprintf(" h%d", k) }) +
			") (d" + repeated(n, func(k int) string { return fmt.Sprintf(" h%d", k) }) + ")))))"
	}},
	"n recursive arguments composed and eliminated": {1_000, func(n int) string {
		return "(data D () (point c ()) (point d (" + repeated(n, func(k int) string { return fmt.Sprintf("(x%d D)", k) }) + ")))\n" +
			"(def f (-> D D) (lam (t) (elim (_ D) t (c c) ((d" + repeated(n, func(k int) string { return fmt.Sprintf(" x%d", k) }) + repeated(n, func(k int) string { return fmt.Sprintf(" h%d", k) }) +
			") (d" + repeated(n, func(k int) string { return fmt.Sprintf(" h%d", k) }) + ")))))\n" +
			"(def wide (-> D D) (lam (x) (d" + strings.Repeat(" x", n) + ")))\n" +
			"(same (-> I D) (lam (k) (f (hcomp D (wide c) ((= k 0) (i) (wide c))))) (lam (k) (wide c)))"
	}},
	"a recursive argument under n functions": {1_000, func(n int) string {
		return "(data D () (point c ()) (point d ((f (-> " + strings.Repeat("Bool ", n) + "D)))))"
	}},
	"a term of n nested constructors": {1_000, func(n int) string {
		return "(data D () (point c ()) (point d ((x D) (f (-> Bool D)))))\n" +
			"(def f (-> D Nat) (lam (t) (elim (_ Nat) t (c 0) ((d x f h hf) (suc h)))))\n" +
			fmt.Sprintf("(same Nat (f %sc%s) %d)", strings.Repeat("(d ", n), strings.Repeat(" (lam (b) c))", n), n)
	}},
	"the length of a list of n": {100_000, func(n int) string {
		return list + fmt.Sprintf("(same Nat (length (build %d)) %d)", n, n)
	}},
	"a list of n copied and compared": {100_000, func(n int) string {
		return list + fmt.Sprintf("(same (List Nat) (copy (build %d)) (build %d))", n, n)
	}},
	"the normal form of a list of n": {100_000, func(n int) string {
		return list + fmt.Sprintf("(normal (build %d) %snil%s)", n, repeated(n, func(k int) string { return fmt.Sprintf("(cons %d ", n-1-k) }), strings.Repeat(")", n))
	}},
	"a written list of n": {100_000, func(n int) string {
		return list + fmt.Sprintf("(same Nat (length %snil%s) %d)", strings.Repeat("(cons 1 ", n), strings.Repeat(")", n), n)
	}},
	"the transport of a list of n": {100_000, func(n int) string {
		return list + fmt.Sprintf("(same Nat (length (transp (i (List Nat)) bot (build %d))) %d)", n, n)
	}},
}

type cost struct{ steps, memory, bytes int64 }

// costs handles a script and returns what its last form took.
func costs(t testing.TB, text string) (c cost) {
	e, err := nbe.New()
	require.NoError(t, err)
	var stats nbe.Stats
	// lists of this length nest deeper than the default allows
	deep := nbe.Within(nbe.Limits{Depth: nbe.MaxDepth})
	s := &script.Session{Engine: e, Options: []nbe.CallOption{nbe.Count(&stats), deep}}
	var before, after runtime.MemStats
	runtime.ReadMemStats(&before)
	s.Report = func(r script.Result) {
		require.NoError(t, r.Err)
		runtime.ReadMemStats(&after)
		c = cost{stats.Steps, stats.Memory, int64(after.TotalAlloc - before.TotalAlloc)}
		before = after
	}
	require.NoError(t, s.Source(context.Background(), []byte(text), "given"))
	return c
}

func TestDataGrowth(t *testing.T) {
	for name, g := range growing {
		t.Run(name, func(t *testing.T) {
			small, large := costs(t, g.text(g.size/4)), costs(t, g.text(g.size))
			t.Logf("%d: %+v, %d: %+v", g.size/4, small, g.size, large)
			// four times as much, with room for what tables double by
			for what, pair := range map[string][2]int64{"steps": {small.steps, large.steps}, "memory": {small.memory, large.memory}, "bytes": {small.bytes, large.bytes}} {
				require.LessOrEqual(t, pair[1], 5*pair[0]+100_000, what)
			}
		})
	}
}

func BenchmarkData(b *testing.B) {
	for name, g := range growing {
		for _, n := range []int{g.size / 4, g.size / 2, g.size} {
			text := g.text(n)
			b.Run(fmt.Sprintf("%s/%d", name, n), func(b *testing.B) {
				for range b.N {
					c := costs(b, text)
					b.ReportMetric(float64(c.steps)/float64(n), "steps/item")
					b.ReportMetric(float64(c.bytes)/float64(n), "bytes/item")
				}
			})
		}
	}
}
