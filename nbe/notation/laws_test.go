package notation_test

import (
	"math/big"
	"math/rand/v2"
	"strings"
	"testing"
	"unicode/utf8"

	"github.com/google/go-cmp/cmp"
	"github.com/google/go-cmp/cmp/cmpopts"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
)

// The laws of reading and printing, on random written terms of all shapes,
// those of hosts' formers included.

// hostShapes are the shapes of invented formers: a crate, a row of crates, a mark.
var hostShapes = []term.Shape{
	{Word: "crate", Slots: []term.Slot{{}, {Binds: []term.Sort{term.TermSort, term.DimensionSort}}, {Sort: term.FaceSort}, {Sort: term.DimensionSort, Rest: true}}},
	{Word: "stack", Slots: []term.Slot{{Sort: term.LevelSort}, {Rows: []term.Slot{{Sort: term.NameSort}, {Binds: []term.Sort{term.TermSort, term.TermSort}}, {Rest: true}}}}},
	{Word: "shelf", Slots: []term.Slot{{Rows: []term.Slot{{Rows: []term.Slot{{Sort: term.DimensionSort}}}}}}},
	{Word: "mark", Slots: nil},
	{Word: "berth'", Slots: []term.Slot{{Binds: []term.Sort{term.DimensionSort}, Rest: true}}},
}

func hostWords(t require.TestingT) *notation.Words {
	w, err := notation.NewWords(hostShapes...)
	require.NoError(t, err)
	return w
}

var someNames = []string{"x", "y", "i", "crane", "añejo", "λ", "荷", "-1", "a[0]", "x'", "strict", "formal", "…", "7up", "�"}

// generator builds written terms; upTo draws a number from 0 to n.
type generator struct {
	upTo  func(n int) int
	terms []term.Shape
}

func newGenerator(upTo func(n int) int) generator {
	g := generator{upTo: upTo, terms: hostShapes}
	for _, s := range term.Words() {
		switch s.Word {
		case "I", "min", "max", "rev", "top", "bot", "=", "and", "or":
		default:
			g.terms = append(g.terms, s)
		}
	}
	return g
}

func even(seed uint64) generator {
	source := rand.New(rand.NewPCG(seed, 2))
	return newGenerator(func(n int) int { return source.IntN(n + 1) })
}

func drawn(t *rapid.T) generator {
	return newGenerator(func(n int) int { return rapid.IntRange(0, n).Draw(t, "n") })
}

func (g generator) name() string { return someNames[g.upTo(len(someNames)-1)] }

func (g generator) dimension(depth int) *term.Written {
	if depth <= 0 {
		if g.upTo(2) == 0 {
			return term.Numeral(uint64(g.upTo(1)))
		}
		return term.Name(g.name())
	}
	parts := []*term.Written{g.dimension(depth - 1)}
	for range g.upTo(2) {
		parts = append(parts, g.dimension(depth-2))
	}
	switch g.upTo(3) {
	case 0:
		return term.Min(parts...)
	case 1:
		return term.Max(parts...)
	case 2:
		return term.Rev(parts[0])
	}
	return g.dimension(0)
}

func (g generator) face(depth int) *term.Written {
	switch k := g.upTo(4); {
	case k == 0:
		return term.Top()
	case k == 1:
		return term.Bot()
	case k == 2 || depth <= 0:
		return term.Eq(g.dimension(depth-1), uint64(g.upTo(1)))
	default:
		parts := []*term.Written{g.face(depth - 1)}
		for range g.upTo(2) {
			parts = append(parts, g.face(depth-2))
		}
		if k == 3 {
			return term.And(parts...)
		}
		return term.Or(parts...)
	}
}

func (g generator) numeral() *term.Written {
	return term.BigNumeral(new(big.Int).Lsh(big.NewInt(int64(g.upTo(20))), uint(g.upTo(1)*100)))
}

func (g generator) term(depth int) *term.Written {
	if depth <= 0 {
		if g.upTo(3) == 0 {
			return g.numeral()
		}
		return term.Name(g.name())
	}
	if g.upTo(3) == 0 {
		w := &term.Written{Kind: term.ApplyKind}
		args := g.upTo(3)
		if args == 0 {
			w.Parts = []term.Part{{Body: term.Name(g.name())}}
			return w
		}
		w.Parts = []term.Part{{Body: g.term(depth - 1)}}
		for range args {
			a := g.term(depth - 2)
			if g.upTo(2) == 0 {
				a = g.dimension(depth - 2)
			}
			w.Parts = append(w.Parts, term.Part{Body: a})
		}
		return w
	}
	s := g.terms[g.upTo(len(g.terms)-1)]
	w := term.Form(s.Word, g.parts(s.Slots, depth-1)...)
	if (s.Word == "Pi" || s.Word == "->") && g.upTo(3) == 0 {
		w.Parts[0].Body = term.Interval()
	}
	// Long nests of the forms that are written as one.
	if len(s.Slots) > 0 && g.upTo(1) == 0 {
		switch s.Word {
		case "lam", "line", "Pi", "->", "Sigma", "*", "pair", "let":
			last := len(w.Parts) - 1
			again := term.Form(s.Word, g.parts(s.Slots, depth-2)...)
			w.Parts[last].Body = again
		case "at":
			w.Parts[0].Body = term.Form(s.Word, g.parts(s.Slots, depth-2)...)
		}
	}
	return w
}

