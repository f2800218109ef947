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
	say := func(name, text string) program {
		return program{name: name, ty: "", text: func(string) string { return text }}
	}
	return []program{
		say("functions around a hypothesis", "((elim (x (-> A A)) 100000000 (zero (lam (m) m)) ((suc k h) (lam (m) (f (h m))))) a)"),
		say("a deep constructor", "(coil 100000000)"),
		say("pairs of hypotheses", "(fst (elim (x (* Nat Nat)) 100000000 (zero (pair 0 0)) ((suc k h) (pair (snd h) (suc (fst h))))))"),
		say("transports", "(elim (x A) 100000000 (zero a) ((suc k h) (transp (i A) bot h)))"),
		say("composites", "(lam (i) (elim (x A) 100000000 (zero a) ((suc k h) (hcomp A h ((= i 0) (j) h)))))"),
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

// mostStack is how much stack the default nesting takes, and how deep the deepest program went.
func mostStack(t *testing.T, depth int64) uint64 {
	e := corpusEngine(t)
	most := uint64(0)
	for _, p := range deepest() {
		text := p.text("")
		ty := "A"
		switch p.name {
		case "a deep constructor":
			ty = "Drum"
		case "pairs of hypotheses":
			ty = "Nat"
		case "composites":
			ty = "(-> I A)"
		}
		runtime.GC()
		before := stacksInUse()
		m := &stackMeter{Context: context.Background(), done: make(chan struct{})}
		s := e.Scope()
		x, err := s.Check(m, readText(t, text), readText(t, ty))
		require.NoError(t, err)
		var st nbe.Stats
		_, err = s.Normal(m, x, nbe.Within(nbe.Limits{Depth: depth}), nbe.Count(&st))
		require.Error(t, err, p.name)
		used := m.most.Load() - min(before, m.most.Load())
		t.Logf("%-32s nesting %7d, stack %4d MB, %5d bytes a level", p.name, st.Deepest, used>>20, used/uint64(max(st.Deepest, 1)))
		most = max(most, used)
	}
	return most
}

func TestTheDefaultNestingFitsItsStack(t *testing.T) {
	depth := int64(nbe.DefaultDepth)
	if !long {
		depth = 30_000
	}
	most := mostStack(t, depth)
	require.LessOrEqual(t, most*uint64(nbe.DefaultDepth)/uint64(depth), uint64(256<<20), "more stack than is documented")
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
