package term

import (
	"sort"
	"strconv"
	"strings"
)

// The names of bound variables.
//
// A name must not capture: inside the scope of a binder called x nothing else
// that is written x may occur. Of all binders in scope that are called x only
// the innermost can occur at all (the outer ones would have been captured by
// it), so a candidate is tried against that one alone: does it occur in the
// new binder's scope? Occurrences are numbered in the order of writing, a scope
// is an interval of those numbers, and the question is a binary search. Globals
// and constructors are tried in the same way.

// naming holds the binders and mentioned names of a term in the order of writing.
type naming struct {
	bounds   []bound
	events   []int // a binder's index where its scope opens, -1 where the latest one's closes
	open     []int // the binders whose scope is open
	clock    int   // occurrences so far
	mentions map[string]*occurrences
}

// occurrences are the numbers of the places where one thing occurs, ascending, and its only node.
type occurrences struct {
	at   []int
	node *Written
}

// within reports whether one of the numbers from first up to end is among them.
func (o *occurrences) within(first, end int) bool {
	k := sort.SearchInts(o.at, first)
	return k < len(o.at) && o.at[k] < end
}

// bound is a binder: of the scope (binder is nil) or of the term.
type bound struct {
	occurrences
	hint       string
	dimension  bool
	first      bool // the first of the names that one body stands under
	binder     *Binder
	part       *Part
	form       *Written // the form that becomes unused when the name is not used
	unused     string
	start, end int // its scope
	group      int // the first binder of its body
	// What the name hid, and how the counter of its stem stood, to put both back.
	name      string
	hidden    int
	stem      string
	stemCount int
}

// bind opens the scope of b and returns its index.
func (n *naming) bind(b bound) int {
	k := len(n.bounds)
	b.start = n.clock
	b.group = k
	if !b.first && k > 0 {
		b.group = n.bounds[k-1].group
	}
	n.bounds = append(n.bounds, b)
	n.events = append(n.events, k)
	n.open = append(n.open, k)
	return k
}

// release closes the scopes of the latest open binders.
func (n *naming) release(count int) {
	for ; count > 0; count-- {
		n.bounds[n.open[len(n.open)-1]].end = n.clock
		n.open = n.open[:len(n.open)-1]
		n.events = append(n.events, -1)
	}
}

// occurrence returns the node that names a binder, and notes that it stands here.
func (n *naming) occurrence(k int) *Written { return n.bounds[k].note(n) }

// mention returns the node of a global, a data type or a constructor, and notes that it stands here.
func (n *naming) mention(name string) *Written {
	o := n.mentions[name]
	if o == nil {
		if n.mentions == nil {
			n.mentions = map[string]*occurrences{}
		}
		o = &occurrences{}
		n.mentions[name] = o
	}
	w := o.note(n)
	w.Word = name
	return w
}

func (o *occurrences) note(n *naming) *Written {
	if o.node == nil {
		o.node = &Written{Kind: NameKind}
	}
	o.at = append(o.at, n.clock)
	n.clock++
	return o.node
}

// openScope binds the variables and dimensions of the scope.
func (w *writer) openScope(names Names) {
	for _, name := range names.Variables {
		w.variables = append(w.variables, w.bind(bound{hint: name, first: true}))
	}
	for _, name := range names.Dimensions {
		w.dimensions = append(w.dimensions, w.bind(bound{hint: name, first: true, dimension: true}))
	}
}

// choose gives every binder its name.
func (w *writer) choose() {
	w.release(len(w.open))
	c := chooser{
		naming: &w.naming, taken: w.taken,
		inScope: map[string]int{}, counts: map[string]int{}, last: map[string]int{},
	}
	for k, b := range w.bounds {
		if b.binder == nil {
			c.last[b.hint] = k
		}
	}
	for _, k := range w.events {
		if w.watch.Ended(1) {
			return
		}
		if k < 0 {
			c.close()
		} else {
			c.name(k)
		}
	}
}

