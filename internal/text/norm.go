package text

import (
	"unicode"
	"unicode/utf8"

	"golang.org/x/text/unicode/norm"
)

// Fold appends the normal form of a word to dst: Unicode NFC, lower case,
// apostrophes as U+0027, hyphens as U+002D, ligatures of f spelled out, format
// characters (the soft hyphen among them) left out. It is the form that the
// lexicon is keyed by. Fold is idempotent, gives the same for NFC and NFD, and
// allocates only when dst must grow. Bytes that are not UTF-8 are kept.
func Fold(dst, word []byte) []byte {
	start := len(dst)
	for i, c := range word {
		if c >= utf8.RuneSelf {
			return foldRunes(dst, start, word[i:])
		}
		if c == '`' {
			c = '\''
		} else if 'A' <= c && c <= 'Z' {
			c += 'a' - 'A'
		}
		dst = append(dst, c)
	}
	return dst
}

// foldRunes is Fold for a rest that begins with a byte above ASCII; the form
// begins at dst[start].
func foldRunes(dst []byte, start int, rest []byte) []byte {
	for i := 0; i < len(rest); {
		r, n := utf8.DecodeRune(rest[i:])
		if r == utf8.RuneError && n <= 1 {
			dst = append(dst, rest[i])
		} else {
			dst = appendFolded(dst, r)
		}
		i += n
	}
	end := len(dst)
	if norm.NFC.QuickSpan(dst[start:end]) == end-start {
		return dst
	}
	// Compose behind the form, then move down. The NUL between them is a
	// starter, which keeps Append from composing across.
	dst = append(dst, 0)
	dst = norm.NFC.Append(dst, dst[start:end]...)
	return append(dst[:start], dst[end+1:]...)
}

// appendFolded appends the folded form of one code point.
func appendFolded(dst []byte, r rune) []byte {
	switch {
	case isApostrophe(r):
		return append(dst, '\'')
	case r == '\u2010' || r == '\u2011':
		return append(dst, '-')
	case r == '\u0130': // İ, whose simple lower case would lose the dot that NFD keeps
		return append(dst, "i\u0307"...)
	case '\uFB00' <= r && r <= '\uFB06':
		return append(dst, ligatures[r-'\uFB00']...)
	case isFormat(r):
		return dst
	}
	return utf8.AppendRune(dst, unicode.ToLower(r))
}

var ligatures = [...]string{"ff", "fi", "fl", "ffi", "ffl", "st", "st"}

// isApostrophe reports the characters written for an apostrophe inside words:
// the two right ones, and those that keyboards and converters put in their place.
func isApostrophe(r rune) bool {
	switch r {
	case '\'', '\u2019', '\u2018', '\u201B', '\u02BB', '\u02BC', '\u2032', '\uFF07', '`', '\u00B4':
		return true
	}
	return false
}
