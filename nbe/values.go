package nbe

import (
	"context"

	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/quote"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Value is an element of the semantic domain in a scope, with its type: what
// an elaborator works with all day, without going through text. It is
// evaluated at most once, when needed; immutable and safe for concurrent use.
type Value struct {
	scope *Scope
	cases []valueCase // one for each conjunction of what the scope assumes
}

type valueCase struct{ t, v value.Value }

// Value is the value of a term; no work is done.
func (t *Term) Value() *Value {
	if t == nil {
		return nil
	}
	out := &Value{scope: t.scope}
	for _, c := range t.cases {
		out.cases = append(out.cases, valueCase{c.t, c.v})
	}
	return out
}

// TypeValue is the type of a term as a value, an element of a universe.
func (t *Term) TypeValue() *Value { return t.Value().Type() }

// Type is the type of a value. Its own type is given as the universe of the
// highest level that can be written, which it belongs to by cumulativity.
func (v *Value) Type() *Value {
	if v == nil {
		return nil
	}
	out := &Value{scope: v.scope}
	for _, c := range v.cases {
		out.cases = append(out.cases, valueCase{prims.NewUniverse(prims.MaxLevel), c.t})
	}
	return out
}

// Scope is the scope that v belongs to.
func (v *Value) Scope() *Scope { return v.in() }

// in is v's scope's engine for a call that also takes values ws of that scope.
func (v *Value) call(ctx context.Context, options []CallOption, ws []*Value, body func(run *value.Run, k int) valueCase) (*Value, error) {
	if v == nil {
		return nil, empty()
	}
	for _, w := range ws {
		if w == nil || w.scope != v.scope {
			return nil, &term.Error{Kind: term.WrongScope, Message: "the value belongs to another scope"}
		}
	}
	out := &Value{scope: v.scope}
	err := v.in().engine().call(ctx, gather(options), func(run *value.Run) {
		for k := range v.cases {
			out.cases = append(out.cases, body(run, k))
		}
	})
	if err != nil {
		return nil, err
	}
	return out, nil
}

func unfit(run *value.Run, what string) {
	run.Fail(&term.Error{Kind: term.IllTyped, Message: what})
}

// fits requires an argument's type to be included in a domain.
func (s *Scope) fits(run *value.Run, k int, got, domain value.Value) {
	x := s.cases[k]
	cmp := quote.NewComparer(run, x.variableNames(), x.dimensionNames(), isHole)
	if cmp.Included(got, domain) != quote.Equal {
		c := s.e.checker(run, x.clone())
		run.Fail(&term.Error{Kind: term.IllTyped, Message: "the argument has another type", Want: c.ShowType(domain), Got: c.ShowType(got), Detail: s.e.difference(run, cmp.Difference())})
	}
}

// Apply applies a function to values of the same scope, which must have the
// types of its domains: that is checked.
func (v *Value) Apply(ctx context.Context, args []*Value, options ...CallOption) (*Value, error) {
	return v.call(ctx, options, args, func(run *value.Run, k int) valueCase {
		c := v.cases[k]
		for _, a := range args {
			p, ok := run.Force(c.t).(*prims.Pi)
			if !ok {
				unfit(run, "only a function takes an argument")
			}
			v.scope.fits(run, k, a.cases[k].t, p.Domain)
			c = valueCase{p.Codomain.Open(run, a.cases[k].v), prims.LaterApply(run, c.v, a.cases[k].v)}
		}
		return c
	})
}

// At takes a path, or a function over the interval, at a dimension: an
// interval expression over the dimensions of the scope.
func (v *Value) At(ctx context.Context, dimension *term.Written, options ...CallOption) (*Value, error) {
	return v.call(ctx, options, nil, func(run *value.Run, k int) valueCase {
		c := v.cases[k]
		r := v.scope.e.checker(run, v.scope.cases[k].clone()).Dimension(dimension)
		d := value.DimensionOf(r)
		switch t := run.Force(c.t).(type) {
		case *prims.Path:
			return valueCase{t.Line.Open(run, d), prims.LaterAt(run, c.v, r)}
		case *prims.PiDimension:
			return valueCase{t.Codomain.Open(run, d), prims.LaterApply(run, c.v, d)}
		}
		unfit(run, "only a path stands at a dimension")
		return c
	})
}

// First is the first part of a pair.
func (v *Value) First(ctx context.Context, options ...CallOption) (*Value, error) {
	return v.call(ctx, options, nil, func(run *value.Run, k int) valueCase {
		t, ok := run.Force(v.cases[k].t).(*prims.Sigma)
		if !ok {
			unfit(run, "only a pair has parts")
		}
		return valueCase{t.First, prims.LaterFirst(run, v.cases[k].v)}
	})
}

// Second is the second part of a pair.
func (v *Value) Second(ctx context.Context, options ...CallOption) (*Value, error) {
	return v.call(ctx, options, nil, func(run *value.Run, k int) valueCase {
		t, ok := run.Force(v.cases[k].t).(*prims.Sigma)
		if !ok {
			unfit(run, "only a pair has parts")
		}
		return valueCase{t.Second.Open(run, prims.LaterFirst(run, v.cases[k].v)), prims.LaterSecond(run, v.cases[k].v)}
	})
}

// In is the value in a scope that was made from its own by adding variables,
// dimensions and assumptions; under an assumption it is the face of the value.
// Errors: WrongScope if s was not made from v's scope.
func (v *Value) In(ctx context.Context, s *Scope, options ...CallOption) (*Value, error) {
	if v == nil || s == nil {
		return nil, empty()
	}
	var way []*Scope
	for x := s; x != v.scope; x = x.parent {
		if x == nil {
			return nil, &term.Error{Kind: term.WrongScope, Message: "the scope was not made from that of the value"}
		}
		way = append(way, x)
	}
	out := &Value{s, v.cases}
	err := s.engine().call(ctx, gather(options), func(run *value.Run) {
		for k := len(way) - 1; k >= 0; k-- {
			var cases []valueCase
			for _, from := range way[k].from {
				c := out.cases[from.index]
				cases = append(cases, valueCase{run.Restrict(c.t, from.cube), run.Restrict(c.v, from.cube)})
			}
			out.cases = cases
		}
	})
	if err != nil {
		return nil, err
	}
	return out, nil
}

// origin says which conjunction of the parent scope a conjunction comes from,
// and on which cube it is.
type origin struct {
	index int
	cube  interval.Cube
}

// ReadBack is the full η-long normal form of v, one for each conjunction. The
// options are those of Scope.Normal; Opaque has no effect on values.
func (v *Value) ReadBack(ctx context.Context, options ...CallOption) (forms []Form, err error) {
	o := gather(options)
	s := v.in()
	err = s.engine().call(ctx, o.as(value.ReadbackSite, nil), func(run *value.Run) {
		for k, x := range s.cases {
			q := quote.NewReader(run, len(x.variables), len(x.dimensions), o.fold())
			forms = append(forms, Form{Face: x.face, Term: q.Term(v.cases[k].t, v.cases[k].v), Type: q.Type(v.cases[k].t), names: s.names(x, o.limits), dims: x.dimensionNames()})
		}
		s.account(run, forms, o)
	})
	if err != nil {
		return nil, err
	}
	return forms, nil
}

// Equal compares v with a value of the same scope, at the type of v.
func (v *Value) Equal(ctx context.Context, w *Value, options ...CallOption) (result Comparison, err error) {
	if v == nil || w == nil || w.scope != v.scope {
		return Comparison{}, &term.Error{Kind: term.WrongScope, Message: "the value belongs to another scope"}
	}
	a, b := &Term{scope: v.scope}, &Term{scope: v.scope}
	for k := range v.cases {
		a.cases = append(a.cases, termCase{t: v.cases[k].t, v: v.cases[k].v})
		b.cases = append(b.cases, termCase{t: w.cases[k].t, v: w.cases[k].v})
	}
	return v.scope.Compare(ctx, a, b, options...)
}

// Semantic evaluates v to weak head normal form and returns it as the domain of
// package value has it, with its type: for hosts that look at values
// themselves. There is one for each conjunction.
func (v *Value) Semantic(ctx context.Context, options ...CallOption) (types []value.Value, values []value.Value, err error) {
	err = v.in().engine().call(ctx, gather(options), func(run *value.Run) {
		for _, c := range v.cases {
			types, values = append(types, run.Force(c.t)), append(values, run.Force(c.v))
		}
	})
	return types, values, err
}
