// Command drum reads the log of a cable drum on a cargo quay and, if a sheet of
// bays is given, the order to relabel them.
//
//	go run ./examples/drum LOG [BAYS]
//
// The log becomes a loop of the circle, whose winding number is the drum's net
// turns; the relabelling becomes a path of types, along which the inventory is
// carried. Both are checked against ordinary arithmetic. The exit status is 1
// where the two disagree, and 2 where a file cannot be read.
package main

import (
	"context"
	"flag"
	"fmt"
	"io"
	"os"
	"os/signal"
	"strings"
)

func main() {
	flag.Usage = func() {
		fmt.Fprintln(flag.CommandLine.Output(), "usage: drum LOG [BAYS]")
		flag.PrintDefaults()
	}
	flag.Parse()
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt)
	defer stop()
	os.Exit(run(ctx, flag.Args(), os.Stdout, os.Stderr))
}

func run(ctx context.Context, files []string, out, problems io.Writer) int {
	if len(files) < 1 || len(files) > 2 {
		fmt.Fprintln(problems, "usage: drum LOG [BAYS]")
		return 2
	}
	turns, err := readFile(files[0], readLog)
	if err != nil {
		fmt.Fprintln(problems, err)
		return 2
	}
	quay, err := newQuay(ctx)
	if err != nil {
		fmt.Fprintln(problems, err)
		return 1
	}
	ok, err := reportTurns(ctx, quay, turns, out)
	if err == nil && len(files) == 2 {
		var sheet *Bays
		if sheet, err = readFile(files[1], readBays); err != nil {
			fmt.Fprintln(problems, err)
			return 2
		}
		var carried bool
		carried, err = reportBays(ctx, quay, sheet, out)
		ok = ok && carried
	}
	switch {
	case err != nil:
		fmt.Fprintln(problems, err)
		return 1
	case !ok:
		return 1
	}
	return 0
}

func readFile[T any](name string, read func(io.Reader) (T, error)) (T, error) {
	f, err := os.Open(name)
	if err != nil {
		var none T
		return none, err
	}
	defer f.Close()
	x, err := read(f)
	if err != nil {
		return x, fmt.Errorf("%s:%w", name, err)
	}
	return x, nil
}

func reportTurns(ctx context.Context, q *quay, log []Turn, out io.Writer) (bool, error) {
	want, total := 0, 0
	for _, t := range log {
		want += t.By
		total += max(t.By, -t.By)
	}
	got, stats, err := q.netTurns(ctx, log)
	if err != nil {
		return false, err
	}
	fmt.Fprintf(out, "%d entries, %d turns in all\n", len(log), total)
	fmt.Fprintf(out, "net turns, as a winding number: %s (%d steps)\n", got, stats.Steps)
	fmt.Fprintf(out, "net turns, by arithmetic:       %d\n", want)
	return got.IsInt64() && got.Int64() == int64(want), nil
}

func reportBays(ctx context.Context, q *quay, b *Bays, out io.Writer) (bool, error) {
	want := b.relabelled()
	got, err := q.carryInventory(ctx, b)
	if err != nil {
		return false, err
	}
	fmt.Fprintf(out, "crates by bay before:           %s\n", list(b.Crates))
	fmt.Fprintf(out, "carried along the relabelling:  %s\n", list(got))
	fmt.Fprintf(out, "relabelled by arithmetic:       %s\n", list(want))
	for k := range want {
		if got[k] != want[k] {
			return false, nil
		}
	}
	return true, nil
}

func list(crates []int) string { return strings.Trim(fmt.Sprint(crates), "[]") }
