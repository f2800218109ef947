package term_test

import (
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value/interval"
)

// A resolver of written terms that knows nothing of how their names were chosen.

// resolver reads a written term beside the core term it came from, looking
// names up as a reader of the text would: the latest binding of a name counts.
type resolver struct {
	t     require.TestingT
	words *notation.Words
}

// named is one name in scope; a name that was left out is empty.
type named struct {
	name      string
	dimension bool
	level     int
}

type environment []named

func (e environment) find(name string) (named, bool) {
	for k := len(e) - 1; k >= 0; k-- {
		if e[k].name == name {
			return e[k], true
		}
	}
	return named{}, false
}

func (e environment) bind(name string, dimension bool) environment {
	level := 0
	for _, n := range e {
		if n.dimension == dimension {
			level++
		}
	}
	return append(e[:len(e):len(e)], named{name, dimension, level})
}

func (r resolver) dimension(w *term.Written, e environment) interval.Dim {
	switch {
	case w.Kind == term.NumeralKind && w.Number.Sign() == 0:
		return interval.Zero()
	case w.Kind == term.NumeralKind:
		return interval.One()
	case w.Kind == term.NameKind:
		n, ok := e.find(w.Word)
		require.True(r.t, ok && n.dimension, "%s is no dimension", w)
		return interval.Var(interval.Name(n.level))
	case w.Word == "rev":
		return r.dimension(w.Parts[0].Body, e).Rev()
	}
	out := r.dimension(w.Parts[0].Body, e)
	for _, p := range w.Parts[1:] {
		if w.Word == "min" {
			out = out.Min(r.dimension(p.Body, e))
		} else {
			out = out.Max(r.dimension(p.Body, e))
		}
	}
	return out
}

func (r resolver) face(w *term.Written, e environment) interval.Face {
	switch w.Word {
	case "top":
		return interval.Top()
	case "bot":
		return interval.Bot()
	case "=":
		d := r.dimension(w.Parts[0].Body, e)
		if w.Parts[1].Body.Number.Sign() == 0 {
			return d.Is0()
		}
		return d.Is1()
	}
	out := r.face(w.Parts[0].Body, e)
	for _, p := range w.Parts[1:] {
		if w.Word == "and" {
			out = out.And(r.face(p.Body, e))
		} else {
			out = out.Or(r.face(p.Body, e))
		}
	}
	return out
}

// under resolves a body; dimensions says how many of its names, the last, are dimensions.
func (r resolver) under(b *term.Bound, p term.Part, dimensions int, e environment) {
	for k := range b.Hints {
		name := ""
		if len(p.Binders) > 0 {
			name = p.Binders[k].Name
			assert.True(r.t, term.IsName(name) && !r.words.Taken(name), "%q is no name", name)
		}
		e = e.bind(name, k >= len(b.Hints)-dimensions)
	}
	r.core(b.Body, p.Body, e)
}

func (r resolver) arg(a term.Arg, p term.Part, e environment) {
	switch a := a.(type) {
	case term.Dimension:
		assert.True(r.t, a.Equal(r.dimension(p.Body, e)), "%v is written %s", a.Dim, p.Body)
	case *term.Face:
		assert.True(r.t, a.Equal(r.face(p.Body, e)), "%v is written %s", a.Face, p.Body)
	case *term.Bound:
		r.under(a, p, 1, e)
	case term.Rows:
		require.Len(r.t, p.Rows, len(a))
		for j := range a {
			for k := range a[j] {
				r.arg(a[j][k], p.Rows[j][k], e)
			}
		}
	case term.Core:
		r.core(a, p.Body, e)
	}
}

func (r resolver) global(name string, w *term.Written, e environment) {
	require.Equal(r.t, term.NameKind, w.Kind)
	assert.Equal(r.t, name, w.Word)
	_, captured := e.find(name)
	assert.False(r.t, captured, "%s is captured", name)
}

