package value

import "example.com/boxwright/value/interval"

// Case is a body waiting for several arguments at once: a case of an
// elimination. Like a Closure it is data.
type Case interface {
	Support() Support
	SubstituteCase(run *Run, s *Subst) Case
	// ApplyAll evaluates the body; it may keep the arguments but not the slice.
	ApplyAll(run *Run, args []Value) Value
	// OpenAll is ApplyAll without doing any work.
	OpenAll(run *Run, args []Value) Value
	// Enter returns a call frame (Run.Frame) whose first slots, as many as the
	// arity, are for the arguments; Eval evaluates the body in it, as often as
	// the caller likes, who then releases it.
	Enter(run *Run) []Value
	Eval(run *Run, frame []Value) Value
	// Arity is the number of arguments.
	Arity() int
	// HintAt is the host's name of argument k.
	HintAt(k int) string
	// AsClosure is a case of one argument as a closure.
	AsClosure() Closure
	// Uses reports whether the body mentions argument k; where it does not,
	// anything may be passed.
	Uses(k int) bool
	// StrictIn reports whether the body evaluates its argument k in any case.
	// Asking may evaluate captured functions that the body evaluates anyway.
	StrictIn(run *Run, k int) bool
}

// Lam is a function as a value, over a type or over the interval.
type Lam struct{ Body Closure }

// Support is the closure's.
func (l *Lam) Support() Support { return l.Body.Support() }

// Substitute delays s over the closure.
func (l *Lam) Substitute(run *Run, s *Subst) Value { return &Lam{Body: l.Body.Substitute(run, s)} }

// Strict reports whether the function evaluates its argument in any case.
func (l *Lam) Strict(run *Run) bool { return l.Body.Strict(run) }

// Uses reports whether a closure may look at its argument.
func Uses(c Closure) bool {
	switch c := c.(type) {
	case Constant:
		return false
	case interface{ Uses(k int) bool }:
		return c.Uses(0)
	}
	return true
}

// Line is a closure over a dimension that is a value under a bound name: what
// the Kan rules make. The body is evaluated once, at the name, and substituted.
type Line struct {
	I    Name
	Body Value
	Name string // for printing
}

// Support is that of the body without the bound name.
func (l *Line) Support() Support { return l.Body.Support().Without(l.I) }

// Substitute renames the bound name where an image mentions it.
func (l *Line) Substitute(run *Run, s *Subst) Closure {
	i, under := run.Under(l.I, l.Body.Support(), s, 0)
	body := run.Substitute(l.Body, under)
	if body == l.Body {
		return l
	}
	return &Line{i, body, l.Name}
}

// Apply puts the dimension in.
func (l *Line) Apply(run *Run, arg Value) Value {
	return run.At(l.Body, l.I, arg.(*Dimension).Dim)
}

// Open puts the dimension in; the substitution is delayed either way.
func (l *Line) Open(run *Run, arg Value) Value { return l.Apply(run, arg) }

// Hint is the name for printing.
func (l *Line) Hint() string { return l.Name }

// Strict is false: a dimension needs no evaluation.
func (l *Line) Strict(*Run) bool { return false }

// Constant is a closure that does not look at its argument.
type Constant struct{ V Value }

// Support is the value's.
func (c Constant) Support() Support { return c.V.Support() }

// Substitute delays s over the value.
func (c Constant) Substitute(run *Run, s *Subst) Closure { return Constant{run.Substitute(c.V, s)} }

// Apply returns the value.
func (c Constant) Apply(*Run, Value) Value { return c.V }

// Open returns the value.
func (c Constant) Open(*Run, Value) Value { return c.V }

// Hint is none.
func (c Constant) Hint() string { return "_" }

// Strict is false.
func (c Constant) Strict(*Run) bool { return false }

// Rule is the body of a closure that a rule of a former makes: a function of
// what it captured and the argument. It captures nothing of its own.
type Rule struct {
	Name  string // of the bound variable, for printing
	Apply func(run *Run, c *Captured, x Value) Value
}

// Captured is what a rule's closure holds: values, walls and a face in the
// surrounding dimensions, and values on a line under the bound name I. When
// the argument arrives, I is renamed where the argument mentions it.
type Captured struct {
	Rule    *Rule
	Values  []Value
	Walls   System
	Face    interval.Face
	I       Name
	Line    []Value
	support Support
}

// NewCaptured makes the closure and determines its support.
func NewCaptured(run *Run, c Captured) *Captured {
	run.Charge(PriceClosure)
	c.support = c.free() | c.lineSupport().Without(c.I)
	return &c
}

func (c *Captured) free() (sup Support) {
	for _, v := range c.Values {
		sup |= v.Support()
	}
	return sup | c.Walls.Support() | c.Face.Support()
}

func (c *Captured) lineSupport() (sup Support) {
	for _, v := range c.Line {
		sup |= v.Support()
	}
	return sup
}

// Support is what NewCaptured found.
func (c *Captured) Support() Support { return c.support }

// Substitute delays s over every captured value, under I for the line.
func (c *Captured) Substitute(run *Run, s *Subst) Closure {
	if !run.Plain.NoSupport && c.support&s.Domain() == 0 {
		return c
	}
	out := Captured{Rule: c.Rule, Values: substituteAll(run, c.Values, s), Walls: c.Walls, Face: c.Face.Subst(s), I: c.I, Line: c.Line}
	if len(c.Walls) > 0 {
		out.Walls = c.Walls.Substitute(run, s)
	}
	if len(c.Line) > 0 {
		i, under := run.Under(c.I, c.lineSupport(), s, out.free())
		out.I, out.Line = i, substituteAll(run, c.Line, under)
	}
	return NewCaptured(run, out)
}

func substituteAll(run *Run, vs []Value, s *Subst) []Value {
	if len(vs) == 0 || s == nil {
		return vs
	}
	out := make([]Value, len(vs))
	for k, v := range vs {
		out[k] = run.Substitute(v, s)
	}
	return out
}

// SubstituteAll delays s over each of vs.
func (r *Run) SubstituteAll(vs []Value, s *Subst) []Value { return substituteAll(r, vs, s) }

// Apply runs the rule, with the line's name fresh for the argument.
func (c *Captured) Apply(run *Run, x Value) Value {
	if len(c.Line) > 0 && x.Support().Has(c.I) {
		i := run.Fresh(c.support | c.lineSupport() | x.Support())
		d := *c
		d.I, d.Line = i, substituteAll(run, c.Line, interval.Rename(c.I, i))
		c = &d
	}
	return c.Rule.Apply(run, c, x)
}

// Open delays Apply.
func (c *Captured) Open(run *Run, x Value) Value {
	return run.Later(c.support|x.Support(), func(run *Run) Value { return c.Apply(run, x) })
}

// Hint is the rule's name of its variable.
func (c *Captured) Hint() string { return c.Rule.Name }

// Strict is false: what a rule makes of its argument it delays.
func (c *Captured) Strict(*Run) bool { return false }
