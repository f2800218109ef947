package tally

import (
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Audit is an elimination without what it eliminates: a family, and a case for
// each constructor. It is also the frame that waits on a neutral.
type Audit struct {
	Family              value.Closure
	Settled, Due, Waive value.Case
}

// Support is the union of the parts'.
func (e *Audit) Support() value.Support {
	return e.Family.Support() | e.Settled.Support() | e.Due.Support() | e.Waive.Support()
}

// Frontier is empty: an audit waits for nothing but its tally.
func (e *Audit) Frontier() (frontier, faces value.Support) { return 0, 0 }

func (e *Audit) substitute(run *value.Run, s *value.Subst) *Audit {
	if s == nil {
		return e
	}
	return &Audit{e.Family.Substitute(run, s), e.Settled.SubstituteCase(run, s), e.Due.SubstituteCase(run, s), e.Waive.SubstituteCase(run, s)}
}

// Relabel delays s over the parts.
func (e *Audit) Relabel(run *value.Run, s *value.Subst) value.Frame { return e.substitute(run, s) }

// Resume eliminates v, on demand.
func (e *Audit) Resume(run *value.Run, v value.Value) value.Value {
	switch v := run.Force(v).(type) {
	case *Settled:
		run.Step()
		return e.Settled.ApplyAll(run, []value.Value{v.A})
	case *Due:
		run.Step()
		return e.Due.ApplyAll(run, []value.Value{v.Rest, e.Later(run, v.Rest)})
	case *Waive:
		run.Step()
		return e.Waive.ApplyAll(run, []value.Value{v.Rest, e.Later(run, v.Rest), value.DimensionOf(v.At)})
	case *Composite:
		run.Step()
		i := run.Fresh(e.Support() | v.Support())
		h := prims.Hfill(run, i, v.Type, v.Base, v.Walls)
		walls := v.Walls.Map(run, e.Support(), 0, func(run *value.Run, _ value.Name, u value.Value, cut *value.Subst) value.Value {
			return e.substitute(run, cut).Resume(run, u)
		})
		return prims.Comp(run, i, e.Family.Open(run, h), e.Later(run, v.Base), walls)
	case *value.Neutral:
		return v.Eliminate(run, e)
	default:
		run.Fault("audit of %T, which is no tally", v)
		return nil
	}
}

// Later is Resume in a cell.
func (e *Audit) Later(run *value.Run, v value.Value) value.Value {
	return run.Later(e.Support()|v.Support(), func(run *value.Run) value.Value { return e.Resume(run, v) })
}

// Type is the family at the neutral.
func (e *Audit) Type(run *value.Run, _ value.Value, n *value.Neutral) value.Value {
	return e.Family.Open(run, n)
}

// bindings makes binders for reading back and for comparing.
type bindings interface {
	Variable(hint string, t value.Value) value.Value
	Dimension(hint string) value.Name
}

// binders binds what the case of constructor k takes, and returns it with the
// type of the case.
func (e *Audit) binders(run *value.Run, t *Type, k int, b bindings) (env []value.Value, of value.Value) {
	if k == 0 {
		a := b.Variable("a", t.Of)
		return []value.Value{a}, e.Family.Open(run, &Settled{a})
	}
	u := b.Variable("u", t)
	env = []value.Value{u, b.Variable("h", e.Family.Open(run, u))}
	if k == 1 {
		return env, e.Family.Open(run, &Due{u})
	}
	i := b.Dimension("i")
	return append(env, value.DimensionName(i)), e.Family.Open(run, &Waive{u, interval.Var(i)})
}

func (e *Audit) cases() [3]value.Case { return [3]value.Case{e.Settled, e.Due, e.Waive} }

// ReadBack reads family and cases.
func (e *Audit) ReadBack(q value.Quoter, head value.Core, t value.Value) value.Core {
	run := q.Run()
	ty := run.Force(t).(*Type)
	args := []term.Arg{q.Variable(e.Family.Hint(), ty, func(x value.Value) value.Core { return q.Type(e.Family.Open(run, x)) }), head}
	for k, c := range e.cases() {
		args = append(args, q.Binders(func(b value.Binding) value.Core {
			env, of := e.binders(run, ty, k, b)
			return q.Term(of, c.OpenAll(run, env))
		}))
	}
	return op(auditSig, args...)
}

// Same compares family and cases.
func (e *Audit) Same(c value.Comparer, other value.Frame, t value.Value) bool {
	o, ok := other.(*Audit)
	run := c.Run()
	if !ok {
		return false
	}
	ty := run.Force(t).(*Type)
	if !c.Variable(e.Family.Hint(), ty, func(x value.Value) bool {
		return c.EqualTypes("the family", e.Family.Open(run, x), o.Family.Open(run, x))
	}) {
		return false
	}
	theirs := o.cases()
	for k, mine := range e.cases() {
		if !c.Binders(func(b value.Binding) bool {
			env, of := e.binders(run, ty, k, b)
			return c.Terms("the case of "+names[k], of, mine.OpenAll(run, env), theirs[k].OpenAll(run, env))
		}) {
			return false
		}
	}
	return true
}

var names = [3]string{"settled", "due", "waive"}
