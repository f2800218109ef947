package nbe_test

// For each rule a wrong version of it that the tests of the rules must catch.
// Each mutation is one textual change of the module's source. All of them are
// built into one copy of the module, where the environment says which of them
// is in force: first none, which must pass, and then each in turn, which must
// fail. A change whose text does not stand in the source exactly once fails the
// test: the rule has been rewritten, and the mutation is to be rewritten with it.

import (
	"encoding/json"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"sort"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"
)

// mutation says what stands in a file, with the expression in ⟦ ⟧ that a wrong
// one replaces. tests are those of the tests of rules that must catch it.
type mutation struct {
	name, file  string
	text, wrong string
	tests       string
}

var mutations = []mutation{
	// functions
	{"functions: the argument is not restricted to the wall", "prims/pi.go",
		"Apply(run, u, ⟦run.Substitute(x, cut)⟧)", "x", "HcompPi$"},
	{"functions: walls are lost", "prims/pi.go",
		"LaterApply(run, f, x), ⟦walls⟧)", "walls[:0]", "HcompPi$"},
	{"functions: transport forgets its face", "prims/pi.go",
		"Open(run, back), ⟦c.Face⟧", "interval.Bot()", "TranspPi$"},
	{"functions: the argument is not transported back", "prims/pi.go",
		"LaterApply(run, f, ⟦start⟧)", "x", "TranspPi$"},
	{"functions: the codomain is not over the filler", "prims/pi.go",
		"Open(run, ⟦back⟧), c.Face", "start", "TranspPi$"},
	{"functions: the filler forgets its end", "prims/kan.go",
		"⟦phi.Or(interval.Eq1(i))⟧, v)", "phi", "TranspPi$"},
	{"functions: the way back forgets its face", "prims/kan.go",
		"interval.Var(j).Rev()), ⟦phi⟧, v)", "interval.Bot()", "TranspPi$"},
	{"functions over the interval: walls are lost", "prims/pi_dimension.go",
		"LaterApply(run, f, r), ⟦walls⟧)", "walls[:0]", "HcompPiDimension"},
	{"functions over the interval: the dimension is not restricted to the wall", "prims/pi_dimension.go",
		"Apply(run, u, ⟦run.Substitute(r, cut)⟧)", "r", "HcompPiDimension"},
	{"functions over the interval: transport forgets its face", "prims/pi_dimension.go",
		"Open(run, r), ⟦c.Face⟧", "interval.Bot()", "TranspPiDimension"},
	{"a rule's line is not renamed for its argument", "value/closure.go",
		"⟦x.Support().Has(c.I)⟧", "false", "TranspPi"},
	// pairs
	{"pairs: the second part by hcomp", "prims/sigma.go",
		"⟦LaterComp⟧(run, i, t.Second.Open(run, a), p2, seconds)",
		"func(run *value.Run, _ value.Name, _, u value.Value, w value.System) value.Value { return LaterHcomp(run, t.Second.Open(run, p1), u, w) }", "HcompSigma"},
	{"pairs: the second part is not over the filler", "prims/sigma.go",
		"LaterComp(run, i, t.Second.Open(run, ⟦a⟧), p2", "p1", "HcompSigma"},
	{"pairs: the first part loses its walls", "prims/sigma.go",
		"NewPair(LaterHcomp(run, t.First, p1, ⟦firsts⟧)", "firsts[:0]", "HcompSigma"},
	{"pairs: the second part loses its walls", "prims/sigma.go",
		"Open(run, a), p2, ⟦seconds⟧)", "seconds[:0]", "HcompSigma"},
	{"pairs: the second part's transport forgets its face", "prims/sigma.go",
		"Open(run, a), ⟦phi⟧, p2)", "interval.Bot()", "TranspSigma"},
	{"pairs: the second part's transport is not over the filler", "prims/sigma.go",
		"LaterTransp(run, i, t.Second.Open(run, ⟦a⟧)", "p1", "TranspSigma"},
	{"pairs: the first part's transport forgets its face", "prims/sigma.go",
		"NewPair(LaterTransp(run, i, t.First, ⟦phi⟧, p1)", "interval.Bot()", "TranspSigma"},
	// paths
	{"paths: no wall at 0", "prims/path.go",
		"us = us.Constant(run, ⟦interval.Eq0(j)⟧, t.A0)", "interval.Bot()", "HcompPath"},
	{"paths: no wall at 1", "prims/path.go",
		"us = us.Constant(run, ⟦interval.Eq1(j)⟧, t.A1)", "interval.Bot()", "HcompPath"},
	{"paths: the walls end at the wrong ends", "prims/path.go",
		"us = us.Constant(run, interval.Eq1(j), ⟦t.A1⟧)", "t.A0", "HcompPath"},
	{"paths: the walls are lost", "prims/path.go",
		"us := ⟦walls⟧.Map(run, interval.Single(j)", "walls[:0]", "HcompPath"},
	{"paths: transport has no wall on its face", "prims/path.go",
		".Constant(run, ⟦phi⟧, pj)", "interval.Bot()", "TranspPath$"},
	{"paths: transport has a wrong end", "prims/path.go",
		"us = us.Line(run, interval.Eq1(j), i, ⟦t.A1⟧)", "t.A0", "TranspPath$"},
	{"paths: transport keeps an end where it was", "prims/path.go",
		"us = us.Line(run, interval.Eq0(j), i, ⟦t.A0⟧)", "run.At(t.A0, i, interval.Zero())", "TranspPath$"},
	{"paths: transport has no wall at 0", "prims/path.go",
		"us = us.Line(run, ⟦interval.Eq0(j)⟧, i, t.A0)", "interval.Bot()", "TranspPath$"},
	{"paths: transport by hcomp", "prims/path.go",
		"over(j, ⟦LaterComp(run, i, t.Line.Open(run, value.DimensionName(j)), pj, us)⟧)", "LaterHcomp(run, run.At(t.Line.Open(run, value.DimensionName(j)), i, interval.One()), pj, us)", "TranspPath$"},
	{"paths: a variable path ends where it begins", "prims/path.go",
		"return ⟦t.A1⟧\n", "t.A0", "PathEnds"},
	{"a constant wall is not restricted to its face", "value/wall.go",
		"body := ⟦run.Restrict(v, cube)⟧", "v", "TranspPathConstructor"},
	// the unit type and the universe
	{"the unit type has no η", "prims/unit.go",
		"SameElement(value.Comparer, value.Value, value.Value) bool { return ⟦true⟧ }", "false", "Unit"},
	{"the universe transports to another type", "prims/universe.go",
		"a value.Value) value.Value {\n\treturn ⟦a⟧\n}", "value.Value(UnitType)", "TranspUniverse"},
	// derived operations
	{"a composite on top is its wall at 0", "value/wall.go",
		"return run.At(w.Body, w.I, ⟦interval.One()⟧)", "interval.Zero()", "TopAndBot"},
	{"a transport on top is not the identity", "prims/kan.go",
		"func Transp(run *value.Run, i value.Name, a value.Value, phi interval.Face, v value.Value) value.Value {\n\tif ⟦phi.IsTop()⟧ {", "false", "TranspPath|Frontier|Substituting"},
	{"comp does not transport its base", "prims/kan.go",
		"u0 = ⟦LaterTransp(run, i, a, interval.Bot(), base)⟧", "base", "HcompSigma"},
	{"comp: the walls' transport is the identity at the wrong end", "prims/kan.go",
		"Transp(run, j, at, ⟦interval.Eq1(k)⟧, u)", "interval.Eq0(k)", "HcompSigma|TranspPath$"},
	{"comp: the walls' lines begin at the wrong place", "prims/kan.go",
		"⟦interval.Var(k).Max(interval.Var(j))⟧", "interval.Var(j)", "TranspPath$"},
	{"comp: a wall's own dimension is forgotten", "prims/kan.go",
		"us = ⟦walls.MapLines⟧(", "walls.Map", "TranspPath$"},
	{"comp: the line is not restricted to the wall", "prims/kan.go",
		"line := ⟦run.Substitute(a, cut)⟧", "a", "TranspPath$|Comp$"},
	{"hfill has no wall at 0", "prims/kan.go",
		"out.Constant(run, ⟦r.Is0()⟧, base)", "interval.Bot()", "HcompSigma"},
	{"hfill: the walls are there at once", "prims/kan.go",
		"at := ⟦r.Subst(w.Cube.Restriction()).Min(interval.Var(w.I))⟧", "interval.Var(w.I)", "HcompSigma"},
	{"fill: the line is there at once", "prims/kan.go",
		"line := run.At(a, i, ⟦r.Min(interval.Var(j))⟧)", "interval.Var(j)", "StrictHcompArguments"},
	{"tfill moves also at 0", "prims/kan.go",
		"⟦phi.Or(r.Is0())⟧, v)", "phi", "TranspSigma"},
	{"a composite that waits ends at the wall's start", "prims/kan_later.go",
		"run.Substitute(⟦wall.End(run)⟧, s), true", "run.At(wall.Body, wall.I, interval.Zero())", "TranspPath$|HcompPath|TranspPathConstructor"},
	{"walls of different lines are alike", "value/wall.go",
		"v.I == w.I && ⟦v.Body == w.Body⟧ && free", "true", "TranspPath$|HcompPath|Hcomp"},
	{"walls that come from different lines stay alike", "value/wall.go",
		"⟦u.Body == w.Body⟧ && u.I == w.I && v.I == i", "true", "TranspPath$|HcompPath|Hcomp|Substituting"},
	{"walls that are cut are alike", "value/wall.go",
		"⟦free&(v.Cube.Support()|w.Cube.Support()) == 0⟧", "true", "HcompPi$"},
	{"walls of different lines are read once", "quote/read.go",
		"⟦v.Body == w.Body⟧ && v.I == w.I", "true", "TranspPath$|HcompPath|Hcomp"},
	{"comp as it is written: the walls' face", "prims/kan_words.go",
		"&term.Face{Face: ⟦interval.Eq1(k)⟧}", "interval.Eq0(k)", "Comp$"},
	{"fill as it is written has no wall at 0", "prims/kan_words.go",
		"face := ⟦r.Is0()⟧\n", "interval.Bot()", "Hfill|Fill"},
	{"tfill as it is written moves also at 0", "prims/kan_words.go",
		"⟦phi.Or(r.Is0())⟧", "phi", "Tfill"},
	{"walls need not stand on the base", "prims/kan_words.go",
		"c.Value(base), ⟦u.OpenAll(run, []value.Value{value.Zero()})⟧", "c.Value(base)", "WallsInOrder"},
	{"walls need not agree", "prims/kan_words.go",
		"c.Same(t, a, ⟦b⟧,", "a", "WallsInOrder"},
	{"a line need not be constant on the face", "prims/kan_words.go",
		"c.SameType(a0, ⟦a⟧,", "a0", "WallsInOrder"},
	// data types
	{"strict: a dependent argument by hcomp", "prims/data_kan.go",
		"if ⟦c.Args[n].Dependent⟧ {", "false", "StrictHcomp"},
	{"strict: every argument by comp", "prims/data_kan.go",
		"if ⟦c.Args[n].Dependent⟧ {", "true", "StrictHcomp"},
	{"strict: a later argument is not over the filler", "prims/data_kan.go",
		"fillers[n] = ⟦Hfill(run, i, a, args[n], us)⟧", "args[n]", "StrictHcomp"},
	{"strict numbers: the walls are not looked at", "prims/numeral.go",
		"same = same && ⟦rests[k].Body == nil && counts[k].equal(n)⟧", "true", "StrictHcomp|Frontier"},
	{"strict numbers: the successors of the base alone", "prims/numeral.go",
		"if ⟦m.less(least)⟧ {", "false", "StrictHcomp"},
	{"formal composites are pushed", "prims/data_kan.go",
		"if ⟦t.Data.Formal⟧ {", "t.Data.Formal && len(walls) > 9", "FormalHcomp"},
	{"elimination of formal composites not over the filler", "prims/data_elim.go",
		"Comp(run, i, e.family.Open(run, ⟦h⟧)", "v.Base", "FormalElim"},
	{"elimination of formal composites by hcomp", "prims/data_elim.go",
		"⟦Comp⟧(run, i, e.family.Open(run, h)",
		"func(run *value.Run, i value.Name, a, u value.Value, w value.System) value.Value { return Hcomp(run, run.At(a, i, interval.One()), u, w) }", "FormalElim"},
	{"elimination of formal composites loses walls", "prims/data_elim.go",
		"e.Later(run, v.Base), ⟦walls⟧)", "walls[:0]", "FormalElim"},
	{"both treatments are taken", "prims/data_declare.go",
		"if ⟦w.Compositions > 1⟧ {", "false", "Clash"},
	{"strict with path constructors is taken", "prims/data_declare.go",
		"case \"strict\":\n\t\tif ⟦paths⟧ {", "false", "Clash"},
	{"transport of constructors is the identity", "prims/data_kan.go",
		"if ⟦len(t.Params) == 0⟧ {", "len(t.Params) < 3", "TranspData"},
	{"transport of constructors forgets its face", "prims/data_kan.go",
		"at1[n] = LaterTransp(run, i, a, ⟦phi⟧, arg)", "interval.Bot()", "TranspData"},
	{"transport of constructors is not over the fillers", "prims/data_kan.go",
		"fillers[n] = ⟦Tfill(run, i, a, phi, arg)⟧", "arg", "TranspData"},
	{"transport of formal composites loses walls", "prims/data_kan.go",
		"LaterTransp(run, i, t, phi, v.Base), ⟦walls⟧)", "walls[:0]", "TranspData"},
	{"a path constructor is not corrected", "prims/data_kan.go",
		"len(v.Dims) > 0 && ⟦!v.Of.Commutes⟧", "false", "TranspPathConstructor"},
	{"every path constructor is corrected", "prims/data_kan.go",
		"len(v.Dims) > 0 && ⟦!v.Of.Commutes⟧", "true", "TranspPathConstructor"},
	{"the correction has no wall on the face", "prims/data_kan.go",
		".Constant(run, ⟦phi⟧, v)", "interval.Bot()", "TranspPathConstructor"},
	{"the correction's wall begins at the wrong end", "prims/data_kan.go",
		"Or(⟦interval.Eq0(j)⟧), e)", "interval.Eq1(j)", "TranspPathConstructor"},
	{"a constructor does not become its boundary", "prims/data.go",
		"if ⟦b.Cube.Subst(s).IsTop()⟧ {", "false", "FormalElim|TranspPathConstructor|FormalHcomp"},
	{"numerals are counted at once without the count", "prims/numeral_elim.go",
		"d, ⟦r.count.times(run, n)⟧, ", "r.count", "Number"},
	// normal forms
	{"implied walls are kept", "value/wall.go",
		"if ⟦i != j && w.Cube.Implies(v.Cube)⟧", "false", "WallsInOrder"},
	{"walls stand as they come", "value/wall.go",
		"for ⟦at > 0 && w.Cube.Compare(out[at-1].Cube) < 0⟧ {", "false", "WallsInOrder|OrderIsByBinding"},
	{"only ends unstick", "value/interval/subst.go",
		"if ⟦faces == 0⟧ {\n\t\treturn true", "true", "Frontier"},
	{"a stuck composite does not wait for what is in its walls", "prims/data_kan.go",
		"all |= ⟦w.Body.Support().Without(w.I)⟧", "value.Support(0)", "Frontier"},
	{"a stuck composite waits for its faces alone when dimensions meet", "prims/data_kan.go",
		"stuckHcomp(t, base, walls, all, ⟦all⟧)", "walls.FaceSupport()", "Frontier"},
	{"walls are read at the type of the composite", "quote/read.go",
		"here := ⟦q.run.Restrict(t, w.Cube)⟧", "t", "WallsAtTheirType"},
	{"walls are compared at the type of the composite", "quote/compare.go",
		"here := ⟦c.run.Restrict(t, w.Cube)⟧", "t", "WallsAtTheirType"},
}

