package promises

// Cancellation. A context that ends stops any call, wherever it is: every loop
// and every recursion looks at the context often enough. What is measured is
// the processor time between two looks, which is what an answer waits for at
// the most; the clock would measure the machine's other work too.

import (
	"context"
	"errors"
	"fmt"
	"io"
	"math/big"
	"slices"
	"strings"
	"sync"
	"syscall"
	"testing"
	"time"

	"github.com/stretchr/testify/require"
	"go.uber.org/goleak"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
)

// looked is a context that notes the processor time between looks at it and
// ends at the look that stands in end, if that is positive.
type looked struct {
	context.Context
	mu   sync.Mutex
	last time.Duration
	gaps []time.Duration
	end  int
	done chan struct{}
	stop time.Duration // end, too, when this much time has been used
}

var errQuayClosed = errors.New("the quay is closed")

func newLooked(end int, stop time.Duration) *looked {
	return &looked{Context: context.Background(), last: processor(), end: end, done: make(chan struct{}), stop: processor() + stop}
}

func processor() time.Duration {
	var r syscall.Rusage
	if syscall.Getrusage(syscall.RUSAGE_SELF, &r) != nil {
		return 0
	}
	return time.Duration(r.Utime.Nano())
}

func (c *looked) Done() <-chan struct{} { return c.done }

func (c *looked) Err() error {
	c.mu.Lock()
	defer c.mu.Unlock()
	now := processor()
	c.gaps = append(c.gaps, now-c.last)
	c.last = now
	if c.end > 0 && len(c.gaps) >= c.end || now > c.stop {
		return errQuayClosed
	}
	return nil
}

// endless are programs that go on for long, each in its own way.
func endless() []program {
	say := func(name, ty, text string) program {
		return program{name: name, ty: ty, text: func(string) string { return text }}
	}
	wide := func(n int, op, inner string) string {
		var names, parts strings.Builder
		for k := range n {
			fmt.Fprintf(&names, " i%d j%d", k, k)
			fmt.Fprintf(&parts, " (%s i%d j%d)", inner, k, k)
		}
		return "(lam (" + names.String() + ") (at loopA (" + op + parts.String() + ")))"
	}
	return []program{
		say("Ackermann", "Nat", "(Ack 4 2)"),
		say("powers", "Nat", "(power 100000000)"),
		say("a tree that grows", "Tree", "(elim (x Tree) (coilTree 40) (leaf leaf) ((node l r hl hr) (node hr hl)))"),
		say("a deep constructor", "Drum", "(coil 100000000)"),
		say("comparing what is the same", "(Path Nat (Ack 3 9) (Ack 3 9))", "(line (i) (unroll (coil (Ack 3 9))))"),
		say("functions of functions", "Nat", "((elim (x (-> Nat Nat)) 100000000 (zero (lam (m) m)) ((suc k h) (lam (m) (h (suc m))))) 0)"),
		say("a wide meet", "(-> "+strings.Repeat("I I ", 11)+"A)", wide(11, "min", "max")),
		say("a wide join", "(-> "+strings.Repeat("I I ", 11)+"A)", wide(11, "max", "min")),
		say("a wide interval that is substituted in", "(-> "+strings.Repeat("I I ", 10)+"A)",
			strings.Replace(wide(10, "min", "max"), "(at loopA (min", "((ann (lam (z) (at loopA (min z (rev z)))) (-> I A)) (min", 1)),
		say("a large text", "A", rep(200_000, "(f ", "a", ")")),
		say("equivalences", "(U 0)", rep(12, "(Equiv ", "A", " A)")),
		say("composites in walls", "(-> I A)", "(lam (i) "+rep(3000, "(hcomp A a ((= i 0) (j) ", "a", "))")+")"),
		say("types that are compared", "(U 1)", "(elim (x (U 1)) 100000000 (zero (U 0)) ((suc k h) (-> h (U 0))))"),
		say("many numerals", "A", "(let "+"("+strings.Repeat("(n Nat "+strings.Repeat("9", 20_000)+") ", 40)+") a)"),
	}
}

func TestEveryLoopLooksAtItsContext(t *testing.T) {
	defer goleak.VerifyNone(t, goleak.IgnoreCurrent())
	e := corpusEngine(t)
	define(t, e, "(def coilTree (-> Nat Tree) (lam (n) (elim (x Tree) n (zero leaf) ((suc k h) (node h h)))))")
	var all []time.Duration
	for _, p := range endless() {
		ctx := newLooked(0, 400*time.Millisecond)
		err := ask(ctx, e, p.ty, p.text(""), nbe.Within(nbe.Limits{Memory: 2 << 30}))
		require.True(t, answered(err), "%s: %v", p.name, err)
		if term.KindOf(err) == term.Cancelled {
			require.ErrorIs(t, err, errQuayClosed, p.name)
		}
		all = append(all, ctx.gaps...)
		slices.Sort(ctx.gaps)
		n := len(ctx.gaps)
		t.Logf("%-40s %7d looks, gaps: median %v, 99%% %v, most %v: %s", p.name, n, ctx.gaps[n/2], ctx.gaps[n*99/100], ctx.gaps[n-1], outcome(err))
		require.Less(t, ctx.gaps[n-1], 300*time.Millisecond, "%s: a loop that does not look", p.name)
	}
	slices.Sort(all)
	t.Logf("all: median %v, 99%% %v, most %v", all[len(all)/2], all[len(all)*99/100], all[len(all)-1])
	require.Less(t, all[len(all)/2], time.Millisecond)
	require.Less(t, all[len(all)*99/100], 10*time.Millisecond)
}

