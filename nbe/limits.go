package nbe

import (
	"math/rand/v2"

	"example.com/boxwright/value"
)

// Limits bound one call. A field that is zero takes the engine's, and where
// that is zero too the default; there is no value for "unlimited".
type Limits struct {
	// Steps is how many steps a call may take: β, eliminations on canonical
	// forms, Kan rules, unfoldings.
	Steps int64
	// Depth is how deeply evaluation, checking, comparing and reading back may nest.
	Depth int64
	// Memory is how many bytes a call may be charged, at the fixed prices of package value.
	Memory int64
	// Output is how many nodes a normal form may have, as a shared graph.
	Output int64
	// Text is how many nodes a normal form may have as a tree when it is written out.
	Text int64
}

// The defaults, all on. A step takes about 0.2 to 1 µs, so the default number
// of steps lasts about a minute. A level of nesting takes 0.7 to 2.4 kB of stack,
// up to 3.0 kB under the race detector and up to 3.8 kB without optimisation;
// 1,000 levels stand on a stack of at most 4 MB (value.HopEvery), so that the
// default nesting takes 60 × 4 MB = 240 MB in each of these builds. Memory is charged
// when it is allocated and never given back, at some 0.5 to 1 GB in a second, so
// the default lasts for 10 to 20 seconds of allocation. The output, at about
// 200 bytes a node, is at most 2 GB, and the text at most 4 million nodes of
// some 100 bytes.
const (
	DefaultSteps  = 100_000_000
	DefaultDepth  = 60_000
	DefaultMemory = 8 << 30
	DefaultOutput = 10_000_000
	DefaultText   = 1 << 22
)

// The documented maxima: what is above them is taken as them. Four million
// levels are as many as parentheses may nest in a text; they stand on 4,000
// goroutines one after the other (value.HopEvery levels each) and take 4 to
// 8 GB of stack, which is charged to the memory too, at 1 kB a level.
const (
	MaxDepth = 4_000_000
)

func pick(values ...int64) int64 {
	for _, v := range values {
		if v > 0 {
			return v
		}
	}
	return 0
}

func (l Limits) or(m Limits) Limits {
	return Limits{
		pick(l.Steps, m.Steps, DefaultSteps), min(pick(l.Depth, m.Depth, DefaultDepth), MaxDepth),
		pick(l.Memory, m.Memory, DefaultMemory), pick(l.Output, m.Output, DefaultOutput), pick(l.Text, m.Text, DefaultText),
	}
}

func (l Limits) budget() value.Budget {
	return value.Budget{Steps: l.Steps, Depth: l.Depth, Memory: l.Memory, Output: l.Output}
}

// Stats is what a call did.
type Stats = value.Stats

// FormerStats are the composites and transports of one former.
type FormerStats = value.FormerStats

// CallOption is an option of one call.
type CallOption func(*callOptions)

type callOptions struct {
	limits    Limits
	keep      map[string]bool
	keepAll   bool
	opaque    map[string]bool
	stats     *Stats
	inclusion bool
	recheck   bool
	draw      *rand.Rand
	observation
}

func gather(options []CallOption) *callOptions {
	o := &callOptions{}
	for _, f := range options {
		if f != nil {
			f(o)
		}
	}
	return o
}

// Within bounds the call by l instead of the engine's limits.
func Within(l Limits) CallOption { return func(o *callOptions) { o.limits = l } }

// Folded keeps the named definitions folded: they are unfolded only where an
// elimination, a Kan operation or a comparison needs them, and stand by name
// otherwise.
func Folded(names ...string) CallOption {
	return func(o *callOptions) {
		if o.keep == nil {
			o.keep = map[string]bool{}
		}
		for _, n := range names {
			o.keep[n] = true
		}
	}
}

// AllFolded keeps every definition folded.
func AllFolded() CallOption { return func(o *callOptions) { o.keepAll = true } }

// Opaque makes the named definitions opaque for the call: they never unfold. It
// has an effect on what is evaluated from terms in the call, not on values that
// were evaluated before.
func Opaque(names ...string) CallOption {
	return func(o *callOptions) {
		if o.opaque == nil {
			o.opaque = map[string]bool{}
		}
		for _, n := range names {
			o.opaque[n] = true
		}
	}
}

// Count stores what the call did into s, also when it fails.
func Count(s *Stats) CallOption { return func(o *callOptions) { o.stats = s } }

// Inclusion compares types at ≤ instead of equality.
func Inclusion() CallOption { return func(o *callOptions) { o.inclusion = true } }

// DrawNames makes fresh names of dimensions random among those that are free,
// instead of the lowest: a hook for tests of what must not depend on it.
func DrawNames(seed uint64) CallOption {
	return func(o *callOptions) { o.draw = rand.New(rand.NewPCG(seed, 0)) }
}
