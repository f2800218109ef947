// Cubes: consistent conjunctions of faces.
//
// A Cube is a partial assignment of ends to dimensions, one conjunction of a
// face formula (CCHM 4.1). No name has both ends. To work under a face is to
// work, for each of its cubes, under the cube's Restriction.

package interval

import "strings"

// Cube is a consistent partial assignment of ends to dimensions. The zero
// value assigns nothing. 16 bytes.
type Cube struct{ conj conj }

// Assignment says that a dimension is at one of its ends.
type Assignment struct {
	// Name is the dimension.
	Name Name
	// One is true for the end 1 and false for 0.
	One bool
}

// CubeOf returns the cube of the given assignments; ok is false when they give
// a dimension both ends.
func CubeOf(as ...Assignment) (c Cube, ok bool) {
	for _, a := range as {
		c.conj = c.conj.union(literal(a.Name, a.One))
	}
	if !c.conj.consistent() {
		return Cube{}, false
	}
	return c, true
}

// Len returns the number of dimensions that c assigns.
func (c Cube) Len() int { return c.conj.size() }

// Support returns the names that c assigns; it is exact below 63.
func (c Cube) Support() Support { return c.conj.support() }

// IsTop reports whether c assigns nothing.
func (c Cube) IsTop() bool { return c.conj.low == 0 && c.conj.high == nil }

// Equal reports whether c and d assign the same.
func (c Cube) Equal(d Cube) bool {
	return c.conj.low == d.conj.low && (c.conj.high == d.conj.high || c.conj.compare(d.conj) == 0)
}

// Compare returns -1, 0 or 1: assignment by assignment, outermost name first,
// 0 before 1, and an assignment before none.
func (c Cube) Compare(d Cube) int { return c.conj.compare(d.conj) }

// Assignments returns what c assigns, ascending by name. It allocates.
func (c Cube) Assignments() []Assignment {
	var out []Assignment
	c.conj.literals(func(n Name, second bool) { out = append(out, Assignment{n, second}) })
	return out
}

// Get returns the end that c assigns to n; ok is false when it assigns none.
func (c Cube) Get(n Name) (one, ok bool) {
	first, second := c.conj.get(n)
	return second, first || second
}

// And returns the cube of the assignments of both; ok is false when they
// contradict each other.
func (c Cube) And(d Cube) (e Cube, ok bool) {
	u := c.conj.union(d.conj)
	if !u.consistent() {
		return Cube{}, false
	}
	return Cube{u}, true
}

// Implies reports whether c assigns everything that d assigns.
func (c Cube) Implies(d Cube) bool { return d.conj.subset(c.conj) }

// Without returns c without its assignment to n.
func (c Cube) Without(n Name) Cube { return Cube{c.conj.without(n)} }

// Face returns the face that has c as its only cube.
func (c Cube) Face() Face { return Face{formOfConj(c.conj)} }

// Subst returns the face that c becomes under s.
func (c Cube) Subst(s *Subst) Face { return c.Face().Subst(s) }

// Restriction returns the substitution which sends the names of c to their
// ends, nil for the cube that assigns nothing. It does not allocate for one
// assignment to a name below 32.
func (c Cube) Restriction() *Subst {
	if c.conj.high == nil {
		w := c.conj.low
		if w == 0 {
			return nil
		}
		if w&(w-1) == 0 {
			return &endTable[leadingZeros(w)]
		}
	}
	s := newSubst(c.Len())
	c.conj.literals(func(n Name, second bool) { s.push(newEntry(n, end(second))) })
	return s.done()
}

// end returns the end 1 or 0.
func end(one bool) Dim {
	if one {
		return One()
	}
	return Zero()
}

// String returns c for debugging, its names written i0, i1 and so on.
func (c Cube) String() string {
	if c.IsTop() {
		return "top"
	}
	var b strings.Builder
	for _, a := range c.Assignments() {
		b.WriteString("(" + nameString(a.Name))
		if a.One {
			b.WriteString("=1)")
		} else {
			b.WriteString("=0)")
		}
	}
	return b.String()
}
