package channel

import "unicode/utf8"

// Symbol is a class of letters the model keeps figures for: the edge of a word,
// the letters a to z with or without accents, and one class for the rest.
type Symbol uint8

// The symbols that are not letters of the alphabet. Letters are 1 to 26.
const (
	Edge  Symbol = 0  // the start or the end of a word
	Other Symbol = 27 // apostrophe, hyphen, digit, letter of another script
)

// symbols is the size of the alphabet.
const symbols = 28

// Letter is one code point of a word and the class it belongs to.
type Letter struct {
	Rune rune
	Sym  Symbol
}

// latinBase gives the plain letter under each accented one from U+00DF (sharp
// s) to U+017F (long s); '.' where there is none.
const latinBase = "s" +
	"aaaaaaaceeeeiiiidnooooo.ouuuuyty" + // from U+00E0
	"aaaaaaccccccccddddeeeeeeeeeegggg" + // from U+0100
	"gggghhhhiiiiiiiiiiiijjkkklllllll" + // from U+0120
	"lllnnnnnnnnnoooooooorrrrrrssssss" + // from U+0140
	"ssttttttuuuuuuuuuuuuwwyyyzzzzzzs" // from U+0160

// LetterOf classifies a code point, which should be in lower case.
func LetterOf(r rune) Letter {
	switch {
	case 'a' <= r && r <= 'z':
		return Letter{r, Symbol(r-'a') + 1}
	case 0xdf <= r && r <= 0x17f:
		if b := latinBase[r-0xdf]; b != '.' {
			return Letter{r, Symbol(b-'a') + 1}
		}
	}
	return Letter{r, Other}
}

// AppendLetters appends the letters of a word in UTF-8. Bytes that are not
// UTF-8 become U+FFFD.
func AppendLetters(dst []Letter, word []byte) []Letter {
	for len(word) > 0 {
		r, n := utf8.DecodeRune(word)
		dst = append(dst, LetterOf(r))
		word = word[n:]
	}
	return dst
}

// Rune is the plain letter of a symbol; '^' for an edge and '\” for Other.
func (s Symbol) Rune() rune {
	switch {
	case s == Edge:
		return '^'
	case s < Other:
		return 'a' + rune(s) - 1
	}
	return '\''
}
