package generate

import (
	"fmt"

	"example.com/boxwright/nbe/term"
)

// Source is where choices come from: Intn returns a number from 0 to n-1.
type Source interface{ Intn(n int) int }

// Variable of the scope.
type variable struct {
	name string
	t    *Type
}

// Generator makes types and terms in a scope of dimensions and variables.
type Generator struct {
	Tally map[string]int // how often each form, and each operation at each kind of type, was made

	source    Source
	dims      []string
	variables []variable
	fuel      int
	next      int
}

// New is a generator in a scope of the given dimensions. fuel bounds how many
// terms that are not leaves it makes.
func New(source Source, dims []string, fuel int) *Generator {
	return &Generator{Tally: map[string]int{}, source: source, dims: dims, fuel: fuel}
}

// Refill gives the generator new fuel.
func (g *Generator) Refill(fuel int) { g.fuel = fuel }

// Push adds a variable of the scope.
func (g *Generator) Push(name string, t *Type) { g.variables = append(g.variables, variable{name, t}) }

func (g *Generator) count(what string) { g.Tally[what]++ }

func (g *Generator) pick(n int) int { return g.source.Intn(n) }

func (g *Generator) maybe(of int) bool { return g.pick(of) == 0 }

func (g *Generator) fresh(prefix string) string {
	g.next++
	return fmt.Sprintf("%s%d", prefix, g.next)
}

func one(name string, w *term.Written) map[string]*term.Written {
	return map[string]*term.Written{name: w}
}

// over runs f with one more dimension.
func (g *Generator) over(f func(i string)) {
	i := g.fresh("i")
	n := len(g.dims)
	g.dims = append(g.dims[:n:n], i)
	f(i)
	g.dims = g.dims[:n]
}

// under runs f with one more variable.
func (g *Generator) under(t *Type, f func(x string)) {
	x := g.fresh("x")
	n := len(g.variables)
	g.variables = append(g.variables[:n:n], variable{x, t})
	f(x)
	g.variables = g.variables[:n]
}

// Dimension is an interval expression.
func (g *Generator) Dimension() *term.Written {
	if len(g.dims) == 0 {
		return term.Numeral(uint64(g.pick(2)))
	}
	literal := func() *term.Written {
		d := term.Name(g.dims[g.pick(len(g.dims))])
		if g.maybe(3) {
			d = term.Name(g.dims[len(g.dims)-1]) // the innermost, which a composite is about
		}
		if g.maybe(3) {
			return term.Rev(d)
		}
		return d
	}
	switch g.pick(8) {
	case 0:
		return term.Min(literal(), literal())
	case 1:
		return term.Max(literal(), literal())
	case 2:
		return term.Max(term.Min(literal(), literal()), literal())
	case 3:
		return term.Numeral(uint64(g.pick(2)))
	}
	return literal()
}

// Type is a type; size bounds its depth.
func (g *Generator) Type(size int) *Type {
	var base = []Kind{Nat, Circle, Variable, Line, NatLine, Bool, Unit, Tally, Push}
	var more = []Kind{Glued, Pi, Sigma, Path, PiI, Family, OverNat, OverRing, Sum, List, Susp, Crate, Path, Sigma, Pi}
	if size <= 0 || g.maybe(4) {
		return g.Of(base[g.pick(len(base))], size)
	}
	return g.Of(more[g.pick(len(more))], size)
}

// Of is a type of the given kind.
func (g *Generator) Of(kind Kind, size int) *Type {
	t := &Type{Kind: kind}
	switch t.Kind {
	case Line, NatLine, Push:
		t.Args = []*term.Written{g.Dimension()}
	case Glued:
		face, _ := g.face()
		t.Args = []*term.Written{face}
	case Family:
		t.Args = []*term.Written{g.Term(&Type{Kind: Variable}, size-1)}
	case OverNat:
		t.Args = []*term.Written{g.Term(&Type{Kind: Nat}, size-1)}
	case OverRing:
		t.Args = []*term.Written{g.Term(&Type{Kind: Circle}, size-1)}
	case Sum:
		t.A, t.B = g.Type(size-1), g.Type(size-1)
	case List, Susp:
		t.A = g.Type(size - 1)
	case Pi, Sigma, Crate:
		t.A = g.Type(size - 1)
		g.under(t.A, func(x string) { t.Name, t.B = x, g.Type(size-1) })
	case PiI:
		g.over(func(i string) { t.Name, t.A = i, g.Type(size-1) })
	case Path:
		g.over(func(i string) {
			t.Name, t.A = i, g.Type(size-1)
			t.Args = []*term.Written{g.Term(t.A, size-1)}
		})
	}
	g.count("type " + string(t.Kind))
	return t
}

