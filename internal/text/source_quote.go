package text

import (
	"bytes"
	"strings"
)

// farQuote bounds a literal whose delimiters the writer chose, in bytes.
const farQuote = 16 << 10

// characterMark moves over "?" with a sign that would begin a string or comment,
// where a character stands.
func (s *codeScanner) characterMark() bool {
	rest := s.source[s.pos:]
	if len(rest) < 2 || strings.IndexByte("\"'`#;", rest[1]) < 0 || len(rest) > 2 && alnumByte(rest[2]) ||
		s.pos > 0 && strings.IndexByte(" \t\n([{,=!", s.source[s.pos-1]) < 0 {
		return false
	}
	s.pos, s.last = s.pos+2, '\''
	return true
}

// chosenQuote moves over a literal that begins with a word and a delimiter of the
// writer's choice: q{...}, s/.../.../, %w[...].
func (s *codeScanner) chosenQuote() bool {
	word := s.chosenWord()
	open := s.pos + len(word)
	if word == "" || s.pos < s.plain || open >= len(s.source) || strings.IndexByte("/!|{([#%@", s.source[open]) < 0 {
		return false
	}
	end, ok := s.chosenEnd(open)
	if ok && (word == "s" || word == "tr" || word == "y") {
		if s.source[open] == s.source[end-1] {
			end--
		} else {
			for end < len(s.source) && isSpaceByte(s.source[end]) {
				end++
			}
		}
		end, ok = s.chosenEnd(end)
	}
	if !ok {
		s.plain = end
		return false
	}
	s.pos, s.last = end, '"'
	return true
}

// chosenWord returns the word at pos that begins such a literal, "" when there is
// none, or the name of something else.
func (s *codeScanner) chosenWord() string {
	rest := s.source[s.pos:]
	for _, word := range s.quotes {
		if !bytes.HasPrefix(rest, []byte(word)) {
			continue
		}
		if s.pos == 0 {
			return word
		}
		before := s.source[s.pos-1]
		if word[0] == '%' && strings.IndexByte(" \t\n([{,=", before) < 0 || alnumByte(before) || strings.IndexByte("_$@%&>-{", before) >= 0 {
			return ""
		}
		return word
	}
	return ""
}

// chosenEnd returns the place behind the delimiter that closes the one at open;
// where none does, how far it looked.
func (s *codeScanner) chosenEnd(open int) (end int, ok bool) {
	if open >= len(s.source) {
		return open, false
	}
	opener := s.source[open]
	closer := opener
	if i := strings.IndexByte("([{<", opener); i >= 0 {
		closer = ")]}>"[i]
	}
	bound := min(len(s.source), open+farQuote)
	depth := 1
	for i := open + 1; i < bound; i++ {
		switch c := s.source[i]; {
		case c == '\\':
			i++
		case c == closer:
			if depth--; depth == 0 {
				return i + 1, true
			}
		case c == opener:
			depth++
		}
	}
	return bound, false
}
