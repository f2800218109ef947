package main

// The rows as benchmarks: each at each of its sizes, with the baseline measured
// beside it. The metric x/base is the ratio the table gives, per part, and steps
// the steps of an operation. A growth row's exponent takes all sizes: go run
// ./examples/measure -rows NAME.

import (
	"strconv"
	"testing"
	"time"

	"example.com/boxwright/examples/measure/gauge"
)

func BenchmarkRows(b *testing.B) {
	s := settings(1, time.Millisecond)
	for _, r := range rows() {
		b.Run(r.Name, func(b *testing.B) {
			for _, n := range r.Sizes {
				b.Run(strconv.Itoa(n), func(b *testing.B) { benchmarkRow(b, r, n, s) })
			}
		})
	}
}

func benchmarkRow(b *testing.B, r gauge.Row, n int, s gauge.Settings) {
	c, err := r.Prepare(n)
	if err != nil {
		b.Fatal(err)
	}
	base, baseParts := c.Base, max(c.BaseParts, 1)
	if base == nil {
		base, baseParts = s.Unit, s.Units
	}
	base()
	begin := time.Now()
	rounds := 0
	for ; rounds < 3 || time.Since(begin) < 5*time.Millisecond; rounds++ {
		base()
	}
	one := float64(time.Since(begin)) / float64(rounds) / baseParts
	b.ReportAllocs()
	for b.Loop() {
		b.StopTimer()
		op, err := c.Fresh()
		if err != nil {
			b.Fatal(err)
		}
		b.StartTimer()
		if err := op(); err != nil {
			b.Fatal(err)
		}
	}
	b.ReportMetric(float64(b.Elapsed())/float64(b.N)/max(c.Parts, 1)/one, "x/base")
	for _, k := range []string{"steps", "nodes"} {
		if v, ok := c.Counts[k]; ok {
			b.ReportMetric(v, k)
		}
	}
}
