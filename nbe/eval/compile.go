package eval

import (
	"slices"

	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
)

// Resolver tells the compiler what names stand for.
type Resolver interface {
	// Operation is what an operator does, nil if no former brings it.
	Operation(sig *term.Signature) Operation
	// Global is a definition or an assumption, nil if there is none.
	Global(name string) value.Global
}

// Compile compiles a core term of a scope of nv variables and nd dimensions,
// over those of them that are listed, by level; it must mention no others. The
// cost is linear in its size as a shared graph, for what is shared in one scope.
func Compile(run *value.Run, r Resolver, c term.Core, nv, nd int, variables, dimensions []int) *Abstraction {
	k := &compiler{run: run, r: r}
	abs := &Abstraction{arity: len(variables) + len(dimensions), site: run.Standing}
	l := &layout{abs: abs, size: abs.arity}
	l.place(variables, dimensions)
	abs.body = k.term(c, l, nv, nd)
	return abs
}

// Levels are the levels below n, for Compile.
func Levels(n int) []int {
	out := make([]int, n)
	for k := range out {
		out[k] = k
	}
	return out
}

// Eval evaluates a compiled term whose scope is env: its variables, then its
// dimensions. No work is done before the result is forced.
func (a *Abstraction) Eval(run *value.Run, env []value.Value) value.Value {
	return newThunk(run, a.body, append([]value.Value(nil), env...))
}

// Case is a compiled term as a case over its scope.
func (a *Abstraction) Case(run *value.Run) value.Case { return caseClosure{a.close(run, nil)} }

type compiler struct {
	run    *value.Run
	r      Resolver
	seen   map[seenKey]*Abstraction
	placed map[seenKey]Code // cheap operators, in the frames they stand in
	cheap  map[*term.Op]int8
}

type seenKey struct {
	arg term.Arg
	l   *layout
}

// layout says which slot holds what in one frame. A level that is not there
// yet is captured from the surrounding frame.
type layout struct {
	outer                 *layout
	abs                   *Abstraction
	variables, dimensions slots
	size                  int
	used                  []bool // by argument
}

// slots says where levels stand. Most frames have few, for which a map would be
// most of what compiling costs.
type slots struct {
	few  []placed
	many map[int]int
}

type placed struct{ level, slot int }

// fewSlots is how many are looked through one by one.
const fewSlots = 12

func (s *slots) at(level int) (slot int, ok bool) {
	if s.many != nil {
		slot, ok = s.many[level]
		return slot, ok
	}
	for _, p := range s.few {
		if p.level == level {
			return p.slot, true
		}
	}
	return 0, false
}

func (s *slots) put(level, slot int) {
	if s.many == nil && len(s.few) < fewSlots {
		s.few = append(s.few, placed{level, slot})
		return
	}
	if s.many == nil {
		s.many = map[int]int{}
		for _, p := range s.few {
			s.many[p.level] = p.slot
		}
	}
	s.many[level] = slot
}

// place puts a scope's variables into the first slots, then its dimensions.
func (l *layout) place(variables, dimensions []int) {
	for s, level := range variables {
		l.variables.put(level, s)
	}
	for s, level := range dimensions {
		l.dimensions.put(level, len(variables)+s)
	}
}

// slot is where a level stands. It looks outwards and then captures inwards, by
// loops, since binders may nest deeper than a stack.
func (l *layout) slot(level int, dimension bool) int {
	var way []*layout // those that do not have it yet
	s := -1
	for at := l; ; at = at.outer {
		if at == nil {
			return -1
		}
		if known, ok := at.levels(dimension).at(level); ok {
			if known < len(at.used) {
				at.used[known] = true
			}
			s = known
			break
		}
		way = append(way, at)
	}
	for k := len(way) - 1; k >= 0; k-- {
		at := way[k]
		at.abs.captures = append(at.abs.captures, s)
		s = at.size
		at.size++
		at.levels(dimension).put(level, s)
	}
	return s
}

func (l *layout) levels(dimension bool) *slots {
	if dimension {
		return &l.dimensions
	}
	return &l.variables
}

func (k *compiler) fault(what string, at any) {
	k.run.Fail(&term.Error{Kind: term.Malformed, Message: "this core term cannot be compiled: " + what, Detail: at})
}

func (k *compiler) slot(l *layout, level int, dimension bool) int {
	s := l.slot(level, dimension)
	if s < 0 {
		k.fault("a level is not in scope", level)
	}
	return s
}

func (k *compiler) term(c term.Core, l *layout, nv, nd int) (code Code) {
	switch c := c.(type) {
	case *term.Variable:
		return slotCode(k.slot(l, c.Level, false))
	case *term.Global:
		g := k.r.Global(c.Name)
		if g == nil {
			k.run.Fail(&term.Error{Kind: term.NotFound, Message: "there is no definition or assumption of this name", GotText: c.Name})
		}
		return globalCode{g}
	case *term.Op:
		k.run.Down(func() { code = k.op(c, l, nv, nd) })
		return code
	}
	k.fault("an unknown node", c)
	return nil
}

