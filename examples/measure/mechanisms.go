package main

import (
	"errors"
	"fmt"
	"io"
	"regexp"
	"runtime"
	"strings"
	"text/tabwriter"
	"time"

	"example.com/boxwright/examples/measure/gauge"
	"example.com/boxwright/nbe"
	"example.com/boxwright/value"
)

// What each mechanism buys: the same work in the evaluator with one of them
// switched off, in steps, allocations and processor time as multiples of what the
// whole evaluator takes. A mechanism whose column is full of ones does not pay.

// mechanism is a way of building the evaluator.
type mechanism struct {
	name  string
	plain value.Plain
}

var mechanismList = []mechanism{
	{"all", value.Plain{}},
	{"no supports", value.Plain{NoSupport: true}},
	{"no sharing", value.Plain{NoSharing: true}},
	{"eager substitution", value.Plain{Eager: true}},
	{"no frontier", value.Plain{NoFrontier: true}},
	{"no numeral rule", value.Plain{NoNumerals: true}},
	{"plain", value.Plain{NoSupport: true, NoSharing: true, Eager: true, NoFrontier: true, NoNumerals: true}},
}

// mechanismWork are the pieces of work, small enough for the plain evaluator.
var mechanismWork = []struct {
	name, given string
	dimensions  int
	term        string
}{
	{"Church numeral 2^16", functionsText, 0, "(n16 Nat (lam (x) (suc x)) 0)"},
	{"Ackermann A(2,40)", functionsText, 0, "(ackermann 2 40)"},
	{"factorial 8", functionsText, 0, "(factorial 8)"},
	{"insertion sort of 8 numbers", functionsText, 0, "(sort (cons 5 (cons 3 (cons 9 (cons 1 (cons 7 (cons 2 (cons 8 (cons 4 nil)))))))))"},
	{"path concatenated 100 times, read back", pathsText, 0, "(left 99)"},
	{"doubling 10 times, read back", readingText, 0, "(doubling 10 5)"},
	{"transp at 20 nested pairs", formersText, 1, "(summed 20 2 (transp (i (Pairs 20 (at two i))) bot (pairs 20 (at two 0))))"},
	{"comp at 6 nested pairs", formersText, 1, "(summed 6 2 (comp (i (Pairs 6 (at two i))) (pairs 6 (at two 0)) ((= i0 0) (i) (pairs 6 (at two i)))))"},
	{"comp at 6 nested functions", formersText, 1, "(applied 6 2 (comp (i (Functions 6 (at two i))) (functions 6 (at two 0)) ((= i0 0) (i) (functions 6 (at two i)))))"},
	{"transp at 3 nested paths", quaysText, 3, nestedPath(false, 3, "i0 i1 i2")},
	{"winding number of loop^4", smallWindingText, 0, "(winding (turns 4))"},
	{"transport along 3 links of ua", smallWindingText, 0, "(transp (i (at (turned 2) i)) bot (pos 0))"},
}

// smallWindingText is what winding needs and no more, since the plain evaluator
// checks it too.
const smallWindingText = `
(load "equivalences.sexp")
(data Int () (point pos ((n Nat))) (point negsuc ((n Nat))))
(def successor (-> Int Int)
  (lam (z) (elim (x Int) z ((pos n) (pos (suc n))) ((negsuc n) (elim (x Int) n (zero (pos 0)) ((suc m h) (negsuc m)))))))
(def predecessor (-> Int Int)
  (lam (z) (elim (x Int) z ((pos n) (elim (x Int) n (zero (negsuc 0)) ((suc m h) (pos m)))) ((negsuc n) (negsuc (suc n))))))
(def back (Pi ((z Int)) (Path Int (successor (predecessor z)) z))
  (lam (z) (elim (x (Path Int (successor (predecessor x)) x)) z
    ((pos n) (elim (m (Path Int (successor (predecessor (pos m))) (pos m))) n
      (zero (line (i) (pos 0))) ((suc m h) (line (i) (pos (suc m))))))
    ((negsuc n) (line (i) (negsuc n))))))
(def forth (Pi ((z Int)) (Path Int (predecessor (successor z)) z))
  (lam (z) (elim (x (Path Int (predecessor (successor x)) x)) z
    ((pos n) (line (i) (pos n)))
    ((negsuc n) (elim (m (Path Int (predecessor (successor (negsuc m))) (negsuc m))) n
      (zero (line (i) (negsuc 0))) ((suc m h) (line (i) (negsuc (suc m)))))))))
(def step (Equiv Int Int) (quasi-inverse Int Int successor predecessor back forth))
(def turn (Path (U 0) Int Int) (line (i) (Glue Int ((= i 0) Int step) ((= i 1) Int (identity-equivalence Int)))))
(def cover (-> Circle (U 0)) (lam (x) (elim (y (U 0)) x (base Int) ((loop i) (at turn i)))))
(def Loops (U 0) (Path Circle base base))
(def turns (-> Nat Loops)
  (lam (n) (elim (x Loops) n (zero (line (i) base))
    ((suc k h) (compose Circle base base base h (line (i) (loop i)))))))
(def winding (-> Loops Int) (lam (p) (transp (i (cover (at p i))) bot (pos 0))))
(def turned (-> Nat (Path (U 0) Int Int))
  (lam (n) (elim (x (Path (U 0) Int Int)) n (zero turn) ((suc k h) (compose (U 0) Int Int Int h turn)))))
`

