package train

import (
	"math"
)

// Method says how the mass of pruned n-grams finds its way into the rest.
type Method uint8

const (
	// Revised hands the count of a pruned n-gram down to the n-gram without
	// its leftmost word, in place of the one that it counted for there, and
	// estimates again: lower orders stay the distributions that they must be
	// once they carry more of the text (Siivola, Hirsimäki and Virpioja 2007).
	Revised Method = iota
	// Renormalised keeps all probabilities and recomputes back-offs alone
	// (Stolcke 1998).
	Renormalised
)

// dropAlways is below any real loss and keepAll between it and them.
const (
	dropAlways = -1
	keepAll    = -0.5
)

// losses returns, for each n-gram of order 2 and up, what the model loses when
// the n-gram is pruned: the relative entropy between the model with and without
// it (Stolcke 1998), in nats a token, with the context weighted by its plain
// relative frequency: under Kneser-Ney the product of lower-order probabilities
// is not the frequency of a context (Chelba et al. 2010).
//
// An n-gram inherits the greatest loss of those that need it, as parent or as
// context, so that any threshold leaves a sound model.
func (e *estimator) losses() [][]float32 {
	top := len(e.tables) - 1
	out := make([][]float32, top+1)
	for k := top; k > 0; k-- {
		own := e.orderLosses(k)
		if k < top {
			for i, v := range out[k] {
				own[i] = max(own[i], v)
			}
		}
		out[k] = own
		if k > 1 {
			out[k-1] = e.inherited(k, own)
		}
	}
	return out
}

// inherited returns for order k-1 the greatest loss among dependants in k.
func (e *estimator) inherited(k int, own []float32) []float32 {
	need := make([]float32, e.tables.Len(k-1))
	for i := range need {
		need[i] = dropAlways
	}
	first := e.tables[k-1].First
	for parent := range need {
		for i := first[parent]; i < first[parent+1]; i++ {
			need[parent] = max(need[parent], own[i])
		}
	}
	for i, h := range e.contexts[k] {
		need[h] = max(need[h], own[i])
	}
	return need
}

func (e *estimator) orderLosses(k int) []float32 {
	t, lower := &e.tables[k], &e.tables[k-1]
	raw, context := e.counts.levels[k].raw, e.contexts[k]
	seen, unseen := e.contextMass(k)
	out := make([]float32, len(raw))
	minCount := uint32(0)
	if k < len(e.options.MinCounts) {
		minCount = e.options.MinCounts[k]
	}
	total := float64(e.counts.Tokens)
	parallel(e.options.Workers, e.tables.Len(k-1), func(from, to int) {
		for parent := from; parent < to; parent++ {
			for i := lower.First[parent]; i < lower.First[parent+1]; i++ {
				if raw[i] < minCount {
					out[i] = dropAlways
					continue
				}
				h := context[i]
				loss := relativeEntropy(float64(t.LogProb[i]), float64(lower.LogProb[parent]), float64(lower.Backoff[h]), unseen[h])
				out[i] = float32(max(0, loss) * seen[h] / total)
			}
		}
	})
	return out
}

// contextMass returns for each context of order k+1 n-grams how often it
// occurred and which share of the lower-order distribution its unseen words have.
func (e *estimator) contextMass(k int) (seen, unseen []float64) {
	n := e.tables.Len(k - 1)
	seen, unseen = make([]float64, n), make([]float64, n)
	for h := range unseen {
		unseen[h] = 1
	}
	raw, context := e.counts.levels[k].raw, e.contexts[k]
	lower := &e.tables[k-1]
	for parent := range n {
		for i := lower.First[parent]; i < lower.First[parent+1]; i++ {
			seen[context[i]] += float64(raw[i])
			unseen[context[i]] -= float64(lower.LogProb[parent])
		}
	}
	return seen, unseen
}

// relativeEntropy returns the divergence within one context when a word of
// probability p falls back to back-off times its lower probability, and the
// back-off is renormalised. unseen is the lower-order mass of all words that
// back off already.
func relativeEntropy(p, lower, back, unseen float64) float64 {
	unseen = max(unseen, 1e-9)
	mass := back * unseen
	renormalised := (mass + p) / (unseen + lower)
	return -p*(math.Log(lower*renormalised)-math.Log(p)) - mass*(math.Log(renormalised)-math.Log(back))
}

// prune removes the n-grams whose loss is not above the threshold. It may be
// called again with a higher threshold. After Revised, the tables want a new
// estimate.
func (e *estimator) prune(losses [][]float32, threshold float32) {
	keep := func(k, i int) bool { return k == 0 || losses[k][i] > threshold }
	if e.options.Prune == Revised {
		e.revise(keep)
	} else {
		e.renormalise(keep)
	}
	e.compact(losses, keep)
}

