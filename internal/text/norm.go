package text

import (
	"unicode"
	"unicode/utf8"

	"golang.org/x/text/unicode/norm"
)

// Fold appends the normal form of a word to dst: Unicode NFC, lower case,
// apostrophes as U+0027, hyphens as U+002D, ligatures of f spelled out, format
// characters (the soft hyphen among them) left out. It is the form that the
// lexicon is keyed by. Fold is idempotent and gives the same for NFC and NFD.
// It allocates only when dst must grow or the word is not in NFC. Bytes that
// are not UTF-8 are kept.
func Fold(dst, word []byte) []byte {
	start := len(dst)
	if dst = appendFolded(dst, word); norm.NFC.QuickSpan(dst[start:]) == len(dst)-start {
		return dst
	}
	var c composer
	return c.compose(dst, start)
}

// appendFolded is Fold less the composing.
func appendFolded(dst, word []byte) []byte {
	for i := 0; i < len(word); {
		c := word[i]
		if c >= utf8.RuneSelf {
			r, n := utf8.DecodeRune(word[i:])
			if r == utf8.RuneError && n <= 1 {
				dst = append(dst, c)
			} else {
				dst = appendFoldedRune(dst, r)
			}
			i += n
			continue
		}
		switch {
		case c == '`':
			c = '\''
		case 'A' <= c && c <= 'Z':
			c += 'a' - 'A'
		}
		dst = append(dst, c)
		i++
	}
	return dst
}

// appendFoldedRune appends the folded form of one code point above ASCII.
func appendFoldedRune(dst []byte, r rune) []byte {
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

// composer puts text into NFC with memory of its own, kept from call to call.
type composer struct {
	iter    norm.Iter
	scratch []byte
}

// compose puts dst[start:] into NFC in place and returns the shorter or longer dst.
func (c *composer) compose(dst []byte, start int) []byte {
	c.scratch = append(c.scratch[:0], dst[start:]...)
	dst = dst[:start]
	for c.iter.Init(norm.NFC, c.scratch); !c.iter.Done(); {
		dst = append(dst, c.iter.Next()...)
	}
	return dst
}

// isApostrophe reports the characters written for an apostrophe inside words:
// the two right ones, and those that keyboards and converters put in their place.
func isApostrophe(r rune) bool {
	switch r {
	case '\'', '\u2019', '\u2018', '\u201B', '\u02BB', '\u02BC', '\u2032', '\uFF07', '`', '\u00B4',
		'\u1FEF', '\u1FFD': // these two are ` and U+00B4 in NFC
		return true
	}
	return false
}
