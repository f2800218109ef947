package term

import "math/big"

// Written terms from Go, one function for each form, so that a host needs no
// text. Nothing is checked here: a term of the wrong shape is refused, with
// its place, by the engine that is asked to check it. Where the notation takes
// several names or parts at once, so do these functions, and the tree they
// return nests as the reader's does.

// Row is one row of a form: a wall, a part of a system, a case.
type Row = []Part

// Name returns the name s: of a variable, a definition, a data type, a
// constructor or a dimension.
func Name(s string) *Written { return &Written{Kind: NameKind, Word: s} }

// Numeral returns the natural number n or, where a dimension stands, the end n.
func Numeral(n uint64) *Written {
	return &Written{Kind: NumeralKind, Number: new(big.Int).SetUint64(n)}
}

// BigNumeral returns the natural number n, which is copied. A negative n is no
// term, and the engine refuses it.
func BigNumeral(n *big.Int) *Written {
	return &Written{Kind: NumeralKind, Number: new(big.Int).Set(n)}
}

// Form returns the form with the given head word and parts: the way to write a
// host's own former, and what every function below returns.
func Form(word string, parts ...Part) *Written {
	return &Written{Kind: FormKind, Word: word, Parts: parts}
}

// Plain returns the part that is w and binds nothing.
func Plain(w *Written) Part { return Part{Body: w} }

// Under returns the part that is body under the names, outermost first.
func Under(body *Written, names ...string) Part {
	p := Part{Body: body}
	for _, n := range names {
		p.Binders = append(p.Binders, Binder{Name: n})
	}
	return p
}

// RowsPart returns the part that is a list of rows.
func RowsPart(rows ...Row) Part { return Part{Rows: rows} }

// Apply returns f applied to terms or dimensions; also a data type at its
// parameters and a constructor at its arguments and dimensions. Without
// arguments it is f.
func Apply(f *Written, args ...*Written) *Written {
	if len(args) == 0 {
		return f
	}
	parts := make([]Part, 1, len(args)+1)
	parts[0].Body = f
	for _, a := range args {
		parts = append(parts, Part{Body: a})
	}
	return &Written{Kind: ApplyKind, Parts: parts}
}

// nest returns the form of word around body for each of the names, the first outermost.
func nest(word string, body *Written, names []string) *Written {
	for k := len(names) - 1; k >= 0; k-- {
		body = Form(word, Under(body, names[k]))
	}
	return body
}

// right returns the parts joined by word, nested to the right.
func right(word string, parts []*Written) *Written {
	if len(parts) == 0 {
		return Form(word)
	}
	w := parts[len(parts)-1]
	for k := len(parts) - 2; k >= 0; k-- {
		w = Form(word, Plain(parts[k]), Plain(w))
	}
	return w
}

// Lam returns the function of the names, outermost first, that gives body; a
// name may stand for a dimension. Without names it is body.
func Lam(body *Written, names ...string) *Written { return nest("lam", body, names) }

// Pi returns the type of functions from domain to codomain, which may mention
// name. The domain may be [Interval].
func Pi(name string, domain, codomain *Written) *Written {
	return Form("Pi", Plain(domain), Under(codomain, name))
}

// Arrow returns the type of functions from all but the last of the types to
// the last, none depending on what came before. One type alone is itself.
func Arrow(types ...*Written) *Written { return right("->", types) }

// Sigma returns the type of pairs of an a in first and an element of second,
// which may mention a under name.
func Sigma(name string, first, second *Written) *Written {
	return Form("Sigma", Plain(first), Under(second, name))
}

// Product returns the type of pairs that do not depend, nested to the right.
func Product(types ...*Written) *Written { return right("*", types) }

// Pair returns the pair of the parts, nested to the right.
func Pair(parts ...*Written) *Written { return right("pair", parts) }

// Fst returns the first component of p.
func Fst(p *Written) *Written { return Form("fst", Plain(p)) }

// Snd returns the second component of p.
func Snd(p *Written) *Written { return Form("snd", Plain(p)) }

// Path returns the type of paths in a from x to y.
func Path(a, x, y *Written) *Written { return Form("Path", Plain(a), Plain(x), Plain(y)) }

// PathOver returns the type of paths from x to y over the line of types a, which may mention dimension.
func PathOver(dimension string, a, x, y *Written) *Written {
	return Form("PathOver", Under(a, dimension), Plain(x), Plain(y))
}

// Line returns the path of the dimensions, outermost first, that gives body.
func Line(body *Written, dimensions ...string) *Written { return nest("line", body, dimensions) }

// At returns the path p at the dimensions, the first one first.
func At(p *Written, dimensions ...*Written) *Written {
	for _, r := range dimensions {
		p = Form("at", Plain(p), Plain(r))
	}
	return p
}

// UnitType returns the type with one element.
func UnitType() *Written { return Form("Unit") }

// UnitElement returns the element of the type with one element.
func UnitElement() *Written { return Form("unit") }