// Composite is a term of the type t whose outermost form is a Kan operation.
func (g *Generator) Composite(t *Type, size int) *term.Written {
	switch g.pick(3) {
	case 0:
		return g.hcomp(t, size)
	case 1:
		return g.transp(t, size)
	}
	return g.comp(t, size)
}

// Term is a term of the type t; size bounds its depth.
func (g *Generator) Term(t *Type, size int) *term.Written {
	if size <= 0 || g.fuel <= 0 {
		return g.leaf(t)
	}
	g.fuel--
	switch g.pick(16) {
	case 0, 1, 2, 3:
		return g.intro(t, size-1)
	case 4, 5, 6:
		return g.hcomp(t, size-1)
	case 7, 8:
		return g.transp(t, size-1)
	case 9, 10:
		return g.comp(t, size-1)
	case 11:
		return g.leaf(t)
	}
	return g.eliminate(t, size-1)
}

func ann(w *term.Written, t *Type) *term.Written { return term.Ann(w, t.Written()) }

// variable is a variable of the type t, if there is one.
func (g *Generator) variable(t *Type) *term.Written {
	text := t.String()
	var found []string
	for _, v := range g.variables {
		if v.t.Kind == t.Kind && v.t.String() == text {
			found = append(found, v.name)
		}
	}
	if len(found) == 0 {
		return nil
	}
	g.count("variable")
	return term.Name(found[g.pick(len(found))])
}

func (g *Generator) one(ws ...*term.Written) *term.Written { return ws[g.pick(len(ws))] }

func (g *Generator) leaf(t *Type) *term.Written {
	if w := g.variable(t); w != nil && !g.maybe(3) {
		return w
	}
	call := func(f string, args ...*term.Written) *term.Written { return term.Apply(term.Name(f), args...) }
	at := func(p string, rs ...*term.Written) *term.Written { return term.At(term.Name(p), rs...) }
	switch t.Kind {
	case Nat:
		return g.one(term.Numeral(uint64(g.pick(3))), term.Name("n0"), at("pN", g.Dimension()), at("zN", g.Dimension()), at("sN", g.Dimension(), g.Dimension()),
			at("rN", g.Dimension(), g.Dimension()), at("rN", g.Dimension(), g.Dimension()), call("suc", at("rN", g.Dimension(), g.Dimension())))
	case Bool:
		return g.one(term.Name("true"), term.Name("false"), term.Name("q0"))
	case Unit:
		return g.one(term.UnitElement(), term.Name("u0"))
	case Circle:
		return g.one(term.Name("base"), call("loop", g.Dimension()), at("pC", g.Dimension()), term.Name("c0"))
	case Tally:
		return g.one(term.Name("none"), at("pT", g.Dimension()), call("more", term.Name("t0")))
	case Variable:
		return g.one(term.Name("a0"), at("pA", g.Dimension()), at("sA", g.Dimension(), g.Dimension()))
	case Line:
		return call("la", t.Args[0])
	case NatLine:
		return call("xE", t.Args[0])
	case Family:
		return call("b", t.Args[0])
	case OverNat:
		return call("fN", t.Args[0])
	case OverRing:
		return g.overRing(t)
	case Glued:
		return g.glued(t, g.leaf(&Type{Kind: Variable}))
	}
	return g.intro(t, 0)
}

// glued brings an element of A into a composite of types that A is the base of.
func (g *Generator) glued(t *Type, a *term.Written) *term.Written {
	i, j := g.fresh("i"), g.fresh("i")
	return term.Transp(j, term.Hfill(term.Universe(0), term.Name("A"), term.Name(j), t.typeWall(i)), term.Bot(), a)
}

