// Package eval turns core terms into values. A term is compiled once: every
// binder and every delayed argument becomes an [Abstraction] that says exactly
// which slots of the surrounding frame it captures, and every operator becomes
// an [Operation] with compiled arguments. Evaluation names no former: what an
// operator does, its Operation says, the built-in ones like a host's.
package eval

import (
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Frame holds the values of a body's bound variables and of what it captured;
// dimensions stand in it as *value.Dimension. A frame is only lent: nothing
// may keep it after Eval returns.
type Frame = []value.Value

// Code is a compiled term.
type Code interface {
	// Eval evaluates it, on demand; the result may be a lazy cell still to be forced.
	Eval(run *value.Run, f Frame) value.Value
}

// Operation is what a core operator does. It is stateless and safe for concurrent use.
type Operation interface {
	Eval(run *value.Run, f Frame, args []Arg) value.Value
}

// Canonical is an Operation whose Eval, with these arguments, does no work
// beyond building a value: delaying it would cost more than doing it.
type Canonical interface {
	Operation
	Canonical(args []Arg) bool
}

// Eliminator is an Operation that waits for one of its arguments.
type Eliminator interface {
	Operation
	// Principal is the argument it waits for.
	Principal() int
	// Frame is the elimination itself, for a neutral.
	Frame(run *value.Run, f Frame, args []Arg) value.Frame
}

// Ready is an Operation that, with some values of its arguments, does no more work
// than delaying it would cost, although with others it does.
type Ready interface {
	Operation
	Ready(f Frame, args []Arg) bool
}

// Matcher is an Eliminator that, at some values, ends in one of its own bodies.
// That is evaluated in its place, without nesting.
type Matcher interface {
	Eliminator
	// Match returns the body and a frame of [Arg.Frame] with the arguments in
	// it; a nil body where more is to be done for v, which is forced. The step
	// is the caller's to take.
	Match(run *value.Run, f Frame, args []Arg, v value.Value) (*Arg, Frame)
	// Label is what counters and profiles call it.
	Label(args []Arg) *value.Label
	// Eliminate is Eval for a principal argument with the value v, which is forced.
	Eliminate(run *value.Run, f Frame, args []Arg, v value.Value) value.Value
}

type slotCode int

func (c slotCode) Eval(_ *value.Run, f Frame) value.Value { return f[c] }

type constantCode struct{ v value.Value }

func (c constantCode) Eval(*value.Run, Frame) value.Value { return c.v }

type globalCode struct{ g value.Global }

func (c globalCode) Eval(run *value.Run, _ Frame) value.Value { return run.Unfold(c.g) }

// Fold is a definition under eliminations that nobody needs the value of yet:
// nil where the run keeps the definition opaque, and for an assumption.
func (t *thunk) Fold(run *value.Run) *value.Neutral {
	var frames []value.Frame
	for c := t.code.(*opCode); ; {
		e := c.op.(Eliminator)
		frames = append(frames, e.Frame(run, t.env, c.args))
		switch p := c.args[e.Principal()].code.(type) {
		case *opCode:
			c = p
		case globalCode:
			l, ok := run.Folded(p.g).(*value.Lazy)
			if !ok {
				return nil
			}
			n := l.Fold(run)
			for k := len(frames) - 1; k >= 0 && n != nil; k-- {
				n = n.Eliminate(run, frames[k])
			}
			return n
		}
	}
}

// Unfolded is the value.
func (t *thunk) Unfolded(run *value.Run) value.Value { return t.Do(run) }

// Unfolding is the definition under the eliminations.
func (t *thunk) Unfolding(run *value.Run) (value.Global, bool) {
	for c := t.code.(*opCode); ; {
		switch p := c.principal.code.(type) {
		case *opCode:
			c = p
		case globalCode:
			if _, ok := run.Folded(p.g).(*value.Lazy); ok {
				return p.g, true
			}
			return nil, true
		}
	}
}

// SketchFold is the definition at those arguments that are there.
func (t *thunk) SketchFold(s *value.Sketch) *term.Written {
	var spine []*opCode
	out := hidden
	for c := t.code.(*opCode); c != nil; {
		spine = append(spine, c)
		switch p := c.principal.code.(type) {
		case *opCode:
			c = p
		case globalCode:
			out, c = term.Name(p.g.GlobalName()), nil
		}
	}
	for k := len(spine) - 1; k >= 0; k-- {
		if a := spine[k].argument; a != nil {
			out = term.Apply(out, t.sketch(s, a))
		} else {
			out = term.Apply(hidden, out)
		}
	}
	return out
}

var hidden = term.Name("…")

func (t *thunk) sketch(s *value.Sketch, a *Arg) *term.Written {
	switch c := a.code.(type) {
	case slotCode:
		return s.Value(t.env[c])
	case constantCode:
		return s.Value(c.v)
	case globalCode:
		return term.Name(c.g.GlobalName())
	}
	if a.dim != nil {
		return s.Dimension(a.dim.eval(t.env))
	}
	return hidden
}

// Arg is a compiled argument of an operator: by the slot of its signature a
// term, a body under binders, a dimension, a face, rows, or a payload.
type Arg struct {
	code    Code         // a term in the surrounding frame
	abs     *Abstraction // a delayed term, or a body under binders
	call    *opCode      // the delayed term in the surrounding frame, where it is a small call; may be nil
	dim     *dimensionCode
	face    *faceCode
	Rows    [][]Arg
	Payload term.Arg
}

// Eval evaluates a term argument, on demand.
func (a *Arg) Eval(run *value.Run, f Frame) value.Value {
	if a.code != nil {
		return a.code.Eval(run, f)
	}
	if a.call != nil {
		return a.call.Eval(run, f)
	}
	if a.dim != nil {
		return run.Dimension(a.dim.eval(f))
	}
	n := len(a.abs.captures)
	frame := run.Frame(n)
	a.abs.capture(frame, f)
	v := a.abs.body.Eval(run, frame)
	run.Release(n)
	return v
}

// Delay is a term argument without doing any work; a dimension argument is its value.
func (a *Arg) Delay(run *value.Run, f Frame) value.Value {
	switch {
	case a.code != nil:
		return delay(run, a.code, f)
	case a.dim != nil:
		return run.Dimension(a.dim.eval(f))
	}
	if len(a.abs.captures) == 0 {
		return a.abs.thunk(run, nil, nil)
	}
	return a.abs.thunk(run, f, nil)
}

func delay(run *value.Run, c Code, f Frame) value.Value {
	switch c := c.(type) {
	case slotCode:
		return f[c]
	case constantCode:
		return c.v
	case globalCode:
		return run.Folded(c.g)
	}
	return c.Eval(run, f) // only cheap operators stand undelayed
}

// Known is a term argument that is a variable of the frame, as far as its value is
// known without doing any work; nil for every other argument.
func (a *Arg) Known(f Frame) value.Value {
	if slot, ok := a.code.(slotCode); ok {
		return value.Peek(f[slot])
	}
	return nil
}

// IsDimension reports whether the argument is a dimension.
func (a *Arg) IsDimension() bool { return a.dim != nil }

// Dimension evaluates a dimension argument.
func (a *Arg) Dimension(f Frame) interval.Dim { return a.dim.eval(f) }

// Face evaluates a face argument.
func (a *Arg) Face(f Frame) interval.Face { return a.face.eval(f) }

// Close is a body under one binder as a closure.
func (a *Arg) Close(run *value.Run, f Frame) value.Closure { return a.abs.close(run, f) }

// Lambda is a body under one binder as a function.
func (a *Arg) Lambda(run *value.Run, f Frame) *value.Lam { return a.abs.lambda(run, f) }

// Family is Close for the part of a type that is opened wherever the type is
// looked at.
func (a *Arg) Family(run *value.Run, f Frame) value.Closure {
	c := a.abs.close(run, f)
	if c.Uses(0) {
		return c
	}
	return &family{closure: c}
}

// CloseAll is a body under any number of binders as a case.
func (a *Arg) CloseAll(run *value.Run, f Frame) value.Case { return caseClosure{a.abs.close(run, f)} }

// Line is a body under one dimension binder as a line: a fresh name outside
// avoid, and the body at it, delayed.
func (a *Arg) Line(run *value.Run, f Frame, avoid value.Support) (value.Name, value.Value) {
	i := run.Fresh(a.abs.support(f) | avoid)
	return i, a.abs.thunk(run, f, value.DimensionName(i))
}

// Walls evaluates rows of face and line. Each wall is made under each
// conjunction of its own face, with the conjunction substituted into
// everything it captures.
func (a *Arg) Walls(run *value.Run, f Frame) value.System {
	out := make(value.System, 0, len(a.Rows)+2)
	for _, row := range a.Rows {
		face := row[0].Face(f)
		if face.IsBot() {
			run.Dropped++
		}
		for k := range face.Len() {
			cube := face.Cube(k)
			under := restrict(run, row[1].abs, f, cube)
			i, body := row[1].Line(run, under, cube.Support())
			if !cube.IsTop() {
				run.Release(len(f))
			}
			out = append(out, value.Wall{Cube: cube, I: i, Body: body})
		}
	}
	return out
}

// Restricted calls yield with each conjunction of the row's face (its argument
// 0) and with the frame restricted to it, for the row's other arguments.
func Restricted(run *value.Run, f Frame, row []Arg, yield func(cube interval.Cube, f Frame)) {
	face := run.Face(row[0].Face(f))
	for k := range face.Len() {
		cube := face.Cube(k)
		if cube.IsTop() {
			yield(cube, f)
			continue
		}
		g := run.Frame(len(f))
		for k, v := range f {
			g[k] = nil
			if v != nil {
				g[k] = run.Restrict(v, cube)
			}
		}
		yield(cube, g)
		run.Release(len(f))
	}
}

// restrict is the frame f on a cube, in the slots that abs captures; the caller
// gives it back unless the cube is top.
func restrict(run *value.Run, abs *Abstraction, f Frame, cube interval.Cube) Frame {
	if cube.IsTop() {
		return f
	}
	run.Charge(int64(len(f)) * value.PriceSlot)
	g := run.Frame(len(f))
	for _, slot := range abs.captures {
		g[slot] = run.Restrict(f[slot], cube)
	}
	return g
}

// Shares reports whether two arguments of one operator are the same shared
// subterm, so that they may share their cell too.
func (a *Arg) Shares(b *Arg) bool { return a.abs != nil && a.abs == b.abs }
