package kit_test

import (
	"flag"
	"fmt"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/kit"
	"example.com/boxwright/nbe/term"
)

// probe is a testing.TB that notes what an assertion says instead of failing.
type probe struct {
	testing.TB
	said string
}

func (p *probe) Helper()                      {}
func (p *probe) Errorf(f string, args ...any) { p.said += fmt.Sprintf(f, args...) }

const yard = `
	(def add (-> Nat Nat Nat) (lam (m n) (elim (x Nat) m (zero n) ((suc k h) (suc h)))))
	(assume drums Nat) (assume crane (-> Nat Nat))`

func TestAssertionsHoldAndFail(t *testing.T) {
	e := kit.Engine(t, yard)
	s := kit.Scope(t, e, "i", "A : (U 0)", "a : A", "p : (Path A a a)")
	for _, c := range []struct {
		name   string
		assert func(t testing.TB) bool
		says   string // empty: it holds
	}{
		{"equal", func(t testing.TB) bool { return kit.EqualAt(t, s, "Nat", "(add 2 3)", "5") }, ""},
		{"not equal", func(t testing.TB) bool {
			return kit.EqualAt(t, s, nil, "(ann (pair 1 (crane 2)) (* Nat Nat))", "(pair 1 (crane 3))")
		}, "the second part, the argument"},
		{"differ", func(t testing.TB) bool { return kit.DifferAt(t, s, "A", "(transp (j A) bot a)", "a") }, ""},
		{"do not differ", func(t testing.TB) bool { return kit.DifferAt(t, s, "A", "(transp (j A) top a)", "a") }, "equal by definition, both being a"},
		{"normal form", func(t testing.TB) bool { return kit.NormalIs(t, s, "(Path A a a)", "p", "(line (k) (at p k))") }, ""},
		{"another normal form", func(t testing.TB) bool { return kit.NormalIs(t, s, nil, "(crane (add 1 1))", "(crane (add 1 1))") }, "2 is not (add 1 1)"},
		{"refused", func(t testing.TB) bool { return kit.RefusedAs(t, s, term.IllTyped, "Nat", "a") }, ""},
		{"accepted", func(t testing.TB) bool { return kit.RefusedAs(t, s, term.IllTyped, "A", "a") }, "was accepted"},
		{"another kind", func(t testing.TB) bool { return kit.RefusedAs(t, s, term.IllTyped, "Nat", "nowhere") }, "as not found"},
		{"steps", func(t testing.TB) bool { return kit.StepsAtMost(t, s, 100, nil, "(add 2 3)") }, ""},
		{"too many steps", func(t testing.TB) bool { return kit.StepsAtMost(t, s, 1, nil, "(add (crane 2) 3)") }, "at most 1"},
		{"allocations", func(t testing.TB) bool {
			return kit.AllocationGrowth(t, 10, 1000, 2, func(int) { _ = make([]int, 10) })
		}, ""},
		{"allocations grow", func(t testing.TB) bool {
			return kit.AllocationGrowth(t, 10, 1000, 2, func(n int) {
				var all []*int
				for k := range n {
					all = append(all, &k)
				}
				_ = all
			})
		}, "a factor of"},
	} {
		t.Run(c.name, func(t *testing.T) {
			p := &probe{TB: t}
			require.Equal(t, c.says == "", c.assert(p), p.said)
			require.Contains(t, p.said, c.says)
		})
	}
}

// A message about two long terms names the difference and not both terms.
func TestMessagesAreShort(t *testing.T) {
	e := kit.Engine(t, yard)
	deep := func(core string) string {
		return strings.Repeat("(crane (add drums ", 60) + core + strings.Repeat("))", 60)
	}
	p := &probe{TB: t}
	kit.NormalIs(p, e.Scope(), nil, deep("1"), deep("2"))
	require.NotEmpty(t, p.said)
	a, b := kit.Read(t, e, deep("1")), kit.Read(t, e, deep("2"))
	require.Equal(t, "1 is not 2", kit.WayTo(a, b).String()[len(kit.WayTo(a, b).String())-10:])
}

func TestTermsUpToBoundNames(t *testing.T) {
	e := kit.Engine(t, yard)
	read := func(s string) *term.Written { return kit.Read(t, e, s) }
	for _, c := range [][2]string{
		{"(lam (x y) (x y))", "(lam (a b) (a b))"},
		{"(hcomp Nat 0 ((= i 0) (j) (crane j)))", "(hcomp Nat 0 ((= i 0) (k) (crane k)))"},
		{"(elim (x Nat) drums (zero 0) ((suc k h) h))", "(elim (y Nat) drums (zero 0) ((suc a b) b))"},
	} {
		require.True(t, kit.SameUpToNames(read(c[0]), read(c[1])))
		require.Empty(t, cmp.Diff(read(c[0]), read(c[1]), kit.CompareTerms()))
	}
	for _, c := range [][2]string{
		{"(lam (x y) x)", "(lam (x y) y)"},
		{"(lam (x) y)", "(lam (y) y)"},
		{"(lam (x) x)", "(line (x) x)"},
	} {
		require.False(t, kit.SameUpToNames(read(c[0]), read(c[1])))
		require.NotEmpty(t, cmp.Diff(read(c[0]), read(c[1]), kit.CompareTerms()))
	}
	d := cmp.Diff(read("(lam (x) (crane (pair x 1)))"), read("(lam (y) (crane (pair y 2)))"), kit.CompareTerms())
	require.Contains(t, d, "(lam (·0) (crane (pair ·0 ")

	// checked terms and values by their normal forms
	s := e.Scope()
	check := func(text string) *nbe.Term {
		x, err := s.Infer(t.Context(), read(text))
		require.NoError(t, err)
		return x
	}
	require.Empty(t, cmp.Diff(check("(add 2 3)"), check("5"), kit.CompareTerms()))
	require.NotEmpty(t, cmp.Diff(check("(add 2 3)").Value(), check("6").Value(), kit.CompareTerms()))
	require.Empty(t, cmp.Diff(check("(crane 2)").Core(), check("(crane 2)").Core(), kit.CompareTerms()))
	require.NotEmpty(t, cmp.Diff(check("(crane 2)").Core(), check("(crane 3)").Core(), kit.CompareTerms()))
}

func TestScripts(t *testing.T) { kit.Scripts(t, "testdata/scripts/*.txtar") }

func TestArchivesReadBack(t *testing.T) {
	text := "a comment\n-- main.sexp --\n(show 1)\n-- want --\nnothing\n"
	a := kit.ParseArchive(text)
	require.Equal(t, text, a.String())
	require.Len(t, a.Files, 2)
	report, failed := kit.RunArchive(t, kit.ParseArchive("-- s --\n(same Nat 1 2)\n(load \"gone\")\n"))
	require.Len(t, failed, 2)
	require.Contains(t, report, "1 is not 2")
}

func TestGoldenNormalForms(t *testing.T) {
	e := kit.Engine(t, yard)
	require.True(t, kit.GoldenNormal(t, e.Scope(), "testdata/normal/crane.golden", nil, "crane"))
	if flag.Lookup("update-golden").Value.String() == "true" {
		return
	}
	p := &probe{TB: t}
	require.False(t, kit.GoldenNormal(p, e.Scope(), "testdata/normal/crane.golden", nil, "(lam (n) n)")) // not inferred
	require.False(t, kit.GoldenNormal(p, e.Scope(), "testdata/normal/crane.golden", nil, "drums"))
	require.Contains(t, p.said, "line 1 differs")
}