// cheapest is how deep canonical operators may nest and still be built at once.
const cheapest = 3

func (k *compiler) op(c *term.Op, l *layout, nv, nd int) Code {
	op := k.r.Operation(c.Sig)
	if op == nil {
		k.run.Fail(&term.Error{Kind: term.NotFound, Message: "no former brings this operator", GotText: c.Sig.Name})
	}
	out := &opCode{op: op, args: make([]Arg, len(c.Args)), level: value.Level{Site: k.run.Standing}}
	principal := -1
	if e, ok := op.(Eliminator); ok {
		principal = e.Principal()
	}
	for i, a := range c.Args {
		slot := c.Sig.SlotOf(i).Slot
		if i == principal {
			core, ok := a.(term.Core)
			if !ok {
				k.fault("an argument of the wrong sort", c)
			}
			code := k.term(core, l, nv, nd)
			out.args[i].code = code
			switch p := code.(type) {
			case globalCode:
				out.folds = true
			case *opCode:
				out.folds = p.folds
			}
			continue
		}
		out.args[i] = k.arg(a, slot, l, nv, nd)
	}
	if m, ok := op.(Matcher); ok {
		out.nameCases(m.Label(out.args).Elimination())
	}
	out.cheap = k.cheapness(c)
	if p, ok := op.(Preparer); ok {
		if payload, ok := p.Prepare(c, nv); ok {
			out.args = append(out.args, Arg{Payload: payload})
		}
	}
	if s, ok := op.(Special); ok {
		out.op = s.Special(k.run, out.args)
	}
	out.found()
	if constant, ok := op.(Closed); ok {
		return constantCode{constant.Value(k.run, out.args)}
	}
	return out
}

// nameCases makes the code of cases know that it runs inside of the elimination.
func (c *opCode) nameCases(elimination *value.Site) {
	for _, a := range c.args {
		for _, row := range a.Rows {
			for _, x := range row {
				if x.abs == nil {
					continue
				}
				if body, ok := x.abs.body.(*opCode); ok {
					body.level.Within = elimination
				}
			}
		}
	}
}

// cheapness is 0 for an operator that is to be delayed, and otherwise 1 + how
// deep cheap operators nest in it. It is found on the core term: to compile an
// argument first and look then would compile what is nested 2^depth times.
func (k *compiler) cheapness(c *term.Op) int {
	if known, ok := k.cheap[c]; ok {
		return int(known)
	}
	cheap, nested := 0, false
	if o, ok := k.r.Operation(c.Sig).(Canonical); ok {
		args := make([]Arg, len(c.Args))
		cheap = 1
		for i, a := range c.Args {
			switch a := a.(type) {
			case *term.Op:
				nested = true
				below := 0
				k.run.Down(func() { below = k.cheapness(a) })
				cheap = max(cheap, below+1)
			case term.Level, term.Number, term.Reference:
				args[i].Payload = a
			}
		}
		if cheap > cheapest || !o.Canonical(args) {
			cheap = 0
		}
	}
	if nested { // one without operators below it is found as quickly again
		if k.cheap == nil {
			k.cheap = map[*term.Op]int8{}
		}
		k.cheap[c] = int8(cheap)
	}
	return cheap
}

func (k *compiler) isClosed(c *term.Op) bool {
	_, ok := k.r.Operation(c.Sig).(Closed)
	return ok
}

// Closed is an Operation whose value depends on nothing in the frame: a
// numeral, a universe. It is made once, when the term is compiled.
type Closed interface {
	Operation
	Value(run *value.Run, args []Arg) value.Value
}

// Special is an Operation with a quicker form for some arguments, which is found
// once, when the term is compiled.
type Special interface {
	Operation
	// Special is that form, or the operation itself.
	Special(run *value.Run, args []Arg) Operation
}

// Preparer is an Operation that looks at its term once, when it is compiled in
// a scope of the given number of variables; what it finds is one more argument.
type Preparer interface {
	Operation
	Prepare(c *term.Op, variables int) (term.Arg, bool)
}

