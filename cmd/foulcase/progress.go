package main

import (
	"fmt"
	"io"
	"sync"
	"time"
)

const (
	progressDelay = 2 * time.Second        // work shorter than this shows none
	progressTick  = 200 * time.Millisecond // between two looks
)

// progress keeps one line on a terminal that says how far long work has come.
// It is safe for concurrent use; a nil one, and one without a terminal, shows
// nothing.
type progress struct {
	w  io.Writer
	mu sync.Mutex

	label       string
	done, total int64     // in bytes; total is 0 where nobody knows
	since       time.Time // when the work began
	shown       bool      // the line stands on the terminal
	stop        chan struct{}
}

func newProgress(w io.Writer, terminal bool) *progress {
	if !terminal {
		return nil
	}
	return &progress{w: w}
}

// Set says what is being done from here on, and how many bytes it has to go
// through; 0 where nobody knows.
func (p *progress) Set(label string, total int64) {
	if p == nil {
		return
	}
	p.mu.Lock()
	defer p.mu.Unlock()
	p.label, p.done, p.total = label, 0, total
	if p.stop == nil {
		p.since, p.stop = time.Now(), make(chan struct{})
		go p.watch(p.stop)
	}
}

// Add counts n more bytes as done.
func (p *progress) Add(n int) {
	if p == nil {
		return
	}
	p.mu.Lock()
	defer p.mu.Unlock()
	p.done += int64(n)
}

// Stop takes the line away for good.
func (p *progress) Stop() {
	if p == nil {
		return
	}
	p.clear()
	p.mu.Lock()
	defer p.mu.Unlock()
	if p.stop != nil {
		close(p.stop)
		p.stop = nil
	}
}

func (p *progress) watch(stop chan struct{}) {
	tick := time.NewTicker(progressTick)
	defer tick.Stop()
	for {
		select {
		case <-stop:
			return
		case now := <-tick.C:
			p.paint(now)
		}
	}
}

// paint draws the line as of now, once the work has lasted long enough.
func (p *progress) paint(now time.Time) {
	p.mu.Lock()
	defer p.mu.Unlock()
	if p.stop == nil || now.Sub(p.since) < progressDelay {
		return
	}
	line := p.label
	switch {
	case p.total > 0:
		line = fmt.Sprintf("%s: %d %% of %s", p.label, 100*p.done/p.total, formatSize(p.total))
	case p.done > 0:
		line = fmt.Sprintf("%s: %s", p.label, formatSize(p.done))
	}
	fmt.Fprintf(p.w, "\r\x1b[K%s", line)
	p.shown = true
}

// clear takes the line off the terminal before something else is written.
func (p *progress) clear() {
	if p == nil {
		return
	}
	p.mu.Lock()
	defer p.mu.Unlock()
	if p.shown {
		io.WriteString(p.w, "\r\x1b[K")
		p.shown = false
	}
}

// watched counts what is read through it.
type watched struct {
	io.Reader
	progress *progress
}

func (w watched) Read(b []byte) (int, error) {
	n, err := w.Reader.Read(b)
	w.progress.Add(n)
	return n, err
}
