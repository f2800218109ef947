package nbe_test

import (
	"context"
	"errors"
	"fmt"
	"math/big"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/term"
)

// The API in wrong hands: terms that are no terms, names that are no names,
// things of one scope in another, zero values, ended contexts, limits. Each
// misuse is an error of the right kind, and the engine is as it was before.

var background = context.Background()

// works shows that an engine does its work and that nothing has been added
// under the names that failed calls used.
func works(t *testing.T, e *nbe.Engine) {
	t.Helper()
	err := firstError(e.Fork(), `
(def half Nat 3) (def Half (U 0) Nat) (data Halves () (point halfc ()))
(def halfsum (-> Nat Nat Nat) (lam (m n) (elim (x Nat) m (zero n) ((suc k h) (suc h)))))
(same Nat (halfsum 2 half) 5) (normal (at (ann (line (i) (loop i)) (Path Circle base base)) 0) base)
(def halfline (-> I Nat) (lam (i) (hcomp Nat 1 ((= i 0) (j) 1)))) (same Nat (halfline 0) 1)`)
	require.NoError(t, err)
}

// misuse requires an error of a kind, and an engine that works afterwards.
func misuse(t *testing.T, e *nbe.Engine, kind term.ErrorKind, err error) {
	t.Helper()
	var structured *term.Error
	require.True(t, errors.As(err, &structured), "%v", err)
	assert.ErrorIs(t, err, kind, "%v", err)
	assert.NotEmpty(t, err.Error())
	works(t, e)
}

// call is one of the calls that take a term.
type call struct {
	name string
	do   func(e *nbe.Engine, w *term.Written, options ...nbe.CallOption) error
}

func nat() *term.Written { return term.Name("Nat") }

// calls are all the ways in which a written term enters an engine.
var calls = []call{
	{"Infer", func(e *nbe.Engine, w *term.Written, o ...nbe.CallOption) error {
		_, err := e.Scope().Infer(background, w, o...)
		return err
	}},
	{"Check, the term", func(e *nbe.Engine, w *term.Written, o ...nbe.CallOption) error {
		_, err := e.Scope().Check(background, w, nat(), o...)
		return err
	}},
	{"Check, the type", func(e *nbe.Engine, w *term.Written, o ...nbe.CallOption) error {
		_, err := e.Scope().Check(background, term.Numeral(1), w, o...)
		return err
	}},
	{"CompareAt", func(e *nbe.Engine, w *term.Written, o ...nbe.CallOption) error {
		_, err := e.Scope().CompareAt(background, nat(), term.Numeral(1), w, o...)
		return err
	}},
	{"Variable", func(e *nbe.Engine, w *term.Written, o ...nbe.CallOption) error {
		_, err := e.Scope().Variable(background, "half", w, o...)
		return err
	}},
	{"Define, the term", func(e *nbe.Engine, w *term.Written, o ...nbe.CallOption) error {
		return e.Define(background, "half", nat(), w, o...)
	}},
	{"Define, the type", func(e *nbe.Engine, w *term.Written, o ...nbe.CallOption) error {
		return e.Define(background, "half", w, term.Numeral(1), o...)
	}},
	{"Assume", func(e *nbe.Engine, w *term.Written, o ...nbe.CallOption) error {
		return e.Assume(background, "half", w, o...)
	}},
	{"Hole", func(e *nbe.Engine, w *term.Written, o ...nbe.CallOption) error {
		return e.Hole(background, "half", w, o...)
	}},
	{"Declare, a parameter", func(e *nbe.Engine, w *term.Written, o ...nbe.CallOption) error {
		return e.Declare(background, &term.Declaration{Name: "Halves", Params: []term.Param{{Name: "X", Type: w}}}, o...)
	}},
	{"Declare, an argument", func(e *nbe.Engine, w *term.Written, o ...nbe.CallOption) error {
		return e.Declare(background, &term.Declaration{Name: "Halves", Constructors: []term.Constructor{{Name: "halfc", Args: []term.Param{{Name: "x", Type: w}}}}}, o...)
	}},
	{"Declare, a boundary", func(e *nbe.Engine, w *term.Written, o ...nbe.CallOption) error {
		return e.Declare(background, &term.Declaration{Name: "Halves", Constructors: []term.Constructor{
			{Name: "halfc", Path: true, Dims: []term.Binder{{Name: "i"}}, Boundary: []term.BoundaryWall{{Face: term.Eq(term.Name("i"), 0), Element: w}}}}}, o...)
	}},
	{"a wall", func(e *nbe.Engine, w *term.Written, o ...nbe.CallOption) error {
		_, err := e.Scope().Infer(background, term.Hcomp(nat(), term.Numeral(1), term.Wall(term.Top(), "i", w)), o...)
		return err
	}},
	{"under a face", func(e *nbe.Engine, w *term.Written, o ...nbe.CallOption) error {
		s, err := e.Scope().Dimension("i")
		if err != nil {
			return err
		}
		if s, err = s.Assume(background, term.Or(term.Eq(term.Name("i"), 0), term.Eq(term.Name("i"), 1))); err != nil {
			return err
		}
		_, err = s.Infer(background, w, o...)
		return err
	}},
	{"after other work", func(e *nbe.Engine, w *term.Written, o ...nbe.CallOption) error {
		_, err := e.Scope().Infer(background, term.Let("x", nat(), term.Numeral(3), w), o...)
		return err
	}},
}

