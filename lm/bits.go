package lm

import (
	"encoding/binary"
	"math/bits"
)

// padding lets an 8-byte load start at any byte that holds data.
const padding = 8

// packed is an array of unsigned integers of equal width, at most 57 bits.
type packed struct {
	data  []byte
	width uint64
	mask  uint64
}

func newPacked(width uint, data []byte) packed {
	return packed{data, uint64(width), 1<<width - 1}
}

func packedBytes(n uint64, width uint) uint64 {
	return (n*uint64(width)+7)/8 + padding
}

// at returns element i, which must be below the length the data was sized for.
func (p *packed) at(i uint64) uint64 {
	bit := i * p.width
	return binary.LittleEndian.Uint64(p.data[bit>>3:]) >> (bit & 7) & p.mask
}

// set stores element i into zeroed data.
func (p *packed) set(i, value uint64) {
	bit := i * p.width
	b := p.data[bit>>3:]
	binary.LittleEndian.PutUint64(b, binary.LittleEndian.Uint64(b)|value<<(bit&7))
}

// word returns the i-th 64 bits.
func word(data []byte, i uint64) uint64 {
	return binary.LittleEndian.Uint64(data[8*i:])
}

// setBit sets one bit.
func setBit(data []byte, i uint64) {
	data[i>>3] |= 1 << (i & 7)
}

// selectBit returns the position of the set bit of x that has n set bits below
// it; 64 or more if there is none.
func selectBit(x uint64, n int) uint64 {
	at := uint64(0)
	for half := uint64(32); half >= 8; half /= 2 {
		if c := bits.OnesCount64(x & (1<<half - 1)); n >= c {
			n -= c
			x >>= half
			at += half
		}
	}
	for ; n > 0; n-- {
		x &= x - 1
	}
	return at + uint64(bits.TrailingZeros64(x))
}

// flagBlock is the number of bits between counts in flags.
const flagBlock = 512

// flags is a bit vector that counts its set bits (Jacobson 1989).
type flags struct {
	data   []byte // bits, in whole blocks
	counts []byte // uint32 set bits before each block
}

func flagWords(n uint64) uint64 { return (n + flagBlock - 1) / flagBlock * (flagBlock / 64) }

func flagBytes(n uint64) (data, counts uint64) {
	words := flagWords(n)
	return 8 * words, words / (flagBlock / 64) * 4
}

func (f *flags) has(i uint32) bool {
	return f.data[i>>3]>>(i&7)&1 != 0
}

// rank returns the number of set bits below i.
func (f *flags) rank(i uint32) uint64 {
	block := uint64(i) / flagBlock
	n := uint64(binary.LittleEndian.Uint32(f.counts[4*block:]))
	last := uint64(i) / 64
	for w := block * (flagBlock / 64); w < last; w++ {
		n += uint64(bits.OnesCount64(word(f.data, w)))
	}
	return n + uint64(bits.OnesCount64(word(f.data, last)&(1<<(i&63)-1)))
}

// count fills in the counts and returns the number of set bits.
func (f *flags) count() uint32 {
	n := uint32(0)
	for w := range uint64(len(f.data) / 8) {
		if w%(flagBlock/64) == 0 {
			binary.LittleEndian.PutUint32(f.counts[w/(flagBlock/64)*4:], n)
		}
		n += uint32(bits.OnesCount64(word(f.data, w)))
	}
	return n
}
