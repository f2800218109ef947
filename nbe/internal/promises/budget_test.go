package promises

// Budgets. Each stops a call close to the set value, with an account of what
// was spent and on what, and leaves engine and values as they were: the same
// question with a larger budget gives the right answer.

import (
	"context"
	"errors"
	"math/big"
	"runtime"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
)

func spentOf(err error) *value.Spent {
	var e *term.Error
	if errors.As(err, &e) {
		s, _ := e.Detail.(*value.Spent)
		return s
	}
	return nil
}

// budget is one of the budgets: how to set it, and what of it was spent.
type budget struct {
	what  string
	set   func(l *nbe.Limits, n int64)
	of    func(s *value.Spent) int64
	small int64 // runs out on the question below
	ample int64
}

func budgets() []budget {
	return []budget{
		{"steps", func(l *nbe.Limits, n int64) { l.Steps = n }, func(s *value.Spent) int64 { return s.Steps }, 1_500, 1 << 40},
		{"bytes", func(l *nbe.Limits, n int64) { l.Memory = n }, func(s *value.Spent) int64 { return s.Memory }, 100_000, 1 << 40},
		{"levels of nesting", func(l *nbe.Limits, n int64) { l.Depth = n }, func(s *value.Spent) int64 { return s.Deepest }, 700, nbe.MaxDepth},
		{"nodes", func(l *nbe.Limits, n int64) { l.Output = n }, func(s *value.Spent) int64 { return 0 }, 500, 1 << 40},
		{"nodes of text", func(l *nbe.Limits, n int64) { l.Text = n }, func(s *value.Spent) int64 { return 0 }, 600, 1 << 40},
	}
}

// question needs some of every budget: it computes, nests, and its normal form is long.
const question = "(coil (add (Ack 3 4) 1000))"

func normalOf(t testing.TB, s *nbe.Scope, x *nbe.Term, l nbe.Limits) ([]nbe.Form, nbe.Stats, error) {
	var st nbe.Stats
	forms, err := s.Normal(context.Background(), x, nbe.Within(l), nbe.Count(&st))
	if err == nil {
		_, err = forms[0].Written()
	}
	return forms, st, err
}

func TestBudgetsAloneAndInPairs(t *testing.T) {
	all := budgets()
	e := corpusEngine(t)
	s := e.Scope()
	ctx := context.Background()
	fresh := func() *nbe.Term {
		x, err := s.Infer(ctx, readText(t, question))
		require.NoError(t, err)
		return x
	}
	want, _, err := normalOf(t, s, fresh(), nbe.Limits{})
	require.NoError(t, err)
	for i := range all {
		for j := range all { // the second is tighter or looser, or is the same one alone
			for _, other := range []int64{all[j].small, all[j].ample} {
				var l nbe.Limits
				all[j].set(&l, other)
				all[i].set(&l, all[i].small)
				x := fresh()
				_, st, err := normalOf(t, s, x, l)
				require.Equal(t, term.OutOfBudget, term.KindOf(err), "%s and %s: %v", all[i].what, all[j].what, err)
				spent := spentOf(err)
				require.NotNil(t, spent, "%v", err)
				if other == all[j].ample && i != j {
					require.Equal(t, all[i].what, spent.What)
				} else {
					require.Contains(t, []string{all[i].what, all[j].what}, spent.What)
				}
				// no budget is passed by more than a tenth, whichever ran out
				for k, limit := range []int64{l.Steps, l.Memory, l.Depth} {
					if limit > 0 {
						require.LessOrEqual(t, float64(all[k].of(spent)), 1.1*float64(limit), "%s under %s", all[k].what, spent.What)
					}
				}
				require.LessOrEqual(t, spent.Steps, st.Steps)
				require.NotEmpty(t, spent.Operations)
				// the same term, its values partly forced, with larger budgets
				got, _, err := normalOf(t, s, x, nbe.Limits{})
				require.NoError(t, err)
				require.True(t, term.Same(want[0].Term, got[0].Term))
			}
		}
	}
}

// What goes over a limit of the interval's is accounted for, too.
func TestWideIntervalsAreAccountedFor(t *testing.T) {
	e := corpusEngine(t)
	for _, p := range endless() {
		if p.name != "a wide interval that is substituted in" {
			continue
		}
		err := ask(context.Background(), e, p.ty, p.text(""))
		require.Equal(t, term.OutOfBudget, term.KindOf(err), "%v", err)
		spent := spentOf(err)
		require.NotNil(t, spent, "%v", err)
		require.Equal(t, "conjunctions", spent.What)
		require.Positive(t, spent.Steps)
		require.NotEmpty(t, spent.Operations)
	}
}

