package lm

import "fmt"

// plan is the layout of a section to be written.
type plan struct {
	tables    Tables
	contexts  [][]uint32 // by order, the context of each n-gram
	isContext [][]bool   // by order, whether an n-gram is one
	shapes    []levelShape
}

func newPlan(t Tables) (*plan, error) {
	if err := checkShape(t); err != nil {
		return nil, err
	}
	p := &plan{tables: t, contexts: make([][]uint32, len(t)), isContext: make([][]bool, len(t))}
	for k := 1; k < len(t); k++ {
		var err error
		if p.contexts[k], err = t.Contexts(k, p.contexts[k-1]); err != nil {
			return nil, err
		}
		p.isContext[k-1] = make([]bool, t.Len(k-1))
		for _, c := range p.contexts[k] {
			p.isContext[k-1][c] = true
		}
	}
	for k := range t {
		p.shapes = append(p.shapes, p.shape(k))
	}
	return p, nil
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
		last := k == len(t)-1
		if len(t[k].LogProb) != n || !last && (len(t[k].Backoff) != n || len(t[k].First) != n+1 || int(t[k].First[n]) != t.Len(k+1)) {
			return fmt.Errorf("lm: arrays of the %d-grams differ in length", k+1)
		}
	}
	return nil
}

func (p *plan) shape(k int) levelShape {
	n := p.tables.Len(k)
	s := levelShape{order: k + 1, last: k == len(p.tables)-1, count: uint32(n)}
	if k > 0 && n > 0 {
		greatest, next := uint64(0), p.keys(k)
		for i := range uint64(n) {
			greatest = next(i)
		}
		s.keys = shapeFor(uint64(n), greatest)
	}
	if s.last {
		return s
	}
	s.first = shapeFor(uint64(n)+1, uint64(p.tables.Len(k+1)))
	for _, is := range p.isContext[k] {
		if is {
			s.contexts++
		}
	}
	return s
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
