package term

import (
	"context"
	"fmt"
	"math/big"

	"example.com/boxwright/nbe/internal/watch"
	"example.com/boxwright/value/interval"
)

// From core terms to written ones.
//
// The writer goes over a core term once, outside in, and builds the written
// tree; it does not know the names of bound variables yet, but counts where
// each of them occurs. When the tree stands, [naming] chooses
// the names, outside in again. A type whose bound name occurs nowhere becomes
// the form that binds nothing: -> for Pi, * for Sigma, Path for PathOver.
//
// Both passes keep their own lists of work, so nesting costs no stack. The
// written term is a tree and the core term a graph: the writer counts what it
// makes, gives up at a limit, and says how large the tree would have been.

// DefaultSize is the most nodes that [Write] makes when Names gives no limit.
const DefaultSize = 1 << 22

// Names says how a scope's variables and dimensions are called, and how large
// a term may be written. The zero value is the empty scope.
type Names struct {
	Variables  []string          // by level
	Dimensions []string          // by level
	Taken      func(string) bool // more words that no bound name may be: those of host formers; nil: none
	Size       int               // the most nodes written, see [Size]; 0: DefaultSize
}

// Write returns c as a written term, in the shortest form that reads back to
// it. Bound names are the hints wherever nothing is captured by them; a hint
// that is empty, "_" or no name is replaced, by "_" where the name is not used.
// A name of the scope that a later one hides is written as a variant of it.
// The errors are [*Error]: OutOfBudget when c is larger than names.Size as a
// tree, with the size, a *big.Int, as its Detail, or for a numeral that the
// notation has no room for ([MaxDigits]); WrongScope for a level
// without a name; Internal for an operator that does not fit its signature.
// Cost: linear in the result, times the logarithm of its size at worst. Safe
// for concurrent use.
func Write(c Core, names Names) (*Written, error) {
	return WriteContext(context.Background(), c, names)
}

// WriteContext is [Write] in a context, whose end is the error Cancelled.
func WriteContext(ctx context.Context, c Core, names Names) (*Written, error) {
	w := writer{limit: names.Size, taken: names.Taken, watch: watch.Of(ctx)}
	if w.limit <= 0 {
		w.limit = DefaultSize
	}
	var root *Written
	w.openScope(names)
	w.core(c, &root)
	w.run()
	if w.failed == nil && w.made > w.limit && w.watch.Cause() == nil {
		size := writtenSize(c, w.watch)
		w.failed = &Error{
			Kind: OutOfBudget, Message: "the term is too large to be written", Detail: size,
			WantText: fmt.Sprintf("at most %d nodes", w.limit), GotText: sizeText(size),
		}
	}
	if w.watch.Cause() != nil {
		return nil, ended(w.watch)
	}
	if w.failed != nil {
		return nil, w.failed
	}
	if w.choose(); w.watch.Cause() != nil {
		return nil, ended(w.watch)
	}
	return root, nil
}

// ended is the error of a context that has ended.
func ended(w *watch.Watch) *Error {
	return &Error{Kind: Cancelled, Message: "cancelled", Cause: w.Cause()}
}

// MaxDigits is how many decimal digits a numeral of the notation may have: what
// is read and what is written. Converting more would take long and could not be
// interrupted.
const MaxDigits = 100_000

// LongNumeral is the message of the error of a numeral with more than MaxDigits.
const LongNumeral = "a numeral is too long to be written"

// tooLong reports whether n has more than MaxDigits digits, by its bits: 3.3219
// of them for a digit, less one.
func tooLong(n *big.Int) bool { return n != nil && n.BitLen() > MaxDigits*33219/10000 }

// number is the numeral n.
func (w *writer) number(n *big.Int) *Written {
	if tooLong(n) && w.failed == nil {
		w.failed = &Error{
			Kind: OutOfBudget, Message: LongNumeral, Detail: new(big.Int).SetInt64(int64(n.BitLen())),
			WantText: fmt.Sprintf("at most %d digits", MaxDigits), GotText: fmt.Sprintf("%d bits", n.BitLen()),
		}
	}
	return &Written{Kind: NumeralKind, Number: n}
}

