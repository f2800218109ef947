package promises

// Nesting. No input overflows the stack: every form of the corpus, nested deep,
// is answered or refused with an error, on stacks that may not grow beyond what
// is documented.

import (
	"context"
	"fmt"
	"runtime/debug"
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
)

// stackLimit is what one goroutine's stack may take in these tests: the process
// dies beyond it.
const stackLimit = 8 << 20

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

// declarations nest in the types of arguments, in parameters and in boundaries.
func declarations() []struct {
	name string
	make func(n int) string
} {
	type d = struct {
		name string
		make func(n int) string
	}
	return []d{
		{"functions into the data type", func(n int) string { return "(data D () (point c ((f " + rep(n, "(-> Nat ", "D", ")") + "))))" }},
		{"functions into the data type and their elimination", func(n int) string {
			return "(data D () (point z ()) (point c ((f " + rep(n, "(-> Nat ", "D", ")") + ")))) (def size (-> D Nat) (lam (d) (elim (x Nat) d (z 0) ((c f h) 1))))"
		}},
		{"functions over the interval", func(n int) string { return "(data D () (point c ((f " + rep(n, "(-> I ", "D", ")") + "))))" }},
		{"types of arguments", func(n int) string { return "(data D () (point c ((f " + rep(n, "(-> Nat ", "Nat", ")") + "))))" }},
		{"arguments to the left", func(n int) string { return "(data D () (point c ((f " + rep(n, "(-> ", "Nat", " Nat)") + "))))" }},
		{"arguments", func(n int) string {
			return "(data D () (point c (" + strings.Repeat("(a Nat) ", min(n, 1000)) + ")))"
		}},
		{"constructors", func(n int) string {
			var b strings.Builder
			for k := range min(n, 1000) {
				fmt.Fprintf(&b, "(point c%d ())", k)
			}
			return "(data D () " + b.String() + ")"
		}},
		{"boundaries", func(n int) string {
			return "(data D () (point z ()) (point s ((d D))) (path p () (i) ((= i 0) " + rep(n, "(s ", "z", ")") + ")))"
		}},
		{"faces of boundaries", func(n int) string {
			return "(data D () (point z ()) (path p () (i) (" + rep(n, "(or (= i 0) ", "(= i 1)", ")") + " z)))"
		}},
	}
}

func TestDeclarationsNest(t *testing.T) {
	defer debug.SetMaxStack(debug.SetMaxStack(stackLimit))
	n := 12_000
	if long {
		n = 300_000
	}
	for _, d := range declarations() {
		t.Run(d.name, func(t *testing.T) {
			for _, n := range []int{2, n} {
				e := corpusEngine(t)
				wait := 3 * time.Second
				if long {
					wait = 30 * time.Second
				}
				ctx, cancel := context.WithTimeout(context.Background(), wait)
				defer cancel()
				limits := []nbe.CallOption{nbe.Within(nbe.Limits{Memory: 2 << 30, Depth: 2_000_000})}
				refused := false // what uses a declaration that was refused is refused too
				s := &script.Session{Engine: e, Options: limits, Report: func(r script.Result) {
					require.True(t, refused || answered(r.Err), "%v", r.Err)
					refused = refused || r.Err != nil
					if n == 2 {
						require.NoError(t, r.Err)
					}
					t.Logf("%d levels: %s", n, outcome(r.Err))
					if r.Err == nil && r.Form.Kind == notation.Declare {
						_, err := e.Account(ctx, r.Form.Name)
						require.True(t, answered(err), "%v", err)
					}
				}}
				err := s.Source(ctx, []byte(d.make(n)), "nest")
				require.True(t, answered(err), "%v", err)
			}
		})
	}
}
