// Package nbe is what a host of the engine imports first. An [Engine] holds
// definitions, assumptions and data declarations; a [Scope] is a typing context
// in which terms are checked, normalised and compared; [Limits] bound every
// call. Written terms come from nbe/term or, as text, from nbe/notation.
//
// What a host may rely on, whatever it is handed:
//   - Every failure is an error value, a *[term.Error] with a kind, a place and
//     terms; no call panics, and none overflows the stack.
//   - Every call is bounded by limits, all of them on by default, and stops within
//     a tenth over the one that runs out. The error's Detail, a *[value.Spent],
//     says what was spent, by which rules, and in which three definitions most.
//   - Every call takes a context, whose end it sees within a millisecond as a
//     rule and ten at worst, reading and printing too; the error wraps the
//     context's cause. What takes no context, as the String methods and
//     [term.Same] do, is bounded by the size of what it is given, and has a
//     sibling that takes one. No goroutine outlives its call.
//   - A call that was stopped leaves engine and values as they were: the same
//     question with more to spend gives the right answer.
//   - An Engine, its Scopes, Terms and Values are safe for concurrent use.
//   - The same calls on a fresh engine give the same normal forms, verdicts,
//     errors and counters, on every run and machine.
//   - What [Engine.Save] wrote, [Engine.Load] gives back; a stream that is
//     damaged, or needs a former that is not there, is refused.
package nbe

import (
	"context"
	"sync"
	"sync/atomic"

	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
)

// Engine holds definitions, assumptions and data declarations. It is safe for
// concurrent use; what one goroutine adds, calls that begin later see.
type Engine struct {
	mu       sync.RWMutex
	entries  map[string]any // *definition, *prims.Data, *prims.Constructor
	order    []string       // names of declarations in their order, of this layer
	base     *layer         // what this engine was forked from, immutable
	words    map[string]*prims.Word
	ops      map[*term.Signature]eval.Operation
	notation *notation.Words
	limits   Limits
	plain    value.Plain
	flat     bool // universe levels are switched off
	high     *atomic.Int32
	solved   map[value.Global]value.Global // copied when it grows
	nat      *prims.Data
	former   map[*term.Signature]formerID // what brings an operator
	builtin  map[string]bool              // what every engine declares; not in saved state
	title    string                       // in the labels of Go's profiles
}

// layer is a frozen part of an engine's entries.
type layer struct {
	entries map[string]any
	order   []string
	base    *layer
	depth   int
}

// definition is a definition, an assumption or a hole. It implements value.Global.
type definition struct {
	name     string
	typeCore term.Core
	core     term.Core // nil for assumptions and holes
	t        value.Value
	v        value.Value // for an assumption the neutral
	folded   value.Value
	hole     bool
	code     *eval.Abstraction
	place    term.Place
	site     value.Site
	// as it was given, for saving it; where it comes from a stream, that stands in stored
	writtenType, written *term.Written
	stored               *stored
}

func (d *definition) GlobalName() string               { return d.name }
func (d *definition) TypeValue(*value.Run) value.Value { return d.t }
func (d *definition) Unfold(*value.Run) value.Value    { return d.v }
func (d *definition) Folded(*value.Run) value.Value    { return d.folded }
func (d *definition) Site() *value.Site                { return &d.site }
func (d *definition) Code() *eval.Abstraction          { return d.code }
func isHole(g value.Global) bool                       { d, ok := g.(*definition); return ok && d.hole }

// Option sets up an engine.
type Option func(*Engine) error

// WithLimits sets the limits of calls that give none of their own.
func WithLimits(l Limits) Option {
	return func(e *Engine) error { e.limits = l; return nil }
}

// WithFormers registers formers of the host's beside the built-in ones. A word
// or a signature that is taken is refused with kind Duplicate.
func WithFormers(formers ...prims.Former) Option {
	return func(e *Engine) error {
		for _, f := range formers {
			for _, w := range f.Words {
				if term.IsHeadWord(w.Word) { // of dimensions, faces and scripts too, which no former brings
					return &term.Error{Kind: term.Duplicate, Message: "the former " + f.Name + " brings a word that is taken", GotText: w.Word}
				}
			}
		}
		return e.register(formers)
	}
}

