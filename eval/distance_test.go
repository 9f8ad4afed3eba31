package eval

import (
	"math/rand/v2"
	"testing"

	"github.com/agnivade/levenshtein"
)

// Textbook pairs (Jurafsky & Martin, chapter 2; acress: Kernighan, Church &
// Gale 1990). ca/abc tells restricted transpositions (3) from free ones (2).
func TestEditDistance(t *testing.T) {
	for _, c := range []struct {
		a, b string
		want int
	}{
		{"kitten", "sitting", 3},
		{"Saturday", "Sunday", 3},
		{"intention", "execution", 5},
		{"ca", "abc", 3},
		{"acress", "caress", 1},
		{"", "quay", 4},
		{"naïve", "naive", 1},
	} {
		for _, got := range []int{editDistance(c.a, c.b), editDistance(c.b, c.a)} {
			if got != c.want {
				t.Errorf("%s/%s: %d, want %d", c.a, c.b, got, c.want)
			}
		}
	}
	if d := levenshtein.ComputeDistance("acress", "caress"); d != 2 {
		t.Errorf("acress/caress without transpositions: %d, want 2", d)
	}
}

// Against the definition, on random words of three letters' alphabet.
func TestEditDistanceByRecursion(t *testing.T) {
	r := rand.New(rand.NewPCG(1, 3))
	draw := func() string {
		b := make([]byte, r.IntN(7))
		for i := range b {
			b[i] = byte('a' + r.IntN(3))
		}
		return string(b)
	}
	for range 2000 {
		a, b := draw(), draw()
		if got, want := editDistance(a, b), distanceByRecursion(a, b); got != want {
			t.Fatalf("%q/%q: %d, want %d", a, b, got, want)
		}
	}
}

func distanceByRecursion(a, b string) int {
	if len(a) == 0 || len(b) == 0 {
		return len(a) + len(b)
	}
	change := 1
	if a[0] == b[0] {
		change = 0
	}
	d := min(distanceByRecursion(a[1:], b[1:])+change, distanceByRecursion(a[1:], b)+1, distanceByRecursion(a, b[1:])+1)
	if len(a) > 1 && len(b) > 1 && a[0] == b[1] && a[1] == b[0] {
		d = min(d, distanceByRecursion(a[2:], b[2:])+1)
	}
	return d
}

func TestEditClass(t *testing.T) {
	for _, c := range [][3]string{
		{"pillot", "pilot", "insertion"},
		{"plot", "pilot", "deletion"},
		{"pilat", "pilot", "substitution"},
		{"piolt", "pilot", "transposition"},
		{"polit", "pilot", "two edits"},
		{"pielet", "pilot", "two edits"},
		{"plttt", "pilot", "three or more"},
		{"pilot", "pilot", "case only"},
	} {
		if got := editClass(c[0], c[1]); got != c[2] {
			t.Errorf("%s for %s: %s, want %s", c[0], c[1], got, c[2])
		}
	}
}
