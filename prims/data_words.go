package prims

import (
	"fmt"

	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Data types, constructors and eliminations as written terms.

func dataFormer() Former {
	return Former{
		Name: "data types", Version: 1,
		Words:     []Word{word("elim", inferElim, nil)},
		Operators: []Operator{{dataSig, dataOp{}}, {conSig, conOp{}}, {elimSig, elimOp{}}},
	}
}

// Elaborate types a data type at its parameters.
func (d *Data) Elaborate(c value.Checker, w *term.Written, args []*term.Written, _ value.Value) (value.Core, value.Value) {
	if len(args) != len(d.Params) {
		c.Fail(w, term.IllTyped, d.Name+" stands with its parameters", fmt.Sprintf("%d parameters", len(d.Params)), fmt.Sprint(len(args)))
	}
	core := make([]term.Arg, 1, 1+len(args))
	core[0] = term.Reference{Name: d.Name, Index: -1, Target: d}
	params := make([]value.Value, 0, len(args))
	for k, a := range args {
		p := c.Check(a, d.Params[k].At(c.Run(), params, nil))
		core = append(core, p)
		params = append(params, c.Value(p))
	}
	return op(dataSig, core...), NewUniverse(d.Level)
}

// Elaborate types a constructor at its arguments and dimensions. With
// parameters it needs the type.
func (k *Constructor) Elaborate(c value.Checker, w *term.Written, args []*term.Written, want value.Value) (value.Core, value.Value) {
	run := c.Run()
	d := k.Data
	var t *DataType
	switch {
	case want != nil:
		var ok bool
		if t, ok = run.Force(want).(*DataType); !ok || t.Data != d {
			c.Fail(w, term.IllTyped, "the constructor "+k.Name+" does not make an element of this type", c.ShowType(want), "an element of "+d.Name)
		}
	case len(d.Params) == 0:
		t = NewDataType(d, nil)
	default:
		c.Fail(w, term.IllTyped, "the type of this constructor cannot be inferred; ann gives it", "a known type", "the constructor "+k.Name)
	}
	if n := len(k.Args) + len(k.Dims); len(args) != n {
		c.Fail(w, term.IllTyped, "the constructor "+k.Name+" stands with all its arguments",
			fmt.Sprintf("%d arguments and %d dimensions", len(k.Args), len(k.Dims)), fmt.Sprintf("%d in all", len(args)))
	}
	core := make([]term.Arg, 2, 2+len(args))
	core[0], core[1] = k.reference, term.Rows{}
	if len(k.Dims) > 0 && len(d.Params) > 0 {
		row := make([]term.Arg, len(d.Params))
		for n, p := range t.Params {
			row[n] = c.ReadBack(d.Params[n].At(run, t.Params, nil), p)
		}
		core[1] = term.Rows{row}
	}
	vs := make([]value.Value, 0, len(k.Args))
	for n := range k.Args {
		a := c.Check(args[n], k.Args[n].At(run, t.Params, vs))
		core = append(core, a)
		vs = append(vs, c.Value(a))
	}
	for n := range k.Dims {
		core = append(core, term.Dimension{Dim: c.Dimension(args[len(k.Args)+n])})
	}
	return canonicalNumber(c.Run(), k, core), t
}

// canonicalNumber makes numerals of constructors, suc 1 being 2.
func canonicalNumber(run *value.Run, k *Constructor, core []term.Arg) value.Core {
	if !k.Data.Numerals {
		return op(conSig, core...)
	}
	if k.Index == 0 {
		return readNumeral(k.Data, natural{})
	}
	if n, ok := core[2].(*term.Op); ok && n.Sig == numeralSig {
		return readNumeral(k.Data, naturalOf(n.Args[0].(term.Number).Int).plus(run, natural{small: 1}))
	}
	return op(conSig, core...)
}

// Numeral elaborates a numeral of this declaration.
func (d *Data) Numeral(w *term.Written) (value.Core, value.Value) {
	return readNumeral(d, naturalOf(w.Number)), NewDataType(d, nil)
}

// hints as the checker's binders
type namedBinding struct {
	b       value.CheckerBinding
	binders []term.Binder
}

func (n *namedBinding) next(standard string) term.Binder {
	if len(n.binders) == 0 {
		return term.Binder{Name: standard}
	}
	b := n.binders[0]
	n.binders = n.binders[1:]
	return b
}

func (n *namedBinding) Variable(hint string, t value.Value) value.Value {
	return n.b.Variable(n.next(hint), t)
}
func (n *namedBinding) Dimension(hint string) value.Name { return n.b.Dimension(n.next(hint)) }

func standardName(_ int, standard string) string { return standard }

// inferElim types an elimination, case by case in the order of the declaration.
func inferElim(c value.Checker, w *term.Written) (value.Core, value.Value) {
	run := c.Run()
	scrutinee, st := c.Infer(part(w, 1))
	t, ok := run.Force(st).(*DataType)
	if !ok {
		c.Fail(part(w, 1), term.IllTyped, "only elements of data types are eliminated", "an element of a data type", c.ShowType(st))
	}
	d := t.Data
	if !d.declared {
		c.Fail(w, term.BadDeclaration, "the declaration of "+d.Name+" may not eliminate it", nil, nil)
	}
	family := c.Variable(binder(w, 0), t, func(value.Value) value.Core {
		core, _ := c.Type(part(w, 0))
		return core
	})
	e := newEliminator(d, c.Case(family, []term.Sort{term.TermSort}).AsClosure(), make([]value.Case, len(d.Constructors)), nil)
	e.checked = e

	given := arrangeCases(c, w, d)
	rows := make(term.Rows, 0, len(given))
	for k, con := range d.Constructors {
		p := given[k]
		var sorts []term.Sort
		b := c.Binders(func(b value.CheckerBinding) value.Core {
			env, ct := e.caseBinders(run, &namedBinding{b, p.Binders}, con, t.Params, standardName)
			sorts = make([]term.Sort, len(env))
			for n := len(env) - len(con.Dims); n < len(env); n++ {
				sorts[n] = term.DimensionSort
			}
			return c.Check(p.Body, ct)
		})
		b.Dimensions = len(con.Dims)
		body := c.Case(b, sorts)
		e.checkBoundary(c, p, con, t.Params, body)
		e.cases[k] = body
		e.support |= body.Support()
		rows = append(rows, []term.Arg{con.reference, b})
	}
	return op(elimSig, d.eliminator, term.Rows{}, family, scrutinee, rows), e.family.Open(run, c.Value(scrutinee))
}

// arrangeCases puts the cases into the order of the declaration; each must
// stand there once and bind what its constructor takes.
func arrangeCases(c value.Checker, w *term.Written, d *Data) []term.Part {
	index := make(map[string]int, len(d.Constructors))
	for k, con := range d.Constructors {
		index[con.Name] = k
	}
	given := make([]term.Part, len(d.Constructors))
	for _, row := range w.Parts[2].Rows {
		name := row[0].Body
		k, ok := index[name.Word]
		if !ok {
			c.Fail(name, term.BadDeclaration, "this is no constructor of "+d.Name, "a constructor of "+d.Name, name.Word)
		}
		if given[k].Body != nil {
			c.Fail(name, term.BadDeclaration, "the case of "+name.Word+" stands twice", nil, nil)
		}
		con := d.Constructors[k]
		recursive := 0
		for _, a := range con.Args {
			if a.Recursive != nil {
				recursive++
			}
		}
		if n := len(con.Args) + recursive + len(con.Dims); len(row[1].Binders) != n {
			c.Fail(name, term.BadDeclaration, "the case of "+name.Word+" binds the wrong number of names",
				fmt.Sprintf("%d arguments, %d hypotheses and %d dimensions", len(con.Args), recursive, len(con.Dims)), fmt.Sprintf("%d names", len(row[1].Binders)))
		}
		given[k] = row[1]
	}
	for k, p := range given {
		if p.Body == nil {
			c.Fail(w, term.BadDeclaration, "a case is missing", "a case of "+d.Constructors[k].Name, "none")
		}
	}
	return given
}

// checkBoundary requires the case of a path constructor to be, on each face of
// the boundary, the elimination of the boundary's element, each hypothesis
// standing for the elimination of its argument.
func (e *Eliminator) checkBoundary(c value.Checker, p term.Part, con *Constructor, params []value.Value, body value.Case) {
	run := c.Run()
	if len(con.Boundary) == 0 {
		return
	}
	c.Binders(func(b value.CheckerBinding) value.Core {
		args := make([]value.Value, len(con.Args))
		for n := range args {
			args[n] = b.Variable(p.Binders[n], con.Args[n].At(run, params, args))
		}
		env := append([]value.Value(nil), args...)
		for n := range args {
			if r := con.Args[n].Recursive; r != nil {
				env = append(env, e.hypothesis(run, r, args[n]))
			}
		}
		dims := make([]interval.Dim, len(con.Dims))
		images := make([]interval.Dim, len(con.Dims))
		for n := range dims {
			dims[n] = interval.Var(b.Dimension(p.Binders[len(env)+n]))
			images[n] = dims[n]
		}
		for _, wall := range con.Boundary {
			face := wall.Cube.Subst(dimensionSubst(images))
			c.Under(face, nil, func(cube interval.Cube) {
				cut := cube.Restriction()
				under := make([]interval.Dim, len(dims))
				for n := range dims {
					under[n] = dims[n].Subst(cut)
				}
				all := run.SubstituteAll(environment(nil, env, dims), cut)
				element := wall.Element.OpenAll(run, environment(run.SubstituteAll(params, cut), run.SubstituteAll(args, cut), under))
				here := e
				if cut != nil {
					here = e.substitute(run, cut)
				}
				c.Same(here.family.Open(run, element), here.Eliminate(run, element), restrictCase(run, body, cut).ApplyAll(run, all),
					&term.Error{Kind: term.Disagreement, Place: p.Body.Place, Message: "the case of " + con.Name + " disagrees with the elimination of its boundary"})
			})
		}
		return nil
	})
}

func restrictCase(run *value.Run, c value.Case, cut *value.Subst) value.Case {
	if cut == nil {
		return c
	}
	return c.SubstituteCase(run, cut)
}
