package counted_test

import (
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/examples/counted"
	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/kit"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
)

var with = nbe.WithFormers(counted.Former())

// former is what the law suite is to know of counted functions.
func former(w *notation.Words) kit.Former {
	fill := func(text string, pairs ...any) *term.Written { return kit.Fill(w, text, pairs...) }
	return kit.Former{
		Name: "counted functions", Options: []nbe.Option{with},
		Types: func(g *kit.Gen) kit.Sample {
			a := kit.Base(g)
			b := kit.Family(g, "B", a.Type)
			s := kit.Sample{Type: fill("(Counted A (y B))", "A", a.Type, "B", b(term.Name("y")))}
			s.Element = func(g *kit.Gen) *term.Written {
				if g.Choose(2) == 1 {
					v := g.Variable("v", fill("(Pi ((y A)) B)", "A", a.Type, "B", b(term.Name("y"))), nil)
					return term.Ann(fill("(counting (y N) (y (V y)))", "N", kit.Numbers().Any(g), "V", v), s.Type)
				}
				return g.Variable("f", s.Type, nil)
			}
			s.Expand = func(f *term.Written) *term.Written {
				return fill("(counting (y (lifts F y)) (y (lifted F y)))", "F", f)
			}
			s.Eliminations = func(g *kit.Gen) []kit.Elimination {
				x, ok := kit.Constant(g, a.Type)
				if !ok {
					return nil
				}
				lifts := func(f *term.Written) *term.Written { return fill("(lifts F X)", "F", f, "X", x) }
				lifted := func(f *term.Written) *term.Written { return fill("(lifted F X)", "F", f, "X", x) }
				nat := term.Name("Nat")
				return []kit.Elimination{
					{
						Name: "the count", Of: lifts,
						Composite: func(box kit.Box, _ func(x, at *term.Written) *term.Written) *term.Written {
							return box.Map(nat, lifts).Hcomp()
						},
						Transport: func(t kit.Transport, _ func(x, at *term.Written) *term.Written) *term.Written {
							return t.With(nat, fill("(lifts F X)", "F", t.Base, "X", t.Back(a.Type, x, term.Numeral(0)))).Transp()
						},
					},
					{
						Name: "the value", Of: lifted,
						Composite: func(box kit.Box, _ func(x, at *term.Written) *term.Written) *term.Written {
							return box.Map(b(x), lifted).Hcomp()
						},
						Transport: func(t kit.Transport, _ func(x, at *term.Written) *term.Written) *term.Written {
							return t.With(b(t.Back(a.Type, x, kit.Along())), fill("(lifted F X)", "F", t.Base, "X", t.Back(a.Type, x, term.Numeral(0)))).Transp()
						},
					},
				}
			}
			return s
		},
	}
}

func TestLaws(t *testing.T) {
	e, err := nbe.New(with)
	require.NoError(t, err)
	kit.CheckLaws(t, former(e.Words()), kit.Trials(30))
}

func TestScripts(t *testing.T) { kit.Scripts(t, "testdata/*.txtar", with) }

func TestRefusals(t *testing.T) {
	e := kit.Engine(t, "(assume A (U 0)) (assume f (Counted A (x A))) (assume a A)", with)
	s := e.Scope()
	kit.RefusedAs(t, s, term.IllTyped, nil, "(lifts a a)")
	kit.RefusedAs(t, s, term.IllTyped, nil, "(lifted f 3)")
	kit.RefusedAs(t, s, term.IllTyped, "(Counted A (x A))", "(counting (x a) (x x))")
	kit.RefusedAs(t, s, term.IllTyped, "Nat", "(counting (x 1) (x x))")
	kit.EqualAt(t, s, "(Counted A (x A))", "f", "(counting (y (lifts f y)) (z (lifted f z)))")
}
