package editor

import (
	"strconv"
	"unicode/utf8"

	"example.org/foulcase"
)

// source is what diagnostics say they come from.
const source = "foulcase"

// appendDiagnostics appends the diagnostics of marks, which are in the order of the
// text, as a JSON array. They are written by hand because all of them are written
// anew after every keystroke.
func (d *document) appendDiagnostics(b []byte, marks []foulcase.Mark) []byte {
	b = append(b, '[')
	for i, at := 0, d.cursor(); i < len(marks); i++ {
		if i > 0 {
			b = append(b, ',')
		}
		b = d.appendDiagnostic(b, at.span(marks[i]), marks[i])
	}
	return append(b, ']')
}

func (d *document) appendDiagnostic(b []byte, s span, m foulcase.Mark) []byte {
	severity := d.asked.query
	if m.Grade == foulcase.GradeMark {
		severity = d.asked.mark
	}
	b = append(b, `{"range":{"start":`...)
	b = appendPosition(b, s.Start)
	b = append(b, `,"end":`...)
	b = appendPosition(b, s.End)
	b = append(b, `},"severity":`...)
	b = strconv.AppendInt(b, int64(severity), 10)
	b = append(b, `,"source":"`+source+`","code":"`...)
	b = append(b, m.Kind.String()...)
	b = append(b, `","message":`...)
	b = appendString(b, wording(m))
	b = append(b, `,"data":{"p":`...)
	b = strconv.AppendFloat(b, m.P, 'f', 3, 64)
	b = append(b, `,"corrections":[`...)
	for i, c := range m.Corrections {
		if i > 0 {
			b = append(b, ',')
		}
		b = appendString(b, c.Text)
	}
	return append(b, "]}}"...)
}

func appendPosition(b []byte, p position) []byte {
	b = append(b, `{"line":`...)
	b = strconv.AppendInt(b, int64(p.Line), 10)
	b = append(b, `,"character":`...)
	b = strconv.AppendInt(b, int64(p.Character), 10)
	return append(b, '}')
}

// appendPublication appends the notification that brings a document's diagnostics;
// version is nil when they are of none.
func appendPublication(b []byte, uri string, version *int, items []byte) []byte {
	b = append(b, `{"jsonrpc":"2.0","method":"textDocument/publishDiagnostics","params":{"uri":`...)
	b = appendString(b, uri)
	if version != nil {
		b = append(b, `,"version":`...)
		b = strconv.AppendInt(b, int64(*version), 10)
	}
	b = append(b, `,"diagnostics":`...)
	b = append(b, items...)
	return append(b, "}}"...)
}

// appendString appends a string of JSON (RFC 8259). What is not UTF-8 becomes U+FFFD.
func appendString(b []byte, s string) []byte {
	const hex = "0123456789abcdef"
	b = append(b, '"')
	for _, r := range s {
		switch {
		case r == '"' || r == '\\':
			b = append(b, '\\', byte(r))
		case r < ' ':
			b = append(b, '\\', 'u', '0', '0', hex[r>>4], hex[r&15])
		default:
			b = utf8.AppendRune(b, r)
		}
	}
	return append(b, '"')
}

// publish sends the diagnostics, unless the client asks for them itself. Those of a
// document that was closed meanwhile are dropped.
func (d *document) publish() {
	if d.s.client.pulls() {
		return
	}
	message := make([]byte, 0, len(d.items)+len(d.uri)+200)
	message = appendPublication(message, d.uri, &d.version, d.items)
	d.s.mu.Lock()
	defer d.s.mu.Unlock()
	if d.s.documents[d.uri] == d {
		d.s.out.put(parcel{d.uri, message})
	}
}

// places finds the ranges of marks in the order of the text.
type places struct{ cursor }

func (d *document) cursor() places {
	if d.draft == nil {
		return places{}
	}
	return places{d.lines.cursor(d.draft.Source())}
}

func (p *places) span(m foulcase.Mark) span {
	return span{p.position(int(m.Offset)), p.position(int(m.Offset + m.Length))}
}
