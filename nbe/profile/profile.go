// Package profile puts together where the work of calls of the engine was done,
// and writes it in the format of pprof.
//
// A [Profile] belongs to whoever asks for it: hand one to a call, or the same one
// to many calls, which are added up. Nothing is process-wide, and two calls
// with two profiles know nothing of each other. The frames are the host's own
// definitions, with file and line where the reader or the host gave places, and
// the operations of the theory: "elim Nat", "hcomp at pairs", "transp at Glue",
// "substitution", "checking", "comparison", "readback", nested as they called
// each other. How recursion is folded, package value says (value.MaxPath).
//
// Steps, substitutions, lazy values, memory and entries are exact: over all
// paths they add up to the counters of the calls. Time is sampled.
package profile

import (
	"cmp"
	"fmt"
	"io"
	"path/filepath"
	"slices"
	"strings"
	"sync"
	"time"

	"example.com/boxwright/value"
)

// Profile is what calls have been charged for, by path. The zero value is
// empty and ready for use. Safe for concurrent use.
type Profile struct {
	mu       sync.Mutex
	root     node
	stats    value.Stats
	calls    int
	began    time.Time
	duration time.Duration
}

// node is one frame on a path, with what was counted there.
type node struct {
	frame  Frame
	counts value.Counts
	next   map[Frame]*node
	order  []*node
}

// Frame is one frame of a path: a definition or an operation.
type Frame struct {
	Kind value.SiteKind
	Name string
	File string // empty where it is not known
	Line int
}

// Sample is one path with what was counted at its end and not further down.
type Sample struct {
	Path   []Frame // outermost first
	Counts value.Counts
}

// Add adds a trace that has ended, and the counters of its run. It is what the
// engine does at the end of a call, and leaves the trace as it is.
func (p *Profile) Add(t *value.Trace, stats value.Stats, began time.Time) {
	p.mu.Lock()
	defer p.mu.Unlock()
	if p.calls == 0 {
		p.began = began
	}
	p.calls++
	p.duration += time.Since(began)
	p.stats.Add(stats)
	type pair struct {
		from *value.Path
		to   *node
	}
	work := []pair{{t.Root(), &p.root}}
	for len(work) > 0 {
		w := work[len(work)-1]
		work = work[:len(work)-1]
		w.to.counts.Add(w.from.Counts)
		for path := range w.from.Below {
			work = append(work, pair{path, w.to.child(frameOf(path.Site))})
		}
	}
}

func frameOf(s *value.Site) Frame {
	return Frame{s.Kind, SiteName(s), s.Place.File, s.Place.Line}
}

// SiteName is the name of a site in profiles: a term is called by its place.
func SiteName(s *value.Site) string {
	if s.Kind == value.SiteTerm && s.Place.Line > 0 {
		return fmt.Sprintf("%s at %s:%d", s.Name, filepath.Base(s.Place.File), s.Place.Line)
	}
	return s.Name
}

func (n *node) child(f Frame) *node {
	if m, ok := n.next[f]; ok {
		return m
	}
	if n.next == nil {
		n.next = map[Frame]*node{}
	}
	m := &node{frame: f}
	n.next[f] = m
	n.order = append(n.order, m)
	return m
}

// Merge adds another profile, which is left as it is.
func (p *Profile) Merge(o *Profile) {
	if p == o {
		return
	}
	o.mu.Lock()
	samples, stats, calls, began, duration := o.samples(), o.stats, o.calls, o.began, o.duration
	o.mu.Unlock()
	p.mu.Lock()
	defer p.mu.Unlock()
	if p.calls == 0 {
		p.began = began
	}
	p.calls += calls
	p.duration += duration
	p.stats.Add(stats)
	for _, s := range samples {
		n := &p.root
		for _, f := range s.Path {
			n = n.child(f)
		}
		n.counts.Add(s.Counts)
	}
}

// Samples are the paths with what was counted at the end of each, those where
// nothing was counted left out. The slice is the caller's own.
func (p *Profile) Samples() []Sample {
	p.mu.Lock()
	defer p.mu.Unlock()
	return p.samples()
}

func (p *Profile) samples() []Sample {
	type at struct {
		n    *node
		path []Frame
	}
	var out []Sample
	work := []at{{&p.root, nil}}
	for len(work) > 0 {
		w := work[len(work)-1]
		work = work[:len(work)-1]
		if w.n.counts != (value.Counts{}) {
			out = append(out, Sample{w.path, w.n.counts})
		}
		for k := len(w.n.order) - 1; k >= 0; k-- {
			m := w.n.order[k]
			work = append(work, at{m, append(slices.Clip(w.path), m.frame)})
		}
	}
	return out
}

// Stats are the counters of all calls together.
func (p *Profile) Stats() value.Stats {
	p.mu.Lock()
	defer p.mu.Unlock()
	s := value.Stats{}
	s.Add(p.stats)
	return s
}

// Calls is how many calls have been added.
func (p *Profile) Calls() int {
	p.mu.Lock()
	defer p.mu.Unlock()
	return p.calls
}

// Total is the sum over all paths.
func (p *Profile) Total() (total value.Counts) {
	for _, s := range p.Samples() {
		total.Add(s.Counts)
	}
	return total
}

// Line is a frame with what was counted at it, and at it and below.
type Line struct {
	Frame
	Flat, Cumulative value.Counts
}

// Lines are the frames, the one with most steps of its own first; frames with
// the same, by name.
func (p *Profile) Lines() []Line {
	index := map[Frame]int{}
	var lines []Line
	at := func(f Frame) *Line {
		k, ok := index[f]
		if !ok {
			k = len(lines)
			index[f] = k
			lines = append(lines, Line{Frame: f})
		}
		return &lines[k]
	}
	for _, s := range p.Samples() {
		for k, f := range s.Path {
			if !slices.Contains(s.Path[:k], f) { // recursion counts once
				at(f).Cumulative.Add(s.Counts)
			}
		}
		if n := len(s.Path); n > 0 {
			at(s.Path[n-1]).Flat.Add(s.Counts)
		}
	}
	slices.SortFunc(lines, func(a, b Line) int {
		return cmp.Or(cmp.Compare(b.Flat.Steps, a.Flat.Steps), cmp.Compare(b.Cumulative.Steps, a.Cumulative.Steps),
			cmp.Compare(a.Name, b.Name), cmp.Compare(a.File, b.File), cmp.Compare(a.Line, b.Line))
	})
	return lines
}

// Text writes the n frames with most steps of their own as a table; all if n
// is not positive.
func (p *Profile) Text(w io.Writer, n int) error {
	lines := p.Lines()
	if n > 0 && len(lines) > n {
		lines = lines[:n]
	}
	var b strings.Builder
	fmt.Fprintf(&b, "%10s %10s %10s %10s %12s %10s  %s\n", "steps", "cum", "entered", "pushed", "bytes", "time", "where")
	for _, l := range lines {
		where := l.Name
		if l.File != "" && l.Kind != value.SiteTerm {
			where += fmt.Sprintf(" (%s:%d)", l.File, l.Frame.Line)
		}
		fmt.Fprintf(&b, "%10d %10d %10d %10d %12d %10s  %s\n", l.Flat.Steps, l.Cumulative.Steps, l.Flat.Entered, l.Flat.Pushed, l.Flat.Memory,
			time.Duration(l.Flat.Nanos).Round(10*time.Microsecond), where)
	}
	_, err := io.WriteString(w, b.String())
	return err
}
