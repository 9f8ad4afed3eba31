package channel

import "math"

// Unit is a model in which every slip costs one nat, to be compared with edit
// distances; without swaps if they are not to count as one.
func Unit(swaps bool) (*Model, error) {
	e := math.Exp(-1)
	fill := func(n int, p float64) []float64 {
		t := make([]float64, n)
		for i := range t {
			t[i] = p
		}
		return t
	}
	d := &draft{
		keep: fill(cube, 1), drop: fill(cube, e), insert: fill(cube, e),
		doubt: fill(cube, 1), subLeft: fill(cube, e), subNext: fill(cube, 1),
		swap: fill(square, 0), stop: fill(square, 1),
		prices: Prices{Accent: 1, Foreign: 1},
	}
	if swaps {
		d.swap = fill(square, e)
	}
	return d.model()
}

// Strengths are what ChooseStrength tries.
var Strengths = strengths
