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

// A positive type with one constructor whose rules can be put wrong one at a
// time: (Tag A), (tag a), (untag C t (a c)), an elimination into a type C.

type tagRules struct {
	hcomp  func(run *value.Run, t *tagType, base value.Value, walls value.System) value.Value
	transp func(run *value.Run, t *tagType, i value.Name, phi interval.Face, v value.Value) value.Value
	// commute is the elimination of a composite.
	commute func(run *value.Run, e *untag, c *tagBox) value.Value
	same    func(c value.Comparer, t *tagType, x, y *tagBox) bool
}

type tagType struct {
	of    value.Value
	rules *tagRules
}
type tag struct{ a value.Value }
type tagBox struct {
	t     *tagType
	base  value.Value
	walls value.System
}

func formal(_ *value.Run, t *tagType, base value.Value, walls value.System) value.Value {
	return &tagBox{t, base, walls}
}

// pushed pushes the constructor through base and walls, where all of them show it.
func pushed(run *value.Run, t *tagType, base value.Value, walls value.System) (value.Value, bool) {
	b, ok := run.Force(base).(*tag)
	if !ok {
		return nil, false
	}
	us := make(value.System, len(walls))
	for k, w := range walls {
		u, ok := run.Force(w.Body).(*tag)
		if !ok {
			return nil, false
		}
		us[k] = value.Wall{Cube: w.Cube, I: w.I, Body: u.a}
	}
	return &tag{prims.LaterHcomp(run, t.of, b.a, us)}, true
}

func strict(run *value.Run, t *tagType, base value.Value, walls value.System) value.Value {
	if v, ok := pushed(run, t, base, walls); ok {
		return v
	}
	all := t.Support() | base.Support() | walls.Support()
	return prims.StuckHcomp(t, base, walls, all, all)
}

func rightTag() *tagRules {
	return &tagRules{
		hcomp: formal,
		transp: func(run *value.Run, t *tagType, i value.Name, phi interval.Face, v value.Value) value.Value {
			switch v := run.Force(v).(type) {
			case *tag:
				return &tag{prims.LaterTransp(run, i, t.of, phi, v.a)}
			case *tagBox:
				walls := v.walls.Map(run, t.Support().Without(i)|phi.Support(), interval.Single(i), func(run *value.Run, _ value.Name, u value.Value, cut *value.Subst) value.Value {
					return prims.Transp(run, i, run.Substitute(t, cut), phi.Subst(cut), u)
				})
				return prims.Hcomp(run, run.At(t, i, interval.One()), prims.LaterTransp(run, i, t, phi, v.base), walls)
			case *value.Neutral:
				return v.Eliminate(run, prims.TransportFrame(i, t, phi))
			default:
				run.Fault("transport of %T", v)
				return nil
			}
		},
		commute: func(run *value.Run, e *untag, c *tagBox) value.Value {
			walls := c.walls.Map(run, e.Support(), 0, func(run *value.Run, _ value.Name, u value.Value, cut *value.Subst) value.Value {
				return e.cut(run, cut).Resume(run, u)
			})
			i := run.Fresh(e.Support() | c.Support())
			return prims.Comp(run, i, e.into, e.later(run, c.base), walls)
		},
		same: func(c value.Comparer, t *tagType, x, y *tagBox) bool {
			return prims.SameHcomp(c, t, x.base, x.walls, y.base, y.walls)
		},
	}
}

