package kit

import (
	"fmt"

	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
)

// The laws, each a function of a trial. What a law compares, it compares twice:
// by the comparison of values and by the comparison of normal forms, which must
// agree; that is a law of its own.
//
// Where a law speaks of a substitution, one side is computed in general
// position and substituted afterwards, once as a value and once through its
// normal form, and the other is evaluated from the start where the
// substitution leads.

// Law is one law of the suite.
type Law struct {
	Name      string
	Statement string
	check     func(t *trial) *Failure
}

// The names of the laws.
const (
	LawInput       = "input"
	LawWalls       = "walls"
	LawFillers     = "fillers"
	LawConstancy   = "constancy"
	LawDimensions  = "dimensions"
	LawVariables   = "variables"
	LawTyping      = "typing"
	LawStability   = "stability"
	LawAgreement   = "agreement"
	LawEliminators = "eliminators"
	LawCongruence  = "congruence"
	LawSystems     = "systems"
	LawEta         = "eta"
	LawOrder       = "order"
)

// Laws returns the laws in the order in which they are tried.
func Laws() []Law {
	return []Law{
		{LawInput, "what the generators draw is well typed", (*trial).input},
		{LawWalls, "on the face of a wall, a composite is the end of that wall", (*trial).walls},
		{LawConstancy, "a transport is the identity on its face, and where its face is top", (*trial).constancy},
		{LawFillers, "a filler stands on the base at 0, ends in the operation at 1, and is the walls on their faces", (*trial).fillers},
		{LawTyping, "results have the type of the operation: their normal forms check at it and are the same elements", (*trial).typing},
		{LawStability, "the normal form of a normal form is itself", (*trial).stability},
		{LawDimensions, "operations, eliminations and elements commute with every substitution of dimensions", (*trial).dimensions},
		{LawVariables, "they commute with putting values for variables", (*trial).variables},
		{LawEliminators, "eliminations of composites and transports are what the former claims: what it commutes with, or waiting", (*trial).eliminators},
		{LawCongruence, "equal inputs give equal outputs", (*trial).congruence},
		{LawSystems, "the order of walls, and walls that others imply, make no difference", (*trial).systems},
		{LawEta, "an element equals its η-expansion", (*trial).eta},
		{LawOrder, "evaluation order, sharing and the choice of names make no difference", (*trial).order},
		{LawAgreement, "two elements are equal by comparison exactly when their normal forms are the same", (*trial).agreement},
	}
}

// trial is one instance in a scope, in one build.
type trial struct {
	es    *engines
	x     *Instance
	build build
	w     *world // variables and dimensions
	wide  *world // with the dimension fresh
	made  map[string]element
}

// fresh is the dimension that substitutions may bring in, point the dimension of fillers.
const (
	fresh = "m"
	point = "r"
)

// newTrial sets up the scopes; a failure is one of the generator.
func newTrial(es *engines, x *Instance, b build) (*trial, *Failure) {
	t := &trial{es: es, x: x, build: b, made: map[string]element{}}
	var err error
	if t.w, err = es.world(b, x.Variables, x.Dimensions); err == nil {
		t.wide, err = t.w.with(fresh)
	}
	if err != nil {
		return nil, &Failure{Law: LawInput, Instance: x, Err: err, build: b}
	}
	return t, nil
}

// failure is a failure with an error, nil for what says nothing.
func (t *trial) failure(law, where string, err error) *Failure {
	if !broken(err) {
		t.es.spent[law]++
		return nil
	}
	return &Failure{Law: law, Instance: t.x, Where: where, Err: err}
}

// agree compares two values of a world at a type. made is how the left one came about.
func (t *trial) agree(law string, w *world, ty, left, right value.Value, what, where, made string) *Failure {
	equal, err := w.equal(ty, left, right)
	if err != nil {
		return t.failure(law, where, err)
	}
	l, err := w.normal(element{ty, left})
	if err != nil {
		return t.failure(law, where, fmt.Errorf("reading back the left side: %w", err))
	}
	r, err := w.normal(element{ty, right})
	if err != nil {
		return t.failure(law, where, fmt.Errorf("reading back the right side: %w", err))
	}
	same := term.Same(l, r)
	if equal && same {
		return nil
	}
	f := &Failure{Law: law, Instance: t.x, What: what, Where: where, Made: made, Left: w.write(l), Right: w.write(r), Over: w.dims}
	if u, err := w.normalType(element{ty, left}); err == nil {
		f.Type = w.write(u)
	}
	if equal != same {
		f.Law = LawAgreement
		if equal {
			f.Made = "the comparison calls them equal"
		} else {
			f.Made = "the comparison calls them different, and their normal forms are the same"
		}
	}
	return f
}

