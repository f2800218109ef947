package notation

import (
	"context"
	"slices"

	"example.com/boxwright/nbe/term"
)

// Lists to the forms of scripts. A script is read whole before any of its
// forms is handled, so that text which cannot be read is found first.

// Kind tells the forms of scripts apart.
type Kind uint8

const (
	// Define is (def NAME T t).
	Define Kind = iota + 1
	// Assume is (assume NAME T).
	Assume
	// Declare is (data NAME (PARAM …) CLAUSE …).
	Declare
	// Equal is (same T a b).
	Equal
	// Differ is (differ T a b).
	Differ
	// Normal is (normal t n).
	Normal
	// Show is (show t).
	Show
	// Blocked is (blocked t).
	Blocked
	// Reject is (reject FORM).
	Reject
	// Load is (load "FILE").
	Load
)

var kindWords = [...]string{"", "def", "assume", "data", "same", "differ", "normal", "show", "blocked", "reject", "load"}

// String returns the head word of the form.
func (k Kind) String() string {
	if int(k) < len(kindWords) {
		return kindWords[k]
	}
	return "unknown form"
}

// Form is one form of a script. Which fields it uses, its Kind says.
type Form struct {
	Kind        Kind
	Place       term.Place
	Name        string            // of Define and Assume
	NamePlace   term.Place        // where the name stands
	Type        *term.Written     // of Define, Assume, Equal, Differ
	Term        *term.Written     // of Define, Normal, Show, Blocked; the first of Equal and Differ
	Other       *term.Written     // the second of Equal and Differ; what Normal gives
	Declaration *term.Declaration // of Declare
	Inner       *Form             // of Reject
	File        string            // of Load, as written
	FilePlace   term.Place        // where it stands
}

var formUsage = [...]string{
	"a form of a script", "(def NAME T t)", "(assume NAME T)", "(data NAME (PARAM …) CLAUSE …)", "(same T a b)",
	"(differ T a b)", "(normal t n)", "(show t)", "(blocked t)", "(reject FORM)", `(load "FILE")`,
}

// ReadScript reads a whole script of the words w (nil: those of the notation).
// Places carry file. The first fault in the text is reported, with the errors
// of [ReadTerm], and then there are no forms; a text without forms is a script.
// Cost: linear in src, but for the conversion of long numerals. Safe for
// concurrent use.
func ReadScript(src []byte, file string, w *Words) ([]Form, error) {
	return ReadScriptContext(context.Background(), src, file, w)
}

// ReadScriptContext is [ReadScript] in a context, whose end is the error Cancelled.
func ReadScriptContext(ctx context.Context, src []byte, file string, w *Words) ([]Form, error) {
	r := newReader(ctx, string(src), file, w)
	var out []Form
	for {
		n, ok, err := r.lists.next()
		if err != nil {
			return nil, err
		}
		if !ok {
			return out, nil
		}
		form := r.script(&n)
		if err := r.run(); err != nil {
			return nil, err
		}
		out = append(out, *form)
	}
}

// script reads one form of a script. Terms are put on the list of work.
func (r *reader) script(n *node) *Form {
	form := &Form{}
	for f := form; ; f = f.Inner {
		f.Place = r.place(n)
		if listOf(n) && n.items[0].kind == wordNode {
			f.Kind = Kind(max(0, slices.Index(kindWords[1:], n.items[0].text)+1))
		}
		if f.Kind == 0 {
			r.fault(n, formUsage[0])
			return form
		}
		if !r.fill(f, n.items[1:]) {
			r.fault(n, formUsage[f.Kind])
			return form
		}
		if f.Kind != Reject {
			return form
		}
		f.Inner = &Form{}
		n = &n.items[1]
	}
}

