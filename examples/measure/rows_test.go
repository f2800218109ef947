package main

// Every row works at its smallest size and gives the right answer there (the rows
// check their answers themselves), repeating one leaves the live heap where it was,
// and the command measures, saves, draws and compares.

import (
	"bytes"
	"path/filepath"
	"testing"
	"time"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/examples/measure/gauge"
)

// small is the row at its smallest size, and whether that is small enough for a test.
func small(r gauge.Row) (gauge.Row, bool) {
	r.Sizes = r.Sizes[:1]
	switch r.Name {
	case "function composition at depth 10^6", "insertion sort of numbers below 16":
		return r, false // the size is part of the row
	}
	return r, r.Sizes[0] <= 1<<16 || r.Kind != gauge.Ratio
}

func TestRowsAreWellFormed(t *testing.T) {
	names := map[string]bool{}
	for _, r := range rows() {
		require.False(t, names[r.Name], "%s stands twice", r.Name)
		names[r.Name] = true
		require.NotEmpty(t, r.Sizes, r.Name)
		require.IsIncreasing(t, append([]int{0}, r.Sizes...), r.Name)
		if r.Kind == gauge.Growth {
			require.Len(t, r.Sizes, 5, r.Name)
		}
	}
}

// bounded is how much the live heap may move by itself.
const bounded = 512 << 10

func TestRepeatingARowLeavesTheHeapWhereItWas(t *testing.T) {
	if testing.Short() {
		t.Skip("it takes seconds")
	}
	for _, r := range rows() {
		r, ok := small(r)
		if !ok || r.Sizes[0] > 1<<16 {
			continue
		}
		t.Run(r.Name, func(t *testing.T) {
			c, err := r.Prepare(r.Sizes[0])
			require.NoError(t, err)
			begin := time.Now()
			op, err := c.Fresh()
			require.NoError(t, err)
			require.NoError(t, op())
			n := int(min(max(200*time.Millisecond/max(time.Since(begin), 1), 3), 100))
			left, err := gauge.Left(c.Fresh, n)
			require.NoError(t, err)
			require.Less(t, left, int64(bounded))
		})
	}
}

func TestTheCommand(t *testing.T) {
	dir := t.TempDir()
	saved, drawn := filepath.Join(dir, "run.json"), filepath.Join(dir, "growth.svg")
	status := func(args ...string) (int, string) {
		var out, err bytes.Buffer
		code := run(args, &out, &err)
		return code, out.String() + err.String()
	}
	code, text := status("-rows", "^cube", "-largest", "4", "-rounds", "4", "-round", "1ms", "-json", "-o", saved, "-svg", drawn)
	require.Zero(t, code, text)
	table, err := gauge.Load(saved)
	require.NoError(t, err)
	require.Len(t, table.Results, 1)
	require.Len(t, table.Results[0].Points, 3)
	require.Empty(t, table.Results[0].Error)
	require.FileExists(t, drawn)

	code, text = status("-from", saved, "-against", saved)
	require.Zero(t, code, text)
	require.Contains(t, text, "cube with all walls")

	for k := range table.Results[0].Points {
		for j := range table.Results[0].Points[k].Ratios {
			table.Results[0].Points[k].Ratios[j] /= 100 // whatever the machine is busy with
		}
	}
	faster := filepath.Join(dir, "faster.json")
	require.NoError(t, write(table, nil, faster, "", true))
	code, text = status("-from", saved, "-against", faster)
	require.Equal(t, 1, code, text)
	require.Contains(t, text, "LOSS")

	code, _ = status("-rows", "(")
	require.Equal(t, 2, code)
	code, _ = status("-from", filepath.Join(dir, "none"))
	require.Equal(t, 2, code)
	code, text = status("-list", "-rows", "winding")
	require.Zero(t, code)
	require.Contains(t, text, "winding number of loop^n")
}
