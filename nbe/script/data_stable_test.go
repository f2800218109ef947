package script_test

// What every derived rule of a declaration must keep: that computing and
// substituting commute. On random declarations, random terms made of their
// constructors, composites, transports and eliminations are normalised and then
// substituted as values, and substituted as texts and then normalised: sending
// dimensions to ends, renaming them, identifying them, putting expressions for
// them. The engine as it is and the plain evaluators must give the same.

import (
	"context"
	"fmt"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/quote"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

var dims = []string{"k", "l", "m"}

// substitutions put, for k, l and m, these; the same as dimensions by level.
var substitutions = []struct {
	texts [3]string
	dims  [3]interval.Dim
}{
	{[3]string{"0", "l", "m"}, [3]interval.Dim{interval.Zero(), v(1), v(2)}},
	{[3]string{"k", "1", "m"}, [3]interval.Dim{v(0), interval.One(), v(2)}},
	{[3]string{"k", "0", "m"}, [3]interval.Dim{v(0), interval.Zero(), v(2)}},
	{[3]string{"k", "l", "0"}, [3]interval.Dim{v(0), v(1), interval.Zero()}},
	{[3]string{"1", "0", "m"}, [3]interval.Dim{interval.One(), interval.Zero(), v(2)}},
	{[3]string{"l", "k", "m"}, [3]interval.Dim{v(1), v(0), v(2)}},
	{[3]string{"l", "l", "m"}, [3]interval.Dim{v(1), v(1), v(2)}},
	{[3]string{"m", "l", "m"}, [3]interval.Dim{v(2), v(1), v(2)}},
	{[3]string{"(rev l)", "l", "k"}, [3]interval.Dim{v(1).Rev(), v(1), v(0)}},
	{[3]string{"(min k l)", "(max k l)", "m"}, [3]interval.Dim{v(0).Min(v(1)), v(0).Max(v(1)), v(2)}},
	{[3]string{"(min k (rev k))", "l", "0"}, [3]interval.Dim{v(0).Min(v(0).Rev()), v(1), interval.Zero()}},
}

func v(n int) interval.Dim { return interval.Var(interval.Name(n)) }

// stage is an engine with a declaration and a scope of three dimensions.
type stage struct {
	scope *nbe.Scope
	words *notation.Words
	call  []nbe.CallOption
}

func newStage(t require.TestingT, text string, call []nbe.CallOption, options ...nbe.Option) *stage {
	e, err := nbe.New(options...)
	require.NoError(t, err)
	s := &script.Session{Engine: e, Options: call, Report: func(r script.Result) { require.NoError(t, r.Err, "%s", text) }}
	require.NoError(t, s.Source(context.Background(), []byte(text), "given"))
	scope := e.Scope()
	for _, d := range dims {
		scope, err = scope.Dimension(d)
		require.NoError(t, err)
	}
	return &stage{scope, e.Words(), append([]nbe.CallOption{nbe.Within(nbe.Limits{Steps: 3_000_000, Output: 200_000})}, call...)}
}

func (s *stage) term(t require.TestingT, text string) *nbe.Term {
	w, err := notation.ReadTerm(text, "given", s.words)
	require.NoError(t, err, "%s", text)
	x, err := s.scope.Infer(context.Background(), w, s.call...)
	require.NoError(t, err, "%s", text)
	return x
}

func (s *stage) normal(t *rapid.T, text string) (term.Core, *nbe.Term) {
	x := s.term(t, text)
	forms, err := s.scope.Normal(context.Background(), x, s.call...)
	if term.KindOf(err) == term.OutOfBudget {
		t.Skip("too large")
	}
	require.NoError(t, err, "%s", text)
	return forms[0].Term, x
}

func (s *stage) show(c term.Core) string {
	w, err := s.scope.Write(c)
	if err != nil {
		return err.Error()
	}
	return w.String()
}

// substituted is a checked term's value with s put in, read back.
func substituted(t require.TestingT, x *nbe.Term, s *interval.Subst) term.Core {
	types, values, err := x.Value().Semantic(context.Background())
	require.NoError(t, err)
	run := value.NewRun(value.Settings{Budget: value.Budget{Steps: 10_000_000, Depth: 250_000, Memory: 4 << 30, Output: 1_000_000}})
	q := quote.NewReader(run, 0, len(dims), nil)
	var out term.Core
	run.Down(func() { out = q.Term(run.Substitute(types[0], s), run.Substitute(values[0], s)) })
	return out
}

// drawTerm is a random term of the declaration, with its dimensions in braces.
func drawTerm(t *rapid.T, d *declared, args []arg) string {
	bound := 100
	m := &maker{t: t, d: d, args: args, dims: dims, paths: len(d.paths), bound: &bound}
	at := m.dim()
	switch rapid.IntRange(0, 3).Draw(t, "term") {
	case 0:
		m.at = at
		return "(ann " + m.element(3) + " " + d.self(at) + ")"
	case 1: // a transport, constant where a dimension keeps the line in one place
		z, r := m.fresh("z"), "{"+dims[rapid.IntRange(0, 2).Draw(t, "line")]+"}"
		line, phi := "(min "+z+" "+r+")", "(= "+r+" 0)"
		m.at = "0"
		if rapid.Bool().Draw(t, "from there") {
			line, phi, m.at = "(max "+z+" "+r+")", "(= "+r+" 1)", r
		}
		if rapid.Bool().Draw(t, "nowhere constant") {
			phi = "bot"
		}
		return "(transp (" + z + " " + d.self(line) + ") " + phi + " " + m.element(2) + ")"
	case 2:
		m.at = at
		if e := d.identity(at, m.element(2)); e != "" {
			return e
		}
	}
	// an elimination or a transport of a transport
	z := m.fresh("z")
	m.at = "0"
	e := "(transp (" + z + " " + d.self(z) + ") bot " + m.element(2) + ")"
	if id := d.identity("1", e); id != "" {
		return id
	}
	return e
}

func putAll(e string, texts [3]string) string {
	for k, d := range dims {
		e = strings.ReplaceAll(e, "{"+d+"}", "{{"+fmt.Sprint(k)+"}}")
	}
	for k := range dims {
		e = strings.ReplaceAll(e, "{{"+fmt.Sprint(k)+"}}", texts[k])
	}
	return e
}

func TestDataRulesAreStable(t *testing.T) {
	tally := map[string]int{}
	rapid.Check(t, func(t *rapid.T) {
		d := drawDeclaration(t)
		scope, args := d.scope()
		text := d.text() + scope
		fast := newStage(t, text, nil)
		plain := newStage(t, text, nil, nbe.WithPlain(value.Plain{NoSupport: true, Eager: true, NoFrontier: true, NoNumerals: true}))
		drawn := newStage(t, text, []nbe.CallOption{nbe.DrawNames(rapid.Uint64().Draw(t, "names"))})
		for range 3 {
			e := drawTerm(t, d, args)
			here := putAll(e, [3]string{"k", "l", "m"})
			nf, x := fast.normal(t, here)
			for name, other := range map[string]*stage{"plain": plain, "names drawn at random": drawn} {
				got, _ := other.normal(t, here)
				require.True(t, term.Same(nf, got), "%s%s\n%s: %s\nfast: %s", text, here, name, other.show(got), fast.show(nf))
			}
			unforced := fast.term(t, here)
			for _, s := range substitutions {
				sub := interval.NewSubst([]interval.Name{0, 1, 2}, s.dims[:])
				there := putAll(e, s.texts)
				want, y := fast.normal(t, there)
				for name, value := range map[string]*nbe.Term{"after it was read back": x, "before": unforced} {
					got := substituted(t, value, sub)
					require.True(t, term.Same(want, got), "%s%s\nwith %v, %s\nsubstituted: %s\ncomputed:    %s", text, here, s.texts, name, fast.show(got), fast.show(want))
				}
				// comparing agrees with the comparison of normal forms
				types, err := sameType(fast, x, y)
				require.NoError(t, err)
				if types {
					c, err := fast.scope.Compare(context.Background(), x, y, fast.call...)
					require.NoError(t, err)
					require.Equal(t, term.Same(nf, want), c.Verdict == nbe.Equal, "%s%s\n%s", text, here, there)
				}
			}
			tally["terms"]++
			written := fast.show(nf)
			for _, word := range []string{"hcomp", "transp", "elim", "pa0", "pa1", "pa2"} {
				if strings.Contains(written, word) {
					tally[word]++
				}
			}
		}
	})
	t.Log(tally)
	for _, word := range []string{"terms", "hcomp", "transp", "elim", "pa0", "pa1"} {
		require.NotZero(t, tally[word], "no term exercised %s", word)
	}
}

func sameType(s *stage, x, y *nbe.Term) (bool, error) {
	c, err := x.TypeValue().Equal(context.Background(), y.TypeValue(), s.call...)
	return c.Verdict == nbe.Equal, err
}