func (g generator) parts(slots []term.Slot, depth int) (out []term.Part) {
	for _, s := range slots {
		if s.Rows != nil {
			rows := [][]term.Part{}
			for range g.upTo(3) {
				rows = append(rows, g.parts(s.Rows, depth-1))
			}
			return append(out, term.Part{Rows: rows})
		}
		for again := true; again; again = s.Rest && g.upTo(2) > 0 {
			out = append(out, g.part(s, depth))
		}
	}
	return out
}

func (g generator) part(s term.Slot, depth int) term.Part {
	names := len(s.Binds)
	if s.Many {
		names = g.upTo(3)
	}
	p := term.Part{}
	for range names {
		p.Binders = append(p.Binders, term.Binder{Name: g.name()})
	}
	switch s.Sort {
	case term.TermSort:
		p.Body = g.term(depth)
	case term.DimensionSort:
		p.Body = g.dimension(depth)
	case term.FaceSort:
		p.Body = g.face(depth)
	case term.LevelSort:
		p.Body = g.numeral()
	case term.NameSort:
		p.Body = term.Name(g.name())
	}
	return p
}

// check runs a law on small drawn and on larger evenly spread inputs.
func check(t *testing.T, law func(t require.TestingT, g generator, depth int)) {
	rapid.Check(t, func(t *rapid.T) { law(t, drawn(t), rapid.IntRange(0, 3).Draw(t, "depth")) })
	for seed := range uint64(300) {
		law(t, even(seed), 5)
	}
}

func TestWhatIsPrintedReadsBack(t *testing.T) {
	words := hostWords(t)
	check(t, func(t require.TestingT, g generator, depth int) {
		w := g.term(depth)
		text := notation.Print(w)
		back, err := notation.ReadTerm(text, "t", words)
		require.NoError(t, err, "%s", text)
		require.True(t, back.Same(w), "%s\n%s", text, back)
		require.Equal(t, text, notation.Print(back))
		require.False(t, strings.ContainsRune(text, '\n'))
	})
}

func TestLayoutChangesNothingAndKeepsToTheWidth(t *testing.T) {
	words := hostWords(t)
	check(t, func(t require.TestingT, g generator, depth int) {
		w := g.term(depth)
		width := g.upTo(100)
		text := notation.Format(w, width)
		back, err := notation.ReadTerm(text, "t", words)
		require.NoError(t, err, "%s", text)
		require.True(t, back.Same(w), "%s\n%s", text, back)
		if width == 0 {
			require.Equal(t, notation.Print(w), text)
			return
		}
		for _, l := range strings.Split(text, "\n") {
			require.Equal(t, strings.TrimRight(l, " "), l)
			// Only an item that cannot be broken, with what closes after it, may be too long for a line.
			if utf8.RuneCountInString(l) > width {
				require.LessOrEqual(t, len(strings.Fields(strings.TrimLeft(l, " (")))-1, 1, "%d: %s", width, text)
			}
		}
	})
}

// noise puts space and comments between the tokens of a text that has no quotations.
func noise(g generator, text string) string {
	breaks := []string{" ", "\n", "\r\n", "\t", "; a (comment\" ü\n", ";\r\n", "  ", "\u00a0", "\u2003"}
	var b strings.Builder
	space := func() {
		for range g.upTo(2) {
			b.WriteString(breaks[g.upTo(len(breaks)-1)])
		}
	}
	space()
	for _, c := range text {
		switch c {
		case ' ':
			b.WriteString(breaks[g.upTo(len(breaks)-1)])
			space()
		case '(', ')':
			space()
			b.WriteRune(c)
			space()
		default:
			b.WriteRune(c)
		}
	}
	space()
	return b.String()
}

func TestSpaceAndCommentsSayNothingAndPlacesAreRight(t *testing.T) {
	words := hostWords(t)
	check(t, func(t require.TestingT, g generator, depth int) {
		w := g.term(depth)
		text := noise(g, notation.Print(w))
		back, err := notation.ReadTerm(text, "file", words)
		require.NoError(t, err, "%q", text)
		require.True(t, back.Same(w), "%q\n%s", text, back)
		lines := strings.Split(text, "\n")
		at := func(p term.Place) string {
			require.Equal(t, "file", p.File)
			characters := []rune(lines[p.Line-1])
			return string(characters[p.Column-1:])
		}
		everyNode(back, func(w *term.Written) {
			switch {
			case w.Kind == term.NameKind:
				require.True(t, strings.HasPrefix(at(w.Place), w.Word), "%q", text)
			case w.Kind == term.NumeralKind:
				require.True(t, strings.HasPrefix(at(w.Place), w.Number.String()), "%q", text)
			case len(w.Parts) == 0:
				require.True(t, strings.HasPrefix(at(w.Place), w.Word) || strings.HasPrefix(at(w.Place), "("), "%q", text)
			default:
				require.True(t, strings.HasPrefix(at(w.Place), "("), "%q", text)
			}
		}, func(b term.Binder) {
			require.True(t, strings.HasPrefix(at(b.Place), b.Name), "%q", text)
		})
	})
}

