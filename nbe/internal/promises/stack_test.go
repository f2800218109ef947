package promises

// Stack. The default nesting takes at most 256 MB of stack in all, in a plain
// build, under the race detector and without optimisation. A run that nests goes
// on on fresh goroutines, so the stacks of all of them count together, as the
// runtime reports them.

import (
	"context"
	"os"
	"os/exec"
	"runtime"
	"runtime/metrics"
	"sync/atomic"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
)

func stacksInUse() uint64 {
	s := []metrics.Sample{{Name: "/memory/classes/heap/stacks:bytes"}}
	metrics.Read(s)
	return s[0].Value.Uint64()
}

// deepest are programs that nest as deep as the budget lets them.
func deepest() []program {
	say := func(name, ty, text string) program {
		return program{name: name, ty: ty, text: func(string) string { return text }}
	}
	return []program{
		say("functions around a hypothesis", "A", "((elim (x (-> A A)) 100000000 (zero (lam (m) m)) ((suc k h) (lam (m) (f (h m))))) a)"),
		say("a deep constructor", "Drum", "(coil 100000000)"),
		say("pairs of hypotheses", "Nat", "(fst (elim (x (* Nat Nat)) 100000000 (zero (pair 0 0)) ((suc k h) (pair (snd h) (suc (fst h))))))"),
		say("transports", "A", "(elim (x A) 100000000 (zero a) ((suc k h) (transp (i A) bot h)))"),
		say("composites", "(-> I A)", "(lam (i) (elim (x A) 100000000 (zero a) ((suc k h) (hcomp A h ((= i 0) (j) h)))))"),
	}
}

// stackMeter is a context that notes how much stack there is at each look.
type stackMeter struct {
	context.Context
	done  chan struct{}
	looks atomic.Int64
	most  atomic.Uint64
}

func (m *stackMeter) Done() <-chan struct{} { return m.done }

func (m *stackMeter) Err() error {
	if m.looks.Add(1)%16 == 0 {
		if n := stacksInUse(); n > m.most.Load() {
			m.most.Store(n)
		}
	}
	return nil
}

// mostStack is how much stack that nesting takes at most, over the programs that
// nest for ever and over every form of the corpus that gets as deep.
func mostStack(t *testing.T, depth int64) uint64 {
	e := corpusEngine(t)
	all := deepest()
	for _, n := range nests() {
		if n.most == 0 { // the others end before they are deep
			ty, text := n.make(int(depth) + 1_000)
			all = append(all, program{name: n.name, ty: ty, text: func(string) string { return text }})
		}
	}
	most := uint64(0)
	for _, p := range all {
		runtime.GC()
		before := stacksInUse()
		m := &stackMeter{Context: context.Background(), done: make(chan struct{})}
		deep := int64(0)
		limits := nbe.Within(nbe.Limits{Depth: depth, Steps: 3_000_000, Memory: 4 << 30})
		call := func(f func(options ...nbe.CallOption) error) bool {
			var st nbe.Stats
			err := f(limits, nbe.Count(&st))
			require.True(t, answered(err), "%s: %v", p.name, err)
			deep = max(deep, st.Deepest)
			return err == nil
		}
		s := e.Scope()
		w, ty := readText(t, p.text("")), readText(t, p.ty)
		var x, y *nbe.Term
		_ = call(func(o ...nbe.CallOption) (err error) { x, err = s.Check(m, w, ty, o...); return }) &&
			call(func(o ...nbe.CallOption) (err error) { y, err = s.Check(m, w, ty, o...); return }) &&
			call(func(o ...nbe.CallOption) error { _, err := s.Compare(m, x, y, o...); return err }) &&
			call(func(o ...nbe.CallOption) error { _, err := s.Normal(m, x, o...); return err })
		if deep < depth/2 {
			continue
		}
		used := m.most.Load() - min(before, m.most.Load())
		t.Logf("%-45s nesting %7d, stack %4d MB, %5d bytes a level", p.name, deep, used>>20, used/uint64(max(deep, 1)))
		most = max(most, used*uint64(depth)/uint64(min(deep, depth)))
	}
	return most
}

func TestTheDefaultNestingFitsItsStack(t *testing.T) {
	depth := int64(nbe.DefaultDepth)
	if !long {
		depth = 8_000
	}
	most, share := mostStack(t, depth), uint64(256<<20)
	if depth < nbe.DefaultDepth { // of a part its part, and what other goroutines stand on
		share = share*uint64(depth)/nbe.DefaultDepth + 4<<20
	}
	require.LessOrEqual(t, most, share, "more stack than is documented")
}

// The same without optimisation, by a test binary of its own.
func TestTheDefaultNestingFitsItsStackWithoutOptimisation(t *testing.T) {
	if !long && os.Getenv("BOXWRIGHT_UNOPTIMISED") == "" {
		t.Skip("takes a build of its own: BOXWRIGHT_LONG=1")
	}
	if os.Getenv("BOXWRIGHT_CHILD") != "" {
		t.Skip("is the child")
	}
	for _, flags := range [][]string{{"-gcflags=all=-N -l"}, {"-race"}} {
		cmd := exec.Command("go", append(append([]string{"test"}, flags...), "-run", "^TestTheDefaultNestingFitsItsStack$|TestNothingOverflows", "-count=1", ".")...)
		cmd.Env = append(os.Environ(), "BOXWRIGHT_CHILD=1", "BOXWRIGHT_LONG=")
		out, err := cmd.CombinedOutput()
		require.NoError(t, err, "%v: %s", flags, out)
	}
}
