package value

import (
	"cmp"
	"fmt"
	"slices"
	"strings"

	"example.com/boxwright/nbe/term"
)

// What a run counts, and how that is shown. Every count is a plain number that
// depends on nothing but the calls made: no clock, no collector, no scheduler.
// For the same calls on a fresh engine it is the same on every run and machine,
// so that a test can pin it and a regression shows as a number.

// StepKind says by which rule of the theory a step was taken.
type StepKind uint8

// The kinds of steps. Checking, reading back and comparing take steps of their
// own; what is evaluated on the way counts by its own rules.
const (
	StepOther       StepKind = iota // a step of a host's former that says nothing else
	StepApply                       // β of functions, also over the interval
	StepAt                          // β of paths
	StepProject                     // a projection from a pair
	StepEliminate                   // an elimination on a constructor or a formal composite
	StepNumeral                     // arithmetic on stored numbers
	StepBoundary                    // a path constructor on a face of its boundary
	StepUnglue                      // unglue on an element or on a face
	StepHcomp                       // a composite by its type's rule
	StepTransp                      // a transport by its type's rule
	StepUnfold                      // a folded definition unfolded
	StepCheck                       // a form elaborated
	StepCompare                     // a pair of values compared
	StepDimensional                 // an interval expression or a face elaborated
	StepKinds       = int(iota)
)

var stepNames = [StepKinds]string{
	"other", "function applied", "path at a dimension", "projection", "elimination", "arithmetic", "boundary", "unglue",
	"hcomp", "transp", "unfolding", "checking", "comparing", "dimension checked",
}

// String is the rule's name.
func (k StepKind) String() string {
	if int(k) < len(stepNames) {
		return stepNames[k]
	}
	return "unknown"
}

// Stats counts what a run did. For the same calls on a fresh engine the counts
// are the same on every run and machine. The counts by rule add up to Steps.
type Stats struct {
	Steps         int64
	ByRule        [StepKinds]int64
	Substitutions int64 // delayed over a value
	Skipped       int64 // answered by the support
	Pushed        int64 // pushed one constructor down
	Relabelled    int64 // neutrals that a substitution could not unstick
	Lazies        int64 // lazy cells made
	Forced        int64 // lazy cells evaluated
	Composites    int64 // hcomp rules
	Transports    int64 // transp rules
	Unfolded      int64 // definitions unfolded
	Dropped       int64 // walls dropped: their face became bot, or another wall covers them
	Identical     int64 // comparisons answered by identity
	Deepest       int64 // deepest nesting
	Memory        int64 // bytes charged
	// ByFormer are the composites and transports by former, in the order of names.
	ByFormer []FormerStats
}

// FormerStats counts the Kan rules of one former; those at neutral types stand
// under "neutral types".
type FormerStats struct {
	Former                 string
	Composites, Transports int64
	label                  *Label
}

// Snapshot is what the run has counted so far, for keeping.
func (r *Run) Snapshot() Stats {
	s := r.Stats
	s.Deepest = r.deepest()
	s.ByFormer = slices.Clone(s.ByFormer)
	for k := range s.ByFormer {
		s.ByFormer[k].label = nil
	}
	s.ByFormer = mergeFormers(s.ByFormer)
	return s
}

// mergeFormers puts entries of one name together, in the order of names.
func mergeFormers(list []FormerStats) []FormerStats {
	slices.SortFunc(list, func(a, b FormerStats) int { return cmp.Compare(a.Former, b.Former) })
	out := list[:0]
	for _, f := range list {
		if n := len(out); n > 0 && out[n-1].Former == f.Former {
			out[n-1].Composites += f.Composites
			out[n-1].Transports += f.Transports
		} else {
			out = append(out, f)
		}
	}
	return out
}

// Add adds the counts of another run; the deepest nesting is the deeper one.
func (s *Stats) Add(o Stats) {
	for _, c := range s.counters() {
		*c.at += *c.of(&o)
	}
	for k, n := range o.ByRule {
		s.ByRule[k] += n
	}
	s.Deepest = max(s.Deepest, o.Deepest)
	s.ByFormer = mergeFormers(append(slices.Clone(s.ByFormer), o.ByFormer...))
}

type counter struct {
	name string
	at   *int64
	of   func(*Stats) *int64
}

