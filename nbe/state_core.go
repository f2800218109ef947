package nbe

import (
	"encoding/binary"
	"math/big"
	"sync"

	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Core terms as bytes. A term is the list of its nodes, each after those that it
// uses and named by its number, so sharing is kept and nesting costs no stack. A
// node is a variable, a global or an operator with its arguments; what is no
// node stands in the arguments. Names and operators are numbers in the stream's
// tables.

const (
	coreVariable byte = iota + 1
	coreGlobal
	coreOp
	argNode
	argBound
	argDimension
	argFace
	argRows
	argLevel
	argNumber
	argReference
	argNone
)

// encoder collects the tables while terms are encoded.
type encoder struct {
	e       *Engine
	run     *value.Run
	strings []string
	names   map[string]int
	ops     map[*term.Signature]int
	sigs    []*term.Signature
}

func newEncoder(e *Engine, run *value.Run) *encoder {
	return &encoder{e: e, run: run, names: map[string]int{}, ops: map[*term.Signature]int{}}
}

func (c *encoder) string(out []byte, s string) []byte {
	k, ok := c.names[s]
	if !ok {
		k = len(c.strings)
		c.names[s] = k
		c.strings = append(c.strings, s)
	}
	return binary.AppendUvarint(out, uint64(k))
}

func (c *encoder) text(out []byte, s string) []byte {
	return append(binary.AppendUvarint(out, uint64(len(s))), s...)
}

func (c *encoder) op(out []byte, sig *term.Signature) []byte {
	k, ok := c.ops[sig]
	if !ok {
		k = len(c.sigs)
		c.ops[sig] = k
		c.sigs = append(c.sigs, sig)
	}
	return binary.AppendUvarint(out, uint64(k))
}

// children calls yield for the core terms that stand in an argument, in order.
func children(a term.Arg, yield func(term.Core)) {
	switch a := a.(type) {
	case term.Core:
		yield(a)
	case *term.Bound:
		yield(a.Body)
	case term.Rows:
		for _, row := range a {
			for _, b := range row {
				children(b, yield) // rows do not nest
			}
		}
	}
}

// postorder calls visit for every node of c once, each after those it uses.
func postorder(run *value.Run, c term.Core, visit func(term.Core)) {
	seen := map[term.Core]bool{}
	type step struct {
		c     term.Core
		leave bool
	}
	work := []step{{c: c}}
	for len(work) > 0 {
		s := work[len(work)-1]
		work = work[:len(work)-1]
		run.Work(1)
		if s.leave {
			visit(s.c)
			continue
		}
		if seen[s.c] {
			continue
		}
		seen[s.c] = true
		work = append(work, step{s.c, true})
		if op, ok := s.c.(*term.Op); ok {
			for k := len(op.Args) - 1; k >= 0; k-- {
				children(op.Args[k], func(x term.Core) {
					if !seen[x] {
						work = append(work, step{c: x})
					}
				})
			}
		}
	}
}

// core is c encoded.
func (c *encoder) core(root term.Core) []byte {
	var out []byte
	number := map[term.Core]uint64{}
	node := func(out []byte, x term.Core) []byte { return binary.AppendUvarint(out, number[x]) }
	postorder(c.run, root, func(x term.Core) {
		number[x] = uint64(len(number))
		c.run.Charge(value.PriceNode)
		switch x := x.(type) {
		case *term.Variable:
			out = binary.AppendUvarint(append(out, coreVariable), uint64(x.Level))
		case *term.Global:
			out = c.string(append(out, coreGlobal), x.Name)
		case *term.Op:
			out = c.op(append(out, coreOp), x.Sig)
			out = binary.AppendUvarint(out, uint64(len(x.Args)))
			for _, a := range x.Args {
				out = c.arg(out, a, node)
			}
		}
	})
	return out
}

func (c *encoder) arg(out []byte, a term.Arg, node func([]byte, term.Core) []byte) []byte {
	switch a := a.(type) {
	case term.Core:
		return node(append(out, argNode), a)
	case *term.Bound:
		out = binary.AppendUvarint(append(out, argBound), uint64(len(a.Hints)))
		for _, h := range a.Hints {
			out = c.string(out, h)
		}
		out = binary.AppendUvarint(out, uint64(a.Dimensions))
		return node(out, a.Body)
	case term.Dimension:
		out = binary.AppendUvarint(append(out, argDimension), uint64(a.Dim.Len()))
		for k := range a.Dim.Len() {
			literals := a.Dim.Conjunction(k)
			out = binary.AppendUvarint(out, uint64(len(literals)))
			for _, l := range literals {
				out = binary.AppendUvarint(out, uint64(l.Name)<<1|bit(l.Negated))
			}
		}
		return out
	case *term.Face:
		out = binary.AppendUvarint(append(out, argFace), uint64(a.Face.Len()))
		for k := range a.Face.Len() {
			list := a.Face.Cube(k).Assignments()
			out = binary.AppendUvarint(out, uint64(len(list)))
			for _, l := range list {
				out = binary.AppendUvarint(out, uint64(l.Name)<<1|bit(l.One))
			}
		}
		return out
	case term.Rows:
		out = binary.AppendUvarint(append(out, argRows), uint64(len(a)))
		for _, row := range a {
			out = binary.AppendUvarint(out, uint64(len(row)))
			for _, b := range row {
				out = c.arg(out, b, node)
			}
		}
		return out
	case term.Level:
		return binary.AppendUvarint(append(out, argLevel), uint64(a))
	case term.Number:
		b := a.Bytes()
		return append(binary.AppendUvarint(append(out, argNumber), uint64(len(b))), b...)
	case term.Reference:
		return binary.AppendVarint(c.string(append(out, argReference), a.Name), int64(a.Index))
	}
	return append(out, argNone)
}

func bit(b bool) uint64 {
	if b {
		return 1
	}
	return 0
}

// formers writes which formers bring the operators that have been used.
func (c *encoder) formers(out []byte) []byte {
	out = binary.AppendUvarint(out, uint64(len(c.sigs)))
	for _, sig := range c.sigs {
		f := c.e.former[sig]
		out = c.text(out, f.name)
		out = binary.AppendUvarint(out, uint64(f.version))
		out = c.text(out, sig.Name)
	}
	return out
}

// formerID is a former's name and version, as saved state asks for them.
type formerID struct {
	name    string
	version int
}

// stream is an open stream: its tables and entries.
type stream struct {
	e       *Engine
	mu      sync.Mutex
	strings []string
	sigs    []*term.Signature
	entries []stored
}

func (s *stream) string(in *decoder) string {
	k := in.uvarint()
	if k >= uint64(len(s.strings)) {
		in.failed = true
		return ""
	}
	return s.strings[k]
}

func (s *stream) readFormers(in *decoder) error {
	here := map[formerID]map[string]*term.Signature{}
	for sig, id := range s.e.former {
		if here[id] == nil {
			here[id] = map[string]*term.Signature{}
		}
		here[id][sig.Name] = sig
	}
	for n := in.count(3); n > 0; n-- {
		id := formerID{string(in.bytes()), int(in.uvarint())}
		name := string(in.bytes())
		if in.failed {
			break
		}
		sig, ok := here[id][name]
		if !ok {
			return &term.Error{Kind: term.NotFound, Message: "the stream uses an operator that no registered former brings in that version", GotText: name, WantText: id.String()}
		}
		s.sigs = append(s.sigs, sig)
	}
	return nil
}

// decoder reads bytes; failed says that they ended too early or made no sense.
type decoder struct {
	src    []byte
	failed bool
}

func (d *decoder) uvarint() uint64 {
	n, k := binary.Uvarint(d.src)
	if k <= 0 {
		d.failed, d.src = true, nil
		return 0
	}
	d.src = d.src[k:]
	return n
}

func (d *decoder) varint() int64 {
	n, k := binary.Varint(d.src)
	if k <= 0 {
		d.failed, d.src = true, nil
		return 0
	}
	d.src = d.src[k:]
	return n
}

// count is a number of things that take at least size bytes each.
func (d *decoder) count(size int) int {
	n := d.uvarint()
	if n > uint64(len(d.src)/size) {
		d.failed, d.src = true, nil
		return 0
	}
	return int(n)
}

func (d *decoder) take(n int) []byte {
	if n > len(d.src) {
		d.failed, d.src = true, nil
		return nil
	}
	out := d.src[:n:n]
	d.src = d.src[n:]
	return out
}

func (d *decoder) bytes() []byte { return d.take(d.count(1)) }

func (d *decoder) byte() byte {
	if b := d.take(1); b != nil {
		return b[0]
	}
	return 0
}

// core decodes a core term; nil if it does not read. Names are resolved here.
func (s *stream) core(run *value.Run, src []byte) term.Core {
	in := &decoder{src: src}
	var nodes []term.Core
	for len(in.src) > 0 && !in.failed {
		run.Charge(value.PriceNode)
		switch in.byte() {
		case coreVariable:
			nodes = append(nodes, &term.Variable{Level: int(in.uvarint())})
		case coreGlobal:
			nodes = append(nodes, &term.Global{Name: s.string(in)})
		case coreOp:
			k := in.uvarint()
			if k >= uint64(len(s.sigs)) {
				return nil
			}
			op := &term.Op{Sig: s.sigs[k], Args: make([]term.Arg, in.count(1))}
			for k := range op.Args {
				op.Args[k] = s.arg(in, nodes, true)
			}
			nodes = append(nodes, op)
		default:
			in.failed = true
		}
	}
	if in.failed || len(nodes) == 0 {
		return nil
	}
	return nodes[len(nodes)-1]
}

func (s *stream) arg(in *decoder, nodes []term.Core, rows bool) term.Arg {
	node := func() term.Core {
		k := in.uvarint()
		if k >= uint64(len(nodes)) {
			in.failed = true
			return &term.Variable{}
		}
		return nodes[k]
	}
	switch in.byte() {
	case argNode:
		return node()
	case argBound:
		b := &term.Bound{Hints: make([]string, in.count(1))}
		for k := range b.Hints {
			b.Hints[k] = s.string(in)
		}
		b.Dimensions = int(in.uvarint())
		b.Body = node()
		return b
	case argDimension:
		d := interval.Zero()
		for n := in.count(1); n > 0; n-- {
			meet := interval.One()
			for k := in.count(1); k > 0; k-- {
				l := in.uvarint()
				v := interval.Var(interval.Name(l >> 1 & (1<<30 - 1)))
				if l&1 == 1 {
					v = v.Rev()
				}
				meet = meet.Min(v)
			}
			d = d.Max(meet)
		}
		return term.Dimension{Dim: d}
	case argFace:
		f := interval.Bot()
		for n := in.count(1); n > 0; n-- {
			cube := interval.Top()
			for k := in.count(1); k > 0; k-- {
				l := in.uvarint()
				if name := interval.Name(l >> 1 & (1<<30 - 1)); l&1 == 1 {
					cube = cube.And(interval.Eq1(name))
				} else {
					cube = cube.And(interval.Eq0(name))
				}
			}
			f = f.Or(cube)
		}
		return &term.Face{Face: f}
	case argRows:
		out := make(term.Rows, in.count(1))
		for k := range out {
			out[k] = make([]term.Arg, in.count(1))
			for j := range out[k] {
				if !rows {
					in.failed = true
					break
				}
				out[k][j] = s.arg(in, nodes, false)
			}
		}
		return out
	case argLevel:
		return term.Level(in.uvarint())
	case argNumber:
		return term.Number{Int: new(big.Int).SetBytes(in.bytes())}
	case argReference:
		r := term.Reference{Name: s.string(in), Index: int(in.varint())}
		switch x := s.e.lookup(r.Name).(type) {
		case *prims.Data:
			r.Target = x
			in.failed = in.failed || r.Index != -1
		case *prims.Constructor:
			r.Target = x
			in.failed = in.failed || r.Index != x.Index
		default:
			in.failed = true
		}
		return r
	case argNone:
		return nil
	}
	in.failed = true
	return nil
}

// typeOf is the elaborated type of d.
func (d *definition) typeOf(run *value.Run) term.Core {
	if d.stored == nil {
		return d.typeCore
	}
	return d.stored.decode(run, d.stored.ty, &d.stored.decodedT)
}

// coreOf is the elaborated term of d, nil for assumptions and holes.
func (d *definition) coreOf(run *value.Run) term.Core {
	if d.stored == nil || d.stored.core == nil {
		return d.core
	}
	return d.stored.decode(run, d.stored.core, &d.stored.decodedC)
}

// defined reports whether d is a definition, and no assumption or hole.
func (d *definition) defined() bool {
	return d.core != nil || d.stored != nil && d.stored.kind == stateDefinition
}

// decode decodes src once. Two runs may both do it; one result is kept.
func (s *stored) decode(run *value.Run, src []byte, at *term.Core) term.Core {
	s.from.mu.Lock()
	c := *at
	s.from.mu.Unlock()
	if c != nil {
		return c
	}
	if c = s.from.core(run, src); c == nil {
		run.Fail(stateError("the term of %s does not read", s.name))
	}
	s.from.mu.Lock()
	*at = c
	s.from.mu.Unlock()
	return c
}

// evaluate is the value of d, a definition, evaluated anew.
func (d *definition) evaluate(run *value.Run) value.Value {
	if d.code != nil {
		return d.code.Eval(run, nil)
	}
	return d.stored.from.e.evaluated(run, d.coreOf(run))
}

// evaluated is a closed core term as a value.
func (e *Engine) evaluated(run *value.Run, c term.Core) value.Value {
	return eval.Compile(run, e, c, 0, 0, nil, nil).Eval(run, nil)
}
