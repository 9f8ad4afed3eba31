package channel

import (
	"math"
	"testing"
)

// Worked out on paper: an edit with a probability of a tenth could be made at ten
// places, so one is expected; five are seen. The model counts for twice the places
// of the pairs and for ten more, so its prior weighs 1 x (2 + 10/10) = 3 edits. The
// factor is (5 + 3) / (1 + 3) = 2. A second edit of the kind, expected once too and
// never seen, has (0 + 3) / (1 + 3) = 3/4.
func TestFactorsOnPaper(t *testing.T) {
	f := newFamily([]float64{.1, .1, 0}, []float64{10, 10, 10}, 2, 10, 0, func(i int) int { return i })
	f.raise([]float64{5, 0, 7})
	for i, want := range []float64{.2, .075, 0} {
		if got := f.tilted()[i]; math.Abs(got-want) > 1e-12 {
			t.Errorf("edit %d: %v, want %v", i, got, want)
		}
	}
	// 3 (log 2 - 2 + 1) + 3 (log .75 - .75 + 1) - 10 x .1 x (2 - 1) - 10 x .1 x (.75 - 1)
	if got, want := f.penalty(), 3*(math.Log(2)-1)+3*(math.Log(.75)+.25)-1+.25; math.Abs(got-want) > 1e-12 {
		t.Errorf("penalty %v, want %v", got, want)
	}
}

// With a level for the kind above, the kind takes what the edits share: 5 seen where
// 2 are expected and the prior weighs 2 x (2 + 10/20) = 5 gives (5 + 5) / (2 + 5) =
// 10/7. Then the first has (5 + 3) / (10/7 + 3) = 56/31, the second 3 / (31/7) = 21/31.
func TestFactorsOfLevels(t *testing.T) {
	f := newFamily([]float64{.1, .1}, []float64{10, 10}, 2, 10, 0, func(int) int { return 0 }, func(i int) int { return i })
	f.raise([]float64{5, 0})
	for i, want := range []float64{.1 * 10 / 7 * 56 / 31, .1 * 10 / 7 * 21 / 31} {
		if got := f.tilted()[i]; math.Abs(got-want) > 1e-12 {
			t.Errorf("edit %d: %v, want %v", i, got, want)
		}
	}
}

func TestClearlyMore(t *testing.T) {
	// Differences 1, 2, 3: mean 2, standard error 1/sqrt 3. Then -3, 0, 4: mean 1/3.
	if !clearlyMore([]float64{2, 2, 2}, []float64{1, 0, -1}) || clearlyMore([]float64{-3, 0, 4}, []float64{0, 0, 0}) {
		t.Error("a mean of 2 with an error of 0.58 is clear, one of 0.33 with 2.03 is not")
	}
}
