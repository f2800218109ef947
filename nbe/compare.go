package nbe

import (
	"context"
	"fmt"
	"strings"

	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/quote"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Verdict is the outcome of a comparison.
type Verdict = quote.Verdict

// The verdicts.
const (
	Different = quote.Different
	Equal     = quote.Equal
	Undecided = quote.Undecided
)

// Comparison is a verdict and, where the two differ, the account of where.
type Comparison struct {
	Verdict    Verdict
	Difference *Difference
	Hole       string // what an undecided comparison waits for
}

// Difference says where two terms differ.
type Difference struct {
	Way         []string // the way into both terms, outermost first
	Face        string   // the face it is under
	Variables   []string // names in scope of the parts
	Dimensions  []string
	Left, Right *term.Written // the two smallest parts that differ, if they are terms
	LeftText    string        // the same where they are not
	RightText   string
	face        interval.Face
}

// String tells the difference in one line.
func (d *Difference) String() string {
	if d == nil {
		return "no difference"
	}
	left, right := d.LeftText, d.RightText
	if d.Left != nil {
		left, right = d.Left.String(), d.Right.String()
	}
	var b strings.Builder
	if len(d.Way) > 0 {
		b.WriteString("at " + strings.Join(d.Way, ", ") + ": ")
	}
	b.WriteString(left + " is not " + right)
	if d.Face != "top" {
		b.WriteString(" on the face " + d.Face)
	}
	return b.String()
}

func (e *Engine) difference(run *value.Run, d *quote.Difference) *Difference {
	if d == nil {
		return nil
	}
	d.Names, d.DimensionNames = apart(d.Names, "x", nil), apart(d.DimensionNames, "i", d.Names)
	out := &Difference{Way: d.Way, Face: faceText(d.Face, d.DimensionNames), Variables: d.Names, Dimensions: d.DimensionNames, LeftText: d.LeftText, RightText: d.RightText, face: d.Face}
	if d.Left == nil {
		return out
	}
	read := func(v value.Value) *term.Written {
		q := quote.NewReader(run, d.Variables, d.Dimensions, keepAll)
		var core term.Core
		if d.Type == nil {
			core = q.Type(v)
		} else {
			core = q.Term(d.Type, v)
		}
		w, err := term.Write(core, term.Names{Variables: d.Names, Dimensions: d.DimensionNames, Taken: e.notation.Taken, Size: shown})
		if err != nil {
			return &term.Written{Kind: term.NameKind, Word: "…"}
		}
		return w
	}
	out.Left, out.Right = read(d.Left), read(d.Right)
	return out
}

// apart are names for what is in scope of a difference, each another: binders
// that the terms leave without a name get one, for nobody could tell them apart.
func apart(names []string, standard string, others []string) []string {
	taken := make(map[string]bool, len(names)+len(others))
	for _, n := range others {
		taken[n] = true
	}
	out := make([]string, len(names))
	for k, n := range names {
		if n == "_" {
			n = standard
		}
		free := n
		for j := 1; taken[free]; j++ {
			free = fmt.Sprint(n, j)
		}
		taken[free] = true
		out[k] = free
	}
	return out
}

func (c *checker) difference(d *quote.Difference) *Difference { return c.e.difference(c.run, d) }

// Compare decides whether a and b, which have been checked in this scope, are
// equal by definition at the type of a. With Inclusion, two types are compared
// at ≤. Where the scope assumes several conjunctions it must hold under each.
func (s *Scope) Compare(ctx context.Context, a, b *Term, options ...CallOption) (result Comparison, err error) {
	if err := s.owns(a, b); err != nil {
		return Comparison{}, err
	}
	o := gather(options)
	err = s.engine().call(ctx, o.as(value.ComparingSite, &a.site), func(run *value.Run) {
		result.Verdict = Equal
		for k, x := range s.cases {
			cmp := quote.NewComparer(run, x.variableNames(), x.dimensionNames(), isHole)
			l, r := a.cases[k], b.cases[k]
			lv, rv := l.v, r.v
			if len(o.opaque) > 0 {
				lv, rv = s.e.evaluate(run, l.core, x), s.e.evaluate(run, r.core, x)
			}
			var v Verdict
			if o.inclusion {
				s.isType(run, l.t)
				s.isType(run, r.t)
				v = cmp.Included(lv, rv)
			} else {
				v = cmp.EqualAt(l.t, lv, rv)
			}
			if v != Equal {
				result = Comparison{Verdict: v, Difference: s.e.difference(run, cmp.Difference())}
				if v == Undecided {
					result.Hole = cmp.Blocked().GlobalName()
				}
				return
			}
		}
	})
	if err != nil {
		return Comparison{}, err
	}
	return result, nil
}

// CompareAt checks two written terms at a type and compares them.
func (s *Scope) CompareAt(ctx context.Context, ty, a, b *term.Written, options ...CallOption) (Comparison, error) {
	t, err := s.formed(ctx, ty, options)
	if err != nil {
		return Comparison{}, err
	}
	x, err := s.CheckAt(ctx, a, t, options...)
	if err != nil {
		return Comparison{}, err
	}
	y, err := s.CheckAt(ctx, b, t, options...)
	if err != nil {
		return Comparison{}, err
	}
	return s.Compare(ctx, x, y, options...)
}

// formed elaborates a type, and blames its place where it is none.
func (s *Scope) formed(ctx context.Context, ty *term.Written, options []CallOption) (t *Term, err error) {
	t, err = s.Infer(ctx, ty, options...)
	if err != nil {
		return nil, err
	}
	err = s.engine().call(ctx, gather(options), func(run *value.Run) {
		for k, x := range s.cases {
			if _, ok := run.Force(t.cases[k].t).(*prims.Universe); !ok {
				c := s.e.checker(run, x.clone())
				c.Fail(ty, term.IllTyped, "this is no type", "a type", c.ShowType(t.cases[k].t))
			}
		}
	})
	return t, err
}
