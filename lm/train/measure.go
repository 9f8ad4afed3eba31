package train

import (
	"math"

	"example.org/foulcase/lm"
)

// Measurement sums up a model's prices for a text. To compare models of
// different vocabularies, as with folded and unfolded case, take LogProb over
// the same text: a sum of nats is comparable where a perplexity is not.
type Measurement struct {
	Sentences  int64
	Tokens     int64                  // predicted ones, end ids included
	Unseen     int64                  // tokens whose id is the unknown one
	LogProb    float64                // of all tokens, nats
	UnseenProb float64                // part of LogProb that is due to unseen tokens, nats
	Orders     [lm.MaxOrder + 1]int64 // tokens by the length of the n-gram that priced them
}

// Perplexity returns exp of the mean price of all tokens.
func (m *Measurement) Perplexity() float64 {
	return math.Exp(-m.LogProb / float64(m.Tokens))
}

// PerplexitySeen leaves unseen tokens out; they still stand in the contexts.
func (m *Measurement) PerplexitySeen() float64 {
	return math.Exp(-(m.LogProb - m.UnseenProb) / float64(m.Tokens-m.Unseen))
}

// Measure prices a text. unknown tells which ids count as unseen; nil for none.
func Measure(m *lm.Model, text Sentences, begin uint32, unknown func(id uint32) bool) (Measurement, error) {
	var sum Measurement
	for sentence, err := range text {
		if err != nil {
			return sum, err
		}
		sum.add(m, sentence, begin, unknown)
	}
	return sum, nil
}

// add prices one sentence and returns its log probability in nats.
func (sum *Measurement) add(m *lm.Model, sentence []uint32, begin uint32, unknown func(uint32) bool) float64 {
	var state, next lm.State
	if len(sentence) > 0 && sentence[0] == begin {
		state, sentence = m.Begin(begin), sentence[1:]
	}
	total := 0.0
	for _, w := range sentence {
		sum.Orders[m.Explain(state, w).Order]++
		p := float64(m.Advance(&state, w, &next))
		state = next
		total += p
		if unknown != nil && unknown(w) {
			sum.Unseen++
			sum.UnseenProb += p
		}
	}
	sum.Sentences++
	sum.Tokens += int64(len(sentence))
	sum.LogProb += total
	return total
}
