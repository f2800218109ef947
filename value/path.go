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

// node is a path while the trace lasts.
type node struct {
	site, owner  *Site // its last site, and the definition or term it stands in
	counts       Counts
	below        Counts // what was done below it and is not counted at paths below it
	parent       Back
	depth        int32
	last, second link
	next         []link
}

// link leads on from a path; to is further up where recursion is folded.
type link struct {
	site *Site
	to   Back
}

// fold says that a folded path was entered, and from where.
type fold struct{ to, from Back }

//go:noinline
func (t *Trace) enter(from Back, s *Site) {
	if s == nil {
		return
	}
	n := &t.nodes[from]
	if n.last.site != s {
		n = t.turn(from, s)
	}
	to := n.last.to
	n = &t.nodes[to]
	n.counts.Entered++
	n.counts.Steps -= t.run.Steps
	n.counts.Memory -= t.run.Memory
	t.at = to
	if n.parent != from {
		t.fold(to, from, t.run.Steps)
	}
}

// call is enter for the code of a function, with the β-step that was taken just before.
//
//go:noinline
func (t *Trace) call(from Back, s *Site) {
	steps := t.run.Steps
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
	n.counts.Entered++
	n.counts.Steps -= steps
	n.counts.Memory -= t.run.Memory
	t.at = to
	if n.parent != from {
		t.fold(to, from, steps)
	}
}

//go:noinline
func (t *Trace) leave(back Back) {
	if t.light {
		t.operations = t.operations[:len(t.operations)-1]
		return
	}
	t.up(back, t.run.Steps)
}

// up leaves what was entered since the run was at back, which after tail calls is
// more than one path.
func (t *Trace) up(back Back, steps int64) {
	at := t.at
	for at != back {
		n := &t.nodes[at]
		n.counts.Steps += steps
		n.counts.Memory += t.run.Memory
		if k := len(t.folds); k > 0 && t.folds[k-1].to == at {
			from := t.folds[k-1].from
			t.unfold(at, from, steps)
			at = from
		} else {
			at = n.parent
		}
	}
	t.at = back
}

// tail enters a site by a tail call from what was entered since back. Where that
// leads to a path which is there already, the run goes back to it instead of
// keeping all that a loop goes through.
//
//go:noinline
func (t *Trace) tail(back Back, s *Site, steps int64) {
	from := t.at
	n := &t.nodes[from]
	if n.site == s || s == nil {
		return
	}
	if n.last.site != s {
		n = t.turn(from, s)
	}
	to := n.last.to
	n = &t.nodes[to]
	n.counts.Entered++
	if n.parent != from && t.among(to, back) {
		t.up(to, steps)
		return
	}
	n.counts.Steps -= steps
	n.counts.Memory -= t.run.Memory
	t.at = to
	if n.parent != from {
		t.fold(to, from, steps)
	}
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
	t.folded(to, from, -steps, -t.run.Memory)
	t.folds = append(t.folds, fold{to, from})
}

func (t *Trace) unfold(to, from Back, steps int64) {
	t.folded(to, from, steps, t.run.Memory)
	t.folds = t.folds[:len(t.folds)-1]
}

func (t *Trace) folded(to, from Back, steps, memory int64) {
	b := &t.nodes[from].below
	b.Steps += steps
	b.Memory += memory
	b = &t.nodes[t.nodes[to].parent].below
	b.Steps -= steps
	b.Memory -= memory
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
		p := &Path{Site: n.site, Counts: n.counts}
		out[int(root)+k] = p
		p.Counts.Steps -= n.below.Steps
		p.Counts.Memory -= n.below.Memory
		if n.parent == 0 {
			continue
		}
		p.Parent = out[n.parent] // parents come first
		p.Parent.next = append(p.Parent.next, p)
		p.Parent.Counts.Steps -= n.counts.Steps
		p.Parent.Counts.Memory -= n.counts.Memory
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
