package gauge

import (
	"encoding/json"
	"fmt"
	"io"
	"math"
	"os"
	"runtime"
	"strings"
	"text/tabwriter"
)

// Tables of results: for people, for machines, and merged.

// Table is the results of one run.
type Table struct {
	Go      string    `json:"go"`
	System  string    `json:"system"`
	Rounds  int       `json:"rounds"`
	Unit    string    `json:"unit"` // what the common unit is
	Results []*Result `json:"results"`
}

// NewTable is a table without results.
func NewTable(rounds int, unit string) *Table {
	return &Table{Go: runtime.Version(), System: runtime.GOOS + "/" + runtime.GOARCH, Rounds: rounds, Unit: unit}
}

// Load reads a table that was saved as JSON.
func Load(file string) (*Table, error) {
	text, err := os.ReadFile(file)
	if err != nil {
		return nil, err
	}
	t := &Table{}
	if err := json.Unmarshal(text, t); err != nil {
		return nil, fmt.Errorf("%s: %w", file, err)
	}
	return t, nil
}

// WriteJSON writes the table for machines.
func (t *Table) WriteJSON(w io.Writer) error {
	e := json.NewEncoder(w)
	e.SetEscapeHTML(false)
	e.SetIndent("", " ")
	return e.Encode(t)
}

// Merge puts another table's results in, in the place of those of the same name.
func (t *Table) Merge(u *Table) {
	for _, r := range u.Results {
		if k := t.index(r.Name); k >= 0 {
			t.Results[k] = r
		} else {
			t.Results = append(t.Results, r)
		}
	}
}

func (t *Table) index(name string) int {
	for k, r := range t.Results {
		if r.Name == name {
			return k
		}
	}
	return -1
}

// Missed is how many rows have missed their targets or failed.
func (t *Table) Missed() (n int) {
	for _, r := range t.Results {
		if !r.Met {
			n++
		}
	}
	return n
}

// WriteText writes the table for people, a line for each row and, for rows of
// several sizes, at the largest of them.
func (t *Table) WriteText(w io.Writer) {
	fmt.Fprintf(w, "%s, %s; medians of %d rounds of processor time, the collector's included; without a baseline of its own a row is compared with %s\n", t.Go, t.System, t.Rounds, t.Unit)
	group := ""
	tw := tabwriter.NewWriter(w, 2, 0, 2, ' ', tabwriter.AlignRight)
	for _, r := range t.Results {
		if r.Group != group {
			tw.Flush()
			group = r.Group
			fmt.Fprintf(w, "\n%s\n", group)
			fmt.Fprintln(tw, "size\ttime\twall\tallocs\tbytes\tbaseline\tits allocs\tratio\tpeak heap\tleft\tfound\ttarget\tmet\t  work")
		}
		t.writeRow(tw, r)
	}
	tw.Flush()
}

func (t *Table) writeRow(w io.Writer, r *Result) {
	if len(r.Points) == 0 {
		fmt.Fprintf(w, "\t\t\t\t\t\t\t\t\t\t\t%s\tfailed\t  %s: %s\n", r.target(), r.Name, r.Error)
		return
	}
	p := &r.Points[len(r.Points)-1]
	met, note := "yes", ""
	if !r.Met {
		met = "NO"
	}
	if n := len(p.Ratios); n < t.Rounds {
		note = fmt.Sprintf(" (%d rounds)", n)
	}
	if r.Error != "" {
		met, note = "failed", ": "+r.Error
	}
	fmt.Fprintf(w, "%d %s\t%s\t%s\t%s\t%s\t%s\t%s\t%s\t%s\t%s\t%s\t%s\t%s\t  %s%s\n", p.Size, r.Unit, nanos(p.CPU), nanos(p.Wall), count(p.Allocs), memory(p.Bytes),
		nanos(p.BaseCPU), count(p.BaseAllocs), figure(p.Ratio()), memory(float64(p.Peak)), memory(float64(p.Left)), r.found(), r.target(), met, r.Name, note)
}

func (r *Result) found() string { return r.say(r.Value) }

func (r *Result) target() string { return "≤ " + r.say(r.Target) }

func (r *Result) say(v float64) string {
	of := ""
	if r.Quantity != "" {
		of = " " + r.Quantity
	}
	switch r.Kind {
	case Growth:
		return fmt.Sprintf("n^%.2f%s", v, of)
	case Factor:
		return fmt.Sprintf("×%.2f%s", v, of)
	case Allocations:
		return fmt.Sprintf("%.3g allocs", v)
	case Heap:
		return memory(v)
	}
	return "×" + figure(v)
}

func figure(v float64) string {
	if math.Abs(v) >= 100 {
		return fmt.Sprintf("%.0f", v)
	}
	return fmt.Sprintf("%.3g", v)
}

// nanos is a time in nanoseconds with a unit.
func nanos(v float64) string {
	for _, u := range []struct {
		size float64
		name string
	}{{1e9, "s"}, {1e6, "ms"}, {1e3, "µs"}} {
		if v >= u.size {
			return fmt.Sprintf("%.3g %s", v/u.size, u.name)
		}
	}
	return fmt.Sprintf("%.3g ns", v)
}

func memory(v float64) string {
	sign := ""
	if v < 0 {
		sign, v = "-", -v
	}
	for _, u := range []struct {
		size float64
		name string
	}{{1 << 30, "GiB"}, {1 << 20, "MiB"}, {1 << 10, "KiB"}} {
		if v >= u.size {
			return fmt.Sprintf("%s%.3g %s", sign, v/u.size, u.name)
		}
	}
	return fmt.Sprintf("%s%.0f B", sign, v)
}

func count(v float64) string {
	s := fmt.Sprintf("%.0f", v)
	var b strings.Builder
	for k, c := range s {
		if k > 0 && (len(s)-k)%3 == 0 {
			b.WriteByte(',')
		}
		b.WriteRune(c)
	}
	return b.String()
}
