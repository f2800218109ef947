package gauge

import (
	"fmt"
	"math"
	"runtime"
	"slices"
	"time"
)

// Taking the times of a row. One thread runs Go code while a row is measured, so
// that the collector's work is paid by the one who makes it and no idle processor
// takes part of it. What an operation needs is prepared before the clock starts.

// Settings say how long is measured.
type Settings struct {
	Rounds int           // rounds for each size, at least 1
	Round  time.Duration // how long a round of one side lasts at least
	Unit   func()        // one operation of the common unit
	Units  float64       // parts of it
	// Patience is for how long a size is measured: when it is over, three rounds are
	// enough. 0: until all rounds are done.
	Patience time.Duration
	Repeat   int  // how often an operation is repeated to see what it leaves on the heap; 0: not at all
	NoHeap   bool // no extra run for the peak of the live heap
}

// Point is a row at one size, as measured. Times are in nanoseconds.
type Point struct {
	Size       int                `json:"size"`
	Wall       float64            `json:"wall"`       // median time of an operation
	CPU        float64            `json:"cpu"`        // median processor time of an operation
	Allocs     float64            `json:"allocs"`     // objects made by an operation
	Bytes      float64            `json:"bytes"`      // bytes allocated by an operation
	BaseCPU    float64            `json:"baseCPU"`    // median processor time of the baseline's operation
	BaseAllocs float64            `json:"baseAllocs"` // objects made by the baseline's operation
	Ratios     []float64          `json:"ratios"`     // of each round, of one part to one part
	Peak       int64              `json:"peak"`       // of the live heap, above what was there before
	Left       int64              `json:"left"`       // what the repetitions left on it
	Parts      float64            `json:"parts"`
	Counts     map[string]float64 `json:"counts,omitempty"`
}

// Ratio is the median of the rounds' ratios.
func (p *Point) Ratio() float64 { return Median(p.Ratios) }

// Result is a row with what was measured.
type Result struct {
	Group    string  `json:"group"`
	Name     string  `json:"name"`
	Kind     Kind    `json:"kind"`
	Unit     string  `json:"unit,omitempty"`
	Target   float64 `json:"target"`
	Quantity string  `json:"quantity,omitempty"`
	Baseline string  `json:"baseline,omitempty"`
	Points   []Point `json:"points"`
	Value    float64 `json:"value"` // what the target speaks of
	Met      bool    `json:"met"`
	Error    string  `json:"error,omitempty"`
}

// Measure measures a row. What goes wrong stands in the result's Error; what was
// measured before it, too.
func Measure(row Row, s Settings) *Result {
	r := &Result{Group: row.Group, Name: row.Name, Kind: row.Kind, Unit: row.Unit, Target: row.Target, Quantity: row.Quantity, Baseline: row.Baseline}
	defer runtime.GOMAXPROCS(runtime.GOMAXPROCS(1))
	for _, size := range row.Sizes {
		p, err := measure(row, size, s)
		if err != nil {
			r.Error = fmt.Sprintf("size %d: %v", size, err)
			break
		}
		r.Points = append(r.Points, *p)
	}
	if len(r.Points) > 0 {
		r.judge()
	}
	return r
}

// judge computes the value the target speaks of.
func (r *Result) judge() {
	last := &r.Points[len(r.Points)-1]
	switch r.Kind {
	case Ratio:
		r.Value = last.Ratio()
	case Growth:
		var x, y []float64
		for k := range r.Points {
			x = append(x, float64(r.Points[k].Size))
			y = append(y, r.Points[k].quantity(r.Quantity))
		}
		r.Value = Slope(x, y)
	case Factor:
		for k := 1; k < len(r.Points); k++ {
			f := r.Points[k].quantity(r.Quantity) / r.Points[k-1].quantity(r.Quantity)
			r.Value = max(r.Value, math.Pow(f, 1/float64(r.Points[k].Size-r.Points[k-1].Size)))
		}
	case Allocations:
		r.Value = last.Allocs / last.Parts
	case Heap:
		r.Value = float64(last.Peak) / last.Parts
	}
	r.Met = r.Value <= r.Target && r.Error == ""
}

func (p *Point) quantity(key string) float64 {
	if key == "" {
		return p.CPU
	}
	return p.Counts[key]
}

