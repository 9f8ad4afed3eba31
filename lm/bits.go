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
// it; x must have more than n. It counts the bits of all bytes at once, finds
// the byte, and looks the rest up (Vigna 2008, "Broadword Implementation of
// Rank/Select Queries").
func selectBit(x uint64, n int) uint64 {
	const ones, tops = 0x0101010101010101, 0x8080808080808080
	c := x - x>>1&0x5555555555555555
	c = c&0x3333333333333333 + c>>2&0x3333333333333333
	c = (c + c>>4) & 0x0f0f0f0f0f0f0f0f * ones // byte k: set bits of bytes 0..k
	full := (uint64(n)*ones | tops) - c&^tops  // the top bit of byte k: are these at most n?
	at := uint64(bits.OnesCount64(full&tops)) * 8
	below := c << 8 >> (at & 63) & 0xff
	return at + uint64(selectInByte[(uint64(n)-below)&7][byte(x>>(at&63))])
}

// selectInByte[n][x] is the position of the set bit of x that has n set bits
// below it; 8 where there is none.
var selectInByte = func() (table [8][256]uint8) {
	for x := range 256 {
		n := 0
		for at := range 8 {
			if x>>at&1 != 0 {
				table[n][x] = uint8(at)
				n++
			}
		}
		for ; n < 8; n++ {
			table[n][x] = 8
		}
	}
	return table
}()
