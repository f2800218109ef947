package promises

// Nesting. No input overflows the stack: every form of the corpus, nested deep,
// is answered or refused with an error, on stacks that may not grow beyond what
// is documented.

import (
	"context"
	"fmt"
	"runtime/debug"
	"testing"
	"time"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
)

// stackLimit is what one goroutine's stack may take in these tests: the process
// dies beyond it.
const stackLimit = 64 << 20

// ask does everything with a term that can be done, and returns the first error.
func ask(ctx context.Context, e *nbe.Engine, ty, text string, options ...nbe.CallOption) (err error) {
	wt, err := notation.ReadTermContext(ctx, ty, "", nil)
	if err != nil {
		return err
	}
	w, err := notation.ReadTermContext(ctx, text, "", nil)
	if err != nil {
		return err
	}
	s := e.Scope()
	t, err := s.Check(ctx, w, wt, options...)
	if err != nil {
		return err
	}
	again, err := s.CheckLike(ctx, w, t, options...)
	if err != nil {
		return err
	}
	c, err := s.Compare(ctx, t, again, options...)
	if err != nil {
		return err
	}
	if c.Verdict != nbe.Equal {
		return fmt.Errorf("not equal to itself: %s", c.Difference)
	}
	forms, err := s.Normal(ctx, t, options...)
	if err != nil {
		return err
	}
	size, _ := term.Size(forms[0].Term)
	if !size.IsInt64() || size.Int64() > 1<<21 {
		return nil
	}
	written, err := s.Write(forms[0].Term)
	if err != nil {
		return err
	}
	if _, err = written.TextContext(ctx); err != nil {
		return err
	}
	if _, err := s.CheckLike(ctx, written, t, options...); err != nil {
		return fmt.Errorf("the normal form: %w", err)
	}
	return nil
}

// soon is ask with a deadline; what is stopped by it has not overflowed either.
func soon(e *nbe.Engine, ty, text string, options ...nbe.CallOption) error {
	wait := time.Second
	if long {
		wait = time.Minute
	}
	ctx, cancel := context.WithTimeout(context.Background(), wait)
	defer cancel()
	return ask(ctx, e, ty, text, options...)
}

func answered(err error) bool {
	return err == nil || term.KindOf(err) == term.OutOfBudget || term.KindOf(err) == term.Cancelled
}

func TestNothingOverflowsTheStack(t *testing.T) {
	defer debug.SetMaxStack(debug.SetMaxStack(stackLimit))
	e := corpusEngine(t)
	levels := []int{1, 12_000} // beyond value.HopEvery
	if long {
		levels = []int{1, 1000, 10_000, 100_000, 1_000_000}
	}
	limits := nbe.Within(nbe.Limits{Memory: 2 << 30, Depth: 2_000_000})
	for _, nest := range nests() {
		t.Run(nest.name, func(t *testing.T) {
			for _, n := range levels {
				if nest.most > 0 {
					n = min(n, nest.most)
				}
				ty, text := nest.make(n)
				err := soon(e, ty, text, limits)
				require.True(t, answered(err), "%d levels: %v", n, err)
				if n == 1 {
					require.NoError(t, err)
				}
				t.Logf("%d levels: %s", n, outcome(err))
			}
		})
	}
	for _, p := range numberPrograms() {
		t.Run(p.name, func(t *testing.T) {
			for _, n := range []string{"3", fmt.Sprint(levels[len(levels)-1])} {
				err := soon(e, p.ty, p.text(n), limits)
				require.True(t, answered(err), "%s: %v", n, err)
				if n == "3" {
					require.NoError(t, err)
				}
				t.Logf("%s: %s", n, outcome(err))
			}
		})
	}
}

func outcome(err error) string {
	if err == nil {
		return "answered"
	}
	var s *value.Spent
	if s = spentOf(err); s != nil {
		return fmt.Sprintf("refused: %v: %s", err, s)
	}
	return fmt.Sprintf("refused: %v", err)
}
