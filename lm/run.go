package lm

import "math/bits"

// run is a short non-decreasing sequence of integers in Elias-Fano coding
// (Elias 1974, Fano 1971): the high bits as gaps in unary, a one for each
// element behind as many zeros as the high part has grown, and the low bits in
// an array. It takes about 2 + log2(greatest/length) bits an element and finds
// an element by its value or its place without decoding the others.
//
//	lowWidth  uint8
//	highBits  uint8
//	high      highBits bits, to whole bytes
//	low       lowWidth bits an element, to whole bytes
//
// Damaged bytes give wrong elements, never an access out of bounds.
type run struct {
	data     []byte
	highBits uint64
	high     uint64 // byte offset of the high bits
	low      uint64 // bit offset of the low bits
	width    uint64 // of the low bits
	end      uint64 // byte offset behind the run
}

// runHeader is the length of what stands before the high bits.
const runHeader = 2

// runAt reads the header of a run of n elements.
func runAt(data []byte, at, n uint64) run {
	head := load(data, at)
	r := run{data: data, width: head & 0x3f, highBits: head >> 8 & 0xff, high: at + runHeader}
	low := r.high + bytesFor(r.highBits)
	r.low = low * 8
	r.end = low + bytesFor(n*r.width)
	return r
}

// runShape returns the widths for n elements none of which exceeds greatest.
// No more than three bits of the high part fall to an element.
func runShape(n, greatest uint64) (width, highBits uint64) {
	if greatest/n > 0 {
		width = uint64(bits.Len64(greatest/n)) - 1
	}
	return width, n + greatest>>width + 1
}

func runBytes(n, greatest uint64) uint64 {
	width, highBits := runShape(n, greatest)
	return runHeader + bytesFor(highBits) + bytesFor(n*width)
}

// putRun writes values at a byte offset of zeroed data and returns the offset
// behind them.
func putRun(data []byte, at uint64, values []uint64) uint64 {
	n := uint64(len(values))
	width, highBits := runShape(n, values[n-1])
	data[at], data[at+1] = byte(width), byte(highBits)
	high := (at + runHeader) * 8
	low := high + bytesFor(highBits)*8
	for i, v := range values {
		storeBits(data, high+v>>width+uint64(i), 1)
		storeBits(data, low+uint64(i)*width, v&(1<<width-1))
	}
	return low/8 + bytesFor(n*width)
}

// word returns the w-th 64 of the high bits, those beyond their end cleared.
func (r *run) word(w uint64) uint64 {
	x := load(r.data, r.high+8*w)
	if rest := r.highBits - 64*w; rest < 64 {
		x &= 1<<rest - 1
	}
	return x
}

// at returns element i given the position of its one in the high bits.
func (r *run) at(i, one uint64) uint64 {
	return (one-i)<<r.width | loadBits(r.data, r.low+i*r.width, r.width)
}

// value returns element i; zero if the run is damaged.
func (r *run) value(i uint64) uint64 {
	n := int(i)
	for w := uint64(0); 64*w < r.highBits; w++ {
		x := r.word(w)
		c := bits.OnesCount64(x)
		if n < c {
			return r.at(i, 64*w+selectBit(x, n))
		}
		n -= c
	}
	return 0
}

// find looks among the elements [lo, hi) for a value. Elements must be strictly
// increasing.
func (r *run) find(lo, hi, value uint64) (uint64, bool) {
	high := value >> r.width
	at := r.behindZeros(high)
	// Elements that share the high bits are a run of ones.
	first := at - high
	hi = min(hi, first+r.ones(at))
	lo = max(lo, first)
	low := value & (1<<r.width - 1)
	for lo < hi {
		mid := (lo + hi) / 2
		switch v := loadBits(r.data, r.low+mid*r.width, r.width); {
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

// behindZeros returns the position behind n zeros, or highBits.
func (r *run) behindZeros(n uint64) uint64 {
	if n == 0 {
		return 0
	}
	left := int(min(n, r.highBits+1)) - 1
	for w := uint64(0); 64*w < r.highBits; w++ {
		x := ^r.word(w)
		c := bits.OnesCount64(x)
		if left < c {
			return min(64*w+selectBit(x, left)+1, r.highBits)
		}
		left -= c
	}
	return r.highBits
}

// ones returns the length of the run of ones that begins at a position.
func (r *run) ones(at uint64) uint64 {
	n := uint64(0)
	for at < r.highBits {
		w, shift := at/64, at&63
		c := uint64(bits.TrailingZeros64(^(r.word(w) >> shift)))
		n += c
		if c < 64-shift {
			break
		}
		at += c
	}
	return n
}

// pair returns elements i and i+1; zeros if the run is damaged.
func (r *run) pair(i uint64) (uint64, uint64) {
	n := int(i)
	for w := uint64(0); 64*w < r.highBits; w++ {
		x := r.word(w)
		c := bits.OnesCount64(x)
		if n >= c {
			n -= c
			continue
		}
		one := selectBit(x, n)
		this := r.at(i, 64*w+one)
		x = x >> one >> 1 << one << 1 // clears the lowest bits up to this one
		for x == 0 {
			if w++; 64*w >= r.highBits {
				return 0, 0
			}
			x = r.word(w)
		}
		return this, r.at(i+1, 64*w+uint64(bits.TrailingZeros64(x)))
	}
	return 0, 0
}
