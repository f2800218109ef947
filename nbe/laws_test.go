package nbe_test

// How the tests of the rules are written. A law is an equation of the theory
// with the published source beside it: a script of assumptions, dimensions, a
// type and two sides. It must hold in the dimensions as they are and on every
// face of them, by the direct comparison and by the comparison of normal forms,
// in the engine as it is, in the plain evaluator and with names drawn at random.
// The right side of a rule is written out at neutral types, where nothing
// computes, so that it says what the rule says and not what the engine does.

import (
	"context"
	"fmt"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
)

// law is one equation, or inequation, of the theory.
type law struct {
	name   string
	source string
	given  string // a script
	dims   string // dimensions in scope
	ty     string
	left   string
	right  string
	differ bool // the two are different by definition, in general position
}

// build is a way of running the engine.
type build struct {
	name    string
	options []nbe.Option
	call    []nbe.CallOption
}

var allPlain = value.Plain{NoSupport: true, NoSharing: true, Eager: true, NoFrontier: true, NoNumerals: true}

// builds are the engine as it is, the plain evaluator, and names drawn at random.
func builds() []build {
	return []build{
		{"fast", nil, nil},
		{"plain", []nbe.Option{nbe.WithPlain(allPlain)}, nil},
		{"random names", nil, []nbe.CallOption{nbe.DrawNames(7)}},
	}
}

// engine is an engine that has handled a script, every form of which must do
// what it should.
func (b build) engine(t require.TestingT, given string) *nbe.Engine {
	e, err := nbe.New(b.options...)
	require.NoError(t, err)
	b.handle(t, e, given)
	return e
}

func (b build) handle(t require.TestingT, e *nbe.Engine, text string) {
	s := &script.Session{Engine: e, Options: b.call, Report: func(r script.Result) {
		require.NoError(t, r.Err, "%s", r.Form)
	}}
	require.NoError(t, s.Source(context.Background(), []byte(text), "given"))
}

func read(t require.TestingT, text string) *term.Written {
	w, err := notation.ReadTerm(text, "law", nil)
	require.NoError(t, err, "%s", text)
	return w
}

// faces are all the ways to put dimensions to an end or leave them; nil for none.
func faces(dims []string) []*term.Written {
	out := [][]*term.Written{nil}
	for _, d := range dims {
		more := out
		for _, f := range out {
			for end := range uint64(2) {
				more = append(more, append(f[:len(f):len(f)], term.Eq(term.Name(d), end)))
			}
		}
		out = more
	}
	and := make([]*term.Written, len(out))
	for k, f := range out {
		if k > 0 {
			and[k] = term.And(f...)
		}
	}
	return and
}

// compare compares two written terms at a type in both ways, which must agree.
func compare(t require.TestingT, b build, s *nbe.Scope, ty, left, right *term.Written) (equal bool, account string) {
	ctx := context.Background()
	l, err := s.Check(ctx, left, ty, b.call...)
	require.NoError(t, err, "%s: the left side", b.name)
	r, err := s.Check(ctx, right, ty, b.call...)
	require.NoError(t, err, "%s: the right side", b.name)
	c, err := s.Compare(ctx, l, r, b.call...)
	require.NoError(t, err, "%s: comparing", b.name)
	x, err := s.Normal(ctx, l, b.call...)
	require.NoError(t, err, "%s: the left normal form", b.name)
	y, err := s.Normal(ctx, r, b.call...)
	require.NoError(t, err, "%s: the right normal form", b.name)
	same := len(x) == len(y)
	for k := 0; same && k < len(x); k++ {
		same = term.Same(x[k].Term, y[k].Term)
		account += fmt.Sprintf("\nleft  %s\nright %s", &x[k], &y[k])
	}
	require.Equal(t, same, c.Verdict == nbe.Equal, "%s: comparing says %s, normal forms:%s", b.name, c.Verdict, account)
	if c.Difference != nil {
		account += "\n" + c.Difference.String()
	}
	return same, account
}

// check checks one law in one build.
func (l law) check(t *testing.T, b build) {
	ctx := context.Background()
	e := b.engine(t, l.given)
	scope := e.Scope()
	dims := strings.Fields(l.dims)
	for _, d := range dims {
		var err error
		scope, err = scope.Dimension(d)
		require.NoError(t, err)
	}
	ty, left, right := read(t, l.ty), read(t, l.left), read(t, l.right)
	for _, face := range faces(dims) {
		if l.differ && face != nil {
			continue
		}
		s := scope
		if face != nil {
			var err error
			s, err = scope.Assume(ctx, face, b.call...)
			require.NoError(t, err)
		}
		equal, account := compare(t, b, s, ty, left, right)
		if equal == l.differ {
			t.Fatalf("%s (%s), in the build %q, on the face %v: equal by definition is %v%s", l.name, l.source, b.name, face, equal, account)
		}
	}
}

// holds checks laws in every build.
func holds(t *testing.T, given string, laws ...law) {
	t.Helper()
	for _, l := range laws {
		l.given = given + "\n" + l.given
		t.Run(l.name, func(t *testing.T) {
			for _, b := range builds() {
				l.check(t, b)
			}
		})
	}
}

// accepted runs a script in every build; each form must do what it should.
func accepted(t *testing.T, text string) {
	t.Helper()
	for _, b := range builds() {
		b.engine(t, text)
	}
}

// where is the law with a name written out.
func (l law) where(name, text string) law {
	for _, side := range []*string{&l.ty, &l.left, &l.right} {
		*side = strings.ReplaceAll(*side, " "+name, " "+text)
	}
	return l
}

// lines are types and families that nothing computes at, over no dimension,
// one and two.
const lines = `
	(assume A (U 0)) (assume B (-> A (U 0))) (assume C (U 0))
	(assume LA (-> I (U 0))) (assume LC (-> I (U 0))) (assume LB (Pi ((i I) (x (LA i))) (U 0)))
	(assume M (-> I I (U 0)))
`