// subject is a term under a law.
type subject struct {
	what string
	w    *term.Written
}

// subjects are the operation, its eliminations, and the base as an element.
func (t *trial) subjects() []subject {
	op := t.x.Term()
	out := []subject{{"the " + t.x.Op.String(), op}}
	for _, e := range t.x.Eliminations {
		out = append(out, subject{e.Name + " of the " + t.x.Op.String(), t.x.Eliminate(e, op, oneEnd)})
	}
	return append(out, subject{"the base", term.Ann(t.x.Base, t.x.TypeAt(zero))})
}

// value is a subject as a value, evaluated once in a trial.
func (t *trial) value(w *term.Written) (element, error) {
	key := w.String()
	if x, ok := t.made[key]; ok {
		return x, nil
	}
	x, err := t.w.infer(w)
	if err == nil {
		t.made[key] = x
	}
	return x, err
}

// input: everything that was drawn is well typed.
func (t *trial) input() *Failure {
	for _, s := range t.subjects() {
		if _, err := t.value(s.w); err != nil {
			return t.failure(LawInput, s.what, err)
		}
	}
	return nil
}

// substituted compares the subject s after a substitution, as a value and
// through its normal form, with what right is from the start.
func (t *trial) substituted(law string, from *world, x element, s Substitution, to *world, right *term.Written, ty *term.Written, what string) *Failure {
	where := s.String()
	var r element
	var err error
	if ty == nil {
		r, err = to.infer(right)
	} else {
		r, err = to.check(right, ty)
	}
	if err != nil {
		return t.failure(law, where, err)
	}
	sub := s.onLevels(to.dims) // from's are the first of them
	l, err := from.along(x, sub)
	if err != nil {
		return t.failure(law, where, err)
	}
	if f := t.agree(law, to, r.t, l.v, r.v, what, where, "the value, substituted"); f != nil {
		f.right = right
		return f
	}
	n, err := from.normal(x)
	if err != nil {
		return t.failure(law, where, err)
	}
	v, err := to.evaluate(to.move(n, from.dims, sub))
	if err != nil {
		return t.failure(law, where, err)
	}
	f := t.agree(law, to, r.t, v, r.v, what, where, "the normal form, substituted")
	if f != nil {
		f.right = right
	}
	return f
}

func endsOf(kind string, at []End) Substitution {
	var pairs []any
	for _, e := range at {
		pairs = append(pairs, e.Dimension, e.at())
	}
	return substitution(kind, pairs...)
}

// walls: on its faces a composite is the ends of its walls.
func (t *trial) walls() *Failure {
	if t.x.Op == Transp {
		return nil
	}
	op, err := t.value(t.x.Term())
	if err != nil {
		return t.failure(LawWalls, "", err)
	}
	for _, w := range t.x.Walls {
		s := endsOf("a face", w.Ends)
		end := Replace(Replace(w.Body, map[string]*term.Written{direction: oneEnd}), s.Put)
		if f := t.substituted(LawWalls, t.w, op, s, t.w, end, Replace(t.x.TypeAt(oneEnd), s.Put), "the "+t.x.Op.String()); f != nil {
			f.Face = w.Face
			return f
		}
	}
	return nil
}

// constancy: a transport is the identity on its face.
func (t *trial) constancy() *Failure {
	if t.x.Op != Transp {
		return nil
	}
	op, err := t.value(t.x.Term())
	if err != nil {
		return t.failure(LawConstancy, "", err)
	}
	for _, face := range t.x.Faces {
		s := endsOf("a face", ends(face))
		if f := t.substituted(LawConstancy, t.w, op, s, t.w, Replace(t.x.Base, s.Put), Replace(t.x.TypeAt(oneEnd), s.Put), "the transp"); f != nil {
			f.Face = face
			return f
		}
	}
	return nil
}

