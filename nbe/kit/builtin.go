package kit

import (
	"example.com/boxwright/nbe/term"
)

// The built-in formers as the suite sees them: how to draw their types, their
// elements and their eliminations, and what the theory claims of these. An
// author of a former finds the shape of her own generator here.

// Builtin returns the built-in formers.
func Builtin() []Former {
	return []Former{
		{Name: "functions", Types: functions},
		{Name: "functions over the interval", Types: dimensionFunctions},
		{Name: "pairs", Types: pairs},
		{Name: "paths", Types: paths},
		{Name: "the unit type", Types: func(*Gen) Sample { return unit() }},
		{Name: "universes", Types: func(*Gen) Sample { return types() }},
		{Name: "numbers", Types: func(g *Gen) Sample { return numbersWithElim() }},
		{Name: "sums", Types: sums},
		{Name: "the circle", Types: func(g *Gen) Sample { return turnsWithElim() }},
		{Name: "lists, formal", Script: formalLists, Types: lists},
		{Name: "suspensions", Script: suspension, Types: suspensions},
		{Name: "data whose transport is corrected", Script: winches, Types: winch},
		{Name: "gluing", Script: glued, Types: gluing},
		{Name: "neutral types", Types: func(g *Gen) Sample { return Base(g) }},
	}
}

// Everything is all built-in formers as one, for generators that are to draw
// from all of them.
func Everything() Former {
	all := Builtin()
	out := Former{Name: "all built-in formers", Types: func(g *Gen) Sample { return all[g.Choose(len(all))].Types(g) }}
	for _, f := range all {
		out.Script += f.Script
	}
	return out
}

func functions(g *Gen) Sample {
	a := Base(g)
	b := Family(g, "B", a.Type)
	s := Sample{Type: fill("(Pi ((y A)) B)", "A", a.Type, "B", b(term.Name("y")))}
	s.Element = func(g *Gen) *term.Written { return g.Variable("f", s.Type, nil) }
	s.Eliminations = func(g *Gen) []Elimination {
		x, ok := Constant(g, a.Type)
		if !ok {
			return nil
		}
		return []Elimination{{
			Name: "application",
			Of:   func(f *term.Written) *term.Written { return term.Apply(f, x) },
			Composite: func(box Box, of func(x, at *term.Written) *term.Written) *term.Written {
				return box.Map(b(x), func(u *term.Written) *term.Written { return term.Apply(u, x) }).Hcomp()
			},
			Transport: func(t Transport, of func(x, at *term.Written) *term.Written) *term.Written {
				back := func(r *term.Written) *term.Written { return t.Back(a.Type, x, r) }
				return t.With(b(back(Along())), term.Apply(t.Base, back(zero))).Transp()
			},
		}}
	}
	s.Expand = func(f *term.Written) *term.Written { return fill("(lam (y) (F y))", "F", f) }
	return s
}

// Constant is a new variable of the type a for an elimination to be given,
// where a does not vary along the line: one argument then serves base, walls
// and lid alike.
func Constant(g *Gen, a *term.Written) (x *term.Written, ok bool) {
	if namesIn(a)[height] {
		return nil, false
	}
	return g.Over(without(g.dims, height)...).Variable("x", a, nil), true
}

func without(names []string, name string) []string {
	var out []string
	for _, n := range names {
		if n != name {
			out = append(out, n)
		}
	}
	return out
}

func dimensionFunctions(g *Gen) Sample {
	b := Base(g.With("z"))
	s := Sample{Type: term.Pi("z", term.Interval(), b.Type)}
	s.Element = func(g *Gen) *term.Written {
		if g.Choose(2) == 1 {
			return term.Ann(term.Lam(b.Any(g.With("z")), "z"), s.Type)
		}
		return g.Variable("f", s.Type, nil)
	}
	s.Expand = func(f *term.Written) *term.Written { return fill("(lam (y) (F y))", "F", f) }
	s.Eliminations = func(g *Gen) []Elimination {
		r := term.Name(g.dims[0])
		at := Replace(b.Type, map[string]*term.Written{"z": r})
		return []Elimination{{
			Name: "application",
			Of:   func(f *term.Written) *term.Written { return term.Apply(f, r) },
			Composite: func(box Box, of func(x, at *term.Written) *term.Written) *term.Written {
				return box.Map(at, func(u *term.Written) *term.Written { return term.Apply(u, r) }).Hcomp()
			},
			Transport: func(t Transport, of func(x, at *term.Written) *term.Written) *term.Written {
				return t.With(at, term.Apply(t.Base, r)).Transp()
			},
		}}
	}
	return s
}

