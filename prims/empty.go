package prims

import "example.com/boxwright/nbe/term"

// Empty has no constructors.
func emptyDeclaration() *term.Declaration { return &term.Declaration{Name: "Empty"} }
