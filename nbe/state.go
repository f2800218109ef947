package nbe

import (
	"bytes"
	"context"
	"crypto/sha256"
	"encoding/binary"
	"fmt"
	"io"
	"sort"

	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/value"
)

// Portable state: what an engine holds, as a stream.
//
// The stream is: the eight bytes of stateMagic; the version of the form; the
// length of what follows; a table of strings; the formers that the terms use,
// each with its version and the names of its operators; the entries; and the
// SHA-256 sum of everything before it. An entry is a data declaration, as its
// text, or a definition, an assumption or a hole: its name, its place, its
// content hash, its texts, and its elaborated type and term in the form of
// state_core.go. Entries stand in an order in which each comes after what it
// uses. What every engine declares by itself is not in the stream.
//
// Loading looks at the sum, the version and the formers, and at no term: a
// definition's type and term are decoded and compiled when somebody first looks
// at them. The sum finds damage, not malice: a stream from somebody who is not
// trusted is to be loaded with Recheck, which elaborates every text anew,
// compares what comes of it with the content hash, and takes over what it has
// elaborated itself: of such a stream no term is decoded.

const (
	stateMagic   = "\x89bwstate"
	stateVersion = 1
	// maxState is how large a stream may be.
	maxState = 1 << 30
)

const (
	stateDefinition byte = iota + 1
	stateAssumption
	stateHole
	stateData
)

// Recheck makes Load elaborate every definition and declaration anew from its
// text, compare the result with the content hash in the stream, and add that
// result, whatever else the stream holds.
func Recheck() CallOption { return func(o *callOptions) { o.recheck = true } }

// stored is a definition as it stands in a stream: decoded when needed.
type stored struct {
	from         *stream
	ty, core     []byte // encoded; core is nil for assumptions and holes
	tyText, text string
	hash         Hash
	place        term.Place
	kind         byte
	name         string
	declaration  string // of stateData
	decodedT     term.Core
	decodedC     term.Core
}

func stateError(format string, args ...any) *term.Error {
	return &term.Error{Kind: term.Malformed, Message: "this is no stream of saved definitions that can be loaded: " + fmt.Sprintf(format, args...)}
}

// Save writes everything that e holds beyond what every engine declares to w.
// The errors are those of w, as the cause of an error of kind Unreadable;
// OutOfBudget for a term whose text is longer than [term.MaxText]; Cancelled.
// Cost: linear in the terms, as graphs, and in their texts. What is added to e
// meanwhile may or may not be in the stream.
func (e *Engine) Save(ctx context.Context, w io.Writer, options ...CallOption) error {
	var out []byte
	err := e.call(ctx, gather(options), func(run *value.Run) { out = e.encode(ctx, run) })
	if err != nil {
		return err
	}
	if _, err := w.Write(out); err != nil {
		return &term.Error{Kind: term.Unreadable, Message: "the stream cannot be written", Cause: err}
	}
	return nil
}

// entriesInOrder are the entries beyond the builtin ones, each after what it uses.
func (e *Engine) entriesInOrder(run *value.Run) []any {
	e.mu.RLock()
	var layers []*layer
	for l := e.base; l != nil; l = l.base {
		layers = append(layers, l)
	}
	var names []string
	for k := len(layers) - 1; k >= 0; k-- {
		names = append(names, layers[k].order...)
	}
	names = append(names, e.order...)
	e.mu.RUnlock()
	const (
		under = iota + 1
		done
	)
	state := map[string]int{}
	var out []any
	type step struct {
		name  string
		leave bool
	}
	var work []step
	for k := len(names) - 1; k >= 0; k-- {
		work = append(work, step{name: names[k]})
	}
	for len(work) > 0 {
		s := work[len(work)-1]
		work = work[:len(work)-1]
		run.Work(1)
		x := e.lookup(s.name)
		if c, ok := x.(*prims.Constructor); ok {
			x, s.name = c.Data, c.Data.Name
		}
		if s.leave {
			state[s.name] = done
			if !e.builtin[s.name] {
				out = append(out, x)
			}
			continue
		}
		if x == nil || state[s.name] != 0 {
			continue
		}
		state[s.name] = under
		work = append(work, step{s.name, true})
		uses := e.uses(run, x)
		for k := len(uses) - 1; k >= 0; k-- {
			work = append(work, step{name: uses[k]})
		}
	}
	return out
}

// uses are the names that an entry uses, in order.
func (e *Engine) uses(run *value.Run, x any) []string {
	names := map[string]bool{}
	visit := func(c term.Core) {
		if c == nil {
			return
		}
		term.Walk(c, func(a term.Arg) bool {
			run.Work(1)
			switch a := a.(type) {
			case *term.Global:
				names[a.Name] = true
			case term.Reference:
				names[a.Name] = true
			}
			return true
		})
	}
	switch x := x.(type) {
	case *definition:
		visit(x.typeOf(run))
		visit(x.coreOf(run))
	case *prims.Data:
		x.Cores(visit)
	}
	out := make([]string, 0, len(names))
	for name := range names {
		out = append(out, name)
	}
	sort.Strings(out)
	return out
}

