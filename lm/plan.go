package lm

import (
	"fmt"
	"iter"
	"math"
	"math/bits"
)

// plan is the layout of a section to be written.
type plan struct {
	tables    Tables
	contexts  [][]uint32 // by order, the context of each n-gram
	isContext [][]bool   // by order, whether the back-off of an n-gram matters
	shapes    []shape
}

func newPlan(t Tables, probBits, backBits uint64) (*plan, error) {
	if err := checkShape(t); err != nil {
		return nil, err
	}
	p := &plan{tables: t, contexts: make([][]uint32, len(t)), isContext: make([][]bool, len(t))}
	for k := 1; k < len(t); k++ {
		var err error
		if p.contexts[k], err = t.Contexts(k, p.contexts[k-1]); err != nil {
			return nil, err
		}
	}
	p.markContexts()
	for k := range t {
		s := shape{count: uint32(t.Len(k)), size: padding}
		for c := range p.blocks(k) {
			s.size += c.bytes(probBits, backBits)
		}
		if s.size > math.MaxUint32 {
			return nil, fmt.Errorf("lm: %d-grams take %d bytes, which is too much", k+1, s.size)
		}
		p.shapes = append(p.shapes, s)
	}
	return p, nil
}

// markContexts marks what is a context of a longer n-gram, and what has a
// back-off without being one: files of other origin hold such.
func (p *plan) markContexts() {
	for k := range len(p.tables) - 1 {
		is := make([]bool, p.tables.Len(k))
		for _, c := range p.contexts[k+1] {
			is[c] = true
		}
		for i, b := range p.tables[k].Backoff {
			is[i] = is[i] || b != 0
		}
		p.isContext[k] = is
	}
}

func checkShape(t Tables) error {
	if len(t) < 1 || len(t) > MaxOrder {
		return fmt.Errorf("lm: order %d, want 1 to %d", len(t), MaxOrder)
	}
	if n := t.Len(0); n == 0 || n > maxVocabulary {
		return fmt.Errorf("lm: vocabulary of %d words", n)
	}
	for k := range t {
		n := t.Len(k)
		if uint64(n) >= 1<<30 {
			return fmt.Errorf("lm: %d %d-grams are too many", n, k+1)
		}
		if k < len(t)-1 && (len(t[k].First) != n+1 || int(t[k].First[n]) != t.Len(k+1)) {
			return fmt.Errorf("lm: the children of the %d-grams are not the %d-grams", k+1, k+2)
		}
	}
	return nil
}

func checkValues(t Tables) error {
	for k := range t {
		n := t.Len(k)
		if len(t[k].LogProb) != n || k < len(t)-1 && len(t[k].Backoff) != n {
			return fmt.Errorf("lm: arrays of the %d-grams differ in length", k+1)
		}
	}
	return nil
}

// content is what a block is to hold, values aside. It is reused.
type content struct {
	start, n           int // n-grams of the level
	keys, ends         []uint64
	keyBase, firstBase uint64
	context            uint64
}

// bytes returns the size of the block.
func (c *content) bytes(probBits, backBits uint64) uint64 {
	n := uint64(c.n)
	size := bytesFor(n * probBits)
	if len(c.keys) > 0 {
		size += headerSize + headerFor(n, c.keys[n-1]).bytes(n)
	}
	if len(c.ends) > 0 {
		size += 8 + headerSize + headerFor(n, c.ends[n-1]).bytes(n)
		size += bytesFor(uint64(bits.OnesCount64(c.context)) * backBits)
	}
	return size
}

// blocks yields the blocks of level k in order.
func (p *plan) blocks(k int) iter.Seq[*content] {
	return func(yield func(*content) bool) {
		t, count := &p.tables[k], p.tables.Len(k)
		var next func(uint64) uint64
		if k > 0 {
			next = p.keys(k)
		}
		c := &content{}
		for ; c.start < count; c.start += c.n {
			c.n = min(blockLen, count-c.start)
			c.keys, c.ends, c.context = c.keys[:0], c.ends[:0], 0
			for i := c.start; i < c.start+c.n; i++ {
				if k > 0 {
					c.keys = append(c.keys, next(uint64(i))-c.keyBase)
				}
				if k < len(p.tables)-1 {
					c.ends = append(c.ends, uint64(t.First[i+1])-c.firstBase)
					if p.isContext[k][i] {
						c.context |= 1 << (i - c.start)
					}
				}
			}
			if !yield(c) {
				return
			}
			if k > 0 {
				c.keyBase += c.keys[c.n-1] + 1
			}
			if k < len(p.tables)-1 {
				c.firstBase += c.ends[c.n-1]
			}
		}
	}
}

// keys returns a function that gives the keys of level k, in order from zero,
// as one increasing sequence.
func (p *plan) keys(k int) func(i uint64) uint64 {
	first := p.tables[k-1].First
	parent, base, last := -1, uint64(0), uint64(0)
	next := uint64(0) // where the children of the next parent begin
	lowest := uint32(0)
	return func(i uint64) uint64 {
		for i == next { // skips parents without children
			parent++
			next = uint64(first[parent+1])
			if next == i {
				continue
			}
			if i > 0 {
				base = last + 1
			}
			lowest = p.lowest(k, parent)
			break
		}
		last = base + uint64(p.contexts[k][i]-lowest)
		return last
	}
}

// lowest returns the least context that a child of a parent of level k-1 can
// have: the first child of the parent's context.
func (p *plan) lowest(k, parent int) uint32 {
	if k == 1 {
		return 0
	}
	return p.tables[k-2].First[p.contexts[k-1][parent]]
}
