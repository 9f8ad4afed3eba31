package lm_test

import (
	"fmt"
	"math/rand/v2"
	"slices"
	"testing"

	"example.org/foulcase/lm"
)

// randomText has words outside the vocabulary in it.
func randomText(r *rand.Rand, vocabulary, n int) []uint32 {
	words := make([]uint32, n)
	for i := range words {
		words[i] = uint32(r.IntN(1 + r.IntN(vocabulary+1)))
	}
	return words
}

// TestBatchesEqualAdvance compares what is scored together with the same words
// scored one by one: not a bit may differ.
func TestBatchesEqualAdvance(t *testing.T) {
	for _, c := range []struct{ order, vocabulary, sentences int }{
		{1, 7, 10}, {2, 300, 3000}, {3, 40, 500}, {4, 130, 4000}, {5, 20, 800}, {6, 9, 600},
	} {
		t.Run(fmt.Sprint(c), func(t *testing.T) {
			r := rand.New(rand.NewPCG(uint64(c.order), 17))
			o := randomOracle(r, c.order, c.vocabulary, c.sentences)
			for _, m := range []*lm.Model{open(t, encode(t, o, lm.Codebooks{})), open(t, encode(t, o, evenBooks(c.order)))} {
				for n := range 40 {
					compareBatches(t, m, randomText(r, c.vocabulary, n), randomText(r, c.vocabulary, n))
				}
			}
		})
	}
}

func compareBatches(t *testing.T, m *lm.Model, text, others []uint32) {
	t.Helper()
	n := len(text)
	logp, states := make([]float32, n), make([]lm.State, n+1)
	wantP, want := make([]float32, n), make([]lm.State, n+1)
	for i, w := range text {
		wantP[i] = m.Advance(&want[i], w, &want[i+1])
	}
	m.AdvanceText(text, states, logp)
	if !slices.Equal(logp, wantP) || !slices.Equal(states, want) {
		t.Fatalf("%v as a text: %v, want %v", text, logp, wantP)
	}

	next, wantNext := make([]lm.State, n), make([]lm.State, n)
	for i, w := range others {
		wantP[i] = m.Advance(&states[i], w, &wantNext[i])
	}
	m.AdvanceEach(states[:n], others, logp, next)
	if !slices.Equal(logp, wantP) || !slices.Equal(next, wantNext) {
		t.Fatalf("%v each after its state in %v: %v, want %v", others, text, logp, wantP)
	}

	for i, w := range others {
		wantP[i] = m.Advance(&states[n], w, &wantNext[i])
	}
	m.AdvanceAll(&states[n], others, logp, next)
	if !slices.Equal(logp, wantP) || !slices.Equal(next, wantNext) {
		t.Fatalf("%v after %v: %v, want %v", others, text, logp, wantP)
	}
}
