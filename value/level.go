package value

// Nesting: how deep a run is, whose code runs at each level, and how it goes on
// where a stack ends. That the code is written down at each level costs one
// store; it is what a budget that ran out names, and what a sample of time sees.

// levelState is what runs at a level now.
type levelState struct {
	code *Level // that it began with
	tail *Level // that it has come to by tail calls; nil where there were none
}

// Level is what runs at one level of nesting. Compiled code has one of its own.
type Level struct {
	Site   *Site // the definition or term whose code it is; nil where that is not known
	Within *Site // the elimination whose case the code is; nil for all other code
}

// elsewhere stands at levels where no compiled code runs.
var elsewhere = new(Level)

// firstLevels is how many levels are there from the beginning.
const firstLevels = 32

// Enter counts one level of nesting. Where it returns true the caller must
// continue inside Hop; either way it calls Leave when it is done.
func (r *Run) Enter() bool { return r.EnterAt(elsewhere) }

// EnterAt is Enter for compiled code, which continues inside HopAt.
func (r *Run) EnterAt(l *Level) bool {
	r.depth++
	if d := uint64(r.depth); d < uint64(len(r.levels)) {
		r.levels[d] = levelState{l, nil}
		return false
	}
	return true
}

// Continue says that a level goes on with other code, by a tail call.
func (r *Run) Continue(l *Level) {
	if d := uint64(r.depth); d < uint64(len(r.levels)) {
		r.levels[d].tail = l
	}
}

// lower makes levels those below the limit.
func (r *Run) lower() { r.levels = r.reached[:min(int64(len(r.reached)), r.limit)] }

// deepest is the deepest level that was reached.
func (r *Run) deepest() int64 {
	for d := len(r.reached) - 1; d > 0; d-- {
		if r.reached[d].code != nil {
			return int64(d)
		}
	}
	return 0
}

// running is the definition or term whose code runs, of the innermost levels.
func (r *Run) running() *Site {
	for d := min(r.depth, int64(len(r.reached))-1); d > 0 && d > r.depth-8; d-- {
		l := r.reached[d].code
		if t := r.reached[d].tail; t != nil {
			l = t
		}
		if l != nil && l.Site != nil {
			return l.Site
		}
	}
	return nil
}

// Leave ends a level of nesting.
func (r *Run) Leave() { r.depth-- }

// Hop continues on a fresh goroutine, so that no stack grows beyond HopEvery
// levels, or stops the run where its nesting is used up. Where all that is short
// is the list of levels it makes room and continues where it is.
func (r *Run) Hop(f func()) { r.HopAt(elsewhere, f) }

// HopAt is Hop for compiled code.
func (r *Run) HopAt(l *Level, f func()) {
	if d := int(r.depth); d >= len(r.reached) {
		more := make([]levelState, max(d+1, 2*len(r.reached)))
		copy(more, r.reached)
		r.reached = more
	}
	r.reached[r.depth] = levelState{l, nil}
	r.lower()
	if r.depth < r.limit {
		f()
		return
	}
	if r.depth >= r.budget.Depth {
		r.over("levels of nesting", r.budget.Depth)
	}
	r.Poll()
	if r.depth >= freeLevels && r.depth > r.stacked { // the stack is kept, so each level is charged once
		r.Charge((r.depth - r.stacked) * PriceLevel)
		r.stacked = r.depth
	}
	limit := r.limit
	r.limit = min(r.depth+HopEvery, r.budget.Depth)
	r.lower()
	var thrown any
	done := make(chan struct{})
	go func() {
		defer close(done)
		defer func() { thrown = recover() }()
		f()
	}()
	<-done
	r.limit = limit
	r.lower()
	if thrown != nil {
		panic(thrown)
	}
}

// Down runs f one level deeper, wherever that is.
func (r *Run) Down(f func()) {
	if r.Enter() {
		r.Hop(f)
	} else {
		f()
	}
	r.Leave()
}
