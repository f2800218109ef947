package library

import (
	"encoding/json"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
)

// One wrong version of each rule of gluing, each of which the checks of testdata
// must catch: a dropped wall, a wrong end, a missing face. The rules are mutated
// in an overlay, so that no file changes. Compiling each takes seconds, so this
// runs when it is asked for, with BOXWRIGHT_MUTATIONS=1; that every mutation
// still applies is looked at always.

// mutation replaces old, which stands in the file once.
type mutation struct{ name, file, old, new string }

var mutations = []mutation{
	{name: "a Glue type whose face holds is not T", file: "prims/glue.go",
		old: "if p.Cube.IsTop() {\n\t\t\treturn p.T\n\t\t}\n\t}\n\treturn &GlueType", new: "if false {\n\t\t\treturn p.T\n\t\t}\n\t}\n\treturn &GlueType"},
	{name: "an element whose face holds is not t", file: "prims/glue.go",
		old: "if p.Cube.IsTop() {\n\t\t\treturn p.T\n\t\t}\n\t\tsup", new: "if false {\n\t\t\treturn p.T\n\t\t}\n\t\tsup"},
	{name: "unglue where the face holds forgets the map", file: "prims/glue.go",
		old: "return mapped(run, p.E, b)", new: "return b"},
	{name: "unglue of a known element looks at no face", file: "prims/glue.go",
		old: "ok && !glueParts(parts).top()", new: "ok"},
	{name: "equality of elements looks at the bases alone", file: "prims/glue.go",
		old: `return c.Terms("what is glued on", p.T, run.Restrict(a, p.Cube), run.Restrict(b, p.Cube))`, new: "return true"},
	{name: "equality of elements looks at the parts alone", file: "prims/glue.go",
		old: `return c.Terms("the base of glue", g.A, Unglue(run, g.Parts, a), Unglue(run, g.Parts, b))`, new: "return true"},
	{name: "equality of types forgets the equivalence", file: "prims/glue.go",
		old: `c.EqualTypes("the type glued on", p.T, qs[k].T) &&`, new: `c.EqualTypes("the type glued on", p.T, qs[k].T) ||`},
	{name: "equality of types forgets the faces", file: "prims/glue.go",
		old: "if !ps[k].Cube.Equal(qs[k].Cube) {", new: "if false && k >= 0 {"},

	{name: "hcomp: the walls of the parts are dropped", file: "prims/glue_hcomp.go",
		old: "sides = append(sides, value.Wall{Cube: p.Cube, I: i, Body: mapAlong(run, p.E, t)})", new: "_ = mapAlong(run, p.E, t)"},
	{name: "hcomp: the part is filled but stands still", file: "prims/glue_hcomp.go",
		old: "t := Hfill(run, i, p.T, base, us)", new: "t := base"},
	{name: "hcomp: the part is the base's", file: "prims/glue_hcomp.go",
		old: "glued[k] = GlueValue{p.Cube, LaterHcomp(run, p.T, base, us)}", new: "glued[k] = GlueValue{p.Cube, base}"},
	{name: "hcomp: the base's walls are not unglued under their faces", file: "prims/glue_hcomp.go",
		old: "return Unglue(run, parts.substitute(run, cut), u)", new: "return Unglue(run, nil, u)"},

	{name: "transp: the base is unglued at the end", file: "prims/glue_transp.go",
		old: "base := LaterUnglue(run, parts.substitute(run, start), u0)", new: "_ = start\n\tbase := LaterUnglue(run, parts.substitute(run, end), u0)"},
	{name: "transp: no wall where nothing moves", file: "prims/glue_transp.go",
		old: "for k := range psi.Len() {", new: "for k := range 0 {"},
	{name: "transp: no wall where a part stands throughout", file: "prims/glue_transp.go",
		old: "sides = append(sides, value.Wall{Cube: p.Cube, I: i, Body: mapAlong(run, p.E, t)})", new: "_ = mapAlong(run, p.E, t)"},
	{name: "transp: the part throughout is filled from nowhere", file: "prims/glue_transp.go",
		old: "t := Tfill(run, i, p.T, under, u)", new: "t := u"},
	{name: "transp: the contraction does not extend what stands throughout", file: "prims/glue_transp.go",
		old: "done = append(done, GlueValue{p.Cube, LaterTransp(run, i, p.T, under, u)})", new: "_ = done"},
	{name: "transp: the base is not corrected along the fiber", file: "prims/glue_transp.go",
		old: "corrections = append(corrections, value.Wall{Cube: p.Cube, I: j, Body: LaterAt(run, path, interval.Var(j))})", new: "_, _ = path, j"},
	{name: "transp: the correction moves where nothing should", file: "prims/glue_transp.go",
		old: "corrections = corrections.Constant(run, psi, a1)", new: ""},
	{name: "transp: the parts are those of the start", file: "prims/glue_transp.go",
		old: "parts1 := parts.substitute(run, end)", new: "parts1 := parts.substitute(run, start)"},
	{name: "transp across parts: the parts are exchanged", file: "prims/glue_across.go",
		old: "case one && to == nil:\n\t\t\tto = p\n\t\tcase !one && from == nil:", new: "case !one && to == nil:\n\t\t\tto = p\n\t\tcase one && from == nil:"},
	{name: "transp across parts: a part throughout is overlooked", file: "prims/glue_across.go",
		old: "case !mentions:\n\t\t\treturn nil, nil, false", new: "case !mentions:\n\t\t\tcontinue"},
	{name: "transp across parts: the base does not move", file: "prims/glue_across.go",
		old: "v = Transp(run, i, a, interval.Bot(), v)", new: "_ = i"},
	{name: "transp without parts: too few composites", file: "prims/glue_bare.go",
		old: "for range 2 * depth {\n\t\t\tu = ", new: "for range depth {\n\t\t\tu = "},
	{name: "transp without parts: too few composites at data", file: "prims/glue_bare.go",
		old: "for range 2 * depth {\n\t\t\t\tv = ", new: "for range depth {\n\t\t\t\tv = "},
	{name: "transp without parts: the composites are at the start", file: "prims/glue_bare.go",
		old: "end := run.At(a, i, interval.One())", new: "end := run.At(a, i, interval.Zero())"},
	{name: "transp without parts: what stands still is overlooked", file: "prims/glue_bare.go",
		old: "len(g.Parts) == 0 && psi.IsBot()", new: "len(g.Parts) == 0"},
	{name: "extend: the first part loses its walls", file: "prims/glue_transp.go",
		old: "return Hcomp(run, p.T, base, walls)", new: "return Hcomp(run, p.T, base, walls[:0])"},
	{name: "extend: the contraction is walked backwards", file: "prims/glue_transp.go",
		old: "return At(run, Apply(run, Second(run, center), point), interval.Var(i))", new: "return At(run, Apply(run, Second(run, center), point), interval.Var(i).Rev())"},

	{name: "composition of types: the walls' lines are not turned around", file: "prims/equiv.go",
		old: "interval.Var(l.i).Rev()", new: "interval.Var(l.i)"},
	{name: "composition of types: the whole line is glued on, not its end", file: "prims/universe_hcomp.go",
		old: "w.End(run)", new: "w.Body"},
	{name: "the equivalence along a line: the map runs backwards", file: "prims/equiv.go",
		old: "return Transp(run, i, l, interval.Bot(), x)", new: "return Backward(run, i, l, interval.Bot(), x)"},
	{name: "the equivalence along a line: the center is on the other side", file: "prims/equiv.go",
		old: "return Transp(run, l.i, l.e, interval.Bot(), y)", new: "return Transp(run, l.i, l.line(run), interval.Bot(), y)"},
	{name: "the equivalence along a line: the contraction has another wall", file: "prims/equiv.go",
		old: "lineFiberPath(run, i, line, y, v0, l)).\n", new: "v0).\n"},
	{name: "the equivalence along a line: the path of the center is not closed", file: "prims/equiv.go",
		old: "walls := value.System{}.Line(run, interval.Eq0(l), i, v).Line(run, interval.Eq1(l), i, u)", new: "walls := value.System{}.Line(run, interval.Eq0(l), i, v); _ = u"},
}

