package editor

import (
	"encoding/json"
	"fmt"
	"sync"
)

// progressFrom is the size of a document, in bytes, whose first judgement takes long
// enough to be told of.
const progressFrom = 256 << 10

// progress shows how far a judgement is, where the client shows such.
type progress struct {
	s     *Server
	title string
	token string // "": none is shown

	mu    sync.Mutex
	begun bool // the client took the token
	ended bool
	shown int // percent
}

// progress begins to show the judgement of a document of some bytes.
func (s *Server) progress(name string, size int) *progress {
	p := &progress{s: s, title: "Reading " + name}
	if size < progressFrom || !s.client.Window.WorkDoneProgress {
		return p
	}
	p.token = fmt.Sprintf("foulcase/%d", s.counter.Add(1))
	s.ask("window/workDoneProgress/create", map[string]string{"token": p.token}, func(_ json.RawMessage, err error) {
		p.mu.Lock()
		defer p.mu.Unlock()
		if err == nil && !p.ended {
			p.begun = true
			p.tell(progressValue{Kind: "begin", Title: p.title, Percentage: &p.shown})
		}
	})
	return p
}

func (p *progress) report(done, total int) {
	p.mu.Lock()
	defer p.mu.Unlock()
	percent := min(100, 100*done/max(total, 1))
	if p.begun && percent > p.shown {
		p.shown = percent
		p.tell(progressValue{Kind: "report", Percentage: &percent})
	}
}

func (p *progress) end() {
	p.mu.Lock()
	defer p.mu.Unlock()
	p.ended = true
	if p.begun {
		p.tell(progressValue{Kind: "end"})
	}
}

func (p *progress) tell(v progressValue) {
	p.s.tell("$/progress", progressParams{p.token, v})
}