func TestTermsThatAreNone(t *testing.T) {
	one := term.Numeral(1)
	var hollow *term.Written
	terms := map[string]*term.Written{
		"nil":                      nil,
		"the zero term":            {},
		"no kind":                  {Kind: 99, Word: "Nat"},
		"no numeral":               {Kind: term.NumeralKind},
		"a negative numeral":       term.BigNumeral(big.NewInt(-1)),
		"no head word":             term.Form("hoist", term.Plain(one)),
		"the empty head word":      term.Form(""),
		"a script's word":          term.Form("load", term.Plain(one)),
		"lam of nothing":           term.Form("lam"),
		"lam without a name":       term.Form("lam", term.Plain(one)),
		"lam with two names":       term.Form("lam", term.Under(one, "x", "y")),
		"lam of nil":               term.Lam(nil, "x"),
		"a name that is none":      term.Ann(term.Lam(one, "the crane"), term.Arrow(nat(), nat())),
		"a name that is a word":    term.Ann(term.Lam(one, "lam"), term.Arrow(nat(), nat())),
		"a name that is empty":     term.Ann(term.Lam(one, ""), term.Arrow(nat(), nat())),
		"a name that is a number":  term.Ann(term.Lam(one, "7"), term.Arrow(nat(), nat())),
		"a dimension that is none": term.Ann(term.Line(one, "("), term.Path(nat(), one, one)),
		"an empty application":     {Kind: term.ApplyKind},
		"nothing applied":          term.Apply(nil, one),
		"applied to nothing":       term.Apply(term.Name("suc"), nil),
		"rows where a term stands": term.Form("fst", term.RowsPart()),
		"a term where rows stand":  term.Form("hcomp", term.Plain(nat()), term.Plain(one), term.Plain(one)),
		"no rows":                  term.Form("hcomp", term.Plain(nat()), term.Plain(one)),
		"a row of nothing":         term.Hcomp(nat(), one, term.Row{}),
		"a row that is short":      term.Hcomp(nat(), one, term.Row{term.Plain(term.Top())}),
		"a row of nil":             term.Hcomp(nat(), one, term.Wall(nil, "i", nil)),
		"a wall that binds two":    term.Hcomp(nat(), one, term.Row{term.Plain(term.Top()), term.Under(one, "i", "j")}),
		"a path of nothing":        term.Path(nil, nil, nil),
		"at nothing":               term.At(term.Name("seq"), nil),
		"min of nothing":           term.At(term.Ann(term.Line(one, "i"), term.Path(nat(), one, one)), term.Min()),
		"min of nil":               term.At(term.Ann(term.Line(one, "i"), term.Path(nat(), one, one)), term.Min(nil)),
		"rev of nothing":           term.At(term.Ann(term.Line(one, "i"), term.Path(nat(), one, one)), term.Form("rev")),
		"and of nothing":           term.Transp("i", nat(), term.And(), one),
		"and of nil":               term.Transp("i", nat(), term.And(nil), one),
		"= of nothing":             term.Transp("i", nat(), term.Form("="), one),
		"a level of nothing":       term.Form("U"),
		"a level of nil":           term.Form("U", term.Plain(nil)),
		"a level that is a name":   term.Form("U", term.Plain(term.Name("n"))),
		"elim of nil":              term.Elim("x", nil, nil),
		"a case of nil":            term.Elim("x", nat(), one, term.Case("zero", nil)),
		"a case of nothing":        term.Elim("x", nat(), one, term.Row{}),
		"a case without a name":    term.Elim("x", nat(), one, term.Row{term.Plain(one), term.Plain(one)}),
		"a let of nil":             term.Let("x", nil, nil, nil),
		"product of nothing":       term.Product(),
		"pair of nothing":          term.Ann(term.Pair(), term.Product(nat(), nat())),
		"nil in a wall on bot":     term.Hcomp(nat(), one, term.Wall(term.Bot(), "i", hollow)),
		"Glue of nil":              term.Glue(nil, term.GlueType(nil, nil, nil)),
		"Equiv of nil":             term.Equiv(nil, nil),
	}
	for name, w := range terms {
		for _, c := range calls {
			t.Run(name+", "+c.name, func(t *testing.T) {
				if w == nil && c.name == "Define, the term" {
					t.Skip("see TestNothingToDefine")
				}
				e := fresh(t)
				err := c.do(e, w)
				require.Error(t, err)
				kind := term.KindOf(err)
				// What is before the hole may be at fault first.
				assert.Contains(t, []term.ErrorKind{malformed, illTyped, notFound, badDeclaration}, kind, "%v", err)
				works(t, e)
			})
		}
	}
}

