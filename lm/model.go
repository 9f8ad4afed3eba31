package lm

import (
	"encoding/binary"
	"fmt"
	"math"
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
// its n-grams. The time taken does not depend on the size of the model. Errors
// wrap ErrFormat. The n-grams are not examined: see Verify.
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
	probBits, backBits := uint64(head[6]), uint64(head[7])
	if m.order < 1 || m.order > MaxOrder || !validWidth(probBits) || !validWidth(backBits) {
		return nil, fmt.Errorf("%w: order %d with values of %d and %d bits", ErrFormat, m.order, probBits, backBits)
	}
	m.readShapes(&r)
	m.readCodebooks(&r, probBits, backBits)
	for k := range m.order {
		l := &m.levels[k]
		if data := r.take(l.bytes(), fmt.Sprintf("%d-grams", k+1)); r.err == nil {
			l.over(data)
		}
	}
	if r.err == nil && len(r.rest) != 0 {
		r.err = fmt.Errorf("%w: %d bytes too many", ErrFormat, len(r.rest))
	}
	if r.err != nil {
		return nil, r.err
	}
	return m, nil
}

func validWidth(width uint64) bool {
	return width >= 1 && width <= maxCodeBits || width == exactBits
}

func (m *Model) readShapes(r *reader) {
	for k := range m.order {
		b := r.take(shapeSize, "shapes")
		if r.err != nil {
			return
		}
		l := &m.levels[k]
		l.order, l.last = k+1, k == m.order-1
		l.headers = headerBytes(l.order, l.last)
		l.shape, r.err = readShape(b, k+1)
	}
}

func (m *Model) readCodebooks(r *reader, probBits, backBits uint64) {
	for k := range m.order {
		l := &m.levels[k]
		l.prob = r.codebook(probBits, 0, fmt.Sprintf("%d-gram probabilities", k+1))
		if !l.last {
			l.back = r.codebook(backBits, maxNats, fmt.Sprintf("%d-gram back-offs", k+1))
		}
	}
}

// reader walks the header.
type reader struct {
	rest []byte
	err  error
}

func (r *reader) take(n uint64, what string) []byte {
	if r.err != nil {
		return nil
	}
	if uint64(len(r.rest)) < n {
		r.err = fmt.Errorf("%w: cut within its %s", ErrFormat, what)
		return nil
	}
	b := r.rest[:n:n]
	r.rest = r.rest[n:]
	return b
}

func (r *reader) codebook(width uint64, limit float32, what string) codebook {
	c := codebook{width: width}
	if width == exactBits {
		return c
	}
	b := r.take(4<<width, what)
	if b == nil {
		return c
	}
	c.values = make([]float32, 1<<width)
	for i := range c.values {
		v := math.Float32frombits(binary.LittleEndian.Uint32(b[4*i:]))
		if !inRange(v, limit) {
			r.err = fmt.Errorf("%w: value %v in its %s", ErrFormat, v, what)
		}
		c.values[i] = v
	}
	return c
}

// inRange is false for what is no number, too.
func inRange(v, limit float32) bool { return v <= limit && v >= -maxNats }

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