func (g *Generator) overRing(t *Type) *term.Written {
	x, i := g.fresh("x"), g.fresh("i")
	g.count("elim Circle, dependent")
	return term.Elim(x, term.Apply(term.Name("FC"), term.Name(x)), t.Args[0],
		term.Case("base", term.Name("cb")), term.Case("loop", term.At(term.Name("cl"), term.Name(i)), i))
}

// intro is a canonical term, where the type has one.
func (g *Generator) intro(t *Type, size int) (out *term.Written) {
	g.count("intro " + string(t.Kind))
	call := func(f string, args ...*term.Written) *term.Written { return term.Apply(term.Name(f), args...) }
	switch t.Kind {
	case Nat:
		return call("suc", g.Term(t, size))
	case Tally:
		return call("more", g.Term(t, size))
	case Circle:
		return call("loop", g.Dimension())
	case Sum:
		if g.maybe(2) {
			return call("inl", g.Term(t.A, size))
		}
		return call("inr", g.Term(t.B, size))
	case List:
		if size <= 0 {
			return term.Name("nil")
		}
		return call("cons", g.Term(t.A, size), g.Term(t, size-1))
	case Susp:
		return g.one(term.Name("north"), term.Name("south"), call("merid", g.Term(t.A, size), g.Dimension()))
	case Push:
		r := t.Args[0]
		point := call("la", r)
		if size > 0 {
			point = g.Term(&Type{Kind: Line, Args: []*term.Written{r}}, size)
		}
		return g.one(call("into", call("LF", r, point)), call("glued", point, g.Dimension()))
	case Crate, Sigma:
		a := g.Term(t.A, size)
		b := g.Term(t.B.With(one(t.Name, ann(a, t.A))), size)
		if t.Kind == Crate {
			return call("crate", a, b)
		}
		return term.Pair(a, b)
	case Pi:
		g.under(t.A, func(x string) { out = term.Lam(g.Term(t.B.With(one(t.Name, term.Name(x))), size), x) })
		return out
	case PiI:
		g.over(func(i string) { out = term.Lam(g.Term(t.A.With(one(t.Name, term.Name(i))), size), i) })
		return out
	case Path:
		i := g.fresh("i")
		return term.Line(Replace(t.Args[0], one(t.Name, term.Name(i))), i)
	case Variable:
		return term.At(term.Name("pA"), g.Dimension())
	case Glued:
		return g.glued(t, g.Term(&Type{Kind: Variable}, size))
	case Bool, Unit, Line, NatLine, Family, OverNat, OverRing:
		return g.leaf(t)
	}
	panic("no introduction of " + string(t.Kind))
}

// Face is a face of the dimensions in scope with a dimension that is 0 on it.
func (g *Generator) face() (face, zero *term.Written) {
	if len(g.dims) == 0 {
		return term.Bot(), term.Numeral(1)
	}
	literal := func() (face, zero *term.Written) {
		d := term.Name(g.dims[g.pick(len(g.dims))])
		if g.maybe(2) {
			return term.Eq(d, 0), d
		}
		return term.Eq(d, 1), term.Rev(d)
	}
	f, z := literal()
	switch g.pick(5) {
	case 0:
		f2, z2 := literal()
		return term.And(f, f2), term.Max(z, z2)
	case 1:
		f2, z2 := literal()
		return term.Or(f, f2), term.Min(z, z2)
	}
	return f, z
}

// walls are walls that are the line u over i, each written in its own way.
func (g *Generator) walls(i string, u *term.Written) []term.Row {
	var rows []term.Row
	for range g.pick(4) {
		face, zero := g.face()
		j := g.fresh("i")
		at := term.Name(j)
		switch g.pick(4) {
		case 0: // on the face it is the same
			at = term.Max(at, zero)
		case 1:
			at = term.Min(at, term.Rev(zero))
		}
		rows = append(rows, term.Wall(face, j, Replace(u, one(i, at))))
	}
	g.count(fmt.Sprintf("composite with %d walls", len(rows)))
	return rows
}

func (g *Generator) hcomp(t *Type, size int) (out *term.Written) {
	g.over(func(i string) {
		u := g.Term(t, size)
		base := Replace(u, one(i, term.Numeral(0)))
		outer := g.dims
		g.dims = g.dims[:len(g.dims)-1]
		rows := g.walls(i, u)
		if g.maybe(4) {
			g.count("hfill " + string(t.Kind))
			out = term.Hfill(t.Written(), base, g.Dimension(), rows...)
		} else {
			g.count("hcomp " + string(t.Kind))
			out = term.Hcomp(t.Written(), base, rows...)
		}
		g.dims = outer
	})
	return out
}

