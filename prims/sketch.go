package prims

import (
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Sketches of values, for whoever follows a run: what has been evaluated and
// nothing else. A function's body has not been, so it stands as "…".

// Sketch is the type of functions.
func (p *Pi) Sketch(s *value.Sketch) *term.Written {
	name, body := s.Body(p.Codomain)
	return term.Pi(name, s.Value(p.Domain), body)
}

// Sketch is the type of functions of a dimension.
func (p *PiDimension) Sketch(s *value.Sketch) *term.Written {
	name, body := s.Body(p.Codomain)
	return term.Pi(name, term.Interval(), body)
}

// Sketch is the type of pairs.
func (t *Sigma) Sketch(s *value.Sketch) *term.Written {
	name, body := s.Body(t.Second)
	return term.Sigma(name, s.Value(t.First), body)
}

// Sketch is the pair.
func (p *Pair) Sketch(s *value.Sketch) *term.Written { return term.Pair(s.Value(p.A), s.Value(p.B)) }

// Sketch is the equivalence, of which nothing is made for showing it.
func (l *lineEquivalence) Sketch(*value.Sketch) *term.Written { return term.Name("…") }

// Sketch is the type of paths.
func (t *Path) Sketch(s *value.Sketch) *term.Written {
	name, body := s.Body(t.Line)
	return term.PathOver(name, body, s.Value(t.A0), s.Value(t.A1))
}

// Sketch is the path.
func (p *PathLam) Sketch(s *value.Sketch) *term.Written {
	name, body := s.Body(p.Body)
	return term.Line(body, name)
}

// Sketch is the universe.
func (u *Universe) Sketch(*value.Sketch) *term.Written { return term.Universe(uint64(u.Level)) }

// Sketch is the element of Unit.
func (unitElement) Sketch(*value.Sketch) *term.Written { return term.UnitElement() }

// Sketch is the type itself.
func (unitType) Sketch(*value.Sketch) *term.Written { return term.UnitType() }

// Sketch is the data type at its parameters.
func (t *DataType) Sketch(s *value.Sketch) *term.Written {
	return term.Apply(term.Name(t.Data.Name), sketches(s, t.Params)...)
}

// Sketch is the constructor at its arguments and dimensions.
func (c *Con) Sketch(s *value.Sketch) *term.Written {
	args := sketches(s, c.Args)
	for _, d := range c.Dims {
		args = append(args, s.Dimension(d))
	}
	return term.Apply(term.Name(c.Of.Name), args...)
}

// Sketch is the formal composite.
func (f *Formal) Sketch(s *value.Sketch) *term.Written {
	return term.Hcomp(f.Type.Sketch(s), s.Value(f.Base), s.Walls(f.Walls)...)
}

// Sketch is the numeral.
func (n *Number) Sketch(*value.Sketch) *term.Written { return term.BigNumeral(n.Int()) }

// Sketch is the number of successors and what is below them.
func (n *Successors) Sketch(s *value.Sketch) *term.Written {
	below := s.Value(n.base)
	if n.count.big == nil && n.count.small <= 3 {
		for range n.count.small {
			below = term.Apply(term.Name(n.data.Constructors[1].Name), below)
		}
		return below
	}
	return term.Apply(term.Name(n.data.Constructors[1].Name+"…"), term.BigNumeral(n.count.Int()), below)
}

// Sketch is the Glue type.
func (g *GlueType) Sketch(s *value.Sketch) *term.Written {
	var rows []term.Row
	for _, p := range g.Parts {
		rows = append(rows, term.GlueType(s.Face(p.Cube.Face()), s.Value(p.T), s.Value(p.E)))
	}
	return term.Glue(s.Value(g.A), rows...)
}

// Sketch is the element.
func (g *GlueElement) Sketch(s *value.Sketch) *term.Written {
	var rows []term.Row
	for _, p := range g.Parts {
		rows = append(rows, term.GluePart(s.Face(p.Cube.Face()), s.Value(p.T)))
	}
	return term.GlueElement(s.Value(g.Base), rows...)
}

// Sketch is the eliminator, of what is left open: it is a value only inside closures.
func (e *Eliminator) Sketch(s *value.Sketch) *term.Written {
	return (&elimFrame{e}).SketchOn(s, term.Name("…"))
}

func (h *hcompHead) Sketch(s *value.Sketch) *term.Written {
	return term.Hcomp(s.Value(h.a), s.Value(h.base), s.Walls(h.walls)...)
}

func (h *transpHead) Sketch(s *value.Sketch) *term.Written {
	return term.Transp(interval.Var(h.i).String(), s.Value(h.a), s.Face(h.phi), s.Value(h.v))
}

func (f *elimFrame) SketchOn(s *value.Sketch, head *term.Written) *term.Written {
	name, family := s.Body(f.family)
	var cases []term.Row
	for k, c := range f.data.Constructors {
		if k >= len(f.cases) || f.cases[k] == nil {
			continue
		}
		var names []string
		for n := range f.cases[k].Arity() {
			names = append(names, hint(f.cases[k].HintAt(n), "_"))
		}
		cases = append(cases, term.Case(c.Name, term.Name("…"), names...))
	}
	return term.Elim(name, family, head, cases...)
}

func (f *transpFrame) SketchOn(s *value.Sketch, head *term.Written) *term.Written {
	return term.Transp(interval.Var(f.i).String(), s.Value(f.t), s.Face(f.phi), head)
}

func (f *unglueFrame) SketchOn(_ *value.Sketch, head *term.Written) *term.Written {
	return term.Unglue(head)
}

func (f *atFrame) SketchOn(s *value.Sketch, head *term.Written) *term.Written {
	return term.At(head, s.Dimension(f.r))
}

func (f *applyFrame) SketchOn(s *value.Sketch, head *term.Written) *term.Written {
	return term.Apply(head, s.Value(f.arg))
}

func (f *projection) SketchOn(_ *value.Sketch, head *term.Written) *term.Written {
	if f.second {
		return term.Snd(head)
	}
	return term.Fst(head)
}

func sketches(s *value.Sketch, vs []value.Value) []*term.Written {
	out := make([]*term.Written, len(vs))
	for k, v := range vs {
		out[k] = s.Value(v)
	}
	return out
}
