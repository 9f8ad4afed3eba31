package train

import (
	"context"
	"math"

	"example.org/foulcase/lm"
)

// bucketShift leaves sign, exponent and seven bits of a float32: losses within
// one bucket differ by less than one part in a hundred.
const bucketShift = 16

// leastBytes is less than an n-gram takes, so that the first guess at a
// threshold leaves too many rather than too few.
const leastBytes = 1.5

// pruneAll prunes by the options' cut-offs, threshold and size, and returns the
// threshold that this came to.
func (e *estimator) pruneAll(ctx context.Context) (float32, error) {
	losses := e.losses()
	threshold := float32(keepAll)
	if e.options.Threshold > 0 {
		threshold = float32(e.options.Threshold)
	}
	if e.options.Size > 0 {
		threshold = max(threshold, e.keeping(losses, e.room()/leastBytes))
	}
	for {
		if err := ctx.Err(); err != nil {
			return 0, err
		}
		e.prune(losses, threshold)
		size, err := lm.Size(e.shape(), e.options.ProbBits, e.options.BackoffBits)
		if err != nil {
			return 0, err
		}
		kept := 0
		for k := 1; k < len(losses); k++ {
			kept += len(losses[k])
		}
		if e.options.Size <= 0 || size <= e.options.Size || kept == 0 {
			break
		}
		// Packed more thinly, an n-gram takes more: this errs by too little.
		each := (float64(size) - e.fixed()) / float64(kept)
		fitting := e.keeping(losses, e.room()/each)
		threshold = max(fitting, nextBucket(threshold))
	}
	if e.options.Prune == Revised {
		return threshold, e.estimate(ctx)
	}
	return threshold, nil
}

// shape returns the tables without values, which pruning leaves stale.
func (e *estimator) shape() lm.Tables {
	t := e.counts.tables()
	t[0].LogProb = e.tables[0].LogProb
	return t
}

// fixed returns roughly the bytes of the unigrams, which are never pruned.
func (e *estimator) fixed() float64 {
	return float64(e.tables.Len(0)) * float64(e.options.ProbBits+e.options.BackoffBits) / 8
}

// room returns the bytes that Options.Size leaves for longer n-grams.
func (e *estimator) room() float64 {
	return max(0, float64(e.options.Size)-e.fixed())
}

// keeping returns the least threshold that keeps at most n n-grams.
func (e *estimator) keeping(losses [][]float32, n float64) float32 {
	buckets := make([]float64, 1<<(31-bucketShift))
	for _, order := range losses {
		for _, v := range order {
			if v >= 0 {
				buckets[math.Float32bits(v)>>bucketShift]++
			}
		}
	}
	kept := 0.0
	for b := len(buckets) - 1; b >= 0; b-- {
		if kept += buckets[b]; kept > n {
			return nextBucket(math.Float32frombits(uint32(b) << bucketShift))
		}
	}
	return keepAll
}

// nextBucket returns the largest loss in the bucket of v.
func nextBucket(v float32) float32 {
	if v < 0 {
		return 0
	}
	bucket := math.Float32bits(v)>>bucketShift + 1
	return math.Float32frombits(bucket<<bucketShift - 1)
}
