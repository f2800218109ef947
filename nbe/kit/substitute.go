package kit

import (
	"strings"

	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// Substitution of names in written terms, capture-avoiding; and the same
// substitution on values, whose dimensions in scope are named by level.

// namesIn are the names that occur in w, bound ones too.
func namesIn(w *term.Written) map[string]bool {
	out := map[string]bool{}
	todo := []*term.Written{w}
	for len(todo) > 0 {
		w := todo[len(todo)-1]
		todo = todo[:len(todo)-1]
		if w == nil {
			continue
		}
		if w.Kind == term.NameKind {
			out[w.Word] = true
		}
		for _, p := range w.Parts {
			todo = append(todo, p.Body)
			for _, row := range p.Rows {
				for _, x := range row {
					todo = append(todo, x.Body)
				}
			}
		}
	}
	return out
}

// Replace is w with terms put for free names, bound names making way.
func Replace(w *term.Written, put map[string]*term.Written) *term.Written {
	if w == nil || len(put) == 0 {
		return w
	}
	image := map[string]bool{}
	for _, x := range put {
		for n := range namesIn(x) {
			image[n] = true
		}
	}
	return replace(w, put, image)
}

// replace is Replace where bound names make way for those of avoid alone.
func replace(w *term.Written, put map[string]*term.Written, avoid map[string]bool) *term.Written {
	type job struct {
		w   *term.Written
		env *replacement
		dst **term.Written
	}
	var env *replacement
	for n, x := range put {
		env = &replacement{env, n, x}
	}
	var root *term.Written
	todo := []job{{w, env, &root}}
	for len(todo) > 0 {
		j := todo[len(todo)-1]
		todo = todo[:len(todo)-1]
		if j.w == nil {
			continue
		}
		if j.w.Kind == term.NameKind {
			*j.dst = j.env.of(j.w)
			continue
		}
		c := *j.w
		*j.dst = &c
		c.Parts = append([]term.Part(nil), c.Parts...)
		part := func(p *term.Part) {
			env := j.env
			p.Binders = append([]term.Binder(nil), p.Binders...)
			for k, b := range p.Binders {
				if b.Name == "_" {
					continue
				}
				to := b.Name
				for avoid[to] {
					to += "'"
				}
				env = &replacement{env, b.Name, term.Name(to)}
				p.Binders[k].Name = to
			}
			if p.Body != nil {
				todo = append(todo, job{p.Body, env, &p.Body})
			}
		}
		for k := range c.Parts {
			p := &c.Parts[k]
			part(p)
			p.Rows = append([][]term.Part(nil), p.Rows...)
			if len(p.Rows) == 0 {
				p.Rows = j.w.Parts[k].Rows
			}
			for r := range p.Rows {
				p.Rows[r] = append([]term.Part(nil), p.Rows[r]...)
				for n := range p.Rows[r] {
					part(&p.Rows[r][n])
				}
			}
		}
	}
	return root
}

type replacement struct {
	outer *replacement
	name  string
	by    *term.Written
}

func (r *replacement) of(w *term.Written) *term.Written {
	for ; r != nil; r = r.outer {
		if r.name == w.Word {
			return r.by
		}
	}
	return w
}

// Substitution sends dimensions to elements of the interval, all at once.
type Substitution struct {
	Kind string // "an end", "a renaming", "an identification", "a connection"
	Put  map[string]*term.Written
	Keys []string
}

func substitution(kind string, pairs ...any) Substitution {
	s := Substitution{Kind: kind, Put: map[string]*term.Written{}}
	for k := 0; k < len(pairs); k += 2 {
		name := pairs[k].(string)
		s.Put[name] = pairs[k+1].(*term.Written)
		s.Keys = append(s.Keys, name)
	}
	return s
}

// String is the substitution as text.
func (s Substitution) String() string {
	var parts []string
	for _, k := range s.Keys {
		parts = append(parts, k+" := "+s.Put[k].String())
	}
	return strings.Join(parts, ", ")
}

// onLevels is s on values of a scope with the dimensions named.
func (s Substitution) onLevels(dims []string) *value.Subst {
	level := map[string]interval.Dim{}
	for k, d := range dims {
		level[d] = interval.Var(value.Name(k))
	}
	var names []value.Name
	var images []interval.Dim
	for _, k := range s.Keys {
		n, _, _ := level[k].Literal()
		names = append(names, n)
		images = append(images, dimensionOf(s.Put[k], level))
	}
	return interval.NewSubst(names, images)
}

// dimensionOf is an interval expression that a generator made, as a value.
func dimensionOf(w *term.Written, level map[string]interval.Dim) interval.Dim {
	switch {
	case w.Kind == term.NameKind:
		return level[w.Word]
	case w.Kind == term.NumeralKind && w.Number.Sign() == 0:
		return interval.Zero()
	case w.Kind == term.NumeralKind:
		return interval.One()
	}
	d := dimensionOf(w.Parts[0].Body, level)
	for _, p := range w.Parts[1:] {
		e := dimensionOf(p.Body, level)
		if w.Word == "min" {
			d = d.Min(e)
		} else {
			d = d.Max(e)
		}
	}
	if w.Word == "rev" {
		d = d.Rev()
	}
	return d
}

// substitutions are the substitutions of the dimensions that the laws try; the
// name fresh is in the scope they lead to.
func substitutions(dims []string, fresh string) []Substitution {
	n, m := term.Name, term.Name(fresh)
	var out []Substitution
	for _, k := range dims {
		out = append(out,
			substitution("an end", k, term.Numeral(0)), substitution("an end", k, term.Numeral(1)),
			substitution("a renaming", k, m), substitution("a reversal", k, term.Rev(n(k))),
			substitution("a connection", k, term.Min(n(k), m)), substitution("a connection", k, term.Max(term.Rev(n(k)), m)),
			substitution("a connection", k, term.Min(m, term.Rev(m))))
	}
	if len(dims) > 1 {
		k, l := dims[0], dims[1]
		out = append(out,
			substitution("an identification", k, n(l)), substitution("an identification", k, m, l, m),
			substitution("a renaming", k, n(l), l, n(k)),
			substitution("an identification", l, term.Rev(n(k))),
			substitution("a connection", k, term.Min(n(k), n(l))), substitution("a connection", l, term.Max(n(k), n(l))))
	}
	return out
}

// Mentions reports whether one of the names occurs in w.
func Mentions(w *term.Written, names ...string) bool {
	in := namesIn(w)
	for _, n := range names {
		if in[n] {
			return true
		}
	}
	return false
}
