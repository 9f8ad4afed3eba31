package lexicon

import (
	"bytes"
	"encoding/binary"
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
// The root stands at 0. Three spare bytes end the automaton, so that any number
// of it can be read as four bytes.
type automaton []byte

const sparePadding = 3

// node is a node's header taken apart; offsets count from the automaton's start.
type node struct {
	final         bool
	n             int // edges
	labels        int // offset of the labels
	targets, tlen int // offset of the targets, bytes of each
	skips, slen   int // offset of the skips, bytes of each
	end           int // offset behind the node
}

// at reads the node at pos; a node that does not fit gives one without edges.
func (a automaton) at(pos uint32) (nd node) {
	if uint64(pos)+1+sparePadding > uint64(len(a)) {
		return node{end: len(a)}
	}
	h := a[pos]
	nd.final = h&0x80 != 0
	nd.n = int(h >> 4 & 7)
	nd.labels = int(pos) + 1
	if nd.n == 7 {
		nd.n = int(a[nd.labels])
		nd.labels++
	}
	nd.tlen, nd.slen = int(h>>2&3), int(h&3)
	nd.targets = nd.labels + nd.n
	nd.skips = nd.targets + nd.n*nd.tlen
	nd.end = nd.skips + max(nd.n-1, 0)*nd.slen
	if nd.end+sparePadding > len(a) || nd.tlen == 0 && nd.n > 1 {
		nd.n = 0
	}
	return nd
}

// target gives the node that edge i of nd leads to; ok is false when it does
// not lie behind nd.
func (a automaton) target(nd *node, i int) (pos uint32, ok bool) {
	if nd.tlen == 0 {
		return uint32(nd.end), true
	}
	v := a.number(nd.targets+i*nd.tlen, nd.tlen)
	pos = uint32(nd.end) + v>>1
	if v&1 != 0 {
		pos = uint32(len(a)-sparePadding) - v>>1
	}
	return pos, pos >= uint32(nd.end) && pos < uint32(len(a))
}

// skip gives the number of the node's words that sort before those of edge i.
func (a automaton) skip(nd *node, i int) uint32 {
	if i == 0 {
		if nd.final {
			return 1
		}
		return 0
	}
	return a.number(nd.skips+(i-1)*nd.slen, nd.slen)
}

// number reads size bytes, 0 to 3, at pos; three bytes behind must exist.
func (a automaton) number(pos, size int) uint32 {
	return binary.LittleEndian.Uint32(a[pos:]) & (1<<(8*size) - 1)
}

// edge finds the edge of nd with the label, -1 if there is none.
func (a automaton) edge(nd *node, label byte) int {
	labels := a[nd.labels : nd.labels+nd.n]
	if len(labels) > 12 {
		return bytes.IndexByte(labels, label)
	}
	for i, l := range labels {
		if l == label {
			return i
		}
	}
	return -1
}

// edgeOf finds the edge of nd, which has edges, below which the node's word
// number id lies: the last whose skip is not above id.
func (a automaton) edgeOf(nd *node, id uint32) int {
	i := nd.n - 1
	for i > 0 && a.skip(nd, i) > id {
		i--
	}
	return i
}

// final reports whether a word ends at pos.
func (a automaton) final(pos uint32) bool {
	return uint64(pos) < uint64(len(a)) && a[pos]&0x80 != 0
}
