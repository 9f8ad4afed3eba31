package text

import (
	"bytes"
	"errors"
	"io"
)

const (
	defaultChunk = 64 << 10 // bytes
	leastChunk   = 4 << 10  // bytes
)

var byteOrderMark = []byte("\uFEFF")

// plainReader cuts a stream of plain text into blocks. It holds one window of
// at most a chunk; the blocks alias it, so each window has memory of its own.
//
// A blank line ends a block; whether another line end does is said at [joins].
// A block that outgrows the chunk is cut between sentences or, inside a sentence
// as long as that, at white space. A chunk without any white space is no prose
// and is passed over.
type plainReader struct {
	r      io.Reader
	window []byte
	offset int64 // of window[0] in the source
	eof    bool
	err    error // of the source
	yield  func(*Block, error) bool

	lines LineMap // stands at window[fed]
	fed   int
	table []textLine // of the window
	seg   Segmenter  // finds where to cut
}

func readPlain(r io.Reader, o Options, yield func(*Block, error) bool) {
	chunk := o.Chunk
	if chunk == 0 {
		chunk = defaultChunk
	}
	p := plainReader{r: r, yield: yield, window: make([]byte, 0, max(chunk, leastChunk))}
	p.fill()
	if bytes.HasPrefix(p.window, byteOrderMark) {
		p.offset = int64(len(byteOrderMark)) // it takes no column
		p.window = p.window[len(byteOrderMark):]
	}
	for len(p.window) > 0 {
		used, more := p.blocks()
		if !more {
			return
		}
		p.advance(used)
		p.fill()
	}
	if p.err != nil {
		yield(nil, p.err)
	}
}

// fill reads until the window is full or the source ends. A source that fails
// ends there: what was read of it is read out first, then comes the error.
func (p *plainReader) fill() {
	if p.eof {
		return
	}
	n, err := io.ReadFull(p.r, p.window[len(p.window):cap(p.window)])
	p.window = p.window[:len(p.window)+n]
	p.eof = err != nil
	if !errors.Is(err, io.EOF) && !errors.Is(err, io.ErrUnexpectedEOF) {
		p.err = err
	}
}

// advance drops n bytes from the front; the rest moves to a new window.
func (p *plainReader) advance(n int) {
	p.feed(n)
	p.fed = 0
	p.offset += int64(n)
	if p.eof {
		p.window = p.window[n:]
		return
	}
	next := make([]byte, len(p.window)-n, cap(p.window))
	copy(next, p.window[n:])
	p.window = next
}

// feed moves the line map on to window[n].
func (p *plainReader) feed(n int) {
	p.lines.Feed(p.window[p.fed:n])
	p.fed = n
}

// blocks yields the blocks that are whole in the window or, when none is, the
// beginning of one. It returns how many bytes are done with, at least one, and
// whether the receiver wants more.
func (p *plainReader) blocks() (used int, more bool) {
	p.table = splitLines(p.table[:0], p.window)
	for rest := p.table; len(rest) > 0; {
		n := 0
		for n < len(rest) && !rest[n].blank() {
			n++
		}
		closed := p.eof || n < len(rest)
		done, more := p.paragraphs(rest[:n], closed)
		if !more {
			return 0, false
		}
		if done > 0 {
			used = rest[done-1].next
		}
		if !closed {
			break
		}
		for n < len(rest) && rest[n].blank() {
			used = rest[n].next
			n++
		}
		rest = rest[n:]
	}
	if used > 0 {
		return used, true
	}
	cut, prose := p.cut()
	if !prose {
		return cut, true
	}
	return cut, p.emit(trimSpace(p.window, 0, cut))
}

// paragraphs yields the blocks among lines without a blank one. Unless closed,
// more lines follow outside the window, and the block at the end is kept back.
// It returns how many lines are done with and whether the receiver wants more.
func (p *plainReader) paragraphs(lines []textLine, closed bool) (done int, more bool) {
	width := wrapWidth(p.window, lines)
	for i, l := range lines {
		left := len(lines) - i - 1 // lines after this one
		if !closed && (left == 0 || left == 1 && width > 0) {
			break // the window may cut the last line: it is not judged yet
		}
		if left > 0 && joins(p.window, l, lines[i+1], width) {
			continue
		}
		if !p.emit(lines[done].start, l.end) {
			return done, false
		}
		done = i + 1
	}
	return done, true
}

// emit yields window[start:end] as a block and returns what yield did.
func (p *plainReader) emit(start, end int) bool {
	if start == end {
		return true
	}
	p.feed(start)
	text := p.window[start:end:end]
	return p.yield(&Block{
		Text:   text,
		source: text,
		offset: p.offset + int64(start),
		origin: p.lines.Position(),
	}, nil)
}

// cut says where to end a block that fills the window: before the last sentence
// that begins in it, else at the last white space. Without white space it is not
// prose, and the whole window goes.
func (p *plainReader) cut() (n int, prose bool) {
	start, end := trimSpace(p.window, 0, len(p.window))
	space := bytes.LastIndexAny(p.window[start:end], " \t\n\r\f\v")
	if space < 0 {
		return len(p.window), false
	}
	space += start
	last := 0
	for s := range p.seg.Sentences(p.window[:space]) {
		last = s.Start
	}
	if last > start {
		return last, true
	}
	return space, true
}
