package lexicon

import (
	"encoding/binary"
	"fmt"
	"slices"
)

// compiler builds a minimal automaton in one pass over sorted words (Daciuk,
// Mihov, Watson & Watson 2000): the states of the last word stay open; those
// that the next word leaves are closed, and replaced by an equal closed state
// where there is one.
type compiler struct {
	closed   []state          // states by number; a state's targets come before it
	register map[string]int32 // state, written out, to its number
	open     []state          // the path of the last word, root first
	last     []byte
	words    int
	key      []byte // scratch
}

type state struct {
	final bool
	edges []stateEdge
}

type stateEdge struct {
	label  byte
	target int32 // a closed state; not yet set on the last edge of an open one
}

func newCompiler() *compiler {
	return &compiler{register: map[string]int32{}, open: make([]state, 1)}
}

// add enters a word; words must come in ascending byte order, each once.
func (c *compiler) add(word []byte) error {
	if len(word) == 0 || len(word) > MaxForm {
		return fmt.Errorf("lexicon: form %q has %d bytes; 1 to %d are allowed", word, len(word), MaxForm)
	}
	common := commonPrefix(c.last, word)
	if c.words > 0 && (common == len(word) || common < len(c.last) && c.last[common] > word[common]) {
		return fmt.Errorf("lexicon: form %q after %q: forms must ascend", word, c.last)
	}
	c.closeDown(common)
	for _, b := range word[common:] {
		top := &c.open[len(c.open)-1]
		top.edges = append(top.edges, stateEdge{label: b, target: -1})
		c.open = append(c.open, state{})
	}
	c.open[len(c.open)-1].final = true
	c.last = append(c.last[:0], word...)
	c.words++
	return nil
}

// closeDown closes the open states below the given depth, deepest first.
func (c *compiler) closeDown(depth int) {
	for len(c.open)-1 > depth {
		n := len(c.open) - 1
		number := c.close(c.open[n])
		c.open = c.open[:n]
		parent := &c.open[n-1]
		parent.edges[len(parent.edges)-1].target = number
	}
}

// close gives the number of the closed state equal to s, entering s if it is new.
func (c *compiler) close(s state) int32 {
	k := c.key[:0]
	if s.final {
		k = append(k, 1)
	}
	for _, e := range s.edges {
		k = append(k, e.label)
		k = binary.LittleEndian.AppendUint32(k, uint32(e.target))
	}
	c.key = k
	if number, ok := c.register[string(k)]; ok {
		return number
	}
	number := int32(len(c.closed))
	c.closed = append(c.closed, state{s.final, slices.Clone(s.edges)})
	c.register[string(k)] = number
	return number
}

// finish closes all and gives the states, targets before their sources, the
// root last.
func (c *compiler) finish() []state {
	c.closeDown(0)
	c.closed = append(c.closed, c.open[0])
	return c.closed
}

func commonPrefix(a, b []byte) int {
	n := min(len(a), len(b))
	for i := range n {
		if a[i] != b[i] {
			return i
		}
	}
	return n
}
