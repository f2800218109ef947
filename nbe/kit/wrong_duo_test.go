package kit_test

import (
	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/kit"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Pairs whose rules can be put wrong one at a time: (Duo A (x B)), (duo a b),
// (left p), (right p).

type duoRules struct {
	hcomp      func(run *value.Run, t *duoType, p value.Value, walls value.System) value.Value
	transp     func(run *value.Run, t *duoType, i value.Name, phi interval.Face, p value.Value) value.Value
	support    func(p *duo) value.Support
	substitute func(run *value.Run, p *duo, s *value.Subst) value.Value
	same       func(c value.Comparer, t *duoType, a, b value.Value) bool
	read       func(q value.Quoter, t *duoType, v value.Value) value.Core
}

type duoType struct {
	first  value.Value
	second value.Closure
	rules  *duoRules
}

type duo struct {
	a, b  value.Value
	rules *duoRules
}

func rightDuo() *duoRules {
	return &duoRules{
		hcomp: func(run *value.Run, t *duoType, p value.Value, walls value.System) value.Value {
			firsts, seconds := halves(run, walls)
			i := run.Fresh(t.Support() | p.Support() | walls.Support())
			a := prims.Hfill(run, i, t.first, half(run, p, false), firsts)
			return t.pair(prims.LaterHcomp(run, t.first, half(run, p, false), firsts),
				prims.LaterComp(run, i, t.second.Open(run, a), half(run, p, true), seconds))
		},
		transp: func(run *value.Run, t *duoType, i value.Name, phi interval.Face, p value.Value) value.Value {
			a := prims.Tfill(run, i, t.first, phi, half(run, p, false))
			return t.pair(prims.LaterTransp(run, i, t.first, phi, half(run, p, false)),
				prims.LaterTransp(run, i, t.second.Open(run, a), phi, half(run, p, true)))
		},
		support: func(p *duo) value.Support { return p.a.Support() | p.b.Support() },
		substitute: func(run *value.Run, p *duo, s *value.Subst) value.Value {
			return &duo{run.Substitute(p.a, s), run.Substitute(p.b, s), p.rules}
		},
		same: func(c value.Comparer, t *duoType, a, b value.Value) bool {
			run := c.Run()
			return c.Terms("the left part", t.first, half(run, a, false), half(run, b, false)) &&
				c.Terms("the right part", t.second.Open(run, half(run, a, false)), half(run, a, true), half(run, b, true))
		},
		read: func(q value.Quoter, t *duoType, v value.Value) value.Core {
			run := q.Run()
			return core(duoSig, q.Term(t.first, half(run, v, false)), q.Term(t.second.Open(run, half(run, v, false)), half(run, v, true)))
		},
	}
}

func (t *duoType) pair(a, b value.Value) value.Value { return &duo{a, b, t.rules} }

func halves(run *value.Run, walls value.System) (firsts, seconds value.System) {
	each := func(right bool) value.System {
		return walls.Map(run, 0, 0, func(run *value.Run, _ value.Name, u value.Value, _ *value.Subst) value.Value {
			return project(run, u, right)
		})
	}
	return each(false), each(true)
}

func half(run *value.Run, p value.Value, right bool) value.Value {
	return run.Later(p.Support(), func(run *value.Run) value.Value { return project(run, p, right) })
}

func project(run *value.Run, p value.Value, right bool) value.Value {
	switch p := run.Force(p).(type) {
	case *duo:
		if right {
			return p.b
		}
		return p.a
	case *value.Neutral:
		return p.Eliminate(run, duoFrame(right))
	default:
		run.Fault("projection of %T", p)
		return nil
	}
}

func (t *duoType) Support() value.Support { return t.first.Support() | t.second.Support() }
func (t *duoType) Substitute(run *value.Run, s *value.Subst) value.Value {
	return &duoType{run.Substitute(t.first, s), t.second.Substitute(run, s), t.rules}
}
func (p *duo) Support() value.Support { return p.rules.support(p) }
func (p *duo) Substitute(run *value.Run, s *value.Subst) value.Value {
	return p.rules.substitute(run, p, s)
}
func (t *duoType) Hcomp(run *value.Run, p value.Value, walls value.System) value.Value {
	return t.rules.hcomp(run, t, p, walls)
}
func (t *duoType) Transp(run *value.Run, i value.Name, phi interval.Face, p value.Value) value.Value {
	return t.rules.transp(run, t, i, phi, p)
}
func (t *duoType) ReadBack(q value.Quoter) value.Core {
	return core(duoTypeSig, q.Type(t.first), q.Variable("x", t.first, func(x value.Value) value.Core { return q.Type(t.second.Open(q.Run(), x)) }))
}
func (t *duoType) SameType(c value.Comparer, other value.Type) bool {
	o, ok := other.(*duoType)
	return ok && c.Types("the left type", t.first, o.first) && c.Variable("x", t.first, func(x value.Value) bool {
		return c.Types("the right type", t.second.Open(c.Run(), x), o.second.Open(c.Run(), x))
	})
}
func (t *duoType) ReadBackElement(q value.Quoter, v value.Value) value.Core {
	return t.rules.read(q, t, v)
}
func (t *duoType) SameElement(c value.Comparer, a, b value.Value) bool {
	return t.rules.same(c, t, a, b)
}

type duoFrame bool

func (f duoFrame) Support() value.Support                       { return 0 }
func (f duoFrame) Frontier() (frontier, faces value.Support)    { return 0, 0 }
func (f duoFrame) Relabel(*value.Run, *value.Subst) value.Frame { return f }
func (f duoFrame) Resume(run *value.Run, head value.Value) value.Value {
	return project(run, head, bool(f))
}
func (f duoFrame) Type(run *value.Run, t value.Value, n *value.Neutral) value.Value {
	d := run.Force(t).(*duoType)
	if !f {
		return d.first
	}
	return d.second.Open(run, n.Eliminate(run, duoFrame(false)))
}
func (f duoFrame) ReadBack(_ value.Quoter, head value.Core, _ value.Value) value.Core {
	if f {
		return core(rightSig, head)
	}
	return core(leftSig, head)
}
func (f duoFrame) Same(_ value.Comparer, other value.Frame, _ value.Value) bool {
	return other == value.Frame(f)
}

var (
	plain = term.CoreSlot{}
	under = term.CoreSlot{Slot: term.Slot{Binds: []term.Sort{term.TermSort}}}

	duoTypeSig = &term.Signature{Name: "Duo", Word: "Duo", Slots: []term.CoreSlot{plain, under}}
	duoSig     = &term.Signature{Name: "duo", Word: "duo", Slots: []term.CoreSlot{plain, plain}}
	leftSig    = &term.Signature{Name: "left", Word: "left", Slots: []term.CoreSlot{plain}}
	rightSig   = &term.Signature{Name: "right", Word: "right", Slots: []term.CoreSlot{plain}}
)

func core(sig *term.Signature, args ...term.Arg) value.Core { return &term.Op{Sig: sig, Args: args} }

// makes is an operation that is its function.
type makes func(run *value.Run, f eval.Frame, args []eval.Arg) value.Value

func (m makes) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return m(run, f, args)
}