func pairs(g *Gen) Sample {
	a := Base(g)
	b := Family(g, "B", a.Type)
	s := Sample{Type: fill("(Sigma ((y A)) B)", "A", a.Type, "B", b(term.Name("y")))}
	s.Element = func(g *Gen) *term.Written {
		if g.Choose(2) == 1 {
			x := a.Any(g)
			return term.Ann(term.Pair(x, g.Variable("y", b(x), nil)), s.Type)
		}
		return g.Variable("p", s.Type, nil)
	}
	first := func(p *term.Written) *term.Written { return term.Fst(p) }
	second := func(p *term.Written) *term.Written { return term.Snd(p) }
	s.Expand = func(p *term.Written) *term.Written { return fill("(pair (fst P) (snd P))", "P", p) }
	s.Eliminations = func(*Gen) []Elimination {
		return []Elimination{
			{
				Name: "the first part", Of: first,
				Composite: func(box Box, of func(x, at *term.Written) *term.Written) *term.Written {
					return box.Map(a.Type, first).Hcomp()
				},
				Transport: func(t Transport, of func(x, at *term.Written) *term.Written) *term.Written {
					return t.With(a.Type, first(t.Base)).Transp()
				},
			},
			{
				Name: "the second part", Of: second,
				Composite: func(box Box, of func(x, at *term.Written) *term.Written) *term.Written {
					return box.Map(a.Type, second).Over(b(box.Map(a.Type, first).Hfill(Along())))
				},
				Transport: func(t Transport, of func(x, at *term.Written) *term.Written) *term.Written {
					return t.With(b(t.With(a.Type, first(t.Base)).Tfill(Along())), second(t.Base)).Transp()
				},
			},
		}
	}
	return s
}

func paths(g *Gen) Sample {
	a := Base(g)
	x, y := a.Any(g), a.Any(g)
	s := Sample{Type: fill("(Path A X Y)", "A", a.Type, "X", x, "Y", y)}
	s.Element = func(g *Gen) *term.Written { return g.Variable("p", s.Type, nil) }
	s.Expand = func(p *term.Written) *term.Written { return fill("(line (z) (at P z))", "P", p) }
	s.Eliminations = func(g *Gen) []Elimination {
		d := g.dims[0]
		return []Elimination{{
			Name: "the point at " + d,
			Of:   func(p *term.Written) *term.Written { return term.At(p, term.Name(d)) },
			Composite: func(box Box, of func(x, at *term.Written) *term.Written) *term.Written {
				b := box.Map(a.Type, func(u *term.Written) *term.Written { return term.At(u, term.Name(d)) })
				for one, end := range []*term.Written{x, y} {
					at := []End{{d, one == 1}}
					b.Walls = append(b.Walls, Wall{Face: term.Eq(term.Name(d), uint64(one)), Ends: at, Body: Replace(end, cut(at))})
				}
				return b.Hcomp()
			},
		}}
	}
	return s
}

func unit() Sample {
	s := Sample{Type: term.Form("Unit")}
	s.Element = func(g *Gen) *term.Written {
		if g.Choose(2) == 1 {
			return g.Variable("u", s.Type, func(*Gen) *term.Written { return term.Form("unit") })
		}
		return term.Form("unit")
	}
	s.Expand = func(*term.Written) *term.Written { return term.Form("unit") }
	return s
}

func types() Sample {
	s := Sample{Type: universe, Shallow: true}
	s.Element = func(g *Gen) *term.Written { return Base(g).Type }
	return s
}

// eliminate is the elimination of a data type into a family of types over it,
// with the cases given as text over the family's type C and the cases' names.
func eliminate(g *Gen, ty *term.Written, commutes bool, text string, pairs ...any) Elimination {
	e := Elimination{Name: "elim", Of: func(x *term.Written) *term.Written {
		return fill(text, append([]any{"SCRUTINEE", x}, pairs...)...)
	}}
	if commutes {
		family := pairs[1].(*term.Written)
		e.Composite = func(box Box, of func(x, at *term.Written) *term.Written) *term.Written {
			return box.Map(family, func(u *term.Written) *term.Written { return of(u, oneEnd) }).Over(family)
		}
	}
	return e
}

