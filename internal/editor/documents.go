package editor

import (
	"encoding/json"
	"path/filepath"
)

func (s *Server) didOpen(params json.RawMessage) *failure {
	var p didOpenParams
	if f := decode(params, &p); f != nil {
		return f
	}
	item := p.TextDocument
	if s.find(item.URI) != nil {
		s.log(loudWarning, "%s was opened for a second time", item.URI)
		s.shut(item.URI)
	}
	d := &document{s: s, uri: item.URI, path: s.pathFor(item.URI), language: item.LanguageID, version: item.Version, inbox: newMailbox()}
	d.lines.unit = s.unit
	if !s.watches() { // nobody else tells that files changed
		s.forget()
	}
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.closed {
		return nil
	}
	d.asked = s.defaults.clone()
	d.preferred = d.asked
	s.documents[d.uri] = d
	d.inbox.put(task{changes: true, run: func() {
		d.load()
		d.begin([]byte(item.Text))
	}})
	s.work.Add(1)
	go d.run()
	s.configure(d)
	return nil
}

func (s *Server) didChange(params json.RawMessage) *failure {
	var p didChangeParams
	if f := decode(params, &p); f != nil {
		f.Message += "; close the document and open it again"
		return f
	}
	return s.to(p.TextDocument.URI, func(d *document) {
		d.inbox.put(task{changes: true, run: func() {
			version := d.version + 1
			if v := p.TextDocument.Version; v != nil {
				version = *v
			}
			d.edited(version, p.ContentChanges)
		}})
	})
}

// didSave has everything judged anew that a keystroke leaves alone.
func (s *Server) didSave(params json.RawMessage) *failure {
	var p documentParams
	if f := decode(params, &p); f != nil {
		return f
	}
	if name, ok := pathOf(p.TextDocument.URI); ok && s.isWatched(name) {
		s.forget()
		s.reload(true)
	}
	return s.to(p.TextDocument.URI, func(d *document) {
		d.inbox.put(task{run: func() { d.unsettled = true }})
	})
}

func (s *Server) didClose(params json.RawMessage) *failure {
	var p documentParams
	if f := decode(params, &p); f != nil {
		return f
	}
	return s.to(p.TextDocument.URI, func(d *document) { s.shut(d.uri) })
}

// to does something with an open document.
func (s *Server) to(uri string, do func(*document)) *failure {
	d := s.find(uri)
	if d == nil {
		return failf(invalidParams, "%.200s is not open", uri)
	}
	do(d)
	return nil
}

func (s *Server) find(uri string) *document {
	s.mu.Lock()
	defer s.mu.Unlock()
	return s.documents[uri]
}

// shut ends a document and clears its diagnostics; those it may still send are
// dropped.
func (s *Server) shut(uri string) {
	s.mu.Lock()
	defer s.mu.Unlock()
	d := s.documents[uri]
	delete(s.documents, uri)
	if !s.client.pulls() {
		s.out.put(parcel{uri, appendPublication(nil, uri, nil, []byte("[]"))})
	}
	d.inbox.put(task{changes: true, run: func() { d.closed = true }})
}

// each calls do with every open document.
func (s *Server) each(do func(*document)) {
	s.mu.Lock()
	defer s.mu.Unlock()
	for _, d := range s.documents {
		do(d)
	}
}

// pathFor is where the settings of a document are looked up: its file, or its name in
// the first folder of the workspace.
func (s *Server) pathFor(uri string) string {
	if name, ok := pathOf(uri); ok {
		return name
	}
	s.mu.Lock()
	defer s.mu.Unlock()
	for _, f := range s.folders {
		if dir, ok := pathOf(f.URI); ok {
			return filepath.Join(dir, nameOf(uri))
		}
	}
	return nameOf(uri)
}