// revise moves the counts of n-grams about to be pruned to their parents and
// to the share that their contexts lose, from the highest order down.
func (e *estimator) revise(keep func(k, i int) bool) {
	top := len(e.tables) - 1
	if e.lost == nil {
		e.lost = make([][]float64, top)
	}
	for k := top; k > 0; k-- {
		if e.lost[k-1] == nil {
			e.lost[k-1] = make([]float64, e.tables.Len(k-1))
		}
		counts, upper := e.counts.levels[k].adjusted, e.counts.levels[k-1].adjusted
		first := e.tables[k-1].First
		for parent := range upper {
			for i := first[parent]; i < first[parent+1]; i++ {
				if !keep(k, int(i)) {
					upper[parent] = addCounts(upper[parent], counts[i]-1)
					e.lost[k-1][e.contexts[k][i]] += float64(counts[i])
				}
			}
		}
	}
}

// renormalise recomputes back-offs for the n-grams about to be pruned.
func (e *estimator) renormalise(keep func(k, i int) bool) {
	for k := len(e.tables) - 1; k > 0; k-- {
		lower := &e.tables[k-1]
		_, unseen := e.contextMass(k)
		mass := make([]float64, len(unseen))
		for h, b := range lower.Backoff {
			mass[h] = float64(b) * max(unseen[h], 1e-9)
			unseen[h] = max(unseen[h], 1e-9)
		}
		for parent, p := range lower.LogProb {
			for i := lower.First[parent]; i < lower.First[parent+1]; i++ {
				if !keep(k, int(i)) {
					h := e.contexts[k][i]
					mass[h] += float64(e.tables[k].LogProb[i])
					unseen[h] += float64(p)
				}
			}
		}
		for h := range mass {
			lower.Backoff[h] = float32(mass[h] / unseen[h])
		}
	}
}

// compact drops the pruned n-grams from all arrays and renumbers the rest.
func (e *estimator) compact(losses [][]float32, keep func(k, i int) bool) {
	sizes := make([]int, len(e.tables))
	for k := range sizes {
		sizes[k] = e.tables.Len(k)
	}
	var below []uint32 // new indices of the order below; nil for unigrams, which all stay
	for k := 1; k < len(e.tables); k++ {
		first := e.counts.levels[k-1].first
		newFirst := make([]uint32, 0, len(first))
		index := make([]uint32, sizes[k])
		n := uint32(0)
		for parent := range sizes[k-1] {
			if k > 1 && !keep(k-1, parent) {
				continue
			}
			newFirst = append(newFirst, n)
			for i := first[parent]; i < first[parent+1]; i++ {
				if keep(k, int(i)) {
					index[i] = n
					n++
				}
			}
		}
		newFirst = append(newFirst, n)
		e.counts.levels[k-1].first = newFirst
		e.filter(k, func(i int) bool { return keep(k, i) })
		for i, h := range e.contexts[k] {
			if below != nil {
				e.contexts[k][i] = below[h]
			}
		}
		below = index
	}
	for k := 1; k < len(losses); k++ {
		losses[k] = filtered(losses[k], func(i int) bool { return keep(k, i) })
	}
	for k := range e.tables {
		e.tables[k].Word, e.tables[k].First = e.counts.levels[k].word, e.counts.levels[k].first
	}
}

// filter drops what keep refuses from the arrays of order k+1.
func (e *estimator) filter(k int, keep func(i int) bool) {
	l := &e.counts.levels[k]
	shared := k == len(e.tables)-1 // raw and adjusted are one array
	l.word = filtered(l.word, keep)
	l.raw = filtered(l.raw, keep)
	if shared {
		l.adjusted = l.raw
	} else {
		l.adjusted = filtered(l.adjusted, keep)
	}
	if k == 1 {
		e.contexts[k] = l.word // the context of a bigram is its first word
	} else {
		e.contexts[k] = filtered(e.contexts[k], keep)
	}
	e.tables[k].LogProb = filtered(e.tables[k].LogProb, keep)
	e.tables[k].Backoff = filtered(e.tables[k].Backoff, keep)
	if e.lost != nil && k < len(e.lost) {
		e.lost[k] = filtered(e.lost[k], keep)
	}
}

func filtered[T any](values []T, keep func(i int) bool) []T {
	out := values[:0]
	for i, v := range values {
		if keep(i) {
			out = append(out, v)
		}
	}
	return out
}
