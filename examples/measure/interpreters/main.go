// Command interpreters measures the engine beside two general-purpose interpreters
// written in Go, and saves a table that measure can read:
//
//	go run . -o interpreters.json
//	cd ../../.. && go run ./examples/measure -with examples/measure/interpreters/interpreters.json
//
// It is a module of its own, so that nobody who imports the engine downloads an
// interpreter. The interpreters run the same recursions as the rows of measure,
// compiled before the clock starts.
package main

import (
	"context"
	"flag"
	"fmt"
	"os"
	"strings"
	"time"

	"github.com/dop251/goja"
	"go.starlark.net/starlark"
	"go.starlark.net/syntax"

	"example.com/boxwright/examples/measure/gauge"
	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
)

const text = `
(def Church (U 1) (Pi ((A (U 0))) (-> (-> A A) A A)))
(def two Church (lam (A f x) (f (f x))))
(def times (-> Church Church Church) (lam (m n A f) (m A (n A f))))
(def square (-> Church Church) (lam (m) (times m m)))
(def n16 Church (square (square (square (square two)))))
(def ackermann (-> Nat Nat Nat)
  (lam (m) (elim (x (-> Nat Nat)) m
    (zero (lam (n) (suc n)))
    ((suc k h) (lam (n) (elim (y Nat) n (zero (h 1)) ((suc l g) (h g))))))))
`

const javascript = `
const two = f => x => f(f(x));
const times = m => n => f => m(n(f));
const square = m => times(m)(m);
const n16 = square(square(square(square(two))));
function church() { return n16(x => x + 1)(0); }
function elim(n, zero, step) { for (let k = 0; k < n; k++) zero = step(k)(zero); return zero; }
const ack = m => elim(m, n => n + 1, k => h => n => elim(n, h(1), l => g => h(g)));
function ackermann() { return ack(2)(300); }
`

const starlarkText = `
two = lambda f: lambda x: f(f(x))
times = lambda m: lambda n: lambda f: m(n(f))
square = lambda m: times(m)(m)
n16 = square(square(square(square(two))))
def church():
    return n16(lambda x: x + 1)(0)
def elim(n, zero, step):
    for k in range(n):
        zero = step(k)(zero)
    return zero
ack = lambda m: elim(m, lambda n: n + 1, lambda k: lambda h: lambda n: elim(n, h(1), lambda l: lambda g: h(g)))
def ackermann():
    return ack(2)(300)
`

// engine returns the operation of evaluating a term.
func engine(src, answer string) (func() (func() error, error), error) {
	e, err := nbe.New()
	if err != nil {
		return nil, err
	}
	s := &script.Session{Engine: e, Report: func(r script.Result) {
		if r.Err != nil && err == nil {
			err = r.Err
		}
	}}
	if e := s.Source(context.Background(), []byte(text), "rows.sexp"); e != nil || err != nil {
		return nil, fmt.Errorf("%v %w", e, err)
	}
	w, err := notation.ReadTerm(src, "row", e.Words())
	if err != nil {
		return nil, err
	}
	return func() (func() error, error) { return evaluate(e.Scope(), w, answer) }, nil
}

func evaluate(s *nbe.Scope, w *term.Written, answer string) (func() error, error) {
	t, err := s.Infer(context.Background(), w)
	if err != nil {
		return nil, err
	}
	return func() error {
		forms, err := s.Normal(context.Background(), t)
		if err == nil && forms[0].String() != answer {
			err = fmt.Errorf("the answer is %s", &forms[0])
		}
		return err
	}, nil
}

// gojaCall returns the call of a function of the script.
func gojaCall(name, answer string) (func(), error) {
	vm := goja.New()
	if _, err := vm.RunString(javascript); err != nil {
		return nil, err
	}
	f, ok := goja.AssertFunction(vm.Get(name))
	if !ok {
		return nil, fmt.Errorf("%s is no function", name)
	}
	return func() {
		if v, err := f(goja.Undefined()); err != nil || v.String() != answer {
			panic(fmt.Sprint(v, err))
		}
	}, nil
}

// starlarkCall is the same with the other interpreter.
func starlarkCall(name, answer string) (func(), error) {
	thread := &starlark.Thread{}
	globals, err := starlark.ExecFileOptions(&syntax.FileOptions{Recursion: true, GlobalReassign: true}, thread, "rows.star", starlarkText, nil)
	if err != nil {
		return nil, err
	}
	return func() {
		if v, err := starlark.Call(thread, globals[name], nil, nil); err != nil || v.String() != answer {
			panic(fmt.Sprint(v, err))
		}
	}, nil
}

func rows() (out []gauge.Row) {
	for _, interpreter := range []struct {
		name string
		call func(name, answer string) (func(), error)
	}{{"goja", gojaCall}, {"starlark", starlarkCall}} {
		for _, work := range []struct {
			name, function, src, answer string
			size                        int
			target                      float64
		}{
			{"Church numeral 2^16 at successor and zero", "church", "(n16 Nat (lam (x) (suc x)) 0)", "65536", 1 << 16, 0.6},
			{"Ackermann A(2,300) by the recursor", "ackermann", "(ackermann 2 300)", "603", 300, 1},
		} {
			out = append(out, gauge.Row{
				Group: "Beside general-purpose interpreters", Name: work.name + ", beside " + interpreter.name, Kind: gauge.Ratio, Sizes: []int{work.size}, Target: work.target, Baseline: interpreter.name,
				Prepare: func(int) (*gauge.Case, error) {
					fresh, err := engine(work.src, work.answer)
					if err != nil {
						return nil, err
					}
					base, err := interpreter.call(work.function, work.answer)
					return &gauge.Case{Fresh: fresh, Base: base}, err
				},
			})
		}
	}
	return out
}

func main() {
	out := flag.String("o", "", "save the table in `file`")
	rounds := flag.Int("rounds", 10, "rounds for each row")
	flag.Parse()
	table := gauge.NewTable(*rounds, "the interpreter that the row names")
	for _, r := range rows() {
		table.Results = append(table.Results, gauge.Measure(r, gauge.Settings{Rounds: *rounds, Round: 20 * time.Millisecond}))
	}
	table.WriteText(os.Stdout)
	if *out == "" {
		return
	}
	var b strings.Builder
	err := table.WriteJSON(&b)
	if err == nil {
		err = os.WriteFile(*out, []byte(b.String()), 0o644)
	}
	if err != nil {
		fmt.Fprintln(os.Stderr, err)
		os.Exit(2)
	}
}