// WithPlain switches shortcuts of the evaluator off, for testing the fast
// evaluator against the plain one.
func WithPlain(p value.Plain) Option {
	return func(e *Engine) error { e.plain = p; return nil }
}

// WithoutLevels switches universe levels off: (U n) is (U 0) whatever n is, and
// is an element of itself. It is unsound: Girard's paradox then proves Empty, by
// a term whose evaluation never ends, which every limit stops. It is for hosts
// that want to try things out before they settle levels. What such an engine has
// saved, or its hashes, no engine with levels takes for its own.
func WithoutLevels() Option {
	return func(e *Engine) error { e.flat = true; return nil }
}

// New returns an engine with Empty, Bool, Nat, Sum and Circle declared. The
// errors are those of the options.
func New(options ...Option) (*Engine, error) {
	e := &Engine{entries: map[string]any{}, words: map[string]*prims.Word{}, ops: map[*term.Signature]eval.Operation{}, former: map[*term.Signature]formerID{}, high: new(atomic.Int32)}
	e.high.Store(64)
	if err := e.register(prims.Table()); err != nil {
		return nil, err
	}
	for _, o := range options {
		if o == nil {
			continue
		}
		if err := o(e); err != nil {
			return nil, err
		}
	}
	if e.flat {
		for sig, id := range e.former {
			e.former[sig] = formerID{id.name + " without universe levels", id.version}
		}
	}
	var shapes []term.Shape
	builtin := map[string]bool{}
	for _, s := range term.Words() {
		builtin[s.Word] = true
	}
	for name, w := range e.words {
		if !builtin[name] {
			shapes = append(shapes, w.Shape)
		}
	}
	words, err := notation.NewWords(shapes...)
	if err != nil {
		return nil, err
	}
	e.notation = words
	for _, d := range prims.Prelude() {
		if err := e.Declare(context.Background(), d); err != nil {
			return nil, err
		}
	}
	e.builtin = map[string]bool{}
	for name := range e.entries {
		e.builtin[name] = true
	}
	return e, nil
}

func (e *Engine) register(formers []prims.Former) error {
	for _, f := range formers {
		for _, w := range f.Words {
			if _, ok := e.words[w.Word]; ok {
				return &term.Error{Kind: term.Duplicate, Message: "the former " + f.Name + " brings a word that is taken", GotText: w.Word}
			}
			w := w
			e.words[w.Word] = &w
		}
		for _, o := range f.Operators {
			if _, ok := e.ops[o.Sig]; ok {
				return &term.Error{Kind: term.Duplicate, Message: "the former " + f.Name + " brings an operator that is taken", GotText: o.Sig.Name}
			}
			e.ops[o.Sig] = o.Op
			e.former[o.Sig] = formerID{f.Name, f.Version}
		}
	}
	return nil
}

// Words is the table of head words that text for this engine is read with.
func (e *Engine) Words() *notation.Words {
	if e == nil {
		return nil
	}
	return e.notation
}

// maxLayers is how many layers of forks a look-up goes through before they are
// put together.
const maxLayers = 8

// Fork returns an engine with everything e holds. What is added to one
// afterwards, the other does not see. It costs little, whatever e holds.
func (e *Engine) Fork() *Engine {
	if e == nil {
		return nil
	}
	e.mu.Lock()
	defer e.mu.Unlock()
	if len(e.entries) > 0 {
		depth := 1
		if e.base != nil {
			depth = e.base.depth + 1
		}
		e.base = &layer{e.entries, e.order, e.base, depth}
		e.entries, e.order = map[string]any{}, nil
		if depth > maxLayers {
			e.base = e.base.flat()
		}
	}
	return &Engine{entries: map[string]any{}, base: e.base, words: e.words, ops: e.ops, former: e.former, builtin: e.builtin, notation: e.notation, limits: e.limits, plain: e.plain, flat: e.flat, high: e.high, solved: e.solved, nat: e.nat, title: e.title}
}

func (l *layer) flat() *layer {
	out := &layer{entries: map[string]any{}, depth: 1}
	var all []*layer
	for ; l != nil; l = l.base {
		all = append(all, l)
	}
	for k := len(all) - 1; k >= 0; k-- {
		for name, x := range all[k].entries {
			out.entries[name] = x
		}
		out.order = append(out.order, all[k].order...)
	}
	return out
}

