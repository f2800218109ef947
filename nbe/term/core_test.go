package term_test

import (
	"math/big"
	"math/rand/v2"

	"pgregory.net/rapid"

	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value/interval"
)

// Core terms for the tests of this package: signatures with the names and the
// argument shapes that the writer goes by, functions that build terms of them,
// and a generator of well-scoped (not well-typed) terms.

var (
	oneName    = []term.Sort{term.TermSort}
	oneDim     = []term.Sort{term.DimensionSort}
	open       = term.CoreSlot{}
	hidden     = term.CoreSlot{Silent: true}
	under      = term.CoreSlot{Slot: term.Slot{Binds: oneName}}
	underDim   = term.CoreSlot{Slot: term.Slot{Binds: oneDim}}
	dimension  = term.CoreSlot{Slot: term.Slot{Sort: term.DimensionSort}}
	faceSlot   = term.CoreSlot{Slot: term.Slot{Sort: term.FaceSort}}
	openRest   = term.CoreSlot{Slot: term.Slot{Rest: true}}
	hiddenRest = term.CoreSlot{Slot: term.Slot{Rest: true}, Silent: true}
	walls      = term.CoreSlot{Slot: term.Slot{Rows: []term.Slot{{Sort: term.FaceSort}, {Binds: oneDim}}}}
)

func rowsOf(slots ...term.Slot) term.CoreSlot { return term.CoreSlot{Slot: term.Slot{Rows: slots}} }

func sig(name, word string, slots ...term.CoreSlot) *term.Signature {
	return &term.Signature{Name: name, Word: word, Slots: slots}
}

var (
	lamSig      = sig("lam", "lam", under)
	lamDimSig   = sig("lamDim", "lam", underDim)
	appSig      = sig("app", "", open, open)
	piSig       = sig("Pi", "Pi", open, under)
	piDimSig    = sig("PiDim", "Pi", underDim)
	sigmaSig    = sig("Sigma", "Sigma", open, under)
	pairSig     = sig("pair", "pair", open, open)
	fstSig      = sig("fst", "fst", open)
	pathOverSig = sig("PathOver", "PathOver", underDim, open, open)
	lineSig     = sig("line", "line", underDim)
	atSig       = sig("at", "at", open, dimension, hidden, hidden)
	unitSig     = sig("Unit", "Unit")
	universeSig = sig("U", "U", term.CoreSlot{Slot: term.Slot{Sort: term.LevelSort}})
	dataSig     = sig("data", "", open, openRest)
	conSig      = sig("con", "", open, hidden, openRest)
	numeralSig  = sig("numeral", "", open)
	elimSig     = sig("elim", "elim", hidden, hidden, under, open, rowsOf(term.Slot{Sort: term.NameSort}, term.Slot{Many: true}))
	transpSig   = sig("transp", "transp", underDim, faceSlot, open)
	hcompSig    = sig("hcomp", "hcomp", open, open, walls)
	glueTypeSig = sig("Glue", "Glue", open, rowsOf(term.Slot{Sort: term.FaceSort}, term.Slot{}, term.Slot{}))
	unglueSig   = sig("unglue", "unglue", open, hiddenRest)
	letSig      = sig("let", "let", open, open, under)
	crateSig    = sig("crate", "crate", open, underDim, faceSlot, openRest) // a host's
)

func op(s *term.Signature, args ...term.Arg) *term.Op { return &term.Op{Sig: s, Args: args} }
func variable(level int) term.Core                    { return &term.Variable{Level: level} }
func global(name string) term.Core                    { return &term.Global{Name: name} }
func body(c term.Core, hints ...string) *term.Bound   { return &term.Bound{Hints: hints, Body: c} }
func lam(hint string, c term.Core) term.Core          { return op(lamSig, body(c, hint)) }
func line(hint string, c term.Core) term.Core         { return op(lineSig, body(c, hint)) }
func app(f term.Core, args ...term.Arg) term.Core {
	for _, a := range args {
		f = op(appSig, f, a)
	}
	return f
}
func pi(hint string, a, b term.Core) term.Core { return op(piSig, a, body(b, hint)) }
func pair(a, b term.Core) term.Core            { return op(pairSig, a, b) }
func at(p term.Core, r interval.Dim) term.Core {
	return op(atSig, p, term.Dimension{Dim: r}, global("left"), global("right"))
}
func face(f interval.Face) *term.Face { return &term.Face{Face: f} }
func data(name string, params ...term.Arg) term.Core {
	return op(dataSig, append([]term.Arg{term.Reference{Name: name, Index: -1}}, params...)...)
}
func con(name string, args ...term.Arg) term.Core {
	return op(conSig, append([]term.Arg{term.Reference{Name: name, Target: berths{}}, term.Rows{{global("silent")}}}, args...)...)
}
func numeral(n int64) term.Core { return op(numeralSig, term.Number{Int: big.NewInt(n)}) }

