package text

import (
	"bytes"
	"strings"
	"unicode/utf8"
)

// subtitles gathers the text of cues. A block is a cue, or several when a
// sentence goes on over them: when a cue begins in lower case and the one before
// has no mark at its end that ends a sentence. The lines of a cue are one text,
// but a line that begins with a dash is another speaker's.
type subtitles struct {
	*emitter
	marks  string                       // the bytes that markup begins with
	mark   func(from, to int) (len int) // takes the markup at from; 0: it is none
	escape func(string) (string, bool)
	prose  prose
	last   textLine // the last one taken
	opens  bool     // the next line is the first of its cue
	hidden bool     // what comes is left out
}

// timing reports that a line tells when a cue is shown.
func (s *subtitles) timing(l textLine) bool {
	line := s.source[l.start:l.end]
	return len(line) > 0 && classes[line[0]]&cDigit != 0 && bytes.Contains(line, []byte("-->"))
}

// line takes a line of a cue's text.
func (s *subtitles) line(l textLine) {
	switch {
	case s.hidden || len(s.prose.text) == 0:
	case s.opens && s.goesOn(l):
		// The space stands for the line end alone: what follows it, the times
		// among it, interrupts the text.
		s.prose.standIn("\n", s.last.end, s.last.next)
	case s.opens || s.speaks(l):
		s.finish()
	default:
		s.prose.standIn("\n", s.last.end, l.start)
	}
	s.opens, s.last = false, l
	s.pieces(l.start, l.end)
}

// finish yields the running block.
func (s *subtitles) finish() {
	if b := s.prose.block(); b != nil {
		b.escape = s.escape
		s.emit(b)
	}
	s.prose = prose{source: s.source, end: s.prose.end}
}

// pieces takes source[from:to] less its markup.
func (s *subtitles) pieces(from, to int) {
	for from < to {
		i := bytes.IndexAny(s.source[from:to], s.marks)
		if i < 0 {
			break
		}
		s.take(from, from+i)
		from += i
		n := s.mark(from, to)
		if n == 0 {
			n = 1
			s.take(from, from+n)
		}
		from += n
	}
	s.take(from, to)
}

// take takes source[from:to] as it is.
func (s *subtitles) take(from, to int) {
	if !s.hidden {
		s.prose.verbatim(from, to)
	}
}

// goesOn reports that the sentence of the running block goes on in a line.
func (s *subtitles) goesOn(l textLine) bool {
	before := bytes.TrimRight(s.prose.text, " \t\r\n\"')]\u201D\u2019\u00BB")
	end, _ := utf8.DecodeLastRune(before)
	first, _ := utf8.DecodeRune(s.visible(l))
	return !strings.ContainsRune(".!?:\u2026\u266A", end) && isLower(first)
}

// speaks reports that a line begins with the dash of a speaker.
func (s *subtitles) speaks(l textLine) bool {
	first, _ := utf8.DecodeRune(s.visible(l))
	return first == '-' || first == '\u2013' || first == '\u2014'
}

// visible returns a line from the first character on that is no tag, opening
// quote or bracket.
func (s *subtitles) visible(l textLine) []byte {
	line := s.source[l.start:l.end]
	for {
		line = bytes.TrimLeft(line, " \t\"'([\u201C\u2018\u00AB")
		if !bytes.HasPrefix(line, []byte("<")) && !bytes.HasPrefix(line, []byte("{")) {
			return line
		}
		end := bytes.IndexAny(line, ">}")
		if end < 0 {
			return line
		}
		line = line[end+1:]
	}
}

// angled returns the length of a tag at the start of b, the brackets included; 0
// when none is there.
func angled(b []byte) int {
	end := bytes.IndexAny(b[1:], "<>") + 1
	if b[0] != '<' || end == 0 || b[end] != '>' {
		return 0
	}
	return end + 1
}
