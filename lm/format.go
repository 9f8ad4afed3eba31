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
//	shapes     for each order: count uint32, of its n-grams (of order 1 the
//	           vocabulary); size uint64, of its blocks in bytes
//	codebooks  for each order: 2^probBits float32 log probabilities, then, but
//	           for the highest order, 2^backBits float32 back-offs; absent where
//	           the width is 32
//	levels     for each order a directory, an entry a block, then the blocks
//
// A block holds blockLen n-grams, the last one of a level the rest: all that is
// stored of an n-gram is within some 200 bytes. A directory entry:
//
//	offset     uint32, of the block in the level's blocks
//	firstBase  uint32, index of the block's first child; 0 in the highest order
//	keyBase    uint64, one more than the last key of the block before
//
// A block:
//
//	context    uint64, a bit an n-gram: is it a context? not in the highest
//	           order
//	headers    of keys and ends, as far as they are there
//	keys       run, less keyBase; not in order 1
//	ends       run, index behind the last child, less firstBase; not in the
//	           highest order
//	probs      codes, to whole bytes
//	backs      codes, one for each context, to whole bytes
//
// The parent of an n-gram is the n-gram without its leftmost word; n-grams are
// sorted by parent, then key. The key of a bigram is its first word. Of a longer
// one it is the place of its context among the siblings of that context (both
// lack the last word): the words that can stand there are few, so the number is
// small (Pibiri and Venturini 2017), and the state knows it already. The keys
// of a level make one increasing sequence: each parent's begin anew above the
// last one before.
const (
	magic     = "fcng"
	version   = 1
	shapeSize = 12
	entrySize = 16
	blockLen  = 64
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
	width  uint64
	values []float32 // 2^width; nil when values are stored as they are
}

// value reads the code at a bit offset.
func (c *codebook) value(data []byte, bit uint64) float32 {
	code := loadBits(data, bit, c.width)
	if c.values == nil {
		return math.Float32frombits(uint32(code))
	}
	return c.values[code&uint64(len(c.values)-1)]
}

// shape is what must be known to lay a level out.
type shape struct {
	count uint32
	size  uint64 // of the blocks, padding included
}

func (s *shape) blocks() uint64 { return (uint64(s.count) + blockLen - 1) / blockLen }

func (s *shape) bytes() uint64 { return s.blocks()*entrySize + s.size }

func (s *shape) append(dst []byte) []byte {
	return binary.LittleEndian.AppendUint64(binary.LittleEndian.AppendUint32(dst, s.count), s.size)
}

func readShape(b []byte, order int) (shape, error) {
	s := shape{binary.LittleEndian.Uint32(b), binary.LittleEndian.Uint64(b[4:])}
	if s.size > math.MaxUint32 || order == 1 && (s.count == 0 || s.count > maxVocabulary) {
		return s, fmt.Errorf("%w: shape of its %d-grams", ErrFormat, order)
	}
	return s, nil
}

// level is one order's n-grams.
type level struct {
	shape
	order      int
	last       bool
	headers    uint64 // bytes of a block's run headers
	directory  []byte
	data       []byte
	prob, back codebook
}

// over lays the level out over data of shape.bytes bytes.
func (l *level) over(data []byte) {
	n := l.blocks() * entrySize
	l.directory, l.data = data[:n:n], data[n:]
}

func (l *level) offset(b uint64) uint64 {
	return uint64(binary.LittleEndian.Uint32(l.directory[b*entrySize:]))
}

func (l *level) firstBase(b uint64) uint64 {
	return uint64(binary.LittleEndian.Uint32(l.directory[b*entrySize+4:]))
}

func (l *level) keyBase(b uint64) uint64 {
	return binary.LittleEndian.Uint64(l.directory[b*entrySize+8:])
}

// block is a view of one block.
type block struct {
	keys, ends   run
	context      uint64
	probs, backs uint64 // bit offsets
}

// layOut makes v a view of block b, which must be below blocks().
func (l *level) layOut(v *block, b uint64) {
	n := min(blockLen, uint64(l.count)-b*blockLen)
	at := l.offset(b)
	if !l.last {
		v.context = load(l.data, at)
		at += 8
	}
	head := load(l.data, at)
	at += l.headers
	if l.order > 1 {
		v.keys = readHeader(head).at(at)
		at += v.keys.bytes(n)
		head >>= 8 * headerSize
	}
	if !l.last {
		v.ends = readHeader(head).at(at)
		at += v.ends.bytes(n)
	}
	v.probs = at * 8
	v.backs = (at + bytesFor(n*l.prob.width)) * 8
}

// headerBytes returns how long the headers of a block are.
func headerBytes(order int, last bool) uint64 {
	n := uint64(0)
	if order > 1 {
		n += headerSize
	}
	if !last {
		n += headerSize
	}
	return n
}
