package train

import "context"

// trieBuilder turns keys in ascending order into the levels of Counts.
type trieBuilder struct {
	packer   packer
	options  Options
	levels   []countLevel
	previous []uint32 // fields of the key before
	fields   []uint32
}

func newTrieBuilder(p packer, vocabulary int, o Options) *trieBuilder {
	b := &trieBuilder{
		packer: p, options: o, levels: make([]countLevel, p.order),
		previous: make([]uint32, p.order), fields: make([]uint32, p.order),
	}
	b.levels[0].raw = make([]uint32, vocabulary)
	b.levels[0].adjusted = make([]uint32, vocabulary)
	return b
}

func (b *trieBuilder) build(ctx context.Context, s stream) error {
	for done := int64(0); ; done++ {
		c, ok, err := s.next()
		if err != nil {
			return err
		}
		if !ok {
			break
		}
		b.add(c)
		if done&(1<<20-1) == 0 {
			if err := ctx.Err(); err != nil {
				return err
			}
			b.options.Progress(Progress{Stage: "merge", Done: done})
		}
	}
	b.seal()
	return nil
}

// add counts one distinct key along its path, adding the nodes that the key
// before it did not share.
func (b *trieBuilder) add(c counted) {
	b.packer.unpack(c.key, b.fields)
	shared := 0
	for shared < len(b.fields) && b.fields[shared] == b.previous[shared] {
		shared++
	}
	node := int(b.fields[0]) - 1
	b.levels[0].raw[node] = addCounts(b.levels[0].raw[node], c.n)
	k := 1
	for ; k < len(b.fields) && b.fields[k] != 0; k++ {
		l := &b.levels[k]
		if k >= shared {
			b.open(k, node)
		}
		node = len(l.raw) - 1
		l.raw[node] = addCounts(l.raw[node], c.n)
	}
	if k < len(b.levels) { // the path ends at the edge of a sentence
		end := &b.levels[k-1]
		end.adjusted[node] = addCounts(end.adjusted[node], c.n)
	}
	b.fields, b.previous = b.previous, b.fields
}

// open appends a node to level k as a child of parent.
func (b *trieBuilder) open(k, parent int) {
	l, upper := &b.levels[k], &b.levels[k-1]
	for len(upper.first) <= parent {
		upper.first = append(upper.first, uint32(len(l.raw)))
	}
	l.word = append(l.word, b.fields[k]-1)
	l.raw = append(l.raw, 0)
	if k < len(b.levels)-1 {
		l.adjusted = append(l.adjusted, 0)
	}
	upper.adjusted[parent]++
}

// seal ends the child ranges. In the highest order all counts are plain.
func (b *trieBuilder) seal() {
	top := &b.levels[len(b.levels)-1]
	top.adjusted = top.raw
	for k := range len(b.levels) - 1 {
		l := &b.levels[k]
		for len(l.first) <= len(l.raw) {
			l.first = append(l.first, uint32(len(b.levels[k+1].raw)))
		}
	}
}
