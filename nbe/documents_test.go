package nbe_test

import (
	"bytes"
	"encoding/json"
	"flag"
	"fmt"
	"go/ast"
	"go/doc"
	"go/format"
	"go/parser"
	"go/token"
	"io"
	"io/fs"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"slices"
	"sort"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/prims"
)

// What the documents say is true: the first example is compiled code, the
// commands exist, imports go one way, and the exported names are those that
// somebody decided to export.

var update = flag.Bool("update", false, "write the list of exported names anew")

const module = "example.com/boxwright"

// allowed are the packages of the module that each room may import. A core room
// imports nothing else but the standard library.
var allowed = map[string]struct {
	rooms []string
	core  bool
}{
	"value/interval":     {nil, true},
	"nbe/internal/watch": {nil, true},
	"nbe/term":           {[]string{"value/interval", "nbe/internal/watch"}, true},
	"value":              {[]string{"value/interval", "nbe/term"}, true},
	"nbe/eval":           {[]string{"value/interval", "nbe/term", "value"}, true},
	"prims":              {[]string{"value/interval", "nbe/term", "value", "nbe/eval"}, true},
	"quote":              {[]string{"value/interval", "nbe/term", "value"}, true},
	"nbe/notation":       {[]string{"nbe/term", "nbe/internal/watch"}, true},
	"nbe/profile":        {[]string{"value"}, true},
	"nbe":                {[]string{"value/interval", "nbe/term", "value", "nbe/eval", "prims", "quote", "nbe/notation", "nbe/profile", "nbe/internal/watch"}, true},
	"nbe/script":         {[]string{"nbe", "nbe/notation", "nbe/term"}, true},
}

// listed is what go list says of a package.
type listed struct {
	ImportPath, Dir string
	Imports         []string
	Standard        bool
}

func list(t *testing.T) []listed {
	t.Helper()
	c := exec.Command("go", "list", "-json=ImportPath,Dir,Imports", "./...")
	c.Dir = ".."
	out, err := c.Output()
	require.NoError(t, err)
	var all []listed
	for d := json.NewDecoder(bytes.NewReader(out)); ; {
		var p listed
		err := d.Decode(&p)
		if err == io.EOF {
			return all
		}
		require.NoError(t, err)
		all = append(all, p)
	}
}

func TestImportsGoOneWay(t *testing.T) {
	seen := map[string]bool{}
	for _, p := range list(t) {
		room := strings.TrimPrefix(strings.TrimPrefix(p.ImportPath, module), "/")
		rule, known := allowed[room]
		seen[room] = true
		for _, i := range p.Imports {
			inner, ours := strings.CutPrefix(i, module+"/")
			switch {
			case ours && strings.HasPrefix(room, "examples/"):
				assert.False(t, strings.Contains(inner, "internal"), "%s imports %s, which a stranger cannot", room, inner)
			case ours && known:
				assert.Contains(t, rule.rooms, inner, "%s imports %s", room, inner)
			case !ours && known && rule.core:
				first, _, _ := strings.Cut(i, "/")
				assert.NotContains(t, first, ".", "%s imports %s, which is not of the standard library", room, i)
			}
			if ours && !strings.HasPrefix(room, "examples/") {
				assert.False(t, strings.HasPrefix(inner, "examples/"), "%s imports %s", room, inner)
			}
		}
		top, _, _ := strings.Cut(room, "/")
		assert.Contains(t, []string{"nbe", "value", "quote", "prims", "examples"}, top, "a room at the top")
	}
	for room := range allowed {
		assert.True(t, seen[room], "there is no room %s", room)
	}
}

// exported are the exported names of a package, one a line: functions, types,
// methods, constants, variables.
func exported(t *testing.T, dir string) []string {
	t.Helper()
	set := token.NewFileSet()
	var files []*ast.File
	names, err := filepath.Glob(filepath.Join(dir, "*.go"))
	require.NoError(t, err)
	for _, name := range names {
		if strings.HasSuffix(name, "_test.go") {
			continue
		}
		f, err := parser.ParseFile(set, name, nil, parser.ParseComments)
		require.NoError(t, err)
		files = append(files, f)
	}
	p, err := doc.NewFromFiles(set, files, module)
	require.NoError(t, err)
	var out []string
	bare := func(comment, name string) {
		if dir == "." || dir == "term" { // what hosts read
			assert.NotEmpty(t, comment, "%s has no comment", name)
		}
	}
	add := func(what string, fs []*doc.Func) {
		for _, f := range fs {
			out = append(out, what+f.Name)
			bare(f.Doc, what+f.Name)
		}
	}
	values := func(vs []*doc.Value, what string) {
		for _, v := range vs {
			for _, n := range v.Names {
				if ast.IsExported(n) {
					out = append(out, what+n)
				}
			}
		}
	}
	add("func ", p.Funcs)
	values(p.Consts, "const ")
	values(p.Vars, "var ")
	for _, ty := range p.Types {
		out = append(out, "type "+ty.Name)
		bare(ty.Doc, ty.Name)
		add("func ", ty.Funcs)
		add("method "+ty.Name+".", ty.Methods)
		values(ty.Consts, "const ")
		values(ty.Vars, "var ")
	}
	sort.Strings(out)
	return out
}

