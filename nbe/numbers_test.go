package nbe_test

// Programs over natural numbers against math/big, with the rule that eliminates
// numerals at once switched on and off. The recurrences are the textbook ones.

import (
	"context"
	"fmt"
	"math/big"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
)

const programs = `
	(def add (-> Nat Nat Nat) (lam (m n) (elim (_ Nat) m (zero n) ((suc k h) (suc h)))))
	(def mul (-> Nat Nat Nat) (lam (m n) (elim (_ Nat) m (zero 0) ((suc k h) (add n h)))))
	(def power (-> Nat Nat Nat) (lam (m n) (elim (_ Nat) n (zero 1) ((suc k h) (mul m h)))))
	(def factorial (-> Nat Nat) (lam (n) (elim (_ Nat) n (zero 1) ((suc k h) (mul (suc k) h)))))
	(def fibonacci (-> Nat Nat)
	  (lam (n) (fst (elim (_ (* Nat Nat)) n (zero (pair 0 1)) ((suc k h) (pair (snd h) (add (fst h) (snd h))))))))
	(def ackermann (-> Nat Nat Nat)
	  (lam (m) (elim (_ (-> Nat Nat)) m (zero (lam (n) (suc n)))
	    ((suc k f) (lam (n) (elim (_ Nat) n (zero (f 1)) ((suc j h) (f h))))))))
	(def binomial (-> Nat Nat Nat)
	  (lam (n) (elim (_ (-> Nat Nat)) n
	    (zero (lam (k) (elim (_ Nat) k (zero 1) ((suc j h) 0))))
	    ((suc m row) (lam (k) (elim (_ Nat) k (zero 1) ((suc j h) (add (row j) (row (suc j))))))))))
	(def predecessor (-> Nat Nat) (lam (n) (elim (_ Nat) n (zero 0) ((suc k h) k))))
	(def monus (-> Nat Nat Nat) (lam (m n) (elim (_ Nat) n (zero m) ((suc k h) (predecessor h)))))
`

// numeralBuilds are the engine with and without the rule for numerals. The
// step-by-step one is given small numbers only.
func numeralBuilds() []build {
	return []build{
		{"at once", nil, nil},
		{"step by step", []nbe.Option{nbe.WithPlain(value.Plain{NoNumerals: true})}, nil},
	}
}

func normalNumber(t *testing.T, e *nbe.Engine, w *term.Written) string {
	ctx := context.Background()
	s := e.Scope()
	x, err := s.Infer(ctx, w)
	require.NoError(t, err)
	forms, err := s.Normal(ctx, x)
	require.NoError(t, err, "%s", w)
	require.Len(t, forms, 1)
	return forms[0].String()
}

func number(n int64) *big.Int { return big.NewInt(n) }

func TestNumberProgramsAgainstBig(t *testing.T) {
	type program struct {
		name  string
		limit int64 // of each argument
		arity int
		want  func(a []int64) *big.Int
	}
	all := []program{
		{"add", 12, 2, func(a []int64) *big.Int { return new(big.Int).Add(number(a[0]), number(a[1])) }},
		{"mul", 12, 2, func(a []int64) *big.Int { return new(big.Int).Mul(number(a[0]), number(a[1])) }},
		{"power", 4, 2, func(a []int64) *big.Int { return new(big.Int).Exp(number(a[0]), number(a[1]), nil) }},
		{"factorial", 6, 1, func(a []int64) *big.Int { return new(big.Int).MulRange(1, a[0]) }},
		{"binomial", 8, 2, func(a []int64) *big.Int { return new(big.Int).Binomial(a[0], a[1]) }},
		{"fibonacci", 12, 1, func(a []int64) *big.Int { return fibonacci(a[0]) }},
		{"ackermann", 2, 2, func(a []int64) *big.Int { return ackermann(a[0], number(a[1])) }},
		{"predecessor", 12, 1, func(a []int64) *big.Int { return number(max(a[0]-1, 0)) }},
		{"monus", 9, 2, func(a []int64) *big.Int { return number(max(a[0]-a[1], 0)) }},
	}
	for _, b := range numeralBuilds() {
		e := b.engine(t, programs)
		for _, p := range all {
			for x := range p.limit + 1 {
				for y := range p.limit + 1 {
					a := []int64{x, y}[:p.arity]
					if p.arity == 1 && y > 0 {
						break
					}
					args := make([]*term.Written, len(a))
					for k := range a {
						args[k] = term.Numeral(uint64(a[k]))
					}
					w := term.Apply(term.Name(p.name), args...)
					require.Equal(t, p.want(a).String(), normalNumber(t, e, w), "%s, %s", w, b.name)
				}
			}
		}
	}
}

