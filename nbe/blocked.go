package nbe

import (
	"context"
	"fmt"
	"path/filepath"
	"strings"

	"example.com/boxwright/nbe/eval"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/quote"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Why a term does not compute further. The account is read off the normal
// form: each stuck part has at its head a variable, an assumption, a hole, or
// an operation of the theory that waits itself, and above it the eliminations
// that wait for it. In which definition an operation stands, the normal form
// does not say; the run that makes it keeps that (value/stuck.go), with nothing
// taken over from runs that did not.

// Blockage is the account of what keeps a term from computing further: one
// entry for each stuck part, outermost first. A term whose normal form is built
// from constructors alone has none.
type Blockage struct {
	Parts []Block
	More  int // how many further parts there are beyond those listed
}

// Block is the account of one stuck part.
type Block struct {
	Part    *term.Written // the stuck part itself
	Head    HeadKind      // what stands at its head
	Name    string        // the head's name, where it has one
	Waiting []Waiting     // the operations that wait for the head, innermost first
	Stands  Waiting       // of a composite or a transport at the head: where that stands
	Face    string        // the face the part stands under
	Release []Release     // what would let it go on: a face, or something for the head
	Walls   []Obstacle    // of a composite that does not push: what does not show the constructor
}

// ReleaseKind says what would let a stuck part go on.
type ReleaseKind uint8

// The kinds of releases.
const (
	ReleaseFace       ReleaseKind = iota + 1 // that one of the conjunctions of Face holds
	ReleaseValue                             // a value for the variable Name
	ReleaseDefinition                        // a definition of the assumption or hole Name
	ReleaseUnfolding                         // that the definition Name is unfolded
	ReleaseType                              // that the type Term, or the line whose body it is, shows its former
)

// Release is one thing that would let a stuck part go on.
type Release struct {
	Kind ReleaseKind
	Face interval.Face // its dimensions are levels in the part's scope
	Name string
	Term *term.Written
	text string
}

// String is the release in words.
func (r Release) String() string { return r.text }

// ObstacleKind says which part of a composite keeps it from being pushed.
type ObstacleKind uint8

// The kinds of obstacles.
const (
	ObstacleType ObstacleKind = iota + 1 // the type Term shows no former
	ObstacleBase                         // the base Term shows no constructor
	ObstacleWall                         // the wall Term on Face shows no constructor, or another one than the base
)

// Obstacle is a part of a composite that keeps it from being pushed.
type Obstacle struct {
	Kind   ObstacleKind
	Face   interval.Face // of a wall; its dimensions are levels in the part's scope
	Term   *term.Written
	Shows  string // the constructor that a wall shows, if it shows one
	Wanted string // the one that the base shows, if it shows one
	text   string
}

// String is the obstacle in words.
func (o Obstacle) String() string { return o.text }

// Waiting is an operation that waits, and where it stands.
type Waiting struct {
	Operation  string     // "an elimination of Nat", "an application"
	Definition string     // the definition in which it is written; empty for the term itself
	Place      term.Place // of that definition, or of the term
}

// String is the operation with the definition it stands in and that one's place.
func (w Waiting) String() string {
	if w.Definition == "" {
		return w.Operation
	}
	text := w.Operation + " in " + w.Definition
	if w.Place.Line > 0 {
		text += fmt.Sprintf(" (%s:%d)", filepath.Base(w.Place.File), w.Place.Line)
	}
	return text
}

// HeadKind says what stands at the head of a stuck part.
type HeadKind uint8

// The kinds of heads.
const (
	HeadVariable HeadKind = iota + 1
	HeadAssumption
	HeadHole
	HeadDefinition // kept folded or opaque
	HeadComposite
	HeadTransport
	HeadOther
)

var headNames = [...]string{"", "the variable", "the assumption", "the hole", "the definition", "a composite", "a transport", "an operation"}

// String is the kind in words.
func (k HeadKind) String() string { return headNames[k] }

// maxBlocks is how many stuck parts an account lists.
const maxBlocks = 20

// String is the account as text, a line for each stuck part.
func (b *Blockage) String() string {
	if len(b.Parts) == 0 {
		return "nothing blocks it: the normal form is built from constructors"
	}
	var lines []string
	for _, p := range b.Parts {
		line := p.Part.String() + ": " + p.Head.String()
		if p.Name != "" {
			line += " " + p.Name
		}
		if p.Stands.Definition != "" {
			line += p.Stands.String()
		}
		var waiting []string
		for _, w := range p.Waiting {
			waiting = append(waiting, w.String())
		}
		switch {
		case len(waiting) > 0:
			line += " keeps " + strings.Join(waiting, ", ") + " waiting"
		case p.Head == HeadComposite || p.Head == HeadTransport || p.Head == HeadOther:
			line += " waits itself"
		default:
			line += " has no value"
		}
		for _, w := range p.Walls {
			line += "; " + w.String()
		}
		if p.Face != "top" {
			line += "; on the face " + p.Face
		}
		if len(p.Release) > 0 {
			var release []string
			for _, r := range p.Release {
				release = append(release, r.String())
			}
			line += "; it goes on with " + strings.Join(release, " or ")
		}
		lines = append(lines, line)
	}
	if b.More > 0 {
		lines = append(lines, fmt.Sprintf("and %d further stuck parts", b.More))
	}
	return strings.Join(lines, "\n")
}

// Blocked tells what keeps t from computing further. The options are those of Normal.
func (s *Scope) Blocked(ctx context.Context, t *Term, options ...CallOption) (*Blockage, error) {
	o := gather(options)
	o.stuck = true
	forms, err := s.forms(ctx, t, o, func(q *quote.Reader, t, v value.Value) term.Core { return q.Term(t, v) })
	if err != nil {
		return nil, err
	}
	b := &Blockage{}
	for k := range forms {
		w := &blockWalk{s: s, out: b, seen: map[*term.Op]bool{}, trace: o.trace}
		w.visit(forms[k].Term, blockScope{names: forms[k].names.Variables, dims: forms[k].dims, face: forms[k].Face})
	}
	return b, nil
}

// blockScope is the scope of a part: names, and the face it stands under.
type blockScope struct {
	names, dims []string
	face        interval.Face
}

type blockWalk struct {
	s    *Scope
	out  *Blockage
	seen map[*term.Op]bool
	// trace knows in which definitions the parts got stuck
	trace *value.Trace
}

// waiting is an operation that waits, with where it stands.
func (w *blockWalk) waiting(operation string, c term.Core) Waiting {
	out := Waiting{Operation: operation}
	if s := w.trace.StuckAt(c); s != nil {
		out.Place = s.Place
		if s.Kind == value.SiteDefinition {
			out.Definition = s.Name
		}
	}
	return out
}

type blockTask struct {
	arg  term.Arg
	slot term.Slot
	x    blockScope
}

// visit walks a normal form outside in, with a list of work of its own.
func (w *blockWalk) visit(c term.Core, x blockScope) {
	work := []blockTask{{c, term.Slot{}, x}}
	for len(work) > 0 {
		t := work[len(work)-1]
		work = work[:len(work)-1]
		var next []blockTask
		switch a := t.arg.(type) {
		case *term.Variable, *term.Global:
			if t.arg == term.Arg(c) { // inside others, a bare name is a value like any
				w.stuck(c, t.x)
			}
		case *term.Op:
			if w.seen[a] {
				continue
			}
			w.seen[a] = true
			if w.isStuck(a) {
				w.stuck(a, t.x)
			}
			for k, arg := range a.Args {
				if slot := a.Sig.SlotOf(k); !slot.Silent && !(w.isStuck(a) && k == w.principal(a)) {
					next = append(next, blockTask{arg, slot.Slot, t.x})
				}
			}
		case *term.Bound:
			next = append(next, blockTask{a.Body, term.Slot{}, t.x.under(a, t.slot)})
		case term.Rows:
			for _, row := range a {
				x := t.x
				for k, arg := range row {
					if f, ok := arg.(*term.Face); ok {
						x.face = x.face.And(f.Face)
						continue
					}
					slot := term.Slot{}
					if k < len(t.slot.Rows) {
						slot = t.slot.Rows[k]
					}
					next = append(next, blockTask{arg, slot, x})
				}
			}
		}
		for k := len(next) - 1; k >= 0; k-- {
			work = append(work, next[k])
		}
	}
}

// under is the scope under the binders of b.
func (x blockScope) under(b *term.Bound, slot term.Slot) blockScope {
	names := append([]string(nil), x.names...)
	dims := append([]string(nil), x.dims...)
	for k, hint := range b.Hints {
		dimension := k >= len(b.Hints)-b.Dimensions
		if !slot.Many && k < len(slot.Binds) {
			dimension = slot.Binds[k] == term.DimensionSort
		}
		if dimension {
			dims = append(dims, distinct(hint, "i", names, dims))
		} else {
			names = append(names, distinct(hint, "x", names, dims))
		}
	}
	return blockScope{names, dims, x.face}
}

// distinct is hint, or a variant of it that no name in scope is.
func distinct(hint, standard string, taken ...[]string) string {
	if hint == "" || hint == "_" {
		hint = standard
	}
	name := hint
	for n := 1; ; n++ {
		free := true
		for _, list := range taken {
			for _, t := range list {
				free = free && t != name
			}
		}
		if free {
			return name
		}
		name = fmt.Sprint(hint, n)
	}
}

// principal is the argument that an operator waits for, -1 for those that
// build; a transport and a composite in normal form wait for something within.
func (w *blockWalk) principal(c *term.Op) int {
	if c.Sig.Name == "transp" {
		return 2
	}
	if e, ok := w.s.e.ops[c.Sig].(eval.Eliminator); ok {
		return e.Principal()
	}
	return -1
}

func (w *blockWalk) isStuck(c *term.Op) bool {
	if w.principal(c) >= 0 {
		return true
	}
	return c.Sig.Name == "hcomp" && !w.formal(c)
}

// formal reports whether a composite stands in a data type with formal composites.
func (w *blockWalk) formal(c *term.Op) bool {
	t, ok := c.Args[0].(*term.Op)
	if !ok || t.Sig.Name != "data" {
		return false
	}
	d, ok := t.Args[0].(term.Reference).Target.(interface{ HasFormalComposites() bool })
	return ok && d.HasFormalComposites()
}

// waitings are the names of what waits, in the words of the theory.
var waitings = map[string]string{
	"app": "an application", "fst": "a first projection", "snd": "a second projection", "at": "a path at a dimension",
	"unglue": "unglue", "transp": "a transport", "hcomp": "a composite",
}

func (w *blockWalk) stuck(c term.Core, x blockScope) {
	if len(w.out.Parts) == maxBlocks {
		w.out.More++
		return
	}
	b := Block{Face: faceText(x.face, x.dims)}
	b.Part = w.write(c, x)
	release := interval.Bot()
	var waiting []Waiting
	for {
		o, ok := c.(*term.Op)
		if !ok {
			break
		}
		k := w.principal(o)
		if o.Sig.Name == "transp" {
			release = release.Or(o.Args[1].(*term.Face).Face)
			line := o.Args[0].(*term.Bound)
			if !w.isData(line.Body) {
				b.Head, b.Stands = HeadTransport, w.waiting("", o)
				t := w.write(line.Body, x.under(line, o.Sig.Slots[0].Slot))
				b.Release = append(b.Release, Release{Kind: ReleaseType, Term: t, text: "a type for its line " + t.String()})
				break
			}
		}
		if k < 0 {
			break
		}
		name := waitings[o.Sig.Name]
		if name == "" {
			name = "an " + o.Sig.Name
		}
		if r, ok := o.Args[0].(term.Reference); ok {
			name = "an elimination of " + r.Name
		}
		waiting = append(waiting, w.waiting(name, o))
		if d, ok := o.Args[len(o.Args)-1].(term.Dimension); ok && o.Sig.Name == "at" {
			release = release.Or(d.Is0()).Or(d.Is1())
		}
		if rows, ok := o.Args[len(o.Args)-1].(term.Rows); ok && o.Sig.Name == "unglue" {
			for _, row := range rows {
				release = release.Or(row[0].(*term.Face).Face)
			}
		}
		c = o.Args[k].(term.Core)
	}
	for k := len(waiting) - 1; k >= 0; k-- {
		b.Waiting = append(b.Waiting, waiting[k])
	}
	w.head(&b, c, x, &release)
	if !release.IsBot() {
		b.Release = append([]Release{{Kind: ReleaseFace, Face: release, text: "the face " + faceText(release, x.dims)}}, b.Release...)
	}
	w.out.Parts = append(w.out.Parts, b)
}

func (w *blockWalk) isData(c term.Core) bool {
	o, ok := c.(*term.Op)
	return ok && o.Sig.Name == "data"
}

// head describes what stands at the head of a stuck part.
func (w *blockWalk) head(b *Block, c term.Core, x blockScope, release *interval.Face) {
	switch h := c.(type) {
	case *term.Variable:
		b.Head = HeadVariable
		if h.Level < len(x.names) {
			b.Name = x.names[h.Level]
		}
		b.Release = append(b.Release, Release{Kind: ReleaseValue, Name: b.Name, text: "a value for " + b.Name})
	case *term.Global:
		b.Head, b.Name = HeadDefinition, h.Name
		if d, ok := w.s.e.lookup(h.Name).(*definition); ok && !d.defined() {
			b.Head = HeadAssumption
			if d.hole {
				b.Head = HeadHole
			}
			b.Release = append(b.Release, Release{Kind: ReleaseDefinition, Name: h.Name, text: "a definition of " + h.Name})
		} else {
			b.Release = append(b.Release, Release{Kind: ReleaseUnfolding, Name: h.Name, text: "unfolding " + h.Name})
		}
	case *term.Op:
		if b.Head != 0 {
			return
		}
		b.Head = HeadOther
		if h.Sig.Name != "hcomp" {
			return
		}
		b.Head, b.Stands = HeadComposite, w.waiting("", h)
		w.composite(b, h, x, release)
	}
}

// composite says of a composite that does not push what does not show a constructor.
func (w *blockWalk) composite(b *Block, h *term.Op, x blockScope, release *interval.Face) {
	rows, _ := h.Args[2].(term.Rows)
	for _, row := range rows {
		*release = release.Or(row[0].(*term.Face).Face)
	}
	if !w.isData(h.Args[0].(term.Core)) {
		t := w.write(h.Args[0].(term.Core), x)
		b.Walls = append(b.Walls, Obstacle{Kind: ObstacleType, Term: t, text: "its type " + t.String() + " shows no former"})
		b.Release = append(b.Release, Release{Kind: ReleaseType, Term: t, text: "a type for " + t.String()})
		return
	}
	shows := func(c term.Core) string {
		if o, ok := c.(*term.Op); ok {
			switch o.Sig.Name {
			case "con":
				return o.Args[0].(term.Reference).Name
			case "numeral":
				return o.Args[0].(term.Number).String()
			}
		}
		return ""
	}
	base := shows(h.Args[1].(term.Core))
	if base == "" {
		t := w.write(h.Args[1].(term.Core), x)
		b.Walls = append(b.Walls, Obstacle{Kind: ObstacleBase, Term: t, text: "its base " + t.String() + " shows no constructor"})
	}
	for _, row := range rows {
		face, line := row[0].(*term.Face), row[1].(*term.Bound)
		under := x
		under.face = face.Face
		under = under.under(line, term.Slot{Binds: []term.Sort{term.DimensionSort}})
		wall := shows(line.Body)
		o := Obstacle{Kind: ObstacleWall, Face: face.Face, Term: w.write(line.Body, under), Shows: wall, Wanted: base}
		switch on := faceText(face.Face, x.dims); {
		case wall == "":
			o.text = "its wall on " + on + ", " + o.Term.String() + ", shows no constructor"
		case base != "" && wall != base:
			o.text = "its wall on " + on + " shows " + wall + ", not " + base
		default:
			continue
		}
		b.Walls = append(b.Walls, o)
	}
}

func (w *blockWalk) write(c term.Core, x blockScope) *term.Written {
	out, err := term.Write(c, term.Names{Variables: x.names, Dimensions: x.dims, Taken: w.s.e.notation.Taken, Size: shown})
	if err != nil {
		return &term.Written{Kind: term.NameKind, Word: "…"}
	}
	return out
}
