package text

import (
	"bytes"
	"io"
	"mime"
	"strings"
)

const (
	mostParts  = 8        // how deep multiparts may stand in each other
	mostHeader = 16 << 10 // bytes of a header field that is looked at
)

// readMail reads a message (RFC 5322): its subject and what its writer wrote in
// the text parts. Quoted lines, the signature, attachments, parts that are no
// plain text, parts in base64 and parts in other charsets than US-ASCII and
// UTF-8 are left out.
func readMail(r io.Reader, o Options, yield func(*Block, error) bool) {
	readRecords(r, o, yield, func(e *emitter) error {
		m := mail{emitter: e}
		head, body := m.head(e.at, len(e.source))
		m.subject(head.subject)
		m.entity(head, body, len(e.source), 0)
		return nil
	})
}

type mail struct{ *emitter }

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
		if pos = l.next; m.folds(l.start) {
			continue
		}
		name, _, ok := bytes.Cut(m.source[l.start:l.end], []byte(":"))
		if !ok {
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

// entity reads the body of a message or part.
func (m *mail) entity(h mailHead, body, end, depth int) {
	kind, params := mediaType(h.contentType)
	switch {
	case mailWord(h.disposition) == "attachment":
	case strings.HasPrefix(kind, "multipart/"):
		if boundary := params["boundary"]; boundary != "" && depth < mostParts {
			m.parts([]byte("--"+boundary), kind, body, end, depth)
		}
	case kind == "text/plain":
		t := mailText{emitter: m.emitter, flowed: strings.EqualFold(params["format"], "flowed")}
		t.read(h.encoding, strings.ToLower(params["charset"]), body, end)
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

// parts reads the parts of a multipart: what stands between lines that begin
// with the delimiter.
func (m *mail) parts(delimiter []byte, kind string, pos, end, depth int) {
	from := -1 // where the part at hand begins
	for pos < end && !m.stopped {
		l := lineAt(m.source[:end], pos)
		rest, delimits := bytes.CutPrefix(m.source[pos:max(pos, l.end)], delimiter)
		closes := string(rest) == "--"
		if delimits = delimits && (closes || len(rest) == 0); delimits {
			m.part(kind, from, pos, depth)
			from = l.next
		}
		if pos = l.next; delimits && closes {
			return
		}
	}
	m.part(kind, from, end, depth)
}

// part reads source[from:to], a part of a multipart of that kind.
func (m *mail) part(kind string, from, to, depth int) {
	if from < 0 || from >= to {
		return
	}
	h, body := m.head(from, to)
	if h.contentType == "" && kind == "multipart/digest" {
		return // messages, unless they say otherwise
	}
	m.entity(h, body, to, depth+1)
}
