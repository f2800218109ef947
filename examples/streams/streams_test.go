package streams_test

import (
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/examples/streams"
	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/kit"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
)

var with = nbe.WithFormers(streams.Former())

func words(t testing.TB) *notation.Words {
	e, err := nbe.New(with)
	require.NoError(t, err)
	return e.Words()
}

// former is what the law suite is to know of streams.
func former(w *notation.Words) kit.Former {
	fill := func(text string, pairs ...any) *term.Written { return kit.Fill(w, text, pairs...) }
	return kit.Former{
		Name: "streams", Options: []nbe.Option{with},
		Types: func(g *kit.Gen) kit.Sample {
			a := kit.Base(g)
			s := kit.Sample{Type: fill("(Stream A)", "A", a.Type)}
			s.Element = func(g *kit.Gen) *term.Written {
				switch g.Choose(3) {
				case 1: // a constant stream, of a variable so that its element may vary along the line
					return term.Ann(fill("(unfold Unit (lam (u) (pair X u)) unit)", "X", a.Any(g)), s.Type)
				case 2:
					step := g.Variable("f", fill("(-> Nat (* A Nat))", "A", a.Type), nil)
					return term.Ann(fill("(unfold Nat F N)", "F", step, "N", kit.Numbers().Any(g)), s.Type)
				}
				return g.Variable("s", s.Type, s.Element)
			}
			head := func(x *term.Written) *term.Written { return fill("(head X)", "X", x) }
			tail := func(x *term.Written) *term.Written { return fill("(tail X)", "X", x) }
			s.Eliminations = func(*kit.Gen) []kit.Elimination {
				return []kit.Elimination{
					{
						Name: "head", Of: head,
						Composite: func(box kit.Box, _ func(x, at *term.Written) *term.Written) *term.Written {
							return box.Map(a.Type, head).Hcomp()
						},
						Transport: func(t kit.Transport, _ func(x, at *term.Written) *term.Written) *term.Written {
							return t.With(a.Type, head(t.Base)).Transp()
						},
					},
					{
						Name: "tail", Of: tail,
						Composite: func(box kit.Box, _ func(x, at *term.Written) *term.Written) *term.Written {
							return box.Map(s.Type, tail).Hcomp()
						},
						Transport: func(t kit.Transport, _ func(x, at *term.Written) *term.Written) *term.Written {
							return t.With(s.Type, tail(t.Base)).Transp()
						},
					},
					{Name: "the third element", Of: func(x *term.Written) *term.Written { return head(tail(tail(x))) }},
				}
			}
			return s
		},
	}
}

func TestLaws(t *testing.T) { kit.CheckLaws(t, former(words(t)), kit.Trials(30)) }

func TestScripts(t *testing.T) { kit.Scripts(t, "testdata/*.txtar", with) }

// A stream that never ends has a finite normal form, and its elements compute.
func TestUnfoldings(t *testing.T) {
	e := kit.Engine(t, `
		(def count (-> Nat (Stream Nat)) (lam (n) (unfold Nat (lam (k) (pair k (suc k))) n)))
		(def drop (Pi ((A (U 0))) (-> Nat (Stream A) (Stream A)))
		  (lam (A n) (elim (x (-> (Stream A) (Stream A))) n (zero (lam (s) s)) ((suc k h) (lam (s) (h (tail s)))))))`, with)
	s := e.Scope()
	kit.EqualAt(t, s, "Nat", "(head (drop Nat 1000 (count 7)))", "1007")
	kit.NormalIs(t, s, nil, "(tail (count 7))", "(unfold Nat (lam (k) (pair k (suc k))) 8)")
	kit.StepsAtMost(t, s, 200, nil, "(count 1000000)")
	// no η: two streams with the same elements need not be equal
	kit.DifferAt(t, s, "(Stream Nat)", "(count 7)", "(unfold (* Nat Unit) (lam (k) (pair (fst k) (pair (suc (fst k)) unit))) (pair 7 unit))")
	kit.RefusedAs(t, s, term.IllTyped, "Nat", "(unfold Nat (lam (k) (pair k k)) 0)")
	kit.RefusedAs(t, s, term.IllTyped, nil, "(head 3)")
}

// Words that are taken are refused: by another former, by the notation, by scripts.
func TestWordsClash(t *testing.T) {
	for _, word := range []string{"Stream", "lam", "hcomp", "min", "def"} {
		other := prims.Former{Name: "another", Words: []prims.Word{{Shape: term.Shape{Word: word}}}}
		_, err := nbe.New(with, nbe.WithFormers(other))
		kit.ErrorIs(t, err, term.Duplicate, "%s", word)
	}
	_, err := nbe.New(nbe.WithFormers(prims.Table()...))
	kit.ErrorIs(t, err, term.Duplicate)
	_, err = nbe.New(with)
	require.NoError(t, err)
	// and a word is no name
	e := kit.Engine(t, "", with)
	kit.ErrorIs(t, e.Assume(t.Context(), "Stream", term.Universe(0)), term.Malformed)
}
