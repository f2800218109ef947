package promises

// Concurrency. Many goroutines work on one engine at random: defining, checking,
// comparing, reading back, forking, cancelling. Every answer is that of a run
// alone. Under the race detector this is the test of the engine's locks and of
// the values that they share.

import (
	"context"
	"fmt"
	"math/rand/v2"
	"os"
	"runtime"
	"sync"
	"testing"
	"time"

	"github.com/stretchr/testify/require"
	"go.uber.org/goleak"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/term"
)

// work are questions with answers, cheap enough to be asked many times.
var work = []struct{ ty, text string }{
	{"Nat", "(Ack 2 3)"}, {"Nat", "(unroll (coil 50))"}, {"Nat", "(double (add 3 4))"}, {"Drum", "(coil 5)"}, {"Tree", "(twin (twin leaf))"},
	{"A", "(f (keep (f a)))"}, {"(-> A A)", "(transp (i (-> A A)) bot f)"}, {"(Path A a a)", "(line (i) (hcomp A (at loopA i) ((or (= i 0) (= i 1)) (j) (at loopA j))))"},
	{"(-> A A)", "(fst (idEquiv A))"}, {"(Path (U 0) A A)", "(line (i) (Glue A ((or (= i 0) (= i 1)) A (idEquiv A))))"},
	{"(-> A A)", "(lam (x) (transp (i (Glue A ((or (= i 0) (= i 1)) A (idEquiv A)))) bot x))"}, {"(Quay Nat)", "(berth (Ack 1 2) (end))"},
	{"Nat", "a"}, {"A", "(f 0)"}, {"(U 0)", "(U 0)"}, // refused
}

// answerOf asks a question of an engine and renders all that comes of it.
func answerOf(ctx context.Context, t require.TestingT, e *nbe.Engine, ty, text string) (string, error) {
	s := e.Scope()
	x, err := s.Check(ctx, mustRead(t, text), mustRead(t, ty))
	if err != nil {
		return "refused: " + err.Error(), err
	}
	forms, err := s.Normal(ctx, x)
	if err != nil {
		return "stopped: " + err.Error(), err
	}
	y, err := s.CheckLike(ctx, mustRead(t, text), x)
	if err != nil {
		return "", err
	}
	c, err := s.Compare(ctx, x, y)
	return fmt.Sprintf("%s, %s to itself", forms[0].String(), c.Verdict), err
}

func TestManyGoroutinesOneEngine(t *testing.T) {
	defer goleak.VerifyNone(t, goleak.IgnoreCurrent())
	alone := make([]string, len(work))
	for k, q := range work {
		alone[k], _ = answerOf(context.Background(), t, corpusEngine(t), q.ty, q.text)
	}
	e := corpusEngine(t)
	lasts := time.Second
	if long {
		lasts = 30 * time.Second
	}
	if d, err := time.ParseDuration(os.Getenv("BOXWRIGHT_HAMMER")); err == nil {
		lasts = d
	}
	end := time.Now().Add(lasts)
	var wg sync.WaitGroup
	var mu sync.Mutex
	asked, stopped := 0, 0
	for g := range 64 {
		wg.Add(1)
		go func() {
			defer wg.Done()
			rnd := rand.New(rand.NewPCG(uint64(g), 7))
			mine := e
			for n := 0; time.Now().Before(end) && !t.Failed(); n++ {
				k := rnd.IntN(len(work))
				ctx, cancel := context.WithCancel(context.Background())
				switch rnd.IntN(8) {
				case 0:
					mine = e.Fork()
				case 1:
					mine = e
				case 2:
					name := fmt.Sprintf("own%dx%d", g, n)
					if err := mine.Define(ctx, name, mustRead(t, "Nat"), mustRead(t, "(Ack 1 3)")); err != nil {
						t.Errorf("%s: %v", name, err)
					}
					if got, _ := answerOf(ctx, t, mine, "Nat", "(add "+name+" 0)"); got != "5, equal to itself" {
						t.Errorf("%s is %s", name, got)
					}
				case 3: // both may try, one succeeds, in each engine
					err := mine.Define(ctx, fmt.Sprintf("shared%d", n%8), mustRead(t, "Nat"), mustRead(t, "3"))
					if err != nil && term.KindOf(err) != term.Duplicate {
						t.Errorf("shared: %v", err)
					}
				case 4:
					time.AfterFunc(time.Duration(rnd.IntN(300))*time.Microsecond, cancel)
				}
				got, err := answerOf(ctx, t, mine, work[k].ty, work[k].text)
				mu.Lock()
				asked++
				if term.KindOf(err) == term.Cancelled {
					stopped++
				} else if got != alone[k] {
					t.Errorf("%s: %s, alone %s", work[k].text, got, alone[k])
				}
				mu.Unlock()
				cancel()
			}
		}()
	}
	wg.Wait()
	t.Logf("%d questions, %d of them cancelled", asked, stopped)
	require.Greater(t, asked, 100)
}

func mustRead(t require.TestingT, text string) *term.Written {
	w, err := readQuiet(text)
	require.NoError(t, err)
	return w
}

// The same calls on a fresh engine give the same answers, counters and
// out-of-budget errors, whatever the number of processors, the collector and
// the schedule.
func TestDeterminism(t *testing.T) {
	defer runtime.GOMAXPROCS(runtime.GOMAXPROCS(0))
	defer setGC(setGC(100))
	all := func() (out []string) {
		e := corpusEngine(t)
		s := e.Scope()
		for _, q := range work {
			var st nbe.Stats
			x, err := s.Check(context.Background(), mustRead(t, q.text), mustRead(t, q.ty), nbe.Count(&st))
			out = append(out, fmt.Sprint(err, st))
			if err != nil {
				continue
			}
			forms, err := s.Normal(context.Background(), x, nbe.Count(&st))
			require.NoError(t, err)
			out = append(out, forms[0].String(), fmt.Sprint(st))
		}
		for _, steps := range []int64{1, 10, 1000, 5000} {
			x, err := s.Infer(context.Background(), mustRead(t, question))
			require.NoError(t, err)
			_, _, err = normalOf(t, s, x, nbe.Limits{Steps: steps})
			out = append(out, fmt.Sprint(err), fmt.Sprint(spentOf(err)))
		}
		return out
	}
	want := all()
	for _, procs := range []int{1, 2, 7} {
		for _, gc := range []int{10, 100, 1000} {
			runtime.GOMAXPROCS(procs)
			setGC(gc)
			require.Equal(t, want, all(), "GOMAXPROCS=%d GOGC=%d", procs, gc)
		}
	}
	// beside others
	var wg sync.WaitGroup
	for range 4 {
		wg.Add(1)
		go func() {
			defer wg.Done()
			if got := all(); fmt.Sprint(got) != fmt.Sprint(want) {
				t.Error("another answer beside others")
			}
		}()
	}
	wg.Wait()
}

// Independent checks on one engine: BenchmarkIndependentChecks with -cpu 1,2
// tells how much two processors help.
func BenchmarkIndependentChecks(b *testing.B) {
	e := corpusEngine(b)
	b.RunParallel(func(pb *testing.PB) {
		for pb.Next() {
			if _, err := answerOf(context.Background(), b, e, "Nat", "(unroll (coil (Ack 2 9)))"); err != nil {
				b.Error(err)
			}
		}
	})
}
