package train

import (
	"math"

	"example.org/foulcase/lm"
)

// bucketShift leaves sign, exponent and seven bits of a float32: losses within
// one bucket differ by less than one part in a hundred.
const bucketShift = 16

// threshold returns the least threshold at which the model fits into the bytes
// of Options.Size, or the one of the options.
func (e *estimator) threshold(losses [][]float32) float32 {
	if e.options.Size <= 0 {
		if e.options.Threshold > 0 {
			return float32(e.options.Threshold)
		}
		return keepAll
	}
	buckets := make([][]int, len(losses)) // by order and loss
	for k := 1; k < len(losses); k++ {
		buckets[k] = make([]int, 1<<(32-bucketShift))
		for _, v := range losses[k] {
			if v >= 0 {
				buckets[k][math.Float32bits(v+0)>>bucketShift]++
			}
		}
	}
	counts := make([]int, len(losses))
	counts[0] = e.tables.Len(0)
	for b := uint32(1<<(31-bucketShift)) - 1; ; b-- {
		for k := 1; k < len(losses); k++ {
			counts[k] += buckets[k][b]
		}
		if lm.Size(counts, e.options.ProbBits, e.options.BackoffBits) > e.options.Size {
			return math.Float32frombits((b + 1) << bucketShift)
		}
		if b == 0 {
			return keepAll
		}
	}
}
