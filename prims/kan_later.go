package prims

import (
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Composites and transports that wait. Where ends are put into one, so that a wall
// of it holds or nothing moves, the rule for that (CHM 2) comes before the work:
//
//	hcomp A u0 [… top ↦ i.u] = u(1)      transp (i.A) top v = v

// laterComposite is hcomp, if straight, or comp along the line i.a.
type laterComposite struct {
	value.Pending
	straight bool
	i        value.Name
	a, base  value.Value
	walls    value.System
}

// Do composes.
func (w *laterComposite) Do(run *value.Run) value.Value {
	if w.straight {
		return Hcomp(run, w.a, w.base, w.walls)
	}
	return Comp(run, w.i, w.a, w.base, w.walls)
}

// EndAt is the end of a wall that holds.
func (w *laterComposite) EndAt(run *value.Run, s *value.Subst) (value.Value, bool) {
	for k := range w.walls {
		wall := &w.walls[k]
		if s.Ends()&wall.Cube.Support() != 0 && wall.Cube.Subst(s).IsTop() {
			return run.Substitute(wall.End(run), s), true
		}
	}
	return nil, false
}

// laterTransp is transp along the line i.a.
type laterTransp struct {
	value.Pending
	i   value.Name
	a   value.Value
	phi interval.Face
	v   value.Value
}

// Do transports.
func (w *laterTransp) Do(run *value.Run) value.Value { return Transp(run, w.i, w.a, w.phi, w.v) }

// EndAt is what is transported, where nothing moves.
func (w *laterTransp) EndAt(run *value.Run, s *value.Subst) (value.Value, bool) {
	if s.Ends()&w.phi.Support() != 0 && w.phi.Subst(s).IsTop() {
		return run.Substitute(w.v, s), true
	}
	return nil, false
}
