package text

import (
	"bytes"
	"io"
)

// readSRT reads the text of SubRip subtitles: numbers, times and tags (<i>,
// {\an8}) are left out. A blank line inside a cue is borne.
func readSRT(r io.Reader, o Options, yield func(*Block, error) bool) {
	readRecords(r, o, yield, func(e *emitter) error {
		s := srt{subtitles{emitter: e, marks: "<{", prose: prose{source: e.source}}}
		s.mark = s.tag
		s.escape = func(words string) (string, bool) { return words, !bytes.ContainsAny([]byte(words), "<{") }
		s.read()
		return nil
	})
}

type srt struct{ subtitles }

func (s *srt) read() {
	inside := false
	for pos := s.at; pos < len(s.source) && !s.stopped; {
		l := lineAt(s.source, pos)
		pos = l.next
		switch {
		case s.timing(l):
			inside, s.opens = true, true
		case inside && !l.blank() && !s.number(l):
			s.line(l)
		}
	}
	s.finish()
}

// number reports that a line is the number of the cue whose times follow.
func (s *srt) number(l textLine) bool {
	for _, c := range s.source[l.start:l.end] {
		if classes[c]&cDigit == 0 {
			return false
		}
	}
	return l.next < len(s.source) && s.timing(lineAt(s.source, l.next))
}

// tag leaves a tag out.
func (s *srt) tag(from, to int) (n int) {
	b := s.source[from:to]
	if b[0] == '{' {
		if end := bytes.IndexAny(b[1:], "{}") + 1; end > 1 && b[1] == '\\' && b[end] == '}' {
			return end + 1
		}
		return 0
	}
	if len(b) > 2 && (classes[b[1]]&cLetter != 0 || b[1] == '/') {
		return angled(b)
	}
	return 0
}
