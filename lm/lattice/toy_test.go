package lattice_test

import (
	"math/rand/v2"

	"example.org/foulcase/lm/lattice"
)

// toyState is the last one or two words.
type toyState struct{ older, newer uint32 }

// toy is a trigram model kept in maps: it answers with the entry of the
// longest context it has, and drops from the state the words no entry extends.
type toy struct {
	trigrams map[[3]uint32]float32
	bigrams  map[[2]uint32]float32
	unigrams map[uint32]float32
	pairs    map[[2]uint32]bool // contexts of trigrams
}

func (m *toy) Advance(s *toyState, w uint32, next *toyState) float32 {
	*next = toyState{newer: w}
	if m.pairs[[2]uint32{s.newer, w}] {
		next.older = s.newer
	}
	if p, ok := m.trigrams[[3]uint32{s.older, s.newer, w}]; ok {
		return p
	}
	if p, ok := m.bigrams[[2]uint32{s.newer, w}]; ok {
		return p
	}
	return m.unigrams[w]
}

// newToy draws a model over words 1..vocabulary, with each possible bigram and
// trigram present by the given chance.
func newToy(r *rand.Rand, vocabulary uint32, chance float64) *toy {
	m := &toy{map[[3]uint32]float32{}, map[[2]uint32]float32{}, map[uint32]float32{}, map[[2]uint32]bool{}}
	for w := uint32(1); w <= vocabulary; w++ {
		m.unigrams[w] = -1 - 9*r.Float32()
		for v := uint32(1); v <= vocabulary; v++ {
			if r.Float64() < chance {
				m.bigrams[[2]uint32{v, w}] = -5 * r.Float32()
			}
			for u := uint32(1); u <= vocabulary; u++ {
				if r.Float64() < chance {
					m.trigrams[[3]uint32{u, v, w}] = -3 * r.Float32()
					m.pairs[[2]uint32{u, v}] = true
				}
			}
		}
	}
	return m
}

// randomEdges draws a lattice over nodes 0..last: one edge over each token, and
// more of any length up to three with nought to four words.
func randomEdges(r *rand.Rand, last, more int, vocabulary uint32) []lattice.Edge {
	var edges []lattice.Edge
	add := func(from, to, words int) {
		e := lattice.Edge{From: from, To: to, Score: -8 * r.Float64(), Tag: int32(len(edges))}
		for range words {
			e.Words = append(e.Words, 1+r.Uint32N(vocabulary))
		}
		edges = append(edges, e)
	}
	for i := range last {
		add(i, i+1, 1)
	}
	for range more {
		from := r.IntN(last)
		add(from, min(last, from+1+r.IntN(3)), r.IntN(lattice.MaxWords+1))
	}
	r.Shuffle(len(edges), func(i, j int) { edges[i], edges[j] = edges[j], edges[i] })
	return edges
}
