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
	*next = State{}
	if w >= m.levels[0].shape.count {
		return -maxNats
	}
	at, key := w, w // the longest n-gram so far
	found := 0      // its level
	n := min(int(s.n), m.order-1)
	for {
		l := &m.levels[found]
		if l.shape.last {
			break
		}
		if back, ok := l.backoff(at); ok {
			next.keys[found], next.backoff[found] = key, back
			next.n = uint8(found + 1)
		}
		if found == n {
			break
		}
		child, place, ok := m.child(found, at, s.keys[found])
		if !ok {
			break
		}
		at, key = child, place
		found++
	}
	logp := m.levels[found].logProb(at)
	for i := found; i < n; i++ {
		logp += s.backoff[i]
	}
	return logp
}

// child returns the child of n-gram i of level k that has a key, and its place
// among the children.
func (m *Model) child(k int, i, key uint32) (child, place uint32, ok bool) {
	below := &m.levels[k+1]
	lo, hi := m.levels[k].children(i, below.shape.count)
	if lo == hi {
		return 0, 0, false
	}
	at, ok := below.keys.search(lo, hi, uint64(key))
	return uint32(at), uint32(at - lo), ok
}
