package train

import (
	"cmp"
	"slices"

	"example.org/foulcase/lm"
)

// sampleSize bounds the values a codebook is learned from.
const sampleSize = 1 << 20

// lloydRounds suffices for centres to settle when they start from bins of equal
// weight.
const lloydRounds = 30

// leastWeight keeps values that the text never uses in view.
const leastWeight = 0.25

// weighted is a value with how often a text is expected to use it.
type weighted struct {
	value  float32
	weight float64
}

// codebooks learns the values that stand for probabilities and back-offs. What
// counts is the error in running text, so a probability weighs as much as its
// n-gram's count, and a back-off as much as the different words seen behind it,
// whose discounts it hands on.
func (e *estimator) codebooks() lm.Codebooks {
	var b lm.Codebooks
	if e.options.ProbBits != ExactBits {
		b.ProbBits = e.options.ProbBits
		for k := range e.tables {
			b.Prob = append(b.Prob, learn(e.weightedProbs(k), 1<<b.ProbBits))
		}
	}
	if e.options.BackoffBits != ExactBits {
		b.BackoffBits = e.options.BackoffBits
		for k := range len(e.tables) - 1 {
			b.Backoff = append(b.Backoff, learn(e.weightedBackoffs(k), 1<<b.BackoffBits))
		}
	}
	return b
}

// weightedProbs samples the probabilities of order k+1.
func (e *estimator) weightedProbs(k int) []weighted {
	values, counts := e.tables[k].LogProb, e.counts.levels[k].adjusted
	step := len(values)/sampleSize + 1
	out := make([]weighted, 0, len(values)/step+1)
	for i := 0; i < len(values); i += step {
		out = append(out, weighted{values[i], max(float64(counts[i]), leastWeight)})
	}
	return out
}

// weightedBackoffs samples the back-offs of the contexts of order k+1.
func (e *estimator) weightedBackoffs(k int) []weighted {
	followers := make([]uint32, e.tables.Len(k))
	for _, h := range e.contexts[k+1] {
		followers[h]++
	}
	step := len(followers)/sampleSize + 1
	var out []weighted
	for h, n := range followers {
		if n > 0 && h%step == 0 {
			out = append(out, weighted{e.tables[k].Backoff[h], float64(n)})
		}
	}
	return out
}

// learn returns at most n ascending centres: bins of equal weight (Federico and
// Bertoldi 2006) moved to the least squared error (Lloyd 1982).
func learn(sample []weighted, n int) []float32 {
	if len(sample) == 0 {
		return []float32{0}
	}
	slices.SortFunc(sample, func(a, b weighted) int { return cmp.Compare(a.value, b.value) })
	l := lloyd{values: make([]float32, len(sample)), weights: make([]float64, len(sample)+1), sums: make([]float64, len(sample)+1)}
	for i, s := range sample {
		l.values[i] = s.value
		l.weights[i+1] = l.weights[i] + s.weight
		l.sums[i+1] = l.sums[i] + s.weight*float64(s.value)
	}
	if distinct := slices.Compact(slices.Clone(l.values)); len(distinct) <= n {
		return distinct
	}
	centres := l.even(n)
	for range lloydRounds {
		centres = l.settle(centres)
	}
	return centres
}

// lloyd holds ascending values with running sums of weights and of weighted
// values in front of each.
type lloyd struct {
	values  []float32
	weights []float64
	sums    []float64
}

func (l *lloyd) mean(from, to int) float32 {
	return float32((l.sums[to] - l.sums[from]) / (l.weights[to] - l.weights[from]))
}

// even returns the means of n bins of equal weight, fewer where values repeat.
func (l *lloyd) even(n int) []float32 {
	centres := make([]float32, 0, n)
	from, total := 0, l.weights[len(l.values)]
	for i := range n {
		to, _ := slices.BinarySearch(l.weights, total*float64(i+1)/float64(n))
		if i == n-1 {
			to = len(l.values)
		}
		if to > from {
			centres = append(centres, l.mean(from, to))
			from = to
		}
	}
	return slices.Compact(centres)
}

// settle moves each centre to the mean of the values nearest to it.
func (l *lloyd) settle(centres []float32) []float32 {
	out := make([]float32, 0, len(centres))
	from := 0
	for i := range centres {
		to := len(l.values)
		if i+1 < len(centres) {
			to, _ = slices.BinarySearch(l.values, (centres[i]+centres[i+1])/2)
		}
		if to > from {
			out = append(out, l.mean(from, to))
			from = to
		}
	}
	return slices.Compact(out)
}
