package lm

// State is the context of the next word: the words to the left that some
// n-gram of the model can still use, with their back-off weights. Words that
// no n-gram extends are dropped, so contexts that cannot differ in any future
// score compare equal. The zero State is the empty context. States of
// different models must not be mixed.
type State struct {
	// keys[0] is the nearest word; keys[i] is the place of the context of
	// length i+1 among its siblings, which are those that differ from it in
	// the leftmost word alone.
	keys    [MaxOrder - 1]uint32
	backoff [MaxOrder - 1]float32 // of the context of length i+1, nats
	n       uint8
}

// Len returns the number of words the state holds.
func (s State) Len() int { return int(s.n) }

// Begin returns the state after the word that opens a sentence.
func (m *Model) Begin(class uint32) State {
	var next State
	m.Advance(&State{}, class, &next)
	return next
}

// Score returns log P(w | s) in nats and the state that follows w. An id
// outside the vocabulary scores -1000 and empties the context.
func (m *Model) Score(s State, w uint32) (logp float32, next State) {
	logp = m.Advance(&s, w, &next)
	return logp, next
}

// Advance is Score for hot loops: it writes the following state to next, which
// must not be s. It allocates nothing.
func (m *Model) Advance(s *State, w uint32, next *State) float32 {
	order, logp := m.match(s, w, next)
	if order == 0 {
		return logp
	}
	return s.backOff(logp, order, m.order)
}

// backOff adds to a log probability found by an n-gram of some order the
// weights of the contexts that are longer.
func (s *State) backOff(logp float32, order, highest int) float32 {
	for i := order - 1; i < min(int(s.n), highest-1); i++ {
		logp += s.backoff[i]
	}
	return logp
}

// match descends to the longest n-gram that ends in w and returns its order and
// log probability; order 0 is an id outside the vocabulary.
func (m *Model) match(s *State, w uint32, next *State) (order int, logp float32) {
	*next = State{}
	if w >= m.levels[0].count {
		return 0, -maxNats
	}
	n := min(int(s.n), m.order-1)
	var at place
	m.word(&at, w)
	at.enter(next)
	for at.level < n && m.descend(&at, s.keys[at.level]) {
		at.enter(next)
	}
	clear(next.keys[next.n:])
	return at.level + 1, at.logProb()
}
