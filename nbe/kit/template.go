package kit

import (
	"fmt"

	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
)

// Fill reads a term in the notation, of the words w (nil: those of the
// notation), and puts terms for names in it: pairs are names and the terms to
// put for them, as they are: what stands under a binder of the text may mention
// its name. Dimensions and faces are put in the same way. It is meant for the terms of generators, which are written down
// once; a text that cannot be read panics.
func Fill(w *notation.Words, text string, pairs ...any) *term.Written {
	t, err := notation.ReadTerm(text, "template", w)
	if err != nil {
		panic(fmt.Sprintf("kit.Fill: %v", err))
	}
	put := map[string]*term.Written{}
	for k := 0; k+1 < len(pairs); k += 2 {
		switch x := pairs[k+1].(type) {
		case *term.Written:
			put[pairs[k].(string)] = x
		case string:
			put[pairs[k].(string)] = term.Name(x)
		default:
			panic(fmt.Sprintf("kit.Fill: %T is no term", x))
		}
	}
	return replace(t, put, map[string]bool{})
}

// fill is Fill for the words of the notation.
func fill(text string, pairs ...any) *term.Written { return Fill(nil, text, pairs...) }