// sizeText says how large a tree is.
func sizeText(size *big.Int) string {
	if size.BitLen() > 64 {
		return fmt.Sprintf("more than 2^%d nodes", size.BitLen()-1)
	}
	return size.String() + " nodes"
}

// writer holds the state of the first pass.
type writer struct {
	limit, made int
	taken       func(string) bool
	failed      *Error
	watch       *watch.Watch
	todo        []job
	// What is in scope at the place being written, by level: indices of bound.
	variables, dimensions []int
	naming
}

// job is a core term, or a body under names, to be written into dst, or,
// without dst, the end of a scope: what is in scope is cut back to the given
// numbers.
type job struct {
	c                     Core
	under                 *binding
	dst                   **Written
	variables, dimensions int
}

func (w *writer) run() {
	for len(w.todo) > 0 && w.failed == nil && w.made <= w.limit && !w.watch.Ended(1) {
		last := len(w.todo) - 1
		j := w.todo[last]
		w.todo = w.todo[:last]
		if j.dst == nil {
			w.leave(j.variables, j.dimensions)
			continue
		}
		first := len(w.todo)
		if j.under != nil {
			w.enter(j.under)
			w.core(j.under.Body, j.dst)
			continue
		}
		*j.dst = w.node(j.c)
		// The parts were put on the list in their order; the first is next.
		for a, b := first, len(w.todo)-1; a < b; a, b = a+1, b-1 {
			w.todo[a], w.todo[b] = w.todo[b], w.todo[a]
		}
	}
}

// binding is a body to be written under names of the given sorts; part is
// where the names go, form the form around it, and unused the word that form
// gets when the name is not used.
type binding struct {
	*Bound
	sorts  []Sort
	part   *Part
	form   *Written
	unused string
}

func (w *writer) fail(kind ErrorKind, format string, args ...any) {
	if w.failed == nil {
		w.failed = &Error{Kind: kind, Message: fmt.Sprintf(format, args...)}
	}
}

// core puts c on the list of work.
func (w *writer) core(c Arg, dst **Written) {
	if c, ok := c.(Core); ok && c != nil {
		w.todo = append(w.todo, job{c: c, dst: dst})
		return
	}
	w.fail(Internal, "an argument of an operator is %T where a term stands", c)
}

// bound puts the body b, under names of the given sorts, on the list of work.
func (w *writer) bound(a Arg, part *Part, sorts []Sort, form *Written, unused string) {
	b, ok := a.(*Bound)
	if !ok || b == nil {
		w.fail(Internal, "an argument of an operator is %T where a body under names stands", a)
		return
	}
	part.Binders = make([]Binder, len(sorts))
	w.todo = append(w.todo, job{under: &binding{b, sorts, part, form, unused}, dst: &part.Body})
}

func (w *writer) enter(b *binding) {
	w.todo = append(w.todo, job{variables: len(w.variables), dimensions: len(w.dimensions)})
	for k, sort := range b.sorts {
		hint := ""
		if k < len(b.Hints) {
			hint = b.Hints[k]
		}
		n := w.bind(bound{
			hint: hint, dimension: sort == DimensionSort, first: k == 0,
			binder: &b.part.Binders[k], part: b.part, form: b.form, unused: b.unused,
		})
		if sort == DimensionSort {
			w.dimensions = append(w.dimensions, n)
		} else {
			w.variables = append(w.variables, n)
		}
	}
}

func (w *writer) leave(variables, dimensions int) {
	w.release(len(w.variables) - variables + len(w.dimensions) - dimensions)
	w.variables, w.dimensions = w.variables[:variables], w.dimensions[:dimensions]
}

// node writes one core term, leaving its parts on the list of work.
func (w *writer) node(c Core) *Written {
	w.made++
	switch c := c.(type) {
	case *Variable:
		if c.Level < 0 || c.Level >= len(w.variables) {
			w.fail(WrongScope, "the variable of level %d is not in scope", c.Level)
			return nil
		}
		return w.occurrence(w.variables[c.Level])
	case *Global:
		return w.mention(c.Name)
	case *Op:
		if c.Sig == nil {
			w.fail(Internal, "an operator without a signature")
			return nil
		}
		if special := specialWriters[c.Sig.Name]; special.write != nil {
			if len(c.Args) < special.args {
				w.fail(Internal, "the operator %s has %d arguments", c.Sig.Name, len(c.Args))
				return nil
			}
			return special.write(w, c)
		}
		return w.byShape(c)
	}
	w.fail(Internal, "%T is no core term", c)
	return nil
}

