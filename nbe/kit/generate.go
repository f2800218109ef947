package kit

import (
	"example.com/boxwright/nbe/term"
)

// Generators of well-typed terms. A Gen knows the dimensions in scope and
// collects the variables it needs: their types mention no dimension of the
// scope, since a variable that stands for an element of a varying type is a
// function of the dimensions. So variables come first in a scope, and every
// substitution of dimensions leaves them as they are.

// Variable is a variable that a generator has put into scope.
type Variable struct {
	Name string
	Type *term.Written
	// Value draws a value to put for the variable; nil where there is none at hand.
	Value func(g *Gen) *term.Written
}

// Gen is a generator's state. It belongs to one trial.
type Gen struct {
	source Source
	dims   []string
	scope  *genScope
	depth  int
}

type genScope struct {
	variables []Variable
	counts    map[string]int
	prefix    string // of every name, where names of another scope are to be avoided
}

// NewGen is a generator over the dimensions named.
func NewGen(s Source, dimensions ...string) *Gen {
	return &Gen{source: s, dims: dimensions, scope: &genScope{counts: map[string]int{}}}
}

// Variables are the variables in scope so far, in their order.
func (g *Gen) Variables() []Variable { return g.scope.variables }

// Dimensions are the dimensions in scope.
func (g *Gen) Dimensions() []string { return g.dims }

// Over is g with other dimensions in scope; variables are collected together.
func (g *Gen) Over(dimensions ...string) *Gen {
	h := *g
	h.dims = dimensions
	return &h
}

// With is g with one more dimension in scope.
func (g *Gen) With(dimension string) *Gen {
	return g.Over(append(append([]string(nil), g.dims...), dimension)...)
}

// Deeper is g one level further down; Small says when to come to an end.
func (g *Gen) Deeper() *Gen {
	h := *g
	h.depth++
	return &h
}

// Small reports whether what is drawn should be atomic.
func (g *Gen) Small() bool { return g.depth >= 2 }

// Choose is a number from 0 up to n; 0 should be the simplest choice.
func (g *Gen) Choose(n int) int { return g.source.Next(max(n, 1)) }

// reserved are the dimensions that instances and laws use.
var reserved = map[string]bool{direction: true, height: true, fresh: true, point: true, "k": true, "l": true, "j": true, "z": true}

// Name is a name that nothing in scope has, beginning with the stem.
func (g *Gen) Name(stem string) string {
	stem = g.scope.prefix + stem
	n := g.scope.counts[stem]
	if n == 0 && reserved[stem] {
		n = 1
	}
	g.scope.counts[stem] = n + 1
	if n == 0 {
		return stem
	}
	return stem + itoa(n)
}

// Declare puts a closed variable into scope.
func (g *Gen) Declare(stem string, ty *term.Written, value func(g *Gen) *term.Written) *term.Written {
	name := g.Name(stem)
	g.scope.variables = append(g.scope.variables, Variable{name, ty, value})
	return term.Name(name)
}

// Variable is a new variable at the type ty, which may mention the dimensions
// in scope: a function of them, applied to them. value, which may be nil, draws
// values for it, at the same dimensions.
func (g *Gen) Variable(stem string, ty *term.Written, value func(g *Gen) *term.Written) *term.Written {
	mentioned := namesIn(ty)
	all := g.Choose(2) == 1
	var dims []string
	for _, d := range g.dims {
		if all || mentioned[d] {
			dims = append(dims, d)
		}
	}
	for k := len(dims) - 1; k >= 0; k-- {
		ty = term.Pi(dims[k], term.Interval(), ty)
	}
	var closed func(g *Gen) *term.Written
	if value != nil {
		closed = func(g *Gen) *term.Written { return term.Lam(value(g.Over(dims...)), dims...) }
	}
	f := g.Declare(stem, ty, closed)
	return term.Apply(f, nameTerms(dims)...)
}

