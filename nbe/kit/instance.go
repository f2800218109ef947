package kit

import (
	"example.com/boxwright/nbe/term"
)

// Instances: what a law is tried on. An instance is a box to be composed, a
// line to be transported along, or an open box over a line, in a scope of
// variables and dimensions, with the eliminations of its type.
//
// Invariant: the faces of the walls are single conjunctions, walls stand on
// the base and agree where their faces meet, and a line of types is constant
// where the transport is the identity. A generator of types and elements
// suffices for that: boxes are cut out of elements that have one dimension
// more, or are put together by paths that are variables.

// Operation says which Kan operation an instance is about.
type Operation int

// The operations.
const (
	Hcomp Operation = iota
	Transp
	Comp
)

// String is the word of the operation.
func (o Operation) String() string { return [...]string{"hcomp", "transp", "comp"}[o] }

// direction is the dimension that walls and lines bind. While types and
// elements are drawn, the same dimension is in scope as height: a line is
// closed by putting for it what makes the line constant on a transport's face.
const (
	direction = "i"
	height    = "h"
)

// Along is the point of the line that [Box.Over] and [Transport.With] bind.
func Along() *term.Written { return term.Name(direction) }

// Wall is one wall of a box: on the face, the line Body in the dimension i.
type Wall struct {
	Face *term.Written
	Ends []End // the same face
	Body *term.Written
}

// End is a dimension at an end.
type End struct {
	Dimension string
	One       bool
}

func (e End) at() *term.Written {
	if e.One {
		return term.Numeral(1)
	}
	return term.Numeral(0)
}

// ends are the ends of a face that is one conjunction.
func ends(face *term.Written) []End {
	if face.Word == "and" {
		var out []End
		for _, p := range face.Parts {
			out = append(out, ends(p.Body)...)
		}
		return out
	}
	if face.Word != "=" {
		return nil
	}
	return []End{{face.Parts[0].Body.Word, face.Parts[1].Body.Number.Sign() > 0}}
}

func cut(ends []End) map[string]*term.Written {
	put := map[string]*term.Written{}
	for _, e := range ends {
		put[e.Dimension] = e.at()
	}
	return put
}

// Instance is an instance of the laws.
type Instance struct {
	Op         Operation
	Variables  []Variable
	Dimensions []string
	// Type is the type; for Transp and Comp it is the line, in the dimension i.
	Type *term.Written
	// Base is what is composed or transported.
	Base *term.Written
	// Walls are the walls; Faces the conjunctions of a transport's face.
	Walls []Wall
	Faces []*term.Written
	// Eliminations are those of the type; for Transp and Comp, at the end 1 of the line.
	Eliminations []Elimination
	Expand       func(x *term.Written) *term.Written
	still        bool // the line is constant on the face as it was drawn
}

// Elimination is an elimination of the type under test, and what the former
// claims about it. Of makes the elimination of a term whose type can be
// inferred; it may mention the dimensions it was drawn over. With a claim, the
// elimination of a composite or of a transport is equal to what the claim
// makes of the box or the line, given Of at a point of the line: 0, 1 or
// [Along]. A nil claim means that the elimination waits: where the composite
// or the transport is stuck, so is the elimination.
type Elimination struct {
	Name      string
	Of        func(x *term.Written) *term.Written
	Composite func(box Box, of func(x, at *term.Written) *term.Written) *term.Written
	Transport func(line Transport, of func(x, at *term.Written) *term.Written) *term.Written
}

// Box is a box as a claim sees it.
type Box struct {
	Type, Base *term.Written
	Walls      []Wall // in the dimension i
}

// Hcomp is the composite of the box.
func (b Box) Hcomp() *term.Written {
	return composite("hcomp", []term.Part{term.Plain(b.Type)}, b.Base, b.Walls)
}

// Hfill is the filler of the box at r.
func (b Box) Hfill(r *term.Written) *term.Written {
	return term.Form("hfill", term.Plain(b.Type), term.Plain(b.Base), term.Plain(r), wallsPart(b.Walls))
}

// Map is the box of another type whose base and walls f makes of b's.
func (b Box) Map(ty *term.Written, f func(x *term.Written) *term.Written) Box {
	out := Box{Type: ty, Base: f(b.Base)}
	for _, w := range b.Walls {
		w.Body = f(w.Body)
		out.Walls = append(out.Walls, w)
	}
	return out
}

