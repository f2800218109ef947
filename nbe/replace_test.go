package nbe_test

import (
	"context"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/term"
)

// An assumption or a hole may become a definition. What was stuck on it
// computes from then on, in that engine and not in those it was forked from or
// to before.

func TestValuesStuckOnAnAssumptionComputeOnceItIsDefined(t *testing.T) {
	ctx := context.Background()
	for _, stuck := range []struct{ text, before, after string }{
		{"(suc crates)", "(suc crates)", "6"},
		{"(elim (x Nat) crates (zero 1) ((suc k h) (suc (suc h))))", "", "11"},
		{"(hcomp Nat crates)", "(hcomp Nat crates)", "5"},
		{"(hcomp Nat (suc crates))", "(suc (hcomp Nat crates))", "6"},
		{"(ann (pair crates (hcomp Nat crates)) (* Nat Nat))", "(pair crates (hcomp Nat crates))", "(pair 5 5)"},
		{"(ann (lam (x) (elim (y Nat) crates (zero x) ((suc k h) (suc h)))) (-> Nat Nat))", "", "(lam (x) (suc (suc (suc (suc (suc x))))))"},
	} {
		e, err := nbe.New()
		require.NoError(t, err)
		require.NoError(t, e.Assume(ctx, "crates", term.Name("Nat")))
		fork := e.Fork()
		v := valueOf(t, e.Scope(), e, stuck.text)
		if stuck.before != "" {
			require.Equal(t, stuck.before, readBack(t, v), stuck.text)
		} else {
			readBack(t, v) // so that what is stuck has been evaluated
		}
		require.NoError(t, e.Define(ctx, "crates", term.Name("Nat"), term.Numeral(5)))
		require.Equal(t, stuck.after, readBack(t, v), stuck.text)
		// the fork still has the assumption
		require.Equal(t, "crates", readBack(t, valueOf(t, fork.Scope(), fork, "crates")))
		require.Equal(t, "5", readBack(t, valueOf(t, e.Scope(), e, "crates")))
		// and may define it otherwise
		require.NoError(t, fork.Define(ctx, "crates", term.Name("Nat"), term.Numeral(8)))
		require.Equal(t, "8", readBack(t, valueOf(t, fork.Scope(), fork, "crates")))
	}
}

func TestDefinitionsMadeOverAnAssumptionSeeItsDefinition(t *testing.T) {
	ctx := context.Background()
	e, err := nbe.New()
	require.NoError(t, err)
	require.NoError(t, e.Assume(ctx, "berth", term.Universe(0)))
	require.NoError(t, e.Assume(ctx, "first", term.Name("berth")))
	require.NoError(t, e.Define(ctx, "moved", term.Name("berth"), readText(t, e, "(transp (i berth) bot first)")))
	require.Equal(t, "(transp (i berth) bot first)", readBack(t, valueOf(t, e.Scope(), e, "moved")))
	require.NoError(t, e.Define(ctx, "berth", term.Universe(0), term.Name("Nat")))
	require.NoError(t, e.Define(ctx, "first", term.Name("Nat"), term.Numeral(3)))
	require.Equal(t, "3", readBack(t, valueOf(t, e.Scope(), e, "moved")))
}

func TestADefinitionOfAnAssumptionKeepsItsTypeAndDoesNotUseIt(t *testing.T) {
	ctx := context.Background()
	e, err := nbe.New()
	require.NoError(t, err)
	require.NoError(t, e.Assume(ctx, "crates", term.Name("Nat")))
	require.NoError(t, e.Define(ctx, "more", term.Name("Nat"), readText(t, e, "(suc crates)")))
	require.ErrorIs(t, e.Define(ctx, "crates", term.Name("Bool"), term.Name("true")), term.IllTyped)
	require.ErrorIs(t, e.Define(ctx, "crates", term.Name("Nat"), readText(t, e, "(suc crates)")), term.IllTyped)
	require.ErrorIs(t, e.Define(ctx, "crates", term.Name("Nat"), readText(t, e, "(suc more)")), term.IllTyped)
	require.Equal(t, "crates", readBack(t, valueOf(t, e.Scope(), e, "crates")))
	require.NoError(t, e.Define(ctx, "crates", term.Name("Nat"), term.Numeral(1)))
	require.ErrorIs(t, e.Define(ctx, "crates", term.Name("Nat"), term.Numeral(2)), term.Duplicate)
	require.ErrorIs(t, e.Define(ctx, "more", term.Name("Nat"), term.Numeral(2)), term.Duplicate)
}

func TestComparisonsThatDependOnAHoleAreUndecided(t *testing.T) {
	ctx := context.Background()
	e, err := nbe.New()
	require.NoError(t, err)
	require.NoError(t, e.Hole(ctx, "unknown", term.Name("Nat")))
	s := e.Scope()
	a, b := valueOf(t, s, e, "(suc unknown)"), valueOf(t, s, e, "3")
	c, err := a.Equal(ctx, b)
	require.NoError(t, err)
	require.Equal(t, nbe.Undecided, c.Verdict)
	require.Equal(t, "unknown", c.Hole)
	c, err = a.Equal(ctx, valueOf(t, s, e, "(suc unknown)"))
	require.NoError(t, err)
	require.Equal(t, nbe.Equal, c.Verdict)
	c, err = valueOf(t, s, e, "true").Equal(ctx, valueOf(t, s, e, "false"))
	require.NoError(t, err)
	require.Equal(t, nbe.Different, c.Verdict)
	require.NoError(t, e.Define(ctx, "unknown", term.Name("Nat"), term.Numeral(2)))
	c, err = a.Equal(ctx, b)
	require.NoError(t, err)
	require.Equal(t, nbe.Equal, c.Verdict)
}