func (e *Engine) lookup(name string) any {
	if e == nil {
		return nil
	}
	e.mu.RLock()
	defer e.mu.RUnlock()
	if x, ok := e.entries[name]; ok {
		return x
	}
	for l := e.base; l != nil; l = l.base {
		if x, ok := l.entries[name]; ok {
			return x
		}
	}
	return nil
}

// Operation is what a core operator does (eval.Resolver).
func (e *Engine) Operation(sig *term.Signature) eval.Operation { return e.ops[sig] }

// Global is a definition or an assumption as evaluation sees it (eval.Resolver).
func (e *Engine) Global(name string) value.Global {
	if d, ok := e.lookup(name).(*definition); ok {
		return d
	}
	return nil
}

func (e *Engine) numeral(c *checker, w *term.Written) (term.Core, value.Value) {
	if e.nat == nil {
		c.Fail(w, term.NotFound, "there are no natural numbers here", nil, w)
	}
	return e.nat.Numeral(w)
}

// add makes entries known, all of them or none.
func (e *Engine) add(names []string, xs []any) *term.Error {
	e.mu.Lock()
	defer e.mu.Unlock()
	for _, name := range names {
		taken := e.entries[name] != nil
		for l := e.base; l != nil && !taken; l = l.base {
			taken = l.entries[name] != nil
		}
		if taken {
			return &term.Error{Kind: term.Duplicate, Message: "this name is declared already", GotText: name}
		}
	}
	for k, name := range names {
		e.entries[name] = xs[k]
		e.order = append(e.order, name)
	}
	return nil
}

// call is one call's run; everything that can leave it comes back as an error.
func (e *Engine) call(ctx context.Context, o *callOptions, body func(run *value.Run)) (err error) {
	if e.isZero() {
		return empty()
	}
	e.mu.RLock()
	solved := e.solved
	e.mu.RUnlock()
	s := value.Settings{Context: ctx, Budget: o.limits.or(e.limits).budget(), Plain: e.plain, OneUniverse: e.flat, High: e.high, Solutions: solved, Draw: o.draw}
	if len(o.opaque) > 0 || o.stuck {
		v := &view{opaque: o.opaque, values: map[*definition]value.Value{}}
		if o.stuck {
			v.folded = map[*definition]value.Value{}
		}
		s.Unfold = v
	}
	run := value.NewRun(s)
	end := o.watch(ctx, run)
	defer func() {
		if end != nil {
			end()
		}
		if o.stats != nil {
			*o.stats = run.Snapshot()
		}
		if thrown := recover(); thrown != nil {
			err = run.ErrorOf(thrown)
		}
	}()
	run.Poll()
	if end != nil || o.labels {
		run.Down(func() { e.watched(ctx, o, run, body) })
		return nil
	}
	run.Down(func() { body(run) })
	return nil
}

func (e *Engine) checker(run *value.Run, x *scopeContext) *checker {
	return &checker{scopeContext: x, e: e, run: run, declared: map[string]value.Named{}}
}

// view is a run's own idea of the definitions, where some are kept opaque.
type view struct {
	opaque map[string]bool
	values map[*definition]value.Value
	// folded, if not nil, are the run's own folded forms: nothing of a definition
	// is taken over that other runs have evaluated.
	folded map[*definition]value.Value
}

func (u *view) Unfold(run *value.Run, g value.Global) value.Value {
	d, ok := g.(*definition)
	if !ok || !d.defined() {
		return g.Unfold(run)
	}
	if v, ok := u.values[d]; ok {
		return v
	}
	var v value.Value
	if u.opaque[d.name] {
		v = value.NewNeutral(&value.GlobalHead{Global: d})
	} else {
		v = d.evaluate(run)
	}
	u.values[d] = v
	return v
}

func (u *view) Folded(run *value.Run, g value.Global) value.Value {
	if d, ok := g.(*definition); ok && u.opaque[d.name] {
		return u.Unfold(run, g)
	}
	if d, ok := g.(*definition); ok && u.folded != nil && d.defined() {
		v, ok := u.folded[d]
		if !ok {
			v = run.Fold(value.NewNeutral(&value.GlobalHead{Global: d}))
			u.folded[d] = v
		}
		return v
	}
	return g.Folded(run)
}
