package nbe

import (
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Interval expressions and faces, and resolving names where there is nothing
// to check.

func (c *checker) isEnd(w *term.Written) (one, ok bool) {
	if w == nil || w.Kind != term.NumeralKind || w.Number == nil || !w.Number.IsInt64() {
		return false, false
	}
	n := w.Number.Int64()
	return n == 1, n == 0 || n == 1
}

// Dimension elaborates an interval expression.
func (c *checker) Dimension(w *term.Written) (d interval.Dim) {
	if w == nil {
		c.Fail(w, term.Malformed, "a dimension is missing", "a dimension", nil)
	}
	switch w.Kind {
	case term.NameKind:
		if list := c.names[w.Word]; len(list) > 0 {
			b := list[len(list)-1]
			if b.dimension {
				return c.dimensions[b.level].at
			}
			c.Fail(w, term.IllTyped, "a term stands where a dimension is expected", "a dimension", "the variable "+w.Word)
		}
		if c.e.lookup(w.Word) != nil {
			c.Fail(w, term.IllTyped, "a term stands where a dimension is expected", "a dimension", w.Word)
		}
		c.Fail(w, term.NotFound, "no dimension of this name is in scope", nil, w.Word)
	case term.NumeralKind:
		one, ok := c.isEnd(w)
		if !ok {
			c.Fail(w, term.IllTyped, "this numeral is no end of the interval", "0 or 1", w)
		}
		if one {
			return interval.One()
		}
		return interval.Zero()
	case term.FormKind:
		switch w.Word {
		case "min", "max", "rev":
			c.word(w)
			c.run.Take(value.StepDimensional)
			c.run.Down(func() {
				d = c.Dimension(w.Parts[0].Body)
				for _, p := range w.Parts[1:] {
					c.run.Work(1)
					c.run.Dimension(d)
					if w.Word == "min" {
						d = d.Min(c.Dimension(p.Body))
					} else {
						d = d.Max(c.Dimension(p.Body))
					}
				}
			})
			if w.Word == "rev" {
				return d.Rev()
			}
			return d
		}
	}
	c.Fail(w, term.IllTyped, "a term stands where a dimension is expected", "a dimension", w)
	return d
}

// IsDimension reports whether w is an interval expression by its form and the names in scope.
func (c *checker) IsDimension(w *term.Written) bool {
	switch w.Kind {
	case term.NameKind:
		list := c.names[w.Word]
		return len(list) > 0 && list[len(list)-1].dimension
	case term.FormKind:
		return w.Word == "min" || w.Word == "max" || w.Word == "rev"
	}
	return false
}

// Face elaborates a face.
func (c *checker) Face(w *term.Written) (f interval.Face) {
	if w == nil || w.Kind != term.FormKind {
		c.Fail(w, term.IllTyped, "this is no face", "a face", w)
	}
	switch w.Word {
	case "top":
		return interval.Top()
	case "bot":
		return interval.Bot()
	case "=":
		c.word(w)
		d := c.Dimension(w.Parts[0].Body)
		one, ok := c.isEnd(w.Parts[1].Body)
		if !ok {
			c.Fail(w.Parts[1].Body, term.IllTyped, "a face says that a dimension is at an end; there are no diagonal faces", "0 or 1", w.Parts[1].Body)
		}
		if one {
			return d.Is1()
		}
		return d.Is0()
	case "and", "or":
		c.word(w)
		c.run.Take(value.StepDimensional)
		c.run.Down(func() {
			f = c.Face(w.Parts[0].Body)
			for _, p := range w.Parts[1:] {
				c.run.Work(1)
				c.run.Face(f)
				if w.Word == "and" {
					f = f.And(c.Face(p.Body))
				} else {
					f = f.Or(c.Face(p.Body))
				}
			}
		})
		return f
	}
	c.Fail(w, term.IllTyped, "this is no face", "a face", w)
	return f
}

// resolve requires the names in parts that are never checked to be in scope.
func (c *checker) resolve(parts []term.Part) {
	inner := map[string]int{}
	type step struct {
		part  *term.Part
		leave bool
	}
	var stack []step
	push := func(parts []term.Part) {
		for k := len(parts) - 1; k >= 0; k-- {
			stack = append(stack, step{part: &parts[k]})
		}
	}
	push(parts)
	nesting, most := int64(0), c.run.Budget().Depth
	for len(stack) > 0 {
		c.run.Step()
		s := stack[len(stack)-1]
		stack = stack[:len(stack)-1]
		for _, b := range s.part.Binders {
			if s.leave {
				inner[b.Name]--
			} else {
				inner[b.Name]++
			}
		}
		if s.leave {
			nesting--
			continue
		}
		if nesting++; nesting > most {
			c.run.Over("levels of nesting", most)
		}
		stack = append(stack, step{s.part, true})
		for k := len(s.part.Rows) - 1; k >= 0; k-- {
			push(s.part.Rows[k])
		}
		w := s.part.Body
		if w == nil {
			continue
		}
		if w.Kind == term.NameKind && inner[w.Word] == 0 && len(c.names[w.Word]) == 0 {
			if _, ok := c.declared[w.Word]; !ok && c.e.lookup(w.Word) == nil {
				c.Fail(w, term.NotFound, "nothing of this name is in scope", nil, w.Word)
			}
		}
		push(w.Parts)
	}
}
