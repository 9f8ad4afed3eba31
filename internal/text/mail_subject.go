package text

import (
	"bytes"
	"mime"
	"regexp"
	"strings"
)

var (
	encodedWord = regexp.MustCompile(`=\?[^?\s]+\?[BbQq]\?[^?\s]*\?=`) // RFC 2047
	replyMark   = regexp.MustCompile(`^(?i:\s*(?:re|fwd?)\s*:)*\s*`)
)

// subject yields the subject without the marks of answers. An encoded word
// (RFC 2047) is read, but there is no spelling for a correction in a subject
// that has one.
func (m *mail) subject(s piece) {
	value := m.source[s.from:s.to]
	p := prose{source: m.source}
	at := len(replyMark.Find(value))
	encoded := false
	for _, w := range encodedWord.FindAllIndex(value, -1) {
		if w[0] < at {
			continue
		}
		// White space between two encoded words is none (6.2).
		if gap := value[at:w[0]]; !encoded || len(bytes.TrimSpace(gap)) > 0 {
			m.unfold(&p, s.from+at, s.from+w[0])
		}
		text, err := new(mime.WordDecoder).Decode(string(value[w[0]:w[1]]))
		if err != nil || text == "" {
			text = placeholder
		}
		p.standIn(text, s.from+w[0], s.from+w[1])
		at, encoded = w[1], true
	}
	m.unfold(&p, s.from+at, s.to)
	b := p.block()
	if b == nil {
		return
	}
	b.Heading = true
	b.escape = func(words string) (string, bool) { return words, !encoded && isASCII(words) }
	m.emit(b)
}

// unfold takes part of a field's value, each fold as a line break.
func (m *mail) unfold(p *prose, from, to int) {
	for l := range linesOf(m.source[:to], from) {
		if l.next == to {
			break
		}
		p.verbatim(from, l.end)
		p.lineBreak(l.end)
		from = l.next
	}
	p.verbatim(from, to)
}

func isASCII(s string) bool {
	return strings.IndexFunc(s, func(r rune) bool { return r > '~' }) < 0
}
