package text

import "bytes"

// This file passes over what only some languages have: here-documents and regular
// expressions, in which quotation marks and comment signs mean nothing.

// hereDocument notes the here-document that the mark at hand announces: the mark,
// then "-" or "~" or none, and a word, in quotation marks or not; after a blank a
// word in capitals.
func (s *codeScanner) hereDocument() {
	s.pos += len(s.hereMark)
	s.last = '<'
	rest := s.source[s.pos:]
	n := 0
	for n < min(3, len(rest)) && bytes.IndexByte([]byte("-~ \"'"), rest[n]) >= 0 {
		n++
	}
	word := rest[n:]
	if n > 0 && rest[n-1] == ' ' && len(word) > 0 && classes[word[0]]&cUpper == 0 {
		return // a shift of bits
	}
	length := 0
	for length < len(word) && (alnumByte(word[length]) || word[length] == '_') {
		length++
	}
	if length == 0 || classes[word[0]]&cDigit != 0 || s.noHere {
		return
	}
	s.here = append(s.here, word[:length])
	s.pos += n + length
	if n > 0 && rest[n-1] != ' ' && s.pos < len(s.source) && s.source[s.pos] == rest[n-1] {
		s.pos++ // the closing quotation mark
	}
}

// endOfHere returns how far the here-document goes that word ends, -1 when nothing
// ends it.
func endOfHere(b, word []byte) int {
	for at := 0; at < len(b); {
		n := lineLength(b[at:])
		line := bytes.TrimSpace(b[at : at+n])
		if rest, ok := bytes.CutPrefix(line, word); ok && (len(rest) == 0 || !alnumByte(rest[0])) && len(rest) < 3 {
			return at + n
		}
		at += n + 1
	}
	return -1
}

// regularExpression moves over a literal between slashes, where an operand may
// stand: after an operator, an opening bracket or a word such as return. It must
// end on its line.
func (s *codeScanner) regularExpression() bool {
	if s.pos < s.plain || !s.operandMayFollow() {
		return false
	}
	class := false
	for i := s.pos + 1; i < len(s.source); i++ {
		switch s.source[i] {
		case '\\':
			i++
		case '[':
			class = true
		case ']':
			class = false
		case '/':
			if !class {
				s.pos, s.last = i+1, '/'
				return true
			}
		case '\n', '\r':
			s.plain = i
			return false
		}
	}
	s.plain = len(s.source)
	return false
}

func (s *codeScanner) operandMayFollow() bool {
	if s.last == 0 || bytes.IndexByte([]byte("(,=:[!&|?{};+-*%<>~^"), s.last) >= 0 {
		return true
	}
	before := bytes.TrimRight(s.source[max(0, s.pos-16):s.pos], " \t")
	word := len(before)
	for word > 0 && alnumByte(before[word-1]) {
		word--
	}
	switch string(before[word:]) {
	case "return", "typeof", "case", "in", "of", "and", "or", "not", "if", "unless", "while", "when", "split", "match":
		return true
	}
	return false
}
