package lexicon

import (
	"strings"
	"unicode"
	"unicode/utf8"

	"golang.org/x/text/unicode/norm"

	"example.org/foulcase/internal/text"
)

// isVowel reports a vowel letter of English, y included.
func isVowel(c byte) bool { return strings.IndexByte("aeiouy", c) >= 0 }

// plainLetters strips the marks off the letters: "café" to "cafe".
func plainLetters(form string) string {
	if isASCII(form) {
		return form
	}
	var b strings.Builder
	for _, r := range norm.NFD.String(form) {
		if !unicode.Is(unicode.Mn, r) {
			b.WriteRune(r)
		}
	}
	return b.String()
}

func isASCII(s string) bool {
	for i := range len(s) {
		if s[i] >= utf8.RuneSelf {
			return false
		}
	}
	return true
}

// latinWord reports a form of Latin letters with apostrophes between them at most.
func latinWord(form string) bool {
	letters := 0
	for i, r := range form {
		switch {
		case r == '\'' && i > 0 && i < len(form)-1:
		case unicode.Is(unicode.Latin, r) || unicode.Is(unicode.Mn, r):
			letters++
		default:
			return false
		}
	}
	return letters > 0
}

// hasTriple reports three equal letters in a row.
func hasTriple(form string) bool {
	for i := 2; i < len(form); i++ {
		if form[i] == form[i-1] && form[i] == form[i-2] {
			return true
		}
	}
	return false
}

func foldString(word string) string { return string(text.Fold(nil, []byte(word))) }
