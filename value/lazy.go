package value

import (
	"runtime"
	"sync/atomic"

	"example.com/boxwright/value/interval"
)

// Lazy is work not yet done, or done: a term waiting in its environment, a
// substitution waiting over a value, a rule's later part. It is evaluated at
// most once in a run and only when needed. It holds no run and no "in
// progress" mark: a run that is stopped leaves it as it was, and two runs that
// meet may both do the work, of which one publishes.
type Lazy struct {
	support Support
	pending atomic.Pointer[Pending]
	result  Value
	fold    *folding // the folded form, where the work is a definition under eliminations
}

// Work is what a lazy cell waits for. Do's result may itself be lazy.
type Work interface{ Do(run *Run) Value }

// Pending is embedded in work, so that a cell points to it and can let go of
// the whole work, environment and all, the moment the result is published.
type Pending struct{ work Work }

var (
	published = new(Pending) // the result is there
	claimed   = new(Pending) // the result is being written, which takes two instructions
)

// Support over-approximates the free dimensions, as determined when the cell was made.
func (l *Lazy) Support() Support { return l.support }

// Substitute forces the cell; Run.Substitute delays instead.
func (l *Lazy) Substitute(run *Run, s *Subst) Value { return run.Force(l).Substitute(run, s) }

// Fold is the folded form of the cell: a neutral headed by a global; nil if it
// has none. It is made when it is first asked for, one level at a time.
func (l *Lazy) Fold(run *Run) *Neutral {
	if l.fold == nil {
		return nil
	}
	return l.fold.get(run)
}

// NewLazy makes a cell of work w, which embeds p.
func (r *Run) NewLazy(support Support, p *Pending, w Work) *Lazy {
	r.Lazies++
	r.Charge(PriceLazy)
	p.work = w
	l := &Lazy{support: support}
	l.pending.Store(p)
	return l
}

type laterWork struct {
	Pending
	f func(*Run) Value
}

func (w *laterWork) Do(run *Run) Value { return w.f(run) }

// Later makes a cell of a Go function. support must cover everything the
// function captures; whatever stands under a face must have been restricted
// before.
func (r *Run) Later(support Support, f func(*Run) Value) Value {
	w := &laterWork{f: f}
	return r.LaterWork(support, &w.Pending, w)
}

// LaterWork is Later for work that is more than a function; it embeds p.
func (r *Run) LaterWork(support Support, p *Pending, w Work) Value {
	if r.Traced() {
		return r.laterTraced(support, w)
	}
	return r.NewLazy(support, p, w)
}

// Ended is implemented by work that may be over before it is done: where ends are
// put in, a wall may hold, or a transport be the identity.
type Ended interface {
	Work
	// EndAt is the result with s put in, where that can be told without doing the work.
	EndAt(run *Run, s *Subst) (Value, bool)
}

// endAt is the result of the cell's work with s put in, where the work need not be done.
func (l *Lazy) endAt(run *Run, s *Subst) (Value, bool) {
	p := l.pending.Load()
	if p == published || p == claimed || run.Plain.Eager {
		return nil, false
	}
	w := p.work
	if t, ok := w.(*tracedWork); ok {
		w = t.work
	}
	if e, ok := w.(Ended); ok {
		return e.EndAt(run, s)
	}
	return nil, false
}

// LaterOf is Later of a function that captures nothing but its two arguments:
// the cell costs one object less.
func (r *Run) LaterOf(support Support, f func(run *Run, a, b Value) Value, a, b Value) Value {
	w := &ofWork{f: f, a: a, b: b}
	return r.LaterWork(support, &w.Pending, w)
}

type ofWork struct {
	Pending
	f    func(run *Run, a, b Value) Value
	a, b Value
}

func (w *ofWork) Do(run *Run) Value { return w.f(run, w.a, w.b) }

// Force evaluates v to weak head normal form.
func (r *Run) Force(v Value) Value {
	if l, ok := v.(*Lazy); ok || r.solutions != nil {
		return r.forced(v, l)
	}
	return v
}

func (r *Run) forced(v Value, l *Lazy) Value {
	if l != nil {
		if l.pending.Load() == published {
			v = l.result
		} else {
			v = r.force(l)
		}
	}
	if r.solutions != nil {
		return r.refresh(v)
	}
	return v
}

// Peek returns the value of a cell that has been forced, and v otherwise.
func Peek(v Value) Value {
	if l, ok := v.(*Lazy); ok && l.pending.Load() == published {
		return l.result
	}
	return v
}

func (r *Run) force(l *Lazy) Value {
	if r.Enter() {
		return r.forceHop(l)
	}
	v := r.forceChain(l)
	r.Leave()
	return v
}

//go:noinline
func (r *Run) forceHop(l *Lazy) (v Value) {
	r.Hop(func() { v = r.forceChain(l) })
	r.Leave()
	return v
}

