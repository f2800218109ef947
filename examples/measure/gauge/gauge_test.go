package gauge

// Laws of measuring: what is fitted is found, the U test gives the exact
// distribution, a slower run is seen and noise is not, tables survive being saved.

import (
	"bytes"
	"encoding/xml"
	"errors"
	"io"
	"math"
	"math/bits"
	"math/rand/v2"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/require"
)

func TestSlopeFindsThePower(t *testing.T) {
	for _, k := range []float64{0, 0.5, 1, 2, 3.7} {
		var x, y []float64
		for _, n := range []float64{10, 32, 100, 316, 1000} {
			x, y = append(x, n), append(y, 42*math.Pow(n, k))
		}
		require.InDelta(t, k, Slope(x, y), 1e-9)
	}
	require.Zero(t, Slope([]float64{5}, []float64{7}), "one point has no slope")
}

func TestMedian(t *testing.T) {
	require.Equal(t, 3.0, Median([]float64{9, 1, 3}))
	require.Equal(t, 2.0, Median([]float64{9, 1, 3, 0}))
	require.Zero(t, Median(nil))
}

// counted is P of the U test found by going through every way to choose which of
// the ranks belong to the first sample.
func counted(a, b []float64) float64 {
	n, m := len(a), len(b)
	turned := func(first func(k int) bool) (u int) {
		behind := 0
		for k := range n + m {
			if first(k) {
				u += k - behind
				behind++
			}
		}
		return min(u, n*m-u)
	}
	var all []float64
	all = append(append(all, a...), b...)
	rank := make([]int, n+m)
	for k, v := range all {
		for _, w := range all {
			if w < v {
				rank[k]++
			}
		}
	}
	seen := turned(func(r int) bool {
		for k := range n {
			if rank[k] == r {
				return true
			}
		}
		return false
	})
	var as, ways float64
	for mask := range uint(1) << (n + m) {
		if bits.OnesCount(mask) == n {
			ways++
			if turned(func(r int) bool { return mask>>r&1 == 1 }) <= seen {
				as++
			}
		}
	}
	return as / ways
}

func TestUTestIsExactOnSmallSamples(t *testing.T) {
	random := rand.New(rand.NewPCG(1, 2))
	for range 200 {
		a, b := make([]float64, 1+random.IntN(6)), make([]float64, 1+random.IntN(6))
		for k := range a {
			a[k] = random.Float64()
		}
		for k := range b {
			b[k] = random.Float64() + 0.3
		}
		// In the middle the two tails meet, and twice one of them is more than 1.
		require.InDelta(t, counted(a, b), UTest(a, b), 1e-9, "%v %v", a, b)
		require.InDelta(t, UTest(b, a), UTest(a, b), 1e-9)
	}
	require.Equal(t, 1.0, UTest(nil, []float64{1}))
	require.Equal(t, 1.0, UTest([]float64{1, 1, 1}, []float64{1, 1, 1}), "all are tied")
}

func TestUTestWithTiesIsNearTheExactOne(t *testing.T) {
	var a, b []float64
	for k := range 40 {
		a, b = append(a, float64(k)), append(b, float64(k)+3.5)
	}
	exact := UTest(a, b)
	a, b = append(a, 7, 7), append(b, 7+3.5, 7+3.5)
	require.InDelta(t, exact, UTest(a, b), 0.03)
}

func samples(around float64, noise float64, seed uint64) []float64 {
	random := rand.New(rand.NewPCG(seed, 1))
	out := make([]float64, 10)
	for k := range out {
		out[k] = around * (1 + noise*(random.Float64()-0.5))
	}
	return out
}

func tableOf(ratios ...[]float64) *Table {
	t := NewTable(10, "a unit")
	for k, r := range ratios {
		res := &Result{Name: string(rune('a' + k)), Kind: Ratio, Target: 5, Points: []Point{{Size: 3, CPU: 10, Ratios: r, Parts: 1}}}
		res.judge()
		t.Results = append(t.Results, res)
	}
	return t
}

