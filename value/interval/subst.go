// Substitutions of dimensions.
//
// A Subst is a finite parallel substitution, the identity elsewhere. Its
// entries are sorted by name and none of them is the identity, so equal
// substitutions have equal entries and the identity is the nil *Subst. What the
// hot paths ask is kept as words: which names are touched, and which literals
// become 0 and 1.

package interval

import (
	"cmp"
	"slices"
)

// Subst is a finite parallel substitution of Dims for names, the identity
// elsewhere. It is immutable. The nil *Subst is the identity, for all methods.
type Subst struct {
	first entry
	rest  []entry
	dom   Support // of the names
	img   Support // of the images
	ends  Support // of the names whose image is an end
	// Of the names below 32: the bits of all of them, and the bits of the
	// literals i, ~i that become 0 and that become 1.
	touched, zeros, ones uint64
	// allEnds says that every image is an end, lowImages that no image
	// mentions a name from 32 up.
	allEnds, lowImages bool
}

// entry is a name with its image and the image's support.
type entry struct {
	name Name
	dim  Dim
	sup  Support
}

// endTable holds the substitutions of an end for one name below 63, name k
// going to 0 at 2k and to 1 at 2k+1. It is never written after initialisation.
var endTable = func() (table [126]Subst) {
	for k := range table {
		s := newSubst(1)
		s.push(newEntry(Name(k/2), end(k%2 == 1)))
		table[k] = *s.done()
	}
	return table
}()

func newEntry(n Name, d Dim) entry { return entry{n, d, d.Support()} }

// newSubst returns a substitution to push up to size entries on.
func newSubst(size int) *Subst {
	s := &Subst{first: entry{name: -1}}
	if size > 1 {
		s.rest = make([]entry, 0, size-1)
	}
	return s
}

// push adds an entry whose name is above those before, unless it is the
// identity.
func (s *Subst) push(e entry) {
	switch {
	case e.isIdentity():
	case s.first.name < 0:
		s.first = e
	default:
		s.rest = append(s.rest, e)
	}
}

// done returns the substitution of the entries pushed, and nil for none.
func (s *Subst) done() *Subst {
	if s.first.name < 0 {
		return nil
	}
	s.summarise()
	return s
}

// isIdentity reports whether the image is the name itself.
func (e entry) isIdentity() bool {
	n, negated, ok := e.dim.Literal()
	return ok && !negated && n == e.name
}

// summarise computes the words of s from its entries.
func (s *Subst) summarise() {
	s.allEnds, s.lowImages = true, true
	for k := range s.Len() {
		e := s.entry(k)
		s.dom |= Single(e.name)
		s.img |= e.sup
		if _, ok := e.dim.form.words(); !ok {
			s.lowImages = false
		}
		if e.dim.IsEnd() {
			s.ends |= Single(e.name)
		} else {
			s.allEnds = false
		}
		if uint32(e.name) >= narrowNames {
			continue
		}
		bit := firstBit(e.name)
		s.touched |= bit | bit>>1
		switch {
		case e.dim.IsZero():
			s.zeros |= bit
			s.ones |= bit >> 1
		case e.dim.IsOne():
			s.ones |= bit
			s.zeros |= bit >> 1
		}
	}
}

// entry returns the entry at index k.
func (s *Subst) entry(k int) *entry {
	if k == 0 {
		return &s.first
	}
	return &s.rest[k-1]
}

// Assign returns [n:=d], which is nil when d is n itself. For an end d and n
// below 63 it does not allocate.
func Assign(n Name, d Dim) *Subst {
	if d.IsEnd() && uint32(n) < 63 {
		return &endTable[2*int(n)+d.form.n]
	}
	return assign(n, &d)
}

// assign is Assign for what is not in the table.
func assign(n Name, d *Dim) *Subst {
	s := newSubst(1)
	s.push(newEntry(n, *d))
	return s.done()
}

// Rename returns [n:=m], which is nil when the names are the same.
func Rename(n, m Name) *Subst { return Assign(n, Var(m)) }

// NewSubst returns the substitution which sends names[k] to dims[k], all at
// once. A name given twice takes its last image; what is left over in the
// longer slice is ignored. It keeps neither slice.
func NewSubst(names []Name, dims []Dim) *Subst {
	count := min(len(names), len(dims))
	order := make([]int, count)
	for k := range order {
		order[k] = k
	}
	slices.SortStableFunc(order, func(a, b int) int { return cmp.Compare(names[a], names[b]) })
	s := newSubst(count)
	for j, k := range order {
		if j+1 == count || names[order[j+1]] != names[k] {
			s.push(newEntry(names[k], dims[k]))
		}
	}
	return s.done()
}

