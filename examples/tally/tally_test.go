package tally_test

import (
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/examples/tally"
	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/kit"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
)

var with = nbe.WithFormers(tally.Former())

// former is what the law suite is to know of tallies.
func former(w *notation.Words) kit.Former {
	fill := func(text string, pairs ...any) *term.Written { return kit.Fill(w, text, pairs...) }
	return kit.Former{
		Name: "tallies", Options: []nbe.Option{with},
		Types: func(g *kit.Gen) kit.Sample {
			a := kit.Base(g)
			s := kit.Sample{Type: fill("(Tally A)", "A", a.Type)}
			s.Element = func(g *kit.Gen) *term.Written {
				rest := func() *term.Written {
					if g.Small() {
						return g.Variable("u", s.Type, nil)
					}
					return s.Any(g.Deeper())
				}
				switch g.Choose(4) {
				case 1:
					return term.Ann(fill("(due T)", "T", rest()), s.Type)
				case 2:
					return term.Ann(term.Form("waive", term.Plain(rest()), term.Plain(g.Dimension())), s.Type)
				case 3:
					return g.Variable("u", s.Type, s.Element)
				}
				return term.Ann(fill("(settled X)", "X", a.Any(g)), s.Type)
			}
			s.Eliminations = func(g *kit.Gen) []kit.Elimination {
				// into an abstract type, whose charges change what is audited by
				// step and whose waivers are the paths back, and into a family
				// over the tally
				c := kit.Abstract(g).Type
				step := g.Over().Variable("f", fill("(-> C C)", "C", c), nil)
				back := g.Over().Variable("p", fill("(Pi ((c C)) (Path C (F c) c))", "C", c, "F", step), nil)
				into := func(name string, family *term.Written, text string, pairs ...any) kit.Elimination {
					e := kit.Elimination{Name: name, Of: func(x *term.Written) *term.Written {
						return fill(text, append(pairs, "TALLY", x)...)
					}}
					e.Composite = func(box kit.Box, of func(x, at *term.Written) *term.Written) *term.Written {
						fibre := func(x *term.Written) *term.Written { return kit.Replace(family, map[string]*term.Written{"y": x}) }
						return box.Map(nil, func(u *term.Written) *term.Written { return of(u, term.Numeral(1)) }).Over(fibre(box.Hfill(kit.Along())))
					}
					return e
				}
				base := g.Over().Variable("c", c, nil)
				return []kit.Elimination{
					into("audit", c, "(audit (y C) TALLY (a B) (u w (F w)) (u w z (at (P w) z)))", "C", c, "B", base, "F", step, "P", back),
					into("an audit in a path", fill("(Path (Tally A) y y)", "A", a.Type),
						"(audit (y (Path (Tally A) y y)) TALLY (a (line (z) (settled a))) (u t (line (z) (due (at t z)))) (u t w (line (z) (waive (at t z) w))))", "A", a.Type),
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
	e := kit.Engine(t, "(assume A (U 0)) (assume a A) (assume t (Tally A))", with)
	s := kit.Scope(t, e, "i")
	kit.RefusedAs(t, s, term.IllTyped, nil, "(settled a)")
	kit.RefusedAs(t, s, term.IllTyped, "A", "(settled a)")
	kit.RefusedAs(t, s, term.IllTyped, nil, "(due a)")
	kit.RefusedAs(t, s, term.Disagreement, nil, "(audit (x Nat) t (a 0) (u h (suc h)) (u h i h))")
	kit.RefusedAs(t, s, term.Disagreement, nil, "(audit (x Nat) t (a 0) (u h h) (u h i 0))")
}
