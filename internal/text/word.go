package text

import (
	"unicode/utf8"

	"golang.org/x/text/unicode/norm"
)

// word appends the word that starts at start and has its first letter or digit
// at p (a leading apostrophe lies between). It returns its end.
//
// Words follow UAX #29 (rules WB4 to WB13b), tailored: letters with their
// extenders, and between two letters any character of isApostrophe and the
// middle dot; a colon and a point end a word; an underscore stays inside before
// a letter or digit. Letters of scripts that the annex breaks by the character
// are kept together, since words with them are left alone in any case.
func (s *Segmenter) word(start, p, q int) int {
	w := shape{lead: p > start}
	text := s.text[:q]
	for p < q {
		from := p
		for p < q && 'a' <= text[p] && text[p] <= 'z' {
			p++
		}
		if w.lower += p - from; p == q {
			break
		}
		c := text[p]
		switch m := classes[c]; {
		case m&cUpper != 0:
			if w.lower+w.upper == 0 {
				w.first = true
			}
			w.upper++
			p++
			continue
		case m&cDigit != 0:
			w.digits = true
			p++
			continue
		case c == '_' && alnumAt(text, p+1, q):
			w.under = true
			p++
			continue
		case m&(cHigh|cApos|cCode) == 0:
		default:
			if n := s.wordRune(&w, start, p, q); n > 0 {
				p += n
				continue
			}
		}
		break
	}
	s.addWord(start, p, w)
	return p
}

// shape counts what a word is made of.
type shape struct {
	lower, upper, other int  // letters: Latin by case, Latin without case
	first               bool // its first cased letter is a capital
	foreign             bool // it has letters of another script, or bytes that are not UTF-8
	digits, under       bool // it has digits, underscores
	lead, inner         bool // it has an apostrophe before its first letter, between letters
	high                bool // it has characters above ASCII
}

func (w *shape) letters() int { return w.lower + w.upper + w.other }

// wordRune takes one character above ASCII, or an apostrophe, into a word. It
// returns its length, 0 when it ends the word.
func (s *Segmenter) wordRune(w *shape, start, p, q int) int {
	r, n := utf8.DecodeRune(s.text[p:q])
	if isApostrophe(r) || r == '\u00B7' {
		if p == start || !letterAt(s.text, p+n, q) {
			return 0
		}
		w.inner = true
		w.high = w.high || n > 1 || r == '`'
		return n
	}
	switch classOf(r, n) {
	case rLatin:
		switch {
		case isUpper(r):
			if w.lower+w.upper == 0 {
				w.first = true
			}
			w.upper++
		case isLower(r):
			w.lower++
		default:
			w.other++
		}
	case rForeign, rBroken:
		w.foreign = true
	case rExtender:
	default:
		return 0
	}
	w.high = true
	return n
}

// letterAt reports a letter, of any script, at p.
func letterAt(text []byte, p, q int) bool {
	if p >= q {
		return false
	}
	r, n := utf8.DecodeRune(text[p:q])
	cl := classOf(r, n)
	return cl == rLatin || cl == rForeign
}

func alnumAt(text []byte, p, q int) bool {
	return p < q && classes[text[p]]&cDigit != 0 || letterAt(text, p, q)
}

// addWord appends the token of a word, with the kind its shape gives it.
func (s *Segmenter) addWord(start, end int, w shape) {
	word := s.text[start:end]
	t := Token{Start: start, End: end, Glued: start == s.last}
	switch {
	case w.foreign:
		t.Kind = Other
		if w.letters() > 0 {
			t.Kind = Literal
		}
	case w.digits && w.letters() == 0 && !w.under, w.digits && w.lead: // the second is '90s
		t.Kind = Number
	case w.digits, w.under:
		t.Kind = Literal
	default:
		t.Case = casePattern(w.lower, w.upper, w.first)
		t.Kind = s.wordKind(word, w, t.Case)
		t.Norm = s.norm(word, w)
	}
	if t.Kind == Word && w.lower > 0 {
		s.lower++
	} else if t.Kind == Word && w.upper >= longCapitals {
		s.upper++
	}
	s.tokens = append(s.tokens, t)
	s.last = end
}

// norm returns the normal form of a word: the text itself where it is that
// already, else a copy in the arena.
func (s *Segmenter) norm(word []byte, w shape) []byte {
	if w.upper == 0 && !w.high {
		return word[:len(word):len(word)]
	}
	return s.fold(word)
}

// fold is Fold into the arena.
func (s *Segmenter) fold(word []byte) []byte {
	n := len(s.arena)
	s.arena = appendFolded(s.arena, word)
	if norm.NFC.QuickSpan(s.arena[n:]) < len(s.arena)-n {
		s.arena = s.composer.compose(s.arena, n)
	}
	return s.arena[n:len(s.arena):len(s.arena)]
}

// leadingApostrophe reports that the apostrophe at p, before the letters from
// first on, is part of a word ('tis, 'em, the 's of "what 's") or of a year
// ('98) rather than a quotation mark.
func (s *Segmenter) leadingApostrophe(p, first, q int) bool {
	if p == s.last && len(s.tokens) > 0 && wordish(s.tokens[len(s.tokens)-1].Kind) {
		return false
	}
	end := first
	for end < q && classes[s.text[end]]&cAlnum != 0 {
		end++
	}
	if end == first || end-first > 8 {
		return false
	}
	if next, _ := utf8.DecodeRune(s.text[end:q]); end < q && isApostrophe(next) && !letterAt(s.text, end+1, q) {
		return false // a quoted word
	}
	var buf [8]byte
	return clipped(appendFolded(buf[:0], s.text[first:end]))
}