func nameTerms(names []string) []*term.Written {
	out := make([]*term.Written, len(names))
	for k, n := range names {
		out[k] = term.Name(n)
	}
	return out
}

// Dimension is an element of the interval over the dimensions in scope.
func (g *Gen) Dimension() *term.Written {
	n := len(g.dims)
	if n == 0 {
		return term.Numeral(uint64(g.Choose(2)))
	}
	d := func() *term.Written { return term.Name(g.dims[g.Choose(n)]) }
	switch g.Choose(8) {
	case 5:
		return term.Rev(d())
	case 6:
		return term.Min(d(), d())
	case 7:
		return term.Max(d(), term.Rev(d()))
	}
	return d()
}

// Face is a face over the dimensions in scope, neither top nor bot.
func (g *Gen) Face() *term.Written {
	faces := g.Faces()
	if len(faces) == 1 {
		return faces[0]
	}
	return term.Or(faces...)
}

// Faces are the conjunctions of a face over the dimensions in scope.
func (g *Gen) Faces() []*term.Written {
	n := len(g.dims)
	if n == 0 {
		return []*term.Written{term.Bot()}
	}
	d := func() *term.Written { return term.Name(g.dims[g.Choose(n)]) }
	switch g.Choose(6) {
	case 1:
		return []*term.Written{term.Eq(d(), 1)}
	case 2:
		k := d()
		return []*term.Written{term.Eq(k, 0), term.Eq(k, 1)}
	case 3:
		if n > 1 {
			return []*term.Written{term.And(term.Eq(term.Name(g.dims[0]), 0), term.Eq(term.Name(g.dims[1]), uint64(g.Choose(2))))}
		}
	case 4:
		if n > 1 {
			return []*term.Written{term.Eq(term.Name(g.dims[0]), uint64(g.Choose(2))), term.Eq(term.Name(g.dims[1]), uint64(g.Choose(2)))}
		}
	}
	return []*term.Written{term.Eq(d(), 0)}
}

// Sample is a type over the dimensions in scope, and how to draw its elements.
type Sample struct {
	Type *term.Written
	// Element draws an element of Type. The generator it is given may have more
	// dimensions in scope than the type was drawn with.
	Element func(g *Gen) *term.Written
	// Eliminations, if not nil, are eliminations of elements of Type.
	Eliminations func(g *Gen) []Elimination
	// Still are conjunctions of a face on which the type does not vary along a
	// line, though what it is made of does.
	Still []*term.Written
	// Shallow keeps composites from being drawn as elements, for types whose
	// composites of composites are large.
	Shallow bool
	// Expand, if not nil, is the η-expansion of an element.
	Expand func(x *term.Written) *term.Written
}

// Variable is an element of s that is a new variable.
func (s Sample) Variable(g *Gen) *term.Written { return g.Variable("x", s.Type, s.Element) }

// Any is an element of s: what Element draws, a variable, or a composite.
func (s Sample) Any(g *Gen) *term.Written {
	if s.Element == nil {
		return s.Variable(g)
	}
	switch g.Choose(7) {
	case 1, 2:
		return s.Variable(g)
	case 3:
		if !s.Shallow && !g.Small() && len(g.dims) > 0 {
			return s.Composed(g.Deeper())
		}
	}
	return s.Element(g)
}

// Composed is an element of s that is a composite with one wall, on the face
// where a dimension in scope is 0.
func (s Sample) Composed(g *Gen) *term.Written {
	d, z := g.dims[g.Choose(len(g.dims))], g.Name("z")
	u := s.Element(g.With(z))
	wall := Replace(u, map[string]*term.Written{d: zero})
	return term.Form("hcomp", term.Plain(s.Type), term.Plain(Replace(u, map[string]*term.Written{z: zero})),
		term.RowsPart(term.Row{term.Plain(term.Eq(term.Name(d), 0)), term.Under(wall, z)}))
}
