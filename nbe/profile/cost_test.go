package profile_test

import (
	"example.com/boxwright/value"

	"math"
	"regexp"
	"runtime/debug"
	"strconv"

	"context"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"runtime"
	"slices"
	"strings"
	"syscall"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/profile"
	"example.com/boxwright/nbe/script"
)

// What watching costs: nothing when it is off, at most a tenth for exact counts
// and three in a hundred for time.

const drums = `
(load "../../examples/library/equivalences.sexp")
(load "../../examples/library/univalence.sexp")
(data Turns () (point forth ((n Nat))) (point back ((n Nat))))
(def wind-on (-> Turns Turns) (lam (z) (elim (x Turns) z ((forth n) (forth (suc n)))
  ((back n) (elim (y Turns) n (zero (forth 0)) ((suc k h) (back k)))))))
(def wind-off (-> Turns Turns) (lam (z) (elim (x Turns) z ((back n) (back (suc n)))
  ((forth n) (elim (y Turns) n (zero (back 0)) ((suc k h) (forth k)))))))
(def on-off (Pi ((z Turns)) (Path Turns (wind-on (wind-off z)) z))
  (lam (z) (elim (x (Path Turns (wind-on (wind-off x)) x)) z
    ((forth n) (elim (m (Path Turns (wind-on (wind-off (forth m))) (forth m))) n (zero (line (i) (forth 0))) ((suc k h) (line (i) (forth (suc k))))))
    ((back n) (line (i) (back n))))))
(def off-on (Pi ((z Turns)) (Path Turns (wind-off (wind-on z)) z))
  (lam (z) (elim (x (Path Turns (wind-off (wind-on x)) x)) z
    ((forth n) (line (i) (forth n)))
    ((back n) (elim (m (Path Turns (wind-off (wind-on (back m))) (back m))) n (zero (line (i) (back 0))) ((suc k h) (line (i) (back (suc k)))))))))
(def winding-on (Equiv Turns Turns) (quasi-inverse Turns Turns wind-on wind-off on-off off-on))
(def cable (-> Circle (U 0)) (lam (x) (elim (y (U 0)) x (base Turns) ((loop i) (at (ua Turns Turns winding-on) i)))))
(def after (-> (Path Circle base base) (Path Circle base base) (Path Circle base base))
  (lam (p q) (line (i) (hcomp Circle (at p i) ((= i 0) (j) base) ((= i 1) (j) (at q j))))))
(def turns (-> (Path Circle base base) Turns) (lam (p) (transp (i (cable (at p i))) bot (forth 0))))
(def drum (-> Nat (Path Circle base base))
  (lam (n) (elim (x (Path Circle base base)) n (zero (line (i) base)) ((suc k h) (after h (line (i) (loop i)))))))
(def N (U 1) (Pi ((A (U 0))) (-> (-> A A) A A)))
(def two N (lam (A f x) (f (f x))))
(def times (-> N N N) (lam (m n A f) (m A (n A f))))
(def square (-> N N) (lam (m) (times m m)))
(def ack (-> Nat Nat Nat) (lam (m) (elim (x (-> Nat Nat)) m (zero (lam (n) (suc n)))
  ((suc k h) (lam (n) (elim (y Nat) n (zero (h 1)) ((suc l g) (h g))))))))
`

func drumEngine(tb testing.TB) *nbe.Engine {
	e, err := nbe.New()
	require.NoError(tb, err)
	s := script.Session{Engine: e, Report: func(r script.Result) { require.NoError(tb, r.Err) }}
	require.NoError(tb, s.Source(context.Background(), []byte(drums), "drums.sexp"))
	return e
}

var works = []struct{ name, text, small string }{
	{"winding", "(turns (drum 1000))", "(turns (drum 30))"},
	{"church", "(square (square (square (square two))) Nat (lam (x) (suc x)) 0)", "(square (square two) Nat (lam (x) (suc x)) 0)"},
	{"ackermann", "(ack 2 400)", "(ack 2 9)"},
}

// processor is the processor time that the process has used, in nanoseconds. It
// does not depend on what else the machine does, as the time of day would.
func processor() int64 {
	var u syscall.Rusage
	if err := syscall.Getrusage(syscall.RUSAGE_SELF, &u); err != nil {
		return 0
	}
	return u.Utime.Nano() + u.Stime.Nano()
}

