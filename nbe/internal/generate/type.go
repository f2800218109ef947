// Package generate makes random well-typed written terms for tests: not only
// λ-terms but composites with several walls over several dimensions, transports
// along lines that vary and are constant on a face, fillers, eliminations of
// strict and formal data. A term is well typed by construction and up to
// definitional equality, so an engine that refuses one has a fault.
//
// Binders have names that are used once, so substitution needs no renaming.
// Paths are generated with an inhabitant: a body over a dimension, whose ends
// are the ends of the type.
package generate

import (
	"fmt"

	"example.com/boxwright/nbe/term"
)

// Kind is the shape of a type.
type Kind string

// The shapes of types that are generated.
const (
	Nat      Kind = "Nat"
	Bool     Kind = "Bool"
	Unit     Kind = "Unit"
	Circle   Kind = "Circle"
	Tally    Kind = "Tally" // formal without path constructors
	Variable Kind = "A"     // a type that nothing is known of
	Line     Kind = "LA"    // a line of such types
	Family   Kind = "B"     // a family over A
	NatLine  Kind = "E"     // a path of types from Nat to Unit
	OverNat  Kind = "FN"    // a family over Nat
	OverRing Kind = "FC"    // a family over Circle
	Sum      Kind = "Sum"
	List     Kind = "List"
	Susp     Kind = "Susp"  // a path constructor that commutes with transport
	Push     Kind = "Push"  // one that does not
	Glued    Kind = "Glued" // a composite of types
	Crate    Kind = "Crate" // a constructor with a dependent argument
	Pi       Kind = "Pi"
	PiI      Kind = "PiI"
	Sigma    Kind = "Sigma"
	Path     Kind = "Path"
)

// Kinds are all of them.
var Kinds = []Kind{Nat, Bool, Unit, Circle, Tally, Variable, Line, Family, NatLine, OverNat, OverRing, Glued, Sum, List, Susp, Push, Crate, Pi, PiI, Sigma, Path}

// Given is the script of what the generated terms mention.
const Given = `
	(data Tally () (composition formal) (point none ()) (point more ((t Tally))))
	(data List ((A (U 0))) (point nil ()) (point cons ((a A) (l (List A)))))
	(data Susp ((A (U 0))) (point north ()) (point south ()) (path merid ((a A)) (i) ((= i 0) north) ((= i 1) south)))
	(data Push ((A (U 0)) (B (U 0)) (f (-> A B))) (point into ((b B))) (path glued ((a A)) (i) ((= i 0) (into (f a)))))
	(data Crate ((A (U 0)) (B (-> A (U 0)))) (point crate ((a A) (b (B a)))))
	(assume A (U 0)) (assume a0 A) (assume a1 A) (assume pA (Path A a0 a1)) (assume sA (Path (Path A a0 a1) pA pA))
	(assume LA (-> I (U 0))) (assume la (Pi ((i I)) (LA i))) (assume LC (-> I (U 0))) (assume LF (Pi ((i I)) (-> (LA i) (LC i))))
	(assume A2 (U 0)) (assume PU (Path (U 0) A A2))
	(assume B (-> A (U 0))) (assume b (Pi ((x A)) (B x)))
	(assume E (Path (U 0) Nat Unit)) (assume xE (Pi ((i I)) (at E i)))
	(assume FN (-> Nat (U 0))) (assume fN (Pi ((n Nat)) (FN n))) (assume fz (FN 0)) (assume fs (Pi ((n Nat)) (-> (FN n) (FN (suc n)))))
	(assume FC (-> Circle (U 0))) (assume cb (FC base)) (assume cl (PathOver (i (FC (loop i))) cb cb))
	(assume n0 Nat) (assume n1 Nat) (assume pN (Path Nat n0 n1)) (assume zN (Path Nat 0 0)) (assume sN (Path (Path Nat 0 0) zN zN)) (assume rN (Path (Path Nat 0 0) (line (_) 0) (line (_) 0)))
	(assume c0 Circle) (assume pC (Path Circle base c0)) (assume t0 Tally) (assume pT (Path Tally t0 none))
	(assume q0 Bool) (assume u0 Unit)
`

