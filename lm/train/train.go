package train

import (
	"context"

	"example.org/foulcase/lm"
)

// Result is a trained model with an account of how it came about.
type Result struct {
	Section   []byte    // what lm.Open opens
	Tables    lm.Tables // the same model before quantising
	Sentences int64
	Tokens    int64       // predicted ones, end ids included
	Counted   []int       // distinct n-grams of each order in the text
	Kept      []int       // n-grams of each order in the model
	Discounts []Discounts // of each order
	Threshold float32     // loss above which n-grams were kept, nats a token; below 0 if all were
}

// Train counts, smooths, prunes, quantises and encodes.
func Train(ctx context.Context, text Sentences, o Options) (*Result, error) {
	counts, err := Count(ctx, text, o)
	if err != nil {
		return nil, err
	}
	return Build(ctx, counts, o)
}

// Build is Train from counts that were taken with the same options. It takes
// the counts over: they must not be used again.
func Build(ctx context.Context, counts *Counts, o Options) (*Result, error) {
	o, err := o.normalise()
	if err != nil {
		return nil, err
	}
	e := newEstimator(counts, o)
	r := &Result{Sentences: counts.Sentences, Tokens: counts.Tokens, Discounts: e.discounts, Threshold: keepAll}
	for k := range counts.levels {
		r.Counted = append(r.Counted, counts.Len(k+1))
	}
	if err := e.estimate(ctx); err != nil {
		return nil, err
	}
	if o.Size > 0 || o.Threshold > 0 || len(o.MinCounts) > 0 {
		o.Progress(Progress{Stage: "prune"})
		if r.Threshold, err = e.pruneAll(ctx); err != nil {
			return nil, err
		}
	}
	e.finish()
	o.Progress(Progress{Stage: "encode"})
	r.Tables = e.tables
	for k := range r.Tables {
		r.Kept = append(r.Kept, r.Tables.Len(k))
	}
	r.Section, err = lm.Encode(r.Tables, e.codebooks())
	return r, err
}
