// Command uncovered reads a coverage profile and says which statements of the
// core packages no test reaches. Each of them must be explained in a list;
// what is not, and a package below the least coverage, is a failure.
//
//	go run .ci/uncovered.go PROFILE LIST LEAST
//
// A line of the list is "text REGEXP: reason", for blocks whose source matches,
// or "func FILE NAME: reason", for the rest of a function. An entry that explains
// nothing is told, and is no failure: what the clock decides is covered by chance.
package main

import (
	"bufio"
	"fmt"
	"go/ast"
	"go/parser"
	"go/token"
	"os"
	"regexp"
	"slices"
	"strconv"
	"strings"
)

type block struct {
	file               string
	line, column, last int
	statements         int
	hit                bool
}

type entry struct {
	pattern    *regexp.Regexp
	file, name string
	line       string
	used       bool
}

func fail(format string, args ...any) {
	fmt.Fprintf(os.Stderr, format+"\n", args...)
	os.Exit(2)
}

func main() {
	if len(os.Args) != 4 {
		fail("usage: uncovered PROFILE LIST LEAST")
	}
	least, err := strconv.ParseFloat(os.Args[3], 64)
	if err != nil {
		fail("%v", err)
	}
	blocks, list := profile(os.Args[1]), entries(os.Args[2])
	all, seen := map[string]int{}, map[string]int{}
	files := map[string]*source{}
	bad := false
	for _, b := range blocks {
		folder := b.file[:strings.LastIndex(b.file, "/")]
		all[folder] += b.statements
		if b.hit {
			seen[folder] += b.statements
			continue
		}
		if b.statements == 0 {
			continue
		}
		if files[b.file] == nil {
			files[b.file] = read(b.file)
		}
		if text := files[b.file].of(b); !explained(list, b, text, files[b.file].function(b.line)) {
			bad = true
			fmt.Printf("not covered, not explained: %s:%d in %s: %s\n", b.file, b.line, files[b.file].function(b.line), strings.Join(strings.Fields(text), " "))
		}
	}
	var folders []string
	for f := range all {
		folders = append(folders, f)
	}
	slices.Sort(folders)
	for _, f := range folders {
		percent := 100 * float64(seen[f]) / float64(all[f])
		fmt.Printf("%-24s %5.1f %% of %d statements\n", f, percent, all[f])
		if percent < least {
			fmt.Printf("%s is below %g %%\n", f, least)
			bad = true
		}
	}
	for _, e := range list {
		if !e.used {
			fmt.Printf("explains nothing: %s\n", e.line)
		}
	}
	if bad {
		os.Exit(1)
	}
}

// profile is the blocks of a profile, each once: it holds them once for each test binary.
func profile(name string) []*block {
	f, err := os.Open(name)
	if err != nil {
		fail("%v", err)
	}
	defer f.Close()
	known := map[string]*block{}
	var out []*block
	in := bufio.NewScanner(f)
	form := regexp.MustCompile(`^[^/]+/[^/]+/(.*\.go):(\d+)\.(\d+),(\d+)\.\d+ (\d+) (\d+)$`)
	for in.Scan() {
		m := form.FindStringSubmatch(in.Text())
		if m == nil {
			continue
		}
		key := in.Text()[:strings.LastIndex(in.Text(), " ")]
		b := known[key]
		if b == nil {
			number := func(s string) int { n, _ := strconv.Atoi(s); return n }
			b = &block{file: m[1], line: number(m[2]), column: number(m[3]), last: number(m[4]), statements: number(m[5])}
			known[key] = b
			out = append(out, b)
		}
		b.hit = b.hit || m[6] != "0"
	}
	slices.SortFunc(out, func(a, b *block) int {
		if c := strings.Compare(a.file, b.file); c != 0 {
			return c
		}
		return a.line - b.line
	})
	return out
}

func entries(name string) (out []*entry) {
	src, err := os.ReadFile(name)
	if err != nil {
		fail("%v", err)
	}
	for _, line := range strings.Split(string(src), "\n") {
		what, _, ok := strings.Cut(line, ": ")
		switch words := strings.Fields(what); {
		case line == "" || strings.HasPrefix(line, "#"):
		case ok && len(words) >= 2 && words[0] == "text":
			p, err := regexp.Compile(strings.TrimPrefix(what, "text "))
			if err != nil {
				fail("%s: %v", line, err)
			}
			out = append(out, &entry{pattern: p, line: line})
		case ok && len(words) == 3 && words[0] == "func":
			out = append(out, &entry{file: words[1], name: words[2], line: line})
		default:
			fail("no entry: %s", line)
		}
	}
	return out
}

func explained(list []*entry, b *block, text, function string) bool {
	found := false
	for _, e := range list {
		if e.pattern != nil && e.pattern.MatchString(text) || e.pattern == nil && e.file == b.file && e.name == function {
			e.used, found = true, true
		}
	}
	return found
}

// source is a file with the functions that stand in it.
type source struct {
	lines     []string
	functions []function
}

type function struct {
	name        string
	first, last int
}

func read(name string) *source {
	src, err := os.ReadFile(name)
	if err != nil {
		fail("%v", err)
	}
	set := token.NewFileSet()
	tree, err := parser.ParseFile(set, name, src, 0)
	if err != nil {
		fail("%v", err)
	}
	out := &source{lines: strings.Split(string(src), "\n")}
	for _, d := range tree.Decls {
		if f, ok := d.(*ast.FuncDecl); ok {
			name := f.Name.Name
			if f.Recv != nil {
				t := f.Recv.List[0].Type
				if star, ok := t.(*ast.StarExpr); ok {
					t = star.X
				}
				if i, ok := t.(*ast.IndexExpr); ok {
					t = i.X
				}
				if n, ok := t.(*ast.Ident); ok {
					name = n.Name + "." + name
				}
			}
			out.functions = append(out.functions, function{name, set.Position(f.Pos()).Line, set.Position(f.End()).Line})
		}
	}
	return out
}

func (s *source) function(line int) string {
	for _, f := range s.functions {
		if f.first <= line && line <= f.last {
			return f.name
		}
	}
	return "?"
}

// of is the text of a block.
func (s *source) of(b *block) string {
	lines := slices.Clone(s.lines[b.line-1 : b.last])
	lines[0] = lines[0][min(b.column-1, len(lines[0])):]
	return strings.Join(lines, "\n")
}