// berths stands for a declaration whose constructor of index k has k dimensions.
type berths struct{}

func (berths) Dimensions(constructor int) int { return constructor }

// hints are good names, names that capture, head words, and what is no name.
var hints = []string{"x", "x", "y", "x1", "x2", "i", "i", "crane", "add", "zero", "_", "_", "", "min", "reject", "crate", "(", "a b", "7", "007", "é", "\xff"}

var globals = []string{"add", "crane", "x", "i", "_", "x1", "zero"}

// generator draws core terms with the given numbers of variables and
// dimensions in scope. upTo draws a number from 0 to n.
type generator struct{ upTo func(n int) int }

// drawn is the generator of a property: what fails is made smaller.
func drawn(t *rapid.T) generator {
	return generator{func(n int) int { return rapid.IntRange(0, n).Draw(t, "n") }}
}

// even is the generator that draws all numbers alike, so that terms grow large.
func even(seed uint64) generator {
	source := rand.New(rand.NewPCG(seed, 1))
	return generator{func(n int) int { return source.IntN(n + 1) }}
}

func (g generator) of(texts []string) string { return texts[g.upTo(len(texts)-1)] }

func (g generator) hint() string { return g.of(hints) }

func (g generator) dimension(dims int) interval.Dim {
	r := interval.Zero()
	for range g.upTo(2) {
		meet := interval.One()
		for range g.upTo(2) {
			if dims > 0 {
				meet = meet.Min(interval.Lit(interval.Name(g.upTo(dims-1)), g.upTo(1) == 1))
			}
		}
		r = r.Max(meet)
	}
	return r
}

func (g generator) face(dims int) *term.Face {
	return face(g.dimension(dims).Is0().Or(g.dimension(dims).Is1()))
}

func (g generator) core(vars, dims, depth int) term.Core {
	if depth == 0 {
		if k := g.upTo(vars + 1); k < vars {
			return variable(k)
		}
		return global(g.of(globals))
	}
	sub := func() term.Core { return g.core(vars, dims, depth-1) }
	inVar := func() *term.Bound { return body(g.core(vars+1, dims, depth-1), g.hint()) }
	inDim := func() *term.Bound { return body(g.core(vars, dims+1, depth-1), g.hint()) }
	dim := func() term.Dimension { return term.Dimension{Dim: g.dimension(dims)} }
	switch g.upTo(21) {
	case 0, 1:
		return op(lamSig, inVar())
	case 2:
		return op(lamDimSig, inDim())
	case 3:
		return app(sub(), sub())
	case 4:
		return app(sub(), dim(), sub())
	case 5:
		return op(piSig, sub(), inVar())
	case 6:
		return op(piDimSig, inDim())
	case 7:
		return op(sigmaSig, sub(), inVar())
	case 8:
		return pair(sub(), sub())
	case 9:
		return op(pathOverSig, inDim(), sub(), sub())
	case 10:
		return op(lineSig, inDim())
	case 11:
		return at(sub(), g.dimension(dims))
	case 12:
		return op(unitSig)
	case 13:
		return data("Berth", sub())
	case 14:
		return con(g.of([]string{"zero", "x", "left"}), sub(), dim())
	case 15:
		return numeral(int64(g.upTo(20)))
	case 16, 17:
		cases := term.Rows{}
		for k := range g.upTo(3) {
			b := &term.Bound{}
			for range g.upTo(2) {
				b.Hints = append(b.Hints, g.hint())
			}
			v := len(b.Hints)
			for range k {
				b.Hints = append(b.Hints, g.hint())
			}
			b.Body = g.core(vars+v, dims+k, depth-1)
			name := g.of([]string{"zero", "x", "left"})
			cases = append(cases, []term.Arg{term.Reference{Name: name, Index: k, Target: berths{}}, b})
		}
		return op(elimSig, term.Reference{Name: "Berth", Index: -1}, term.Rows{{sub()}}, inVar(), sub(), cases)
	case 18:
		return op(transpSig, inDim(), g.face(dims), sub())
	case 19:
		rows := term.Rows{}
		for range g.upTo(2) {
			rows = append(rows, []term.Arg{g.face(dims), inDim()})
		}
		return op(hcompSig, sub(), sub(), rows)
	case 20:
		return op(letSig, sub(), sub(), inVar())
	}
	return op(crateSig, sub(), inDim(), g.face(dims), sub(), sub())
}
