package nbe_test

import (
	"context"
	"math/big"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/term"
)

// Recursion over numerals: a step may look at the number as well as at its
// hypothesis, and may demand it in any of the ways a program does.
func TestNumeralLoopsLookAtTheNumber(t *testing.T) {
	const given = programs + `
		(def triangle (-> Nat Nat) (lam (n) (elim (_ Nat) n (zero 0) ((suc k h) (add h k)))))
		(def flipped (-> Nat Nat Nat) (lam (m n) (add n m)))
		(def through (-> Nat Nat) (lam (n) (elim (_ Nat) n (zero 0) ((suc k h) (flipped k h)))))
		(def twice (-> (-> Nat Nat) Nat Nat) (lam (f n) (f (f n))))
		(def step (-> Nat Nat) (lam (n) (add n 1)))
		(def doubled (-> Nat Nat) (lam (n) (elim (_ Nat) n (zero 0) ((suc k h) (twice step h)))))
		(def passed (-> (-> Nat Nat) Nat Nat) (lam (f n) (elim (_ Nat) n (zero 0) ((suc k h) (twice f h)))))
		(def computed (-> Nat Nat) (lam (n) (elim (_ Nat) n (zero 0) ((suc k h) (twice (lam (m) (add m 1)) h)))))
		(def alias (-> Nat Nat Nat) add)
		(def aliased (-> Nat Nat) (lam (n) (elim (_ Nat) n (zero 0) ((suc k h) (alias h k)))))
		(def chosen (* (-> Nat Nat Nat) Nat) (pair add 0))
		(def picked (-> Nat Nat Nat) (fst chosen))
		(def choosing (-> Nat Nat) (lam (n) (elim (_ Nat) n (zero 0) ((suc k h) (picked h k)))))
		(def curried (-> Nat Nat Nat) (lam (m) (add m)))
		(def half-applied (-> Nat Nat) (lam (n) (elim (_ Nat) n (zero 0) ((suc k h) (curried h k)))))
		(assume opaque (-> Nat Nat))
		(def constant (-> Nat Nat) (lam (n) (elim (_ Nat) n (zero 0) ((suc k h) (snd (ann (pair (opaque h) k) (* Nat Nat)))))))
		(def nested (-> Nat Nat) (lam (n) (elim (_ Nat) (suc (suc (through n))) (zero 0) ((suc k h) (suc (suc h))))))
		(def shared (-> Nat (* Nat Nat)) (lam (n) (pair (add n n) (add n n))))
	`
	for _, b := range builds() {
		e := b.engine(t, given)
		for n := range int64(9) {
			for name, want := range map[string]int64{
				"triangle": n * (n - 1) / 2, "through": n * (n - 1) / 2, "doubled": 2 * n, "computed": 2 * n, "nested": 4 + n*(n-1),
				"aliased": n * (n - 1) / 2, "choosing": n * (n - 1) / 2, "half-applied": n * (n - 1) / 2, "constant": max(n-1, 0),
			} {
				w := term.Apply(term.Name(name), term.Numeral(uint64(n)))
				require.Equal(t, number(want).String(), normalNumber(t, e, w), "%s, %s", w, b.name)
			}
			w := term.Apply(term.Name("passed"), term.Name("step"), term.Numeral(uint64(n)))
			require.Equal(t, number(2*n).String(), normalNumber(t, e, w), "%s, %s", w, b.name)
			w = read(t, "(fst (shared "+number(n).String()+"))")
			require.Equal(t, number(2*n).String(), normalNumber(t, e, w), "%s, %s", w, b.name)
		}
	}
}

