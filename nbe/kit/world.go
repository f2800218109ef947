package kit

import (
	"context"
	"errors"
	"fmt"
	"math/rand/v2"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/quote"
	"example.com/boxwright/value"
)

// Worlds: an engine in one of its builds with a scope, in which laws look at
// terms as values. Everything here is what any host can reach.

// build is a way of running the engine.
type build struct {
	name  string
	plain value.Plain
	seed  uint64 // of fresh names; 0: the lowest
}

var (
	fast   = build{name: "the engine as it is"}
	builds = []build{
		{name: "the plain evaluator", plain: value.Plain{NoSupport: true, NoSharing: true, Eager: true, NoFrontier: true, NoNumerals: true}},
		{name: "without sharing", plain: value.Plain{NoSharing: true}},
		{name: "with eager substitutions", plain: value.Plain{Eager: true, NoFrontier: true}},
		{name: "with names drawn at random", seed: 11},
	}
)

// limits bound every call of the suite: a wrong rule may well not end.
var limits = nbe.Limits{Steps: 100_000, Depth: 20_000, Memory: 64 << 20, Output: 20_000}

// world is a scope with its names.
type world struct {
	build build
	e     *nbe.Engine
	scope *nbe.Scope
	vars  []string
	dims  []string
}

// engines are the engines of a former, one for each build that was asked for.
type engines struct {
	former Former
	made   map[string]*nbe.Engine
	tried  map[string]int // by law: how often it was tried
	spent  map[string]int // and how often a budget ran out
	put    int            // how many values were put for variables
	unfit  int            // and how many did not fit what was drawn after them
}

func (es *engines) of(b build) (*nbe.Engine, error) {
	if e, ok := es.made[b.name]; ok {
		return e, nil
	}
	options := append([]nbe.Option{nbe.WithLimits(limits), nbe.WithPlain(b.plain)}, es.former.Options...)
	e, err := engine(es.former.Script, options)
	if err != nil {
		return nil, err
	}
	es.made[b.name] = e
	return e, nil
}

// world is the scope of the variables and dimensions.
func (es *engines) world(b build, variables []Variable, dims []string) (*world, error) {
	e, err := es.of(b)
	if err != nil {
		return nil, err
	}
	w := &world{build: b, e: e, scope: e.Scope()}
	for _, v := range variables {
		if w.scope, err = w.scope.Variable(context.Background(), v.Name, v.Type, w.call()...); err != nil {
			return nil, fmt.Errorf("the generator's variable %s : %s: %w", v.Name, v.Type, err)
		}
		w.vars = append(w.vars, v.Name)
	}
	for _, d := range dims {
		if w, err = w.with(d); err != nil {
			return nil, err
		}
	}
	return w, nil
}

// with is w with one more dimension.
func (w *world) with(dim string) (*world, error) {
	s, err := w.scope.Dimension(dim)
	if err != nil {
		return nil, err
	}
	c := *w
	c.scope, c.dims = s, append(append([]string(nil), w.dims...), dim)
	return &c, nil
}

func (w *world) call() []nbe.CallOption {
	if w.build.seed == 0 {
		return nil
	}
	return []nbe.CallOption{nbe.DrawNames(w.build.seed)}
}

// run runs f in a run of its own, of the same build.
func (w *world) run(f func(run *value.Run) error) (err error) {
	s := value.Settings{Plain: w.build.plain, Budget: value.Budget{Steps: limits.Steps, Depth: limits.Depth, Memory: limits.Memory, Output: limits.Output}}
	if w.build.seed != 0 {
		s.Draw = rand.New(rand.NewPCG(w.build.seed, 1))
	}
	run := value.NewRun(s)
	defer func() {
		if thrown := recover(); thrown != nil {
			err = value.ErrorOf(thrown)
		}
	}()
	run.Down(func() { err = f(run) })
	return err
}

