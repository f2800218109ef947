package kit

import (
	"context"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/script"
)

// Script tests in the txtar form: a text archive of files, each under a line
// "-- NAME --", with a comment before the first. The file "main.sexp" is the
// script (the first file, where there is none of that name), "want" is its
// report, and the others are there to be loaded.

// File is one file of an archive.
type File struct {
	Name string
	Data string
}

// Archive is a text archive.
type Archive struct {
	Comment string
	Files   []File
}

// ParseArchive reads the txtar form. Every text is an archive.
func ParseArchive(text string) *Archive {
	a := &Archive{}
	at := &a.Comment
	for len(text) > 0 {
		line, rest, _ := strings.Cut(text, "\n")
		text = rest
		if name, ok := marker(line); ok {
			a.Files = append(a.Files, File{Name: name})
			at = &a.Files[len(a.Files)-1].Data
			continue
		}
		*at += line + "\n"
	}
	return a
}

func marker(line string) (string, bool) {
	line = strings.TrimRight(line, "\r")
	if !strings.HasPrefix(line, "-- ") || !strings.HasSuffix(line, " --") || len(line) < 7 {
		return "", false
	}
	return strings.TrimSpace(line[3 : len(line)-3]), true
}

// String is the archive as text.
func (a *Archive) String() string {
	var b strings.Builder
	b.WriteString(a.Comment)
	for _, f := range a.Files {
		fmt.Fprintf(&b, "-- %s --\n%s", f.Name, f.Data)
	}
	return b.String()
}

// Get returns the file of a name.
func (a *Archive) Get(name string) (data string, ok bool) {
	for _, f := range a.Files {
		if f.Name == name {
			return f.Data, true
		}
	}
	return "", false
}

func (a *Archive) set(name, data string) {
	for k := range a.Files {
		if a.Files[k].Name == name {
			a.Files[k].Data = data
			return
		}
	}
	a.Files = append(a.Files, File{name, data})
}

// Scripts runs every archive that matches the pattern as a subtest, each on an
// engine of its own with the options. The report of each form stands on a line
// of its own: its place, its word and what it says. Where an archive has no
// "want", every form must do what it says. Under -update-golden "want" is
// written anew in the archives that have one.
func Scripts(t *testing.T, pattern string, options ...nbe.Option) {
	t.Helper()
	files, err := filepath.Glob(pattern)
	if err != nil || len(files) == 0 {
		t.Fatalf("kit: no archive matches %q", pattern)
	}
	for _, file := range files {
		t.Run(strings.TrimSuffix(filepath.Base(file), ".txtar"), func(t *testing.T) {
			text, err := os.ReadFile(file)
			if err != nil {
				t.Fatal(err)
			}
			a := ParseArchive(string(text))
			got, failed := RunArchive(t, a, options...)
			want, ok := a.Get("want")
			switch {
			case !ok:
				for _, err := range failed {
					t.Errorf("%v", err)
				}
			case *update:
				if a.set("want", got); os.WriteFile(file, []byte(a.String()), 0o644) != nil {
					t.Errorf("%s cannot be written", file)
				}
			default:
				if d := firstLine(want, got); d != "" {
					t.Errorf("%s: the report: %s", file, d)
				}
			}
		})
	}
}

// RunArchive runs the script of an archive and returns its report and what
// went wrong.
func RunArchive(t testing.TB, a *Archive, options ...nbe.Option) (report string, failed []error) {
	t.Helper()
	e, err := nbe.New(options...)
	if err != nil {
		t.Fatalf("kit: %v", err)
	}
	if len(a.Files) == 0 {
		t.Fatalf("kit: the archive holds no script")
	}
	main := "main.sexp"
	if _, ok := a.Get(main); !ok {
		main = a.Files[0].Name
	}
	var b strings.Builder
	s := &script.Session{
		Engine: e,
		ReadFile: func(name string) ([]byte, error) {
			if data, ok := a.Get(filepath.ToSlash(filepath.Clean(name))); ok {
				return []byte(data), nil
			}
			return nil, fs.ErrNotExist
		},
		Report: func(r script.Result) {
			switch {
			case r.Err != nil:
				failed = append(failed, r.Err)
				fmt.Fprintln(&b, r.Err)
			case r.Text != "":
				fmt.Fprintf(&b, "%s: %s: %s\n", r.Form.Place, r.Form.Kind, r.Text)
			}
		},
	}
	if err := s.File(context.Background(), main); err != nil {
		failed = append(failed, err)
		fmt.Fprintln(&b, err)
	}
	return b.String(), failed
}

func itoa(n int) string { return strconv.Itoa(n) }

// indented is text with an indent before every line.
func indented(text, indent string) string {
	return indent + strings.ReplaceAll(text, "\n", "\n"+indent)
}
