package prims

import "example.com/boxwright/nbe/term"

// Bool is true and false.
func boolDeclaration() *term.Declaration {
	return &term.Declaration{Name: "Bool", Constructors: []term.Constructor{point("true"), point("false")}}
}
