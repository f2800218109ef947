package term

import "example.com/boxwright/value/interval"

// Move says how a core term is brought from one scope into another that has
// more binders: variables from level Variables on, and dimensions from level
// Dimensions on, are bound inside the term and move up; the free dimensions
// below are replaced by Subst, the free variables stay.
type Move struct {
	Variables, Dimensions         int // the scope the term comes from
	MoreVariables, MoreDimensions int // how many binders the new scope has beyond it; may be negative for dimensions that Subst removes
	Subst                         *interval.Subst
	Each                          func() // called for each operator that is made, to charge it; may panic; nil: none
}

// Apply moves c. Sharing is kept; the cost is linear in c as a shared graph.
// Terms nested deeper than a stack holds are walked on fresh goroutines.
func (m Move) Apply(c Core) Core {
	w := mover{Move: m, seen: map[Core]Core{}}
	return w.core(c, 0)
}

type mover struct {
	Move
	seen map[Core]Core
}

const moveHop = 20_000

func (m *mover) core(c Core, depth int) Core {
	switch c := c.(type) {
	case *Variable:
		if c.Level >= m.Variables && m.MoreVariables != 0 {
			return &Variable{c.Level + m.MoreVariables}
		}
		return c
	case *Op:
		if len(c.Args) == 0 {
			return c
		}
		if out, ok := m.seen[c]; ok {
			return out
		}
		var out Core
		if depth > 0 && depth%moveHop == 0 {
			done := make(chan struct{})
			var thrown any
			go func() {
				defer close(done)
				defer func() { thrown = recover() }()
				out = m.op(c, depth+1)
			}()
			<-done
			if thrown != nil {
				panic(thrown)
			}
		} else {
			out = m.op(c, depth+1)
		}
		m.seen[c] = out
		return out
	}
	return c
}

func (m *mover) op(c *Op, depth int) Core {
	if m.Each != nil {
		m.Each()
	}
	out := &Op{Sig: c.Sig, Args: make([]Arg, len(c.Args))}
	for k, a := range c.Args {
		out.Args[k] = m.arg(a, depth)
	}
	return out
}

func (m *mover) arg(a Arg, depth int) Arg {
	switch a := a.(type) {
	case Core:
		return m.core(a, depth)
	case *Bound:
		return &Bound{Hints: a.Hints, Body: m.core(a.Body, depth), Dimensions: a.Dimensions}
	case Dimension:
		return Dimension{a.Dim.Subst(m.subst(a.Dim.Names()))}
	case *Face:
		return &Face{a.Face.Subst(m.subst(a.Face.Names()))}
	case Rows:
		out := make(Rows, len(a))
		for i, row := range a {
			out[i] = make([]Arg, len(row))
			for j, x := range row {
				out[i][j] = m.arg(x, depth)
			}
		}
		return out
	}
	return a
}

func (m *mover) subst(names []interval.Name) *interval.Subst {
	var from []interval.Name
	var to []interval.Dim
	for _, n := range names {
		if int(n) >= m.Dimensions {
			if m.MoreDimensions != 0 {
				from, to = append(from, n), append(to, interval.Var(n+interval.Name(m.MoreDimensions)))
			}
		} else if d, ok := m.Subst.Lookup(n); ok {
			from, to = append(from, n), append(to, d)
		}
	}
	if len(from) == 0 {
		return nil
	}
	return interval.NewSubst(from, to)
}
