package candidates

import (
	"slices"
	"testing"

	"example.org/foulcase/candidates/lexicon"
	"github.com/agnivade/levenshtein"
)

// The index finds what a look at every pair finds, with the Levenshtein distance
// of a general library (which knows no swaps) as the measure.
func TestNearWordsFindsAll(t *testing.T) {
	words := []string{"a", "cat", "cart", "act", "at", "car", "care", "acre", "berth", "birth", "book", "bok", "bookk", "form", "from", "farm", "quay", "key"}
	lex, err := lexicon.FromWords(words)
	if err != nil {
		t.Fatal(err)
	}
	near := newNearWords(lex, -100)
	for a := range uint32(lex.Len()) {
		x := string(lex.AppendForm(nil, a))
		got := near.of(a)
		if len(x) < 2 {
			got = nil
		}
		for b := range uint32(lex.Len()) {
			y := string(lex.AppendForm(nil, b))
			want := a != b && len(x) > 1 && len(y) > 1 && (levenshtein.ComputeDistance(x, y) == 1 || swapped(x, y))
			if slices.Contains(got, b) != want {
				t.Errorf("%q near %q: %v, want %v", x, y, !want, want)
			}
		}
	}
}

func swapped(x, y string) bool {
	for i := range len(x) - 1 {
		if z := []byte(x); len(x) == len(y) {
			z[i], z[i+1] = z[i+1], z[i]
			if string(z) == y && x != y {
				return true
			}
		}
	}
	return false
}