// What hosts use is short, and grows only when somebody says so with -update.
func TestExportedNames(t *testing.T) {
	for dir, file := range map[string]string{".": "testdata/exported-nbe.txt", "term": "testdata/exported-term.txt"} {
		got := strings.Join(exported(t, dir), "\n") + "\n"
		if *update {
			require.NoError(t, os.MkdirAll(filepath.Dir(file), 0o755))
			require.NoError(t, os.WriteFile(file, []byte(got), 0o644))
			continue
		}
		want, err := os.ReadFile(file)
		require.NoError(t, err)
		assert.Equal(t, string(want), got, "run go test ./nbe -run TestExportedNames -update if these names are meant")
	}
}

// document is a text of the top of the module.
func document(t *testing.T, name string) string {
	t.Helper()
	text, err := os.ReadFile(filepath.Join("..", name))
	require.NoError(t, err)
	return string(text)
}

// The first example of the README is the body of func Example, which is run.
func TestTheReadmesExampleIsCompiled(t *testing.T) {
	_, rest, ok := strings.Cut(document(t, "README.md"), "```go\n")
	require.True(t, ok)
	shown, _, ok := strings.Cut(rest, "```")
	require.True(t, ok)
	assert.Less(t, strings.Count(shown, "\n"), 30)

	src, err := os.ReadFile("example_test.go")
	require.NoError(t, err)
	_, rest, ok = strings.Cut(string(src), "func Example() {\n")
	require.True(t, ok)
	body, _, ok := strings.Cut(rest, "\n}\n")
	require.True(t, ok)
	formatted, err := format.Source([]byte("func Example() {\n" + shown + "}\n"))
	require.NoError(t, err)
	assert.Equal(t, "func Example() {\n"+body+"\n}\n", string(formatted))
}

// The limits that the README tells are those of the code.
func TestTheReadmesLimits(t *testing.T) {
	text := document(t, "README.md")
	for _, n := range []int64{nbe.DefaultSteps, nbe.DefaultDepth, nbe.DefaultOutput, nbe.DefaultText, notation.MaxNesting, notation.MaxDigits} {
		assert.Contains(t, text, commas(n))
	}
	assert.Contains(t, text, fmt.Sprintf("| %d GiB |", nbe.DefaultMemory>>30))
	assert.Contains(t, text, fmt.Sprintf("(U %d)", prims.MaxLevel))
}

// commas is a number with a comma before each three digits.
func commas(n int64) string {
	if n < 1000 {
		return fmt.Sprint(n)
	}
	return fmt.Sprintf("%s,%03d", commas(n/1000), n%1000)
}

// Every command of the documents names packages, scripts, tests and fuzzers
// that are there.
func TestTheDocumentsCommandsExist(t *testing.T) {
	tests := map[string]bool{}
	require.NoError(t, filepath.WalkDir("..", func(path string, d fs.DirEntry, err error) error {
		if err != nil || !strings.HasSuffix(path, "_test.go") {
			return err
		}
		text, err := os.ReadFile(path)
		for _, m := range regexp.MustCompile(`(?m)^func ((?:Test|Fuzz|Benchmark)\w*)\(`).FindAllStringSubmatch(string(text), -1) {
			tests[m[1]] = true
		}
		return err
	}))
	commands := 0
	for _, name := range []string{"README.md", "DEVELOPERS.md"} {
		for _, line := range strings.Split(document(t, name), "\n") {
			command, ok := strings.CutPrefix(line, "    ")
			if !ok || !regexp.MustCompile(`^(\w+=\w+ )?(go|\.ci/)`).MatchString(command) {
				continue
			}
			commands++
			words := strings.Fields(command)
			for k, w := range words {
				if path, ok := strings.CutPrefix(w, "./"); ok && w != "./..." {
					_, err := os.Stat(filepath.Join("..", strings.TrimSuffix(path, "/...")))
					assert.NoError(t, err, command)
				}
				if strings.HasSuffix(w, ".sexp") {
					_, err := os.Stat(filepath.Join("..", w))
					assert.NoError(t, err, command)
				}
				if k > 0 && (words[k-1] == "-run" || words[k-1] == "-fuzz") && w != "XXX" {
					assert.True(t, tests[w], "%s: there is no %s", command, w)
				}
			}
		}
		for _, path := range regexp.MustCompile("`((?:nbe|value|prims|quote|examples|\\.ci)(?:/[\\w.*-]+)*)(?: [\\w ]*)?`").FindAllStringSubmatch(document(t, name), -1) {
			if strings.Contains(path[1], "*") {
				found, err := filepath.Glob(filepath.Join("..", path[1]))
				require.NoError(t, err)
				assert.NotEmpty(t, found, path[1])
				continue
			}
			_, err := os.Stat(filepath.Join("..", path[1]))
			var missing bool
			if err != nil { // perhaps a name in a package, such as nbe.WithPlain
				room, _, dotted := strings.Cut(path[1], ".")
				_, err = os.Stat(filepath.Join("..", room))
				missing = err != nil || !dotted
			}
			assert.False(t, missing, "%s: there is no %s", name, path[1])
		}
	}
	assert.GreaterOrEqual(t, commands, 10)
	// The names in code of other packages than main that the documents mention are there.
	names := slices.Concat(exported(t, "."), exported(t, "term"), exported(t, "../prims"), exported(t, "../value"))
	for _, name := range []string{"README.md", "DEVELOPERS.md"} {
		for _, m := range regexp.MustCompile("`\\*?(?:nbe|term|prims|value)\\.(\\w+)`").FindAllStringSubmatch(document(t, name), -1) {
			assert.True(t, slices.ContainsFunc(names, func(n string) bool { return strings.HasSuffix(n, " "+m[1]) }), "%s mentions %s", name, m[0])
		}
	}
}