// counters are the plain counts that add up, with the names they are shown by.
func (s *Stats) counters() []counter {
	list := []counter{
		{name: "steps", of: func(s *Stats) *int64 { return &s.Steps }},
		{name: "substitutions", of: func(s *Stats) *int64 { return &s.Substitutions }},
		{name: "substitutions-skipped", of: func(s *Stats) *int64 { return &s.Skipped }},
		{name: "substitutions-pushed", of: func(s *Stats) *int64 { return &s.Pushed }},
		{name: "neutrals-relabelled", of: func(s *Stats) *int64 { return &s.Relabelled }},
		{name: "lazy-made", of: func(s *Stats) *int64 { return &s.Lazies }},
		{name: "lazy-forced", of: func(s *Stats) *int64 { return &s.Forced }},
		{name: "hcomp", of: func(s *Stats) *int64 { return &s.Composites }},
		{name: "transp", of: func(s *Stats) *int64 { return &s.Transports }},
		{name: "unfolded", of: func(s *Stats) *int64 { return &s.Unfolded }},
		{name: "walls-dropped", of: func(s *Stats) *int64 { return &s.Dropped }},
		{name: "identical", of: func(s *Stats) *int64 { return &s.Identical }},
		{name: "bytes-charged", of: func(s *Stats) *int64 { return &s.Memory }},
	}
	for k := range list {
		list[k].at = list[k].of(s)
	}
	return list
}

// String is the counts as text, one on each line, those that are zero left out.
func (s Stats) String() string {
	var b strings.Builder
	line := func(name string, n int64) {
		if n != 0 {
			fmt.Fprintf(&b, "%-28s %12d\n", name, n)
		}
	}
	for _, c := range s.counters() {
		line(strings.ReplaceAll(c.name, "-", " "), *c.at)
		if c.name == "steps" {
			for k, n := range s.ByRule {
				line("  "+StepKind(k).String(), n)
			}
		}
	}
	line("deepest nesting", s.Deepest)
	for _, f := range s.ByFormer {
		line("  hcomp at "+f.Former, f.Composites)
		line("  transp at "+f.Former, f.Transports)
	}
	return b.String()
}

// Report gives the counts that are not zero to a benchmark as custom metrics,
// divided by the number of units of work that one operation does: a
// *testing.B is a reporter.
func (s Stats) Report(b interface{ ReportMetric(n float64, unit string) }, units float64) {
	for _, c := range s.counters() {
		if *c.at != 0 {
			b.ReportMetric(float64(*c.at)/units, c.name)
		}
	}
	for k, n := range s.ByRule {
		if n != 0 {
			b.ReportMetric(float64(n)/units, "steps:"+strings.ReplaceAll(StepKind(k).String(), " ", "-"))
		}
	}
	for _, f := range s.ByFormer {
		name := strings.ReplaceAll(f.Former, " ", "-")
		if f.Composites != 0 {
			b.ReportMetric(float64(f.Composites)/units, "hcomp:"+name)
		}
		if f.Transports != 0 {
			b.ReportMetric(float64(f.Transports)/units, "transp:"+name)
		}
	}
	b.ReportMetric(float64(s.Deepest), "deepest")
}

// Label is how a former is called in counters and profiles, with the sites of
// its rules. It is made once for each former and not changed.
type Label struct {
	Name                      string
	hcomp, transp, eliminated Site
}

// NewLabel is the label of a former, or of a data type: of "pairs" the sites are
// "hcomp at pairs", "transp at pairs" and "elim pairs". place is where it was
// declared, if it was.
func NewLabel(name string, place term.Place) *Label {
	return &Label{
		name,
		Site{SiteHcomp, "hcomp at " + name, place},
		Site{SiteTransp, "transp at " + name, place},
		Site{SiteElimination, "elim " + name, place},
	}
}

// Elimination is the site "elim" of the label.
func (l *Label) Elimination() *Site { return &l.eliminated }

// Labelled is implemented by types whose former has a label. Without one a type
// is counted under the name of its Go type.
type Labelled interface{ Label() *Label }

var neutralLabel = NewLabel("neutral types", term.Place{})

// labelOf is the label of t's former.
func (r *Run) labelOf(t Type) *Label {
	if l, ok := t.(Labelled); ok {
		return l.Label()
	}
	name := fmt.Sprintf("%T", t)
	for k := range r.ByFormer {
		if r.ByFormer[k].Former == name {
			return r.ByFormer[k].label
		}
	}
	l := NewLabel(name, term.Place{})
	r.former(l)
	return l
}

// former is the entry of a label. There are few, so they are gone through.
func (r *Run) former(l *Label) *FormerStats {
	for k := range r.ByFormer {
		if r.ByFormer[k].label == l {
			return &r.ByFormer[k]
		}
	}
	r.ByFormer = append(r.ByFormer, FormerStats{Former: l.Name, label: l})
	return &r.ByFormer[len(r.ByFormer)-1]
}

// Composite takes the step of a composite at t; nil is a neutral type.
func (r *Run) Composite(t Type) {
	l := neutralLabel
	if t != nil {
		l = r.labelOf(t)
	}
	r.Take(StepHcomp)
	r.Composites++
	r.former(l).Composites++
}

// Transport takes the step of a transport along a line of t's former; nil is a
// neutral type.
func (r *Run) Transport(t Type) {
	l := neutralLabel
	if t != nil {
		l = r.labelOf(t)
	}
	r.Take(StepTransp)
	r.Transports++
	r.former(l).Transports++
}