func (e *Engine) encode(ctx context.Context, run *value.Run) []byte {
	enc := newEncoder(e, run)
	var entries []byte
	list := e.entriesInOrder(run)
	hashes := &hasher{e: e, run: run, known: map[string]Hash{}}
	for _, x := range list {
		run.Poll()
		switch x := x.(type) {
		case *prims.Data:
			h := hashes.of(x.Name)
			entries = append(entries, stateData)
			entries = enc.string(entries, x.Name)
			entries = append(entries, h[:]...)
			entries = enc.text(entries, (&notation.Form{Kind: notation.Declare, Name: x.Name, Declaration: x.Written}).String())
		case *definition:
			kind := stateDefinition
			if !x.defined() {
				kind = stateAssumption
				if x.hole {
					kind = stateHole
				}
			}
			h := hashes.of(x.name)
			entries = append(entries, kind)
			entries = enc.string(entries, x.name)
			entries = append(entries, h[:]...)
			entries = enc.string(entries, x.place.File)
			entries = binary.AppendUvarint(entries, uint64(max(x.place.Line, 0)))
			entries = binary.AppendUvarint(entries, uint64(max(x.place.Column, 0)))
			ty, t := x.texts(ctx, run)
			entries = enc.text(entries, ty)
			entries = enc.text(entries, t)
			entries = enc.text(entries, string(enc.core(x.typeOf(run))))
			if kind == stateDefinition {
				entries = enc.text(entries, string(enc.core(x.coreOf(run))))
			}
		}
	}
	var body []byte
	body = binary.AppendUvarint(body, uint64(len(enc.strings)))
	for _, s := range enc.strings {
		body = binary.AppendUvarint(body, uint64(len(s)))
		body = append(body, s...)
	}
	body = enc.formers(body)
	body = binary.AppendUvarint(body, uint64(len(list)))
	body = append(body, entries...)
	out := []byte(stateMagic)
	out = binary.AppendUvarint(out, stateVersion)
	out = binary.AppendUvarint(out, uint64(len(body)))
	out = append(out, body...)
	sum := sha256.Sum256(out)
	return append(out, sum[:]...)
}

// Load adds everything in the stream to e, or nothing. Errors: Malformed for a
// stream that is damaged, truncated, of another form or version, or that goes on
// after its end; NotFound for a former or an operator that is not registered
// here, or not in the same version; Duplicate for a name that is declared
// already; Unequal, with Recheck, for a definition that elaborates to something
// else than the stream holds; Unreadable for the errors of r. Cost without
// Recheck: linear in the stream, without elaborating anything but its data
// declarations.
func (e *Engine) Load(ctx context.Context, r io.Reader, options ...CallOption) error {
	src, err := io.ReadAll(io.LimitReader(r, maxState+1))
	if err != nil {
		return &term.Error{Kind: term.Unreadable, Message: "the stream cannot be read", Cause: err}
	}
	if len(src) > maxState {
		return stateError("it is longer than %d bytes", maxState)
	}
	o := gather(options)
	s, err := e.open(src)
	if err != nil {
		return err
	}
	if o.recheck {
		return e.recheck(ctx, s, options)
	}
	// Everything is put together in a fork, so that a failure adds nothing; what
	// is evaluated on the way finds its names there.
	f := e.Fork()
	s.e = f
	restored := map[string]any{}
	var names []string
	var xs []any
	err = e.call(ctx, o, func(run *value.Run) {
		for k := range s.entries {
			run.Charge(value.PriceNode)
			if d := &s.entries[k]; d.kind != stateData {
				x := restore(run, d)
				names, xs = append(names, d.name), append(xs, x)
				restored[d.name] = x
			}
		}
	})
	if err != nil {
		return err
	}
	if err := f.add(names, xs); err != nil {
		return err
	}
	names, xs = nil, nil
	for k := range s.entries {
		d := &s.entries[k]
		if d.kind != stateData {
			names, xs = append(names, d.name), append(xs, restored[d.name])
			continue
		}
		if err := f.loadData(ctx, d, options); err != nil {
			return err
		}
		data := f.lookup(d.name).(*prims.Data)
		names, xs = append(names, d.name), append(xs, data)
		for _, c := range data.Constructors {
			names, xs = append(names, c.Name), append(xs, c)
		}
	}
	s.e = e
	if err := e.add(names, xs); err != nil {
		return err
	}
	return nil
}

func (e *Engine) loadData(ctx context.Context, d *stored, options []CallOption) error {
	forms, err := notation.ReadScriptContext(ctx, []byte(d.declaration), "", e.notation)
	if err != nil || len(forms) != 1 || forms[0].Kind != notation.Declare || forms[0].Name != d.name {
		if term.KindOf(err) == term.Cancelled {
			return err
		}
		return stateError("the declaration of %s does not read", d.name)
	}
	return e.Declare(ctx, forms[0].Declaration, options...)
}