func numbersWithElim() Sample {
	s := Numbers()
	s.Eliminations = func(g *Gen) []Elimination {
		out := []Elimination{eliminate(g, s.Type, false, "(elim (y Nat) SCRUTINEE (zero 1) ((suc n hyp) (suc (suc hyp))))")}
		c := Family(g, "C", s.Type)
		z := g.Variable("z", c(term.Numeral(0)), nil)
		step := g.Variable("s", term.Pi("n", s.Type, term.Arrow(c(term.Name("n")), c(fill("(suc n)")))), nil)
		return append(out, eliminate(g, s.Type, false, "(elim (y C) SCRUTINEE (zero Z) ((suc n hyp) (S n hyp)))",
			"C", c(term.Name("y")), "Z", z, "S", step))
	}
	return s
}

func turnsWithElim() Sample {
	s := Turns()
	s.Eliminations = func(g *Gen) []Elimination {
		var out []Elimination
		c := Abstract(g).Type
		b := g.Over().Variable("b", c, nil)
		p := g.Over().Variable("p", term.Path(c, b, b), nil)
		out = append(out, eliminate(g, s.Type, true, "(elim (y C) SCRUTINEE (base B) ((loop j) (at P j)))", "C", c, "B", b, "P", p))
		// into a family, over the filler
		over := Family(g.Over(), "D", s.Type)
		d := g.Over().Variable("d", over(term.Name("base")), nil)
		q := g.Over().Variable("q", term.PathOver("j", over(fill("(loop j)")), d, d), nil)
		e := eliminate(g, s.Type, false, "(elim (y D) SCRUTINEE (base B) ((loop j) (at P j)))", "D", over(term.Name("y")), "B", d, "P", q)
		e.Composite = func(box Box, of func(x, at *term.Written) *term.Written) *term.Written {
			return box.Map(nil, func(u *term.Written) *term.Written { return of(u, oneEnd) }).Over(over(box.Hfill(Along())))
		}
		return append(out, e)
	}
	return s
}

func sums(g *Gen) Sample {
	a, b := Base(g), Base(g)
	s := Sample{Type: fill("(Sum A B)", "A", a.Type, "B", b.Type)}
	s.Element = func(g *Gen) *term.Written {
		switch g.Choose(3) {
		case 1:
			return term.Ann(fill("(inl X)", "X", a.Any(g)), s.Type)
		case 2:
			return term.Ann(fill("(inr X)", "X", b.Any(g)), s.Type)
		}
		return g.Variable("s", s.Type, s.Element)
	}
	s.Eliminations = func(g *Gen) []Elimination {
		return []Elimination{eliminate(g, s.Type, false, "(elim (y Nat) SCRUTINEE ((inl a) 0) ((inr b) 1))")}
	}
	return s
}

const formalLists = `(data Manifest ((A (U 0))) (composition formal) (point end ()) (point entry ((a A) (rest (Manifest A)))))`

func lists(g *Gen) Sample {
	a := Base(g)
	s := Sample{Type: fill("(Manifest A)", "A", a.Type)}
	s.Element = func(g *Gen) *term.Written {
		switch g.Choose(3) {
		case 1:
			return term.Ann(fill("(entry X R)", "X", a.Any(g), "R", g.Variable("r", s.Type, nil)), s.Type)
		case 2:
			return g.Variable("m", s.Type, s.Element)
		}
		return term.Ann(term.Name("end"), s.Type)
	}
	s.Eliminations = func(g *Gen) []Elimination {
		return []Elimination{eliminate(g, s.Type, true, "(elim (y C) SCRUTINEE (end 0) ((entry a r hyp) (suc hyp)))", "C", term.Name("Nat"))}
	}
	return s
}

const suspension = `(data Quay ((A (U 0))) (point left ()) (point right ()) (path gangway ((a A)) (i) ((= i 0) left) ((= i 1) right)))`

func suspensions(g *Gen) Sample {
	a := Base(g)
	s := Sample{Type: fill("(Quay A)", "A", a.Type)}
	s.Element = func(g *Gen) *term.Written {
		switch g.Choose(4) {
		case 1:
			return term.Ann(fill("(gangway X R)", "X", a.Any(g), "R", g.Dimension()), s.Type)
		case 2:
			return g.Variable("s", s.Type, s.Element)
		case 3:
			return term.Ann(term.Name("right"), s.Type)
		}
		return term.Ann(term.Name("left"), s.Type)
	}
	s.Eliminations = func(g *Gen) []Elimination {
		base := term.Name("Circle")
		return []Elimination{eliminate(g, s.Type, true, "(elim (y C) SCRUTINEE (left base) (right base) ((gangway a j) (loop j)))", "C", base)}
	}
	return s
}

