package value

import (
	"context"
	"runtime/trace"
	"sync/atomic"
	"time"

	"example.com/boxwright/nbe/term"
)

// Where a run is: the path of sites that its work nests in, and what was done
// at each. A site is a definition whose code is running, an elimination of a
// data type, a Kan operation at a former, a substitution being pushed, or one
// of checking, comparing and reading back.
//
// Work waits in lazy cells and is done where somebody looks, so a path follows
// who looked. Whose work it is, the cell says: compiled code knows the
// definition it was compiled for and enters it wherever it runs, and a cell
// that a rule made, in a run that is traced, is entered with the definition
// that was running when it was made. A definition's work is therefore charged
// to it, below whoever asked for it.
//
// Steps and memory are taken as differences when the path changes, so a hook is
// the entering and leaving of a site and nothing else is counted twice; the
// counts of all paths add up to the run's exactly. A β-step belongs to the function
// that is called, not to the caller.
//
// Paths are kept whole up to MaxPath sites. A longer one, as recursion makes
// it, goes back to the nearest place on it where the same site was entered from
// the same one: counts stay exact, also by caller, and the tree stays small.
// Beyond MaxPaths paths in one run, every recursion is folded like that.
//
// A run without a trace pays one nil test at each hook.

// MaxPath is how many sites a path has before recursion is folded.
const MaxPath = 48

// MaxPaths is how many different paths one run keeps before it folds all recursion.
const MaxPaths = 1 << 15

// SiteKind tells the kinds of sites apart.
type SiteKind uint8

// The kinds of sites.
const (
	SiteDefinition SiteKind = iota + 1
	SiteTerm                // a term that a host or a script gave
	SiteElimination
	SiteHcomp
	SiteTransp
	SiteSubstitution
	SiteOperation // checking, comparing, reading back
)

// Site is a place where work is done. Sites are compared by pointer within a
// run, and by what they hold when runs are put together.
type Site struct {
	Kind  SiteKind
	Name  string
	Place term.Place // where it was written, if that is known
}

// The sites of the engine's own operations.
var (
	SubstitutionSite = &Site{Kind: SiteSubstitution, Name: "substitution"}
	CheckingSite     = &Site{Kind: SiteOperation, Name: "checking"}
	ComparingSite    = &Site{Kind: SiteOperation, Name: "comparison"}
	ReadbackSite     = &Site{Kind: SiteOperation, Name: "readback"}
	EvaluationSite   = &Site{Kind: SiteOperation, Name: "evaluation"}
)

// Counts are what is counted at a path.
type Counts struct {
	Entered int64 // how often the site was entered from another
	Steps   int64
	Pushed  int64 // substitutions pushed one constructor down
	Forced  int64 // lazy values forced
	Memory  int64 // bytes charged
	Nanos   int64 // time, by samples
}

// Add adds o.
func (c *Counts) Add(o Counts) {
	c.Entered += o.Entered
	c.Steps += o.Steps
	c.Pushed += o.Pushed
	c.Forced += o.Forced
	c.Memory += o.Memory
	c.Nanos += o.Nanos
}

// Path is one path of a trace: its last site, what was counted there and not
// below, and the paths that go on from it.
type Path struct {
	Site   *Site
	Counts Counts
	Parent *Path // nil at the root

	owner        *Site // the definition or term it stands in
	depth        int
	last, second link
	next         []link
}

// link leads on from a path; to is further up where recursion is folded.
type link struct {
	site *Site
	to   *Path
}

// Below yields the paths that go on from p, in the order they were first taken.
func (p *Path) Below(yield func(*Path) bool) {
	for _, l := range p.next {
		if l.to.Parent == p && !yield(l.to) {
			return
		}
	}
}

// Trace is what a run keeps of where its work is done. It belongs to one run;
// make one for each. The zero value keeps paths and time, but no counts.
type Trace struct {
	Exact  bool          // count exactly, not only time
	Every  time.Duration // between samples of time; 0: no time
	Follow *Follow       // may be nil
	// Regions, if not nil, is the context whose execution trace gets a region
	// for each operation of the engine.
	Regions context.Context

	root    Path
	at      *Path
	run     *Run
	steps   int64 // of the run, when the path last changed
	memory  int64
	paths   int
	due     atomic.Bool // a sample of time is due
	sampled time.Time
	stuck   *stuckAt // nil where nobody is going to ask
	// reporting: the rule that is called next has been reported
	reporting bool
	stop      chan struct{}
	stopped   bool
}

