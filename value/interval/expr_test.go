// Expressions for the tests: trees of interval and face operations, drawn at
// random and read in several models. The models share no code with the package.

package interval

import (
	"fmt"
	"slices"
	"testing"

	"github.com/crillab/gophersat/solver"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"
)

// expr is an interval expression: op is one of '0' '1' 'v' '&' '|' '~'.
type expr struct {
	op   byte
	name Name
	l, r *expr
}

// faceExpr is a face expression: op is one of '0' '1' '=' '&' '|', where '='
// says that the interval expression is at an end.
type faceExpr struct {
	op   byte
	dim  *expr
	one  bool
	l, r *faceExpr
}

// pick draws a number below n <= 16, all nearly as likely: the library's own
// integers lean so far to the small ones that most expressions would be leaves.
func pick(t *rapid.T, n int) int {
	k := 0
	for range 6 {
		k *= 2
		if rapid.Bool().Draw(t, "bit") {
			k++
		}
	}
	return k % n
}

// pickFrom draws one of the elements.
func pickFrom[T any](t *rapid.T, from []T) T { return from[pick(t, len(from))] }

// drawExpr draws an expression of at most the given depth over the names.
func drawExpr(t *rapid.T, names []Name, depth int) *expr {
	if depth == 0 || pick(t, 8) == 0 {
		if k := pick(t, 16); k >= 14 {
			return &expr{op: "01"[k-14]}
		}
		return &expr{op: 'v', name: pickFrom(t, names)}
	}
	if op := "~&|&|"[pick(t, 5)]; op != '~' {
		return &expr{op: op, l: drawExpr(t, names, depth-1), r: drawExpr(t, names, depth-1)}
	}
	return &expr{op: '~', l: drawExpr(t, names, depth-1)}
}

// drawFaceExpr draws a face expression of at most the given depth.
func drawFaceExpr(t *rapid.T, names []Name, depth int) *faceExpr {
	if depth == 0 || pick(t, 8) == 0 {
		if k := pick(t, 16); k >= 14 {
			return &faceExpr{op: "01"[k-14]}
		}
		return &faceExpr{op: '=', one: pick(t, 2) == 1, dim: drawExpr(t, names, pickFrom(t, []int{0, 0, 2}))}
	}
	op := "&|"[pick(t, 2)]
	return &faceExpr{op: op, l: drawFaceExpr(t, names, depth-1), r: drawFaceExpr(t, names, depth-1)}
}

// drawLike draws an expression that is equal to e in every De Morgan algebra,
// by rewriting with the laws of CCHM 3.1 at random places.
func drawLike(t *rapid.T, e *expr, names []Name) *expr {
	if e.l != nil {
		l := drawLike(t, e.l, names)
		r := e.r
		if r != nil {
			r = drawLike(t, r, names)
		}
		e = &expr{op: e.op, l: l, r: r}
	}
	dual := map[byte]byte{'&': '|', '|': '&'}
	switch pick(t, 8) {
	case 0: // x = ~~x
		return &expr{op: '~', l: &expr{op: '~', l: e}}
	case 1: // x = x & (x | y), and dually
		op := "&|"[pick(t, 2)]
		return &expr{op: op, l: e, r: &expr{op: dual[op], l: drawExpr(t, names, 1), r: e}}
	case 2: // x op y = y op x
		if e.r != nil {
			return &expr{op: e.op, l: e.r, r: e.l}
		}
	case 3: // x op y = ~(~x dual ~y)
		if e.r != nil {
			return &expr{op: '~', l: &expr{op: dual[e.op], l: &expr{op: '~', l: e.l}, r: &expr{op: '~', l: e.r}}}
		}
	case 4: // x op (y dual z) = (x op y) dual (x op z)
		if e.r != nil && e.r.op == dual[e.op] {
			return &expr{op: e.r.op, l: &expr{op: e.op, l: e.l, r: e.r.l}, r: &expr{op: e.op, l: e.l, r: e.r.r}}
		}
	}
	return e
}

// String writes the expression for failure reports.
func (e *expr) String() string {
	switch e.op {
	case 'v':
		return nameString(e.name)
	case '~':
		return "~" + e.l.String()
	case '&', '|':
		return fmt.Sprintf("(%v %c %v)", e.l, e.op, e.r)
	}
	return string(e.op)
}