// apply is the mutated text; false if the table no longer fits the file.
func (m mutation) apply(src string) (string, bool) {
	if strings.Count(src, m.old) != 1 {
		return "", false
	}
	return strings.Replace(src, m.old, m.new, 1), true
}

func TestEveryMutationApplies(t *testing.T) {
	root := moduleRoot(t)
	for _, m := range mutations {
		src, err := os.ReadFile(filepath.Join(root, m.file))
		if err != nil {
			t.Fatal(err)
		}
		if _, ok := m.apply(string(src)); !ok {
			t.Errorf("%s: what it replaces stands in %s another number of times", m.name, m.file)
		}
	}
}

func TestMutationsAreCaught(t *testing.T) {
	if os.Getenv("BOXWRIGHT_MUTATIONS") == "" {
		t.Skip("compiles the module once for each mutation; BOXWRIGHT_MUTATIONS=1 asks for it")
	}
	goTool, err := exec.LookPath("go")
	if err != nil {
		t.Skip(err)
	}
	root := moduleRoot(t)
	for _, m := range mutations {
		t.Run(m.name, func(t *testing.T) {
			src, err := os.ReadFile(filepath.Join(root, m.file))
			if err != nil {
				t.Fatal(err)
			}
			text, ok := m.apply(string(src))
			if !ok {
				t.Fatal("it no longer applies")
			}
			dir := t.TempDir()
			mutated, overlay := filepath.Join(dir, "mutated.go"), filepath.Join(dir, "overlay.json")
			list, err := json.Marshal(map[string]map[string]string{"Replace": {filepath.Join(root, m.file): mutated}})
			if err != nil {
				t.Fatal(err)
			}
			for file, content := range map[string][]byte{mutated: []byte(text), overlay: list} {
				if err := os.WriteFile(file, content, 0o600); err != nil {
					t.Fatal(err)
				}
			}
			cmd := exec.Command(goTool, "test", "-overlay", overlay, "-vet=off", "-timeout", "60s", "-run", "TestRules/(glue|universe)/fast", "./examples/library")
			cmd.Dir = root
			out, err := cmd.CombinedOutput()
			if err == nil {
				t.Fatal("no check of testdata fails")
			}
			if !strings.Contains(string(out), "--- FAIL: TestRules") && !strings.Contains(string(out), "panic: test timed out") {
				t.Fatalf("the mutated rules were not tested: %s", clip(string(out)))
			}
		})
	}
}

func moduleRoot(t *testing.T) string {
	t.Helper()
	dir, err := os.Getwd()
	if err != nil {
		t.Fatal(err)
	}
	for ; ; dir = filepath.Dir(dir) {
		if _, err := os.Stat(filepath.Join(dir, "go.mod")); err == nil {
			return dir
		}
		if dir == filepath.Dir(dir) {
			t.Fatal("there is no module here")
		}
	}
}