type cost struct {
	steps, allocs, cpu float64
	err                error
}

// mechanismLimit is when a piece of work is given up.
const mechanismLimit = 5 * time.Second

func costOf(given string, dimensions int, text string) cost {
	fail := func(err error) cost { return cost{err: err} }
	h, err := newHost(given)
	if err != nil {
		return fail(err)
	}
	s, err := h.dimensions(dimensions)
	if err != nil {
		return fail(err)
	}
	row := gauge.Row{Name: text, Kind: gauge.Ratio, Sizes: []int{1}, Prepare: func(int) (*gauge.Case, error) { return h.normalising(s, text, ""), nil }}
	r := gauge.Measure(row, gauge.Settings{Rounds: 3, Round: 5 * time.Millisecond, Unit: func() {}, NoHeap: true})
	if r.Error != "" {
		return fail(errors.New(r.Error))
	}
	return cost{steps: h.counts["steps"], allocs: r.Points[0].Allocs, cpu: r.Points[0].CPU}
}

// writeMechanisms measures the work whose names match in every build.
func writeMechanisms(stdout, stderr io.Writer, name *regexp.Regexp) error {
	before := longest
	longest = mechanismLimit
	defer func() { plain, longest = nil, before; forget() }()
	costs := make([]map[string]cost, len(mechanismWork))
	for k := range costs {
		costs[k] = map[string]cost{}
	}
	for _, m := range mechanismList {
		plain = []nbe.Option{nbe.WithPlain(m.plain)}
		forget()
		for k, w := range mechanismWork {
			if name.MatchString(w.name) {
				fmt.Fprintf(stderr, "%s: %s\n", m.name, w.name)
				costs[k][m.name] = costOf(w.given, w.dimensions, w.term)
			}
		}
	}
	fmt.Fprintf(stdout, "%s, %s/%s. For each piece of work the steps, allocations and processor time of the whole evaluator, and by how much they are multiplied\nwithout a mechanism (steps / allocations / time). A piece of work is given up after %s.\n\n", runtime.Version(), runtime.GOOS, runtime.GOARCH, mechanismLimit)
	tw := tabwriter.NewWriter(stdout, 2, 0, 2, ' ', 0)
	fmt.Fprint(tw, "work\tsteps\tallocs\ttime")
	for _, m := range mechanismList[1:] {
		fmt.Fprintf(tw, "\t%s", m.name)
	}
	fmt.Fprintln(tw)
	for k, w := range mechanismWork {
		all, ok := costs[k]["all"]
		if !ok {
			continue
		}
		if all.err != nil {
			fmt.Fprintf(tw, "%s\t%v\n", w.name, all.err)
			continue
		}
		fmt.Fprintf(tw, "%s\t%.0f\t%.0f\t%s", w.name, all.steps, all.allocs, time.Duration(all.cpu).Round(time.Microsecond))
		for _, m := range mechanismList[1:] {
			switch c := costs[k][m.name]; {
			case c.err == nil:
				fmt.Fprintf(tw, "\t%s/%s/%s", times(c.steps/max(all.steps, 1)), times(c.allocs/max(all.allocs, 1)), times(c.cpu/all.cpu))
			case strings.Contains(c.err.Error(), "cancelled"):
				fmt.Fprint(tw, "\tgiven up")
			default:
				fmt.Fprintf(tw, "\t%.60v", c.err)
			}
		}
		fmt.Fprintln(tw)
	}
	return tw.Flush()
}

func times(v float64) string {
	if v >= 100 {
		return fmt.Sprintf("%.0f", v)
	}
	return fmt.Sprintf("%.2g", v)
}
