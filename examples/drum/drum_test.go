package main

import (
	"bytes"
	"context"
	"fmt"
	"math/rand/v2"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"
)

// The winding number and the carried inventory are what ordinary arithmetic
// says, which the command itself checks and reports by its status.

func TestNetTurnsAreTheSumOfTheEntries(t *testing.T) {
	ctx := context.Background()
	q, err := newQuay(ctx)
	require.NoError(t, err)
	rng := rand.New(rand.NewPCG(1, 2))
	for range 20 {
		var log []Turn
		want := 0
		for range rng.IntN(12) {
			by := rng.IntN(21) - 10
			want += by
			log = append(log, Turn{By: by})
		}
		got, _, err := q.netTurns(ctx, log)
		require.NoError(t, err)
		require.Equal(t, fmt.Sprint(want), got.String(), "%v", log)
	}
}

func TestALogOfAHundredThousandTurns(t *testing.T) {
	if testing.Short() {
		t.Skip("takes some seconds")
	}
	ctx := context.Background()
	q, err := newQuay(ctx)
	require.NoError(t, err)
	got, _, err := q.netTurns(ctx, []Turn{{By: 60_000}, {By: -40_000}})
	require.NoError(t, err)
	require.Equal(t, "20000", got.String())
}

func TestInventoriesAreCarriedAlongTheRelabelling(t *testing.T) {
	ctx := context.Background()
	q, err := newQuay(ctx)
	require.NoError(t, err)
	rng := rand.New(rand.NewPCG(3, 4))
	for n := 1; n <= 6; n++ {
		b := &Bays{Becomes: rng.Perm(n)}
		for range n {
			b.Crates = append(b.Crates, rng.IntN(100))
		}
		got, err := q.carryInventory(ctx, b)
		require.NoError(t, err)
		require.Equal(t, b.relabelled(), got)
	}
}

func TestLinesThatAreWrongAreRefusedByTheirNumber(t *testing.T) {
	for text, want := range map[string]string{
		"06:40 forward 3\n06:30 back 1":         `2: expected a time not before the last entry's, found 06:30`,
		"# remark\n\n25:00 forward 1":           `3: expected a time like 06:40, found "25:00"`,
		"06:40 sideways 1":                      `1: expected forward or back, found "sideways"`,
		"06:40 forward":                         `1: expected a time, a direction and a number, found 2 words`,
		"06:40 forward three":                   `1: expected a number of turns, found "three"`,
		"06:40 forward -3":                      `1: expected a number of turns, found "-3"`,
		"06:40 forward 1\n06:41 back 999999999": `2: expected at most 10000000 turns in all`,
	} {
		_, err := readLog(strings.NewReader(text))
		require.EqualError(t, err, want)
	}
	for text, want := range map[string]string{
		"crates 1 2\nbecomes 1 1":      "2: two bays become bay 1",
		"crates 1 2\nbecomes 1 3":      `2: expected a number from 1 to 2, found "3"`,
		"crates 1 2\ncrates 1 2":       "2: crates stands twice",
		"boxes 1":                      `1: expected crates or becomes, found "boxes"`,
		"crates 1 2 3\nbecomes 2 1":    " the sheet counts the crates of 3 bays and relabels 2",
		"crates\n":                     "1: expected 1 to 64 bays, found 0",
		"crates 1 -2\nbecomes 2 1 # x": `1: expected a number from 0 to 1000000000, found "-2"`,
	} {
		_, err := readBays(strings.NewReader(text))
		require.EqualError(t, err, want)
	}
}

func TestTheCommandReportsAndItsStatusSaysWhetherBothAgree(t *testing.T) {
	var out, problems bytes.Buffer
	require.Equal(t, 0, run(context.Background(), []string{"monday.log", "monday.bays"}, &out, &problems), problems.String())
	require.Contains(t, out.String(), "net turns, as a winding number: 3 ")
	require.Contains(t, out.String(), "carried along the relabelling:  7 12 31 0\n")
	require.Equal(t, 2, run(context.Background(), []string{"none.log"}, &out, &problems))
	require.Equal(t, 2, run(context.Background(), nil, &out, &problems))
	require.Equal(t, 2, run(context.Background(), []string{"monday.bays"}, &out, &problems))
	require.Contains(t, problems.String(), `monday.bays:2: expected a time, a direction and a number, found 5 words`)
}
