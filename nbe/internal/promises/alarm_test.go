package promises

// Alarms for the worst failures of a kernel: a closed term accepted at Empty,
// two closed numerals judged equal that are not, a closed number whose normal
// form is no numeral, true equal to false. Terms are made of well-typed ones by
// putting parts of one in the place of parts of another, so that many are
// accepted and many are nearly right; the seeds hold the published paradoxes.
// BOXWRIGHT_LONG=1 tries two hundred times as many.

import (
	"context"
	"math/rand/v2"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
)

// closedGiven has no assumptions: everything at hand is closed, and data types
// compose strictly where they can.
const closedGiven = `
(def add (-> Nat Nat Nat) (lam (m n) (elim (x Nat) m (zero n) ((suc k h) (suc h)))))
(def not (-> Bool Bool) (lam (b) (elim (x Bool) b (true false) (false true))))
(def even (-> Nat Bool) (lam (n) (elim (x Bool) n (zero true) ((suc k h) (not h)))))
(def Never (-> Bool (U 0)) (lam (b) (elim (x (U 0)) b (true Unit) (false Empty))))
(def NatCode (-> Nat (U 0)) (lam (n) (elim (x (U 0)) n (zero Unit) ((suc k h) Empty))))
(def idEquiv (Pi ((T (U 0))) (Equiv T T)) (lam (T) (pair (lam (x) x) (lam (y) (pair (pair y (line (i) y)) (lam (z) (line (i) (pair (at (snd z) i) (line (j) (at (snd z) (min i j)))))))))))
(def notInvolution (Pi ((b Bool)) (Path Bool b (not (not b)))) (lam (b) (elim (x (Path Bool x (not (not x)))) b (true (line (i) true)) (false (line (i) false)))))
(def loops (-> Nat (Path Circle base base)) (lam (n) (elim (x (Path Circle base base)) n (zero (line (i) base)) ((suc k h) (line (i) (hcomp Circle (at h i) ((= i 0) (j) base) ((= i 1) (j) (loop j))))))))
(data Two () (point one ()) (point two ()) (path between () (i) ((= i 0) one) ((= i 1) two)))
`

// paradoxes are refused, each for the reason that the name says.
var paradoxes = []struct{ name, text string }{
	{"a universe in itself", "(def bad (U 0) (U 0))"},
	{"a universe in itself, by a sum", "(def bad (U 0) (Sigma ((A (U 0))) A))"},
	{"a universe in itself, by functions", "(def bad (U 0) (Pi ((A (U 0))) A))"},
	{"a universe in itself, by paths", "(def bad (U 0) (Path (U 0) Nat Nat))"},
	// Hurkens, "A simplification of Girard's paradox" (TLCA 1995), its universe at one level
	{"Girard and Hurkens", "(def Uni (U 0) (Pi ((X (U 0))) (-> (-> (-> (-> X (U 0)) (U 0)) X) (-> (-> X (U 0)) (U 0)))))"},
	{"a data type of types in their own universe", "(def bad (U 0) ((ann (lam (T) T) (-> (U 0) (U 0))) (Sigma ((A (U 0))) (-> A (U 0)))))"},
	{"data in the domain of its own function", "(data Bad () (point bad ((f (-> Bad Empty)))))"},
	{"data in the domain of the domain", "(data Bad () (point bad ((f (-> (-> Bad Empty) Empty)))))"},
	{"data in the parameter of another", "(data Bad () (point bad ((f (Sum Bad (-> Bad Empty))))))"},
	{"data in a path of types", "(data Bad () (point bad ((f (Path (U 0) Bad Nat)))))"},
	{"ends that are told apart", "(def bad (-> Two Bool) (lam (t) (elim (x Bool) t (one true) (two false) ((between i) true))))"},
	{"ends that are told apart by a type", "(def bad (-> Two (U 0)) (lam (t) (elim (x (U 0)) t (one Unit) (two Empty) ((between i) Unit))))"},
	{"a boundary that disagrees with itself", "(data Bad () (point p ()) (point q ()) (path s () (i j) ((= i 0) p) ((= j 0) q)))"},
	{"a boundary in another type", "(data Bad () (point p ()) (path s () (i) ((= i 0) p) ((= i 1) true)))"},
	{"a circle that is not round", "(def bad (-> Circle Bool) (lam (c) (elim (x Bool) c (base true) ((loop i) false))))"},
	{"an equivalence that is none", "(def bad (Path (U 0) Bool Unit) (line (i) (Glue Unit ((= i 0) Bool (pair (lam (b) unit) (lam (u) (pair (pair true (line (j) unit)) (lam (z) (line (j) z)))))) ((= i 1) Unit (idEquiv Unit)))))"},
	{"a path between numbers", "(def bad (Path Nat 0 1) (line (i) (hcomp Nat 0 ((= i 1) (j) 1))))"},
	{"a path between truths", "(def bad (Path Bool true false) (line (i) (hcomp Bool true ((= i 0) (j) true) ((= i 1) (j) false))))"},
	{"transport along what is not constant", "(def bad Empty (transp (i (Never true)) top unit))"},
	{"an elimination without cases", "(def bad Empty (elim (x Empty) 0))"},
	{"itself", "(def bad Empty bad)"},
	{"a definition in its own type", "(def bad (-> Empty bad) (lam (x) x))"},
}

