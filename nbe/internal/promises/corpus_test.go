package promises

// The promises to a host that embeds the engine, and the corpus that they are
// tested on: terms that nest deep, terms that never end, terms that grow.
// BOXWRIGHT_LONG=1 makes the tests of promises long: a million levels, half a
// minute of concurrency.

import (
	"context"
	"os"
	"runtime/debug"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
)

var long = os.Getenv("BOXWRIGHT_LONG") != ""

// given is what the corpus speaks of: crates counted by numbers, drums of a
// cable, berths.
const given = `
(assume A (U 0)) (assume a A) (assume f (-> A A)) (assume g (-> A A A)) (assume loopA (Path A a a))
(data Drum () (point hub ()) (point turn ((d Drum))))
(data Tree () (point leaf ()) (point node ((l Tree) (r Tree))))
(data Quay ((T (U 0))) (point end ()) (point berth ((t T) (q (Quay T)))))
(def double (-> Nat Nat) (lam (n) (elim (x Nat) n (zero 0) ((suc k h) (suc (suc h))))))
(def add (-> Nat Nat Nat) (lam (m n) (elim (x Nat) m (zero n) ((suc k h) (suc h)))))
(def power (-> Nat Nat) (lam (n) (elim (x Nat) n (zero 1) ((suc k h) (add h h)))))
(def keep (-> A A) (lam (x) x))
(def twin (-> Tree Tree) (lam (t) (node t t)))
(def coil (-> Nat Drum) (lam (n) (elim (x Drum) n (zero hub) ((suc k h) (turn h)))))
(def unroll (-> Drum Nat) (lam (d) (elim (x Nat) d (hub 0) ((turn e h) (suc h)))))
(def pred (-> Nat Nat) (lam (n) (elim (x Nat) n (zero 0) ((suc k h) k))))
(def Ack (-> Nat Nat Nat) (lam (m) (elim (x (-> Nat Nat)) m (zero (lam (n) (suc n))) ((suc k h) (lam (n) (elim (x Nat) n (zero (h 1)) ((suc k2 h2) (h h2))))))))
(def refl (Pi ((x A)) (Path A x x)) (lam (x) (line (i) x)))
(def idEquiv (Pi ((T (U 0))) (Equiv T T)) (lam (T) (pair (lam (x) x) (lam (y) (pair (pair y (line (i) y)) (lam (z) (line (i) (pair (at (snd z) i) (line (j) (at (snd z) (min i j)))))))))))
`

func corpusEngine(t testing.TB, options ...nbe.Option) *nbe.Engine {
	e, err := nbe.New(options...)
	require.NoError(t, err)
	define(t, e, given)
	return e
}

func define(t testing.TB, e *nbe.Engine, text string) {
	s := &script.Session{Engine: e, Report: func(r script.Result) { require.NoError(t, r.Err, "%s", r.Form) }}
	require.NoError(t, s.Source(context.Background(), []byte(text), "given"))
}

func readText(t testing.TB, text string) *term.Written {
	w, err := notation.ReadTerm(text, "", nil)
	require.NoError(t, err)
	return w
}

// rep is before n times, core, after n times.
func rep(n int, before, core, after string) string {
	return strings.Repeat(before, n) + core + strings.Repeat(after, n)
}

// nest is a form that nests: a term of n levels and its type.
type nest struct {
	name string
	// quadratic: what it costs grows faster than its size, so it is tried at fewer levels
	most int
	make func(n int) (ty, t string)
}

