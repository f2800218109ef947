package value

// The tree of paths of a trace. Paths are numbered and stand in one list, so that
// entering and leaving one stores no pointer.

// Path is one path of a trace that has ended: its last site, what was counted
// there and not below, and the paths that go on from it.
type Path struct {
	Site   *Site
	Counts Counts
	Parent *Path // nil at the root
	next   []*Path
}

// Below yields the paths that go on from p, in the order they were first taken.
func (p *Path) Below(yield func(*Path) bool) {
	for _, q := range p.next {
		if !yield(q) {
			return
		}
	}
}

// Back is where a run was before it entered a site, for Out and Left; 0 is what
// a run has that nobody watches.
type Back int32

// root is the number of the path of no sites.
const root Back = 1

// node is a path while the trace lasts. What entering and leaving look at stands
// first, in one line of the processor's cache.
type node struct {
	site                   *Site // its last site
	last                   link  // the way on that was taken last
	parent                 Back
	depth                  int32
	entered, steps, memory int64

	second                link // the way on that was taken last but one
	owner                 *Site
	pushed, forced, nanos int64
	// what was done below it and is not counted at paths below it
	stepsBelow, memoryBelow int64
	next                    []link
}

// link leads on from a path; to is further up where recursion is folded.
type link struct {
	site *Site
	to   Back
}

// fold says that a folded path was entered, and from where.
type fold struct{ to, from Back }

// call is Run.In for the code of a function, with the β-step that was taken just before.
//
//go:noinline
func (t *Trace) call(r *Run, from Back, s *Site) {
	steps := r.Steps
	if t.called == steps {
		steps--
	}
	t.called = -1
	n := &t.nodes[from]
	if n.site == s || s == nil {
		return
	}
	if n.last.site != s {
		n = t.turn(from, s)
	}
	to := n.last.to
	n = &t.nodes[to]
	n.entered++
	n.steps -= steps
	n.memory -= r.Memory
	t.at = to
	if n.parent != from {
		t.fold(to, from, steps)
	}
}

// tail enters a site by a tail call from what was entered since back, 0 where
// nothing was, and returns what to go back to. Where that leads to a path which is
// there already, the run goes back to it instead of keeping all that a loop goes
// through.
//
//go:noinline
func (t *Trace) tail(r *Run, back Back, s *Site, steps int64) Back {
	from := t.at
	if back == 0 {
		back = from
	}
	n := &t.nodes[from]
	if n.site == s || s == nil {
		return back
	}
	if n.last.site != s {
		n = t.turn(from, s)
	}
	to := n.last.to
	n = &t.nodes[to]
	n.entered++
	if n.parent != from {
		if t.among(to, back) {
			t.up(to, steps)
			return back
		}
		t.fold(to, from, steps)
	}
	n.steps -= steps
	n.memory -= r.Memory
	t.at = to
	return back
}

//go:noinline
func (t *Trace) leave(r *Run, back Back) {
	at := t.at
	n := &t.nodes[at]
	if n.parent == back && t.folded != at {
		n.steps += r.Steps
		n.memory += r.Memory
		t.at = back
	} else if t.light {
		t.operations = t.operations[:len(t.operations)-1]
	} else {
		t.up(back, r.Steps)
	}
}

// up leaves what was entered since the run was at back, which after tail calls is
// more than one path.
func (t *Trace) up(back Back, steps int64) {
	at := t.at
	for at != back {
		n := &t.nodes[at]
		n.steps += steps
		n.memory += t.run.Memory
		if t.folded == at {
			at = t.unfold(steps)
		} else {
			at = n.parent
		}
	}
	t.at = back
}

// among reports whether a path is one of those from where the run is up to back.
func (t *Trace) among(p, back Back) bool {
	k := len(t.folds)
	for at := t.at; at != p; {
		switch {
		case at == back:
			return false
		case k > 0 && t.folds[k-1].to == at:
			k--
			at = t.folds[k].from
		default:
			at = t.nodes[at].parent
		}
	}
	return true
}

