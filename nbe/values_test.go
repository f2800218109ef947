package nbe_test

import (
	"context"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
)

// What an elaborator does all day: values are applied, taken apart, taken on a
// face and read back without going through text.

func readText(t *testing.T, e *nbe.Engine, text string) *term.Written {
	t.Helper()
	w, err := notation.ReadTerm(text, "test", e.Words())
	require.NoError(t, err)
	return w
}

func valueOf(t *testing.T, s *nbe.Scope, e *nbe.Engine, text string) *nbe.Value {
	t.Helper()
	x, err := s.Infer(context.Background(), readText(t, e, text))
	require.NoError(t, err)
	return x.Value()
}

func readBack(t *testing.T, v *nbe.Value) string {
	t.Helper()
	forms, err := v.ReadBack(context.Background())
	require.NoError(t, err)
	require.Len(t, forms, 1)
	return forms[0].String()
}

func TestValuesAreAppliedAndTakenApart(t *testing.T) {
	ctx := context.Background()
	e, err := nbe.New()
	require.NoError(t, err)
	s := e.Scope()
	f := valueOf(t, s, e, "(ann (lam (x) (pair x (suc x))) (-> Nat (* Nat Nat)))")
	p, err := f.Apply(ctx, []*nbe.Value{valueOf(t, s, e, "41")})
	require.NoError(t, err)
	second, err := p.Second(ctx)
	require.NoError(t, err)
	require.Equal(t, "42", readBack(t, second))
	first, err := p.First(ctx)
	require.NoError(t, err)
	c, err := first.Equal(ctx, valueOf(t, s, e, "41"))
	require.NoError(t, err)
	require.Equal(t, nbe.Equal, c.Verdict)

	_, err = f.Apply(ctx, []*nbe.Value{valueOf(t, s, e, "true")})
	require.ErrorIs(t, err, term.IllTyped)
	_, err = p.Apply(ctx, []*nbe.Value{first})
	require.ErrorIs(t, err, term.IllTyped)
	_, err = f.First(ctx)
	require.ErrorIs(t, err, term.IllTyped)
	_, err = f.At(ctx, term.Numeral(0))
	require.ErrorIs(t, err, term.IllTyped)
}

func TestAFaceOfAValueIsTakenInTheScopeOfTheFace(t *testing.T) {
	ctx := context.Background()
	e, err := nbe.New()
	require.NoError(t, err)
	s := e.Scope()
	s, err = s.Variable(ctx, "p", readText(t, e, "(Path Nat 3 5)"))
	require.NoError(t, err)
	s, err = s.Dimension("i")
	require.NoError(t, err)
	v := valueOf(t, s, e, "(at p i)")
	require.Equal(t, "(at p i)", readBack(t, v))

	left, err := s.Assume(ctx, readText(t, e, "(Path Nat 0 0)")) // no face
	require.ErrorIs(t, err, term.IllTyped)
	require.Nil(t, left)
	face := term.Eq(term.Name("i"), 0)
	left, err = s.Assume(ctx, face)
	require.NoError(t, err)
	at0, err := v.In(ctx, left)
	require.NoError(t, err)
	require.Equal(t, "3", readBack(t, at0))

	both, err := s.Assume(ctx, term.Or(term.Eq(term.Name("i"), 0), term.Eq(term.Name("i"), 1)))
	require.NoError(t, err)
	ends, err := v.In(ctx, both)
	require.NoError(t, err)
	forms, err := ends.ReadBack(ctx)
	require.NoError(t, err)
	require.Len(t, forms, 2)
	require.Equal(t, "3", forms[0].String())
	require.Equal(t, "5", forms[1].String())

	none, err := s.Assume(ctx, term.Bot())
	require.NoError(t, err)
	nothing, err := v.In(ctx, none)
	require.NoError(t, err)
	forms, err = nothing.ReadBack(ctx)
	require.NoError(t, err)
	require.Empty(t, forms)

	// the way back is no way
	_, err = at0.In(ctx, s)
	require.ErrorIs(t, err, term.WrongScope)
	_, err = at0.Equal(ctx, v)
	require.ErrorIs(t, err, term.WrongScope)

	// a line taken at dimensions of the scope
	line := valueOf(t, s, e, "(ann (line (j) (at p (min i j))) (Path Nat 3 (at p i)))")
	end, err := line.At(ctx, term.Numeral(1))
	require.NoError(t, err)
	require.Equal(t, "(at p i)", readBack(t, end))
}

func TestViewsGoNoFurtherThanTheOutermostConstructor(t *testing.T) {
	ctx := context.Background()
	e, err := nbe.New()
	require.NoError(t, err)
	// ackermann is far too large to be evaluated in the steps given
	forms, err := notation.ReadScript([]byte(`
(def ackermann (-> Nat Nat Nat) (lam (m) (elim (x (-> Nat Nat)) m (zero (lam (n) (suc n)))
  ((suc k h) (lam (n) (elim (y Nat) n (zero (h 1)) ((suc l g) (h g))))))))`), "test", e.Words())
	require.NoError(t, err)
	require.NoError(t, e.Define(ctx, forms[0].Name, forms[0].Type, forms[0].Term))
	s := e.Scope()
	v := valueOf(t, s, e, "(ann (pair (ackermann 9 9) true) (* Nat Bool))")
	few := nbe.Within(nbe.Limits{Steps: 1000})
	view, err := v.View(ctx, few)
	require.NoError(t, err)
	require.Equal(t, "pair", view.Head)
	right, err := view.Parts[1].View(ctx, few)
	require.NoError(t, err)
	require.Equal(t, "true", right.Head)
	_, err = view.Parts[0].View(ctx, few)
	require.ErrorIs(t, err, term.OutOfBudget)

	for text, head := range map[string]string{
		"(-> Nat Nat)": "Pi", "(* Nat Nat)": "Sigma", "(Path Nat 0 0)": "Path", "Unit": "Unit", "(U 3)": "U", "(Sum Nat Bool)": "Sum",
		"7": "numeral", "unit": "unit", "(ann (inl 3) (Sum Nat Bool))": "inl", "(hcomp Circle base)": "hcomp", "base": "base",
		"(ann (lam (x) x) (-> Nat Nat))": "lam", "(ann (line (i) 0) (Path Nat 0 0))": "line", "(-> I Nat)": "Pi",
	} {
		view, err := valueOf(t, s, e, text).View(ctx)
		require.NoError(t, err, text)
		require.Equal(t, head, view.Head, text)
	}
}

