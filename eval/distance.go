package eval

import (
	"unicode/utf8"

	"github.com/agnivade/levenshtein"
)

// editDistance is the restricted Damerau distance ("optimal string
// alignment"): insertions, deletions, substitutions and transpositions of
// neighbours, no part edited twice, each at a cost of one code point.
func editDistance(a, b string) int {
	s, t := []rune(a), []rune(b)
	older, old, row := make([]int, len(t)+1), make([]int, len(t)+1), make([]int, len(t)+1)
	for j := range old {
		old[j] = j
	}
	for i := range s {
		row[0] = i + 1
		for j := range t {
			change := old[j]
			if s[i] != t[j] {
				change++
			}
			best := min(change, old[j+1]+1, row[j]+1)
			if i > 0 && j > 0 && s[i] == t[j-1] && s[i-1] == t[j] {
				best = min(best, older[j-1]+1)
			}
			row[j+1] = best
		}
		older, old, row = old, row, older
	}
	return old[len(t)]
}

// editClass names how far an observed form is from the intended one, after
// Damerau (1964): a single edit by what happened to the intended form, or how
// many edits there are.
func editClass(observed, intended string) string {
	longer := utf8.RuneCountInString(observed) - utf8.RuneCountInString(intended)
	switch d := editDistance(observed, intended); {
	case d == 0:
		return "case only"
	case d == 2:
		return "two edits"
	case d > 2:
		return "three or more"
	case longer > 0:
		return "insertion"
	case longer < 0:
		return "deletion"
	case levenshtein.ComputeDistance(observed, intended) == 2:
		return "transposition" // one edit here, two without transpositions
	}
	return "substitution"
}