func measure(row Row, size int, s Settings) (*Point, error) {
	c, err := row.Prepare(size)
	if err != nil {
		return nil, err
	}
	base, baseParts := c.Base, parts(c.BaseParts)
	if base == nil {
		base, baseParts = s.Unit, parts(s.Units)
	}
	baseSide := func() (func() error, error) { return func() error { base(); return nil }, nil }
	// The first operation warms up: definitions are evaluated, caches filled.
	first, err := sample(c.Fresh, 1)
	if err != nil {
		return nil, err
	}
	if first.wall < float64(s.Round) {
		if first, err = sample(c.Fresh, 1); err != nil {
			return nil, err
		}
	}
	if _, err := sample(baseSide, 1); err != nil { // the first time is no measure
		return nil, err
	}
	firstBase, err := sample(baseSide, 1)
	if err != nil {
		return nil, err
	}
	n, m := often(first, s.Round), often(firstBase, s.Round)
	p := &Point{Size: size, Parts: parts(c.Parts)}
	var wall, cpu, baseCPU []float64
	begin := time.Now()
	for round := range max(s.Rounds, 1) {
		if s.Patience > 0 && round >= 3 && time.Since(begin) > s.Patience {
			break
		}
		var e, b times
		// The order alternates: neither side always runs on the other's garbage.
		if round%2 == 0 {
			b, _ = sample(baseSide, m)
		}
		if e, err = sample(c.Fresh, n); err != nil {
			return nil, err
		}
		if round%2 == 1 {
			b, _ = sample(baseSide, m)
		}
		wall, cpu, baseCPU = append(wall, e.wall), append(cpu, e.cpu), append(baseCPU, b.cpu)
		p.Ratios = append(p.Ratios, e.cpu/p.Parts/(b.cpu/baseParts))
		p.Allocs, p.Bytes, p.BaseAllocs = e.allocs, e.bytes, b.allocs
	}
	p.Wall, p.CPU, p.BaseCPU = Median(wall), Median(cpu), Median(baseCPU)
	if !s.NoHeap {
		if p.Peak, err = peak(c.Fresh); err != nil {
			return nil, err
		}
	}
	if s.Repeat > 0 {
		if p.Left, err = Left(c.Fresh, s.Repeat); err != nil {
			return nil, err
		}
	}
	p.Counts = c.Counts
	return p, nil
}

type times struct{ wall, cpu, allocs, bytes float64 } // of one operation

// often is how many operations fill a round.
func often(one times, round time.Duration) int {
	if one.wall <= 0 {
		return 1
	}
	return int(min(max(math.Ceil(float64(round)/one.wall), 1), 20_000))
}

// sample does n operations and returns what one took.
func sample(fresh func() (func() error, error), n int) (times, error) {
	ops := make([]func() error, n)
	for k := range ops {
		op, err := fresh()
		if err != nil {
			return times{}, err
		}
		ops[k] = op
	}
	runtime.GC()
	var before, after runtime.MemStats
	runtime.ReadMemStats(&before)
	wall, cpu := time.Now(), processor()
	for k, op := range ops {
		if err := op(); err != nil {
			return times{}, err
		}
		ops[k] = nil
	}
	t := times{cpu: float64(processor() - cpu), wall: float64(time.Since(wall))}
	runtime.ReadMemStats(&after)
	t.allocs, t.bytes = float64(after.Mallocs-before.Mallocs), float64(after.TotalAlloc-before.TotalAlloc)
	f := float64(n)
	return times{t.wall / f, max(t.cpu, 1) / f, t.allocs / f, t.bytes / f}, nil
}

// Median is the middle of the values, 0 without any.
func Median(v []float64) float64 {
	if len(v) == 0 {
		return 0
	}
	v = slices.Sorted(slices.Values(v))
	n := len(v)
	return (v[(n-1)/2] + v[n/2]) / 2
}

// Slope is the exponent k of the power law y = c·x^k that fits best, by least
// squares of the logarithms.
func Slope(x, y []float64) float64 {
	var sx, sy, sxx, sxy float64
	n := float64(len(x))
	for k := range x {
		a, b := math.Log(x[k]), math.Log(max(y[k], 1e-9))
		sx, sy, sxx, sxy = sx+a, sy+b, sxx+a*a, sxy+a*b
	}
	d := n*sxx - sx*sx
	if d == 0 {
		return 0
	}
	return (n*sxy - sx*sy) / d
}
