package nbe_test

// Properties of random well-typed terms: what the engine says must agree with
// itself whichever way it is asked, and with the plain evaluator. The terms are
// well typed by construction, so refusing one is a failure as well.

import (
	"context"
	"errors"
	"fmt"
	"maps"
	"math/rand/v2"
	"slices"
	"strings"
	"sync"
	"testing"

	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/internal/generate"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

var dimensionNames = []string{"k", "l", "m"}

// small keeps a random term from filling the machine; a term that needs more is
// left out, and too many of those fail the test.
var small = nbe.Within(nbe.Limits{Steps: 2_000_000, Depth: 20_000, Memory: 512 << 20, Output: 60_000})

// drawn are choices that rapid can shrink. Its numbers lean towards the small
// ones, which would make small terms of few kinds; a shift evens them out.
type drawn struct {
	t     *rapid.T
	shift *rand.Rand
}

func draw(t *rapid.T) drawn {
	return drawn{t, rand.New(rand.NewPCG(rapid.Uint64().Draw(t, "seed"), 0))}
}

func (d drawn) Intn(n int) int {
	return (rapid.IntRange(0, n-1).Draw(d.t, "choice") + d.shift.IntN(n)) % n
}

// tally is what all properties together have exercised.
var tally = struct {
	sync.Mutex
	forms         map[string]int
	terms, budget int
	stats         nbe.Stats
}{forms: map[string]int{}}

var engines = map[string]*nbe.Engine{}

// engineOf is a fork of the engine of a build that knows what the generated
// terms mention.
func engineOf(t require.TestingT, b build) *nbe.Engine {
	tally.Lock()
	defer tally.Unlock()
	if engines[b.name] == nil {
		engines[b.name] = b.engine(t, generate.Given)
	}
	return engines[b.name].Fork()
}

// sample is a random type with two terms of it, in a scope of dimensions.
type sample struct {
	t       *generate.Type
	ty      *term.Written
	a, b    *term.Written
	g       *generate.Generator
	subject string
}

func newSample(source generate.Source) sample {
	g := generate.New(source, dimensionNames, 14)
	t := g.Of(generate.Kinds[source.Intn(len(generate.Kinds))], 2)
	g.Refill(10)
	a := g.Composite(t, 3)
	if source.Intn(2) == 0 {
		a = g.Term(t, 4)
	}
	g.Refill(5)
	b := g.Term(t, 2)
	tally.Lock()
	for k, n := range g.Tally {
		tally.forms[k] += n
	}
	tally.terms += 2
	tally.Unlock()
	return sample{t, t.Written(), a, b, g, fmt.Sprintf("(same %s\n  %s\n  %s)", t, a, b)}
}

func scopeOf(t require.TestingT, e *nbe.Engine) *nbe.Scope {
	s := e.Scope()
	for _, d := range dimensionNames {
		var err error
		s, err = s.Dimension(d)
		require.NoError(t, err)
	}
	return s
}

// outOfBudget ends a property for a term that is too large; any other error fails.
func outOfBudget(t require.TestingT, err error, subject string) bool {
	if errors.Is(err, term.OutOfBudget) {
		tally.Lock()
		tally.budget++
		tally.Unlock()
		return true
	}
	require.NoError(t, err, "%s", subject)
	return false
}

type prover struct {
	t    require.TestingT
	s    *nbe.Scope
	call []nbe.CallOption
	what string
}

// tooLarge leaves a property.
type tooLarge struct{}

func leave() {
	if r := recover(); r != nil {
		if _, ok := r.(tooLarge); !ok {
			panic(r)
		}
	}
}

func (p *prover) no(err error, doing string) {
	if outOfBudget(p.t, err, doing+"\n"+p.what) {
		panic(tooLarge{})
	}
}

func (p *prover) check(w, ty *term.Written) *nbe.Term {
	x, err := p.s.Check(context.Background(), w, ty, p.call...)
	p.no(err, "checking "+w.Text(400))
	return x
}

func (p *prover) normal(x *nbe.Term) nbe.Form {
	var stats nbe.Stats
	forms, err := p.s.Normal(context.Background(), x, append(p.call[:len(p.call):len(p.call)], nbe.Count(&stats))...)
	tally.Lock()
	tally.stats.Composites += stats.Composites
	tally.stats.Transports += stats.Transports
	tally.stats.Relabelled += stats.Relabelled
	tally.stats.Skipped += stats.Skipped
	tally.stats.Pushed += stats.Pushed
	tally.Unlock()
	p.no(err, "normalising")
	return forms[0]
}

func (p *prover) equal(x, y *nbe.Term) bool {
	c, err := p.s.Compare(context.Background(), x, y, p.call...)
	p.no(err, "comparing")
	return c.Verdict == nbe.Equal
}

func (p *prover) written(f nbe.Form) (w, ty *term.Written) {
	w, err := f.Written()
	p.no(err, "writing")
	ty, err = f.WrittenType()
	p.no(err, "writing the type")
	return w, ty
}

func (p *prover) same(a, b nbe.Form, what string) {
	if !term.Same(a.Term, b.Term) {
		require.FailNow(p.t, "two normal forms", "%s\n%s\n%s\nfor %s", what, &a, &b, p.what)
	}
}

// property checks f on samples; times says how many each round has.
func property(t *testing.T, times int, f func(t *rapid.T, x sample)) {
	t.Helper()
	rapid.Check(t, func(rt *rapid.T) {
		for range times {
			func() {
				defer leave()
				f(rt, newSample(draw(rt)))
			}()
		}
	})
}

func proverOf(t require.TestingT, b build, x sample) *prover {
	return &prover{t: t, s: scopeOf(t, engineOf(t, b)), call: append([]nbe.CallOption{small}, b.call...), what: b.name + ": " + x.subject}
}

var fast = build{"fast", nil, nil}

// A normal form is a term of its type, is its own normal form, and is equal to
// what it is the normal form of.
func TestNormalFormsAreTermsAndStay(t *testing.T) {
	property(t, 4, func(t *rapid.T, x sample) {
		p := proverOf(t, fast, x)
		a := p.check(x.a, x.ty)
		n := p.normal(a)
		w, ty := p.written(n)
		again := p.check(w, ty)
		p.same(n, p.normal(again), "normalising twice")
		require.True(t, p.equal(a, p.check(w, x.ty)), "not equal to its normal form %s\nfor %s", w, x.subject)
	})
}

// Comparing says what comparing normal forms says.
func TestComparingAgreesWithNormalForms(t *testing.T) {
	property(t, 4, func(t *rapid.T, x sample) {
		p := proverOf(t, fast, x)
		a, b := p.check(x.a, x.ty), p.check(x.b, x.ty)
		equal := p.equal(a, b)
		require.True(t, p.equal(a, a) && p.equal(b, a) == equal, "%s", x.subject)
		require.Equal(t, term.Same(p.normal(a).Term, p.normal(b).Term), equal, "%s", x.subject)
	})
}

// Putting dimensions into a value, before and after it has been looked at, gives
// what putting them into the term gives: ends, renamings, identifications,
// connections.
func TestSubstitutingDimensionsCommutes(t *testing.T) {
	property(t, 4, func(t *rapid.T, x sample) {
		p := proverOf(t, fast, x)
		words, source := map[string]*term.Written{}, draw(t)
		var names []interval.Name
		var dims []interval.Dim
		for k, d := range dimensionNames {
			w, r := someDimension(source)
			if r.Equal(interval.Var(interval.Name(k))) {
				continue
			}
			words[d] = w
			names, dims = append(names, interval.Name(k)), append(dims, r)
		}
		sub := interval.NewSubst(names, dims)
		p.what += "\nsubstitution " + fmt.Sprint(words)
		ctx := context.Background()
		a := p.check(x.a, x.ty)
		early, err := p.s.SubstituteValue(ctx, a, sub, p.call...)
		p.no(err, "substituting")
		want := p.normal(p.check(generate.Replace(x.a, words), generate.Replace(x.ty, words)))
		p.same(want, p.normal(early), "substituted before it was looked at")
		p.normal(a)
		late, err := p.s.SubstituteValue(ctx, a, sub, p.call...)
		p.no(err, "substituting")
		p.same(want, p.normal(late), "substituted after it was looked at")
		require.True(t, p.equal(early, late), "comparing the two: %s", p.what)
	})
}

// A term under the assumption of a face is the term with the face put into its
// value.
func TestAssumingAFaceSubstitutes(t *testing.T) {
	property(t, 2, func(t *rapid.T, x sample) {
		p := proverOf(t, fast, x)
		ctx := context.Background()
		source := draw(t)
		k, end := source.Intn(3), uint64(source.Intn(2))
		d := interval.Zero()
		if end == 1 {
			d = interval.One()
		}
		a := p.check(x.a, x.ty)
		p.normal(a)
		late, err := p.s.SubstituteValue(ctx, a, interval.Assign(interval.Name(k), d), p.call...)
		p.no(err, "substituting")
		want := p.normal(late)
		s, err := p.s.Assume(ctx, term.Eq(term.Name(dimensionNames[k]), end), p.call...)
		p.no(err, "assuming")
		p.s = s
		p.same(want, p.normal(p.check(x.a, x.ty)), fmt.Sprintf("on the face %s = %d", dimensionNames[k], end))
	})
}

// What is written in other words for the same is equal: through a function that
// gives its argument back, a wall on top, a transport on top, a path at an end.
func TestDetoursAreEqual(t *testing.T) {
	property(t, 3, func(t *rapid.T, x sample) {
		p := proverOf(t, fast, x)
		other := detour(draw(t), x.a, x.ty)
		a, b := p.check(x.a, x.ty), p.check(other, x.ty)
		require.True(t, p.equal(a, b) && p.equal(b, a), "%s\nand %s", x.subject, other)
		p.same(p.normal(a), p.normal(b), "by a detour")
	})
}

func detour(s generate.Source, a, ty *term.Written) *term.Written {
	switch s.Intn(7) {
	case 0:
		return term.Apply(term.Ann(term.Lam(term.Name("given"), "given"), term.Arrow(ty, ty)), a)
	case 1:
		return term.Hcomp(ty, a, term.Wall(term.Top(), "top-line", a))
	case 2:
		return term.Transp("top-line", ty, term.Top(), a)
	case 3:
		return term.At(term.Ann(term.Line(a, "flat"), term.Path(ty, a, a)), term.Name("k"))
	case 4:
		return term.Snd(term.Ann(term.Pair(term.UnitElement(), a), term.Product(term.UnitType(), ty)))
	case 5:
		return term.Hfill(ty, a, term.Numeral(0))
	}
	return term.Let("held", ty, a, term.Name("held"))
}

func someDimension(s generate.Source) (*term.Written, interval.Dim) {
	k, l := s.Intn(3), s.Intn(3)
	x, y := interval.Var(interval.Name(k)), interval.Var(interval.Name(l))
	v, w := term.Name(dimensionNames[k]), term.Name(dimensionNames[l])
	switch s.Intn(8) {
	case 0:
		return term.Numeral(0), interval.Zero()
	case 1:
		return term.Numeral(1), interval.One()
	case 2:
		return term.Rev(v), x.Rev()
	case 3:
		return term.Min(v, w), x.Min(y)
	case 4:
		return term.Max(v, w), x.Max(y)
	case 5:
		return term.Min(v, term.Rev(w)), x.Min(y.Rev())
	}
	return v, x
}

// Putting a closed term for a variable, by application, by a definition in the
// place of an assumption, and into the term, gives the same.
func TestSubstitutingVariablesCommutes(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		defer leave()
		source := draw(t)
		closed := generate.New(source, nil, 8)
		s := closed.Type(2)
		closed.Refill(5)
		v := closed.Term(s, 2)
		g := generate.New(source, dimensionNames, 12)
		g.Push("y", s)
		ty := g.Type(2)
		g.Refill(8)
		a := g.Term(ty, 3)
		ctx := context.Background()
		what := fmt.Sprintf("(assume y %s)\n%s\n%s\ny := %s", s, ty, a, v)

		e := engineOf(t, fast)
		plain := &prover{t: t, s: scopeOf(t, e.Fork()), call: []nbe.CallOption{small}, what: what}
		put := map[string]*term.Written{"y": term.Ann(v, s.Written())}
		want := plain.normal(plain.check(generate.Replace(a, put), generate.Replace(ty.Written(), put)))
		f := term.Ann(term.Lam(a, "y"), term.Pi("y", s.Written(), ty.Written()))
		plain.same(want, plain.normal(plain.check(term.Apply(f, v), generate.Replace(ty.Written(), put))), "by application")

		require.NoError(t, e.Assume(ctx, "y", s.Written()), what)
		p := &prover{t: t, s: scopeOf(t, e), call: []nbe.CallOption{small}, what: what}
		x := p.check(a, ty.Written())
		p.normal(x)
		plain.no(e.Define(ctx, "y", s.Written(), v, small), "defining")
		p.same(want, p.normal(x), "by a definition in the assumption's place")

		// as a definition from the start, unfolded, folded and compared
		f2 := engineOf(t, fast)
		plain.no(f2.Define(ctx, "y", s.Written(), v, small), "defining")
		q := &prover{t: t, s: scopeOf(t, f2), call: []nbe.CallOption{small}, what: what}
		d := q.check(a, ty.Written())
		unfolded := q.check(generate.Replace(a, put), ty.Written())
		require.True(t, q.equal(d, unfolded) && q.equal(unfolded, d), "%s", what)
		folded, err := q.s.Normal(ctx, d, small, nbe.AllFolded())
		q.no(err, "normalising folded")
		w, wt := q.written(folded[0])
		again := q.check(w, wt)
		require.True(t, q.equal(d, again), "folded %s\n%s", w, what)
		q.same(want, q.normal(d), "by a definition")
		q.same(want, q.normal(again), "by a folded normal form")
	})
}