// fill reads the parts of a form of a script; false says that their number is wrong.
func (r *reader) fill(f *Form, items []node) bool {
	want := 2
	switch f.Kind {
	case Define, Equal, Differ:
		want = 3
	case Show, Blocked, Reject, Load:
		want = 1
	case Declare:
		return r.declaration(f, items)
	}
	if len(items) != want {
		return false
	}
	switch f.Kind {
	case Define, Assume:
		b := r.binder(&items[0])
		f.Name, f.NamePlace = b.Name, b.Place
		r.put(&items[1], termHere, &f.Type)
		if f.Kind == Define {
			r.put(&items[2], termHere, &f.Term)
		}
	case Equal, Differ:
		r.put(&items[0], termHere, &f.Type)
		r.put(&items[1], termHere, &f.Term)
		r.put(&items[2], termHere, &f.Other)
	case Normal:
		r.put(&items[0], termHere, &f.Term)
		r.put(&items[1], termHere, &f.Other)
	case Show, Blocked:
		r.put(&items[0], termHere, &f.Term)
	case Load:
		if items[0].kind != textNode {
			r.fault(&items[0], `a file's path in double quotes`)
		}
		f.File, f.FilePlace = r.name(items[0].text), r.place(&items[0])
	}
	return true
}

// declaration reads (data NAME (PARAM …) CLAUSE …).
func (r *reader) declaration(f *Form, items []node) bool {
	if len(items) < 2 {
		return false
	}
	b := r.binder(&items[0])
	d := &term.Declaration{Name: b.Name, Place: f.Place}
	f.Name, f.NamePlace, f.Declaration = b.Name, b.Place, d
	d.Params = r.telescope(&items[1])
	clauses := items[2:]
	// Asking for both treatments of composition is not malformed but a declaration to be refused, so all such clauses are read.
	for len(clauses) > 0 && isClause(&clauses[0], "composition") {
		c := &clauses[0]
		d.Compositions++
		if len(c.items) != 2 || c.items[1].kind != wordNode || c.items[1].text != "strict" && c.items[1].text != "formal" {
			r.fault(c, "(composition strict) or (composition formal)")
		} else if d.Compositions == 1 {
			d.Composition = r.name(c.items[1].text)
		}
		clauses = clauses[1:]
	}
	// Boundaries are read into place by address.
	d.Constructors = make([]term.Constructor, len(clauses))
	for k := range clauses {
		r.clause(&clauses[k], &d.Constructors[k])
	}
	return true
}

func isClause(n *node, word string) bool {
	return listOf(n) && n.items[0].kind == wordNode && n.items[0].text == word
}

// telescope reads ((x A) …), which may be empty.
func (r *reader) telescope(n *node) []term.Param {
	if n.kind != listNode {
		r.fault(n, "a list of (x A)")
		return nil
	}
	out := make([]term.Param, len(n.items))
	for k := range n.items {
		item := &n.items[k]
		if item.kind != listNode || len(item.items) != 2 {
			r.fault(item, "(x A)")
			continue
		}
		b := r.binder(&item.items[0])
		out[k].Name, out[k].Place = b.Name, b.Place
		r.put(&item.items[1], termHere, &out[k].Type)
	}
	return out
}

// clause reads (point c (ARG …)) or (path c (ARG …) (i …) (φ e) …).
func (r *reader) clause(n *node, c *term.Constructor) {
	switch {
	case isClause(n, "point") && len(n.items) == 3:
	case isClause(n, "path") && len(n.items) >= 4:
		c.Path = true
	case isClause(n, "path"):
		r.fault(n, "(path c ((x T) …) (i …) (φ e) …)")
		return
	default:
		want := "(point c ((x T) …))"
		if !isClause(n, "point") {
			want = "a point or a path clause"
		}
		r.fault(n, want)
		return
	}
	c.Place = r.place(n)
	c.Name = r.binder(&n.items[1]).Name
	c.Args = r.telescope(&n.items[2])
	if !c.Path {
		return
	}
	if !listOf(&n.items[3]) {
		r.fault(&n.items[3], "a list of dimensions")
		return
	}
	c.Dims = r.binders(n.items[3].items)
	walls := n.items[4:]
	c.Boundary = make([]term.BoundaryWall, len(walls))
	for k := range walls {
		if walls[k].kind != listNode || len(walls[k].items) != 2 {
			r.fault(&walls[k], "(φ e)")
			continue
		}
		r.put(&walls[k].items[0], faceHere, &c.Boundary[k].Face)
		r.put(&walls[k].items[1], termHere, &c.Boundary[k].Element)
	}
}
