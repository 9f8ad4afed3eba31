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
	Better     float64 `json:"better"` // share of the samples in which B's value is greater; ties are not
	P          float64 `json:"p"`      // two-sided; 1 where the two never differ
	Resamples  int     `json:"resamples"`
}

// PairedBootstrap compares two systems on the same items by several metrics
// (Koehn 2004, ACL W04-3250). metrics returns both systems' values on a sample,
// given as indices into the items with repetition, metric by metric; it must
// not keep the slice. Samples in which a value is NaN count for neither. P is
// twice the share of samples on the rarer side of no difference, the data
// itself counted as one more (Davison & Hinkley 1997, chapter 4).
func PairedBootstrap(items int, metrics func(sample []int) (a, b []float64), r Resampling) []Paired {
	sample := make([]int, items)
	for i := range sample {
		sample[i] = i
	}
	a, b := metrics(sample)
	paired, draws := make([]Paired, len(a)), make([][]float64, len(a))
	for m := range paired {
		paired[m] = Paired{Difference: Number(b[m] - a[m]), Resamples: r.resamples()}
	}
	random := r.random()
	for range r.resamples() {
		for i := range sample {
			sample[i] = random.IntN(items)
		}
		a, b := metrics(sample)
		for m := range draws {
			if d := b[m] - a[m]; !math.IsNaN(d) {
				draws[m] = append(draws[m], d)
			}
		}
	}
	for m := range paired {
		paired[m].weigh(draws[m])
	}
	return paired
}

// weigh fills in what the differences of the samples tell.
func (p *Paired) weigh(differences []float64) {
	better, worse := 0, 0
	for _, d := range differences {
		switch {
		case d > 0:
			better++
		case d < 0:
			worse++
		}
	}
	n := len(differences)
	p.Low, p.High = interval(differences)
	p.Better = float64(better) / float64(p.Resamples)
	p.P = min(1, 2*float64(1+n-max(better, worse))/float64(1+n))
}