// Over is the composite of the box over a line of types: whatever was drawn
// runs along with it, and [Along] is the point at hand.
func (b Box) Over(line *term.Written) *term.Written {
	line = Replace(line, map[string]*term.Written{height: term.Name(direction)})
	return composite("comp", []term.Part{term.Under(line, direction)}, b.Base, b.Walls)
}

// Transport is a transport as a claim sees it: along i.Line, the identity on
// Face, of Base.
type Transport struct {
	Line, Face, Base *term.Written
	height           *term.Written
}

// Transp is the transport.
func (t Transport) Transp() *term.Written {
	return term.Form("transp", term.Under(t.Line, direction), term.Plain(t.Face), term.Plain(t.Base))
}

// Tfill is its filler at r.
func (t Transport) Tfill(r *term.Written) *term.Written {
	return term.Form("tfill", term.Under(t.Line, direction), term.Plain(t.Face), term.Plain(t.Base), term.Plain(r))
}

// With is the transport of another element along another line: whatever was
// drawn runs along with it, and [Along] is the point at hand.
func (t Transport) With(line, base *term.Written) Transport {
	t.Line, t.Base = Replace(line, map[string]*term.Written{height: t.height}), base
	return t
}

// Back is the filler of a line backwards: from x at its end 1 to r, on the
// transport's face x itself.
func (t Transport) Back(line, x, r *term.Written) *term.Written {
	at := Replace(t.height, map[string]*term.Written{direction: term.Max(r, term.Rev(term.Name("j")))})
	line = Replace(line, map[string]*term.Written{height: at})
	return term.Form("transp", term.Under(line, "j"), term.Plain(term.Or(t.Face, term.Eq(r, 1))), term.Plain(x))
}

func wallsPart(walls []Wall) term.Part {
	rows := make([]term.Row, len(walls))
	for k, w := range walls {
		rows[k] = term.Row{term.Plain(w.Face), term.Under(w.Body, direction)}
	}
	return term.RowsPart(rows...)
}

func composite(word string, head []term.Part, base *term.Written, walls []Wall) *term.Written {
	return term.Form(word, append(head, term.Plain(base), wallsPart(walls))...)
}

func orFaces(faces []*term.Written) *term.Written {
	switch len(faces) {
	case 0:
		return term.Bot()
	case 1:
		return faces[0]
	}
	return term.Or(faces...)
}

// Face is the face of a transport.
func (x *Instance) Face() *term.Written { return orFaces(x.Faces) }

// Box is the box of a composite.
func (x *Instance) Box() Box { return Box{x.Type, x.Base, x.Walls} }

// heightAt is what the height is at a point of the line.
func (x *Instance) heightAt(r *term.Written) *term.Written {
	if x.Op == Transp && len(x.Faces) > 0 && !x.still {
		return term.Min(r, off(x.Faces)) // constant on the face
	}
	return r
}

// Eliminate is an elimination of a term at a point of the line.
func (x *Instance) Eliminate(e Elimination, t, at *term.Written) *term.Written {
	return Replace(e.Of(t), map[string]*term.Written{height: x.heightAt(at)})
}

// Transport is the transport of a Transp.
func (x *Instance) Transport() Transport {
	return Transport{x.Type, x.Face(), x.Base, x.heightAt(term.Name(direction))}
}

// Term is the operation itself.
func (x *Instance) Term() *term.Written {
	switch x.Op {
	case Hcomp:
		return x.Box().Hcomp()
	case Comp:
		return x.Box().Over(x.Type)
	}
	return x.Transport().Transp()
}

// Filler is its filler at r.
func (x *Instance) Filler(r *term.Written) *term.Written {
	switch x.Op {
	case Hcomp:
		return x.Box().Hfill(r)
	case Comp:
		return term.Form("fill", term.Under(x.Type, direction), term.Plain(x.Base), term.Plain(r), wallsPart(x.Walls))
	}
	return x.Transport().Tfill(r)
}

// TypeAt is the type at a point of the line.
func (x *Instance) TypeAt(r *term.Written) *term.Written {
	return Replace(x.Type, map[string]*term.Written{direction: r})
}

var zero, oneEnd = term.Numeral(0), term.Numeral(1)

