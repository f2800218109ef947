package prims

import (
	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// The rules in a run that somebody follows: reported, and then applied by calling
// the rule again, which sees that it has been reported (Run.Report).

// The labels of the built-in formers, in counters and profiles.
var (
	piLabel          = value.NewLabel("functions", term.Place{})
	piDimensionLabel = value.NewLabel("functions of a dimension", term.Place{})
	sigmaLabel       = value.NewLabel("pairs", term.Place{})
	pathLabel        = value.NewLabel("paths", term.Place{})
	unitLabel        = value.NewLabel("Unit", term.Place{})
	universeLabel    = value.NewLabel("universes", term.Place{})
	glueLabel        = value.NewLabel("Glue", term.Place{})
)

// Label is "functions".
func (p *Pi) Label() *value.Label { return piLabel }

// Label is "functions of a dimension".
func (p *PiDimension) Label() *value.Label { return piDimensionLabel }

// Label is "pairs".
func (t *Sigma) Label() *value.Label { return sigmaLabel }

// Label is "paths".
func (t *Path) Label() *value.Label { return pathLabel }

// Label is "universes".
func (u *Universe) Label() *value.Label { return universeLabel }

// Label is "Unit".
func (unitType) Label() *value.Label { return unitLabel }

// Label is "Glue".
func (g *GlueType) Label() *value.Label { return glueLabel }

// Label is the data type's name.
func (t *DataType) Label() *value.Label { return t.Data.label }

func hcompObserved(run *value.Run, t, base value.Value, walls value.System) value.Value {
	former, _ := t.(value.Type)
	back := run.InHcomp(former)
	var e *value.Event
	if run.Followed() {
		e = run.Begins(value.StepHcomp, "hcomp at "+run.FormerName(former), func(s *value.Sketch) *term.Written {
			return term.Hcomp(s.Value(t), s.Value(base), s.Walls(walls)...)
		})
	}
	run.Report()
	v := Hcomp(run, t, base, walls)
	if n, ok := v.(*value.Neutral); ok && n.Length() == 0 {
		run.Stuck(n)
	}
	run.Ends(e, v)
	run.Out(back)
	return v
}

func transpObserved(run *value.Run, i value.Name, t value.Value, phi interval.Face, v value.Value) value.Value {
	former, _ := t.(value.Type)
	back := run.InTransp(former)
	var e *value.Event
	if run.Followed() {
		e = transpBegins(run, i, t, phi, v)
	}
	run.Report()
	w := Transp(run, i, t, phi, v)
	if n, ok := w.(*value.Neutral); ok && n.Length() == 0 {
		run.Stuck(n)
	}
	run.Ends(e, w)
	run.Out(back)
	return w
}

func transpBegins(run *value.Run, i value.Name, t value.Value, phi interval.Face, v value.Value) *value.Event {
	former, _ := t.(value.Type)
	return run.Begins(value.StepTransp, "transp at "+run.FormerName(former), func(s *value.Sketch) *term.Written {
		return term.Transp(interval.Var(i).String(), s.Value(t), s.Face(phi), s.Value(v))
	})
}

// alongFollowed is the map of the equivalence along the line i.L.
func alongFollowed(run *value.Run, i value.Name, l, x value.Value) value.Value {
	e := run.Begins(value.StepApply, value.StepApply.String(), func(s *value.Sketch) *term.Written {
		return term.Apply(term.Name("…"), s.Value(x))
	})
	return run.Ends(e, alongLineAt(run, i, l, x))
}

// followed eliminates v, which is forced, and reports that.
func (e *Eliminator) followed(run *value.Run, v value.Value) value.Value {
	back := run.InElimination(e.data.label)
	var event *value.Event
	if _, stuck := v.(*value.Neutral); !stuck {
		event = run.Begins(value.StepEliminate, "elim "+e.data.Name, func(s *value.Sketch) *term.Written {
			return (&elimFrame{e}).SketchOn(s, s.Value(v))
		})
	}
	run.Report()
	w := run.Ends(event, e.Eliminate(run, v))
	run.Out(back)
	return w
}

func betaFollowed(run *value.Run, f *Lam, x value.Value) value.Value {
	e := run.Begins(value.StepApply, value.StepApply.String(), func(s *value.Sketch) *term.Written {
		return term.Apply(s.Value(f), s.Value(x))
	})
	return run.Ends(e, f.Body.Apply(run, x))
}

func atFollowed(run *value.Run, p *PathLam, r interval.Dim) value.Value {
	e := run.Begins(value.StepAt, value.StepAt.String(), func(s *value.Sketch) *term.Written {
		return term.At(s.Value(p), s.Dimension(r))
	})
	return run.Ends(e, p.at(run, r))
}

func projectFollowed(run *value.Run, p *Pair, f *projection, v value.Value) value.Value {
	e := run.Begins(value.StepProject, value.StepProject.String(), func(s *value.Sketch) *term.Written {
		return f.SketchOn(s, s.Value(p))
	})
	return run.Ends(e, v)
}

// beginUnglue reports that v is unglued.
func beginUnglue(run *value.Run, v value.Value) *value.Event {
	return run.Begins(value.StepUnglue, value.StepUnglue.String(), func(s *value.Sketch) *term.Written {
		return term.Unglue(s.Value(v))
	})
}

func unglueFollowed(run *value.Run, g *GlueElement) value.Value {
	return run.Ends(beginUnglue(run, g), g.Base)
}

func unglueFaceFollowed(run *value.Run, equivalence, b value.Value) value.Value {
	e := beginUnglue(run, b)
	return run.Ends(e, mapped(run, equivalence, b))
}

// acrossFollowed reports the transport along g in a nest of Glue types, whose
// argument is made when all have been gone through.
func acrossFollowed(run *value.Run, i value.Name, g *GlueType) *value.Event {
	return run.Begins(value.StepTransp, "transp at "+g.Label().Name, func(s *value.Sketch) *term.Written {
		return term.Transp(interval.Var(i).String(), s.Value(g), term.Bot(), term.Name("…"))
	})
}

func boundaryFollowed(run *value.Run, c *Con, v value.Value) value.Value {
	e := run.Begins(value.StepBoundary, value.StepBoundary.String(), func(s *value.Sketch) *term.Written {
		return s.Value(c)
	})
	return run.Ends(e, v)
}

// matchFollowed is an elimination of v of which only the case that it takes has
// been made.
func matchFollowed(run *value.Run, l *value.Label, v value.Value, body *eval.Arg, env eval.Frame) value.Value {
	back := run.InElimination(l)
	c, _, _ := shown(run, v, new([1]value.Value))
	e := run.Begins(value.StepEliminate, "elim "+c.Data.Name, func(s *value.Sketch) *term.Written {
		var names []string
		for _, name := range body.Hints() {
			names = append(names, hint(name, "_"))
		}
		return term.Elim("_", term.Name("…"), s.Value(v), term.Case(c.Name, term.Name("…"), names...))
	})
	run.Take(value.StepEliminate)
	return run.Left(back, run.Ends(e, body.Enter(run, env)))
}