// dim evaluates the expression with the package, names mapped by rename.
func (e *expr) dim(rename func(Name) Name) Dim {
	switch e.op {
	case '0':
		return Zero()
	case '1':
		return One()
	case 'v':
		return Var(rename(e.name))
	case '~':
		return e.l.dim(rename).Rev()
	case '&':
		return e.l.dim(rename).Min(e.r.dim(rename))
	}
	return e.l.dim(rename).Max(e.r.dim(rename))
}

// face evaluates the expression with the package, names mapped by rename.
func (e *faceExpr) face(rename func(Name) Name) Face {
	switch e.op {
	case '0':
		return Bot()
	case '1':
		return Top()
	case '=':
		if e.one {
			return e.dim.dim(rename).Is1()
		}
		return e.dim.dim(rename).Is0()
	case '&':
		return e.l.face(rename).And(e.r.face(rename))
	}
	return e.l.face(rename).Or(e.r.face(rename))
}

func same(n Name) Name { return n }

// The four-element De Morgan algebra: 0, a, b, 1 as 0, 1, 2, 3. Meet and join
// are bitwise, and the reversal fixes a and b.
var fourReverse = [4]uint8{3, 1, 2, 0}

// four evaluates the expression in the four-element algebra.
func (e *expr) four(at func(Name) uint8) uint8 {
	switch e.op {
	case '0':
		return 0
	case '1':
		return 3
	case 'v':
		return at(e.name)
	case '~':
		return fourReverse[e.l.four(at)]
	case '&':
		return e.l.four(at) & e.r.four(at)
	}
	return e.l.four(at) | e.r.four(at)
}

// fourOf evaluates a normal form in the four-element algebra.
func fourOf(d Dim, at func(Name) uint8) uint8 {
	join := uint8(0)
	for k := range d.Len() {
		meet := uint8(3)
		for _, l := range d.Conjunction(k) {
			v := at(l.Name)
			if l.Negated {
				v = fourReverse[v]
			}
			meet &= v
		}
		join |= meet
	}
	return join
}

// everywhere calls yield for all assignments of values below base to the names.
func everywhere(names []Name, base int, yield func(at func(Name) uint8) bool) {
	total := 1
	for range names {
		total *= base
	}
	for code := range total {
		values := map[Name]uint8{}
		rest := code
		for _, n := range names {
			values[n] = uint8(rest % base)
			rest /= base
		}
		if !yield(func(n Name) uint8 { return values[n] }) {
			return
		}
	}
}

// circuit is a problem for the solver: clauses over numbered variables, a
// negative number being the negation. A Dim is a monotone circuit in
// independent variables for i and ~i (the free De Morgan algebra is the free
// distributive lattice on the literals); a face is one in variables for (i=0)
// and (i=1), of which not both hold. Variable 1 is true.
//
// The clauses are made here because the solver's own translation of formulas
// (package bf of version 1.4.0) loses guards in nested disjunctions: it finds
// no model for ((s and (s or (s and s))) or f) and not s.
type circuit struct {
	clauses  [][]int
	literals map[literalKey]int
	last     int
}

type literalKey struct {
	name   Name
	second bool
}

func newCircuit() *circuit {
	return &circuit{clauses: [][]int{{1}}, literals: map[literalKey]int{}, last: 1}
}

// literal returns the variable of a literal.
func (c *circuit) literal(n Name, second bool) int {
	key := literalKey{n, second}
	if c.literals[key] == 0 {
		c.last++
		c.literals[key] = c.last
	}
	return c.literals[key]
}

// and returns a variable for the conjunction of two.
func (c *circuit) and(a, b int) int {
	switch {
	case a == b:
		return a
	case a == -b:
		return -1
	}
	c.last++
	c.clauses = append(c.clauses, []int{-c.last, a}, []int{-c.last, b}, []int{c.last, -a, -b})
	return c.last
}

func (c *circuit) or(a, b int) int { return -c.and(-a, -b) }

// follows asks the solver whether b follows from a; with faces set, no name is
// at both ends.
func (c *circuit) follows(a, b int, faces bool) bool {
	clauses := append(slices.Clone(c.clauses), []int{a}, []int{-b})
	if faces {
		for key, v := range c.literals {
			if w := c.literals[literalKey{key.name, true}]; !key.second && w != 0 {
				clauses = append(clauses, []int{-v, -w})
			}
		}
	}
	return solver.New(solver.ParseSlice(clauses)).Solve() == solver.Unsat
}

