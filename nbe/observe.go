package nbe

import (
	"context"
	"runtime/pprof"
	"time"

	"example.com/boxwright/nbe/profile"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/value"
)

// Watching a call: profiles, following, labels and regions. Each is asked for
// by an option of the call; nothing is process-wide, and a call that nobody
// watches pays a nil test at each hook.

// Follow says which rules of a call are reported, and to whom; see Following.
type Follow = value.Follow

// Event is one application of a rule, reported to a Follow.
type Event = value.Event

// observation is what was asked for of one call.
type observation struct {
	profile   *profile.Profile
	timeOnly  bool
	follow    *Follow
	labels    bool
	regions   bool
	stuck     bool         // keep where computing got stuck, in trace
	trace     *value.Trace // of the call, while it lasts and afterwards
	operation *value.Site  // what the call does
	subject   *value.Site  // the definition or term it does it with; nil if there is none
}

// Profile adds what the call is charged for to p, by definition and operation:
// exact counts, and time by samples. It works also for calls that are stopped,
// whose profile is complete up to the stop. The same p may be given to many
// calls, also at once. About a tenth slower where steps are shortest.
func Profile(p *profile.Profile) CallOption {
	return func(o *callOptions) { o.profile, o.timeOnly = p, false }
}

// ProfileTime is Profile with time alone, which costs less.
func ProfileTime(p *profile.Profile) CallOption {
	return func(o *callOptions) { o.profile, o.timeOnly = p, true }
}

// Following reports the rules that the call applies to f, which belongs to the
// call as long as that lasts.
func Following(f *Follow) CallOption { return func(o *callOptions) { o.follow = f } }

// Labels gives the goroutines of the call the labels engine, definition and
// operation in Go's own profiles (runtime/pprof), beside those of its context.
// The last two follow the run, looked at each millisecond.
func Labels() CallOption { return func(o *callOptions) { o.labels = true } }

// Regions marks checking, evaluating, comparing and reading back as regions in
// Go's execution traces (runtime/trace).
func Regions() CallOption { return func(o *callOptions) { o.regions = true } }

// WithName names the engine in the labels of Go's profiles.
func WithName(name string) Option {
	return func(e *Engine) error { e.title = name; return nil }
}

// sampleEvery is how much time passes between two samples.
const sampleEvery = time.Millisecond

// as says what a call does, and with what.
func (o *callOptions) as(operation, subject *value.Site) *callOptions {
	o.operation, o.subject = operation, subject
	return o
}

// termSite is the site of a term that a host gave.
func termSite(w *term.Written) value.Site {
	s := value.Site{Kind: value.SiteTerm, Name: "term"}
	if w != nil {
		s.Place = w.Place
	}
	return s
}

// watch begins what was asked for; the function that it returns ends it.
func (o *callOptions) watch(ctx context.Context, run *value.Run) (end func()) {
	run.Standing = o.subject
	if o.profile == nil && o.follow == nil && !o.regions && !o.stuck && !o.labels {
		return nil
	}
	began := time.Now()
	t := &value.Trace{Exact: o.profile != nil && !o.timeOnly, Follow: o.follow}
	if o.profile != nil || o.labels {
		t.Every = sampleEvery
	}
	if o.regions {
		t.Regions = ctx
	}
	if o.stuck {
		t.KeepStuck()
	}
	o.trace = t
	run.Begin(t)
	if run.Watched() && o.subject != nil {
		run.Operate(o.subject)
	}
	return func() {
		t.End()
		if o.profile != nil {
			o.profile.Add(t, run.Snapshot(), began)
		}
	}
}

// watched runs body as the operation of the call.
func (e *Engine) watched(ctx context.Context, o *callOptions, run *value.Run, body func(run *value.Run)) {
	operation := o.operation
	if operation == nil {
		operation = value.EvaluationSite
	}
	inner := body
	if run.Watched() {
		inner = func(run *value.Run) {
			defer run.Operation(operation)()
			body(run)
		}
	}
	if !o.labels {
		inner(run)
		return
	}
	pprof.Do(ctx, e.labels(o.subject, operation), func(inside context.Context) {
		labelled := map[[2]*value.Site]context.Context{}
		o.trace.Label = func(definition, at *value.Site) {
			if at == nil {
				at = operation
			}
			key := [2]*value.Site{definition, at}
			c, ok := labelled[key]
			if !ok {
				c = pprof.WithLabels(inside, e.labels(definition, at))
				labelled[key] = c
			}
			pprof.SetGoroutineLabels(c)
		}
		defer func() { o.trace.Label = nil }()
		inner(run)
	})
}

// labels say in Go's profiles where a run is.
func (e *Engine) labels(definition, operation *value.Site) pprof.LabelSet {
	name := ""
	if definition != nil {
		name = profile.SiteName(definition)
	}
	return pprof.Labels("engine", e.title, "definition", name, "operation", operation.Name)
}
