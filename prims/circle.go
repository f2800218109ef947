package prims

import "example.com/boxwright/nbe/term"

// Circle is a point and a loop at it (CHM 3.1).
func circleDeclaration() *term.Declaration {
	i := term.Name("i")
	return &term.Declaration{Name: "Circle", Constructors: []term.Constructor{
		point("base"),
		{Name: "loop", Path: true, Dims: []term.Binder{{Name: "i"}}, Boundary: []term.BoundaryWall{
			{Face: term.Or(term.Eq(i, 0), term.Eq(i, 1)), Element: term.Name("base")},
		}},
	}}
}
