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
// contexts marks which n-grams have a back-off to speak of.
func codebooks(t lm.Tables, o Options) lm.Codebooks {
	var b lm.Codebooks
	if o.ProbBits != ExactBits {
		b.ProbBits = o.ProbBits
		for k := range t {
			b.Prob = append(b.Prob, learn(t[k].LogProb, 1<<o.ProbBits))
		}
	}
	if o.BackoffBits != ExactBits {
		b.BackoffBits = o.BackoffBits
		for k := range len(t) - 1 {
			b.Backoff = append(b.Backoff, learn(t[k].Backoff, 1<<o.BackoffBits-1))
		}
	}
	return b
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
