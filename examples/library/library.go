// Package library holds scripts of standard mathematics for the engine, as files
// for programs, so that they are found wherever the program runs. A script loads
// what it builds on:
//
//	paths.sexp         inverses, composites, transport, path induction
//	equivalences.sexp  contractible types, fibers, quasi-inverses
//	propositions.sexp  propositions, sets, groupoids
//	univalence.sexp    ua, its computation rule, univalence
//	booleans.sexp      negation as a path of types, and its square
//	integers.sexp      integers, successor as an equivalence
//	decidable.sexp     Hedberg's theorem, sets with decidable equality
//	circle.sexp        universal cover, winding numbers, loops as integers
//	loops.sexp         the circle is a groupoid
//	suspension.sexp    suspensions, the Hopf fibration
//	join.sexp          joins, the circle as a group, the Hopf construction
//	james.sexp         the James construction on the 2-sphere
//	rotations.sexp     types with a rotation, degrees of squares of words
//	brunerie.sexp      a Brunerie number, which is -2
//	numerals.sexp      unary, binary and base-4 numerals, addition carried across
package library

import (
	"context"
	"embed"
	"io/fs"
	"path"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/script"
)

// Files are the scripts, by file name.
//
//go:embed *.sexp
var Files embed.FS

// ReadFile reads a script of the library by its file name, whatever directory is
// named before it: what a [script.Session] needs to load scripts of the library.
func ReadFile(name string) ([]byte, error) { return fs.ReadFile(Files, path.Base(name)) }

// Load handles scripts of the library, named without their ending, on e, with what
// they load. The error is that of the first form that does not do what it should,
// or fs.ErrNotExist in a *script.Unreadable.
func Load(ctx context.Context, e *nbe.Engine, names ...string) error {
	var first error
	s := &script.Session{Engine: e, ReadFile: ReadFile, Report: func(r script.Result) {
		if r.Err != nil && first == nil {
			first = r.Err
		}
	}}
	for _, name := range names {
		if err := s.File(ctx, name+".sexp"); err != nil {
			return err
		}
	}
	return first
}