func TestCompareSeesLossesAndNoNoise(t *testing.T) {
	old := tableOf(samples(4, 0.05, 1), samples(4, 0.05, 2), samples(4, 0.05, 3), samples(4, 2, 4))
	now := tableOf(samples(4.8, 0.05, 5), samples(4.1, 0.05, 6), samples(3, 0.05, 7), samples(4, 2, 8))
	changes := Compare(old, now)
	require.Len(t, changes, 4)
	require.True(t, changes[0].Lost(), "a fifth more is a loss")
	require.False(t, changes[1].Lost(), "2 % is less than what counts")
	require.True(t, changes[2].Won())
	require.False(t, changes[3].Lost() || changes[3].Won(), "noise is no difference: %+v", changes[3])
	var b bytes.Buffer
	require.Equal(t, 1, WriteChanges(&b, changes))
	require.Equal(t, 4, strings.Count(b.String(), "\n"))
	require.Empty(t, Compare(old, tableOf()), "rows that only one run has are not compared")
}

func TestTablesAreSavedAndMerged(t *testing.T) {
	table := tableOf(samples(4, 0.05, 1), samples(6, 0.05, 2))
	require.Equal(t, 1, table.Missed())
	var b bytes.Buffer
	require.NoError(t, table.WriteJSON(&b))
	file := filepath.Join(t.TempDir(), "run.json")
	require.NoError(t, os.WriteFile(file, b.Bytes(), 0o600))
	again, err := Load(file)
	require.NoError(t, err)
	require.Equal(t, table, again)
	again.Merge(tableOf(samples(1, 0.05, 1)))
	require.Len(t, again.Results, 2)
	require.InDelta(t, 1, again.Results[0].Value, 0.1)
	_, err = Load(filepath.Join(t.TempDir(), "none"))
	require.ErrorIs(t, err, os.ErrNotExist)
}

var kept [][]byte

func TestMeasureCountsWhatIsDone(t *testing.T) {
	s := Settings{Rounds: 3, Round: time.Millisecond, Unit: func() {}, Repeat: 20}
	const size = 1 << 20
	row := Row{Name: "work", Kind: Allocations, Sizes: []int{1}, Target: 2, Prepare: func(int) (*Case, error) {
		return &Case{Fresh: func() (func() error, error) {
			kept = nil // or what the operation before left would hide what this one holds
			return func() error { kept = [][]byte{make([]byte, size)}; return nil }, nil
		}}, nil
	}}
	r := Measure(row, s)
	require.Empty(t, r.Error)
	require.InDelta(t, 2, r.Value, 0.5)
	require.GreaterOrEqual(t, r.Points[0].Peak, int64(size*9/10))
	require.Less(t, r.Points[0].Left, int64(size/2), "each operation drops what the one before left")
	row.Prepare = func(int) (*Case, error) {
		return Always(func() error { kept = append(kept, make([]byte, size)); return nil }), nil
	}
	require.GreaterOrEqual(t, Measure(row, s).Points[0].Left, int64(19*size), "what is kept is seen")
	kept = nil
	row.Kind, row.Sizes = Growth, []int{1, 2, 4}
	row.Prepare = func(n int) (*Case, error) {
		if n > 2 {
			return nil, errors.New("too large")
		}
		return Always(func() error { time.Sleep(time.Microsecond); return nil }), nil
	}
	failed := Measure(row, s)
	require.Len(t, failed.Points, 2)
	require.Contains(t, failed.Error, "size 4: too large")
	require.False(t, failed.Met)
}

func TestDrawingsAreWellFormed(t *testing.T) {
	table := NewTable(1, "a unit")
	for _, k := range []float64{0, 1, 2} {
		r := &Result{Name: "growth <&>", Kind: Growth, Target: 1.15}
		for _, n := range []int{10, 100, 1000} {
			r.Points = append(r.Points, Point{Size: n, CPU: math.Pow(float64(n), k), Ratios: []float64{1}, Parts: 1})
		}
		r.judge()
		table.Results = append(table.Results, r)
	}
	var b bytes.Buffer
	require.NoError(t, table.WriteSVG(&b))
	require.Equal(t, 9, strings.Count(b.String(), "<circle"), "every measured point is drawn")
	d := xml.NewDecoder(&b)
	for {
		_, err := d.Token()
		if err == io.EOF {
			break
		}
		require.NoError(t, err)
	}
	b.Reset()
	table.WriteText(&b)
	require.Contains(t, b.String(), "n^2.00")
}
