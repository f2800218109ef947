package kit_test

import (
	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/kit"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Paths whose rules can be put wrong one at a time: (Rope A a b), (rope (j u)),
// (reach p r).

type ropeRules struct {
	ends  int // how many of the two ends a neutral rope has
	walls int // how many of them a composite and a transport hold fast
}

func rightRope() *ropeRules { return &ropeRules{2, 2} }

type ropeType struct {
	of    value.Value
	ends  [2]value.Value
	rules *ropeRules
}
type rope struct{ line value.Closure }

func (t *ropeType) Support() value.Support {
	return t.of.Support() | t.ends[0].Support() | t.ends[1].Support()
}
func (t *ropeType) Substitute(run *value.Run, s *value.Subst) value.Value {
	return &ropeType{run.Substitute(t.of, s), [2]value.Value{run.Substitute(t.ends[0], s), run.Substitute(t.ends[1], s)}, t.rules}
}
func (p *rope) Support() value.Support { return p.line.Support() }
func (p *rope) Substitute(run *value.Run, s *value.Subst) value.Value {
	return &rope{p.line.Substitute(run, s)}
}

func reach(run *value.Run, p value.Value, r interval.Dim) value.Value {
	switch p := run.Force(p).(type) {
	case *rope:
		run.Step()
		return p.line.Apply(run, value.DimensionOf(r))
	case *value.Neutral:
		t := run.Force(value.TypeOf(run, p)).(*ropeType)
		if r.IsZero() && t.rules.ends > 0 {
			return t.ends[0]
		}
		if r.IsOne() && t.rules.ends > 1 {
			return t.ends[1]
		}
		return p.Eliminate(run, ropeFrame{r})
	default:
		run.Fault("%T is no rope", p)
		return nil
	}
}

func laterReach(run *value.Run, p value.Value, r interval.Dim) value.Value {
	return run.Later(p.Support()|r.Support(), func(run *value.Run) value.Value { return reach(run, p, r) })
}

func (t *ropeType) Hcomp(run *value.Run, p value.Value, walls value.System) value.Value {
	j := run.Fresh(t.Support() | p.Support() | walls.Support())
	us := walls.Map(run, interval.Single(j), 0, func(run *value.Run, _ value.Name, u value.Value, _ *value.Subst) value.Value {
		return reach(run, u, interval.Var(j))
	})
	for k, face := range []interval.Face{interval.Eq0(j), interval.Eq1(j)}[:t.rules.walls] {
		us = us.Constant(run, face, t.ends[k])
	}
	return &rope{&value.Line{I: j, Body: prims.LaterHcomp(run, t.of, laterReach(run, p, interval.Var(j)), us), Name: "j"}}
}

func (t *ropeType) Transp(run *value.Run, i value.Name, phi interval.Face, p value.Value) value.Value {
	j := run.Fresh(t.Support() | p.Support() | phi.Support() | interval.Single(i))
	pj := laterReach(run, p, interval.Var(j))
	us := value.System(nil).Constant(run, phi, pj)
	for k, face := range []interval.Face{interval.Eq0(j), interval.Eq1(j)}[:t.rules.walls] {
		us = us.Line(run, face, i, t.ends[k])
	}
	return &rope{&value.Line{I: j, Body: prims.LaterComp(run, i, t.of, pj, us), Name: "j"}}
}

func (t *ropeType) ReadBack(q value.Quoter) value.Core {
	return core(ropeTypeSig, q.Type(t.of), q.Term(t.of, t.ends[0]), q.Term(t.of, t.ends[1]))
}
func (t *ropeType) SameType(c value.Comparer, other value.Type) bool {
	o, ok := other.(*ropeType)
	return ok && c.EqualTypes("the type", t.of, o.of) && c.Terms("the end at 0", t.of, t.ends[0], o.ends[0]) && c.Terms("the end at 1", t.of, t.ends[1], o.ends[1])
}
func (t *ropeType) ReadBackElement(q value.Quoter, p value.Value) value.Core {
	return core(ropeSig, q.Dimension("j", func(j value.Name) value.Core { return q.Term(t.of, laterReach(q.Run(), p, interval.Var(j))) }))
}
func (t *ropeType) SameElement(c value.Comparer, a, b value.Value) bool {
	return c.Dimension("j", func(j value.Name) bool {
		return c.Terms("a point", t.of, laterReach(c.Run(), a, interval.Var(j)), laterReach(c.Run(), b, interval.Var(j)))
	})
}

type ropeFrame struct{ r interval.Dim }

func (f ropeFrame) Support() value.Support                           { return f.r.Support() }
func (f ropeFrame) Frontier() (frontier, faces value.Support)        { return f.r.Support(), 0 }
func (f ropeFrame) Relabel(_ *value.Run, s *value.Subst) value.Frame { return ropeFrame{f.r.Subst(s)} }
func (f ropeFrame) Resume(run *value.Run, p value.Value) value.Value { return reach(run, p, f.r) }
func (f ropeFrame) Type(run *value.Run, t value.Value, _ *value.Neutral) value.Value {
	return run.Force(t).(*ropeType).of
}
func (f ropeFrame) ReadBack(_ value.Quoter, p value.Core, _ value.Value) value.Core {
	return core(reachSig, p, term.Dimension{Dim: f.r})
}
func (f ropeFrame) Same(_ value.Comparer, other value.Frame, _ value.Value) bool {
	o, ok := other.(ropeFrame)
	return ok && o.r.Equal(f.r)
}

var (
	overDim     = term.Slot{Binds: []term.Sort{term.DimensionSort}}
	aDim        = term.Slot{Sort: term.DimensionSort}
	ropeTypeSig = &term.Signature{Name: "Rope", Word: "Rope", Slots: []term.CoreSlot{plain, plain, plain}}
	ropeSig     = &term.Signature{Name: "rope", Word: "rope", Slots: []term.CoreSlot{{Slot: overDim}}}
	reachSig    = &term.Signature{Name: "reach", Word: "reach", Slots: []term.CoreSlot{plain, {Slot: aDim}}}
)

func ropeFormer(rules *ropeRules) prims.Former {
	return prims.Former{
		Name: "rope", Version: 1,
		Words: []prims.Word{
			{Shape: term.Shape{Word: "Rope", Slots: []term.Slot{{}, {}, {}}}, Infer: func(c value.Checker, w *term.Written) (value.Core, value.Value) {
				a, n := c.Type(w.Parts[0].Body)
				t := c.Value(a)
				return core(ropeTypeSig, a, c.Check(w.Parts[1].Body, t), c.Check(w.Parts[2].Body, t)), prims.NewUniverse(n)
			}},
			{Shape: term.Shape{Word: "rope", Slots: []term.Slot{overDim}}, Check: func(c value.Checker, w *term.Written, want value.Value) value.Core {
				t, ok := c.Run().Force(want).(*ropeType)
				if !ok {
					c.Fail(w, term.IllTyped, "no rope has this type", c.ShowType(want), nil)
				}
				body := c.Dimensioned(w.Parts[0].Binders[0], func(value.Name) value.Core { return c.Check(w.Parts[0].Body, t.of) })
				line := c.Case(body, overDim.Binds)
				for k, end := range []*value.Dimension{value.Zero(), value.One()} {
					c.Same(t.of, t.ends[k], line.OpenAll(c.Run(), []value.Value{end}), &term.Error{Kind: term.Disagreement, Place: w.Place, Message: "the rope ends elsewhere"})
				}
				return core(ropeSig, body)
			}},
			{Shape: term.Shape{Word: "reach", Slots: []term.Slot{{}, aDim}}, Infer: func(c value.Checker, w *term.Written) (value.Core, value.Value) {
				p, t := c.Infer(w.Parts[0].Body)
				rt, ok := c.Run().Force(t).(*ropeType)
				if !ok {
					c.Fail(w, term.IllTyped, "this is no rope", nil, nil)
				}
				return core(reachSig, p, term.Dimension{Dim: c.Dimension(w.Parts[1].Body)}), rt.of
			}},
		},
		Operators: []prims.Operator{
			{Sig: ropeTypeSig, Op: makes(func(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
				return &ropeType{args[0].Delay(run, f), [2]value.Value{args[1].Delay(run, f), args[2].Delay(run, f)}, rules}
			})},
			{Sig: ropeSig, Op: makes(func(run *value.Run, f eval.Frame, args []eval.Arg) value.Value { return &rope{args[0].Close(run, f)} })},
			{Sig: reachSig, Op: resumes(func(_ *value.Run, f eval.Frame, args []eval.Arg) value.Frame { return ropeFrame{args[1].Dimension(f)} })},
		},
	}
}

// ropes is the former as the suite sees it.
func ropes(name string, rules *ropeRules) kit.Former {
	options := []nbe.Option{nbe.WithFormers(ropeFormer(rules))}
	w := wordsOf(options)
	fill := func(text string, pairs ...any) *term.Written { return kit.Fill(w, text, pairs...) }
	return kit.Former{Name: name, Options: options, Types: func(g *kit.Gen) kit.Sample {
		a := kit.Base(g)
		x := a.Any(g)
		y := x
		if g.Choose(2) == 1 {
			y = a.Any(g)
		}
		s := kit.Sample{Type: fill("(Rope A X Y)", "A", a.Type, "X", x, "Y", y)}
		s.Element = func(g *kit.Gen) *term.Written { return g.Variable("p", s.Type, nil) }
		s.Expand = func(p *term.Written) *term.Written { return fill("(rope (z (reach P z)))", "P", p) }
		s.Eliminations = func(g *kit.Gen) []kit.Elimination {
			d := term.Name(g.Dimensions()[0])
			return []kit.Elimination{{Name: "reach", Of: func(p *term.Written) *term.Written {
				return term.Form("reach", term.Plain(p), term.Plain(d))
			}}}
		}
		return s
	}}
}
