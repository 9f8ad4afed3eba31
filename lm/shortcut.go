package lm

import (
	"math"
	"slices"
)

// Shortcut answers what Advance answers, much sooner where the model has no
// bigram of the word and the one before it, which is so of most words that are
// tried in place of another. It holds every unigram unpacked and a Bloom filter
// (1970) of the bigrams, the bits of each in one word of memory, in some 3 bytes
// a bigram and 8 a word of the vocabulary. It is safe for concurrent use.
type Shortcut struct {
	model   *Model
	logp    []float32 // of each unigram, nats
	backoff []float32 // of each as a context, nats; noContext if it is none
	filter  []uint64
	most    float32 // that back-off weights may add to a log probability, nats
}

// noContext is no back-off weight: those are at least -maxNats.
const noContext = -math.MaxFloat32

// filterBits is the room for a bigram in the filter, each of which sets four: some
// two in a hundred of other pairs seem to be there.
const filterBits = 12

// NewShortcut unpacks the model's unigrams and bigrams, which takes about a tenth
// of a second for some millions.
func (m *Model) NewShortcut() *Shortcut {
	c := &Shortcut{
		model:   m,
		logp:    make([]float32, m.Vocabulary()),
		backoff: make([]float32, m.Vocabulary()),
	}
	if m.order > 1 {
		c.filter = make([]uint64, uint64(m.levels[1].count)*filterBits/64+1)
	}
	for k := range m.order - 1 { // the longest n-grams are no contexts
		c.most += max(0, m.levels[k].back.greatest())
	}
	var p place
	for w := range c.logp {
		m.word(&p, uint32(w))
		c.logp[w] = p.logProb()
		c.backoff[w] = noContext
		if m.order == 1 {
			continue
		}
		if back, ok := p.backoff(); ok {
			c.backoff[w] = back
		}
		lo, hi := m.children(&p)
		for left := range m.levels[1].keysOf(lo, hi) {
			at, bits := c.place(left, uint32(w))
			c.filter[at] |= bits
		}
	}
	return c
}

// greatest is the greatest value that a code stands for, nats; where values are
// stored as they are, one that none exceeds.
func (c *codebook) greatest() float32 {
	if c.values == nil {
		return maxNats
	}
	return slices.Max(c.values)
}

// keysOf yields the keys of the n-grams [lo, hi), which are the children of one.
func (l *level) keysOf(lo, hi uint64) func(yield func(uint32) bool) {
	return func(yield func(uint32) bool) {
		var v block
		begin, number := uint64(0), uint64(math.MaxUint64)
		for at := lo; at < hi; at++ {
			if b := at / blockLen; b != number {
				number = b
				l.layOut(&v, b)
			}
			i := at % blockLen
			if at == lo {
				if begin = l.keyBase(number); i > 0 {
					begin += v.keys.value(l.data, i-1) + 1
				}
			}
			if !yield(uint32(l.keyBase(number) + v.keys.value(l.data, i) - begin)) {
				return
			}
		}
	}
}

// place returns the word of the filter and its bits that stand for a bigram.
func (c *Shortcut) place(left, w uint32) (at int, bits uint64) {
	h := (uint64(left)<<32 | uint64(w)) * 0x9e3779b97f4a7c15 // the golden ratio's bits (Knuth)
	h ^= h >> 29
	h *= 0xbf58476d1ce4e5b9 // of the finaliser of splitmix64 (Steele, Lea & Flood 2014)
	h ^= h >> 32
	bits = 1<<(h&63) | 1<<(h>>6&63) | 1<<(h>>12&63) | 1<<(h>>18&63)
	return int(h >> 32 * uint64(len(c.filter)) >> 32), bits
}

// Advance is Model.Advance.
func (c *Shortcut) Advance(s *State, w uint32, next *State) float32 {
	if int(w) >= len(c.logp) {
		return c.model.Advance(s, w, next)
	}
	if s.n > 0 {
		if at, bits := c.place(s.keys[0], w); c.filter[at]&bits == bits {
			return c.model.Advance(s, w, next)
		}
	}
	c.Blank(w, next)
	return s.backOff(c.logp[w], 1, c.model.order)
}

// Blank writes the state that follows a word of the vocabulary of whose context
// nothing is known.
func (c *Shortcut) Blank(w uint32, next *State) {
	*next = State{}
	if back := c.backoff[w]; back != noContext {
		next.keys[0], next.backoff[0], next.n = w, back, 1
	}
}

// MayFollow tells of each of several words whether the model may have its bigram
// with the word before: a no is always right, a yes now and then wrong. All must
// be in the vocabulary; has must be as long as words. The answers wait for memory
// together.
func (c *Shortcut) MayFollow(left uint32, words []uint32, has []bool) {
	for i, w := range words {
		at, bits := c.place(left, w)
		has[i] = c.filter[at]&bits == bits
	}
}

// MayLead is MayFollow for several words before one.
func (c *Shortcut) MayLead(words []uint32, w uint32, has []bool) {
	for i, left := range words {
		at, bits := c.place(left, w)
		has[i] = c.filter[at]&bits == bits
	}
}

// Unigram returns the log probability of a word of the vocabulary in no context,
// nats.
func (c *Shortcut) Unigram(w uint32) float32 { return c.logp[w] }

// MostBackoff is the most, nats, that backing off may add to a log probability;
// 0 in a model whose weights are at most 1.
func (c *Shortcut) MostBackoff() float32 { return c.most }

// Nearest returns the last word of the context, if any n-gram can use it.
func (s *State) Nearest() (w uint32, ok bool) { return s.keys[0], s.n > 0 }

// Backoff is what is added to a word's log probability when the model has no
// n-gram of it with the context, nats.
func (s *State) Backoff() (sum float32) {
	for _, b := range s.backoff[:s.n] {
		sum += b
	}
	return sum
}

// Only reports whether the state holds one word, and that is w.
func (s *State) Only(w uint32) bool { return s.n == 1 && s.keys[0] == w }