// forceChain does l's work and, as long as that gives another cell, that one's,
// and then publishes the result in all of them: tail calls do not nest.
func (r *Run) forceChain(first *Lazy) Value {
	var few [6]*Lazy
	chain := append(few[:0], first)
	var v Value
	for l := first; ; {
		p := l.pending.Load()
		for p == claimed {
			runtime.Gosched()
			p = l.pending.Load()
		}
		if p == published {
			v = l.result
			break
		}
		r.Forced++
		if r.Traced() {
			r.trace.nodes[r.trace.at].forced++
		}
		v = p.work.Do(r)
		next, ok := v.(*Lazy)
		if !ok {
			break
		}
		chain = append(chain, next)
		l = next
	}
	if r.Plain.NoSharing {
		return v
	}
	for _, l := range chain {
		l.publish(v)
	}
	return v
}

func (l *Lazy) publish(v Value) {
	p := l.pending.Load()
	if p == published || p == claimed {
		return
	}
	if l.pending.CompareAndSwap(p, claimed) {
		l.result = v
		l.pending.Store(published)
	}
}

type substituted struct {
	Pending
	v Value
	s *Subst
}

func (w *substituted) Do(run *Run) Value {
	v := run.Force(w.v)
	if run.Watched() {
		back := run.Operate(SubstitutionSite)
		run.Pushed++
		if run.Traced() {
			run.trace.nodes[run.trace.at].pushed++
		}
		return run.Left(back, run.push(v, w.s))
	}
	run.Pushed++
	return run.push(v, w.s)
}

// push substitutes in a weak head normal form, if that changes it.
func (r *Run) push(v Value, s *Subst) Value {
	if !r.Plain.NoSupport {
		s = s.RestrictTo(v.Support())
		if s == nil {
			return v
		}
	}
	return v.Substitute(r, s)
}

// Substitute is v with s put in: v itself where its support misses s,
// otherwise a cell in which s waits. Pending substitutions stack; they are
// never merged, so the work beneath them is done once.
func (r *Run) Substitute(v Value, s *Subst) Value {
	if s == nil {
		return v
	}
	support := v.Support()
	if support&s.Domain() == 0 && !r.Plain.NoSupport {
		r.Skipped++
		return v
	}
	if d, ok := v.(*Dimension); ok {
		return r.Dimension(d.Dim.Subst(s))
	}
	if !r.Plain.NoSupport {
		if s = s.RestrictTo(support); s == nil {
			r.Skipped++
			return v
		}
	}
	if l, ok := v.(*Lazy); ok && s.Ends()&support != 0 {
		if w, ok := l.endAt(r, s); ok {
			r.Skipped++
			return w
		}
	}
	r.Substitutions++
	if r.Plain.Eager {
		return r.pushNow(v, s)
	}
	if u, t := renamed(v); t != nil {
		return r.Substitute(u, t.Compose(s))
	}
	w := &substituted{v: v, s: s}
	l := r.NewLazy(SubstSupport(support, s), &w.Pending, w)
	if f, ok := v.(*Lazy); ok && f.fold != nil {
		l.fold = &folding{from: &substitutedFold{f.fold, s}}
	}
	return l
}

// renamed is the value and the renaming that wait in v; nil where something else
// does. A renaming computes nothing whose result could be shared, so what follows
// it is put in together with it.
func renamed(v Value) (Value, *Subst) {
	if l, ok := v.(*Lazy); ok && l.fold == nil {
		if p := l.pending.Load(); p != published && p != claimed {
			if w, ok := p.work.(*substituted); ok {
				if sup := w.v.Support(); w.s.Skippable(sup, sup, sup) {
					return w.v, w.s
				}
			}
		}
	}
	return nil, nil
}

// pushNow pushes at once, which nests as deep as v does.
func (r *Run) pushNow(v Value, s *Subst) (out Value) {
	r.Down(func() { out = r.push(r.Force(v), s) })
	return out
}

// At is v with the dimension n set to d.
func (r *Run) At(v Value, n Name, d interval.Dim) Value {
	if !v.Support().Has(n) && !r.Plain.NoSupport {
		r.Skipped++
		return v
	}
	return r.Substitute(v, interval.Assign(n, d))
}

// SubstSupport is the support of a value with support sup after s.
func SubstSupport(sup Support, s *Subst) Support {
	out := sup
	for k := range s.Len() {
		n, _ := s.At(k)
		out = out.Without(n)
	}
	for k := range s.Len() {
		if n, d := s.At(k); sup.Has(n) {
			out |= d.Support()
		}
	}
	return out
}

// Under is s as it goes under the binder of n, for a body of the given
// support: without n, and with n renamed where an image mentions it.
func (r *Run) Under(n Name, body Support, s *Subst, avoid Support) (Name, *Subst) {
	s = s.Without(n)
	if !r.Plain.NoSupport {
		s = s.RestrictTo(body.Without(n))
	}
	if s.Image().Has(n) || avoid.Has(n) {
		m := r.Fresh(body | s.Image() | avoid)
		if s == nil {
			return m, interval.Rename(n, m)
		}
		return m, s.Extend(n, interval.Var(m))
	}
	return n, s
}