// Root is the path of no sites, below which all others are.
func (t *Trace) Root() *Path { return &t.root }

// Begin makes t the trace of the run.
func (r *Run) Begin(t *Trace) {
	if t == nil || !hooks {
		return
	}
	r.trace, t.run = t, r
	t.at = &t.root
	t.rebase()
	if t.Every > 0 {
		t.sampled, t.stop = time.Now(), make(chan struct{})
		go t.clock(t.stop)
	}
}

func (t *Trace) clock(stop chan struct{}) {
	tick := time.NewTicker(t.Every)
	defer tick.Stop()
	for {
		select {
		case <-stop:
			return
		case <-tick.C:
			t.due.Store(true)
		}
	}
}

// End closes the trace: what has been done since the path last changed is
// counted where the run stands. It is called also for runs that were stopped.
func (t *Trace) End() {
	if t == nil || t.run == nil || t.stopped {
		return
	}
	t.stopped = true
	if t.Every > 0 {
		close(t.stop)
		t.sample()
	}
	if t.Exact {
		t.settle(0)
	}
	t.run.trace = nil
}

func (t *Trace) rebase() {
	r := t.run
	t.steps, t.memory = r.Steps, r.Memory
}

// settle charges what was done since it was last called to the present path,
// apart from a number of steps that belong to what comes next.
func (t *Trace) settle(calls int64) {
	steps, memory, c := t.run.Steps-calls, t.run.Memory, &t.at.Counts
	c.Steps += steps - t.steps
	c.Memory += memory - t.memory
	t.steps, t.memory = steps, memory
}

//go:noinline
func (t *Trace) sample() {
	t.due.Store(false)
	now := time.Now()
	t.at.Counts.Nanos += int64(now.Sub(t.sampled))
	t.sampled = now
}

// Traced reports whether the run keeps a trace: the one test at each hook.
func (r *Run) Traced() bool { return hooks && r.trace != nil }

// In enters a site and returns where the run was, for Out. It does nothing where
// the run is there already. Only a run that is traced may call it.
func (r *Run) In(s *Site) *Path {
	from := r.trace.at
	if from.Site != s {
		r.trace.enter(from, s)
	}
	return from
}

// Called is In for the code of a function: the β-step that was taken just
// before is the function's.
func (r *Run) Called(s *Site) *Path {
	from := r.trace.at
	if from.Site != s {
		r.trace.call(from, s)
	}
	return from
}

// Resume is In for a cell that a rule made while s was running: it does nothing
// where the run stands in s already, at whatever operation.
func (r *Run) Resume(s *Site) *Path {
	from := r.trace.at
	if from.owner != s {
		r.trace.enter(from, s)
	}
	return from
}

// Out leaves what In, Called or Resume entered.
func (r *Run) Out(back *Path) {
	if t := r.trace; t.at != back {
		t.leave(back)
	}
}

// Left is Out for a rule that returns v; back is nil where the run is not traced.
func (r *Run) Left(back *Path, v Value) Value {
	if back != nil && r.trace.at != back {
		r.trace.leave(back)
	}
	return v
}

func (t *Trace) enter(from *Path, s *Site) {
	if s == nil {
		return
	}
	if t.due.Load() {
		t.sample()
	}
	if t.Exact {
		t.settle(0)
	}
	t.step(from, s)
}

func (t *Trace) call(from *Path, s *Site) {
	if s == nil {
		return
	}
	if t.due.Load() {
		t.sample()
	}
	if t.Exact {
		t.settle(min(1, t.run.Steps-t.steps)) // code is called right after its β-step
	}
	t.step(from, s)
}

func (t *Trace) leave(back *Path) {
	if t.due.Load() {
		t.sample()
	}
	if t.Exact {
		t.settle(0)
	}
	t.at = back
}

