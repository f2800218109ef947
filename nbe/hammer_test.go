package nbe_test

import (
	"context"
	"fmt"
	"runtime"
	"sync"
	"sync/atomic"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/term"
)

// Many goroutines on one engine, its terms and its lazy values, for the race
// detector: the same questions give the same answers, whoever asks first, and
// calls that are stopped on the way leave nothing behind.

const shared = `
(def add (-> Nat Nat Nat) (lam (m n) (elim (x Nat) m (zero n) ((suc k h) (suc h)))))
(def mul (-> Nat Nat Nat) (lam (m n) (elim (x Nat) m (zero 0) ((suc k h) (add n h)))))
(def pow (-> Nat Nat Nat) (lam (b n) (elim (x Nat) n (zero 1) ((suc k h) (mul b h)))))
(def turn (Path Circle base base) (line (i) (loop i)))
(def then (Pi ((A (U 0)) (a A) (b A) (c A) (p (Path A a b)) (q (Path A b c))) (Path A a c))
  (lam (A a b c p q) (line (i) (hcomp A (at p i) ((= i 0) (j) a) ((= i 1) (j) (at q j))))))
(def turns (-> Nat (Path Circle base base))
  (lam (n) (elim (x (Path Circle base base)) n (zero (line (i) base)) ((suc k h) (then Circle base base base turn h)))))
(def lots (* Nat Nat Nat) (pair (pow 3 4) (mul 12 12) (add 7 (pow 2 10))))
(def spool (Path Circle base base) (turns 12))
(def moved (-> (Sum Nat Bool) (Sum Nat Bool)) (lam (s) (transp (i (Sum Nat Bool)) bot s)))
(assume berth (Sum Nat Bool))`

func TestHammer(t *testing.T) {
	before := runtime.NumGoroutine()
	e := fresh(t)
	require.NoError(t, firstError(e, shared))
	rounds := 6
	if testing.Short() {
		rounds = 2
	}
	for range rounds {
		hammer(t, e.Fork())
	}
	// What a deep run starts in passing has ended with it.
	ended(t, before)
}

// ended requires no more goroutines than there were before, after a moment to end in.
func ended(t *testing.T, before int) {
	t.Helper()
	for range 1000 {
		if runtime.NumGoroutine() <= before {
			return
		}
		time.Sleep(10 * time.Millisecond)
	}
	t.Errorf("%d goroutines before, %d after", before, runtime.NumGoroutine())
}

// hammer asks questions from many goroutines, all of them about the same terms.
func hammer(t *testing.T, e *nbe.Engine) {
	s := e.Scope()
	ask := map[string]string{"lots": "(pair 81 144 1031)", "spool": "", "moved": "", "(moved berth)": "", "(at spool 0)": "base", "(fst lots)": "81"}
	terms := map[string]*nbe.Term{}
	for text := range ask {
		x, err := s.Infer(background, read(t, text))
		require.NoError(t, err)
		terms[text] = x
	}
	var mu sync.Mutex
	said := map[string]string{}
	var wrong atomic.Int64
	agree := func(key, answer string) {
		mu.Lock()
		defer mu.Unlock()
		if first, ok := said[key]; ok && first != answer {
			wrong.Add(1)
			t.Errorf("%s: %s and %s", key, first, answer)
		}
		said[key] = answer
	}
	var group sync.WaitGroup
	for g := range 12 {
		group.Go(func() {
			for text, x := range terms {
				forms, err := s.Normal(background, x)
				if err != nil {
					wrong.Add(1)
					t.Error(err)
					return
				}
				agree(text, forms[0].String())
				if want := ask[text]; want != "" && forms[0].String() != want {
					t.Errorf("%s: %s, not %s", text, forms[0].String(), want)
				}
				// A call that is stopped somewhere on its way.
				_, err = s.Normal(background, x, nbe.Within(nbe.Limits{Steps: int64(1 + 97*g)}))
				if err != nil && term.KindOf(err) != tooMuch {
					t.Error(err)
				}
				ctx, stop := context.WithTimeout(background, time.Duration(g)*100*time.Microsecond)
				_, err = s.Compare(ctx, x, x)
				stop()
				if err != nil && term.KindOf(err) != term.Cancelled {
					t.Error(err)
				}
				v := x.Value()
				back, err := v.ReadBack(background)
				if err != nil {
					t.Error(err)
					return
				}
				agree(text, back[0].String())
			}
			// Forks and additions beside all that; each name is added once.
			fork := e.Fork()
			if err := fork.Define(background, "mine", nat(), term.Numeral(uint64(g))); err != nil {
				t.Error(err)
			}
			_ = e.Define(background, fmt.Sprint("theirs", g%3), nat(), term.Numeral(3))
			inner := fork.Scope()
			if x, err := inner.Infer(background, term.Apply(term.Name("add"), term.Name("mine"), term.Numeral(1))); err != nil {
				t.Error(err)
			} else if forms, err := inner.Normal(background, x); err != nil || forms[0].String() != fmt.Sprint(g+1) {
				t.Error(forms, err)
			}
		})
	}
	group.Wait()
	require.Zero(t, wrong.Load())
}

// A run that nests deeper than one goroutine's stack continues on others; they
// end with it, also when it fails.
func TestNoGoroutineIsLeft(t *testing.T) {
	before := runtime.NumGoroutine()
	e := fresh(t)
	w := term.Numeral(0)
	for range 50_000 {
		w = term.Ann(w, nat())
	}
	for _, l := range []nbe.Limits{{}, {Depth: 40_000}, {Steps: 30_000}} {
		_, err := e.Scope().Infer(background, w, nbe.Within(l))
		if l.Depth+l.Steps > 0 {
			assert.ErrorIs(t, err, tooMuch)
		} else {
			assert.NoError(t, err)
		}
	}
	ctx, stop := context.WithTimeout(background, time.Millisecond)
	defer stop()
	_, _ = e.Scope().Infer(ctx, w)
	ended(t, before)
}
