// Benchmarks. Each operation is timed next to a baseline in the same run: one
// call that joins two sets of literals held as two words each, the least that
// a meet of conjunctions can cost. The metric x/base is the ratio of the two.

package interval

import (
	"testing"
	"time"
)

// Results go here, so that no call is optimised away.
var (
	sinkPair pair
	sinkBool bool
	sinkDim  Dim
	sinkFace Face
	sinkSup  Support
)

// pair is a set of literals: a word of names and a word of reversed names.
type pair struct{ plain, reversed uint64 }

//go:noinline
func (p pair) join(q pair) pair { return pair{p.plain | q.plain, p.reversed | q.reversed} }

const tableSize = 64

var pairs = func() (table [tableSize]pair) {
	for k := range table {
		table[k] = pair{1 << k, 1 << (k * 7 % 64)}
	}
	return table
}()

// baseline returns the time that n two-word operations take, the best of three.
func baseline(n int) time.Duration {
	best := time.Duration(1 << 62)
	for range 3 {
		start := time.Now()
		for k := range n {
			sinkPair = pairs[k%tableSize].join(pairs[(k+11)%tableSize])
		}
		best = min(best, time.Since(start))
	}
	return best
}

// operands are pairwise different elements of one shape.
type operands struct {
	dims  [tableSize]Dim
	faces [tableSize]Face
}

// literalOperands are single literals on the first eight names.
func literalOperands() (out operands) {
	for k := range tableSize {
		out.dims[k] = Lit(Name(k*5%8), k%3 == 0)
		out.faces[k] = out.dims[k].Is1()
	}
	return out
}

// twoOperands have two conjunctions of two literals.
func twoOperands() (out operands) {
	for k := range tableSize {
		a, b, c := Name(k%4), Name(4+k*3%4), Name(8+k*5%8)
		out.dims[k] = Var(a).Min(Lit(b, k%3 == 0)).Max(Lit(b, k%2 == 0).Min(Var(c)))
		out.faces[k] = out.dims[k].Is1()
	}
	return out
}

func BenchmarkInterval(b *testing.B) {
	one, two := literalOperands(), twoOperands()
	zero, rename := Assign(3, Zero()), Rename(3, 6)
	connect := Assign(3, Var(3).Min(Var(9)))
	missed := Assign(20, Zero())
	for _, bench := range []struct {
		name string
		run  func(in *operands, n int)
	}{
		{"Min", func(in *operands, n int) {
			for k := range n {
				sinkDim = in.dims[k%tableSize].Min(in.dims[(k+11)%tableSize])
			}
		}},
		{"Max", func(in *operands, n int) {
			for k := range n {
				sinkDim = in.dims[k%tableSize].Max(in.dims[(k+11)%tableSize])
			}
		}},
		{"Rev", func(in *operands, n int) {
			for k := range n {
				sinkDim = in.dims[k%tableSize].Rev()
			}
		}},
		{"Equal", func(in *operands, n int) {
			for k := range n {
				sinkBool = in.dims[k%tableSize].Equal(in.dims[(k+11)%tableSize])
			}
		}},
		{"AtMost", func(in *operands, n int) {
			for k := range n {
				sinkBool = in.dims[k%tableSize].AtMost(in.dims[(k+11)%tableSize])
			}
		}},
		{"Support", func(in *operands, n int) {
			for k := range n {
				sinkSup = in.dims[k%tableSize].Support()
			}
		}},
		{"IsEnd", func(in *operands, n int) {
			for k := range n {
				sinkBool = in.dims[k%tableSize].IsEnd()
			}
		}},
		{"Is0", func(in *operands, n int) {
			for k := range n {
				sinkFace = in.dims[k%tableSize].Is0()
			}
		}},
		{"SubstEnd", func(in *operands, n int) {
			for k := range n {
				sinkDim = in.dims[k%tableSize].Subst(zero)
			}
		}},
		{"SubstMissed", func(in *operands, n int) {
			for k := range n {
				sinkDim = in.dims[k%tableSize].Subst(missed)
			}
		}},
		{"SubstRename", func(in *operands, n int) {
			for k := range n {
				sinkDim = in.dims[k%tableSize].Subst(rename)
			}
		}},
		{"SubstConnect", func(in *operands, n int) {
			for k := range n {
				sinkDim = in.dims[k%tableSize].Subst(connect)
			}
		}},
		{"And", func(in *operands, n int) {
			for k := range n {
				sinkFace = in.faces[k%tableSize].And(in.faces[(k+11)%tableSize])
			}
		}},
		{"Or", func(in *operands, n int) {
			for k := range n {
				sinkFace = in.faces[k%tableSize].Or(in.faces[(k+11)%tableSize])
			}
		}},
		{"Entails", func(in *operands, n int) {
			for k := range n {
				sinkBool = in.faces[k%tableSize].Entails(in.faces[(k+11)%tableSize])
			}
		}},
		{"Forall", func(in *operands, n int) {
			for k := range n {
				sinkFace = in.faces[k%tableSize].Forall(Name(k % 8))
			}
		}},
		{"FaceSubstEnd", func(in *operands, n int) {
			for k := range n {
				sinkFace = in.faces[k%tableSize].Subst(zero)
			}
		}},
	} {
		for _, shape := range []struct {
			name string
			in   *operands
		}{{"Literal", &one}, {"Two", &two}} {
			b.Run(bench.name+"/"+shape.name, func(b *testing.B) {
				base := baseline(b.N)
				b.ReportAllocs()
				b.ResetTimer()
				bench.run(shape.in, b.N)
				b.StopTimer()
				b.ReportMetric(float64(b.Elapsed())/float64(max(base, 1)), "x/base")
			})
		}
	}
}

// Making a substitution and asking it what it may skip.
func BenchmarkSubst(b *testing.B) {
	rename := NewSubst([]Name{1, 2}, []Dim{Var(7), Lit(8, true)})
	b.Run("AssignEnd", func(b *testing.B) {
		b.ReportAllocs()
		for k := range b.N {
			sinkBool = Assign(Name(k%8), One()).IsEnds()
		}
	})
	b.Run("Skippable", func(b *testing.B) {
		b.ReportAllocs()
		for range b.N {
			sinkBool = rename.Skippable(3, 6, 63)
		}
	})
	b.Run("Compose", func(b *testing.B) {
		b.ReportAllocs()
		end := Assign(7, Zero())
		for range b.N {
			sinkBool = rename.Compose(end) == nil
		}
	})
	b.Run("Extend", func(b *testing.B) {
		b.ReportAllocs()
		for range b.N {
			sinkBool = rename.Extend(3, One()) == nil
		}
	})
}

// Large normal forms: 4096 conjunctions from twelve joins, and their reversal.
func BenchmarkLarge(b *testing.B) {
	large := clauses(12, 0)
	b.Run("Min", func(b *testing.B) {
		for range b.N {
			sinkDim = clauses(12, 0)
		}
	})
	b.Run("Rev", func(b *testing.B) {
		for range b.N {
			sinkDim = large.Rev()
		}
	})
	b.Run("SubstEnd", func(b *testing.B) {
		end := Assign(3, One())
		for range b.N {
			sinkDim = large.Subst(end)
		}
	})
}