// The boundary of a path constructor that applies a function of the parameters:
// transport does not commute with it as it stands.
const winches = `(data Winch ((A (U 0)) (B (U 0)) (f (-> A B))) (point hook ((b B))) (path pull ((a A)) (i) ((= i 0) (hook (f a)))))`

func winch(g *Gen) Sample {
	a, b := Base(g), Base(g)
	f := g.Variable("f", fill("(-> A B)", "A", a.Type, "B", b.Type), nil)
	s := Sample{Type: fill("(Winch A B F)", "A", a.Type, "B", b.Type, "F", f)}
	s.Element = func(g *Gen) *term.Written {
		switch g.Choose(3) {
		case 1:
			return term.Ann(fill("(pull X R)", "X", a.Any(g), "R", g.Dimension()), s.Type)
		case 2:
			return g.Variable("w", s.Type, s.Element)
		}
		return term.Ann(fill("(hook X)", "X", b.Any(g)), s.Type)
	}
	s.Eliminations = func(g *Gen) []Elimination {
		return []Elimination{eliminate(g, s.Type, true, "(elim (y C) SCRUTINEE ((hook b) base) ((pull a j) base))", "C", term.Name("Circle"))}
	}
	return s
}

// Where its face is top, glue is not written; as functions of the dimension of
// the face they can stand anywhere.
const glued = `
	(def hoist (Pi ((A (U 0)) (T (U 0)) (e (Equiv T A)) (i I) (x T)) (Glue A ((= i 0) T e)))
	  (lam (A T e i x) (glue ((fst e) x) ((= i 0) x))))
	(def lower (Pi ((A (U 0)) (T (U 0)) (e (Equiv T A)) (i I)) (-> (Glue A ((= i 0) T e)) A))
	  (lam (A T e i b) (unglue b)))
`

func gluing(g *Gen) Sample {
	a := Abstract(g).Type
	if g.Choose(2) == 1 {
		l := g.Declare("L", term.Arrow(term.Interval(), universe), func(g *Gen) *term.Written { return term.Lam(Concrete(g), "_") })
		a = term.Apply(l, term.Name(g.dims[len(g.dims)-1]))
	}
	t := Base(g).Type
	e := g.Variable("e", fill("(Equiv T A)", "T", t, "A", a), nil)
	r := g.Dimension()
	s := Sample{Type: term.Glue(a, term.GlueType(term.Eq(r, 0), t, e)), Shallow: true}
	if r.Kind == term.NameKind && r.Word != height && !Mentions(t, height) {
		s.Still = []*term.Written{term.Eq(r, 0)} // there it is T, whatever A and e are
	}
	s.Element = func(g *Gen) *term.Written {
		if g.Choose(2) == 1 {
			return fill("(hoist A T E R X)", "A", a, "T", t, "E", e, "R", r, "X", g.Variable("t", t, nil))
		}
		return g.Variable("b", s.Type, nil)
	}
	s.Eliminations = func(g *Gen) []Elimination {
		lower := func(b *term.Written) *term.Written {
			return fill("(lower A T E R B)", "A", a, "T", t, "E", e, "R", r, "B", b)
		}
		out := Elimination{Name: "unglue", Of: lower}
		if r.Kind == term.NameKind {
			// hcomp A (unglue u0) [ψ ↦ i. unglue u] [φ ↦ i. e.1 t(i)], t the filler in T
			out.Composite = func(box Box, of func(x, at *term.Written) *term.Written) *term.Written {
				on := []End{{r.Word, false}}
				under := Box{Type: Replace(t, cut(on)), Base: Replace(box.Base, cut(on))}
				for _, w := range box.Walls {
					face := Replace(w.Face, cut(on))
					under.Walls = append(under.Walls, Wall{Face: face, Ends: w.Ends, Body: Replace(w.Body, cut(on))})
				}
				b := box.Map(a, lower)
				b.Walls = append(b.Walls, Wall{Face: term.Eq(r, 0), Ends: on, Body: term.Apply(term.Fst(Replace(e, cut(on))), under.Hfill(Along()))})
				return b.Hcomp()
			}
		}
		return []Elimination{out}
	}
	return s
}
