package lm

import "math/bits"

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
	for i := order - 1; i < min(int(s.n), m.order-1); i++ {
		logp += s.backoff[i]
	}
	return logp
}

// match descends to the longest n-gram that ends in w and returns its order and
// log probability; order 0 is an id outside the vocabulary.
func (m *Model) match(s *State, w uint32, next *State) (order int, logp float32) {
	*next = State{}
	l := &m.levels[0]
	if w >= l.count {
		return 0, -maxNats
	}
	n := min(int(s.n), m.order-1)
	key := w
	b, i := uint64(w)/blockLen, uint64(w)%blockLen
	v := l.block(b)
	for {
		if l.last {
			break
		}
		next.keys[order] = key
		if back, ok := l.backoff(&v, i); ok {
			next.backoff[order] = back
			next.n = uint8(order + 1)
		}
		if order == n {
			break
		}
		lo, hi := l.children(&v, b, i)
		below := &m.levels[order+1]
		at, ok := below.find(lo, min(hi, uint64(below.count)), uint64(s.keys[order]), &v)
		if !ok {
			break
		}
		l, key = below, uint32(at-lo)
		b, i = at/blockLen, at%blockLen
		order++
	}
	clear(next.keys[next.n:])
	return order + 1, l.prob.value(l.data, v.probs+i*l.prob.width)
}

// backoff returns the weight of n-gram i of a block as a context; ok is false
// if it is none.
func (l *level) backoff(v *block, i uint64) (weight float32, ok bool) {
	if v.context>>i&1 == 0 {
		return 0, false
	}
	place := uint64(bits.OnesCount64(v.context & (1<<i - 1)))
	return l.back.value(l.data, v.backs+place*l.back.width), true
}

// children returns the range in the next level of the children of n-gram i of
// block b.
func (l *level) children(v *block, b, i uint64) (lo, hi uint64) {
	base := l.firstBase(b)
	if i == 0 {
		return base, base + v.ends.value(l.data, 0)
	}
	lo, hi = v.ends.pair(l.data, i-1)
	return base + lo, base + hi
}

// find looks for the n-gram of the range [lo, hi), hi at most the level's
// count, that has a key. When it does, v becomes its block.
func (l *level) find(lo, hi, key uint64, v *block) (uint64, bool) {
	if lo >= hi {
		return 0, false
	}
	b := lo / blockLen
	inner := l.block(b)
	target := l.keyBase(b) + key
	if i := lo % blockLen; i > 0 {
		target += inner.keys.value(l.data, i-1) + 1
	}
	if last := (hi - 1) / blockLen; last > b {
		if home := l.home(b, last, target); home != b {
			b = home
			inner = l.block(b)
		}
	}
	from := max(lo, b*blockLen) - b*blockLen
	to := min(hi-b*blockLen, blockLen)
	i, ok := inner.keys.find(l.data, from, to, target-l.keyBase(b))
	if !ok {
		return 0, false
	}
	*v = inner
	return b*blockLen + i, true
}

// home returns the block of [b, last] whose keys include the target.
func (l *level) home(b, last, target uint64) uint64 {
	for b < last {
		mid := (b + last + 1) / 2
		if l.keyBase(mid) <= target {
			b = mid
		} else {
			last = mid - 1
		}
	}
	return b
}
