// Command measure measures the engine: against the same work in Go closures, and
// how the cost of work grows with its size.
//
//	go run ./examples/measure                      a table for people
//	go run ./examples/measure -rows winding        the rows whose names match
//	go run ./examples/measure -json -o run.json    a table for machines
//	go run ./examples/measure -svg growth.svg      the growth curves as a drawing
//	go run ./examples/measure -against run.json    compared with a saved run
//	go run ./examples/measure -profiles DIR        where each row spends its steps, for go tool pprof
//	go run ./examples/measure -mechanisms          what each mechanism of the evaluator buys
//
// Rows are data, in the files rows_*.go; package gauge measures them. The exit
// status is 1 where -against finds a significant loss above 10 %.
package main

import (
	"flag"
	"fmt"
	"io"
	"os"
	"regexp"
	"runtime/pprof"
	"slices"
	"time"

	"example.com/boxwright/examples/measure/gauge"
)

func main() { os.Exit(run(os.Args[1:], os.Stdout, os.Stderr)) }

// rows are all rows, in the order of the table.
func rows() []gauge.Row {
	var out []gauge.Row
	for _, part := range [][]gauge.Row{functionRows(), readingRows(), intervalRows(), pathRows(), nestedRows(), windingRows()} {
		out = append(out, part...)
	}
	return out
}

const unitName = "one application of the closures of the Church row"

func settings(rounds int, round time.Duration) gauge.Settings {
	return gauge.Settings{Rounds: rounds, Round: round, Unit: nativeChurch(), Units: churchApplications}
}

func run(args []string, stdout, stderr io.Writer) int {
	f := flag.NewFlagSet("measure", flag.ContinueOnError)
	f.SetOutput(stderr)
	pattern := f.String("rows", "", "measure only the rows whose names match the regular `expression`")
	asJSON := f.Bool("json", false, "write the table for machines")
	out := f.String("o", "", "write the table to `file`")
	svg := f.String("svg", "", "draw the growth curves into `file`")
	against := f.String("against", "", "compare the ratios with the run saved in `file`; status 1 where something is lost")
	with := f.String("with", "", "add the rows of the table saved in `file`, such as that of the interpreters")
	from := f.String("from", "", "measure nothing: take the table saved in `file`")
	rounds := f.Int("rounds", 10, "rounds for each row and size")
	round := f.Duration("round", 20*time.Millisecond, "how long a round of one side lasts at least")
	patience := f.Duration("patience", time.Minute, "the `time` after which three rounds of a size are enough, 0: never")
	repeat := f.Int("repeat", 0, "repeat each operation so often and report what that leaves on the heap")
	f.DurationVar(&longest, "limit", longest, "the longest time one call of the engine may take")
	largest := f.Int("largest", 0, "leave out the sizes above this `size`, 0: none")
	list := f.Bool("list", false, "list the rows")
	mechanisms := f.Bool("mechanisms", false, "measure what each mechanism of the evaluator buys")
	profiles := f.String("profiles", "", "measure nothing: write profiles of the rows, by definition and operation, into `directory`")
	profile := f.String("cpuprofile", "", "write a processor profile to `file`")
	if err := f.Parse(args); err != nil {
		return 2
	}
	fail := func(err error) int { fmt.Fprintln(stderr, "measure:", err); return 2 }
	name, err := regexp.Compile(*pattern)
	if err != nil {
		return fail(err)
	}
	if *profile != "" {
		file, err := os.Create(*profile)
		if err != nil {
			return fail(err)
		}
		defer file.Close()
		if err := pprof.StartCPUProfile(file); err != nil {
			return fail(err)
		}
		defer pprof.StopCPUProfile()
	}
	s := settings(*rounds, *round)
	s.Repeat, s.Patience = *repeat, *patience
	if *mechanisms {
		if err := writeMechanisms(stdout, stderr, name); err != nil {
			return fail(err)
		}
		return 0
	}
	var chosen []gauge.Row
	for _, r := range rows() {
		if *largest > 0 {
			r.Sizes = slices.DeleteFunc(slices.Clone(r.Sizes), func(n int) bool { return n > *largest })
		}
		if name.MatchString(r.Name) && len(r.Sizes) > 0 {
			chosen = append(chosen, r)
		}
	}
	if *list {
		for _, r := range chosen {
			fmt.Fprintf(stdout, "%s: %s, sizes %d\n", r.Group, r.Name, r.Sizes)
		}
		return 0
	}
	if *profiles != "" {
		if err := writeProfiles(*profiles, chosen, stderr); err != nil {
			return fail(err)
		}
		return 0
	}
	table := gauge.NewTable(*rounds, unitName)
	if *from != "" {
		if table, err = gauge.Load(*from); err != nil {
			return fail(err)
		}
		chosen = nil
	}
	for k, r := range chosen {
		fmt.Fprintf(stderr, "%d/%d %s\n", k+1, len(chosen), r.Name)
		table.Results = append(table.Results, gauge.Measure(r, s))
		if *out != "" { // a run takes long: what is done is kept
			if err := write(table, stdout, *out, "", *asJSON); err != nil {
				return fail(err)
			}
		}
	}
	if *with != "" {
		more, err := gauge.Load(*with)
		if err != nil {
			return fail(err)
		}
		table.Merge(more)
	}
	if err := write(table, stdout, *out, *svg, *asJSON); err != nil {
		return fail(err)
	}
	if *against != "" {
		old, err := gauge.Load(*against)
		if err != nil {
			return fail(err)
		}
		if gauge.WriteChanges(stdout, gauge.Compare(old, table)) > 0 {
			return 1
		}
	}
	return 0
}

// write writes the table to its places.
func write(t *gauge.Table, stdout io.Writer, out, svg string, asJSON bool) (err error) {
	w := stdout
	if out != "" {
		file, err := os.Create(out)
		if err != nil {
			return err
		}
		defer func() { err = closed(file, err) }()
		w = file
	}
	if asJSON {
		err = t.WriteJSON(w)
	} else {
		t.WriteText(w)
	}
	if err != nil || svg == "" {
		return err
	}
	file, err := os.Create(svg)
	if err != nil {
		return err
	}
	return closed(file, t.WriteSVG(file))
}

func closed(file *os.File, err error) error {
	if e := file.Close(); err == nil {
		err = e
	}
	return err
}
