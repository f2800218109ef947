package library

import (
	"context"
	"errors"
	"io/fs"
	"path/filepath"
	"slices"
	"testing"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
)

// Normal forms are terms: of every definition of the library, and of every term
// that testdata's scripts normalise, the normal form checks at the term's type,
// is its own normal form, and is equal to the term.

// enough bounds one call; what does not finish within it is counted and left out.
var enough = nbe.Limits{Steps: 60_000, Output: 8_000, Text: 20_000, Memory: 1 << 30}

func TestNormalFormsCheckAgain(t *testing.T) {
	files, err := filepath.Glob("testdata/*.sexp")
	if err != nil {
		t.Fatal(err)
	}
	library, err := fs.Glob(Files, "*.sexp")
	if err != nil {
		t.Fatal(err)
	}
	checked, large := 0, 0
	look := func(e *nbe.Engine, files ...string) {
		s := session(e, func(r script.Result) {
			if r.Err != nil {
				t.Fatal(shortened(r.Err))
			}
			if !slices.Contains(files, filepath.Base(r.Form.Place.File)) {
				return
			}
			var w *term.Written
			switch r.Form.Kind {
			case notation.Define:
				w = &term.Written{Kind: term.NameKind, Word: r.Form.Name}
			case notation.Normal:
				w = r.Form.Term
			default:
				return
			}
			switch ok, err := checksAgain(e.Scope(), w, enough); {
			case ok:
				checked++
			case errors.Is(err, term.OutOfBudget):
				t.Logf("%s: %s is too large", r.Form.Place, clip(w))
				large++
			default:
				t.Errorf("%s: %s: %s", r.Form.Place, clip(w), clip(err))
			}
		})
		for _, file := range files {
			if err := s.File(context.Background(), file); err != nil {
				t.Fatal(err)
			}
		}
	}
	look(newEngine(t), library...)
	for _, file := range files {
		look(newEngine(t), filepath.Base(file))
	}
	t.Logf("%d normal forms checked again, %d were too large", checked, large)
	if large*6 > checked {
		t.Errorf("%d of %d normal forms were left out", large, checked+large)
	}
}

// checksAgain reports whether the normal form of w is a term like it, and what is wrong if not.
func checksAgain(s *nbe.Scope, w *term.Written, limits nbe.Limits) (bool, error) {
	ctx, within := context.Background(), nbe.Within(limits)
	x, err := s.Infer(ctx, w, within)
	if err != nil {
		return false, err
	}
	forms, err := s.Normal(ctx, x, within)
	if err != nil {
		return false, err
	}
	n, err := forms[0].Written()
	if err != nil {
		return false, err
	}
	again, err := s.CheckLike(ctx, n, x, within)
	if err != nil {
		return false, err
	}
	if !term.Same(again.Core(), forms[0].Term) {
		return false, errors.New("what is printed reads back as another term")
	}
	twice, err := s.Normal(ctx, again, within)
	if err != nil {
		return false, err
	}
	if !term.Same(twice[0].Term, forms[0].Term) {
		return false, errors.New("normalising twice gives another form")
	}
	c, err := s.Compare(ctx, x, again, within)
	if err != nil {
		return false, err
	}
	if c.Verdict != nbe.Equal {
		return false, errors.New("the term is not equal to its normal form")
	}
	return true, nil
}
