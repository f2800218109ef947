// Package value holds the semantic domain of the engine: values, closures,
// neutrals with their spines, lazy cells, walls, and the substitution of
// dimensions on them; the interfaces by which a type former reaches the
// evaluator, reading back, comparison and the checker; and a run, which is one
// call's budget and counters.
//
// Dimensions in values are names and binding is nominal (Pitts, "Nominal
// Sets", 2013): every value can say at once, as one word, an
// over-approximation of the dimensions free in it, and a substitution whose
// domain misses that support returns the value itself. Otherwise it is delayed
// in a lazy cell and pushed one constructor at a time when somebody looks.
//
// Invariants:
//   - A value is immutable once it has been forced, and may be shared by
//     goroutines and by runs. It holds no run and no budget.
//   - Every lazy node makes sense as it stands: what is built under a face is
//     built from inputs that the face has been substituted into, so a node is
//     never forced first and restricted afterwards.
//   - The body of a wall does not mention the dimensions of its own face.
package value

import "example.com/boxwright/value/interval"

// Name and Support are short for the interval's.
type (
	Name    = interval.Name
	Support = interval.Support
	Subst   = interval.Subst
)

// Value is an element of the semantic domain: a lazy cell (*Lazy), a neutral
// (*Neutral), a dimension (*Dimension), a type (Type) or a canonical element
// of a former.
type Value interface {
	// Support over-approximates the dimensions free in the value, in O(1).
	Support() Support
	// Substitute pushes s one constructor down. It is called on weak head
	// normal forms, with a substitution that meets the support; everybody else
	// calls Run.Substitute, which delays it.
	Substitute(run *Run, s *Subst) Value
}

// Type is the value of a type whose former is known. Its methods are the rules
// of that former; evaluation, reading back and comparison reach them only
// through this interface.
type Type interface {
	Value
	// Hcomp composes base with walls, none of whose faces is top.
	Hcomp(run *Run, base Value, walls System) Value
	// Transp transports a along the line i.T, T the receiver at the generic i,
	// with i fresh for phi and a, and phi not top.
	Transp(run *Run, i Name, phi interval.Face, a Value) Value
	// ReadBack reads the type itself back.
	ReadBack(q Quoter) Core
	// SameType compares the receiver with a type of any former: equality or,
	// where the comparison is at ≤ and the former has variance, inclusion.
	SameType(c Comparer, other Type) bool
	// ReadBackElement reads an element back in η-long normal form; v is forced.
	ReadBackElement(q Quoter, v Value) Core
	// SameElement compares two elements; both are forced.
	SameElement(c Comparer, a, b Value) bool
}

// Closure is a body waiting for an argument, which may be a *Dimension. It is
// data: it has a support and can be substituted.
type Closure interface {
	Support() Support
	// Substitute delays s over what the closure captured.
	Substitute(run *Run, s *Subst) Closure
	// Apply evaluates the body; the result may be a lazy cell still to be forced.
	Apply(run *Run, arg Value) Value
	// Open is Apply without doing any work: the body as a lazy cell.
	Open(run *Run, arg Value) Value
	// Hint is the host's name of the bound variable, for printing.
	Hint() string
	// Strict reports whether the body evaluates its argument in any case.
	// Asking may evaluate captured functions that the body evaluates anyway.
	Strict(run *Run) bool
}

// Dimension is an interval expression as a value: what a function over the
// interval or a path is applied to.
type Dimension struct{ interval.Dim }

var ends = [2]*Dimension{{interval.Zero()}, {interval.One()}}

var literals = func() (t [63]*Dimension) {
	for n := range t {
		t[n] = &Dimension{interval.Var(Name(n))}
	}
	return t
}()

// DimensionOf is d as a value; ends and low names do not allocate.
func DimensionOf(d interval.Dim) *Dimension {
	switch {
	case d.IsZero():
		return ends[0]
	case d.IsOne():
		return ends[1]
	}
	if n, negated, ok := d.Literal(); ok && !negated && int(n) < len(literals) {
		return literals[n]
	}
	return &Dimension{d}
}

// Dimension is d as a value, charged where it is long: the work on it grows
// with the square of its length.
func (r *Run) Dimension(d interval.Dim) Value {
	if n := d.Len(); n > 4 {
		r.Charge(int64(n) * PriceConjunction)
	}
	return DimensionOf(d)
}

// Face charges f where it is long.
func (r *Run) Face(f interval.Face) interval.Face {
	if n := f.Len(); n > 4 {
		r.Charge(int64(n) * PriceConjunction)
	}
	return f
}

// DimensionName is the dimension n as a value.
func DimensionName(n Name) *Dimension {
	if int(n) < len(literals) {
		return literals[n]
	}
	return &Dimension{interval.Var(n)}
}

// Zero and One are the ends as values.
func Zero() *Dimension { return ends[0] }
func One() *Dimension  { return ends[1] }

// Substitute is the substitution of dimensions itself.
func (d *Dimension) Substitute(_ *Run, s *Subst) Value { return DimensionOf(d.Dim.Subst(s)) }
