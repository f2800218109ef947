package term

import (
	"context"

	"example.com/boxwright/nbe/internal/watch"
)

// Sameness of terms.
//
// Core terms are graphs that may be exponentially larger as trees, so the
// comparison joins the nodes that must be equal into classes, and compares two
// nodes of one class only once. A wrong guess does no harm: then some pair of
// nodes differs, and that pair is reached. The walk keeps its own list of work.

// Same reports whether a and b are the same core term up to hints and to
// annotations that are not written: with
// variables and dimensions numbered by level, that is up to bound names. Cost:
// nearly linear in the number of distinct nodes of both, however large they
// are as trees; nesting costs no stack. Safe for concurrent use.
//
// A call on terms that are not known to be small is better made with
// [SameContext], which can be stopped.
func Same(a, b Core) bool { return same(a, b, nil) }

// SameContext is [Same] in a context, whose end is the error Cancelled.
func SameContext(ctx context.Context, a, b Core) (bool, error) {
	w := watch.Of(ctx)
	answer := same(a, b, w)
	if w.Cause() != nil {
		return false, ended(w)
	}
	return answer, nil
}

func same(a, b Core, w *watch.Watch) bool {
	c := comparison{class: classes[*Op]{}}
	c.todo = append(c.todo, [2]Arg{a, b})
	for len(c.todo) > 0 && !w.Ended(1) {
		next := c.todo[len(c.todo)-1]
		c.todo = c.todo[:len(c.todo)-1]
		if !c.agree(next[0], next[1]) {
			return false
		}
	}
	return true
}

// classes holds, for a node that has been compared, another one of its class;
// the root of a class has none.
type classes[N comparable] map[N]N

// root returns the root of n's class, halving the way to it.
func (c classes[N]) root(n N) N {
	for {
		up, ok := c[n]
		if !ok {
			return n
		}
		if upper, ok := c[up]; ok {
			c[n] = upper
		}
		n = up
	}
}

// join makes one class of two and reports whether they were one already.
func (c classes[N]) join(a, b N) bool {
	if a, b = c.root(a), c.root(b); a == b {
		return true
	}
	c[a] = b
	return false
}

// comparison holds the pairs still to be compared.
type comparison struct {
	todo  [][2]Arg
	class classes[*Op]
}

// agree compares a and b as far as they lie open and puts their parts on the list.
func (c *comparison) agree(a, b Arg) bool {
	switch a := a.(type) {
	case *Variable:
		b, ok := b.(*Variable)
		return ok && a.Level == b.Level
	case *Global:
		b, ok := b.(*Global)
		return ok && a.Name == b.Name
	case *Op:
		b, ok := b.(*Op)
		return ok && c.operators(a, b)
	case *Bound:
		b, ok := b.(*Bound)
		if !ok {
			return false
		}
		if a != b {
			if len(a.Hints) != len(b.Hints) {
				return false
			}
			c.todo = append(c.todo, [2]Arg{a.Body, b.Body})
		}
		return true
	case Dimension:
		b, ok := b.(Dimension)
		return ok && a.Equal(b.Dim)
	case *Face:
		b, ok := b.(*Face)
		return ok && (a == b || a.Equal(b.Face))
	case Rows:
		b, ok := b.(Rows)
		if !ok || len(a) != len(b) {
			return false
		}
		for k := range a {
			if !c.all(a[k], b[k]) {
				return false
			}
		}
		return true
	case Level:
		b, ok := b.(Level)
		return ok && a == b
	case Number:
		b, ok := b.(Number)
		return ok && (a.Int == b.Int || a.Int != nil && b.Int != nil && a.Cmp(b.Int) == 0)
	case Reference:
		// A name is declared once in an engine, so the target needs no look.
		b, ok := b.(Reference)
		return ok && a.Name == b.Name && a.Index == b.Index
	}
	return a == nil && b == nil
}

func (c *comparison) operators(a, b *Op) bool {
	if a == b {
		return true
	}
	if a.Sig != b.Sig || len(a.Args) != len(b.Args) {
		return false
	}
	if len(a.Args) == 0 || c.class.join(a, b) {
		return true
	}
	for k := len(a.Args) - 1; k >= 0; k-- {
		// what is silent follows from the rest: a checker may have left
		// definitions folded in it that a normal form unfolds
		if !a.Sig.silent(k) {
			c.todo = append(c.todo, [2]Arg{a.Args[k], b.Args[k]})
		}
	}
	return true
}

func (c *comparison) all(a, b []Arg) bool {
	if len(a) != len(b) {
		return false
	}
	for k := len(a) - 1; k >= 0; k-- {
		c.todo = append(c.todo, [2]Arg{a[k], b[k]})
	}
	return true
}

// Same reports whether w and v are the same tree, places aside. Names count:
// two terms that differ in their bound names are not the same here. Cost as for
// the [Same] of core terms.
func (w *Written) Same(v *Written) bool { return sameWritten(w, v, nil) }

// SameContext is Same in a context, whose end is the error Cancelled.
func (w *Written) SameContext(ctx context.Context, v *Written) (bool, error) {
	eye := watch.Of(ctx)
	answer := sameWritten(w, v, eye)
	if eye.Cause() != nil {
		return false, ended(eye)
	}
	return answer, nil
}

func sameWritten(w, v *Written, eye *watch.Watch) bool {
	class := classes[*Written]{}
	todo := [][2]*Written{{w, v}}
	for len(todo) > 0 && !eye.Ended(1) {
		w, v := todo[len(todo)-1][0], todo[len(todo)-1][1]
		todo = todo[:len(todo)-1]
		if w == v {
			continue
		}
		if w == nil || v == nil || w.Kind != v.Kind || w.Word != v.Word || (w.Number == nil) != (v.Number == nil) ||
			w.Number != nil && w.Number.Cmp(v.Number) != 0 {
			return false
		}
		if len(w.Parts) == 0 && len(v.Parts) == 0 || class.join(w, v) {
			continue
		}
		rows := [][2][]Part{{w.Parts, v.Parts}}
		for len(rows) > 0 {
			a, b := rows[len(rows)-1][0], rows[len(rows)-1][1]
			rows = rows[:len(rows)-1]
			if len(a) != len(b) {
				return false
			}
			for k := range a {
				if len(a[k].Rows) != len(b[k].Rows) || !sameBinders(a[k].Binders, b[k].Binders) {
					return false
				}
				for j := range a[k].Rows {
					rows = append(rows, [2][]Part{a[k].Rows[j], b[k].Rows[j]})
				}
				todo = append(todo, [2]*Written{a[k].Body, b[k].Body})
			}
		}
	}
	return true
}

func sameBinders(a, b []Binder) bool {
	if len(a) != len(b) {
		return false
	}
	for k := range a {
		if a[k].Name != b[k].Name {
			return false
		}
	}
	return true
}