func fresh(t *testing.T) *nbe.Engine {
	t.Helper()
	e, err := nbe.New()
	require.NoError(t, err)
	return e
}

func TestKindOfMalformedTerms(t *testing.T) {
	e := fresh(t)
	for name, w := range map[string]*term.Written{
		"nil": nil, "no kind": {Kind: 77}, "no numeral": {Kind: term.NumeralKind}, "negative": term.BigNumeral(big.NewInt(-3)),
		"no word": term.Form("hoist"), "no shape": term.Form("fst"), "no function": {Kind: term.ApplyKind}, "a nil part": term.Apply(nil),
	} {
		_, err := e.Scope().Infer(background, w)
		assert.ErrorIs(t, err, malformed, name)
	}
	works(t, e)
}

func TestNothingToDefine(t *testing.T) {
	e := fresh(t)
	misuse(t, e, malformed, e.Define(background, "half", nat(), nil))
	misuse(t, e, malformed, e.Define(background, "half", nil, nil))
	misuse(t, e, malformed, e.Declare(background, nil))
	misuse(t, e, malformed, e.Declare(background, &term.Declaration{}))
	misuse(t, e, malformed, e.Declare(background, &term.Declaration{Name: "Halves", Constructors: []term.Constructor{{}}}))
	misuse(t, e, malformed, e.Declare(background, &term.Declaration{Name: "Halves", Params: []term.Param{{}}}))
	misuse(t, e, badDeclaration, e.Declare(background, &term.Declaration{Name: "Halves", Composition: "loose"}))
	misuse(t, e, malformed, e.Declare(background, &term.Declaration{Name: "Halves", Constructors: []term.Constructor{
		{Name: "halfc", Path: true, Dims: []term.Binder{{Name: "i j"}}}}}))
	err := e.Declare(background, &term.Declaration{Name: "Halves", Constructors: []term.Constructor{
		{Name: "halfc", Path: true, Dims: []term.Binder{{Name: "i"}}, Boundary: []term.BoundaryWall{{}}}}})
	require.Error(t, err)
	works(t, e)
}

