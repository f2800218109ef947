package promises

// Watching a call changes nothing of what it does: the same answers, the same
// rules, the same errors, with everything followed and each rule rendered before and
// after it is applied.

import (
	"context"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/profile"
	"example.com/boxwright/nbe/term"
)

// watched are programs by which every rule and every form of value is rendered.
var watched = []struct{ ty, text string }{
	{"(-> A A)", "(lam (x) (transp (i (Glue A ((= i 0) A (idEquiv A)) ((= i 1) A (idEquiv A)))) bot x))"},
	{"(-> I I A)", "(lam (i j) (unglue (ann (glue a ((= i 0) a) ((and (= i 1) (= j 0)) a)) (Glue A ((= i 0) A (idEquiv A)) ((and (= i 1) (= j 0)) A (idEquiv A))))))"},
	{"(-> (U 0) (U 0))", "(lam (X) (at (ann (line (i) (hcomp (U 0) X ((= i 0) (j) X))) (Path (U 0) X (hcomp (U 0) X))) 1))"},
	{"(-> Nat Nat)", "(lam (n) (elim (x Nat) (suc (suc n)) (zero 0) ((suc k h) (suc (add h k)))))"},
	{"(-> Nat (U 0))", "(lam (n) (elim (x (U 0)) n (zero (Pi ((x A)) (Path A x x))) ((suc k h) (Sigma ((y h)) (Pi ((i I)) (Quay Unit))))))"},
	{"(-> (-> Nat Unit) Nat (Path Unit unit unit))", "(lam (f n) (line (i) (f (add 4 n))))"},
	{"(-> I I (Path A a a))", "(lam (i j) (transp (k (Path A a a)) (or (= i 0) (= j 1)) (line (k) (at loopA (min (max i (rev i)) k (rev k))))))"},
	{"(-> Circle (Path Circle base base) Circle)", "(lam (c p) (elim (x Circle) (hcomp Circle c) (base base) ((loop i) (at p i))))"},
	{"(-> I Circle)", "(lam (i) ((ann (lam (c) (elim (x Circle) c (base base) ((loop j) (loop (rev j))))) (-> Circle Circle)) (hcomp Circle (loop i) ((= i 0) (j) (loop j)) ((= i 1) (j) base))))"},
	{"(-> Bool (Sum Nat A))", "(lam (b) (elim (x (Sum Nat A)) b (true (inl 100000000000000000000)) (false (inr (f a)))))"},
	{"(U 1)", "(transp (i (U 1)) bot (U 0))"},
	{"Nat", "(snd (transp (i (* A Nat)) bot (ann (pair a 3) (* A Nat))))"},
	{"(U 0)", "(elim (x (U 0)) 0 (zero (Pi ((x A)) (Path A x x))) ((suc k h) h))"},
	{"(U 0)", "(elim (x (U 0)) true (true (Pi ((i I)) A)) (false Unit))"},
	{"(U 0)", "(elim (x (U 0)) false (true (Path A a a)) (false Unit))"},
	{"(U 0)", "(elim (x (U 0)) true (true (Path A a a)) (false Unit))"},
	{"(U 0)", "(elim (x (U 0)) true (true (Sigma ((y A)) (Path A y y))) (false Unit))"},
	{"Unit", "(elim (x Unit) true (true unit) (false unit))"},
	{"(-> Nat Nat)", "(lam (n) (elim (x Nat) true (true (suc (suc n))) (false 7)))"},
	{"(-> Nat Nat)", "(lam (n) (elim (x Nat) true (true (add 10 n)) (false 7)))"},
	{"(-> I (Path A a a))", "(lam (i) (elim (x (Path A a a)) true (true (line (j) (hcomp A a ((or (= j 0) (= j 1)) (k) a) ((= i 0) (k) a)))) (false loopA)))"},
	{"(-> I A)", "(lam (i) (unglue (elim (x (Glue A ((= i 0) A (idEquiv A)))) true (true (glue a ((= i 0) a))) (false (glue a ((= i 0) a))))))"},
	{"(-> (-> Nat Bool) Nat Nat)", "(lam (q n) (add 3 (elim (x Nat) (q n) (true (add 5 n)) (false n))))"},
	{"(-> Tree Tree)", "(lam (t) (elim (x Tree) (node t leaf) (leaf leaf) ((node l r hl hr) (twin hr))))"},
}