// Universe returns the universe of level n.
func Universe(n uint64) *Written { return Form("U", Plain(Numeral(n))) }

// Interval returns the interval, which stands only as a domain of [Pi] and [Arrow].
func Interval() *Written { return Form("I") }

// Elim returns the elimination of scrutinee into family, which may mention
// name. The cases may stand in any order.
func Elim(name string, family, scrutinee *Written, cases ...Row) *Written {
	return Form("elim", Under(family, name), Plain(scrutinee), RowsPart(cases...))
}

// Case returns the case of an elimination for a constructor: names are its
// arguments, then one induction hypothesis for each recursive argument, then
// its dimensions.
func Case(constructor string, body *Written, names ...string) Row {
	return Row{Plain(Name(constructor)), Under(body, names...)}
}

// Transp returns the transport of a along the line of types family, which may
// mention dimension and is constant in it on face.
func Transp(dimension string, family, face, a *Written) *Written {
	return Form("transp", Under(family, dimension), Plain(face), Plain(a))
}

// Wall returns the wall on face that is body, which may mention dimension.
func Wall(face *Written, dimension string, body *Written) Row {
	return Row{Plain(face), Under(body, dimension)}
}

// Hcomp returns the composite in the type a of base with the walls.
func Hcomp(a, base *Written, walls ...Row) *Written {
	return Form("hcomp", Plain(a), Plain(base), RowsPart(walls...))
}

// Comp returns the composite of base with the walls along the line of types family.
func Comp(dimension string, family, base *Written, walls ...Row) *Written {
	return Form("comp", Under(family, dimension), Plain(base), RowsPart(walls...))
}

// Hfill returns the filler of [Hcomp] at the dimension r.
func Hfill(a, base, r *Written, walls ...Row) *Written {
	return Form("hfill", Plain(a), Plain(base), Plain(r), RowsPart(walls...))
}

// Fill returns the filler of [Comp] at the dimension r.
func Fill(dimension string, family, base, r *Written, walls ...Row) *Written {
	return Form("fill", Under(family, dimension), Plain(base), Plain(r), RowsPart(walls...))
}

// Tfill returns the filler of [Transp] at the dimension r.
func Tfill(dimension string, family, face, a, r *Written) *Written {
	return Form("tfill", Under(family, dimension), Plain(face), Plain(a), Plain(r))
}

// Glue returns the type base glued along the rows, each a [GlueType].
func Glue(base *Written, rows ...Row) *Written {
	return Form("Glue", Plain(base), RowsPart(rows...))
}

// GlueType returns the row of [Glue] that says: on face the type is t, and
// equivalence goes from it to the base.
func GlueType(face, t, equivalence *Written) Row {
	return Row{Plain(face), Plain(t), Plain(equivalence)}
}

// GlueElement returns the element over base that is given on faces by the rows, each a [GluePart].
func GlueElement(base *Written, rows ...Row) *Written {
	return Form("glue", Plain(base), RowsPart(rows...))
}

// GluePart returns the row of [GlueElement] that says: on face the element is t.
func GluePart(face, t *Written) Row { return Row{Plain(face), Plain(t)} }

// Unglue returns the element of the base under the element b of a Glue type.
func Unglue(b *Written) *Written { return Form("unglue", Plain(b)) }

// Equiv returns the type of equivalences from a to b.
func Equiv(a, b *Written) *Written { return Form("Equiv", Plain(a), Plain(b)) }

// Ann returns t, to be checked at the type ty.
func Ann(t, ty *Written) *Written { return Form("ann", Plain(t), Plain(ty)) }

// Let returns body with name defined as t of type ty, for body alone.
func Let(name string, ty, t, body *Written) *Written {
	return Form("let", Plain(ty), Plain(t), Under(body, name))
}

// plainForm returns the form of word with parts that bind nothing.
func plainForm(word string, parts []*Written) *Written {
	w := Form(word)
	for _, p := range parts {
		w.Parts = append(w.Parts, Part{Body: p})
	}
	return w
}

// Min returns the meet of one dimension or more.
func Min(dimensions ...*Written) *Written { return plainForm("min", dimensions) }

// Max returns the join of one dimension or more.
func Max(dimensions ...*Written) *Written { return plainForm("max", dimensions) }

// Rev returns the reversal of the dimension r.
func Rev(r *Written) *Written { return Form("rev", Plain(r)) }

// Top returns the face that always holds.
func Top() *Written { return Form("top") }

// Bot returns the face that never holds.
func Bot() *Written { return Form("bot") }

// Eq returns the face on which the dimension r is the end 0 or 1.
func Eq(r *Written, end uint64) *Written { return Form("=", Plain(r), Plain(Numeral(end))) }

// And returns the meet of one face or more.
func And(faces ...*Written) *Written { return plainForm("and", faces) }

// Or returns the join of one face or more.
func Or(faces ...*Written) *Written { return plainForm("or", faces) }
