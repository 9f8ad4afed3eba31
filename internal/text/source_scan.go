package text

import (
	"bytes"
	"cmp"
	"slices"
	"strings"
	"unicode/utf8"
)

// codePiece is a comment or string of source code.
type codePiece struct {
	start, end int        // with its delimiters
	from, to   int        // without
	line       bool       // a comment that ends with its line
	first      bool       // nothing but white space stands before it on its line
	in         *enclosure // nil for a comment that ends with its line
}

// codeScanner finds the comments and strings of a language by its entry in the
// table of languages. Time is linear: a string that its line does not close takes
// the line, anything else that is not closed takes the rest.
type codeScanner struct {
	*language
	source []byte
	take   func(codePiece)
	pos    int
	inside int       // where the line at hand begins to have more than white space
	last   byte      // the last byte of code that is no white space, 0 at the start
	begins [256]bool // bytes that may begin anything
	here   [][]byte  // the words that end the here-documents of this line
	plain  int       // no regular expression and no literal of chosen delimiters begins before
	noHere bool      // a here-document had no end: what looks like one is none
}

// pieces gives the comments and strings of source to take, in order.
func (l language) pieces(source []byte, take func(codePiece)) {
	l.enclosures = slices.Clone(l.enclosures)
	slices.SortStableFunc(l.enclosures, func(a, b enclosure) int { return cmp.Compare(len(b.open), len(a.open)) })
	s := codeScanner{language: &l, source: source, take: take, pos: bomLen(source)}
	for _, e := range l.enclosures {
		s.begins[e.open[0]] = true
	}
	for _, open := range append([]string{"\n", "\r", l.hereMark, l.island[1]}, l.line...) {
		if open != "" {
			s.begins[open[0]] = true
		}
	}
	s.begins['\\'] = s.begins['\\'] || l.backslash
	s.begins['/'] = s.begins['/'] || l.regex
	s.begins['?'] = s.begins['?'] || l.question
	for _, word := range l.quotes {
		s.begins[word[0]] = true
	}
	if s.inside = s.pos; l.island[0] != "" {
		s.findIsland()
	}
	for s.pos < len(source) {
		s.step()
	}
}

// step moves over one byte of code or one piece.
func (s *codeScanner) step() {
	c := s.source[s.pos]
	switch {
	case s.begins[c] && s.begin(c):
		return
	case isSpaceByte(c):
		if s.inside == s.pos {
			s.inside++
		}
	default:
		s.last = c
	}
	s.pos++
}

// begin moves over what begins at the byte c, and reports whether anything does.
func (s *codeScanner) begin(c byte) bool {
	rest := s.source[s.pos:]
	switch {
	case c == '\n' || c == '\r':
		s.newLine()
	case s.island[1] != "" && bytes.HasPrefix(rest, []byte(s.island[1])):
		s.findIsland()
	case s.hereMark != "" && bytes.HasPrefix(rest, []byte(s.hereMark)):
		s.hereDocument()
	case s.question && c == '?' && s.characterMark():
	case s.quotes != nil && s.chosenQuote():
	case s.enclosed():
	case s.lineComment():
	case s.regex && c == '/' && s.regularExpression():
	case s.backslash && c == '\\' && len(rest) > 1 && !isSpaceByte(rest[1]):
		s.pos, s.last = s.pos+2, '\\'
	default:
		return false
	}
	return true
}

func (s *codeScanner) newLine() {
	s.pos++
	for _, word := range s.here {
		end := endOfHere(s.source[s.pos:], word)
		if s.noHere = end < 0; s.noHere {
			break
		}
		s.pos += end
	}
	s.here = s.here[:0]
	s.inside = s.pos
}

// findIsland moves to where code begins again.
func (s *codeScanner) findIsland() {
	i := bytes.Index(s.source[s.pos:], []byte(s.island[0]))
	if i < 0 {
		s.pos = len(s.source)
		return
	}
	s.pos += i + len(s.island[0])
}

func (s *codeScanner) lineComment() bool {
	rest := s.source[s.pos:]
	i := slices.IndexFunc(s.line, func(open string) bool { return bytes.HasPrefix(rest, []byte(open)) })
	if i < 0 || s.fresh && s.pos != s.inside || s.spaced && !lineStart(s.source, s.pos) && !bytes.ContainsRune([]byte(" \t\r\n;(){}"), rune(s.source[s.pos-1])) {
		return false
	}
	end := s.pos + lineLength(rest)
	s.take(codePiece{start: s.pos, end: end, from: s.pos + len(s.line[i]), to: end, line: true, first: s.pos == s.inside})
	s.pos = end
	return true
}

