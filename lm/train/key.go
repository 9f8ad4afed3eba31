package train

import "math/bits"

// maxVocabulary bounds word ids, so that six of them, each with room for the
// mark of a sentence's edge, fit a key.
const maxVocabulary = 1 << 20

// key is an n-gram packed for sorting from its last word to its first: the
// last word is in the highest bits. A field holds id+1; zero fields say that
// the sentence began.
type key struct{ hi, lo uint64 }

func (k key) less(o key) bool {
	return k.hi < o.hi || k.hi == o.hi && k.lo < o.lo
}

// packer knows the width of a field and how many there are.
type packer struct {
	order int
	width uint
}

func newPacker(order, vocabulary int) packer {
	return packer{order, uint(bits.Len(uint(vocabulary)))}
}

// bits returns how many low bits of a key are in use.
func (p packer) bits() uint { return uint(p.order) * p.width }

// pack makes the key of the n-gram that ends with the last of words; at most
// order of them are taken.
func (p packer) pack(words []uint32) key {
	var k key
	for i := range p.order {
		field := uint64(0)
		if i < len(words) {
			field = uint64(words[len(words)-1-i]) + 1
		}
		k.hi = k.hi<<p.width | k.lo>>(64-p.width)
		k.lo = k.lo<<p.width | field
	}
	return k
}

// unpack writes the fields of k, last word first.
func (p packer) unpack(k key, fields []uint32) {
	mask := uint64(1)<<p.width - 1
	for i := p.order - 1; i >= 0; i-- {
		fields[i] = uint32(k.lo & mask)
		k.lo = k.lo>>p.width | k.hi<<(64-p.width)
		k.hi >>= p.width
	}
}
