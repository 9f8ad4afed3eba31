package channel

import (
	"encoding/binary"
	"errors"
	"fmt"
	"hash/fnv"
	"slices"
	"sort"

	"example.org/foulcase/internal/text"
)

// ErrFitted is wrapped by every error of OpenFitted.
var ErrFitted = errors.New("channel: not a section of fitted pairs of this version")

// The section is: magic, number of hashes (4 bytes, little-endian), then the
// hashes, 4 bytes each, ascending without repeats.
const (
	fittedMagic  = "fcfp0001"
	fittedHeader = len(fittedMagic) + 4
)

// Fitted is the set of pairs that a model was fitted on, kept as hashes, so
// that a measurement can tell whether it would measure on them. It is safe for
// concurrent use.
type Fitted struct {
	hashes []byte
}

// FittedSection writes the pairs as a section: what Fit takes after Clean.
func FittedSection(pairs []Pair) []byte {
	hashes := make([]uint32, len(pairs))
	for i, p := range pairs {
		hashes[i] = hashPair(p.Observed, p.Intended)
	}
	return fittedSection(hashes)
}

// With writes the section of these pairs and more.
func (f *Fitted) With(pairs []Pair) []byte {
	more := &Fitted{FittedSection(pairs)[fittedHeader:]}
	var hashes []uint32
	for _, set := range []*Fitted{f, more} {
		for i := range set.Len() {
			hashes = append(hashes, set.at(i))
		}
	}
	return fittedSection(hashes)
}

func fittedSection(hashes []uint32) []byte {
	slices.Sort(hashes)
	hashes = slices.Compact(hashes)
	b := append(make([]byte, 0, fittedHeader+4*len(hashes)), fittedMagic...)
	b = binary.LittleEndian.AppendUint32(b, uint32(len(hashes)))
	for _, h := range hashes {
		b = binary.LittleEndian.AppendUint32(b, h)
	}
	return b
}

// OpenFitted reads a section in place; the bytes must not change afterwards.
func OpenFitted(section []byte) (*Fitted, error) {
	if len(section) < fittedHeader || string(section[:len(fittedMagic)]) != fittedMagic {
		return nil, fmt.Errorf("%w: unknown beginning", ErrFitted)
	}
	f := &Fitted{section[fittedHeader:]}
	if n := binary.LittleEndian.Uint32(section[len(fittedMagic):]); uint64(len(f.hashes)) != 4*uint64(n) {
		return nil, fmt.Errorf("%w: %d bytes for %d hashes", ErrFitted, len(f.hashes), n)
	}
	for i := 1; i < f.Len(); i++ {
		if f.at(i-1) >= f.at(i) {
			return nil, fmt.Errorf("%w: hash %d is out of order", ErrFitted, i)
		}
	}
	return f, nil
}

// Len is the number of pairs.
func (f *Fitted) Len() int { return len(f.hashes) / 4 }

func (f *Fitted) at(i int) uint32 { return binary.LittleEndian.Uint32(f.hashes[4*i:]) }

// Has reports whether the pair was fitted on, its case and kinds of apostrophe
// aside. It never misses one; of pairs not fitted on, it takes Len in 2^32 for
// fitted, three in a million for 13,000 pairs.
func (f *Fitted) Has(observed, intended string) bool {
	h := hashPair(observed, intended)
	i := sort.Search(f.Len(), func(i int) bool { return f.at(i) >= h })
	return i < f.Len() && f.at(i) == h
}

// hashPair is the 64-bit FNV-1a hash (Fowler, Noll & Vo) of the normal forms
// with a zero byte between, its halves folded by exclusive or.
func hashPair(observed, intended string) uint32 {
	key := append(text.Fold(nil, []byte(observed)), 0)
	h := fnv.New64a()
	h.Write(text.Fold(key, []byte(intended)))
	sum := h.Sum64()
	return uint32(sum>>32) ^ uint32(sum)
}
