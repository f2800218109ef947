// The wide algebra: conjunctions of any names, and their antichains.
//
// A conj is a word for the names below 32 and a list of codes for the others.
// All rules are those of the narrow algebra, with subsets and unions of lists
// for the words' bit operations. Nothing here is meant to be fast; it is meant
// to be right, and to stop where the narrow algebra stops. The tests rename
// problems from one algebra to the other.

package interval

import (
	"cmp"
	"math/bits"
	"slices"
)

// high holds the literals of names from 32 up: ascending codes, at least one.
// The code of a literal is twice its name, plus one for the second literal.
type high struct{ codes []uint32 }

// conj is a conjunction of any names. high is nil when there is no high
// literal.
type conj struct {
	low  uint64
	high *high
}

// literal returns the conjunction of one literal.
func literal(n Name, second bool) conj {
	bit := uint32(0)
	if second {
		bit = 1
	}
	if uint32(n) < narrowNames {
		return conj{low: firstBit(n) >> bit}
	}
	return conj{high: &high{codes: []uint32{2*uint32(n) + bit}}}
}

// codes returns the high literals.
func (c conj) codes() []uint32 {
	if c.high == nil {
		return nil
	}
	return c.high.codes
}

// withCodes returns the conjunction of a word and ascending codes.
func withCodes(low uint64, codes []uint32) conj {
	if len(codes) == 0 {
		return conj{low: low}
	}
	return conj{low: low, high: &high{codes: codes}}
}

// subset reports whether the literals of c are among those of d.
func (c conj) subset(d conj) bool {
	if c.low&^d.low != 0 {
		return false
	}
	if c.high == d.high || c.high == nil {
		return true
	}
	rest := d.codes()
	if len(rest) < len(c.high.codes) {
		return false
	}
	for _, a := range c.high.codes {
		for len(rest) > 0 && rest[0] < a {
			rest = rest[1:]
		}
		if len(rest) == 0 || rest[0] != a {
			return false
		}
	}
	return true
}

// union returns the conjunction of the literals of both.
func (c conj) union(d conj) conj {
	low := c.low | d.low
	if c.high == nil || c.high == d.high {
		return conj{low, d.high}
	}
	if d.high == nil {
		return conj{low, c.high}
	}
	a, b := c.high.codes, d.high.codes
	codes := make([]uint32, 0, len(a)+len(b))
	for len(a) > 0 && len(b) > 0 {
		switch {
		case a[0] < b[0]:
			codes, a = append(codes, a[0]), a[1:]
		case a[0] > b[0]:
			codes, b = append(codes, b[0]), b[1:]
		default:
			codes, a, b = append(codes, a[0]), a[1:], b[1:]
		}
	}
	codes = append(codes, a...)
	codes = append(codes, b...)
	return withCodes(low, codes)
}

// consistent reports whether no name has both literals.
func (c conj) consistent() bool {
	if !consistentWord(c.low) {
		return false
	}
	codes := c.codes()
	for i := 1; i < len(codes); i++ {
		if codes[i]^codes[i-1] == 1 {
			return false
		}
	}
	return true
}

// swap exchanges the two literals of every name.
func (c conj) swap() conj {
	codes := slices.Clone(c.codes())
	for i := range codes {
		codes[i] ^= 1
	}
	slices.Sort(codes)
	return withCodes(swapWord(c.low), codes)
}

// compare puts conjunctions into the canonical order: at the first difference,
// the earlier literal first, and having one before having none.
func (c conj) compare(d conj) int {
	if c.low != d.low {
		return cmp.Compare(d.low, c.low)
	}
	a, b := c.codes(), d.codes()
	for i := 0; i < len(a) && i < len(b); i++ {
		if a[i] != b[i] {
			return cmp.Compare(a[i], b[i])
		}
	}
	return cmp.Compare(len(b), len(a))
}

// size is the number of literals.
func (c conj) size() int { return bits.OnesCount64(c.low) + len(c.codes()) }

// support returns an over-approximation of the names in c.
func (c conj) support() Support {
	s := wordSupport(c.low)
	for _, code := range c.codes() {
		s |= Single(Name(code / 2))
	}
	return s
}

// get reports whether c has the first and the second literal of n.
func (c conj) get(n Name) (first, second bool) {
	if uint32(n) < narrowNames {
		bit := firstBit(n)
		return c.low&bit != 0, c.low&(bit>>1) != 0
	}
	for _, code := range c.codes() {
		if code/2 == uint32(n) {
			if code&1 == 0 {
				first = true
			} else {
				second = true
			}
		}
	}
	return first, second
}

// without returns c without the literals of n.
func (c conj) without(n Name) conj {
	if uint32(n) < narrowNames {
		return conj{c.low &^ nameMask(n), c.high}
	}
	first, second := c.get(n)
	if !first && !second {
		return c
	}
	var codes []uint32
	for _, code := range c.codes() {
		if code/2 != uint32(n) {
			codes = append(codes, code)
		}
	}
	return withCodes(c.low, codes)
}

// literals calls yield for each literal in canonical order.
func (c conj) literals(yield func(n Name, second bool)) {
	for w := c.low; w != 0; {
		k := leadingZeros(w)
		w &^= 1 << 63 >> uint(k)
		yield(Name(k/2), k%2 == 1)
	}
	for _, code := range c.codes() {
		yield(Name(code/2), code%2 == 1)
	}
}

// wideCost is how many comparisons of words one of conjs takes the time of.
const wideCost = 4

// addConj joins c to the antichain cs, which it may overwrite.
func addConj(cs []conj, c conj, k *work) []conj {
	cost := wideCost * len(cs) * (1 + len(c.codes()))
	for _, d := range cs {
		if d.subset(c) {
			k.add(cost, len(cs))
			return cs
		}
	}
	kept := cs[:0]
	for _, d := range cs {
		if !c.subset(d) {
			kept = append(kept, d)
		}
	}
	kept = append(kept, c)
	k.add(cost, len(kept))
	return kept
}

// meetConjs returns the meet of the antichains a and b.
func meetConjs(a, b []conj, faces bool, k *work) []conj {
	var out []conj
	for _, c := range a {
		for _, d := range b {
			if u := c.union(d); !faces || u.consistent() {
				out = addConj(out, u, k)
			}
		}
	}
	return out
}

// transversalConjs is transversalWords for conjunctions of any names.
func transversalConjs(cs []conj, faces bool, k *work) []conj {
	done := []conj{{}}
	for _, c := range cs {
		var clause []conj
		c.literals(func(n Name, second bool) { clause = append(clause, literal(n, second)) })
		done = meetConjs(done, clause, faces, k)
	}
	return done
}

// entailsConjs reports whether every conjunction of a is absorbed by one of b.
func entailsConjs(a, b []conj) bool {
	for _, c := range a {
		if !slices.ContainsFunc(b, func(d conj) bool { return d.subset(c) }) {
			return false
		}
	}
	return true
}