func nests() []nest {
	plain := func(name, ty, before, core, after string) nest {
		return nest{name, 0, func(n int) (string, string) { return ty, rep(n, before, core, after) }}
	}
	return []nest{
		plain("successors of a numeral", "Nat", "(suc ", "0", ")"),
		plain("successors under a function", "(-> Nat Nat)", "(ann ", "(lam (n) (suc n))", " (-> Nat Nat))"),
		{"successors of a variable", 0, func(n int) (string, string) { return "(-> Nat Nat)", "(lam (n) " + rep(n, "(suc ", "n", ")") + ")" }},
		plain("constructors", "Drum", "(turn ", "hub", ")"),
		plain("branches", "Tree", "(node leaf ", "leaf", ")"),
		plain("branches on the left", "Tree", "(node ", "leaf", " leaf)"),
		plain("lists", "(Quay A)", "(berth a ", "(end)", ")"),
		plain("applications of an assumption", "A", "(f ", "a", ")"),
		plain("applications of an assumption on the left", "A", "(g ", "a", " a)"),
		plain("applications of an assumption on the right", "A", "(g a ", "a", ")"),
		plain("applications of a definition", "A", "(keep ", "a", ")"),
		plain("applications of functions", "A", "((ann (lam (x) x) (-> A A)) ", "a", ")"),
		plain("arithmetic", "Nat", "(double ", "0", ")"),
		plain("arithmetic on the right", "Nat", "(add 1 ", "0", ")"),
		plain("eliminations", "Nat", "(elim (x Nat) ", "0", " (zero 0) ((suc k h) k))"),
		plain("eliminations in a case", "Nat", "(elim (x Nat) 0 (zero ", "0", ") ((suc k h) h))"),
		plain("eliminations of a tree", "Tree", "(elim (x Tree) ", "leaf", " (leaf leaf) ((node l r hl hr) (node hr hl)))"),
		plain("annotations", "A", "(ann ", "a", " A)"),
		plain("arrows to the right", "(U 0)", "(-> A ", "A", ")"),
		plain("arrows to the left", "(U 0)", "(-> ", "A", " A)"),
		plain("products", "(U 0)", "(Sigma ((x A)) ", "A", ")"),
		plain("products to the left", "(U 0)", "(* ", "A", " A)"),
		plain("functions over the interval", "(U 0)", "(Pi ((i I)) ", "A", ")"),
		plain("data types of data types", "(U 0)", "(Quay ", "A", ")"),
		plain("sums of sums", "(U 0)", "(Sum Nat ", "Nat", ")"),
		{"lets", 0, func(n int) (string, string) { return "A", rep(n, "(let ((x A a)) ", "a", ")") }},
		{"lets in lets", 0, func(n int) (string, string) { return "A", rep(n, "(let ((x A ", "a", ")) x)") }},
		{"pairs", 0, func(n int) (string, string) { return rep(n, "(* A ", "A", ")"), rep(n, "(pair a ", "a", ")") }},
		{"pairs to the left", 0, func(n int) (string, string) { return rep(n, "(* ", "A", " A)"), rep(n, "(pair ", "a", " a)") }},
		{"projections", 20_000, func(n int) (string, string) {
			return "A", rep(n, "(fst ", "(ann "+rep(n, "(pair ", "a", " a)")+" "+rep(n, "(* ", "A", " A)")+")", ")")
		}},
		{"functions", 0, func(n int) (string, string) { return rep(n, "(-> A ", "A", ")"), rep(n, "(lam (x) ", "x", ")") }},
		{"functions of functions", 0, func(n int) (string, string) {
			return rep(n, "(-> A ", "A", ")"), "(lam (y) " + rep(n-1, "(lam (x) ", "y", ")") + ")"
		}},
		{"spines", 20_000, func(n int) (string, string) {
			return "(-> " + rep(n, "(-> A ", "A", ")") + " A)", "(lam (h) (h" + strings.Repeat(" a", n) + "))"
		}},
		{"paths of paths", 100, func(n int) (string, string) {
			ty, t := "A", "a"
			for range min(n, 12) {
				ty, t = "(Path "+ty+" "+t+" "+t+")", "(line (i) "+t+")"
			}
			return ty, t
		}},
		{"transports", 0, func(n int) (string, string) { return "A", rep(n, "(transp (i A) bot ", "a", ")") }},
		{"transports at functions", 0, func(n int) (string, string) { return "(-> A A)", rep(n, "(transp (i (-> A A)) bot ", "f", ")") }},
		{"composites", 0, func(n int) (string, string) { return "A", rep(n, "(hcomp A ", "a", ")") }},
		{"composites in walls", 0, func(n int) (string, string) {
			return "(-> I A)", "(lam (i) " + rep(n, "(hcomp A a ((= i 0) (j) ", "a", "))") + ")"
		}},
		{"composites in bases", 0, func(n int) (string, string) {
			return "(-> I A)", "(lam (i) " + rep(n, "(hcomp A ", "a", " ((= i 0) (j) a))") + ")"
		}},
		{"composites in composites", 2_000, func(n int) (string, string) { return "A", rep(n, "(comp (i A) ", "a", ")") }},
		{"composites of numbers", 0, func(n int) (string, string) {
			return "(-> I Nat)", "(lam (i) " + rep(n, "(hcomp Nat ", "0", " ((= i 0) (j) 0))") + ")"
		}},
		{"glued types", 2_000, func(n int) (string, string) { return "(U 0)", rep(n, "(Glue ", "A", ")") }},
		{"glued elements", 2_000, func(n int) (string, string) { return rep(n, "(Glue ", "A", ")"), rep(n, "(glue ", "a", ")") }},
		{"equivalences", 200, func(n int) (string, string) { return "(U 0)", rep(min(n, 200), "(Equiv ", "A", " A)") }},
		{"reversals", 0, func(n int) (string, string) {
			return "(-> I A)", "(lam (i) (at loopA " + rep(n, "(rev ", "i", ")") + "))"
		}},
		{"meets and joins", 0, func(n int) (string, string) {
			return "(-> I I A)", "(lam (i j) (at loopA " + rep(n, "(min i (max j ", "i", "))") + "))"
		}},
		{"faces", 0, func(n int) (string, string) {
			return "(-> I A)", "(lam (i) (hcomp A a (" + rep(n, "(or (= i 0) (and (= i 0) ", "(= i 0)", "))") + " (k) a)))"
		}},
		{"a wide interval", 500, func(n int) (string, string) {
			var names, meets strings.Builder
			for k := range min(n, 40) {
				names.WriteString(" i" + string(rune('a'+k%26)) + strings.Repeat("x", k/26))
				if k%2 == 1 {
					p, q := k-1, k
					name := func(k int) string { return "i" + string(rune('a'+k%26)) + strings.Repeat("x", k/26) }
					meets.WriteString(" (max " + name(p) + " " + name(q) + ")")
				}
			}
			return "(-> " + strings.Repeat("I ", min(n, 40)) + "A)", "(lam (" + names.String() + ") (at loopA (min 1" + meets.String() + ")))"
		}},
	}
}