// element is a value with its type, in a world.
type element struct{ t, v value.Value }

// elementOf is a checked term as a forced value.
func (w *world) elementOf(t *nbe.Term) (element, error) {
	types, values, err := t.Value().Semantic(context.Background(), w.call()...)
	if err != nil {
		return element{}, err
	}
	return element{types[0], values[0]}, nil
}

// infer elaborates a term whose type can be inferred.
func (w *world) infer(t *term.Written) (element, error) {
	x, err := w.scope.Infer(context.Background(), t, w.call()...)
	if err != nil {
		return element{}, err
	}
	return w.elementOf(x)
}

// check elaborates a term at a type.
func (w *world) check(t, ty *term.Written) (element, error) {
	x, err := w.scope.Check(context.Background(), t, ty, w.call()...)
	if err != nil {
		return element{}, err
	}
	return w.elementOf(x)
}

// normal is the normal form of an element.
func (w *world) normal(x element) (c term.Core, err error) {
	err = w.run(func(run *value.Run) error {
		c = quote.NewReader(run, len(w.vars), len(w.dims), nil).Term(x.t, x.v)
		return nil
	})
	return c, err
}

// normalType is the normal form of its type.
func (w *world) normalType(x element) (c term.Core, err error) {
	err = w.run(func(run *value.Run) error {
		c = quote.NewReader(run, len(w.vars), len(w.dims), nil).Type(x.t)
		return nil
	})
	return c, err
}

// write is a core term as a written one.
func (w *world) write(c term.Core) *term.Written {
	out, err := w.scope.Write(c)
	if err != nil {
		return term.Name("(" + err.Error() + ")")
	}
	return out
}

// equal compares two values at a type.
func (w *world) equal(t, a, b value.Value) (equal bool, err error) {
	err = w.run(func(run *value.Run) error {
		equal = quote.NewComparer(run, w.vars, w.dims, nil).EqualAt(t, a, b) == quote.Equal
		return nil
	})
	return equal, err
}

// along is the value that x becomes under a substitution of the dimensions:
// delayed over the finished value, as evaluation does it.
func (w *world) along(x element, s *value.Subst) (out element, err error) {
	err = w.run(func(run *value.Run) error {
		out = element{run.Substitute(x.t, s), run.Force(run.Substitute(x.v, s))}
		return nil
	})
	return out, err
}

// environment are the variables and dimensions of w as values.
func (w *world) environment() ([]value.Value, error) {
	var env []value.Value
	for _, name := range w.vars {
		x, err := w.infer(term.Name(name))
		if err != nil {
			return nil, err
		}
		env = append(env, x.v)
	}
	for k := range w.dims {
		env = append(env, value.DimensionName(value.Name(k)))
	}
	return env, nil
}

// evaluate is a core term of w as a value, unchecked.
func (w *world) evaluate(c term.Core) (v value.Value, err error) {
	env, err := w.environment()
	if err != nil {
		return nil, err
	}
	err = w.run(func(run *value.Run) error {
		nv, nd := len(w.vars), len(w.dims)
		v = run.Force(eval.Compile(run, w.e, c, nv, nd, eval.Levels(nv), eval.Levels(nd)).Eval(run, env))
		return nil
	})
	return v, err
}

// move is a core term of a scope with the dimensions from, brought into w by a substitution.
func (w *world) move(c term.Core, from []string, s *value.Subst) term.Core {
	return term.Move{Variables: len(w.vars), Dimensions: len(from), MoreDimensions: len(w.dims) - len(from), Subst: s}.Apply(c)
}

// stuck reports whether a value is neutral.
func stuck(v value.Value) bool { _, ok := v.(*value.Neutral); return ok }

// broken reports whether an error is a fault of the rules rather than a
// budget that ran out.
func broken(err error) bool {
	return err != nil && !errors.Is(err, term.OutOfBudget) && !errors.Is(err, term.Cancelled)
}