// chooser holds the state of the second pass.
type chooser struct {
	*naming
	taken   func(string) bool
	inScope map[string]int // the innermost binder of each name, plus one
	counts  map[string]int // for each stem, the number last put behind it, within the scope at hand
	last    map[string]int // for each name of the scope, the last binder that has it
	stack   []int          // the binders whose scope is open
}

// name chooses the name of binder k and puts it where it stands.
func (c *chooser) name(k int) {
	b := &c.bounds[k]
	c.stack = append(c.stack, k)
	switch {
	case b.binder == nil:
		if b.name = b.hint; c.last[b.hint] != k || !c.usable(b.hint) || c.mentions[b.hint] != nil {
			// Hidden by a later name of the scope, hiding what the term mentions, or
			// no name: better that it reads back as nothing than as something else.
			c.variant(k, stemOf(b.hint))
		}
	case b.unused != "" && len(b.at) == 0:
		b.form.Word = b.unused
		b.part.Binders = nil
		b.hidden = -1
		return
	default:
		c.pick(k)
		b.binder.Name = b.name
	}
	b.hidden = c.inScope[b.name]
	c.inScope[b.name] = k + 1
	if b.node != nil {
		b.node.Word = b.name
	}
}

// close ends the scope of the innermost binder.
func (c *chooser) close() {
	b := &c.bounds[c.stack[len(c.stack)-1]]
	c.stack = c.stack[:len(c.stack)-1]
	if b.hidden < 0 {
		return
	}
	c.inScope[b.name] = b.hidden
	if b.stem != "" {
		c.counts[b.stem] = b.stemCount
	}
}

// pick chooses the name of a binder of the term.
func (c *chooser) pick(k int) {
	b := &c.bounds[k]
	hint := b.hint
	blank := hint == "_" || !IsWord(hint)
	if blank && len(b.at) == 0 {
		hint, blank = "_", false
	}
	if !blank {
		if b.name = hint; !c.free(k, hint) {
			c.variant(k, stemOf(hint))
		}
		return
	}
	plain := plainVariables
	if b.dimension {
		plain = plainDimensions
	}
	for _, s := range plain {
		// A name of the writer's own making hides nothing, used or not.
		if b.name = s; c.inScope[s] == 0 && c.free(k, s) {
			return
		}
	}
	c.variant(k, plain[0])
}

// The names for what has none, in the order of preference; never written to.
var (
	plainVariables  = []string{"x", "y", "z"}
	plainDimensions = []string{"i", "j", "k"}
)

// variant names binder k by the stem with the next number behind it that is
// free. The numbers go on from those in scope, so a nest of n binders of one
// stem is named in n steps.
func (c *chooser) variant(k int, stem string) {
	b := &c.bounds[k]
	b.stem, b.stemCount = stem, c.counts[stem]
	n := b.stemCount
	for {
		n++
		if b.name = stem + strconv.Itoa(n); c.inScope[b.name] == 0 && c.free(k, b.name) {
			break
		}
	}
	c.counts[stem] = n
}

// stemOf is the name without the digits at its end; a stem is not empty and no number.
func stemOf(name string) string {
	if stem := strings.TrimRight(name, "0123456789"); IsWord(stem) {
		return stem
	}
	return "x"
}

// usable reports whether s is a name.
func (c *chooser) usable(s string) bool { return IsName(s) && (c.taken == nil || !c.taken(s)) }

// free reports whether nothing is captured when binder k is called s.
func (c *chooser) free(k int, s string) bool {
	b := &c.bounds[k]
	if !c.usable(s) {
		return false
	}
	if o := c.mentions[s]; o != nil && o.within(b.start, b.end) {
		return false
	}
	// The scope's own names are all in scope before any other, so a variant must not take one of them.
	if last, ok := c.last[s]; ok && b.binder == nil && last != k {
		return false
	}
	inner := c.inScope[s] - 1
	if inner < 0 {
		return true
	}
	if c.bounds[inner].group == b.group && s != "_" {
		return false
	}
	return !c.bounds[inner].within(b.start, b.end)
}
