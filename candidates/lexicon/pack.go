package lexicon

import (
	"fmt"
	"slices"
)

// packer writes states as an automaton. It works from the end of the automaton
// to its start, so that the place of every target, counted from the end, is
// known before its sources are written; pieces are collected in that order.
type packer struct {
	states []state
	words  []uint32 // of each state: words from it on
	place  []int    // of each state: bytes from its first byte to the automaton's end
	nodes  []byte   // the nodes written, the last node of the automaton first
	sizes  []int    // and their sizes
	total  int
}

// pack encodes the states of a compiler.
func pack(states []state) (automaton, error) {
	p := &packer{states: states, words: make([]uint32, len(states)), place: make([]int, len(states))}
	for i, s := range states {
		p.words[i] = p.count(s)
	}
	for _, i := range p.order() {
		if err := p.write(i); err != nil {
			return nil, err
		}
	}
	out := make(automaton, p.total+sparePadding)
	from, to := 0, p.total
	for _, size := range p.sizes {
		copy(out[to-size:to], p.nodes[from:from+size])
		from += size
		to -= size
	}
	return out, nil
}

func (p *packer) count(s state) uint32 {
	var n uint32
	if s.final {
		n = 1
	}
	for _, e := range s.edges {
		n += p.words[e.target]
	}
	return n
}

// order lists the states in the order of writing: those reached by most edges
// first (with all below them), because near the end short numbers reach them;
// then the rest, so that a node's first subtree follows it.
func (p *packer) order() []int32 {
	sources := make([]int, len(p.states))
	for _, s := range p.states {
		for _, e := range s.edges {
			sources[e.target]++
		}
	}
	const popular = 3
	var roots []int32
	for i, n := range sources {
		if n >= popular {
			roots = append(roots, int32(i))
		}
	}
	slices.SortStableFunc(roots, func(a, b int32) int { return sources[b] - sources[a] })
	roots = append(roots, int32(len(p.states)-1))

	order := make([]int32, 0, len(p.states))
	done := make([]bool, len(p.states))
	var visit func(i int32)
	visit = func(i int32) { // depth at most MaxForm
		if done[i] {
			return
		}
		done[i] = true
		edges := p.states[i].edges
		for k := len(edges) - 1; k >= 0; k-- {
			visit(edges[k].target)
		}
		order = append(order, i)
	}
	for _, r := range roots {
		visit(r)
	}
	return order
}

// write puts state i before everything written so far.
func (p *packer) write(i int32) error {
	s := p.states[i]
	n := len(s.edges)
	skips := make([]uint32, 0, n)
	var before uint32
	if s.final {
		before = 1
	}
	for k, e := range s.edges {
		if k > 0 {
			skips = append(skips, before)
		}
		before += p.words[e.target]
	}
	targets := make([]uint32, 0, n)
	tlen := 0
	if n != 1 || p.place[s.edges[0].target] != p.total {
		for _, e := range s.edges {
			v := p.targetNumber(e.target)
			targets = append(targets, v)
			tlen = max(tlen, byteLen(v))
		}
	}
	slen := 0
	for _, v := range skips {
		slen = max(slen, byteLen(v))
	}
	if tlen > 3 || slen > 3 {
		return fmt.Errorf("lexicon: too many forms: %d (at most 16 million)", p.words[len(p.words)-1])
	}
	from := len(p.nodes)
	head := byte(min(n, 7)<<4 | tlen<<2 | slen)
	if s.final {
		head |= 0x80
	}
	p.nodes = append(p.nodes, head)
	if n >= 7 {
		p.nodes = append(p.nodes, byte(n))
	}
	for _, e := range s.edges {
		p.nodes = append(p.nodes, e.label)
	}
	p.nodes = appendNumbers(p.nodes, targets, tlen)
	p.nodes = appendNumbers(p.nodes, skips, slen)
	size := len(p.nodes) - from
	p.sizes = append(p.sizes, size)
	p.total += size
	p.place[i] = p.total
	return nil
}

// targetNumber is the smaller of the two numbers that lead to a state from the
// node about to be written.
func (p *packer) targetNumber(target int32) uint32 {
	back := uint32(p.place[target])
	forward := uint32(p.total - p.place[target])
	if back < forward {
		return back<<1 | 1
	}
	return forward << 1
}

func byteLen(v uint32) int {
	switch {
	case v < 1<<8:
		return 1
	case v < 1<<16:
		return 2
	case v < 1<<24:
		return 3
	}
	return 4
}

func appendNumbers(dst []byte, numbers []uint32, size int) []byte {
	for _, v := range numbers {
		for range size {
			dst = append(dst, byte(v))
			v >>= 8
		}
	}
	return dst
}