func TestNamesThatAreNone(t *testing.T) {
	e := fresh(t)
	for _, name := range []string{"", " ", "the crane", "(", "\"x\"", ";", "12", "lam", "def", "=", "I", "composition", "\xff", "a\nb"} {
		misuse(t, e, malformed, e.Define(background, name, nat(), term.Numeral(1)))
		misuse(t, e, malformed, e.Assume(background, name, nat()))
		misuse(t, e, malformed, e.Hole(background, name, nat()))
		misuse(t, e, malformed, e.Declare(background, &term.Declaration{Name: name}))
		_, err := e.Scope().Variable(background, name, nat())
		misuse(t, e, malformed, err)
		_, err = e.Scope().Dimension(name)
		misuse(t, e, malformed, err)
	}
	for _, name := range []string{"Nat", "suc", "loop"} {
		misuse(t, e, duplicate, e.Define(background, name, nat(), term.Numeral(1)))
		misuse(t, e, duplicate, e.Declare(background, &term.Declaration{Name: "Halves", Constructors: []term.Constructor{{Name: name}}}))
	}
	require.NoError(t, e.Define(background, "crates", nat(), term.Numeral(4)))
	misuse(t, e, duplicate, e.Define(background, "crates", nat(), term.Numeral(4)))
	misuse(t, e, duplicate, e.Assume(background, "crates", nat()))
}

func TestOtherScopes(t *testing.T) {
	e, other := fresh(t), fresh(t)
	s := e.Scope()
	mine, err := s.Infer(background, term.Numeral(1))
	require.NoError(t, err)
	deeper, err := s.Variable(background, "x", nat())
	require.NoError(t, err)
	theirs, err := other.Scope().Infer(background, term.Numeral(1))
	require.NoError(t, err)
	inner, err := deeper.Infer(background, term.Name("x"))
	require.NoError(t, err)
	for name, wrong := range map[string]*nbe.Term{"nil": nil, "zero": {}, "another engine's": theirs, "a deeper scope's": inner} {
		t.Run(name, func(t *testing.T) {
			_, err := s.Compare(background, mine, wrong)
			misuse(t, e, term.WrongScope, err)
			_, err = s.Compare(background, wrong, mine)
			misuse(t, e, term.WrongScope, err)
			_, err = s.Normal(background, wrong)
			misuse(t, e, term.WrongScope, err)
			_, err = s.Blocked(background, wrong)
			misuse(t, e, term.WrongScope, err)
			_, err = s.CheckAt(background, term.Numeral(1), wrong)
			misuse(t, e, term.WrongScope, err)
			_, err = s.CheckLike(background, term.Numeral(1), wrong)
			misuse(t, e, term.WrongScope, err)
			if name == "nil" || name == "zero" {
				return
			}
			_, err = mine.Value().Equal(background, wrong.Value())
			misuse(t, e, term.WrongScope, err)
			_, err = mine.Value().Apply(background, []*nbe.Value{wrong.Value()})
			require.Error(t, err)
			_, _, err = s.Bind(background, "y", wrong.Value())
			misuse(t, e, term.WrongScope, err)
			_, err = wrong.Value().In(background, s)
			misuse(t, e, term.WrongScope, err)
		})
	}
	t.Run("a term where a type is asked for", func(t *testing.T) {
		_, err := s.CheckAt(background, term.Numeral(1), mine)
		misuse(t, e, illTyped, err)
	})
}