func closedEngine(t testing.TB) *nbe.Engine {
	e, err := nbe.New(nbe.WithLimits(nbe.Limits{Steps: 20_000, Memory: 64 << 20, Depth: 20_000}))
	require.NoError(t, err)
	define(t, e, closedGiven)
	return e
}

func TestParadoxesAreRefused(t *testing.T) {
	for _, p := range paradoxes {
		s := &script.Session{Engine: closedEngine(t).Fork(), Report: func(r script.Result) {
			require.Error(t, r.Err, "%s: accepted", p.name)
			require.NotContains(t, []term.ErrorKind{term.OutOfBudget, term.Internal, term.Cancelled}, term.KindOf(r.Err), "%s: %v", p.name, r.Err)
			t.Logf("%-45s %v", p.name, r.Err)
		}}
		require.NoError(t, s.Source(context.Background(), []byte(p.text), "paradox"), p.name)
	}
}

var alarmSeeds = []struct{ ty, text string }{
	{"Nat", "(add 2 3)"}, {"Nat", "(elim (x Nat) 5 (zero 1) ((suc k h) (add h h)))"}, {"Bool", "(even (add 3 4))"}, {"Bool", "(not true)"},
	{"Nat", "(transp (i Nat) bot 3)"}, {"Nat", "(hcomp Nat 3)"}, {"Nat", "(comp (i Nat) 2)"}, {"Bool", "(transp (i Bool) bot true)"},
	{"Nat", "(fst (ann (pair 1 true) (* Nat Bool)))"}, {"Bool", "(snd (ann (pair 1 true) (* Nat Bool)))"}, {"(* Nat Bool)", "(pair 4 (even 4))"},
	{"Bool", "(transp (i (Glue Bool ((= i 0) Bool (idEquiv Bool)) ((= i 1) Bool (idEquiv Bool)))) bot true)"},
	{"(Path Nat 2 2)", "(line (i) 2)"}, {"Nat", "(at (ann (line (i) 2) (Path Nat 2 2)) 0)"}, {"(-> Nat Nat)", "(lam (n) (suc n))"}, {"Nat", "((ann (lam (n) (suc n)) (-> Nat Nat)) 6)"},
	{"(Never true)", "unit"}, {"Unit", "(transp (i (Never true)) bot unit)"}, {"(NatCode 0)", "unit"}, {"(-> Empty Nat)", "(lam (e) (elim (x Nat) e))"},
	{"Bool", "(elim (x Bool) (ann (inl 3) (Sum Nat Bool)) ((inl n) (even n)) ((inr b) b))"}, {"Circle", "(at (loops 3) 0)"}, {"Circle", "(loop 0)"},
	{"(U 0)", "(Glue Nat ((= 0 0) Nat (idEquiv Nat)))"}, {"(U 0)", "(Never (even 3))"}, {"(-> (Never false) Empty)", "(lam (x) x)"},
	{"Two", "one"}, {"(Path Two one two)", "(line (i) (between i))"}, {"(Path Bool true (not (not true)))", "(notInvolution true)"},
	{"Nat", "(let ((n Nat 3)) (add n n))"}, {"Bool", "(at (notInvolution true) 1)"}, {"Nat", "(elim (x Nat) (at (ann (line (i) (between i)) (Path Two one two)) 0) (one 3) (two 3) ((between i) 3))"},
}

// parts collects all subterms of w; it holds slots, so that they can be replaced.
func parts(w *term.Written) (out []**term.Written) {
	var walk func(ps []term.Part)
	walk = func(ps []term.Part) {
		for k := range ps {
			for _, r := range ps[k].Rows {
				walk(r)
			}
			if ps[k].Body != nil {
				out = append(out, &ps[k].Body)
				walk(ps[k].Body.Parts)
			}
		}
	}
	walk(w.Parts)
	return out
}

