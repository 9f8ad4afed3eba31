package lm

// Explanation takes one score apart. Total = LogProb + sum of Backoffs[:N].
type Explanation struct {
	Order    int                   // length of the n-gram found, the word itself included; 0 for an id outside the vocabulary
	LogProb  float32               // log probability stored for it, nats
	Backoffs [MaxOrder - 1]float32 // weights added for the longer contexts, shortest first, nats
	N        int                   // number of back-offs added
	Total    float32               // what Score returns, nats
}

// Explain scores w in s as Score does and says how the score came about.
func (m *Model) Explain(s State, w uint32) Explanation {
	var next State
	order, logp := m.match(&s, w, &next)
	e := Explanation{Order: order, LogProb: logp, Total: logp}
	if order == 0 {
		return e
	}
	for i := order - 1; i < min(int(s.n), m.order-1); i++ {
		e.Backoffs[e.N] = s.backoff[i]
		e.Total += s.backoff[i]
		e.N++
	}
	return e
}
