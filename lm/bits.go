package lm

import (
	"encoding/binary"
	"math/bits"
)

// padding lets an 8-byte load start at any byte that holds data.
const padding = 8

// load returns the 8 bytes at a byte offset; zero beyond the data, so that
// damaged offsets do no harm.
func load(data []byte, at uint64) uint64 {
	if at >= uint64(len(data)) || uint64(len(data))-at < 8 {
		return 0
	}
	return binary.LittleEndian.Uint64(data[at:])
}

// loadBits returns width bits, at most 57, at a bit offset.
func loadBits(data []byte, bit, width uint64) uint64 {
	return load(data, bit>>3) >> (bit & 7) & (1<<(width&63) - 1)
}

// storeBits adds a value of at most 57 bits to zeroed data.
func storeBits(data []byte, bit, value uint64) {
	b := data[bit>>3:]
	binary.LittleEndian.PutUint64(b, binary.LittleEndian.Uint64(b)|value<<(bit&7))
}

func bytesFor(bits uint64) uint64 { return (bits + 7) / 8 }

// selectBit returns the position of the set bit of x that has n set bits below
// it; x must have more than n.
func selectBit(x uint64, n int) uint64 {
	at := uint64(0)
	if c := bits.OnesCount32(uint32(x)); n >= c {
		n -= c
		x >>= 32
		at = 32
	}
	if c := bits.OnesCount16(uint16(x)); n >= c {
		n -= c
		x >>= 16
		at += 16
	}
	if c := bits.OnesCount8(uint8(x)); n >= c {
		n -= c
		x >>= 8
		at += 8
	}
	for ; n > 0; n-- {
		x &= x - 1
	}
	return at + uint64(bits.TrailingZeros64(x))
}
