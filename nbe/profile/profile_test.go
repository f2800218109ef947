package profile_test

import (
	"bytes"
	"context"
	"errors"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"sync"
	"testing"
	"time"

	pprof "github.com/google/pprof/profile"
	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/profile"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
)

// The programs stand on a quay: drums of cable, crates, berths.
const quay = `
(def add (-> Nat Nat Nat)
  (lam (m n) (elim (x Nat) m (zero n) ((suc k h) (suc h)))))
(def multiply (-> Nat Nat Nat)
  (lam (m n) (elim (x Nat) m (zero 0) ((suc k h) (add n h)))))
(def stacked (-> Nat Nat Nat)
  (lam (b m) (elim (x Nat) m (zero 1) ((suc k h) (multiply b h)))))
(def twice (Pi ((A (U 0))) (-> (-> A A) A A)) (lam (A f x) (f (f x))))
(def crate (-> Nat Nat) (lam (x) (suc x)))
(data Stack () (point floor ()) (point on ((left Stack) (right Stack))))
(def pile (-> Nat Stack)
  (lam (n) (elim (x Stack) n (zero floor) ((suc k h) (on h h)))))
(def crates (-> Stack Nat)
  (lam (s) (elim (x Nat) s (floor 0) ((on l r hl hr) (suc (add hl hr))))))
(assume Berth (-> I (U 0)))
(assume at-berth (Berth 0))
`

// engine has the quay's definitions. Numbers are taken apart by one, so that
// eliminations can be counted.
func engine(tb testing.TB) *nbe.Engine {
	e, err := nbe.New(nbe.WithPlain(value.Plain{NoNumerals: true}))
	require.NoError(tb, err)
	load(tb, e, quay)
	return e
}

func load(tb testing.TB, e *nbe.Engine, src string) {
	s := script.Session{Engine: e, Report: func(r script.Result) { require.NoError(tb, r.Err) }}
	require.NoError(tb, s.Source(context.Background(), []byte(src), "quay.sexp"))
}

func written(tb testing.TB, e *nbe.Engine, text string) *term.Written {
	w, err := notation.ReadTerm(text, "here.sexp", e.Words())
	require.NoError(tb, err)
	return w
}

// normal normalises text and returns the counters of that call.
func normal(tb testing.TB, e *nbe.Engine, text string, options ...nbe.CallOption) (string, nbe.Stats, error) {
	ctx := context.Background()
	t, err := e.Scope().Infer(ctx, written(tb, e, text))
	require.NoError(tb, err)
	return normalTerm(tb, t, ctx, options...)
}

func normalTerm(tb testing.TB, t *nbe.Term, ctx context.Context, options ...nbe.CallOption) (string, nbe.Stats, error) {
	var stats nbe.Stats
	forms, err := t.Scope().Normal(ctx, t, append(options, nbe.Count(&stats))...)
	if err != nil {
		return "", stats, err
	}
	return forms[0].String(), stats, nil
}

// steps are the steps at the end of paths that end in the given frames.
func steps(p *profile.Profile, ends ...string) (n int64) {
	for _, s := range p.Samples() {
		var names []string
		for _, f := range s.Path {
			names = append(names, f.Name)
		}
		if strings.HasSuffix("/"+strings.Join(names, "/"), "/"+strings.Join(ends, "/")) {
			n += s.Counts.Steps
		}
	}
	return n
}

func power(b, n int64) int64 {
	out := int64(1)
	for range n {
		out *= b
	}
	return out
}

