package main

import (
	"context"
	"fmt"
	"math/big"

	"example.com/boxwright/examples/library"
	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/term"
)

// quay is an engine with the library's circle and univalence loaded.
type quay struct{ e *nbe.Engine }

// limits are wide enough for a log of some millions of turns.
var limits = nbe.Within(nbe.Limits{Steps: 1 << 40, Depth: nbe.MaxDepth, Memory: 1 << 42})

func newQuay(ctx context.Context) (*quay, error) {
	e, err := nbe.New()
	if err != nil {
		return nil, err
	}
	if err := library.Load(ctx, e, "circle"); err != nil {
		return nil, err
	}
	return &quay{e}, nil
}

// loop is a log as a loop of the circle: its turns one after the other. They
// are put together as a balanced tree, so that the term is not as deep as the
// log is long.
func loop(log []Turn) *term.Written {
	var leaves []*term.Written
	forward, back := term.Name("turn-once"), term.Name("turn-back")
	for _, t := range log {
		for range max(t.By, -t.By) {
			if t.By > 0 {
				leaves = append(leaves, forward)
			} else {
				leaves = append(leaves, back)
			}
		}
	}
	if len(leaves) == 0 {
		return term.Name("rest")
	}
	then := term.Name("then")
	for len(leaves) > 1 {
		half := leaves[:0]
		for k := 0; k < len(leaves); k += 2 {
			if k+1 == len(leaves) {
				half = append(half, leaves[k])
			} else {
				half = append(half, term.Apply(then, leaves[k], leaves[k+1]))
			}
		}
		leaves = half
	}
	return leaves[0]
}

// netTurns is the winding number of the log's loop.
func (q *quay) netTurns(ctx context.Context, log []Turn) (*big.Int, nbe.Stats, error) {
	var stats nbe.Stats
	s := q.e.Scope()
	t, err := s.Infer(ctx, term.Apply(term.Name("winding"), loop(log)), limits)
	if err != nil {
		return nil, stats, err
	}
	view, err := t.Value().View(ctx, limits, nbe.Count(&stats))
	if err != nil {
		return nil, stats, err
	}
	n, err := natural(ctx, view.Parts)
	if err != nil {
		return nil, stats, err
	}
	if view.Head == "negsuc" { // negsuc n is -1-n
		n = new(big.Int).Not(n)
	}
	return n, stats, nil
}

// natural is the one part of a view, which is a numeral.
func natural(ctx context.Context, parts []*nbe.Value) (*big.Int, error) {
	if len(parts) != 1 {
		return nil, fmt.Errorf("an integer has one part, not %d", len(parts))
	}
	view, err := parts[0].View(ctx, limits)
	if err != nil {
		return nil, err
	}
	if view.Head != "numeral" {
		return nil, fmt.Errorf("expected a numeral, found %s", view.Head)
	}
	return view.Number, nil
}

func bay(k int) string { return fmt.Sprintf("bay-%d", k+1) }

// onBays is the function from bays that gives each the term at its place.
func onBays(family *term.Written, results []*term.Written) *term.Written {
	var cases []term.Row
	for k, r := range results {
		cases = append(cases, term.Case(bay(k), r))
	}
	return term.Lam(term.Elim("x", family, term.Name("b"), cases...), "b")
}

// carryInventory carries the inventory, a function from bays to numbers, along
// the path of types that the relabelling makes by univalence.
func (q *quay) carryInventory(ctx context.Context, b *Bays) ([]int, error) {
	e := q.e.Fork() // the bays of this sheet are this sheet's alone
	n := len(b.Crates)
	sheet := &term.Declaration{Name: "Bay"}
	becomes, came, crates := make([]*term.Written, n), make([]*term.Written, n), make([]*term.Written, n)
	stays := make([]*term.Written, n) // the constant path at each bay
	for k := range n {
		sheet.Constructors = append(sheet.Constructors, term.Constructor{Name: bay(k)})
		becomes[k] = term.Name(bay(b.Becomes[k]))
		came[b.Becomes[k]] = term.Name(bay(k))
		crates[k] = term.Numeral(uint64(b.Crates[k]))
		stays[k] = term.Line(term.Name(bay(k)), "i")
	}
	if err := e.Declare(ctx, sheet); err != nil {
		return nil, err
	}
	bays, nat, x := term.Name("Bay"), term.Name("Nat"), term.Name("x")
	undone := func(f, g string) *term.Written { // Path Bay (f (g x)) x
		return term.Path(bays, term.Apply(term.Name(f), term.Apply(term.Name(g), x)), x)
	}
	homotopy := func(f, g string) *term.Written {
		return term.Pi("x", bays, undone(f, g))
	}
	for _, d := range []struct {
		name  string
		ty, t *term.Written
	}{
		{"becomes", term.Arrow(bays, bays), onBays(bays, becomes)},
		{"came-from", term.Arrow(bays, bays), onBays(bays, came)},
		{"there-and-back", homotopy("becomes", "came-from"), onBays(undone("becomes", "came-from"), stays)},
		{"back-and-there", homotopy("came-from", "becomes"), onBays(undone("came-from", "becomes"), stays)},
		{"relabelling", term.Path(term.Universe(0), bays, bays), term.Apply(term.Name("ua"), bays, bays,
			term.Apply(term.Name("quasi-inverse"), bays, bays, term.Name("becomes"), term.Name("came-from"), term.Name("there-and-back"), term.Name("back-and-there")))},
		{"inventory", term.Arrow(bays, nat), onBays(nat, crates)},
		{"carried", term.Arrow(bays, nat), term.Transp("i", term.Arrow(term.At(term.Name("relabelling"), term.Name("i")), nat), term.Bot(), term.Name("inventory"))},
	} {
		if err := e.Define(ctx, d.name, d.ty, d.t, limits); err != nil {
			return nil, fmt.Errorf("%s: %w", d.name, err)
		}
	}
	out := make([]int, n)
	for k := range out {
		t, err := e.Scope().Infer(ctx, term.Apply(term.Name("carried"), term.Name(bay(k))), limits)
		if err != nil {
			return nil, err
		}
		crates, err := natural(ctx, []*nbe.Value{t.Value()})
		if err != nil {
			return nil, err
		}
		out[k] = int(crates.Int64())
	}
	return out, nil
}
