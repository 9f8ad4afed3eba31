package additive

import (
	"cmp"
	"math"
	"slices"
	"sort"
)

// Example is one observation. X is not kept.
type Example struct {
	X      []float32
	Yes    bool
	Weight float64 // 1 counts once
}

// Options steer Fit. The zero value works.
type Options struct {
	Rounds  int     // stumps at most; 400 when zero
	Rate    float64 // share of Newton's step taken; .1 when zero
	Penalty float64 // added to each leaf's curvature; 5 when zero
	Least   float64 // curvature a leaf must have, about its number of undecided examples; 2 when zero
	Bins    int     // steps a feature may have at most; 48 when zero
}

func (o *Options) complete() {
	o.Rounds = cmp.Or(o.Rounds, 400)
	o.Rate = cmp.Or(o.Rate, .1)
	o.Penalty = cmp.Or(o.Penalty, 5)
	o.Least = cmp.Or(o.Least, 2)
	o.Bins = min(cmp.Or(o.Bins, 48), math.MaxUint8)
}

// Fit learns a model of the features named. Vectors must be as long as names.
// The same examples in the same order give the same model. Without an example
// of each outcome the model is its base alone, of at most 20 nats either way.
func Fit(names []string, examples []Example, o Options) *Model {
	o.complete()
	f := newFit(len(names), examples, o.Bins)
	m := &Model{Base: f.begin()}
	if math.Abs(m.Base) >= surest {
		return m
	}
	for range o.Rounds {
		if !f.step(o) {
			break
		}
	}
	for k, name := range names {
		if t, ok := f.term(k, name); ok {
			m.Terms = append(m.Terms, t)
		}
	}
	return m
}

// surest bounds the base where one outcome is missing, nats.
const surest = 20

// fit is the state of learning: examples by bin, and the step functions so far.
type fit struct {
	examples []Example
	cuts     [][]float32
	bins     [][]uint8 // of each feature, of each example
	values   [][]float64
	odds     []float64 // of each example so far, nats
	slope    []float64 // of the log-likelihood
	curve    []float64
}

func newFit(features int, examples []Example, bins int) *fit {
	f := &fit{
		examples: examples,
		cuts:     make([][]float32, features),
		bins:     make([][]uint8, features),
		values:   make([][]float64, features),
		odds:     make([]float64, len(examples)),
		slope:    make([]float64, len(examples)),
		curve:    make([]float64, len(examples)),
	}
	column := make([]float32, len(examples))
	for k := range features {
		for i := range examples {
			column[i] = examples[i].X[k]
		}
		f.cuts[k] = quantiles(column, bins)
		f.values[k] = make([]float64, len(f.cuts[k])+1)
		f.bins[k] = make([]uint8, len(examples))
		for i, e := range examples {
			f.bins[k][i] = uint8(sort.Search(len(f.cuts[k]), func(c int) bool { return e.X[k] < f.cuts[k][c] }))
		}
	}
	return f
}

// quantiles returns the borders of at most so many bins of like size; a feature
// of few values has a bin for each.
func quantiles(column []float32, bins int) []float32 {
	sorted := slices.Sorted(slices.Values(column))
	distinct := slices.Compact(slices.Clone(sorted))
	if len(distinct) <= bins {
		return distinct[min(1, len(distinct)):]
	}
	var cuts []float32
	for k := 1; k < bins; k++ {
		if v := sorted[k*len(sorted)/bins]; v > sorted[0] && (len(cuts) == 0 || v > cuts[len(cuts)-1]) {
			cuts = append(cuts, v)
		}
	}
	return cuts
}

// begin sets the odds to those of all examples together and returns them.
func (f *fit) begin() float64 {
	var yes, all float64
	for _, e := range f.examples {
		all += e.Weight
		if e.Yes {
			yes += e.Weight
		}
	}
	base := math.Log(yes) - math.Log(all-yes)
	if all == 0 {
		base = 0
	}
	base = min(max(base, -surest), surest)
	for i := range f.odds {
		f.odds[i] = base
	}
	return base
}

// stump is one cut of one feature and what it adds on either side.
type stump struct {
	feature, cut int
	below, above float64
	gain         float64
}

// step adds the best stump; it is false when none helps.
func (f *fit) step(o Options) bool {
	var slope, curve float64
	for i, e := range f.examples {
		p := 1 / (1 + math.Exp(-f.odds[i]))
		y := 0.0
		if e.Yes {
			y = 1
		}
		f.slope[i] = e.Weight * (y - p)
		f.curve[i] = e.Weight * p * (1 - p)
		slope += f.slope[i]
		curve += f.curve[i]
	}
	best := stump{gain: 1e-3}
	for k := range f.cuts {
		f.search(k, slope, curve, o, &best)
	}
	if best.gain <= 1e-3 {
		return false
	}
	for b := range f.values[best.feature] {
		f.values[best.feature][b] += best.side(b)
	}
	for i, b := range f.bins[best.feature] {
		f.odds[i] += best.side(int(b))
	}
	return true
}

func (s *stump) side(bin int) float64 {
	if bin <= s.cut {
		return s.below
	}
	return s.above
}

// search looks for the best cut of feature k.
func (f *fit) search(k int, slope, curve float64, o Options, best *stump) {
	var g, h [math.MaxUint8 + 1]float64
	for i, b := range f.bins[k] {
		g[b] += f.slope[i]
		h[b] += f.curve[i]
	}
	gain := func(g, h float64) float64 { return g * g / (h + o.Penalty) }
	var gl, hl float64
	for c := range f.cuts[k] {
		gl += g[c]
		hl += h[c]
		gr, hr := slope-gl, curve-hl
		if hl < o.Least || hr < o.Least {
			continue
		}
		if v := gain(gl, hl) + gain(gr, hr) - gain(slope, curve); v > best.gain {
			*best = stump{k, c, o.Rate * gl / (hl + o.Penalty), o.Rate * gr / (hr + o.Penalty), v}
		}
	}
}

// term writes out the steps of feature k, equal neighbours as one; it is false
// for a feature that says nothing.
func (f *fit) term(k int, name string) (Term, bool) {
	t := Term{Feature: name, Values: []float64{round(f.values[k][0])}}
	for c, cut := range f.cuts[k] {
		if v := round(f.values[k][c+1]); v != t.Values[len(t.Values)-1] {
			t.Cuts = append(t.Cuts, float64(cut))
			t.Values = append(t.Values, v)
		}
	}
	return t, len(t.Cuts) > 0
}

// round keeps a ten-thousandth of a nat.
func round(x float64) float64 { return math.Round(x*1e4) / 1e4 }
