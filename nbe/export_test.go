package nbe

// What tests of properties reach of the inside: a substitution of dimensions
// put into values that have been made and perhaps looked at.

import (
	"context"

	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// SubstituteValue is t, as a value, with s put in: the names are the levels of
// the dimensions of the scope, which stay as they are. The result can be
// normalised and compared.
func (s *Scope) SubstituteValue(ctx context.Context, t *Term, sub *interval.Subst, options ...CallOption) (*Term, error) {
	if err := s.owns(t); err != nil {
		return nil, err
	}
	out := &Term{scope: s}
	err := s.e.call(ctx, gather(options), func(run *value.Run) {
		for _, c := range t.cases {
			out.cases = append(out.cases, termCase{c.core, run.Substitute(c.t, sub), run.Substitute(c.v, sub)})
		}
	})
	return out, err
}
