package prims

import (
	"math"
	"math/big"
	"math/bits"

	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
)

// Numerals: sucⁿ zero is stored as a number, and sucⁿ x as n + x, so that a
// number costs its digits. Everything else about natural numbers comes from
// their declaration (nat.go).

// natural is a natural number: small, or big when big is not nil.
type natural struct {
	small uint64
	big   *big.Int
}

func naturalOf(b *big.Int) natural {
	if b.IsUint64() {
		return natural{small: b.Uint64()}
	}
	return natural{big: b}
}

func (n natural) Int() *big.Int {
	if n.big != nil {
		return n.big
	}
	return new(big.Int).SetUint64(n.small)
}

func (n natural) isZero() bool { return n.big == nil && n.small == 0 }

func (n natural) equal(m natural) bool {
	if n.big == nil || m.big == nil {
		return n.big == nil && m.big == nil && n.small == m.small
	}
	return n.big.Cmp(m.big) == 0
}

// MaxNumberBits is how many bits a stored number may have: one operation on
// such numbers, 4 MB each, takes about a millisecond, after which a run looks at
// its context again. A larger one is over the budget for memory, whatever that is.
const MaxNumberBits = 1 << 25

// afford charges a number of the given bits before it is made.
func afford(run *value.Run, bits int) {
	if bits > MaxNumberBits {
		run.Over("bits of a number", MaxNumberBits)
	}
	run.Charge(value.PriceNode + int64(bits/8))
}

func (n natural) plus(run *value.Run, m natural) natural {
	if n.big == nil && m.big == nil {
		if sum, carry := bits.Add64(n.small, m.small, 0); carry == 0 {
			return natural{small: sum}
		}
	}
	a, b := n.Int(), m.Int()
	afford(run, max(a.BitLen(), b.BitLen())+1)
	return naturalOf(new(big.Int).Add(a, b))
}

// times is a product of which one factor, the number of successors that a step
// writes out, is short; with two long ones it could not be interrupted.
func (n natural) times(run *value.Run, m natural) natural {
	if n.big == nil && n.small == 1 {
		return m
	}
	if n.big == nil && m.big == nil {
		if high, low := bits.Mul64(n.small, m.small); high == 0 {
			return natural{small: low}
		}
	}
	a, b := n.Int(), m.Int()
	afford(run, a.BitLen()+b.BitLen())
	return naturalOf(new(big.Int).Mul(a, b))
}

func (n natural) minus(run *value.Run, m natural) natural {
	if n.big == nil {
		return natural{small: n.small - m.small}
	}
	afford(run, n.big.BitLen())
	return naturalOf(new(big.Int).Sub(n.Int(), m.Int()))
}

func (n natural) less(m natural) bool {
	if n.big == nil && m.big == nil {
		return n.small < m.small
	}
	return n.Int().Cmp(m.Int()) < 0
}

// Number is sucⁿ zero as a value.
type Number struct {
	data *Data
	n    natural
}

// Successors is suc^count base, count ≥ 1, as a value.
type Successors struct {
	data  *Data
	count natural
	base  value.Value
}

// newNumber is the number n; small ones are shared.
func newNumber(run *value.Run, d *Data, n natural) *Number {
	if n.big == nil && n.small < uint64(len(d.small)) {
		return d.small[n.small]
	}
	room, _ := run.Numerals.(*numberRoom)
	if room == nil {
		room = new(numberRoom)
		run.Numerals = room
	}
	if len(room.left) == 0 {
		room.left = make([]Number, atOnce)
	}
	out := &room.left[0]
	room.left = room.left[1:]
	out.data, out.n = d, n
	return out
}

// atOnce is how many numbers are made at once, which is cheaper than one by one
// and keeps no more than 400 bytes alive that nobody needs.
const atOnce = 16

type numberRoom struct{ left []Number }

// Support is empty.
func (n *Number) Support() value.Support { return 0 }

// Substitute changes nothing.
func (n *Number) Substitute(*value.Run, *value.Subst) value.Value { return n }

// Int is the number. The caller may not change it.
func (n *Number) Int() *big.Int { return n.n.Int() }

func (n *Number) isZero() bool { return n.n.isZero() }

func (n *Number) predecessor(run *value.Run) value.Value {
	return newNumber(run, n.data, n.n.minus(run, natural{small: 1}))
}

// Support is the base's.
func (s *Successors) Support() value.Support { return s.base.Support() }

// Substitute delays t over the base.
func (s *Successors) Substitute(run *value.Run, t *value.Subst) value.Value {
	return successors(run, s.data, s.count, run.Substitute(s.base, t))
}

// Split is the number of successors and what stands below them.
func (s *Successors) Split() (*big.Int, value.Value) {
	return new(big.Int).Set(s.count.Int()), s.base
}

func (s *Successors) predecessor(run *value.Run) value.Value {
	return successors(run, s.data, s.count.minus(run, natural{small: 1}), s.base)
}

// successors is suc^n v, put together where v is known to be a number.
func successors(run *value.Run, d *Data, n natural, v value.Value) value.Value {
	if n.isZero() {
		return v
	}
	switch v := value.Peek(v).(type) {
	case *Number:
		return newNumber(run, d, v.n.plus(run, n))
	case *Successors:
		return &Successors{d, v.count.plus(run, n), v.base}
	default:
		return &Successors{d, n, v}
	}
}

// successorOp is the constructor suc.
type successorOp struct {
	conOp
	data *Data
}

