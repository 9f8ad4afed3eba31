package text

import (
	"bytes"
	"mime"
	"regexp"
	"strings"
)

var (
	encodedWord = regexp.MustCompile(`=\?[^?\s]+\?[BbQq]\?[^?\s]*\?=`) // RFC 2047
	quotedWord  = regexp.MustCompile(`^(?i:=\?(?:utf-8|us-ascii)(?:\*[^?]*)?\?q\?)`)
	replyMark   = regexp.MustCompile(`^(?i:\s*(?:re|fwd?)\s*:)*\s*`)
)

// subject yields the subject without the marks of answers. Encoded words
// (RFC 2047) are read: those in the encoding "Q" letter by letter, others as a
// whole. In a subject with encoded words corrections can be spelled that are
// letters alone, with one of the others none can.
func (m *mail) subject(s piece) {
	value := m.source[s.from:s.to]
	p := prose{source: m.source}
	at := len(replyMark.Find(value))
	encoded, opaque := false, false
	for _, w := range encodedWord.FindAllIndex(value, -1) {
		if w[0] < at {
			continue
		}
		// White space between two encoded words is none (6.2).
		if gap := value[at:w[0]]; !encoded || len(bytes.TrimSpace(gap)) > 0 {
			m.unfold(&p, s.from+at, s.from+w[0])
		}
		word := value[w[0]:w[1]]
		if lead := len(quotedWord.Find(word)); lead > 0 {
			p.quotedWord(s.from+w[0]+lead, s.from+w[1]-len("?="))
		} else {
			opaque = true
			text, err := new(mime.WordDecoder).Decode(string(word))
			if err != nil || text == "" {
				text = placeholder
			}
			p.standIn(text, s.from+w[0], s.from+w[1])
		}
		at, encoded = w[1], true
	}
	m.unfold(&p, s.from+at, s.to)
	b := p.block()
	if b == nil {
		return
	}
	b.Heading = true
	b.escape = func(words string) (string, bool) {
		return words, !opaque && isASCII(words) && !(encoded && strings.ContainsFunc(words, noLetter))
	}
	m.emit(b)
}

func noLetter(r rune) bool { return !isLetterByte(byte(r)) }

// quotedWord takes the text source[from:to] of an encoded word in the encoding
// "Q", in which an underline stands for a space.
func (p *prose) quotedWord(from, to int) {
	for from < to {
		i := bytes.IndexByte(p.source[from:to], '_')
		if i < 0 {
			break
		}
		p.quotedPrintable(from, from+i)
		p.standIn(" ", from+i, from+i+1)
		from += i + 1
	}
	p.quotedPrintable(from, to)
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
