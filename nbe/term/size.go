package term

import (
	"context"
	"math/big"

	"example.com/boxwright/nbe/internal/watch"
)

// The size of core terms, as trees and as the graphs they are. A tree may be
// exponentially larger than its graph, so each node's size is worked out once,
// bottom up, from an explicit list of work.

// maxSizeBits bounds the sizes that are counted exactly: every larger one is
// given as 2^maxSizeBits, so that a chain of a million doublings does not cost
// a million numbers of a million digits.
const maxSizeBits = 1 << 14

// Size returns how many nodes c has as a tree and how many distinct ones it
// has as a graph. Variables, globals and operators count one each, payloads
// nothing; a dimension or a face in an argument counts what writing it takes.
// A tree of 2^16384 nodes or more is given as that number. Cost: linear in the
// graph, except that the numbers may have up to 2 KB. Safe for concurrent use.
//
// A call on a term that is not known to be small is better made with
// [SizeContext], which can be stopped.
func Size(c Core) (tree *big.Int, nodes int) {
	m := measure{sizes: map[Arg]count{}}
	return m.of(c).big(), m.nodes
}

// SizeContext is [Size] in a context, whose end is the error Cancelled.
func SizeContext(ctx context.Context, c Core) (tree *big.Int, nodes int, err error) {
	m := measure{sizes: map[Arg]count{}, watch: watch.Of(ctx)}
	size := m.of(c)
	if m.watch.Cause() != nil {
		return nil, 0, ended(m.watch)
	}
	return size.big(), m.nodes, nil
}

// writtenSize is the tree size of what the writer writes: without silent arguments.
func writtenSize(c Core, w *watch.Watch) *big.Int {
	m := measure{sizes: map[Arg]count{}, written: true, watch: w}
	return m.of(c).big()
}

// count is a number that is small or, when large is set, large. A large one is not changed.
type count struct {
	small uint64
	large *big.Int
}

var largest = new(big.Int).Lsh(big.NewInt(1), maxSizeBits)

func (a count) big() *big.Int {
	if a.large != nil {
		return new(big.Int).Set(a.large)
	}
	return new(big.Int).SetUint64(a.small)
}

// plus is the sum, or largest where that is less.
func (a count) plus(b count) count {
	if a.large == nil && b.large == nil {
		if sum := a.small + b.small; sum >= a.small {
			return count{small: sum}
		}
	}
	if a.large == largest || b.large == largest {
		return count{large: largest}
	}
	sum := a.big()
	if sum.Add(sum, b.big()); sum.BitLen() > maxSizeBits {
		return count{large: largest}
	}
	return count{large: sum}
}

// measure holds the sizes of operators and bodies worked out so far; todo
// holds what waits, what it waits for standing behind it.
type measure struct {
	sizes   map[Arg]count
	todo    []Arg
	written bool
	nodes   int
	watch   *watch.Watch
}

func (m *measure) of(c Core) count {
	if c == nil {
		return count{}
	}
	m.todo = append(m.todo, c)
	for len(m.todo) > 0 && !m.watch.Ended(1) {
		a := m.todo[len(m.todo)-1]
		if _, ok := m.sizes[a]; ok {
			m.todo = m.todo[:len(m.todo)-1]
			continue
		}
		waiting := len(m.todo)
		size := m.node(a)
		if len(m.todo) == waiting {
			m.todo = m.todo[:waiting-1]
			m.sizes[a] = size
			if _, ok := a.(*Bound); !ok {
				m.nodes++
			}
		}
	}
	return m.sizes[c]
}

// node returns the size of a, a variable, a global, an operator or a body,
// from those of its parts; the parts whose sizes are not known yet go on the
// list, and then the answer says nothing.
func (m *measure) node(a Arg) count {
	switch a := a.(type) {
	case *Op:
		size := count{small: 1}
		for k, arg := range a.Args {
			if m.written && a.Sig.silent(k) {
				continue
			}
			size = size.plus(m.arg(arg))
		}
		return size
	case *Bound:
		return m.arg(a.Body)
	}
	return count{small: 1}
}

// silent reports whether argument k is not written.
func (s *Signature) silent(k int) bool {
	n := len(s.Slots)
	return k < n && s.Slots[k].Silent || k >= n && n > 0 && s.Slots[n-1].Rest && s.Slots[n-1].Silent
}

func (m *measure) arg(a Arg) count {
	switch a := a.(type) {
	case nil:
		return count{}
	case *Variable, *Global, *Op, *Bound:
		size, ok := m.sizes[a]
		if !ok {
			m.todo = append(m.todo, a)
		}
		return size
	case Dimension:
		return count{small: dimensionSize(a)}
	case *Face:
		return count{small: faceSize(a)}
	case Rows:
		size := count{}
		for _, row := range a {
			for _, b := range row {
				size = size.plus(m.arg(b))
			}
		}
		return size
	}
	return count{}
}

// dimensionSize is how many nodes the written form of d has at most.
func dimensionSize(d Dimension) uint64 {
	n := uint64(1)
	for k := range d.Len() {
		n += 1 + 2*uint64(len(d.Conjunction(k)))
	}
	return n
}

// faceSize is how many nodes the written form of f has at most.
func faceSize(f *Face) uint64 {
	n := uint64(1)
	for k := range f.Len() {
		n += 1 + 3*uint64(f.Cube(k).Len())
	}
	return n
}
