package nbe

import (
	"context"
	"math/big"

	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// View is a value reduced to its outermost constructor, and no further: what
// stands there, and the parts as values on which no work has been done.
type View struct {
	// Head is the operator in the words of the notation: Pi, Sigma, Path,
	// PathOver, Unit, U, Glue, a data type's name; lam, line, pair, unit, glue,
	// a constructor's name, numeral, suc, hcomp for a formal composite; neutral.
	Head string
	// Parts are the parts that are values: domain; first type; ends; parameters;
	// the two of a pair; a constructor's arguments; a composite's base.
	Parts []*Value
	// Dimensions are those of a path constructor.
	Dimensions []interval.Dim
	// Number is that of a numeral, or how many successors stand outside; a universe's level.
	Number *big.Int
}

// View reduces v to its outermost constructor. In a scope with several
// conjunctions the first is looked at; under bot there is nothing to see, and
// the error has kind WrongScope.
func (v *Value) View(ctx context.Context, options ...CallOption) (view *View, err error) {
	if v.in().engine().isZero() {
		return nil, empty()
	}
	if len(v.cases) != 1 {
		return nil, &term.Error{Kind: term.WrongScope, Message: "a value is viewed under one conjunction", WantText: "one", GotText: big.NewInt(int64(len(v.cases))).String()}
	}
	err = v.in().engine().call(ctx, gather(options), func(run *value.Run) {
		view = v.view(run, run.Force(v.cases[0].t), run.Force(v.cases[0].v))
	})
	if err != nil {
		return nil, err
	}
	return view, nil
}

func (v *Value) part(t, x value.Value) *Value { return &Value{v.scope, []valueCase{{t, x}}} }

func (v *Value) view(run *value.Run, t, x value.Value) *View {
	anyType := prims.NewUniverse(prims.MaxLevel)
	switch x := x.(type) {
	case *value.Neutral:
		return &View{Head: "neutral"}
	case *prims.Pi:
		return &View{Head: "Pi", Parts: []*Value{v.part(anyType, x.Domain)}}
	case *prims.PiDimension:
		return &View{Head: "Pi"}
	case *prims.Sigma:
		return &View{Head: "Sigma", Parts: []*Value{v.part(anyType, x.First)}}
	case *prims.Path:
		return &View{Head: "Path", Parts: []*Value{v.part(x.Line.Open(run, value.Zero()), x.A0), v.part(x.Line.Open(run, value.One()), x.A1)}}
	case *prims.Universe:
		return &View{Head: "U", Number: big.NewInt(int64(x.Level))}
	case *prims.GlueType:
		return &View{Head: "Glue", Parts: []*Value{v.part(anyType, x.A)}}
	case *prims.DataType:
		out := &View{Head: x.Data.Name}
		for k, p := range x.Params {
			out.Parts = append(out.Parts, v.part(x.Data.Params[k].At(run, x.Params, nil), p))
		}
		return out
	case *prims.Lam:
		return &View{Head: "lam"}
	case *prims.PathLam:
		return &View{Head: "line"}
	case *prims.Pair:
		if s, ok := t.(*prims.Sigma); ok {
			return &View{Head: "pair", Parts: []*Value{v.part(s.First, x.A), v.part(s.Second.Open(run, x.A), x.B)}}
		}
	case *prims.Number:
		return &View{Head: "numeral", Number: new(big.Int).Set(x.Int())}
	case *prims.Successors:
		count, base := x.Split()
		return &View{Head: "suc", Number: count, Parts: []*Value{v.part(t, base)}}
	case *prims.Formal:
		return &View{Head: "hcomp", Parts: []*Value{v.part(t, x.Base)}}
	case *prims.Con:
		if d, ok := t.(*prims.DataType); ok {
			out := &View{Head: x.Of.Name, Dimensions: x.Dims}
			for k, a := range x.Args {
				out.Parts = append(out.Parts, v.part(x.Of.Args[k].At(run, d.Params, x.Args), a))
			}
			return out
		}
	case *prims.GlueElement:
		if g, ok := t.(*prims.GlueType); ok {
			return &View{Head: "glue", Parts: []*Value{v.part(g.A, x.Base)}}
		}
	}
	switch x {
	case value.Value(prims.UnitType):
		return &View{Head: "Unit"}
	case prims.UnitElement:
		return &View{Head: "unit"}
	}
	if n, ok := x.(interface{ HeadWord() string }); ok { // a host's former may say
		return &View{Head: n.HeadWord()}
	}
	return &View{Head: "value"}
}

// Codomain is the codomain of a type of functions, or the second type of a
// type of pairs, at a value of the domain; the value's type is checked.
func (v *Value) Codomain(ctx context.Context, arg *Value, options ...CallOption) (*Value, error) {
	return v.call(ctx, options, []*Value{arg}, func(run *value.Run, k int) valueCase {
		var domain value.Value
		var codomain value.Closure
		switch t := run.Force(v.cases[k].v).(type) {
		case *prims.Pi:
			domain, codomain = t.Domain, t.Codomain
		case *prims.Sigma:
			domain, codomain = t.First, t.Second
		default:
			unfit(run, "only types of functions and of pairs have a codomain")
		}
		v.scope.fits(run, k, arg.cases[k].t, domain)
		return valueCase{v.cases[k].t, codomain.Open(run, arg.cases[k].v)}
	})
}

// Bind returns the scope with one more variable whose type is a value of this
// scope, and the variable.
func (s *Scope) Bind(ctx context.Context, name string, ty *Value, options ...CallOption) (*Scope, *Value, error) {
	if ty == nil || ty.scope != s {
		return nil, nil, &term.Error{Kind: term.WrongScope, Message: "the type belongs to another scope"}
	}
	if err := s.engine().name(name, term.Place{}); err != nil {
		return nil, nil, err
	}
	out := &Scope{e: s.engine(), parent: s}
	variable := &Value{scope: out}
	err := s.engine().call(ctx, gather(options), func(run *value.Run) {
		for k, x := range s.cases {
			s.isType(run, ty.cases[k].t)
			x = x.clone()
			t := ty.cases[k].v
			n := value.NewVariable(len(x.variables), name, t)
			x.pushVariable(name, t, n)
			out.keep(x)
			variable.cases = append(variable.cases, valueCase{t, n})
		}
	})
	if err != nil {
		return nil, nil, err
	}
	return out, variable, nil
}
