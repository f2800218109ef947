package main

import (
	"flag"
	"fmt"
	"io"
	"os"
	"strings"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/profile"
	"example.com/boxwright/nbe/term"
)

// Finding out where the time goes: -profile writes where the work of all files
// was done, for go tool pprof, and -follow prints the rules as they are applied.

// watching is what the command line says of it.
type watching struct {
	profile string
	follow  string
	limit   int64
	work    profile.Profile
}

func (w *watching) flags(f *flag.FlagSet) {
	f.StringVar(&w.profile, "profile", "", "write where the work was done to this `file`, for go tool pprof")
	f.StringVar(&w.follow, "follow", "", "print the rules that are applied: \"all\", or names of definitions and of rules (such as add,elim,transp at pairs) with commas between `them`")
	f.Int64Var(&w.limit, "follow-limit", 200, "how many `rules` are printed")
}

// options are the options of every call of the engine.
func (w *watching) options(out io.Writer) []nbe.CallOption {
	var options []nbe.CallOption
	if w.profile != "" {
		options = append(options, nbe.Profile(&w.work))
	}
	if w.follow != "" {
		options = append(options, nbe.Following(&nbe.Follow{Want: wanted(w.follow), Limit: w.limit, Results: true, Event: func(e *nbe.Event) { line(out, e, w.limit) }}))
	}
	return options
}

// wanted is the filter of -follow.
func wanted(filter string) func(*nbe.Event) bool {
	if filter == "all" {
		return nil
	}
	names := strings.Split(filter, ",")
	return func(e *nbe.Event) bool {
		for _, name := range names {
			name = strings.TrimSpace(name)
			if e.Where != nil && e.Where.Name == name || e.Rule == name || strings.HasPrefix(e.Rule, name+" ") {
				return true
			}
		}
		return false
	}
}

// line prints an event: what the rule is applied to when it begins, what it
// gave when it is done.
func line(out io.Writer, e *nbe.Event, limit int64) {
	if e.Done {
		fmt.Fprintf(out, "#%d = %s\n", e.Number, oneLine(e.After()))
		return
	}
	where := ""
	if e.Where != nil {
		where = ", in " + profile.SiteName(e.Where)
	}
	fmt.Fprintf(out, "#%d %s%s: %s\n", e.Number, e.Rule, where, oneLine(e.Before()))
	if e.Number == limit {
		fmt.Fprintf(out, "#… no further rules: -follow-limit is %d\n", limit)
	}
}

func oneLine(w *term.Written) string {
	return strings.Join(strings.Fields(notation.Format(w, 1<<20)), " ")
}

// write writes the profile, if that was asked for.
func (w *watching) write() error {
	if w.profile == "" {
		return nil
	}
	f, err := os.Create(w.profile)
	if err != nil {
		return err
	}
	if err := w.work.Write(f); err != nil {
		f.Close()
		return err
	}
	return f.Close()
}
