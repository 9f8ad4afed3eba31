package text

import (
	"unicode"
	"unicode/utf8"
)

// class is a set of byte properties; the classes of a run are or-ed to see at
// once what can be in it.
type class uint16

const (
	cSpace   class = 1 << iota // ASCII white space
	cLower                     // a-z
	cUpper                     // A-Z
	cDigit                     // 0-9
	cApos                      // '
	cHyphen                    // -
	cPoint                     // .
	cParen                     // ( )
	cPunct                     // , ; : ! ? " [ ]
	cCode                      // # $ % & * + / < = > @ \ ^ _ ` { | } ~
	cControl                   // C0 and DEL less white space
	cHigh                      // a byte above ASCII

	cLetter = cLower | cUpper
	cAlnum  = cLetter | cDigit
)

// classes holds the class of every byte.
var classes = func() (t [256]class) {
	for i := range t {
		switch c := byte(i); {
		case isSpaceByte(c):
			t[i] = cSpace
		case 'a' <= c && c <= 'z':
			t[i] = cLower
		case 'A' <= c && c <= 'Z':
			t[i] = cUpper
		case '0' <= c && c <= '9':
			t[i] = cDigit
		case c == '\'':
			t[i] = cApos
		case c == '-':
			t[i] = cHyphen
		case c == '.':
			t[i] = cPoint
		case c == '(' || c == ')':
			t[i] = cParen
		case c < ' ' || c == 0x7F:
			t[i] = cControl
		case c >= utf8.RuneSelf:
			t[i] = cHigh
		default:
			t[i] = cCode
		}
	}
	for _, c := range []byte(`,;:!?"[]`) {
		t[c] = cPunct
	}
	return t
}()

// runeClass sorts code points for the scanner of words. The classes follow the
// properties of UAX #29: letters of either kind are ALetter (or, for scripts
// without spaces, what that annex breaks by the character), extenders are
// Extend, Format and ZWJ.
type runeClass uint8

const (
	rSymbol   runeClass = iota // anything else
	rLatin                     // a letter of the Latin script
	rForeign                   // a letter of another script
	rExtender                  // combining mark or format character: goes with what stands before
	rSpace
	rBroken // a byte that is not UTF-8
)

// classOf returns the class of the code point that decodes as r in n bytes.
func classOf(r rune, n int) runeClass {
	switch {
	case r < utf8.RuneSelf:
		switch c := classes[r]; {
		case c&cLetter != 0:
			return rLatin
		case c&cSpace != 0:
			return rSpace
		}
		return rSymbol
	case r == utf8.RuneError && n <= 1:
		return rBroken
	case r < 0x250: // Latin-1 and the first Latin extensions
		switch {
		case r >= 0xC0 && r != 0xD7 && r != 0xF7, r == 0xAA, r == 0xBA:
			return rLatin
		case r == 0xA0, r == 0x85:
			return rSpace
		case r == 0xAD:
			return rExtender
		case r == 0xB5: // the micro sign
			return rForeign
		}
		return rSymbol
	case 0x2010 <= r && r <= 0x2027: // dashes, quotation marks, ellipsis
		return rSymbol
	}
	return classOfRare(r)
}

func classOfRare(r rune) runeClass {
	switch {
	case unicode.Is(unicode.Latin, r) && !('\uFF21' <= r && r <= '\uFF5A') && unicode.IsLetter(r):
		return rLatin
	case unicode.IsSpace(r), r == '\u200B':
		return rSpace
	case unicode.IsMark(r), isFormat(r):
		return rExtender
	case unicode.IsLetter(r):
		return rForeign
	}
	return rSymbol
}

// isFormat reports invisible characters that a word may hold without being
// another word: soft hyphen, joiners, direction marks (general category Cf).
func isFormat(r rune) bool {
	return r == '\u00AD' || r >= '\u0600' && r != '\u200B' && unicode.Is(unicode.Cf, r)
}
