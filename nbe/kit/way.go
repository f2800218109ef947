package kit

import (
	"fmt"
	"strings"

	"example.com/boxwright/nbe/term"
)

// Where two written terms differ, up to bound names. Both walks keep their own
// list of work, so that nesting costs no stack.

// Way is the way from the root of two terms to the smallest parts that hold
// every difference between them, or to the first difference where those parts
// would be long. Equal terms have no way.
type Way struct {
	Steps       []string
	Left, Right *term.Written // nil for equal terms
	More        int           // how many more places differ beside the one shown
}

// String tells the way and the two parts in one line.
func (w Way) String() string {
	if w.Left == nil {
		return "no difference"
	}
	text := ""
	if len(w.Steps) > 0 {
		text = "at " + strings.Join(w.Steps, ", ") + ": "
	}
	text += clip(w.Left.String(), 200) + " is not " + clip(w.Right.String(), 200)
	switch {
	case w.More == 1:
		text += ", and one part beside it differs"
	case w.More > 1:
		text += fmt.Sprintf(", and %d parts beside it differ", w.More)
	}
	return text
}

// bindings pairs the names bound around two terms, innermost first.
type bindings struct {
	outer       *bindings
	left, right string
}

func (b *bindings) same(left, right string) bool {
	for ; b != nil; b = b.outer {
		if b.left == left || b.right == right {
			return b.left == left && b.right == right
		}
	}
	return left == right
}

func (b *bindings) bind(left, right []term.Binder) *bindings {
	for k := range left {
		b = &bindings{b, left[k].Name, right[k].Name}
	}
	return b
}

// pair is two terms to be compared under what binds around them.
type pair struct {
	a, b *term.Written
	env  *bindings
	step string
}

// SameUpToNames reports whether two written terms are the same up to bound names.
func SameUpToNames(a, b *term.Written) bool { return pair{a: a, b: b}.equal() }

func (p pair) equal() bool {
	todo := []pair{p}
	for len(todo) > 0 {
		p := todo[len(todo)-1]
		todo = todo[:len(todo)-1]
		if p.a == p.b && p.env == nil {
			continue
		}
		parts, ok := p.parts()
		if !ok {
			return false
		}
		todo = append(todo, parts...)
	}
	return true
}

// parts are the parts of both terms, side by side; ok is false where the
// terms differ at their roots.
func (p pair) parts() (out []pair, ok bool) {
	a, b := p.a, p.b
	if a == nil || b == nil {
		return nil, a == b
	}
	if a.Kind != b.Kind || len(a.Parts) != len(b.Parts) {
		return nil, false
	}
	switch a.Kind {
	case term.NameKind:
		return nil, p.env.same(a.Word, b.Word)
	case term.NumeralKind:
		return nil, a.Number == b.Number || a.Number != nil && b.Number != nil && a.Number.Cmp(b.Number) == 0
	case term.FormKind:
		if a.Word != b.Word {
			return nil, false
		}
	}
	name := a.Word
	if a.Kind == term.ApplyKind {
		name = "an application"
	}
	for k := range a.Parts {
		if out, ok = p.part(out, a.Parts[k], b.Parts[k], fmt.Sprintf("part %d of %s", k+1, name)); !ok {
			return nil, false
		}
	}
	return out, true
}

func (p pair) part(out []pair, a, b term.Part, step string) ([]pair, bool) {
	if len(a.Binders) != len(b.Binders) || len(a.Rows) != len(b.Rows) {
		return nil, false
	}
	env := p.env.bind(a.Binders, b.Binders)
	if a.Body != nil || b.Body != nil {
		out = append(out, pair{a.Body, b.Body, env, step})
	}
	for k := range a.Rows {
		if len(a.Rows[k]) != len(b.Rows[k]) {
			return nil, false
		}
		for n := range a.Rows[k] {
			if n > 0 && len(a.Rows[k][n].Rows)+len(b.Rows[k][n].Rows) > 0 {
				return nil, false // no form of the notation nests rows
			}
			x, y := a.Rows[k][n], b.Rows[k][n]
			if len(x.Binders) != len(y.Binders) {
				return nil, false
			}
			out = append(out, pair{x.Body, y.Body, env.bind(x.Binders, y.Binders), fmt.Sprintf("row %d, %s", k+1, step)})
		}
	}
	return out, true
}

// shortPart is how long a part may be for the way to stop at it.
const shortPart = 60

// WayTo is the shortest way to where a and b differ. Cost: at worst the depth
// of the difference times the size of the terms.
func WayTo(a, b *term.Written) Way {
	at := pair{a: a, b: b}
	var way Way
	if at.equal() {
		return way
	}
	for {
		parts, ok := at.parts()
		if !ok {
			break
		}
		var differing []pair
		for _, p := range parts {
			if !p.equal() {
				differing = append(differing, p)
			}
		}
		if len(differing) > 1 && max(len(at.a.Text(shortPart)), len(at.b.Text(shortPart))) <= shortPart {
			break
		}
		way.More += len(differing) - 1
		at = differing[0]
		way.Steps = append(way.Steps, at.step)
	}
	way.Left, way.Right = at.a, at.b
	return way
}
