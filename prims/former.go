// Package prims holds the built-in type formers, one file for each: its
// values, its eliminators, its two Kan operations, its η, how it reads back,
// compares and is typed. Derived operations stand in kan.go, data declarations
// in the files data*.go. The table of formers is [Table]; a host's formers are
// registered with the same [Former].
package prims

import (
	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
)

// Former is a type former as an engine registers it: the words it brings to
// the written form and how they are typed, and its operators and what they do.
type Former struct {
	Name      string
	Version   int // changes when the meaning of its operators does; saved state asks for it
	Words     []Word
	Operators []Operator
}

// Word is a head word: its shape and how its forms are elaborated. A word that
// can only be checked leaves Infer nil, one that is always inferred Check nil.
type Word struct {
	term.Shape
	Infer func(c value.Checker, w *term.Written) (value.Core, value.Value)
	Check func(c value.Checker, w *term.Written, want value.Value) value.Core
}

// Operator is a core operator: its signature and what it does.
type Operator struct {
	Sig *term.Signature
	Op  eval.Operation
}

// Table is the table of the built-in formers. The slice is the caller's own.
func Table() []Former {
	return []Former{
		kanFormer(), piFormer(), piDimensionFormer(), sigmaFormer(), pathFormer(), unitFormer(),
		universeFormer(), dataFormer(), numeralFormer(), glueFormer(), letFormer(),
	}
}

// shapes of the built-in words, by word
var shapes = func() map[string]term.Shape {
	m := map[string]term.Shape{}
	for _, s := range term.Words() {
		m[s.Word] = s
	}
	return m
}()

func word(name string, infer func(value.Checker, *term.Written) (value.Core, value.Value), check func(value.Checker, *term.Written, value.Value) value.Core) Word {
	return Word{Shape: shapes[name], Infer: infer, Check: check}
}

func op(sig *term.Signature, args ...term.Arg) *term.Op { return &term.Op{Sig: sig, Args: args} }

func part(w *term.Written, k int) *term.Written { return w.Parts[k].Body }

func binder(w *term.Written, k int) term.Binder { return w.Parts[k].Binders[0] }

// hint prefers the first name that says anything.
func hint(names ...string) string {
	for _, n := range names {
		if n != "" && n != "_" {
			return n
		}
	}
	return "_"
}

// slots of arguments: a term, the rest of the terms, a dimension
var (
	plainSlot = term.CoreSlot{}
	restSlot  = term.CoreSlot{Slot: term.Slot{Rest: true}}
	dimSlot   = term.CoreSlot{Slot: term.Slot{Sort: term.DimensionSort}}
)
