package prims

import (
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// The operations of every type, and those that are derived from them by
// definition (CCHM 4.4, CHM 2). A line of types is a name i and the type at i;
// a result "at i" mentions i. Operations called Later… do no work before
// somebody looks.

// Hcomp is hcomp A base walls. One rule of the type's former at the most is
// applied; where the type is neutral, so is the composite.
func Hcomp(run *value.Run, a, base value.Value, walls value.System) value.Value {
	if w, ok := walls.Top(); ok {
		return w.End(run)
	}
	t := run.Force(a)
	var back value.Back // what the run came from, where it is traced
	if run.Watched() {
		if run.Observed() && !run.Reporting() {
			return hcompObserved(run, t, base, walls)
		}
		former, _ := t.(value.Type)
		back = run.InHcomp(former)
	}
	switch t := t.(type) {
	case value.Type:
		run.Composite(t)
		return run.Left(back, t.Hcomp(run, base, walls))
	case *value.Neutral:
		run.Composite(nil)
		frontier, faces := t.Frontier()
		return run.Left(back, stuckHcomp(t, base, walls, frontier, faces))
	default:
		run.Fault("hcomp at %T, which is no type", t)
		return nil
	}
}

// LaterHcomp is Hcomp in a cell.
func LaterHcomp(run *value.Run, a, base value.Value, walls value.System) value.Value {
	if w, ok := walls.Top(); ok {
		return w.End(run)
	}
	if n := sameNumbers(run, base, walls); n != nil {
		return n
	}
	w := &laterComposite{a: a, base: base, walls: walls, straight: true}
	return run.LaterWork(a.Support()|base.Support()|walls.Support(), &w.Pending, w)
}

// Transp is transp (i.A) φ v.
func Transp(run *value.Run, i value.Name, a value.Value, phi interval.Face, v value.Value) value.Value {
	if phi.IsTop() {
		return v
	}
	i, a = FreshLine(run, i, a, phi.Support()|v.Support())
	t := run.Force(a)
	var back value.Back // what the run came from, where it is traced
	if run.Watched() {
		if run.Observed() && !run.Reporting() {
			return transpObserved(run, i, t, phi, v)
		}
		former, _ := t.(value.Type)
		back = run.InTransp(former)
	}
	switch t := t.(type) {
	case value.Type:
		run.Transport(t)
		return run.Left(back, t.Transp(run, i, phi, v))
	case *value.Neutral:
		run.Transport(nil)
		return run.Left(back, stuckTransp(i, t, phi, v))
	default:
		run.Fault("transp along %T, which is no type", t)
		return nil
	}
}

// LaterTransp is Transp in a cell.
func LaterTransp(run *value.Run, i value.Name, a value.Value, phi interval.Face, v value.Value) value.Value {
	if phi.IsTop() {
		return v
	}
	w := &laterTransp{i: i, a: a, phi: phi, v: v}
	return run.LaterWork(a.Support().Without(i)|phi.Support()|v.Support(), &w.Pending, w)
}

// FreshLine is the line i.A with its name outside avoid.
func FreshLine(run *value.Run, i value.Name, a value.Value, avoid value.Support) (value.Name, value.Value) {
	if !avoid.Has(i) {
		return i, a
	}
	j := run.Fresh(avoid | a.Support() | interval.Single(i))
	return j, run.At(a, i, interval.Var(j))
}

// Comp is
//
//	comp (i.A) u0 [φ ↦ i.u] = hcomp A(1) (transp (i.A) bot u0) [φ ↦ i. transp (j.A(i∨j)) (i=1) u]
func Comp(run *value.Run, i value.Name, a, base value.Value, walls value.System) value.Value {
	if w, ok := walls.Top(); ok {
		return w.End(run)
	}
	if !a.Support().Has(i) && isStill(run.Force(a)) {
		return Hcomp(run, a, base, walls)
	}
	a1, u0, us := compParts(run, i, a, base, walls)
	return Hcomp(run, a1, u0, us)
}

// isStill reports whether every transport along the constant line at t, which is
// forced, is the identity by definition.
func isStill(t value.Value) bool {
	switch t := t.(type) {
	case *Universe:
		return true
	case *DataType:
		return len(t.Params) == 0
	}
	return t == value.Value(UnitType)
}

// LaterComp is Comp in a cell.
func LaterComp(run *value.Run, i value.Name, a, base value.Value, walls value.System) value.Value {
	if w, ok := walls.Top(); ok {
		return w.End(run)
	}
	w := &laterComposite{i: i, a: a, base: base, walls: walls}
	return run.LaterWork(a.Support().Without(i)|base.Support()|walls.Support(), &w.Pending, w)
}

func compParts(run *value.Run, i value.Name, a, base value.Value, walls value.System) (a1, u0 value.Value, us value.System) {
	i, a = FreshLine(run, i, a, base.Support()|walls.Support())
	a1 = run.At(a, i, interval.One())
	u0 = LaterTransp(run, i, a, interval.Bot(), base)
	us = walls.MapLines(run, a.Support().Without(i), interval.Single(i), func(run *value.Run, k value.Name, u value.Value, cut *value.Subst) value.Value {
		line := run.Substitute(a, cut)
		j := run.Fresh(line.Support() | u.Support() | interval.Single(k))
		at := run.At(line, i, interval.Var(k).Max(interval.Var(j)))
		return Transp(run, j, at, interval.Eq1(k), u)
	})
	return a1, u0, us
}

// Hfill is, at i,
//
//	hfill A u0 [φ ↦ i.u] @ i = hcomp A u0 [φ ↦ j. u(i∧j)] [(i=0) ↦ _. u0]
//
// in a cell; i is fresh for everything.
func Hfill(run *value.Run, i value.Name, a, base value.Value, walls value.System) value.Value {
	return LaterHcomp(run, a, base, fillWalls(run, interval.Var(i), base, walls))
}

// HfillAt is hfill at any dimension.
func HfillAt(run *value.Run, r interval.Dim, a, base value.Value, walls value.System) value.Value {
	return LaterHcomp(run, a, base, fillWalls(run, r, base, walls))
}

// Fill is, at i,
//
//	fill (i.A) u0 [φ ↦ i.u] @ i = comp (j.A(i∧j)) u0 [φ ↦ j. u(i∧j)] [(i=0) ↦ _. u0]
//
// in a cell; i is fresh for base and walls and is the name of the line.
func Fill(run *value.Run, i value.Name, a, base value.Value, walls value.System) value.Value {
	return FillAt(run, interval.Var(i), i, a, base, walls)
}

// FillAt is fill along the line i.A at any dimension.
func FillAt(run *value.Run, r interval.Dim, i value.Name, a, base value.Value, walls value.System) value.Value {
	j := run.Fresh(a.Support() | interval.Single(i) | r.Support() | base.Support() | walls.Support())
	line := run.At(a, i, r.Min(interval.Var(j)))
	return LaterComp(run, j, line, base, fillWalls(run, r, base, walls))
}

// fillWalls is [φ ↦ j. u(r∧j)] [(r=0) ↦ _. u0].
func fillWalls(run *value.Run, r interval.Dim, base value.Value, walls value.System) value.System {
	out := make(value.System, 0, len(walls)+1)
	for _, w := range walls {
		w = w.Avoiding(run, r.Support())
		// on w's face r is what that face leaves of it
		at := r.Subst(w.Cube.Restriction()).Min(interval.Var(w.I))
		out = append(out, value.Wall{Cube: w.Cube, I: w.I, Body: run.At(w.Body, w.I, at)})
	}
	return out.Constant(run, r.Is0(), base)
}

// Tfill is, at i,
//
//	tfill (i.A) φ v @ i = transp (j.A(i∧j)) (φ ∨ (i=0)) v
//
// in a cell; i is fresh for φ and v and is the name of the line.
func Tfill(run *value.Run, i value.Name, a value.Value, phi interval.Face, v value.Value) value.Value {
	return TfillAt(run, interval.Var(i), i, a, phi, v)
}

// TfillAt is tfill along the line i.A at any dimension.
func TfillAt(run *value.Run, r interval.Dim, i value.Name, a value.Value, phi interval.Face, v value.Value) value.Value {
	j := run.Fresh(a.Support() | interval.Single(i) | r.Support() | phi.Support() | v.Support())
	return LaterTransp(run, j, run.At(a, i, r.Min(interval.Var(j))), phi.Or(r.Is0()), v)
}

// Backfill is, at i, the filler that ends in v at 1:
//
//	transp (j. A(i ∨ ~j)) (φ ∨ (i=1)) v
//
// in a cell; i is fresh for φ and v and is the name of the line.
func Backfill(run *value.Run, i value.Name, a value.Value, phi interval.Face, v value.Value) value.Value {
	j := run.Fresh(a.Support() | interval.Single(i) | phi.Support() | v.Support())
	line := run.At(a, i, interval.Var(i).Max(interval.Var(j).Rev()))
	return LaterTransp(run, j, line, phi.Or(interval.Eq1(i)), v)
}

// Backward is Backfill at 0: transp (j. A(~j)) φ v, in a cell.
func Backward(run *value.Run, i value.Name, a value.Value, phi interval.Face, v value.Value) value.Value {
	j := run.Fresh(a.Support() | interval.Single(i) | phi.Support() | v.Support())
	return LaterTransp(run, j, run.At(a, i, interval.Var(j).Rev()), phi, v)
}
