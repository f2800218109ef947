// Command script handles scripts: files of forms that define, assume, declare,
// compare, normalise and show terms of cubical type theory.
//
//	go run ./examples/script FILE…
//
// It prints a line for each form that reports something, "FILE:LINE:COLUMN: FORM:
// RESULT", in the same way a line for each form that does not do what it should,
// and a summary. It ends with status 0 if every form did what it should, with 1
// if one did not, and with 2 if something could not be read. The file "-" is
// standard input.
//
// It is also a first example of embedding: this file has everything that a host
// needs (an engine, limits, a context, errors), report.go turns outcomes into
// lines, and progress.go keeps a person company. Everything it imports, a
// stranger's program may import as well.
package main

import (
	"context"
	"errors"
	"flag"
	"fmt"
	"io"
	"os"
	"os/signal"
	"time"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/script"
)

// The exit statuses.
const (
	good       = 0 // every form did what it should
	bad        = 1 // a form did not, or the run was stopped
	unreadable = 2 // a file, a text or the command line cannot be read
)

func main() {
	// Ctrl-C ends the context, and with it the call of the engine that is under
	// way, after at most about a thousand steps. A second one ends the process.
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt)
	context.AfterFunc(ctx, stop)
	os.Exit(run(ctx, os.Args[1:], os.Stdin, os.Stdout, os.Stderr))
}

// settings are what the command line says.
type settings struct {
	files   []string
	limits  nbe.Limits
	timeout time.Duration
	times   bool
	verbose bool
	watch   watching
}

const usage = `Usage: script [flags] FILE…

Handles scripts in the notation, each file on an engine of its own; "-" is
standard input. Exit status: 0 if every form did what it should, 1 if one did
not, 2 if something could not be read.

`

// parse reads the command line.
func parse(args []string, stderr io.Writer) (*settings, error) {
	s := &settings{}
	flags := flag.NewFlagSet("script", flag.ContinueOnError)
	flags.SetOutput(stderr)
	flags.Usage = func() {
		fmt.Fprint(stderr, usage)
		flags.PrintDefaults()
	}
	flags.BoolVar(&s.times, "time", false, "say how long each form took")
	flags.BoolVar(&s.verbose, "v", false, "report definitions, assumptions and declarations too")
	flags.DurationVar(&s.timeout, "timeout", 0, "stop after this `time`, such as 30s (0: no such limit)")
	flags.Int64Var(&s.limits.Steps, "steps", 0, fmt.Sprintf("steps a call may take (0: %d)", nbe.DefaultSteps))
	flags.Int64Var(&s.limits.Depth, "depth", 0, fmt.Sprintf("levels a call may nest (0: %d)", nbe.DefaultDepth))
	flags.Int64Var(&s.limits.Memory, "memory", 0, fmt.Sprintf("bytes a call may be charged (0: %d)", nbe.DefaultMemory))
	flags.Int64Var(&s.limits.Output, "output", 0, fmt.Sprintf("nodes of a normal form, shared ones counted once (0: %d)", nbe.DefaultOutput))
	flags.Int64Var(&s.limits.Text, "text", 0, fmt.Sprintf("nodes of a term that is written out (0: %d)", nbe.DefaultText))
	s.watch.flags(flags)
	if err := flags.Parse(args); err != nil {
		return s, err
	}
	for _, l := range []int64{s.limits.Steps, s.limits.Depth, s.limits.Memory, s.limits.Output, s.limits.Text, int64(s.timeout)} {
		if l < 0 {
			fmt.Fprintln(stderr, "script: a limit cannot be negative")
			return s, errors.New("a limit cannot be negative")
		}
	}
	if s.files = flags.Args(); len(s.files) == 0 {
		flags.Usage()
		return s, errors.New("no files")
	}
	return s, nil
}

// run is the whole program, and returns its exit status.
func run(ctx context.Context, args []string, stdin io.Reader, stdout, stderr io.Writer) int {
	set, err := parse(args, stderr)
	if errors.Is(err, flag.ErrHelp) {
		return good
	}
	if err != nil {
		return unreadable
	}
	if set.timeout > 0 {
		var stop context.CancelFunc
		ctx, stop = context.WithTimeoutCause(ctx, set.timeout, fmt.Errorf("the time of %v is used up", set.timeout))
		defer stop()
	}

	// One engine holds what every script begins with. Each file gets a fork of
	// it, which costs next to nothing, so that files do not see one another.
	engine, err := nbe.New(nbe.WithLimits(set.limits))
	if err != nil {
		fmt.Fprintln(stderr, "script:", err)
		return unreadable
	}
	r := &reporter{out: stdout, set: set, progress: newProgress(stdout, stderr)}
	defer r.progress.stop()

	watch := set.watch.options(stdout)
	status := good
	for _, file := range set.files {
		session := &script.Session{Engine: engine.Fork(), Begin: r.begin, Report: r.report, Options: watch}
		if err := handle(ctx, session, file, stdin); err != nil {
			r.progress.clear()
			fmt.Fprintln(stderr, err)
			status = unreadable
			r.unread++
		}
		if r.cancelled {
			<-ctx.Done() // the engine may see that a deadline has passed before the context does
		}
		if ctx.Err() != nil {
			r.stopped(context.Cause(ctx))
			break
		}
	}
	r.summary()
	if err := set.watch.write(); err != nil {
		fmt.Fprintln(stderr, "script:", err)
		status = unreadable
	}
	if status == good && (r.failed > 0 || ctx.Err() != nil) {
		status = bad
	}
	return status
}

// handle handles one file.
func handle(ctx context.Context, session *script.Session, file string, stdin io.Reader) error {
	if file != "-" {
		return session.File(ctx, file)
	}
	src, err := io.ReadAll(stdin)
	if err != nil {
		return fmt.Errorf("-: standard input cannot be read: %w", err)
	}
	return session.Source(ctx, src, file)
}