// Each of these costs what can be counted with a pencil, and the profile has
// those counts at those frames.
func TestCostsKnownByArithmetic(t *testing.T) {
	type want struct {
		path []string
		n    int64
	}
	type program struct {
		name, text, result string
		want               []want
	}
	var programs []program

	// stacked b m calls multiply m times, which calls add b times each; every
	// function has two arguments, hence two β-steps a call. An elimination takes
	// one step for each successor and one for zero. multiply eliminates b; add
	// eliminates what has been stacked so far, b to the k.
	b, m := int64(3), int64(4)
	added := int64(0)
	for k := range m {
		added += b * (power(b, k) + 1)
	}
	programs = append(programs, program{"stacked", fmt.Sprintf("(stacked %d %d)", b, m), fmt.Sprint(power(b, m)), []want{
		{[]string{"stacked"}, 2 + 1}, // its β-steps, and its unfolding if it was folded
		{[]string{"multiply"}, 2 * m},
		{[]string{"add"}, 2 * b * m},
		{[]string{"stacked", "elim Nat"}, m + 1},
		{[]string{"multiply", "elim Nat"}, m * (b + 1)},
		{[]string{"add", "elim Nat"}, added},
	}})

	// twice of twice of … crate: 2^n calls of crate, and each twice is unfolded
	// once, gets its type and its function once, and is then called once, twice,
	// four times.
	n := int64(6)
	text := "crate"
	for range n {
		text = "(twice Nat " + text + ")"
	}
	programs = append(programs, program{"twice", "(" + text[1:len(text)-1] + " 0)", fmt.Sprint(power(2, n)), []want{
		{[]string{"crate"}, power(2, n) + 1}, // and its unfolding: it is handed on folded
		{[]string{"twice"}, power(2, n) - 1 + 3*n},
	}})

	// a pile of height n has 2^n - 1 crates and 2^n places on the floor; it is
	// made in n + 1 steps, since its halves are shared, and counted in one step a
	// node, since what is counted at each is not.
	n = 5
	programs = append(programs, program{"crates", fmt.Sprintf("(crates (pile %d))", n), fmt.Sprint(power(2, n) - 1), []want{
		{[]string{"pile", "elim Nat"}, n + 1},
		{[]string{"crates", "elim Stack"}, power(2, n+1) - 1},
		{[]string{"add"}, 2 * (power(2, n) - 1)},
	}})

	// a transport at n nested pairs, none dependent, is n transports at pairs
	// and n + 1 at what is paired.
	k := 7
	types, parts := strings.Repeat(" (Berth i)", k+1), strings.Repeat(" at-berth", k+1)
	programs = append(programs, program{"transport", fmt.Sprintf("(transp (i (*%s)) bot (ann (pair%s) (*%s)))", types, parts, strings.ReplaceAll(types, " i)", " 0)")), "", []want{
		{[]string{"transp at pairs"}, int64(k)},
		{[]string{"transp at neutral types"}, int64(k) + 1},
	}})

	// a composite at n nested pairs is n at pairs and n + 1 at what is paired;
	// each wall is projected, once for each part.
	types = strings.Repeat(" (Berth 0)", k+1)
	programs = append(programs, program{"composite", fmt.Sprintf("(ann (lam (r) (hcomp (*%[1]s) (pair%[2]s) ((= r 0) (j) (pair%[2]s)))) (-> I (*%[1]s)))", types, parts), "", []want{
		{[]string{"hcomp at pairs"}, int64(k)},
		{[]string{"hcomp at neutral types"}, int64(k) + 1},
	}})

	for _, c := range programs {
		t.Run(c.name, func(t *testing.T) {
			e := engine(t)
			var p profile.Profile
			got, stats, err := normal(t, e, c.text, nbe.Profile(&p))
			require.NoError(t, err)
			if c.result != "" {
				require.Equal(t, c.result, got)
			}
			for _, w := range c.want {
				require.Equal(t, w.n, steps(&p, w.path...), "%s", strings.Join(w.path, "/"))
			}
			addsUp(t, &p, stats)
		})
	}
}

// Paths add up also where they are folded, over recursion deeper than MaxPath
// and over loops of tail calls, and hold what the counters say of each rule.
func TestRecursionAndTailCalls(t *testing.T) {
	e := drumEngine(t)
	load(t, e, `
(data Quay () (point end ()) (point left ((q Quay))) (point right ((q Quay))))
(def along (-> Nat Quay) (lam (n) (elim (x Quay) n (zero end) ((suc k h) (left (right h))))))
(def step (-> (-> Quay Nat Nat) Quay Nat Nat) (lam (go q n) (go q (suc n))))
(def walk (-> Quay Nat Nat)
  (lam (q) (elim (x (-> Nat Nat)) q (end (lam (n) n)) ((left r h) (lam (n) (step (lam (s) h) r n))) ((right r h) (lam (n) (h n))))))
`)
	for _, text := range []string{"(walk (along 300) 0)", "(ack 2 60)", "(turns (drum 20))", "(square (square two) Nat (lam (x) (suc x)) 0)"} {
		var p, q profile.Profile
		_, stats, err := normal(t, e, text, nbe.Profile(&p))
		require.NoError(t, err)
		addsUp(t, &p, stats)
		if strings.HasPrefix(text, "(walk") {
			require.EqualValues(t, 3*300, steps(&p, "step")) // a call has three arguments
			require.EqualValues(t, 600+1, steps(&p, "walk", "elim Quay"))
		}
		_, stats, err = normal(t, e, text, nbe.Profile(&q), nbe.Within(nbe.Limits{Steps: stats.Steps / 2}))
		require.Equal(t, term.OutOfBudget, term.KindOf(err))
		addsUp(t, &q, stats)
	}
}

