package promises

// Forged streams: damage that its author has sealed with a fresh check sum. The
// sum does not find it, so that any bytes may come to be decoded. Whatever they
// say, loading and what follows it answer or fail with an error; with Recheck
// nothing is taken over that does not elaborate to what it says.

import (
	"bytes"
	"context"
	"crypto/sha256"
	"encoding/binary"
	"errors"
	"fmt"
	"io"
	"math/big"
	"math/rand/v2"
	"testing"
	"testing/iotest"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/term"
)

const magicLength = 8

// sealed is the stream with this body, its length and its sum put right.
func sealed(body []byte) []byte {
	out := []byte("\x89bwstate")
	out = binary.AppendUvarint(out, 1)
	out = binary.AppendUvarint(out, uint64(len(body)))
	out = append(out, body...)
	sum := sha256.Sum256(out)
	return append(out, sum[:]...)
}

// bodyOf is what stands between the head and the sum of a stream.
func bodyOf(src []byte) []byte {
	in := src[magicLength:]
	_, n := binary.Uvarint(in)
	_, m := binary.Uvarint(in[n:])
	return in[n+m : len(in)-sha256.Size]
}

const forgedGiven = `
(data Drum () (point hub ()) (point turn ((d Drum))) (path slip ((d Drum)) (i j) ((= i 0) d) ((= i 1) d)))
(assume f (-> Nat Nat)) (assume g (Path Nat 0 0))
(def n Nat 12345678901234567890123) (def up (U 3) (U 2))
(def m (-> Nat Nat) (lam (x) (elim (y Nat) x (zero 3) ((suc k h) (f h)))))
(def p (-> I I Nat) (lam (i j) (hcomp Nat 0 ((or (= i 0) (and (= i 1) (= j 0))) (k) (at g (min k (rev (max i j))))))))
(def d Drum (turn hub)) (def u Unit unit)`

func forged(t testing.TB) (*nbe.Engine, []byte) {
	e := mustNew(t)
	define(t, e, forgedGiven)
	require.NoError(t, e.Hole(context.Background(), "open", term.Name("Nat")))
	src := saved(t, e)
	require.Equal(t, src, sealed(bodyOf(src)))
	return e, src
}

func TestForgedStreams(t *testing.T) {
	_, src := forged(t)
	body := bodyOf(src)
	rnd := rand.New(rand.NewPCG(1912, 4))
	limits := nbe.Within(nbe.Limits{Steps: 20_000, Depth: 5_000, Memory: 16 << 20, Output: 10_000, Text: 10_000})
	ctx := context.Background()
	tries, taken := 3_000, 0
	if testing.Short() {
		tries = 1_000
	}
	if long {
		tries = 200_000
	}
	for try := range tries {
		bad := bytes.Clone(body)
		for range 1 + rnd.IntN(3) {
			switch at := rnd.IntN(len(bad)); rnd.IntN(4) {
			case 0:
				bad[at] ^= 1 << rnd.IntN(8)
			case 1:
				bad[at] = byte(rnd.IntN(12))
			case 2:
				bad = append(bad[:at], bad[min(at+1+rnd.IntN(3), len(bad)):]...)
			case 3:
				bad = append(bad[:at], append([]byte{byte(rnd.IntN(256))}, bad[at:]...)...)
			}
		}
		e := mustNew(t)
		if e.Load(ctx, bytes.NewReader(sealed(bad)), limits) == nil {
			taken++
			s := e.Scope()
			for _, name := range []string{"n", "up", "m", "p", "d", "u", "open", "f"} {
				// no panic leaves any of these, and none goes on beyond its limits
				_, _ = e.Hash(ctx, name, limits)
				if x, err := s.Infer(ctx, term.Name(name), limits); err == nil {
					_, _ = s.Normal(ctx, x, limits)
					_, _ = s.Compare(ctx, x, x, limits)
				}
			}
			_ = e.Save(ctx, io.Discard, limits)
		}
		define(t, e, "(def sound Nat 3) (same Nat sound 3)")
		if try%10 > 0 {
			continue
		}
		// checked again, what is taken over means what it says
		e = mustNew(t)
		if e.Load(ctx, bytes.NewReader(sealed(bad)), limits, nbe.Recheck()) == nil {
			again := saved(t, e)
			require.NoError(t, mustNew(t).Load(ctx, bytes.NewReader(again), nbe.Recheck()))
		}
	}
	t.Logf("%d forged streams, %d of them loaded without a check", tries, taken)
	require.Greater(t, taken, tries/20, "most do not get beyond the head")
}

// Each end of a stream that is too early, with a sum that is right.
func TestStreamsCutShortAndSealed(t *testing.T) {
	_, src := forged(t)
	body := bodyOf(src)
	for k := range len(body) {
		err := mustNew(t).Load(context.Background(), bytes.NewReader(sealed(body[:k])))
		require.Contains(t, []term.ErrorKind{term.Malformed, term.NotFound}, term.KindOf(err), "cut at %d: %v", k, err)
	}
}