// fillers: their two ends and their walls.
func (t *trial) fillers() *Failure {
	from, err := t.w.with(point)
	if err != nil {
		return t.failure(LawFillers, "", err)
	}
	fill, err := from.infer(t.x.Filler(term.Name(point)))
	if err != nil {
		return t.failure(LawFillers, "", err)
	}
	at := func(kind string, put []End, right, ty *term.Written, face *term.Written) *Failure {
		s := endsOf(kind, put)
		f := t.substituted(LawFillers, from, fill, s, from, Replace(right, s.Put), Replace(ty, s.Put), "the filler")
		if f != nil {
			f.Face = face
		}
		return f
	}
	if f := at("the end 0", []End{{point, false}}, t.x.Base, t.x.TypeAt(zero), nil); f != nil {
		return f
	}
	if f := at("the end 1", []End{{point, true}}, t.x.Term(), t.x.TypeAt(oneEnd), nil); f != nil {
		return f
	}
	there := t.x.TypeAt(term.Name(point))
	for _, w := range t.x.Walls {
		if f := at("a face", w.Ends, Replace(w.Body, map[string]*term.Written{direction: term.Name(point)}), there, w.Face); f != nil {
			return f
		}
	}
	for _, face := range t.x.Faces {
		if f := at("a face", ends(face), t.x.Base, there, face); f != nil {
			return f
		}
	}
	return nil
}

// typing: normal forms check at the type of the operation, and are the same elements.
func (t *trial) typing() *Failure {
	for _, s := range t.subjects() {
		x, err := t.value(s.w)
		if err != nil {
			return t.failure(LawTyping, s.what, err)
		}
		n, err := t.w.normal(x)
		if err != nil {
			return t.failure(LawTyping, s.what, err)
		}
		u, err := t.w.normalType(x)
		if err != nil {
			return t.failure(LawTyping, s.what, err)
		}
		y, err := t.w.check(t.w.write(n), t.w.write(u))
		if err != nil {
			if f := t.failure(LawTyping, s.what, fmt.Errorf("the normal form does not check: %w", err)); f != nil {
				f.Left, f.What = t.w.write(n), s.what
				return f
			}
			return nil
		}
		if f := t.agree(LawTyping, t.w, x.t, x.v, y.v, s.what, "", "the value"); f != nil {
			return f
		}
	}
	return nil
}

// stability: the normal form of a normal form is itself.
func (t *trial) stability() *Failure {
	for _, s := range t.subjects() {
		x, err := t.value(s.w)
		if err != nil {
			return t.failure(LawStability, s.what, err)
		}
		n, err := t.w.normal(x)
		if err != nil {
			return t.failure(LawStability, s.what, err)
		}
		v, err := t.w.evaluate(n)
		if err != nil {
			return t.failure(LawStability, s.what, err)
		}
		m, err := t.w.normal(element{x.t, v})
		if err != nil {
			return t.failure(LawStability, s.what, err)
		}
		if !term.Same(n, m) {
			return &Failure{Law: LawStability, Instance: t.x, What: s.what, Made: "the normal form", Left: t.w.write(n), Right: t.w.write(m)}
		}
	}
	return nil
}

// dimensions: commuting with substitutions of dimensions.
func (t *trial) dimensions() *Failure {
	for _, s := range t.subjects() {
		x, err := t.value(s.w)
		if err != nil {
			return t.failure(LawDimensions, s.what, err)
		}
		for _, sub := range substitutions(t.x.Dimensions, fresh) {
			if f := t.substituted(LawDimensions, t.w, x, sub, t.wide, Replace(s.w, sub.Put), nil, s.what); f != nil {
				f.Kind = sub.Kind
				return f
			}
		}
	}
	return nil
}

// agreement: two elements that need not be equal are so by comparison exactly
// when their normal forms are the same.
func (t *trial) agreement() *Failure {
	at := t.x.TypeAt(oneEnd)
	others := []*term.Written{Replace(t.x.Base, map[string]*term.Written{t.x.Dimensions[0]: zero})}
	if t.x.Op == Hcomp {
		others = append(others, t.x.Base)
	}
	if len(t.x.Walls) > 0 {
		y := *t.x
		y.Walls = y.Walls[1:]
		others = append(others, y.Term())
		y.Walls = nil
		others = append(others, y.Term())
	}
	x, err := t.value(t.x.Term())
	if err != nil {
		return t.failure(LawAgreement, "", err)
	}
	for _, w := range others {
		y, err := t.w.check(w, at)
		if err != nil {
			continue // of another type: the line varies
		}
		if f := t.agree(LawAgreement, t.w, x.t, x.v, y.v, "the "+t.x.Op.String()+", beside another element", "", ""); f != nil && f.Made != "" {
			return f
		}
	}
	return nil
}