// addsUp requires that the paths add up to the counters of the calls.
func addsUp(t *testing.T, p *profile.Profile, stats nbe.Stats) {
	t.Helper()
	for _, s := range p.Samples() {
		require.True(t, s.Counts.Steps >= 0 && s.Counts.Memory >= 0 && s.Counts.Entered >= 0, "%v", s)
	}
	total := p.Total()
	require.Equal(t, stats.Steps, total.Steps, "steps")
	require.Equal(t, stats.Pushed, total.Pushed, "substitutions")
	require.Equal(t, stats.Forced, total.Forced, "forced")
	require.Equal(t, stats.Memory, total.Memory, "memory")
	byRule := int64(0)
	for _, n := range stats.ByRule {
		byRule += n
	}
	require.Equal(t, stats.Steps, byRule, "steps by rule")
	composites, transports := int64(0), int64(0)
	for _, f := range stats.ByFormer {
		composites += f.Composites
		transports += f.Transports
	}
	require.Equal(t, stats.Composites, composites, "composites by former")
	require.Equal(t, stats.Transports, transports, "transports by former")
}

// A profile is read by the library of those who made the format, is valid, and
// adds up to the counters of its calls.
func TestTheFormatIsPprofs(t *testing.T) {
	e := engine(t)
	var p profile.Profile
	var stats nbe.Stats
	for _, text := range []string{"(stacked 3 3)", "(crates (pile 4))"} {
		_, s, err := normal(t, e, text, nbe.Profile(&p))
		require.NoError(t, err)
		stats.Add(s)
	}
	addsUp(t, &p, stats)
	require.Equal(t, 2, p.Calls())
	var file bytes.Buffer
	require.NoError(t, p.Write(&file))
	decoded, err := pprof.Parse(&file)
	require.NoError(t, err)
	require.NoError(t, decoded.CheckValid())
	want := map[string]int64{"steps": stats.Steps, "substitutions": stats.Pushed, "forced": stats.Forced, "memory": stats.Memory}
	for k, st := range decoded.SampleType {
		sum := int64(0)
		for _, s := range decoded.Sample {
			sum += s.Value[k]
		}
		if n, ok := want[st.Type]; ok {
			require.Equal(t, n, sum, "%s", st.Type)
			delete(want, st.Type)
		}
	}
	require.Empty(t, want)
	found := false
	for _, f := range decoded.Function {
		if f.Name == "stacked" {
			found = true
			require.Equal(t, "quay.sexp", f.Filename)
			require.EqualValues(t, 6, f.StartLine)
		}
	}
	require.True(t, found)
	require.Equal(t, "steps", decoded.DefaultSampleType)
}

// The tool that Go programmers use makes sense of it.
func TestGoToolPprof(t *testing.T) {
	if testing.Short() {
		t.Skip("runs go tool pprof")
	}
	dir := t.TempDir()
	src := filepath.Join(dir, "quay.sexp")
	require.NoError(t, os.WriteFile(src, []byte(quay), 0o600))
	e, err := nbe.New()
	require.NoError(t, err)
	var p profile.Profile
	s := script.Session{Engine: e, Options: []nbe.CallOption{nbe.Profile(&p)}}
	require.NoError(t, s.File(context.Background(), src))
	_, _, err = normal(t, e, "(crates (pile 6))", nbe.Profile(&p))
	require.NoError(t, err)
	file := filepath.Join(dir, "work.pb.gz")
	f, err := os.Create(file)
	require.NoError(t, err)
	require.NoError(t, p.Write(f))
	require.NoError(t, f.Close())
	run := func(args ...string) string {
		c := exec.Command("go", append(append([]string{"tool", "pprof"}, args...), file)...)
		c.Env = append(os.Environ(), "PPROF_TMPDIR="+dir)
		out, err := c.CombinedOutput()
		require.NoError(t, err, "%s", out)
		return string(out)
	}
	top := run("-top")
	require.Contains(t, top, "Type: steps")
	require.Contains(t, top, "elim Stack")
	require.Contains(t, run("-peek", "^crates$"), "elim Stack")
	require.Contains(t, run("-list", "^crates$"), "(def crates (-> Stack Nat)")
	require.Contains(t, run("-sample_index=memory", "-top"), "Type: memory")
}

