package prims

import (
	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
)

// Local definitions (let ((x T t)) u), and terms with their type (ann t T).

var letSig = &term.Signature{Name: "let", Word: "let", Slots: []term.CoreSlot{plainSlot, plainSlot, boundSlot}}

type letOp struct{}

// Eval evaluates the body with the definition in a cell, once for all its uses.
func (letOp) Eval(run *value.Run, f eval.Frame, args []eval.Arg) value.Value {
	return args[2].Close(run, f).Apply(run, args[1].Delay(run, f))
}

func letFormer() Former {
	return Former{
		Name: "definitions", Version: 1,
		Words: []Word{
			word("let", inferLet, checkLet),
			word("ann", func(c value.Checker, w *term.Written) (value.Core, value.Value) {
				t, _ := c.Type(part(w, 1))
				v := c.Value(t)
				return c.Check(part(w, 0), v), v
			}, nil),
		},
		Operators: []Operator{{letSig, letOp{}}},
	}
}

func inferLet(c value.Checker, w *term.Written) (value.Core, value.Value) {
	var t value.Value
	core := elaborateLet(c, w, func(body *term.Written) (u value.Core) {
		u, t = c.Infer(body)
		return u
	})
	return core, t
}

func checkLet(c value.Checker, w *term.Written, want value.Value) value.Core {
	return elaborateLet(c, w, func(body *term.Written) value.Core { return c.Check(body, want) })
}

func elaborateLet(c value.Checker, w *term.Written, body func(*term.Written) value.Core) value.Core {
	t, _ := c.Type(part(w, 0))
	tv := c.Value(t)
	a := c.Check(part(w, 1), tv)
	return op(letSig, t, a, c.Defined(binder(w, 2), tv, c.Value(a), func() value.Core { return body(part(w, 2)) }))
}
