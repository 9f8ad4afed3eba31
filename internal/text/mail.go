package text

import (
	"bytes"
	"io"
	"iter"
	"mime"
	"strings"
)

const (
	mostParts  = 8        // how deep multiparts may stand in each other
	mostHeader = 16 << 10 // bytes of a header field that is looked at
)

// readMail reads a message (RFC 5322): its subject and what its writer wrote in
// the text parts; HTML where the same text is not there as plain text. Quoted
// lines, the signature, attachments, parts in base64 and parts in other charsets
// than US-ASCII and UTF-8 are left out.
func readMail(r io.Reader, o Options, yield func(*Block, error) bool) {
	readRecords(r, o, yield, func(e *emitter) error {
		m := mail{emitter: e, options: o}
		message := m.part(e.at, len(e.source))
		m.subject(message.subject)
		m.entity(message)
		return nil
	})
}

type mail struct {
	*emitter
	options Options
}

// mailHead is what is read of a header.
type mailHead struct {
	subject     piece
	contentType string
	encoding    string // of the body, in lower case
	disposition string
}

// head reads the header that begins at pos and returns where the body begins.
func (m *mail) head(pos, end int) (h mailHead, body int) {
	for l := range linesOf(m.source[:end], pos) {
		if l.blank() {
			return h, l.next
		}
		name, _, ok := bytes.Cut(m.source[l.start:l.end], []byte(":"))
		if !ok || m.folds(l.start) {
			continue
		}
		value := piece{l.start + len(name) + 1, l.end}
		switch strings.ToLower(string(name)) {
		case "subject":
			h.subject = m.unfolded(value, end)
		case "content-type":
			h.contentType = m.value(m.unfolded(value, end))
		case "content-transfer-encoding":
			h.encoding = strings.ToLower(m.value(m.unfolded(value, end)))
		case "content-disposition":
			h.disposition = m.value(m.unfolded(value, end))
		}
	}
	return h, end
}

// folds reports that a line whose first character stands at start goes on with
// the field before it.
func (m *mail) folds(start int) bool {
	return start > 0 && (m.source[start-1] == ' ' || m.source[start-1] == '\t')
}

// unfolded widens the value of a field by the lines that go on with it.
func (m *mail) unfolded(p piece, end int) piece {
	next := lineAt(m.source[:end], p.to).next
	for l := range linesOf(m.source[:end], next) {
		if l.blank() || !m.folds(l.start) || l.end-p.from > mostHeader {
			break
		}
		p.to = l.end
	}
	return p
}

// value returns a field's value on one line.
func (m *mail) value(p piece) string {
	value := m.source[p.from:min(p.to, p.from+mostHeader)]
	return strings.Join(strings.Fields(string(value)), " ")
}

// mailPart is a message or a part of one.
type mailPart struct {
	mailHead
	body, end int // in the source
	kind      string
	params    map[string]string // of its Content-Type
	depth     int               // of the multiparts around it
	plain     bool              // the same text stands beside it as plain text
}

// part reads the header of source[from:end], a message or part.
func (m *mail) part(from, end int) (p mailPart) {
	p.mailHead, p.body = m.head(from, end)
	p.kind, p.params = mediaType(p.contentType)
	p.end = end
	return p
}

// entity yields what is read of a part.
func (m *mail) entity(p mailPart) {
	switch {
	case mailWord(p.disposition) == "attachment":
	case strings.HasPrefix(p.kind, "multipart/") && p.depth < mostParts:
		m.multipart(p)
	case p.kind == "text/plain":
		if b := m.decoded(p); b != nil {
			t := mailText{emitter: m.emitter, flowed: strings.EqualFold(p.params["format"], "flowed")}
			t.lines(b)
		}
	case p.kind == "text/html" && !p.plain:
		if b := m.decoded(p); b != nil {
			m.html(b)
		}
	}
}

// multipart yields what is read of the parts of p.
func (m *mail) multipart(p mailPart) {
	plain := p.plain
	if p.kind == "multipart/alternative" {
		for inner := range m.parts(p) {
			plain = plain || inner.kind == "text/plain"
		}
	}
	for inner := range m.parts(p) {
		inner.depth, inner.plain = p.depth+1, plain
		if inner.contentType == "" && p.kind == "multipart/digest" {
			continue // a message, unless it says otherwise
		}
		if m.entity(inner); m.stopped {
			return
		}
	}
}

// mediaType reads a Content-Type; a broken one has no parameters, and none is
// plain text (RFC 2045, 5.2).
func mediaType(value string) (kind string, params map[string]string) {
	if value == "" {
		return "text/plain", nil
	}
	kind, params, err := mime.ParseMediaType(value)
	if err != nil {
		return mailWord(value), nil
	}
	return kind, params
}

// mailWord returns what stands before the parameters of a value.
func mailWord(value string) string {
	word, _, _ := strings.Cut(value, ";")
	return strings.ToLower(strings.TrimSpace(word))
}

// parts yields the parts of a multipart: what stands between lines that begin
// with its delimiter.
func (m *mail) parts(p mailPart) iter.Seq[mailPart] {
	return func(yield func(mailPart) bool) {
		delimiter := []byte("--" + p.params["boundary"])
		from, pos := -1, p.body // where the part at hand begins, and the line
		for pos < p.end && p.params["boundary"] != "" {
			l := lineAt(m.source[:p.end], pos)
			rest, delimits := bytes.CutPrefix(m.source[pos:max(pos, l.end)], delimiter)
			last := string(rest) == "--"
			if delimits && (last || len(rest) == 0) {
				if from >= 0 && !yield(m.part(from, pos)) || last {
					return
				}
				from = l.next
			}
			pos = l.next
		}
		if from >= 0 {
			yield(m.part(from, p.end))
		}
	}
}
