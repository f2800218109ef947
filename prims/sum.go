package prims

import "example.com/boxwright/nbe/term"

// Sum A B is a left element of A or a right element of B.
func sumDeclaration() *term.Declaration {
	return &term.Declaration{
		Name:   "Sum",
		Params: []term.Param{{Name: "A", Type: term.Universe(0)}, {Name: "B", Type: term.Universe(0)}},
		Constructors: []term.Constructor{
			point("inl", term.Param{Name: "a", Type: term.Name("A")}),
			point("inr", term.Param{Name: "b", Type: term.Name("B")}),
		},
	}
}
