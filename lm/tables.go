package lm

import "fmt"

// Table holds the n-grams of one order as parallel arrays, grouped by parent
// (the n-gram without its leftmost word) and sorted by leftmost word within.
type Table struct {
	Word    []uint32  // leftmost word; nil for unigrams, whose index is the word
	First   []uint32  // children of i are First[i]..First[i+1]-1 of the next order; nil in the highest
	LogProb []float32 // nats, <= 0
	Backoff []float32 // nats; nil in the highest order
}

// Tables is a model in memory, by order: Tables[0] holds a unigram for each
// word of the vocabulary.
type Tables []Table

// Len returns the number of n-grams of the 0-based order k.
func (t Tables) Len(k int) int {
	if k > 0 {
		return len(t[k].Word)
	}
	return len(t[0].LogProb)
}

// Contexts returns, for each n-gram of order k+1 >= 2, the index in order k of
// its context: the n-gram without its last word. prev is the result for the
// order below, nil for bigrams; the result for bigrams is Word itself. An n-gram whose context is lacking is an error:
// no query could reach it.
//
// A child's context is a child of its parent's context, and both lists are
// sorted, so one merge finds them all.
func (t Tables) Contexts(k int, prev []uint32) ([]uint32, error) {
	word := t[k].Word
	if k == 1 {
		return word, nil
	}
	out := make([]uint32, len(word))
	first, upper := t[k-1].First, t[k-2].First
	for parent, context := range prev {
		c, end := upper[context], upper[context+1]
		for i := first[parent]; i < first[parent+1]; i++ {
			c = seek(t[k-1].Word, c, end, word[i])
			if c == end || t[k-1].Word[c] != word[i] {
				return nil, fmt.Errorf("lm: %d-gram %d: its context is no %d-gram", k+1, i, k)
			}
			out[i] = c
		}
	}
	return out, nil
}

// seek returns the first index in [lo, hi) whose word is not below w, by
// doubling steps from lo.
func seek(words []uint32, lo, hi, w uint32) uint32 {
	step := uint32(1)
	for lo < hi && words[lo] < w {
		if hi-lo <= step || words[lo+step] >= w {
			hi = min(hi, lo+step)
			lo++
			for lo < hi {
				mid := lo + (hi-lo)/2
				if words[mid] < w {
					lo = mid + 1
				} else {
					hi = mid
				}
			}
			return lo
		}
		lo += step
		step *= 2
	}
	return lo
}