func TestTypesAreTakenApartUnderTheirBinders(t *testing.T) {
	ctx := context.Background()
	e, err := nbe.New()
	require.NoError(t, err)
	s := e.Scope()
	ty := valueOf(t, s, e, "(Pi ((n Nat)) (Path Nat n n))")
	view, err := ty.View(ctx)
	require.NoError(t, err)
	sub, n, err := s.Bind(ctx, "crates", view.Parts[0])
	require.NoError(t, err)
	inside, err := ty.In(ctx, sub)
	require.NoError(t, err)
	codomain, err := inside.Codomain(ctx, n)
	require.NoError(t, err)
	require.Equal(t, "(Path Nat crates crates)", readBack(t, codomain))
	_, err = ty.Codomain(ctx, valueOf(t, s, e, "true"))
	require.ErrorIs(t, err, term.IllTyped)
}

// Each way to take a value apart fits some types only; the others are refused,
// and nothing is left that could be used.
func TestValuesThatDoNotFitAreRefused(t *testing.T) {
	ctx := context.Background()
	e, err := nbe.New()
	require.NoError(t, err)
	s := e.Scope()
	three := valueOf(t, s, e, "3")
	for name, do := range map[string]func() (*nbe.Value, error){
		"a part of a number":        func() (*nbe.Value, error) { return three.Second(ctx) },
		"the codomain of a number":  func() (*nbe.Value, error) { return three.Codomain(ctx, three) },
		"the codomain of no type":   func() (*nbe.Value, error) { return valueOf(t, s, e, "Nat").Codomain(ctx, three) },
		"a number at a dimension":   func() (*nbe.Value, error) { return three.At(ctx, term.Numeral(0)) },
		"a variable of no type":     func() (*nbe.Value, error) { _, v, err := s.Bind(ctx, "crates", three); return v, err },
		"a path at a missing place": func() (*nbe.Value, error) { return valueOf(t, s, e, "(ann (line (i) 0) (Path Nat 0 0))").At(ctx, nil) },
	} {
		v, err := do()
		require.Error(t, err, name)
		require.NotEqual(t, term.Internal, term.KindOf(err), "%s: %v", name, err)
		require.Nil(t, v, name)
	}
	_, _, err = s.Bind(ctx, "lam", valueOf(t, s, e, "Nat"))
	require.Equal(t, term.Malformed, term.KindOf(err), "%v", err)
	_, err = three.In(ctx, nil)
	require.Error(t, err)
	var none *nbe.Value
	require.Nil(t, none.Type())
	require.Nil(t, none.Scope())
	require.Same(t, s, three.Scope())

	// what fits, beside the functions and the paths
	second, err := valueOf(t, s, e, "(Sigma ((n Nat)) (Path Nat n 3))").Codomain(ctx, three)
	require.NoError(t, err)
	require.Equal(t, "(Path Nat 3 3)", readBack(t, second))
	end, err := valueOf(t, s, e, "(ann (lam (i) 5) (-> I Nat))").At(ctx, term.Numeral(1))
	require.NoError(t, err)
	require.Equal(t, "5", readBack(t, end))

	// the face top assumes nothing
	all, err := s.Assume(ctx, term.Top())
	require.NoError(t, err)
	same, err := three.In(ctx, all)
	require.NoError(t, err)
	require.Equal(t, "3", readBack(t, same))
	ended, stop := context.WithCancel(ctx)
	stop()
	_, err = three.In(ended, all)
	require.ErrorIs(t, err, term.Cancelled)
	var zero nbe.Scope
	_, err = zero.Write(nil)
	require.Error(t, err)
}

// A form too large for the limit Text says so where its text would stand, and a
// host's word that can be none keeps an engine from being made.
func TestWhatCannotBeWrittenSaysSo(t *testing.T) {
	ctx := context.Background()
	e, err := nbe.New(nbe.WithLimits(nbe.Limits{Text: 3}))
	require.NoError(t, err)
	forms, err := valueOf(t, e.Scope(), e, "(ann (pair 1 (pair 2 (pair 3 4))) (* Nat Nat Nat Nat))").ReadBack(ctx)
	require.NoError(t, err)
	_, err = forms[0].Written()
	require.ErrorIs(t, err, term.OutOfBudget)
	require.Contains(t, forms[0].String(), err.Error())

	for _, word := range []string{"", "(", "a b", "7"} {
		_, err := nbe.New(nbe.WithFormers(prims.Former{Name: "shed", Words: []prims.Word{{Shape: term.Shape{Word: word}}}}))
		require.Error(t, err, "%q", word)
		require.NotEqual(t, term.Internal, term.KindOf(err), "%v", err)
	}
}
