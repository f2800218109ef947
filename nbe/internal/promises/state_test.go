package promises

// Portable state: what was saved is what is loaded, nothing else is.

import (
	"bytes"
	"context"
	"encoding/binary"
	"fmt"
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
)

func saved(t testing.TB, e *nbe.Engine) []byte {
	var b bytes.Buffer
	require.NoError(t, e.Save(context.Background(), &b))
	return b.Bytes()
}

func loaded(t testing.TB, src []byte, options ...nbe.CallOption) *nbe.Engine {
	e, err := nbe.New()
	require.NoError(t, err)
	require.NoError(t, e.Load(context.Background(), bytes.NewReader(src), options...))
	return e
}

func TestWhatIsSavedIsLoaded(t *testing.T) {
	for _, text := range []string{given, closedGiven, "(assume A (U 0)) (def B (U 0) A)"} {
		e, err := nbe.New()
		require.NoError(t, err)
		define(t, e, text)
		src := saved(t, e)
		require.Equal(t, src, saved(t, e), "saving is deterministic")
		for _, options := range [][]nbe.CallOption{nil, {nbe.Recheck()}} {
			again := loaded(t, src, options...)
			require.Equal(t, src, saved(t, again), "what was loaded is saved as it was")
			for _, q := range work {
				want, _ := answerOf(context.Background(), t, e, q.ty, q.text)
				got, _ := answerOf(context.Background(), t, again, q.ty, q.text)
				require.Equal(t, want, got, "%s", q.text)
			}
		}
	}
}

// An assumption that has become a definition is saved after what it uses.
func TestReplacedAssumptionsAreSaved(t *testing.T) {
	e, err := nbe.New()
	require.NoError(t, err)
	ctx := context.Background()
	require.NoError(t, e.Hole(ctx, "n", term.Name("Nat")))
	define(t, e, "(def m Nat (suc n)) (def k Nat 3)")
	require.NoError(t, e.Define(ctx, "n", term.Name("Nat"), term.Name("k")))
	require.NoError(t, e.Hole(ctx, "open", term.Name("Nat")))
	again := loaded(t, saved(t, e))
	got, err := answerOf(ctx, t, again, "Nat", "m")
	require.NoError(t, err)
	require.Equal(t, "4, equal to itself", got)
	c, err := again.Scope().CompareAt(ctx, term.Name("Nat"), term.Name("open"), term.Numeral(0))
	require.NoError(t, err)
	require.Equal(t, nbe.Undecided, c.Verdict)
	require.NoError(t, again.Define(ctx, "open", term.Name("Nat"), term.Numeral(0)))
	define(t, again, "(same Nat open 0)")
}

func TestDamagedStreamsAreRefused(t *testing.T) {
	e := corpusEngine(t)
	src := saved(t, e)
	refuses := func(what string, src []byte) {
		fresh, err := nbe.New()
		require.NoError(t, err)
		err = fresh.Load(context.Background(), bytes.NewReader(src))
		require.Error(t, err, what)
		require.Contains(t, []term.ErrorKind{term.Malformed, term.NotFound}, term.KindOf(err), "%s: %v", what, err)
		require.Equal(t, len(saved(t, fresh)), len(saved(t, mustNew(t))), "%s: something was added", what)
	}
	for k := 0; k < len(src); k += 1 + len(src)/400 {
		refuses(fmt.Sprintf("cut off at %d", k), src[:k])
		bad := bytes.Clone(src)
		bad[k] ^= 1 << (k % 8)
		refuses(fmt.Sprintf("damaged at %d", k), bad)
	}
	refuses("more behind it", append(bytes.Clone(src), 0))
	refuses("nothing", nil)
	refuses("something else", []byte(given))
	refuses("a length that is too large", binary.AppendUvarint([]byte("\x89bwstate\x01"), 1<<62))
	// loading what is there already adds nothing
	require.Equal(t, term.Duplicate, term.KindOf(e.Load(context.Background(), bytes.NewReader(src))))
}

func mustNew(t testing.TB, options ...nbe.Option) *nbe.Engine {
	e, err := nbe.New(options...)
	require.NoError(t, err)
	return e
}

