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
	if w >= m.levels[0].shape.count {
		return Explanation{LogProb: -maxNats, Total: -maxNats}
	}
	n := min(int(s.n), m.order-1)
	at, found := w, 0
	for found < n {
		child, _, ok := m.child(found, at, s.keys[found])
		if !ok {
			break
		}
		at = child
		found++
	}
	e := Explanation{Order: found + 1, LogProb: m.levels[found].logProb(at), N: n - found}
	copy(e.Backoffs[:], s.backoff[found:n])
	e.Total = e.LogProb
	for _, b := range e.Backoffs[:e.N] {
		e.Total += b
	}
	return e
}
