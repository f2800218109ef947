package main

import (
	"context"
	"fmt"
	"os"
	"testing"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/script"
)

func scriptEngine(tb testing.TB, file string) *nbe.Engine {
	e, err := nbe.New()
	if err != nil {
		tb.Fatal(err)
	}
	s := &script.Session{Engine: e, Report: func(r script.Result) {
		if r.Err != nil {
			tb.Fatal(r.Err)
		}
	}}
	if err := s.File(context.Background(), file); err != nil {
		tb.Fatal(err)
	}
	return e
}

func BenchmarkWind(b *testing.B) {
	e := scriptEngine(b, os.Getenv("WIND"))
	for _, n := range []int{100, 1000, 10000} {
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			b.ReportAllocs()
			var st nbe.Stats
			for b.Loop() {
				_, st = normal(b, e, fmt.Sprintf("(wind (pow %d))", n))
			}
			b.ReportMetric(float64(b.Elapsed().Microseconds())/float64(b.N)/float64(n), "us/turn")
			b.ReportMetric(float64(st.Steps)/float64(n), "steps/turn")
			b.ReportMetric(float64(st.Composites)/float64(n), "comps/turn")
			b.ReportMetric(float64(st.Transports)/float64(n), "transps/turn")
			b.ReportMetric(float64(st.Deepest)/float64(n), "depth/turn")
		})
	}
}