// draw makes an instance.
func draw(f Former, op Operation, source Source) *Instance {
	x := &Instance{Op: op, Dimensions: []string{"k"}}
	g := NewGen(source)
	if g.Choose(3) == 2 {
		x.Dimensions = append(x.Dimensions, "l")
	}
	g = g.Over(x.Dimensions...)
	along := g.With(height)
	var s Sample
	if op == Hcomp {
		s = f.Types(g)
	} else {
		s = f.Types(along)
	}
	x.Expand = s.Expand
	if x.Op == Transp {
		if len(s.Still) > 0 && g.Choose(2) == 1 {
			x.Faces, x.still = s.Still, true
		} else if g.Choose(4) > 0 {
			x.Faces = g.Faces()
		}
		x.Base = Replace(s.Any(along), map[string]*term.Written{height: zero})
	} else {
		x.Base, x.Walls = drawBox(g, s)
	}
	x.Type = Replace(s.Type, map[string]*term.Written{height: x.heightAt(term.Name(direction))})
	if s.Eliminations != nil {
		x.Eliminations = s.Eliminations(along)
	}
	x.Variables = g.Variables()
	return x
}

// off is an interval expression that is 0 on a face.
func off(faces []*term.Written) *term.Written {
	var parts []*term.Written
	for _, f := range faces {
		var lits []*term.Written
		for _, e := range ends(f) {
			if d := term.Name(e.Dimension); e.One {
				lits = append(lits, term.Rev(d))
			} else {
				lits = append(lits, d)
			}
		}
		parts = append(parts, term.Max(lits...))
	}
	return term.Min(parts...)
}

// drawBox draws a base and walls at the type of s, which may vary along i.
func drawBox(g *Gen, s Sample) (base *term.Written, walls []Wall) {
	along := g.With(height)
	at := func(w *term.Written, put map[string]*term.Written, i *term.Written) *term.Written {
		all := map[string]*term.Written{height: term.Name(direction)}
		if i != nil {
			all[height] = i
		}
		for k, v := range put {
			all[k] = v
		}
		return Replace(w, all)
	}
	wall := func(face, body *term.Written) { walls = append(walls, Wall{face, ends(face), body}) }
	switch g.Choose(4) {
	case 1, 2: // two elements at the ends of k, and between them a path that is a variable, or an element for the other wall to end in
		k := g.dims[0]
		u := s.Any(along)
		v := s.Any(along)
		p := g.Over(g.dims[1:]...).Variable("p", term.PathOver(k, at(s.Type, nil, zero),
			at(u, map[string]*term.Written{k: zero}, zero), at(v, map[string]*term.Written{k: oneEnd}, zero)), nil)
		base = term.At(p, term.Name(k))
		wall(term.Eq(term.Name(k), 0), at(u, map[string]*term.Written{k: zero}, nil))
		if g.Choose(2) == 1 {
			wall(term.Eq(term.Name(k), 1), at(v, map[string]*term.Written{k: oneEnd}, nil))
		}
	case 3: // walls that leave the base along paths that are variables
		base = at(s.Any(along), nil, zero)
		for _, f := range apart(g.Faces()) {
			put := cut(ends(f))
			var rest []string
			for _, d := range g.dims {
				if put[d] == nil {
					rest = append(rest, d)
				}
			}
			e := at(s.Any(along), put, oneEnd)
			p := g.Over(rest...).Variable("p", term.PathOver(direction, at(s.Type, put, nil), at(base, put, zero), e), nil)
			wall(f, term.At(p, term.Name(direction)))
		}
	default: // an element with one dimension more, cut open
		u := s.Any(along)
		base = at(u, nil, zero)
		for _, f := range g.Faces() {
			wall(f, at(u, cut(ends(f)), nil))
		}
	}
	return base, walls
}

// apart are the faces that meet no earlier one.
func apart(faces []*term.Written) []*term.Written {
	var out []*term.Written
next:
	for _, f := range faces {
		for _, o := range out {
			meets := true
			for _, a := range ends(f) {
				for _, b := range ends(o) {
					meets = meets && !(a.Dimension == b.Dimension && a.One != b.One)
				}
			}
			if meets {
				continue next
			}
		}
		out = append(out, f)
	}
	return out
}
