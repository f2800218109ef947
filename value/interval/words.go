// The narrow algebra: antichains of machine words.
//
// A conjunction over the names below 32 is one word, two bits a name: name k
// has bit 63-2k for its first literal (i, or (i=0) in a face) and bit 62-2k for
// its second one (~i, or (i=1)). One conjunction absorbs another when its bits
// are a subset of the other's. A disjunction is a slice of words none of which
// absorbs another (an antichain). The canonical order, outermost name first and
// first literal before second, compared literal by literal, then is descending
// numeric order.
//
// Slices given to these functions usually start on the caller's stack; append
// moves them to the heap when they outgrow it. All growth goes through
// addWord, which bounds what is live and counts the work.

package interval

import (
	"fmt"
	"math/bits"
	"slices"
)

// MaxConjunctions bounds the conjunctions of a Dim or Face. An operation which
// would keep more of them, also for a moment, or which would compare
// conjunctions more than about 2^22 times, panics with a *SizeError.
const MaxConjunctions = 1 << 11

// maxWork bounds the comparisons of conjunctions in one operation.
const maxWork = 1 << 22

// SizeError is the value with which an operation panics when a normal form
// would get too large to build. It depends on the operands alone.
type SizeError struct {
	// Conjunctions is the number of conjunctions that were alive.
	Conjunctions int
	// Comparisons is the number of comparisons that had been made.
	Comparisons int
}

// Error says which limit was passed.
func (e *SizeError) Error() string {
	if e.Conjunctions > MaxConjunctions {
		return fmt.Sprintf("interval: a normal form needs more than %d conjunctions", MaxConjunctions)
	}
	return fmt.Sprintf("interval: a normal form of %d conjunctions takes more than %d comparisons", e.Conjunctions, maxWork)
}

// work counts the comparisons of one operation.
type work int

// add counts n comparisons made while live conjunctions were held.
func (k *work) add(n, live int) {
	*k += work(n)
	if *k > maxWork || live > MaxConjunctions {
		panic(&SizeError{Conjunctions: live, Comparisons: int(*k)})
	}
}

const (
	firsts  uint64 = 0xAAAAAAAAAAAAAAAA // all first literals
	seconds uint64 = 0x5555555555555555 // all second literals
	// narrowNames is the number of names that fit into a word.
	narrowNames = 32
)

// leadingZeros returns the index of the earliest literal of w.
func leadingZeros(w uint64) int { return bits.LeadingZeros64(w) }

// firstBit returns the bit of the first literal of n, which must be below 32.
func firstBit(n Name) uint64 { return 1 << 63 >> (2 * uint32(n)) }

// nameMask returns both bits of n, which must be below 32.
func nameMask(n Name) uint64 { return 3 << 62 >> (2 * uint32(n)) }

// swapWord exchanges the two literals of every name.
func swapWord(w uint64) uint64 { return w&firsts>>1 | w&seconds<<1 }

// isLiteral reports whether w has exactly one literal.
func isLiteral(w uint64) bool { return w != 0 && w&(w-1) == 0 }

// consistentWord reports whether w has no name with both literals.
func consistentWord(w uint64) bool { return w&(w>>1)&seconds == 0 }

// wordSupport returns the exact set of the names in w.
func wordSupport(w uint64) Support {
	if w&(w-1) == 0 {
		if w == 0 {
			return 0
		}
		return 1 << (uint(bits.LeadingZeros64(w)) / 2)
	}
	w = (w | w>>1) & seconds
	w = (w | w>>1) & 0x3333333333333333
	w = (w | w>>2) & 0x0F0F0F0F0F0F0F0F
	w = (w | w>>4) & 0x00FF00FF00FF00FF
	w = (w | w>>8) & 0x0000FFFF0000FFFF
	w = (w | w>>16) & 0x00000000FFFFFFFF
	return Support(bits.Reverse32(uint32(w)))
}

// smallChain is the length up to which addWord does not count its comparisons;
// its callers count smallCost for each call.
const (
	smallChain = 16
	smallCost  = 4
)

// addWord joins w to the antichain ws, which it may overwrite. The result is an
// antichain, in no particular order.
func addWord(ws []uint64, w uint64, k *work) []uint64 {
	if len(ws) >= smallChain {
		k.add(len(ws), len(ws))
	}
	for i, v := range ws {
		if both := v & w; both == v {
			return ws
		} else if both == w {
			// Once w absorbs a word, no word can absorb w.
			return replaceFrom(ws, i, w)
		}
	}
	return append(ws, w)
}

// replaceFrom puts w for the word at i and drops the later words it absorbs.
func replaceFrom(ws []uint64, i int, w uint64) []uint64 {
	ws[i] = w
	kept := ws[:i+1]
	for _, v := range ws[i+1:] {
		if w&^v != 0 {
			kept = append(kept, v)
		}
	}
	return kept
}

