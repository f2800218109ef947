package prims

import (
	"fmt"

	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Checking declarations (CHM 3): telescopes, strict positivity, universes, the
// boundaries of path constructors and whether these commute with transport. All
// that evaluation needs to know of a declaration is decided here, once, so that
// no instance of it can choose another rule.

// Declare checks a data declaration in an empty scope. Decisions about it
// ("mentions", "built from", "free of") are taken on normal forms, where the
// η-expansion of a variable counts as that variable.
//
// The level of a data type is the largest of its arguments' types, itself
// counting 0, which is known only at the end. Where it is above 0 everything is
// checked once more with the type at its level, since a type at 0 would pass
// for an element of a universe that it is too large for.
func Declare(c value.Checker, w *term.Declaration) *Data {
	at := written(w.Name, w.Place)
	formal := treatment(c, at, w)
	names := map[string]bool{w.Name: true}
	for _, k := range w.Constructors {
		if names[k.Name] {
			c.Fail(written(k.Name, k.Place), term.Duplicate, "this name stands twice in the declaration", nil, k.Name)
		}
		names[k.Name] = true
	}
	d := declare(c, w, formal, 0)
	if d.raised > d.Level {
		c.Declare(w.Name, nil)
		for _, k := range w.Constructors {
			c.Declare(k.Name, nil)
		}
		d = declare(c, w, formal, d.raised)
	}
	d.declared = true
	return d
}

// declare checks the declaration with its data type at the given level.
func declare(c value.Checker, w *term.Declaration, formal bool, level int) *Data {
	d := &Data{Name: w.Name, Formal: formal, Level: level, label: value.NewLabel(w.Name, w.Place)}
	d.alone = &DataType{Data: d}
	d.eliminator = term.Reference{Name: d.Name, Index: -1, Target: d}
	c.Binders(func(b value.CheckerBinding) value.Core {
		x := &declaring{c: c, run: c.Run(), d: d}
		for _, p := range w.Params {
			core, _ := c.Type(p.Type)
			d.Params = append(d.Params, x.argument(p.Name, core)) // in the scope that core speaks of
			x.params = append(x.params, b.Variable(term.Binder{Name: p.Name, Place: p.Place}, c.Value(core)))
		}
		c.Declare(d.Name, d) // the types of parameters may not mention it
		for k := range w.Constructors {
			con := x.constructor(&w.Constructors[k])
			con.Index = len(d.Constructors)
			con.reference = term.Reference{Name: con.Name, Index: con.Index, Target: con}
			if len(con.Args) == 0 && len(con.Dims) == 0 {
				con.constant = &Con{Of: con}
			}
			d.Constructors = append(d.Constructors, con)
			c.Declare(con.Name, con)
		}
		return nil
	})
	return d
}

func written(name string, p term.Place) *term.Written {
	return &term.Written{Kind: term.NameKind, Word: name, Place: p}
}

// treatment is the declaration's treatment of composition: formal if true.
func treatment(c value.Checker, at *term.Written, w *term.Declaration) bool {
	paths := false
	for _, k := range w.Constructors {
		paths = paths || k.Path
	}
	if w.Compositions > 1 {
		c.Fail(at, term.BadDeclaration, "both treatments of composition are asked for; with both, definitional equality would not be stable under substitution", "one composition clause", fmt.Sprint(w.Compositions))
	}
	switch w.Composition {
	case "":
		return paths
	case "formal":
		return true
	case "strict":
		if paths {
			c.Fail(at, term.BadDeclaration, "path constructors need formal composites: strict would push constructors that eliminators also commute with, and definitional equality would not be stable under substitution", "(composition formal)", "(composition strict)")
		}
		return false
	}
	c.Fail(at, term.BadDeclaration, "there is no such treatment of composition", "strict or formal", w.Composition)
	return false
}

// declaring is the state of a declaration under way.
type declaring struct {
	c      value.Checker
	run    *value.Run
	d      *Data
	params []value.Value
}

// argument is an entry of a telescope in the present scope.
func (x *declaring) argument(name string, core term.Core) Argument {
	n, _ := x.c.Scope()
	used := term.FreeVariables(core, n, x.visit)
	return Argument{Name: name, Core: core, Used: used, Type: x.c.Compile(core, used, nil)}
}

// mentions reports whether a normal form mentions the data type or its constructors.
func (x *declaring) mentions(c term.Core) bool {
	return term.References(c, func(r term.Reference) bool {
		if k, ok := r.Target.(*Constructor); ok {
			return k.Data == x.d
		}
		return r.Target == any(x.d)
	}, x.visit)
}

// visit counts the visit of a node.
func (x *declaring) visit() { x.run.Work(1) }

func (x *declaring) constructor(w *term.Constructor) *Constructor {
	k := &Constructor{Data: x.d, Name: w.Name, Commutes: true}
	if w.Path && len(w.Dims) == 0 {
		x.c.Fail(written(w.Name, w.Place), term.BadDeclaration, "a path constructor has dimensions", "one dimension or more", "none")
	}
	x.c.Binders(func(b value.CheckerBinding) value.Core {
		c := x.c
		var arguments []variable
		for _, p := range w.Args {
			core, level := c.Type(p.Type)
			x.d.raise(level)
			a := x.argument(p.Name, core)
			t := c.Value(core)
			nf := c.Normal(t)
			if x.mentions(nf) {
				a.Recursive = x.recursion(p.Type, nf, t)
				k.recursive = true
				k.ends = k.ends || a.Recursive.hasPath()
			}
			a.steady = x.steady(nf)
			n, _ := c.Scope()
			for _, used := range term.FreeVariables(nf, n, x.visit) {
				a.Dependent = a.Dependent || used >= len(x.params)
			}
			arguments = append(arguments, variable{t, b.Variable(term.Binder{Name: p.Name, Place: p.Place}, t), nil})
			k.Args = append(k.Args, a)
		}
		for _, i := range w.Dims {
			b.Dimension(i)
			k.Dims = append(k.Dims, i.Name)
		}
		x.boundary(k, w, arguments)
		return nil
	})
	return k
}

// raise puts the data type into a universe that holds an argument's type.
func (d *Data) raise(level int) {
	d.raised = max(d.raised, level)
}

// boundary checks the walls of a path constructor's boundary and that they
// agree where their faces meet, and decides whether the constructor commutes
// with transport.
func (x *declaring) boundary(k *Constructor, w *term.Constructor, arguments []variable) {
	c, run := x.c, x.run
	t := NewDataType(x.d, x.params)
	variables, dims := c.Scope()
	for _, wall := range w.Boundary {
		face := c.Face(wall.Face)
		c.Under(face, []term.Part{{Body: wall.Element}}, func(cube interval.Cube) {
			cut := cube.Restriction()
			here := run.Substitute(t, cut)
			core := c.Check(wall.Element, here)
			for _, other := range k.Boundary {
				c.Under(other.Cube.Face(), nil, func(interval.Cube) {
					c.Same(here, c.Value(other.Core), c.Value(core),
						&term.Error{Kind: term.Disagreement, Place: wall.Element.Place, Message: "the boundary of " + k.Name + " disagrees where its faces meet"})
				})
			}
			if k.Commutes && !x.commutes(c.NormalAt(here, c.Value(core)), arguments) {
				k.Commutes = false
			}
			k.Boundary = append(k.Boundary, Boundary{cube, core, c.Compile(core, levels(variables), levels(dims))})
		})
	}
	k.Boundary = irredundantBoundary(k.Boundary)
}

func levels(n int) []int {
	out := make([]int, n)
	for k := range out {
		out[k] = k
	}
	return out
}

func irredundantBoundary(walls []Boundary) []Boundary {
	cubes := make([]interval.Cube, len(walls))
	for k, w := range walls {
		cubes[k] = w.Cube
	}
	out := []Boundary{}
	for _, k := range irredundant(cubes) {
		out = append(out, walls[k])
	}
	return out
}

// variable is an argument variable of the constructor that is being declared,
// with its normal form once somebody has asked for it.
type variable struct {
	t, v   value.Value
	normal term.Core
}

// isArgument reports whether a normal form is the η-expansion of an argument variable.
func (x *declaring) isArgument(c term.Core, arguments []variable) bool {
	if v, ok := c.(*term.Variable); ok {
		return v.Level >= len(x.params)
	}
	for k := range arguments {
		if arguments[k].normal == nil {
			arguments[k].normal = x.c.NormalAt(arguments[k].t, arguments[k].v)
		}
		if term.Same(arguments[k].normal, c) {
			return true
		}
	}
	return false
}

// commutes reports whether a normal boundary element is built from argument
// variables, dimensions, and constructors that commute with transport, alone.
func (x *declaring) commutes(c term.Core, arguments []variable) (ok bool) {
	o, isOp := c.(*term.Op)
	if !isOp {
		return x.isArgument(c, arguments)
	}
	switch o.Sig {
	case numeralSig, unitSig:
		return true
	case conSig:
		con := o.Args[0].(term.Reference).Target.(*Constructor)
		ok = con.Commutes
		x.run.Down(func() {
			for n := range con.Args {
				a := o.Args[2+n].(term.Core)
				// Transport at a data type without parameters is the identity,
				// so its constructors commute only where that is also so for
				// what they are applied to.
				ok = ok && x.commutes(a, arguments) &&
					(con.Data == x.d || len(con.Data.Params) > 0 || con.Args[n].steady || x.closed(a))
			}
		})
		return ok
	}
	return x.isArgument(c, arguments)
}

// closed reports whether c mentions no variable.
func (x *declaring) closed(c term.Core) bool {
	n, _ := x.c.Scope()
	return len(term.FreeVariables(c, n, x.visit)) == 0
}

// steady reports whether transport along a constant line of this normal type is
// the identity by definition.
func (x *declaring) steady(c term.Core) (ok bool) {
	o, isOp := c.(*term.Op)
	if !isOp {
		return false
	}
	x.run.Down(func() {
		switch o.Sig {
		case unitTypeSig, universeSig:
			ok = true
		case dataSig:
			ok = len(o.Args) == 1
		case piSig, sigmaSig:
			ok = x.steady(o.Args[0].(term.Core)) && x.steady(o.Args[1].(*term.Bound).Body)
		case piDimensionSig:
			ok = x.steady(o.Args[0].(*term.Bound).Body)
		}
	})
	return ok
}

// recursion classifies the type of an argument that mentions the data type,
// given with its normal form, and refuses it where the data type does not occur
// strictly positively.
func (x *declaring) recursion(at *term.Written, nf term.Core, t value.Value) (r *Recursion) {
	c, run := x.c, x.run
	refuse := func(message string) {
		c.Fail(at, term.BadDeclaration, message, x.d.Name+" itself, under functions and paths", c.ShowType(t))
	}
	o, ok := nf.(*term.Op)
	if !ok {
		refuse(x.d.Name + " occurs where it is not known to be positive")
		return nil
	}
	under := func(shape recursionShape, body *term.Bound, t value.Value) {
		run.Down(func() { r = newRecursion(shape, x.recursion(at, body.Body, t)) })
	}
	switch t := run.Force(t).(type) {
	case *DataType:
		if t.Data != x.d {
			if x.mentions(nf) {
				refuse(x.d.Name + " inside the parameters of another data type is not supported")
			}
			break
		}
		for k, p := range t.Params {
			c.Same(x.d.Params[k].At(run, x.params, nil), x.params[k], p, &term.Error{Kind: term.BadDeclaration, Place: at.Place,
				Message: x.d.Name + " must stand with its own parameters in order; indexed families are not supported"})
		}
		return newRecursion(recursionSelf, nil)
	case *Pi:
		if x.mentions(o.Args[0].(term.Core)) {
			refuse(x.d.Name + " occurs in the domain of a function, which is not positive")
		}
		c.Variable(anonymous, t.Domain, func(y value.Value) value.Core {
			under(recursionPi, o.Args[1].(*term.Bound), t.Codomain.Open(run, y))
			return nil
		})
		return r
	case *PiDimension:
		c.Dimensioned(anonymous, func(i value.Name) value.Core {
			under(recursionDimension, o.Args[0].(*term.Bound), t.Codomain.Open(run, value.DimensionName(i)))
			return nil
		})
		return r
	case *Path:
		c.Dimensioned(anonymous, func(i value.Name) value.Core {
			under(recursionPath, o.Args[0].(*term.Bound), t.Line.Open(run, value.DimensionName(i)))
			return nil
		})
		return r
	}
	refuse(x.d.Name + " occurs where it is not known to be positive")
	return nil
}

var anonymous = term.Binder{Name: "_"}

// sharedNumbers is how many of the first numbers are made once.
const sharedNumbers = 1024

// StoreAsNumbers makes the elements of d, declared as zero and suc, numbers.
func (d *Data) StoreAsNumbers() {
	d.Numerals = true
	d.small = make([]*Number, sharedNumbers)
	all := make([]Number, sharedNumbers)
	for n := range all {
		all[n] = Number{d, natural{small: uint64(n)}}
		d.small[n] = &all[n]
	}
	d.Constructors[0].constant = d.small[0]
}
