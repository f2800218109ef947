package prims

import (
	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Unit has one element, with η: every two elements are equal, and both
// operations give that element.

type unitType struct{}
type unitElement struct{}

// UnitType and UnitElement are the type and its element as values.
var (
	UnitType    value.Type  = unitType{}
	UnitElement value.Value = unitElement{}
)

func (unitType) Support() value.Support                                  { return 0 }
func (unitType) Substitute(*value.Run, *value.Subst) value.Value         { return UnitType }
func (unitElement) Support() value.Support                               { return 0 }
func (unitElement) Substitute(*value.Run, *value.Subst) value.Value      { return UnitElement }
func (unitType) Hcomp(*value.Run, value.Value, value.System) value.Value { return UnitElement }
func (unitType) Transp(*value.Run, value.Name, interval.Face, value.Value) value.Value {
	return UnitElement
}
func (unitType) ReadBack(value.Quoter) value.Core                          { return op(unitTypeSig) }
func (unitType) SameType(_ value.Comparer, other value.Type) bool          { return other == UnitType }
func (unitType) ReadBackElement(value.Quoter, value.Value) value.Core      { return op(unitSig) }
func (unitType) SameElement(value.Comparer, value.Value, value.Value) bool { return true }

var (
	unitTypeSig = &term.Signature{Name: "Unit", Word: "Unit"}
	unitSig     = &term.Signature{Name: "unit", Word: "unit"}
)

type constantOp struct{ v value.Value }

func (o constantOp) Eval(*value.Run, eval.Frame, []eval.Arg) value.Value { return o.v }
func (o constantOp) Value(*value.Run, []eval.Arg) value.Value            { return o.v }

func unitFormer() Former {
	return Former{
		Name: "the unit type", Version: 1,
		Words: []Word{
			word("Unit", func(value.Checker, *term.Written) (value.Core, value.Value) { return op(unitTypeSig), NewUniverse(0) }, nil),
			word("unit", func(value.Checker, *term.Written) (value.Core, value.Value) { return op(unitSig), UnitType }, nil),
		},
		Operators: []Operator{{unitTypeSig, constantOp{UnitType}}, {unitSig, constantOp{UnitElement}}},
	}
}
