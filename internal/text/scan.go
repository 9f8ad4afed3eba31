package text

import (
	"bytes"
	"unicode/utf8"
)

// scan appends the tokens of the run text[p:q] and returns where it stopped: at
// q, beyond it when a token holds white space, or before it when a sentence ends
// inside the run.
//
// The rules of rules.go are asked at the start of the run and after every
// punctuation mark, but only when the classes of the run make them possible, and
// as long as they have not read the run eight times over: a run of nothing but
// marks is no prose and must not take quadratic time.
func (s *Segmenter) scan(p, q int, mask class) int {
	suspect := s.suspect(p, q, mask)
	budget := 8*(q-p) + 1024 // bytes
	for fresh := suspect; p < q; {
		if fresh {
			end, read := s.leftAlone(p, q)
			if end > p {
				p, fresh = end, false
				continue
			}
			budget -= read
			suspect = budget > 0
		}
		c := s.text[p]
		if classes[c]&cLetter != 0 {
			p, fresh = s.word(p, p, q), false
			continue
		}
		r, n := rune(c), 1
		if c >= utf8.RuneSelf {
			r, n = utf8.DecodeRune(s.text[p:q])
		}
		switch cl := classOf(r, n); {
		case isApostrophe(r):
			if s.leadingApostrophe(p, p+n, q) {
				p = s.word(p, p+n, q)
			} else {
				p = s.mark(r, p, n, q)
			}
			fresh = suspect
		case cl == rLatin || cl == rForeign || cl == rBroken || classes[c]&cDigit != 0:
			p, fresh = s.word(p, p, q), false
		default:
			p, fresh = s.mark(r, p, n, q), suspect
			if s.gluedEnd(p, q) {
				s.ended = true
				return p
			}
		}
	}
	return p
}

// suspect reports that a rule may hold somewhere in the run.
func (s *Segmenter) suspect(p, q int, mask class) bool {
	run := s.text[p:q]
	return mask&(cDigit|cCode) != 0 ||
		mask&cPoint != 0 && innerPoint(run) ||
		mask&cHyphen != 0 && run[0] == '-' ||
		mask&cParen != 0 && bytes.Contains(run, []byte("()")) ||
		mask&cPunct != 0 && bytes.Contains(run, []byte("::")) ||
		mask&cHigh != 0 && numeralLen(run) > 0
}

// innerPoint reports a point with a letter or digit after it.
func innerPoint(run []byte) bool {
	for i := 0; i+1 < len(run); i++ {
		if run[i] == '.' && classes[run[i+1]]&(cAlnum|cHigh) != 0 {
			return true
		}
	}
	return false
}

// gluedEnd reports that a sentence ends inside a run: "end!Then", and "end.Then"
// where the rules did not take it for a dotted name.
func (s *Segmenter) gluedEnd(p, q int) bool {
	n := len(s.tokens)
	if p >= q || n < 2 || s.tokens[n-1].Kind != Terminal || !s.tokens[n-1].Glued {
		return false
	}
	before := &s.tokens[n-2]
	r, _ := utf8.DecodeRune(s.text[p:q])
	return before.Kind == Word && before.Case != Upper && isUpper(r)
}

// mark appends the token of a character that begins no word and returns its end.
func (s *Segmenter) mark(r rune, p, n, q int) int {
	end, kind := p+n, Other
	switch r {
	case ',':
		kind = Comma
	case ';', ':', '/', '\u2014', '\u2015', '\u2026':
		kind = Stop
	case '(', '[', '{':
		kind = Open
	case ')', ']', '}':
		kind = Close
	case '!', '?', '\u203D', '\u203C', '\u2047', '\u2048', '\u2049':
		kind = Terminal
	case '"':
		s.quotes++
		kind = Quote
	case '\'', '\u2018', '\u2019', '\u201A', '\u201B', '\u201C', '\u201D', '\u201E', '\u201F', '\u00AB', '\u00BB', '\u2039', '\u203A', '`', '\u00B4':
		kind = Quote
		if end < q && (r == '\'' || r == '`') && s.text[end] == byte(r) {
			end++ // two make a double one
		}
	case '.':
		return s.points(p, q)
	case '-', '\u2010', '\u2011', '\u2012', '\u2013':
		end, kind = s.hyphens(r, p, n, q)
	case '\uFFFC': // stands for code in formats with markup
		kind = Literal
		for end < q && classes[s.text[end]]&cAlnum != 0 {
			end++
		}
	default:
		for r < utf8.RuneSelf && end < q && s.text[end] == byte(r) {
			end++ // a ruled line
		}
		end = s.symbols(end, q)
	}
	s.add(kind, p, end)
	return end
}

// symbols extends a symbol over the extenders and high symbols glued to it, so
// that an emoji sequence is one token.
func (s *Segmenter) symbols(end, q int) int {
	for end < q && s.text[end] >= utf8.RuneSelf {
		r, n := utf8.DecodeRune(s.text[end:q])
		if cl := classOf(r, n); cl != rExtender && (cl != rSymbol || r < 0x2100 || r == '\uFFFC') {
			break
		}
		end += n
	}
	return end
}

// points appends the token of the points at p. Two or three, also with single
// spaces between, are an ellipsis; four and more end a sentence after one.
func (s *Segmenter) points(p, q int) int {
	n, end := 1, p+1
	for end < q && s.text[end] == '.' {
		n++
		end++
	}
	for n < 8 && end+1 < len(s.text) && s.text[end] == ' ' && s.text[end+1] == '.' &&
		(end+2 == len(s.text) || classes[s.text[end+2]]&cAlnum == 0) {
		n++
		end += 2
	}
	kind := Terminal
	if n == 2 || n == 3 {
		kind = Stop
	}
	s.add(kind, p, end)
	return end
}

// hyphens tells a hyphen from a dash: one alone that touches a word or number is
// a hyphen; an en dash must touch on both sides.
func (s *Segmenter) hyphens(r rune, p, n, q int) (end int, kind Kind) {
	end = p + n
	for r == '-' && end < q && s.text[end] == '-' {
		end++
	}
	left := s.last == p && len(s.tokens) > 0 && wordish(s.tokens[len(s.tokens)-1].Kind)
	right := false
	if end < q {
		next, size := utf8.DecodeRune(s.text[end:q])
		cl := classOf(next, size)
		right = cl == rLatin || cl == rForeign || '0' <= next && next <= '9'
	}
	switch {
	case end > p+n, r >= '\u2012' && !(left && right), !left && !right:
		return end, Stop
	}
	return end, Hyphen
}

// wordish reports the kinds that a hyphen joins.
func wordish(k Kind) bool { return k == Word || k == Number || k == Literal || k == Acronym }
