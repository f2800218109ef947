package library

import (
	"context"
	"errors"
	"fmt"
	"io/fs"
	"os"
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
// is its own normal form, and is equal to the term. So is, for each definition,
// the form that keeps the definitions in its body folded; the largest proofs, whose
// normal forms have hundreds of thousands of nodes as shared graphs and more, are
// looked at in that form alone. BOXWRIGHT_LONG=1 takes larger ones, and tells the
// sizes of what it leaves out (with -v).

// enough bounds one call; what does not finish within it is left out.
var enough = nbe.Limits{Steps: 100_000, Output: 8_000, Text: 20_000, Memory: 1 << 30}

var long = os.Getenv("BOXWRIGHT_LONG") != ""

func init() {
	if long {
		enough = nbe.Limits{Steps: 10_000_000, Output: 50_000, Text: 150_000, Memory: 8 << 30}
	}
}

// immense are the definitions that are too large in either form: what is folded
// in them stands under a transport or a composite of types, which computes.
var immense = []string{"loops-set", "word-is-transport", "box1", "box2", "box3"}

func TestNormalFormsCheckAgain(t *testing.T) {
	files, err := filepath.Glob("testdata/*.sexp")
	if err != nil {
		t.Fatal(err)
	}
	library, err := fs.Glob(Files, "*.sexp")
	if err != nil {
		t.Fatal(err)
	}
	complete, folded := 0, 0
	look := func(e *nbe.Engine, files ...string) {
		s := session(e, func(r script.Result) {
			if r.Err != nil {
				t.Fatal(shortened(r.Err))
			}
			if !slices.Contains(files, filepath.Base(r.Form.Place.File)) {
				return
			}
			w := r.Form.Term
			err := error(nil)
			switch r.Form.Kind {
			case notation.Define:
				w = &term.Written{Kind: term.NameKind, Word: r.Form.Name}
				// folded first, since what has been evaluated is not folded any more
				_, err = checksAgain(e.Scope(), term.Ann(r.Form.Term, r.Form.Type), enough, nbe.AllFolded())
				if err == nil {
					folded++
				} else if !errors.Is(err, term.OutOfBudget) {
					t.Errorf("%s: %s: %s", r.Form.Place, clip(w), clip(err))
				}
			case notation.Normal:
				err = errors.New("there is no body to look at")
			default:
				return
			}
			switch ok, whole := checksAgain(e.Scope(), w, enough); {
			case ok:
				complete++
			case !errors.Is(whole, term.OutOfBudget):
				t.Errorf("%s: %s: %s", r.Form.Place, clip(w), clip(whole))
			case err != nil && !slices.Contains(immense, r.Form.Name):
				t.Errorf("%s: %s is too large, and folded: %s", r.Form.Place, clip(w), clip(err))
			default:
				t.Logf("%s: %s is large (%s), folded: %v", r.Form.Place, clip(w), size(e.Scope(), w), err == nil)
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
	t.Logf("%d normal forms checked again, and %d with the other definitions folded", complete, folded)
	if complete < folded*3/4 {
		t.Errorf("only %d normal forms were checked again without folding, and %d with it", complete, folded)
	}
}

// size is how large a normal form is, where that is asked for and can be said.
func size(s *nbe.Scope, w *term.Written) string {
	if !long {
		return "BOXWRIGHT_LONG=1 says how large"
	}
	ctx := context.Background()
	x, err := s.Infer(ctx, w)
	if err != nil {
		return clip(err)
	}
	forms, err := s.Normal(ctx, x, nbe.Within(nbe.Limits{Steps: 3_000_000, Output: 1_000_000}))
	if err != nil {
		return clip(err)
	}
	tree, nodes := term.Size(forms[0].Term)
	return fmt.Sprintf("%d nodes, %v as a tree", nodes, tree)
}

// checksAgain reports whether the normal form of w, as the options have it, is a
// term like w, and what is wrong if not.
func checksAgain(s *nbe.Scope, w *term.Written, limits nbe.Limits, options ...nbe.CallOption) (bool, error) {
	ctx, within := context.Background(), nbe.Within(limits)
	folds := append(options, within)
	x, err := s.Infer(ctx, w, within)
	if err != nil {
		return false, err
	}
	forms, err := s.Normal(ctx, x, folds...)
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
	twice, err := s.Normal(ctx, again, folds...)
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