// resumes is an elimination of the first argument.
type resumes func(run *value.Run, f eval.Frame, args []eval.Arg) value.Frame

func (resumes) Principal() int { return 0 }
func (r resumes) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return r(run, f, args).Resume(run, args[0].Eval(run, f))
}
func (r resumes) Frame(run *value.Run, f eval.Frame, args []eval.Arg) value.Frame {
	return r(run, f, args)
}

func projections(right bool) resumes {
	return func(*value.Run, eval.Frame, []eval.Arg) value.Frame { return duoFrame(right) }
}

func duoFormer(rules *duoRules) prims.Former {
	inferHalf := func(right bool) func(c value.Checker, w *term.Written) (value.Core, value.Value) {
		return func(c value.Checker, w *term.Written) (value.Core, value.Value) {
			p, t := c.Infer(w.Parts[0].Body)
			d, ok := c.Run().Force(t).(*duoType)
			if !ok {
				c.Fail(w, term.IllTyped, "this is no duo", nil, nil)
			}
			if !right {
				return core(leftSig, p), d.first
			}
			return core(rightSig, p), d.second.Open(c.Run(), c.Value(core(leftSig, p)))
		}
	}
	return prims.Former{
		Name: "duo", Version: 1,
		Words: []prims.Word{
			{Shape: term.Shape{Word: "Duo", Slots: []term.Slot{{}, under.Slot}}, Infer: func(c value.Checker, w *term.Written) (value.Core, value.Value) {
				a, m := c.Type(w.Parts[0].Body)
				n := 0
				b := c.Variable(w.Parts[1].Binders[0], c.Value(a), func(value.Value) (body value.Core) {
					body, n = c.Type(w.Parts[1].Body)
					return body
				})
				return core(duoTypeSig, a, b), prims.NewUniverse(max(m, n))
			}},
			{Shape: term.Shape{Word: "duo", Slots: []term.Slot{{}, {}}}, Check: func(c value.Checker, w *term.Written, want value.Value) value.Core {
				t, ok := c.Run().Force(want).(*duoType)
				if !ok {
					c.Fail(w, term.IllTyped, "no duo has this type", c.ShowType(want), nil)
				}
				a := c.Check(w.Parts[0].Body, t.first)
				return core(duoSig, a, c.Check(w.Parts[1].Body, t.second.Open(c.Run(), c.Value(a))))
			}},
			{Shape: term.Shape{Word: "left", Slots: []term.Slot{{}}}, Infer: inferHalf(false)},
			{Shape: term.Shape{Word: "right", Slots: []term.Slot{{}}}, Infer: inferHalf(true)},
		},
		Operators: []prims.Operator{
			{Sig: duoTypeSig, Op: makes(func(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
				return &duoType{args[0].Delay(run, f), args[1].Close(run, f), rules}
			})},
			{Sig: duoSig, Op: makes(func(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
				return &duo{args[0].Delay(run, f), args[1].Delay(run, f), rules}
			})},
			{Sig: leftSig, Op: projections(false)}, {Sig: rightSig, Op: projections(true)},
		},
	}
}

