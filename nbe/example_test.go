package nbe_test

import (
	"context"
	"errors"
	"fmt"
	"log"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
)

// must is for examples alone: a host handles its errors.
func must[T any](x T, err error) T {
	if err != nil {
		log.Fatal(err)
	}
	return x
}

func check(err error) {
	if err != nil {
		log.Fatal(err)
	}
}

// text reads a term of the notation.
func text(e *nbe.Engine, s string) *term.Written {
	return must(notation.ReadTerm(s, "example", e.Words()))
}

// The first embedding: an engine, a definition, a normal form, a comparison.
func Example() {
	ctx := context.Background()
	engine, err := nbe.New()
	if err != nil {
		log.Fatal(err)
	}
	// Crates put on top of crates: (lam (m n) (elim (x Nat) m (zero n) ((suc k h) (suc h)))).
	nat, m, n, h := term.Name("Nat"), term.Name("m"), term.Name("n"), term.Name("h")
	put := term.Lam(term.Elim("x", nat, m, term.Case("zero", n), term.Case("suc", term.Apply(term.Name("suc"), h), "k", "h")), "m", "n")
	if err := engine.Define(ctx, "put", term.Arrow(nat, nat, nat), put); err != nil {
		log.Fatal(err)
	}
	scope := engine.Scope()
	crates, err := scope.Infer(ctx, term.Apply(term.Name("put"), term.Numeral(2), term.Numeral(3)))
	if err != nil {
		log.Fatal(err) // a *term.Error: its kind, place, and what was expected and found
	}
	forms, err := scope.Normal(ctx, crates)
	if err != nil {
		log.Fatal(err)
	}
	same, err := scope.CompareAt(ctx, nat, term.Numeral(5), term.Apply(term.Name("put"), term.Numeral(1), term.Numeral(3)))
	fmt.Println(forms[0].String(), same.Verdict, same.Difference, err)
	// Output: 5 different 5 is not (put 1 3) <nil>
}

// Terms are built with functions of package term, or read from text; both give
// the same tree.
func ExampleEngine_Words() {
	e := must(nbe.New())
	built := term.Lam(term.Line(term.At(term.Name("p"), term.Rev(term.Name("i"))), "i"), "p")
	fmt.Println(built)
	fmt.Println(text(e, "(lam (p) (line (i) (at p (rev i))))").Same(built))
	// Output:
	// (lam (p) (line (i) (at p (rev i))))
	// true
}

func ExampleEngine_Define() {
	ctx := context.Background()
	e := must(nbe.New())
	check(e.Define(ctx, "turn", text(e, "(Path Circle base base)"), text(e, "(line (i) (loop i))")))
	err := e.Define(ctx, "stuck", text(e, "(Path Circle base base)"), text(e, "7"))
	fmt.Println(err)
	// Output: example:1:1: the type is another: expected (Path Circle base base), found Nat
}

func ExampleEngine_Assume() {
	ctx := context.Background()
	e := must(nbe.New())
	check(e.Assume(ctx, "crates", term.Name("Nat")))
	s := e.Scope()
	x := must(s.Infer(ctx, text(e, "(suc crates)")))
	fmt.Println(must(s.Normal(ctx, x))[0].String())
	// A definition may take the assumption's place; what was stuck on it computes.
	check(e.Define(ctx, "crates", term.Name("Nat"), term.Numeral(6)))
	fmt.Println(must(s.Normal(ctx, x))[0].String())
	// Output:
	// (suc crates)
	// 7
}

func ExampleEngine_Hole() {
	ctx := context.Background()
	e := must(nbe.New())
	check(e.Hole(ctx, "berth", term.Name("Nat")))
	s := e.Scope()
	c := must(s.CompareAt(ctx, term.Name("Nat"), text(e, "(suc berth)"), term.Numeral(4)))
	fmt.Println(c.Verdict, c.Hole)
	check(e.Define(ctx, "berth", term.Name("Nat"), term.Numeral(3)))
	c = must(s.CompareAt(ctx, term.Name("Nat"), text(e, "(suc berth)"), term.Numeral(4)))
	fmt.Println(c.Verdict)
	// Output:
	// undecided berth
	// equal
}

func ExampleEngine_Declare() {
	ctx := context.Background()
	e := must(nbe.New())
	rail := &term.Declaration{Name: "Rail", Constructors: []term.Constructor{
		{Name: "west"}, {Name: "east"},
		{Name: "rail", Path: true, Dims: []term.Binder{{Name: "i"}}, Boundary: []term.BoundaryWall{
			{Face: term.Eq(term.Name("i"), 0), Element: term.Name("west")},
			{Face: term.Eq(term.Name("i"), 1), Element: term.Name("east")},
		}},
	}}
	check(e.Declare(ctx, rail))
	s := e.Scope()
	x := must(s.Infer(ctx, text(e, "(rail 1)")))
	fmt.Println(must(s.Normal(ctx, x))[0].String())
	// Output: east
}

// A fork holds everything its engine holds, and can be dropped.
func ExampleEngine_Fork() {
	ctx := context.Background()
	e := must(nbe.New())
	trial := e.Fork()
	check(trial.Define(ctx, "crates", term.Name("Nat"), term.Numeral(3)))
	_, err := e.Scope().Infer(ctx, term.Name("crates"))
	fmt.Println(errors.Is(err, term.NotFound))
	// Output: true
}

