package kit_test

import (
	"encoding/xml"
	"io"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/kit"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// What rapid draws checks, and pastes back as a script that does too.
func TestTermsForRapid(t *testing.T) {
	f := kit.Everything()
	e := kit.Engine(t, f.Script)
	rapid.Check(t, func(r *rapid.T) {
		x := kit.Terms(f).Draw(r, "term")
		s := x.Scope(t, e)
		_, err := s.Check(t.Context(), x.Term, x.Type)
		require.NoError(r, err)
	})
	x := kit.DrawTerm(f, kit.FromSeed(3))
	kit.Engine(t, f.Script+x.Script())
}

func FuzzLawsOfPairs(f *testing.F) { kit.FuzzLaws(f, kit.Builtin()[2]) }

// Bytes draw the same term again, and the end of the bytes is the simplest one.
func TestTermsFromBytes(t *testing.T) {
	f := kit.Builtin()[2]
	data := []byte{1, 2, 3, 4, 5, 6, 7, 8, 9}
	require.Equal(t, kit.DrawTerm(f, kit.FromBytes(data)).Script(), kit.DrawTerm(f, kit.FromBytes(data)).Script())
	require.NotEqual(t, kit.DrawTerm(f, kit.FromBytes(data)).Script(), kit.DrawTerm(f, kit.FromBytes(nil)).Script())
}

// broken is a former whose transports forget their face, for the reports.
func broken(t *testing.T, options ...kit.Option) *kit.Failure {
	r := rightDuo()
	right := r.transp
	r.transp = func(run *value.Run, t *duoType, i value.Name, _ interval.Face, p value.Value) value.Value {
		return right(run, t, i, interval.Bot(), p)
	}
	f, err := kit.FindFailure(duos("duos without faces", r), append([]kit.Option{kit.Trials(100), kit.Only(kit.LawConstancy)}, options...)...)
	require.NoError(t, err)
	require.NotNil(t, f)
	return f
}

func TestReportsOfFailures(t *testing.T) {
	f := broken(t)
	for _, part := range []string{"breaks the law of constancy", "(= k 0)", "differ", "kit.Seed(", "rigid", "as a script"} {
		require.Contains(t, f.Report(), part)
	}
	// the seed reproduces it, and the failure is the same each time
	again, err := kit.FindFailure(duos("duos without faces", rightDuo()), kit.Seed(f.Seed), kit.Trials(1))
	require.NoError(t, err)
	require.Nil(t, again, "the right former passes on the same input")
	require.Equal(t, f.Report(), broken(t).Report())
	require.Equal(t, f.Report(), broken(t, kit.Seed(f.Seed), kit.Trials(1)).Report())
	require.LessOrEqual(t, f.Kept, f.Drawn)

	// the script can be pasted, and its last form fails
	report, failed := kit.RunArchive(t, kit.ParseArchive("-- main.sexp --\n"+f.Script()), f.Options...)
	require.Len(t, failed, 1, report)
	kit.ErrorIs(t, failed[0], term.Unequal)

	// the SVG is well formed and marks the face in another colour
	svg := f.SVG()
	d := xml.NewDecoder(strings.NewReader(svg))
	for {
		_, err := d.Token()
		if err == io.EOF {
			break
		}
		require.NoError(t, err)
	}
	require.Contains(t, svg, "#c00")
	kit.Golden(t, "testdata/drawing/rigid.svg", svg)
}

// A generator that draws what is ill-typed is told so, and not the former.
func TestIllTypedInputIsTold(t *testing.T) {
	f, err := kit.FindFailure(kit.Former{Name: "nonsense", Types: func(g *kit.Gen) kit.Sample {
		return kit.Sample{Type: term.Name("Nat"), Element: func(*kit.Gen) *term.Written { return term.Form("unit") }}
	}})
	require.NoError(t, err)
	require.Equal(t, kit.LawInput, f.Law)
	f, err = kit.FindFailure(kit.Former{Name: "panics", Types: func(g *kit.Gen) kit.Sample { panic("no") }})
	require.NoError(t, err)
	require.Equal(t, kit.LawInput, f.Law)
	_, err = kit.FindFailure(kit.Former{Name: "clash", Options: []nbe.Option{nbe.WithFormers(prims.Table()...)}})
	kit.ErrorIs(t, err, term.Duplicate)
}
