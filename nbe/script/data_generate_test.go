package script_test

// Random declarations, and random terms of what they declare: telescopes with
// arguments of a parameter, recursive ones, under functions, over the interval
// and along paths; path constructors of one or two dimensions whose boundaries
// use arguments, paths, earlier constructors and composites. Everything is well
// typed by construction: the walls of one system are faces of one element.
//
// An element is a text in which dimensions stand in braces, so that putting
// interval expressions for them is replacing text; binders are never named alike.

import (
	"fmt"
	"slices"
	"strings"

	"pgregory.net/rapid"
)

// declared is a random declaration.
type declared struct {
	params  []string // their names: A, f
	formal  bool
	points  []con
	paths   []con
	clauses []string
}

type con struct {
	name string
	args []arg
	dims int
	// whether the identity, written as an elimination, is typed by the boundary alone
	plain bool
}

// arg is an argument; kind says its type.
type arg struct{ name, kind string }

// types of arguments at the parameters P, the dimensions of the parameters at R
func (d *declared) typeOf(kind, at string) string {
	self := d.self(at)
	switch kind {
	case "label":
		return d.label(at)
	case "nat":
		return "Nat"
	case "self":
		return self
	case "function":
		return "(-> Bool " + self + ")"
	case "interval":
		return "(-> I " + self + ")"
	case "loop":
		return "(Path " + self + " pt0 pt0)"
	case "pair":
		return d.label(at)
	}
	panic(kind)
}

func (d *declared) label(at string) string {
	if len(d.params) == 0 {
		return "Nat"
	}
	return d.param("A", at)
}

// over is the type of the second part of a pair of arguments, whose first is x.
func (d *declared) over(at, x string) string {
	switch {
	case len(d.params) == 0: // a family that recursion over a number makes
		return "(elim (_ (U 0)) " + x + " (zero Nat) ((suc k h) Bool))"
	case !d.has("B"):
		return "Nat"
	}
	if at == "" {
		return "(B " + x + ")"
	}
	return "(B " + at + " " + x + ")"
}

func (d *declared) has(param string) bool { return slices.Contains(d.params, param) }

// param is a parameter, or the line of it at a dimension.
func (d *declared) param(name, at string) string {
	if at == "" {
		return name
	}
	return "(" + name + " " + at + ")"
}

// self is the data type at its parameters.
func (d *declared) self(at string) string {
	if len(d.params) == 0 {
		return "D"
	}
	s := "(D"
	for _, p := range d.params {
		s += " " + d.param(p, at)
	}
	return s + ")"
}

// maker draws elements over what is in scope.
type maker struct {
	t       *rapid.T
	d       *declared
	at      string   // where the parameters stand, empty in the declaration
	args    []arg    // variables in scope
	dims    []string // dimensions in scope, to be put in braces
	paths   int      // how many path constructors may be used
	bound   *int     // names used so far
	noHcomp bool
}

func (m *maker) pick(n int) int { return rapid.IntRange(0, n-1).Draw(m.t, "pick") }

func (m *maker) fresh(stem string) string {
	*m.bound++
	return fmt.Sprintf("%s%d", stem, *m.bound)
}

// dim is an interval expression over the dimensions in scope.
func (m *maker) dim() string {
	if len(m.dims) == 0 {
		return fmt.Sprint(m.pick(2))
	}
	v := func() string { return "{" + m.dims[m.pick(len(m.dims))] + "}" }
	switch m.pick(7) {
	case 0:
		return fmt.Sprint(m.pick(2))
	case 1:
		return "(rev " + v() + ")"
	case 2:
		return "(min " + v() + " " + v() + ")"
	case 3:
		return "(max " + v() + " (rev " + v() + "))"
	default:
		return v()
	}
}

func (m *maker) face() string {
	if len(m.dims) == 0 {
		return "bot"
	}
	eq := func() string { return fmt.Sprintf("(= %s %d)", m.dim(), m.pick(2)) }
	switch m.pick(4) {
	case 0:
		return "(and " + eq() + " " + eq() + ")"
	case 1:
		return "(or " + eq() + " " + eq() + ")"
	default:
		return eq()
	}
}

// variable is an argument in scope; in a term it is a family over the line of parameters.
func (m *maker) variable(name string) string {
	if m.at == "" {
		return name
	}
	return "(" + name + " " + m.at + ")"
}

// label is an element of A, or a number.
func (m *maker) label() string {
	var all []string
	for _, a := range m.args {
		if a.kind == "label" || a.kind == "pair" {
			all = append(all, m.variable(a.name))
		}
	}
	if len(m.d.params) == 0 {
		all = append(all, "0", "3")
	}
	if len(all) == 0 {
		return ""
	}
	x := all[m.pick(len(all))]
	if m.d.has("f") && m.pick(3) == 0 {
		return "(" + m.d.param("f", m.at) + " " + x + ")"
	}
	return x
}

