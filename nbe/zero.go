package nbe

import "example.com/boxwright/nbe/term"

// Zero values. Engines come from New and Fork, everything else from engines;
// on zero values and nil pointers every call is an error, as for any misuse.

// empty is the error of calls on an engine that was not made by New.
func empty() error {
	return &term.Error{Kind: term.WrongScope, Message: "there is no engine here", WantText: "an engine made by New, or what comes from one", GotText: "a zero value"}
}

func (e *Engine) isZero() bool { return e == nil || e.notation == nil }

// engine is the engine of a scope, nil for a zero one.
func (s *Scope) engine() *Engine {
	if s == nil {
		return nil
	}
	return s.e
}

// in is the scope of a value, nil for a zero one.
func (v *Value) in() *Scope {
	if v == nil {
		return nil
	}
	return v.scope
}
