package library

import (
	"context"
	"fmt"
	"math/big"
	"math/rand/v2"
	"testing"
)

// Addition carried along paths of types between numerals (HoTT Book 2.14, on
// structure carried across univalence), against math/big.

func TestAdditionCarriedBetweenUnaryAndBinary(t *testing.T) {
	e := withLibrary(t, "numerals")
	s := e.Scope()
	r := rand.New(rand.NewPCG(2, 14))
	for k := range 150 {
		m, n := r.IntN(501), r.IntN(501)
		if k == 0 {
			m, n = 500, 500
		}
		want := new(big.Int).Add(big.NewInt(int64(m)), big.NewInt(int64(n)))
		src := fmt.Sprintf("(carried-plus %s %s)", numeralTerm(m), numeralTerm(n))
		if got := positional(t, normal(t, s, e, src)); got.Cmp(want) != 0 {
			t.Errorf("%s is %s", src, got)
		}
		src = fmt.Sprintf("(carried-numeral-plus %d %d)", m, n)
		if got := normal(t, s, e, src); got != want.String() {
			t.Errorf("%s is %s", src, got)
		}
	}
}

func numeralTerm(n int) string {
	if n == 0 {
		return "nought"
	}
	return "(positive " + binaryTerm(big.NewInt(int64(n))) + ")"
}

// The proof that addition is commutative is carried with it: it is a path
// between the carried sums, and its normal form checks again.
func TestProofCarriedWithAddition(t *testing.T) {
	e := withLibrary(t, "numerals")
	s := e.Scope()
	r := rand.New(rand.NewPCG(2, 15))
	for range 12 {
		m, n := numeralTerm(r.IntN(30)), numeralTerm(r.IntN(30))
		sum := fmt.Sprintf("((fst carried-commutative-plus) %s %s)", m, n)
		other := fmt.Sprintf("((fst carried-commutative-plus) %s %s)", n, m)
		proof := fmt.Sprintf("((snd carried-commutative-plus) %s %s)", m, n)
		rechecks(t, s, e, proof)
		if a, b := normal(t, s, e, sum), normal(t, s, e, "(at "+proof+" 0)"); a != b {
			t.Errorf("%s begins at %s, not at %s", proof, b, a)
		}
		if a, b := normal(t, s, e, other), normal(t, s, e, "(at "+proof+" 1)"); a != b {
			t.Errorf("%s ends at %s, not at %s", proof, b, a)
		}
		path := fmt.Sprintf("(Path Numeral %s %s)", sum, other)
		if _, err := s.Check(context.Background(), written(t, e, proof), written(t, e, path)); err != nil {
			t.Error(clip(err))
		}
	}
}

func TestAdditionCarriedFromBinaryToBase4(t *testing.T) {
	e := withLibrary(t, "numerals")
	s := e.Scope()
	r := rand.New(rand.NewPCG(2, 16))
	pairs := 10_000
	if testing.Short() {
		pairs = 300
	}
	for k := range pairs {
		m, n := randomNumber(r, 64), randomNumber(r, 64)
		if k == 0 {
			m, n = new(big.Int).SetUint64(1<<64-1), new(big.Int).SetUint64(1<<64-1)
		}
		src := "(quaternary-plus " + quaternaryTerm(m) + " " + quaternaryTerm(n) + ")"
		if got, want := positional(t, normal(t, s, e, src)), new(big.Int).Add(m, n); got.Cmp(want) != 0 {
			t.Fatalf("%s + %s is %s", m, n, got)
		}
	}
	for range 20 {
		m, n := randomNumber(r, 16), randomNumber(r, 200)
		rechecks(t, s, e, "(quaternary-plus "+quaternaryTerm(m)+" "+quaternaryTerm(n)+")")
		if got := positional(t, normal(t, s, e, "(binary-of-quaternary (quaternary "+binaryTerm(n)+"))")); got.Cmp(n) != 0 {
			t.Errorf("%s comes back as %s", n, got)
		}
	}
}

// randomNumber is a positive number of at most the given number of bits.
func randomNumber(r *rand.Rand, bits int) *big.Int {
	n := new(big.Int)
	for range (bits + 63) / 64 {
		n.Lsh(n, 64).Add(n, new(big.Int).SetUint64(r.Uint64()))
	}
	n.Rsh(n, uint(n.BitLen()-min(n.BitLen(), bits)))
	if n.Sign() == 0 {
		n.SetInt64(1)
	}
	return n
}

func BenchmarkAdditionCarriedToBase4(b *testing.B) {
	e := withLibrary(b, "numerals")
	s := e.Scope()
	for _, bits := range []int{64, 128, 256, 512, 1024} {
		r := rand.New(rand.NewPCG(2, 17))
		m, n := randomNumber(r, bits), randomNumber(r, bits)
		src := "(quaternary-plus " + quaternaryTerm(m) + " " + quaternaryTerm(n) + ")"
		want := new(big.Int).Add(m, n)
		b.Run(fmt.Sprint(bits), func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				if got := positional(b, normal(b, s, e, src)); got.Cmp(want) != 0 {
					b.Fatal(got)
				}
			}
		})
	}
}