func ExampleScope_Check() {
	ctx := context.Background()
	e := must(nbe.New())
	s := e.Scope()
	x := must(s.Check(ctx, text(e, "(line (i) (loop (rev i)))"), text(e, "(Path Circle base base)")))
	fmt.Println(must(s.Write(x.Core())))
	_, err := s.Check(ctx, text(e, "(line (i) 3)"), text(e, "(Path Nat 3 4)"))
	fmt.Println(err)
	// Output:
	// (line (i) (loop (rev i)))
	// example:1:1: the path ends elsewhere at 1: expected 4, found 3
}

func ExampleScope_Infer() {
	ctx := context.Background()
	e := must(nbe.New())
	s := e.Scope()
	x := must(s.Infer(ctx, text(e, "(Path Nat 3 4)")))
	forms := must(s.Normal(ctx, x))
	fmt.Println(forms[0].String(), ":", must(forms[0].WrittenType()))
	// Output: (Path Nat 3 4) : (U 0)
}

// Folded definitions stay names until something needs them; opaque ones always.
func ExampleScope_Normal() {
	ctx := context.Background()
	e := must(nbe.New())
	check(e.Define(ctx, "dozen", term.Name("Nat"), term.Numeral(12)))
	check(e.Define(ctx, "lift", text(e, "(-> Nat Nat)"), text(e, "(lam (n) (elim (x Nat) n (zero 0) ((suc k h) k)))")))
	s := e.Scope()
	x := must(s.Infer(ctx, text(e, "(lift dozen)")))
	y := must(s.Check(ctx, text(e, "(pair dozen (lift dozen))"), text(e, "(* Nat Nat)")))
	fmt.Println(must(s.Normal(ctx, x))[0].String())
	fmt.Println(must(s.Normal(ctx, y, nbe.Folded("dozen")))[0].String())
	fmt.Println(must(s.Normal(ctx, y, nbe.Opaque("lift")))[0].String())
	// Output:
	// 11
	// (pair dozen 11)
	// (pair 12 (lift 12))
}

func ExampleScope_Compare() {
	ctx := context.Background()
	e := must(nbe.New())
	s := e.Scope()
	ty := text(e, "(* Nat (-> Nat Nat))")
	c := must(s.CompareAt(ctx, ty, text(e, "(pair 1 (lam (n) n))"), text(e, "(pair 1 (lam (n) (suc n)))")))
	fmt.Println(c.Verdict, "at", c.Difference.Way)
	fmt.Println(c.Difference.Left, "and", c.Difference.Right)
	// Output:
	// different at [the second part the function's value]
	// x and (suc x)
}

// A scope under a face: two faces at once give two forms.
func ExampleScope_Assume() {
	ctx := context.Background()
	e := must(nbe.New())
	s := must(e.Scope().Dimension("i"))
	s = must(s.Assume(ctx, term.Or(term.Eq(term.Name("i"), 0), term.Eq(term.Name("i"), 1))))
	x := must(s.Infer(ctx, text(e, "(loop i)")))
	for _, form := range must(s.Normal(ctx, x)) {
		fmt.Println(form.String())
	}
	// Output:
	// base
	// base
}

// Values are what an elaborator works with: nothing goes through text.
func ExampleTerm_Value() {
	ctx := context.Background()
	e := must(nbe.New())
	s := must(e.Scope().Dimension("i"))
	f := must(s.Infer(ctx, text(e, "(ann (lam (n) (line (j) n)) (Pi ((n Nat)) (Path Nat n n)))")))
	seven := must(s.Infer(ctx, term.Numeral(7)))
	p := must(f.Value().Apply(ctx, []*nbe.Value{seven.Value()}))
	at := must(p.At(ctx, term.Name("i")))
	fmt.Println(must(at.ReadBack(ctx))[0].String())
	// Output: 7
}

func ExampleWithin() {
	ctx := context.Background()
	e := must(nbe.New())
	check(e.Define(ctx, "down", text(e, "(-> Nat Nat)"), text(e, "(lam (n) (elim (x Nat) n (zero 0) ((suc k h) (elim (y Nat) h (zero 0) ((suc m g) m)))))")))
	s := e.Scope()
	x := must(s.Infer(ctx, text(e, "(down 1000000)")))
	_, err := s.Normal(ctx, x, nbe.Within(nbe.Limits{Steps: 1000}))
	fmt.Println(errors.Is(err, term.OutOfBudget))
	// The engine and the term are as they were.
	fmt.Println(must(s.Normal(ctx, x, nbe.Opaque("down")))[0].String())
	// Output:
	// true
	// (down 1000000)
}

func ExampleLimits() {
	e := must(nbe.New(nbe.WithLimits(nbe.Limits{Steps: 1_000_000, Memory: 1 << 28})))
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	_, err := e.Scope().Infer(ctx, term.Numeral(1))
	fmt.Println(errors.Is(err, term.Cancelled), errors.Is(err, context.Canceled))
	// Output: true true
}

func ExampleEngine_Scope() {
	ctx := context.Background()
	e := must(nbe.New())
	s := must(e.Scope().Variable(ctx, "n", term.Name("Nat")))
	_, err := s.Infer(ctx, text(e, "(suc\n  unit)"))
	var fault *term.Error
	if errors.As(err, &fault) {
		fmt.Println(fault.Kind, fault.Place.Line, fault.Place.Column, fault.Want, fault.Got)
	}
	// Output: ill-typed 2 3 Nat Unit
}

func ExampleCount() {
	ctx := context.Background()
	e := must(nbe.New())
	var stats nbe.Stats
	_, err := e.Scope().Infer(ctx, text(e, "(suc 3)"), nbe.Count(&stats))
	fmt.Println(err, stats.Steps > 0)
	// Output: <nil> true
}