// Operation enters one of the engine's operations, with a region of Go's
// execution trace where that was asked for; the function that it returns leaves.
func (r *Run) Operation(s *Site) func() {
	t := r.trace
	if t.at.Site == s {
		return func() {}
	}
	back := r.In(s)
	if t.Regions == nil {
		return func() { r.Out(back) }
	}
	region := trace.StartRegion(t.Regions, s.Name)
	return func() {
		region.End()
		r.Out(back)
	}
}

// Running is the definition or term whose work is being done.
func (r *Run) Running() *Site {
	if r.trace == nil {
		return nil
	}
	return r.trace.at.owner
}

func (t *Trace) step(from *Path, s *Site) {
	if from.last.site != s {
		t.turn(from, s)
	}
	to := from.last.to
	to.Counts.Entered++
	t.at = to
}

// turn makes the way to s the one that is found first, and the one before the second.
func (t *Trace) turn(from *Path, s *Site) {
	if from.second.site == s {
		from.last, from.second = from.second, from.last
		return
	}
	from.second = from.last
	from.last = link{s, t.find(from, s)}
}

//go:noinline
func (t *Trace) find(from *Path, s *Site) *Path {
	for _, l := range from.next {
		if l.site == s {
			return l.to
		}
	}
	if from.depth >= MaxPath || t.paths >= MaxPaths {
		for p := from; p.Parent != nil; p = p.Parent {
			if p.Site == s && (p.Parent.Site == from.Site || from.depth >= 4*MaxPath) {
				if t.paths < MaxPaths {
					from.next = append(from.next, link{s, p})
				}
				return p
			}
		}
	}
	t.paths++
	to := &Path{Site: s, Parent: from, depth: from.depth + 1, owner: from.owner}
	if s.Kind == SiteDefinition || s.Kind == SiteTerm {
		to.owner = s
	}
	from.next = append(from.next, link{s, to})
	return to
}

// FormerName is the name of t's former; nil is a neutral type.
func (r *Run) FormerName(t Type) string {
	if t == nil {
		return neutralLabel.Name
	}
	return r.labelOf(t).Name
}

// InHcomp enters "hcomp at" t's former, or at neutral types if t is nil.
func (r *Run) InHcomp(t Type) *Path {
	if t == nil {
		return r.In(&neutralLabel.hcomp)
	}
	return r.In(&r.labelOf(t).hcomp)
}

// InTransp enters "transp at" t's former, or at neutral types if t is nil.
func (r *Run) InTransp(t Type) *Path {
	if t == nil {
		return r.In(&neutralLabel.transp)
	}
	return r.In(&r.labelOf(t).transp)
}

// InElimination enters the elimination of a data type.
func (r *Run) InElimination(l *Label) *Path { return r.In(&l.eliminated) }

// tracedWork is a Go function's cell with the definition it stands in.
type tracedWork struct {
	Pending
	f    func(*Run) Value
	site *Site
}

func (w *tracedWork) Do(run *Run) Value {
	if !run.Traced() {
		return w.f(run)
	}
	back := run.Resume(w.site)
	v := w.f(run)
	run.Out(back)
	return v
}

// laterTraced is Later in a run that is traced.
func (r *Run) laterTraced(support Support, f func(*Run) Value) Value {
	w := &tracedWork{f: f, site: r.trace.at.owner}
	return r.NewLazy(support, &w.Pending, w)
}

// Sited is implemented by globals, and by what folded forms are made from, that
// know the site they stand at.
type Sited interface{ Site() *Site }

func siteOf(x any) *Site {
	if s, ok := x.(Sited); ok {
		return s.Site()
	}
	return nil
}

// doTraced unfolds a definition at its own site, where it was called.
func (w *foldWork) doTraced(run *Run, n *Neutral) Value {
	caller := run.In(siteOf(w.from))
	g := n.head.(*GlobalHead).Global
	back := run.In(siteOf(g))
	run.Take(StepUnfold)
	var e *Event
	if run.Followed() {
		e = run.Begins(StepUnfold, StepUnfold.String()+" "+g.GlobalName(), func(s *Sketch) *term.Written { return s.neutral(n) })
	}
	v := run.Unfold(g)
	run.Out(back)
	for _, f := range n.Frames() {
		v = f.Resume(run, v)
	}
	run.Ends(e, v)
	run.Out(caller)
	return v
}
