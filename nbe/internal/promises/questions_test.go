package promises

// Questions that a host may ask, each with all its options; and hosts that
// misbehave inside of a call.

import (
	"context"
	"errors"
	"math/big"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
)

// Types are compared at ≤ where that is asked for, and then types they must be.
func TestInclusion(t *testing.T) {
	s := corpusEngine(t).Scope()
	ctx := context.Background()
	for _, c := range []struct {
		a, b     string
		included bool
	}{
		{"(U 0)", "(U 1)", true}, {"(U 1)", "(U 0)", false}, {"(-> A (U 0))", "(-> A (U 2))", true}, {"(-> A (U 2))", "(-> A (U 0))", false},
		{"(* A (U 0))", "(* A (U 1))", true}, {"Nat", "Nat", true}, {"Nat", "Bool", false}, {"(-> (U 1) A)", "(-> (U 0) A)", false},
	} {
		a, b := mustInfer(t, s, c.a), mustInfer(t, s, c.b)
		got, err := s.Compare(ctx, a, b, nbe.Inclusion())
		require.NoError(t, err)
		require.Equal(t, c.included, got.Verdict == nbe.Equal, "%s ≤ %s: %s", c.a, c.b, got.Difference)
	}
	_, err := s.Compare(ctx, mustInfer(t, s, "0"), mustInfer(t, s, "0"), nbe.Inclusion())
	require.Equal(t, term.IllTyped, term.KindOf(err))
}

// An opaque definition is equal to itself alone.
func TestOpaqueInComparisons(t *testing.T) {
	s := corpusEngine(t).Scope()
	ctx := context.Background()
	a, b := mustInfer(t, s, "(double 2)"), mustInfer(t, s, "4")
	for _, c := range []struct {
		options []nbe.CallOption
		equal   bool
	}{{nil, true}, {[]nbe.CallOption{nbe.Opaque("double")}, false}, {[]nbe.CallOption{nbe.Opaque("add")}, true}} {
		got, err := s.Compare(ctx, a, b, c.options...)
		require.NoError(t, err)
		require.Equal(t, c.equal, got.Verdict == nbe.Equal)
		got, err = s.Compare(ctx, a, a, c.options...)
		require.NoError(t, err)
		require.Equal(t, nbe.Equal, got.Verdict)
		require.Equal(t, "no difference", got.Difference.String())
	}
}

// A report of stuck parts is bounded, and says how many more there are.
func TestManyStuckParts(t *testing.T) {
	s := corpusEngine(t).Scope()
	ctx := context.Background()
	b, err := s.Blocked(ctx, mustInfer(t, s, rep(200, "(g (g a a) ", "a", ")")))
	require.NoError(t, err)
	if b.More > 0 {
		require.Contains(t, b.String(), "further stuck parts")
	}
	for _, text := range []string{
		"(lam (i) (hcomp Circle base ((= i 0) (j) (loop j))))", "(ann (lam (n) (elim (x Nat) n (zero 0) ((suc k h) (add h h)))) (-> Nat Nat))",
		"(ann (lam (_ i) (at loopA i)) (-> Nat I A))", "(ann (lam (i) (hcomp Drum hub ((= i 0) (j) hub) ((= i 1) (j) (turn hub)))) (-> I Drum))",
	} {
		w := readText(t, text)
		x, err := s.Infer(ctx, w)
		if err != nil {
			x, err = s.Check(ctx, w, readText(t, "(-> I Circle)"))
		}
		if err != nil {
			continue
		}
		b, err := s.Blocked(ctx, x)
		require.NoError(t, err)
		require.NotEmpty(t, b.String(), text)
	}
}

