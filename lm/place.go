package lm

import "math/bits"

// place is an n-gram of the model with the block that holds it.
type place struct {
	in    *level
	level int // its order less one
	block
	number uint64 // of the block
	i      uint64 // within the block
	key    uint32 // its place among its siblings; of a unigram the word
}

// word makes p the place of a word's unigram; w must be in the vocabulary.
func (m *Model) word(p *place, w uint32) {
	p.in, p.level = &m.levels[0], 0
	p.number, p.i, p.key = uint64(w)/blockLen, uint64(w)%blockLen, w
	p.in.layOut(&p.block, p.number)
}

// descend moves to the n-gram that has one word more to the left, in the context
// whose key is given; it stays, and is false, if the model has none. The place
// must not be of the highest order.
func (m *Model) descend(p *place, key uint32) bool {
	lo, hi := m.children(p)
	if lo >= hi {
		return false
	}
	var q search
	below := &m.levels[p.level+1]
	q.begin(below, lo, hi, uint64(key))
	i, ok := q.find(below, hi)
	if ok {
		p.in, p.level = below, p.level+1
		p.block, p.number, p.i = q.block, q.number, i
		p.key = uint32(q.number*blockLen + i - lo)
	}
	return ok
}

// children returns the range of the children in the next level.
func (m *Model) children(p *place) (lo, hi uint64) {
	base, count := p.in.firstBase(p.number), uint64(m.levels[p.level+1].count)
	if p.i == 0 {
		return base, min(base+p.ends.value(p.in.data, 0), count)
	}
	lo, hi = p.ends.pair(p.in.data, p.i-1)
	return base + lo, min(base+hi, count)
}

// enter writes the n-gram to the state that follows its last word.
func (p *place) enter(next *State) {
	if p.in.last {
		return
	}
	next.keys[p.level] = p.key
	if back, ok := p.backoff(); ok {
		next.backoff[p.level] = back
		next.n = uint8(p.level + 1)
	}
}

func (p *place) logProb() float32 {
	return p.in.prob.value(p.in.data, p.probs+p.i*p.in.prob.width)
}

func (p *place) backoff() (weight float32, ok bool) { return p.in.backoff(&p.block, p.i) }

// backoff returns the weight of n-gram i of a block as a context; ok is false
// if it is none.
func (l *level) backoff(v *block, i uint64) (weight float32, ok bool) {
	if v.context>>i&1 == 0 {
		return 0, false
	}
	place := uint64(bits.OnesCount64(v.context & (1<<i - 1)))
	return l.back.value(l.data, v.backs+place*l.back.width), true
}

// search is the way to one n-gram of a level.
type search struct {
	block
	number   uint64 // of the block
	from, at uint64 // the first n-gram in question, and where its one may stand
	target   uint64 // the key less the block's keyBase
}

// begin finds the block in which the n-gram of the range [lo, hi) that has a key
// would be. The range must not be empty, hi be at most the level's count.
func (q *search) begin(l *level, lo, hi, key uint64) {
	q.number, q.from, q.target = lo/blockLen, lo%blockLen, key
	l.layOut(&q.block, q.number)
	if q.from > 0 {
		before := q.keys.position(l.data, q.from-1)
		q.target += q.keys.join(l.data, q.from-1, before) + 1
		q.at = before + 1
	}
	if last := (hi - 1) / blockLen; last > q.number {
		target := q.target + l.keyBase(q.number)
		if home := l.home(q.number, last, target); home != q.number {
			q.number, q.from, q.at, q.target = home, 0, 0, target-l.keyBase(home)
			l.layOut(&q.block, home)
		}
	}
}

// find looks for the n-gram in its block, before the end hi of the range.
func (q *search) find(l *level, hi uint64) (i uint64, ok bool) {
	return q.keys.find(l.data, q.at, q.from, min(hi-q.number*blockLen, blockLen), q.target)
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