// A content hash depends on the definition and on what it uses, and on nothing else.
func TestContentHashes(t *testing.T) {
	hash := func(name, text string) string {
		e := mustNew(t)
		define(t, e, text)
		h, err := e.Hash(context.Background(), name)
		require.NoError(t, err)
		again := loaded(t, saved(t, e))
		h2, err := again.Hash(context.Background(), name)
		require.NoError(t, err)
		require.Equal(t, h, h2)
		return h.String()
	}
	base := hash("b", "(def a Nat 1) (def b Nat (suc a))")
	require.Equal(t, base, hash("b", "; elsewhere\n(def other Nat 7) (def a Nat 1)\n (def more Nat 8) (def b Nat (suc a)) (def after Nat b)"))
	require.NotEqual(t, base, hash("b", "(def a Nat 2) (def b Nat (suc a))"), "what it uses is another")
	require.NotEqual(t, base, hash("b", "(def a Nat 1) (def b Nat (suc (suc a)))"))
	require.NotEqual(t, base, hash("b", "(assume a Nat) (def b Nat (suc a))"))
	data := hash("D", "(data D () (point c ()) (path p () (i) ((= i 0) c) ((= i 1) c)))")
	require.NotEqual(t, data, hash("D", "(data D () (point c ()) (path p () (i) ((= i 0) c)))"))
	require.NotEqual(t, hash("x", "(data D () (point c ())) (def x D c)"), hash("x", "(data D () (point c ()) (point d ())) (def x D c)"))
}

// library is n definitions, each of which uses earlier ones.
func library(n int) string {
	var b strings.Builder
	b.WriteString("(def add (-> Nat Nat Nat) (lam (m n) (elim (x Nat) m (zero n) ((suc k h) (suc h)))))\n(def d0 (-> Nat Nat) (lam (n) (add n 1)))\n")
	for k := 1; k < n; k++ {
		switch k % 3 {
		case 0:
			fmt.Fprintf(&b, "(def d%d (-> Nat Nat) (lam (n) (d0 (add n %d))))\n", k, k%7)
		case 1:
			fmt.Fprintf(&b, "(def d%d (-> Nat Nat) (lam (n) (elim (x Nat) n (zero %d) ((suc k h) (add h k)))))\n", k, k%5)
		case 2:
			fmt.Fprintf(&b, "(def d%d (Pi ((f (-> Nat Nat))) (Path (-> Nat Nat) f (lam (n) (f n)))) (lam (f) (line (i) (lam (n) (f n)))))\n", k)
			// later ones use an earlier function
			if k+1 < n {
				k++
				fmt.Fprintf(&b, "(def d%d (-> Nat Nat) (lam (n) (d0 (d0 n))))\n", k)
			}
		}
	}
	return b.String()
}

// A library of 10,000 definitions loads much faster than it checks. The times
// are logged; what is asserted leaves room for a busy machine.
func TestLoadingIsFasterThanChecking(t *testing.T) {
	n := 2000
	if long {
		n = 10_000
	}
	e := mustNew(t)
	begin := time.Now()
	define(t, e, library(n))
	checking := time.Since(begin)
	src := saved(t, e)
	best := time.Hour
	for range 5 {
		fresh := mustNew(t)
		begin = time.Now()
		require.NoError(t, fresh.Load(context.Background(), bytes.NewReader(src)))
		best = min(best, time.Since(begin))
	}
	t.Logf("%d definitions, %d bytes: checked in %v, loaded in %v, %.0f times faster", n, len(src), checking, best, float64(checking)/float64(best))
	require.Less(t, best, checking)
}

// dock is a former of a host's: one word for a universe.
func dock(version int) prims.Former {
	return prims.Former{
		Name: "docks", Version: version,
		Words: []prims.Word{{Shape: term.Shape{Word: "Dock"}, Infer: func(value.Checker, *term.Written) (value.Core, value.Value) {
			return &term.Op{Sig: dockSig}, prims.NewUniverse(1)
		}}},
		Operators: []prims.Operator{{Sig: dockSig, Op: dockOp{}}},
	}
}

var dockSig = &term.Signature{Name: "Dock", Word: "Dock"}

type dockOp struct{}

func (dockOp) Eval(*value.Run, eval.Frame, []eval.Arg) value.Value { return prims.NewUniverse(0) }

// A stream that uses a host's former asks for it, in the same version.
func TestFormersOfHostsAreAskedFor(t *testing.T) {
	e, err := nbe.New(nbe.WithFormers(dock(1)))
	require.NoError(t, err)
	ctx := context.Background()
	require.NoError(t, e.Define(ctx, "quays", term.Universe(1), term.Form("Dock")))
	src := saved(t, e)
	for version, kind := range []term.ErrorKind{term.NotFound, 0, term.NotFound} {
		var options []nbe.Option
		if version > 0 {
			options = append(options, nbe.WithFormers(dock(version)))
		}
		other, err := nbe.New(options...)
		require.NoError(t, err)
		require.Equal(t, kind, term.KindOf(other.Load(ctx, bytes.NewReader(src))), "version %d", version)
	}
}