// BenchmarkWatching gives the processor time with exact counts, and with time
// alone, over the time without: the lower quartile of rounds that alternate,
// which other work on the machine disturbs less than the median.
func BenchmarkWatching(b *testing.B) {
	e := drumEngine(b)
	for _, w := range works {
		b.Run(w.name, func(b *testing.B) {
			var p profile.Profile
			modes := [][]nbe.CallOption{nil, {nbe.Profile(&p)}, {nbe.ProfileTime(&p)}}
			var times [3][]float64
			rounds := 0
			for b.Loop() {
				rounds++
				for k := range modes {
					m := (k + rounds) % len(modes)
					total := int64(0)
					for range 2 {
						t, err := e.Scope().Infer(context.Background(), written(b, e, w.text))
						require.NoError(b, err)
						runtime.GC()
						before := processor()
						_, _, err = normalTerm(b, t, context.Background(), modes[m]...)
						total += processor() - before
						require.NoError(b, err)
					}
					times[m] = append(times[m], float64(total))
				}
			}
			for m := range times {
				slices.Sort(times[m])
			}
			quartile := func(ts []float64) float64 { return ts[len(ts)/4] }
			b.ReportMetric(quartile(times[1])/quartile(times[0]), "exact/off")
			b.ReportMetric(quartile(times[2])/quartile(times[0]), "time/off")
			b.ReportMetric(0, "ns/op")
		})
	}
}

// Counters are the same with and without a profile.
func TestWatchingChangesNothing(t *testing.T) {
	e := drumEngine(t)
	for _, w := range works {
		_, _, err := normal(t, e, w.small) // what is shared is forced now
		require.NoError(t, err)
		text, off, err := normal(t, e, w.small)
		require.NoError(t, err)
		for k, option := range []nbe.CallOption{nbe.Profile(new(profile.Profile)), nbe.ProfileTime(new(profile.Profile)), nbe.Labels(), nbe.Regions(),
			nbe.Following(&nbe.Follow{Results: true, Event: func(e *nbe.Event) { _, _ = e.Before(), e.After() }})} {
			again, on, err := normal(t, e, w.small, option)
			require.NoError(t, err)
			require.Equal(t, text, again)
			off.Deepest, on.Deepest = 0, 0 // a watched call begins a few levels deeper
			if k == followed {
				// What is followed goes through a nest of Glue types type by type, to
				// report each: the same rules, with more cells.
				require.Equal(t, rulesOf(off), rulesOf(on), "%s", w.name)
				continue
			}
			require.Equal(t, off, on, "%s", w.name)
		}
	}
}

// followed is the place of the option that follows the call.
const followed = 4

func rulesOf(s value.Stats) value.Stats {
	return value.Stats{Steps: s.Steps, ByRule: s.ByRule, Composites: s.Composites, Transports: s.Transports, Unfolded: s.Unfolded, ByFormer: s.ByFormer}
}

// TestCountersAndAllocations prints what TestOffIsFree compares.
func TestCountersAndAllocations(t *testing.T) {
	e := drumEngine(t)
	for _, w := range works {
		_, _, err := normal(t, e, w.small)
		require.NoError(t, err)
		_, stats, err := normal(t, e, w.small)
		require.NoError(t, err)
		// A collection empties the pools and the runtime allocates for itself; the
		// least of several counts without one is what the call needs.
		limit := debug.SetGCPercent(-1)
		least := math.Inf(1)
		for range 5 {
			least = min(least, testing.AllocsPerRun(5, func() { _, _, _ = normal(t, e, w.small) }))
		}
		debug.SetGCPercent(limit)
		fmt.Printf("MEASURED %s %v allocations %v\n", w.name, least, stats)
	}
}

var allocations = regexp.MustCompile(`(\d+) allocations`)

// A call that nobody watches allocates and counts what it does in a build
// without any hooks.
func TestOffIsFree(t *testing.T) {
	if testing.Short() {
		t.Skip("builds the tests twice")
	}
	measured := func(tags string) (counters string, counts []float64) {
		dir, err := filepath.Abs(".")
		require.NoError(t, err)
		c := exec.Command("go", "test", "-count=1", "-run", "^TestCountersAndAllocations$", "-v", "-tags", tags, ".")
		c.Dir, c.Env = dir, append(os.Environ(), "GOFLAGS=")
		out, err := c.CombinedOutput()
		require.NoError(t, err, "%s", out)
		text := string(out)
		text = text[strings.Index(text, "MEASURED"):strings.LastIndex(text, "--- PASS")]
		for _, found := range allocations.FindAllStringSubmatch(text, -1) {
			n, err := strconv.ParseFloat(found[1], 64)
			require.NoError(t, err)
			counts = append(counts, n)
		}
		return allocations.ReplaceAllString(text, "allocations"), counts
	}
	bare, without := measured("boxwright_nohooks")
	hooked, with := measured("")
	require.Equal(t, bare, hooked)
	require.Len(t, with, len(works))
	// A hook that allocates does so hundreds of times in each of these; a table
	// of the runtime that grows adds one or two.
	require.InDeltaSlice(t, without, with, 3)
}
