package value

import (
	"sync/atomic"

	"example.com/boxwright/nbe/term"
)

// Global is a definition or an assumption as evaluation sees it. Its methods
// are safe for concurrent use.
type Global interface {
	GlobalName() string
	// TypeValue is its type.
	TypeValue(run *Run) Value
	// Unfold is its value: for an assumption the neutral itself.
	Unfold(run *Run) Value
	// Folded is what stands for it where nobody needs its value yet: a cell
	// with a folded form, or the neutral of an assumption.
	Folded(run *Run) Value
}

// Unfolder decides for a run how globals unfold, where a call keeps some of
// them opaque.
type Unfolder interface {
	Unfold(run *Run, g Global) Value
	Folded(run *Run, g Global) Value
}

// Unfold is the value of a global in this run.
func (r *Run) Unfold(g Global) Value {
	r.Unfolded++
	if d, ok := r.solutions[g]; ok {
		g = d
	}
	if r.unfold != nil {
		return r.unfold.Unfold(r, g)
	}
	return g.Unfold(r)
}

// Restrained reports whether the run keeps definitions opaque that others unfold,
// so that what it makes is not for others.
func (r *Run) Restrained() bool { return r.unfold != nil }

// Folded is a global that nobody needs the value of yet.
func (r *Run) Folded(g Global) Value {
	if d, ok := r.solutions[g]; ok {
		g = d
	}
	if r.unfold != nil {
		return r.unfold.Folded(r, g)
	}
	return g.Folded(r)
}

// Fold is the cell of a definition under eliminations: n, headed by a global,
// is what it prints and compares as; its work unfolds the global and resumes
// the eliminations.
func (r *Run) Fold(n *Neutral) *Lazy {
	w := &foldWork{}
	w.n.Store(n)
	l := r.NewLazy(n.support, &w.Pending, w)
	l.fold = &w.folding
	return l
}

// Folder makes the folded form of a cell when somebody asks for it.
type Folder interface {
	// Fold is the folded form, nil where the run keeps the definition opaque
	// or it is an assumption.
	Fold(run *Run) *Neutral
	// Unfolded is the value, found without the folded form.
	Unfolded(run *Run) Value
	// Unfolding is the definition that Unfolded unfolds first, nil if it leaves
	// that to another cell or unfolds none; direct is false where the value is
	// to be found through the folded form.
	Unfolding(run *Run) (g Global, direct bool)
	// SketchFold is the folded form as far as it is there.
	SketchFold(s *Sketch) *term.Written
}

// FoldLater is Fold for a folded form that f makes. Nested definitions make
// nested folded forms, so they are made one level at a time, on demand.
func (r *Run) FoldLater(support Support, f Folder) *Lazy {
	w := &foldWork{folding: folding{from: f}}
	l := r.NewLazy(support, &w.Pending, w)
	l.fold = &w.folding
	return l
}

// folding is a folded form, made or to be made.
type folding struct {
	n    atomic.Pointer[Neutral]
	from Folder // nil if n was there from the beginning
}

func (f *folding) get(run *Run) (n *Neutral) {
	if n = f.n.Load(); n != nil {
		return n
	}
	run.Down(func() { n = f.from.Fold(run) })
	if n != nil && run.unfold == nil { // what a run keeps opaque is its own affair
		f.n.Store(n)
	}
	return n
}

type foldWork struct {
	Pending
	folding
}

func (w *foldWork) Do(run *Run) Value {
	if run.unfold == nil && w.n.Load() == nil {
		g, direct := w.from.Unfolding(run)
		if g != nil {
			return w.unfolded(run, g)
		}
		if direct {
			return w.from.Unfolded(run)
		}
	}
	n := w.get(run)
	if n == nil {
		return w.from.Unfolded(run)
	}
	if run.Traced() {
		return w.doTraced(run, n)
	}
	run.Take(StepUnfold)
	v := run.Unfold(n.head.(*GlobalHead).Global)
	for _, f := range n.Frames() {
		v = f.Resume(run, v)
	}
	return v
}

// unfolded is the value where nobody has asked for the folded form, which is then
// not made.
func (w *foldWork) unfolded(run *Run, g Global) Value {
	if !run.Traced() {
		run.Take(StepUnfold)
		return w.from.Unfolded(run)
	}
	caller := run.In(SiteOf(w.from))
	back := run.In(SiteOf(g))
	run.Take(StepUnfold)
	run.Out(back)
	var e *Event
	if run.Followed() {
		e = run.Begins(StepUnfold, StepUnfold.String()+" "+g.GlobalName(), w.from.SketchFold)
	}
	v := run.Ends(e, w.from.Unfolded(run))
	run.Out(caller)
	return v
}