// Long numbers are added and multiplied as math/big does it.
func TestLongArithmetic(t *testing.T) {
	e := corpusEngine(t)
	define(t, e, "(def trebled (-> Nat Nat Nat) (lam (m n) (elim (x Nat) m (zero n) ((suc k h) (suc (suc (suc h)))))))")
	s := e.Scope()
	ctx := context.Background()
	number := func(bits uint) *big.Int { // of no particular pattern
		n := new(big.Int).Exp(big.NewInt(3), big.NewInt(int64(bits)*100/158), nil)
		return n.Add(n, big.NewInt(int64(bits)))
	}
	for _, bits := range [][2]uint{{10, 60}, {63, 64}, {64, 64}, {200, 70_000}, {9_000, 9_000}, {65_536, 131_072}, {200_000, 70_001}, {100_000, 300_000}} {
		a, b := number(bits[0]), number(bits[1])
		for name, want := range map[string]*big.Int{"add": new(big.Int).Add(a, b), "trebled": new(big.Int).Add(new(big.Int).Mul(a, big.NewInt(3)), b)} {
			x, err := s.Infer(ctx, term.Apply(term.Name(name), term.BigNumeral(a), term.BigNumeral(b)))
			require.NoError(t, err)
			view, err := x.Value().View(ctx)
			require.NoError(t, err)
			require.Equal(t, "numeral", view.Head)
			require.Zero(t, want.Cmp(view.Number), "%s of %d and %d bits", name, a.BitLen(), b.BitLen())
		}
	}
	// and successors of what is stuck, seen from outside
	inner, err := s.Variable(ctx, "n", term.Name("Nat"))
	require.NoError(t, err)
	view, err := mustInfer(t, inner, "(suc (suc n))").Value().View(ctx)
	require.NoError(t, err)
	require.Equal(t, "suc", view.Head)
	require.EqualValues(t, 2, view.Number.Int64())
}

// misbehaved is a former whose word does what it is told.
func misbehaved(do func(c value.Checker)) prims.Former {
	return prims.Former{
		Name: "misbehaved", Version: 1,
		Words: []prims.Word{{Shape: term.Shape{Word: "Hold"}, Infer: func(c value.Checker, _ *term.Written) (value.Core, value.Value) {
			do(c)
			return &term.Op{Sig: dockSig}, prims.NewUniverse(1)
		}}},
		Operators: []prims.Operator{{Sig: dockSig, Op: dockOp{}}},
	}
}

// Whatever a host's former leaves a call with is an error of the call, and the
// engine goes on.
func TestWhatFormersLeaveWith(t *testing.T) {
	leak := errors.New("the hold is flooded")
	for _, c := range []struct {
		name string
		do   func(c value.Checker)
		kind term.ErrorKind
	}{
		{"an error", func(value.Checker) { panic(leak) }, term.Internal},
		{"a text", func(value.Checker) { panic("flooded") }, term.Internal},
		{"a fault of the runtime", func(value.Checker) { var p *term.Written; p.Word = "" }, term.Internal},
		{"a fault of its own", func(c value.Checker) { c.Run().Fault("flooded to %d", 3) }, term.Internal},
		{"what it does not do", func(c value.Checker) { c.Run().Unsupported("flooding") }, term.Unsupported},
		{"a limit of its own", func(c value.Checker) { c.Run().Over("holds", 3) }, term.OutOfBudget},
		{"work without end", func(c value.Checker) {
			for {
				c.Run().Step()
			}
		}, term.OutOfBudget},
		{"memory without end", func(c value.Checker) {
			for {
				c.Run().Charge(1 << 20)
			}
		}, term.OutOfBudget},
		{"nesting without end", func(c value.Checker) {
			var down func()
			down = func() { c.Run().Down(down) }
			down()
		}, term.OutOfBudget},
		{"nothing", func(value.Checker) {}, 0},
	} {
		e, err := nbe.New(nbe.WithFormers(misbehaved(c.do)), nbe.WithLimits(nbe.Limits{Steps: 100_000}))
		require.NoError(t, err)
		_, err = e.Scope().Infer(context.Background(), term.Form("Hold"))
		require.Equal(t, c.kind, term.KindOf(err), "%s: %v", c.name, err)
		if c.name == "an error" {
			require.ErrorIs(t, err, leak)
		}
		if c.kind == term.OutOfBudget {
			require.NotNil(t, spentOf(err), c.name)
		}
		define(t, e, "(def one Nat 1) (same Nat one 1)")
	}
}

