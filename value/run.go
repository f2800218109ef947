package value

import (
	"context"
	"errors"
	"fmt"
	"math/rand/v2"
	"runtime"
	"sync/atomic"
	"time"

	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value/interval"
)

// Budget bounds one run. Every field is a plain number; a run is stopped with
// an out-of-budget error as soon as one is passed.
type Budget struct {
	Steps  int64 // β, eliminations, Kan rules, unfoldings
	Depth  int64 // nesting of evaluation, in levels
	Memory int64 // bytes, charged at the fixed prices of prices.go
	Output int64 // nodes of a normal form, as a shared graph
}

// PollEvery is how many steps pass between two looks at the context: some 50 to
// 250 µs. Work that takes no steps is counted by Charge and Work.
const PollEvery = 256

// pollBytes is how much memory is charged between two looks at the context:
// about 2,000 allocations.
const pollBytes = 256 << 10

// pollWork is how many units of other work pass between two looks at the context.
const pollWork = 4096

// HopEvery is how many levels of nesting stand on one goroutine's stack; the
// next level continues on a fresh one. A level takes 0.7 to 2.4 kB, and at most
// 3.8 kB without optimisation, so a stack, whose size is a power of two, has at
// most 4 MB. It is small so that growing a stack, which copies it and cannot be
// interrupted, takes no more than about a millisecond.
const HopEvery = 1_000

// Plain switches the engine's shortcuts off, for the plain evaluator that the
// fast one is tested against. The zero value is the fast evaluator.
type Plain struct {
	NoSupport  bool // substitutions are made also where the support says they change nothing
	NoSharing  bool // a lazy cell is evaluated anew each time it is forced
	Eager      bool // substitutions are pushed as soon as they are made
	NoFrontier bool // every substitution that meets a neutral recomputes it
	NoNumerals bool // a numeral is eliminated step by step
}

// Run is one call's budget and counters, handed to everything that computes.
// It belongs to one call and is not safe for concurrent use.
type Run struct {
	Stats
	Plain Plain
	// OneUniverse says that levels are switched off: every universe is U 0, and
	// in itself.
	OneUniverse     bool
	budget          Budget
	ctx             context.Context
	deadline        time.Time // of ctx, zero if it has none
	check           int64     // the step at which to look at budget and context again
	nextBytes       int64     // the memory at which to look at them again
	bytes           int64     // the same, or 0 where a clock wants a look at once; atomic
	work            int       // other work since the last look
	depth           int64
	limit           int64           // the depth at which to hop or stop
	levels, reached []levelState    // what runs at each depth: below the limit, and at all that were reached
	spent           map[*Site]int64 // steps by definition, by samples
	sample          int64           // the steps at the last sample
	high            *atomic.Int32
	draw            *rand.Rand // names drawn at random, a hook for tests
	unfold          Unfolder
	// solutions are the assumptions and holes that have become definitions
	// since values were made that are stuck on them
	solutions map[Global]Global
	refreshed map[*Neutral]Value
	slots     []Value // the segment of call frames in use
	used      int
	outer     []outerSegment
	spare     []Value // a segment that is not in use
	watch     *Trace  // what looks at the run; nil where nobody does
	trace     *Trace  // the same if it keeps the path of each step, nil otherwise
	// Numerals is where the former of numerals keeps the numbers that it has
	// made at once; nil at first.
	Numerals any
	stacked  int64 // the levels of nesting whose stack has been charged
	// Standing is the definition or term that is being checked or compiled, for
	// the code that is made of it; nil outside of any.
	Standing *Site
	first    [firstLevels]levelState
}

// Settings are what a run is made with.
type Settings struct {
	Context context.Context
	Budget  Budget
	Plain   Plain
	// OneUniverse switches universe levels off, which is unsound.
	OneUniverse bool
	High        *atomic.Int32 // supply of names beyond the low ones; shared by all runs of an engine
	Unfold      Unfolder
	// Solutions sends assumptions and holes to the definitions that have replaced them.
	Solutions map[Global]Global
	// Draw, if not nil, makes fresh names random among the free ones instead of the lowest.
	Draw *rand.Rand
}