func (k *compiler) arg(a term.Arg, slot term.Slot, l *layout, nv, nd int) Arg {
	switch a := a.(type) {
	case *term.Variable, *term.Global:
		return Arg{code: k.term(a.(term.Core), l, nv, nd)}
	case *term.Op:
		if k.cheapness(a) > 0 || k.isClosed(a) {
			// building it costs less than delaying it, so it stands in the surrounding frame
			code, ok := k.placed[seenKey{a, l}]
			if !ok {
				code = k.term(a, l, nv, nd)
				if k.placed == nil {
					k.placed = map[seenKey]Code{}
				}
				k.placed[seenKey{a, l}] = code
			}
			return Arg{code: code}
		}
		abs := k.abstraction(a, a, nil, nil, l, nv, nd)
		call, _ := outside(abs.body, abs.captures, smallCall).(*opCode)
		return Arg{abs: abs, call: call}
	case *term.Bound:
		return Arg{abs: k.abstraction(a, a.Body, k.binds(a, slot), a.Hints, l, nv, nd)}
	case term.Dimension:
		d := &dimensionCode{dim: a.Dim}
		for _, n := range a.Dim.Names() {
			d.names = append(d.names, n)
			d.slots = append(d.slots, k.slot(l, int(n), true))
		}
		_, negated, ok := a.Dim.Literal()
		d.literal, d.negated = ok && !negated, ok && negated
		return Arg{dim: d}
	case *term.Face:
		f := &faceCode{face: a.Face, end: endOf(a.Face)}
		for _, n := range a.Face.Names() {
			f.names = append(f.names, n)
			f.slots = append(f.slots, k.slot(l, int(n), true))
		}
		return Arg{face: f}
	case term.Rows:
		rows := make([][]Arg, len(a))
		for i, row := range a {
			rows[i] = make([]Arg, len(row))
			for j, x := range row {
				var s term.Slot
				if j < len(slot.Rows) {
					s = slot.Rows[j]
				} else if n := len(slot.Rows); n > 0 {
					s = slot.Rows[n-1]
				}
				rows[i][j] = k.arg(x, s, l, nv, nd)
			}
		}
		return Arg{Rows: rows}
	}
	return Arg{Payload: a}
}

// smallCall is how many arguments a call may have that is compiled for the
// surrounding frame too, so that evaluating it at once needs no frame of its own.
const smallCall = 4

// outside is a call of variables and definitions with variables and definitions
// as it stands in the surrounding frame; nil for any other code.
func outside(c Code, captures []int, left int) Code {
	switch c := c.(type) {
	case slotCode:
		return slotCode(captures[c])
	case constantCode, globalCode:
		return c
	case *opCode:
		if c.caller == nil || left == 0 {
			return nil
		}
		out := *c
		out.args = slices.Clone(c.args)
		for k := range out.args {
			if out.args[k] = (Arg{code: outside(c.args[k].code, captures, left-1)}); out.args[k].code == nil {
				return nil
			}
		}
		out.found()
		return &out
	}
	return nil
}

// binds are the sorts of the names a binds. Where the slot leaves them open, a
// trailing number of them are dimensions, which the binder itself says.
func (k *compiler) binds(a *term.Bound, slot term.Slot) []term.Sort {
	if !slot.Many {
		return slot.Binds
	}
	out := make([]term.Sort, len(a.Hints))
	for i := len(out) - a.Dimensions; i < len(out); i++ {
		out[i] = term.DimensionSort
	}
	return out
}

func (k *compiler) abstraction(key term.Arg, body term.Core, binds []term.Sort, hints []string, l *layout, nv, nd int) *Abstraction {
	if abs, ok := k.seen[seenKey{key, l}]; ok {
		return abs
	}
	abs := &Abstraction{arity: len(binds), hints: hints, site: k.run.Standing}
	inner := &layout{outer: l, abs: abs, size: len(binds), used: make([]bool, len(binds))}
	for s, sort := range binds {
		if sort == term.DimensionSort {
			inner.dimensions.put(nd, s)
			nd++
		} else {
			inner.variables.put(nv, s)
			nv++
		}
	}
	abs.body = k.term(body, inner, nv, nd)
	for s, used := range inner.used {
		if !used && abs.unused == nil {
			abs.unused = make([]bool, abs.arity)
		}
		if !used {
			abs.unused[s] = true
		}
	}
	for s := range abs.arity {
		nodes := demandNodes
		d := demandOf(abs.body, s, &nodes)
		if d != nil && abs.demands == nil {
			abs.demands = make([]*demand, abs.arity)
		}
		if d != nil {
			abs.demands[s] = d
		}
	}
	abs.first = lazy
	if len(abs.demands) > 0 && abs.demands[0] != nil {
		abs.first = unknown
		if len(abs.demands[0].conditions) == 0 {
			abs.first = strict
		}
	}
	if k.seen == nil {
		k.seen = map[seenKey]*Abstraction{}
	}
	k.seen[seenKey{key, l}] = abs
	return abs
}

// CompileCase compiles a body under binders, in a scope of nv variables and nd
// dimensions, as a case that has captured the values vs of the listed levels:
// the variables, then the dimensions.
func CompileCase(run *value.Run, r Resolver, b *term.Bound, sorts []term.Sort, nv, nd int, variables, dimensions []int, vs []value.Value) value.Case {
	k := &compiler{run: run, r: r}
	outer := &layout{abs: &Abstraction{}}
	outer.place(variables, dimensions)
	abs := k.abstraction(b, b.Body, sorts, b.Hints, outer, nv, nd)
	return caseClosure{abs.close(run, vs)}
}
