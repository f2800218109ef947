package prims

import (
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Transp of a Glue type from a part of it to another, which is what a composite
// of types, and ua, make of a transport (CCHM 6.2). Where one part holds at 0,
// with (T, e), another at 1, with (T', e'), and none throughout, the rule is
//
//	transp (i. Glue A [(i=0) ↦ (T,e)] [(i=1) ↦ (T',e')]) bot u0 = hcomp T' (e'.2 a1).1.1 []
//	    a1 = hcomp A(1) (transp (i.A) bot (e.1 u0)) []
//
// In an n-fold composite A is such a type again. At a data type whose composites
// look at their base, which is there in any case, the types are gone through by
// a loop, u0 on its way in and the results on their way out, so that n of them
// do not nest.

// across returns the parts that hold at i = 0 and at i = 1, if there are such and
// the type is one to go through by a loop. A run that keeps no results takes the
// general rule.
func (g *GlueType) across(run *value.Run, i value.Name, psi interval.Face) (from, to *GluePart, ok bool) {
	if !psi.IsBot() || run.Plain.NoSharing {
		return nil, nil, false
	}
	for k := range g.Parts {
		p := &g.Parts[k]
		one, mentions := p.Cube.Get(i)
		switch {
		case !mentions:
			return nil, nil, false
		case p.Cube.Len() > 1:
		case one && to == nil:
			to = p
		case !one && from == nil:
			from = p
		}
	}
	return from, to, from != nil && to != nil && looksAtBase(run, to.T)
}

// looksAtBase reports whether composites at t evaluate their base.
func looksAtBase(run *value.Run, t value.Value) bool {
	d, ok := run.Force(t).(*DataType)
	return ok && !d.Data.Formal
}

type acrossLevel struct {
	from, to *GluePart
	event    *value.Event // of the transport, nil where nobody follows it and for the first
}

func transpAcross(run *value.Run, i value.Name, g *GlueType, from, to *GluePart, u0 value.Value) value.Value {
	few := [4]acrossLevel{{from: from, to: to}}
	levels := few[:1]
	a := run.Force(g.A)
	for {
		inner, ok := a.(*GlueType)
		if !ok {
			break
		}
		from, to, ok := inner.across(run, i, interval.Bot())
		if !ok {
			break
		}
		run.Charge(value.PriceSlot)
		l := acrossLevel{from: from, to: to}
		if run.Followed() {
			l.event = acrossFollowed(run, i, inner)
		}
		levels = append(levels, l)
		run.Transport(inner)
		a = run.Force(inner.A)
	}
	now := looksAtBase(run, a)
	v := u0
	for _, l := range levels {
		e, u := l.from.E, v
		var event *value.Event
		if run.Followed() {
			event = beginUnglue(run, v)
		}
		run.Take(value.StepUnglue)
		if now {
			v = run.Force(mapped(run, e, u))
		} else {
			v = mapAlong(run, e, u)
		}
		run.Ends(event, v)
	}
	end := run.At(a, i, interval.One())
	v = Transp(run, i, a, interval.Bot(), v)
	for k := len(levels) - 1; ; k-- {
		to := levels[k].to
		a1 := run.Force(Hcomp(run, end, v, nil))
		v = Hcomp(run, to.T, center(run, to.E, a1), nil)
		run.Ends(levels[k].event, v)
		if k == 0 {
			return v
		}
		v, end = run.Force(v), to.T
	}
}
