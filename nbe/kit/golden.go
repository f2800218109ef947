package kit

import (
	"context"
	"flag"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
)

// Golden files: what a test printed when somebody last looked at it. The flag
// -update-golden writes them anew; a test run without it never writes.

var update = flag.Bool("update-golden", false, "write golden files and wanted reports anew instead of comparing with them")

// Golden asserts that text is what stands in the file, which is relative to the
// test's package, or writes it there under -update-golden.
func Golden(t testing.TB, file, text string) bool {
	t.Helper()
	text = strings.TrimRight(text, "\n") + "\n"
	if *update {
		if err := os.MkdirAll(filepath.Dir(file), 0o755); err != nil {
			t.Errorf("%v", err)
			return false
		}
		if err := os.WriteFile(file, []byte(text), 0o644); err != nil {
			t.Errorf("%v", err)
			return false
		}
		return true
	}
	want, err := os.ReadFile(file)
	if err != nil {
		t.Errorf("no golden file; -update-golden writes it: %v", err)
		return false
	}
	if d := firstLine(string(want), text); d != "" {
		t.Errorf("%s: %s", file, d)
		return false
	}
	return true
}

// GoldenNormal is Golden for the normal form and the type of a, in the notation.
func GoldenNormal(t testing.TB, s *nbe.Scope, file string, ty, a any) bool {
	t.Helper()
	x, err := checked(t, s, a, ty)
	if err != nil {
		t.Errorf("%v", err)
		return false
	}
	forms, err := s.Normal(context.Background(), x)
	if err != nil {
		t.Errorf("%v", err)
		return false
	}
	var b strings.Builder
	for k := range forms {
		w, err := forms[k].Written()
		if err != nil {
			t.Errorf("%v", err)
			return false
		}
		u, err := forms[k].WrittenType()
		if err != nil {
			t.Errorf("%v", err)
			return false
		}
		b.WriteString(notation.Format(w, 96) + "\n: " + notation.Format(u, 96) + "\n")
	}
	return Golden(t, file, b.String())
}

// firstLine tells the first line in which two texts differ, or nothing.
func firstLine(want, got string) string {
	a, b := strings.Split(want, "\n"), strings.Split(got, "\n")
	for k := range max(len(a), len(b)) {
		x, y := "the end of the text", "the end of the text"
		if k < len(a) {
			x = a[k]
		}
		if k < len(b) {
			y = b[k]
		}
		if x != y {
			return "line " + itoa(k+1) + " differs:\nwant " + x + "\ngot  " + y
		}
	}
	return ""
}
