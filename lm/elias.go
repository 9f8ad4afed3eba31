package lm

import (
	"encoding/binary"
	"math/bits"
)

// sampleEvery is the number of ones, or zeros, between stored positions.
const sampleEvery = 64

// scanAtMost is the length up to which a range is searched element by element
// rather than by its high bits.
const scanAtMost = 8

// monotone is a non-decreasing sequence of integers in Elias-Fano coding
// (Elias 1974, Fano 1971): the low bits of each in an array; the high bits as
// gaps in unary, a one for each element behind as many zeros as the high part
// has grown. It takes about 2 + log2(greatest/length) bits an element.
//
// Damaged data gives wrong elements, never an access out of bounds.
type monotone struct {
	n        uint64 // elements
	highBits uint64 // ones and zeros of the high part
	low      packed
	high     []byte // highBits, in whole words
	ones     []byte // uint32 position of every sampleEvery-th one
	zeros    []byte // likewise of zeros
}

// monotoneShape is what must be known to lay a sequence out.
type monotoneShape struct {
	n        uint64
	lowWidth uint
	highBits uint64
}

// shapeFor returns the shape for n elements none of which exceeds greatest.
func shapeFor(n, greatest uint64) monotoneShape {
	s := monotoneShape{n: n}
	if n > 0 && greatest/n > 0 {
		s.lowWidth = uint(bits.Len64(greatest/n)) - 1
	}
	s.highBits = n + greatest>>s.lowWidth + 1
	return s
}

// parts returns the bytes of low bits, high bits, samples of ones and of zeros.
func (s monotoneShape) parts() [4]uint64 {
	return [4]uint64{
		packedBytes(s.n, s.lowWidth),
		(s.highBits + 63) / 64 * 8,
		(s.n/sampleEvery + 1) * 4,
		((s.highBits-s.n)/sampleEvery + 1) * 4,
	}
}

func (s monotoneShape) bytes() uint64 {
	p := s.parts()
	return p[0] + p[1] + p[2] + p[3]
}

// over lays a sequence out over data of s.bytes() bytes.
func (s monotoneShape) over(data []byte) monotone {
	p := s.parts()
	at := [5]uint64{}
	for i, n := range p {
		at[i+1] = at[i] + n
	}
	part := func(i int) []byte { return data[at[i]:at[i+1]:at[i+1]] }
	return monotone{s.n, s.highBits, newPacked(s.lowWidth, part(0)), part(1), part(2), part(3)}
}

// fill writes the elements; next yields them in order.
func (m *monotone) fill(next func(i uint64) uint64) {
	for i := range m.n {
		v := next(i)
		if m.low.width > 0 {
			m.low.set(i, v&m.low.mask)
		}
		setBit(m.high, v>>m.low.width+i)
	}
	ones, zeros := uint64(0), uint64(0)
	for at := range m.highBits {
		samples, seen := m.zeros, &zeros
		if m.high[at>>3]>>(at&7)&1 != 0 {
			samples, seen = m.ones, &ones
		}
		if *seen%sampleEvery == 0 {
			binary.LittleEndian.PutUint32(samples[*seen/sampleEvery*4:], uint32(at))
		}
		*seen++
	}
}

// find1 returns the position of one number i, or highBits if it is lost.
func (m *monotone) find1(i uint64) uint64 {
	return m.locate(m.ones, i, 0)
}

// find0 returns the position of zero number i, or highBits if it is lost.
func (m *monotone) find0(i uint64) uint64 {
	return m.locate(m.zeros, i, ^uint64(0))
}

// locate scans from the sample before bit number i of those that are ones once
// flipped.
func (m *monotone) locate(samples []byte, i, flip uint64) uint64 {
	s := i / sampleEvery * 4
	if s+4 > uint64(len(samples)) {
		return m.highBits
	}
	start := uint64(binary.LittleEndian.Uint32(samples[s:]))
	n := int(i % sampleEvery)
	w := start / 64
	if w >= uint64(len(m.high)/8) {
		return m.highBits
	}
	x := (word(m.high, w) ^ flip) &^ (1<<(start&63) - 1)
	for {
		c := bits.OnesCount64(x)
		if n < c {
			return w*64 + selectBit(x, n)
		}
		n -= c
		if w++; w >= uint64(len(m.high)/8) {
			return m.highBits
		}
		x = word(m.high, w) ^ flip
	}
}

// following returns the position of the first one at or behind a position.
func (m *monotone) following(at uint64) uint64 {
	w := at / 64
	if w >= uint64(len(m.high)/8) {
		return m.highBits
	}
	x := word(m.high, w) &^ (1<<(at&63) - 1)
	for x == 0 {
		if w++; w >= uint64(len(m.high)/8) {
			return m.highBits
		}
		x = word(m.high, w)
	}
	return w*64 + uint64(bits.TrailingZeros64(x))
}

// join makes element i, below n, of the position of its one.
func (m *monotone) join(i, at uint64) uint64 {
	return (at-i)<<m.low.width | m.low.at(i)
}

// value returns element i, below n.
func (m *monotone) value(i uint64) uint64 {
	return m.join(i, m.find1(i))
}

// pair returns elements i and i+1, both below n.
func (m *monotone) pair(i uint64) (uint64, uint64) {
	at := m.find1(i)
	return m.join(i, at), m.join(i+1, m.following(at+1))
}

// followingZero returns the position of the first zero at or behind a position.
func (m *monotone) followingZero(at uint64) uint64 {
	w := at / 64
	if w >= uint64(len(m.high)/8) {
		return m.highBits
	}
	x := ^word(m.high, w) &^ (1<<(at&63) - 1)
	for x == 0 {
		if w++; w >= uint64(len(m.high)/8) {
			return m.highBits
		}
		x = ^word(m.high, w)
	}
	return w*64 + uint64(bits.TrailingZeros64(x))
}

// search looks in the strictly increasing elements [lo, hi), hi at most n, for
// the one that exceeds the element before lo by distance+1.
func (m *monotone) search(lo, hi, distance uint64) (uint64, bool) {
	target, at := distance, uint64(0)
	if lo > 0 {
		before := m.find1(lo - 1)
		target += m.join(lo-1, before) + 1
		at = before + 1
	}
	if hi-lo <= scanAtMost {
		return m.scan(lo, hi, at, target)
	}
	// The elements that share the target's high bits are a run of ones between
	// two zeros; their low bits are sorted.
	high, low := target>>m.low.width, target&m.low.mask
	at = 0
	if high > 0 {
		at = m.find0(high-1) + 1
	}
	hi = min(hi, m.followingZero(at)-high)
	lo = max(lo, at-high)
	for lo < hi {
		mid := lo + (hi-lo)/2
		switch v := m.low.at(mid); {
		case v == low:
			return mid, true
		case v < low:
			lo = mid + 1
		default:
			hi = mid
		}
	}
	return 0, false
}

// scan looks for the target in [lo, hi), whose first one is at or behind at.
func (m *monotone) scan(lo, hi, at, target uint64) (uint64, bool) {
	for i := lo; i < hi; i++ {
		at = m.following(at)
		if v := m.join(i, at); v >= target {
			return i, v == target
		}
		at++
	}
	return 0, false
}
