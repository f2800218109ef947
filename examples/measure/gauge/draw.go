package gauge

import (
	"fmt"
	"html"
	"io"
	"math"
)

// Growth curves as a drawing: a panel for each growth row, both axes logarithmic
// and of the same scale, so that a slope of 1 is a diagonal. The fitted line is
// drawn through the measured points, the target's slope from the first of them.

const (
	panelWidth   = 300
	panelHeight  = 250
	panelMargin  = 42
	panelsBeside = 4
)

// WriteSVG draws the growth rows of the table.
func (t *Table) WriteSVG(w io.Writer) error {
	var rows []*Result
	for _, r := range t.Results {
		if (r.Kind == Growth || r.Kind == Factor) && len(r.Points) > 1 {
			rows = append(rows, r)
		}
	}
	lines := (len(rows) + panelsBeside - 1) / panelsBeside
	d := &drawing{w: w}
	d.f(`<svg xmlns="http://www.w3.org/2000/svg" width="%d" height="%d" font-family="sans-serif" font-size="10">`+"\n", panelsBeside*panelWidth, lines*panelHeight)
	d.f(`<rect width="100%%" height="100%%" fill="#fcfcf8"/>` + "\n")
	for k, r := range rows {
		d.panel(r, float64(k%panelsBeside*panelWidth), float64(k/panelsBeside*panelHeight))
	}
	d.f("</svg>\n")
	return d.err
}

type drawing struct {
	w   io.Writer
	err error
}

func (d *drawing) f(format string, args ...any) {
	if d.err == nil {
		_, d.err = fmt.Fprintf(d.w, format, args...)
	}
}

func (d *drawing) panel(r *Result, left, top float64) {
	lx := func(p *Point) float64 { return math.Log10(float64(p.Size)) }
	ly := func(p *Point) float64 { return math.Log10(max(p.quantity(r.Quantity), 1e-9)) }
	x0, x1, y0, y1 := math.Inf(1), math.Inf(-1), math.Inf(1), math.Inf(-1)
	var mx, my float64
	for k := range r.Points {
		p := &r.Points[k]
		x0, x1, y0, y1 = min(x0, lx(p)), max(x1, lx(p)), min(y0, ly(p)), max(y1, ly(p))
		mx, my = mx+lx(p)/float64(len(r.Points)), my+ly(p)/float64(len(r.Points))
	}
	// One scale for both axes, wide enough for the longer one.
	scale := min((panelWidth-2*panelMargin)/max(x1-x0, 0.1), (panelHeight-2*panelMargin)/max(y1-y0, 0.1))
	at := func(x, y float64) (float64, float64) {
		return left + panelMargin + (x-x0)*scale, top + panelHeight - panelMargin - (y-y0)*scale
	}
	colour := "#2a6f4e"
	if !r.Met {
		colour = "#b3362b"
	}
	d.f(`<text x="%.1f" y="%.1f" font-size="11">%s</text>`+"\n", left+8, top+14, html.EscapeString(shorten(r.Name, 52)))
	d.f(`<text x="%.1f" y="%.1f" fill="%s">%s, target %s</text>`+"\n", left+8, top+27, colour, html.EscapeString(r.found()), html.EscapeString(r.target()))
	ax, ay := at(x0, y0)
	bx, _ := at(x1, y0)
	_, cy := at(x0, y1)
	d.f(`<path d="M%.1f %.1fV%.1fH%.1f" fill="none" stroke="#999"/>`+"\n", ax, cy, ay, bx)
	if r.Kind == Growth {
		for _, l := range []struct {
			slope, x, y float64
			style       string
		}{
			{r.Target, lx(&r.Points[0]), ly(&r.Points[0]), `stroke="#aaa" stroke-dasharray="3 3"`},
			{r.Value, mx, my, `stroke="` + colour + `"`},
		} {
			px, py := at(x0, l.y+l.slope*(x0-l.x))
			qx, qy := at(x1, l.y+l.slope*(x1-l.x))
			d.f(`<path d="M%.1f %.1fL%.1f %.1f" fill="none" %s/>`+"\n", px, py, qx, qy, l.style)
		}
	}
	for k := range r.Points {
		p := &r.Points[k]
		x, y := at(lx(p), ly(p))
		d.f(`<circle cx="%.1f" cy="%.1f" r="3" fill="%s"/>`+"\n", x, y, colour)
		d.f(`<text x="%.1f" y="%.1f" fill="#666" text-anchor="middle">%d</text>`+"\n", x, ay+12, p.Size)
		if k == 0 || k == len(r.Points)-1 {
			say := nanos(p.CPU)
			if r.Quantity != "" {
				say = count(p.quantity(r.Quantity))
			}
			d.f(`<text x="%.1f" y="%.1f" fill="#666" text-anchor="middle">%s</text>`+"\n", x, y-6, say)
		}
	}
}

func shorten(s string, n int) string {
	r := []rune(s)
	if len(r) <= n {
		return s
	}
	return string(r[:n-1]) + "…"
}
