// Package quote turns values back into syntax and compares them: reading back
// to normal forms, the conversion check, and the account of where two values
// differ. What the formers know of it, they say through value.Quoter and
// value.Comparer.
package quote

import (
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Fold decides which definitions reading back keeps folded.
type Fold func(g value.Global) bool

// Reader reads values back in a scope. It belongs to one run. Readback keeps
// sharing: a value that has been read at a type, in a scope, is read once.
type Reader struct {
	run        *value.Run
	variables  int
	dimensions int
	fold       Fold
	memo       map[memoKey]value.Core
	outside    int        // the variables that were there at first
	bound      []variable // the last variable of each level above those
	nodes      int64
	limit      int64
}

type memoKey struct {
	t, v                  value.Value
	variables, dimensions int
}

// NewReader reads back in a scope of the given numbers of variables and
// dimensions; the names of the dimensions in scope are their levels. fold may
// be nil: every definition is unfolded.
func NewReader(run *value.Run, variables, dimensions int, fold Fold) *Reader {
	return &Reader{run: run, variables: variables, outside: variables, dimensions: dimensions, fold: fold, memo: map[memoKey]value.Core{}, limit: run.Budget().Output}
}

// Run is the run that reading back is charged to.
func (q *Reader) Run() *value.Run { return q.run }

// Count counts one node of the output that a former makes by itself.
func (q *Reader) Count() { q.count() }

func (q *Reader) count() {
	q.nodes++
	q.run.Charge(value.PriceNode)
	if q.nodes > q.limit {
		q.run.Over("nodes", q.limit)
	}
}

// folded is the folded form of v, where reading back keeps it.
func (q *Reader) folded(v value.Value) *value.Neutral {
	l, ok := v.(*value.Lazy)
	if !ok || q.fold == nil {
		return nil
	}
	n := l.Fold(q.run)
	if n != nil && q.fold(n.Head().(*value.GlobalHead).Global) {
		return n
	}
	return nil
}

// Type reads a type back.
func (q *Reader) Type(v value.Value) (c value.Core) {
	key := memoKey{nil, v, q.variables, q.dimensions}
	if c, ok := q.memo[key]; ok {
		return c
	}
	if q.run.Watched() {
		defer q.run.Operation(value.ReadbackSite)()
	}
	before := q.work()
	if q.run.Enter() {
		c = q.hop(nil, v)
	} else {
		c = q.typeBelow(v)
	}
	q.run.Leave()
	q.remember(key, c, before)
	return c
}

func (q *Reader) typeBelow(v value.Value) value.Core {
	if n := q.folded(v); n != nil {
		return q.Neutral(n)
	}
	q.count()
	switch t := q.run.Force(v).(type) {
	case value.Type:
		return t.ReadBack(q)
	case *value.Neutral:
		return q.Neutral(t)
	default:
		q.run.Fault("%T is read back as a type", t)
		return nil
	}
}

// hop is typeBelow, or termBelow where there is a type, on a fresh stack.
//
//go:noinline
func (q *Reader) hop(t, v value.Value) (c value.Core) {
	q.run.Hop(func() {
		if t == nil {
			c = q.typeBelow(v)
		} else {
			c = q.termBelow(t, v)
		}
	})
	return c
}

// small is how much work may be done again rather than remembered: to remember a
// leaf costs more than to read it twice.
const small = 8

// work is what has been done so far, in nodes, steps and cells.
func (q *Reader) work() int64 { return q.nodes + q.run.Steps + q.run.Forced }

func (q *Reader) remember(key memoKey, c value.Core, before int64) {
	if q.work()-before > small {
		q.memo[key] = c
	}
}

// Term reads v back at type t, η-long.
func (q *Reader) Term(t, v value.Value) (c value.Core) {
	key := memoKey{t, v, q.variables, q.dimensions}
	if c, ok := q.memo[key]; ok {
		return c
	}
	if q.run.Watched() {
		defer q.run.Operation(value.ReadbackSite)()
	}
	before := q.work()
	if q.run.Enter() {
		c = q.hop(t, v)
	} else {
		c = q.termBelow(t, v)
	}
	q.run.Leave()
	q.remember(key, c, before)
	return c
}

func (q *Reader) termBelow(t, v value.Value) value.Core {
	if n := q.folded(v); n != nil {
		return q.Neutral(n)
	}
	q.count()
	switch t := q.run.Force(t).(type) {
	case value.Type:
		return t.ReadBackElement(q, q.run.Force(v))
	case *value.Neutral:
		n, ok := q.run.Force(v).(*value.Neutral)
		if !ok {
			q.run.Fault("%T stands in a neutral type", q.run.Force(v))
		}
		return q.Neutral(n)
	default:
		q.run.Fault("%T is read back at as a type", t)
		return nil
	}
}

// Neutral reads a neutral back, along its spine.
func (q *Reader) Neutral(n *value.Neutral) value.Core {
	c := n.Head().ReadBack(q)
	if n.Length() == 0 {
		if q.run.Traced() {
			q.run.ReadStuck(n, c)
		}
		return c
	}
	t := n.Head().Type(q.run)
	prefixes := n.Prefixes()
	if q.run.Traced() {
		q.run.ReadStuck(prefixes[0], c)
	}
	for _, p := range prefixes[1:] {
		q.count()
		before, f := p.Split()
		c = f.ReadBack(q, c, t)
		if q.run.Traced() {
			q.run.ReadStuck(p, c)
		}
		t = f.Type(q.run, t, before)
	}
	return c
}

// variable is one that a binder has had. Binders side by side, as in a large
// pair of functions, have the same ones.
type variable struct {
	hint string
	t    value.Value
	x    *value.Neutral
}

func (q *Reader) variable(hint string, t value.Value) *value.Neutral {
	k := q.variables - q.outside
	q.variables++
	for len(q.bound) <= k {
		q.bound = append(q.bound, variable{})
	}
	if v := &q.bound[k]; v.x == nil || v.hint != hint || v.t != t {
		*v = variable{hint, t, value.NewVariable(q.variables-1, hint, t)}
	}
	return q.bound[k].x
}

// Variable goes under the binder of a variable.
func (q *Reader) Variable(hint string, t value.Value, body func(x value.Value) value.Core) *term.Bound {
	x := q.variable(hint, t)
	c := body(x)
	q.variables--
	return &term.Bound{Hints: []string{hint}, Body: c}
}

// Dimension goes under the binder of a dimension.
func (q *Reader) Dimension(hint string, body func(i value.Name) value.Core) *term.Bound {
	i := value.Name(q.dimensions)
	q.dimensions++
	c := body(i)
	q.dimensions--
	return &term.Bound{Hints: []string{hint}, Body: c, Dimensions: 1}
}

type readerBinding struct {
	q     *Reader
	hints []string
}

func (b *readerBinding) Variable(hint string, t value.Value) value.Value {
	b.hints = append(b.hints, hint)
	return b.q.variable(hint, t)
}

func (b *readerBinding) Dimension(hint string) value.Name {
	i := value.Name(b.q.dimensions)
	b.q.dimensions++
	b.hints = append(b.hints, hint)
	return i
}

// Binders goes under several binders at once.
func (q *Reader) Binders(body func(b value.Binding) value.Core) *term.Bound {
	v, d := q.variables, q.dimensions
	b := &readerBinding{q: q}
	c := body(b)
	q.variables, q.dimensions = v, d
	return &term.Bound{Hints: b.hints, Body: c}
}

// Walls reads a system back at type t: irredundant, in canonical order, each
// wall at t on its own face.
func (q *Reader) Walls(t value.Value, s value.System) term.Rows {
	walls := s.Irredundant()
	q.run.Dropped += int64(len(s) - len(walls))
	cubes := make([]interval.Cube, len(walls))
	for k, w := range walls {
		cubes[k] = w.Cube
	}
	types := make([]value.Value, len(walls))
	rows := make([][]term.Arg, len(walls))
	return q.Rows(cubes, func(k int) []term.Arg {
		w := walls[k]
		here := q.run.Restrict(t, w.Cube)
		for j, v := range walls[:k] { // walls that are alike are read once
			if v.Body == w.Body && v.I == w.I && types[j] == here {
				return rows[j]
			}
		}
		types[k], rows[k] = here, []term.Arg{q.Dimension("j", func(i value.Name) value.Core {
			return q.Term(here, q.run.At(w.Body, w.I, interval.Var(i)))
		})}
		return rows[k]
	})
}

// Rows reads other systems back; the cubes stand in canonical order.
func (q *Reader) Rows(cubes []interval.Cube, row func(k int) []term.Arg) term.Rows {
	rows := make(term.Rows, len(cubes))
	for k, c := range cubes {
		rows[k] = append([]term.Arg{&term.Face{Face: c.Face()}}, row(k)...)
	}
	return rows
}