func everyNode(w *term.Written, node func(*term.Written), binder func(term.Binder)) {
	node(w)
	var parts func([]term.Part)
	parts = func(list []term.Part) {
		for _, p := range list {
			for _, b := range p.Binders {
				binder(b)
			}
			if p.Body != nil {
				everyNode(p.Body, node, binder)
			}
			for _, row := range p.Rows {
				parts(row)
			}
		}
	}
	parts(w.Parts)
}

func (g generator) params(depth int) (out []term.Param) {
	for range g.upTo(2) {
		out = append(out, term.Param{Name: g.name(), Type: g.term(depth)})
	}
	return out
}

func (g generator) form(depth int) *notation.Form {
	f := &notation.Form{Kind: notation.Kind(1 + g.upTo(9))}
	switch f.Kind {
	case notation.Define:
		f.Name, f.Type, f.Term = g.name(), g.term(depth), g.term(depth)
	case notation.Assume:
		f.Name, f.Type = g.name(), g.term(depth)
	case notation.Equal, notation.Differ:
		f.Type, f.Term, f.Other = g.term(depth), g.term(depth), g.term(depth)
	case notation.Normal:
		f.Term, f.Other = g.term(depth), g.term(depth)
	case notation.Show, notation.Blocked:
		f.Term = g.term(depth)
	case notation.Load:
		f.File = "quay/" + g.name() + " ;(" + ".sexp"
	case notation.Reject:
		f.Inner = g.form(depth)
	case notation.Declare:
		d := &term.Declaration{Name: g.name(), Params: g.params(depth)}
		f.Name, f.Declaration = d.Name, d
		if d.Compositions = g.upTo(2); d.Compositions > 0 {
			d.Composition = []string{"strict", "formal"}[g.upTo(1)]
		}
		for range g.upTo(3) {
			c := term.Constructor{Name: g.name(), Path: g.upTo(1) == 1, Args: g.params(depth)}
			if c.Path {
				for again := true; again; again = g.upTo(1) == 1 {
					c.Dims = append(c.Dims, term.Binder{Name: g.name()})
				}
				for range g.upTo(2) {
					c.Boundary = append(c.Boundary, term.BoundaryWall{Face: g.face(depth), Element: g.term(depth)})
				}
			}
			d.Constructors = append(d.Constructors, c)
		}
	}
	return f
}

// formsAgree compares forms of scripts, places aside.
var formsAgree = cmp.Options{
	cmp.Comparer(func(a, b *term.Written) bool { return a.Same(b) }),
	cmpopts.IgnoreTypes(term.Place{}), cmpopts.EquateEmpty(),
}

func TestScriptsReadBack(t *testing.T) {
	words := hostWords(t)
	check(t, func(t require.TestingT, g generator, depth int) {
		var forms []notation.Form
		var text strings.Builder
		for range g.upTo(5) {
			f := g.form(depth - 1)
			forms = append(forms, *f)
			text.WriteString(notation.FormatForm(f, g.upTo(90)) + "\n")
		}
		back, err := notation.ReadScript([]byte(text.String()), "s", words)
		require.NoError(t, err, "%s", text.String())
		assert.Empty(t, cmp.Diff(forms, back, formsAgree))
	})
}

func TestFormsKeepTheirPlaces(t *testing.T) {
	forms, err := notation.ReadScript([]byte("\ufeff; quay\r\n(def drum\r\n  Circle base)(reject\n(load\n \"a b.sexp\"))\n(data Berth ((A (U 0)))\n (point left ((a A)))\n  (path swing () (i)))"), "q.sexp", nil)
	require.NoError(t, err)
	place := func(line, column int) term.Place { return term.Place{File: "q.sexp", Line: line, Column: column} }
	assert.Equal(t, place(2, 1), forms[0].Place)
	assert.Equal(t, place(2, 6), forms[0].NamePlace)
	assert.Equal(t, place(3, 3), forms[0].Type.Place)
	assert.Equal(t, place(3, 10), forms[0].Term.Place)
	assert.Equal(t, place(3, 15), forms[1].Place)
	assert.Equal(t, place(4, 1), forms[1].Inner.Place)
	assert.Equal(t, place(5, 2), forms[1].Inner.FilePlace)
	assert.Equal(t, "a b.sexp", forms[1].Inner.File)
	d := forms[2].Declaration
	assert.Equal(t, place(6, 1), d.Place)
	assert.Equal(t, place(6, 15), d.Params[0].Place)
	assert.Equal(t, place(7, 2), d.Constructors[0].Place)
	assert.Equal(t, place(7, 16), d.Constructors[0].Args[0].Place)
	assert.Equal(t, place(8, 19), d.Constructors[1].Dims[0].Place)
	only, err := notation.ReadTerm("\ufeffx", "", nil)
	require.NoError(t, err)
	assert.Equal(t, 1, only.Place.Column)
}
