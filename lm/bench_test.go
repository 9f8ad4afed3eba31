package lm_test

import (
	"cmp"
	"math/rand/v2"
	"slices"
	"testing"

	"example.org/foulcase/lm"
)

// The benchmarks ask one thing of four structures over one random trigram
// model: the next word's log probability in a running text, each query
// depending on the one before.

const benchVocabulary = 5000

func benchModel(b *testing.B) (*oracle, []uint32) {
	b.Helper()
	r := rand.New(rand.NewPCG(1, 1))
	o := randomOracle(r, 3, benchVocabulary, 20000)
	text := make([]uint32, 1<<16)
	for i := range text {
		text[i] = uint32(r.IntN(1 + r.IntN(benchVocabulary)))
	}
	return o, text
}

func benchAdvance(b *testing.B, books lm.Codebooks) {
	o, text := benchModel(b)
	section := encode(b, o, books)
	m := open(b, section)
	b.ResetTimer()
	var s, next lm.State
	for i := range b.N {
		m.Advance(&s, text[i&(len(text)-1)], &next)
		s = next
	}
	b.ReportMetric(float64(len(section))/float64(len(o.grams)), "bytes/n-gram")
}

func BenchmarkAdvance(b *testing.B) { benchAdvance(b, evenBooks(3)) }

func BenchmarkAdvanceExact(b *testing.B) { benchAdvance(b, lm.Codebooks{}) }

// gram is an n-gram for the baselines, newest word first, n words of it.
type gram struct {
	words [3]uint32
	n     uint32
}

// backOff scores by looking n-grams up, longest first.
func backOff(look func(gram) (values, bool), history [3]uint32, n uint32) float32 {
	p := float32(0)
	for ; ; n-- {
		g := gram{n: n}
		copy(g.words[:n], history[:n])
		if v, ok := look(g); ok {
			return p + v.prob
		}
		c := gram{n: n - 1}
		copy(c.words[:n-1], history[1:n])
		if v, ok := look(c); ok {
			p += v.backoff
		}
	}
}

func benchLook(b *testing.B, text []uint32, look func(gram) (values, bool)) {
	b.ResetTimer()
	var history [3]uint32
	sum := float32(0)
	for i := range b.N {
		history[2], history[1], history[0] = history[1], history[0], text[i&(len(text)-1)]
		sum += backOff(look, history, 3)
	}
	if sum > 0 {
		b.Fatal("log probabilities above zero")
	}
}

func (o *oracle) reversed() map[gram]values {
	out := make(map[gram]values, len(o.grams))
	for _, v := range o.grams {
		g := gram{n: uint32(len(v.words))}
		for i, w := range v.words {
			g.words[len(v.words)-1-i] = w
		}
		out[g] = values{prob: v.prob, backoff: min(v.backoff, 0)}
	}
	return out
}

func BenchmarkPlainMap(b *testing.B) {
	o, text := benchModel(b)
	grams := o.reversed()
	benchLook(b, text, func(g gram) (values, bool) {
		v, ok := grams[g]
		return v, ok
	})
}

func BenchmarkSortedArray(b *testing.B) {
	o, text := benchModel(b)
	type entry struct {
		gram
		prob, backoff float32
	}
	var entries []entry
	for g, v := range o.reversed() {
		entries = append(entries, entry{g, v.prob, v.backoff})
	}
	compare := func(a entry, g gram) int {
		return cmp.Or(cmp.Compare(a.n, g.n), slices.Compare(a.words[:], g.words[:]))
	}
	slices.SortFunc(entries, func(x, y entry) int { return compare(x, y.gram) })
	benchLook(b, text, func(g gram) (values, bool) {
		at, ok := slices.BinarySearchFunc(entries, g, compare)
		if !ok {
			return values{}, false
		}
		return values{prob: entries[at].prob, backoff: entries[at].backoff}, true
	})
	b.ReportMetric(24, "bytes/n-gram")
}
