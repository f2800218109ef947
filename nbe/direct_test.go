package nbe_test

import (
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/prims"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// What a host's former may call on values, with what it has in its hands: the
// methods of values do what the run does, and a composite of which one wall
// stands everywhere is that wall's end (CCHM, 4.2 and 4.3).

func directRun() *value.Run {
	return value.NewRun(value.Settings{Budget: value.Budget{Steps: 1 << 20, Depth: 1 << 10, Memory: 1 << 30, Output: 1 << 20}})
}

func TestMethodsOfValuesSubstitute(t *testing.T) {
	run := directRun()
	const i, j, k = value.Name(3), value.Name(4), value.Name(5)
	s := interval.Rename(i, k)
	d := value.DimensionOf(interval.Var(i).Max(interval.Var(j)))
	want := interval.Var(k).Max(interval.Var(j))
	lazy := run.Later(d.Support(), func(*value.Run) value.Value { return d }).(*value.Lazy)
	run.Down(func() {
		for name, v := range map[string]value.Value{
			"a dimension": d.Substitute(run, s), "by the run": run.Substitute(d, s), "a cell": lazy.Substitute(run, s), "a cell by the run": run.Substitute(lazy, s),
		} {
			got, ok := run.Force(v).(*value.Dimension)
			require.True(t, ok, name)
			require.True(t, got.Dim.Equal(want), "%s: %s", name, got.Dim)
		}
		// where nothing is to be put in, everything stays as it is
		none := interval.Rename(k, i)
		c := value.NewCaptured(run, value.Captured{Rule: &value.Rule{Name: "x"}, Values: []value.Value{value.One()}})
		require.Same(t, c, c.Substitute(run, none))
		skipped := run.Skipped
		require.Equal(t, value.Value(lazy), run.Substitute(lazy, none))
		require.Greater(t, run.Skipped, skipped)
	})
}

func TestACompositeWithAWallEverywhere(t *testing.T) {
	run := directRun()
	const i, j = value.Name(3), value.Name(4)
	everywhere, ok := interval.CubeOf()
	require.True(t, ok)
	require.True(t, everywhere.IsTop())
	base := value.Value(prims.NewUniverse(0))
	walls := value.System{{Cube: everywhere, I: i, Body: &prims.Pi{Domain: prims.UnitType, Codomain: value.Constant{V: base}}}}
	run.Down(func() {
		want := walls[0].End(run)
		require.Equal(t, want, prims.Comp(run, j, prims.NewUniverse(1), base, walls))
		require.Equal(t, want, run.Force(prims.LaterComp(run, j, prims.NewUniverse(1), base, walls)))
		require.Equal(t, base, run.Force(prims.HfillAt(run, interval.Zero(), prims.NewUniverse(1), base, nil)))
	})
}

// β for a function that is constant needs no cell, whatever the argument is.
func TestConstantFunctionsAreAppliedAtOnce(t *testing.T) {
	run := directRun()
	never := run.Later(0, func(*value.Run) value.Value { panic("the argument is not looked at") })
	f := &value.Lam{Body: value.Constant{V: prims.UnitElement}}
	run.Down(func() {
		require.Equal(t, value.Value(prims.UnitElement), prims.LaterApply(run, f, never))
		require.Equal(t, value.Value(prims.UnitElement), run.Force(prims.Apply(run, f, never)))
	})
}

// A sketch shows what has been evaluated, and what cannot be shown as hidden.
func TestSketchesOfWhatIsThere(t *testing.T) {
	unit := value.Constant{V: prims.UnitType}
	require.Equal(t, "…", value.NewSketch().Value(nil).String())
	require.Equal(t, "0", value.NewSketch().Value(value.Zero()).String())
	name, body := value.NewSketch().Body(unit)
	require.Equal(t, "_", name)
	require.Equal(t, value.NewSketch().Value(prims.UnitType).String(), body.String())
	require.Equal(t, "top", value.NewSketch().Face(interval.Top()).String())
	require.Equal(t, "bot", value.NewSketch().Face(interval.Bot()).String())
}

// A run that has done nothing has reached no level, and nobody watches it.
func TestARunOfNothing(t *testing.T) {
	run := directRun()
	run.Begin(nil)
	require.False(t, run.Watched())
	require.Zero(t, run.Snapshot().Deepest)
}

// Report gives each count that is not zero, by the former too.
func TestCompositesAreReportedByFormer(t *testing.T) {
	got := metrics{}
	value.Stats{ByFormer: []value.FormerStats{{Former: "a type", Composites: 6}, {Former: "other", Transports: 4}}}.Report(got, 2)
	require.InDelta(t, 3, got["hcomp:a-type"], 0)
	require.InDelta(t, 2, got["transp:other"], 0)
	require.NotContains(t, got, "transp:a-type")
}

type metrics map[string]float64

func (m metrics) ReportMetric(n float64, unit string) { m[unit] = n }

// The paths below a path are yielded for as long as they are wanted.
func TestPathsAreYieldedOnDemand(t *testing.T) {
	run := directRun()
	trace := &value.Trace{Exact: true}
	run.Begin(trace)
	for _, name := range []string{"first", "second"} {
		run.Out(run.In(&value.Site{Kind: value.SiteDefinition, Name: name}))
	}
	trace.End()
	var all, one []string
	for p := range trace.Root().Below {
		all = append(all, p.Site.Name)
	}
	for p := range trace.Root().Below {
		one = append(one, p.Site.Name)
		break
	}
	require.Equal(t, []string{"first", "second"}, all)
	require.Equal(t, []string{"first"}, one)
}
