package nbe

import (
	"fmt"

	"example.com/boxwright/nbe/term"
	"example.com/boxwright/quote"
	"example.com/boxwright/value"
)

// Comparisons that the checker requires, and its errors.

func (c *checker) comparer() *quote.Comparer {
	return quote.NewComparer(c.run, c.variableNames(), c.dimensionNames(), isHole)
}

// Same requires two terms to be equal at t.
func (c *checker) Same(t, a, b value.Value, err *term.Error) {
	cmp := c.comparer()
	if cmp.EqualAt(t, a, b) != quote.Equal {
		err.Want, err.Got = c.Show(t, a), c.Show(t, b)
		c.disagree(err, cmp)
	}
}

// SameType requires two types to be equal.
func (c *checker) SameType(a, b value.Value, err *term.Error) {
	cmp := c.comparer()
	if cmp.EqualAsTypes(a, b) != quote.Equal {
		err.Want, err.Got = c.ShowType(a), c.ShowType(b)
		c.disagree(err, cmp)
	}
}

func (c *checker) disagree(err *term.Error, cmp *quote.Comparer) {
	err.Detail = c.difference(cmp.Difference())
	c.raise(err)
}

// Included requires got ≤ want for types.
func (c *checker) Included(w *term.Written, got, want value.Value) {
	if got == want {
		return
	}
	cmp := c.comparer()
	if cmp.Included(got, want) != quote.Equal {
		c.disagree(&term.Error{Kind: term.IllTyped, Place: w.Place, Message: "the type is another", Want: c.ShowType(want), Got: c.ShowType(got)}, cmp)
	}
}

// shown is how large a term in a message may be.
const shown = 400

// Show is a value as a written term, definitions folded, for messages.
func (c *checker) Show(t, v value.Value) *term.Written { return c.written(c.ReadBack(t, v)) }

// ShowType is a type as a written term.
func (c *checker) ShowType(t value.Value) *term.Written { return c.written(c.ReadBackType(t)) }

func (c *checker) written(core term.Core) *term.Written {
	w, err := term.Write(core, term.Names{Variables: c.variableNames(), Dimensions: c.dimensionNames(), Taken: c.e.notation.Taken, Size: shown})
	if err != nil {
		return &term.Written{Kind: term.NameKind, Word: "…"}
	}
	return w
}

// Fail raises an error at w. want and got are written terms, texts or nil.
func (c *checker) Fail(w *term.Written, kind term.ErrorKind, message string, want, got any) {
	err := &term.Error{Kind: kind, Message: message}
	if w != nil {
		err.Place = w.Place
	}
	err.Want, err.WantText = either(want)
	err.Got, err.GotText = either(got)
	c.raise(err)
}

func either(x any) (*term.Written, string) {
	switch x := x.(type) {
	case nil:
		return nil, ""
	case *term.Written:
		return x, ""
	case string:
		return nil, x
	}
	return nil, fmt.Sprint(x)
}

// raise leaves the run with the error, telling the face it is under.
func (c *checker) raise(err *term.Error) {
	if !c.face.IsTop() && err.Face == "" {
		err.Face = faceText(c.face, c.dimensionNames())
	}
	c.run.Fail(err)
}
