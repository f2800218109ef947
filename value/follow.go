package value

import (
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value/interval"
)

// Following a computation: the rules that a run applies, one event for each, in
// the order in which they begin, handed to a callback. A filter says which, a
// limit how many; what is not wanted costs a look at the filter, and a run that
// nobody follows pays the nil test of its trace.
//
// Before and after are terms on demand. They are sketches: built from what has
// been evaluated and nothing else, since looking further would change the
// computation that is looked at. What has not been looked at stands as "…",
// dimensions stand by the names that they have in the run.

// DefaultEvents is how many events are delivered where no limit is given.
const DefaultEvents = 1000

// Event is one application of a rule.
type Event struct {
	Number int64    // counted from 1, in the order in which the rules begin
	Kind   StepKind // by which rule
	Rule   string   // the same in words, with the former or the data type: "hcomp at pairs"
	Where  *Site    // the definition or term it stands in, nil outside of any
	Depth  int      // the sites that it nests in
	Done   bool     // the rule has been applied: After tells its result

	trace  *Trace
	path   Back
	before func(*Sketch) *term.Written
	after  Value
}

// Before is what the rule was applied to.
func (e *Event) Before() *term.Written {
	if e.before == nil {
		return hidden
	}
	return e.before(NewSketch())
}

// After is what the rule gave, once it is done.
func (e *Event) After() *term.Written {
	if !e.Done {
		return hidden
	}
	return NewSketch().Value(e.after)
}

// Path is the sites that the rule nests in, outermost first.
func (e *Event) Path() []*Site {
	var out []*Site
	if e.trace == nil {
		return nil
	}
	for p := e.path; p != root; p = e.trace.nodes[p].parent {
		out = append(out, e.trace.nodes[p].site)
	}
	for i, j := 0, len(out)-1; i < j; i, j = i+1, j-1 {
		out[i], out[j] = out[j], out[i]
	}
	return out
}

// Follow says which events are delivered, and where to.
type Follow struct {
	// Event is called in the run's own goroutine; it must not keep the run waiting.
	Event func(*Event)
	// Want filters; nil wants all. It sees events that have not been numbered.
	Want func(*Event) bool
	// Limit is how many rules are reported; 0 means DefaultEvents.
	Limit int64
	// Results delivers each event again when its rule is done.
	Results bool

	seen, cut int64
}

// Seen is how many rules were reported and how many more were wanted after the limit.
func (f *Follow) Seen() (reported, cut int64) { return f.seen, f.cut }

// Followed reports whether somebody follows the run.
func (r *Run) Followed() bool { return hooks && r.trace != nil && r.trace.Follow != nil }

// Observed reports whether somebody looks at each rule, not only at its site.
func (r *Run) Observed() bool { return r.watch.Follow != nil || r.watch.stuck != nil }

// Report says that the rule which is called next has been reported.
func (r *Run) Report() { r.trace.reporting = true }

// Reporting reports, once, whether the rule at hand has been reported.
func (r *Run) Reporting() bool {
	was := r.trace.reporting
	r.trace.reporting = false
	return was
}

// Begins reports that a rule begins; before sketches what it is applied to. The
// result goes to Ends. Only a run that is followed may call it.
func (r *Run) Begins(k StepKind, rule string, before func(*Sketch) *term.Written) *Event {
	t := r.trace
	f := t.Follow
	e := &Event{Kind: k, Rule: rule, Where: t.nodes[t.at].owner, Depth: int(t.nodes[t.at].depth), trace: t, path: t.at, before: before}
	if f.Want != nil && !f.Want(e) {
		return nil
	}
	limit := f.Limit
	if limit <= 0 {
		limit = DefaultEvents
	}
	if f.seen >= limit {
		f.cut++
		return nil
	}
	f.seen++
	e.Number = f.seen
	f.Event(e)
	return e
}

// Ends reports that the rule is done, if Begins was wanted, and returns v.
func (r *Run) Ends(e *Event, v Value) Value {
	if e != nil && r.trace.Follow.Results {
		e.Done, e.after = true, v
		r.trace.Follow.Event(e)
	}
	return v
}

// Sketch writes values down as far as they have been evaluated.
type Sketch struct {
	depth, left int
}