// Sums of a number and an unknown are compared by the number, however large:
// Peano's successor is injective.
func TestLargeSuccessorsAreCompared(t *testing.T) {
	ctx := context.Background()
	large := new(big.Int).Exp(number(10), number(40), nil)
	sum := func(n *big.Int, rest string) string { return "(add " + n.String() + " " + rest + ")" }
	more := new(big.Int).Add(large, number(1))
	twice := new(big.Int).Lsh(large, 1)
	e := numeralBuilds()[0].engine(t, programs+"(assume x Nat) (assume y Nat)")
	for _, l := range []law{
		{left: sum(large, "x"), right: sum(large, "x")},
		{left: sum(large, "(add 1 x)"), right: sum(more, "x")},
		{left: sum(large, sum(large, "x")), right: sum(twice, "x")},
		{left: sum(twice, sum(more, "(add y x)")), right: sum(more, sum(large, sum(large, "(add y x)")))},
	} {
		s := e.Scope()
		left, err := s.Check(ctx, read(t, l.left), read(t, "Nat"))
		require.NoError(t, err)
		right, err := s.Check(ctx, read(t, l.right), read(t, "Nat"))
		require.NoError(t, err)
		c, err := s.Compare(ctx, left, right) // a normal form would have as many successors
		require.NoError(t, err)
		require.Equal(t, nbe.Equal, c.Verdict, "%s and %s", l.left, l.right)
	}
}

// Eliminations are equal when what they eliminate, the family and each case are.
func TestEliminationsDiffer(t *testing.T) {
	const source = "HoTT Book 2013, 1.8, 1.9 and 5.1"
	const given = `
		(data Crate ((A (U 0))) (point empty ()) (point stacked ((a A) (below (Crate A)))))
		(assume A (U 0)) (assume a (-> Nat A)) (assume n (-> Nat Nat)) (assume x Nat) (assume c (Crate A))
		(def top-down (-> (Crate A) (Crate A)) (lam (c) (elim (_ (Crate A)) c (empty empty) ((stacked a b h) (stacked a h)))))`
	holds(t, given,
		law{name: "a case", source: source, ty: "Nat", left: "(elim (_ Nat) x (zero 0) ((suc k h) (n h)))", right: "(elim (_ Nat) x (zero 0) ((suc k h) (n k)))", differ: true},
		law{name: "a case of no hypothesis", source: source, ty: "Nat", left: "(elim (_ Nat) x (zero 0) ((suc k h) (n h)))", right: "(elim (_ Nat) x (zero 1) ((suc k h) (n h)))", differ: true},
		law{name: "the same", source: source, ty: "Nat", left: "(elim (_ Nat) x (zero 0) ((suc k h) (n h)))", right: "(elim (_ Nat) x (zero (fst (ann (pair 0 1) (* Nat Nat)))) ((suc j g) (n g)))"},
		law{name: "a transport and an elimination", source: source, ty: "(Crate A)", left: "(transp (i (Crate A)) bot c)", right: "(top-down c)", differ: true},
	)
}

// Sums too large to be written out are told apart or not at all: what differs is
// shown within the budget for output.
func TestLargeSuccessorsThatDiffer(t *testing.T) {
	ctx := context.Background()
	e := numeralBuilds()[0].engine(t, programs+"(assume x Nat) (assume y Nat)")
	s := e.Scope()
	for _, l := range []law{
		{left: "(add 100000000000000000000001 x)", right: "(add 100000000000000000000000 x)"},
		{left: "(add 100000000000000000000000 x)", right: "(add 200000000000000000000000 x)"},
		{left: "(add 100000000000000000000000 x)", right: "(add 100000000000000000000000 y)"},
		{left: "(add 100000000000000000000000 x)", right: "100000000000000000000000"},
	} {
		left, err := s.Check(ctx, read(t, l.left), read(t, "Nat"))
		require.NoError(t, err)
		right, err := s.Check(ctx, read(t, l.right), read(t, "Nat"))
		require.NoError(t, err)
		c, err := s.Compare(ctx, left, right, nbe.Within(nbe.Limits{Output: 1000}))
		if err != nil {
			require.Equal(t, term.OutOfBudget, term.KindOf(err))
		} else {
			require.Equal(t, nbe.Different, c.Verdict, "%s and %s", l.left, l.right)
		}
	}
}
