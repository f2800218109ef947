package nbe

import (
	"context"
	"crypto/sha256"
	"encoding/binary"
	"encoding/hex"
	"fmt"
	"hash"

	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
)

// Content hashes. The hash of a definition is that of its kind, its name, and
// its elaborated type and term, in which a name stands by the content hash of
// what it names, an operator with its former's name and version, and every
// node by the hash of its parts, so that sharing makes no difference. It
// depends on nothing else: not on the engine, nor on what else it holds, nor on
// where the text stood.

// Hash is a content hash.
type Hash [sha256.Size]byte

// String is the hash in hexadecimal digits.
func (h Hash) String() string { return hex.EncodeToString(h[:]) }

func (f formerID) String() string { return fmt.Sprintf("%s, version %d", f.name, f.version) }

// Hash is the content hash of the definition, assumption, hole or data type of
// a name: equal for equal content in any engine on any machine, and different,
// as far as SHA-256 tells, when the definition or anything that it uses is
// another. Errors: NotFound; those of limits and of the context. Cost: linear in
// the definition and in all that it uses, as graphs.
func (e *Engine) Hash(ctx context.Context, name string, options ...CallOption) (h Hash, err error) {
	if e.lookup(name) == nil {
		return h, &term.Error{Kind: term.NotFound, Message: "nothing of this name is declared", GotText: name}
	}
	err = e.call(ctx, gather(options), func(run *value.Run) {
		h = (&hasher{e: e, run: run, known: map[string]Hash{}}).of(name)
	})
	return h, err
}

// hasher hashes the entries of an engine, each once.
type hasher struct {
	e     *Engine
	run   *value.Run
	known map[string]Hash
}

// of is the hash of an entry; what it uses is hashed first, from a list of work.
func (h *hasher) of(name string) Hash {
	work := []string{name}
	for len(work) > 0 {
		h.run.Work(1)
		top := work[len(work)-1]
		x := h.e.lookup(top)
		if c, ok := x.(*prims.Constructor); ok {
			x = c.Data
		}
		if _, ok := h.known[top]; ok || x == nil {
			work = work[:len(work)-1]
			continue
		}
		waiting := len(work)
		own := map[string]bool{top: true}
		if d, ok := x.(*prims.Data); ok {
			own[d.Name] = true
			for _, c := range d.Constructors {
				own[c.Name] = true
			}
		}
		for _, used := range h.e.uses(h.run, x) {
			if _, ok := h.known[used]; !ok && !own[used] && h.e.lookup(used) != nil {
				work = append(work, used)
			}
		}
		if len(work) > waiting {
			continue
		}
		work = work[:len(work)-1]
		h.entry(top, x)
	}
	return h.known[name]
}

func (h *hasher) entry(name string, x any) {
	sum := sha256.New()
	switch x := x.(type) {
	case *prims.Data:
		// A constructor is hashed as its data type, with its name.
		names := []string{x.Name}
		for _, c := range x.Constructors {
			names = append(names, c.Name)
		}
		for _, n := range names {
			h.known[n] = Hash{} // inside its own declaration
		}
		text(sum, "data", x.Name)
		x.Describe(func(words ...string) { text(sum, words...) }, func(c term.Core) {
			d := h.core(c)
			sum.Write(d[:])
		})
		var d Hash
		sum.Sum(d[:0])
		for _, n := range names {
			own := sha256.New()
			own.Write(d[:])
			text(own, n)
			var k Hash
			own.Sum(k[:0])
			h.known[n] = k
		}
		return
	case *definition:
		kind := "definition"
		if !x.defined() {
			kind = "assumption"
			if x.hole {
				kind = "hole"
			}
		}
		text(sum, kind, x.name)
		t := h.core(x.typeOf(h.run))
		sum.Write(t[:])
		if x.defined() {
			c := h.core(x.coreOf(h.run))
			sum.Write(c[:])
		}
	}
	var d Hash
	sum.Sum(d[:0])
	h.known[name] = d
}

// text adds words, each with its length.
func text(sum hash.Hash, words ...string) {
	var b [binary.MaxVarintLen64]byte
	for _, w := range words {
		sum.Write(b[:binary.PutUvarint(b[:], uint64(len(w)))])
		sum.Write([]byte(w))
	}
}

// core is the hash of a core term, node by node.
func (h *hasher) core(root term.Core) Hash {
	done := map[term.Core]Hash{}
	// An encoder of its own, for what is no node; names and operators are hashed by content.
	postorder(h.run, root, func(c term.Core) {
		sum := sha256.New()
		switch c := c.(type) {
		case *term.Variable:
			text(sum, "variable", fmt.Sprint(c.Level))
		case *term.Global:
			used := h.known[c.Name]
			text(sum, "global", string(used[:]))
		case *term.Op:
			id := h.e.former[c.Sig]
			text(sum, "operator", id.String(), c.Sig.Name, fmt.Sprint(len(c.Args)))
			for _, a := range c.Args {
				h.arg(sum, a, done)
			}
		}
		var d Hash
		sum.Sum(d[:0])
		done[c] = d
	})
	return done[root]
}

func (h *hasher) arg(sum hash.Hash, a term.Arg, done map[term.Core]Hash) {
	switch a := a.(type) {
	case term.Core:
		d := done[a]
		text(sum, "node", string(d[:]))
	case *term.Bound:
		d := done[a.Body]
		text(sum, "bound", fmt.Sprint(len(a.Hints), a.Dimensions))
		text(sum, a.Hints...)
		text(sum, string(d[:]))
	case term.Rows:
		text(sum, "rows", fmt.Sprint(len(a)))
		for _, row := range a {
			text(sum, "row", fmt.Sprint(len(row)))
			for _, b := range row {
				h.arg(sum, b, done)
			}
		}
	case term.Reference:
		used := h.known[a.Name]
		text(sum, "reference", string(used[:]), fmt.Sprint(a.Index))
		if used == (Hash{}) {
			text(sum, a.Name)
		}
	case term.Dimension:
		text(sum, "dimension", a.Dim.String())
	case *term.Face:
		text(sum, "face", a.Face.String())
	case term.Level:
		text(sum, "level", fmt.Sprint(int(a)))
	case term.Number:
		text(sum, "number", string(a.Bytes()))
	default:
		text(sum, "none")
	}
}
