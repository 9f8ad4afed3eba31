package candidates

import (
	"encoding/binary"
	"fmt"
)

// Confusables tells for each typed word which other words may have been meant.
// It is read in place and safe for concurrent use.
//
// The section is: magic, number of words and of blocks (4 bytes each,
// little-endian), where each block of 16 words begins in the body (4 bytes
// each), and the body. For each word the body holds the number of entries in a
// byte, and for each entry, in ascending order of ids, the difference to the id
// before (from 0) as a varint and the cost in a byte, in steps of 1/16 nat.
type Confusables struct {
	words  uint32
	starts []byte
	body   []byte
}

const (
	confusablesMagic  = "fcco0001"
	confusablesHeader = len(confusablesMagic) + 8
	blockWords        = 16
	costStep          = 1.0 / 16
)

// OpenConfusables reads a section in place; the bytes must not change
// afterwards. The entries are checked as they are read: none names a word the
// section does not count, whatever the bytes.
func OpenConfusables(section []byte) (*Confusables, error) {
	if len(section) < confusablesHeader || string(section[:len(confusablesMagic)]) != confusablesMagic {
		return nil, fmt.Errorf("%w: unknown beginning", ErrSection)
	}
	words := binary.LittleEndian.Uint32(section[len(confusablesMagic):])
	blocks := binary.LittleEndian.Uint32(section[len(confusablesMagic)+4:])
	rest := section[confusablesHeader:]
	if uint64(blocks) != (uint64(words)+blockWords-1)/blockWords || uint64(len(rest)) < 4*uint64(blocks) {
		return nil, fmt.Errorf("%w: %d blocks for %d words in %d bytes", ErrSection, blocks, words, len(section))
	}
	return &Confusables{words: words, starts: rest[:4*blocks], body: rest[4*blocks:]}, nil
}

// Words is the number of words of the lexicon the table was built from.
func (c *Confusables) Words() int { return int(c.words) }

// Neighbours iterates over the words that one typed word may have been meant as,
// in ascending order of ids, without allocation:
//
//	for n := table.Lookup(id); n.Next(); {
//		weigh(n.ID, n.Cost)
//	}
type Neighbours struct {
	ID   uint32
	Cost float32 // of the typed word if this one was meant, nats

	body  []byte
	left  int
	words uint32
}

// Lookup finds the neighbours of a typed word.
func (c *Confusables) Lookup(id uint32) Neighbours {
	if id >= c.words {
		return Neighbours{}
	}
	start := binary.LittleEndian.Uint32(c.starts[id/blockWords*4:])
	if uint64(start) > uint64(len(c.body)) {
		return Neighbours{}
	}
	n := Neighbours{body: c.body[start:], words: c.words}
	for range id % blockWords {
		n.begin()
		for n.Next() {
		}
	}
	n.begin()
	n.ID = 0
	return n
}

// begin reads the number of entries of the next word.
func (n *Neighbours) begin() {
	n.left, n.ID = 0, 0
	if len(n.body) > 0 {
		n.left = int(n.body[0])
		n.body = n.body[1:]
	}
}

// Next moves to the next neighbour; it is false behind the last.
func (n *Neighbours) Next() bool {
	if n.left == 0 {
		return false
	}
	delta, size := binary.Uvarint(n.body)
	if size <= 0 || size >= len(n.body) || delta >= uint64(n.words-n.ID) {
		n.left, n.body = 0, nil
		return false
	}
	n.ID += uint32(delta)
	n.Cost = float32(n.body[size]) * costStep
	n.body = n.body[size+1:]
	n.left--
	return true
}
