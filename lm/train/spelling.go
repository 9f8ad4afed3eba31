package train

import (
	"context"
	"iter"

	"example.org/foulcase/lm"
)

// spellingOrder is the longest run of symbols looked at.
const spellingOrder = 6

// Spelling trains the model of new words (lm.OpenSpelling opens its section)
// from folded forms with weights: how often each counts. A weight of one for
// each form models the vocabulary; frequencies would model running text, where
// new words are not found. Size, if above zero, bounds the section in bytes.
func Spelling(ctx context.Context, forms iter.Seq2[string, int], size int64) ([]byte, error) {
	text := func(yield func([]uint32, error) bool) {
		var symbols []uint32
		for form, weight := range forms {
			symbols = lm.AppendSymbols(symbols[:0], []byte(form))
			for range weight {
				if !yield(symbols, nil) {
					return
				}
			}
		}
	}
	r, err := Train(ctx, text, Options{
		Vocabulary: int(lm.Symbols), Begin: uint32(lm.WordBegin), End: uint32(lm.WordEnd),
		Order: spellingOrder, Size: size, Memory: 256 << 20,
	})
	if err != nil {
		return nil, err
	}
	return r.Section, nil
}
