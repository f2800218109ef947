// Package kit is for go test: assertions about terms, options for go-cmp,
// golden normal forms, script tests, generators of well-typed terms, and the
// law suite, which finds the face, the dimension and the input on which the
// rules of a type former break.
//
// # From an empty file to a former that passes
//
// A former is a type with its two Kan operations. Everything of it is reached
// through exported interfaces, and nothing in the engine names it. The guide
// adds crates: (Crate A), whose elements (crate a) hold one element of A, with
// (open c) and η. All of its code stands in guide_test.go of this package, is
// compiled with its tests, and passes.
//
// First the values. A value says which dimensions may be free in it, in O(1)
// and never too few, and takes a substitution of dimensions by handing it to
// its parts; Run.Substitute delays it there.
//
//	type crateType struct{ of value.Value } // (Crate A)
//	type crate struct{ in value.Value }     // (crate a)
//
//	func (t *crateType) Support() value.Support { return t.of.Support() }
//	func (t *crateType) Substitute(run *value.Run, s *value.Subst) value.Value {
//		return &crateType{run.Substitute(t.of, s)}
//	}
//	func (c *crate) Support() value.Support { return c.in.Support() }
//	func (c *crate) Substitute(run *value.Run, s *value.Subst) value.Value {
//		return &crate{run.Substitute(c.in, s)}
//	}
//
// Eliminations compute on what is canonical and wait on what is neutral, as a
// frame. A frame says what it is stuck on beside its element (Frontier:
// nothing here), how it goes on when the element is known, and its type. What
// takes work is delayed in a cell, whose support covers everything it
// captures.
//
//	func open(run *value.Run, c value.Value) value.Value {
//		switch c := run.Force(c).(type) {
//		case *crate:
//			run.Step()
//			return c.in
//		case *value.Neutral:
//			return c.Eliminate(run, opening{})
//		default:
//			run.Fault("%T is no crate", c)
//			return nil
//		}
//	}
//
//	func laterOpen(run *value.Run, c value.Value) value.Value {
//		return run.Later(c.Support(), func(run *value.Run) value.Value { return open(run, c) })
//	}
//
//	type opening struct{}
//
//	func (opening) Support() value.Support                           { return 0 }
//	func (opening) Frontier() (frontier, faces value.Support)        { return 0, 0 }
//	func (o opening) Relabel(*value.Run, *value.Subst) value.Frame   { return o }
//	func (opening) Resume(run *value.Run, c value.Value) value.Value { return open(run, c) }
//	func (opening) Type(run *value.Run, t value.Value, _ *value.Neutral) value.Value {
//		return run.Force(t).(*crateType).of
//	}
//	func (opening) ReadBack(_ value.Quoter, c value.Core, _ value.Value) value.Core {
//		return &term.Op{Sig: openSig, Args: []term.Arg{c}}
//	}
//	func (o opening) Same(_ value.Comparer, other value.Frame, _ value.Value) bool {
//		return other == value.Frame(o)
//	}
//
// The two Kan operations. No wall has the face top and no transport the face
// top: those cases are answered before a former is asked. Walls are changed by
// System.Map, which keeps names apart; whatever a wall's function uses beside
// the wall itself it must cut to the wall's face with the substitution it is
// given. Use the operations of prims/kan.go for the parts, never the rules of
// another type, and take no shortcut because a line looks constant or a box is
// empty: it would not survive a substitution.
//
//	func (t *crateType) Hcomp(run *value.Run, c value.Value, walls value.System) value.Value {
//		in := walls.Map(run, 0, 0, func(run *value.Run, _ value.Name, u value.Value, _ *value.Subst) value.Value {
//			return open(run, u)
//		})
//		return &crate{prims.LaterHcomp(run, t.of, laterOpen(run, c), in)}
//	}
//
//	func (t *crateType) Transp(run *value.Run, i value.Name, phi interval.Face, c value.Value) value.Value {
//		return &crate{prims.LaterTransp(run, i, t.of, phi, laterOpen(run, c))}
//	}
//
// Reading back and comparing. With η, both go by what can be observed of an
// element and never look at whether it is canonical. A positive type without
// pushing reads its composites back with prims.ReadHcomp, and one that pushes
// makes prims.StuckHcomp where it cannot.
//
//	func (t *crateType) ReadBack(q value.Quoter) value.Core {
//		return &term.Op{Sig: crateTypeSig, Args: []term.Arg{q.Type(t.of)}}
//	}
//	func (t *crateType) SameType(c value.Comparer, other value.Type) bool {
//		o, ok := other.(*crateType)
//		return ok && c.Types("what is in the crate", t.of, o.of)
//	}
//	func (t *crateType) ReadBackElement(q value.Quoter, c value.Value) value.Core {
//		return &term.Op{Sig: crateSig, Args: []term.Arg{q.Term(t.of, laterOpen(q.Run(), c))}}
//	}
//	func (t *crateType) SameElement(c value.Comparer, a, b value.Value) bool {
//		return c.Terms("what is in the crate", t.of, laterOpen(c.Run(), a), laterOpen(c.Run(), b))
//	}
//
// The core syntax: a signature for each operator, and what it does. An
// argument is taken delayed unless it is needed at once.
//
//	var (
//		slot         = []term.CoreSlot{{}}
//		crateTypeSig = &term.Signature{Name: "Crate", Word: "Crate", Slots: slot}
//		crateSig     = &term.Signature{Name: "crate", Word: "crate", Slots: slot}
//		openSig      = &term.Signature{Name: "open", Word: "open", Slots: slot}
//	)
//
//	type crateTypeOp struct{}
//
//	func (crateTypeOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
//		return &crateType{args[0].Delay(run, f)}
//	}
//
//	type crateOp struct{}
//
//	func (crateOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
//		return &crate{args[0].Delay(run, f)}
//	}
//
//	type openOp struct{}
//
//	func (openOp) Principal() int { return 0 }
//	func (openOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
//		return open(run, args[0].Eval(run, f))
//	}
//	func (openOp) Frame(*value.Run, eval.Frame, []eval.Arg) value.Frame { return opening{} }
//
// The written form: head words with the shapes of their forms, and how they
// are typed. What introduces is checked at a type, what eliminates is
// inferred. A word that is taken already is refused when the engine is made.
//
//	func crates() prims.Former {
//		one := []term.Slot{{}}
//		return prims.Former{
//			Name: "crates", Version: 1,
//			Words: []prims.Word{
//				{Shape: term.Shape{Word: "Crate", Slots: one}, Infer: func(c value.Checker, w *term.Written) (value.Core, value.Value) {
//					a, level := c.Type(w.Parts[0].Body)
//					return &term.Op{Sig: crateTypeSig, Args: []term.Arg{a}}, prims.NewUniverse(level)
//				}},
//				{Shape: term.Shape{Word: "crate", Slots: one}, Check: func(c value.Checker, w *term.Written, want value.Value) value.Core {
//					t, ok := c.Run().Force(want).(*crateType)
//					if !ok {
//						c.Fail(w, term.IllTyped, "a crate does not have this type", c.ShowType(want), "a crate")
//					}
//					return &term.Op{Sig: crateSig, Args: []term.Arg{c.Check(w.Parts[0].Body, t.of)}}
//				}},
//				{Shape: term.Shape{Word: "open", Slots: one}, Infer: func(c value.Checker, w *term.Written) (value.Core, value.Value) {
//					b, t := c.Infer(w.Parts[0].Body)
//					ct, ok := c.Run().Force(t).(*crateType)
//					if !ok {
//						c.Fail(w, term.IllTyped, "only a crate is opened", "a crate", c.ShowType(t))
//					}
//					return &term.Op{Sig: openSig, Args: []term.Arg{b}}, ct.of
//				}},
//			},
//			Operators: []prims.Operator{
//				{Sig: crateTypeSig, Op: crateTypeOp{}}, {Sig: crateSig, Op: crateOp{}}, {Sig: openSig, Op: openOp{}},
//			},
//		}
//	}
//
// And the law suite. A Sample is a type, a way to draw its elements, its
// η-expansion, and its eliminations with what is claimed of them: an
// elimination with a claim commutes with the operation in just that way, one
// without a claim waits as long as the operation is stuck. Types and elements
// may mention the dimensions in scope; the suite makes boxes and lines of
// them.
//
//	func TestCrates(t *testing.T) {
//		with := nbe.WithFormers(crates())
//		e := kit.Engine(t, "(assume A (U 0)) (assume a A) (assume c (Crate A))", with)
//		fill := func(text string, pairs ...any) *term.Written { return kit.Fill(e.Words(), text, pairs...) }
//		kit.CheckLaws(t, kit.Former{
//			Name: "crates", Options: []nbe.Option{with},
//			Types: func(g *kit.Gen) kit.Sample {
//				a := kit.Base(g)
//				s := kit.Sample{Type: fill("(Crate A)", "A", a.Type)}
//				s.Element = func(g *kit.Gen) *term.Written {
//					return term.Ann(fill("(crate X)", "X", a.Any(g)), s.Type)
//				}
//				s.Expand = func(c *term.Written) *term.Written { return fill("(crate (open C))", "C", c) }
//				opened := func(c *term.Written) *term.Written { return fill("(open C)", "C", c) }
//				s.Eliminations = func(*kit.Gen) []kit.Elimination {
//					return []kit.Elimination{{
//						Name: "open", Of: opened,
//						Composite: func(box kit.Box, _ func(x, at *term.Written) *term.Written) *term.Written {
//							return box.Map(a.Type, opened).Hcomp()
//						},
//						Transport: func(line kit.Transport, _ func(x, at *term.Written) *term.Written) *term.Written {
//							return line.With(a.Type, opened(line.Base)).Transp()
//						},
//					}}
//				}
//				return s
//			},
//		}, kit.Trials(30))
//		kit.EqualAt(t, e.Scope(), "(Crate A)", "(crate (open c))", "c")
//		kit.RefusedAs(t, e.Scope(), term.IllTyped, "(Crate A)", "(crate c)")
//	}
//
// # Reading a failure
//
// A report names the law, the term, and the substitution or face at fault;
// gives both sides as normal forms and the shortest way to where they differ;
// then the smallest scope and box that were found, drawn from the side, with
// the faulty edge marked; the seed that finds it again; and a script that can
// be pasted. Failure.SVG draws the same box. The directory testdata/wrong
// holds the report of every mistake that this package's tests make on purpose:
// a forgotten wall, a filler at the wrong end, a transport that ignores its
// face, pushing and commuting both, and others.
//
// # The other tools
//
// EqualAt, DifferAt, NormalIs, RefusedAs, ErrorIs, StepsAtMost and
// AllocationGrowth assert, and end the test in their Require forms.
// CompareTerms makes cmp.Diff speak the notation, up to bound names. Golden
// and GoldenNormal compare with files, which are written anew by
//
//	go test ./... -update-golden
//
// Scripts runs text archives in the txtar form. Terms and FromRapid draw for
// pgregory.net/rapid, FuzzLaws for go test -fuzz. Paste and Failure.Script
// make scripts of what was found.
package kit
