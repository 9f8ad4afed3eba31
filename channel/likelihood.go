package channel

import "math"

// LogLikelihood is the mean of log P(observed|intended) over pairs, in nats, each
// the sum over all alignments and every pair counting alike. Pairs that a space is
// involved in, or of more than 40 letters, are passed over; of none it is 0.
func (m *Model) LogLikelihood(pairs []Pair) float64 {
	return mean(m.logLikelihoods(pairs))
}

// leastLikelihood stands for the probability of what a model cannot give.
const leastLikelihood = 1e-300

func (m *Model) logLikelihoods(pairs []Pair) []float64 {
	f := new(fitter)
	f.take(pairs)
	tables := unpack(m)
	t := &lattice{likelihoods: newLikelihoods(tables.draft, &estimates{emit: tables.emit})}
	all := make([]float64, len(f.pairs))
	for i, p := range f.pairs {
		all[i] = math.Log(max(t.reset(p), leastLikelihood))
	}
	return all
}
