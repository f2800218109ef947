package prims

import (
	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Data types, each from its declaration (CCHM 4.5 for naturals, CHM 3 in
// general). This file holds the declaration as evaluation sees it, its values,
// and how they read back and compare; the operations, eliminators, transport
// and checking of declarations stand in the other files data_*.go.

// Data is a checked declaration. It is immutable once declared.
type Data struct {
	Name         string
	Params       []Argument
	Constructors []*Constructor
	Formal       bool      // composites are canonical and eliminators commute with them; otherwise strict
	Level        int       // of the universe it lives in
	Numerals     bool      // its elements are stored as numbers
	small        []*Number // the first numbers
	raised       int       // the level so far, while it is being declared
	declared     bool      // the declaration is complete
	alone        *DataType // the type, if it has no parameters
	eliminator   term.Reference
	label        *value.Label // its name in counters and profiles
	// Written is the declaration as it was given, for saving it; nil until it is complete.
	Written *term.Declaration
}

// Argument is one entry of a telescope: of parameters, or of a constructor's arguments.
type Argument struct {
	Name      string
	Core      term.Core  // the type over what Used names, at the levels of parameters and arguments
	Type      value.Case // the type over Used, as a case
	Used      []int      // the levels of parameters and earlier arguments it mentions
	Dependent bool       // it mentions an earlier argument of the constructor
	Recursive *Recursion // how the data type occurs in it, nil if it does not
	steady    bool       // transport along a constant line of it is the identity
}

// Constructor is a point or path constructor of a declaration.
type Constructor struct {
	Data      *Data
	Index     int
	Name      string
	Args      []Argument
	Dims      []string // the names of its dimensions
	Boundary  []Boundary
	Commutes  bool // it commutes with transport; otherwise a composite corrects it
	recursive bool // an argument is recursive
	ends      bool // a recursive argument is a path
	constant  value.Value
	reference term.Reference
}

// Dimensions is the number of the constructor's dimensions, for the writer of
// its cases, which does not know declarations.
func (k *Constructor) Dimensions(int) int { return len(k.Dims) }

// Boundary is one wall of a path constructor's boundary: on the cube, over the
// dimensions numbered from 0, the element over parameters, arguments and dimensions.
type Boundary struct {
	Cube    interval.Cube
	Core    term.Core
	Element value.Case
}

// DataType is a data type at its parameters, as a value.
type DataType struct {
	Data    *Data
	Params  []value.Value
	support value.Support
}

// Con is a constructor at arguments and dimensions, none of its faces
// holding, as a value. Params are there for path constructors alone.
type Con struct {
	Of      *Constructor
	Params  []value.Value
	Args    []value.Value
	Dims    []interval.Dim
	support value.Support
}

// Formal is a formal composite, as a value: canonical.
type Formal struct {
	Type    *DataType
	Base    value.Value
	Walls   value.System
	support value.Support
}

func supportOf(vs []value.Value) (sup value.Support) {
	for _, v := range vs {
		sup |= v.Support()
	}
	return sup
}

// NewDataType is the data type at parameters.
func NewDataType(d *Data, params []value.Value) *DataType {
	if len(params) == 0 && d.alone != nil {
		return d.alone
	}
	return &DataType{d, params, supportOf(params)}
}

// Support is the union of the parameters'.
func (t *DataType) Support() value.Support { return t.support }

// Substitute delays s over the parameters.
func (t *DataType) Substitute(run *value.Run, s *value.Subst) value.Value {
	return NewDataType(t.Data, run.SubstituteAll(t.Params, s))
}

// NewCon is a constructor at arguments and dimensions: the element of its
// boundary where a face of it holds.
func NewCon(run *value.Run, c *Constructor, params, args []value.Value, dims []interval.Dim) value.Value {
	if c.constant != nil {
		return c.constant
	}
	if c.Data.Numerals {
		return successors(run, c.Data, natural{small: 1}, args[0])
	}
	if len(dims) == 0 {
		return &Con{Of: c, Args: args, support: supportOf(args)}
	}
	s := dimensionSubst(dims)
	for _, b := range c.Boundary {
		if b.Cube.Subst(s).IsTop() {
			run.Take(value.StepBoundary)
			if run.Followed() {
				return boundaryFollowed(run, &Con{Of: c, Args: args, Dims: dims}, b.Element.OpenAll(run, environment(params, args, dims)))
			}
			return b.Element.OpenAll(run, environment(params, args, dims))
		}
	}
	sup := supportOf(params) | supportOf(args)
	for _, d := range dims {
		sup |= d.Support()
	}
	return &Con{c, params, args, dims, sup}
}

// dimensionSubst sends the dimensions numbered from 0 to dims.
func dimensionSubst(dims []interval.Dim) *value.Subst {
	names := make([]value.Name, len(dims))
	for k := range dims {
		names[k] = value.Name(k)
	}
	return interval.NewSubst(names, dims)
}

func environment(params, args []value.Value, dims []interval.Dim) []value.Value {
	env := make([]value.Value, 0, len(params)+len(args)+len(dims))
	env = append(append(env, params...), args...)
	for _, d := range dims {
		env = append(env, value.DimensionOf(d))
	}
	return env
}

// Support is the union of the parts'.
func (c *Con) Support() value.Support { return c.support }

// Substitute delays s over the arguments; a face that holds now gives the boundary.
func (c *Con) Substitute(run *value.Run, s *value.Subst) value.Value {
	dims := make([]interval.Dim, len(c.Dims))
	for k, d := range c.Dims {
		dims[k] = d.Subst(s)
	}
	return NewCon(run, c.Of, run.SubstituteAll(c.Params, s), run.SubstituteAll(c.Args, s), dims)
}

// Support is the union of the parts'.
func (f *Formal) Support() value.Support { return f.support }

// Substitute composes again: a face may hold now.
func (f *Formal) Substitute(run *value.Run, s *value.Subst) value.Value {
	return Hcomp(run, run.Substitute(f.Type, s), run.Substitute(f.Base, s), f.Walls.Substitute(run, s))
}

// At is the argument's type over parameters and earlier arguments, in a cell.
func (a *Argument) At(run *value.Run, params, args []value.Value) value.Value {
	env := make([]value.Value, len(a.Used))
	for k, level := range a.Used {
		if level < len(params) {
			env[k] = params[level]
		} else {
			env[k] = args[level-len(params)]
		}
	}
	return a.Type.OpenAll(run, env)
}

// shown is what an element of a data type shows: a constructor with its
// arguments. A number shows zero or the successor of its predecessor, which is put
// into one.
func shown(run *value.Run, v value.Value, one *[1]value.Value) (c *Constructor, args []value.Value, ok bool) {
	switch v := v.(type) {
	case *Con:
		return v.Of, v.Args, true
	case *Number:
		if v.isZero() {
			return v.data.Constructors[0], nil, true
		}
		one[0] = v.predecessor(run)
		return v.data.Constructors[1], one[:], true
	case *Successors:
		one[0] = v.predecessor(run)
		return v.data.Constructors[1], one[:], true
	}
	return nil, nil, false
}

// ReadBack reads the parameters.
func (t *DataType) ReadBack(q value.Quoter) value.Core {
	args := make([]term.Arg, 1, 1+len(t.Params))
	args[0] = term.Reference{Name: t.Data.Name, Index: -1, Target: t.Data}
	for k := range t.Params {
		args = append(args, q.Term(t.Data.Params[k].At(q.Run(), t.Params, nil), t.Params[k]))
	}
	return op(dataSig, args...)
}

// SameType is equality, also where the comparison is at ≤.
func (t *DataType) SameType(c value.Comparer, other value.Type) bool {
	o, ok := other.(*DataType)
	if !ok || o.Data != t.Data {
		return false
	}
	for k := range t.Params {
		if !c.Terms("the parameter "+t.Data.Params[k].Name, t.Data.Params[k].At(c.Run(), t.Params, nil), t.Params[k], o.Params[k]) {
			return false
		}
	}
	return true
}

// ReadBackElement reads constructors and formal composites.
func (t *DataType) ReadBackElement(q value.Quoter, v value.Value) value.Core {
	switch v := v.(type) {
	case *Con:
		return t.readCon(q, v)
	case *Formal:
		return readHcomp(q, t, v.Base, v.Walls)
	case *Number:
		return readNumeral(v.data, v.n)
	case *Successors:
		return t.readSuccessors(q, v)
	case *value.Neutral:
		return q.Neutral(v)
	}
	q.Run().Fault("%T stands in a data type", v)
	return nil
}

func (t *DataType) readCon(q value.Quoter, v *Con) value.Core {
	args := make([]term.Arg, 2, 2+len(v.Args)+len(v.Dims))
	args[0] = v.Of.reference
	args[1] = term.Rows{}
	if len(v.Dims) > 0 && len(t.Params) > 0 {
		row := make([]term.Arg, len(t.Params))
		for k, p := range t.Params {
			row[k] = q.Term(t.Data.Params[k].At(q.Run(), t.Params, nil), p)
		}
		args[1] = term.Rows{row}
	}
	for k, a := range v.Args {
		args = append(args, q.Term(t.argument(q.Run(), v, k), a))
	}
	for _, d := range v.Dims {
		args = append(args, term.Dimension{Dim: d})
	}
	return op(conSig, args...)
}

// argument is the type of argument k of v, an element of t. Where that is t
// again it is the same value, so that what is remembered of elements at t holds
// for it too: without that, a graph of constructors would be read as a tree.
func (t *DataType) argument(run *value.Run, v *Con, k int) value.Value {
	if r := v.Of.Args[k].Recursive; r != nil && r.shape == recursionSelf {
		return t
	}
	return v.Of.Args[k].At(run, t.Params, v.Args)
}

// SameElement compares constructors, numbers and formal composites.
func (t *DataType) SameElement(c value.Comparer, a, b value.Value) bool {
	run := c.Run()
	switch x := a.(type) {
	case *Formal:
		y, ok := b.(*Formal)
		return ok && sameHcomp(c, t, x.Base, x.Walls, y.Base, y.Walls)
	case *value.Neutral:
		y, ok := b.(*value.Neutral)
		return ok && c.Neutrals(x, y)
	case *Number, *Successors:
		return t.sameNumber(c, a, b)
	case *Con:
		y, ok := b.(*Con)
		if !ok || x.Of != y.Of {
			return false
		}
		for k := range x.Args {
			if !c.Terms("the argument "+x.Of.Args[k].Name+" of "+x.Of.Name, t.argument(run, x, k), x.Args[k], y.Args[k]) {
				return false
			}
		}
		for k := range x.Dims {
			if !x.Dims[k].Equal(y.Dims[k]) {
				return c.Differ("a dimension of "+x.Of.Name, x.Dims[k].String(), y.Dims[k].String())
			}
		}
		return true
	}
	return false
}

var (
	referenceSlot = term.CoreSlot{Slot: term.Slot{Sort: term.NameSort}}
	paramsSlot    = term.CoreSlot{Slot: term.Slot{Rows: []term.Slot{{Rest: true}}}, Silent: true}
	dataSig       = &term.Signature{Name: "data", Slots: []term.CoreSlot{referenceSlot, restSlot}}
	conSig        = &term.Signature{Name: "con", Slots: []term.CoreSlot{referenceSlot, paramsSlot, restSlot}}
	elimSig       = &term.Signature{Name: "elim", Word: "elim", Slots: []term.CoreSlot{
		{Slot: term.Slot{Sort: term.NameSort}, Silent: true}, paramsSlot, boundSlot, plainSlot,
		{Slot: term.Slot{Rows: []term.Slot{{Sort: term.NameSort}, {Many: true}}}},
	}}
)

type dataOp struct{}

func (dataOp) Canonical([]eval.Arg) bool { return true }
func (dataOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	d := args[0].Payload.(term.Reference).Target.(*Data)
	params := make([]value.Value, len(args)-1)
	for k := range params {
		params[k] = args[k+1].Delay(run, f)
	}
	return NewDataType(d, params)
}

type conOp struct{}

func (conOp) Canonical(args []eval.Arg) bool { return !stored(args) }

// stored reports whether the constructor makes a number out of its argument,
// which is then evaluated with it: numbers are to be numbers, not chains.
func stored(args []eval.Arg) bool {
	c := args[0].Payload.(term.Reference).Target.(*Constructor)
	return c.Data.Numerals && c.constant == nil
}

// Ready reports whether a successor is that of a number which is known.
func (conOp) Ready(f eval.Frame, args []eval.Arg) bool {
	if !stored(args) {
		return false
	}
	_, ok := args[2].Known(f).(*Number)
	return ok
}

// Demands is the argument of a successor.
func (conOp) Demands(args []eval.Arg) []*eval.Arg {
	if stored(args) {
		return []*eval.Arg{&args[2]}
	}
	return nil
}

// Special is the successor of numbers.
func (o conOp) Special(_ *value.Run, args []eval.Arg) eval.Operation {
	if stored(args) {
		return successorOp{o, args[0].Payload.(term.Reference).Target.(*Constructor).Data}
	}
	return o
}
func (conOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	c := args[0].Payload.(term.Reference).Target.(*Constructor)
	if c.constant != nil {
		return c.constant
	}
	vs := make([]value.Value, len(c.Args))
	for k := range vs {
		vs[k] = args[k+2].Delay(run, f)
	}
	if len(c.Dims) == 0 {
		return NewCon(run, c, nil, vs, nil)
	}
	dims := make([]interval.Dim, len(c.Dims))
	for k := range dims {
		dims[k] = args[k+2+len(vs)].Dimension(f)
	}
	var params []value.Value
	if rows := args[1].Rows; len(rows) > 0 {
		params = make([]value.Value, len(rows[0]))
		for k := range params {
			params[k] = rows[0][k].Delay(run, f)
		}
	}
	return NewCon(run, c, params, vs, dims)
}

// HasFormalComposites reports whether composites are canonical elements.
func (d *Data) HasFormalComposites() bool { return d.Formal }
