package lm

import "math/bits"

// run is a short non-decreasing sequence of integers in Elias-Fano coding
// (Elias 1974, Fano 1971): the high bits as gaps in unary, a one for each
// element behind as many zeros as the high part has grown, and the low bits in
// an array. It takes about 2 + log2(greatest/length) bits an element and finds
// an element by its value or its place without decoding the others.
//
//	high  highBits bits, to whole bytes
//	low   width bits an element, to whole bytes
//
// The widths stand apart, in a runHeader. Damaged bytes give wrong elements,
// never an access out of bounds.
type run struct {
	runHeader
	high uint64 // byte offset of the high bits
	low  uint64 // bit offset of the low bits
}

// runHeader holds the widths of a run. It is stored as two bytes.
type runHeader struct {
	width    uint64 // of the low bits of an element
	highBits uint64
}

// headerSize is the length of a stored runHeader.
const headerSize = 2

// readHeader takes a header from the lowest bytes of head.
func readHeader(head uint64) runHeader {
	return runHeader{head & 0x3f, head >> 8 & 0xff}
}

// headerFor returns the widths for n elements none of which exceeds greatest.
// At most three bits of the high part fall to an element.
func headerFor(n, greatest uint64) runHeader {
	var h runHeader
	if greatest/n > 0 {
		h.width = uint64(bits.Len64(greatest/n)) - 1
	}
	h.highBits = n + greatest>>h.width + 1
	return h
}

func (h runHeader) put(data []byte) { data[0], data[1] = byte(h.width), byte(h.highBits) }

// bytes returns the length of a run of n elements, its header aside.
func (h runHeader) bytes(n uint64) uint64 {
	return bytesFor(h.highBits) + bytesFor(n*h.width)
}

// at lays a run out at a byte offset.
func (h runHeader) at(offset uint64) run {
	return run{h, offset, (offset + bytesFor(h.highBits)) * 8}
}

// put writes the values of a run into zeroed data.
func (r *run) put(data []byte, values []uint64) {
	for i, v := range values {
		storeBits(data, r.high*8+v>>r.width+uint64(i), 1)
		storeBits(data, r.low+uint64(i)*r.width, v&(1<<r.width-1))
	}
}

// word returns the w-th 64 of the high bits, those beyond their end cleared.
func (r *run) word(data []byte, w uint64) uint64 {
	x := load(data, r.high+8*w)
	if rest := r.highBits - 64*w; rest < 64 {
		x &= 1<<rest - 1
	}
	return x
}

// join returns element i given the position of its one in the high bits.
func (r *run) join(data []byte, i, one uint64) uint64 {
	return (one-i)<<r.width | loadBits(data, r.low+i*r.width, r.width)
}

// value returns element i; zero if the run is damaged.
func (r *run) value(data []byte, i uint64) uint64 {
	one := r.position(data, i)
	return r.join(data, i, one)
}

// position returns where the one of element i stands in the high bits; i, where
// the element would be zero, if the run is damaged.
func (r *run) position(data []byte, i uint64) uint64 {
	n := int(i)
	for w := uint64(0); 64*w < r.highBits; w++ {
		x := r.word(data, w)
		c := bits.OnesCount64(x)
		if n < c {
			return 64*w + selectBit(x, n)
		}
		n -= c
	}
	return i
}

// find looks among the elements [lo, hi) for a value that is above all elements
// before lo. Elements must be strictly increasing. The search starts at position
// at of the high bits, behind the one of element lo-1.
func (r *run) find(data []byte, at, lo, hi, value uint64) (uint64, bool) {
	high := value >> r.width
	at = r.behindZeros(data, at, high-(at-lo))
	low := value & (1<<r.width - 1)
	// Elements that share the high bits are a run of ones.
	for i := at - high; i < hi && at < r.highBits && load(data, r.high+at>>3)>>(at&7)&1 != 0; i++ {
		if v := loadBits(data, r.low+i*r.width, r.width); v >= low {
			return i, v == low
		}
		at++
	}
	return 0, false
}

// behindZeros returns the position behind the first n zeros from a position on,
// or highBits.
func (r *run) behindZeros(data []byte, at, n uint64) uint64 {
	if n == 0 {
		return at
	}
	if n > r.highBits {
		return r.highBits
	}
	left := int(n) - 1
	ahead := ^uint64(0) << (at & 63)
	for w := at / 64; 64*w < r.highBits; w++ {
		x := ^r.word(data, w) & ahead
		c := bits.OnesCount64(x)
		if left < c {
			return min(64*w+selectBit(x, left)+1, r.highBits)
		}
		left -= c
		ahead = ^uint64(0)
	}
	return r.highBits
}

// pair returns elements i and i+1; zeros if the run is damaged.
func (r *run) pair(data []byte, i uint64) (uint64, uint64) {
	n := int(i)
	for w := uint64(0); 64*w < r.highBits; w++ {
		x := r.word(data, w)
		c := bits.OnesCount64(x)
		if n >= c {
			n -= c
			continue
		}
		one := selectBit(x, n)
		this := r.join(data, i, 64*w+one)
		x = x >> one >> 1 << one << 1 // clears the lowest bits up to this one
		for x == 0 {
			if w++; 64*w >= r.highBits {
				return 0, 0
			}
			x = r.word(data, w)
		}
		return this, r.join(data, i+1, 64*w+uint64(bits.TrailingZeros64(x)))
	}
	return 0, 0
}
