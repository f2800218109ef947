package promises

// Hostile input. Any text, and any sequence of calls, is answered or refused
// with an error of a kind that fits; no internal fault, no wrong scope accepted.

import (
	"bytes"
	"context"
	"fmt"
	"io/fs"
	"math/rand/v2"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
)

// FuzzScript handles any text as a script: nothing but errors comes of it.
func FuzzScript(f *testing.F) {
	f.Add([]byte(given))
	for _, line := range strings.Split(strings.TrimSpace(given+closedGiven), "\n") {
		f.Add([]byte(line))
	}
	for _, p := range paradoxes {
		f.Add([]byte(p.text))
	}
	for _, h := range hostileTexts() {
		if len(h.text) < 10_000 {
			f.Add([]byte(h.text))
		}
	}
	e := closedEngine(f)
	f.Fuzz(func(t *testing.T, src []byte) {
		s := &script.Session{Engine: e.Fork(), ReadFile: func(string) ([]byte, error) { return nil, fs.ErrNotExist }, Report: func(r script.Result) {
			require.NotEqual(t, term.Internal, term.KindOf(r.Err), "%s: %v", r.Form, r.Err)
		}}
		err := s.Source(context.Background(), src, "fuzz")
		require.NotEqual(t, term.Internal, term.KindOf(err), "%v", err)
	})
}

// FuzzPipeline checks, normalises, prints, reads, checks again and compares.
func FuzzPipeline(f *testing.F) {
	for _, s := range alarmSeeds {
		f.Add(s.ty, s.text)
	}
	for _, s := range work {
		f.Add(s.ty, s.text)
	}
	for _, n := range nests() {
		ty, text := n.make(2)
		f.Add(ty, text)
	}
	e, err := nbe.New(nbe.WithLimits(nbe.Limits{Steps: 20_000, Memory: 64 << 20, Depth: 20_000, Text: 10_000}))
	require.NoError(f, err)
	define(f, e, given)
	f.Fuzz(func(t *testing.T, ty, text string) { pipeline(t, e, ty, text) })
}

// pipeline tells whether the text was accepted and went round.
func pipeline(t testing.TB, e *nbe.Engine, ty, text string) bool {
	ctx := context.Background()
	s := e.Scope()
	wt, err := notation.ReadTerm(ty, "", nil)
	if err != nil {
		return false
	}
	w, err := notation.ReadTerm(text, "", nil)
	if err != nil {
		return false
	}
	x, err := s.Check(ctx, w, wt)
	require.NotEqual(t, term.Internal, term.KindOf(err), "%s at %s: %v", text, ty, err)
	if err != nil {
		return false
	}
	fine := func(err error, where string) bool {
		if err != nil {
			require.Equal(t, term.OutOfBudget, term.KindOf(err), "%s at %s: %s: %v", text, ty, where, err)
		}
		return err == nil
	}
	forms, err := s.Normal(ctx, x)
	if !fine(err, "normalising") {
		return false
	}
	n, err := forms[0].Written()
	if !fine(err, "writing") {
		return false
	}
	printed := notation.Format(n, 60)
	back, err := notation.ReadTerm(printed, "", nil)
	require.NoError(t, err, "%s at %s prints as %s", text, ty, printed)
	require.True(t, back.Same(n), "%s at %s prints as %s", text, ty, printed)
	y, err := s.CheckLike(ctx, back, x)
	if !fine(err, "the normal form "+printed) {
		return false
	}
	c, err := s.Compare(ctx, x, y)
	if !fine(err, "comparing") {
		return false
	}
	require.Equal(t, nbe.Equal, c.Verdict, "%s at %s and its normal form %s: %s", text, ty, printed, c.Difference)
	again, err := s.Normal(ctx, y)
	if fine(err, "normalising again") {
		require.True(t, term.Same(forms[0].Term, again[0].Term), "%s at %s: normalising twice: %s", text, ty, printed)
	}
	return true
}

func TestPipelineOfGrafts(t *testing.T) {
	e := closedEngine(t)
	rnd := rand.New(rand.NewPCG(7, 11))
	tries, round := 800, 0
	if long {
		tries = 100_000
	}
	for range tries {
		ty, w := graft(t, rnd)
		if pipeline(t, e, ty.String(), w.String()) {
			round++
		}
	}
	t.Logf("%d terms, %d went round", tries, round)
	require.Greater(t, round, tries/20)
}