func (t *tagType) Support() value.Support { return t.of.Support() }
func (t *tagType) Substitute(run *value.Run, s *value.Subst) value.Value {
	return &tagType{run.Substitute(t.of, s), t.rules}
}
func (v *tag) Support() value.Support { return v.a.Support() }
func (v *tag) Substitute(run *value.Run, s *value.Subst) value.Value {
	return &tag{run.Substitute(v.a, s)}
}
func (c *tagBox) Support() value.Support {
	return c.t.Support() | c.base.Support() | c.walls.Support()
}
func (c *tagBox) Substitute(run *value.Run, s *value.Subst) value.Value {
	return prims.Hcomp(run, run.Substitute(c.t, s), run.Substitute(c.base, s), c.walls.Substitute(run, s))
}
func (t *tagType) Hcomp(run *value.Run, base value.Value, walls value.System) value.Value {
	return t.rules.hcomp(run, t, base, walls)
}
func (t *tagType) Transp(run *value.Run, i value.Name, phi interval.Face, v value.Value) value.Value {
	return t.rules.transp(run, t, i, phi, v)
}
func (t *tagType) ReadBack(q value.Quoter) value.Core { return core(tagTypeSig, q.Type(t.of)) }
func (t *tagType) SameType(c value.Comparer, other value.Type) bool {
	o, ok := other.(*tagType)
	return ok && c.EqualTypes("what is tagged", t.of, o.of)
}
func (t *tagType) ReadBackElement(q value.Quoter, v value.Value) value.Core {
	switch v := v.(type) {
	case *tag:
		return core(tagSig, q.Term(t.of, v.a))
	case *tagBox:
		return prims.ReadHcomp(q, t, v.base, v.walls)
	case *value.Neutral:
		return q.Neutral(v)
	}
	q.Run().Fault("%T is no tagged element", v)
	return nil
}
func (t *tagType) SameElement(c value.Comparer, a, b value.Value) bool {
	switch x := a.(type) {
	case *tag:
		y, ok := b.(*tag)
		return ok && c.Terms("what is tagged", t.of, x.a, y.a)
	case *tagBox:
		y, ok := b.(*tagBox)
		return ok && t.rules.same(c, t, x, y)
	case *value.Neutral:
		y, ok := b.(*value.Neutral)
		return ok && c.Neutrals(x, y)
	}
	return false
}

// untag is the elimination, as a frame.
type untag struct {
	into  value.Value
	body  value.Closure
	rules *tagRules
}

func (e *untag) Support() value.Support                    { return e.into.Support() | e.body.Support() }
func (e *untag) Frontier() (frontier, faces value.Support) { return 0, 0 }
func (e *untag) cut(run *value.Run, s *value.Subst) *untag {
	if s == nil {
		return e
	}
	return &untag{run.Substitute(e.into, s), e.body.Substitute(run, s), e.rules}
}
func (e *untag) Relabel(run *value.Run, s *value.Subst) value.Frame { return e.cut(run, s) }
func (e *untag) Resume(run *value.Run, v value.Value) value.Value {
	switch v := run.Force(v).(type) {
	case *tag:
		run.Step()
		return e.body.Apply(run, v.a)
	case *tagBox:
		run.Step()
		return e.rules.commute(run, e, v)
	case *value.Neutral:
		return v.Eliminate(run, e)
	default:
		run.Fault("%T has no tag", v)
		return nil
	}
}
func (e *untag) later(run *value.Run, v value.Value) value.Value {
	return run.Later(e.Support()|v.Support(), func(run *value.Run) value.Value { return e.Resume(run, v) })
}
func (e *untag) Type(*value.Run, value.Value, *value.Neutral) value.Value { return e.into }
func (e *untag) ReadBack(q value.Quoter, head value.Core, t value.Value) value.Core {
	of := q.Run().Force(t).(*tagType).of
	return core(untagSig, head, q.Type(e.into), q.Variable("a", of, func(a value.Value) value.Core { return q.Term(e.into, e.body.Open(q.Run(), a)) }))
}
func (e *untag) Same(c value.Comparer, other value.Frame, t value.Value) bool {
	o, ok := other.(*untag)
	run := c.Run()
	return ok && c.EqualTypes("the type", e.into, o.into) && c.Variable("a", run.Force(t).(*tagType).of, func(a value.Value) bool {
		return c.Terms("the case", e.into, e.body.Open(run, a), o.body.Open(run, a))
	})
}

var (
	tagTypeSig = &term.Signature{Name: "Tag", Word: "Tag", Slots: []term.CoreSlot{plain}}
	tagSig     = &term.Signature{Name: "tag", Word: "tag", Slots: []term.CoreSlot{plain}}
	untagSig   = &term.Signature{Name: "untag", Word: "untag", Slots: []term.CoreSlot{plain, plain, under}}
)

