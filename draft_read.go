package foulcase

import (
	"bytes"
	"slices"

	"example.org/foulcase/internal/text"
)

// How far around an edit the document is read anew, in bytes.
const (
	farthestBlank   = 8 << 10   // to look for a blank line beyond the blocks next to it
	largestVicinity = 256 << 10 // in all
)

// vicinity is a stretch of whole lines around edits that is read anew by itself.
// Reading it alone gave the same blocks as reading the whole did, and the edits
// leave its first and its last block alone, so what stands outside is taken to
// read as before.
type vicinity struct {
	open        bool
	start, tail int // bytes before it and behind it; no edit changes them
	first, last int // its blocks are [first, last) of the draft's
	line        int // lines before it
	size, lines int // bytes and line ends in it before the edits
}

// widen makes the vicinity hold an edit of source[start:end], which is not made
// yet. It reports false when only reading the whole will do.
func (d *Draft) widen(start, end int) bool {
	if d.near.open {
		return d.near.start <= start && end <= len(d.source)-d.near.tail
	}
	n := d.around(start, end)
	from, to := n.start, len(d.source)-n.tail
	reaches := func(b *draftBlock) bool { return endOf(b.Block) > from }
	if d.fault != nil || to-from > largestVicinity || from > start || to < end || slices.ContainsFunc(d.blocks[:n.first], reaches) {
		return false
	}
	alone, err := d.blocksOf(d.source[from:to])
	if err != nil || !slices.EqualFunc(alone, d.blocks[n.first:n.last], func(a *text.Block, b *draftBlock) bool {
		return a.Same(b.Block) && from+startOf(a) == startOf(b.Block)
	}) {
		return false
	}
	n.line = lineEnds(d.source[:from])
	n.size, n.lines = to-from, lineEnds(d.source[from:to])
	d.near = n
	return true
}

// around is the stretch of whole lines, from a blank one to a blank one if any
// are near, that holds source[start:end] and a block to each side of what stands
// in its lines and the ones next to them, which may join.
func (d *Draft) around(start, end int) vicinity {
	start, end = d.lineStart(max(0, d.lineStart(start)-1)), d.lineEnd(d.lineEnd(end))
	first, _ := slices.BinarySearchFunc(d.blocks, start, func(b *draftBlock, at int) int { return endOf(b.Block) - at })
	first = max(0, first-1)
	last := first
	for last < len(d.blocks) && startOf(d.blocks[last].Block) <= end {
		last++
	}
	last = min(last+1, len(d.blocks))
	from, to := 0, len(d.source)
	if first > 0 {
		from = d.lineBefore(startOf(d.blocks[first].Block))
	}
	if last < len(d.blocks) {
		to = d.lineAfter(endOf(d.blocks[last-1].Block))
	}
	for first > 0 && endOf(d.blocks[first-1].Block) > from {
		first--
	}
	for last < len(d.blocks) && startOf(d.blocks[last].Block) < to {
		last++
	}
	return vicinity{open: true, start: from, tail: len(d.source) - to, first: first, last: last}
}

// lineBefore returns where the text at begins after a blank line, if one is near
// before it, else where its line begins.
func (d *Draft) lineBefore(at int) int {
	line := d.lineStart(at)
	for from := line; from > 0 && at-from < farthestBlank; {
		before := d.lineStart(from - 1)
		if len(bytes.TrimSpace(d.source[before:from])) == 0 {
			return from
		}
		from = before
		if from == 0 {
			return 0
		}
	}
	return line
}

// lineAfter returns where the next blank line after at ends, if one is near, else where
// the line of at ends.
func (d *Draft) lineAfter(at int) int {
	end := d.lineEnd(at)
	for to := end; to < len(d.source) && to-at < farthestBlank; {
		next := d.lineEnd(to)
		if len(bytes.TrimSpace(d.source[to:next])) == 0 {
			return next
		}
		if to = next; to == len(d.source) {
			return to
		}
	}
	return end
}

// lineStart returns where the line that holds the byte at begins.
func (d *Draft) lineStart(at int) int { return 1 + bytes.LastIndexByte(d.source[:at], '\n') }

// lineEnd returns where the line that holds the byte at ends, its line end included.
func (d *Draft) lineEnd(at int) int {
	if i := bytes.IndexByte(d.source[at:], '\n'); i >= 0 {
		return at + i + 1
	}
	return len(d.source)
}

// read brings the blocks up to the source.
func (d *Draft) read() {
	if !d.unread && d.near.open && d.readVicinity() {
		d.near = vicinity{}
		return
	}
	if d.unread || d.near.open {
		blocks, err := d.blocksOf(d.source)
		d.fault, d.named = err, nil
		if len(blocks) > 0 {
			d.named = blocks[0].Names
		}
		d.replace(0, len(d.blocks), blocks)
		d.unread, d.near = false, vicinity{}
	}
}

// readVicinity reads the vicinity alone. It reports false when the edits reach its
// edges after all, and changes nothing then.
func (d *Draft) readVicinity() bool {
	n := d.near
	inside := d.source[n.start : len(d.source)-n.tail]
	fresh, err := d.blocksOf(inside)
	if err != nil {
		return false
	}
	old := d.blocks[n.first:n.last]
	if n.start > 0 && (len(fresh) == 0 || len(old) == 0 || !fresh[0].Same(old[0].Block)) {
		return false
	}
	if n.tail > 0 && (len(fresh) < 2 || len(old) < 2 || !fresh[len(fresh)-1].Same(old[len(old)-1].Block)) {
		return false
	}
	for _, b := range fresh {
		b.Move(int64(n.start), n.line)
	}
	grown, lines := int64(len(inside)-n.size), lineEnds(inside)-n.lines
	for _, b := range d.blocks[n.last:] {
		b.Move(grown, lines)
	}
	d.replace(n.first, n.last, fresh)
	return true
}

// blocksOf reads a source, or a stretch of one.
func (d *Draft) blocksOf(source []byte) ([]*text.Block, error) {
	var blocks []*text.Block
	for b, err := range text.Blocks(bytes.NewReader(source), d.format, d.asked.reading()) {
		if err != nil {
			return blocks, err
		}
		blocks = append(blocks, b)
	}
	return blocks, nil
}

func startOf(b *text.Block) int {
	from, _ := b.Source(0, 0)
	return int(from)
}

func endOf(b *text.Block) int {
	_, to := b.Source(0, len(b.Text))
	return int(to)
}

// lineEnds counts the line ends of whole lines.
func lineEnds(lines []byte) int {
	if bytes.IndexByte(lines, '\r') < 0 {
		return bytes.Count(lines, []byte{'\n'})
	}
	var m text.LineMap
	m.Feed(lines)
	return m.Position().Line - 1
}
