// Package term holds the only syntax the engine knows, as two Go types.
//
// A written term ([Written]) is what readers and hosts build and what the
// checker takes: names are strings, every node may carry a place, and the
// shape of each form is given by the [Shape] of its head word. A core term
// ([Core]) is what the checker makes and the evaluator takes: variables are
// levels, every annotation that evaluation needs stands in it, and it is
// evaluated without checking.
//
// Both are plain data. Nothing in this package evaluates.
package term

import (
	"math/big"
)

// Place says where a written term came from. The zero Place means "unknown".
// Readers fill in File, Line and Column (both counted from 1, columns in
// characters); hosts that build terms through the API may put anything of
// their own into Tag, and errors hand it back.
type Place struct {
	File         string
	Line, Column int
	Tag          any
}

// Known reports whether the place says anything.
func (p Place) Known() bool { return p.Line > 0 || p.File != "" || p.Tag != nil }

// Kind tells the four kinds of written nodes apart.
type Kind uint8

const (
	// NameKind is a bound variable, a definition, a data type, a constructor or a dimension.
	NameKind Kind = iota
	// NumeralKind is a natural number or, where a dimension stands, an end.
	NumeralKind
	// FormKind is a head word with parts, by the Shape of the word.
	FormKind
	// ApplyKind is something that is no head word applied to arguments: a
	// function to terms or dimensions, a data type to parameters, a
	// constructor to arguments and dimensions. Parts[0] is what is applied.
	ApplyKind
)

// Written is a term as readers and hosts write it. Dimensions and faces are
// written terms too (names, the numerals 0 and 1, and the words min, max, rev,
// top, bot, =, and, or): which of the three a node is, its position tells.
// A Written is not changed after it has been handed to an engine; it may then
// be shared between goroutines and stand in several terms.
type Written struct {
	Kind   Kind
	Word   string   // NameKind: the name. FormKind: the head word.
	Number *big.Int // NumeralKind
	Parts  []Part   // FormKind: by the word's shape. ApplyKind: what is applied, then the arguments.
	Place  Place
}

// Part is one part of a form: a body under the names it binds, or, for a slot
// that holds a list (walls, systems, cases), its rows.
type Part struct {
	Binders []Binder
	Body    *Written
	Rows    [][]Part
}

// Binder is a bound name, of a variable or of a dimension; which, the shape tells.
type Binder struct {
	Name  string
	Place Place
}

// At returns a copy of w's root with the given place.
func (w *Written) At(p Place) *Written {
	c := *w
	c.Place = p
	return &c
}

// Tagged returns a copy of w's root whose place carries tag; an error about it hands the tag back.
func (w *Written) Tagged(tag any) *Written {
	c := *w
	c.Place.Tag = tag
	return &c
}

// Sort is the kind of thing that stands in a slot.
type Sort uint8

const (
	// TermSort: a term.
	TermSort Sort = iota
	// DimensionSort: an element of the interval.
	DimensionSort
	// FaceSort: a face.
	FaceSort
	// LevelSort: a universe level, a plain numeral.
	LevelSort
	// NameSort: a name that is resolved by the form itself (the constructor of a case).
	NameSort
)

// Slot is one position of a form.
type Slot struct {
	Sort  Sort
	Binds []Sort // what it binds, outermost first: TermSort for a variable, DimensionSort for a dimension
	Many  bool   // binds any number of names (cases), Binds is then ignored
	Rows  []Slot // not nil: the slot is the rest of the form, a list of rows of this shape
	Rest  bool   // the last slot of a form: repeated, once or more
}

// Shape is a head word of the notation with the shape of its form. In the
// written form a slot that binds names is "(i … t)" at the top of a form and
// "(i …) t" inside a row.
type Shape struct {
	Word  string
	Slots []Slot
}
