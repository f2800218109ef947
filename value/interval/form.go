// Normal forms, which both algebras end in.
//
// A form is up to four words inline, or a pointer to a wide. A wide holds what
// does not fit: more than four conjunctions (as words, if all names are below
// 32), or names from 32 up (as conjs). A form that fits inline is always
// inline, and a wide that can be words is always words, so that equality is
// structural. Unused inline words are 0.

package interval

import (
	"cmp"
	"slices"
)

// form is the normal form shared by Dim and Face. With wide nil its
// conjunctions are w[:n]; otherwise n and w are 0.
type form struct {
	n    int
	w    [4]uint64
	wide *wide
}

// wide is the fallback of a form. Exactly one of words and conjs is non-nil.
type wide struct {
	words []uint64
	conjs []conj
	sup   Support
}

// formOfWords returns the normal form of an antichain of words, which it may
// reorder but does not keep.
func formOfWords(ws []uint64) form {
	sortWords(ws)
	var f form
	if len(ws) <= len(f.w) {
		f.n = copy(f.w[:], ws)
		return f
	}
	return form{wide: wideOfWords(ws)}
}

// wideOfWords returns the wide form of more than four sorted words.
func wideOfWords(ws []uint64) *wide {
	all := uint64(0)
	for _, w := range ws {
		all |= w
	}
	return &wide{words: slices.Clone(ws), sup: wordSupport(all)}
}

// formOfConjs returns the normal form of an antichain, which it may reorder but
// does not keep.
func formOfConjs(cs []conj) form {
	if !slices.ContainsFunc(cs, func(c conj) bool { return c.high != nil }) {
		ws := make([]uint64, len(cs))
		for i, c := range cs {
			ws[i] = c.low
		}
		return formOfWords(ws)
	}
	slices.SortFunc(cs, conj.compare)
	v := &wide{conjs: slices.Clone(cs)}
	for _, c := range cs {
		v.sup |= c.support()
	}
	return form{wide: v}
}

// formOfConj returns the normal form of one conjunction.
func formOfConj(c conj) form {
	if c.high == nil {
		return form{n: 1, w: [4]uint64{c.low}}
	}
	return form{wide: &wide{conjs: []conj{c}, sup: c.support()}}
}

// literalForm returns the normal form of one literal.
func literalForm(n Name, second bool) (f form) {
	if uint32(n) >= narrowNames {
		return formOfConj(literal(n, second))
	}
	f.n, f.w[0] = 1, firstBit(n)
	if second {
		f.w[0] >>= 1
	}
	return f
}

// words returns the conjunctions as words; ok is false when there are high
// names. The slice is read only.
func (f *form) words() (ws []uint64, ok bool) {
	if f.wide == nil {
		return f.w[:f.n], true
	}
	return f.wide.words, f.wide.conjs == nil
}

// conjs returns the conjunctions. The slice is read only.
func (f *form) conjs() []conj {
	ws, ok := f.words()
	if !ok {
		return f.wide.conjs
	}
	cs := make([]conj, len(ws))
	for i, w := range ws {
		cs[i].low = w
	}
	return cs
}

// len returns the number of conjunctions.
func (f *form) len() int {
	if f.wide == nil {
		return f.n
	}
	return len(f.wide.words) + len(f.wide.conjs)
}

// at returns the conjunction at index k of the canonical order.
func (f *form) at(k int) conj {
	if ws, ok := f.words(); ok {
		return conj{low: ws[k]}
	}
	return f.wide.conjs[k]
}

// equal compares normal forms.
func (f *form) equal(g *form) bool {
	if f.wide == nil || g.wide == nil || f.wide == g.wide {
		return f.wide == g.wide && (f.w[0]^g.w[0])|(f.w[1]^g.w[1])|(f.w[2]^g.w[2])|(f.w[3]^g.w[3])|uint64(f.n^g.n) == 0
	}
	return f.wide.sup == g.wide.sup && f.len() == g.len() && f.compare(g) == 0
}

// compare orders normal forms: conjunction by conjunction, and what ends first
// comes first.
func (f *form) compare(g *form) int {
	for k := 0; k < f.len() && k < g.len(); k++ {
		if c := f.at(k).compare(g.at(k)); c != 0 {
			return c
		}
	}
	return cmp.Compare(f.len(), g.len())
}

// support returns the support of f.
func (f *form) support() Support {
	if f.wide == nil {
		return wordSupport(f.w[0] | f.w[1] | f.w[2] | f.w[3])
	}
	return f.wide.sup
}