// Lookup returns the image of n; ok is false when that is n itself.
func (s *Subst) Lookup(n Name) (d Dim, ok bool) {
	if s == nil || s.dom&Single(n) == 0 {
		return Dim{}, false
	}
	if s.first.name == n {
		return s.first.dim, true
	}
	for k := range s.rest {
		if s.rest[k].name == n {
			return s.rest[k].dim, true
		}
	}
	return Dim{}, false
}

// Domain returns the names that s changes; it is exact below 63.
func (s *Subst) Domain() Support {
	if s == nil {
		return 0
	}
	return s.dom
}

// Ends returns the names that s sends to an end.
func (s *Subst) Ends() Support {
	if s == nil {
		return 0
	}
	return s.ends
}

// Image returns the union of the supports of the images of the names that s
// changes.
func (s *Subst) Image() Support {
	if s == nil {
		return 0
	}
	return s.img
}

// Len returns the number of names that s changes.
func (s *Subst) Len() int {
	if s == nil {
		return 0
	}
	return 1 + len(s.rest)
}

// At returns the name at index k, 0 <= k < s.Len(), ascending, and its image.
func (s *Subst) At(k int) (Name, Dim) {
	e := s.entry(k)
	return e.name, e.dim
}

// IsEnds reports whether every image is 0 or 1.
func (s *Subst) IsEnds() bool { return s == nil || s.allEnds }

// Extend returns s with the image of n set to d, parallel to the others.
func (s *Subst) Extend(n Name, d Dim) *Subst {
	if s == nil {
		return Assign(n, d)
	}
	out := newSubst(s.Len() + 1)
	k := 0
	for ; k < s.Len() && s.entry(k).name < n; k++ {
		out.push(*s.entry(k))
	}
	out.push(newEntry(n, d))
	if k < s.Len() && s.entry(k).name == n {
		k++
	}
	for ; k < s.Len(); k++ {
		out.push(*s.entry(k))
	}
	return out.done()
}

// Without returns s with n sent to itself. It is s when s does not change n.
func (s *Subst) Without(n Name) *Subst {
	if _, ok := s.Lookup(n); !ok {
		return s
	}
	out := newSubst(s.Len())
	for k := range s.Len() {
		if e := s.entry(k); e.name != n {
			out.push(*e)
		}
	}
	return out.done()
}

// RestrictTo returns s without the names that are not in sup: s itself when it
// has none of these, nil when nothing is left. Names from 63 up stay or go
// together.
func (s *Subst) RestrictTo(sup Support) *Subst {
	if s == nil || s.dom&^sup == 0 {
		return s
	}
	if s.dom&sup == 0 {
		return nil
	}
	out := newSubst(s.Len())
	for k := range s.Len() {
		if e := s.entry(k); sup.Has(e.name) {
			out.push(*e)
		}
	}
	return out.done()
}

// Compose returns the substitution that does s first and t on the result.
func (s *Subst) Compose(t *Subst) *Subst {
	if s == nil {
		return t
	}
	if t == nil {
		return s
	}
	out := newSubst(s.Len() + t.Len())
	for i, j := 0, 0; i < s.Len() || j < t.Len(); {
		if i == s.Len() || j < t.Len() && t.entry(j).name < s.entry(i).name {
			out.push(*t.entry(j))
			j++
			continue
		}
		e := s.entry(i)
		i++
		if j < t.Len() && t.entry(j).name == e.name {
			j++
		}
		if e.sup&t.dom == 0 {
			out.push(*e)
		} else {
			out.push(newEntry(e.name, e.dim.Subst(t)))
		}
	}
	return out.done()
}

// Skippable reports whether substituting by s may merely relabel a value with
// the given frontier (dimensions whose going to an end may let it compute),
// dimensions of faces, and support: no dimension of the frontier goes to an
// end, and every dimension of the faces goes to a literal whose variable occurs
// in the image of no other dimension of the support (an untouched dimension is
// its own image). Frontier and faces count as part of the support. It is exact
// when only names below 63 are at hand, and otherwise may say false too often.
// For frontiers see Sterling, Angiuli, "Normalization for Cubical Type Theory",
// LICS 2021.
func (s *Subst) Skippable(frontier, faces, sup Support) bool {
	if s == nil {
		return true
	}
	if s.ends&frontier != 0 {
		return false
	}
	if faces == 0 {
		return true
	}
	sup |= frontier | faces
	if s.dom&sup == 0 {
		return true
	}
	// The untouched names of the support; from 63 up there may always be some.
	once := sup &^ (s.dom &^ distantBit)
	twice := Support(0)
	for k := range s.Len() {
		if e := s.entry(k); sup.Has(e.name) {
			twice |= once & e.sup
			once |= e.sup
		}
	}
	if twice&faces&^(s.dom&^distantBit) != 0 {
		return false
	}
	for k := range s.Len() {
		e := s.entry(k)
		if !faces.Has(e.name) {
			continue
		}
		if _, _, ok := e.dim.Literal(); !ok || e.sup&twice != 0 {
			return false
		}
	}
	return true
}

