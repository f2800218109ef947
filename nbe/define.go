package nbe

import (
	"context"
	"fmt"

	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
)

// Adding to an engine: each call adds everything it says or nothing.

func (e *Engine) name(name string, place term.Place) error {
	if e.isZero() {
		return empty()
	}
	if !term.IsName(name) || e.notation.Taken(name) {
		return &term.Error{Kind: term.Malformed, Place: place, Message: "this cannot be a name", WantText: "a name", GotText: fmt.Sprintf("%q", name)}
	}
	return nil
}

// Define checks t at the type ty and adds the definition. If name is an
// assumption or a hole, the definition takes its place, at the type that it
// has, and values that were stuck on it compute from then on. Errors: those of
// checking; Duplicate.
func (e *Engine) Define(ctx context.Context, name string, ty, t *term.Written, options ...CallOption) error {
	if t == nil {
		return &term.Error{Kind: term.Malformed, Message: "what is to be defined is missing", WantText: "a term"}
	}
	return e.global(ctx, name, ty, t, false, options)
}

// Assume adds a variable of type ty that never computes.
func (e *Engine) Assume(ctx context.Context, name string, ty *term.Written, options ...CallOption) error {
	return e.global(ctx, name, ty, nil, false, options)
}

// Hole adds an unknown of type ty, which a Define of the same name solves.
// Comparisons that depend on it are undecided.
func (e *Engine) Hole(ctx context.Context, name string, ty *term.Written, options ...CallOption) error {
	return e.global(ctx, name, ty, nil, true, options)
}

func (e *Engine) global(ctx context.Context, name string, ty, t *term.Written, hole bool, options []CallOption) error {
	place := term.Place{}
	if ty != nil {
		place = ty.Place
	}
	if err := e.name(name, place); err != nil {
		return err
	}
	old, known := e.lookup(name).(*definition)
	replaces := known && t != nil && !old.defined()
	if !replaces && e.lookup(name) != nil {
		return &term.Error{Kind: term.Duplicate, Place: place, Message: "this name is declared already", GotText: name}
	}
	d := &definition{name: name, place: place, hole: hole, writtenType: ty, written: t, site: value.Site{Kind: value.SiteDefinition, Name: name, Place: place}}
	err := e.call(ctx, gather(options).as(value.CheckingSite, &d.site), func(run *value.Run) {
		c := e.checker(run, newContext())
		d.typeCore, _ = c.Type(ty)
		d.t = eval.Compile(run, e, d.typeCore, 0, 0, nil, nil).Eval(run, nil)
		if t == nil {
			n := value.NewNeutral(&value.GlobalHead{Global: d})
			d.v, d.folded = n, n
			return
		}
		if replaces {
			c.SameType(old.t, d.t, &term.Error{Kind: term.IllTyped, Place: ty.Place, Message: "the assumption has another type"})
		}
		d.core = c.Check(t, d.t)
		if replaces && e.mentions(run, d.core, old) {
			c.Fail(t, term.IllTyped, "the definition of an assumption may not use it", nil, name)
		}
		d.code = eval.Compile(run, e, d.core, 0, 0, nil, nil)
		d.v = d.code.Eval(run, nil)
		d.folded = run.Fold(value.NewNeutral(&value.GlobalHead{Global: d}))
	})
	if err != nil {
		return err
	}
	if replaces {
		e.replace(old, d)
		return nil
	}
	if err := e.add([]string{name}, []any{d}); err != nil {
		err.Place = place
		return err
	}
	return nil
}

// mentions reports whether core uses old, also through definitions.
func (e *Engine) mentions(run *value.Run, core term.Core, old *definition) bool {
	seen := map[string]bool{}
	work := []term.Core{core}
	found := false
	for len(work) > 0 && !found {
		c := work[len(work)-1]
		work = work[:len(work)-1]
		term.Walk(c, func(a term.Arg) bool {
			run.Work(1)
			g, ok := a.(*term.Global)
			if !ok || seen[g.Name] {
				return !found
			}
			seen[g.Name] = true
			if d, ok := e.lookup(g.Name).(*definition); ok {
				found = found || d == old
				if c := d.coreOf(run); c != nil {
					work = append(work, c)
				}
				work = append(work, d.typeOf(run))
			}
			return !found
		})
	}
	return found
}

func (e *Engine) replace(old, d *definition) {
	e.mu.Lock()
	defer e.mu.Unlock()
	solved := make(map[value.Global]value.Global, len(e.solved)+1)
	for k, v := range e.solved {
		solved[k] = v
	}
	solved[old] = d
	e.solved = solved
	e.entries[d.name] = d
}

// Declare checks a data declaration and adds the data type and its
// constructors. Errors: those of checking, with kind BadDeclaration for what
// the theory refuses; Duplicate.
func (e *Engine) Declare(ctx context.Context, w *term.Declaration, options ...CallOption) error {
	if w == nil {
		return &term.Error{Kind: term.Malformed, Message: "the declaration is missing"}
	}
	names := []string{w.Name}
	places := []term.Place{w.Place}
	for _, k := range w.Constructors {
		names, places = append(names, k.Name), append(places, k.Place)
	}
	for k, name := range names {
		if err := e.name(name, places[k]); err != nil {
			return err
		}
		if e.lookup(name) != nil {
			return &term.Error{Kind: term.Duplicate, Place: places[k], Message: "this name is declared already", GotText: name}
		}
	}
	var d *prims.Data
	site := &value.Site{Kind: value.SiteDefinition, Name: w.Name, Place: w.Place}
	err := e.call(ctx, gather(options).as(value.CheckingSite, site), func(run *value.Run) {
		d = prims.Declare(e.checker(run, newContext()), w)
	})
	if err != nil {
		return err
	}
	d.Written = w
	xs := []any{d}
	for _, k := range d.Constructors {
		xs = append(xs, k)
	}
	if e.nat == nil && d.LooksLikeNaturals() {
		d.StoreAsNumbers()
		e.nat = d
	}
	if err := e.add(names, xs); err != nil {
		err.Place = w.Place
		return err
	}
	return nil
}