// NewRun begins a run.
func NewRun(s Settings) *Run {
	if s.Context == nil {
		s.Context = context.Background()
	}
	if s.High == nil {
		s.High = new(atomic.Int32)
		s.High.Store(64)
	}
	r := &Run{Plain: s.Plain, OneUniverse: s.OneUniverse, budget: s.Budget, ctx: s.Context, high: s.High, unfold: s.Unfold, draw: s.Draw, solutions: s.Solutions}
	r.limit = min(HopEvery, r.budget.Depth)
	r.reached = r.first[:]
	r.lower()
	r.next()
	r.deadline, _ = s.Context.Deadline()
	return r
}

// Budget is what the run may spend.
func (r *Run) Budget() Budget { return r.budget }

// Abort is what a run panics with to leave; the entry points of the engine
// recover it. Nothing else of this module panics on purpose.
type Abort struct{ Err *term.Error }

// Fail leaves the run with an error.
func (r *Run) Fail(err *term.Error) { panic(&Abort{err}) }

// Unsupported leaves the run with an error of that kind.
func (r *Run) Unsupported(what string) Value {
	panic(&Abort{&term.Error{Kind: term.Unsupported, Message: what + " is not supported"}})
}

// Fault leaves the run with an internal error: an invariant does not hold.
func (r *Run) Fault(format string, args ...any) {
	panic(&Abort{&term.Error{Kind: term.Internal, Message: fmt.Sprintf(format, args...)}})
}

// Step counts one step of a rule that has no kind of its own.
func (r *Run) Step() { r.Take(StepOther) }

// Take counts one step by a rule of the given kind and, now and then, looks at
// the budget and the context.
func (r *Run) Take(k StepKind) {
	r.ByRule[k]++
	r.Steps++
	if r.Steps >= r.check {
		r.tick()
	}
}

// tick is poll, but for a clock that wants a sample before it is time for one.
//
//go:noinline
func (r *Run) tick() {
	if r.watch != nil && r.watch.due.Load() {
		r.watch.sample()
	}
	if r.Steps >= r.check || r.Memory >= r.nextBytes {
		r.poll()
		return
	}
	atomic.StoreInt64(&r.bytes, r.nextBytes)
}

// next says when to look again.
func (r *Run) next() {
	r.check = min(r.Steps+PollEvery, r.budget.Steps)
	r.nextBytes = min(r.Memory+pollBytes, r.budget.Memory+1)
	atomic.StoreInt64(&r.bytes, r.nextBytes)
}

func (r *Run) poll() {
	r.attribute()
	if r.Steps >= r.budget.Steps {
		r.over("steps", r.budget.Steps)
	}
	if r.Memory > r.budget.Memory {
		r.over("bytes", r.budget.Memory)
	}
	r.look()
	r.next()
	r.work = 0
}

// look stops the run if its context has ended. A deadline that has passed ends
// it also where the context has not noticed yet: its timer may be waiting for
// the very processor that this run keeps busy.
func (r *Run) look() {
	err := r.ctx.Err()
	if err == nil && r.deadline.After(time.Time{}) && !time.Now().Before(r.deadline) {
		for range 100 {
			if err = r.ctx.Err(); err != nil {
				break
			}
			runtime.Gosched()
		}
		if err == nil {
			err = context.DeadlineExceeded
		}
	}
	if err == nil {
		return
	}
	if cause := context.Cause(r.ctx); cause != nil {
		err = cause
	}
	r.Fail(&term.Error{Kind: term.Cancelled, Message: "cancelled", Cause: err})
}

// Poll looks at budget and context at once; entry points call it first.
func (r *Run) Poll() { r.poll() }

// Work counts n units of work that neither takes steps nor is charged memory,
// each about a microsecond at most, and looks at the context now and then.
func (r *Run) Work(n int) {
	if r.work += n; r.work >= pollWork {
		r.poll()
	}
}

// Charge counts memory at a fixed price.
func (r *Run) Charge(bytes int64) {
	r.Memory += bytes
	if r.Memory >= atomic.LoadInt64(&r.bytes) {
		r.tick()
	}
}