// fold notes that from goes on in a path that is not below it: what is done
// there until unfold counts as below from and not as below the path's parent.
//
//go:noinline
func (t *Trace) fold(to, from Back, steps int64) {
	t.move(to, from, -steps, -t.run.Memory)
	t.folds = append(t.folds, fold{to, from})
	t.folded = to
}

// unfold leaves the last path that was folded, and returns where it was entered from.
func (t *Trace) unfold(steps int64) Back {
	last := len(t.folds) - 1
	f := t.folds[last]
	t.move(f.to, f.from, steps, t.run.Memory)
	t.folds, t.folded = t.folds[:last], 0
	if last > 0 {
		t.folded = t.folds[last-1].to
	}
	return f.from
}

func (t *Trace) move(to, from Back, steps, memory int64) {
	n := &t.nodes[from]
	n.stepsBelow += steps
	n.memoryBelow += memory
	n = &t.nodes[t.nodes[to].parent]
	n.stepsBelow -= steps
	n.memoryBelow -= memory
}

// turn makes the way to s the one that is found first, and the one before the second.
//
//go:noinline
func (t *Trace) turn(from Back, s *Site) *node {
	n := &t.nodes[from]
	if n.second.site == s {
		n.last, n.second = n.second, n.last
		return n
	}
	l := link{s, t.find(from, s)}
	n = &t.nodes[from]
	n.last, n.second = l, n.last
	return n
}

func (t *Trace) find(from Back, s *Site) Back {
	n := &t.nodes[from]
	for _, l := range n.next {
		if l.site == s {
			return l.to
		}
	}
	full := len(t.nodes) > MaxPaths
	if n.depth >= MaxPath || full {
		for p := from; p != root; {
			m := &t.nodes[p]
			if m.site == s && (t.nodes[m.parent].site == n.site || n.depth >= 4*MaxPath) {
				if !full {
					n.next = append(n.next, link{s, p})
				}
				return p
			}
			p = m.parent
		}
	}
	to := Back(len(t.nodes))
	n.next = append(n.next, link{s, to})
	m := node{site: s, owner: n.owner, parent: from, depth: n.depth + 1}
	if s.Kind == SiteDefinition || s.Kind == SiteTerm {
		m.owner = s
	}
	t.nodes = append(t.nodes, m)
	return to
}

// unwind leaves all that the run is in.
func (t *Trace) unwind() {
	t.up(0, t.run.Steps)
}

// tree is the paths as they are handed out, each with what was done there and
// not below; a trace that is not exact has time alone.
func (t *Trace) tree() *Path {
	out := make([]*Path, len(t.nodes))
	for k := range t.nodes[root:] {
		n := &t.nodes[int(root)+k]
		p := &Path{Site: n.site, Counts: Counts{
			Entered: n.entered, Steps: n.steps - n.stepsBelow, Memory: n.memory - n.memoryBelow,
			Pushed: n.pushed, Forced: n.forced, Nanos: n.nanos,
		}}
		out[int(root)+k] = p
		if n.parent == 0 {
			continue
		}
		p.Parent = out[n.parent] // parents come first
		p.Parent.next = append(p.Parent.next, p)
		p.Parent.Counts.Steps -= n.steps
		p.Parent.Counts.Memory -= n.memory
	}
	if !t.Exact {
		for _, p := range out[root:] {
			p.Counts = Counts{Nanos: p.Counts.Nanos}
		}
	}
	return out[root]
}

// operation is the innermost operation of a path, nil if there is none.
func (t *Trace) operation(p Back) *Site {
	for ; p != root; p = t.nodes[p].parent {
		if s := t.nodes[p].site; s.Kind != SiteDefinition && s.Kind != SiteTerm {
			return s
		}
	}
	return nil
}
