package value

import (
	"sync/atomic"
	"time"
)

// Time, by samples. A clock sets the mark at which the run looks at its budget
// to 0, so that it stops at its next allocation and says where it is. A
// run that keeps its path knows that. One that does not finds it: compiled code
// has written down at each level of nesting whose it is, and what cases of which
// elimination it is; the operations, of which there are fewer, are kept in a
// list with the level that they were entered at. So time alone costs what a
// look at the clock costs, and nothing at each step.

// operation is one that a run without paths is at, and the level it began at.
type operation struct {
	site  *Site
	depth int64
}

// outside is what Operate returns where no paths are kept: no path is ever there.
const outside Back = -1

// clock asks for a sample now and then.
func (t *Trace) clock(stop chan struct{}) {
	tick := time.NewTicker(t.Every)
	defer tick.Stop()
	for {
		select {
		case <-stop:
			return
		case <-tick.C:
			t.due.Store(true)
			atomic.StoreInt64(&t.run.bytes, 0)
		}
	}
}

// restFactor is how much more time passes between two samples than finding a
// path takes, where a run is deep.
const restFactor = 100

//go:noinline
func (t *Trace) sample() {
	t.due.Store(false)
	now := time.Now()
	if now.Before(t.rest) {
		return
	}
	at := t.at
	if t.light {
		at = t.path()
		t.rest = now.Add(restFactor * time.Since(now))
	}
	t.nodes[at].nanos += int64(now.Sub(t.sampled))
	t.sampled = now
	if t.Label != nil {
		t.Label(t.nodes[at].owner, t.operation(at))
	}
}

// path is where a run is that does not keep its path.
func (t *Trace) path() Back {
	r, at, operations := t.run, root, t.operations
	for d := range min(r.depth+1, int64(len(r.reached))) {
		for len(operations) > 0 && operations[0].depth < d {
			at = t.on(at, operations[0].site)
			operations = operations[1:]
		}
		for _, l := range []*Level{r.reached[d].code, r.reached[d].tail} {
			if l != nil {
				at = t.on(at, l.Within)
				at = t.on(at, l.Site)
			}
		}
	}
	for _, o := range operations {
		at = t.on(at, o.site)
	}
	return at
}

// on is the path that goes on from a path with a site.
func (t *Trace) on(from Back, s *Site) Back {
	if s == nil || t.nodes[from].site == s {
		return from
	}
	if t.nodes[from].last.site != s {
		t.turn(from, s)
	}
	return t.nodes[from].last.to
}

// operating is the innermost operation of a run that does not keep its path.
func (t *Trace) operating() *Site {
	if n := len(t.operations); n > 0 {
		return t.operations[n-1].site
	}
	return nil
}