// held reports whether t mentions a variable whose type mentions d: putting
// something else for d in t would leave the variable's type behind.
func (g *Generator) held(t *Type, d string) bool {
	for _, v := range g.variables {
		if v.t.Mentions(d) && t.Mentions(v.name) {
			return true
		}
	}
	return false
}

// line is a line of types over i that is t at 1: the dimension k of t grows from
// an end to itself. It is constant on the returned face.
func (g *Generator) line(t *Type, i string) (line *Type, face *term.Written, k string) {
	var in []string
	for _, d := range g.dims {
		if d != i && t.Mentions(d) && !g.held(t, d) {
			in = append(in, d)
		}
	}
	if len(in) == 0 || g.maybe(5) {
		face, _ := g.face()
		g.count("constant line")
		return t, face, ""
	}
	k = in[g.pick(len(in))]
	g.count("varying line")
	d := term.Name(k)
	if g.maybe(2) {
		return t.With(one(k, term.Min(d, term.Name(i)))), term.Eq(d, 0), k
	}
	return t.With(one(k, term.Max(d, term.Rev(term.Name(i))))), term.Eq(d, 1), k
}

func (g *Generator) transp(t *Type, size int) *term.Written {
	i := g.fresh("i")
	line, face, _ := g.line(t, i)
	if g.maybe(2) {
		face = term.Bot()
	}
	u := g.Term(line.With(one(i, term.Numeral(0))), size)
	if g.maybe(5) {
		g.count("tfill " + string(t.Kind))
		return term.Tfill(i, line.Written(), face, u, term.Numeral(1))
	}
	g.count("transp " + string(t.Kind))
	return term.Transp(i, line.Written(), face, u)
}

func (g *Generator) comp(t *Type, size int) (out *term.Written) {
	g.over(func(i string) {
		line, _, k := g.line(t, i)
		u := g.Term(line, size)
		base := Replace(u, one(i, term.Numeral(0)))
		outer := g.dims
		g.dims = g.dims[:len(g.dims)-1]
		rows := g.walls(i, u)
		if k == "" && g.maybe(3) {
			g.count("fill " + string(t.Kind))
			out = term.Fill(i, line.Written(), base, g.Dimension(), rows...)
		} else {
			g.count("comp " + string(t.Kind))
			out = term.Comp(i, line.Written(), base, rows...)
		}
		g.dims = outer
	})
	return out
}

// along is a dimension of t with t over it: t is the result at that dimension.
func (g *Generator) along(t *Type, i string) (*Type, *term.Written) {
	for _, d := range g.dims {
		if d != i && t.Mentions(d) && !g.held(t, d) && g.maybe(2) {
			return t.With(one(d, term.Name(i))), term.Name(d)
		}
	}
	return t, g.Dimension()
}

// eliminate is an elimination with a result of type t.
func (g *Generator) eliminate(t *Type, size int) *term.Written {
	switch g.pick(9) {
	case 0:
		g.count("application")
		f := &Type{Kind: Pi, Name: g.fresh("x"), A: g.Type(size), B: t}
		return term.Apply(ann(g.Term(f, size), f), g.Term(f.A, size))
	case 1:
		g.count("application to a dimension")
		i := g.fresh("i")
		line, r := g.along(t, i)
		f := &Type{Kind: PiI, Name: i, A: line}
		return term.Apply(ann(g.Term(f, size), f), r)
	case 2:
		g.count("first part")
		p := &Type{Kind: Sigma, A: t}
		g.under(t, func(x string) { p.Name, p.B = x, g.Type(size) })
		return term.Fst(ann(g.Term(p, size), p))
	case 3:
		g.count("second part")
		p := &Type{Kind: Sigma, Name: g.fresh("x"), A: g.Type(size), B: t}
		return term.Snd(ann(g.Term(p, size), p))
	case 4, 5:
		g.count("path at a dimension")
		p := &Type{Kind: Path}
		var r *term.Written
		g.over(func(i string) {
			line, at := g.along(t, i)
			if found := map[string]bool{}; true {
				names(at, found)
				if found[i] {
					at = term.Numeral(1)
				}
			}
			r = at
			p.Name, p.A = i, line
			p.Args = []*term.Written{g.Term(line, size)}
		})
		return term.At(ann(g.Term(p, size), p), r)
	case 6:
		g.count("let")
		s := g.Type(size)
		a := g.Term(s, size)
		var out *term.Written
		g.under(s, func(x string) { out = term.Let(x, s.Written(), a, g.Term(t, size)) })
		return out
	}
	return g.elim(t, size)
}

