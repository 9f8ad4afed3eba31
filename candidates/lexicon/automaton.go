package lexicon

import (
	"encoding/binary"
	"math/bits"
)

// automaton is a minimal acyclic automaton over bytes, numbered by counting
// paths (Lucchesi & Kowaltowski 1993), packed so that it is used in place.
//
// A node is
//
//	header   1 byte: final<<7 | n<<4 | t<<2 | s; n = 7 means: the next byte is n
//	labels   n bytes, ascending
//	targets  n numbers of t bytes; t = 0 means: the one target follows this node
//	skips    n-1 numbers of s bytes: the words of the node that sort before those
//	         of edge 1, 2 ...; edge 0 has the node's own word (if final) before it
//
// all numbers little-endian. A target is distance<<1 | back: with back = 0 the
// distance runs forward from the end of this node, with back = 1 backward from
// the end of the automaton, where the suffixes shared by many words lie. Every
// target lies behind its node, so no walk can loop, whatever the bytes are; a
// node that breaks a rule reads as one without edges.
//
// The root stands at 0. Eight spare bytes end the automaton, so that any number
// and any eight labels can be read at once.
type automaton []byte

const sparePadding = 8

// node is a node's header taken apart; offsets count from the automaton's start.
type node struct {
	labels, targets, skips uint32 // offsets
	end                    uint32 // offset behind the node
	n                      uint32 // edges
	tlen, slen             uint8  // bytes of a target, of a skip
	own                    uint8  // 1 if a word ends here
}

// at reads the node at pos; one that breaks a rule has no edges.
func (a automaton) at(pos uint32) (nd node) {
	if uint64(pos)+1+sparePadding > uint64(len(a)) {
		return node{}
	}
	h := a[pos]
	nd.own = h >> 7
	nd.n = uint32(h >> 4 & 7)
	nd.labels = pos + 1
	if nd.n == 7 {
		nd.n = uint32(a[nd.labels])
		nd.labels++
	}
	nd.tlen, nd.slen = h>>2&3, h&3
	nd.targets = nd.labels + nd.n
	nd.skips = nd.targets + nd.n*uint32(nd.tlen)
	nd.end = nd.skips + (max(nd.n, 1)-1)*uint32(nd.slen)
	if uint64(nd.end)+sparePadding > uint64(len(a)) || nd.tlen == 0 && nd.n > 1 {
		nd.n = 0
	}
	return nd
}

// target gives the node that edge i of nd leads to; ok is false when it does
// not lie behind nd.
func (a automaton) target(nd *node, i uint32) (pos uint32, ok bool) {
	if nd.tlen == 0 {
		return nd.end, true
	}
	v := a.number(nd.targets+i*uint32(nd.tlen), nd.tlen)
	pos = nd.end + v>>1
	if v&1 != 0 {
		pos = uint32(len(a)-sparePadding) - v>>1
	}
	return pos, pos >= nd.end && pos < uint32(len(a))
}

// skip gives the number of the node's words that sort before those of edge i.
func (a automaton) skip(nd *node, i uint32) uint32 {
	if i == 0 {
		return uint32(nd.own)
	}
	return a.number(nd.skips+(i-1)*uint32(nd.slen), nd.slen)
}

// number reads size bytes, 0 to 3, at pos; three bytes behind must exist.
func (a automaton) number(pos uint32, size uint8) uint32 {
	return binary.LittleEndian.Uint32(a[pos:]) & (1<<(8*size) - 1)
}

// edge finds the edge of nd with the label. It compares eight labels at a time:
// the lowest zero byte of labels xor label is where the subtraction borrows first.
func (a automaton) edge(nd *node, label byte) (i uint32, ok bool) {
	const ones = 0x0101010101010101
	for ; i < nd.n; i += 8 {
		x := binary.LittleEndian.Uint64(a[nd.labels+i:]) ^ ones*uint64(label)
		if zero := (x - ones) & ^x & (ones << 7); zero != 0 {
			i += uint32(bits.TrailingZeros64(zero)) / 8
			return i, i < nd.n
		}
	}
	return 0, false
}

// edgeOf finds the edge of nd, which has edges, below which the node's word
// number id lies: the last whose skip is not above id.
func (a automaton) edgeOf(nd *node, id uint32) uint32 {
	i := nd.n - 1
	for i > 0 && a.skip(nd, i) > id {
		i--
	}
	return i
}

// step follows the edge with the label from the node at pos.
func (a automaton) step(pos uint32, label byte) (target, skip uint32, ok bool) {
	nd := a.at(pos)
	i, ok := a.edge(&nd, label)
	if !ok {
		return 0, 0, false
	}
	target, ok = a.target(&nd, i)
	return target, a.skip(&nd, i), ok
}

// final reports whether a word ends at pos.
func (a automaton) final(pos uint32) bool {
	return uint64(pos) < uint64(len(a)) && a[pos]>>7 != 0
}
