package main

import (
	"context"
	"fmt"
	"testing"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
)

func engineWith(tb testing.TB, src string) *nbe.Engine {
	e, err := nbe.New()
	if err != nil {
		tb.Fatal(err)
	}
	forms, err := notation.ReadScript([]byte(src), "bench", e.Words())
	if err != nil {
		tb.Fatal(err)
	}
	for _, f := range forms {
		if err := e.Define(context.Background(), f.Name, f.Type, f.Term); err != nil {
			tb.Fatal(err)
		}
	}
	return e
}

func normal(tb testing.TB, e *nbe.Engine, text string, o ...nbe.CallOption) (string, nbe.Stats) {
	w, err := notation.ReadTerm(text, "t", e.Words())
	if err != nil {
		tb.Fatal(err)
	}
	return normalTerm(tb, e, w, o...)
}

func normalTerm(tb testing.TB, e *nbe.Engine, w *term.Written, o ...nbe.CallOption) (string, nbe.Stats) {
	ctx := context.Background()
	s := e.Scope()
	t, err := s.Infer(ctx, w)
	if err != nil {
		tb.Fatal(err)
	}
	var st nbe.Stats
	forms, err := s.Normal(ctx, t, append(o, nbe.Count(&st), nbe.Within(nbe.Limits{Depth: nbe.MaxDepth, Memory: 1 << 36, Steps: 1 << 40}))...)
	if err != nil {
		tb.Fatal(err)
	}
	return forms[0].String(), st
}

const church = `
(def N (U 1) (Pi ((A (U 0))) (-> (-> A A) A A)))
(def two N (lam (A f x) (f (f x))))
(def mul (-> N N N) (lam (m n A f) (m A (n A f))))
(def sq (-> N N) (lam (m) (mul m m)))
(def n16 N (sq (sq (sq (sq two)))))
(def ack (-> Nat Nat Nat) (lam (m) (elim (x (-> Nat Nat)) m (zero (lam (n) (suc n)))
   ((suc k h) (lam (n) (elim (y Nat) n (zero (h 1)) ((suc l g) (h g))))))))
`

func TestX(t *testing.T) {
	e := engineWith(t, church)
	s, st := normal(t, e, "(n16 Nat (lam (x) (suc x)) 0)")
	fmt.Println(s, fmt.Sprintf("%+v", st))
	s, st = normal(t, e, "(ack 2 300)")
	fmt.Println(s, fmt.Sprintf("%+v", st))
	s, st = normal(t, e, "(ack 3 7)")
	fmt.Println(s, fmt.Sprintf("%+v", st))
}

type univ interface{}
type fn func(univ) univ

func BenchmarkChurchNative(b *testing.B) {
	b.ReportAllocs()
	two := fn(func(f univ) univ { return fn(func(x univ) univ { return f.(fn)(f.(fn)(x)) }) })
	mul := fn(func(m univ) univ {
		return fn(func(n univ) univ { return fn(func(f univ) univ { return m.(fn)(n.(fn)(f)) }) })
	})
	sq := func(m univ) univ { return mul(m).(fn)(m) }
	n16 := sq(sq(sq(sq(two))))
	suc := fn(func(x univ) univ { return x.(int) + 1 })
	for b.Loop() {
		if n16.(fn)(suc).(fn)(0).(int) != 65536 {
			b.Fatal()
		}
	}
}
func benchTerm(b *testing.B, text string) {
	b.ReportAllocs()
	e := engineWith(b, church)
	for b.Loop() {
		normal(b, e, text)
	}
}
func BenchmarkChurch(b *testing.B) { benchTerm(b, "(n16 Nat (lam (x) (suc x)) 0)") }
func BenchmarkAck2(b *testing.B)   { benchTerm(b, "(ack 2 300)") }
func BenchmarkAck3(b *testing.B)   { benchTerm(b, "(ack 3 7)") }

func ackNative() univ {
	var rec func(n int, z univ, s func(int, func() univ) univ) univ
	_ = rec
	elim := func(n int, z univ, s func(k int, h univ) univ) univ {
		acc := z
		for k := 0; k < n; k++ {
			acc = s(k, acc)
		}
		return acc
	}
	return fn(func(m univ) univ {
		return elim(m.(int), fn(func(n univ) univ { return n.(int) + 1 }), func(k int, h univ) univ {
			return fn(func(n univ) univ {
				return elim(n.(int), h.(fn)(1), func(l int, g univ) univ { return h.(fn)(g) })
			})
		})
	})
}
func BenchmarkAck2Native(b *testing.B) {
	b.ReportAllocs()
	a := ackNative()
	for b.Loop() {
		a.(fn)(2).(fn)(300)
	}
}
func BenchmarkAck3Native(b *testing.B) {
	b.ReportAllocs()
	a := ackNative()
	for b.Loop() {
		a.(fn)(3).(fn)(7)
	}
}
