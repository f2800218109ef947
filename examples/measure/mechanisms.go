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
	{"transp at 20 nested pairs", nestedText, 1, "(askP 20 (transp (i (P i 20)) bot (p 0 20)))"},
	{"comp at 6 nested pairs", nestedText, 1, "(askP 6 (comp (i (P i 6)) (p 0 6) ((= i0 0) (i) (p i 6))))"},
	{"comp at 6 nested functions", nestedText, 1, "(askF 6 (comp (i (F i 6)) (f 0 6) ((= i0 0) (i) (f i 6))))"},
	{"transp at 3 nested paths", nestedText, 3, nestedPath(false, 3, "i0 i1 i2")},
	{"winding number of loop^10", windingText, 0, "(winding (turns (pos 10)))"},
	{"transport along 5 links of ua", windingText, 0, "(transp (i (at (turned 5) i)) bot (pos 0))"},
	{"degree of a loop of the sphere", sphereText, 0, "(bundle-degree (surfaces 0))"},
}

type cost struct {
	steps, allocs, cpu float64
	err                error
}

// mechanismLimit is when a piece of work is given up.
const mechanismLimit = 10 * time.Second

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
