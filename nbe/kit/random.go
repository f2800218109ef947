package kit

import (
	"testing"

	"pgregory.net/rapid"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/term"
)

// The same generators for pgregory.net/rapid and for go test -fuzz.

// TypedTerm is a well-typed term in a scope of variables and dimensions.
type TypedTerm struct {
	Variables  []Variable
	Dimensions []string
	Type, Term *term.Written
}

// DrawTerm draws a term: an element of a type of the former, or one of its
// operations on elements.
func DrawTerm(f Former, s Source) *TypedTerm {
	x := draw(f, Operation(s.Next(3)), s)
	out := &TypedTerm{Variables: x.Variables, Dimensions: x.Dimensions, Type: x.TypeAt(oneEnd), Term: x.Term()}
	if s.Next(3) == 1 {
		out.Type, out.Term = x.TypeAt(zero), x.Base
	}
	return out
}

// Scope is a scope of e in which the term stands.
func (t *TypedTerm) Scope(tb testing.TB, e *nbe.Engine) *nbe.Scope {
	tb.Helper()
	s := e.Scope()
	for _, v := range t.Variables {
		var err error
		if s, err = s.Variable(tb.Context(), v.Name, v.Type); err != nil {
			tb.Fatalf("kit: %v\n%s", err, t.Script())
		}
	}
	for _, d := range t.Dimensions {
		var err error
		if s, err = s.Dimension(d); err != nil {
			tb.Fatalf("kit: %v", err)
		}
	}
	return s
}

// Script is the term as a script that can be pasted.
func (t *TypedTerm) Script() string {
	p := Paste{Variables: t.Variables, Dimensions: t.Dimensions}
	p.Define("subject", t.Type, t.Term)
	return p.String()
}

// String is the script; rapid prints it when a property fails.
func (t *TypedTerm) String() string { return t.Script() }

// FromRapid is the source of what rapid draws, so that rapid makes it smaller.
func FromRapid(t *rapid.T) Source { return rapidSource{t} }

type rapidSource struct{ t *rapid.T }

var choices [256]*rapid.Generator[int]

func init() {
	for n := range choices {
		choices[n] = rapid.IntRange(0, max(n-1, 0))
	}
}

func (s rapidSource) Next(bound int) int {
	if bound < 2 {
		return 0
	}
	return choices[min(bound, len(choices)-1)].Draw(s.t, "choice")
}

// Terms is rapid's generator of well-typed terms of a former.
func Terms(f Former) *rapid.Generator[*TypedTerm] {
	return rapid.Custom(func(t *rapid.T) *TypedTerm { return DrawTerm(f, FromRapid(t)) })
}

// FuzzLaws tries the laws on what a fuzzer's bytes draw. A failure is reported
// as CheckLaws does, without being made smaller: the fuzzer does that.
func FuzzLaws(f *testing.F, former Former, options ...Option) {
	f.Helper()
	for seed := range byte(8) {
		f.Add([]byte{seed, seed >> 1, 3 * seed, 5 * seed, seed, 7 * seed, seed, 1, 2, seed})
	}
	c := config{skip: map[string]bool{}}
	for _, o := range options {
		o(&c)
	}
	es := newEngines(former)
	f.Fuzz(func(t *testing.T, data []byte) {
		if failure, _ := c.try(es, &recorder{source: FromBytes(data)}, nil); failure != nil {
			failure.Former = former.Name
			t.Error(failure.Report())
		}
	})
}
