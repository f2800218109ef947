package notation_test

import (
	"errors"
	"strings"
	"testing"
	"unicode/utf8"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
)

// Forms that no text gives, built by a host, have a text too, which does not
// read as another form.
func TestBadlyBuiltFormsArePrinted(t *testing.T) {
	for name, f := range map[string]*notation.Form{
		"nil":                     nil,
		"zero":                    {},
		"a kind of none":          {Kind: notation.Load + 1},
		"a kind of none, far off": {Kind: 200},
		"nothing rejected":        {Kind: notation.Reject},
		"nothing declared":        {Kind: notation.Declare},
		"a parameter of no type":  {Kind: notation.Declare, Declaration: &term.Declaration{Name: "Berth", Params: []term.Param{{Name: "A"}}}},
	} {
		text := f.String()
		assert.Equal(t, strings.Count(text, "("), strings.Count(text, ")"), name)
		_, err := notation.ReadScript([]byte(text), "", nil)
		assert.ErrorIs(t, err, term.Malformed, "%s: %s", name, text)
	}
	nameless := &notation.Form{Kind: notation.Declare, Declaration: &term.Declaration{Name: "Berth", Params: []term.Param{{Name: "A"}}}}
	assert.Contains(t, nameless.String(), "(A ())", "each parameter has its two parts")
	declared := map[string]bool{}
	for k := notation.Define; k <= notation.Load; k++ {
		declared[k.String()] = true
	}
	assert.False(t, declared[notation.Kind(200).String()])
}

// What a declaration says of composition is read back, also where a host sets
// it without counting clauses, or counts more than one.
func TestCompositionClausesReadBack(t *testing.T) {
	for _, c := range []struct {
		composition string
		clauses     int
	}{{"", 0}, {"strict", 0}, {"formal", 0}, {"strict", 1}, {"formal", 1}, {"strict", 2}, {"formal", 2}} {
		d := &term.Declaration{Name: "Berth", Composition: c.composition, Compositions: c.clauses}
		text := (&notation.Form{Kind: notation.Declare, Declaration: d}).String()
		forms, err := notation.ReadScript([]byte(text), "", nil)
		require.NoError(t, err, text)
		want := c.clauses
		if c.composition != "" {
			want = max(want, 1)
		}
		assert.Equal(t, want, forms[0].Declaration.Compositions, text)
		if c.clauses < 2 {
			assert.Equal(t, c.composition, forms[0].Declaration.Composition, text)
		}
	}
}

// A message quotes what was found in a few words, whole characters all of them.
func TestLongWordsAreCutOffInMessages(t *testing.T) {
	for _, word := range []string{strings.Repeat("x", 500), strings.Repeat("荷", 500), "x" + strings.Repeat("荷", 500), "xy" + strings.Repeat("荷", 500), strings.Repeat("é", 500)} {
		for _, text := range []string{"(U " + word + ")", `(U "` + word + `")`, "(lam ((" + word + ")) x)"} {
			_, err := notation.ReadTerm(text, "", nil)
			var e *term.Error
			require.True(t, errors.As(err, &e), text)
			assert.Less(t, len(e.GotText), 200)
			assert.True(t, utf8.ValidString(e.GotText), e.GotText)
			assert.Contains(t, e.GotText, "…")
		}
	}
}

// The usage of a host's former names each slot, and what it names is what is
// asked for: an example of it reads.
func TestUsageOfHostsFormersNamesEachSlot(t *testing.T) {
	words, err := notation.NewWords(term.Shape{Word: "stack", Slots: []term.Slot{
		{Sort: term.LevelSort}, {Sort: term.NameSort}, {Sort: term.DimensionSort}, {Sort: term.FaceSort}, {},
	}})
	require.NoError(t, err)
	_, err = notation.ReadTerm("(stack)", "", words)
	var e *term.Error
	require.True(t, errors.As(err, &e))
	assert.Equal(t, "(stack n NAME r φ a)", e.WantText)
	_, err = notation.ReadTerm("(stack 1 crane 0 top x)", "", words)
	assert.NoError(t, err)
}
