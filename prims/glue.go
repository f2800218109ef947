package prims

import (
	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Gluing (CCHM 6): the type Glue A [φ ↦ (T, e)], its elements, and unglue, with
//
//	Glue A [top ↦ (T, e)] = T      glue a [top ↦ t] = t      unglue b = e.1 b on top
//	unglue (glue a [φ ↦ t]) = a    b = glue (unglue b) [φ ↦ b]
//
// The operations stand in glue_hcomp.go and glue_transp.go.

// GluePart is one part of a Glue type: on the cube, a type and its equivalence
// with the base; both are restricted to the cube.
type GluePart struct {
	Cube interval.Cube
	T, E value.Value
}

type glueParts []GluePart

// GlueType is a Glue type none of whose faces is top, as a value.
type GlueType struct {
	A       value.Value
	Parts   []GluePart
	support value.Support
}

// GlueElement is glue a [φ ↦ t], no face being top, as a value.
type GlueElement struct {
	Base    value.Value
	Parts   []GlueValue
	support value.Support
}

// GlueValue is one part of an element of a Glue type, restricted to its cube.
type GlueValue struct {
	Cube interval.Cube
	T    value.Value
}

func (ps glueParts) support() (sup value.Support) {
	for _, p := range ps {
		sup |= p.Cube.Support() | p.T.Support() | p.E.Support()
	}
	return sup
}

func (ps glueParts) faces() (sup value.Support) {
	for _, p := range ps {
		sup |= p.Cube.Support()
	}
	return sup
}

// top reports whether one of the parts holds: then the type glued on, which may
// be a Glue type itself, is the whole.
func (ps glueParts) top() bool {
	for _, p := range ps {
		if p.Cube.IsTop() {
			return true
		}
	}
	return false
}

func (ps glueParts) substitute(run *value.Run, s *value.Subst) glueParts {
	if s == nil {
		return ps
	}
	out := make(glueParts, 0, len(ps))
	for _, p := range ps {
		face := p.Cube.Subst(s)
		t, e := run.Substitute(p.T, s), run.Substitute(p.E, s)
		for k := range face.Len() {
			cube := face.Cube(k)
			out = append(out, GluePart{cube, run.Restrict(t, cube), run.Restrict(e, cube)})
		}
	}
	return out
}

func (ps glueParts) irredundant() glueParts {
	cubes := make([]interval.Cube, len(ps))
	for k, p := range ps {
		cubes[k] = p.Cube
	}
	out := make(glueParts, 0, len(ps))
	for _, k := range irredundant(cubes) {
		out = append(out, ps[k])
	}
	return out
}

// NewGlue is Glue A with parts.
func NewGlue(a value.Value, parts []GluePart) value.Value {
	for _, p := range parts {
		if p.Cube.IsTop() {
			return p.T
		}
	}
	return &GlueType{a, parts, a.Support() | glueParts(parts).support()}
}

// NewGlueElement is glue a with parts.
func NewGlueElement(base value.Value, parts []GlueValue) value.Value {
	sup := base.Support()
	for _, p := range parts {
		if p.Cube.IsTop() {
			return p.T
		}
		sup |= p.Cube.Support() | p.T.Support()
	}
	return &GlueElement{base, parts, sup}
}

// Support is the union of the parts'.
func (g *GlueType) Support() value.Support { return g.support }

// Substitute delays s over the parts; a face may become top.
func (g *GlueType) Substitute(run *value.Run, s *value.Subst) value.Value {
	for _, p := range g.Parts { // before the rest is made for nothing
		if p.Cube.Subst(s).IsTop() {
			return run.Substitute(p.T, s)
		}
	}
	return NewGlue(run.Substitute(g.A, s), glueParts(g.Parts).substitute(run, s))
}

// Support is the union of the parts'.
func (g *GlueElement) Support() value.Support { return g.support }

// Substitute delays s over the parts; a face may become top.
func (g *GlueElement) Substitute(run *value.Run, s *value.Subst) value.Value {
	parts := make([]GlueValue, 0, len(g.Parts))
	for _, p := range g.Parts {
		face := p.Cube.Subst(s)
		t := run.Substitute(p.T, s)
		for k := range face.Len() {
			parts = append(parts, GlueValue{face.Cube(k), run.Restrict(t, face.Cube(k))})
		}
	}
	return NewGlueElement(run.Substitute(g.Base, s), parts)
}

// Unglue is unglue b at the Glue type with the given parts, on demand. The
// parts cannot be read off the value of b.
func Unglue(run *value.Run, parts []GluePart, b value.Value) value.Value {
	for k := range parts {
		if parts[k].Cube.IsTop() {
			return unglueOn(run, &parts[k], b)
		}
	}
	switch b := run.Force(b).(type) {
	case *GlueElement:
		run.Take(value.StepUnglue)
		if run.Followed() {
			return unglueFollowed(run, b)
		}
		return b.Base
	case *value.Neutral:
		return b.Eliminate(run, &unglueFrame{parts})
	default:
		run.Fault("unglue of %T", b)
		return nil
	}
}

// unglueOn is unglue b where the part p holds.
func unglueOn(run *value.Run, p *GluePart, b value.Value) value.Value {
	run.Take(value.StepUnglue)
	if run.Followed() {
		return unglueFaceFollowed(run, p.E, b)
	}
	return mapped(run, p.E, b)
}

// LaterUnglue is Unglue in a cell.
func LaterUnglue(run *value.Run, parts []GluePart, b value.Value) value.Value {
	if b, ok := value.Peek(b).(*GlueElement); ok && !glueParts(parts).top() {
		return b.Base
	}
	return run.Later(glueParts(parts).support()|b.Support(), func(run *value.Run) value.Value { return Unglue(run, parts, b) })
}

type unglueFrame struct{ parts glueParts }

func (f *unglueFrame) Support() value.Support { return f.parts.support() }
func (f *unglueFrame) Frontier() (frontier, faces value.Support) {
	return f.parts.faces(), f.parts.faces()
}
func (f *unglueFrame) Relabel(run *value.Run, s *value.Subst) value.Frame {
	return &unglueFrame{f.parts.substitute(run, s)}
}
func (f *unglueFrame) Resume(run *value.Run, head value.Value) value.Value {
	return Unglue(run, f.parts, head)
}
func (f *unglueFrame) Type(run *value.Run, t value.Value, _ *value.Neutral) value.Value {
	return run.Force(t).(*GlueType).A
}

func (f *unglueFrame) ReadBack(q value.Quoter, head value.Core, t value.Value) value.Core {
	g := q.Run().Force(t).(*GlueType)
	return op(unglueSig, head, g.readParts(q, false))
}

// Same: the type of the two heads is the same, and with it the parts.
func (f *unglueFrame) Same(_ value.Comparer, other value.Frame, _ value.Value) bool {
	_, ok := other.(*unglueFrame)
	return ok
}

// readParts reads the parts back: face, type and equivalence, or face and equivalence alone.
func (g *GlueType) readParts(q value.Quoter, types bool) term.Rows {
	parts := glueParts(g.Parts).irredundant()
	cubes := make([]interval.Cube, len(parts))
	for k, p := range parts {
		cubes[k] = p.Cube
	}
	return q.Rows(cubes, func(k int) []term.Arg {
		p := parts[k]
		a := q.Run().Restrict(g.A, p.Cube)
		e := q.Term(EquivType(q.Run(), p.T, a), p.E)
		if types {
			return []term.Arg{q.Type(p.T), e}
		}
		return []term.Arg{e}
	})
}

// ReadBack reads the base and the parts.
func (g *GlueType) ReadBack(q value.Quoter) value.Core {
	return op(glueTypeSig, q.Type(g.A), g.readParts(q, true))
}

// SameType is equality, also where the comparison is at ≤.
func (g *GlueType) SameType(c value.Comparer, other value.Type) bool {
	o, ok := other.(*GlueType)
	if !ok || !c.EqualTypes("the base of Glue", g.A, o.A) {
		return false
	}
	run := c.Run()
	ps, qs := glueParts(g.Parts).irredundant(), glueParts(o.Parts).irredundant()
	if len(ps) != len(qs) {
		return c.Differ("the faces of Glue", glueFace(ps).String(), glueFace(qs).String())
	}
	for k := range ps {
		if !ps[k].Cube.Equal(qs[k].Cube) {
			return c.Differ("the faces of Glue", glueFace(ps).String(), glueFace(qs).String())
		}
	}
	for k, p := range ps {
		if !c.Under(p.Cube, func() bool {
			return c.EqualTypes("the type glued on", p.T, qs[k].T) &&
				c.Terms("the equivalence glued along", EquivType(run, p.T, run.Restrict(g.A, p.Cube)), p.E, qs[k].E)
		}) {
			return false
		}
	}
	return true
}

func glueFace(ps glueParts) interval.Face {
	f := interval.Bot()
	for _, p := range ps {
		f = f.Or(p.Cube.Face())
	}
	return f
}

// ReadBackElement is η: glue (unglue v) [φ ↦ v].
func (g *GlueType) ReadBackElement(q value.Quoter, v value.Value) value.Core {
	run := q.Run()
	parts := glueParts(g.Parts).irredundant()
	cubes := make([]interval.Cube, len(parts))
	for k, p := range parts {
		cubes[k] = p.Cube
	}
	base := q.Term(g.A, Unglue(run, g.Parts, v))
	return op(glueSig, base, q.Rows(cubes, func(k int) []term.Arg {
		return []term.Arg{q.Term(parts[k].T, run.Restrict(v, parts[k].Cube))}
	}))
}

// SameElement is η.
func (g *GlueType) SameElement(c value.Comparer, a, b value.Value) bool {
	run := c.Run()
	for _, p := range g.Parts {
		if !c.Under(p.Cube, func() bool {
			return c.Terms("what is glued on", p.T, run.Restrict(a, p.Cube), run.Restrict(b, p.Cube))
		}) {
			return false
		}
	}
	return c.Terms("the base of glue", g.A, Unglue(run, g.Parts, a), Unglue(run, g.Parts, b))
}

var (
	faceRow     = term.Slot{Sort: term.FaceSort}
	glueTypeSig = &term.Signature{Name: "Glue", Word: "Glue", Slots: []term.CoreSlot{plainSlot, {Slot: term.Slot{Rows: []term.Slot{faceRow, {}, {}}}}}}
	glueSig     = &term.Signature{Name: "glue", Word: "glue", Slots: []term.CoreSlot{plainSlot, {Slot: term.Slot{Rows: []term.Slot{faceRow, {}}}}}}
	unglueSig   = &term.Signature{Name: "unglue", Word: "unglue", Slots: []term.CoreSlot{plainSlot, {Slot: term.Slot{Rows: []term.Slot{faceRow, {}}}, Silent: true}}}
)

type glueTypeOp struct{}

func (glueTypeOp) Canonical([]eval.Arg) bool { return true }
func (glueTypeOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	var parts []GluePart
	for _, row := range args[1].Rows {
		eval.Restricted(run, f, row, func(cube interval.Cube, f eval.Frame) {
			parts = append(parts, GluePart{cube, row[1].Delay(run, f), row[2].Delay(run, f)})
		})
	}
	return NewGlue(args[0].Delay(run, f), parts)
}

type glueOp struct{}

func (glueOp) Canonical([]eval.Arg) bool { return true }
func (glueOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	var parts []GlueValue
	for _, row := range args[1].Rows {
		eval.Restricted(run, f, row, func(cube interval.Cube, f eval.Frame) {
			parts = append(parts, GlueValue{cube, row[1].Delay(run, f)})
		})
	}
	return NewGlueElement(args[0].Delay(run, f), parts)
}

type unglueOp struct{}

func (unglueOp) Principal() int { return 0 }

func (unglueOp) parts(run *value.Run, f eval.Frame, args []eval.Arg) []GluePart {
	var parts []GluePart
	for _, row := range args[1].Rows {
		eval.Restricted(run, f, row, func(cube interval.Cube, f eval.Frame) {
			parts = append(parts, GluePart{cube, UnitType, row[1].Delay(run, f)})
		})
	}
	return parts
}

func (o unglueOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	v := args[0].Eval(run, f)
	return Unglue(run, o.parts(run, f, args), v)
}

func (o unglueOp) Frame(run *value.Run, f eval.Frame, args []eval.Arg) value.Frame {
	return &unglueFrame{o.parts(run, f, args)}
}
