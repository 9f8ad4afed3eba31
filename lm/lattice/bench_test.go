package lattice_test

import (
	"math/rand/v2"
	"testing"

	"example.org/foulcase/lm/lattice"
)

const benchTokens = 25

// BenchmarkPlain is the floor of BenchmarkOneEdge: the model alone.
func BenchmarkPlain(b *testing.B) {
	m, words := benchModel()
	var sum float32
	for b.Loop() {
		var s, next toyState
		for _, w := range words {
			sum += m.Advance(&s, w, &next)
			s = next
		}
	}
	perToken(b)
	_ = sum
}

func BenchmarkOneEdge(b *testing.B) { benchLattice(b, 1) }
func BenchmarkFive(b *testing.B)    { benchLattice(b, 5) }
func BenchmarkTwenty(b *testing.B)  { benchLattice(b, 20) }

// benchLattice runs a sentence with so many edges at each position.
func benchLattice(b *testing.B, edges int) {
	m, words := benchModel()
	l := lattice.New[toyState](lattice.Options{States: 16, Margin: 12})
	one := make([]uint32, 1)
	scored := &counter{toy: m}
	for b.Loop() {
		l.Reset(benchTokens)
		for i, w := range words {
			for j := range edges {
				one[0] = 1 + (w+uint32(7*j))%benchVocabulary
				l.Add(lattice.Edge{From: i, To: i + 1, Words: one, Score: -3 * float64(min(j, 1))})
			}
		}
		if err := l.Run(scored, toyState{}, 1); err != nil {
			b.Fatal(err)
		}
	}
	b.ReportMetric(float64(scored.calls)/float64(b.N*benchTokens), "scores/token")
	perToken(b)
}

type counter struct {
	*toy
	calls int
}

func (c *counter) Advance(s *toyState, w uint32, next *toyState) float32 {
	c.calls++
	return c.toy.Advance(s, w, next)
}

const benchVocabulary = 60

func benchModel() (*toy, []uint32) {
	r := rand.New(rand.NewPCG(6, 28))
	words := make([]uint32, benchTokens)
	for i := range words {
		words[i] = 1 + r.Uint32N(benchVocabulary)
	}
	return newToy(r, benchVocabulary, .2), words
}

func perToken(b *testing.B) {
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*benchTokens), "ns/token")
}
