package profile_test

import (
	"bytes"
	"context"
	"runtime/pprof"
	"runtime/trace"
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/profile"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
)

// Following reports every rule once, in order, no more than wanted.
func TestFollowing(t *testing.T) {
	e := engine(t)
	var all []nbe.Event
	_, stats, err := normal(t, e, "(multiply 2 3)", nbe.Following(&nbe.Follow{Event: func(ev *nbe.Event) {
		all = append(all, *ev)
	}}))
	require.NoError(t, err)
	counts := map[value.StepKind]int64{}
	for k, ev := range all {
		require.EqualValues(t, k+1, ev.Number)
		counts[ev.Kind]++
	}
	for _, kind := range []value.StepKind{value.StepApply, value.StepEliminate, value.StepUnfold, value.StepHcomp, value.StepTransp} {
		require.Equal(t, stats.ByRule[kind], counts[kind], "%s", kind)
	}
	require.NotZero(t, counts[value.StepEliminate])

	// a filter by definition, with results
	var lines []string
	f := &nbe.Follow{Limit: 3, Results: true, Want: func(ev *nbe.Event) bool {
		return ev.Where != nil && ev.Where.Name == "add" && ev.Kind == value.StepEliminate
	},
		Event: func(ev *nbe.Event) {
			if ev.Done {
				lines = append(lines, "= "+ev.After().String())
			} else {
				lines = append(lines, ev.Rule+" "+ev.Before().String())
			}
		}}
	_, _, err = normal(t, e, "(multiply 2 3)", nbe.Following(f))
	require.NoError(t, err)
	require.Equal(t, "elim Nat (elim (x …) 3 (zero …) ((suc k h) …))", lines[0])
	require.Len(t, lines, 6)
	seen, cut := f.Seen()
	require.EqualValues(t, 3, seen)
	require.EqualValues(t, 5, cut) // add is called twice with 3: 2 × (3 + 1) eliminations
}

// The path of an event leads from the term to the definition.
func TestPathsOfEvents(t *testing.T) {
	e := engine(t)
	var path []string
	_, _, err := normal(t, e, "(multiply 2 3)", nbe.Following(&nbe.Follow{Event: func(ev *nbe.Event) {
		if ev.Where != nil && ev.Where.Name == "add" && path == nil {
			for _, s := range ev.Path() {
				path = append(path, s.Name)
			}
		}
	}}))
	require.NoError(t, err)
	require.Equal(t, "term", path[0])
	require.Contains(t, strings.Join(path, "/"), "multiply/elim Nat/multiply/add")
}

// Sketches look at nothing that has not been evaluated, whatever stands there.
func TestSketches(t *testing.T) {
	e := drumEngine(t)
	seen := map[string]bool{}
	_, _, err := normal(t, e, "(turns (drum 3))", nbe.Following(&nbe.Follow{Limit: 100_000, Results: true, Event: func(ev *nbe.Event) {
		for _, w := range []*term.Written{ev.Before(), ev.After()} {
			require.NotNil(t, w)
			require.Less(t, len(w.String()), 10_000)
		}
		seen[ev.Rule] = true
	}}))
	require.NoError(t, err)
	for _, rule := range []string{"function applied", "path at a dimension", "projection", "unglue", "hcomp at Circle", "transp at Glue", "elim Circle", "unfolding drum"} {
		require.Contains(t, seen, rule)
	}
}

// A call that asks for labels has them, beside those of its context, and gives
// them back.
func TestLabels(t *testing.T) {
	e, err := nbe.New(nbe.WithName("quay"))
	require.NoError(t, err)
	load(t, e, quay)
	ctx := pprof.WithLabels(context.Background(), pprof.Labels("host", "crane"))
	x, err := e.Scope().Infer(ctx, written(t, e, "(multiply 2 3)"))
	require.NoError(t, err)
	var goroutines bytes.Buffer
	look := nbe.Following(&nbe.Follow{Limit: 1, Event: func(*nbe.Event) {
		require.NoError(t, pprof.Lookup("goroutine").WriteTo(&goroutines, 1))
	}})
	_, _, err = normalTerm(t, x, ctx, nbe.Labels(), look)
	require.NoError(t, err)
	require.Contains(t, goroutines.String(), `labels: {"definition":"term at here.sexp:1", "engine":"quay", "host":"crane", "operation":"readback"}`)
	goroutines.Reset()
	require.NoError(t, pprof.Lookup("goroutine").WriteTo(&goroutines, 1))
	require.NotContains(t, goroutines.String(), `"engine":"quay"`)
	pprof.SetGoroutineLabels(context.Background())
}

