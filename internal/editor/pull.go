package editor

import (
	"context"
	"encoding/json"
	"slices"
	"strconv"
	"strings"
)

// report is the state of a document's diagnostics for a client that asks; Items are
// left out when the client has those of ResultID.
type report struct {
	Kind     string          `json:"kind"` // full or unchanged
	ResultID string          `json:"resultId"`
	Items    json.RawMessage `json:"items,omitempty"`
}

// workspaceReport is a report among those of all documents.
type workspaceReport struct {
	URI     string `json:"uri"`
	Version int    `json:"version"`
	report
}

// retrigger tells the client to ask again.
type retrigger struct {
	RetriggerRequest bool `json:"retriggerRequest"`
}

func (s *Server) diagnostic(c *call, params json.RawMessage) {
	var p diagnosticParams
	if f := decode(params, &p); f != nil {
		c.reply(nil, f)
		return
	}
	s.hand(c, p.TextDocument.URI, func(d *document) {
		if f := d.judge(c.ctx); f != nil {
			if f.Code == contentModified {
				f = &failure{serverCancelled, f.Message, retrigger{true}}
			}
			c.reply(nil, f)
			return
		}
		c.reply(d.state(p.PreviousResultID), nil)
	})
}

// hand gives a request to the goroutine of a document.
func (s *Server) hand(c *call, uri string, do func(*document)) {
	if f := s.to(uri, func(d *document) { d.inbox.put(task{run: func() { do(d) }}) }); f != nil {
		c.reply(nil, f)
	}
}

// state reports the diagnostics to a client that has those of an earlier state.
func (d *document) state(previous string) report {
	id := strconv.FormatInt(d.resultID, 10)
	if id == previous {
		return report{Kind: "unchanged", ResultID: id}
	}
	return report{Kind: "full", ResultID: id, Items: d.items}
}

// workspaceDiagnostic reports on the documents that are open. Those that change at
// the moment are left out: the client asks for them by themselves.
func (s *Server) workspaceDiagnostic(c *call, params json.RawMessage) {
	var p workspaceDiagnosticParams
	if f := decode(params, &p); f != nil {
		c.reply(nil, f)
		return
	}
	previous := map[string]string{}
	for _, r := range p.PreviousResultIDs {
		previous[r.URI] = r.Value
	}
	reports, expected := make(chan *workspaceReport), 0
	s.each(func(d *document) {
		expected++
		d.inbox.put(task{run: func() {
			var r *workspaceReport
			if d.judge(c.ctx) == nil {
				r = &workspaceReport{d.uri, d.version, d.state(previous[d.uri])}
			}
			select {
			case reports <- r:
			case <-c.ctx.Done():
			}
		}})
	})
	go func() { c.reply(gather(c.ctx, reports, expected), nil) }()
}

type workspaceReports struct {
	Items []workspaceReport `json:"items"`
}

// gather waits for the reports of some documents and puts them in order.
func gather(ctx context.Context, reports <-chan *workspaceReport, expected int) workspaceReports {
	all := workspaceReports{Items: []workspaceReport{}}
	for range expected {
		select {
		case r := <-reports:
			if r != nil {
				all.Items = append(all.Items, *r)
			}
		case <-ctx.Done():
		}
	}
	slices.SortFunc(all.Items, func(a, b workspaceReport) int { return strings.Compare(a.URI, b.URI) })
	return all
}

// refresh makes a client that pulls diagnostics ask again for all of them.
func (s *Server) refresh() {
	if s.client.pulls() && s.client.Workspace.Diagnostics.RefreshSupport {
		s.ask("workspace/diagnostic/refresh", nil, nil)
	}
}
