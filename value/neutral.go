package value

import (
	"example.com/boxwright/nbe/term"
)

// Core is short for the syntax's.
type Core = term.Core

// Neutral is a head that cannot compute under a list of eliminations. It knows
// its frontier: the dimensions which, when they go to an end, may let it
// compute, and the dimensions of the faces in it, whose identification may
// (Sterling and Angiuli, "Normalization for Cubical Type Theory", LICS 2021,
// call the faces where that happens the frontier of instability).
type Neutral struct {
	head                     Head     // of the whole spine
	prev                     *Neutral // nil at the head
	frame                    Frame
	length                   int
	support, frontier, faces Support
}

// Head is what a neutral is stuck on.
type Head interface {
	Support() Support
	// Frontier returns the dimensions that may unstick it at an end, and those of its faces.
	Frontier() (frontier, faces Support)
	// Relabel substitutes where that cannot unstick it.
	Relabel(run *Run, s *Subst) Head
	// Recompute substitutes and tries again.
	Recompute(run *Run, s *Subst) Value
	// Type is its type.
	Type(run *Run) Value
	// ReadBack reads it back.
	ReadBack(q Quoter) Core
	// Same compares it with another head.
	Same(c Comparer, other Head) bool
}

// Frame is an elimination that waits on a neutral.
type Frame interface {
	Support() Support
	Frontier() (frontier, faces Support)
	// Relabel substitutes in what the elimination holds.
	Relabel(run *Run, s *Subst) Frame
	// Resume eliminates a new head, forced or not.
	Resume(run *Run, head Value) Value
	// Type is the type of the elimination of n, which has type t.
	Type(run *Run, t Value, n *Neutral) Value
	// ReadBack reads back the elimination of head, which has type t.
	ReadBack(q Quoter, head Core, t Value) Core
	// Same compares it with another elimination of an equal head of type t.
	Same(c Comparer, other Frame, t Value) bool
}

// NewNeutral is a head without eliminations.
func NewNeutral(h Head) *Neutral {
	frontier, faces := h.Frontier()
	return &Neutral{head: h, support: h.Support(), frontier: frontier, faces: faces}
}

// Eliminate is n under one more elimination.
func (n *Neutral) Eliminate(run *Run, f Frame) *Neutral {
	run.Charge(PriceNode)
	frontier, faces := f.Frontier()
	out := &Neutral{head: n.head, prev: n, frame: f, length: n.length + 1, support: n.support | f.Support(), frontier: n.frontier | frontier, faces: n.faces | faces}
	if run.Traced() {
		run.Stuck(out)
	}
	return out
}

// Head is the head of the spine.
func (n *Neutral) Head() Head { return n.head }

// Split returns the last elimination and what it eliminates; nil and nil at the head.
func (n *Neutral) Split() (*Neutral, Frame) { return n.prev, n.frame }

// Length is the number of eliminations.
func (n *Neutral) Length() int { return n.length }

// Frames returns the eliminations, innermost first.
func (n *Neutral) Frames() []Frame {
	out := make([]Frame, n.length)
	for ; n.prev != nil; n = n.prev {
		out[n.length-1] = n.frame
	}
	return out
}

// Prefixes returns the neutral after each number of eliminations, the head first.
func (n *Neutral) Prefixes() []*Neutral {
	out := make([]*Neutral, n.length+1)
	for ; ; n = n.prev {
		out[n.length] = n
		if n.prev == nil {
			return out
		}
	}
}

// Support over-approximates the dimensions free in the neutral.
func (n *Neutral) Support() Support { return n.support }

// Frontier returns the dimensions that may unstick it, and those of its faces.
func (n *Neutral) Frontier() (frontier, faces Support) { return n.frontier, n.faces }

// Substitute relabels where the frontier allows it, and computes again otherwise.
func (n *Neutral) Substitute(run *Run, s *Subst) Value {
	if !run.Plain.NoFrontier && s.Skippable(n.frontier, n.faces, n.support) {
		run.Relabelled++
		return n.relabel(run, s)
	}
	if run.Traced() && run.trace.stuck != nil {
		return n.recomputeTraced(run, s)
	}
	// The deepest part of the spine that stays stuck is found by going through
	// it from the head: each elimination is resumed on what came before.
	var v Value = n.head.Recompute(run, s)
	for _, f := range n.Frames() {
		v = f.Relabel(run, s).Resume(run, v)
	}
	return v
}

func (n *Neutral) relabel(run *Run, s *Subst) *Neutral {
	if n.support&s.Domain() == 0 && !run.Plain.NoSupport {
		return n
	}
	out := NewNeutral(n.head.Relabel(run, s))
	for _, f := range n.Frames() {
		out = out.Eliminate(run, f.Relabel(run, s))
	}
	if run.Traced() {
		run.sameStuck(out, n)
	}
	return out
}

// TypeOf is the type of a neutral, found from its head along its spine.
func TypeOf(run *Run, n *Neutral) Value {
	t := n.head.Type(run)
	if n.prev == nil {
		return t
	}
	for _, p := range n.Prefixes()[1:] {
		t = p.frame.Type(run, t, p.prev)
	}
	return t
}
