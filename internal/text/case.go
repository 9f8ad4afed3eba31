package text

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// Case is the pattern of capitals of a word.
type Case uint8

// The patterns. One capital alone ("I", "A") is Title.
const (
	NoCase Case = iota // no letter with case
	Lower              // house
	Title              // House
	Upper              // HOUSE
	Mixed              // McDonald, iPhone
)

var caseNames = [...]string{"NoCase", "Lower", "Title", "Upper", "Mixed"}

// String returns the name of the constant.
func (c Case) String() string {
	if int(c) < len(caseNames) {
		return caseNames[c]
	}
	return "Case?"
}

// CaseOf returns the pattern of capitals of a word. Characters without case,
// apostrophes and combining marks among them, do not count.
func CaseOf(word []byte) Case {
	var lower, upper int
	first := false // the first cased letter is a capital
	for i := 0; i < len(word); {
		r, n := rune(word[i]), 1
		if r >= utf8.RuneSelf {
			r, n = utf8.DecodeRune(word[i:])
		}
		i += n
		switch {
		case isUpper(r):
			if lower+upper == 0 {
				first = true
			}
			upper++
		case isLower(r):
			lower++
		}
	}
	return casePattern(lower, upper, first)
}

// casePattern is CaseOf from the counts of cased letters.
func casePattern(lower, upper int, first bool) Case {
	switch {
	case lower+upper == 0:
		return NoCase
	case upper == 0:
		return Lower
	case upper == 1 && first:
		return Title
	case lower == 0:
		return Upper
	}
	return Mixed
}

// isUpper reports a capital; title-case digraphs count as one.
func isUpper(r rune) bool {
	if r < utf8.RuneSelf {
		return 'A' <= r && r <= 'Z'
	}
	return unicode.IsUpper(r) || unicode.IsTitle(r)
}

func isLower(r rune) bool {
	if r < utf8.RuneSelf {
		return 'a' <= r && r <= 'z'
	}
	return unicode.IsLower(r)
}

// ApplyCase gives form the capitals of a pattern: Title raises its first
// letter, Upper all of them; under any other pattern, and under Title when form
// has capitals of its own ("iPhone"), form is returned as it is.
func ApplyCase(pattern Case, form string) string {
	switch pattern {
	case Upper:
		return strings.ToUpper(form)
	case Title:
		if strings.IndexFunc(form, isUpper) >= 0 {
			return form
		}
		i := strings.IndexFunc(form, unicode.IsLetter)
		if i < 0 {
			return form
		}
		r, n := utf8.DecodeRuneInString(form[i:])
		return form[:i] + string(unicode.ToTitle(r)) + form[i+n:]
	}
	return form
}