// duos is the former as the suite sees it.
func duos(name string, rules *duoRules) kit.Former {
	options := []nbe.Option{nbe.WithFormers(duoFormer(rules))}
	w := wordsOf(options)
	fill := func(text string, pairs ...any) *term.Written { return kit.Fill(w, text, pairs...) }
	return kit.Former{Name: name, Options: options, Types: func(g *kit.Gen) kit.Sample {
		a := kit.Base(g)
		b := kit.Family(g, "B", a.Type)
		s := kit.Sample{Type: fill("(Duo A (y B))", "A", a.Type, "B", b(term.Name("y")))}
		s.Element = func(g *kit.Gen) *term.Written {
			if g.Choose(2) == 1 {
				x := a.Any(g)
				return term.Ann(fill("(duo X Y)", "X", x, "Y", g.Variable("y", b(x), nil)), s.Type)
			}
			return g.Variable("p", s.Type, nil)
		}
		left := func(p *term.Written) *term.Written { return fill("(left P)", "P", p) }
		right := func(p *term.Written) *term.Written { return fill("(right P)", "P", p) }
		s.Expand = func(p *term.Written) *term.Written { return fill("(duo (left P) (right P))", "P", p) }
		s.Eliminations = func(*kit.Gen) []kit.Elimination {
			return []kit.Elimination{{
				Name: "left", Of: left,
				Composite: func(box kit.Box, _ func(x, at *term.Written) *term.Written) *term.Written {
					return box.Map(a.Type, left).Hcomp()
				},
				Transport: func(t kit.Transport, _ func(x, at *term.Written) *term.Written) *term.Written {
					return t.With(a.Type, left(t.Base)).Transp()
				},
			}, {
				Name: "right", Of: right,
				Composite: func(box kit.Box, _ func(x, at *term.Written) *term.Written) *term.Written {
					return box.Map(a.Type, right).Over(b(box.Map(a.Type, left).Hfill(kit.Along())))
				},
				Transport: func(t kit.Transport, _ func(x, at *term.Written) *term.Written) *term.Written {
					return t.With(b(t.With(a.Type, left(t.Base)).Tfill(kit.Along())), right(t.Base)).Transp()
				},
			}}
		}
		return s
	}}
}

func wordsOf(options []nbe.Option) *notation.Words {
	e, err := nbe.New(options...)
	if err != nil {
		panic(err)
	}
	return e.Words()
}
