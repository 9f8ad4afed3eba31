package lm

// State is the context of the next word: the words to the left that some
// n-gram of the model can still use, with their back-off weights. Words that
// no n-gram extends are dropped, so contexts that cannot differ in any future
// score compare equal. The zero State is the empty context. States of
// different models must not be mixed.
type State struct {
	words   [MaxOrder - 1]uint32  // nearest first
	backoff [MaxOrder - 1]float32 // of the context of length i+1, nats
	n       uint8
}

// Len returns the number of words the state holds.
func (s State) Len() int { return int(s.n) }

// Word returns the word i places to the left of the next one, i in 0..Len()-1.
func (s State) Word(i int) uint32 { return s.words[i] }

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
	if w >= m.levels[0].count {
		return -maxNats
	}
	at, found := w, 0 // the longest n-gram so far and its level
	n := min(int(s.n), m.order-1)
	for {
		l := &m.levels[found]
		if l.last {
			break
		}
		if back := l.backoff(at); isContext(back) {
			next.words[found], next.backoff[found] = w, back
			if found > 0 {
				next.words[found] = s.words[found-1]
			}
			next.n = uint8(found + 1)
		}
		if found == n {
			break
		}
		below := &m.levels[found+1]
		lo, hi := l.children(at, below.count)
		child, ok := below.find(lo, hi, s.words[found])
		if !ok {
			break
		}
		at = child
		found++
	}
	logp := m.levels[found].logProb(at)
	for i := found; i < n; i++ {
		logp += s.backoff[i]
	}
	return logp
}

// find returns the record of word within [lo, hi).
func (l *level) find(lo, hi, word uint32) (uint32, bool) {
	for lo < hi {
		mid := lo + (hi-lo)/2
		w := l.word(mid)
		if w == word {
			return mid, true
		}
		if w < word {
			lo = mid + 1
		} else {
			hi = mid
		}
	}
	return 0, false
}
