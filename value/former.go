package value

import (
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value/interval"
)

// Quoter is what a former reads back against. It knows the scope: variables
// and dimensions are numbered by level, and the name of a dimension in scope
// is its level.
type Quoter interface {
	Run() *Run
	// Type reads a type back.
	Type(v Value) Core
	// Term reads v back at type t, η-long.
	Term(t, v Value) Core
	// Neutral reads a neutral back.
	Neutral(n *Neutral) Core
	// Variable goes under the binder of a variable of type t.
	Variable(hint string, t Value, body func(x Value) Core) *term.Bound
	// Dimension goes under the binder of a dimension.
	Dimension(hint string, body func(i Name) Core) *term.Bound
	// Binders goes under several binders at once; step makes them.
	Binders(body func(b Binding) Core) *term.Bound
	// Walls reads a system back at type t: split, irredundant, in order, each
	// wall at t on its face.
	Walls(t Value, s System) term.Rows
	// Rows reads other systems back: for each cube, in canonical order.
	Rows(cubes []interval.Cube, row func(k int) []term.Arg) term.Rows
}

// Binding makes binders one after the other.
type Binding interface {
	Variable(hint string, t Value) Value
	Dimension(hint string) Name
}

// Comparer is what a former compares against. Every method that goes down
// takes a step, which names the way for the account of a difference.
type Comparer interface {
	Run() *Run
	// Inclusion reports whether the comparison is at ≤ here.
	Inclusion() bool
	// Types compares two types, at ≤ if the comparison is at ≤ and stays so here.
	Types(step string, a, b Value) bool
	// EqualTypes compares two types at equality, whatever the comparison is at.
	EqualTypes(step string, a, b Value) bool
	// Terms compares two terms at type t.
	Terms(step string, t, a, b Value) bool
	// Neutrals compares two neutrals.
	Neutrals(a, b *Neutral) bool
	// Variable goes under the binder of a variable.
	Variable(hint string, t Value, body func(x Value) bool) bool
	// Dimension goes under the binder of a dimension.
	Dimension(hint string, body func(i Name) bool) bool
	// Binders goes under several.
	Binders(body func(b Binding) bool) bool
	// Under works on a face: what body compares has been restricted to it.
	Under(c interval.Cube, body func() bool) bool
	// Walls compares two systems at type t.
	Walls(t Value, a, b System) bool
	// Differ records that a part which is no term differs, and returns false.
	Differ(step, left, right string) bool
}

// Checker is what a former types its written forms against. Its methods leave
// the run with an error where something is wrong.
type Checker interface {
	Run() *Run
	// Infer elaborates w and returns its type.
	Infer(w *term.Written) (Core, Value)
	// Check elaborates w at type t.
	Check(w *term.Written, t Value) Core
	// Type elaborates a type and returns the level of its universe.
	Type(w *term.Written) (Core, int)
	// Value is a core term in the present scope, as a value; no work is done.
	Value(c Core) Value
	// ReadBack reads a value back into the present scope.
	ReadBack(t, v Value) Core
	// ReadBackType reads a type back into the present scope.
	ReadBackType(t Value) Core
	// Normal is the normal form of a type in the present scope.
	Normal(t Value) Core
	// NormalAt is the normal form of v at type t.
	NormalAt(t, v Value) Core
	// Dimension elaborates an interval expression.
	Dimension(w *term.Written) interval.Dim
	// IsDimension reports whether w, by its form and the names in scope, is an interval expression.
	IsDimension(w *term.Written) bool
	// Face elaborates a face.
	Face(w *term.Written) interval.Face
	// Variable elaborates under the binder of a variable of type t.
	Variable(b term.Binder, t Value, body func(x Value) Core) *term.Bound
	// Defined elaborates under a name that stands for the value v of type t. A
	// value that comes out of it speaks of v.
	Defined(b term.Binder, t, v Value, body func() Core) *term.Bound
	// Dimensioned elaborates under the binder of a dimension.
	Dimensioned(b term.Binder, body func(i Name) Core) *term.Bound
	// Binders elaborates under several binders.
	Binders(body func(b CheckerBinding) Core) *term.Bound
	// Under elaborates on each conjunction of a face, in canonical order, with
	// the scope restricted to it. Where there is none, it only sees to it that
	// the names in written resolve.
	Under(face interval.Face, written []term.Part, body func(c interval.Cube))
	// Scope is the number of variables and of dimensions in scope.
	Scope() (variables, dimensions int)
	// Same requires two terms to be equal at t; otherwise err is raised with both sides.
	Same(t, a, b Value, err *term.Error)
	// SameType requires two types to be equal; otherwise err is raised with both sides.
	SameType(a, b Value, err *term.Error)
	// Included requires got ≤ want for types.
	Included(w *term.Written, got, want Value)
	// Show is a value as a written term, for messages.
	Show(t, v Value) *term.Written
	// ShowType is a type as a written term.
	ShowType(t Value) *term.Written
	// Fail raises an error at w.
	Fail(w *term.Written, kind term.ErrorKind, message string, want, got any)
	// Case is an elaborated body under binders as a case in the present scope.
	Case(b *term.Bound, sorts []term.Sort) Case
	// Compile is a core term of the present scope as a case over the given
	// variables and dimensions, by level; it must mention no others.
	Compile(core Core, variables, dimensions []int) Case
	// Declare makes name stand for n until the declaration that is being
	// checked has ended, or for nothing again if n is nil.
	Declare(name string, n Named)
}

// CheckerBinding makes binders one after the other.
type CheckerBinding interface {
	Variable(b term.Binder, t Value) Value
	Dimension(b term.Binder) Name
}

// Applicable is implemented by the types whose elements can be applied in the
// written form.
type Applicable interface {
	// ElaborateApply elaborates the application of f, of the receiver's type, and returns its type.
	ElaborateApply(c Checker, f Core, arg *term.Written) (Core, Value)
}

// Named is implemented by what a name can stand for, other than a variable, a
// definition or an assumption: data types and constructors.
type Named interface {
	// Elaborate elaborates the name with its arguments: at the type want or, if
	// want is nil, inferring it. w is the whole term.
	Elaborate(c Checker, w *term.Written, args []*term.Written, want Value) (Core, Value)
}