// The labels follow the run: at some time they name each definition and operation
// that it spends its time in.
func TestLabelsFollowTheRun(t *testing.T) {
	e := engine(t)
	x, err := e.Scope().Infer(context.Background(), written(t, e, "(stacked 3 4)"))
	require.NoError(t, err)
	found := false
	look := nbe.Following(&nbe.Follow{Limit: 3000, Event: func(*nbe.Event) {
		if found {
			return
		}
		time.Sleep(time.Millisecond)
		var goroutines bytes.Buffer
		require.NoError(t, pprof.Lookup("goroutine").WriteTo(&goroutines, 1))
		found = strings.Contains(goroutines.String(), `labels: {"definition":"add", "engine":"", "operation":"elim Nat"}`)
	}})
	_, _, err = normalTerm(t, x, context.Background(), nbe.Labels(), look)
	require.NoError(t, err)
	require.True(t, found)
	var goroutines bytes.Buffer
	require.NoError(t, pprof.Lookup("goroutine").WriteTo(&goroutines, 1))
	require.NotContains(t, goroutines.String(), `"definition":"add"`)
}

// A call that asks for regions leaves them in the execution trace.
func TestRegions(t *testing.T) {
	e := engine(t)
	var file bytes.Buffer
	require.NoError(t, trace.Start(&file))
	ctx := context.Background()
	x, err := e.Scope().Infer(ctx, written(t, e, "(multiply 2 3)"), nbe.Regions())
	require.NoError(t, err)
	_, _, err = normalTerm(t, x, ctx, nbe.Regions())
	require.NoError(t, err)
	_, err = x.Scope().Compare(ctx, x, x, nbe.Regions())
	require.NoError(t, err)
	trace.Stop()
	for _, region := range []string{"checking", "evaluation", "readback", "comparison"} {
		require.Contains(t, file.String(), region)
	}
}

// Counters are numbers that a change of the engine shows in.
func TestCountersArePinned(t *testing.T) {
	var before nbe.Stats
	for range 3 {
		e := engine(t)
		_, stats, err := normal(t, e, "(transp (i (* (Berth i) (Berth i) Nat)) bot (ann (pair at-berth at-berth 3) (* (Berth 0) (Berth 0) Nat)))")
		require.NoError(t, err)
		require.EqualValues(t, 5, stats.Transports)
		require.Equal(t, []nbe.FormerStats{{Former: "Nat", Transports: 1}, {Former: "neutral types", Transports: 2}, {Former: "pairs", Transports: 2}}, stats.ByFormer)
		require.EqualValues(t, 5, stats.ByRule[value.StepTransp])
		if before.Steps != 0 {
			require.Equal(t, before, stats)
		}
		before = stats
	}
	require.Contains(t, before.String(), "transp at pairs")
	metrics := reporter{}
	before.Report(metrics, 5)
	require.InDelta(t, 1, metrics["transp"], 0)
	require.InDelta(t, 0.4, metrics["transp:pairs"], 1e-9)
}

type reporter map[string]float64

func (r reporter) ReportMetric(n float64, unit string) { r[unit] = n }

// The table for people has a line for each frame.
func TestText(t *testing.T) {
	e := engine(t)
	var p profile.Profile
	_, _, err := normal(t, e, "(stacked 2 3)", nbe.Profile(&p))
	require.NoError(t, err)
	var text bytes.Buffer
	require.NoError(t, p.Text(&text, 3))
	require.Equal(t, 4, strings.Count(text.String(), "\n"))
	require.Contains(t, text.String(), "(quay.sexp:")
}
