package prims

import (
	"fmt"

	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Declare checks a data declaration in an empty scope. Decisions about it
// ("mentions", "built from", "free of") are taken on normal forms, where the
// η-expansion of a variable counts as that variable.
func Declare(c value.Checker, w *term.Declaration) *Data {
	at := &term.Written{Kind: term.NameKind, Word: w.Name, Place: w.Place}
	d := &Data{Name: w.Name, Formal: treatment(c, at, w)}
	d.eliminator = term.Reference{Name: d.Name, Index: -1, Target: d}
	names := map[string]bool{w.Name: true}
	for _, k := range w.Constructors {
		if names[k.Name] {
			c.Fail(written(k.Name, k.Place), term.Duplicate, "this name stands twice in the declaration", nil, k.Name)
		}
		names[k.Name] = true
	}
	c.Declare(d.Name, d)
	c.Binders(func(b value.CheckerBinding) value.Core {
		x := &declaring{c: c, run: c.Run(), d: d}
		for _, p := range w.Params {
			core, _ := c.Type(p.Type)
			x.params = append(x.params, b.Variable(term.Binder{Name: p.Name, Place: p.Place}, c.Value(core)))
			d.Params = append(d.Params, x.argument(p.Name, core))
		}
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
	d.Level, d.declared = d.raised, true
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
	used := term.FreeVariables(core, n)
	return Argument{Name: name, Core: core, Used: used, Type: x.c.Compile(core, used, nil)}
}

func (x *declaring) constructor(w *term.Constructor) *Constructor {
	k := &Constructor{Data: x.d, Name: w.Name, Commutes: true}
	if w.Path && len(w.Dims) == 0 {
		x.c.Fail(written(w.Name, w.Place), term.BadDeclaration, "a path constructor has dimensions", "one dimension or more", "none")
	}
	x.c.Binders(func(b value.CheckerBinding) value.Core {
		c := x.c
		for _, p := range w.Args {
			core, level := c.Type(p.Type)
			x.d.raise(level)
			a := x.argument(p.Name, core)
			t := c.Value(core)
			nf := c.Normal(t)
			a.Recursive = x.recursion(p.Type, nf, x.depth())
			n, _ := c.Scope()
			for _, used := range term.FreeVariables(nf, n) {
				a.Dependent = a.Dependent || used >= len(x.params)
			}
			b.Variable(term.Binder{Name: p.Name, Place: p.Place}, t)
			k.Args = append(k.Args, a)
		}
		for _, i := range w.Dims {
			b.Dimension(i)
			k.Dims = append(k.Dims, i.Name)
		}
		x.boundary(k, w)
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
func (x *declaring) boundary(k *Constructor, w *term.Constructor) {
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
			if !x.commutes(c.NormalAt(here, c.Value(core)), x.depth()) {
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

// depth is a number of variables and of dimensions in scope.
type depth struct{ variables, dimensions int }

func (x *declaring) depth() depth {
	v, d := x.c.Scope()
	return depth{v, d}
}

// commutes reports whether a normal boundary element is built from argument
// variables, dimensions, and constructors that commute with transport, alone.
func (x *declaring) commutes(c term.Core, at depth) bool {
	c = etaReduce(c, at)
	if v, ok := c.(*term.Variable); ok {
		return v.Level >= len(x.params)
	}
	o, ok := c.(*term.Op)
	if !ok {
		return false
	}
	switch o.Sig {
	case numeralSig:
		return true
	case conSig:
		con, ok := o.Args[0].(term.Reference).Target.(*Constructor)
		if !ok || !con.Commutes || con.Data != x.d {
			return false
		}
		for _, a := range o.Args[2:] {
			if core, ok := a.(term.Core); ok && !x.commutes(core, at) {
				return false
			}
		}
		return true
	}
	return false
}

// etaReduce undoes η at the root of a normal form, as often as it can:
// λx.(f x), ⟨i⟩(p @ i), (fst p, snd p).
func etaReduce(c term.Core, at depth) term.Core {
	o, ok := c.(*term.Op)
	if !ok {
		return c
	}
	switch o.Sig {
	case lamSig, lamDimensionSig, pathLamSig:
		inside := depth{at.variables, at.dimensions + 1}
		if o.Sig == lamSig {
			inside = depth{at.variables + 1, at.dimensions}
		}
		body, ok := etaReduce(o.Args[0].(*term.Bound).Body, inside).(*term.Op)
		if !ok || (body.Sig != applySig && body.Sig != atSig) {
			return c
		}
		head := body.Args[0].(term.Core)
		switch arg := body.Args[1].(type) {
		case term.Dimension:
			n := interval.Name(at.dimensions)
			if o.Sig == lamSig || !arg.Equal(interval.Var(n)) || mentionsDimension(head, n) {
				return c
			}
		case term.Core:
			v, ok := etaReduce(arg, inside).(*term.Variable)
			if !ok || o.Sig != lamSig || v.Level != at.variables || mentionsVariable(head, v.Level) {
				return c
			}
		}
		return head
	case pairSig:
		a, ok1 := etaReduce(o.Args[0].(term.Core), at).(*term.Op)
		b, ok2 := etaReduce(o.Args[1].(term.Core), at).(*term.Op)
		if ok1 && ok2 && a.Sig == firstSig && b.Sig == secondSig && term.Same(a.Args[0].(term.Core), b.Args[0].(term.Core)) {
			return a.Args[0].(term.Core)
		}
	}
	return c
}

func mentionsVariable(c term.Core, level int) (found bool) {
	term.Walk(c, func(a term.Arg) bool {
		if v, ok := a.(*term.Variable); ok && v.Level == level {
			found = true
		}
		return !found
	})
	return found
}

func mentionsDimension(c term.Core, n interval.Name) (found bool) {
	term.Walk(c, func(a term.Arg) bool {
		switch a := a.(type) {
		case term.Dimension:
			found = found || a.Mentions(n)
		case *term.Face:
			found = found || a.Mentions(n)
		}
		return !found
	})
	return found
}

// recursion classifies the normal type of an argument, and refuses it where
// the data type does not occur strictly positively.
func (x *declaring) recursion(at *term.Written, nf term.Core, here depth) *Recursion {
	mentions := func(c term.Core) bool {
		return term.References(c, func(r term.Reference) bool { return r.Target == any(x.d) })
	}
	if !mentions(nf) {
		return nil
	}
	refuse := func(message string) {
		x.c.Fail(at, term.BadDeclaration, message, "the data type itself, under functions and paths", nil)
	}
	o, ok := nf.(*term.Op)
	if !ok {
		refuse("the data type occurs where it must not")
		return nil
	}
	switch o.Sig {
	case dataSig:
		if o.Args[0].(term.Reference).Target != any(x.d) {
			refuse(x.d.Name + " inside the parameters of another data type is not supported")
		}
		for k, a := range o.Args[1:] {
			v, ok := etaReduce(a.(term.Core), here).(*term.Variable)
			if !ok || v.Level != k {
				refuse(x.d.Name + " must stand with its own parameters in order; indexed families are not supported")
			}
		}
		return newRecursion(recursionSelf, nil)
	case piSig:
		if mentions(o.Args[0].(term.Core)) {
			refuse(x.d.Name + " occurs in the domain of a function, which is not positive")
		}
		return newRecursion(recursionPi, x.recursion(at, o.Args[1].(*term.Bound).Body, depth{here.variables + 1, here.dimensions}))
	case piDimensionSig:
		return newRecursion(recursionDimension, x.recursion(at, o.Args[0].(*term.Bound).Body, depth{here.variables, here.dimensions + 1}))
	case pathSig:
		if inner := x.recursion(at, o.Args[0].(*term.Bound).Body, depth{here.variables, here.dimensions + 1}); inner != nil {
			return newRecursion(recursionPath, inner)
		}
	}
	refuse(x.d.Name + " occurs where it is not known to be positive")
	return nil
}

// StoreAsNumbers makes the elements of d, declared as zero and suc, numbers.
func (d *Data) StoreAsNumbers() {
	d.Numerals = true
	d.Constructors[0].constant = &Number{data: d}
}
