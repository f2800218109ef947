// Package interval holds the dimensions of cubical type theory: elements of
// the free De Morgan algebra, the faces they cut out of a cube, and the
// substitutions of dimensions (CCHM 2015, "Cubical Type Theory: a constructive
// interpretation of the univalence axiom", 3.1 and 4.1).
//
// A dimension has a name, a small non-negative number. An element of the
// interval (Dim) and a face formula (Face) are both kept in normal form, as an
// irredundant disjunction of conjunctions in a fixed order, so that two of
// them are equal exactly when they are structurally the same. Everything is an
// immutable value: all methods are safe for concurrent use. Methods of Dim,
// Face and Cube do not allocate, other than those that return slices,
// strings or substitutions, while operands and results have four conjunctions on
// the names below 32 at most, and products on the way to them at most sixteen.
//
// Normal forms may grow exponentially. An operation whose result (or whose
// work) would pass the limits of [MaxConjunctions] panics with a [*SizeError],
// which the engine recovers where a host enters it.
//
// This file holds names and supports. A support is an over-approximation of a
// set of names in one machine word; its invariant is that a name of the set is
// never missing from it.
package interval

import (
	"math/bits"
	"strconv"
)

// Name is the name of a dimension: a small non-negative number. The order of
// names is the order of binding, outermost first. Names below 32 are the cheap
// ones. A negative Name has no meaning here.
type Name int32

// Support is an over-approximated set of dimension names: bit k stands for the
// name k when k < 63, and bit 63 for "any names from 63 up" (Pitts, "Nominal
// Sets", 2013, for supports). Union and intersection are | and &. The zero
// value is the empty set.
type Support uint64

// distantBit is the bit which all names from 63 up share.
const distantBit Support = 1 << 63

// Single returns the support which holds n.
func Single(n Name) Support {
	if uint32(n) >= 63 {
		return distantBit
	}
	return 1 << uint32(n)
}

// Has reports whether n may be in the set. For n >= 63 the answer is about all
// such names at once; a false is always exact.
func (s Support) Has(n Name) bool { return s&Single(n) != 0 }

// Without returns s without n. For n >= 63 it returns s unchanged, since other
// such names may remain.
func (s Support) Without(n Name) Support {
	if uint32(n) >= 63 {
		return s
	}
	return s &^ (1 << uint32(n))
}

// Lowest returns the lowest name below 63 that is not in s: a fresh name for
// everything s covers. ok is false when all 63 are taken.
func (s Support) Lowest() (n Name, ok bool) {
	k := bits.TrailingZeros64(^uint64(s))
	return Name(k), k < 63
}

// nameString writes a name for debugging.
func nameString(n Name) string { return "i" + strconv.Itoa(int(n)) }