func (r resolver) args(args []term.Arg, parts []term.Part, e environment) {
	require.Len(r.t, parts, len(args))
	for k, a := range args {
		r.arg(a, parts[k], e)
	}
}

func (r resolver) core(c term.Core, w *term.Written, e environment) {
	switch c := c.(type) {
	case *term.Variable:
		n, ok := e.find(w.Word)
		require.True(r.t, ok && w.Kind == term.NameKind, "%s is not in scope", w)
		assert.Equal(r.t, named{w.Word, false, c.Level}, n)
	case *term.Global:
		r.global(c.Name, w, e)
	case *term.Op:
		r.operator(c, w, e)
	}
}

func (r resolver) operator(c *term.Op, w *term.Written, e environment) {
	switch c.Sig {
	case lamSig:
		r.under(c.Args[0].(*term.Bound), w.Parts[0], 0, e)
	case piSig, sigmaSig:
		r.core(c.Args[0].(term.Core), w.Parts[0].Body, e)
		r.under(c.Args[1].(*term.Bound), w.Parts[1], 0, e)
		assert.Equal(r.t, len(w.Parts[1].Binders) == 1, w.Word == c.Sig.Word)
	case piDimSig:
		assert.Equal(r.t, "I", w.Parts[0].Body.Word)
		r.under(c.Args[0].(*term.Bound), w.Parts[1], 1, e)
	case letSig:
		r.args(c.Args[:2], w.Parts[:2], e)
		r.under(c.Args[2].(*term.Bound), w.Parts[2], 0, e)
	case appSig:
		last := len(w.Parts) - 1
		r.arg(c.Args[1], w.Parts[last], e)
		if last == 1 {
			r.core(c.Args[0].(term.Core), w.Parts[0].Body, e)
		} else {
			rest := *w
			rest.Parts = w.Parts[:last]
			r.core(c.Args[0].(term.Core), &rest, e)
		}
	case dataSig, conSig:
		args := c.Args[1:]
		if c.Sig == conSig {
			args = c.Args[2:]
		}
		if w.Kind == term.ApplyKind {
			r.args(args, w.Parts[1:], e)
			w = w.Parts[0].Body
		} else {
			assert.Empty(r.t, args)
		}
		r.global(c.Args[0].(term.Reference).Name, w, e)
	case numeralSig:
		assert.Equal(r.t, term.NumeralKind, w.Kind)
		assert.Zero(r.t, c.Args[0].(term.Number).Cmp(w.Number))
	case elimSig:
		r.under(c.Args[2].(*term.Bound), w.Parts[0], 0, e)
		r.core(c.Args[3].(term.Core), w.Parts[1].Body, e)
		cases := c.Args[4].(term.Rows)
		require.Len(r.t, w.Parts[2].Rows, len(cases))
		for k, row := range cases {
			reference := row[0].(term.Reference)
			r.global(reference.Name, w.Parts[2].Rows[k][0].Body, e)
			r.under(row[1].(*term.Bound), w.Parts[2].Rows[k][1], reference.Index, e)
		}
	case atSig:
		r.args(c.Args[:2], w.Parts, e)
	default:
		r.args(c.Args, w.Parts, e)
	}
}

// scopeOf is the environment of names beside the term c: what each of them is
// called is found out by writing it next to c.
func scopeOf(t require.TestingT, c term.Core, names term.Names) environment {
	e := environment{}
	seen := map[string]bool{}
	add := func(only term.Core, dimension bool, level int) {
		both, err := term.Write(app(global("f"), only, c), names)
		require.NoError(t, err)
		w := both.Parts[1].Body
		if dimension {
			w = w.Parts[1].Body
		}
		require.False(t, seen[w.Word], "two names of the scope are %s", w)
		seen[w.Word] = true
		e = append(e, named{w.Word, dimension, level})
	}
	for k := range names.Variables {
		add(variable(k), false, k)
	}
	for k := range names.Dimensions {
		add(at(global("f"), interval.Var(interval.Name(k))), true, k)
	}
	return e
}
