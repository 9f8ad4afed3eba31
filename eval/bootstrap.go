package eval

import (
	"math"
	"math/rand/v2"
	"slices"
)

// Resampling says how bootstrap samples are drawn. The zero value is 1,000
// samples (Koehn 2004) from seed 0.
type Resampling struct {
	Resamples int
	Seed      uint64
}

func (r Resampling) resamples() int {
	if r.Resamples <= 0 {
		return 1000
	}
	return r.Resamples
}

// random is the same for every call with one seed, so that systems measured on
// the same data are measured on the same samples.
func (r Resampling) random() *rand.Rand { return rand.New(rand.NewPCG(r.Seed, 0x5a3)) }

// counts are what a metric is computed from; those of a sample are the sums
// over its groups.
type counts[C any] interface{ plus(C) C }

// measure is a metric as a function of counts. of returns the value, NaN where
// it is not defined, and what it is a share of.
type measure[C any] struct {
	name, class string
	of          func(C) (value, n float64)
}

// bootstrap computes metrics over groups (items or documents, whichever are
// independent of each other) with percentile intervals (Efron & Tibshirani
// 1993, chapter 13). Samples in which a metric is not defined do not count.
func bootstrap[C counts[C]](groups []C, measures []measure[C], r Resampling) []Metric {
	var zero C
	total := zero
	for _, g := range groups {
		total = total.plus(g)
	}
	draws := make([][]float64, len(measures))
	random := r.random()
	for range r.resamples() {
		sum := zero
		for range groups {
			sum = sum.plus(groups[random.IntN(len(groups))])
		}
		for i, m := range measures {
			if v, _ := m.of(sum); !math.IsNaN(v) {
				draws[i] = append(draws[i], v)
			}
		}
	}
	metrics := make([]Metric, len(measures))
	for i, m := range measures {
		value, n := m.of(total)
		low, high := interval(draws[i])
		metrics[i] = Metric{m.name, m.class, Number(value), low, high, n}
	}
	return metrics
}

// interval returns the middle 95 % of the values, which it sorts.
func interval(values []float64) (low, high Number) {
	if len(values) == 0 {
		return Number(math.NaN()), Number(math.NaN())
	}
	slices.Sort(values)
	tail := int(.025 * float64(len(values)))
	return Number(values[tail]), Number(values[len(values)-1-tail])
}

// Paired is the outcome of a paired bootstrap of systems A and B.
type Paired struct {
	Difference Number  `json:"difference"` // B's value less A's
	Low        Number  `json:"low"`        // its 95 % interval
	High       Number  `json:"high"`
	Better     float64 `json:"better"` // share of the samples in which B is better; ties are no better
	Resamples  int     `json:"resamples"`
}

// PairedBootstrap compares two systems on the same items (Koehn 2004, ACL
// W04-3250). metric returns both systems' values on a sample, given as indices
// into the items with repetition; it must not keep the slice. Samples in which
// a value is NaN count for neither.
func PairedBootstrap(items int, metric func(sample []int) (a, b float64), r Resampling) Paired {
	sample := make([]int, items)
	for i := range sample {
		sample[i] = i
	}
	a, b := metric(sample)
	random := r.random()
	var differences []float64
	better := 0
	for range r.resamples() {
		for i := range sample {
			sample[i] = random.IntN(items)
		}
		x, y := metric(sample)
		if d := y - x; !math.IsNaN(d) {
			differences = append(differences, d)
			if d > 0 {
				better++
			}
		}
	}
	low, high := interval(differences)
	return Paired{Number(b - a), low, high, float64(better) / float64(r.resamples()), r.resamples()}
}