func TestZeroValues(t *testing.T) {
	for name, e := range map[string]*nbe.Engine{"zero": {}, "nil": nil} {
		t.Run(name+" engine", func(t *testing.T) {
			assert.NotPanics(t, func() {
				for _, c := range calls {
					assert.Error(t, c.do(e, term.Numeral(1)), c.name)
				}
				assert.Error(t, e.Declare(background, &term.Declaration{Name: "Halves"}))
				_ = e.Fork()
				_ = e.Words()
				_, _ = e.Account(background, "Nat")
			})
		})
	}
	for name, s := range map[string]*nbe.Scope{"zero": {}, "nil": nil} {
		t.Run(name+" scope", func(t *testing.T) {
			assert.NotPanics(t, func() {
				_, err := s.Infer(background, term.Numeral(1))
				assert.Error(t, err)
				_, err = s.Check(background, term.Numeral(1), nat())
				assert.Error(t, err)
				_, err = s.Variable(background, "x", nat())
				assert.Error(t, err)
				_, err = s.Dimension("i")
				assert.Error(t, err)
				_, err = s.Assume(background, term.Top())
				assert.Error(t, err)
				_, err = s.Normal(background, &nbe.Term{})
				assert.Error(t, err)
			})
		})
	}
	t.Run("term", func(t *testing.T) {
		for _, x := range []*nbe.Term{nil, {}} {
			assert.NotPanics(t, func() {
				assert.Nil(t, x.Core())
				assert.Empty(t, x.Cores())
				assert.Nil(t, x.Scope())
				_, err := x.Value().ReadBack(background)
				assert.Error(t, err)
			})
		}
	})
	t.Run("value", func(t *testing.T) {
		for _, v := range []*nbe.Value{nil, {}} {
			assert.NotPanics(t, func() {
				for _, do := range []func() error{
					func() error { _, err := v.ReadBack(background); return err },
					func() error { _, err := v.View(background); return err },
					func() error { _, err := v.First(background); return err },
					func() error { _, err := v.At(background, term.Numeral(0)); return err },
					func() error { _, err := v.Apply(background, nil); return err },
					func() error { _, err := v.Equal(background, v); return err },
				} {
					assert.Error(t, do())
				}
			})
		}
	})
	t.Run("no context, no options", func(t *testing.T) {
		e := fresh(t)
		assert.NotPanics(t, func() {
			var none context.Context
			_, err := e.Scope().Infer(none, term.Numeral(1))
			assert.NoError(t, err)
			_, err = e.Scope().Infer(background, term.Numeral(1), nil, nbe.Count(nil))
			assert.NoError(t, err)
			_, err = nbe.New(nil)
			assert.NoError(t, err)
		})
	})
}

func TestCancelledCalls(t *testing.T) {
	cause := errors.New("the shift is over")
	ended, stop := context.WithCancelCause(background)
	stop(cause)
	e := fresh(t)
	s := e.Scope()
	one, err := s.Infer(background, term.Numeral(1))
	require.NoError(t, err)
	for name, do := range map[string]func() error{
		"Infer":    func() error { _, err := s.Infer(ended, term.Numeral(1)); return err },
		"Check":    func() error { _, err := s.Check(ended, term.Numeral(1), nat()); return err },
		"Variable": func() error { _, err := s.Variable(ended, "x", nat()); return err },
		"Assume":   func() error { _, err := s.Assume(ended, term.Top()); return err },
		"Normal":   func() error { _, err := s.Normal(ended, one); return err },
		"Compare":  func() error { _, err := s.Compare(ended, one, one); return err },
		"Blocked":  func() error { _, err := s.Blocked(ended, one); return err },
		"Define":   func() error { return e.Define(ended, "half", nat(), term.Numeral(1)) },
		"Declare":  func() error { return e.Declare(ended, &term.Declaration{Name: "Halves"}) },
		"ReadBack": func() error { _, err := one.Value().ReadBack(ended); return err },
	} {
		err := do()
		misuse(t, e, term.Cancelled, err)
		assert.ErrorIs(t, err, cause, name)
		assert.ErrorContains(t, err, "the shift is over", name)
	}
}