func TestWatchingChangesNothing(t *testing.T) {
	ctx := context.Background()
	rendered := map[string]bool{}
	events := 0
	for _, results := range []bool{false, true} {
		for k, q := range append(watched, work...) {

			see := func(ev *nbe.Event) {
				events++
				for _, w := range []*term.Written{ev.Before(), ev.After()} {
					text := w.Text(1 << 16)
					back, err := notation.ReadTerm(text, "", nil)
					require.NoError(t, err, "a sketch does not read: %s", text)
					require.NotNil(t, back)
					if w.Kind == term.FormKind {
						rendered[w.Word] = true
					}
				}
			}
			ask := func(options ...nbe.CallOption) (out string, sum nbe.Stats) {
				e := corpusEngine(t)
				s := e.Scope()
				var st nbe.Stats
				with := append(options, nbe.Count(&st))
				x, err := s.Check(ctx, mustRead(t, q.text), mustRead(t, q.ty), with...)
				sum.Add(st)
				if err != nil {
					return err.Error(), sum
				}
				forms, err := s.Normal(ctx, x, with...)
				require.NoError(t, err)
				sum.Add(st)
				y, err := s.CheckLike(ctx, mustRead(t, q.text), x)
				require.NoError(t, err)
				c, err := s.Compare(ctx, x, y, with...)
				require.NoError(t, err)
				sum.Add(st)
				return forms[0].String() + c.Verdict.String(), sum
			}
			answer, counters := ask()
			if k < len(watched) {
				require.NotContains(t, answer, "expected", "%s", q.text)
			}
			var p profile.Profile
			seen, counted := ask(nbe.Following(&nbe.Follow{Limit: 1 << 20, Results: results, Event: see}), nbe.Profile(&p))
			require.Equal(t, answer, seen, q.text)
			require.Equal(t, rules(counters), rules(counted), q.text)
			seen, counted = ask(nbe.ProfileTime(&p), nbe.Labels())
			require.Equal(t, answer, seen, q.text)
			require.Equal(t, rules(counters), rules(counted), q.text)
		}
	}
	require.Greater(t, events, 100)
	for _, word := range []string{"Pi", "PathOver", "lam", "pair", "hcomp", "transp", "at", "elim", "unglue", "glue", "fst", "snd", "Sigma", "Unit", "unit", "line"} {
		require.Contains(t, rendered, word, "nothing was rendered with this word")
	}
}

// rules are the counts of rules. A call that is watched keeps its way, and makes
// no loop of calls in tail position, so it may nest deeper and take more memory.
func rules(s nbe.Stats) []any {
	return []any{s.Steps, s.ByRule, s.Composites, s.Transports, s.Unfolded, s.ByFormer}
}

// A filter sees every rule, and a limit of the reported leaves the rest counted.
func TestFollowedInPart(t *testing.T) {
	e := corpusEngine(t)
	x := mustInfer(t, e.Scope(), "(unroll (coil 20))")
	all := &nbe.Follow{Event: func(*nbe.Event) {}}
	_, err := e.Scope().Engine().Scope().Normal(context.Background(), x, nbe.Following(all))
	require.Equal(t, term.WrongScope, term.KindOf(err))
	_, err = x.Scope().Normal(context.Background(), x, nbe.Following(all))
	require.NoError(t, err)
	total, cut := all.Seen()
	require.Zero(t, cut)
	part := &nbe.Follow{Limit: 5, Event: func(ev *nbe.Event) { require.NotNil(t, ev.After()) }, Want: func(ev *nbe.Event) bool {
		require.NotNil(t, ev.Before())
		return true
	}}
	y := mustInfer(t, e.Scope(), "(unroll (coil 20))")
	_, err = y.Scope().Normal(context.Background(), y, nbe.Following(part))
	require.NoError(t, err)
	reported, cut := part.Seen()
	require.EqualValues(t, 5, reported)
	require.Equal(t, total, reported+cut)
}
