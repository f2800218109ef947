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
// A hook is the entering and leaving of a site. Steps and memory are subtracted
// at the one and added at the other, which makes what was done there and below;
// what was done below is taken off at the end. The counts of all paths add up to
// the run's exactly. A β-step belongs to the function that is called, not to the
// caller.
//
// Whoever wants time alone needs no paths: a sample finds the path (sample.go).
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

// Trace is what a run keeps of where its work is done. It belongs to one run;
// make one for each. The zero value keeps paths and time, but no counts.
type Trace struct {
	Exact bool          // count exactly, not only time
	Every time.Duration // between samples of time; 0: no samples
	// Label, if not nil, is called at each sample with the definition or term and
	// the operation that the run is at; either may be nil.
	Label  func(definition, operation *Site)
	Follow *Follow // may be nil
	// Regions, if not nil, is the context whose execution trace gets a region
	// for each operation of the engine.
	Regions context.Context

	light  bool   // time alone: the run does not keep its path
	nodes  []node // the paths by number; there is no number 0
	at     Back   // where the run is
	run    *Run
	root   *Path
	folded Back   // the innermost path that is folded, 0 if there is none
	folds  []fold // where the run is in paths that are folded, innermost last
	called int64  // which of the run's steps is a β-step whose function has not been entered
	// operations are those that the run is at, where no paths are kept
	operations []operation
	due        atomic.Bool // a sample is due
	sampled    time.Time
	rest       time.Time // until then no sample is taken
	stuck      *stuckAt  // nil where nobody is going to ask
	// reporting: the rule that is called next has been reported
	reporting bool
	stop      chan struct{}
	stopped   bool
}

// Root is the path of no sites, below which all others are, of a trace that has ended.
func (t *Trace) Root() *Path {
	if t.root == nil {
		return &Path{}
	}
	return t.root
}

// Begin makes t the trace of the run.
func (r *Run) Begin(t *Trace) {
	if t == nil || !hooks {
		return
	}
	r.watch, t.run = t, r
	t.nodes, t.at = make([]node, root+1, 32), root
	t.light = !t.Exact && t.Follow == nil && t.stuck == nil
	if !t.light {
		r.trace = t
		t.nodes[root].steps, t.nodes[root].memory = -r.Steps, -r.Memory
	}
	if t.Every > 0 {
		t.sampled, t.stop = time.Now(), make(chan struct{})
		go t.clock(t.stop)
	}
}

// End closes the trace: what is being done is counted up to here. It is called
// also for runs that were stopped.
func (t *Trace) End() {
	if t == nil || t.run == nil || t.stopped {
		return
	}
	t.stopped = true
	if t.Every > 0 {
		close(t.stop)
		t.rest = time.Time{}
		t.sample()
	}
	if !t.light {
		t.unwind()
	}
	t.root = t.tree()
	t.run.trace, t.run.watch = nil, nil
}

// Watched reports whether somebody looks at the run, by whatever means: the one
// test at the hook of an operation.
func (r *Run) Watched() bool { return hooks && r.watch != nil }

// Operate enters an operation, and returns what Out and Left take. Only a run
// that is watched may call it.
func (r *Run) Operate(s *Site) Back {
	if r.trace != nil {
		return r.In(s)
	}
	t := r.watch
	t.operations = append(t.operations, operation{s, r.depth})
	return outside
}

// Traced reports whether the run keeps its path: the one test at all other hooks.
func (r *Run) Traced() bool { return hooks && r.trace != nil }

// In enters a site and returns where the run was, for Out. It does nothing where
// the run is there already. Only a run that is traced may call it.
func (r *Run) In(s *Site) Back {
	t := r.trace
	from := t.at
	n := &t.nodes[from]
	if n.site == s || s == nil {
		return from
	}
	if n.last.site != s {
		n = t.turn(from, s)
	}
	to := n.last.to
	n = &t.nodes[to]
	n.entered++
	n.steps -= r.Steps
	n.memory -= r.Memory
	t.at = to
	if n.parent != from {
		t.fold(to, from, r.Steps)
	}
	return from
}

// Again is Left and In for the site that the run is in, entered from back, with
// one step taken in between. Only a run that is traced may call it.
func (r *Run) Again(back Back) {
	t := r.trace
	if n := &t.nodes[t.at]; n.parent == back && t.folded != t.at {
		n.entered++
		n.steps--
		return
	}
	r.again(back)
}

func (r *Run) again(back Back) {
	t := r.trace
	if t.at == back { // it did not have to be entered
		return
	}
	s := t.nodes[t.at].site
	r.Steps-- // the step was taken inside
	t.leave(r, back)
	r.Steps++
	r.In(s)
}