// edit is what replaces a part of a file.
type edit struct {
	from, to int
	text     string
}

// place finds the expression of the source that m replaces.
func (m mutation) place(t *testing.T, source string) (from, to int) {
	before, rest, ok1 := strings.Cut(m.text, "⟦")
	right, after, ok2 := strings.Cut(rest, "⟧")
	require.True(t, ok1 && ok2, m.name)
	require.Equal(t, 1, strings.Count(source, before+right+after), "%s: in %s this must stand once: %s", m.name, m.file, m.text)
	from = strings.Index(source, before+right+after) + len(before)
	return from, from + len(right)
}

// switches is the Go file that says which mutation is in force.
const switches = `package %s

import (
	"os"
	"strconv"
)

// Mutant is the number of the mutation in force.
var Mutant, _ = strconv.Atoi(os.Getenv("MUTANT"))

// Mutated is wrong where mutation n is in force, otherwise right.
func Mutated[T any](n int, wrong, right T) T {
	if Mutant == n {
		return wrong
	}
	return right
}
`

// mutate writes changed copies of the files under dir and returns the overlay
// that puts them over those of the module in root.
func mutate(t *testing.T, root, dir string) string {
	replace := map[string]string{}
	write := func(path, text string) {
		changed := filepath.Join(dir, fmt.Sprintf("%d.go", len(replace)))
		require.NoError(t, os.WriteFile(changed, []byte(text), 0o600))
		replace[filepath.Join(root, path)] = changed
	}
	byFile := map[string]map[[2]int]string{}
	sources := map[string]string{}
	for k, m := range mutations {
		if byFile[m.file] == nil {
			text, err := os.ReadFile(filepath.Join(root, m.file))
			require.NoError(t, err)
			sources[m.file], byFile[m.file] = string(text), map[[2]int]string{}
		}
		from, to := m.place(t, sources[m.file])
		right, ok := byFile[m.file][[2]int{from, to}]
		if !ok {
			right = sources[m.file][from:to]
		}
		in := "value."
		if strings.HasPrefix(m.file, "value/") {
			in = ""
		}
		text := fmt.Sprintf("%sMutated(%d, %s, %s)", in, k+1, m.wrong, right)
		byFile[m.file][[2]int{from, to}] = text
	}
	for file, changes := range byFile {
		var edits []edit
		for at, text := range changes {
			edits = append(edits, edit{at[0], at[1], text})
		}
		sort.Slice(edits, func(a, b int) bool { return edits[a].from > edits[b].from })
		source, last := sources[file], len(sources[file])
		for _, e := range edits {
			require.LessOrEqual(t, e.to, last, "two mutations of %s overlap: %s", file, e.text)
			source, last = source[:e.from]+e.text+source[e.to:], e.from
		}
		write(file, source)
	}
	write("value/mutant.go", fmt.Sprintf(switches, "value"))
	write("value/interval/mutant.go", fmt.Sprintf(switches, "interval"))
	overlay, err := json.Marshal(map[string]any{"Replace": replace})
	require.NoError(t, err)
	file := filepath.Join(dir, "overlay.json")
	require.NoError(t, os.WriteFile(file, overlay, 0o600))
	return file
}