// circuit reads the expression, reversed when rev is set.
func (e *expr) circuit(c *circuit, rev bool) int {
	switch e.op {
	case '0', '1':
		if (e.op == '1') != rev {
			return 1
		}
		return -1
	case 'v':
		return c.literal(e.name, rev)
	case '~':
		return e.l.circuit(c, !rev)
	}
	if (e.op == '&') != rev {
		return c.and(e.l.circuit(c, rev), e.r.circuit(c, rev))
	}
	return c.or(e.l.circuit(c, rev), e.r.circuit(c, rev))
}

// circuit reads the face expression. Where r is 1 is the reading of r with
// (i=1) for i and (i=0) for ~i, and where r is 0 is that of the reversal.
func (e *faceExpr) circuit(c *circuit) int {
	switch e.op {
	case '0':
		return -1
	case '1':
		return 1
	case '=':
		return e.dim.endCircuit(c, e.one)
	case '&':
		return c.and(e.l.circuit(c), e.r.circuit(c))
	}
	return c.or(e.l.circuit(c), e.r.circuit(c))
}

// endCircuit reads the face on which the expression is 1, or 0 (CCHM 4.1).
func (e *expr) endCircuit(c *circuit, one bool) int {
	switch e.op {
	case '0', '1':
		if (e.op == '1') == one {
			return 1
		}
		return -1
	case 'v':
		return c.literal(e.name, one)
	case '~':
		return e.l.endCircuit(c, !one)
	}
	if (e.op == '&') == one {
		return c.and(e.l.endCircuit(c, one), e.r.endCircuit(c, one))
	}
	return c.or(e.l.endCircuit(c, one), e.r.endCircuit(c, one))
}

// drawDim draws a normal form.
func drawDim(t *rapid.T, names []Name, depth int) Dim {
	return drawExpr(t, names, depth).dim(same)
}

// drawFace draws a face.
func drawFace(t *rapid.T, names []Name, depth int) Face {
	return drawFaceExpr(t, names, depth).face(same)
}

// drawSubst draws a substitution on some of the names, into the names.
func drawSubst(t *rapid.T, names, into []Name) *Subst {
	var from []Name
	var to []Dim
	for _, n := range names {
		switch pick(t, 6) {
		case 0, 1:
			from, to = append(from, n), append(to, end(pick(t, 2) == 1))
		case 2:
			from, to = append(from, n), append(to, Lit(pickFrom(t, into), pick(t, 2) == 1))
		case 3:
			from, to = append(from, n), append(to, drawDim(t, into, 2))
		case 4: // a connection, also of a name with its own reversal
			l, m := Lit(pickFrom(t, into), pick(t, 2) == 1), Lit(pickFrom(t, into), pick(t, 2) == 1)
			if pick(t, 2) == 1 {
				m = l.Rev()
			}
			from, to = append(from, n), append(to, [...]Dim{l.Min(m), l.Max(m)}[pick(t, 2)])
		}
	}
	return NewSubst(from, to)
}

// requireForm checks the invariants of a normal form.
func requireForm(t require.TestingT, f form, faces bool) {
	if f.wide == nil {
		require.LessOrEqual(t, f.n, 4)
		for k := f.n; k < 4; k++ {
			require.Zero(t, f.w[k], "unused word")
		}
	} else {
		require.Zero(t, f.n)
		require.Zero(t, f.w)
		require.True(t, (f.wide.words == nil) != (f.wide.conjs == nil))
		if f.wide.conjs == nil {
			require.Greater(t, len(f.wide.words), 4, "fits inline")
		} else {
			require.True(t, slices.ContainsFunc(f.wide.conjs, func(c conj) bool { return c.high != nil }), "fits words")
		}
	}
	sup := Support(0)
	for _, n := range f.names() {
		sup |= Single(n)
	}
	require.Equal(t, sup, f.support())
	for j := range f.len() {
		c := f.at(j)
		require.True(t, c.high == nil || len(c.high.codes) > 0 && slices.IsSorted(c.high.codes))
		require.True(t, !faces || c.consistent(), "inconsistent cube")
		for k := range f.len() {
			require.True(t, j == k || !c.subset(f.at(k)), "absorbed conjunction")
		}
		if j > 0 {
			require.Negative(t, f.at(j-1).compare(c), "order")
		}
	}
}

// sizeErrorOf returns the *SizeError with which f panics, if it does.
func sizeErrorOf(t *testing.T, f func()) (size *SizeError) {
	defer func() {
		if v := recover(); v != nil {
			var ok bool
			size, ok = v.(*SizeError)
			require.True(t, ok, "panic of another type: %v", v)
		}
	}()
	f()
	return nil
}
