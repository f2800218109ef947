// Elements of the interval.
//
// A Dim is an element of the free De Morgan algebra on the dimension names
// (CCHM 3.1): a distributive lattice with ends and an involution. It is not
// Boolean: the conjunction of i and ~i is not 0. As a lattice it is free on the
// literals i and ~i, so the normal form is an antichain of sets of literals:
// no disjunct is 0, and 1 is the disjunct without literals.

package interval

import "strings"

// Dim is an element of the interval in normal form. The zero value is the end
// 0. Two Dims are equal exactly when Equal says so; == is finer on those that
// do not fit inline and must not be used. 48 bytes.
type Dim struct{ form form }

// Literal is a dimension name or its reversal.
type Literal struct {
	// Name is the dimension.
	Name Name
	// Negated is true for the reversal of the dimension.
	Negated bool
}

// Zero returns the end 0.
func Zero() Dim { return Dim{} }

// One returns the end 1.
func One() Dim { return Dim{form{n: 1}} }

// Var returns the dimension n.
func Var(n Name) Dim { return Dim{literalForm(n, false)} }

// Lit returns the dimension n, or its reversal when negated.
func Lit(n Name, negated bool) Dim { return Dim{literalForm(n, negated)} }

// Min returns the meet of d and e. Panics with a *SizeError when the result is
// too large.
func (d Dim) Min(e Dim) (r Dim) {
	if d.form.n == 1 && e.form.n == 1 {
		r.form.n, r.form.w[0] = 1, d.form.w[0]|e.form.w[0]
		return r
	}
	r.form = d.form.meet(&e.form, false)
	return r
}

// Max returns the join of d and e. Panics with a *SizeError when the result is
// too large.
func (d Dim) Max(e Dim) (r Dim) {
	if d.form.n == 1 && e.form.n == 1 {
		v, w := d.form.w[0], e.form.w[0]
		switch v & w {
		case v:
			return d
		case w:
			return e
		}
		r.form.n, r.form.w[0], r.form.w[1] = 2, max(v, w), min(v, w)
		return r
	}
	r.form = d.form.join(&e.form)
	return r
}

// Rev returns the reversal of d: 1-d in the geometric reading. Panics with a
// *SizeError when the result is too large.
func (d Dim) Rev() (r Dim) {
	if d.form.n == 1 {
		if w := d.form.w[0]; isLiteral(w) {
			r.form.n, r.form.w[0] = 1, swapWord(w)
			return r
		}
	}
	var k work
	r.form = d.form.reverse(&k)
	return r
}

// IsZero reports whether d is the end 0.
func (d Dim) IsZero() bool { return d.form.n == 0 && d.form.wide == nil }

// IsOne reports whether d is the end 1.
func (d Dim) IsOne() bool { return d.form.n == 1 && d.form.w[0] == 0 }

// IsEnd reports whether d is 0 or 1.
func (d Dim) IsEnd() bool { return d.form.w[0] == 0 && d.form.wide == nil }

// Literal returns the name and sign of d when it is a single literal.
func (d Dim) Literal() (n Name, negated, ok bool) {
	if d.form.n == 1 {
		w := d.form.w[0]
		if !isLiteral(w) {
			return 0, false, false
		}
		k := leadingZeros(w)
		return Name(k / 2), k%2 == 1, true
	}
	if d.form.wide != nil && len(d.form.wide.conjs) == 1 {
		if c := d.form.wide.conjs[0]; c.size() == 1 {
			code := c.high.codes[0]
			return Name(code / 2), code%2 == 1, true
		}
	}
	return 0, false, false
}

// Equal reports whether d and e are equal elements of the free algebra.
func (d Dim) Equal(e Dim) bool { return d.form.equal(&e.form) }

// Compare returns -1, 0 or 1: a total order that only depends on the order of
// the names. Conjunctions are compared in turn, each literal by literal.
func (d Dim) Compare(e Dim) int { return d.form.compare(&e.form) }

// AtMost reports whether d <= e in the lattice order. It makes at most
// d.Len()*e.Len() comparisons of conjunctions.
func (d Dim) AtMost(e Dim) bool { return d.form.entails(&e.form) }

// Support returns the names in d; it is exact below 63.
func (d Dim) Support() Support { return d.form.support() }

// Mentions reports exactly whether n occurs in d.
func (d Dim) Mentions(n Name) bool { return d.form.mentions(n) }

// Names returns the names in d, ascending. It allocates.
func (d Dim) Names() []Name { return d.form.names() }

// Len returns the number of conjunctions: none for 0, one for 1.
func (d Dim) Len() int { return d.form.len() }

// Conjunction returns the literals of the conjunction at index k, 0 <= k <
// d.Len(), in canonical order. It allocates.
func (d Dim) Conjunction(k int) []Literal {
	var out []Literal
	d.form.at(k).literals(func(n Name, second bool) { out = append(out, Literal{n, second}) })
	return out
}

// Is1 returns the face on which d is 1 (CCHM 4.1).
func (d Dim) Is1() (f Face) {
	if d.form.n == 1 {
		if w := d.form.w[0]; consistentWord(w) {
			f.form.n, f.form.w[0] = 1, swapWord(w)
		}
		return f
	}
	f.form = d.form.swap(true)
	return f
}

// Is0 returns the face on which d is 0 (CCHM 4.1). Panics with a *SizeError
// when the result is too large.
func (d Dim) Is0() (f Face) {
	if d.form.n == 1 {
		if w := d.form.w[0]; isLiteral(w) {
			f.form.n, f.form.w[0] = 1, w
			return f
		}
	}
	var k work
	f.form = d.form.transversal(true, &k)
	return f
}

// Subst returns d with the substitution put in: the algebra map that s
// determines. Panics with a *SizeError when the result is too large.
func (d Dim) Subst(s *Subst) (r Dim) {
	if s == nil || d.form.untouched(s) {
		return d
	}
	if d.form.n == 1 {
		w := d.form.w[0]
		if w&s.zeros != 0 {
			return r
		}
		w &^= s.ones
		if w&s.touched == 0 {
			r.form.n, r.form.w[0] = 1, w
			return r
		}
		if isLiteral(w) && len(s.rest) == 0 {
			if w&firsts != 0 {
				return s.first.dim
			}
			return s.first.dim.Rev()
		}
	}
	r.form = d.form.subst(s, false)
	return r
}

// String returns d for debugging, its names written i0, i1 and so on.
func (d Dim) String() string {
	if d.IsZero() {
		return "0"
	}
	var b strings.Builder
	for k := range d.Len() {
		if k > 0 {
			b.WriteString(" ∨ ")
		}
		literals := d.Conjunction(k)
		if len(literals) == 0 {
			return "1"
		}
		for j, l := range literals {
			if j > 0 {
				b.WriteString("∧")
			}
			if l.Negated {
				b.WriteString("~")
			}
			b.WriteString(nameString(l.Name))
		}
	}
	return b.String()
}
