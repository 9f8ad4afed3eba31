package text

import (
	"bytes"
	"strings"
	"unicode"
)

// Directive is what the writer of a document says to foulcase in a comment of the
// source: its sign, "foulcase:", and a verb to the end of the line or of the comment.
type Directive struct {
	Start, End int64    // bytes of the source, from the sign to the last word
	Verb       string   // "stet", "off" or "on"
	Words      []string // of stet, as they are written; at least one
}

const (
	directiveSign = "foulcase:"
	// maxDirective is the most bytes of a directive that are read.
	maxDirective = 4 << 10
	// directiveLeads are the bytes that a comment may begin with and that may stand
	// before the sign, blanks between them left out. Prose and code that speak of
	// directives have a letter or a quotation mark there. The last is the end of a
	// byte order mark.
	directiveLeads = "\r\n/*#%;-.!{|\xbf"
)

// MayDirect reports, faster than a scan, whether a source may have directives.
func MayDirect(source []byte) bool { return bytes.Contains(source, []byte(directiveSign)) }

// DirectiveScanner finds the directives of a source that is written to it in
// pieces of any size; it holds no more than one directive. Whatever else stands behind the
// sign is none, and no error: it may be prose.
type DirectiveScanner struct {
	found   func(Directive)
	offset  int64  // of the next piece
	matched int    // bytes of the sign at the end of what was written
	lead    byte   // the last byte before it that is no blank; a line feed at the start
	start   int64  // of the directive at hand
	line    []byte // what stands behind its sign; nil outside directives
}

// NewDirectiveScanner returns a scanner that calls found with every directive, in
// the order of the source.
func NewDirectiveScanner(found func(Directive)) *DirectiveScanner {
	return &DirectiveScanner{found: found, lead: '\n'}
}

// Write scans the next piece. It takes all of it and never fails.
func (s *DirectiveScanner) Write(piece []byte) (int, error) {
	for rest := piece; len(rest) > 0; {
		n := 0
		switch {
		case s.line != nil:
			n = s.collect(rest)
		case s.matched > 0:
			n = s.match(rest)
		default:
			n = s.seek(rest)
		}
		rest = rest[n:]
		s.offset += int64(n)
	}
	return len(piece), nil
}

// Close ends the source, and with it the directive that stands last.
func (s *DirectiveScanner) Close() {
	if s.line != nil {
		s.end()
	}
}

// seek moves on to the first byte of the sign, or past all.
func (s *DirectiveScanner) seek(piece []byte) int {
	n := bytes.Index(piece, []byte(directiveSign))
	for k := len(directiveSign) - 1; n < 0 && k > 0; k-- { // it may be cut in two
		if bytes.HasSuffix(piece, []byte(directiveSign[:k])) {
			n = len(piece) - k
		}
	}
	if n < 0 {
		n = len(piece)
	} else {
		s.matched, s.start = 1, s.offset+int64(n)
	}
	if before := bytes.TrimRight(piece[:n], " \t"); len(before) > 0 {
		s.lead = before[len(before)-1]
	}
	if s.matched > 0 {
		n++
	}
	return n
}

// match compares what follows the sign's first bytes.
func (s *DirectiveScanner) match(piece []byte) int {
	for n, c := range piece {
		if c != directiveSign[s.matched] {
			s.lead, s.matched = directiveSign[s.matched-1], 0
			return n
		}
		if s.matched++; s.matched == len(directiveSign) {
			s.matched = 0
			if strings.IndexByte(directiveLeads, s.lead) >= 0 {
				s.line = make([]byte, 0, 64)
			}
			s.lead = ':'
			return n + 1
		}
	}
	return len(piece)
}

// collect takes what stands behind the sign up to the end of the line.
func (s *DirectiveScanner) collect(piece []byte) int {
	n := bytes.IndexAny(piece, "\r\n")
	ends := n >= 0
	if !ends {
		n = len(piece)
	}
	if room := maxDirective - len(s.line); n >= room {
		n, ends = room, true
	}
	s.line = append(s.line, piece[:n]...)
	if ends {
		s.end()
	}
	return n
}

// end reads the directive that was collected.
func (s *DirectiveScanner) end() {
	d := Directive{Start: s.start}
	said := strings.NewReplacer("\t", " ", ",", " ").Replace(string(s.line))
	s.line = nil
	for _, closing := range []string{"-->", "*/"} {
		said, _, _ = strings.Cut(said, closing)
	}
	words, end := directiveWords(said)
	if len(words) == 0 {
		return
	}
	d.End = d.Start + int64(len(directiveSign)+end)
	switch d.Verb = words[0]; {
	case d.Verb == "stet" && len(words) > 1:
		d.Words = words[1:]
	case d.Verb != "on" && d.Verb != "off" || len(words) > 1:
		return
	}
	s.found(d)
}

// directiveWords splits s into words, as far as what stands between blanks has a letter,
// and returns where the last one ends.
func directiveWords(s string) (words []string, end int) {
	inWord := func(r rune) bool { return unicode.IsLetter(r) || unicode.IsDigit(r) || unicode.IsMark(r) }
	at := 0
	for field := range strings.SplitAfterSeq(s, " ") {
		word := strings.TrimFunc(field, func(r rune) bool { return !inWord(r) })
		if word == "" && strings.TrimSpace(field) != "" {
			break
		}
		if at += len(field); word != "" {
			words, end = append(words, word), at-len(field)+strings.LastIndex(field, word)+len(word)
		}
	}
	return words, end
}