// With more dimensions in scope than a word holds, the same comes out.
func TestManyDimensionsChangeNothing(t *testing.T) {
	property(t, 1, func(t *rapid.T, x sample) {
		p := proverOf(t, fast, x)
		w, ty := p.written(p.normal(p.check(x.a, x.ty)))
		e := engineOf(t, fast)
		s := e.Scope()
		for n := range 70 {
			var err error
			s, err = s.Dimension(fmt.Sprintf("d%d", n))
			require.NoError(t, err)
		}
		for _, d := range dimensionNames {
			var err error
			s, err = s.Dimension(d)
			require.NoError(t, err)
		}
		q := &prover{t: t, s: s, call: p.call, what: p.what}
		a := q.check(x.a, x.ty)
		n := q.normal(a)
		q.same(n, q.normal(q.check(w, ty)), "beside many dimensions")
		require.True(t, term.Same(n.Term, q.check(w, ty).Core()), "%s\n%s\n%s", &n, w, p.what)
	})
}

// The plain evaluator, with each shortcut off and with all of them off, and names
// drawn at random give the same normal forms.
func TestShortcutsChangeNothing(t *testing.T) {
	plain := func(name string, p value.Plain) build { return build{name, []nbe.Option{nbe.WithPlain(p)}, nil} }
	others := []build{
		plain("no support", value.Plain{NoSupport: true}), plain("no sharing", value.Plain{NoSharing: true}),
		plain("eager", value.Plain{Eager: true}), plain("no frontier", value.Plain{NoFrontier: true}),
		plain("no numerals", value.Plain{NoNumerals: true}), plain("all plain", allPlain),
		{"names drawn from seed 1", nil, []nbe.CallOption{nbe.DrawNames(1)}}, {"names drawn from seed 2", nil, []nbe.CallOption{nbe.DrawNames(2)}},
		{"eager with names drawn", []nbe.Option{nbe.WithPlain(value.Plain{Eager: true})}, []nbe.CallOption{nbe.DrawNames(3)}},
	}
	property(t, 1, func(t *rapid.T, x sample) {
		p := proverOf(t, fast, x)
		first := p.normal(p.check(x.a, x.ty))
		for _, b := range others {
			func() {
				defer leave()
				q := proverOf(t, b, x)
				q.same(first, q.normal(q.check(x.a, x.ty)), "fast, and in the build "+b.name)
			}()
		}
	})
}

