package kit

import (
	"fmt"
	"strings"
)

// Drawings of a box: one panel for each dimension, seen from the side. The
// ground is the base at the bottom, where the walls' dimension is 0; the lid is
// what the operation makes, at the top; the two edges are the two ends of the
// panel's dimension. An edge with a wall is built, an edge without one is open;
// where a transport is the identity the edge is rigid. What is at fault is
// marked. Walls on corners, which belong to no single edge, are posts and are
// listed below.

// edge is the state of one part of a panel.
type edge int

const (
	open edge = iota
	built
	rigid
)

// panel is the view of a box along one dimension.
type panel struct {
	dimension   string
	edges       [2]edge
	faults      [2]bool
	lid, ground bool // at fault
}

// drawing is a box taken apart for both renderings.
type drawing struct {
	title  string
	panels []panel
	legend []legend
}

type legend struct {
	name, text string
	fault      bool
}

func (f *Failure) drawing() drawing {
	x := f.Instance
	d := drawing{title: fmt.Sprintf("%s in %s", x.Op, clip(x.Type.String(), 100))}
	if x.Op != Hcomp {
		d.title = fmt.Sprintf("%s along i. %s", x.Op, clip(x.Type.String(), 100))
	}
	faulty := func(e []End) bool {
		if f.Face == nil {
			return false
		}
		at := ends(f.Face)
		if len(at) != len(e) {
			return false
		}
		for k := range at {
			if at[k] != e[k] {
				return false
			}
		}
		return true
	}
	for _, dim := range x.Dimensions {
		p := panel{dimension: dim, lid: f.Face == nil && f.Where != "r := 0", ground: f.Where == "r := 0"}
		put := func(e []End, what edge) {
			if len(e) == 1 && e[0].Dimension == dim {
				side := 0
				if e[0].One {
					side = 1
				}
				p.edges[side] = what
				p.faults[side] = faulty(e)
			}
		}
		for _, w := range x.Walls {
			put(w.Ends, built)
		}
		for _, face := range x.Faces {
			put(ends(face), rigid)
		}
		d.panels = append(d.panels, p)
	}
	first := d.panels[0]
	d.legend = append(d.legend, legend{"lid", f.lidText(), first.lid}, legend{"ground", x.Base.String(), first.ground})
	for _, w := range x.Walls {
		name := "wall"
		if len(w.Ends) > 1 {
			name = "post"
		}
		d.legend = append(d.legend, legend{name, w.Face.String() + "  i. " + w.Body.String(), faulty(w.Ends)})
	}
	for _, face := range x.Faces {
		d.legend = append(d.legend, legend{"rigid", face.String(), faulty(ends(face))})
	}
	return d
}

func (f *Failure) lidText() string {
	what := "what the " + f.Instance.Op.String() + " makes"
	if f.What != "" && f.Face == nil {
		what += "; at fault: " + f.What
		if f.Where != "" {
			what += " at " + f.Where
		}
	}
	return what
}

// Drawing is the box as plain text.
func (f *Failure) Drawing() string {
	if f.Instance == nil {
		return ""
	}
	d := f.drawing()
	var b strings.Builder
	fmt.Fprintf(&b, "  %s\n", d.title)
	const width = 21
	rule := func(left, mid, right string, fault bool) string {
		line := left + strings.Repeat(mid, width) + right
		if fault {
			line += " <!"
		}
		return line
	}
	mark := func(e edge, fault bool) string {
		switch {
		case fault:
			return "!"
		case e == built:
			return "#"
		case e == rigid:
			return "="
		}
		return ":"
	}
	for _, p := range d.panels {
		l, r := mark(p.edges[0], p.faults[0]), mark(p.edges[1], p.faults[1])
		fmt.Fprintf(&b, "    i=1 %s  lid\n", rule(l, "~", r, p.lid))
		for range 3 {
			fmt.Fprintf(&b, "        %s%s%s\n", l, strings.Repeat(" ", width), r)
		}
		fmt.Fprintf(&b, "    i=0 %s  ground\n", rule(l, "_", r, p.ground))
		fmt.Fprintf(&b, "        %s=0%s%s=1\n", p.dimension, strings.Repeat(" ", width-3), p.dimension)
	}
	for _, g := range d.legend {
		at := " "
		if g.fault {
			at = "!"
		}
		fmt.Fprintf(&b, "  %s %-7s %s\n", at, g.name, clip(g.text, 300))
	}
	b.WriteString("    # wall   = identity   : open   ! at fault\n")
	return b.String()
}

// SVG is the box as a drawing of its own, in the layout of [Failure.Drawing].
func (f *Failure) SVG() string {
	if f.Instance == nil {
		return ""
	}
	d := f.drawing()
	const side, gap, top = 140, 90, 50
	width := max(gap+len(d.panels)*(side+gap), 640)
	height := top + side + 60 + 20*len(d.legend) + 20
	var b strings.Builder
	fmt.Fprintf(&b, `<svg xmlns="http://www.w3.org/2000/svg" width="%d" height="%d" font-family="monospace" font-size="12">`+"\n", width, height)
	fmt.Fprintf(&b, `<rect width="100%%" height="100%%" fill="white"/>`+"\n")
	text := func(x, y int, colour, s string) {
		fmt.Fprintf(&b, `<text x="%d" y="%d" fill="%s">%s</text>`+"\n", x, y, colour, escape(s))
	}
	stroke := func(x1, y1, x2, y2 int, e edge, fault bool) {
		colour, w, dash := "#888", 1, ` stroke-dasharray="2 4"`
		if e == built {
			colour, w, dash = "#225", 4, ""
		}
		if e == rigid {
			colour, w, dash = "#225", 4, ` stroke-dasharray="8 3"`
		}
		if fault {
			colour, w = "#c00", 5
		}
		fmt.Fprintf(&b, `<line x1="%d" y1="%d" x2="%d" y2="%d" stroke="%s" stroke-width="%d"%s/>`+"\n", x1, y1, x2, y2, colour, w, dash)
	}
	text(20, 24, "black", clip(d.title, 90))
	for k, p := range d.panels {
		x := gap + k*(side+gap)
		y := top
		stroke(x, y, x+side, y, open, p.lid)
		stroke(x, y+side, x+side, y+side, built, p.ground)
		stroke(x, y, x, y+side, p.edges[0], p.faults[0])
		stroke(x+side, y, x+side, y+side, p.edges[1], p.faults[1])
		text(x+side/2-10, y-6, "black", "lid")
		text(x+side/2-20, y+side+16, "black", "ground")
		text(x-30, y+side+32, "black", p.dimension+"=0")
		text(x+side, y+side+32, "black", p.dimension+"=1")
		if k == 0 {
			text(x-60, y+8, "black", "i=1")
			text(x-60, y+side, "black", "i=0")
		}
	}
	for k, g := range d.legend {
		colour := "black"
		if g.fault {
			colour = "#c00"
		}
		text(20, top+side+60+20*k, colour, fmt.Sprintf("%-7s %s", g.name, clip(g.text, 80)))
	}
	b.WriteString("</svg>\n")
	return b.String()
}

func escape(s string) string {
	return strings.NewReplacer("&", "&amp;", "<", "&lt;", ">", "&gt;").Replace(s)
}
