package lm_test

import (
	"fmt"
	"math/rand/v2"
	"testing"

	"example.org/foulcase/lm"
)

// TestShortcutEqualsAdvance compares every answer and every state, bit for bit,
// on texts whose next word is often one that the model has not seen there.
func TestShortcutEqualsAdvance(t *testing.T) {
	for _, c := range []struct{ order, vocabulary, sentences int }{
		{1, 7, 10}, {2, 300, 3000}, {3, 40, 500}, {4, 500, 4000}, {5, 20, 800}, {6, 9, 600},
	} {
		t.Run(fmt.Sprint(c), func(t *testing.T) {
			r := rand.New(rand.NewPCG(uint64(c.order), 23))
			o := randomOracle(r, c.order, c.vocabulary, c.sentences)
			for _, m := range []*lm.Model{open(t, encode(t, o, lm.Codebooks{})), open(t, encode(t, o, evenBooks(c.order)))} {
				short := m.NewShortcut()
				var state lm.State
				for range 5000 {
					w := uint32(r.IntN(c.vocabulary + 1))
					var want, got lm.State
					wantP, gotP := m.Advance(&state, w, &want), short.Advance(&state, w, &got)
					if wantP != gotP || want != got {
						t.Fatalf("%d after %+v: %v and %+v, want %v and %+v", w, state, gotP, got, wantP, want)
					}
					if state = want; r.IntN(20) == 0 {
						state = lm.State{}
					}
				}
			}
		})
	}
}

func BenchmarkNewShortcut(b *testing.B) {
	m := open(b, encode(b, randomOracle(rand.New(rand.NewPCG(4, 4)), 3, 2000, 20000), lm.Codebooks{}))
	for b.Loop() {
		m.NewShortcut()
	}
	b.ReportMetric(float64(m.Count(2)), "bigrams")
}