// Type is a generated type. Args are dimensions or terms inside it; of a path
// type the body is the inhabitant, over Name.
type Type struct {
	Kind Kind
	Name string
	A, B *Type
	Args []*term.Written
}

// Written is the type as a term.
func (t *Type) Written() *term.Written {
	name := term.Name(string(t.Kind))
	switch t.Kind {
	case Line, Family, OverNat, OverRing:
		return term.Apply(name, t.Args[0])
	case NatLine:
		return term.At(name, t.Args[0])
	case Unit:
		return term.UnitType()
	case Glued:
		return term.Hcomp(term.Universe(0), term.Name("A"), t.typeWall("i"))
	case Sum:
		return term.Apply(name, t.A.Written(), t.B.Written())
	case List, Susp:
		return term.Apply(name, t.A.Written())
	case Push:
		r := t.Args[0]
		return term.Apply(name, term.Apply(term.Name("LA"), r), term.Apply(term.Name("LC"), r), term.Apply(term.Name("LF"), r))
	case Crate:
		return term.Apply(name, t.A.Written(), term.Lam(t.B.Written(), t.Name))
	case Pi:
		return term.Pi(t.Name, t.A.Written(), t.B.Written())
	case PiI:
		return term.Pi(t.Name, term.Interval(), t.A.Written())
	case Sigma:
		return term.Sigma(t.Name, t.A.Written(), t.B.Written())
	case Path:
		return term.PathOver(t.Name, t.A.Written(), t.end(0), t.end(1))
	}
	return name
}

// typeWall is the wall of a composite of types.
func (t *Type) typeWall(i string) term.Row {
	return term.Wall(t.Args[0], i, term.At(term.Name("PU"), term.Name(i)))
}

func (t *Type) end(r uint64) *term.Written {
	return Replace(t.Args[0], map[string]*term.Written{t.Name: term.Numeral(r)})
}

// With is the type with names replaced, dimensions or variables.
func (t *Type) With(s map[string]*term.Written) *Type {
	if t == nil {
		return nil
	}
	out := &Type{Kind: t.Kind, Name: t.Name, A: t.A.With(s), B: t.B.With(s)}
	for _, a := range t.Args {
		out.Args = append(out.Args, Replace(a, s))
	}
	return out
}

// Replace is w with names replaced. Bound names are used once, so nothing is
// captured.
func Replace(w *term.Written, s map[string]*term.Written) *term.Written {
	if w == nil || len(s) == 0 {
		return w
	}
	switch w.Kind {
	case term.NameKind:
		if r, ok := s[w.Word]; ok {
			return r
		}
		return w
	case term.NumeralKind:
		return w
	}
	out := *w
	out.Parts = replaceParts(w.Parts, s)
	return &out
}

func replaceParts(parts []term.Part, s map[string]*term.Written) []term.Part {
	out := make([]term.Part, len(parts))
	for k, p := range parts {
		out[k] = term.Part{Binders: p.Binders, Body: Replace(p.Body, s)}
		for _, row := range p.Rows {
			out[k].Rows = append(out[k].Rows, replaceParts(row, s))
		}
	}
	return out
}

// names are the names that occur in w, bound ones too.
func names(w *term.Written, found map[string]bool) {
	if w == nil {
		return
	}
	if w.Kind == term.NameKind {
		found[w.Word] = true
	}
	var walk func(parts []term.Part)
	walk = func(parts []term.Part) {
		for _, p := range parts {
			names(p.Body, found)
			for _, row := range p.Rows {
				walk(row)
			}
		}
	}
	walk(w.Parts)
}

// Mentions reports whether a name occurs in the type.
func (t *Type) Mentions(name string) bool {
	found := map[string]bool{}
	names(t.Written(), found)
	return found[name]
}

// String is the type as text.
func (t *Type) String() string { return fmt.Sprint(t.Written()) }
