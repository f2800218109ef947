package prims

import (
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Composition and transport at data types.
//
// strict (CCHM 4.5 for naturals): where the base and every wall, each under its
// own face and at a generic i, show the same constructor,
//
//	hcomp D (c a⃗) [φ ↦ i. c u⃗] = c b⃗
//
// b⃗ composing the arguments from left to right: hcomp for an argument whose
// declared type mentions no earlier argument, otherwise comp over the earlier
// fillers. Otherwise the composite is neutral.
//
// formal (CHM 3): the composite is one more canonical element.
//
// Transport along a line of parameters i ⊢ Δ(i) (CHM 3.4):
//
//	transp (i.D) φ (c a⃗) = c â(1),   â = tfill of the arguments, from left to right
//
// for point constructors, and for path constructors that commute with
// transport, their dimensions unchanged; for the others
//
//	transp (i.D) φ (c a⃗ r⃗) = hcomp D(1) (c â(1) r⃗) [φ ↦ _. c a⃗ r⃗] [ψₖ ↦ j. transp (i. D(i ∨ ~j)) (φ ∨ (j=0)) eₖ(~j, â(~j), r⃗)]
//
// and transport commutes with formal composites.

// Hcomp is by the declaration's treatment.
func (t *DataType) Hcomp(run *value.Run, base value.Value, walls value.System) value.Value {
	if t.Data.Formal {
		return &Formal{t, base, walls, t.support | base.Support() | walls.Support()}
	}
	if t.Data.Numerals && !run.Plain.NoNumerals {
		if v, ok := t.hcompNumbers(run, base, walls); ok {
			return v
		}
		return t.stuck(base, walls)
	}
	c, args, ok := shown(run, run.Force(base), new([1]value.Value))
	if !ok {
		return t.stuck(base, walls)
	}
	if len(walls) == 0 && numbers(run, args) {
		return run.Force(base) // which the composites of its arguments would make again
	}
	parts := make([][]value.Value, len(walls)) // the arguments of each wall, under its dimension
	for k, w := range walls {
		d, us, ok := shown(run, run.Force(w.Body), new([1]value.Value))
		if !ok || d != c {
			return t.stuck(base, walls)
		}
		parts[k] = us
	}
	i := run.Fresh(t.support | supportOf(args) | walls.Support())
	composed := make([]value.Value, len(args))
	fillers := make([]value.Value, len(args)) // at i
	for n := range args {
		us := make(value.System, len(walls))
		for k, w := range walls {
			us[k] = value.Wall{Cube: w.Cube, I: w.I, Body: parts[k][n]}
		}
		if c.Args[n].Dependent {
			a := c.Args[n].At(run, t.Params, fillers)
			composed[n] = LaterComp(run, i, a, args[n], us)
			fillers[n] = Fill(run, i, a, args[n], us)
		} else {
			a := c.Args[n].At(run, t.Params, args) // the same at all arguments
			composed[n] = LaterHcomp(run, a, args[n], us)
			fillers[n] = Hfill(run, i, a, args[n], us)
		}
	}
	return NewCon(run, c, nil, composed, nil)
}

// numbers reports whether all of vs are known to be numerals.
func numbers(run *value.Run, vs []value.Value) bool {
	for _, v := range vs {
		if _, ok := value.Peek(v).(*Number); !ok {
			return false
		}
	}
	return !run.Plain.NoNumerals
}

// stuck waits for anything in the base or the walls.
func (t *DataType) stuck(base value.Value, walls value.System) value.Value {
	all := base.Support() | t.support
	for _, w := range walls {
		all |= w.Body.Support().Without(w.I)
	}
	return stuckHcomp(t, base, walls, all, all)
}

// Transp commutes with constructors and formal composites.
func (t *DataType) Transp(run *value.Run, i value.Name, phi interval.Face, v value.Value) value.Value {
	if len(t.Params) == 0 {
		return v
	}
	switch v := run.Force(v).(type) {
	case *Con:
		if len(v.Dims) > 0 && !v.Of.Commutes {
			return t.transpCorrected(run, i, phi, v)
		}
		args, _ := t.transpArgs(run, i, phi, v)
		return NewCon(run, v.Of, t.paramsAt(run, i, interval.One()), args, v.Dims)
	case *Number, *Successors:
		return v
	case *Formal:
		walls := v.Walls.Map(run, t.support.Without(i)|phi.Support(), interval.Single(i), func(run *value.Run, _ value.Name, u value.Value, cut *value.Subst) value.Value {
			return Transp(run, i, run.Substitute(t, cut), phi.Subst(cut), u)
		})
		return Hcomp(run, run.At(t, i, interval.One()), LaterTransp(run, i, t, phi, v.Base), walls)
	case *value.Neutral:
		return v.Eliminate(run, &transpFrame{i, t, phi})
	default:
		run.Fault("transport of %T at a data type", v)
		return nil
	}
}

func (t *DataType) paramsAt(run *value.Run, i value.Name, d interval.Dim) []value.Value {
	return run.SubstituteAll(t.Params, interval.Assign(i, d))
}

// transpArgs are the arguments transported, and their fillers at i.
func (t *DataType) transpArgs(run *value.Run, i value.Name, phi interval.Face, v *Con) (at1, fillers []value.Value) {
	at1 = make([]value.Value, len(v.Args))
	fillers = make([]value.Value, len(v.Args))
	for n, arg := range v.Args {
		a := v.Of.Args[n].At(run, t.Params, fillers)
		at1[n] = LaterTransp(run, i, a, phi, arg)
		fillers[n] = Tfill(run, i, a, phi, arg)
	}
	return at1, fillers
}

// transpCorrected corrects the boundary of a path constructor by a composite.
func (t *DataType) transpCorrected(run *value.Run, i value.Name, phi interval.Face, v *Con) value.Value {
	at1, fillers := t.transpArgs(run, i, phi, v)
	params1 := t.paramsAt(run, i, interval.One())
	base := NewCon(run, v.Of, params1, at1, v.Dims)
	walls := make(value.System, 0, 4).Constant(run, phi, v)

	j := run.Fresh(t.support | v.support | phi.Support() | interval.Single(i))
	back := interval.Assign(i, interval.Var(j).Rev())
	params, args := run.SubstituteAll(t.Params, back), run.SubstituteAll(fillers, back)
	s := dimensionSubst(v.Dims)
	for _, b := range v.Of.Boundary {
		face := b.Cube.Subst(s)
		for k := range face.Len() {
			cube := face.Cube(k)
			cut := cube.Restriction()
			dims := make([]interval.Dim, len(v.Dims))
			for n, d := range v.Dims {
				dims[n] = d.Subst(cut)
			}
			e := b.Element.OpenAll(run, environment(run.SubstituteAll(params, cut), run.SubstituteAll(args, cut), dims))
			line := run.At(run.Substitute(t, cut), i, interval.Var(i).Max(interval.Var(j).Rev()))
			walls = append(walls, value.Wall{Cube: cube, I: j, Body: LaterTransp(run, i, line, phi.Subst(cut).Or(interval.Eq0(j)), e)})
		}
	}
	return Hcomp(run, run.At(t, i, interval.One()), base, walls)
}

// transpFrame is a transport that waits for an element of a data type.
type transpFrame struct {
	i   value.Name
	t   value.Value // at i
	phi interval.Face
}

func (f *transpFrame) Support() value.Support { return f.t.Support().Without(f.i) | f.phi.Support() }
func (f *transpFrame) Frontier() (frontier, faces value.Support) {
	return f.phi.Support(), f.phi.Support()
}

func (f *transpFrame) Relabel(run *value.Run, s *value.Subst) value.Frame {
	phi := f.phi.Subst(s)
	i, under := run.Under(f.i, f.t.Support(), s, phi.Support())
	return &transpFrame{i, run.Substitute(f.t, under), phi}
}

func (f *transpFrame) Resume(run *value.Run, head value.Value) value.Value {
	return Transp(run, f.i, f.t, f.phi, head)
}

func (f *transpFrame) Type(run *value.Run, _ value.Value, _ *value.Neutral) value.Value {
	return run.At(f.t, f.i, interval.One())
}

func (f *transpFrame) ReadBack(q value.Quoter, head value.Core, _ value.Value) value.Core {
	run := q.Run()
	line := q.Dimension("i", func(k value.Name) value.Core { return q.Type(run.At(f.t, f.i, interval.Var(k))) })
	return op(transpSig, line, &term.Face{Face: f.phi}, head)
}

func (f *transpFrame) Same(c value.Comparer, other value.Frame, _ value.Value) bool {
	o, ok := other.(*transpFrame)
	return ok && sameLine(c, f.i, f.t, o.i, o.t) && sameFace(c, f.phi, o.phi)
}