// hostile is a text of an adversary.
type hostile struct {
	name string
	text string
	kind term.ErrorKind // of the error of reading or handling; 0: none
}

func hostileTexts() []hostile {
	return []hostile{
		{"no UTF-8", "(show \xff\xfe)", term.Malformed},
		{"half a character", "(show (lam (x) \xe2\x82))", term.Malformed},
		{"an overlong encoding", "(show \xc0\x80)", term.Malformed},
		{"a null byte", "(show (lam (\x00) x))", term.IllTyped},
		{"names of other scripts", "(def λόγος Nat 0) (same Nat λόγος 0)", 0},
		{"a long line", "(show " + rep(1<<18, "(suc ", "x", ")") + ")", term.OutOfBudget},
		{"a long comment", ";" + strings.Repeat("x", 10<<20), 0},
		{"a long line of spaces", "(show" + strings.Repeat(" ", 10<<20) + "0)", 0},
		{"a long line of names", "(show (f" + strings.Repeat(" a", 1<<20) + "))", term.NotFound},
		{"a long path", "(load \"" + strings.Repeat("a", 10<<20) + "\")", term.Unreadable},
		{"a long name in a term", "(show " + strings.Repeat("n", 1<<20) + ")", term.NotFound},
		{"a long name of a binder", "(show (ann (lam (" + strings.Repeat("n", 1<<20) + ") 0) (-> Nat Nat)))", 0},
		{"a long name", "(def " + strings.Repeat("n", 1<<20) + " Nat 0)", 0},
		{"a long numeral", "(show " + strings.Repeat("9", 1<<20) + ")", term.OutOfBudget},
		{"a long universe", "(show (U " + strings.Repeat("9", 1000) + "))", term.Malformed},
		{"the same name twice", "(def n Nat 0) (def n Nat 1)", term.Duplicate},
		{"a name that is declared twice in one", "(data D () (point c ()) (point c ()))", term.Duplicate},
		{"unbalanced to the left", strings.Repeat("(", 1<<20), term.Malformed},
		{"unbalanced to the right", strings.Repeat(")", 1<<20), term.Malformed},
		{"a quotation without end", "(load \"" + strings.Repeat("a", 1<<16), term.Malformed},
		{"a missing file", `(load "no such file")`, term.Unreadable},
		{"a directory", `(load ".")`, term.Unreadable},
		{"a path with a null byte", "(load \"a\x00b\")", term.Unreadable},
	}
}

func TestHostileTexts(t *testing.T) {
	for _, h := range hostileTexts() {
		t.Run(h.name, func(t *testing.T) {
			var kinds []term.ErrorKind
			e, err := nbe.New()
			require.NoError(t, err)
			s := &script.Session{Engine: e, Report: func(r script.Result) {
				if r.Err != nil {
					kinds = append(kinds, term.KindOf(r.Err))
					require.Less(t, len(r.Err.Error()), 1<<20, "the error repeats the text")
				}
			}}
			if err := s.Source(context.Background(), []byte(h.text), "hostile"); err != nil {
				kinds = append(kinds, term.KindOf(err))
				require.Less(t, len(err.Error()), 1<<20)
			}
			if h.kind == 0 {
				require.Empty(t, kinds)
			} else {
				require.NotEmpty(t, kinds)
				require.NotContains(t, kinds, term.Internal)
				require.Contains(t, kinds, h.kind)
			}
		})
	}
	// files that load each other are loaded once each
	e, err := nbe.New()
	require.NoError(t, err)
	files := map[string]string{"a": `(load "b") (def one Nat 1)`, "b": `(load "a") (load "b") (def two Nat 2)`}
	s := &script.Session{Engine: e, ReadFile: func(name string) ([]byte, error) { return []byte(files[name[strings.LastIndex(name, "/")+1:]]), nil }, Report: func(r script.Result) { require.NoError(t, r.Err) }}
	require.NoError(t, s.File(context.Background(), "a"))
	require.NoError(t, s.Source(context.Background(), []byte("(same Nat (suc one) two)"), "c"))
}

// FuzzCalls makes the calls that the bytes say, and holds them against a model:
// what each engine has, and what each scope may be asked.
func FuzzCalls(f *testing.F) {
	f.Add([]byte("\x00\x01\x02\x03\x04\x05\x06\x07\x08"))
	rnd := rand.New(rand.NewPCG(1, 1))
	for range 8 {
		b := make([]byte, 60)
		for k := range b {
			b[k] = byte(rnd.IntN(256))
		}
		f.Add(b)
	}
	base := closedEngine(f)
	f.Fuzz(func(t *testing.T, script []byte) { calls(t, base, script) })
}