// Wherever a call is stopped, the engine answers the same question afterwards.
func TestStoppedAnywhereAndAskedAgain(t *testing.T) {
	e := corpusEngine(t)
	ty, text := "Nat", "(unroll (coil (add (Ack 3 5) (pred 30))))"
	whole := newLooked(0, time.Minute)
	require.NoError(t, ask(whole, e, ty, text))
	looks := len(whole.gaps)
	require.Greater(t, looks, 20)
	for end := 1; end <= looks; end += 1 + looks/60 {
		err := ask(newLooked(end, time.Minute), e, ty, text)
		require.Equal(t, term.Cancelled, term.KindOf(err), "at look %d of %d: %v", end, looks, err)
		require.ErrorIs(t, err, errQuayClosed)
	}
	require.NoError(t, ask(context.Background(), e, ty, text))
}

// What goes over terms without a run can be stopped anywhere, too, and otherwise
// answers as it does without a context.
func TestTermsAreGoneOverInAContext(t *testing.T) {
	e := corpusEngine(t)
	s := e.Scope()
	w := readText(t, rep(8_000, "(f ", "a", ")"))
	x, y := mustInfer(t, s, rep(8_000, "(f ", "a", ")")).Core(), mustInfer(t, s, rep(8_000, "(f ", "a", ")")).Core()
	again := readText(t, rep(8_000, "(f ", "a", ")"))
	for name, call := range map[string]func(ctx context.Context) error{
		"same": func(ctx context.Context) error {
			same, err := term.SameContext(ctx, x, y)
			require.True(t, same || err != nil)
			return err
		},
		"written": func(ctx context.Context) error {
			same, err := w.SameContext(ctx, again)
			require.True(t, same || err != nil)
			return err
		},
		"size": func(ctx context.Context) error {
			tree, nodes, err := term.SizeContext(ctx, x)
			if err == nil {
				want, graph := term.Size(x)
				require.Equal(t, want, tree)
				require.Equal(t, graph, nodes)
			}
			return err
		},
		"write": func(ctx context.Context) error { return second(s.WriteContext(ctx, x)) },
		"text":  func(ctx context.Context) error { return second(w.TextContext(ctx)) },
		"format": func(ctx context.Context) error {
			return second(notation.FormatContext(ctx, w, 80))
		},
		"read": func(ctx context.Context) error {
			return second(notation.ReadTermContext(ctx, w.Text(1<<20), "", nil))
		},
		"script": func(ctx context.Context) error {
			return second(notation.ReadScriptContext(ctx, []byte("(show "+w.Text(1<<20)+")"), "", nil))
		},
		"save":    func(ctx context.Context) error { return e.Save(ctx, io.Discard) },
		"account": func(ctx context.Context) error { return second(e.Account(ctx, "Tree")) },
	} {
		whole := newLooked(0, time.Hour)
		require.NoError(t, call(whole), name)
		looks := len(whole.gaps)
		require.Positive(t, looks, name)
		for end := 1; end <= looks; end += 1 + looks/12 {
			err := call(newLooked(end, time.Hour))
			require.Equal(t, term.Cancelled, term.KindOf(err), "%s at look %d of %d: %v", name, end, looks, err)
			require.ErrorIs(t, err, errQuayClosed, name)
		}
	}
}

// The cause of a context is what the error wraps; a deadline that has passed is
// seen though its timer has not run.
func TestCause(t *testing.T) {
	e := corpusEngine(t)
	ctx, cancel := context.WithCancelCause(context.Background())
	cancel(errQuayClosed)
	for name, err := range map[string]error{
		"ask":     ask(ctx, e, "Nat", "0"),
		"define":  e.Define(ctx, "one", term.Name("Nat"), term.Numeral(1)),
		"declare": e.Declare(ctx, &term.Declaration{Name: "Void"}),
		"read":    second(notation.ReadTermContext(ctx, "a", "", nil)),
		"format":  second(notation.FormatContext(ctx, term.Name("a"), 80)),
		"same":    second(term.SameContext(ctx, &term.Global{Name: "a"}, &term.Global{Name: "a"})),
		"written": second(term.Name("a").SameContext(ctx, term.Name("a"))),
		"size":    sized(ctx, &term.Global{Name: "a"}),
		"write":   second(e.Scope().WriteContext(ctx, &term.Global{Name: "a"})),
		"save":    e.Save(ctx, io.Discard),
	} {
		require.Equal(t, term.Cancelled, term.KindOf(err), name)
		require.ErrorIs(t, err, errQuayClosed, name)
	}
	late, cancel2 := context.WithDeadline(context.Background(), time.Now().Add(-time.Second))
	defer cancel2()
	require.ErrorIs(t, ask(late, e, "Nat", "0"), context.DeadlineExceeded)
}

func sized(ctx context.Context, c term.Core) error {
	_, _, err := term.SizeContext(ctx, c)
	return err
}

func second[T any](_ T, err error) error { return err }

// Long numbers are refused before they are made.
func TestLongNumbers(t *testing.T) {
	e := corpusEngine(t)
	s := e.Scope()
	n, err := s.Infer(context.Background(), term.BigNumeral(new(big.Int).Lsh(big.NewInt(1), 1<<26)))
	if err == nil {
		_, err = s.Normal(context.Background(), n)
	}
	require.Equal(t, term.OutOfBudget, term.KindOf(err), "%v", err)
	long, err := s.Infer(context.Background(), term.BigNumeral(new(big.Int).Lsh(big.NewInt(1), 1<<20)))
	require.NoError(t, err)
	forms, err := s.Normal(context.Background(), long)
	require.NoError(t, err)
	_, err = forms[0].Written()
	require.Equal(t, term.OutOfBudget, term.KindOf(err), "%v", err)
}