// IsIn reports whether the run is at s already. Only a run that is traced may ask.
func (r *Run) IsIn(s *Site) bool { return r.trace.nodes[r.trace.at].site == s }

// Calls says that a β-step has been taken, which belongs to the code that is
// called next; it reports whether somebody follows the run. Only a run that is
// traced may call it.
func (r *Run) Calls() bool {
	r.trace.called = r.Steps
	return r.trace.Follow != nil
}

// Called is In for the code of a function: the β-step that was taken just
// before is the function's.
func (r *Run) Called(s *Site) Back {
	from := r.trace.at
	r.trace.call(r, from, s)
	return from
}

// TailCalled is Called for a tail call, with the β-step that was taken just
// before. back is what the run came from when it entered the first of them, 0 for
// that one; it is returned for Left, which leaves all of them.
func (r *Run) TailCalled(back Back, s *Site) Back {
	return r.trace.tail(r, back, s, r.Steps-1)
}

// Tail is In for a tail call; back is as with TailCalled.
func (r *Run) Tail(back Back, s *Site) Back {
	return r.trace.tail(r, back, s, r.Steps)
}

// Resume is In for a cell that a rule made while s was running: it does nothing
// where the run stands in s already, at whatever operation.
func (r *Run) Resume(s *Site) Back {
	if from := r.trace.at; r.trace.nodes[from].owner == s {
		return from
	}
	return r.In(s)
}

// Out leaves what Operate, In, Called or Resume entered.
func (r *Run) Out(back Back) {
	if t := r.watch; t.at != back {
		t.leave(r, back)
	}
}

// Left is Out for a rule that returns v; back is 0 where the run is not watched.
func (r *Run) Left(back Back, v Value) Value {
	if back != 0 && r.watch.at != back {
		r.watch.leave(r, back)
	}
	return v
}

// Operation enters one of the engine's operations, with a region of Go's
// execution trace where that was asked for; the function that it returns leaves.
func (r *Run) Operation(s *Site) func() {
	t := r.watch
	if t.light && t.operating() == s || !t.light && t.nodes[t.at].site == s {
		return func() {}
	}
	back := r.Operate(s)
	if t.Regions == nil {
		return func() { r.Out(back) }
	}
	region := trace.StartRegion(t.Regions, s.Name)
	return func() {
		region.End()
		r.Out(back)
	}
}

// Running is the definition or term whose work is being done, nil where the run
// is not traced.
func (r *Run) Running() *Site {
	if r.trace == nil {
		return nil
	}
	return r.trace.nodes[r.trace.at].owner
}

// FormerName is the name of t's former; nil is a neutral type.
func (r *Run) FormerName(t Type) string {
	if t == nil {
		return neutralLabel.Name
	}
	return r.labelOf(t).Name
}

// InHcomp enters "hcomp at" t's former, or at neutral types if t is nil.
func (r *Run) InHcomp(t Type) Back {
	if t == nil {
		return r.Operate(&neutralLabel.hcomp)
	}
	return r.Operate(&r.labelOf(t).hcomp)
}

// InTransp enters "transp at" t's former, or at neutral types if t is nil.
func (r *Run) InTransp(t Type) Back {
	if t == nil {
		return r.Operate(&neutralLabel.transp)
	}
	return r.Operate(&r.labelOf(t).transp)
}

// InElimination enters the elimination of a data type.
func (r *Run) InElimination(l *Label) Back { return r.In(&l.eliminated) }

// tracedWork is work that a rule left for later with the definition it stands in.
type tracedWork struct {
	Pending
	work Work
	site *Site
}

func (w *tracedWork) Do(run *Run) Value {
	if !run.Traced() {
		return w.work.Do(run)
	}
	back := run.Resume(w.site)
	v := w.work.Do(run)
	run.Out(back)
	return v
}

// laterTraced is LaterWork in a run that is traced.
func (r *Run) laterTraced(support Support, work Work) Value {
	w := &tracedWork{work: work, site: r.trace.nodes[r.trace.at].owner}
	return r.NewLazy(support, &w.Pending, w)
}

// Sited is implemented by globals, and by what folded forms are made from, that
// know the site they stand at.
type Sited interface{ Site() *Site }

// SiteOf is the site of what is Sited, nil for anything else.
func SiteOf(x any) *Site {
	if s, ok := x.(Sited); ok {
		return s.Site()
	}
	return nil
}

// doTraced unfolds a definition at its own site, where it was called.
func (w *foldWork) doTraced(run *Run, n *Neutral) Value {
	caller := run.In(SiteOf(w.from))
	g := n.head.(*GlobalHead).Global
	back := run.In(SiteOf(g))
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