// element is an element of the data type.
func (m *maker) element(depth int) string {
	if depth <= 0 {
		return m.leaf()
	}
	switch m.pick(6) {
	case 0:
		return m.leaf()
	case 1:
		if m.noHcomp {
			return m.leaf()
		}
		return m.composite(depth)
	case 2, 3:
		if m.paths > 0 {
			if e := m.apply(m.d.paths[m.pick(m.paths)], depth-1); e != "" {
				return e
			}
		}
	}
	if e := m.apply(m.d.points[m.pick(len(m.d.points))], depth-1); e != "" {
		return e
	}
	return m.leaf()
}

func (m *maker) leaf() string {
	var all []string
	for _, a := range m.args {
		switch v := m.variable(a.name); a.kind {
		case "self":
			all = append(all, v)
		case "function":
			all = append(all, "("+v+" true)")
		case "interval":
			if m.at == "" {
				all = append(all, "("+a.name+" "+m.dim()+")")
			} else {
				all = append(all, "("+a.name+" "+m.at+" "+m.dim()+")")
			}
		case "loop":
			all = append(all, "(at "+v+" "+m.dim()+")")
		}
	}
	if len(all) == 0 || m.pick(4) == 0 {
		return "pt0"
	}
	return all[m.pick(len(all))]
}

// apply is a constructor at random arguments, empty if there are none for it.
func (m *maker) apply(c con, depth int) string {
	s := c.name
	for _, a := range c.args {
		x := ""
		switch a.kind {
		case "label":
			x = m.label()
		case "nat":
			x = fmt.Sprint(m.pick(3))
		case "pair": // both from one variable, since the second is over the first
			for _, v := range m.args {
				if v.kind == "pair" {
					x = m.variable(v.name) + " " + m.variable(v.name+"b")
				}
			}
		case "self":
			x = m.element(depth)
		case "function":
			x = "(lam (" + m.fresh("b") + ") " + m.element(depth) + ")"
		case "interval":
			i := m.fresh("i")
			inner := *m
			inner.dims = append(append([]string(nil), m.dims...), i)
			x = "(lam (" + i + ") " + put(inner.element(depth), i, i) + ")"
		case "loop":
			i := m.fresh("i")
			x = "(line (" + i + ") pt0)"
			for _, v := range m.args {
				if v.kind == "loop" {
					x = m.variable(v.name)
				}
			}
		}
		if x == "" {
			return ""
		}
		s += " " + x
	}
	for range c.dims {
		s += " " + m.dim()
	}
	if s == c.name {
		return s
	}
	return "(" + s + ")"
}

// composite is a composite whose walls are faces of one element.
func (m *maker) composite(depth int) string {
	i := m.fresh("i")
	inner := *m
	inner.dims = append(append([]string(nil), m.dims...), i)
	e := inner.element(depth - 1)
	if !m.d.formal && m.pick(2) == 0 {
		// a strict composite that waits for its walls
		for _, a := range m.args {
			if a.kind == "loop" {
				e = "(at " + m.variable(a.name) + " (min {" + i + "} " + m.dim() + "))"
			}
		}
	}
	s := "(hcomp " + m.d.self(m.at) + " " + put(e, i, "0")
	for range m.pick(3) {
		s += " (" + m.face() + " (" + i + ") " + put(e, i, i) + ")"
	}
	return s + ")"
}

// put puts an interval expression for a dimension.
func put(e, dim, r string) string { return strings.ReplaceAll(e, "{"+dim+"}", r) }

// kinds of arguments that a declaration may have.
var kinds = []string{"label", "self", "nat", "function", "interval", "loop", "pair"}

