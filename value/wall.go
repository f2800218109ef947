package value

import "example.com/boxwright/value/interval"

// Wall is one wall of a composite: on the face Cube, the line Body in the
// dimension I. Cube is one conjunction (faces are split when walls are made)
// and Body has it substituted in: it does not mention the dimensions of Cube.
// I is none of them either.
type Wall struct {
	Cube interval.Cube
	I    Name
	Body Value
}

// System is a list of walls; it is not changed once made.
type System []Wall

// Support over-approximates the dimensions free in the walls.
func (s System) Support() (sup Support) {
	for i := range s {
		sup |= s[i].Cube.Support() | s[i].Body.Support().Without(s[i].I)
	}
	return sup
}

// FaceSupport is the dimensions of the faces alone.
func (s System) FaceSupport() (sup Support) {
	for i := range s {
		sup |= s[i].Cube.Support()
	}
	return sup
}

// Substitute puts t into faces and walls. A wall whose face becomes bot is
// dropped, one whose face becomes several conjunctions is split.
func (s System) Substitute(run *Run, t *Subst) System {
	out := make(System, 0, len(s))
	from := make([]int, 0, len(s)) // which wall each of out comes from
	for n, w := range s {
		face := run.Face(w.Cube.Subst(t))
		run.Charge(PriceWall)
		if face.IsBot() {
			run.Dropped++
		}
	cubes:
		for k := range face.Len() {
			cube := face.Cube(k)
			i, under := run.Under(w.I, w.Body.Support(), t, cube.Support())
			support := SubstSupport(w.Body.Support(), under)
			for j, v := range out { // the same line with the same put in, which neither face cuts
				if u := &s[from[j]]; u.Body == w.Body && u.I == w.I && v.I == i && (v.Cube.Support()|cube.Support())&support == 0 {
					out, from = append(out, Wall{cube, i, v.Body}), append(from, n)
					continue cubes
				}
			}
			body := run.Substitute(w.Body, under)
			out, from = append(out, Wall{cube, i, run.Restrict(body, cube)}), append(from, n)
		}
	}
	return out
}

// Restrict is v on the face c.
func (r *Run) Restrict(v Value, c interval.Cube) Value {
	if c.Support()&v.Support() == 0 && !r.Plain.NoSupport {
		return v
	}
	return r.Substitute(v, c.Restriction())
}

// End is the wall at I = 1, which is what a composite is on the wall's face.
func (w Wall) End(run *Run) Value { return run.At(w.Body, w.I, interval.One()) }

// Avoiding is w with its dimension renamed where avoid has it, so that values
// with support avoid can be brought under its binder.
func (w Wall) Avoiding(run *Run, avoid Support) Wall {
	if !avoid.Has(w.I) {
		return w
	}
	i := run.Fresh(avoid | w.Body.Support() | w.Cube.Support())
	return Wall{w.Cube, i, run.At(w.Body, w.I, interval.Var(i))}
}

// Top returns the wall whose face is top, if there is one.
func (s System) Top() (Wall, bool) {
	for _, w := range s {
		if w.Cube.IsTop() {
			return w, true
		}
	}
	return Wall{}, false
}

// Map builds from each wall u the wall f(i, u) on the same face, lazily. cut
// is the restriction to that face, for f to put into every other value it
// uses (Run.Substitute). free is the support of those values; bound are names
// that f binds itself and that must not be a wall's own. f brings the wall's
// own dimension in only through u.
func (s System) Map(run *Run, free, bound Support, f func(run *Run, i Name, body Value, cut *Subst) Value) System {
	return s.mapped(run, free, bound, false, f)
}

// MapLines is Map for an f that uses the wall's own dimension also where u
// does not mention it.
func (s System) MapLines(run *Run, free, bound Support, f func(run *Run, i Name, body Value, cut *Subst) Value) System {
	return s.mapped(run, free, bound, true, f)
}

func (s System) mapped(run *Run, free, bound Support, own bool, f func(run *Run, i Name, body Value, cut *Subst) Value) System {
	out := make(System, len(s), len(s)+2)
	for k, w := range s {
		if j := s.alike(k, free); j >= 0 && !w.Cube.Support().Has(out[j].I) {
			out[k] = Wall{w.Cube, out[j].I, out[j].Body}
			continue
		}
		w = w.Avoiding(run, free|bound)
		cut := w.Cube.Restriction()
		support := w.Body.Support() | SubstSupport(free, cut)
		if own {
			support |= interval.Single(w.I)
		}
		out[k] = Wall{w.Cube, w.I, run.Later(support, func(run *Run) Value { return f(run, w.I, w.Body, cut) })}
	}
	return out
}

// alike is an earlier wall than k with the same line, from which values of support
// free make the same, since neither's face cuts them; -1 if there is none.
func (s System) alike(k int, free Support) int {
	w := &s[k]
	for j := range s[:k] {
		v := &s[j]
		if v.I == w.I && v.Body == w.Body && free&(v.Cube.Support()|w.Cube.Support()) == 0 {
			return j
		}
	}
	return -1
}

// Constant is a wall on the given face that is v throughout; v is restricted here.
func (s System) Constant(run *Run, face interval.Face, v Value) System {
	for k := range face.Len() {
		cube := face.Cube(k)
		body := run.Restrict(v, cube)
		s = append(s, Wall{cube, run.Fresh(body.Support() | cube.Support()), body})
	}
	return s
}

// Line adds on the given face the wall i.v; v may mention i and is restricted here.
func (s System) Line(run *Run, face interval.Face, i Name, v Value) System {
	for k := range face.Len() {
		cube := face.Cube(k)
		s = append(s, Wall{cube, i, run.Restrict(v, cube)})
	}
	return s
}

// Irredundant is the system without the walls whose face implies another's,
// in the canonical order of faces. What it drops agrees with what it keeps.
func (s System) Irredundant() System {
	out := make(System, 0, len(s))
next:
	for i, w := range s {
		for j, v := range s {
			if i != j && w.Cube.Implies(v.Cube) && (j < i || !v.Cube.Implies(w.Cube)) {
				continue next
			}
		}
		at := len(out)
		for at > 0 && w.Cube.Compare(out[at-1].Cube) < 0 {
			at--
		}
		out = append(out, Wall{})
		copy(out[at+1:], out[at:])
		out[at] = w
	}
	return out
}
