package prims

import (
	"fmt"

	"example.com/boxwright/nbe/term"
)

// What a declaration is made of, for saving it and for its content hash.

// Cores calls visit for every core term of the declaration.
func (d *Data) Cores(visit func(term.Core)) {
	d.Describe(func(...string) {}, visit)
}

// Describe goes over the declaration in order: its shape as words, its types
// and boundaries as core terms.
func (d *Data) Describe(words func(...string), core func(term.Core)) {
	words(fmt.Sprint(d.Formal, d.Level, len(d.Params), len(d.Constructors)))
	arguments := func(list []Argument) {
		for _, a := range list {
			words("argument", a.Name)
			core(a.Core)
		}
	}
	arguments(d.Params)
	for _, c := range d.Constructors {
		words("constructor", c.Name, fmt.Sprint(len(c.Args), len(c.Boundary)))
		words(c.Dims...)
		arguments(c.Args)
		for _, b := range c.Boundary {
			words("boundary", b.Cube.String())
			core(b.Core)
		}
	}
}
