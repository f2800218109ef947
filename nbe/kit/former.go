package kit

import "example.com/boxwright/nbe"

// Former is a type former under test.
type Former struct {
	Name string
	// Options are those of an engine that has the former.
	Options []nbe.Option
	// Script is handled before anything is drawn.
	Script string
	// Types draws a type of the former over the dimensions that g has in scope.
	Types func(g *Gen) Sample
}
