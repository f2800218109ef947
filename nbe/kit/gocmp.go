package kit

import (
	"context"
	"fmt"
	"strings"

	"github.com/google/go-cmp/cmp"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
)

// Options for go-cmp. Terms compare up to bound names; a difference is shown
// in the notation, line by line, with bound names numbered from the outside in
// where the terms themselves would differ in nothing else.

// CompareTerms returns the options with which cmp.Diff and cmp.Equal take
// written terms, core terms, forms, checked terms and values: terms up to
// bound names, checked terms and values by their normal forms. What cannot be
// normalised or written within its limits shows the error in its place.
func CompareTerms() cmp.Option {
	return cmp.Options{
		cmp.FilterValues(SameUpToNames, cmp.Ignore()),
		cmp.FilterValues(func(a, b *term.Written) bool { return !SameUpToNames(a, b) }, cmp.Transformer("notation", lines)),
		cmp.Transformer("written", func(f nbe.Form) *term.Written { return orError(f.Written()) }),
		cmp.Transformer("normal", func(t *nbe.Term) []*term.Written {
			if t == nil {
				return nil
			}
			return normalForms(t.Scope().Normal(context.Background(), t))
		}),
		cmp.Transformer("normal", func(v *nbe.Value) []*term.Written {
			if v == nil {
				return nil
			}
			return normalForms(v.ReadBack(context.Background()))
		}),
		coreOption[*term.Op](), coreOption[*term.Variable](), coreOption[*term.Global](),
	}
}

func coreOption[C term.Core]() cmp.Option {
	return cmp.Transformer("written", func(c C) *term.Written { return orError(term.Write(c, levelNames(c))) })
}

func normalForms(forms []nbe.Form, err error) []*term.Written {
	if err != nil {
		return []*term.Written{orError(nil, err)}
	}
	out := make([]*term.Written, len(forms))
	for k := range forms {
		out[k] = orError(forms[k].Written())
	}
	return out
}

func orError(w *term.Written, err error) *term.Written {
	if err != nil {
		return term.Name("(" + err.Error() + ")")
	}
	return w
}

// levelNames are names for the free levels of a core term.
func levelNames(c term.Core) term.Names {
	variables, dimensions := 0, 0
	term.Walk(c, func(a term.Arg) bool {
		switch a := a.(type) {
		case *term.Variable:
			variables = max(variables, a.Level+1)
		case term.Dimension:
			for _, n := range a.Dim.Names() {
				dimensions = max(dimensions, int(n)+1)
			}
		case *term.Face:
			for _, n := range a.Face.Names() {
				dimensions = max(dimensions, int(n)+1)
			}
		}
		return true
	})
	var names term.Names
	for k := range variables {
		names.Variables = append(names.Variables, fmt.Sprintf("x%d", k))
	}
	for k := range dimensions {
		names.Dimensions = append(names.Dimensions, fmt.Sprintf("i%d", k))
	}
	return names
}

// lines is a term in the notation, line by line, with its bound names numbered.
func lines(w *term.Written) []string {
	if w == nil {
		return nil
	}
	return strings.Split(notation.Format(numbered(w), 72), "\n")
}

// numbered is w with every bound name replaced by its depth, so that terms
// that differ in bound names alone are written alike.
func numbered(w *term.Written) *term.Written {
	type job struct {
		w   *term.Written
		env *bindings
		n   int
		dst **term.Written
	}
	var root *term.Written
	todo := []job{{w, nil, 0, &root}}
	for len(todo) > 0 {
		j := todo[len(todo)-1]
		todo = todo[:len(todo)-1]
		if j.w == nil {
			continue
		}
		c := *j.w
		*j.dst = &c
		if c.Kind == term.NameKind {
			for b := j.env; b != nil; b = b.outer {
				if b.left == c.Word {
					c.Word = b.right
					break
				}
			}
			continue
		}
		c.Parts = append([]term.Part(nil), c.Parts...)
		part := func(p *term.Part) {
			env, n := j.env, j.n
			p.Binders = append([]term.Binder(nil), p.Binders...)
			for k := range p.Binders {
				name := fmt.Sprintf("·%d", n)
				env = &bindings{env, p.Binders[k].Name, name}
				p.Binders[k].Name = name
				n++
			}
			if p.Body != nil {
				todo = append(todo, job{p.Body, env, n, &p.Body})
			}
		}
		for k := range c.Parts {
			p := &c.Parts[k]
			part(p)
			p.Rows = append([][]term.Part(nil), p.Rows...)
			for r := range p.Rows {
				p.Rows[r] = append([]term.Part(nil), p.Rows[r]...)
				for n := range p.Rows[r] {
					part(&p.Rows[r][n])
				}
			}
		}
	}
	return root
}
