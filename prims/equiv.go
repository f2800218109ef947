package prims

import (
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Fibers, contractibility and equivalences (CCHM 5), as types, and the
// equivalence between the ends of a line of types (CCHM 7.1).
//
//	Fiber (f:T→A) y  = Σ(x:T) Path A y (f x)
//	Contr X          = Σ(x:X) Π(y:X) Path X x y
//	Equiv T A        = Σ(f:T→A) Π(y:A) Contr (Fiber f y)

func captured(run *value.Run, r *value.Rule, vs ...value.Value) value.Closure {
	return value.NewCaptured(run, value.Captured{Rule: r, Values: vs})
}

// FiberType is the fiber of f : T → A over y.
func FiberType(run *value.Run, t, a, f, y value.Value) value.Value {
	return &Sigma{t, captured(run, fiberPath, a, f, y)}
}

var fiberPath = &value.Rule{Name: "x", Apply: fiberPathRule}

func fiberPathRule(run *value.Run, c *value.Captured, x value.Value) value.Value {
	a, f, y := c.Values[0], c.Values[1], c.Values[2]
	return &Path{value.Constant{V: a}, y, LaterApply(run, f, x)}
}

// ContrType says that X is contractible.
func ContrType(run *value.Run, x value.Value) value.Value {
	return &Sigma{x, captured(run, contraction, x)}
}

var contraction = &value.Rule{Name: "x", Apply: contractionRule}

func contractionRule(run *value.Run, c *value.Captured, center value.Value) value.Value {
	return &Pi{c.Values[0], captured(run, contractionPath, c.Values[0], center)}
}

var contractionPath = &value.Rule{Name: "y", Apply: contractionPathRule}

func contractionPathRule(_ *value.Run, c *value.Captured, y value.Value) value.Value {
	return &Path{value.Constant{V: c.Values[0]}, c.Values[1], y}
}

// EquivType is the type of equivalences from T to A.
func EquivType(run *value.Run, t, a value.Value) value.Value {
	return &Sigma{&Pi{t, value.Constant{V: a}}, captured(run, isEquivalence, t, a)}
}

var isEquivalence = &value.Rule{Name: "f", Apply: isEquivalenceRule}

func isEquivalenceRule(run *value.Run, c *value.Captured, f value.Value) value.Value {
	t, a := c.Values[0], c.Values[1]
	return &Pi{a, captured(run, contractibleFiber, t, a, f)}
}

var contractibleFiber = &value.Rule{Name: "y", Apply: contractibleFiberRule}

func contractibleFiberRule(run *value.Run, c *value.Captured, y value.Value) value.Value {
	return ContrType(run, FiberType(run, c.Values[0], c.Values[1], c.Values[2], y))
}

// lineEquivalence is the equivalence from L(0) to L(1) along the line i.L, whose
// map is transport, for L(i) = E(~i). It is a pair of which each part is made
// when it is asked for. With
//
//	u x i = tfill (i.L(i)) bot x @ i          v y i = transp (j. L(i ∨ ~j)) (i=1) y
//	b l i = fill (i.L(i)) (v y 0) [(l=0) ↦ i. v y i] [(l=1) ↦ i. u (v y 0) i] @ i
//	w k i = fill (i.L(~i)) (p @ k) [(k=0) ↦ i. v y (~i)] [(k=1) ↦ i. u x (~i)] @ i,   α k = w k 1
//
// the fibers are contractible by
//
//	λy. ((v y 0, ⟨l⟩ b l 1), λ(x,p). ⟨k⟩ (α k, ⟨l⟩ comp (i.L(i)) (α (k∧l)) [(l=0) ↦ i. v y i] [(l=1) ↦ i. u (α k) i]
//	                                                                    [(k=0) ↦ i. b l i] [(k=1) ↦ i. w l (~i)]))
type lineEquivalence struct {
	i value.Name
	e value.Value // E at i
}

// Support is the line's.
func (l *lineEquivalence) Support() value.Support { return l.e.Support().Without(l.i) }

// Substitute delays s over the line.
func (l *lineEquivalence) Substitute(run *value.Run, s *value.Subst) value.Value {
	i, under := run.Under(l.i, l.e.Support(), s, 0)
	return &lineEquivalence{i, run.Substitute(l.e, under)}
}

// line is L at i.
func (l *lineEquivalence) line(run *value.Run) value.Value {
	return run.At(l.e, l.i, interval.Var(l.i).Rev())
}

func (l *lineEquivalence) first(run *value.Run) value.Value {
	return &Lam{Body: value.NewCaptured(run, value.Captured{Rule: alongLine, I: l.i, Line: []value.Value{l.line(run)}})}
}

func (l *lineEquivalence) second(run *value.Run) value.Value {
	return &Lam{Body: value.NewCaptured(run, value.Captured{Rule: lineFibers, I: l.i, Line: []value.Value{l.line(run)}})}
}

// mapped is e.1 x, on demand.
func mapped(run *value.Run, e, x value.Value) value.Value {
	if l, ok := run.Force(e).(*lineEquivalence); ok {
		run.Take(value.StepApply)
		if run.Followed() {
			return alongFollowed(run, l.i, l.line(run), x)
		}
		return alongLineAt(run, l.i, l.line(run), x)
	}
	return Apply(run, First(run, e), x)
}

// center is (e.2 y).1.1, the element that e's map sends to y up to a path, on demand.
func center(run *value.Run, e, y value.Value) value.Value {
	if l, ok := run.Force(e).(*lineEquivalence); ok {
		run.Take(value.StepApply)
		if run.Followed() {
			return alongFollowed(run, l.i, l.e, y)
		}
		return Transp(run, l.i, l.e, interval.Bot(), y) // v y 0
	}
	return First(run, First(run, Apply(run, Second(run, e), y)))
}

var alongLine = &value.Rule{Name: "x", Apply: alongLineRule}

func alongLineRule(run *value.Run, c *value.Captured, x value.Value) value.Value {
	return alongLineAt(run, c.I, c.Line[0], x)
}

func alongLineAt(run *value.Run, i value.Name, l, x value.Value) value.Value {
	return Transp(run, i, l, interval.Bot(), x)
}

var lineFibers = &value.Rule{Name: "y", Apply: lineFibersRule}

func lineFibersRule(run *value.Run, c *value.Captured, y value.Value) value.Value {
	i, line := c.I, c.Line[0]
	l := run.Fresh(line.Support() | y.Support() | interval.Single(i))
	v0 := Backward(run, i, line, interval.Bot(), y)
	end := lineFiberPath(run, i, line, y, v0, l)
	center := NewPair(v0, over(l, run.At(end, i, interval.One())))
	return NewPair(center, &Lam{Body: value.NewCaptured(run, value.Captured{Rule: lineContraction, Values: []value.Value{y}, I: i, Line: c.Line})})
}

// lineFiberPath is b l i, at l and i.
func lineFiberPath(run *value.Run, i value.Name, line, y, v0 value.Value, l value.Name) value.Value {
	v := Backfill(run, i, line, interval.Bot(), y)
	u := Tfill(run, i, line, interval.Bot(), v0)
	walls := value.System{}.Line(run, interval.Eq0(l), i, v).Line(run, interval.Eq1(l), i, u)
	return Fill(run, i, line, v0, walls)
}

var lineContraction = &value.Rule{Name: "p", Apply: lineContractionRule}

func lineContractionRule(run *value.Run, c *value.Captured, xp value.Value) value.Value {
	i, line, y := c.I, c.Line[0], c.Values[0]
	x, p := LaterFirst(run, xp), LaterSecond(run, xp)
	used := line.Support() | y.Support() | xp.Support() | interval.Single(i)
	k := run.Fresh(used)
	l := run.Fresh(used | interval.Single(k))
	atK, atL := interval.Var(k), interval.Var(l)
	flip := interval.Assign(i, interval.Var(i).Rev())

	v := Backfill(run, i, line, interval.Bot(), y) // v y i
	v0 := Backward(run, i, line, interval.Bot(), y)
	w := Fill(run, i, run.Substitute(line, flip), LaterAt(run, p, atK), // w k i
		value.System{}.Line(run, interval.Eq0(k), i, run.Substitute(v, flip)).
			Line(run, interval.Eq1(k), i, run.Substitute(Tfill(run, i, line, interval.Bot(), x), flip)))
	alpha := run.At(w, i, interval.One()) // α k
	walls := value.System{}.
		Line(run, interval.Eq0(l), i, v).
		Line(run, interval.Eq1(l), i, Tfill(run, i, line, interval.Bot(), alpha)).
		Line(run, interval.Eq0(k), i, lineFiberPath(run, i, line, y, v0, l)).
		Line(run, interval.Eq1(k), i, run.Substitute(run.Substitute(w, interval.Assign(k, atL)), flip))
	square := LaterComp(run, i, line, run.At(alpha, k, atK.Min(atL)), walls)
	return over(k, NewPair(alpha, over(l, square)))
}
