package kit_test

import (
	"os"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/kit"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// The code of the guide in doc.go stands here, where it is compiled and run.

type crateType struct{ of value.Value } // (Crate A)
type crate struct{ in value.Value }     // (crate a)

func (t *crateType) Support() value.Support { return t.of.Support() }
func (t *crateType) Substitute(run *value.Run, s *value.Subst) value.Value {
	return &crateType{run.Substitute(t.of, s)}
}
func (c *crate) Support() value.Support { return c.in.Support() }
func (c *crate) Substitute(run *value.Run, s *value.Subst) value.Value {
	return &crate{run.Substitute(c.in, s)}
}

func open(run *value.Run, c value.Value) value.Value {
	switch c := run.Force(c).(type) {
	case *crate:
		run.Step()
		return c.in
	case *value.Neutral:
		return c.Eliminate(run, opening{})
	default:
		run.Fault("%T is no crate", c)
		return nil
	}
}

func laterOpen(run *value.Run, c value.Value) value.Value {
	return run.Later(c.Support(), func(run *value.Run) value.Value { return open(run, c) })
}

type opening struct{}

func (opening) Support() value.Support                           { return 0 }
func (opening) Frontier() (frontier, faces value.Support)        { return 0, 0 }
func (o opening) Relabel(*value.Run, *value.Subst) value.Frame   { return o }
func (opening) Resume(run *value.Run, c value.Value) value.Value { return open(run, c) }
func (opening) Type(run *value.Run, t value.Value, _ *value.Neutral) value.Value {
	return run.Force(t).(*crateType).of
}
func (opening) ReadBack(_ value.Quoter, c value.Core, _ value.Value) value.Core {
	return &term.Op{Sig: openSig, Args: []term.Arg{c}}
}
func (o opening) Same(_ value.Comparer, other value.Frame, _ value.Value) bool {
	return other == value.Frame(o)
}

func (t *crateType) Hcomp(run *value.Run, c value.Value, walls value.System) value.Value {
	in := walls.Map(run, 0, 0, func(run *value.Run, _ value.Name, u value.Value, _ *value.Subst) value.Value {
		return open(run, u)
	})
	return &crate{prims.LaterHcomp(run, t.of, laterOpen(run, c), in)}
}

func (t *crateType) Transp(run *value.Run, i value.Name, phi interval.Face, c value.Value) value.Value {
	return &crate{prims.LaterTransp(run, i, t.of, phi, laterOpen(run, c))}
}

func (t *crateType) ReadBack(q value.Quoter) value.Core {
	return &term.Op{Sig: crateTypeSig, Args: []term.Arg{q.Type(t.of)}}
}
func (t *crateType) SameType(c value.Comparer, other value.Type) bool {
	o, ok := other.(*crateType)
	return ok && c.Types("what is in the crate", t.of, o.of)
}
func (t *crateType) ReadBackElement(q value.Quoter, c value.Value) value.Core {
	return &term.Op{Sig: crateSig, Args: []term.Arg{q.Term(t.of, laterOpen(q.Run(), c))}}
}
func (t *crateType) SameElement(c value.Comparer, a, b value.Value) bool {
	return c.Terms("what is in the crate", t.of, laterOpen(c.Run(), a), laterOpen(c.Run(), b))
}

var (
	slot         = []term.CoreSlot{{}}
	crateTypeSig = &term.Signature{Name: "Crate", Word: "Crate", Slots: slot}
	crateSig     = &term.Signature{Name: "crate", Word: "crate", Slots: slot}
	openSig      = &term.Signature{Name: "open", Word: "open", Slots: slot}
)

type crateTypeOp struct{}

func (crateTypeOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return &crateType{args[0].Delay(run, f)}
}

type crateOp struct{}

func (crateOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return &crate{args[0].Delay(run, f)}
}

type openOp struct{}

func (openOp) Principal() int { return 0 }
func (openOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return open(run, args[0].Eval(run, f))
}
func (openOp) Frame(*value.Run, eval.Frame, []eval.Arg) value.Frame { return opening{} }

func crates() prims.Former {
	one := []term.Slot{{}}
	return prims.Former{
		Name: "crates", Version: 1,
		Words: []prims.Word{
			{Shape: term.Shape{Word: "Crate", Slots: one}, Infer: func(c value.Checker, w *term.Written) (value.Core, value.Value) {
				a, level := c.Type(w.Parts[0].Body)
				return &term.Op{Sig: crateTypeSig, Args: []term.Arg{a}}, prims.NewUniverse(level)
			}},
			{Shape: term.Shape{Word: "crate", Slots: one}, Check: func(c value.Checker, w *term.Written, want value.Value) value.Core {
				t, ok := c.Run().Force(want).(*crateType)
				if !ok {
					c.Fail(w, term.IllTyped, "a crate does not have this type", c.ShowType(want), "a crate")
				}
				return &term.Op{Sig: crateSig, Args: []term.Arg{c.Check(w.Parts[0].Body, t.of)}}
			}},
			{Shape: term.Shape{Word: "open", Slots: one}, Infer: func(c value.Checker, w *term.Written) (value.Core, value.Value) {
				b, t := c.Infer(w.Parts[0].Body)
				ct, ok := c.Run().Force(t).(*crateType)
				if !ok {
					c.Fail(w, term.IllTyped, "only a crate is opened", "a crate", c.ShowType(t))
				}
				return &term.Op{Sig: openSig, Args: []term.Arg{b}}, ct.of
			}},
		},
		Operators: []prims.Operator{
			{Sig: crateTypeSig, Op: crateTypeOp{}}, {Sig: crateSig, Op: crateOp{}}, {Sig: openSig, Op: openOp{}},
		},
	}
}

func TestCrates(t *testing.T) {
	with := nbe.WithFormers(crates())
	e := kit.Engine(t, "(assume A (U 0)) (assume a A) (assume c (Crate A))", with)
	fill := func(text string, pairs ...any) *term.Written { return kit.Fill(e.Words(), text, pairs...) }
	kit.CheckLaws(t, kit.Former{
		Name: "crates", Options: []nbe.Option{with},
		Types: func(g *kit.Gen) kit.Sample {
			a := kit.Base(g)
			s := kit.Sample{Type: fill("(Crate A)", "A", a.Type)}
			s.Element = func(g *kit.Gen) *term.Written {
				return term.Ann(fill("(crate X)", "X", a.Any(g)), s.Type)
			}
			s.Expand = func(c *term.Written) *term.Written { return fill("(crate (open C))", "C", c) }
			opened := func(c *term.Written) *term.Written { return fill("(open C)", "C", c) }
			s.Eliminations = func(*kit.Gen) []kit.Elimination {
				return []kit.Elimination{{
					Name: "open", Of: opened,
					Composite: func(box kit.Box, _ func(x, at *term.Written) *term.Written) *term.Written {
						return box.Map(a.Type, opened).Hcomp()
					},
					Transport: func(line kit.Transport, _ func(x, at *term.Written) *term.Written) *term.Written {
						return line.With(a.Type, opened(line.Base)).Transp()
					},
				}}
			}
			return s
		},
	}, kit.Trials(30))
	kit.EqualAt(t, e.Scope(), "(Crate A)", "(crate (open c))", "c")
	kit.RefusedAs(t, e.Scope(), term.IllTyped, "(Crate A)", "(crate c)")
}

// Every block of code in the guide stands in this file.
func TestGuideIsCompiled(t *testing.T) {
	doc, err := os.ReadFile("doc.go")
	require.NoError(t, err)
	code, err := os.ReadFile("guide_test.go")
	require.NoError(t, err)
	blocks, block := 0, ""
	for _, line := range strings.Split(string(doc), "\n") {
		if rest, ok := strings.CutPrefix(line, "//\t"); ok && !strings.HasPrefix(rest, "go test") {
			block += rest + "\n"
			continue
		}
		if line == "//" && block != "" {
			block += "\n"
			continue
		}
		if block = strings.TrimRight(block, "\n"); block != "" {
			require.Contains(t, string(code), block)
			blocks++
			block = ""
		}
	}
	require.GreaterOrEqual(t, blocks, 7)
}