// untouched reports whether no name that s changes occurs in f. A true is always
// right, a false may be wrong for names from 32 up.
func (f *form) untouched(s *Subst) bool {
	if f.wide == nil {
		return (f.w[0]|f.w[1]|f.w[2]|f.w[3])&s.touched == 0
	}
	return f.wide.sup&s.dom == 0
}

// subst puts s into a normal form: into a face when faces is set.
func (f *form) subst(s *Subst, faces bool) form {
	var k work
	if ws, low := f.words(); low && s.lowImages {
		var buf [16]uint64
		return formOfWords(substWords(buf[:0], ws, s, faces, &k))
	}
	return formOfConjs(substConjs(f.conjs(), s, faces, &k))
}

// substWords appends to dst the words of ws with s put in, for an s whose images
// have no high names.
func substWords(dst, ws []uint64, s *Subst, faces bool, k *work) []uint64 {
	// The literal that becomes 0 and 1 in a Dim becomes top and bot in a face.
	dead, gone := s.zeros, s.ones
	if faces {
		dead, gone = gone, dead
	}
	for _, w := range ws {
		if w&dead != 0 {
			continue
		}
		w &^= gone
		if w&s.touched == 0 {
			dst = addWord(dst, w, k)
			continue
		}
		dst = substWord(dst, w, s, faces, k)
	}
	return dst
}

// substWord appends the image of one word without dead literals.
func substWord(dst []uint64, w uint64, s *Subst, faces bool, k *work) []uint64 {
	rest := w &^ s.touched
	left := w & s.touched
	var one, two [16]uint64
	done, next := append(one[:0], 0), two[:0]
	for j := 0; left != 0; j++ {
		e := s.entry(j)
		if left&nameMask(e.name) == 0 {
			continue
		}
		bit := firstBit(e.name)
		for _, second := range [2]bool{false, true} {
			if second {
				bit >>= 1
			}
			if left&bit == 0 {
				continue
			}
			left &^= bit
			image := imageOf(&e.dim, second, faces, k)
			if image.n == 1 {
				rest |= image.w[0]
				continue
			}
			words, _ := image.words()
			next = meetWords(next[:0], done, words, faces, k)
			done, next = next, done
		}
	}
	for _, v := range done {
		if v |= rest; !faces || consistentWord(v) {
			dst = addWord(dst, v, k)
		}
	}
	return dst
}

// substConjs returns the conjunctions of cs with s put in.
func substConjs(cs []conj, s *Subst, faces bool, k *work) []conj {
	var out []conj
	for _, c := range cs {
		for _, d := range substConj(c, s, faces, k) {
			out = addConj(out, d, k)
		}
	}
	return out
}

// substConj returns the image of one conjunction.
func substConj(c conj, s *Subst, faces bool, k *work) []conj {
	k.add(s.Len()*(1+len(c.codes())), 0)
	rest := c
	done := []conj{{}}
	for j := range s.Len() {
		e := s.entry(j)
		first, second := c.get(e.name)
		if !first && !second {
			continue
		}
		rest = rest.without(e.name)
		if first {
			image := imageOf(&e.dim, false, faces, k)
			done = meetConjs(done, image.conjs(), faces, k)
		}
		if second {
			image := imageOf(&e.dim, true, faces, k)
			done = meetConjs(done, image.conjs(), faces, k)
		}
	}
	return meetConjs(done, []conj{rest}, faces, k)
}

// imageOf returns what the first or second literal of a name becomes when the
// name becomes d: d and its reversal, or the faces on which d is 0 and 1.
func imageOf(d *Dim, second, faces bool, k *work) form {
	switch {
	case faces && second:
		return d.form.swap(true)
	case faces:
		return d.form.transversal(true, k)
	case second:
		return d.form.reverse(k)
	default:
		return d.form
	}
}
