package term

import (
	"math/big"

	"example.com/boxwright/value/interval"
)

// Core is a core term: a [Variable], a [Global] or an [Op]. Core terms are
// made by the checker and by reading back; they are immutable and may share
// subterms, so walks over them that must be fast remember where they have been.
//
// Variables and dimensions are numbered by level, separately: the outermost
// variable in scope is 0 and so is the outermost dimension. Dimensions and
// faces stand in normal form, the names of [interval] being those levels, so
// two core terms are the same up to bound names exactly when they are equal
// apart from hints ([Same]).
type Core interface {
	Arg
	isCore()
}

// Arg is an argument of an [Op]: a Core, a *Bound, a [Dimension], a *Face,
// a [Rows] or a payload ([Level], [Number], [Reference]).
type Arg interface{ isArg() }

// Variable is a bound variable or a variable of the scope, by level.
type Variable struct{ Level int }

// Global is a definition or an assumption of the engine.
type Global struct{ Name string }

// Op is an operator applied to arguments, as its Signature says.
type Op struct {
	Sig  *Signature
	Args []Arg
}

// Bound is a body under binders; the signature tells which of them are
// variables and which dimensions. Hints are the host's names, for printing.
// Dimensions says how many of the binders, the last ones, are dimensions; it
// is looked at where the signature leaves the number of binders open.
type Bound struct {
	Hints      []string
	Body       Core
	Dimensions int
}

// Dimension is an interval expression as an argument.
type Dimension struct{ interval.Dim }

// Face is a face as an argument.
type Face struct{ interval.Face }

// Rows is a list of rows of arguments: walls, systems, cases.
type Rows [][]Arg

// Level is a universe level as an argument.
type Level int

// Number is a natural number as an argument.
type Number struct{ *big.Int }

// Reference names a declaration, or a constructor of one (Index ≥ 0; -1 is
// the data type itself). Target is the declaration, resolved.
type Reference struct {
	Name   string
	Index  int
	Target any
}

func (*Variable) isArg()  {}
func (*Variable) isCore() {}
func (*Global) isArg()    {}
func (*Global) isCore()   {}
func (*Op) isArg()        {}
func (*Op) isCore()       {}
func (*Bound) isArg()     {}
func (Dimension) isArg()  {}
func (*Face) isArg()      {}
func (Rows) isArg()       {}
func (Level) isArg()      {}
func (Number) isArg()     {}
func (Reference) isArg()  {}

// CoreSlot is one position of a core operator. Silent slots are annotations:
// they are evaluated but not written.
type CoreSlot struct {
	Slot
	Silent bool
}

// Signature is the plain-data description of a core operator: its name, the
// word that writes it (empty: application, or a head taken from a Reference),
// and the shape of its arguments. The last slot may repeat (Rest). Signatures
// are compared by identity.
type Signature struct {
	Name  string
	Word  string
	Slots []CoreSlot
}

// SlotOf returns the slot that argument k fills.
func (s *Signature) SlotOf(k int) CoreSlot {
	if n := len(s.Slots); k >= n && n > 0 && s.Slots[n-1].Rest {
		return s.Slots[n-1]
	}
	return s.Slots[k]
}