// enclosed moves over a block comment, string or character.
func (s *codeScanner) enclosed() bool {
	for i := range s.enclosures {
		e := &s.enclosures[i]
		from, closing, ok := e.opens(s.source, s.pos)
		if !ok || e.fresh && !lineStart(s.source, s.pos) {
			continue
		}
		if e.role == character {
			s.pos += max(1, charLength(s.source, s.pos))
			s.last = '\''
			return true
		}
		p := codePiece{start: s.pos, from: from, first: s.pos == s.inside, in: e}
		if p.to, p.end, ok = e.closes(s.source, from, closing); ok {
			if e.role == docstring && !p.first || e.role == docstring && strings.IndexByte("([{,=+%\\", s.last) >= 0 && s.last != 0 {
				p.in = &enclosure{open: e.open, close: e.close, escape: e.escape, lines: true}
			}
			if s.raw && p.in.role == quoted && rawPrefix(s.source, s.pos) {
				p.in = &enclosure{open: e.open, close: e.close, lines: e.lines}
			}
			s.take(p)
		}
		if s.pos = p.end; e.role != remark {
			s.last = '"'
		}
		if lineStart(s.source, s.pos) {
			s.inside = s.pos
		}
		return true
	}
	return false
}

// opens reports that the enclosure begins at source[at:], where its inside begins,
// and what closes it.
func (e *enclosure) opens(source []byte, at int) (from int, closing string, ok bool) {
	rest := source[at:]
	if !bytes.HasPrefix(rest, []byte(e.open)) || e.apart && at > 0 && alnumByte(source[at-1]) {
		return 0, "", false
	}
	n := len(e.open)
	if e.tag == 0 {
		return at + n, e.close, true
	}
	const longest = 64
	for n < min(len(rest), longest) && (rest[n] == e.tag || e.tag == 'w' && (alnumByte(rest[n]) || rest[n] == '_')) {
		n++
	}
	if !bytes.HasPrefix(rest[n:], []byte(e.openEnd)) {
		return 0, "", false
	}
	return at + n + len(e.openEnd), e.close + string(rest[len(e.open):n]) + e.closeEnd, true
}

// closes finds the end of the inside and of the closing delimiter; without one both
// are where the string, or the source, must end.
func (e *enclosure) closes(source []byte, from int, closing string) (to, end int, ok bool) {
	depth, brackets := 0, 0
	for i := from; i < len(source); i++ {
		c := source[i]
		switch {
		case (c == '\n' || c == '\r') && !e.lines && closing[0] != c:
			return i, i, false
		case brackets > 0:
			brackets += bracket(e.inner, c)
		case e.inner != "" && c == e.inner[0] && bytes.HasPrefix(source[i:], []byte(e.inner)):
			brackets, i = 1, i+len(e.inner)-1
		case e.escape != 0 && c == e.escape:
			if i++; bytes.HasPrefix(source[i:], []byte("\r\n")) {
				i++
			}
		case e.nested && bytes.HasPrefix(source[i:], []byte(e.open)):
			depth, i = depth+1, i+len(e.open)-1
		case c != closing[0] || !bytes.HasPrefix(source[i:], []byte(closing)) || e.fresh && !lineStart(source, i):
		case depth > 0:
			depth, i = depth-1, i+len(closing)-1
		case e.doubled && bytes.HasPrefix(source[i+len(closing):], []byte(closing)):
			i += 2*len(closing) - 1
		default:
			return i, i + len(closing), true
		}
	}
	return len(source), len(source), false
}

// bracket counts the brackets of the kind that inner ends with.
func bracket(inner string, c byte) int {
	switch open := inner[len(inner)-1]; {
	case c == open:
		return 1
	case open == '{' && c == '}' || open == '(' && c == ')':
		return -1
	}
	return 0
}

// charLength returns the length of the character literal at source[at:], 0 for an
// apostrophe that begins none: a lifetime, a prime, a mark between digits.
func charLength(source []byte, at int) int {
	if before := source[max(0, at-2):at]; len(before) > 0 && alnumByte(before[len(before)-1]) {
		prefix := before[len(before)-1]
		known := prefix == 'L' || prefix == 'u' || prefix == 'U' || prefix == 'b' || string(before) == "u8"
		if !known || len(before) == 2 && alnumByte(before[0]) && string(before) != "u8" {
			return 0
		}
	}
	rest := source[at+1:]
	const longest = len(`\u{10FFFF}`)
	if len(rest) > 1 && rest[0] == '\\' {
		if i := bytes.IndexByte(rest[2:min(len(rest), 2+longest)], '\''); i >= 0 {
			return i + 4
		}
		return 0
	}
	_, n := utf8.DecodeRune(rest)
	if n == 0 || len(rest) <= n || rest[n] != '\'' || rest[0] == '\n' {
		return 0
	}
	return n + 2
}

// rawPrefix reports that the letters right before the string at source[at:] are a
// prefix with an r.
func rawPrefix(source []byte, at int) bool {
	from := at
	for from > 0 && at-from < 3 && alnumByte(source[from-1]) {
		from--
	}
	return at-from < 3 && bytes.ContainsAny(source[from:at], "rR")
}

func lineStart(source []byte, at int) bool {
	return at == 0 || source[at-1] == '\n' || source[at-1] == '\r' || at == bomLen(source)
}

// lineLength is how many bytes stand before the end of the line.
func lineLength(b []byte) int {
	if i := bytes.IndexAny(b, "\r\n"); i >= 0 {
		return i
	}
	return len(b)
}