// substitutedFold is a folded form with a substitution put in.
type substitutedFold struct {
	f *folding
	s *Subst
}

func (w *substitutedFold) Fold(run *Run) *Neutral {
	if n := w.f.get(run); n != nil {
		return n.relabel(run, w.s)
	}
	return nil
}

func (w *substitutedFold) Unfolded(*Run) Value              { return nil }
func (w *substitutedFold) Unfolding(*Run) (Global, bool)    { return nil, false }
func (w *substitutedFold) SketchFold(*Sketch) *term.Written { return hidden }

// GlobalHead is a global that is not unfolded: an assumption, an opaque
// definition, or any definition in its folded form.
type GlobalHead struct{ Global Global }

// Support is empty: globals are closed.
func (h *GlobalHead) Support() Support { return 0 }

// Frontier is empty.
func (h *GlobalHead) Frontier() (frontier, faces Support) { return 0, 0 }

// Relabel changes nothing.
func (h *GlobalHead) Relabel(*Run, *Subst) Head { return h }

// Recompute changes nothing.
func (h *GlobalHead) Recompute(*Run, *Subst) Value { return NewNeutral(h) }

// ReadBack is the global's name.
func (h *GlobalHead) ReadBack(Quoter) Core { return &term.Global{Name: h.Global.GlobalName()} }

// Type is the global's.
func (h *GlobalHead) Type(run *Run) Value { return h.Global.TypeValue(run) }

// Same holds for the same global.
func (h *GlobalHead) Same(_ Comparer, other Head) bool {
	o, ok := other.(*GlobalHead)
	return ok && o.Global == h.Global
}

// VariableHead is a variable of a scope, by level, with its type. A
// substitution of dimensions changes the type alone.
type VariableHead struct {
	Level int
	Of    Value // its type
	Name  string
}

// NewVariable is a variable as a value.
func NewVariable(level int, name string, t Value) *Neutral {
	v := &struct {
		n Neutral
		h VariableHead
	}{h: VariableHead{level, t, name}}
	v.n = Neutral{head: &v.h, support: t.Support()}
	return &v.n
}

// Support is that of its type.
func (h *VariableHead) Support() Support { return h.Of.Support() }

// Frontier is empty: no substitution of dimensions makes a variable compute.
func (h *VariableHead) Frontier() (frontier, faces Support) { return 0, 0 }

// Relabel substitutes in the type.
func (h *VariableHead) Relabel(run *Run, s *Subst) Head {
	return &VariableHead{h.Level, run.Substitute(h.Of, s), h.Name}
}

// Recompute substitutes in the type.
func (h *VariableHead) Recompute(run *Run, s *Subst) Value { return NewNeutral(h.Relabel(run, s)) }

// Type is its type.
func (h *VariableHead) Type(*Run) Value { return h.Of }

// ReadBack is the variable's level.
func (h *VariableHead) ReadBack(Quoter) Core { return &term.Variable{Level: h.Level} }

// Same holds for the same level.
func (h *VariableHead) Same(_ Comparer, other Head) bool {
	o, ok := other.(*VariableHead)
	return ok && o.Level == h.Level
}

// refresh is v, computed further where it is a neutral that was stuck on an
// assumption or a hole which has become a definition since. The result is kept
// for this run alone: others may not have the definition.
func (r *Run) refresh(v Value) Value {
	n, ok := v.(*Neutral)
	if !ok {
		return v
	}
	if w, ok := r.refreshed[n]; ok {
		return w
	}
	if r.refreshed == nil {
		r.refreshed = map[*Neutral]Value{}
	}
	r.refreshed[n] = n // what asks again on the way sees it as it is
	var w Value
	r.Down(func() { w = r.refreshOnce(n) })
	r.refreshed[n] = w
	return w
}

func (r *Run) refreshOnce(n *Neutral) (w Value) {
	if h, ok := n.head.(*GlobalHead); ok {
		w = n
		if _, solved := r.solutions[h.Global]; solved {
			w = r.resume(n, r.Unfold(h.Global))
		}
	} else if w = n.head.Recompute(r, nil); n.length > 0 {
		w = r.resume(n, w)
	}
	for {
		if l, ok := w.(*Lazy); ok {
			w = r.Force(l)
		}
		m, ok := w.(*Neutral)
		if !ok || m == n {
			return w
		}
		if h, ok := m.head.(*GlobalHead); !ok || r.solutions[h.Global] == nil {
			return w // it has just been computed as far as it goes
		}
		if w = r.refresh(m); w == Value(m) {
			return w
		}
	}
}

func (r *Run) resume(n *Neutral, v Value) Value {
	for _, f := range n.Frames() {
		v = f.Resume(r, v)
	}
	return v
}