// Wherever a script is stopped, it ends with its context's cause and nothing else.
func TestScriptsAreStoppedAnywhere(t *testing.T) {
	text := given + `
(same Nat (Ack 1 3) 5) (differ Nat 1 2) (normal (coil 3) (turn (turn (turn hub)))) (show (lam (x) x)) (show (fst (idEquiv A))) (show Tree)
(blocked (f a)) (reject (def a Nat 0)) (reject (reject (show 3))) (reject (normal (coil 2) hub)) (show (ann (line (i) a) (Path A a a)))`
	run := func(ctx context.Context) (err error) {
		s := &script.Session{Engine: mustNew(t), Report: func(r script.Result) {
			if term.KindOf(r.Err) == term.Cancelled {
				err = r.Err
			} else if r.Err != nil {
				t.Errorf("%s: %v", r.Form, r.Err)
			}
		}}
		if e := s.Source(ctx, []byte(strings.ReplaceAll(text, "(show (lam (x) x))", "")), "script"); e != nil {
			err = e
		}
		return err
	}
	whole := newLooked(0, 1<<40)
	require.NoError(t, run(whole))
	for end := 1; end <= len(whole.gaps); end++ {
		err := run(newLooked(end, 1<<40))
		require.Equal(t, term.Cancelled, term.KindOf(err), "look %d of %d: %v", end, len(whole.gaps), err)
		require.ErrorIs(t, err, errQuayClosed)
	}
	t.Logf("stopped at each of %d looks", len(whole.gaps))
}

// A view tells what stands outermost, for every form of value, with its parts.
func TestViews(t *testing.T) {
	s := corpusEngine(t).Scope()
	ctx := context.Background()
	for _, c := range []struct {
		ty, text, head string
		parts          int
	}{
		{"(U 0)", "(-> A A)", "Pi", 1}, {"(U 0)", "(Pi ((i I)) A)", "Pi", 0}, {"(U 0)", "(* A A)", "Sigma", 1}, {"(U 0)", "(Path A a a)", "Path", 2},
		{"(U 1)", "(U 0)", "U", 0}, {"(U 0)", "(Glue A)", "Glue", 1}, {"(U 0)", "(Quay A)", "Quay", 1}, {"(U 0)", "Unit", "Unit", 0}, {"(U 0)", "A", "neutral", 0},
		{"(-> A A)", "(lam (x) x)", "lam", 0}, {"(Path A a a)", "(line (i) a)", "line", 0}, {"(* A Nat)", "(pair a 3)", "pair", 2}, {"Nat", "(add 2 3)", "numeral", 0},
		{"Tree", "(node leaf leaf)", "node", 2}, {"(Quay A)", "(berth a (end))", "berth", 2}, {"Unit", "unit", "unit", 0}, {"(Glue A)", "(glue a)", "glue", 1}, {"A", "(f a)", "neutral", 0},
	} {
		x, err := s.Check(ctx, readText(t, c.text), readText(t, c.ty))
		require.NoError(t, err, c.text)
		view, err := x.Value().View(ctx)
		require.NoError(t, err, c.text)
		require.Equal(t, c.head, view.Head, c.text)
		require.Len(t, view.Parts, c.parts, c.text)
		for _, p := range view.Parts {
			forms, err := p.ReadBack(ctx)
			require.NoError(t, err, c.text)
			require.NotEmpty(t, forms[0].String())
			forms, err = p.Type().ReadBack(ctx)
			require.NoError(t, err, c.text)
			require.NotEmpty(t, forms[0].String())
		}
	}
	inner, err := s.Dimension("i")
	require.NoError(t, err)
	x, err := inner.Check(ctx, readText(t, "(hcomp Circle base ((= i 0) (j) (loop j)))"), term.Name("Circle"))
	require.NoError(t, err)
	view, err := x.Value().View(ctx)
	require.NoError(t, err)
	require.Equal(t, "hcomp", view.Head)
	require.Len(t, view.Parts, 1)
}
