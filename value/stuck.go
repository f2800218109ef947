package value

// Where computing got stuck: the definition or term in which each elimination
// that waits on a neutral stands. A run keeps that only where somebody is going
// to ask, and reading back carries it over to the terms that it makes.

// stuckAt is what a trace keeps of neutrals and of what they are read back to.
type stuckAt struct {
	values map[*Neutral]*Site
	terms  map[Core]*Site
}

// KeepStuck makes the trace keep where eliminations and Kan operations got stuck.
func (t *Trace) KeepStuck() {
	t.stuck = &stuckAt{map[*Neutral]*Site{}, map[Core]*Site{}}
}

// StuckAt is the site at which the operation of a term that was read back got
// stuck, nil if that is not known.
func (t *Trace) StuckAt(c Core) *Site { return t.stuck.terms[c] }

// Stuck notes that n got stuck here. Only a run that is traced may call it.
func (r *Run) Stuck(n *Neutral) {
	if t := r.trace; t.stuck != nil {
		t.stuck.values[n] = t.nodes[t.at].owner
	}
}

// ReadStuck notes that n is read back as c. Only a run that is traced may call it.
func (r *Run) ReadStuck(n *Neutral, c Core) {
	if t := r.trace; t.stuck != nil {
		if s := t.stuck.values[n]; s != nil {
			t.stuck.terms[c] = s
		}
	}
}

// sameStuck notes that n got stuck where old did, of which it is a copy.
func (r *Run) sameStuck(n, old *Neutral) {
	t := r.trace
	if t.stuck == nil {
		return
	}
	for ; n != nil && old != nil; n, old = n.prev, old.prev {
		t.stuck.values[n] = t.stuck.values[old]
	}
}

// recomputeTraced computes again, each elimination where it got stuck before.
func (n *Neutral) recomputeTraced(run *Run, s *Subst) Value {
	var v Value
	for k, p := range n.Prefixes() {
		back := run.Resume(run.trace.stuck.values[p])
		if k == 0 {
			v = n.head.Recompute(run, s)
		} else {
			v = p.frame.Relabel(run, s).Resume(run, v)
		}
		run.Out(back)
	}
	return v
}