// NewSketch is a sketch of a few levels and about a hundred nodes.
func NewSketch() *Sketch { return &Sketch{4, 100} }

var hidden = term.Name("…")

// Sketched is implemented by values and heads of neutrals that can be sketched.
type Sketched interface {
	Sketch(s *Sketch) *term.Written
}

// SketchedFrame is implemented by eliminations that can be sketched, on what
// they eliminate.
type SketchedFrame interface {
	SketchOn(s *Sketch, head *term.Written) *term.Written
}

// Value is v as far as it has been evaluated.
func (s *Sketch) Value(v Value) *term.Written {
	if s.depth == 0 || s.left == 0 {
		return hidden
	}
	s.depth--
	s.left--
	defer func() { s.depth++ }()
	switch v := Peek(v).(type) {
	case *Dimension:
		return s.Dimension(v.Dim)
	case *Neutral:
		return s.neutral(v)
	case *Lazy:
		if v.fold != nil {
			if n := v.fold.n.Load(); n != nil {
				return s.neutral(n)
			}
		}
		return hidden
	case Sketched:
		return v.Sketch(s)
	case Labelled:
		return term.Name(v.Label().Name)
	}
	return hidden
}

func (s *Sketch) neutral(n *Neutral) *term.Written {
	out := hidden
	switch h := n.head.(type) {
	case *VariableHead:
		out = term.Name(h.Name)
	case *GlobalHead:
		out = term.Name(h.Global.GlobalName())
	case Sketched:
		out = h.Sketch(s)
	}
	for _, f := range n.Frames() {
		if f, ok := f.(SketchedFrame); ok {
			out = f.SketchOn(s, out)
		} else {
			out = term.Apply(hidden, out)
		}
	}
	return out
}

// Body is a closure's body: what has been evaluated of it, which for compiled
// code is nothing, under a name of its variable.
func (s *Sketch) Body(c Closure) (string, *term.Written) {
	name := c.Hint()
	if name == "" {
		name = "_"
	}
	switch c := c.(type) {
	case *Line:
		return interval.Var(c.I).String(), s.Value(c.Body)
	case Constant:
		return name, s.Value(c.V)
	}
	return name, hidden
}

// Dimension is an interval expression, by the names in the run.
func (s *Sketch) Dimension(d interval.Dim) *term.Written {
	switch {
	case d.IsZero():
		return term.Numeral(0)
	case d.IsOne():
		return term.Numeral(1)
	}
	var joins []*term.Written
	for k := range d.Len() {
		var meets []*term.Written
		for _, l := range d.Conjunction(k) {
			x := dimensionName(l.Name)
			if l.Negated {
				x = term.Rev(x)
			}
			meets = append(meets, x)
		}
		joins = append(joins, joined(term.Min, meets))
	}
	return joined(term.Max, joins)
}

func joined(f func(...*term.Written) *term.Written, parts []*term.Written) *term.Written {
	if len(parts) == 1 {
		return parts[0]
	}
	return f(parts...)
}

func dimensionName(n Name) *term.Written {
	return term.Name(interval.Var(n).String())
}

// Face is a face, by the names in the run.
func (s *Sketch) Face(f interval.Face) *term.Written {
	switch {
	case f.IsTop():
		return term.Top()
	case f.IsBot():
		return term.Bot()
	}
	var cubes []*term.Written
	for k := range f.Len() {
		var parts []*term.Written
		for _, a := range f.Cube(k).Assignments() {
			end := uint64(0)
			if a.One {
				end = 1
			}
			parts = append(parts, term.Eq(dimensionName(a.Name), end))
		}
		cubes = append(cubes, joined(term.And, parts))
	}
	return joined(term.Or, cubes)
}

// Walls are the walls of a composite.
func (s *Sketch) Walls(walls System) []term.Row {
	var out []term.Row
	for _, w := range walls {
		out = append(out, term.Wall(s.Face(w.Cube.Face()), interval.Var(w.I).String(), s.Value(w.Body)))
	}
	return out
}

// Sketch is the function.
func (l *Lam) Sketch(s *Sketch) *term.Written {
	name, body := s.Body(l.Body)
	return term.Lam(body, name)
}
