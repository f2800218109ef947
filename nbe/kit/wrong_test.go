package kit_test

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/require"

	"example.com/boxwright/nbe/kit"
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// The formers of this file's wrong ones pass with their rules as they should be.
func TestRightFormersPass(t *testing.T) {
	strictRules := rightTag()
	strictRules.hcomp = strict
	for _, f := range []kit.Former{duos("duos", rightDuo()), tags("formal tags", rightTag(), true), tags("strict tags", strictRules, false), ropes("ropes", rightRope())} {
		t.Run(f.Name, func(t *testing.T) { kit.CheckLaws(t, f, kit.Trials(24)) })
	}
}

// Every wrong former is caught by the law it breaks.
func TestWrongFormersAreCaught(t *testing.T) {
	pairwise := func(wrong func(r *duoRules)) func(name string) kit.Former {
		return func(name string) kit.Former {
			r := rightDuo()
			wrong(r)
			return duos(name, r)
		}
	}
	tagged := func(commutes bool, wrong func(r *tagRules)) func(name string) kit.Former {
		return func(name string) kit.Former {
			r := rightTag()
			wrong(r)
			return tags(name, r, commutes)
		}
	}
	for _, c := range []struct {
		name string
		law  string
		make func(name string) kit.Former
	}{
		{"a forgotten wall", kit.LawWalls, pairwise(func(r *duoRules) {
			right := r.hcomp
			r.hcomp = func(run *value.Run, t *duoType, p value.Value, walls value.System) value.Value {
				return right(run, t, p, walls[:len(walls)-1])
			}
		})},
		{"walls that end where they begin", kit.LawWalls, pairwise(func(r *duoRules) {
			right := r.hcomp
			r.hcomp = func(run *value.Run, t *duoType, p value.Value, walls value.System) value.Value {
				still := make(value.System, len(walls))
				for k, w := range walls {
					still[k] = value.Wall{Cube: w.Cube, I: w.I, Body: run.At(w.Body, w.I, interval.Zero())}
				}
				return right(run, t, p, still)
			}
		})},
		{"a transport that ignores its face", kit.LawConstancy, pairwise(func(r *duoRules) {
			right := r.transp
			r.transp = func(run *value.Run, t *duoType, i value.Name, _ interval.Face, p value.Value) value.Value {
				return right(run, t, i, interval.Bot(), p)
			}
		})},
		{"a transport that forgets the face in its second part", kit.LawConstancy, pairwise(func(r *duoRules) {
			r.transp = func(run *value.Run, t *duoType, i value.Name, phi interval.Face, p value.Value) value.Value {
				a := prims.Tfill(run, i, t.first, phi, half(run, p, false))
				return t.pair(prims.LaterTransp(run, i, t.first, phi, half(run, p, false)),
					prims.LaterTransp(run, i, t.second.Open(run, a), interval.Bot(), half(run, p, true)))
			}
		})},
		{"a filler at the wrong end", kit.LawTyping, pairwise(func(r *duoRules) {
			r.transp = func(run *value.Run, t *duoType, i value.Name, phi interval.Face, p value.Value) value.Value {
				a := prims.Tfill(run, i, t.first, phi, half(run, p, false))
				back := run.At(a, i, interval.Var(i).Rev())
				return t.pair(prims.LaterTransp(run, i, t.first, phi, half(run, p, false)),
					prims.LaterTransp(run, i, t.second.Open(run, back), phi, half(run, p, true)))
			}
		})},
		{"dependent parts composed in the wrong order", kit.LawTyping, pairwise(func(r *duoRules) {
			r.hcomp = func(run *value.Run, t *duoType, p value.Value, walls value.System) value.Value {
				firsts, seconds := halves(run, walls)
				a := prims.LaterHcomp(run, t.first, half(run, p, false), firsts)
				return t.pair(a, prims.LaterHcomp(run, t.second.Open(run, a), half(run, p, true), seconds))
			}
		})},
		{"a composite without its filler where the family looks constant", kit.LawDimensions, pairwise(func(r *duoRules) {
			right := r.hcomp
			r.hcomp = func(run *value.Run, t *duoType, p value.Value, walls value.System) value.Value {
				if walls.Support() == 0 && p.Support() == 0 {
					firsts, seconds := halves(run, walls)
					a := half(run, p, false)
					return t.pair(prims.LaterHcomp(run, t.first, a, firsts), prims.LaterHcomp(run, t.second.Open(run, a), half(run, p, true), seconds))
				}
				return right(run, t, p, walls)
			}
		})},
		{"a line's name that is not fresh", kit.LawTyping, pairwise(func(r *duoRules) {
			r.hcomp = func(run *value.Run, t *duoType, p value.Value, walls value.System) value.Value {
				firsts, seconds := halves(run, walls)
				const i = 0
				a := prims.Hfill(run, i, t.first, half(run, p, false), firsts)
				return t.pair(prims.LaterHcomp(run, t.first, half(run, p, false), firsts),
					prims.LaterComp(run, i, t.second.Open(run, a), half(run, p, true), seconds))
			}
		})},
		{"a substitution that forgets a part", kit.LawWalls, pairwise(func(r *duoRules) {
			r.substitute = func(run *value.Run, p *duo, s *value.Subst) value.Value {
				return &duo{run.Substitute(p.a, s), p.b, p.rules}
			}
		})},
		{"a support that is too small", kit.LawWalls, pairwise(func(r *duoRules) {
			r.support = func(p *duo) value.Support { return p.a.Support() }
		})},
		{"an η that loses a part", kit.LawAgreement, pairwise(func(r *duoRules) {
			r.same = func(c value.Comparer, t *duoType, a, b value.Value) bool {
				return c.Terms("the left part", t.first, half(c.Run(), a, false), half(c.Run(), b, false))
			}
		})},
		{"reading back without η", kit.LawAgreement, pairwise(func(r *duoRules) {
			right := r.read
			r.read = func(q value.Quoter, t *duoType, v value.Value) value.Core {
				if n, ok := v.(*value.Neutral); ok {
					return q.Neutral(n)
				}
				return right(q, t, v)
			}
		})},
		{"an η that loses a face", kit.LawEta, func(name string) kit.Former { return ropes(name, &ropeRules{ends: 1, walls: 2}) }},
		{"a composite that lets go of an end", kit.LawTyping, func(name string) kit.Former { return ropes(name, &ropeRules{ends: 2, walls: 1}) }},
		{"pushing and commuting both", kit.LawDimensions, tagged(true, func(r *tagRules) {
			r.hcomp = func(run *value.Run, t *tagType, base value.Value, walls value.System) value.Value {
				if v, ok := pushed(run, t, base, walls); ok {
					return v
				}
				return formal(run, t, base, walls)
			}
		})},
		{"a strict composite that does not know what it waits for", kit.LawDimensions, tagged(false, func(r *tagRules) {
			r.hcomp = func(run *value.Run, t *tagType, base value.Value, walls value.System) value.Value {
				if v, ok := pushed(run, t, base, walls); ok {
					return v
				}
				return prims.StuckHcomp(t, base, walls, 0, 0)
			}
		})},
		{"an empty box that is its base", kit.LawDimensions, tagged(true, func(r *tagRules) {
			r.hcomp = func(run *value.Run, t *tagType, base value.Value, walls value.System) value.Value {
				if len(walls) == 0 {
					return base
				}
				return formal(run, t, base, walls)
			}
		})},
		{"a transport that is the identity where the line looks constant", kit.LawDimensions, tagged(true, func(r *tagRules) {
			right := r.transp
			r.transp = func(run *value.Run, t *tagType, i value.Name, phi interval.Face, v value.Value) value.Value {
				if !t.Support().Has(i) {
					return v
				}
				return right(run, t, i, phi, v)
			}
		})},
		{"an eliminator that forgets the walls", kit.LawEliminators, tagged(true, func(r *tagRules) {
			r.commute = func(run *value.Run, e *untag, c *tagBox) value.Value { return e.later(run, c.base) }
		})},
		{"a claim to commute with what waits", kit.LawEliminators, tagged(true, func(r *tagRules) {
			r.hcomp = strict
		})},
		{"composites compared by their bases alone", kit.LawAgreement, tagged(true, func(r *tagRules) {
			r.same = func(c value.Comparer, t *tagType, x, y *tagBox) bool { return c.Terms("the base", t, x.base, y.base) }
		})},
		{"a transport that leaves the walls behind", kit.LawConstancy, tagged(true, func(r *tagRules) {
			right := r.transp
			r.transp = func(run *value.Run, t *tagType, i value.Name, phi interval.Face, v value.Value) value.Value {
				if c, ok := run.Force(v).(*tagBox); ok {
					return prims.Hcomp(run, run.At(t, i, interval.One()), prims.LaterTransp(run, i, t, phi, c.base), nil)
				}
				return right(run, t, i, phi, v)
			}
		})},
	} {
		t.Run(c.name, func(t *testing.T) {
			// η shows in what the normal forms of an element and its expansion are
			failure, err := kit.FindFailure(c.make("a former with "+c.name), kit.Trials(200), kit.Only(c.law, kit.LawEta))
			require.NoError(t, err)
			require.NotNil(t, failure, "it is not caught")
			t.Log(failure.Report())
			require.Equal(t, c.law, failure.Law)
			kit.Golden(t, "testdata/wrong/"+strings.NewReplacer(" ", "-", "η", "eta", "'", "").Replace(c.name)+".golden", failure.Report())
		})
	}
}
