package notation

import (
	"strings"

	"example.com/boxwright/nbe/term"
)

// Written terms and forms of scripts to text.

// Print returns w on one line; [ReadTerm] reads the same tree back from it. A
// text longer than [term.MaxText] is cut off and ends in "…", which does not
// read back.
func Print(w *term.Written) string { return w.String() }

// String returns the form on one line; [ReadScript] reads the same form back
// from it. A path with a double quote or a line feed in it has no text that
// reads back, and neither has a term that [Print] cuts off.
func (f *Form) String() string {
	var b strings.Builder
	rejects := 0
	for f != nil && f.Kind == Reject {
		b.WriteString("(reject ")
		rejects++
		f = f.Inner
	}
	if f == nil {
		f = &Form{}
	}
	b.WriteString("(" + f.Kind.String())
	word := func(s string) { b.WriteString(" " + s) }
	switch f.Kind {
	case Define, Assume:
		word(f.Name)
	case Load:
		word(`"` + f.File + `"`)
	case Declare:
		if f.Declaration != nil {
			printDeclaration(&b, f.Declaration)
		}
	}
	for _, t := range []*term.Written{f.Type, f.Term, f.Other} {
		if t != nil {
			word(t.String())
		}
	}
	b.WriteString(")" + strings.Repeat(")", rejects))
	return b.String()
}

func printDeclaration(b *strings.Builder, d *term.Declaration) {
	b.WriteString(" " + d.Name + " ")
	printTelescope(b, d.Params)
	for k := range d.Compositions {
		// Which one a second clause asked for is not kept; that there were several is.
		if k == 0 || d.Composition != "strict" {
			b.WriteString(" (composition " + d.Composition + ")")
		} else {
			b.WriteString(" (composition formal)")
		}
	}
	if d.Compositions == 0 && d.Composition != "" {
		b.WriteString(" (composition " + d.Composition + ")")
	}
	for _, c := range d.Constructors {
		word := " (point "
		if c.Path {
			word = " (path "
		}
		b.WriteString(word + c.Name + " ")
		printTelescope(b, c.Args)
		if c.Path {
			b.WriteString(" (")
			for k, i := range c.Dims {
				if k > 0 {
					b.WriteString(" ")
				}
				b.WriteString(i.Name)
			}
			b.WriteString(")")
			for _, wall := range c.Boundary {
				b.WriteString(" (" + textOf(wall.Face) + " " + textOf(wall.Element) + ")")
			}
		}
		b.WriteString(")")
	}
}

func printTelescope(b *strings.Builder, params []term.Param) {
	b.WriteString("(")
	for k, p := range params {
		if k > 0 {
			b.WriteString(" ")
		}
		b.WriteString("(" + p.Name + " " + textOf(p.Type) + ")")
	}
	b.WriteString(")")
}

// textOf is the text of w, or of nothing where a badly built form lacks it.
func textOf(w *term.Written) string {
	if w == nil {
		return "()"
	}
	return w.String()
}