// A budget that is just enough is enough, and one less is not.
func TestBudgetsAreExact(t *testing.T) {
	e := corpusEngine(t)
	s := e.Scope()
	fresh := func() *nbe.Term {
		x, err := s.Infer(context.Background(), readText(t, question))
		require.NoError(t, err)
		return x
	}
	_, st, err := normalOf(t, s, fresh(), nbe.Limits{})
	require.NoError(t, err)
	_, _, err = normalOf(t, s, fresh(), nbe.Limits{Steps: st.Steps + 1, Memory: st.Memory + 200_000})
	require.NoError(t, err)
	_, _, err = normalOf(t, s, fresh(), nbe.Limits{Steps: st.Steps})
	require.Equal(t, term.OutOfBudget, term.KindOf(err))
	_, _, err = normalOf(t, s, fresh(), nbe.Limits{Memory: st.Memory - 1})
	require.Equal(t, term.OutOfBudget, term.KindOf(err))
}

// The account names the definitions whose code took the most steps.
func TestTheAccountNamesWhatCostMost(t *testing.T) {
	e := corpusEngine(t)
	s := e.Scope()
	x, err := s.Infer(context.Background(), readText(t, "(add (pred 5) (unroll (coil (Ack 3 6))))"))
	require.NoError(t, err)
	_, _, err = normalOf(t, s, x, nbe.Limits{Steps: 100_000})
	spent := spentOf(err)
	require.NotNil(t, spent)
	require.NotEmpty(t, spent.Definitions)
	require.Equal(t, "Ack", spent.Definitions[0].Name, "%s", spent)
	require.LessOrEqual(t, len(spent.Definitions), 3)
	sum := int64(0)
	for _, c := range spent.Operations {
		sum += c.Steps
	}
	require.GreaterOrEqual(t, sum, spent.Steps)
}

// The size of the output: as a graph when it is read back, as a tree when it is
// written, and a tree that is exponentially larger than its graph is refused
// with its size.
func TestOutputAsGraphAndAsTree(t *testing.T) {
	e := corpusEngine(t)
	define(t, e, "(def coilTree (-> Nat Tree) (lam (n) (elim (x Tree) n (zero leaf) ((suc k h) (node h h)))))")
	s := e.Scope()
	x, err := s.Infer(context.Background(), readText(t, "(coilTree 100)"))
	require.NoError(t, err)
	forms, err := s.Normal(context.Background(), x, nbe.Within(nbe.Limits{Output: 1000, Text: 10_000}))
	require.NoError(t, err, "as a graph it is small")
	tree, graph := term.Size(forms[0].Term)
	require.Positive(t, tree.Cmp(new(big.Int).Lsh(big.NewInt(1), 100)))
	require.Less(t, graph, 1000)
	_, err = forms[0].Written()
	require.Equal(t, term.OutOfBudget, term.KindOf(err))
	require.Equal(t, tree, spentOf(err).Needed)
	require.Equal(t, "nodes of text", spentOf(err).What)
	require.EqualValues(t, 10_000, spentOf(err).Limit)
	require.NotEmpty(t, spentOf(err).Operations, "what the call took that read it back")
}

// What is charged is what is used: a run's charge is at least half of the bytes
// that it allocates, and at most eight times of them, over the corpus.
func TestMemoryIsWhatItSays(t *testing.T) {
	e := corpusEngine(t)
	s := e.Scope()
	for _, p := range []program{
		{name: "a deep constructor", text: func(string) string { return "(coil 50000)" }},
		{name: "a number", text: func(string) string { return "(unroll (coil 50000))" }},
		{name: "Ackermann", text: func(string) string { return "(Ack 3 6)" }},
		{name: "functions", text: func(string) string {
			return "((elim (x (-> A A)) 20000 (zero (lam (m) m)) ((suc k h) (lam (m) (f (h m))))) a)"
		}},
	} {
		x, err := s.Infer(context.Background(), readText(t, p.text("")))
		require.NoError(t, err)
		var before, after runtime.MemStats
		runtime.ReadMemStats(&before)
		var st nbe.Stats
		_, err = s.Normal(context.Background(), x, nbe.Count(&st), nbe.Within(nbe.Limits{Depth: nbe.MaxDepth}))
		runtime.ReadMemStats(&after)
		require.NoError(t, err)
		used := after.TotalAlloc - before.TotalAlloc
		if used > 1<<20 { // below that, what every call takes weighs more
			require.Greater(t, float64(st.Memory), 0.5*float64(used), p.name)
			require.Less(t, float64(st.Memory), 8*float64(used), p.name)
		}
		t.Logf("%-30s charged %9d, allocated %9d, ratio %.2f", p.name, st.Memory, used, float64(st.Memory)/float64(used))
	}
}
