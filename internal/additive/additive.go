// Package additive models the log-odds of a yes-or-no outcome as a sum of step
// functions, one of each feature (Hastie & Tibshirani 1990), so that a score can
// be read as the account of its terms.
//
// [Fit] learns the steps by gradient boosting of stumps under logistic loss
// (Friedman 2001) with Newton's step in the leaves (Chen & Guestrin 2016).
package additive

import (
	"fmt"
	"math"
	"slices"
	"sort"
)

// Model is a sum of step functions. The zero Model says even odds of
// everything. It is safe for concurrent use once made.
type Model struct {
	Base  float64 `json:"base"` // log-odds, nats
	Terms []Term  `json:"terms"`
}

// Term is the step function of one feature: Values[i] holds for Cuts[i-1] <= x <
// Cuts[i], in nats.
type Term struct {
	Feature string    `json:"feature"`
	Cuts    []float64 `json:"cuts"`   // ascending
	Values  []float64 `json:"values"` // one more than Cuts
}

// At returns the value of the term for x, nats.
func (t *Term) At(x float64) float64 {
	return t.Values[sort.Search(len(t.Cuts), func(i int) bool { return x < t.Cuts[i] })]
}

// Bound is a Model whose terms know their places in a vector of features.
type Bound struct {
	model *Model
	place []int // of each term
}

// Bind looks the model's features up among the names of a vector. A term of an
// unknown name, or one whose steps are not well-formed, is an error.
func (m *Model) Bind(names []string) (*Bound, error) {
	b := &Bound{model: m, place: make([]int, len(m.Terms))}
	if !finite(m.Base) {
		return nil, fmt.Errorf("base %v is no number", m.Base)
	}
	for i := range m.Terms {
		t := &m.Terms[i]
		b.place[i] = slices.Index(names, t.Feature)
		switch {
		case b.place[i] < 0:
			return nil, fmt.Errorf("no feature is called %q", t.Feature)
		case len(t.Values) != len(t.Cuts)+1:
			return nil, fmt.Errorf("feature %q: %d values for %d cuts, want one more", t.Feature, len(t.Values), len(t.Cuts))
		case !slices.IsSorted(t.Cuts) || !finite(t.Cuts...) || !finite(t.Values...):
			return nil, fmt.Errorf("feature %q: cuts are not ascending numbers, or values not numbers", t.Feature)
		}
	}
	return b, nil
}

func finite(x ...float64) bool {
	return !slices.ContainsFunc(x, func(v float64) bool { return math.IsNaN(v) || math.IsInf(v, 0) })
}

// LogOdds returns the model's log-odds, nats, for a vector in the order of the
// bound names.
func (b *Bound) LogOdds(x []float32) float64 {
	sum := b.model.Base
	for i, at := range b.place {
		sum += b.model.Terms[i].At(float64(x[at]))
	}
	return sum
}

// Account calls yield with each term's feature, its value in x, and what it adds
// to the log-odds.
func (b *Bound) Account(x []float32, yield func(feature string, value float32, nats float64)) {
	for i, at := range b.place {
		t := &b.model.Terms[i]
		yield(t.Feature, x[at], t.At(float64(x[at])))
	}
}

// Base is the log-odds before any feature, nats.
func (b *Bound) Base() float64 { return b.model.Base }
