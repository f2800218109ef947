package main

import (
	"example.com/boxwright/examples/measure/gauge"
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Dimensions and faces. An operation of these rows is a thousand of the work, over
// operands that change, so that the clock sees something.

const dimensionGroup = "Dimensions, faces, composition, transport"

const inner = 1000

// literals is a set of literals as two words, the least a meet can be made of.
type literals struct{ plain, reversed uint64 }

//go:noinline
func (p literals) join(q literals) literals {
	return literals{p.plain | q.plain, p.reversed | q.reversed}
}

var (
	sinkLiterals literals
	sinkDim      interval.Dim
	sinkFace     interval.Face
	sinkBool     bool
	sinkValue    value.Value
	sinkSupport  value.Support
	// what is only written to is kept all the same, so that the work is done
	_ = []any{&sinkLiterals, &sinkDim, &sinkFace, &sinkBool, &sinkValue, &sinkSupport, &sinkCore}
)

const operandCount = 64

var wordOperands = func() (table [operandCount]literals) {
	for k := range table {
		table[k] = literals{1 << k, 1 << (k * 7 % 64)}
	}
	return table
}()

func joinWords() {
	for k := range inner {
		sinkLiterals = wordOperands[k%operandCount].join(wordOperands[(k+11)%operandCount])
	}
}

// operands are dimensions and the faces on which they are 1: of one literal on
// eight dimensions, or of four conjunctions on thirty-two.
func operands(conjunctions int) (dims [operandCount]interval.Dim, faces [operandCount]interval.Face) {
	for k := range operandCount {
		d := interval.Lit(interval.Name(k*5%8), k%3 == 0)
		for c := 1; c < conjunctions; c++ {
			d = d.Max(interval.Lit(interval.Name((k*5+c*9)%32), k%2 == 0).Min(interval.Var(interval.Name((k + c*11 + 1) % 32))))
		}
		dims[k], faces[k] = d, d.Is1()
	}
	return dims, faces
}

func intervalRow(name string, kind gauge.Kind, target float64, conjunctions int, op func(d *[operandCount]interval.Dim, f *[operandCount]interval.Face)) gauge.Row {
	return gauge.Row{Group: dimensionGroup, Name: name, Kind: kind, Sizes: []int{conjunctions}, Unit: "conjunctions", Target: target, Baseline: "the operation on two words",
		Prepare: func(int) (*gauge.Case, error) {
			d, f := operands(conjunctions)
			c := gauge.Always(func() error { op(&d, &f); return nil })
			c.Base, c.Parts, c.BaseParts = joinWords, inner, inner
			return c, nil
		}}
}

// unrelated is a value without the dimension that is substituted.
func unrelated() value.Value {
	return prims.NewPair(value.DimensionName(1), value.DimensionName(2))
}

func endpointCase() *gauge.Case {
	run := value.NewRun(value.Settings{Budget: value.Budget{Steps: 1 << 60, Depth: 1 << 20, Memory: 1 << 60}})
	values := [2]value.Value{unrelated(), value.DimensionName(4)}
	c := gauge.Always(func() error {
		for k := range inner {
			sinkValue = run.At(values[k&1], 3, interval.One())
		}
		return nil
	})
	c.Base = func() {
		for k := range inner {
			sinkSupport = values[k&1].Support()
		}
	}
	c.Parts, c.BaseParts = inner, inner
	return c
}

func intervalRows() []gauge.Row {
	type dims = [operandCount]interval.Dim
	type faces = [operandCount]interval.Face
	meet := func(_ *dims, f *faces) {
		for k := range inner {
			sinkFace = f[k%operandCount].And(f[(k+11)%operandCount])
		}
	}
	join := func(_ *dims, f *faces) {
		for k := range inner {
			sinkFace = f[k%operandCount].Or(f[(k+11)%operandCount])
		}
	}
	entail := func(_ *dims, f *faces) {
		for k := range inner {
			sinkBool = f[k%operandCount].Entails(f[(k+11)%operandCount])
		}
	}
	lattice := func(d *dims, _ *faces) {
		for k := range inner {
			switch a, b := d[k%operandCount], d[(k+11)%operandCount]; k % 3 {
			case 0:
				sinkDim = a.Min(b)
			case 1:
				sinkDim = a.Max(b)
			default:
				sinkDim = a.Rev()
			}
		}
	}
	six := func(*dims, *faces) {
		for k := range inner {
			i, j, l := interval.Var(interval.Name(k%6)), interval.Var(interval.Name(k*5%6)), interval.Var(interval.Name((k+3)%6))
			sinkDim = i.Min(j).Max(l.Rev()).Min(j.Rev().Max(i)).Rev()
		}
	}
	endpoint := func(kind gauge.Kind, name string, target float64) gauge.Row {
		return gauge.Row{Group: dimensionGroup, Name: name, Kind: kind, Sizes: []int{1}, Target: target, Baseline: "one interface method call",
			Prepare: func(int) (*gauge.Case, error) { return endpointCase(), nil }}
	}
	return []gauge.Row{
		intervalRow("min, max and rev of one literal", gauge.Ratio, 5, 1, lattice),
		intervalRow("face meet of one literal", gauge.Ratio, 5, 1, meet),
		intervalRow("face join of one literal", gauge.Ratio, 5, 1, join),
		intervalRow("face entailment of one literal", gauge.Ratio, 5, 1, entail),
		intervalRow("normal form of min, max and rev on 6 dimensions", gauge.Allocations, 0, 4, six),
		intervalRow("face meet, results up to 4 conjunctions on 32 dimensions", gauge.Allocations, 0, 2, meet),
		intervalRow("face join, results up to 4 conjunctions on 32 dimensions", gauge.Allocations, 0, 2, join),
		intervalRow("face entailment, 4 conjunctions on 32 dimensions", gauge.Allocations, 0, 4, entail),
		endpoint(gauge.Allocations, "endpoint substitution that meets nothing, allocations", 0),
		endpoint(gauge.Ratio, "endpoint substitution that meets nothing", 3),
	}
}
