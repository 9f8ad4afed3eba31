package lm

import (
	"encoding/binary"
	"errors"
	"fmt"
	"math"
	"math/bits"
)

// The section, all integers little-endian:
//
//	magic      4 bytes "fcng"
//	version    uint8
//	order      uint8, 1..MaxOrder
//	probBits   uint8, width of a log probability: 1..12 a code, 32 a float32
//	backBits   uint8, width of a back-off, likewise
//	count      order x uint32, n-grams of each order; count[0] is the vocabulary
//	codebooks  for each order: 2^probBits float32 log probabilities, then, but
//	           for the highest order, 2^backBits float32 back-offs; absent where
//	           the width is 32
//	levels     for each order: count records, one more empty record at the end
//	           (but for the highest order), zero bytes up to padding
//
// A record of order k is, from the lowest bit:
//
//	word       the n-gram's leftmost word, sorted within its parent (order >= 2)
//	prob       log P(last word | the others)
//	back       back-off of the n-gram as a context; not in the highest order
//	child      index of its first child in level k+1; not in the highest order.
//	           The next record's child ends the range.
//
// The parent of an n-gram is the n-gram without its leftmost word. A back-off
// equal to notContext marks an n-gram that no longer n-gram has as its
// context: states drop it.
const (
	magic   = "fcng"
	version = 1
	// MaxOrder is the longest n-gram a model may hold.
	MaxOrder = 6
	// exactBits is the width of a value stored as it is.
	exactBits = 32
	// maxCodeBits bounds a codebook to 4,096 values.
	maxCodeBits = 12
	// padding lets an 8-byte load start at any byte that holds a record.
	padding = 8
	// maxWordBits allows vocabularies of up to 2^28 words.
	maxWordBits = 28
)

// ErrFormat is wrapped by every error of Open: the bytes are no model that
// this version reads.
var ErrFormat = errors.New("lm: not a usable n-gram section")

// codebook turns the packed codes of one order into values.
type codebook struct {
	width  uint      // bits of a code
	values []float32 // 2^width entries; nil when values are stored as they are
}

func (c *codebook) value(code uint64) float32 {
	if c.values == nil {
		return math.Float32frombits(uint32(code))
	}
	return c.values[code&uint64(len(c.values)-1)]
}

// level is one order's array of records.
type level struct {
	data                       []byte
	count                      uint32
	recordBits                 uint64
	wordMask                   uint64
	probAt, backAt, childAt    uint64 // bit offsets within a record
	probMask, backMask, chMask uint64
	prob, back                 codebook
	last                       bool
}

// layout sets the widths of a level: order is 1-based, next the number of
// n-grams of the following order.
func (l *level) layout(order int, vocabulary, next uint32, probBits, backBits uint, last bool) {
	wordBits := uint64(0)
	if order > 1 {
		wordBits = uint64(bits.Len32(vocabulary - 1))
	}
	l.last = last
	l.wordMask = 1<<wordBits - 1
	l.probAt = wordBits
	l.probMask = 1<<probBits - 1
	l.recordBits = wordBits + uint64(probBits)
	if last {
		return
	}
	l.backAt = l.recordBits
	l.backMask = 1<<backBits - 1
	l.childAt = l.backAt + uint64(backBits)
	childBits := uint64(bits.Len32(next))
	l.chMask = 1<<childBits - 1
	l.recordBits = l.childAt + childBits
}

// bytes returns the length of the level's records with their padding.
func (l *level) bytes() uint64 {
	records := uint64(l.count)
	if !l.last {
		records++
	}
	return (records*l.recordBits+7)/8 + padding
}

// field loads up to 57 bits that begin at bit position at.
func (l *level) field(at, mask uint64) uint64 {
	return binary.LittleEndian.Uint64(l.data[at>>3:]) >> (at & 7) & mask
}

func (l *level) word(i uint32) uint32 {
	return uint32(l.field(uint64(i)*l.recordBits, l.wordMask))
}

func (l *level) logProb(i uint32) float32 {
	return l.prob.value(l.field(uint64(i)*l.recordBits+l.probAt, l.probMask))
}

func (l *level) backoff(i uint32) float32 {
	return l.back.value(l.field(uint64(i)*l.recordBits+l.backAt, l.backMask))
}

// children returns the range of record i's children in the next level, which
// holds limit records. A damaged range comes out empty or short, never wild.
func (l *level) children(i, limit uint32) (lo, hi uint32) {
	at := uint64(i)*l.recordBits + l.childAt
	lo = uint32(l.field(at, l.chMask))
	hi = min(uint32(l.field(at+l.recordBits, l.chMask)), limit)
	return min(lo, hi), hi
}

// notContext is the stored back-off of an n-gram that is no context: minus
// zero, so that adding it changes nothing.
var notContext = float32(math.Copysign(0, -1))

func isContext(backoff float32) bool {
	return math.Float32bits(backoff) != 1<<31
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

func (r *reader) codebook(width uint, limit float32, what string) codebook {
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
		if !(v <= limit && v >= -maxNats) {
			r.err = fmt.Errorf("%w: value %v in its %s", ErrFormat, v, what)
			return c
		}
		c.values[i] = v
	}
	return c
}
