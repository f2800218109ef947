// Package gauge measures work against a baseline and says how its cost grows.
//
// A [Row] is data: what is done, at which sizes, what one operation is, what the
// baseline's is, and which target is set. [Measure] makes a [Result] of it, a
// [Table] holds the results of one run, and [Compare] compares two runs.
//
// Times are compared only within one run. Each round measures the engine and the
// baseline one right after the other, so that what a noisy machine does to one it
// does to the other, and the ratio of a row is the median of the rounds' ratios.
// Ratios are taken from the processor time of the process (the collector's
// included) with one thread running Go code; the wall clock is reported beside it.
package gauge

// Kind says what a row's target speaks of.
type Kind string

const (
	// Ratio: the time of a part of the operation over that of a part of the baseline.
	Ratio Kind = "ratio"
	// Growth: the exponent of a quantity in the size, fitted over all sizes.
	Growth Kind = "growth"
	// Factor: by what a quantity is multiplied from one size to the next, at most.
	Factor Kind = "factor"
	// Allocations: heap objects made by one part of the operation.
	Allocations Kind = "allocations"
	// Heap: bytes of live heap at the peak, for each part of the operation.
	Heap Kind = "heap"
)

// Row is one line of the table.
type Row struct {
	Group    string  // the heading it stands under
	Name     string  // the work
	Kind     Kind    // what the target speaks of
	Sizes    []int   // at which it is measured, ascending
	Unit     string  // what the size counts
	Target   float64 // the most that is wanted
	Quantity string  // of Growth and Factor: "" for time, otherwise a key of Case.Counts
	Baseline string  // what the baseline is; empty: the table's common unit
	Prepare  func(size int) (*Case, error)
}

// Case is a row at one size.
type Case struct {
	// Fresh prepares one operation. Only what it returns is timed, and that is
	// called once; an error of it, such as a wrong answer, ends the row.
	Fresh func() (func() error, error)
	// Base is one operation of the baseline; nil: the table's common unit.
	Base func()
	// Parts and BaseParts are how many parts an operation has, for the ratio; 0 is 1.
	Parts, BaseParts float64
	// Counts is what the last operation counted.
	Counts map[string]float64
}

// Always is a case that needs no preparing for each operation.
func Always(op func() error) *Case {
	return &Case{Fresh: func() (func() error, error) { return op, nil }}
}

func parts(p float64) float64 {
	if p == 0 {
		return 1
	}
	return p
}
