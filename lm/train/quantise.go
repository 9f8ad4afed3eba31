package train

import (
	"slices"

	"example.org/foulcase/lm"
)

// sampleSize bounds the values a codebook is learned from.
const sampleSize = 1 << 20

// lloydRounds suffices for centres to settle when they start from bins of equal
// population.
const lloydRounds = 30

// codebooks learns the values that stand for probabilities and back-offs.
func (e *estimator) codebooks() lm.Codebooks {
	var b lm.Codebooks
	if e.options.ProbBits != ExactBits {
		b.ProbBits = e.options.ProbBits
		for k := range e.tables {
			b.Prob = append(b.Prob, learn(e.tables[k].LogProb, 1<<b.ProbBits))
		}
	}
	if e.options.BackoffBits != ExactBits {
		b.BackoffBits = e.options.BackoffBits
		for k := range len(e.tables) - 1 {
			b.Backoff = append(b.Backoff, learn(e.contextBackoffs(k), 1<<b.BackoffBits))
		}
	}
	return b
}

// contextBackoffs returns the back-offs of the n-grams of order k+1 that are
// contexts: no other back-off is stored.
func (e *estimator) contextBackoffs(k int) []float32 {
	isContext := make([]bool, e.tables.Len(k))
	for _, h := range e.contexts[k+1] {
		isContext[h] = true
	}
	return filtered(slices.Clone(e.tables[k].Backoff), func(i int) bool { return isContext[i] })
}

// learn returns at most n ascending centres: bins of equal population (Federico
// and Bertoldi 2006) moved to the least squared error (Lloyd 1982).
func learn(values []float32, n int) []float32 {
	sorted := sample(values)
	slices.Sort(sorted)
	distinct := slices.Compact(slices.Clone(sorted))
	if len(distinct) <= n {
		if len(distinct) == 0 {
			return []float32{0}
		}
		return distinct
	}
	sums := make([]float64, len(sorted)+1)
	for i, v := range sorted {
		sums[i+1] = sums[i] + float64(v)
	}
	centres := make([]float32, 0, n)
	for i := range n {
		from, to := i*len(sorted)/n, (i+1)*len(sorted)/n
		if to > from {
			centres = append(centres, mean(sums, from, to))
		}
	}
	centres = slices.Compact(centres)
	for range lloydRounds {
		centres = settle(sorted, sums, centres)
	}
	return centres
}

// settle moves each centre to the mean of the values nearest to it.
func settle(sorted []float32, sums []float64, centres []float32) []float32 {
	out := make([]float32, 0, len(centres))
	from := 0
	for i := range centres {
		to := len(sorted)
		if i+1 < len(centres) {
			edge := (centres[i] + centres[i+1]) / 2
			to, _ = slices.BinarySearch(sorted, edge)
		}
		if to > from {
			out = append(out, mean(sums, from, to))
		}
		from = max(from, to)
	}
	return slices.Compact(out)
}

func mean(sums []float64, from, to int) float32 {
	return float32((sums[to] - sums[from]) / float64(to-from))
}

// sample copies values, every so many when there are more than sampleSize.
func sample(values []float32) []float32 {
	step := len(values)/sampleSize + 1
	out := make([]float32, 0, len(values)/step+1)
	for i := 0; i < len(values); i += step {
		out = append(out, values[i])
	}
	return out
}