// elim eliminates an element of a data type.
func (g *Generator) elim(t *Type, size int) (out *term.Written) {
	call := func(f string, args ...*term.Written) *term.Written { return term.Apply(term.Name(f), args...) }
	if t.Kind == OverNat {
		g.count("elim Nat, dependent")
		x, k, h := g.fresh("x"), g.fresh("x"), g.fresh("x")
		return term.Elim(x, call("FN", term.Name(x)), ann(t.Args[0], &Type{Kind: Nat}), term.Case("zero", term.Name("fz")),
			term.Case("suc", call("fs", term.Name(k), term.Name(h)), k, h))
	}
	if t.Kind == OverRing {
		return g.overRing(&Type{Kind: OverRing, Args: []*term.Written{ann(t.Args[0], &Type{Kind: Circle})}})
	}
	kinds := []Kind{Nat, Bool, Circle, Tally, Sum, List, Susp, Push, Crate}
	s := &Type{Kind: kinds[g.pick(len(kinds))]}
	g.count("elim " + string(s.Kind))
	small := &Type{Kind: []Kind{Nat, Circle, Variable}[g.pick(3)]}
	cell := func() (string, *term.Written) {
		var j string
		var w *term.Written
		g.over(func(i string) { j, w = i, g.Term(t, size) })
		return j, w
	}
	var cases []term.Row
	under := func(constructor string, types ...*Type) {
		var ns []string
		var bind func(k int)
		bind = func(k int) {
			if k == len(types) {
				cases = append(cases, term.Case(constructor, g.Term(t, size), ns...))
				return
			}
			g.under(types[k], func(x string) {
				ns = append(ns, x)
				bind(k + 1)
			})
		}
		bind(0)
	}
	switch s.Kind {
	case Nat:
		under("zero")
		under("suc", s, t)
	case Bool:
		under("true")
		under("false")
	case Tally:
		under("none")
		under("more", s, t)
	case Sum:
		s.A, s.B = small, &Type{Kind: Nat}
		under("inl", s.A)
		under("inr", s.B)
	case List:
		s.A = small
		under("nil")
		under("cons", s.A, s, t)
	case Crate:
		s.A, s.Name = &Type{Kind: Variable}, g.fresh("x")
		s.B = &Type{Kind: Family, Args: []*term.Written{term.Name(s.Name)}}
		g.under(s.A, func(x string) {
			g.under(s.B.With(one(s.Name, term.Name(x))), func(y string) {
				cases = append(cases, term.Case("crate", g.Term(t, size), x, y))
			})
		})
	case Circle: // the loop goes along the line, over to where it began, and back
		j, w := cell()
		i := g.fresh("i")
		cases = append(cases, term.Case("base", Replace(w, one(j, term.Numeral(1)))),
			term.Case("loop", term.Hcomp(t.Written(), Replace(w, one(j, term.Numeral(0))),
				term.Wall(term.Eq(term.Name(i), 0), j, w), term.Wall(term.Eq(term.Name(i), 1), j, w)), i))
	case Susp:
		s.A = small
		j, w := cell()
		cases = append(cases, term.Case("north", Replace(w, one(j, term.Numeral(0)))), term.Case("south", Replace(w, one(j, term.Numeral(1)))),
			term.Case("merid", w, g.fresh("x"), j))
	case Push:
		s.Args = []*term.Written{g.Dimension()}
		j, w := cell()
		cases = append(cases, term.Case("into", Replace(w, one(j, term.Numeral(0))), g.fresh("x")), term.Case("glued", w, g.fresh("x"), j))
	}
	return term.Elim(g.fresh("x"), t.Written(), ann(g.Term(s, size), s), cases...)
}
