package lm

import (
	"encoding/binary"
	"fmt"
	"math/bits"
)

// maxNats bounds every stored value and, negated, is the score of an id
// outside the vocabulary: far below any word's price, yet safe to add up.
const maxNats = 1000

// Model is an n-gram model over a section that stays the caller's.
type Model struct {
	order  int
	levels [MaxOrder]level
}

// Open reads the header of a section and keeps the section, without copying
// its records. The time taken does not depend on the size of the model.
// Errors wrap ErrFormat. Records are not examined: see Verify.
func Open(section []byte) (*Model, error) {
	r := reader{rest: section}
	head := r.take(8, "header")
	if r.err != nil {
		return nil, r.err
	}
	if string(head[:4]) != magic {
		return nil, fmt.Errorf("%w: it does not begin with %q", ErrFormat, magic)
	}
	if head[4] != version {
		return nil, fmt.Errorf("%w: version %d, this program reads %d; rebuild the model", ErrFormat, head[4], version)
	}
	m := &Model{order: int(head[5])}
	probBits, backBits := uint(head[6]), uint(head[7])
	if m.order < 1 || m.order > MaxOrder || !validWidth(probBits) || !validWidth(backBits) {
		return nil, fmt.Errorf("%w: order %d with values of %d and %d bits", ErrFormat, m.order, probBits, backBits)
	}
	if err := m.readCounts(&r, probBits, backBits); err != nil {
		return nil, err
	}
	for k := range m.order {
		l := &m.levels[k]
		l.data = r.take(l.bytes(), fmt.Sprintf("%d-grams", k+1))
	}
	if r.err == nil && len(r.rest) != 0 {
		r.err = fmt.Errorf("%w: %d bytes too many", ErrFormat, len(r.rest))
	}
	if r.err != nil {
		return nil, r.err
	}
	return m, nil
}

func validWidth(width uint) bool {
	return width >= 1 && width <= maxCodeBits || width == exactBits
}

// readCounts reads the counts and codebooks and lays the levels out.
func (m *Model) readCounts(r *reader, probBits, backBits uint) error {
	b := r.take(4*uint64(m.order), "counts")
	if r.err != nil {
		return r.err
	}
	for k := range m.order {
		m.levels[k].count = binary.LittleEndian.Uint32(b[4*k:])
	}
	vocabulary := m.levels[0].count
	if vocabulary == 0 || bits.Len32(vocabulary) > maxWordBits {
		return fmt.Errorf("%w: %d words", ErrFormat, vocabulary)
	}
	for k := range m.order {
		l := &m.levels[k]
		l.prob = r.codebook(probBits, 0, fmt.Sprintf("%d-gram probabilities", k+1))
		last := k == m.order-1
		next := uint32(0)
		if !last {
			l.back = r.codebook(backBits, maxNats, fmt.Sprintf("%d-gram back-offs", k+1))
			next = m.levels[k+1].count
		}
		l.layout(k+1, vocabulary, next, probBits, backBits, last)
	}
	return r.err
}

// Order returns the length of the longest n-gram.
func (m *Model) Order() int { return m.order }

// Vocabulary returns the number of word ids.
func (m *Model) Vocabulary() int { return int(m.levels[0].count) }

// Count returns the number of n-grams of an order, 1..Order().
func (m *Model) Count(order int) int {
	if order < 1 || order > m.order {
		return 0
	}
	return int(m.levels[order-1].count)
}

// Verify reads every record and reports the first that cannot be right: words
// out of order or outside the vocabulary, child ranges that overlap or end
// early, values that are no numbers. It takes time linear in the model.
func (m *Model) Verify() error {
	for k := range m.order {
		if err := m.verifyLevel(k); err != nil {
			return err
		}
	}
	return nil
}

func (m *Model) verifyLevel(k int) error {
	l := &m.levels[k]
	bad := func(i uint32, what string) error {
		return fmt.Errorf("%w: %d-gram %d: %s", ErrFormat, k+1, i, what)
	}
	end := uint32(0)
	for i := range l.count {
		if p := l.logProb(i); !(p <= 0 && p >= -maxNats) {
			return bad(i, "log probability is not a number in range")
		}
		if l.last {
			continue
		}
		if b := l.backoff(i); !(b <= maxNats && b >= -maxNats) {
			return bad(i, "back-off is not a number in range")
		}
		next := &m.levels[k+1]
		lo := uint32(l.field(uint64(i)*l.recordBits+l.childAt, l.chMask))
		hi := uint32(l.field(uint64(i+1)*l.recordBits+l.childAt, l.chMask))
		if lo != end || hi < lo || hi > next.count {
			return bad(i, "range of children")
		}
		end = hi
		for c := lo; c < hi; c++ {
			if w := next.word(c); w >= m.levels[0].count || c > lo && w <= next.word(c-1) {
				return bad(i, "order of children")
			}
		}
	}
	if !l.last && end != m.levels[k+1].count {
		return bad(l.count, "children left over")
	}
	return nil
}
