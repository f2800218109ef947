package library

import (
	"context"
	"fmt"
	"math/rand/v2"
	"strings"
	"testing"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/quote"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Generated Glue types over three dimensions: integers with copies of themselves
// glued on, along the equivalence that adds a number, on faces drawn at random.
// What unglue gives never changes as one walks along such a type, so Go knows
// every integer that transport arrives at. And what is computed at generic
// dimensions and substituted in afterwards is what is computed at the images.

// face is a conjunction over i, j, k: -1 free, otherwise the end.
type face [3]int

func (f face) String() string {
	var parts []string
	for d, end := range f {
		if end >= 0 {
			parts = append(parts, fmt.Sprintf("(= %s %d)", names[d], end))
		}
	}
	return "(and " + strings.Join(parts, " ") + ")"
}

func (f face) meets(g face) bool {
	for d := range f {
		if f[d] >= 0 && g[d] >= 0 && f[d] != g[d] {
			return false
		}
	}
	return true
}

func (f face) holds(corner [3]int) bool { return f.meets(face(corner)) }

var names = [3]string{"i", "j", "k"}

// glued is one generated type.
type glued struct {
	faces   []face
	offsets []int // what the equivalence of each part adds
}

// generate adds parts to g that agree with its own; each adds from least to most.
func (g glued) generate(r *rand.Rand, least, most int) glued {
next:
	for range 1 + r.IntN(4) {
		f := face{-1, -1, -1}
		for range 1 + r.IntN(2) {
			f[r.IntN(3)] = r.IntN(2)
		}
		offset := least + r.IntN(most-least+1)
		for k, other := range g.faces {
			if f.meets(other) {
				offset = g.offsets[k]
			}
		}
		for k, other := range g.faces {
			if f.meets(other) && offset != g.offsets[k] {
				continue next
			}
		}
		g.faces, g.offsets = append(g.faces, f), append(g.offsets, offset)
	}
	return g
}

// equivalence adds n to an integer.
func equivalence(n int) string {
	switch {
	case n == 0:
		return "(identity-equivalence Int)"
	case n < 0:
		return "(inverse-equivalence Int Int " + equivalence(-n) + ")"
	case n == 1:
		return "successor-equivalence"
	}
	return "(compose-equivalences Int Int Int successor-equivalence " + equivalence(n-1) + ")"
}

// definition is the type as a function of its dimensions.
func (g glued) definition() string {
	var b strings.Builder
	b.WriteString("(lam (i j k) (Glue Int")
	for k, f := range g.faces {
		fmt.Fprintf(&b, " (%s Int %s)", f, equivalence(g.offsets[k]))
	}
	return b.String() + "))"
}

// offset is what the part that holds at a corner adds.
func (g glued) offset(corner [3]int) (int, bool) {
	for k, f := range g.faces {
		if f.holds(corner) {
			return g.offsets[k], true
		}
	}
	return 0, false
}

// element is the element of the type at a corner whose image in Int is n.
func (g glued) element(corner [3]int, n int) string {
	if by, ok := g.offset(corner); ok {
		return intTerm(n - by)
	}
	return fmt.Sprintf("(ann (glue %s) (G %s))", intTerm(n), corners(corner))
}

func corners(c [3]int) string { return fmt.Sprintf("%d %d %d", c[0], c[1], c[2]) }

// image is the integer that a term at a corner stands for.
func (g glued) image(t testing.TB, s *nbe.Scope, e *nbe.Engine, corner [3]int, src string) int {
	by, ok := g.offset(corner)
	if !ok {
		src = "(unglue " + src + ")"
	}
	return by + integer(t, normal(t, s, e, src))
}

func define(t testing.TB, e *nbe.Engine, name, ty, src string) {
	t.Helper()
	if err := e.Define(context.Background(), name, written(t, e, ty), written(t, e, src)); err != nil {
		t.Fatalf("%v in %s", clip(err), clip(src))
	}
}

func TestTransportInGeneratedGlueTypes(t *testing.T) {
	library := withLibrary(t, "integers")
	r := rand.New(rand.NewPCG(6, 1))
	rounds := 40
	if testing.Short() {
		rounds = 8
	}
	for range rounds {
		e := library.Fork()
		g := glued{}.generate(r, -1, 2)
		define(t, e, "G", "(-> I I I (U 0))", g.definition())
		s := e.Scope()
		corner := [3]int{r.IntN(2), r.IntN(2), r.IntN(2)}
		n := r.IntN(7) - 3
		src := g.element(corner, n)
		for range 5 {
			d := r.IntN(3)
			from := corner
			corner[d] = 1 - corner[d]
			at := [3]string{fmt.Sprint(from[0]), fmt.Sprint(from[1]), fmt.Sprint(from[2])}
			at[d] = "m"
			if from[d] == 1 {
				at[d] = "(rev m)"
			}
			line := "(G " + strings.Join(at[:], " ") + ")"
			switch r.IntN(4) {
			case 0: // composition stays where it is, up to a path
				src = fmt.Sprintf("(hcomp (G %s) %s)", corners(from), src)
			case 1:
				src = fmt.Sprintf("(comp (m (G %s)) %s)", corners(from), src)
			}
			src = fmt.Sprintf("(transp (m %s) bot %s)", line, src)
			if got := g.image(t, s, e, corner, src); got != n {
				t.Fatalf("in %s\n%s\nstands for %d, not %d", g.definition(), src, got, n)
			}
		}
	}
}

// substitutions of the dimensions j and k, as text and as the interval has them,
// for terms of a scope in which j is dimension 0 and k is dimension 1.
var substitutions = []struct {
	j, k   string
	of, to interval.Dim
}{
	{"0", "k", interval.Zero(), interval.Var(1)},
	{"1", "k", interval.One(), interval.Var(1)},
	{"j", "0", interval.Var(0), interval.Zero()},
	{"j", "1", interval.Var(0), interval.One()},
	{"0", "1", interval.Zero(), interval.One()},
	{"k", "j", interval.Var(1), interval.Var(0)},
	{"k", "k", interval.Var(1), interval.Var(1)},
	{"(rev j)", "k", interval.Var(0).Rev(), interval.Var(1)},
	{"(min j k)", "(max j k)", interval.Var(0).Min(interval.Var(1)), interval.Var(0).Max(interval.Var(1))},
	{"j", "(min j (rev j))", interval.Var(0), interval.Var(0).Min(interval.Var(0).Rev())},
}

func TestGlueIsStableUnderSubstitution(t *testing.T) {
	library := withLibrary(t, "integers")
	r := rand.New(rand.NewPCG(6, 2))
	rounds := 10
	if testing.Short() {
		rounds = 3
	}
	for n := range rounds {
		e := library.Fork()
		// along i from a corner type that is known, with j and k free
		g := glued{[]face{{0, -1, -1}}, []int{1}}.generate(r, 0, 1)
		define(t, e, "G", "(-> I I I (U 0))", g.definition())
		define(t, e, "walk", "(Pi ((j I) (k I)) (G 1 j k))", "(lam (j k) (transp (i (G i j k)) bot (pos 4)))")
		define(t, e, "box", "(Pi ((j I) (k I)) (G 1 j k))",
			"(lam (j k) (hcomp (G 1 j k) (walk j k) ((= j 0) (l) (walk 0 k)) ((= k 1) (l) (walk j 1))))")
		define(t, e, "there", "(Pi ((j I) (k I)) (G 1 j k))", "(lam (j k) (transp (m (G 1 (min m j) k)) (= j 0) (walk 0 k)))")
		for _, src := range []string{"walk", "box", "there"} {
			stable(t, e, src, nbe.DrawNames(uint64(n)))
			rechecks(t, e.Scope(), e, src)
		}
		rechecks(t, e.Scope(), e, "G")
	}
}

// stable requires the value of a function of j and k at generic dimensions,
// forced and read back first and substituted in afterwards, to have the normal
// form of the function at the images.
func stable(t *testing.T, e *nbe.Engine, name string, options ...nbe.CallOption) {
	t.Helper()
	ctx := context.Background()
	s := e.Scope()
	for _, d := range []string{"j", "k"} {
		var err error
		if s, err = s.Dimension(d); err != nil {
			t.Fatal(err)
		}
	}
	generic, err := s.Infer(ctx, written(t, e, "("+name+" j k)"), options...)
	if err != nil {
		t.Fatal(err)
	}
	if _, err := generic.Value().ReadBack(ctx, options...); err != nil {
		t.Fatal(err)
	}
	types, values, err := generic.Value().Semantic(ctx, options...)
	if err != nil {
		t.Fatal(err)
	}
	for _, sub := range substitutions {
		there, err := s.Infer(ctx, written(t, e, fmt.Sprintf("(%s %s %s)", name, sub.j, sub.k)), options...)
		if err != nil {
			t.Fatal(err)
		}
		want, err := s.Normal(ctx, there, options...)
		if err != nil {
			t.Fatal(err)
		}
		run := value.NewRun(value.Settings{Budget: value.Budget{Steps: 1 << 30, Depth: 1 << 16, Memory: 1 << 40, Output: 1 << 30}})
		by := interval.NewSubst([]interval.Name{0, 1}, []interval.Dim{sub.of, sub.to})
		got := quote.NewReader(run, 0, 2, nil).Term(run.Substitute(types[0], by), run.Substitute(values[0], by))
		if !term.Same(got, want[0].Term) {
			w, _ := s.Write(got)
			t.Fatalf("%s at %s %s:\nsubstituted: %s\ncomputed: %s", name, sub.j, sub.k, clip(w), clip(&want[0]))
		}
	}
}