// doubling has a number, slow, whose evaluation takes 2^50 steps.
const doubling = `
(def add (-> Nat Nat Nat) (lam (m n) (elim (x Nat) m (zero n) ((suc k h) (suc h)))))
(def pow (-> Nat Nat) (lam (n) (elim (x Nat) n (zero 1) ((suc k h) (add h h)))))
(def down (-> Nat Nat) (lam (n) (elim (x Nat) n (zero 0) ((suc k h) (elim (y Nat) h (zero 0) ((suc m g) m))))))
(def slow Nat (down (pow 50)))
(def hoard Nat ((elim (x (-> Nat Nat)) (pow 50) (zero (lam (x) x)) ((suc k h) (lam (x) (h (suc x))))) 0))`

func TestCancelledOnTheWay(t *testing.T) {
	e := fresh(t)
	require.NoError(t, firstError(e, doubling))
	s := e.Scope()
	slow, err := s.Infer(background, term.Name("slow"))
	require.NoError(t, err)
	ctx, stop := context.WithTimeout(background, 20*time.Millisecond)
	defer stop()
	begin := time.Now()
	_, err = s.Normal(ctx, slow, nbe.Within(nbe.Limits{Steps: 1 << 60}))
	misuse(t, e, term.Cancelled, err)
	assert.ErrorIs(t, err, context.DeadlineExceeded)
	assert.Less(t, time.Since(begin), 10*time.Second)
	// What was stopped can be asked again, and folded it costs nothing.
	forms, err := s.Normal(background, slow, nbe.AllFolded())
	require.NoError(t, err)
	assert.Equal(t, "slow", forms[0].String())
}

