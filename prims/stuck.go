package prims

import (
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

var (
	hcompSig  = &term.Signature{Name: "hcomp", Word: "hcomp", Slots: []term.CoreSlot{{}, {}, {Slot: wallSlot}}}
	transpSig = &term.Signature{Name: "transp", Word: "transp", Slots: []term.CoreSlot{lineSlot, faceSlot, {}}}

	lineSlot  = term.CoreSlot{Slot: term.Slot{Binds: []term.Sort{term.DimensionSort}}}
	faceSlot  = term.CoreSlot{Slot: term.Slot{Sort: term.FaceSort}}
	boundSlot = term.CoreSlot{Slot: term.Slot{Binds: []term.Sort{term.TermSort}}}
	wallSlot  = term.Slot{Rows: []term.Slot{{Sort: term.FaceSort}, {Binds: []term.Sort{term.DimensionSort}}}}
)

// hcompHead is a composite that cannot compute: its type is neutral, or its
// former waits for something in it.
type hcompHead struct {
	a, base                  value.Value
	walls                    value.System
	frontier, faces, support value.Support
}

// stuckHcomp is the neutral composite. What its former waits for, apart from
// its faces, belongs to its frontier.
func stuckHcomp(a, base value.Value, walls value.System, frontier, faces value.Support) value.Value {
	own := walls.FaceSupport()
	return value.NewNeutral(&hcompHead{a, base, walls, frontier | own, faces | own, a.Support() | base.Support() | walls.Support()})
}

func (h *hcompHead) Support() value.Support                    { return h.support }
func (h *hcompHead) Frontier() (frontier, faces value.Support) { return h.frontier, h.faces }

func (h *hcompHead) Relabel(run *value.Run, s *value.Subst) value.Head {
	return &hcompHead{run.Substitute(h.a, s), run.Substitute(h.base, s), h.walls.Substitute(run, s),
		value.SubstSupport(h.frontier, s), value.SubstSupport(h.faces, s), value.SubstSupport(h.support, s)}
}

func (h *hcompHead) Recompute(run *value.Run, s *value.Subst) value.Value {
	return Hcomp(run, run.Substitute(h.a, s), run.Substitute(h.base, s), h.walls.Substitute(run, s))
}

func (h *hcompHead) Type(*value.Run) value.Value { return h.a }

func (h *hcompHead) ReadBack(q value.Quoter) value.Core {
	return readHcomp(q, h.a, h.base, h.walls)
}

func (h *hcompHead) Same(c value.Comparer, other value.Head) bool {
	o, ok := other.(*hcompHead)
	return ok && c.EqualTypes("the type of the composite", h.a, o.a) &&
		sameHcomp(c, h.a, h.base, h.walls, o.base, o.walls)
}

func readHcomp(q value.Quoter, a, base value.Value, walls value.System) value.Core {
	return &term.Op{Sig: hcompSig, Args: []term.Arg{q.Type(a), q.Term(a, base), q.Walls(a, walls)}}
}

func sameHcomp(c value.Comparer, a, base value.Value, walls value.System, base2 value.Value, walls2 value.System) bool {
	return c.Terms("the base", a, base, base2) && c.Walls(a, walls, walls2)
}

// transpHead is a transport along a neutral line.
type transpHead struct {
	i               value.Name
	a               value.Value // at i
	phi             interval.Face
	v               value.Value
	frontier, faces value.Support
}

func stuckTransp(i value.Name, a *value.Neutral, phi interval.Face, v value.Value) value.Value {
	frontier, faces := a.Frontier()
	own := phi.Support()
	return value.NewNeutral(&transpHead{i, a, phi, v, frontier.Without(i) | own, faces.Without(i) | own})
}

func (h *transpHead) Support() value.Support {
	return h.a.Support().Without(h.i) | h.phi.Support() | h.v.Support()
}
func (h *transpHead) Frontier() (frontier, faces value.Support) { return h.frontier, h.faces }

func (h *transpHead) Relabel(run *value.Run, s *value.Subst) value.Head {
	i, a, phi, v := h.substitute(run, s)
	return &transpHead{i, a, phi, v, value.SubstSupport(h.frontier, s), value.SubstSupport(h.faces, s)}
}

func (h *transpHead) substitute(run *value.Run, s *value.Subst) (value.Name, value.Value, interval.Face, value.Value) {
	phi, v := h.phi.Subst(s), run.Substitute(h.v, s)
	i, under := run.Under(h.i, h.a.Support(), s, phi.Support()|v.Support())
	return i, run.Substitute(h.a, under), phi, v
}

func (h *transpHead) Recompute(run *value.Run, s *value.Subst) value.Value {
	i, a, phi, v := h.substitute(run, s)
	return Transp(run, i, a, phi, v)
}

func (h *transpHead) Type(run *value.Run) value.Value { return run.At(h.a, h.i, interval.One()) }

func (h *transpHead) ReadBack(q value.Quoter) value.Core {
	return readTransp(q, h.i, h.a, h.phi, h.v)
}

func (h *transpHead) Same(c value.Comparer, other value.Head) bool {
	o, ok := other.(*transpHead)
	return ok && sameLine(c, h.i, h.a, o.i, o.a) && sameFace(c, h.phi, o.phi) &&
		c.Terms("what is transported", c.Run().At(h.a, h.i, interval.Zero()), h.v, o.v)
}

func readTransp(q value.Quoter, i value.Name, a value.Value, phi interval.Face, v value.Value) value.Core {
	run := q.Run()
	line := q.Dimension("i", func(k value.Name) value.Core { return q.Type(run.At(a, i, interval.Var(k))) })
	return &term.Op{Sig: transpSig, Args: []term.Arg{line, &term.Face{Face: phi}, q.Term(run.At(a, i, interval.Zero()), v)}}
}

func sameLine(c value.Comparer, i value.Name, a value.Value, j value.Name, b value.Value) bool {
	run := c.Run()
	return c.Dimension("i", func(k value.Name) bool {
		return c.EqualTypes("the line of types", run.At(a, i, interval.Var(k)), run.At(b, j, interval.Var(k)))
	})
}

func sameFace(c value.Comparer, phi, psi interval.Face) bool {
	return phi.Equal(psi) || c.Differ("the face", phi.String(), psi.String())
}
