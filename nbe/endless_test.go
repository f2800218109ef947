package nbe_test

import (
	"context"
	"runtime"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/term"
)

// The hypothesis of a path ends in the elimination of its end. Where that is a
// transport of another argument, the type of the hypothesis has no finite normal
// form; reading it back ends by the budget, with memory that grows as the steps do.
func TestHypothesesWithoutAnEnd(t *testing.T) {
	e := fresh(t)
	require.NoError(t, firstError(e, `
(data Slide ((A (U 0))) (point berth ((a A))) (point moved ((x (Slide A)) (p (Path (Slide A) x (transp (k (Slide A)) bot x))))))
(def slid (-> (Slide Nat) Nat) (lam (s) (elim (z Nat) s ((berth a) a) ((moved x p hx hp) (at hp 1)))))`))
	s := e.Scope()
	x, err := s.Infer(context.Background(), read(t, "slid"))
	require.NoError(t, err)
	var before, after runtime.MemStats
	runtime.ReadMemStats(&before)
	_, err = s.Normal(context.Background(), x, nbe.Within(nbe.Limits{Steps: 20_000}))
	runtime.ReadMemStats(&after)
	require.Equal(t, term.OutOfBudget, term.KindOf(err), "%v", err)
	require.Less(t, (after.TotalAlloc-before.TotalAlloc)/20_000, uint64(20_000), "bytes a step")
}