// A call that is stopped has a profile that is complete up to the stop.
func TestStoppedCalls(t *testing.T) {
	e := engine(t)
	var p profile.Profile
	_, stats, err := normal(t, e, "(stacked 9 9)", nbe.Profile(&p), nbe.Within(nbe.Limits{Steps: 5000}))
	require.Equal(t, term.OutOfBudget, term.KindOf(err))
	require.EqualValues(t, 5000, stats.Steps)
	addsUp(t, &p, stats)
	require.NotZero(t, steps(&p, "multiply", "elim Nat"))

	var r profile.Profile
	_, stats, err = normal(t, e, "(stacked 9 9)", nbe.Profile(&r), nbe.Within(nbe.Limits{Memory: 1 << 20}))
	require.Equal(t, term.OutOfBudget, term.KindOf(err))
	addsUp(t, &r, stats)

	var q profile.Profile
	ctx, cancel := context.WithCancel(context.Background())
	defer cancel()
	follow := &nbe.Follow{Limit: 2000, Event: func(ev *nbe.Event) {
		if ev.Number == 1000 {
			cancel()
		}
	}}
	x, err := e.Scope().Infer(context.Background(), written(t, e, "(stacked 9 9)"))
	require.NoError(t, err)
	_, stats, err = normalTerm(t, x, ctx, nbe.Profile(&q), nbe.Following(follow))
	require.Equal(t, term.Cancelled, term.KindOf(err))
	require.Greater(t, stats.Steps, int64(1000))
	addsUp(t, &q, stats)
}

// Two calls at once have two profiles, and one profile may be given to many.
func TestCallsAtOnce(t *testing.T) {
	e := engine(t)
	var alone, other profile.Profile
	_, _, err := normal(t, e, "(stacked 3 3)", nbe.Profile(&alone))
	require.NoError(t, err)
	_, _, err = normal(t, e, "(crates (pile 4))", nbe.Profile(&other))
	require.NoError(t, err)
	var shared profile.Profile
	var wg sync.WaitGroup
	for k := range 8 {
		wg.Add(1)
		go func() {
			defer wg.Done()
			text, want, stranger := "(stacked 3 3)", &alone, "crates"
			if k%2 == 1 {
				text, want, stranger = "(crates (pile 4))", &other, "stacked"
			}
			for range 5 {
				var p profile.Profile
				_, stats, err := normal(t, e, text, nbe.Profile(&p))
				if err != nil {
					t.Error(err)
					return
				}
				got, old := p.Total(), want.Total()
				if got.Steps != stats.Steps || got.Steps > old.Steps || steps(&p, stranger) != 0 {
					t.Errorf("%s: %d steps in the profile, %d in the counters, %d alone", text, got.Steps, stats.Steps, old.Steps)
				}
				shared.Merge(&p)
				if _, _, err = normal(t, e, text, nbe.Profile(&shared)); err != nil {
					t.Error(err)
				}
			}
		}()
	}
	wg.Wait()
	require.Equal(t, 80, shared.Calls())
	require.Equal(t, shared.Stats().Steps, shared.Total().Steps)
}

// A profile that is merged into itself stays as it is, and a writer's error is
// the caller's.
func TestProfilesAtTheirEdges(t *testing.T) {
	var p profile.Profile
	p.Add(&value.Trace{}, value.Stats{}, time.Time{})
	before := p.Calls()
	p.Merge(&p)
	require.Equal(t, before, p.Calls())
	require.ErrorIs(t, p.Write(full{}), errFull)
}

// Work on values stands under evaluation, the operation of a call that names no other.
func TestWorkOnValuesIsEvaluation(t *testing.T) {
	e := engine(t)
	ctx := context.Background()
	x, err := e.Scope().Infer(ctx, written(t, e, "(multiply 6 7)"))
	require.NoError(t, err)
	var p profile.Profile
	_, err = x.Value().View(ctx, nbe.Profile(&p))
	require.NoError(t, err)
	steps := int64(0)
	for _, s := range p.Samples() {
		if len(s.Path) > 0 {
			require.Equal(t, value.EvaluationSite.Name, s.Path[0].Name)
			steps += s.Counts.Steps
		}
	}
	require.Positive(t, steps)

	// what was counted outside of it has a place in Go's format too
	var out bytes.Buffer
	require.NoError(t, p.Write(&out))
	parsed, err := pprof.Parse(&out)
	require.NoError(t, err)
	for _, s := range parsed.Sample {
		require.NotEmpty(t, s.Location)
	}
}

var errFull = errors.New("the shelf is full")

// full is a writer that takes nothing.
type full struct{}

func (full) Write([]byte) (int, error) { return 0, errFull }
