package nbe

import (
	"context"
	"errors"
	"math/big"
	"strings"

	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/quote"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Scope is a typing context over an engine: variables, dimensions and face
// assumptions. It is immutable: adding to it gives a new scope. It owns its
// variables, and terms and values of one scope are refused by another
// (WrongScope). Safe for concurrent use.
type Scope struct {
	e      *Engine
	cases  []*scopeContext // one for each conjunction of what is assumed
	parent *Scope
	from   []origin // of each case in parent
}

// Scope returns the empty scope of the engine.
func (e *Engine) Scope() *Scope { return &Scope{e: e, cases: []*scopeContext{newContext()}} }

// Engine is the engine that s is a scope of.
func (s *Scope) Engine() *Engine { return s.engine() }

func (x *scopeContext) clone() *scopeContext {
	y := *x
	y.variables = append([]variable(nil), x.variables...)
	y.dimensions = append([]dimension(nil), x.dimensions...)
	y.hints = [2][]string{x.variableNames(), x.dimensionNames()}
	y.names = make(map[string][]bound, len(x.names))
	for name, list := range x.names {
		y.names[name] = append([]bound(nil), list...)
	}
	return &y
}

// keep adds the case that comes from the parent's case of the same index.
func (s *Scope) keep(x *scopeContext) {
	s.from = append(s.from, origin{index: len(s.cases)})
	s.cases = append(s.cases, x)
}

// Variable returns the scope with one more variable, of type ty.
func (s *Scope) Variable(ctx context.Context, name string, ty *term.Written, options ...CallOption) (*Scope, error) {
	out := &Scope{e: s.engine(), parent: s}
	err := s.engine().call(ctx, gather(options).as(value.CheckingSite, nil), func(run *value.Run) {
		for _, x := range s.cases {
			x = x.clone()
			c := s.e.checker(run, x)
			c.binder(term.Binder{Name: name})
			core, _ := c.Type(ty)
			t := c.Value(core)
			x.pushVariable(name, t, value.NewVariable(len(x.variables), name, t))
			out.keep(x)
		}
	})
	if err != nil {
		return nil, err
	}
	return out, nil
}

// Dimension returns the scope with one more dimension.
func (s *Scope) Dimension(name string) (*Scope, error) {
	if err := s.engine().name(name, term.Place{}); err != nil {
		return nil, err
	}
	out := &Scope{e: s.engine(), parent: s}
	for _, x := range s.cases {
		x = x.clone()
		x.pushDimension(name, interval.Var(value.Name(len(x.dimensions))))
		out.keep(x)
	}
	return out, nil
}

// Assume returns the scope on a face. With several conjunctions, what is
// checked and compared later must hold under each, and normalising gives one
// form for each; under bot everything is equal and there are no forms.
func (s *Scope) Assume(ctx context.Context, face *term.Written, options ...CallOption) (*Scope, error) {
	out := &Scope{e: s.engine(), parent: s}
	err := s.engine().call(ctx, gather(options).as(value.CheckingSite, nil), func(run *value.Run) {
		for index, x := range s.cases {
			c := s.e.checker(run, x.clone())
			f := c.Face(face)
			for k := range f.Len() {
				cube := f.Cube(k)
				if cube.IsTop() {
					out.cases = append(out.cases, c.scopeContext)
				} else {
					out.cases = append(out.cases, c.restricted(run, cube))
				}
				out.from = append(out.from, origin{index, cube})
			}
		}
	})
	if err != nil {
		return nil, err
	}
	return out, nil
}

// Term is a term that has been checked in a scope: its core and its type, for
// each conjunction of what the scope assumes. Immutable, safe for concurrent use.
type Term struct {
	scope *Scope
	cases []termCase
	site  value.Site // in profiles
}

type termCase struct {
	core term.Core
	t    value.Value
	v    value.Value
}

// begin is a term that is going to be made of w, and the options of that call.
func (s *Scope) begin(w *term.Written, options []CallOption) (*Term, *callOptions) {
	out := &Term{scope: s, site: termSite(w)}
	return out, gather(options).as(value.CheckingSite, &out.site)
}

func (s *Scope) newTerm(run *value.Run, out *Term, each func(c *checker) (term.Core, value.Value)) *Term {
	for _, x := range s.cases {
		c := s.e.checker(run, x.clone())
		core, t := each(c)
		out.cases = append(out.cases, termCase{core, t, c.Value(core)})
	}
	return out
}

// Check elaborates w at the type ty, which is checked first.
func (s *Scope) Check(ctx context.Context, w, ty *term.Written, options ...CallOption) (t *Term, err error) {
	out, o := s.begin(w, options)
	err = s.engine().call(ctx, o, func(run *value.Run) {
		t = s.newTerm(run, out, func(c *checker) (term.Core, value.Value) {
			tc, _ := c.Type(ty)
			tv := c.Value(tc)
			return c.Check(w, tv), tv
		})
	})
	return t, err
}

// CheckAt elaborates w at a type that has been checked in the same scope.
func (s *Scope) CheckAt(ctx context.Context, w *term.Written, ty *Term, options ...CallOption) (t *Term, err error) {
	if err := s.owns(ty); err != nil {
		return nil, err
	}
	out, o := s.begin(w, options)
	err = s.engine().call(ctx, o, func(run *value.Run) {
		k := 0
		t = s.newTerm(run, out, func(c *checker) (term.Core, value.Value) {
			tv := ty.cases[k].v
			s.isType(run, ty.cases[k].t)
			k++
			return c.Check(w, tv), tv
		})
	})
	return t, err
}

func (s *Scope) isType(run *value.Run, t value.Value) {
	if _, ok := run.Force(t).(*prims.Universe); !ok {
		run.Fail(&term.Error{Kind: term.IllTyped, Message: "this is no type", WantText: "a type"})
	}
}

// Infer elaborates w and infers its type.
func (s *Scope) Infer(ctx context.Context, w *term.Written, options ...CallOption) (t *Term, err error) {
	out, o := s.begin(w, options)
	err = s.engine().call(ctx, o, func(run *value.Run) {
		t = s.newTerm(run, out, func(c *checker) (term.Core, value.Value) { return c.Infer(w) })
	})
	return t, err
}

func (s *Scope) owns(ts ...*Term) error {
	for _, t := range ts {
		if t == nil || t.scope != s {
			return &term.Error{Kind: term.WrongScope, Message: "the term belongs to another scope"}
		}
	}
	return nil
}

// Core is the elaborated core term; under an assumption of several
// conjunctions that of the first, and nil under bot.
func (t *Term) Core() term.Core {
	if t == nil || len(t.cases) == 0 {
		return nil
	}
	return t.cases[0].core
}

// Cores are the elaborated core terms, one for each conjunction.
func (t *Term) Cores() []term.Core {
	if t == nil {
		return nil
	}
	out := make([]term.Core, len(t.cases))
	for k, c := range t.cases {
		out[k] = c.core
	}
	return out
}

// Scope is the scope that t belongs to.
func (t *Term) Scope() *Scope {
	if t == nil {
		return nil
	}
	return t.scope
}

// Form is a term that was read back, with its type and the face it is under.
type Form struct {
	Face  interval.Face
	Term  term.Core
	Type  term.Core
	names term.Names
	dims  []string
	spent *value.Spent // by the call that read it back
}

// Written is the form as a written term. Errors: those of [term.Write]; a tree
// larger than the limit Text is OutOfBudget, with the account of the call that
// read the form back, in which Needed is the tree's size.
func (f *Form) Written() (*term.Written, error) { return f.WrittenContext(context.Background()) }

// WrittenContext is Written in a context.
func (f *Form) WrittenContext(ctx context.Context) (*term.Written, error) {
	return write(ctx, f.Term, f.names, f.spent)
}

// WrittenType is the form's type as a written term.
func (f *Form) WrittenType() (*term.Written, error) {
	return f.WrittenTypeContext(context.Background())
}

// WrittenTypeContext is WrittenType in a context.
func (f *Form) WrittenTypeContext(ctx context.Context) (*term.Written, error) {
	return write(ctx, f.Type, f.names, f.spent)
}

// write is [term.WriteContext] with an account of what was spent.
func write(ctx context.Context, c term.Core, names term.Names, spent *value.Spent) (*term.Written, error) {
	w, err := term.WriteContext(ctx, c, names)
	var full *term.Error
	if !errors.As(err, &full) || full.Kind != term.OutOfBudget {
		return w, err
	}
	account := value.Spent{What: "nodes of text", Limit: int64(names.Size)}
	if spent != nil {
		account = *spent
	}
	account.Needed, _ = full.Detail.(*big.Int)
	if full.Message == term.LongNumeral {
		account.What, account.Limit = "digits", term.MaxDigits
	}
	full.Detail = &account
	return nil, full
}

// String is the form as text, or what keeps it from being written.
func (f *Form) String() string {
	w, err := f.Written()
	if err != nil {
		return "(" + err.Error() + ")"
	}
	return w.String()
}

func (s *Scope) names(x *scopeContext, limits Limits) term.Names {
	return term.Names{Variables: x.variableNames(), Dimensions: x.dimensionNames(), Taken: s.e.notation.Taken, Size: int(limits.or(s.e.limits).Text)}
}

// Write is a core term of this scope as a written one. Errors: those of
// [Form.Written]. Cost: up to the limit Text.
func (s *Scope) Write(c term.Core) (*term.Written, error) {
	return s.WriteContext(context.Background(), c)
}

// WriteContext is Write in a context.
func (s *Scope) WriteContext(ctx context.Context, c term.Core) (*term.Written, error) {
	if s.engine().isZero() {
		return nil, empty()
	}
	names := term.Names{Taken: s.e.notation.Taken, Size: int(s.e.limits.or(Limits{}).Text)}
	if len(s.cases) > 0 {
		names = s.names(s.cases[0], Limits{})
	}
	return write(ctx, c, names, nil)
}

func (o *callOptions) fold() quote.Fold {
	switch {
	case o.keepAll:
		return keepAll
	case len(o.keep) > 0:
		return func(g value.Global) bool { return o.keep[g.GlobalName()] }
	}
	return nil
}

// Normal is the full η-long normal form of t, one for each conjunction of what
// the scope assumes. With Folded, AllFolded or Opaque, definitions stay.
func (s *Scope) Normal(ctx context.Context, t *Term, options ...CallOption) (forms []Form, err error) {
	return s.forms(ctx, t, gather(options), func(q *quote.Reader, t, v value.Value) term.Core { return q.Term(t, v) })
}

func (s *Scope) forms(ctx context.Context, t *Term, o *callOptions, read func(q *quote.Reader, t, v value.Value) term.Core) (forms []Form, err error) {
	if err := s.owns(t); err != nil {
		return nil, err
	}
	err = s.engine().call(ctx, o.as(value.ReadbackSite, &t.site), func(run *value.Run) {
		for k, x := range s.cases {
			c := t.cases[k]
			v := c.v
			if len(o.opaque) > 0 || o.stuck {
				v = s.e.evaluate(run, c.core, x)
			}
			if o.regions && o.fold() == nil {
				end := run.Operation(value.EvaluationSite)
				v = run.Force(v)
				end()
			}
			q := quote.NewReader(run, len(x.variables), len(x.dimensions), o.fold())
			forms = append(forms, Form{Face: x.face, Term: read(q, c.t, v), Type: q.Type(c.t), names: s.names(x, o.limits), dims: x.dimensionNames()})
		}
		s.account(run, forms, o)
	})
	if err != nil {
		return nil, err
	}
	return forms, nil
}

// account gives the forms that a call read back what it spent.
func (s *Scope) account(run *value.Run, forms []Form, o *callOptions) {
	spent := run.Account("nodes of text", o.limits.or(s.e.limits).Text)
	for k := range forms {
		forms[k].spent = spent
	}
}

func (e *Engine) evaluate(run *value.Run, core term.Core, x *scopeContext) value.Value {
	variables, dimensions, vs := free(run, core, x.env, len(x.variables), len(x.dimensions))
	return eval.Compile(run, e, core, len(x.variables), len(x.dimensions), variables, dimensions).Eval(run, vs)
}

// faceText is a face with the names of a scope.
func faceText(f interval.Face, names []string) string {
	if f.IsTop() {
		return "top"
	}
	var cubes []string
	for k := range f.Len() {
		var parts []string
		for _, a := range f.Cube(k).Assignments() {
			name := "?"
			if int(a.Name) < len(names) {
				name = names[a.Name]
			}
			end := " 0)"
			if a.One {
				end = " 1)"
			}
			parts = append(parts, "(= "+name+end)
		}
		if len(parts) == 1 {
			cubes = append(cubes, parts[0])
		} else {
			cubes = append(cubes, "(and "+strings.Join(parts, " ")+")")
		}
	}
	switch len(cubes) {
	case 0:
		return "bot"
	case 1:
		return cubes[0]
	}
	return "(or " + strings.Join(cubes, " ") + ")"
}

// CheckLike elaborates w at the type of a term of the same scope.
func (s *Scope) CheckLike(ctx context.Context, w *term.Written, like *Term, options ...CallOption) (t *Term, err error) {
	if err := s.owns(like); err != nil {
		return nil, err
	}
	out, o := s.begin(w, options)
	err = s.engine().call(ctx, o, func(run *value.Run) {
		k := 0
		t = s.newTerm(run, out, func(c *checker) (term.Core, value.Value) {
			tv := like.cases[k].t
			k++
			return c.Check(w, tv), tv
		})
	})
	return t, err
}
