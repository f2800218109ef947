package value

import (
	"cmp"
	"fmt"
	"math/big"
	"slices"

	"example.com/boxwright/nbe/term"
)

// What memory costs, and what a run that went over its budget had spent.
//
// Memory is charged when it is allocated, at the prices below, and never given
// back: the collector's work does not count, so a budget means the same on every
// machine. The prices are what the allocations take on a 64-bit machine, with
// what regularly comes with them, rounded up: a run's charge is at least the
// memory that it keeps.

// Prices of memory, in bytes.
const (
	PriceLazy    = 160 // a cell (48) with the work that waits in it (up to 112)
	PriceClosure = 96  // a closure with four captured values
	PriceNode    = 80  // a core term, a frame of a neutral, an entry of a memo
	PriceSlot    = 16  // one more value in a closure, a frame or a list
	PriceWall    = 64  // a wall: its face, its name, its body
	// a conjunction of an interval expression or a face that has more than four;
	// high, for the time that it takes
	PriceConjunction = 64
	PriceLevel       = 1024 // a level of nesting, the first time that the stack gets that deep
)

// freeLevels is the nesting from which on the stack is charged: what most runs
// take is the same whatever they do.
const freeLevels = 10_000

// Cost is what something has cost.
type Cost struct {
	Name  string
	Steps int64
}

// Spent is what a run had spent when it went over a budget: the Detail of the
// error. Definitions are at most three, those whose own code took most steps,
// by samples of PollEvery steps. Operations are all that took any, the most
// frequent first.
type Spent struct {
	Stats
	What        string // what ran out: "steps", "bytes", "levels of nesting", "nodes", "nodes of text", "conjunctions" …
	Limit       int64
	Needed      *big.Int // how much of it would have been enough, where that is known
	Definitions []Cost
	Operations  []Cost
}

// String is the account in one line.
func (s *Spent) String() string {
	text := fmt.Sprintf("%d steps, %d bytes, nesting %d", s.Steps, s.Memory, s.Deepest)
	for k, c := range s.Definitions {
		if k == 0 {
			text += "; in"
		}
		text += fmt.Sprintf(" %s (%d)", c.Name, c.Steps)
	}
	for k, c := range s.Operations {
		if k == 0 {
			text += "; by"
		}
		text += fmt.Sprintf(" %s (%d)", c.Name, c.Steps)
	}
	return text
}

// attribute adds the steps since the last sample to the definition that is running.
func (r *Run) attribute() {
	n := r.Steps - r.sample
	r.sample = r.Steps
	site := r.running()
	if n == 0 || site == nil || site.Kind != SiteDefinition {
		return
	}
	if r.spent == nil {
		r.spent = map[*Site]int64{}
	}
	r.spent[site] += n
}

// Over leaves the run: it would use more of what than the limit allows.
func (r *Run) Over(what string, limit int64) { r.over(what, limit) }

func (r *Run) over(what string, limit int64) {
	r.Fail(&term.Error{Kind: term.OutOfBudget, Message: "out of budget", WantText: fmt.Sprintf("at most %d %s", limit, what), GotText: "more", Detail: r.Account(what, limit)})
}

// Account is what the run has spent so far, as what goes over a limit says it.
func (r *Run) Account(what string, limit int64) *Spent {
	r.attribute()
	s := &Spent{Stats: r.Snapshot(), What: what, Limit: limit}
	s.Deepest = max(s.Deepest, r.depth)
	for site, n := range r.spent {
		s.Definitions = append(s.Definitions, Cost{site.Name, n})
	}
	byCost := func(a, b Cost) int {
		return cmp.Or(cmp.Compare(b.Steps, a.Steps), cmp.Compare(a.Name, b.Name))
	}
	slices.SortFunc(s.Definitions, byCost)
	s.Definitions = s.Definitions[:min(3, len(s.Definitions))]
	for k, n := range r.ByRule {
		if n > 0 {
			s.Operations = append(s.Operations, Cost{StepKind(k).String(), n})
		}
	}
	if r.Pushed > 0 {
		s.Operations = append(s.Operations, Cost{"substitution", r.Pushed})
	}
	slices.SortFunc(s.Operations, byCost)
	return s
}
