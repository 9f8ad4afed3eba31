package lm_test

import (
	"cmp"
	"fmt"
	"math/rand/v2"
	"slices"
	"testing"

	"example.org/foulcase/lm"
)

// oracle is a back-off model in the plainest form: a map from n-grams, oldest
// word first, to their values.
type oracle struct {
	order      int
	vocabulary int
	grams      map[string]values
	contexts   map[string]bool
}

type values struct {
	words         []uint32
	prob, backoff float32
}

func name(words []uint32) string { return fmt.Sprint(words) }

// randomOracle holds the n-grams of random sentences, less some that no other
// needs, so that all ways of backing off occur.
func randomOracle(r *rand.Rand, order, vocabulary, sentences int) *oracle {
	o := &oracle{order, vocabulary, map[string]values{}, map[string]bool{}}
	for w := range uint32(vocabulary) {
		o.add(r, []uint32{w})
	}
	for range sentences {
		var words []uint32
		for range 1 + r.IntN(12) {
			words = append(words, uint32(r.IntN(1+r.IntN(vocabulary)))) // low ids are frequent
		}
		for n := 2; n <= order; n++ {
			for i := 0; i+n <= len(words); i++ {
				if o.has(words[i:i+n-1]) && o.has(words[i+1:i+n]) && r.IntN(4) > 0 {
					o.add(r, words[i:i+n])
				}
			}
		}
	}
	for gram, v := range o.grams {
		if !o.contexts[gram] && v.prob > -8 {
			v.backoff = 0
			o.grams[gram] = v
		}
	}
	return o
}

func (o *oracle) has(words []uint32) bool { _, ok := o.grams[name(words)]; return ok }

func (o *oracle) add(r *rand.Rand, words []uint32) {
	if !o.has(words) {
		o.grams[name(words)] = values{slices.Clone(words), -10 * r.Float32(), 1 - 4*r.Float32()}
		o.contexts[name(words[:len(words)-1])] = true
	}
}

// score backs off by the book.
func (o *oracle) score(context []uint32, w uint32) (order int, p float32) {
	context = context[max(0, len(context)-o.order+1):]
	for {
		if v, ok := o.grams[name(append(slices.Clone(context), w))]; ok {
			return len(context) + 1, p + v.prob
		}
		p += o.grams[name(context)].backoff
		context = context[1:]
	}
}

// useful returns how many words of a history a state may keep.
func (o *oracle) useful(history []uint32) int {
	for n := min(o.order-1, len(history)); n > 0; n-- {
		context := name(history[len(history)-n:])
		if o.contexts[context] || o.grams[context].backoff != 0 {
			return n
		}
	}
	return 0
}

// tables lays the n-grams out as lm.Encode wants them.
func (o *oracle) tables() lm.Tables {
	levels := make([][]values, o.order)
	for _, v := range o.grams {
		levels[len(v.words)-1] = append(levels[len(v.words)-1], v)
	}
	t := make(lm.Tables, o.order)
	for k, level := range levels {
		slices.SortFunc(level, func(a, b values) int {
			for i := k; i >= 0; i-- {
				if c := cmp.Compare(a.words[i], b.words[i]); c != 0 {
					return c
				}
			}
			return 0
		})
		parents := 0
		if k > 0 {
			parents = len(levels[k-1])
			t[k-1].First = make([]uint32, parents+1)
		}
		parent := 0
		for _, v := range level {
			if k > 0 {
				for !slices.Equal(levels[k-1][parent].words, v.words[1:]) {
					parent++
				}
				for i := parent + 1; i <= parents; i++ {
					t[k-1].First[i]++
				}
				t[k].Word = append(t[k].Word, v.words[0])
			}
			t[k].LogProb = append(t[k].LogProb, v.prob)
			if k < o.order-1 {
				t[k].Backoff = append(t[k].Backoff, v.backoff)
			}
		}
	}
	return t
}

func encode(t testing.TB, o *oracle, books lm.Codebooks) []byte {
	t.Helper()
	section, err := lm.Encode(o.tables(), books)
	if err != nil {
		t.Fatal(err)
	}
	return section
}

func open(t testing.TB, section []byte) *lm.Model {
	t.Helper()
	m, err := lm.Open(section)
	if err != nil {
		t.Fatal(err)
	}
	return m
}

// steps is a codebook of n values from lo to hi.
func steps(n int, lo, hi float32) []float32 {
	out := make([]float32, n)
	for i := range out {
		out[i] = lo + (hi-lo)*float32(i)/float32(n-1)
	}
	return out
}

// evenBooks returns codebooks of 4-bit steps over the oracle's values.
func evenBooks(order int) lm.Codebooks {
	b := lm.Codebooks{ProbBits: 4, BackoffBits: 4}
	for range order {
		b.Prob = append(b.Prob, steps(16, -10, 0))
		b.Backoff = append(b.Backoff, steps(16, -3, 1))
	}
	return b
}
