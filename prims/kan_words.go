package prims

import (
	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// The operations and their derived forms as words: hcomp and transp are
// operators; comp and the fillers are unfolded here, by their definitions.

type hcompOp struct{}

func (hcompOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return Hcomp(run, args[0].Delay(run, f), args[1].Delay(run, f), args[2].Walls(run, f))
}

type transpOp struct{}

func (transpOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	phi, v := args[1].Face(f), args[2].Delay(run, f)
	if phi.IsTop() {
		return v
	}
	i, a := args[0].Line(run, f, phi.Support()|v.Support())
	return Transp(run, i, a, phi, v)
}

func kanFormer() Former {
	return Former{
		Name: "composition and transport", Version: 1,
		Words: []Word{
			word("hcomp", inferHcomp, nil),
			word("comp", inferComp, nil),
			word("hfill", inferHfill, nil),
			word("fill", inferFill, nil),
			word("transp", inferTransp, nil),
			word("tfill", inferTfill, nil),
		},
		Operators: []Operator{{hcompSig, hcompOp{}}, {transpSig, transpOp{}}},
	}
}

// coreWall is an elaborated wall: on cube, the line under one dimension.
type coreWall struct {
	cube interval.Cube
	body *term.Bound
}

// elaborateWalls checks walls over base: each at the type on its own face,
// standing on the base, and agreeing with the others wherever their faces meet.
// typeAt is the type at a dimension, on whatever face it is called; it speaks
// of core terms of the present levels and is not called under more binders.
func elaborateWalls(c value.Checker, rows [][]term.Part, base value.Core, typeAt func(*value.Dimension) value.Value) []coreWall {
	run := c.Run()
	var walls []coreWall
	for _, row := range rows {
		at := row[1].Body
		c.Under(c.Face(row[0].Body), row[1:], func(cube interval.Cube) {
			here := typeAt(next(c))
			body := c.Dimensioned(row[1].Binders[0], func(value.Name) value.Core {
				return c.Check(at, here)
			})
			u := c.Case(body, dimensions)
			c.Same(typeAt(value.Zero()), c.Value(base), u.OpenAll(run, []value.Value{value.Zero()}),
				&term.Error{Kind: term.Disagreement, Place: at.Place, Message: "the wall does not stand on the base"})
			for _, other := range walls {
				run.Take(value.StepDimensional) // many walls make many pairs
				c.Under(other.cube.Face(), nil, func(interval.Cube) {
					d := next(c)
					t, a, b := typeAt(d), c.Case(other.body, dimensions).OpenAll(run, []value.Value{d}), c.Case(body, dimensions).OpenAll(run, []value.Value{d})
					c.Dimensioned(row[1].Binders[0], func(value.Name) value.Core {
						c.Same(t, a, b,
							&term.Error{Kind: term.Disagreement, Place: at.Place, Message: "two walls disagree where their faces meet"})
						return nil
					})
				})
			}
			walls = append(walls, coreWall{cube, body})
		})
	}
	return walls
}

// wallRows is walls as an argument: irredundant and in order.
func wallRows(walls []coreWall) term.Rows {
	cubes := make([]interval.Cube, len(walls))
	for k, w := range walls {
		cubes[k] = w.cube
	}
	rows := term.Rows{}
	for _, k := range irredundant(cubes) {
		rows = append(rows, []term.Arg{&term.Face{Face: walls[k].cube.Face()}, walls[k].body})
	}
	return rows
}

// irredundant are the indices of the cubes that imply no other, in canonical order.
func irredundant(cubes []interval.Cube) []int {
	var out []int
next:
	for i, a := range cubes {
		for j, b := range cubes {
			if i != j && a.Implies(b) && (j < i || !b.Implies(a)) {
				continue next
			}
		}
		at := len(out)
		for at > 0 && a.Compare(cubes[out[at-1]]) < 0 {
			at--
		}
		out = append(out, 0)
		copy(out[at+1:], out[at:])
		out[at] = i
	}
	return out
}

// next is the dimension that the next binder will bind, for values that are
// made outside it: a core term with binders has the levels of the scope it was
// elaborated in, and is not evaluated under more.
func next(c value.Checker) *value.Dimension {
	_, d := c.Scope()
	return value.DimensionName(value.Name(d))
}

func inferHcomp(c value.Checker, w *term.Written) (value.Core, value.Value) {
	a, base, walls := elaborateBox(c, part(w, 0), part(w, 1), w.Parts[2].Rows)
	return op(hcompSig, a, base, wallRows(walls)), c.Value(a)
}

func elaborateBox(c value.Checker, a, base *term.Written, rows [][]term.Part) (value.Core, value.Core, []coreWall) {
	ac, _ := c.Type(a)
	u0 := c.Check(base, c.Value(ac))
	return ac, u0, elaborateWalls(c, rows, u0, func(*value.Dimension) value.Value { return c.Value(ac) })
}

func inferHfill(c value.Checker, w *term.Written) (value.Core, value.Value) {
	a, base, walls := elaborateBox(c, part(w, 0), part(w, 1), w.Parts[3].Rows)
	r := c.Dimension(part(w, 2))
	return op(hcompSig, a, base, wallRows(fillCore(c, r, base, walls))), c.Value(a)
}

// elaborateLine elaborates a line of types under its dimension.
func elaborateLine(c value.Checker, p term.Part) (*term.Bound, func(*value.Dimension) value.Value) {
	line := c.Dimensioned(p.Binders[0], func(value.Name) value.Core {
		a, _ := c.Type(p.Body)
		return a
	})
	return line, func(d *value.Dimension) value.Value {
		return c.Case(line, dimensions).OpenAll(c.Run(), []value.Value{d})
	}
}

func elaborateOpenBox(c value.Checker, line term.Part, base *term.Written, rows [][]term.Part) (*term.Bound, func(*value.Dimension) value.Value, value.Core, []coreWall) {
	l, typeAt := elaborateLine(c, line)
	u0 := c.Check(base, typeAt(value.Zero()))
	return l, typeAt, u0, elaborateWalls(c, rows, u0, typeAt)
}

func inferComp(c value.Checker, w *term.Written) (value.Core, value.Value) {
	line, typeAt, base, walls := elaborateOpenBox(c, w.Parts[0], part(w, 1), w.Parts[2].Rows)
	return compCore(c, line, base, walls), typeAt(value.One())
}

func inferFill(c value.Checker, w *term.Written) (value.Core, value.Value) {
	line, typeAt, base, walls := elaborateOpenBox(c, w.Parts[0], part(w, 1), w.Parts[3].Rows)
	r := c.Dimension(part(w, 2))
	return compCore(c, boundedLine(c, line, r), base, fillCore(c, r, base, walls)), typeAt(value.DimensionOf(r))
}

func inferTransp(c value.Checker, w *term.Written) (value.Core, value.Value) {
	line, typeAt, phi, v := elaborateTransp(c, w)
	return op(transpSig, line, &term.Face{Face: phi}, v), typeAt(value.One())
}

func inferTfill(c value.Checker, w *term.Written) (value.Core, value.Value) {
	line, typeAt, phi, v := elaborateTransp(c, w)
	r := c.Dimension(part(w, 3))
	return op(transpSig, boundedLine(c, line, r), &term.Face{Face: phi.Or(r.Is0())}, v), typeAt(value.DimensionOf(r))
}

func elaborateTransp(c value.Checker, w *term.Written) (*term.Bound, func(*value.Dimension) value.Value, interval.Face, value.Core) {
	line, typeAt := elaborateLine(c, w.Parts[0])
	phi := c.Face(part(w, 1))
	c.Under(phi, nil, func(interval.Cube) {
		a0, a := typeAt(value.Zero()), typeAt(next(c))
		c.Dimensioned(w.Parts[0].Binders[0], func(value.Name) value.Core {
			c.SameType(a0, a,
				&term.Error{Kind: term.Disagreement, Place: part(w, 0).Place, Message: "the line of types is not constant where the transport is the identity"})
			return nil
		})
	})
	return line, typeAt, phi, c.Check(part(w, 2), typeAt(value.Zero()))
}

// boundedLine is j.A(r∧j) for the line i.A.
func boundedLine(c value.Checker, line *term.Bound, r interval.Dim) *term.Bound {
	v, d := c.Scope()
	j := interval.Name(d)
	m := term.Move{Variables: v, Dimensions: d + 1, Subst: interval.Assign(j, r.Min(interval.Var(j)))}
	return &term.Bound{Hints: line.Hints, Body: moved(c, m, line.Body)}
}

// moved is x moved by m, charged by the node.
func moved(c value.Checker, m term.Move, x value.Core) value.Core {
	run := c.Run()
	m.Each = func() { run.Charge(3 * value.PriceNode) } // with its arguments and a body
	return m.Apply(x)
}

// compCore is comp (i.A) u0 [φ ↦ i.u] unfolded:
// hcomp A(1) (transp (i.A) bot u0) [φ ↦ k. transp (j.A(k∨j)) (k=1) u].
func compCore(c value.Checker, line *term.Bound, base value.Core, walls []coreWall) value.Core {
	v, d := c.Scope()
	k, j := interval.Name(d), interval.Name(d+1)
	a1 := moved(c, term.Move{Variables: v, Dimensions: d + 1, MoreDimensions: -1, Subst: interval.Assign(k, interval.One())}, line.Body)
	u0 := op(transpSig, line, &term.Face{Face: interval.Bot()}, base)
	us := make([]coreWall, len(walls))
	for n, w := range walls {
		m := term.Move{Variables: v, Dimensions: d + 1, MoreDimensions: 1, Subst: w.cube.Restriction().Extend(k, interval.Var(k).Max(interval.Var(j)))}
		body := op(transpSig, &term.Bound{Hints: line.Hints, Body: moved(c, m, line.Body)}, &term.Face{Face: interval.Eq1(k)}, w.body.Body)
		us[n] = coreWall{w.cube, &term.Bound{Hints: w.body.Hints, Body: body}}
	}
	return op(hcompSig, a1, u0, wallRows(us))
}

// fillCore is the walls [φ ↦ j. u(r∧j)] [(r=0) ↦ _. u0].
func fillCore(c value.Checker, r interval.Dim, base value.Core, walls []coreWall) []coreWall {
	v, d := c.Scope()
	j := interval.Name(d)
	out := make([]coreWall, 0, len(walls)+1)
	for _, w := range walls {
		at := r.Subst(w.cube.Restriction()).Min(interval.Var(j))
		m := term.Move{Variables: v, Dimensions: d + 1, Subst: interval.Assign(j, at)}
		out = append(out, coreWall{w.cube, &term.Bound{Hints: w.body.Hints, Body: moved(c, m, w.body.Body)}})
	}
	face := r.Is0()
	for k := range face.Len() {
		cube := face.Cube(k)
		m := term.Move{Variables: v, Dimensions: d, MoreDimensions: 1, Subst: cube.Restriction()}
		out = append(out, coreWall{cube, &term.Bound{Hints: []string{"_"}, Body: moved(c, m, base)}})
	}
	return out
}
