package quote

import (
	"slices"

	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Verdict is the outcome of a comparison.
type Verdict uint8

const (
	// Different: not equal by definition.
	Different Verdict = iota
	// Equal by definition.
	Equal
	// Undecided: it depends on a hole of the host's.
	Undecided
)

// String is the verdict in a word.
func (v Verdict) String() string { return [...]string{"different", "equal", "undecided"}[v] }

// Difference is the account of where two values differ: the way into both, the
// face it is under, and the two smallest parts that differ. Types, where the
// parts are types, is nil.
type Difference struct {
	Way                   []string
	Face                  interval.Face
	Variables, Dimensions int // the scope of the parts
	Type                  value.Value
	Left, Right           value.Value
	LeftText, RightText   string // where the parts are no terms
	Names                 []string
	DimensionNames        []string
}

// Comparer compares values in a scope. It belongs to one run and one
// comparison. What has been proved equal is remembered with its type and its
// scope, never as a pair alone.
type Comparer struct {
	run        *value.Run
	scope      [2][]string // names of the variables and the dimensions in scope, shared with the caller
	variables  []string    // hints of those that the comparison went under
	dimensions []string
	inclusion  bool
	memo       map[pairKey]bool // true: equal; false: different
	way        []string
	face       interval.Face
	blocked    value.Global
	found      *Difference
	isHole     func(value.Global) bool
}

type pairKey struct {
	t, a, b   value.Value
	inclusion bool
}

// NewComparer compares in a scope with the given names of variables and
// dimensions, whose names as values are their levels; the slices are not copied
// and must stay as they are. isHole may be nil.
func NewComparer(run *value.Run, variables, dimensions []string, isHole func(value.Global) bool) *Comparer {
	return &Comparer{run: run, scope: [2][]string{variables, dimensions}, memo: map[pairKey]bool{}, face: interval.Top(), isHole: isHole}
}

// Included decides a ≤ b for types.
func (c *Comparer) Included(a, b value.Value) Verdict {
	if c.run.Watched() {
		defer c.run.Operation(value.ComparingSite)()
	}
	c.inclusion = true
	ok := c.Types("", a, b)
	c.inclusion = false
	return c.verdict(ok)
}

// EqualAt decides whether a and b are equal at t.
func (c *Comparer) EqualAt(t, a, b value.Value) Verdict {
	if c.run.Watched() {
		defer c.run.Operation(value.ComparingSite)()
	}
	return c.verdict(c.Terms("", t, a, b))
}

// EqualAsTypes decides whether two types are equal.
func (c *Comparer) EqualAsTypes(a, b value.Value) Verdict {
	if c.run.Watched() {
		defer c.run.Operation(value.ComparingSite)()
	}
	return c.verdict(c.EqualTypes("", a, b))
}

func (c *Comparer) verdict(ok bool) Verdict {
	switch {
	case ok:
		return Equal
	case c.blocked != nil:
		return Undecided
	}
	return Different
}

// Difference is the account of the difference that was found, nil after a success.
func (c *Comparer) Difference() *Difference { return c.found }

// Blocked is the hole that an undecided comparison waits for.
func (c *Comparer) Blocked() value.Global { return c.blocked }

// Run is the run that comparing is charged to.
func (c *Comparer) Run() *value.Run { return c.run }

// Inclusion reports whether the comparison is at ≤ here.
func (c *Comparer) Inclusion() bool { return c.inclusion }

// level is the level of the next variable, dimension that of the next dimension.
func (c *Comparer) level() int     { return len(c.scope[0]) + len(c.variables) }
func (c *Comparer) dimension() int { return len(c.scope[1]) + len(c.dimensions) }

func (c *Comparer) differ(t, a, b value.Value) bool {
	if c.found == nil {
		c.found = &Difference{
			Way: append([]string(nil), c.way...), Face: c.face, Variables: c.level(), Dimensions: c.dimension(), Type: t, Left: a, Right: b,
			Names: slices.Concat(c.scope[0], c.variables), DimensionNames: slices.Concat(c.scope[1], c.dimensions),
		}
	}
	return false
}

// Differ records that a part which is no term differs.
func (c *Comparer) Differ(step, left, right string) bool {
	c.differ(nil, nil, nil)
	if c.found.Left == nil && c.found.LeftText == "" {
		c.found.Way = append(c.found.Way, step)
		c.found.LeftText, c.found.RightText = left, right
	}
	return false
}

// attempt compares folded forms; a failure of it says nothing.
func (c *Comparer) attempt(a, b value.Value) bool {
	l, ok1 := a.(*value.Lazy)
	r, ok2 := b.(*value.Lazy)
	if !ok1 || !ok2 {
		return false
	}
	m, n := l.Fold(c.run), r.Fold(c.run)
	if m == nil || n == nil || m.Length() != n.Length() || !m.Head().Same(c, n.Head()) {
		return false
	}
	found, blocked := c.found, c.blocked
	ok := c.Neutrals(m, n)
	c.found, c.blocked = found, blocked
	return ok
}

// into goes one step down: typesBelow, or termsBelow where there is a type.
func (c *Comparer) into(step string, t, a, b value.Value) (ok bool) {
	if step != "" {
		c.way = append(c.way, step)
	}
	if c.run.Enter() {
		ok = c.hop(t, a, b)
	} else if t == nil {
		ok = c.typesBelow(a, b)
	} else {
		ok = c.termsBelow(t, a, b)
	}
	c.run.Leave()
	if step != "" {
		c.way = c.way[:len(c.way)-1]
	}
	return ok
}

//go:noinline
func (c *Comparer) hop(t, a, b value.Value) (ok bool) {
	c.run.Hop(func() {
		if t == nil {
			ok = c.typesBelow(a, b)
		} else {
			ok = c.termsBelow(t, a, b)
		}
	})
	return ok
}

// work is what has been done so far, in steps and cells.
func (c *Comparer) work() int64 { return c.run.Steps + c.run.Forced }

func (c *Comparer) remember(key pairKey, ok bool, before int64) {
	if c.work()-before > small {
		c.memo[key] = ok
	}
}

// EqualTypes compares two types at equality.
func (c *Comparer) EqualTypes(step string, a, b value.Value) bool {
	inclusion := c.inclusion
	c.inclusion = false
	ok := c.Types(step, a, b)
	c.inclusion = inclusion
	return ok
}

// Types compares two types, at ≤ where the comparison is at ≤.
func (c *Comparer) Types(step string, a, b value.Value) bool {
	if a == b {
		c.run.Identical++
		return true
	}
	key := pairKey{nil, a, b, c.inclusion}
	if known, ok := c.memo[key]; ok {
		c.run.Identical++
		return known || c.differ(nil, a, b)
	}
	before := c.work()
	ok := c.into(step, nil, a, b)
	c.remember(key, ok, before)
	return ok
}

func (c *Comparer) typesBelow(a, b value.Value) bool {
	c.run.Take(value.StepCompare)
	if c.attempt(a, b) {
		return true
	}
	x, y := c.run.Force(a), c.run.Force(b)
	if x == y {
		return true
	}
	switch x := x.(type) {
	case value.Type:
		if y, ok := y.(value.Type); ok && x.SameType(c, y) {
			return true
		}
	case *value.Neutral:
		if y, ok := y.(*value.Neutral); ok && c.Neutrals(x, y) {
			return true
		}
	}
	c.waits(x, y)
	return c.differ(nil, a, b)
}

// Terms compares two terms at type t.
func (c *Comparer) Terms(step string, t, a, b value.Value) bool {
	if a == b {
		c.run.Identical++
		return true
	}
	key := pairKey{t, a, b, false}
	if known, ok := c.memo[key]; ok {
		c.run.Identical++
		return known || c.differ(t, a, b)
	}
	inclusion := c.inclusion
	c.inclusion = false
	before := c.work()
	ok := c.into(step, t, a, b)
	c.inclusion = inclusion
	c.remember(key, ok, before)
	return ok
}

func (c *Comparer) termsBelow(t, a, b value.Value) bool {
	c.run.Take(value.StepCompare)
	if c.attempt(a, b) {
		return true
	}
	x, y := c.run.Force(a), c.run.Force(b)
	if x == y {
		return true
	}
	switch t := c.run.Force(t).(type) {
	case value.Type:
		if t.SameElement(c, x, y) {
			return true
		}
	case *value.Neutral:
		m, ok1 := x.(*value.Neutral)
		n, ok2 := y.(*value.Neutral)
		if ok1 && ok2 && c.Neutrals(m, n) {
			return true
		}
	}
	c.waits(x, y)
	return c.differ(t, a, b)
}

// waits notes a hole that heads one of two values that differ.
func (c *Comparer) waits(vs ...value.Value) {
	if c.isHole == nil {
		return
	}
	for _, v := range vs {
		if n, ok := v.(*value.Neutral); ok {
			if g, ok := n.Head().(*value.GlobalHead); ok && c.isHole(g.Global) {
				c.blocked = g.Global
			}
		}
	}
}

// Neutrals compares two neutrals, head first, then along their spines.
func (c *Comparer) Neutrals(a, b *value.Neutral) bool {
	if a == b {
		return true
	}
	if a.Length() != b.Length() || !a.Head().Same(c, b.Head()) {
		return false
	}
	if a.Length() == 0 {
		return true
	}
	t := a.Head().Type(c.run)
	frames := b.Frames()
	for k, p := range a.Prefixes()[1:] {
		c.run.Take(value.StepCompare)
		before, f := p.Split()
		if !f.Same(c, frames[k], t) {
			return false
		}
		t = f.Type(c.run, t, before)
	}
	return true
}

// Variable goes under the binder of a variable.
func (c *Comparer) Variable(hint string, t value.Value, body func(x value.Value) bool) bool {
	return c.Binders(func(b value.Binding) bool { return body(b.Variable(hint, t)) })
}

// Dimension goes under the binder of a dimension.
func (c *Comparer) Dimension(hint string, body func(i value.Name) bool) bool {
	return c.Binders(func(b value.Binding) bool { return body(b.Dimension(hint)) })
}

type comparerBinding struct{ c *Comparer }

func (b comparerBinding) Variable(hint string, t value.Value) value.Value {
	x := value.NewVariable(b.c.level(), hint, t)
	b.c.variables = append(b.c.variables, hint)
	return x
}

func (b comparerBinding) Dimension(hint string) value.Name {
	i := value.Name(b.c.dimension())
	b.c.dimensions = append(b.c.dimensions, hint)
	return i
}

// Binders goes under several binders.
func (c *Comparer) Binders(body func(b value.Binding) bool) bool {
	v, d := len(c.variables), len(c.dimensions)
	ok := body(comparerBinding{c})
	c.variables, c.dimensions = c.variables[:v], c.dimensions[:d]
	return ok
}

// Under works on a face.
func (c *Comparer) Under(cube interval.Cube, body func() bool) bool {
	face := c.face
	c.face = face.And(cube.Face())
	ok := body()
	c.face = face
	return ok
}

// Walls compares two systems at type t: the same faces once what is implied is
// dropped, and equal walls, each at t on its face.
func (c *Comparer) Walls(t value.Value, a, b value.System) bool {
	all := len(a) + len(b)
	a, b = a.Irredundant(), b.Irredundant()
	c.run.Dropped += int64(all - len(a) - len(b))
	same := len(a) == len(b)
	for k := 0; same && k < len(a); k++ {
		same = a[k].Cube.Equal(b[k].Cube)
	}
	if !same {
		return c.Differ("the faces of the walls", faceOf(a).String(), faceOf(b).String())
	}
	for k, w := range a {
		here := c.run.Restrict(t, w.Cube)
		if !c.Under(w.Cube, func() bool {
			return c.Dimension("i", func(i value.Name) bool {
				return c.Terms("the wall on "+w.Cube.String(), here, c.run.At(w.Body, w.I, interval.Var(i)), c.run.At(b[k].Body, b[k].I, interval.Var(i)))
			})
		}) {
			return false
		}
	}
	return true
}

func faceOf(s value.System) interval.Face {
	f := interval.Bot()
	for _, w := range s {
		f = f.Or(w.Cube.Face())
	}
	return f
}

var _ value.Comparer = (*Comparer)(nil)
var _ value.Quoter = (*Reader)(nil)
