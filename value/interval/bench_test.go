package interval

import "testing"

const tableSize = 256

var (
	sinkWord uint64
	sinkBool bool
	sinkDim  Dim
	sinkFace Face
	sinkSup  Support
)

//go:noinline
func orWords(a, b uint64) uint64 { return a | b }

func BenchmarkBaseInline(b *testing.B) {
	var xs, ys [tableSize]uint64
	for k := range xs {
		xs[k], ys[k] = 1<<uint(k%64), 1<<uint(k*7%64)
	}
	b.ResetTimer()
	for k := 0; k < b.N; k++ {
		sinkWord = xs[k%tableSize] | ys[k%tableSize]
	}
}
func BenchmarkBaseCall(b *testing.B) {
	var xs, ys [tableSize]uint64
	for k := range xs {
		xs[k], ys[k] = 1<<uint(k%64), 1<<uint(k*7%64)
	}
	b.ResetTimer()
	for k := 0; k < b.N; k++ {
		sinkWord = orWords(xs[k%tableSize], ys[k%tableSize])
	}
}

func dims1() (out [tableSize]Dim) {
	for k := range out {
		out[k] = Lit(Name(k*5%8), k%3 == 0)
	}
	return
}
func dims2() (out [tableSize]Dim) {
	for k := range out {
		out[k] = Lit(Name(k*5%8), k%3 == 0).Min(Lit(Name(k*7%8), k%5 == 0)).Max(Var(Name(k % 7)))
	}
	return
}
func faces1() (out [tableSize]Face) {
	for k := range out {
		out[k] = Eq0(Name(k * 5 % 8))
		if k%3 == 0 {
			out[k] = Eq1(Name(k * 5 % 8))
		}
	}
	return
}
func faces2() (out [tableSize]Face) {
	f := faces1()
	for k := range out {
		out[k] = f[k].And(f[(k*3+1)%tableSize]).Or(f[(k*7+3)%tableSize])
	}
	return
}

func BenchmarkOps(b *testing.B) {
	d1, d2, f1, f2 := dims1(), dims2(), faces1(), faces2()
	e1 := d1
	for k := range e1 {
		e1[k] = d1[(k*11+5)%tableSize]
	}
	e2 := d2
	for k := range e1 {
		e2[k] = d2[(k*11+5)%tableSize]
	}
	g1, g2 := f1, f2
	for k := range g1 {
		g1[k], g2[k] = f1[(k*11+5)%tableSize], f2[(k*11+5)%tableSize]
	}
	s := Assign(3, Zero())
	r := Rename(3, 6)
	miss := Assign(20, Zero())
	run := func(name string, f func(k int)) {
		_ = f
	}
	_ = run
	b.Run("Min1", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkDim = d1[k%tableSize].Min(e1[k%tableSize])
		}
	})
	b.Run("Max1", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkDim = d1[k%tableSize].Max(e1[k%tableSize])
		}
	})
	b.Run("Rev1", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkDim = d1[k%tableSize].Rev()
		}
	})
	b.Run("And1", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkFace = f1[k%tableSize].And(g1[k%tableSize])
		}
	})
	b.Run("Or1", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkFace = f1[k%tableSize].Or(g1[k%tableSize])
		}
	})
	b.Run("Ent1", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkBool = f1[k%tableSize].Entails(g1[k%tableSize])
		}
	})
	b.Run("Eq1", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkBool = d1[k%tableSize].Equal(e1[k%tableSize])
		}
	})
	b.Run("Sup1", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkSup = d1[k%tableSize].Support()
		}
	})
	b.Run("Sup2", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkSup = d2[k%tableSize].Support()
		}
	})
	b.Run("SubstEnd1", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkDim = d1[k%tableSize].Subst(s)
		}
	})
	b.Run("SubstMiss1", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkDim = d1[k%tableSize].Subst(miss)
		}
	})
	b.Run("SubstRen1", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkDim = d1[k%tableSize].Subst(r)
		}
	})
	b.Run("FSubstEnd1", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkFace = f1[k%tableSize].Subst(s)
		}
	})
	b.Run("IsEnd", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkBool = d1[k%tableSize].IsEnd()
		}
	})
	b.Run("Is0", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkFace = d1[k%tableSize].Is0()
		}
	})
	b.Run("Copy", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkDim = d1[k%tableSize]
		}
	})
	b.Run("Min2", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkDim = d2[k%tableSize].Min(e2[k%tableSize])
		}
	})
	b.Run("Max2", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkDim = d2[k%tableSize].Max(e2[k%tableSize])
		}
	})
	b.Run("Rev2", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkDim = d2[k%tableSize].Rev()
		}
	})
	b.Run("And2", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkFace = f2[k%tableSize].And(g2[k%tableSize])
		}
	})
	b.Run("Or2", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkFace = f2[k%tableSize].Or(g2[k%tableSize])
		}
	})
	b.Run("Ent2", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkBool = f2[k%tableSize].Entails(g2[k%tableSize])
		}
	})
	b.Run("SubstEnd2", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkDim = d2[k%tableSize].Subst(s)
		}
	})
	b.Run("SubstRen2", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkDim = d2[k%tableSize].Subst(r)
		}
	})
	b.Run("FSubstEnd2", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkFace = f2[k%tableSize].Subst(s)
		}
	})
	b.Run("Is0-2", func(b *testing.B) {
		for k := 0; k < b.N; k++ {
			sinkFace = d2[k%tableSize].Is0()
		}
	})
}