// Recheck refuses what does not elaborate, and what elaborates to something else.
func TestRecheckRefuses(t *testing.T) {
	load := func(from, to string, options ...nbe.CallOption) error {
		e := mustNew(t)
		define(t, e, "(data Bay () (point dry ()) (path wet () (i) ((= i 0) dry))) (def one Nat (suc zero)) (def berth Bay dry) (assume left Nat)")
		body := bodyOf(saved(t, e))
		require.Len(t, to, len(from))
		require.Contains(t, string(body), from)
		return mustNew(t).Load(context.Background(), bytes.NewReader(sealed(bytes.Replace(body, []byte(from), []byte(to), 1))), options...)
	}
	for _, c := range []struct {
		from, to   string
		kind, bare term.ErrorKind // with Recheck and without
	}{
		{"(suc zero)", "(suc  one)", term.NotFound, 0},
		{"(suc zero)", "(suc unit)", term.IllTyped, 0},
		{"(suc zero)", "(suc (ze)(", term.Malformed, 0},
		{"(suc zero)", "zero      ", term.Unequal, 0},
		{"(point dry ())", "(point dry  (", term.Malformed, term.Malformed},
		{"(data Bay () (point dry ())", "(data Bay () (point wry ())", term.NotFound, term.NotFound},
		{"((= i 0) dry)", "((= i 1) dry)", term.Unequal, 0},
	} {
		if len(c.from) != len(c.to) {
			c.to += " "
		}
		require.Equal(t, c.kind, term.KindOf(load(c.from, c.to, nbe.Recheck())), "%s as %s", c.from, c.to)
		require.Equal(t, c.bare, term.KindOf(load(c.from, c.to)), "%s as %s", c.from, c.to)
	}
}

// A stream whose terms are not those of its texts: with Recheck the texts count.
func TestRecheckTakesTheTexts(t *testing.T) {
	_, src := forged(t)
	number, _ := new(big.Int).SetString("12345678901234567890123", 10)
	other := new(big.Int).Add(number, big.NewInt(1))
	require.Equal(t, 1, bytes.Count(bodyOf(src), number.Bytes()))
	bad := sealed(bytes.Replace(bodyOf(src), number.Bytes(), other.Bytes(), 1))
	for _, options := range [][]nbe.CallOption{nil, {nbe.Recheck()}} {
		e := mustNew(t)
		require.NoError(t, e.Load(context.Background(), bytes.NewReader(bad), options...))
		got, err := answerOf(context.Background(), t, e, "Nat", "n")
		require.NoError(t, err)
		want := other
		if options != nil {
			want = number
		}
		require.Equal(t, want.String()+", equal to itself", got)
	}
}

type brokenWriter struct{ err error }

func (w brokenWriter) Write([]byte) (int, error) { return 0, w.err }

// The errors of a host's reader and writer are those of loading and saving, and
// whatever stops either is told.
func TestStreamsThatFail(t *testing.T) {
	e, src := forged(t)
	ctx := context.Background()
	leak := errors.New("the hold is flooded")
	err := e.Save(ctx, brokenWriter{leak})
	require.Equal(t, term.Unreadable, term.KindOf(err))
	require.ErrorIs(t, err, leak)
	err = mustNew(t).Load(ctx, io.MultiReader(bytes.NewReader(src[:100]), iotest.ErrReader(leak)))
	require.Equal(t, term.Unreadable, term.KindOf(err))
	require.ErrorIs(t, err, leak)
	require.Equal(t, term.OutOfBudget, term.KindOf(e.Save(ctx, io.Discard, nbe.Within(nbe.Limits{Memory: 100}))))
	require.Equal(t, term.OutOfBudget, term.KindOf(mustNew(t).Load(ctx, bytes.NewReader(src), nbe.Within(nbe.Limits{Memory: 100}))))
	_, err = e.Hash(ctx, "nothing")
	require.Equal(t, term.NotFound, term.KindOf(err))
	// a stream of another version
	other := bytes.Clone(src)
	other[magicLength] = 9
	require.Equal(t, term.Malformed, term.KindOf(mustNew(t).Load(ctx, bytes.NewReader(other))))
	// wherever loading is stopped, nothing is added
	for _, options := range [][]nbe.CallOption{nil, {nbe.Recheck()}} {
		whole := newLooked(0, 1<<40)
		require.NoError(t, mustNew(t).Load(whole, bytes.NewReader(src), options...))
		for end := 1; end <= len(whole.gaps); end += 1 + len(whole.gaps)/60 {
			fresh := mustNew(t)
			err := fresh.Load(newLooked(end, 1<<40), bytes.NewReader(src), options...)
			require.Equal(t, term.Cancelled, term.KindOf(err), "look %d of %d: %v", end, len(whole.gaps), err)
			require.Equal(t, len(saved(t, mustNew(t))), len(saved(t, fresh)), "something was added")
		}
	}
	// names are said once, also where a stream says them
	for _, name := range []string{"m", "Drum", "turn"} {
		fresh := mustNew(t)
		define(t, fresh, fmt.Sprintf("(assume %s Nat)", name))
		require.Equal(t, term.Duplicate, term.KindOf(fresh.Load(ctx, bytes.NewReader(src))), name)
	}
}
