package prims

import (
	"fmt"

	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Universes U n : U (n+1), Russell style and cumulative (HoTT Book 1.3): their
// elements are types. transp (i. U n) φ A = A; composition stands in
// universe_hcomp.go.

// Universe is U n as a value.
type Universe struct{ Level int }

var universes = [8]*Universe{{0}, {1}, {2}, {3}, {4}, {5}, {6}, {7}}

// NewUniverse is U n.
func NewUniverse(n int) *Universe {
	if n < len(universes) {
		return universes[n]
	}
	return &Universe{n}
}

// Support is empty.
func (u *Universe) Support() value.Support { return 0 }

// Substitute changes nothing.
func (u *Universe) Substitute(*value.Run, *value.Subst) value.Value { return u }

// Transp is the identity.
func (u *Universe) Transp(_ *value.Run, _ value.Name, _ interval.Face, a value.Value) value.Value {
	return a
}

// ReadBack is the level.
func (u *Universe) ReadBack(value.Quoter) value.Core { return op(universeSig, term.Level(u.Level)) }

// SameType is equality of levels or, where the comparison is at ≤, their order.
// With levels switched off there is one universe; a former from outside may
// still say that it lives higher up.
func (u *Universe) SameType(c value.Comparer, other value.Type) bool {
	o, ok := other.(*Universe)
	return ok && (u.Level == o.Level || c.Run().OneUniverse || u.Level < o.Level && c.Inclusion() ||
		c.Differ("the level", fmt.Sprint(u.Level), fmt.Sprint(o.Level)))
}

// ReadBackElement reads a type back.
func (u *Universe) ReadBackElement(q value.Quoter, v value.Value) value.Core { return q.Type(v) }

// SameElement compares types at equality.
func (u *Universe) SameElement(c value.Comparer, a, b value.Value) bool {
	return c.EqualTypes("", a, b)
}

var universeSig = &term.Signature{Name: "U", Word: "U", Slots: []term.CoreSlot{{Slot: term.Slot{Sort: term.LevelSort}}}}

type universeOp struct{}

func (universeOp) Eval(_ *value.Run, _ eval.Frame, args []eval.Arg) value.Value {
	return NewUniverse(int(args[0].Payload.(term.Level)))
}
func (o universeOp) Value(run *value.Run, args []eval.Arg) value.Value { return o.Eval(run, nil, args) }

// MaxLevel is the highest universe level that can be written.
const MaxLevel = 1 << 20

func universeFormer() Former {
	return Former{
		Name: "universes", Version: 1,
		Words: []Word{word("U", func(c value.Checker, w *term.Written) (value.Core, value.Value) {
			n := part(w, 0).Number
			if n == nil || !n.IsInt64() || n.Int64() > MaxLevel {
				c.Fail(part(w, 0), term.Malformed, "this is no universe level", fmt.Sprintf("a numeral up to %d", MaxLevel), part(w, 0))
			}
			if c.Run().OneUniverse {
				return op(universeSig, term.Level(0)), NewUniverse(0)
			}
			level := int(n.Int64())
			return op(universeSig, term.Level(level)), NewUniverse(level + 1)
		}, nil)},
		Operators: []Operator{{universeSig, universeOp{}}},
	}
}
