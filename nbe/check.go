package nbe

import (
	"fmt"
	"slices"

	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/quote"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// The checker elaborates written terms to core terms, bidirectionally: types of
// what introduces are given, types of what eliminates are inferred. How each
// form is typed, its former says (value.Checker is what formers see of this).
//
// To work under a face is to work, for each conjunction of it, with the
// conjunction substituted into everything in scope.

// scopeContext is what is in scope: variables and dimensions by level, names.
type scopeContext struct {
	variables  []variable
	dimensions []dimension
	hints      [2][]string        // the names of both, by level
	names      map[string][]bound // innermost last
	face       interval.Face      // what has been assumed, for messages
	cube       interval.Cube      // the same as the one conjunction that is assumed here
	support    value.Support
	env        *environment
}

type variable struct {
	name string
	t, v value.Value
}

type dimension struct {
	name string
	at   interval.Dim // the dimension of its own level, or what an assumption made of it
}

type bound struct {
	dimension bool
	level     int
}

// environment is the values in scope as an immutable list, innermost first, so
// that a delayed evaluation can hold on to it at no cost.
type environment struct {
	outer     *environment
	v         value.Value
	dimension bool
	level     int
}

func newContext() *scopeContext {
	return &scopeContext{names: map[string][]bound{}, face: interval.Top()}
}

func (x *scopeContext) pushVariable(name string, t, v value.Value) {
	level := len(x.variables)
	x.variables = append(x.variables, variable{name, t, v})
	x.hints[0] = append(x.hints[0], name)
	x.names[name] = append(x.names[name], bound{false, level})
	x.env = &environment{x.env, v, false, level}
	x.support |= v.Support()
}

func (x *scopeContext) pushDimension(name string, at interval.Dim) {
	level := len(x.dimensions)
	x.dimensions = append(x.dimensions, dimension{name, at})
	x.hints[1] = append(x.hints[1], name)
	x.names[name] = append(x.names[name], bound{true, level})
	x.env = &environment{x.env, value.DimensionOf(at), true, level}
	x.support |= at.Support()
}

func (x *scopeContext) unname(name string) {
	list := x.names[name]
	if len(list) <= 1 {
		delete(x.names, name)
		return
	}
	x.names[name] = list[:len(list)-1]
}

// mark and reset restore the context after binders.
func (x *scopeContext) reset(variables, dimensions int, env *environment, support value.Support) {
	for len(x.variables) > variables {
		n := len(x.variables) - 1
		x.unname(x.variables[n].name)
		x.variables = x.variables[:n]
	}
	for len(x.dimensions) > dimensions {
		n := len(x.dimensions) - 1
		x.unname(x.dimensions[n].name)
		x.dimensions = x.dimensions[:n]
	}
	x.hints = [2][]string{x.hints[0][:variables], x.hints[1][:dimensions]}
	x.env, x.support = env, support
}

// restricted is the context on a cube; names are shared with x.
func (x *scopeContext) restricted(run *value.Run, cube interval.Cube) *scopeContext {
	cut := cube.Restriction()
	run.Charge(int64(len(x.variables)+len(x.dimensions)) * value.PriceNode)
	y := &scopeContext{names: x.names, face: x.face.And(cube.Face())}
	y.cube, _ = x.cube.And(cube)
	y.variables = make([]variable, len(x.variables))
	for k, v := range x.variables {
		y.variables[k] = variable{v.name, run.Substitute(v.t, cut), run.Substitute(v.v, cut)}
		y.support |= y.variables[k].v.Support()
	}
	y.hints = [2][]string{x.variableNames(), x.dimensionNames()}
	y.dimensions = make([]dimension, len(x.dimensions))
	for k, d := range x.dimensions {
		y.dimensions[k] = dimension{d.name, d.at.Subst(cut)}
		y.support |= y.dimensions[k].at.Support()
	}
	var flip []*environment
	for e := x.env; e != nil; e = e.outer {
		flip = append(flip, e)
	}
	for k := len(flip) - 1; k >= 0; k-- {
		e := flip[k]
		v := value.Value(nil)
		if e.dimension {
			v = value.DimensionOf(y.dimensions[e.level].at)
		} else {
			v = y.variables[e.level].v
		}
		y.env = &environment{y.env, v, e.dimension, e.level}
	}
	return y
}

// variableNames are the names of the variables, outermost first. The slice is
// lent: what keeps it while x goes on takes a copy. Appending to it makes one.
func (x *scopeContext) variableNames() []string { return slices.Clip(x.hints[0]) }

// dimensionNames are the names of the dimensions, in the same way.
func (x *scopeContext) dimensionNames() []string { return slices.Clip(x.hints[1]) }

// checker is one elaboration. It implements value.Checker.
type checker struct {
	*scopeContext
	e        *Engine
	run      *value.Run
	declared map[string]value.Named // by the declaration under way
}

var _ value.Checker = (*checker)(nil)

func (c *checker) Run() *value.Run { return c.run }

// Infer elaborates w and returns its type.
func (c *checker) Infer(w *term.Written) (core term.Core, t value.Value) {
	c.run.Down(func() { core, t = c.infer(w) })
	return core, t
}

func (c *checker) infer(w *term.Written) (term.Core, value.Value) {
	c.run.Take(value.StepCheck)
	if w == nil {
		c.Fail(w, term.Malformed, "a term is missing", "a term", nil)
	}
	switch w.Kind {
	case term.NameKind:
		return c.name(w, w, nil, nil)
	case term.NumeralKind:
		if w.Number == nil || w.Number.Sign() < 0 {
			c.Fail(w, term.Malformed, "this is no numeral", "a natural number", nil)
		}
		return c.e.numeral(c, w)
	case term.ApplyKind:
		return c.application(w, nil)
	case term.FormKind:
		word := c.word(w)
		if word.Infer == nil {
			if word.Check == nil {
				c.Fail(w, term.IllTyped, "this is no term", "a term", w)
			}
			c.Fail(w, term.IllTyped, "the type of this form cannot be inferred; ann gives it", "a known type", w)
		}
		return word.Infer(c, w)
	}
	c.Fail(w, term.Malformed, "this node is of no known kind", nil, nil)
	return nil, nil
}

// word is the word of a form, whose parts are as its shape says.
func (c *checker) word(w *term.Written) *prims.Word {
	word, ok := c.e.words[w.Word]
	if !ok {
		if c.e.notation.Taken(w.Word) {
			if shape, ok := c.e.notation.Shape(w.Word); ok && !wellShaped(w, shape.Slots) {
				c.Fail(w, term.Malformed, "this form does not have the shape of its head word", nil, nil)
			}
			return &prims.Word{}
		}
		c.Fail(w, term.Malformed, "there is no form with this head word", nil, w.Word)
	}
	if !wellShaped(w, word.Slots) {
		c.Fail(w, term.Malformed, "this form does not have the shape of its head word", fmt.Sprintf("a %s with %d parts", w.Word, len(word.Slots)), nil)
	}
	return word
}

func wellShaped(w *term.Written, slots []term.Slot) bool {
	return shaped(w.Parts, slots, false)
}

func shaped(parts []term.Part, slots []term.Slot, row bool) bool {
	if n := len(slots); n > 0 && slots[n-1].Rest {
		if len(parts) < n {
			return false
		}
	} else if len(parts) != n {
		return false
	}
	for k, p := range parts {
		slot := slots[min(k, len(slots)-1)]
		if slot.Rows != nil {
			if p.Body != nil {
				return false
			}
			for _, r := range p.Rows {
				if !shaped(r, slot.Rows, true) {
					return false
				}
			}
			continue
		}
		if p.Body == nil || p.Rows != nil || !slot.Many && len(p.Binders) != len(slot.Binds) {
			return false
		}
	}
	return true
}

// Check elaborates w at type t.
func (c *checker) Check(w *term.Written, t value.Value) (core term.Core) {
	c.run.Down(func() { core = c.check(w, t) })
	return core
}

func (c *checker) check(w *term.Written, t value.Value) term.Core {
	c.run.Take(value.StepCheck)
	if w == nil {
		c.Fail(w, term.Malformed, "a term is missing", "a term", nil)
	}
	var core term.Core
	var got value.Value
	switch w.Kind {
	case term.NameKind:
		core, got = c.name(w, w, nil, t)
	case term.ApplyKind:
		core, got = c.application(w, t)
	case term.FormKind:
		word := c.word(w)
		if word.Check != nil {
			return word.Check(c, w, t)
		}
		core, got = c.infer(w)
	default:
		core, got = c.infer(w)
	}
	c.Included(w, got, t)
	return core
}

// name elaborates a name with arguments, which only a data type or a
// constructor takes here.
func (c *checker) name(w, name *term.Written, args []*term.Written, want value.Value) (term.Core, value.Value) {
	if list := c.names[name.Word]; len(list) > 0 {
		b := list[len(list)-1]
		if b.dimension {
			c.Fail(name, term.IllTyped, "a dimension stands where a term is expected", "a term", "the dimension "+name.Word)
		}
		return &term.Variable{Level: b.level}, c.variables[b.level].t
	}
	if n, ok := c.declared[name.Word]; ok {
		return n.Elaborate(c, w, args, want)
	}
	switch x := c.e.lookup(name.Word).(type) {
	case value.Named:
		return x.Elaborate(c, w, args, want)
	case *definition:
		return &term.Global{Name: x.name}, x.t
	}
	c.Fail(name, term.NotFound, "nothing of this name is in scope", nil, name.Word)
	return nil, nil
}

// named is what a name stands for, if it takes arguments itself.
func (c *checker) named(w *term.Written) bool {
	if w.Kind != term.NameKind || len(c.names[w.Word]) > 0 {
		return false
	}
	if _, ok := c.declared[w.Word]; ok {
		return true
	}
	_, ok := c.e.lookup(w.Word).(value.Named)
	return ok
}

// application elaborates what is no head word, applied to arguments.
func (c *checker) application(w *term.Written, want value.Value) (term.Core, value.Value) {
	if len(w.Parts) == 0 {
		c.Fail(w, term.Malformed, "an application of nothing", "a term", nil)
	}
	for _, p := range w.Parts {
		if p.Body == nil {
			c.Fail(w, term.Malformed, "a part of an application is missing", "a term", nil)
		}
	}
	head := w.Parts[0].Body
	if c.named(head) {
		args := make([]*term.Written, len(w.Parts)-1)
		for k := range args {
			args[k] = w.Parts[k+1].Body
		}
		return c.name(w, head, args, want)
	}
	f, t := c.Infer(head)
	if len(w.Parts) == 1 {
		c.Fail(w, term.IllTyped, "a function does not stand in parentheses of its own", "an argument", "none")
	}
	for _, p := range w.Parts[1:] {
		a, ok := c.run.Force(t).(value.Applicable)
		if !ok {
			c.Fail(p.Body, term.IllTyped, "only a function takes an argument", "a function", c.ShowType(t))
		}
		f, t = a.ElaborateApply(c, f, p.Body)
	}
	return f, t
}

// Type elaborates a type and returns the level of its universe.
func (c *checker) Type(w *term.Written) (term.Core, int) {
	core, t := c.Infer(w)
	u, ok := c.run.Force(t).(*prims.Universe)
	if !ok {
		c.Fail(w, term.IllTyped, "this is no type", "a type", c.ShowType(t))
	}
	return core, u.Level
}

// Value is a core term in the present scope, as a value; no work is done.
func (c *checker) Value(core term.Core) value.Value {
	switch x := core.(type) {
	case *term.Variable:
		return c.variables[x.Level].v
	case *term.Global:
		if d, ok := c.e.lookup(x.Name).(*definition); ok {
			return c.run.Folded(d)
		}
	}
	d := &delayed{c.e, core, c.env, len(c.variables), len(c.dimensions), c.run.Standing}
	if c.folds(core) {
		return c.run.FoldLater(c.support, d)
	}
	return c.run.Later(c.support, d.Unfolded)
}

// folds reports whether core is a definition under eliminations, so that it has
// a folded form to be compared by.
func (c *checker) folds(core term.Core) bool {
	for {
		switch x := core.(type) {
		case *term.Global:
			d, ok := c.e.lookup(x.Name).(*definition)
			return ok && d.defined()
		case *term.Op:
			e, ok := c.e.ops[x.Sig].(eval.Eliminator)
			if !ok {
				return false
			}
			if core, ok = x.Args[e.Principal()].(term.Core); !ok {
				return false
			}
		default:
			return false
		}
	}
}

// delayed is a core term in a scope, not compiled yet.
type delayed struct {
	e        *Engine
	core     term.Core
	env      *environment
	nv, nd   int
	standing *value.Site
}

// Unfolded compiles the term; no work is done beyond that.
func (d *delayed) Unfolded(run *value.Run) value.Value {
	outside := run.Standing
	run.Standing = d.standing
	variables, dimensions, vs := free(run, d.core, d.env, d.nv, d.nd)
	v := eval.Compile(run, d.e, d.core, d.nv, d.nd, variables, dimensions).Eval(run, vs)
	run.Standing = outside
	return v
}

// Fold is the folded form.
func (d *delayed) Fold(run *value.Run) *value.Neutral {
	if l, ok := d.Unfolded(run).(*value.Lazy); ok {
		return l.Fold(run)
	}
	return nil
}

// Unfolding leaves it to the cell that is compiled.
func (d *delayed) Unfolding(*value.Run) (value.Global, bool) { return nil, true }

// SketchFold is that cell's.
func (d *delayed) SketchFold(*value.Sketch) *term.Written { return term.Name("…") }

// Site is the definition or term that it stands in.
func (d *delayed) Site() *value.Site { return d.standing }

// free are the levels that core mentions, with their values.
func free(run *value.Run, core term.Core, env *environment, nv, nd int) (variables, dimensions []int, vs []value.Value) {
	hasV, hasD := map[int]bool{}, map[int]bool{}
	term.Walk(core, func(a term.Arg) bool {
		run.Work(1)
		switch a := a.(type) {
		case *term.Variable:
			if a.Level < nv {
				hasV[a.Level] = true
			}
		case term.Dimension:
			for _, n := range a.Dim.Names() {
				if int(n) < nd {
					hasD[int(n)] = true
				}
			}
		case *term.Face:
			for _, n := range a.Face.Names() {
				if int(n) < nd {
					hasD[int(n)] = true
				}
			}
		}
		return true
	})
	var ds []value.Value
	for e := env; e != nil && len(variables)+len(dimensions) < len(hasV)+len(hasD); e = e.outer {
		run.Work(1)
		switch {
		case e.dimension && hasD[e.level]:
			dimensions, ds = append(dimensions, e.level), append(ds, e.v)
		case !e.dimension && hasV[e.level]:
			variables, vs = append(variables, e.level), append(vs, e.v)
		}
	}
	return variables, dimensions, append(vs, ds...)
}

// keepAll keeps every definition folded: what the checker reads back.
func keepAll(value.Global) bool { return true }

// ReadBack reads a value back into the present scope, definitions folded.
func (c *checker) ReadBack(t, v value.Value) term.Core {
	return quote.NewReader(c.run, len(c.variables), len(c.dimensions), keepAll).Term(t, v)
}

// ReadBackType reads a type back into the present scope, definitions folded.
func (c *checker) ReadBackType(t value.Value) term.Core {
	return quote.NewReader(c.run, len(c.variables), len(c.dimensions), keepAll).Type(t)
}

// Normal is the normal form of a type in the present scope.
func (c *checker) Normal(t value.Value) term.Core {
	return quote.NewReader(c.run, len(c.variables), len(c.dimensions), nil).Type(t)
}

// NormalAt is the normal form of v at type t.
func (c *checker) NormalAt(t, v value.Value) term.Core {
	return quote.NewReader(c.run, len(c.variables), len(c.dimensions), nil).Term(t, v)
}

// Scope is the number of variables and of dimensions in scope.
func (c *checker) Scope() (variables, dimensions int) {
	return len(c.variables), len(c.dimensions)
}

// Case is an elaborated body under binders as a case in the present scope.
func (c *checker) Case(b *term.Bound, sorts []term.Sort) value.Case {
	nv, nd := len(c.variables), len(c.dimensions)
	variables, dimensions, vs := free(c.run, b.Body, c.env, nv, nd)
	return eval.CompileCase(c.run, c.e, b, sorts, nv, nd, variables, dimensions, vs)
}

// Compile is a core term of the present scope as a case over the given levels.
func (c *checker) Compile(core term.Core, variables, dimensions []int) value.Case {
	return eval.Compile(c.run, c.e, core, len(c.variables), len(c.dimensions), variables, dimensions).Case(c.run)
}

// Declare makes name stand for n until the declaration has ended, or for
// nothing again if n is nil.
func (c *checker) Declare(name string, n value.Named) {
	if n == nil {
		delete(c.declared, name)
		return
	}
	c.declared[name] = n
}

// inside runs body and restores the scope.
func (c *checker) inside(body func()) {
	v, d, env, support := len(c.variables), len(c.dimensions), c.env, c.support
	body()
	c.reset(v, d, env, support)
}

func hintOf(b term.Binder) []string { return []string{b.Name} }

// Variable elaborates under the binder of a variable of type t.
func (c *checker) Variable(b term.Binder, t value.Value, body func(x value.Value) term.Core) *term.Bound {
	return c.Defined(b, t, value.NewVariable(len(c.variables), b.Name, t), func() term.Core { return body(c.variables[len(c.variables)-1].v) })
}

// Defined elaborates under a name that stands for the value v of type t.
func (c *checker) Defined(b term.Binder, t, v value.Value, body func() term.Core) *term.Bound {
	c.binder(b)
	out := &term.Bound{Hints: hintOf(b)}
	c.inside(func() {
		c.pushVariable(b.Name, t, v)
		out.Body = body()
	})
	return out
}

// Dimensioned elaborates under the binder of a dimension.
func (c *checker) Dimensioned(b term.Binder, body func(i value.Name) term.Core) *term.Bound {
	c.binder(b)
	out := &term.Bound{Hints: hintOf(b), Dimensions: 1}
	c.inside(func() {
		i := value.Name(len(c.dimensions))
		c.pushDimension(b.Name, interval.Var(i))
		out.Body = body(i)
	})
	return out
}

// binder refuses names that terms built through the API may hold.
func (c *checker) binder(b term.Binder) {
	if b.Name != "_" && !term.IsName(b.Name) || c.e.notation.Taken(b.Name) {
		c.Fail(&term.Written{Place: b.Place}, term.Malformed, "this cannot be a name", "a name", fmt.Sprintf("%q", b.Name))
	}
}

type checkerBinding struct {
	c     *checker
	hints []string
}

func (b *checkerBinding) Variable(n term.Binder, t value.Value) value.Value {
	b.c.binder(n)
	x := value.NewVariable(len(b.c.variables), n.Name, t)
	b.c.pushVariable(n.Name, t, x)
	b.hints = append(b.hints, n.Name)
	return x
}

func (b *checkerBinding) Dimension(n term.Binder) value.Name {
	b.c.binder(n)
	i := value.Name(len(b.c.dimensions))
	b.c.pushDimension(n.Name, interval.Var(i))
	b.hints = append(b.hints, n.Name)
	return i
}

// Binders elaborates under several binders.
func (c *checker) Binders(body func(b value.CheckerBinding) term.Core) *term.Bound {
	b := &checkerBinding{c: c}
	out := &term.Bound{}
	c.inside(func() { out.Body = body(b) })
	out.Hints = b.hints
	return out
}

// Under elaborates on each conjunction of a face, with the scope restricted to it.
func (c *checker) Under(face interval.Face, written []term.Part, body func(cube interval.Cube)) {
	face = face.Subst(c.cube.Restriction()) // what is assumed may decide some of it
	if face.IsBot() {
		c.resolve(written)
		return
	}
	for k := range face.Len() {
		cube := face.Cube(k)
		if cube.IsTop() {
			body(cube)
			continue
		}
		outer := c.scopeContext
		c.scopeContext = outer.restricted(c.run, cube)
		body(cube)
		c.scopeContext = outer
	}
}
