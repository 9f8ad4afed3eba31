package text

import (
	"cmp"
	"io"
)

// recordsMaxBytes is the most bytes of a document of records that is read when
// the options do not say: its blocks are yielded as they are found, so that
// memory holds little more than the bytes.
const recordsMaxBytes = 64 << 20

// emitter yields the blocks of one document as they are found, in the order of
// the source, each with its place.
type emitter struct {
	source  []byte
	yield   func(*Block, error) bool
	lines   LineMap // stands at source[at]
	at      int
	stopped bool // the receiver wants no more
}

// readRecords reads a document as a whole and lets scan find its blocks. An
// error of scan comes after the blocks it found. Scan should look at e.stopped
// now and then.
func readRecords(r io.Reader, o Options, yield func(*Block, error) bool, scan func(e *emitter) error) {
	o.MaxBytes = cmp.Or(o.MaxBytes, recordsMaxBytes)
	source, err := readAll(r, o)
	if err != nil {
		yield(nil, err)
		return
	}
	e := &emitter{source: source, yield: yield, at: bomLen(source)}
	if err := scan(e); err != nil && !e.stopped {
		yield(nil, err)
	}
}

// emit yields a block that does not begin before the last one did.
func (e *emitter) emit(b *Block) {
	if e.stopped {
		return
	}
	e.lines.Feed(e.source[e.at:b.offset])
	e.at = int(b.offset)
	b.origin = e.lines.Position()
	e.stopped = !e.yield(b, nil)
}

// position returns the place of a byte of the source at or behind the last
// block.
func (e *emitter) position(at int) Position {
	lines := e.lines
	lines.Feed(e.source[e.at:at])
	return lines.Position()
}

// emitPlain yields what p has gathered as plain text is read, paragraph by
// paragraph, with escape for each.
func (e *emitter) emitPlain(p *prose, escape func(string) (string, bool)) {
	b := p.block()
	if b == nil {
		return
	}
	b.escape = escape
	for lines := range stretches(b.Text) {
		width := wrapWidth(b.Text, lines)
		b.cut(lines, e.emit, func(i int) bool { return joins(b.Text, lines[i], lines[i+1], width) })
		if e.stopped {
			return
		}
	}
}