// byShape writes an operator as its signature says.
func (w *writer) byShape(c *Op) *Written {
	word := c.Sig.Word
	if word == "" {
		word = c.Sig.Name
	}
	f := Form(word)
	written := 0
	for k := range c.Args {
		if !c.Sig.silent(k) {
			written++
		}
	}
	f.Parts = make([]Part, 0, written)
	for k, a := range c.Args {
		if c.Sig.silent(k) {
			continue
		}
		if n := len(c.Sig.Slots); n == 0 || k >= n && !c.Sig.Slots[n-1].Rest {
			w.fail(Internal, "the operator %s has %d arguments", c.Sig.Name, len(c.Args))
			return nil
		}
		f.Parts = append(f.Parts, Part{})
		w.arg(a, c.Sig.SlotOf(k).Slot, &f.Parts[len(f.Parts)-1])
	}
	return f
}

// arg writes an argument into the part that the slot describes.
func (w *writer) arg(a Arg, slot Slot, part *Part) {
	switch a := a.(type) {
	case *Bound:
		w.bound(a, part, slot.Binds, nil, "")
	case Dimension:
		w.made += int(dimensionSize(a))
		part.Body = w.dimension(a.Dim)
	case *Face:
		w.made += int(faceSize(a))
		part.Body = w.face(a.Face)
	case Rows:
		w.rows(a, slot, part)
	case Level:
		part.Body = Numeral(uint64(max(a, 0)))
	case Number:
		part.Body = w.number(a.Int)
	case Reference:
		part.Body = w.mention(a.Name)
	default:
		w.core(a, &part.Body)
	}
}

func (w *writer) rows(rows Rows, slot Slot, part *Part) {
	part.Rows = make([][]Part, len(rows))
	for j, row := range rows {
		if len(row) > len(slot.Rows) {
			w.fail(Internal, "a row of %d arguments where %d stand", len(row), len(slot.Rows))
			return
		}
		part.Rows[j] = make([]Part, len(row))
		for k, a := range row {
			w.arg(a, slot.Rows[k], &part.Rows[j][k])
		}
	}
}

// dimension writes r: the join of the meets of its literals.
func (w *writer) dimension(r interval.Dim) *Written {
	if r.IsEnd() {
		if r.IsOne() {
			return Numeral(1)
		}
		return Numeral(0)
	}
	meets := make([]*Written, r.Len())
	for k := range meets {
		literals := r.Conjunction(k)
		parts := make([]*Written, len(literals))
		for j, l := range literals {
			if parts[j] = w.dimensionName(l.Name); l.Negated {
				parts[j] = Rev(parts[j])
			}
		}
		meets[k] = joined(Min, parts)
	}
	return joined(Max, meets)
}

// face writes f: the join of the meets of its equations.
func (w *writer) face(f interval.Face) *Written {
	if f.IsBot() {
		return Bot()
	}
	cubes := make([]*Written, f.Len())
	for k := range cubes {
		assignments := f.Cube(k).Assignments()
		if len(assignments) == 0 {
			return Top()
		}
		parts := make([]*Written, len(assignments))
		for j, a := range assignments {
			end := uint64(0)
			if a.One {
				end = 1
			}
			parts[j] = Eq(w.dimensionName(a.Name), end)
		}
		cubes[k] = joined(And, parts)
	}
	return joined(Or, cubes)
}

// joined is the only part, or the form of all of them.
func joined(form func(...*Written) *Written, parts []*Written) *Written {
	if len(parts) == 1 {
		return parts[0]
	}
	return form(parts...)
}

func (w *writer) dimensionName(n interval.Name) *Written {
	if n < 0 || int(n) >= len(w.dimensions) {
		w.fail(WrongScope, "the dimension of level %d is not in scope", n)
		return Name("_")
	}
	return w.occurrence(w.dimensions[n])
}