// Large results, which only the rule for numerals reaches.
func TestLargeNumbersAgainstBig(t *testing.T) {
	e := numeralBuilds()[0].engine(t, programs)
	seventeen := new(big.Int).Exp(number(10), number(40), nil)
	for _, c := range []struct {
		w    *term.Written
		want *big.Int
	}{
		{term.Apply(term.Name("add"), term.BigNumeral(seventeen), term.BigNumeral(seventeen)), new(big.Int).Add(seventeen, seventeen)},
		{term.Apply(term.Name("mul"), term.Numeral(1000), term.BigNumeral(seventeen)), new(big.Int).Mul(number(1000), seventeen)},
		{term.Apply(term.Name("power"), term.Numeral(2), term.Numeral(100)), new(big.Int).Exp(number(2), number(100), nil)},
		{term.Apply(term.Name("power"), term.Numeral(7), term.Numeral(60)), new(big.Int).Exp(number(7), number(60), nil)},
		{term.Apply(term.Name("factorial"), term.Numeral(30)), new(big.Int).MulRange(1, 30)},
		{term.Apply(term.Name("fibonacci"), term.Numeral(200)), fibonacci(200)},
		{term.Apply(term.Name("ackermann"), term.Numeral(2), term.Numeral(40)), ackermann(2, number(40))},
		{term.Apply(term.Name("ackermann"), term.Numeral(3), term.Numeral(5)), ackermann(3, number(5))},
		{term.Apply(term.Name("binomial"), term.Numeral(14), term.Numeral(6)), new(big.Int).Binomial(14, 6)},
		{term.Apply(term.Name("predecessor"), term.BigNumeral(seventeen)), new(big.Int).Sub(seventeen, number(1))},
	} {
		require.Equal(t, c.want.String(), normalNumber(t, e, c.w), "%s", c.w)
	}
}

func fibonacci(n int64) *big.Int {
	a, b := number(0), number(1)
	for range n {
		a, b = b, new(big.Int).Add(a, b)
	}
	return a
}

// ackermann is Ackermann's function as Péter has it; its first four rows have
// closed forms: n + 1, n + 2, 2n + 3, 2^(n+3) - 3.
func ackermann(m int64, n *big.Int) *big.Int {
	switch m {
	case 0:
		return new(big.Int).Add(n, number(1))
	case 1:
		return new(big.Int).Add(n, number(2))
	case 2:
		return new(big.Int).Add(new(big.Int).Lsh(n, 1), number(3))
	case 3:
		return new(big.Int).Sub(new(big.Int).Exp(number(2), new(big.Int).Add(n, number(3)), nil), number(3))
	}
	panic(fmt.Sprint("no closed form for row ", m))
}

// Open terms: the rule for numerals and stepping give the same normal forms.
func TestNumeralRuleOnOpenTerms(t *testing.T) {
	const given = programs + "(assume x Nat) (assume y Nat) (assume e (Path Nat x y))"
	var want []string
	for _, b := range numeralBuilds() {
		e := b.engine(t, given)
		var got []string
		for _, text := range []string{
			"(add 3 x)", "(add x 3)", "(add (suc (suc x)) y)", "(mul 3 (suc x))", "(mul (suc (suc x)) 2)", "(add (add 2 x) (add 3 y))",
			"(suc (suc 3))", "(suc (suc x))", "(predecessor (suc x))", "(predecessor (add 2 x))", "(power x 2)", "(fibonacci (suc (suc x)))",
			"(ann (lam (k) (hcomp Nat (suc (suc x)) ((= k 0) (i) (suc (add 1 (at e i)))))) (-> I Nat))",
			"(ann (lam (k) (add (hcomp Nat (suc x) ((= k 0) (i) (suc (at e i)))) 4)) (-> I Nat))",
			"(ann (lam (k) (add 4 (hcomp Nat (suc x) ((= k 0) (i) (suc (at e i)))))) (-> I Nat))",
			"(ann (lam (k) (hcomp Nat 3 ((= k 0) (i) (add 1 2)))) (-> I Nat))",
		} {
			got = append(got, text+" = "+normalNumber(t, e, read(t, text)))
		}
		if want == nil {
			want = got
		}
		require.Equal(t, want, got, b.name)
	}
}

// NOTATION: suc 1 is 2, and 10^9 costs as much as 5.
func TestNumeralsAreNumbers(t *testing.T) {
	accepted(t, "(assume x Nat) (normal (suc 1) 2) (same Nat (suc (suc x)) (suc (suc x))) (differ Nat (suc x) x) (differ Nat 3 4)")
	e := numeralBuilds()[0].engine(t, programs)
	var small, large nbe.Stats
	for _, c := range []struct {
		n     uint64
		stats *nbe.Stats
	}{{5, &small}, {1_000_000_000, &large}} {
		s := e.Scope()
		w := term.Apply(term.Name("add"), term.Numeral(c.n), term.Numeral(c.n))
		x, err := s.Infer(context.Background(), w)
		require.NoError(t, err)
		_, err = s.Normal(context.Background(), x, nbe.Count(c.stats))
		require.NoError(t, err)
	}
	require.Equal(t, small.Steps, large.Steps)
}