// Eval evaluates the argument: numbers are to be numbers, not chains.
func (o successorOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	v := run.Force(args[2].Eval(run, f))
	if n, ok := v.(*Number); ok && n.n.big == nil && n.n.small < math.MaxUint64 {
		return newNumber(run, o.data, natural{small: n.n.small + 1})
	}
	return successors(run, o.data, natural{small: 1}, v)
}

// counted is v as a number plus a rest; the rest is nil for a numeral.
func counted(run *value.Run, v value.Value) (n natural, rest value.Value) {
	for {
		switch w := run.Force(v).(type) {
		case *Number:
			return n.plus(run, w.n), nil
		case *Successors:
			run.Take(value.StepNumeral)
			n, v = n.plus(run, w.count), w.base
		default:
			return n, w
		}
	}
}

func readNumeral(d *Data, n natural) value.Core {
	return op(numeralSig, term.Number{Int: n.Int()}, term.Reference{Name: d.Name, Index: -1, Target: d})
}

// readSuccessors reads suc^n x without nesting the stack.
func (t *DataType) readSuccessors(q value.Quoter, v *Successors) value.Core {
	n, rest := counted(q.Run(), v)
	if rest == nil {
		return readNumeral(t.Data, n)
	}
	core := q.Term(t, rest)
	suc := t.Data.Constructors[1]
	counter, _ := q.(interface{ Count() }) // each successor is a node of the output
	for ; !n.isZero(); n = n.minus(q.Run(), natural{small: 1}) {
		if counter != nil {
			counter.Count()
		}
		q.Run().Charge(value.PriceNode)
		core = op(conSig, suc.reference, term.Rows{}, core)
	}
	return core
}

func (t *DataType) sameNumber(c value.Comparer, a, b value.Value) bool {
	run := c.Run()
	m, x := counted(run, a)
	n, y := counted(run, b)
	if x == nil && y == nil {
		return m.equal(n)
	}
	if x != nil && y != nil && m.equal(n) {
		return c.Terms("the number below the successors", t, x, y)
	}
	// what is left below the common successors differs, unless a hole there says more
	least := m
	if n.less(m) {
		least = n
	}
	if least.isZero() {
		return false
	}
	below := func(n natural, rest value.Value) value.Value {
		if rest == nil {
			return newNumber(run, t.Data, n.minus(run, least))
		}
		return successors(run, t.Data, n.minus(run, least), rest)
	}
	return c.Terms("the number below the successors", t, below(m, x), below(n, y))
}

var numeralSig = &term.Signature{Name: "numeral", Slots: []term.CoreSlot{{}, {Slot: term.Slot{Sort: term.NameSort}, Silent: true}}}

type numeralOp struct{}

func (o numeralOp) Eval(run *value.Run, _ eval.Frame, args []eval.Arg) value.Value {
	return o.Value(run, args)
}

func (numeralOp) Value(run *value.Run, args []eval.Arg) value.Value {
	n := naturalOf(args[0].Payload.(term.Number).Int)
	afford(run, n.Int().BitLen())
	return newNumber(run, args[1].Payload.(term.Reference).Target.(*Data), n)
}

func numeralFormer() Former {
	return Former{Name: "numerals", Version: 1, Operators: []Operator{{numeralSig, numeralOp{}}}}
}

// sameNumbers is the numeral that base and all walls are, as far as is known
// without doing any work, which is then their composite; nil if they are not.
func sameNumbers(run *value.Run, base value.Value, walls value.System) value.Value {
	n, ok := value.Peek(base).(*Number)
	if !ok || run.Plain.NoNumerals {
		return nil
	}
	for _, w := range walls {
		if m, ok := value.Peek(w.Body).(*Number); !ok || !m.n.equal(n.n) {
			return nil
		}
	}
	return n
}

// hcompNumbers is a strict composite of numbers: equal numerals give that
// numeral, which is what pushing successors would give, and common successors
// are pushed all at once. ok is false where it is stuck.
func (t *DataType) hcompNumbers(run *value.Run, base value.Value, walls value.System) (value.Value, bool) {
	n, rest := countedOne(run, base)
	rests := make(value.System, len(walls))
	least := n
	counts := make([]natural, len(walls))
	for k, w := range walls {
		m, r := countedOne(run, w.Body)
		if m.less(least) {
			least = m
		}
		counts[k] = m
		rests[k] = value.Wall{Cube: w.Cube, I: w.I, Body: r}
	}
	if rest == nil {
		same := true
		for k := range walls {
			same = same && rests[k].Body == nil && counts[k].equal(n)
		}
		if same {
			return newNumber(run, t.Data, n), true
		}
	}
	if least.isZero() {
		return nil, false
	}
	below := func(m natural, r value.Value) value.Value {
		m = m.minus(run, least)
		if r == nil {
			return &Number{t.Data, m}
		}
		return successors(run, t.Data, m, r)
	}
	for k := range walls {
		rests[k].Body = below(counts[k], rests[k].Body)
	}
	return successors(run, t.Data, least, LaterHcomp(run, t, below(n, rest), rests)), true
}

// countedOne is v as far as it shows at once: the number, and what is below
// the successors, not forced further.
func countedOne(run *value.Run, v value.Value) (natural, value.Value) {
	switch w := run.Force(v).(type) {
	case *Number:
		return w.n, nil
	case *Successors:
		return w.count, w.base
	default:
		return natural{}, w
	}
}