// program is a program over a number.
type program struct {
	name string
	ty   string
	text func(n string) string
	tree bool // its result is as large as the number
}

func numberPrograms() []program {
	say := func(name, ty, before, after string, tree bool) program {
		return program{name, ty, func(n string) string { return before + n + after }, tree}
	}
	return []program{
		say("a step that is affine", "Nat", "(double ", ")", false),
		say("a step that does not use its hypothesis", "Nat", "(pred ", ")", false),
		say("a step that makes a tree of its hypothesis", "Drum", "(coil ", ")", true),
		say("there and back", "Nat", "(unroll (coil ", "))", false),
		say("a step that looks at its number first", "Nat", "(elim (x Nat) ", " (zero 0) ((suc k h) (elim (y Nat) k (zero 1) ((suc k2 h2) h))))", false),
		say("functions that use their hypothesis", "Nat", "((elim (x (-> Nat Nat)) ", " (zero (lam (m) m)) ((suc k h) (lam (m) (h (suc m))))) 0)", false),
		say("functions around their hypothesis", "Nat", "((elim (x (-> Nat Nat)) ", " (zero (lam (m) m)) ((suc k h) (lam (m) (suc (h m))))) 0)", false),
		say("functions around a stuck hypothesis", "A", "((elim (x (-> A A)) ", " (zero (lam (m) m)) ((suc k h) (lam (m) (f (h m))))) a)", true),
		say("pairs of hypotheses", "Nat", "(fst (elim (x (* Nat Nat)) ", " (zero (pair 0 0)) ((suc k h) (pair (snd h) (suc (fst h))))))", false),
		say("types that nest", "(U 0)", "(elim (x (U 0)) ", " (zero A) ((suc k h) (-> h A)))", true),
		say("transports that nest", "A", "(elim (x A) ", " (zero a) ((suc k h) (transp (i A) bot h)))", true),
		say("delayed substitutions that nest", "A", "(at (elim (x (Path A a a)) ", " (zero loopA) ((suc k h) (line (i) (at h (rev i))))) 0)", false),
		say("composites that nest", "(-> I A)", "(lam (i) (elim (x A) ", " (zero a) ((suc k h) (hcomp A h ((= i 0) (j) h)))))", true),
	}
}

func readQuiet(text string) (*term.Written, error) { return notation.ReadTerm(text, "", nil) }

func setGC(percent int) int { return debug.SetGCPercent(percent) }