// floors are how often the properties together must have exercised each form,
// for a test of properties to mean something.
const (
	floorType = 30
	floorRule = 10
)

func TestPropertiesExercised(t *testing.T) {
	if len(tally.forms) == 0 {
		t.Skip("no property was run")
	}
	var lines []string
	for _, k := range slices.Sorted(maps.Keys(tally.forms)) {
		lines = append(lines, fmt.Sprintf("%s: %d", k, tally.forms[k]))
	}
	s := tally.stats
	t.Logf("%d terms, %d left out as too large; %d composites, %d transports, %d substitutions relabelled, %d skipped, %d pushed\n%s",
		tally.terms, tally.budget, s.Composites, s.Transports, s.Relabelled, s.Skipped, s.Pushed, strings.Join(lines, "\n"))
	if tally.terms < 2500 {
		t.Skip("only some of the properties were run")
	}
	for _, k := range generate.Kinds {
		require.GreaterOrEqual(t, tally.forms["type "+string(k)], floorType, "types %s", k)
		for _, rule := range []string{"hcomp", "transp", "comp"} {
			require.GreaterOrEqual(t, tally.forms[rule+" "+string(k)], floorRule, "%s at %s", rule, k)
		}
	}
	for _, k := range []string{"hfill Nat", "fill Nat", "composite with 2 walls", "composite with 3 walls", "varying line", "constant line",
		"application", "application to a dimension", "first part", "second part", "path at a dimension", "let",
		"elim Nat", "elim Nat, dependent", "elim Circle", "elim Circle, dependent", "elim Bool", "elim Tally", "elim Sum", "elim List", "elim Susp", "elim Push", "elim Crate"} {
		require.GreaterOrEqual(t, tally.forms[k], floorRule, "%s", k)
	}
	for what, n := range map[string]int64{"composites": s.Composites, "transports": s.Transports, "relabelled": s.Relabelled, "skipped": s.Skipped, "pushed": s.Pushed} {
		require.Greater(t, n, int64(1000), what)
	}
	require.Less(t, tally.budget*10, tally.terms, "too many terms were too large")
}
