package interval

import (
	"cmp"
	"slices"
)

// The wide algebra, and the normal form that both algebras end in.
//
// A form is a normal form: up to four words inline, or a pointer to a wide. A
// wide holds what does not fit: more than four conjunctions (as words, if all
// names are below 32), or names from 32 up (as conjunctions of a word and a
// list of high literals). A form that fits inline is always inline, and a wide
// that can be words is always words, so equality stays structural. Unused
// inline words are 0.

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
func (c conj) size() int { return popcount(c.low) + len(c.codes()) }

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

// addConj joins c to the antichain cs, which it may overwrite.
func addConj(cs []conj, c conj, k *work) []conj {
	cost := len(cs) * (1 + len(c.codes()))
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
func entailsConjs(a, b []conj, k *work) bool {
	for _, c := range a {
		k.add(len(b)*(1+len(c.codes())), len(b))
		if !slices.ContainsFunc(b, func(d conj) bool { return d.subset(c) }) {
			return false
		}
	}
	return true
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
		return f.wide == g.wide && f.n == g.n && f.w == g.w
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

// join returns the disjunction of two normal forms.
func (f *form) join(g *form) form {
	var k work
	a, low := f.words()
	b, ok := g.words()
	if low && ok {
		var buf [8]uint64
		out := append(buf[:0], a...)
		for _, w := range b {
			out = addWord(out, w, &k)
		}
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
	var k work
	a, low := f.words()
	b, ok := g.words()
	if low && ok {
		var buf [16]uint64
		return formOfWords(meetWords(buf[:0], a, b, faces, &k))
	}
	return formOfConjs(meetConjs(f.conjs(), g.conjs(), faces, &k))
}

// transversal returns the meet, over the conjunctions of f, of the disjunctions
// of their literals.
func (f *form) transversal(faces bool) form {
	var k work
	if ws, ok := f.words(); ok {
		var buf [16]uint64
		return formOfWords(transversalWords(buf[:0], ws, faces, &k))
	}
	return formOfConjs(transversalConjs(f.conjs(), faces, &k))
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
	var k work
	a, low := f.words()
	b, ok := g.words()
	if low && ok {
		return entailsWords(a, b, &k)
	}
	return entailsConjs(f.conjs(), g.conjs(), &k)
}
