package kit

import (
	"context"
	"fmt"
	"slices"

	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
)

// The laws about variables, eliminations, equal inputs and evaluation itself.

// variables: commuting with putting values for variables.
func (t *trial) variables() *Failure {
	for k, v := range t.x.Variables {
		if v.Value == nil {
			continue
		}
		g := NewGen(FromSeed(uint64(len(t.x.Variables))))
		g.scope.prefix = "v"
		val := v.Value(g)
		wrap := func(w *term.Written) *term.Written { return term.Let(v.Name, v.Type, val, w) }
		vars := append(append([]Variable(nil), t.x.Variables[:k]...), g.Variables()...)
		for _, u := range t.x.Variables[k+1:] {
			u.Type = wrap(u.Type)
			vars = append(vars, u)
		}
		to, err := t.es.world(t.build, vars, t.x.Dimensions)
		if err != nil {
			t.es.unfit++ // a later variable's type may need more of this one than the value has
			continue
		}
		put, err := to.check(val, v.Type)
		if err != nil {
			t.es.unfit++
			continue
		}
		t.es.put++
		for _, s := range t.subjects() {
			if f := t.valueFor(to, v.Name, put.v, s, wrap(s.w), v.Name+" := "+val.String()); f != nil {
				return f
			}
		}
	}
	return nil
}

// valueFor compares the normal form of a subject, evaluated with a value for a
// variable, with the subject where the variable is defined.
func (t *trial) valueFor(to *world, name string, put value.Value, s subject, defined *term.Written, where string) *Failure {
	x, err := t.value(s.w)
	if err != nil {
		return t.failure(LawVariables, where, err)
	}
	r, err := to.infer(defined)
	if err != nil {
		return nil // walls that agreed for a variable's sake
	}
	n, err := t.w.normal(x)
	if err != nil {
		return t.failure(LawVariables, where, err)
	}
	var env []value.Value
	for _, v := range t.w.vars {
		if v == name {
			env = append(env, put)
			continue
		}
		y, err := to.infer(term.Name(v))
		if err != nil {
			return t.failure(LawVariables, where, err)
		}
		env = append(env, y.v)
	}
	for k := range to.dims {
		env = append(env, value.DimensionName(value.Name(k)))
	}
	var v value.Value
	err = to.run(func(run *value.Run) error {
		nv, nd := len(t.w.vars), len(to.dims)
		v = run.Force(eval.Compile(run, to.e, n, nv, nd, eval.Levels(nv), eval.Levels(nd)).Eval(run, env))
		return nil
	})
	if err != nil {
		return t.failure(LawVariables, where, err)
	}
	f := t.agree(LawVariables, to, r.t, v, r.v, s.what, where, "the normal form, with the value put in")
	if f != nil {
		f.Kind = "a value for a variable"
	}
	return f
}

// eliminators: what the former claims about them.
func (t *trial) eliminators() *Failure {
	op := t.x.Term()
	x, err := t.value(op)
	if err != nil {
		return t.failure(LawEliminators, "", err)
	}
	of := func(e Elimination) func(x, at *term.Written) *term.Written {
		return func(y, at *term.Written) *term.Written { return t.x.Eliminate(e, y, at) }
	}
	for _, e := range t.x.Eliminations {
		l, err := t.value(t.x.Eliminate(e, op, oneEnd))
		if err != nil {
			return t.failure(LawEliminators, e.Name, err)
		}
		var claim *term.Written
		claimed := false
		switch {
		case t.x.Op == Hcomp && e.Composite != nil:
			claim, claimed = e.Composite(t.x.Box(), of(e)), true
		case t.x.Op == Transp && e.Transport != nil:
			claim, claimed = e.Transport(t.x.Transport(), of(e)), true
		case t.x.Op == Comp:
			continue
		}
		if !claimed {
			if stuck(x.v) && !stuck(l.v) {
				return &Failure{Law: LawEliminators, Instance: t.x, What: e.Name + " of the " + t.x.Op.String(), Made: "the former claims that it waits, and it does not", Left: t.normalText(l)}
			}
			continue
		}
		r, err := t.w.infer(claim)
		if err != nil {
			return t.failure(LawEliminators, "the claim for "+e.Name, err)
		}
		if f := t.agree(LawEliminators, t.w, l.t, l.v, r.v, e.Name+" of the "+t.x.Op.String(), "", "the elimination (right: what the former claims)"); f != nil {
			return f
		}
	}
	return nil
}

func (t *trial) normalText(x element) *term.Written {
	n, err := t.w.normal(x)
	if err != nil {
		return term.Name("(" + err.Error() + ")")
	}
	return t.w.write(n)
}

// congruence: the operation on normal forms of its inputs, and eliminations of
// normal forms.
func (t *trial) congruence() *Failure {
	op, err := t.value(t.x.Term())
	if err != nil {
		return t.failure(LawCongruence, "", err)
	}
	y, err := t.normalInputs()
	if err != nil {
		return t.failure(LawCongruence, "the normal forms of the inputs", err)
	}
	r, err := t.w.infer(y.Term())
	if err != nil {
		return t.failure(LawCongruence, "the operation on the normal forms of its inputs", err)
	}
	if f := t.agree(LawCongruence, t.w, op.t, op.v, r.v, "the "+t.x.Op.String(), "", "the operation (right: on the normal forms of its inputs)"); f != nil {
		return f
	}
	for _, e := range t.x.Eliminations {
		for _, on := range []struct {
			of, at *term.Written
			what   string
		}{{t.x.Term(), oneEnd, "the " + t.x.Op.String()}, {term.Ann(t.x.Base, t.x.TypeAt(zero)), zero, "the base"}} {
			x, err := t.value(on.of)
			if err != nil {
				return t.failure(LawCongruence, e.Name, err)
			}
			l, err := t.value(t.x.Eliminate(e, on.of, on.at))
			if err != nil {
				return t.failure(LawCongruence, e.Name, err)
			}
			n, err := t.w.normal(x)
			if err != nil {
				return t.failure(LawCongruence, e.Name, err)
			}
			r, err := t.w.infer(t.x.Eliminate(e, term.Ann(t.w.write(n), t.x.TypeAt(on.at)), on.at))
			if err != nil {
				return t.failure(LawCongruence, e.Name, err)
			}
			if f := t.agree(LawCongruence, t.w, l.t, l.v, r.v, e.Name+" of "+on.what, "", "the elimination (right: of its normal form)"); f != nil {
				return f
			}
		}
	}
	return nil
}

