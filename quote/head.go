package quote

import (
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
)

// Head reads v back at type t no deeper than its outermost constructor: what
// stands below is read back with every definition folded that can be. There is
// no form for an unevaluated remainder in the syntax, so what is below and not
// headed by a definition is read in full.
func (q *Reader) Head(t, v value.Value) value.Core {
	run := q.run
	switch t := run.Force(t).(type) {
	case value.Type:
		fold := q.fold
		q.fold = func(value.Global) bool { return true }
		c := t.ReadBackElement(q, run.Force(v))
		q.fold = fold
		return c
	case *value.Neutral:
		if n, ok := run.Force(v).(*value.Neutral); ok {
			return q.Neutral(n)
		}
	}
	run.Fail(&term.Error{Kind: term.Internal, Message: "a value does not fit its type"})
	return nil
}
