package text

import (
	"bytes"
	"unicode/utf8"
)

// wordKind gives a word of Latin letters its kind: a single letter other than a
// and I is left alone; a word of capitals is a number when roman, an acronym up
// to five letters and a word from six on or with an apostrophe inside (DON'T);
// acronyms may have an ending (PCs, NASA's); a capital inside makes an identifier
// or a brand (camelCase, iPhone), left alone, but for names (McDonald, O'Neill).
// A unit after a number (10 kg) is left alone too.
func (s *Segmenter) wordKind(word []byte, w shape, c Case) Kind {
	switch {
	case w.letters() == 1:
		if last := word[len(word)-1] | 0x20; w.inner || w.high || last == 'a' || last == 'i' || len(word) > 1 {
			return Word
		}
		return Literal
	case c == Lower:
		if len(word) < 6 && (roman(word) || s.afterNumber() && spacedUnit(word)) {
			return Literal
		}
	case c == Upper && roman(word):
		return Number
	case c == Upper && w.letters() < longCapitals && (!w.inner || bytes.HasSuffix(word, []byte("S"))):
		return Acronym
	case c == Mixed && acronymEnding(word):
		return Acronym
	case c == Mixed && !nameShape(word):
		return Literal
	}
	return Word
}

// longCapitals is the length in letters from which a word of capitals is a word.
const longCapitals = 6

// afterNumber reports that the last token is a number with a space after it.
func (s *Segmenter) afterNumber() bool {
	n := len(s.tokens)
	return n > 0 && s.tokens[n-1].Kind == Number && classes[s.text[s.last-1]]&cDigit != 0
}

// acronymEnding: capitals and a small s, with or without an apostrophe.
func acronymEnding(word []byte) bool {
	n := 0
	for n < len(word) && classes[word[n]]&cUpper != 0 {
		n++
	}
	switch string(word[n:]) {
	case "s", "'s", "\u2019s", "es":
		return n > 1
	}
	return false
}

// nameShape: Mc, Mac, De, Van and the like before a capital, or a capital after
// an apostrophe, and small letters otherwise.
func nameShape(word []byte) bool {
	rest := word
	for _, prefix := range [...]string{"Mac", "Mc", "Fitz", "De", "Di", "Du", "Da", "Del", "Des", "La", "Le", "Van", "Von", "St"} {
		if n := len(prefix); len(word) > n+2 && string(word[:n]) == prefix && classes[word[n]]&(cUpper|cHigh) != 0 {
			rest = word[n:]
			break
		}
	}
	start := true // of a part
	for i := 0; i < len(rest); {
		r, n := utf8.DecodeRune(rest[i:])
		if isUpper(r) && !start {
			return false
		}
		start = isApostrophe(r)
		i += n
	}
	return true
}

// clipped reports the folded letters of words written with a leading apostrophe,
// of clitics that stand apart in text cut into words, and of decades.
func clipped(norm []byte) bool {
	switch string(norm) {
	case "tis", "twas", "twere", "twill", "twould", "em", "cause", "til", "till", "bout", "round", "cos", "coz", "n",
		"neath", "gainst", "tween", "fraid", "nother", "nuff", "s", "ll", "re", "ve", "d", "m", "t":
		return true
	}
	return len(norm) >= 2 && len(norm) <= 3 && all(norm[:2], cDigit) && (len(norm) == 2 || norm[2] == 's')
}

// roman reports a roman numeral of two letters or more: of I, V and X alone, or
// in capitals of four letters and more, so that MIX, CD and mild are none.
func roman(word []byte) bool {
	if len(word) < 2 || len(word) > 15 {
		return false
	}
	small := true // I, V and X alone
	for _, c := range word {
		switch c {
		case 'I', 'V', 'X', 'i', 'v', 'x':
		case 'L', 'C', 'D', 'M':
			small = false
		default:
			return false
		}
	}
	if !small && len(word) < 4 {
		return false
	}
	return romanOrder(word)
}

// romanOrder checks the digits from thousands to ones.
func romanOrder(word []byte) bool {
	var buf [15]byte
	w := bytes.TrimLeft(appendFolded(buf[:0], word), "m")
	for _, d := range [...][3]byte{{'c', 'd', 'm'}, {'x', 'l', 'c'}, {'i', 'v', 'x'}} {
		one, five, ten := d[0], d[1], d[2]
		switch {
		case len(w) > 1 && w[0] == one && (w[1] == five || w[1] == ten):
			w = w[2:]
			continue
		case len(w) > 0 && w[0] == five:
			w = w[1:]
		}
		for n := 0; n < 3 && len(w) > 0 && w[0] == one; n++ {
			w = w[1:]
		}
	}
	return len(w) == 0
}