// meetWords appends the meet of the antichains a and b to dst, which must be
// empty and share no memory with them. With faces set, inconsistent
// conjunctions are left out.
func meetWords(dst, a, b []uint64, faces bool, k *work) []uint64 {
	for _, v := range a {
		k.add(smallCost*len(b), len(dst))
		for _, w := range b {
			if u := v | w; !faces || consistentWord(u) {
				dst = addWord(dst, u, k)
			}
		}
	}
	return dst
}

// meetBits appends to dst the meet of the antichain a with the disjunction of
// the literals of w.
func meetBits(dst, a []uint64, w uint64, faces bool, k *work) []uint64 {
	for ; w != 0; w &= w - 1 {
		bit := w & -w
		k.add(smallCost*len(a), len(dst))
		for _, v := range a {
			if u := v | bit; !faces || consistentWord(u) {
				dst = addWord(dst, u, k)
			}
		}
	}
	return dst
}

// transversalWords appends to dst the meet, over the words of ws, of the
// disjunctions of their literals: the dual of ws, without exchanging literals.
func transversalWords(dst, ws []uint64, faces bool, k *work) []uint64 {
	if len(ws) == 0 {
		return append(dst, 0)
	}
	var buf [16]uint64
	done, next := dst, buf[:0]
	for w := ws[0]; w != 0; w &= w - 1 {
		done = append(done, w&-w)
	}
	for _, w := range ws[1:] {
		next = meetBits(next[:0], done, w, faces, k)
		done, next = next, done
	}
	return append(dst[:0], done...)
}

// block is room on the stack for what up to four words by four words make.
// Indices are masked to spare the checks of their bounds.
type block struct {
	words [16]uint64
	n     int
}

// add joins w to the antichain in the block, which must have room.
func (b *block) add(w uint64) {
	kept := 0
	for k := 0; k < b.n; k++ {
		v := b.words[k&15]
		if v&^w == 0 {
			// Nothing was dropped: w absorbs no word when a word absorbs w.
			return
		}
		if w&^v != 0 {
			b.words[kept&15] = v
			kept++
		}
	}
	b.words[kept&15] = w
	b.n = kept + 1
}

// meet fills the empty block with the meet of two inline antichains.
func (b *block) meet(f, g *form, faces bool) {
	for i := range f.n {
		v := f.w[i&3]
		for j := range g.n {
			if u := v | g.w[j&3]; !faces || consistentWord(u) {
				b.add(u)
			}
		}
	}
}

// join fills the empty block with the join of two inline antichains, in order.
func (b *block) join(f, g *form) {
	for i, j := 0, 0; i < f.n || j < g.n; {
		if j == g.n || i < f.n && f.w[i&3] >= g.w[j&3] {
			w := f.w[i&3]
			i++
			if !g.absorbs(w, true) {
				b.words[b.n&15] = w
				b.n++
			}
		} else {
			w := g.w[j&3]
			j++
			if !f.absorbs(w, false) {
				b.words[b.n&15] = w
				b.n++
			}
		}
	}
}

// transversal fills the empty block with transversalWords of an inline
// antichain; ok is false when it runs out of room.
func (b *block) transversal(f *form, faces bool) (ok bool) {
	b.add(0)
	for i := range f.n {
		old := *b
		b.n = 0
		for k := range old.n {
			v := old.words[k&15]
			for w := f.w[i&3]; w != 0; w &= w - 1 {
				if b.n == len(b.words) {
					return false
				}
				if u := v | w&-w; !faces || consistentWord(u) {
					b.add(u)
				}
			}
		}
	}
	return true
}

// form returns the normal form of the block, which it sorts.
func (b *block) form() (f form) {
	ws := b.words[:b.n&31]
	sortFew(ws)
	if len(ws) > len(f.w) {
		f.wide = wideOfWords(ws)
		return f
	}
	f.n = len(ws)
	for k, w := range ws {
		f.w[k&3] = w
	}
	return f
}

// sortWords puts an antichain into the canonical order.
func sortWords(ws []uint64) {
	if len(ws) <= smallChain {
		sortFew(ws)
		return
	}
	slices.SortFunc(ws, func(a, b uint64) int {
		if a > b {
			return -1
		}
		return 1
	})
}

// sortFew is sortWords for a few words.
func sortFew(ws []uint64) {
	for i := 1; i < len(ws); i++ {
		w := ws[i]
		j := i
		for ; j > 0 && ws[j-1] < w; j-- {
			ws[j] = ws[j-1]
		}
		ws[j] = w
	}
}

// entailsWords reports whether every word of a is absorbed by a word of b.
func entailsWords(a, b []uint64) bool {
next:
	for _, v := range a {
		for _, w := range b {
			if w&^v == 0 {
				continue next
			}
		}
		return false
	}
	return true
}
