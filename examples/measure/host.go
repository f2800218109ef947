package main

import (
	"context"
	"fmt"
	"sync"
	"time"

	"example.com/boxwright/examples/library"
	"example.com/boxwright/examples/measure/gauge"
	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
)

// What rows need of the engine: an engine with a script, terms of it, and
// operations on them. Terms are elaborated before the clock starts and anew for
// each operation, so that nothing an earlier one has evaluated helps a later one,
// except definitions, which are evaluated once in any host.

var background = context.Background()

// longest is how long one call of the engine may take.
var longest = time.Minute

// limited is a context for one call.
func limited() (context.Context, context.CancelFunc) {
	return context.WithTimeout(context.Background(), longest)
}

// deep are the limits of rows that nest deeply: the documented maximum of nesting,
// and of the rest as much as any row takes.
var deep = nbe.Limits{Depth: nbe.MaxDepth, Steps: 1 << 40, Memory: 1 << 40, Output: 1 << 26, Text: 1 << 26}

// host is an engine that has handled a script.
type host struct {
	e       *nbe.Engine
	options []nbe.CallOption // of every call
	empty   *nbe.Scope
	stats   nbe.Stats // of the last operation
	counts  map[string]float64
}

// plain are the options of every engine that is made: the table of mechanisms sets them.
var plain []nbe.Option

var (
	enginesLock sync.Mutex
	engines     = map[string]*nbe.Engine{}
	failures    = map[string]error{}
)

// newHost returns an engine that has handled the text, whose loads are files of the
// library. Engines of the same text are forks of one.
func newHost(text string) (*host, error) {
	enginesLock.Lock()
	defer enginesLock.Unlock()
	h := &host{options: append([]nbe.CallOption{nbe.Within(deep)}, watched...), counts: map[string]float64{}}
	if e := engines[text]; e != nil {
		h.e = e.Fork()
		return h, nil
	}
	if err := failures[text]; err != nil {
		return nil, err
	}
	e, err := nbe.New(plain...)
	if err != nil {
		return nil, err
	}
	h.e = e
	if err := h.handle(text); err != nil {
		failures[text] = err
		return nil, err
	}
	engines[text] = h.e
	h.e = h.e.Fork()
	return h, nil
}

// forget drops the engines, after plain has been set.
func forget() { engines, failures = map[string]*nbe.Engine{}, map[string]error{} }

func (h *host) handle(text string) error {
	var first error
	s := &script.Session{Engine: h.e, Options: h.options, Report: func(r script.Result) {
		if r.Err != nil && first == nil {
			first = r.Err
		}
	}, ReadFile: library.ReadFile}
	ctx, cancel := limited()
	defer cancel()
	if err := s.Source(ctx, []byte(text), "rows.sexp"); err != nil {
		return err
	}
	return first
}

func (h *host) read(text string) (*term.Written, error) {
	return notation.ReadTerm(text, "row", h.e.Words())
}

// infer elaborates a term, text or written, in the scope s, nil for the empty one.
func (h *host) infer(s *nbe.Scope, t any) (*nbe.Term, error) {
	if s == nil {
		if h.empty == nil {
			h.empty = h.e.Scope()
		}
		s = h.empty
	}
	w, ok := t.(*term.Written)
	if !ok {
		var err error
		if w, err = h.read(t.(string)); err != nil {
			return nil, err
		}
	}
	return s.Infer(background, w, h.options...)
}

// dimensions is the empty scope with n dimensions, i0, i1 and so on.
func (h *host) dimensions(n int) (*nbe.Scope, error) {
	s := h.e.Scope()
	for k := range n {
		var err error
		if s, err = s.Dimension(fmt.Sprintf("i%d", k)); err != nil {
			return nil, err
		}
	}
	return s, nil
}

// normal normalises t, notes what was counted and returns the form.
func (h *host) normal(t *nbe.Term) (*nbe.Form, error) {
	ctx, cancel := limited()
	defer cancel()
	forms, err := t.Scope().Normal(ctx, t, append(h.options, nbe.Count(&h.stats))...)
	if err != nil {
		return nil, err
	}
	h.counts["steps"] = float64(h.stats.Steps)
	return &forms[0], nil
}

// normalising is the case that elaborates the term and, timed, normalises it; the
// answer, if it is not empty, is what it must be.
func (h *host) normalising(s *nbe.Scope, t any, answer string) *gauge.Case {
	if text, ok := t.(string); ok {
		if w, err := h.read(text); err == nil {
			t = w
		}
	}
	return &gauge.Case{Counts: h.counts, Fresh: func() (func() error, error) {
		x, err := h.infer(s, t)
		if err != nil {
			return nil, err
		}
		return func() error {
			f, err := h.normal(x)
			if err != nil || answer == "" {
				return err
			}
			if got := f.String(); got != answer {
				return fmt.Errorf("the answer is %.60s instead of %.60s", got, answer)
			}
			return nil
		}, nil
	}}
}

// measuring is normalising with the size of the form counted after the clock has
// stopped: the nodes as a shared graph and as a tree.
func (h *host) measuring(s *nbe.Scope, t any) (*gauge.Case, error) {
	x, err := h.infer(s, t)
	if err != nil {
		return nil, err
	}
	f, err := h.normal(x)
	if err != nil {
		return nil, err
	}
	tree, nodes := term.Size(f.Term)
	h.counts["nodes"] = float64(nodes)
	h.counts["tree"], _ = tree.Float64()
	return h.normalising(s, t, ""), nil
}

// comparing is the case that compares two terms, evaluated before if warm; they
// must be equal, or differ.
func (h *host) comparing(s *nbe.Scope, a, b any, warm bool, want nbe.Verdict) (*gauge.Case, error) {
	fresh := func() (func() error, error) {
		x, err := h.infer(s, a)
		if err != nil {
			return nil, err
		}
		y, err := h.infer(s, b)
		if err != nil {
			return nil, err
		}
		return func() error {
			ctx, cancel := limited()
			defer cancel()
			c, err := x.Scope().Compare(ctx, x, y, append(h.options, nbe.Count(&h.stats))...)
			if err != nil {
				return err
			}
			h.counts["steps"] = float64(h.stats.Steps)
			if c.Verdict != want {
				return fmt.Errorf("the comparison says %s", c.Verdict)
			}
			return nil
		}, nil
	}
	if !warm {
		return &gauge.Case{Fresh: fresh, Counts: h.counts}, nil
	}
	op, err := fresh()
	if err != nil {
		return nil, err
	}
	c := gauge.Always(op)
	c.Counts = h.counts
	return c, op()
}
