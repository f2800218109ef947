package profile

import (
	"bytes"
	"compress/gzip"
	"io"

	"example.com/boxwright/value"
)

// The format of pprof: one protocol buffer, compressed with gzip. The message
// and its field numbers are those of profile.proto, which the project
// github.com/google/pprof publishes; what is written here is the part of it
// that a profile without machine code needs: sample types, samples, one
// location and one function for each frame, and the table of strings.

// fields of the messages, by profile.proto
const (
	profileSampleType    = 1
	profileSample        = 2
	profileLocation      = 4
	profileFunction      = 5
	profileStringTable   = 6
	profileTimeNanos     = 9
	profileDurationNanos = 10
	profileComment       = 13
	profileDefault       = 14

	valueTypeType = 1
	valueTypeUnit = 2

	sampleLocation = 1
	sampleValue    = 2

	locationID   = 1
	locationLine = 4

	lineFunction = 1
	lineLine     = 2

	functionID         = 1
	functionName       = 2
	functionSystemName = 3
	functionFile       = 4
	functionStart      = 5
)

// sampleTypes are what the profile counts, in the order of its values.
var sampleTypes = []struct {
	name, unit string
	of         func(value.Counts) int64
}{
	{"steps", "count", func(c value.Counts) int64 { return c.Steps }},
	{"entered", "count", func(c value.Counts) int64 { return c.Entered }},
	{"substitutions", "count", func(c value.Counts) int64 { return c.Pushed }},
	{"forced", "count", func(c value.Counts) int64 { return c.Forced }},
	{"memory", "bytes", func(c value.Counts) int64 { return c.Memory }},
	{"time", "nanoseconds", func(c value.Counts) int64 { return c.Nanos }},
}

// Write writes the profile in the format of pprof, for go tool pprof. Errors
// are those of w.
func (p *Profile) Write(w io.Writer) error {
	z := gzip.NewWriter(w)
	if _, err := z.Write(p.encode()); err != nil {
		return err
	}
	return z.Close()
}

func (p *Profile) encode() []byte {
	p.mu.Lock()
	samples, began, duration := p.samples(), p.began, p.duration
	p.mu.Unlock()
	strings := newStrings()
	var out message

	for _, t := range sampleTypes {
		var m message
		m.number(valueTypeType, strings.index(t.name))
		m.number(valueTypeUnit, strings.index(t.unit))
		out.message(profileSampleType, m)
	}
	frames := map[Frame]int64{}
	var order []Frame
	for _, s := range samples {
		var m message
		ids := make([]int64, 0, len(s.Path))
		for k := len(s.Path) - 1; k >= 0; k-- { // innermost first
			f := s.Path[k]
			id, ok := frames[f]
			if !ok {
				order = append(order, f)
				id = int64(len(order))
				frames[f] = id
			}
			ids = append(ids, id)
		}
		if len(ids) == 0 {
			f := Frame{Kind: value.SiteOperation, Name: "engine"}
			id, ok := frames[f]
			if !ok {
				order = append(order, f)
				id = int64(len(order))
				frames[f] = id
			}
			ids = append(ids, id)
		}
		m.packed(sampleLocation, ids)
		values := make([]int64, len(sampleTypes))
		for k, t := range sampleTypes {
			values[k] = t.of(s.Counts)
		}
		m.packed(sampleValue, values)
		out.message(profileSample, m)
	}
	for k, f := range order {
		id := int64(k + 1)
		var line, location message
		line.number(lineFunction, id)
		line.number(lineLine, int64(f.Line))
		location.number(locationID, id)
		location.message(locationLine, line)
		out.message(profileLocation, location)
	}
	for k, f := range order {
		var m message
		m.number(functionID, int64(k+1))
		m.number(functionName, strings.index(f.Name))
		m.number(functionSystemName, strings.index(f.Name))
		m.number(functionFile, strings.index(f.File))
		m.number(functionStart, int64(f.Line))
		out.message(profileFunction, m)
	}
	comment := strings.index("where the work of a normaliser was done, by definition and operation")
	usual := strings.index(sampleTypes[0].name)
	for _, s := range strings.list {
		out.text(profileStringTable, s)
	}
	if !began.IsZero() {
		out.number(profileTimeNanos, began.UnixNano())
	}
	out.number(profileDurationNanos, int64(duration))
	out.packed(profileComment, []int64{comment})
	out.number(profileDefault, usual)
	return out.Bytes()
}

// stringTable numbers strings; the empty one is number 0.
type stringTable struct {
	list    []string
	numbers map[string]int64
}

func newStrings() *stringTable { return &stringTable{[]string{""}, map[string]int64{"": 0}} }

func (t *stringTable) index(s string) int64 {
	n, ok := t.numbers[s]
	if !ok {
		n = int64(len(t.list))
		t.numbers[s] = n
		t.list = append(t.list, s)
	}
	return n
}

// message is a protocol buffer's message under construction.
type message struct{ bytes.Buffer }

func (m *message) varint(n uint64) {
	for n >= 0x80 {
		m.WriteByte(byte(n) | 0x80)
		n >>= 7
	}
	m.WriteByte(byte(n))
}

// the wire types that occur
const (
	wireVarint = 0
	wireBytes  = 2
)

// number writes a field; 0 is what a missing field means and is left out.
func (m *message) number(field int, n int64) {
	if n != 0 {
		m.varint(uint64(field)<<3 | wireVarint)
		m.varint(uint64(n))
	}
}

func (m *message) bytes(field int, b []byte) {
	m.varint(uint64(field)<<3 | wireBytes)
	m.varint(uint64(len(b)))
	m.Write(b)
}

func (m *message) text(field int, s string) { m.bytes(field, []byte(s)) }

func (m *message) message(field int, inner message) { m.bytes(field, inner.Bytes()) }

func (m *message) packed(field int, ns []int64) {
	var inner message
	for _, n := range ns {
		inner.varint(uint64(n))
	}
	m.message(field, inner)
}