func TestLimits(t *testing.T) {
	e := fresh(t)
	require.NoError(t, firstError(e, doubling+`
(def pair2 (-> Nat (* Nat Nat)) (lam (x) (pair x x)))
(def tree (U 0) (let ((a (U 0) Nat) (b (U 0) (* a a)) (c (U 0) (* b b)) (d (U 0) (* c c)) (e (U 0) (* d d)) (f (U 0) (* e e)) (g (U 0) (* f f))) (* g g)))`))
	s := e.Scope()
	nested := term.Numeral(0)
	for range 3000 {
		nested = term.Ann(nested, nat())
	}
	normal := func(text string, l nbe.Limits) error {
		x, err := s.Infer(background, term.Name(text))
		require.NoError(t, err)
		forms, err := s.Normal(background, x, nbe.Within(l))
		if err != nil {
			return err
		}
		_, err = forms[0].Written()
		return err
	}
	for _, c := range []struct {
		name string
		do   func(l nbe.Limits) error
		l    nbe.Limits
		says string
	}{
		{"steps", func(l nbe.Limits) error { return normal("slow", l) }, nbe.Limits{Steps: 10_000}, "10000 steps"},
		{"depth", func(l nbe.Limits) error { _, err := s.Infer(background, nested, nbe.Within(l)); return err }, nbe.Limits{Depth: 1000}, "1000 levels"},
		{"memory", func(l nbe.Limits) error { return normal("hoard", l) }, nbe.Limits{Memory: 1 << 16}, "65536 bytes"},
		{"output", func(l nbe.Limits) error { return normal("tree", l) }, nbe.Limits{Output: 3}, "3 nodes"},
		{"text", func(l nbe.Limits) error { return normal("tree", l) }, nbe.Limits{Text: 100}, "100"},
	} {
		t.Run(c.name, func(t *testing.T) {
			err := c.do(c.l)
			misuse(t, e, tooMuch, err)
			assert.ErrorContains(t, err, c.says)
			// The same holds for limits of the engine, and with every other limit set as well.
			l := nbe.Limits{Steps: 1 << 20, Depth: 1 << 16, Memory: 1 << 28, Output: 1 << 20, Text: 1 << 20}
			for _, p := range []struct{ to, from *int64 }{{&l.Steps, &c.l.Steps}, {&l.Depth, &c.l.Depth}, {&l.Memory, &c.l.Memory}, {&l.Output, &c.l.Output}, {&l.Text, &c.l.Text}} {
				if *p.from != 0 {
					*p.to = *p.from
				}
			}
			assert.ErrorIs(t, c.do(l), tooMuch)
		})
	}
	t.Run("a limit of the engine", func(t *testing.T) {
		small, err := nbe.New(nbe.WithLimits(nbe.Limits{Steps: 500}))
		require.NoError(t, err)
		assert.ErrorIs(t, firstError(small, doubling+"(show slow)"), tooMuch)
		_, err = small.Scope().Infer(background, nested, nbe.Within(nbe.Limits{Steps: 1 << 20}))
		assert.NoError(t, err, "a call's own limit counts")
	})
	t.Run("nothing is added when a definition runs out", func(t *testing.T) {
		err := firstError(e.Fork(), "(def half (Path Nat slow 0) (line (i) 0))", nbe.Within(nbe.Limits{Steps: 5000}))
		misuse(t, e, tooMuch, err)
	})
	t.Run("negative limits are those by default", func(t *testing.T) {
		_, err := s.Infer(background, nested, nbe.Within(nbe.Limits{-1, -1, -1, -1, -1}))
		assert.NoError(t, err)
	})
	t.Run("what was spent is told also after a failure", func(t *testing.T) {
		var stats nbe.Stats
		x, err := s.Infer(background, term.Name("slow"))
		require.NoError(t, err)
		_, err = s.Normal(background, x, nbe.Within(nbe.Limits{Steps: 10_000}), nbe.Count(&stats))
		require.Error(t, err)
		assert.GreaterOrEqual(t, stats.Steps, int64(10_000))
	})
}

// A term that a host has tied into a knot is as deep as one likes, and refused.
func TestKnots(t *testing.T) {
	knots := map[string]func(w *term.Written){
		"lam":  func(w *term.Written) { *w = *term.Lam(w, "x") },
		"suc":  func(w *term.Written) { *w = *term.Apply(term.Name("suc"), w) },
		"fst":  func(w *term.Written) { *w = *term.Fst(w) },
		"let":  func(w *term.Written) { *w = *term.Let("x", nat(), term.Numeral(1), w) },
		"ann":  func(w *term.Written) { *w = *term.Ann(w, nat()) },
		"wall": func(w *term.Written) { *w = *term.Hcomp(nat(), term.Numeral(1), term.Wall(term.Bot(), "i", w)) },
		"min":  func(w *term.Written) { *w = *term.Min(w, w) },
		"->":   func(w *term.Written) { *w = *term.Arrow(w, w) },
	}
	for name, tie := range knots {
		t.Run(name, func(t *testing.T) {
			e := fresh(t)
			w := &term.Written{}
			tie(w)
			ctx, stop := context.WithTimeout(background, 20*time.Second)
			defer stop()
			_, err := e.Scope().Infer(ctx, w, nbe.Within(nbe.Limits{Depth: 20_000, Steps: 1 << 20}))
			require.Error(t, err)
			assert.NotErrorIs(t, err, term.Cancelled)
			assert.NotErrorIs(t, err, term.Internal)
			if name == "wall" { // which is not checked, but its names must be there
				assert.ErrorContains(t, err, "20000 levels of nesting")
			}
			assert.Less(t, len(fmt.Sprint(err)), 1<<18)
			works(t, e)
		})
	}
}
