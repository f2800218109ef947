package kit

import "example.com/boxwright/nbe/term"

// The types that generators stand on: an abstract type, one that varies along
// a dimension, numbers, the circle, a path between types.

var universe = term.Universe(0)

// Concrete is a closed type with elements, to be put for a type variable.
func Concrete(g *Gen) *term.Written {
	switch g.Choose(3) {
	case 1:
		return term.Name("Circle")
	case 2:
		return term.Form("Unit")
	}
	return term.Name("Nat")
}

// Base is a type that is not of the former under test.
func Base(g *Gen) Sample {
	switch g.Choose(6) {
	case 1:
		return Numbers()
	case 2:
		return Turns()
	case 3:
		l := g.Declare("L", term.Arrow(term.Interval(), universe), func(g *Gen) *term.Written { return term.Lam(Concrete(g), "_") })
		return abstract(term.Apply(l, g.Dimension()))
	case 4:
		nat := term.Name("Nat")
		q := g.Declare("q", term.Path(universe, nat, nat), func(*Gen) *term.Written { return term.Line(nat, "_") })
		return abstract(term.At(q, g.Dimension()))
	case 5:
		base := term.Name("base")
		loops := term.Path(term.Name("Circle"), base, base)
		return Sample{Type: loops, Element: func(g *Gen) *term.Written {
			if g.Choose(2) == 0 {
				return g.Variable("p", loops, func(*Gen) *term.Written { return term.Line(base, "_") })
			}
			return term.Line(term.Apply(term.Name("loop"), term.Name("z")), "z")
		}}
	}
	return Abstract(g)
}

// Abstract is a type variable.
func Abstract(g *Gen) Sample { return abstract(g.Declare("X", universe, Concrete)) }

// abstract is a type of which nothing is known but that it is one.
func abstract(ty *term.Written) Sample {
	s := Sample{Type: ty}
	s.Element = func(g *Gen) *term.Written { return g.Variable("x", ty, nil) }
	return s
}

// Numbers are the natural numbers: numerals, successors, variables, points of
// a loop that computes as soon as the loop is known.
func Numbers() Sample {
	s := Sample{Type: term.Name("Nat")}
	s.Element = func(g *Gen) *term.Written {
		switch g.Choose(4) {
		case 1:
			return term.Numeral(uint64(g.Choose(3)))
		case 2:
			if !g.Small() {
				return term.Apply(term.Name("suc"), s.Element(g.Deeper()))
			}
		case 3:
			n := term.Numeral(uint64(g.Choose(2)))
			p := g.Declare("p", term.Path(s.Type, n, n), func(*Gen) *term.Written { return term.Line(n, "_") })
			return term.At(p, g.Dimension())
		}
		return g.Variable("n", s.Type, func(g *Gen) *term.Written { return term.Numeral(uint64(g.Choose(3))) })
	}
	return s
}

// Turns are the points of the circle.
func Turns() Sample {
	s := Sample{Type: term.Name("Circle")}
	s.Element = func(g *Gen) *term.Written {
		switch g.Choose(3) {
		case 1:
			return term.Apply(term.Name("loop"), g.Dimension())
		case 2:
			return g.Variable("t", s.Type, func(g *Gen) *term.Written { return term.Apply(term.Name("loop"), g.Dimension()) })
		}
		return term.Name("base")
	}
	return s
}

// Family is a family of types over an element of the type a, as a function of
// the element; values for it do not depend on the element.
func Family(g *Gen, stem string, a *term.Written) func(x *term.Written) *term.Written {
	f := g.Variable(stem, term.Arrow(a, universe), func(g *Gen) *term.Written { return term.Lam(Concrete(g), "_") })
	return func(x *term.Written) *term.Written { return term.Apply(f, x) }
}
