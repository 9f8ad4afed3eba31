package text

import "bytes"

// longCapitals is the length in letters from which a word of capitals is a
// word: shorter ones are acronyms.
const longCapitals = 6

// wordKind gives a word of Latin letters its kind by its shape.
func (s *Segmenter) wordKind(word []byte, w shape, c Case) Kind {
	switch {
	case w.letters() == 1:
		if w.high || oneLetterWord(word) {
			return Word
		}
		return Literal
	case c == Upper:
		return capitals(word, w)
	case c == Mixed && acronymEnding(word):
		return Acronym
	case c == Mixed && !nameShape(word):
		return Literal
	}
	return Word
}

func oneLetterWord(word []byte) bool {
	switch word[len(word)-1] {
	case 'a', 'A', 'i', 'I':
		return true
	}
	return false
}

func capitals(word []byte, w shape) Kind {
	if roman(word) {
		return Number
	}
	if w.letters() >= longCapitals {
		return Word
	}
	return Acronym
}

func acronymEnding(word []byte) bool { return false }
func nameShape(word []byte) bool     { return false }
func roman(word []byte) bool         { return false }

// clipped reports the folded letters of words written with a leading apostrophe.
func clipped(norm []byte) bool {
	switch string(norm) {
	case "tis", "twas", "em", "s", "ll", "re", "ve", "d", "m":
		return true
	}
	return false
}

// leftAlone appends the token of what begins at p and is left alone, and returns
// its end, p when no rule holds.
func (s *Segmenter) leftAlone(p, q int) int {
	if bytes.Contains(s.text[p:q], []byte("://")) {
		s.add(Literal, p, q)
		return q
	}
	return p
}