// restore is a definition, an assumption or a hole of a stream.
func restore(run *value.Run, s *stored) *definition {
	d := &definition{name: s.name, place: s.place, hole: s.kind == stateHole, stored: s, site: value.Site{Kind: value.SiteDefinition, Name: s.name, Place: s.place}}
	n := value.NewNeutral(&value.GlobalHead{Global: d})
	d.t = run.Later(0, func(run *value.Run) value.Value { return s.from.e.evaluated(run, d.typeOf(run)) })
	if s.kind != stateDefinition {
		d.v, d.folded = n, n
		return d
	}
	d.v = run.Later(0, func(run *value.Run) value.Value { return d.evaluate(run) })
	d.folded = run.Fold(n)
	return d
}

// recheck elaborates everything in the stream on a fork of its own, and adds
// what comes of it.
func (e *Engine) recheck(ctx context.Context, s *stream, options []CallOption) error {
	f := e.Fork()
	var names []string
	var xs []any
	for k := range s.entries {
		d := &s.entries[k]
		if d.kind == stateData {
			if err := f.loadData(ctx, d, options); err != nil {
				return err
			}
		} else {
			read := func(text string) (*term.Written, error) {
				return notation.ReadTermContext(ctx, text, d.place.File, f.notation)
			}
			ty, err := read(d.tyText)
			if err != nil {
				return err
			}
			var t *term.Written
			if d.kind == stateDefinition {
				if t, err = read(d.text); err != nil {
					return err
				}
			}
			if err := f.global(ctx, d.name, ty, t, d.kind == stateHole, options); err != nil {
				return err
			}
		}
		h, err := f.Hash(ctx, d.name, options...)
		if err != nil {
			return err
		}
		if h != d.hash {
			return &term.Error{Kind: term.Unequal, Message: d.name + " is not what the stream says", WantText: d.hash.String(), GotText: h.String()}
		}
		switch x := f.lookup(d.name).(type) {
		case *definition:
			x.place, x.site.Place = d.place, d.place
			names, xs = append(names, d.name), append(xs, x)
		case *prims.Data:
			names, xs = append(names, d.name), append(xs, x)
			for _, c := range x.Constructors {
				names, xs = append(names, c.Name), append(xs, c)
			}
		}
	}
	if err := e.add(names, xs); err != nil {
		return err
	}
	return nil
}

// open reads the stream as far as it is not about terms.
func (e *Engine) open(src []byte) (*stream, error) {
	head := len(stateMagic)
	if len(src) < head || string(src[:head]) != stateMagic {
		return nil, stateError("it does not begin as one")
	}
	in := &decoder{src: src[head:]}
	if v := in.uvarint(); v != stateVersion {
		return nil, stateError("it is of version %d, not %d", v, stateVersion)
	}
	size := in.uvarint()
	if in.failed || size > uint64(len(in.src)) || len(in.src)-int(size) != sha256.Size {
		return nil, stateError("it is truncated, or goes on after its end")
	}
	end := len(src) - sha256.Size
	if sum := sha256.Sum256(src[:end]); !bytes.Equal(sum[:], src[end:]) {
		return nil, stateError("it is damaged")
	}
	in.src = in.src[:size]
	s := &stream{e: e}
	for n := in.count(1); n > 0; n-- {
		s.strings = append(s.strings, string(in.bytes()))
	}
	if err := s.readFormers(in); err != nil {
		return nil, err
	}
	n := in.count(1)
	s.entries = make([]stored, 0, n)
	for ; n > 0; n-- {
		d := stored{from: s, kind: in.byte()}
		d.name = s.string(in)
		copy(d.hash[:], in.take(len(d.hash)))
		if d.kind == stateData {
			d.declaration = string(in.bytes())
		} else {
			d.place.File = s.string(in)
			d.place.Line, d.place.Column = int(in.uvarint()), int(in.uvarint())
			d.tyText, d.text = string(in.bytes()), string(in.bytes())
			d.ty = in.bytes()
			if d.kind == stateDefinition {
				d.core = in.bytes()
			}
		}
		if in.failed || d.kind == 0 || d.kind > stateData || e.name(d.name, d.place) != nil {
			return nil, stateError("an entry does not read")
		}
		s.entries = append(s.entries, d)
	}
	if in.failed || len(in.src) > 0 {
		return nil, stateError("its entries do not read")
	}
	return s, nil
}

// texts are the texts of a definition's type and term.
func (d *definition) texts(ctx context.Context, run *value.Run) (ty, t string) {
	if d.stored != nil {
		return d.stored.tyText, d.stored.text
	}
	text := func(w *term.Written) string {
		if w == nil {
			return ""
		}
		s, err := w.TextContext(ctx)
		if err == nil && len(s) > term.MaxText {
			run.Over("bytes of text", term.MaxText)
		}
		if err != nil {
			run.Fail(err.(*term.Error))
		}
		return s
	}
	return text(d.writtenType), text(d.written)
}