// TestMutations is left out with -short: it builds the tests anew.
func TestMutations(t *testing.T) {
	if testing.Short() {
		t.Skip("building and running the wrong versions takes a minute")
	}
	goTool, err := exec.LookPath("go")
	if err != nil {
		t.Skip("there is no go command")
	}
	root, err := filepath.Abs("..")
	require.NoError(t, err)
	dir := t.TempDir()
	binary := filepath.Join(dir, "rules.test")
	c := exec.Command(goTool, "test", "-c", "-vet=off", "-overlay", mutate(t, root, dir), "-o", binary, "./nbe")
	c.Dir = root
	text, err := c.CombinedOutput()
	require.NoError(t, err, "the wrong versions do not build: %s", text)
	run := func(n int, tests string) (string, error) {
		c := exec.Command(binary, "-test.run", "^Test.*("+tests+")", "-test.skip", "^TestMutations$", "-test.short", "-rapid.nofailfile", "-test.timeout", "120s")
		c.Dir = filepath.Join(root, "nbe")
		c.Env = append(os.Environ(), fmt.Sprintf("MUTANT=%d", n))
		text, err := c.CombinedOutput()
		require.NotContains(t, string(text), "no tests to run", "%s", tests)
		return string(text), err
	}
	right, err := run(0, "Rule|Clash|Memory|Number")
	require.NoError(t, err, "with no mutation in force: %s", right)
	for k, m := range mutations {
		t.Run(m.name, func(t *testing.T) {
			t.Parallel()
			_, err := run(k+1, m.tests)
			require.Error(t, err, "no test of %s noticed", m.tests)
		})
	}
}
