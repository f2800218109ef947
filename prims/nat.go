package prims

import "example.com/boxwright/nbe/term"

// Nat is zero and suc. Its elements are stored as numbers (numeral.go), which
// is the one thing that the declaration does not say.
func natDeclaration() *term.Declaration {
	return &term.Declaration{Name: "Nat", Constructors: []term.Constructor{
		point("zero"), point("suc", term.Param{Name: "n", Type: term.Name("Nat")}),
	}}
}

// LooksLikeNaturals reports whether d is declared as zero and suc are.
func (d *Data) LooksLikeNaturals() bool {
	if d.Name != "Nat" || d.Formal || len(d.Params) != 0 || len(d.Constructors) != 2 {
		return false
	}
	zero, suc := d.Constructors[0], d.Constructors[1]
	return len(zero.Args) == 0 && len(suc.Args) == 1 && suc.Args[0].Recursive != nil && suc.Args[0].Recursive.shape == recursionSelf
}