func TestCalls(t *testing.T) {
	base := closedEngine(t)
	rnd := rand.New(rand.NewPCG(3, 3))
	for range 150 {
		b := make([]byte, 120)
		for k := range b {
			b[k] = byte(rnd.IntN(256))
		}
		calls(t, base, b)
	}
}

// modelled is an engine with what it ought to hold: numbers by name, -1 for an assumption.
type modelled struct {
	e    *nbe.Engine
	has  map[string]int
	took []*nbe.Term
}

func calls(t testing.TB, base *nbe.Engine, script []byte) {
	ctx := context.Background()
	in := bytes.NewReader(script)
	next := func(n int) int {
		b, err := in.ReadByte()
		if err != nil {
			return 0
		}
		return int(b) % n
	}
	all := []*modelled{{e: base.Fork(), has: map[string]int{}}}
	for in.Len() > 0 {
		m := all[next(len(all))]
		name := fmt.Sprintf("name%d", next(6))
		number := next(5)
		_, taken := m.has[name]
		switch next(8) {
		case 0: // define a number
			err := m.e.Define(ctx, name, term.Name("Nat"), term.Numeral(uint64(number)))
			if taken && m.has[name] >= 0 {
				require.Equal(t, term.Duplicate, term.KindOf(err), "%v", err)
			} else {
				require.NoError(t, err)
				m.has[name] = number
			}
		case 1: // assume
			err := m.e.Assume(ctx, name, term.Name("Nat"))
			if taken {
				require.Equal(t, term.Duplicate, term.KindOf(err), "%v", err)
			} else {
				require.NoError(t, err)
				m.has[name] = -1
			}
		case 2: // use
			s := m.e.Scope()
			x, err := s.Infer(ctx, term.Apply(term.Name("suc"), term.Name(name)))
			if !taken {
				require.Equal(t, term.NotFound, term.KindOf(err), "%v", err)
				continue
			}
			require.NoError(t, err)
			forms, err := s.Normal(ctx, x)
			require.NoError(t, err)
			want := fmt.Sprint(m.has[name] + 1)
			if m.has[name] < 0 {
				want = "(suc " + name + ")"
			}
			require.Equal(t, want, forms[0].String())
			m.took = append(m.took, x)
		case 3: // a term that was checked before still reads as what it was, or as what has been filled in since
			if len(m.took) > 0 {
				x := m.took[next(len(m.took))]
				_, err := x.Scope().Normal(ctx, x)
				require.NoError(t, err)
				_, err = m.e.Scope().Normal(ctx, x)
				require.Equal(t, term.WrongScope, term.KindOf(err), "%v", err)
			}
		case 4: // fork
			if len(all) < 6 {
				has := map[string]int{}
				for k, v := range m.has {
					has[k] = v
				}
				all = append(all, &modelled{e: m.e.Fork(), has: has})
			}
		case 5: // what is wrong changes nothing
			err := m.e.Define(ctx, name, term.Name("Nat"), term.Name("true"))
			require.Error(t, err)
		case 6: // compare
			other := fmt.Sprintf("name%d", next(6))
			if _, ok := m.has[other]; !ok || !taken {
				continue
			}
			c, err := m.e.Scope().CompareAt(ctx, term.Name("Nat"), term.Name(name), term.Name(other))
			require.NoError(t, err)
			equal := name == other || m.has[name] >= 0 && m.has[name] == m.has[other]
			require.Equal(t, equal, c.Verdict == nbe.Equal, "%s and %s: %v", name, other, c)
		case 7: // scopes
			s, err := m.e.Scope().Variable(ctx, "x", term.Name("Nat"))
			require.NoError(t, err)
			s, err = s.Dimension("i")
			require.NoError(t, err)
			s, err = s.Assume(ctx, term.Eq(term.Name("i"), uint64(next(2))))
			require.NoError(t, err)
			x, err := s.Infer(ctx, term.Name("x"))
			require.NoError(t, err)
			c, err := s.Compare(ctx, x, x)
			require.NoError(t, err)
			require.Equal(t, nbe.Equal, c.Verdict)
		}
	}
}