func tagFormer(rules *tagRules) prims.Former {
	return prims.Former{
		Name: "tag", Version: 1,
		Words: []prims.Word{
			{Shape: term.Shape{Word: "Tag", Slots: []term.Slot{{}}}, Infer: func(c value.Checker, w *term.Written) (value.Core, value.Value) {
				a, n := c.Type(w.Parts[0].Body)
				return core(tagTypeSig, a), prims.NewUniverse(n)
			}},
			{Shape: term.Shape{Word: "tag", Slots: []term.Slot{{}}}, Check: func(c value.Checker, w *term.Written, want value.Value) value.Core {
				t, ok := c.Run().Force(want).(*tagType)
				if !ok {
					c.Fail(w, term.IllTyped, "nothing tagged has this type", c.ShowType(want), nil)
				}
				return core(tagSig, c.Check(w.Parts[0].Body, t.of))
			}},
			{Shape: term.Shape{Word: "untag", Slots: []term.Slot{{}, {}, under.Slot}}, Infer: func(c value.Checker, w *term.Written) (value.Core, value.Value) {
				v, t := c.Infer(w.Parts[0].Body)
				tt, ok := c.Run().Force(t).(*tagType)
				if !ok {
					c.Fail(w, term.IllTyped, "this has no tag", nil, nil)
				}
				into, _ := c.Type(w.Parts[1].Body)
				body := c.Variable(w.Parts[2].Binders[0], tt.of, func(value.Value) value.Core { return c.Check(w.Parts[2].Body, c.Value(into)) })
				return core(untagSig, v, into, body), c.Value(into)
			}},
		},
		Operators: []prims.Operator{
			{Sig: tagTypeSig, Op: makes(func(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
				return &tagType{args[0].Delay(run, f), rules}
			})},
			{Sig: tagSig, Op: makes(func(run *value.Run, f eval.Frame, args []eval.Arg) value.Value { return &tag{args[0].Delay(run, f)} })},
			{Sig: untagSig, Op: resumes(func(run *value.Run, f eval.Frame, args []eval.Arg) value.Frame {
				return &untag{args[1].Delay(run, f), args[2].Close(run, f), rules}
			})},
		},
	}
}

// tags is the former as the suite sees it; commutes is what it claims of untag.
func tags(name string, rules *tagRules, commutes bool) kit.Former {
	options := []nbe.Option{nbe.WithFormers(tagFormer(rules))}
	w := wordsOf(options)
	fill := func(text string, pairs ...any) *term.Written { return kit.Fill(w, text, pairs...) }
	return kit.Former{Name: name, Options: options, Types: func(g *kit.Gen) kit.Sample {
		a := kit.Base(g)
		s := kit.Sample{Type: fill("(Tag A)", "A", a.Type)}
		tagged := func(g *kit.Gen) *term.Written { return term.Ann(fill("(tag X)", "X", a.Any(g)), s.Type) }
		s.Element = func(g *kit.Gen) *term.Written {
			switch g.Choose(3) {
			case 1: // a loop, which computes at its ends and as soon as it is known
				if kit.Mentions(s.Type, g.Dimensions()...) {
					return tagged(g)
				}
				x := tagged(g.Over())
				p := g.Over().Variable("p", fill("(Path T X X)", "T", s.Type, "X", x), func(*kit.Gen) *term.Written { return term.Line(x, "_") })
				return term.At(p, g.Dimension())
			case 2:
				return g.Variable("u", s.Type, tagged)
			}
			return tagged(g)
		}
		s.Eliminations = func(g *kit.Gen) []kit.Elimination {
			c := kit.Base(g.Over())
			z := g.Over().Variable("z", c.Type, nil)
			e := kit.Elimination{Name: "untag", Of: func(x *term.Written) *term.Written {
				return fill("(untag X C (a Z))", "X", x, "C", c.Type, "Z", z)
			}}
			if commutes {
				e.Composite = func(box kit.Box, of func(x, at *term.Written) *term.Written) *term.Written {
					return box.Map(c.Type, func(u *term.Written) *term.Written { return of(u, term.Numeral(1)) }).Over(c.Type)
				}
			}
			return []kit.Elimination{e}
		}
		return s
	}}
}
