package lm

import (
	"encoding/binary"
	"errors"
	"fmt"
	"math"
)

// The section, all integers little-endian:
//
//	magic      4 bytes "fcng"
//	version    uint8
//	order      uint8, 1..MaxOrder
//	probBits   uint8, width of a log probability: 1..12 a code, 32 a float32
//	backBits   uint8, width of a back-off, likewise
//	shapes     for each order, shapeBytes long:
//	           count uint32      n-grams; of order 1 the vocabulary
//	           contexts uint32   those that are contexts of longer ones
//	           keyLow uint8, firstLow uint8, two zero bytes
//	           keyHigh uint64, firstHigh uint64   see monotone
//	codebooks  for each order: 2^probBits float32 log probabilities, then, but
//	           for the highest order, 2^backBits float32 back-offs; absent where
//	           the width is 32
//	levels     for each order:
//	           keys      monotone, not in order 1
//	           probs     packed codes
//	           context   flags: is the n-gram a context? not in the highest order
//	           backs     packed codes, one for each context; likewise
//	           first     monotone, index of the first child; likewise
//
// The parent of an n-gram is the n-gram without its leftmost word; n-grams are
// sorted by parent, then key. The key of a bigram is its first word. Of a longer
// one it is the place of its context among the siblings of that context (both
// lack the last word): the words that can stand there are few, so the number is
// small (Pibiri and Venturini 2017), and the state knows it already. The keys
// of a level make one increasing sequence: each parent's begin anew above the
// last one before.
const (
	magic      = "fcng"
	version    = 1
	shapeBytes = 28
	// MaxOrder is the longest n-gram a model may hold.
	MaxOrder = 6
	// exactBits is the width of a value stored as it is.
	exactBits = 32
	// maxCodeBits bounds a codebook to 4,096 values.
	maxCodeBits = 12
	// maxVocabulary bounds the number of word ids.
	maxVocabulary = 1 << 28
)

// ErrFormat is wrapped by every error of Open and Verify: the bytes are no
// model that this version reads.
var ErrFormat = errors.New("lm: not a usable n-gram section")

// codebook turns the packed codes of one order into values.
type codebook struct {
	values []float32 // a power of two of them; nil when values are stored as they are
}

func (c *codebook) value(code uint64) float32 {
	if c.values == nil {
		return math.Float32frombits(uint32(code))
	}
	return c.values[code&uint64(len(c.values)-1)]
}

// levelShape is what must be known to lay a level out.
type levelShape struct {
	order    int
	last     bool
	count    uint32
	contexts uint32
	keys     monotoneShape
	first    monotoneShape
}

func (s *levelShape) append(dst []byte) []byte {
	dst = binary.LittleEndian.AppendUint32(dst, s.count)
	dst = binary.LittleEndian.AppendUint32(dst, s.contexts)
	dst = append(dst, byte(s.keys.lowWidth), byte(s.first.lowWidth), 0, 0)
	dst = binary.LittleEndian.AppendUint64(dst, s.keys.highBits)
	return binary.LittleEndian.AppendUint64(dst, s.first.highBits)
}

func readShape(b []byte, order int, last bool) (levelShape, error) {
	s := levelShape{order: order, last: last, count: binary.LittleEndian.Uint32(b), contexts: binary.LittleEndian.Uint32(b[4:])}
	s.keys = monotoneShape{lowWidth: uint(b[8]), highBits: binary.LittleEndian.Uint64(b[12:])}
	s.first = monotoneShape{lowWidth: uint(b[9]), highBits: binary.LittleEndian.Uint64(b[20:])}
	if order > 1 {
		s.keys.n = uint64(s.count)
	}
	if !last {
		s.first.n = uint64(s.count) + 1
	}
	if s.count == math.MaxUint32 || s.contexts > s.count || !s.keys.sound() || !s.first.sound() || b[10]|b[11] != 0 ||
		order == 1 && (s.count == 0 || s.count > maxVocabulary) {
		return s, fmt.Errorf("%w: shape of its %d-grams", ErrFormat, order)
	}
	return s, nil
}

// sound reports whether positions fit their samples and widths a load.
func (s monotoneShape) sound() bool {
	if s.n == 0 {
		return s.lowWidth == 0 && s.highBits == 0
	}
	return s.lowWidth <= 40 && s.highBits >= s.n && s.highBits <= math.MaxUint32
}

// parts returns the lengths in bytes of keys, probs, context bits and counts,
// backs, first.
func (s *levelShape) parts(probBits, backBits uint) [6]uint64 {
	var p [6]uint64
	if s.order > 1 {
		p[0] = s.keys.bytes()
	}
	p[1] = packedBytes(uint64(s.count), probBits)
	if !s.last {
		p[2], p[3] = flagBytes(uint64(s.count))
		p[4] = packedBytes(uint64(s.contexts), backBits)
		p[5] = s.first.bytes()
	}
	return p
}

func (s *levelShape) bytes(probBits, backBits uint) uint64 {
	sum := uint64(0)
	for _, n := range s.parts(probBits, backBits) {
		sum += n
	}
	return sum
}

// level is one order's n-grams.
type level struct {
	shape      levelShape
	keys       monotone
	probs      packed
	context    flags
	backs      packed
	first      monotone
	prob, back codebook
}

// over lays the level out over data of shape.bytes bytes.
func (l *level) over(data []byte, probBits, backBits uint) {
	var part [6][]byte
	at := uint64(0)
	for i, n := range l.shape.parts(probBits, backBits) {
		part[i] = data[at : at+n : at+n]
		at += n
	}
	if l.shape.order > 1 {
		l.keys = l.shape.keys.over(part[0])
	}
	l.probs = newPacked(probBits, part[1])
	if !l.shape.last {
		l.context = flags{part[2], part[3]}
		l.backs = newPacked(backBits, part[4])
		l.first = l.shape.first.over(part[5])
	}
}

func (l *level) logProb(i uint32) float32 {
	return l.prob.value(l.probs.at(uint64(i)))
}

// backoff returns the weight of n-gram i as a context; ok is false if it is
// none.
func (l *level) backoff(i uint32) (weight float32, ok bool) {
	if !l.context.has(i) {
		return 0, false
	}
	at := l.context.rank(i)
	if at >= uint64(l.shape.contexts) {
		return 0, false
	}
	return l.back.value(l.backs.at(at)), true
}

// children returns the range of n-gram i's children in the next level, which
// holds limit n-grams. A damaged range comes out empty or short, never wild.
func (l *level) children(i, limit uint32) (lo, hi uint64) {
	lo, hi = l.first.pair(uint64(i))
	hi = min(hi, uint64(limit))
	return min(lo, hi), hi
}