func drawDeclaration(t *rapid.T) *declared {
	d := &declared{}
	d.params = [][]string{nil, {"A"}, {"A", "f"}, {"A", "B"}}[rapid.IntRange(0, 3).Draw(t, "parameters")]
	names := 0
	arguments := func(most int) (args []arg) {
		for range rapid.IntRange(0, most).Draw(t, "arguments") {
			names++
			args = append(args, arg{fmt.Sprintf("x%d", names), kinds[rapid.IntRange(0, len(kinds)-1).Draw(t, "kind")]})
		}
		return args
	}
	add := func(c con, clause string) {
		for k, a := range c.args {
			if k > 0 {
				clause += " "
			}
			clause += "(" + a.name + " " + d.typeOf(a.kind, "") + ")"
			if a.kind == "pair" {
				clause += " (" + a.name + "b " + d.over("", a.name) + ")"
			}
		}
		d.clauses = append(d.clauses, clause+")")
	}
	add(con{}, "(point pt0 (")
	d.points = []con{{name: "pt0", plain: true}}
	for n := range rapid.IntRange(1, 2).Draw(t, "points") {
		c := con{name: fmt.Sprintf("pt%d", n+1), args: arguments(3), plain: true}
		d.points = append(d.points, c)
		add(c, "(point "+c.name+" (")
		d.clauses[len(d.clauses)-1] += ")"
	}
	d.clauses[0] += ")"
	bound := 0
	for n := range max(0, rapid.IntRange(-1, 3).Draw(t, "paths")) { // none in two of five, which may be strict
		d.formal = true
		c := con{name: fmt.Sprintf("pa%d", n), args: arguments(2), dims: rapid.IntRange(1, 2).Draw(t, "dimensions"), plain: true}
		m := &maker{t: t, d: d, args: c.args, paths: len(d.paths), bound: &bound, noHcomp: rapid.Bool().Draw(t, "no composites")}
		c.plain = m.noHcomp
		for _, p := range d.paths {
			c.plain = c.plain && p.plain
		}
		dims := []string{"i", "j"}[:c.dims]
		walls := ""
		if c.dims == 1 && rapid.Bool().Draw(t, "ends apart") {
			walls = " ((= i 0) " + m.element(2) + ") ((= i 1) " + m.element(2) + ")"
		} else {
			m.dims = dims
			e := m.element(2)
			for _, i := range dims {
				e = put(e, i, i)
			}
			for range rapid.IntRange(0, 3).Draw(t, "walls") {
				f := m.face()
				for _, i := range dims {
					f = put(f, i, i)
				}
				walls += " (" + f + " " + e + ")"
			}
		}
		add(c, "(path "+c.name+" (")
		d.clauses[len(d.clauses)-1] += " (" + strings.Join(dims, " ") + ")" + walls + ")"
		d.paths = append(d.paths, c)
	}
	if !d.formal && rapid.Bool().Draw(t, "formal") {
		d.formal = true
	}
	return d
}

// text is the declaration, with what random terms are over: a line of its
// parameters and, along it, an element of each kind of argument.
func (d *declared) text() string {
	s := "(data D ("
	for _, p := range d.params {
		s += map[string]string{"A": "(A (U 0))", "f": "(f (-> A A))", "B": "(B (-> A (U 0)))"}[p]
	}
	s += ")"
	if d.formal && len(d.paths) == 0 {
		s += " (composition formal)"
	}
	return s + " " + strings.Join(d.clauses, " ") + ")\n"
}

// scope is what random terms are over: at every r, lines of parameters and an
// element of each kind of argument.
func (d *declared) scope() (string, []arg) {
	s := ""
	for _, p := range d.params {
		s += map[string]string{"A": "(assume A (-> I (U 0)))", "f": "(assume f (Pi ((r I)) (-> (A r) (A r))))",
			"B": "(assume B (Pi ((r I)) (-> (A r) (U 0))))"}[p]
	}
	var args []arg
	for k, kind := range kinds {
		if kind == "nat" {
			continue
		}
		name := fmt.Sprintf("v%d", k)
		args = append(args, arg{name, kind})
		t := d.typeOf(kind, "")
		if len(d.params) > 0 {
			t = d.typeOf(kind, "r")
		}
		s += fmt.Sprintf("(assume %s (Pi ((r I)) %s))\n", name, t)
		if kind == "pair" {
			at := "r"
			if len(d.params) == 0 {
				at = ""
			}
			s += fmt.Sprintf("(assume %sb (Pi ((r I)) %s))\n", name, d.over(at, "("+name+" r)"))
		}
	}
	return s, args
}

// identity is the identity as an elimination, empty where a boundary with
// composites keeps it from being typed: the composite of the images along a
// family that is constant is not the image itself.
func (d *declared) identity(at, e string) string {
	s := "(elim (_ " + d.self(at) + ") (ann " + e + " " + d.self(at) + ")"
	for _, c := range append(append([]con(nil), d.points...), d.paths...) {
		if !c.plain && len(d.params) > 0 {
			return ""
		}
		binds, body := "", ""
		for _, a := range c.args {
			binds += " " + a.name
			if a.kind == "pair" {
				binds += " " + a.name + "b"
			}
		}
		for _, a := range c.args {
			switch a.kind {
			case "label", "nat":
				body += " " + a.name
			case "pair":
				body += " " + a.name + " " + a.name + "b"
			default:
				binds += " h" + a.name
				body += " h" + a.name
			}
		}
		for k := range c.dims {
			binds += fmt.Sprintf(" z%d", k)
			body += fmt.Sprintf(" z%d", k)
		}
		if body == "" {
			s += " (" + c.name + " " + c.name + ")"
		} else {
			s += " ((" + c.name + binds + ") (" + c.name + body + "))"
		}
	}
	return s + ")"
}
