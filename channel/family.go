package channel

import "math"

// family is the edits of one kind in all surroundings. Each has its probability
// under a model that others made, times a factor for every level: for the kind as
// a whole, for the letters, for these with a neighbour. A factor above one says
// that a house makes the edits of a group oftener than the model has it.
type family struct {
	base    []float64 // probability under the model; 0 where there is no such edit
	chances []float64 // weighted number of places in the pairs where it could be made
	tilt    []float64 // the product of its factors; see spread
	levels  []level
	active  []int32 // the edits that could be made somewhere in the pairs
}

// level shares a family out among groups, each with a factor. A factor's prior is
// the gamma distribution, its mode at one, that weight edits would leave behind
// where the model expects as many.
type level struct {
	group  []int32 // of each edit
	factor []float64
	weight []float64
}

// newFamily makes a family with factors of one. In each group the model counts for
// trust places, for share times those that the pairs have, and for reserve edits.
func newFamily(base, chances []float64, share, trust, reserve float64, groups ...func(i int) int) *family {
	f := &family{base: base, chances: chances, tilt: make([]float64, len(base))}
	for i := range f.tilt {
		f.tilt[i] = 1
	}
	for i, b := range base {
		if b > 0 && chances[i] > 0 {
			f.active = append(f.active, int32(i))
		}
	}
	for _, of := range groups {
		f.levels = append(f.levels, f.level(of, share, trust, reserve))
	}
	return f
}

func (f *family) level(of func(i int) int, share, trust, reserve float64) level {
	l := level{group: make([]int32, len(f.base))}
	var places []float64
	for i := range f.base {
		g := of(i)
		l.group[i] = int32(g)
		for len(l.factor) <= g {
			l.factor, l.weight, places = append(l.factor, 1), append(l.weight, 0), append(places, 0)
		}
		l.weight[g] += f.chances[i] * f.base[i]
		places[g] += f.chances[i]
	}
	for g := range l.weight {
		if places[g] > 0 {
			l.weight[g] = l.weight[g]*(share+trust/places[g]) + reserve
		}
	}
	return l
}

// raise sets the factors to what is likeliest given expected numbers of edits,
// level by level, each given the others (Meng & Rubin 1993): seen edits and those
// of the prior over expected ones and those of the prior.
func (f *family) raise(seen []float64) {
	for k := range f.levels {
		l := &f.levels[k]
		n, expected := make([]float64, len(l.factor)), make([]float64, len(l.factor))
		for _, i := range f.active {
			g := l.group[i]
			n[g] += seen[i]
			expected[g] += f.chances[i] * f.base[i] * f.tilt[i]
		}
		change := make([]float64, len(l.factor))
		for g, old := range l.factor {
			change[g] = 1
			if l.weight[g] > 0 {
				l.factor[g] = (n[g] + l.weight[g]) / (expected[g]/old + l.weight[g])
				change[g] = l.factor[g] / old
			}
		}
		for _, i := range f.active {
			f.tilt[i] *= change[l.group[i]]
		}
	}
}

// spread brings the factors to the edits that could be made nowhere in the pairs.
func (f *family) spread() {
	for i := range f.tilt {
		f.tilt[i] = 1
		for k := range f.levels {
			f.tilt[i] *= f.levels[k].factor[f.levels[k].group[i]]
		}
	}
}

// penalty is what the factors add to the log likelihood, in nats: the logarithm of
// their prior, less the edits expected beyond those of the model.
func (f *family) penalty() float64 {
	sum := 0.0
	for _, i := range f.active {
		sum -= f.chances[i] * f.base[i] * (f.tilt[i] - 1)
	}
	for _, l := range f.levels {
		for g, factor := range l.factor {
			sum += l.weight[g] * (math.Log(factor) - factor + 1)
		}
	}
	return sum
}

// tilted gives the probabilities of the edits with their factors.
func (f *family) tilted() []float64 {
	p := make([]float64, len(f.base))
	for i, b := range f.base {
		p[i] = b * f.tilt[i]
	}
	return p
}