// mentions reports exactly whether n occurs.
func (f *form) mentions(n Name) bool {
	if f.wide == nil {
		return uint32(n) < narrowNames && (f.w[0]|f.w[1]|f.w[2]|f.w[3])&nameMask(n) != 0
	}
	if !f.wide.sup.Has(n) {
		return false
	}
	for k := range f.len() {
		if first, second := f.at(k).get(n); first || second {
			return true
		}
	}
	return false
}

// names returns the names that occur, ascending.
func (f *form) names() []Name {
	var out []Name
	for k := range f.len() {
		f.at(k).literals(func(n Name, _ bool) { out = append(out, n) })
	}
	slices.Sort(out)
	return slices.Compact(out)
}

// isZero reports whether f has no conjunction.
func (f *form) isZero() bool { return f.n == 0 && f.wide == nil }

// isOne reports whether f has the conjunction without literals.
func (f *form) isOne() bool { return f.n == 1 && f.w[0] == 0 }

// absorbs reports whether an inline f has a word that absorbs w, other than w
// itself when strict is set.
func (f *form) absorbs(w uint64, strict bool) bool {
	for i := range f.n {
		if v := f.w[i&3]; v&^w == 0 && (v != w || !strict) {
			return true
		}
	}
	return false
}

// join returns the disjunction of two normal forms.
func (f *form) join(g *form) form {
	if g.isZero() || f.isOne() {
		return *f
	}
	if f.isZero() || g.isOne() {
		return *g
	}
	if f.wide == nil && g.wide == nil {
		var b block
		b.join(f, g)
		return b.form()
	}
	var k work
	a, low := f.words()
	b, ok := g.words()
	if low && ok {
		out := slices.Clone(a)
		k.add(smallCost*len(b), len(a))
		for _, w := range b {
			out = addWord(out, w, &k)
		}
		k.add(0, len(out))
		return formOfWords(out)
	}
	out := slices.Clone(f.conjs())
	for _, c := range g.conjs() {
		out = addConj(out, c, &k)
	}
	return formOfConjs(out)
}

// meet returns the conjunction of two normal forms.
func (f *form) meet(g *form, faces bool) form {
	if g.isOne() || f.isZero() {
		return *f
	}
	if f.isOne() || g.isZero() {
		return *g
	}
	if f.wide == nil && g.wide == nil {
		var b block
		b.meet(f, g, faces)
		return b.form()
	}
	var k work
	a, low := f.words()
	b, ok := g.words()
	if low && ok {
		return formOfWords(meetWords(nil, a, b, faces, &k))
	}
	return formOfConjs(meetConjs(f.conjs(), g.conjs(), faces, &k))
}

// transversal returns the meet, over the conjunctions of f, of the disjunctions
// of their literals.
func (f *form) transversal(faces bool, k *work) form {
	if f.wide == nil {
		var b block
		if b.transversal(f, faces) {
			return b.form()
		}
	}
	if ws, ok := f.words(); ok {
		return formOfWords(transversalWords(nil, ws, faces, k))
	}
	return formOfConjs(transversalConjs(f.conjs(), faces, k))
}

// reverse returns the reversal of f, which is the form of a Dim.
func (f *form) reverse(k *work) form {
	if f.wide == nil {
		swapped := *f
		for i := range f.n {
			swapped.w[i&3] = swapWord(f.w[i&3])
		}
		return swapped.transversal(false, k)
	}
	dual := f.transversal(false, k)
	return dual.swap(false)
}

// swap exchanges the two literals of every name, dropping inconsistent
// conjunctions when faces is set.
func (f *form) swap(faces bool) form {
	if ws, ok := f.words(); ok {
		var buf [16]uint64
		out := buf[:0]
		for _, w := range ws {
			if !faces || consistentWord(w) {
				out = append(out, swapWord(w))
			}
		}
		return formOfWords(out)
	}
	var out []conj
	for _, c := range f.conjs() {
		if !faces || c.consistent() {
			out = append(out, c.swap())
		}
	}
	return formOfConjs(out)
}

// entails reports whether f <= g.
func (f *form) entails(g *form) bool {
	if f.n == 1 && g.n == 1 {
		return g.w[0]&^f.w[0] == 0
	}
	a, low := f.words()
	b, ok := g.words()
	if low && ok {
		return entailsWords(a, b)
	}
	return entailsConjs(f.conjs(), g.conjs())
}
