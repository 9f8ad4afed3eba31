package house

import (
	"crypto/sha256"
	"encoding/hex"
	"slices"
	"strings"
	"unicode"

	"example.org/foulcase"
	"example.org/foulcase/internal/text"
)

// fingerprintBytes is the length of a fingerprint in bytes; as digits it is twice that.
const fingerprintBytes = 8

// reach is how many words to each side of a mark its fingerprint takes in.
const reach = 3

// Fingerprint identifies a mark by 16 hexadecimal digits: of the Name of its
// document, its part, its kind, its folded form and the three words to each side.
// It stays the same when lines move, when text further off changes, and however
// path is spelled. Marks alike in all of these share it.
func Fingerprint(path string, m foulcase.Mark) string {
	before, after := surroundings(m)
	parts := slices.Concat([]string{Name(path), m.Part, m.Kind.String(), formOf(m.Observed)}, before, []string{""}, after)
	sum := sha256.Sum256([]byte(strings.Join(parts, "\x00")))
	return hex.EncodeToString(sum[:fingerprintBytes])
}

// surroundings are the nearest words before and after a mark, folded. Where its
// context has the form more than once, the occurrence nearest the middle is meant.
func surroundings(m foulcase.Mark) (before, after []string) {
	form := strings.Join(strings.Fields(m.Observed), " ")
	best, offCentre := -1, len(m.Context)
	for i := 0; form != "" && i+len(form) <= len(m.Context); i++ {
		if off := max(2*i+len(form), len(m.Context)) - min(2*i+len(form), len(m.Context)); off < offCentre && strings.HasPrefix(m.Context[i:], form) {
			best, offCentre = i, off
		}
	}
	if best < 0 { // written with markup inside: the whole context stands for it
		return wordsOf(m.Context), nil
	}
	before, after = wordsOf(m.Context[:best]), wordsOf(m.Context[best+len(form):])
	return before[max(0, len(before)-reach):], after[:min(reach, len(after))]
}

// wordsOf folds the words of s, without what stands between them.
func wordsOf(s string) []string {
	return strings.FieldsFunc(fold(s), func(r rune) bool {
		return !unicode.IsLetter(r) && !unicode.IsNumber(r) && !unicode.IsMark(r) && r != '\''
	})
}

// formOf folds what was observed, however its lines were broken.
func formOf(observed string) string { return fold(strings.Join(strings.Fields(observed), " ")) }

func fold(s string) string { return string(text.Fold(nil, []byte(s))) }
