package main

import (
	"fmt"
	"io"
	"os"
	"sync"
	"time"
)

// Progress of a long run, for a person: one line on standard error that says
// which form is being handled, shown where that form takes more than a moment
// and wiped away afterwards. In a pipe, or where nobody watches the results,
// there is none. A nil *progress does nothing.

type progress struct {
	mu    sync.Mutex
	out   io.Writer
	timer *time.Timer
	shown bool
	begun time.Time
}

// patience is how long a form may take before something is said.
const patience = time.Second

// width is how much of a line is used, in characters.
const width = 78

// newProgress returns nil unless both outputs are terminals.
func newProgress(stdout, stderr io.Writer) *progress {
	if !isTerminal(stdout) || !isTerminal(stderr) {
		return nil
	}
	return &progress{out: stderr}
}

// isTerminal reports whether w is a terminal, as far as the standard library can tell.
func isTerminal(w io.Writer) bool {
	f, ok := w.(*os.File)
	if !ok {
		return false
	}
	info, err := f.Stat()
	return err == nil && info.Mode()&os.ModeCharDevice != 0 && f.Name() != os.DevNull
}

// show says what, and for how long, after a moment and then every moment.
func (p *progress) show(what string) {
	if p == nil {
		return
	}
	p.mu.Lock()
	defer p.mu.Unlock()
	p.halt()
	p.begun = time.Now()
	var timer *time.Timer
	timer = time.AfterFunc(patience, func() {
		p.mu.Lock()
		defer p.mu.Unlock()
		if p.timer != timer {
			return // cleared, or another form's turn, in the meantime
		}
		line := []rune(fmt.Sprintf("%v  %s", time.Since(p.begun).Round(time.Second), what))
		fmt.Fprintf(p.out, "\r\x1b[K%s", string(line[:min(len(line), width)]))
		p.shown = true
		timer.Reset(patience)
	})
	p.timer = timer
}

// clear wipes the line away.
func (p *progress) clear() {
	if p == nil {
		return
	}
	p.mu.Lock()
	defer p.mu.Unlock()
	p.halt()
}

// stop ends everything.
func (p *progress) stop() { p.clear() }

func (p *progress) halt() {
	if p.timer != nil {
		p.timer.Stop()
		p.timer = nil
	}
	if p.shown {
		fmt.Fprint(p.out, "\r\x1b[K")
		p.shown = false
	}
}
