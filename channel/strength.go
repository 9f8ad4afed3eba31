package channel

import (
	"errors"
	"hash/fnv"
	"math"
	"slices"
)

// Folds is into how many parts Fold deals pairs.
const Folds = 5

// Fold is the part that a pair falls in, from 0, by a hash of the intended word, so
// that all slips of a word are in one. Fold 0 is for measuring; ChooseStrength
// leaves out the others in turn.
func Fold(p Pair) int {
	h := fnv.New64a()
	h.Write([]byte(lower(p).Intended))
	sum := h.Sum64()
	return int((sum ^ sum>>32) % Folds)
}

// Trial is how a model adapted at a strength did on pairs that it was not adapted to.
type Trial struct {
	Strength      float64
	Pairs         int
	LogLikelihood float64 // nats a pair
}

// strengths are tried from the one that leaves the model as it is downwards.
var strengths = [...]float64{math.Inf(1), 10000, 3000, 1000, 300, 100, 30}

// enoughTried is the number of left-out pairs from which no more are left out.
const enoughTried = 250

// ChooseStrength finds how many pairs a model should count for when Adapt blends
// it with these. Pairs outside fold 0 are left out fold by fold, and of the
// strengths, from infinity down, one takes the place of the last taken when it makes
// them likelier by more than the standard error of the mean (after Breiman et al.
// 1984), so that few pairs move the model little. Progress is told of every model
// made and may be nil.
func ChooseStrength(m *Model, pairs []Pair, progress func(done, all int)) (float64, []Trial, error) {
	var learn, left [][]Pair
	tried := 0
	for fold := 1; fold < Folds && tried < enoughTried; fold++ {
		var in, out []Pair
		for _, p := range pairs {
			switch Fold(p) {
			case 0:
			case fold:
				out = append(out, p)
			default:
				in = append(in, p)
			}
		}
		if len(in) > 0 && len(out) > 0 {
			learn, left = append(learn, in), append(left, out)
			tried += len(out)
		}
	}
	best, bestOf := math.Inf(1), []float64(nil)
	var trials []Trial
	for i, s := range strengths {
		var of []float64
		for k := range learn {
			adapted, _, err := Adapt(m, learn[k], s)
			if errors.Is(err, ErrNoPairs) {
				continue
			}
			if err != nil {
				return 0, nil, err
			}
			of = append(of, adapted.logLikelihoods(left[k])...)
			if progress != nil {
				progress(i*len(learn)+k+1, len(strengths)*len(learn))
			}
		}
		if i == 0 || clearlyMore(of, bestOf) {
			best, bestOf = s, of
		}
		trials = append(trials, Trial{s, len(of), mean(of)})
	}
	return best, trials, nil
}

// clearlyMore reports whether the mean of a is above that of b by more than the
// standard error of their differences.
func clearlyMore(a, b []float64) bool {
	d := slices.Clone(a)
	for i := range d {
		d[i] -= b[i]
	}
	average, squares := mean(d), 0.0
	for _, v := range d {
		squares += (v - average) * (v - average)
	}
	n := float64(len(d))
	return n > 1 && average > math.Sqrt(squares/(n-1)/n)
}

func mean(x []float64) float64 {
	sum := 0.0
	for _, v := range x {
		sum += v
	}
	return sum / max(1, float64(len(x)))
}
