package train

import (
	"context"
	"math"
	"sync"

	"example.org/foulcase/lm"
)

// estimator turns counts into probabilities: interpolated modified Kneser-Ney,
//
//	p(w|h) = (c(hw) - D(c(hw))) / S(h) + g(h) p(w|h'),
//	g(h)   = (sum of D(c(hv)) over v + lost(h)) / S(h),
//
// where c are adjusted counts, S(h) sums them over all words, h' is h without
// its leftmost word, and the unigrams interpolate with the uniform
// distribution over all words but the begin id. lost(h) is what pruning took
// from h's own counts; zero without pruning.
//
// While it works, the tables hold plain probabilities; finish takes logs.
type estimator struct {
	options   Options
	counts    *Counts
	discounts []Discounts
	tables    lm.Tables
	contexts  [][]uint32  // by order, index of each n-gram's context; nil for unigrams
	lost      [][]float64 // by order, counts pruned from each context; nil without pruning
}

// newEstimator takes counts over, with discounts estimated from them.
func newEstimator(counts *Counts, o Options) *estimator {
	return &estimator{options: o, counts: counts, discounts: counts.discounts(), contexts: make([][]uint32, 1)}
}

// estimate fills the tables with plain probabilities.
func (e *estimator) estimate(ctx context.Context) error {
	e.tables = e.counts.tables()
	e.unigrams()
	for k := 1; k < len(e.tables); k++ {
		if err := ctx.Err(); err != nil {
			return err
		}
		e.options.Progress(Progress{Stage: "estimate", Order: k + 1})
		if err := e.order(k); err != nil {
			return err
		}
	}
	return nil
}

func (e *estimator) unigrams() {
	counts := e.counts.levels[0].adjusted
	sum, share := 0.0, 0.0
	for _, c := range counts {
		sum += float64(c)
		share += e.discounts[0].of(c)
	}
	uniform := 1 / float64(len(counts)-1)
	if sum > 0 {
		share /= sum
	} else {
		sum, share = 1, 1
	}
	p := make([]float32, len(counts))
	for w, c := range counts {
		p[w] = float32((float64(c)-e.discounts[0].of(c))/sum + share*uniform)
	}
	p[e.options.Begin] = 1 // never predicted; log 0 keeps out of the way
	e.tables[0].LogProb = p
}

// order estimates the back-offs of order k (0-based: of its contexts) and the
// probabilities of order k+1.
func (e *estimator) order(k int) error {
	if len(e.contexts) <= k {
		contexts, err := e.tables.Contexts(k, e.contexts[k-1])
		if err != nil {
			return err
		}
		e.contexts = append(e.contexts, contexts)
	}
	sum := e.backoffs(k)
	counts, context := e.counts.levels[k].adjusted, e.contexts[k]
	lower, back := e.tables[k-1].LogProb, e.tables[k-1].Backoff
	first := e.tables[k-1].First
	p := make([]float32, len(counts))
	d := e.discounts[k]
	parallel(e.options.Workers, len(lower), func(from, to int) {
		for parent := from; parent < to; parent++ {
			for i := first[parent]; i < first[parent+1]; i++ {
				c, h := counts[i], context[i]
				p[i] = float32((float64(c)-d.of(c))/sum[h] + float64(back[h])*float64(lower[parent]))
			}
		}
	})
	e.tables[k].LogProb = p
	return nil
}

// backoffs sets the weights g of order k's contexts and returns their sums S.
func (e *estimator) backoffs(k int) []float64 {
	contexts := e.tables.Len(k - 1)
	sum, share := make([]float64, contexts), make([]float64, contexts)
	if e.lost != nil && e.lost[k-1] != nil {
		copy(sum, e.lost[k-1])
		copy(share, e.lost[k-1])
	}
	counts, d := e.counts.levels[k].adjusted, e.discounts[k]
	for i, h := range e.contexts[k] {
		sum[h] += float64(counts[i])
		share[h] += d.of(counts[i])
	}
	back := make([]float32, contexts)
	for h := range back {
		back[h] = 1
		if sum[h] > 0 {
			back[h] = float32(share[h] / sum[h])
		}
	}
	e.tables[k-1].Backoff = back
	return sum
}

// finish takes logarithms of all values.
func (e *estimator) finish() {
	for k := range e.tables {
		logs(e.options.Workers, e.tables[k].LogProb)
		logs(e.options.Workers, e.tables[k].Backoff)
	}
}

// minLog keeps a weight of zero finite: e^-50 is out of sight.
const minLog = -50

func logs(workers int, values []float32) {
	parallel(workers, len(values), func(from, to int) {
		for i := from; i < to; i++ {
			values[i] = float32(max(math.Log(float64(values[i])), minLog))
		}
	})
	for i, v := range values {
		values[i] = v + 0 // no minus zero
	}
}

// parallel splits [0, n) into equal parts, one a worker.
func parallel(workers, n int, work func(from, to int)) {
	if n < 1<<14 || workers < 2 {
		work(0, n)
		return
	}
	var wait sync.WaitGroup
	for i := range workers {
		wait.Go(func() { work(i*n/workers, (i+1)*n/workers) })
	}
	wait.Wait()
}
