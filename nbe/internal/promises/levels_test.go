package promises

// Universe levels, and what stops a host that switches them off. With levels the
// paradox of a universe in itself is refused at its first step; without, it is
// accepted, and every question about it ends with the budget.

import (
	"bytes"
	"context"
	"os"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
)

// handled is what each form of a script came to, by its name.
func handled(t testing.TB, e *nbe.Engine, text string) map[string]error {
	outcomes := map[string]error{}
	s := &script.Session{Engine: e, Report: func(r script.Result) { outcomes[r.Form.Name] = r.Err }}
	require.NoError(t, s.Source(context.Background(), []byte(text), "hurkens"))
	return outcomes
}

func hurkens(t testing.TB) string {
	src, err := os.ReadFile("testdata/hurkens.sexp")
	require.NoError(t, err)
	return string(src)
}

func TestTheParadoxIsRefusedWithLevels(t *testing.T) {
	// at the lowest level, at the next, and with its universe one level up
	for _, text := range []string{hurkens(t), strings.ReplaceAll(hurkens(t), "(U 0)", "(U 1)"), strings.ReplaceAll(hurkens(t), "Uni (U 0)", "Uni (U 1)")} {
		outcomes := handled(t, mustNew(t), text)
		require.Equal(t, term.IllTyped, term.KindOf(outcomes["Power"]), "a universe is too large for itself: %v", outcomes["Power"])
		require.Error(t, outcomes["paradox"])
	}
	// its universe stands one level up, where it cannot be applied to itself
	outcomes := handled(t, mustNew(t), `
(def Uni (U 1) (Pi ((X (U 0))) (-> (-> (-> (-> X (U 0)) (U 0)) X) (-> (-> X (U 0)) (U 0)))))
(def tau (-> (-> (-> Uni (U 0)) (U 0)) Uni) (lam (t X f p) (t (lam (x) (p (f (x X f)))))))
(def sigma (-> Uni (-> (-> Uni (U 0)) (U 0))) (lam (s) (s Uni tau)))`)
	require.NoError(t, outcomes["Uni"])
	require.NoError(t, outcomes["tau"])
	require.Equal(t, term.IllTyped, term.KindOf(outcomes["sigma"]), "%v", outcomes["sigma"])
}

func TestTheParadoxLoopsWithinItsBudgetWithoutLevels(t *testing.T) {
	e := mustNew(t, nbe.WithoutLevels())
	for name, err := range handled(t, e, hurkens(t)) {
		require.NoError(t, err, name)
	}
	ctx := context.Background()
	s := e.Scope()
	x, err := s.Infer(ctx, term.Name("paradox"))
	require.NoError(t, err)
	other, err := s.Check(ctx, term.Apply(term.Name("unfounded"), term.Name("founded")), term.Name("Empty"))
	require.NoError(t, err)
	number, err := s.Infer(ctx, readText(t, "(elim (x Nat) paradox)"))
	require.NoError(t, err)
	limits := []nbe.Limits{{Steps: 10_000}, {Steps: 100_000}, {Memory: 1 << 20}, {Memory: 20 << 20},
		// The loop is one of tail calls and does not nest.
		{Depth: 1000, Steps: 200_000}, {Depth: nbe.MaxDepth, Memory: 30 << 20, Steps: 200_000}}
	if long {
		limits = append(limits, nbe.Limits{}, nbe.Limits{Depth: nbe.MaxDepth})
	}
	for _, l := range limits {
		within := nbe.Within(l)
		stopped := func(err error, what string) {
			require.Equal(t, term.OutOfBudget, term.KindOf(err), "%s within %+v: %v", what, l, err)
			require.NotNil(t, spentOf(err), what)
		}
		_, err := s.Normal(ctx, x, within)
		stopped(err, "its normal form")
		_, err = s.Normal(ctx, number, within)
		stopped(err, "a number made of it")
		c, err := s.Compare(ctx, number, mustInfer(t, s, "0"), within)
		require.NotEqual(t, nbe.Equal, c.Verdict)
		stopped(err, "a comparison with a number")
		_, err = x.Value().View(ctx, within)
		stopped(err, "a look at it")
		_, err = e.Scope().Check(ctx, readText(t, "(line (i) 0)"), readText(t, "(Path Nat 0 (elim (x Nat) paradox))"), within)
		stopped(err, "checking")
	}
	// what has the same folded form is equal without a look inside
	c, err := s.Compare(ctx, x, x)
	require.NoError(t, err)
	require.Equal(t, nbe.Equal, c.Verdict)
	_, err = s.Compare(ctx, x, other, nbe.Within(nbe.Limits{Steps: 100_000}))
	require.True(t, answered(err), "%v", err)
	// and the engine answers other questions
	define(t, e, "(same Nat (elim (x Nat) 3 (zero 0) ((suc k h) k)) 2)")
}

func mustInfer(t testing.TB, s *nbe.Scope, text string) *nbe.Term {
	x, err := s.Infer(context.Background(), readText(t, text))
	require.NoError(t, err)
	return x
}

// There is one universe, with everything in it, and one normal form of it.
func TestOneUniverseWithoutLevels(t *testing.T) {
	define(t, mustNew(t, nbe.WithoutLevels()), `
(same (U 0) (U 0) (U 7))
(normal (U 3) (U 0))
(def All (U 0) (Sigma ((A (U 1))) A))
(def inside All (pair All (pair (U 0) Nat)))
(data Types () (point of ((T (U 5)))))
(def code Types (of Types))
(def Line (Path (U 2) (U 0) (U 1)) (line (i) (U 9)))`)
}

// What was accepted without levels is not loaded where there are levels.
func TestStateWithoutLevelsIsForeign(t *testing.T) {
	e := mustNew(t, nbe.WithoutLevels())
	define(t, e, "(def one Nat 1)")
	src := saved(t, e)
	err := mustNew(t).Load(context.Background(), bytes.NewReader(src))
	require.Equal(t, term.NotFound, term.KindOf(err), "%v", err)
	require.NoError(t, mustNew(t, nbe.WithoutLevels()).Load(context.Background(), bytes.NewReader(src)))
	require.NoError(t, mustNew(t, nbe.WithoutLevels()).Load(context.Background(), bytes.NewReader(src), nbe.Recheck()))
}