// normalInputs is the instance with the normal forms of its parts.
func (t *trial) normalInputs() (*Instance, error) {
	y := *t.x
	line := t.w
	if t.x.Op != Hcomp {
		var err error
		if line, err = t.w.with(direction); err != nil {
			return nil, err
		}
	}
	normal := func(w *world, x element, err error) (*term.Written, error) {
		if err != nil {
			return nil, err
		}
		n, err := w.normal(x)
		if err != nil {
			return nil, err
		}
		return w.write(n), nil
	}
	x, err := line.infer(t.x.Type)
	if y.Type, err = normal(line, x, err); err != nil {
		return nil, err
	}
	x, err = t.w.check(t.x.Base, t.x.TypeAt(zero))
	if y.Base, err = normal(t.w, x, err); err != nil {
		return nil, err
	}
	y.Walls = nil
	for _, w := range t.x.Walls {
		s, err := t.w.scope.Assume(context.Background(), w.Face, t.w.call()...)
		if err != nil {
			return nil, err
		}
		here := *t.w
		here.scope = s
		under, err := here.with(direction)
		if err != nil {
			return nil, err
		}
		x, err := under.check(w.Body, t.x.Type)
		if w.Body, err = normal(under, x, err); err != nil {
			return nil, err
		}
		y.Walls = append(y.Walls, w)
	}
	return &y, nil
}

// systems: the walls in another order, with one that another implies.
func (t *trial) systems() *Failure {
	if t.x.Op == Transp || len(t.x.Walls) == 0 {
		return nil
	}
	op, err := t.value(t.x.Term())
	if err != nil {
		return t.failure(LawSystems, "", err)
	}
	y := *t.x
	y.Walls = slices.Clone(t.x.Walls)
	slices.Reverse(y.Walls)
	for _, d := range t.x.Dimensions {
		w := t.x.Walls[0]
		if slices.ContainsFunc(w.Ends, func(e End) bool { return e.Dimension == d }) {
			continue
		}
		more := append(slices.Clone(w.Ends), End{d, false})
		w.Face = term.And(w.Face, term.Eq(term.Name(d), 0))
		w.Ends, w.Body = more, Replace(w.Body, cut(more))
		y.Walls = append(y.Walls, w)
	}
	r, err := t.w.infer(y.Term())
	if err != nil {
		return t.failure(LawSystems, "", err)
	}
	return t.agree(LawSystems, t.w, op.t, op.v, r.v, "the "+t.x.Op.String(), "", "the walls as drawn (right: in another order)")
}

// eta: an element equals its expansion.
func (t *trial) eta() *Failure {
	if t.x.Expand == nil {
		return nil
	}
	for _, on := range []struct {
		w, at *term.Written
		what  string
	}{{t.x.Term(), oneEnd, "the " + t.x.Op.String()}, {term.Ann(t.x.Base, t.x.TypeAt(zero)), zero, "the base"}} {
		l, err := t.value(on.w)
		if err != nil {
			return t.failure(LawEta, "", err)
		}
		r, err := t.w.check(Replace(t.x.Expand(on.w), map[string]*term.Written{height: t.x.heightAt(on.at)}), t.x.TypeAt(on.at))
		if err != nil {
			return t.failure(LawEta, "the expansion of "+on.what, err)
		}
		if f := t.agree(LawEta, t.w, l.t, l.v, r.v, on.what, "", "the element (right: its expansion)"); f != nil {
			return f
		}
	}
	return nil
}

// order: other builds give the same normal forms, and so does asking again.
func (t *trial) order() *Failure {
	for _, s := range t.subjects() {
		x, err := t.value(s.w)
		if err != nil {
			return t.failure(LawOrder, s.what, err)
		}
		n, err := t.w.normal(x)
		if err != nil {
			return t.failure(LawOrder, s.what, err)
		}
		if again, err := t.w.normal(x); err == nil && !term.Same(n, again) {
			return &Failure{Law: LawOrder, Instance: t.x, What: s.what, Where: "asked again", Left: t.w.write(n), Right: t.w.write(again)}
		}
		for _, b := range builds {
			w, err := t.es.world(b, t.x.Variables, t.x.Dimensions)
			if err != nil {
				return t.failure(LawOrder, b.name, err)
			}
			y, err := w.infer(s.w)
			if err != nil {
				if f := t.failure(LawOrder, b.name, fmt.Errorf("%s: %w", b.name, err)); f != nil {
					return f
				}
				continue
			}
			m, err := w.normal(y)
			if err != nil {
				if f := t.failure(LawOrder, b.name, fmt.Errorf("%s: %w", b.name, err)); f != nil {
					return f
				}
				continue
			}
			if l, r := t.w.write(n), w.write(m); !SameUpToNames(l, r) {
				return &Failure{Law: LawOrder, Instance: t.x, What: s.what, Where: b.name, Made: t.build.name + " (right: " + b.name + ")", Left: l, Right: r}
			}
		}
	}
	return nil
}
