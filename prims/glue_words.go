package prims

import (
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Glue, glue, unglue and Equiv as written terms.

func glueFormer() Former {
	return Former{
		Name: "gluing", Version: 1,
		Words: []Word{
			word("Glue", inferGlue, nil),
			word("glue", nil, checkGlue),
			word("unglue", inferUnglue, nil),
			word("Equiv", inferEquiv, nil),
		},
		Operators: []Operator{{glueTypeSig, glueTypeOp{}}, {glueSig, glueOp{}}, {unglueSig, unglueOp{}}},
	}
}

// coreRows puts rows, each on its cube, into canonical order.
func coreRows(cubes []interval.Cube, rows [][]term.Arg) term.Rows {
	out := term.Rows{}
	for _, k := range irredundant(cubes) {
		out = append(out, append([]term.Arg{&term.Face{Face: cubes[k].Face()}}, rows[k]...))
	}
	return out
}

func inferGlue(c value.Checker, w *term.Written) (value.Core, value.Value) {
	run := c.Run()
	a, level := c.Type(part(w, 0))
	var cubes []interval.Cube
	var rows [][]term.Arg
	for _, row := range w.Parts[1].Rows {
		tw, ew := row[1].Body, row[2].Body
		c.Under(c.Face(row[0].Body), row[1:], func(cube interval.Cube) {
			t, n := c.Type(tw)
			level = max(level, n)
			e := c.Check(ew, EquivType(run, c.Value(t), c.Value(a)))
			for k, other := range cubes {
				c.Under(other.Face(), nil, func(interval.Cube) {
					c.SameType(c.Value(rows[k][0].(term.Core)), c.Value(t),
						&term.Error{Kind: term.Disagreement, Place: tw.Place, Message: "two types glued on disagree where their faces meet"})
					c.Same(EquivType(run, c.Value(t), c.Value(a)), c.Value(rows[k][1].(term.Core)), c.Value(e),
						&term.Error{Kind: term.Disagreement, Place: ew.Place, Message: "two equivalences glued along disagree where their faces meet"})
				})
			}
			cubes, rows = append(cubes, cube), append(rows, []term.Arg{t, e})
		})
	}
	return op(glueTypeSig, a, coreRows(cubes, rows)), NewUniverse(level)
}

func checkGlue(c value.Checker, w *term.Written, want value.Value) value.Core {
	run := c.Run()
	g, ok := run.Force(want).(*GlueType)
	if !ok {
		c.Fail(w, term.IllTyped, "glue makes elements of Glue types none of whose faces is top", c.ShowType(want), "glue")
	}
	base := c.Check(part(w, 0), g.A)
	var cubes []interval.Cube
	var rows [][]term.Arg
	face := interval.Bot()
	for _, row := range w.Parts[1].Rows {
		at := row[1].Body
		c.Under(c.Face(row[0].Body), row[1:], func(cube interval.Cube) {
			face = face.Or(cube.Face())
			cut := cube.Restriction()
			parts := glueParts(g.Parts).substitute(run, cut)
			if !glueFace(parts).IsTop() {
				c.Fail(at, term.Disagreement, "nothing is glued on here", "a face of "+glueFace(g.Parts).String(), cube.String())
			}
			t := c.Check(at, run.Substitute(g, cut))
			tv := c.Value(t)
			c.Same(run.Substitute(g.A, cut), run.Later(parts.support()|tv.Support(), func(run *value.Run) value.Value { return Unglue(run, parts, tv) }), c.Value(base),
				&term.Error{Kind: term.Disagreement, Place: at.Place, Message: "the base is not the image of what is glued on"})
			for k, other := range cubes {
				c.Under(other.Face(), nil, func(sub interval.Cube) {
					c.Same(run.Restrict(run.Substitute(g, cut), sub), c.Value(rows[k][0].(term.Core)), c.Value(t),
						&term.Error{Kind: term.Disagreement, Place: at.Place, Message: "two elements glued on disagree where their faces meet"})
				})
			}
			cubes, rows = append(cubes, cube), append(rows, []term.Arg{t})
		})
	}
	if whole := glueFace(g.Parts); !face.Equal(whole) {
		c.Fail(w, term.Disagreement, "the faces of glue are not those of its type", whole.String(), face.String())
	}
	return op(glueSig, base, coreRows(cubes, rows))
}

func inferUnglue(c value.Checker, w *term.Written) (value.Core, value.Value) {
	run := c.Run()
	b, t := c.Infer(part(w, 0))
	g, ok := run.Force(t).(*GlueType)
	if !ok {
		c.Fail(part(w, 0), term.IllTyped, "unglue takes an element of a Glue type none of whose faces is top", "an element of a Glue type", c.ShowType(t))
	}
	var cubes []interval.Cube
	var rows [][]term.Arg
	for _, p := range glueParts(g.Parts).irredundant() {
		c.Under(p.Cube.Face(), nil, func(cube interval.Cube) {
			e := c.ReadBack(EquivType(run, p.T, run.Restrict(g.A, p.Cube)), p.E)
			cubes, rows = append(cubes, cube), append(rows, []term.Arg{e})
		})
	}
	return op(unglueSig, b, coreRows(cubes, rows)), g.A
}

// inferEquiv unfolds Equiv T A.
func inferEquiv(c value.Checker, w *term.Written) (value.Core, value.Value) {
	t, m := c.Type(part(w, 0))
	a, n := c.Type(part(w, 1))
	v, d := c.Scope()
	up := func(x term.Core, by int) term.Core {
		return moved(c, term.Move{Variables: v, Dimensions: d, MoreVariables: by}, x)
	}
	upDimension := func(x term.Core, by int) term.Core {
		return moved(c, term.Move{Variables: v, Dimensions: d, MoreVariables: by, MoreDimensions: 1}, x)
	}
	variable := func(k int) term.Core { return &term.Variable{Level: v + k} }
	bound := func(name string, body term.Core) *term.Bound {
		return &term.Bound{Hints: []string{name}, Body: body}
	}
	// f is variable 0, y is 1; a fiber stands under by variables
	fiber := func(by int) term.Core {
		return op(sigmaSig, up(t, by), bound("x", op(pathSig, bound("_", upDimension(a, by+1)), variable(1), op(applySig, variable(0), variable(by)))))
	}
	fiberOver := func(by int) term.Core { // the same under one more dimension
		x := fiber(by)
		return moved(c, term.Move{Variables: v + by, Dimensions: d, MoreDimensions: 1}, x)
	}
	contr := op(sigmaSig, fiber(2), bound("x", op(piSig, fiber(3), bound("y", op(pathSig, bound("_", fiberOver(4)), variable(2), variable(3))))))
	return op(sigmaSig, op(piSig, t, bound("_", up(a, 1))), bound("f", op(piSig, up(a, 1), bound("y", contr)))), NewUniverse(max(m, n))
}