// Fresh is a dimension's name outside avoid: the lowest, so that names stay
// small and supports stay exact.
func (r *Run) Fresh(avoid Support) Name {
	if r.draw != nil {
		if n := Name(r.draw.IntN(63)); !avoid.Has(n) {
			return n
		}
	}
	if n, ok := avoid.Lowest(); ok {
		return n
	}
	return Name(r.high.Add(1))
}

// Call frames stand in segments; the first of a run is small, since most runs
// are. A segment that has become empty gives way to the one before it.
const (
	firstSegment = 64
	frameSegment = 1024
)

// outerSegment is a segment that is full for now.
type outerSegment struct {
	slots []Value
	used  int
}

// Frame returns n slots for a call frame, to be given back with Release(n) in
// the opposite order. Nothing may keep a frame after its release.
func (r *Run) Frame(n int) []Value {
	from, to := r.used, r.used+n
	if to > len(r.slots) {
		return r.segment(n)
	}
	r.used = to
	return r.slots[from:to:to]
}

// Release gives back the last frame, of n slots.
func (r *Run) Release(n int) {
	r.used -= n
	if r.used == 0 && len(r.outer) > 0 {
		r.shrink()
	}
}

// Mark is how far the run's call frames reach.
type Mark struct{ used, segments int }

// Mark is for [Run.Slide] and [Run.Reset].
func (r *Run) Mark() Mark { return Mark{r.used, len(r.outer)} }

// slack is how many slots may stand below the last frame that are not needed any
// more: moving it each time costs more.
const slack = 16

// Slide moves the last frame down over those that were made since the mark,
// which are not needed any more.
func (r *Run) Slide(m Mark, f []Value) []Value {
	used := m.used
	if len(r.outer) != m.segments {
		used = 0 // everything in this segment was made since
	}
	end := used + len(f)
	if r.used < end+slack {
		return f
	}
	g := r.slots[used:end:end]
	copy(g, f)
	r.used = end
	return g
}

// Reset gives back all frames that were made since the mark.
func (r *Run) Reset(m Mark) {
	for len(r.outer) > m.segments {
		r.shrink()
	}
	if len(r.outer) == m.segments { // an empty segment may have gone before
		r.used = m.used
	}
}

//go:noinline
func (r *Run) segment(n int) []Value {
	size := firstSegment
	if r.slots != nil {
		r.outer = append(r.outer, outerSegment{r.slots, r.used})
		size = frameSegment
	}
	if len(r.spare) >= n {
		r.slots, r.spare = r.spare, nil
	} else {
		r.slots = make([]Value, max(size, n))
	}
	r.used = n
	return r.slots[:n:n]
}

//go:noinline
func (r *Run) shrink() {
	last := len(r.outer) - 1
	r.spare = r.slots // so that work at the edge of a segment does not make one each time
	r.slots, r.used = r.outer[last].slots, r.outer[last].used
	r.outer = r.outer[:last]
}

// ErrorOf turns what the run panicked with into an error value, as the function
// ErrorOf does; where it went over a limit, with its account.
func (r *Run) ErrorOf(thrown any) *term.Error {
	err := ErrorOf(thrown)
	if err.Kind == term.OutOfBudget && err.Detail == nil {
		var size *interval.SizeError
		if errors.As(err.Cause, &size) {
			err.Detail = r.Account("conjunctions", interval.MaxConjunctions)
		}
	}
	return err
}

func recoverSize(thrown any) (*term.Error, bool) {
	e, ok := thrown.(*interval.SizeError)
	if !ok {
		return nil, false
	}
	return &term.Error{Kind: term.OutOfBudget, Message: e.Error(), Cause: e}, true
}

// ErrorOf turns what a run panicked with into an error value. What is neither
// an Abort nor a size error of the interval becomes an internal fault.
func ErrorOf(thrown any) *term.Error {
	switch t := thrown.(type) {
	case *Abort:
		return t.Err
	case error:
		if e, ok := recoverSize(t); ok {
			return e
		}
		return &term.Error{Kind: term.Internal, Message: "internal fault", Cause: t}
	}
	return &term.Error{Kind: term.Internal, Message: fmt.Sprintf("internal fault: %v", thrown)}
}