// graft is one seed with a part of another in the place of one of its own, once or more.
func graft(t testing.TB, rnd *rand.Rand) (ty, w *term.Written) {
	seed := alarmSeeds[rnd.IntN(len(alarmSeeds))]
	holder := &term.Written{Kind: term.ApplyKind, Parts: []term.Part{{Body: mustRead(t, seed.text)}}}
	for n := 1 + rnd.IntN(3); n > 0; n-- {
		other := alarmSeeds[rnd.IntN(len(alarmSeeds))]
		from := []string{other.text, other.ty, "0", "1", "true", "Empty", "Unit", "(U 0)", "i", "n", "x", "h", "k", "unit", "(hcomp Nat 1)"}
		source := &term.Written{Kind: term.ApplyKind, Parts: []term.Part{{Body: mustRead(t, from[max(0, rnd.IntN(2*len(from))-len(from))])}}}
		donors, slots := parts(source), parts(holder)
		*slots[rnd.IntN(len(slots))] = *donors[rnd.IntN(len(donors))]
	}
	return mustRead(t, seed.ty), holder.Parts[0].Body
}

// alarm raises the alarm if w shows one of the failures; it tells whether w was accepted.
func alarm(t testing.TB, e *nbe.Engine, ty, w *term.Written) bool {
	ctx := context.Background()
	s := e.Scope()
	if _, err := s.Check(ctx, w, term.Name("Empty")); err == nil {
		t.Errorf("accepted at Empty: %s", w)
	}
	accepted := false
	for _, at := range []*term.Written{ty, term.Name("Nat"), term.Name("Bool"), nil} {
		var x *nbe.Term
		var err error
		if at == nil {
			x, err = s.Infer(ctx, w)
		} else {
			x, err = s.Check(ctx, w, at)
		}
		if term.KindOf(err) == term.Internal {
			t.Errorf("%s at %s: %v", w, at, err)
		}
		if err != nil {
			continue
		}
		accepted = true
		forms, err := s.Normal(ctx, x)
		if err != nil {
			if term.KindOf(err) != term.OutOfBudget {
				t.Errorf("%s: its normal form: %v", w, err)
			}
			continue
		}
		kind, err := forms[0].WrittenType()
		if err != nil {
			continue
		}
		n, err := forms[0].Written()
		if err != nil {
			continue
		}
		switch kind.String() {
		case "Empty":
			t.Errorf("of type Empty: %s", w)
		case "Nat":
			if n.Kind != term.NumeralKind {
				t.Errorf("a number that is no numeral: %s gives %s", w, n)
				continue
			}
			next, err := s.CheckLike(ctx, term.Apply(term.Name("suc"), n), x)
			require.NoError(t, err)
			if c, err := s.Compare(ctx, x, next); err == nil && c.Verdict == nbe.Equal {
				t.Errorf("%s equals its successor", w)
			}
		case "Bool":
			truth := n.String()
			if truth != "true" && truth != "false" {
				t.Errorf("a truth that is none: %s gives %s", w, n)
				continue
			}
			other := map[string]string{"true": "false", "false": "true"}[truth]
			y, err := s.CheckLike(ctx, term.Name(other), x)
			require.NoError(t, err)
			if c, err := s.Compare(ctx, x, y); err == nil && c.Verdict == nbe.Equal {
				t.Errorf("%s equals true and false", w)
			}
		}
		// the normal form is of the same type and equal to the term
		y, err := s.CheckLike(ctx, n, x)
		if err != nil {
			if term.KindOf(err) != term.OutOfBudget {
				t.Errorf("%s: its normal form %s is refused: %v", w, n, err)
			}
			continue
		}
		if c, err := s.Compare(ctx, x, y); err == nil && c.Verdict != nbe.Equal {
			t.Errorf("%s and its normal form %s: %s", w, n, c.Difference)
		}
	}
	return accepted
}

func TestSoundnessAlarms(t *testing.T) {
	e := closedEngine(t)
	rnd := rand.New(rand.NewPCG(2015, 2018))
	tries, accepted := 1500, 0
	if long {
		tries = 300_000
	}
	for range tries {
		ty, w := graft(t, rnd)
		if alarm(t, e, ty, w) {
			accepted++
		}
	}
	t.Logf("%d terms, %d of them accepted at some type", tries, accepted)
	require.Greater(t, accepted, tries/20, "the generator makes too few terms that are right")
}

// FuzzAlarms looks for the same failures in any text.
func FuzzAlarms(f *testing.F) {
	for _, s := range alarmSeeds {
		f.Add(s.ty, s.text)
	}
	for _, p := range paradoxes {
		if w, ok := strings.CutPrefix(p.text, "(def bad "); ok {
			f.Add(w, w)
		}
	}
	e := closedEngine(f)
	f.Fuzz(func(t *testing.T, ty, text string) {
		a, err := notation.ReadTerm(ty, "", nil)
		if err != nil {
			return
		}
		w, err := notation.ReadTerm(text, "", nil)
		if err != nil {
			return
		}
		alarm(t, e, a, w)
	})
}
