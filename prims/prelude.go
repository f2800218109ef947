package prims

import "example.com/boxwright/nbe/term"

// Prelude returns the declarations that every engine begins with: Empty, Bool,
// Nat, Sum and Circle. They are declarations like any other.
func Prelude() []*term.Declaration {
	return []*term.Declaration{emptyDeclaration(), boolDeclaration(), natDeclaration(), sumDeclaration(), circleDeclaration()}
}

func point(name string, args ...term.Param) term.Constructor {
	return term.Constructor{Name: name, Args: args}
}
