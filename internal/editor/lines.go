package editor

import (
	"bytes"
	"slices"
	"unicode/utf8"
)

// position is a place in a document as the protocol names it: line and column from
// 0, the column in units of the client's encoding.
type position struct {
	Line      int `json:"line"`
	Character int `json:"character"`
}

type span struct {
	Start position `json:"start"`
	End   position `json:"end"`
}

// chunkSize is about how many bytes of text a chunk has: few enough to be read
// through for one position, enough that the chunks of a long document are few.
const chunkSize = 2 << 10

// lines knows where the lines of a text are, in chunks of it: an edit reads only the
// chunks it touches, and a place is found by adding up those before it. The text is
// valid UTF-8, and its lines end with \n, \r\n or \r.
type lines struct {
	unit   encoding
	chunks []chunk
}

// chunk sums up some bytes of text. No chunk ends inside a code point or a \r\n.
type chunk struct {
	size   int // bytes
	breaks int // ends of lines
	tail   int // units after the last of them, or of all
}

// reset reads a text from its beginning.
func (l *lines) reset(source []byte) { l.chunks = l.cut(l.chunks[:0], source) }

// edit takes notice that source was made by writing added bytes in place of those
// from start to end.
func (l *lines) edit(source []byte, start, end, added int) {
	first, from := l.find(start)
	if first > 0 { // a \r at its end may meet a \n now
		first--
		from -= l.chunks[first].size
	}
	last, to := l.find(end)
	for stop := min(last+2, len(l.chunks)); last < stop; last++ {
		to += l.chunks[last].size
	}
	l.chunks = slices.Replace(l.chunks, first, last, l.cut(nil, source[from:to+added-(end-start)])...)
}

// find returns the chunk that has the byte at offset, and where it begins; at the
// end of the text, the number of chunks.
func (l *lines) find(offset int) (i, at int) {
	for i, c := range l.chunks {
		if offset < at+c.size {
			return i, at
		}
		at += c.size
	}
	return len(l.chunks), at
}

// cut appends the chunks of a stretch of text, as even as can be.
func (l *lines) cut(chunks []chunk, text []byte) []chunk {
	for pieces := (len(text) + chunkSize - 1) / chunkSize; len(text) > 0; pieces-- {
		end := len(text) / max(pieces, 1)
		for end < len(text) && (!utf8.RuneStart(text[end]) || text[end] == '\n' && text[end-1] == '\r') {
			end++
		}
		breaks, last := countBreaks(text[:end])
		chunks = append(chunks, chunk{end, breaks, l.unit.count(text[last:end])})
		text = text[end:]
	}
	return chunks
}

// countBreaks counts the ends of lines in b and tells where the last line begins.
func countBreaks(b []byte) (breaks, last int) {
	breaks = bytes.Count(b, []byte{'\n'})
	for at := 0; ; {
		i := bytes.IndexByte(b[at:], '\r')
		if i < 0 {
			return breaks, max(bytes.LastIndexByte(b, '\n')+1, at)
		}
		if at += i + 1; at == len(b) || b[at] != '\n' {
			breaks++
		}
	}
}

// offset is the byte at a position. A column past the end of its line means that
// end; ok is false where there is no such line, and the nearest place is returned.
func (l *lines) offset(source []byte, p position) (offset int, ok bool) {
	ok = p.Line >= 0 && p.Character >= 0
	p = position{max(p.Line, 0), max(p.Character, 0)}
	line, at := 0, 0
	for i, c := range l.chunks {
		if p.Line <= line+c.breaks {
			begin := at + beginOfLine(source[at:at+c.size], p.Line-line)
			return l.along(source, i, at+c.size, begin, p.Character), ok
		}
		line += c.breaks
		at += c.size
	}
	return at, ok && p.Line == 0
}

// beginOfLine is where the line n, counted from 0, begins in b.
func beginOfLine(b []byte, n int) int {
	at := 0
	for ; n > 0; n-- {
		at += endOfLine(b[at:])
		if b[at] == '\r' && at+1 < len(b) && b[at+1] == '\n' {
			at++
		}
		at++
	}
	return at
}

// endOfLine is where the line that b begins with ends: at the end of b if nowhere
// before.
func endOfLine(b []byte) int {
	if i := bytes.IndexAny(b, "\r\n"); i >= 0 {
		return i
	}
	return len(b)
}

// along goes some units along a line from the byte at, which is in chunk i, whose
// end is given.
func (l *lines) along(source []byte, i, end, at, units int) int {
	for {
		rest := source[at:end]
		stop := endOfLine(rest)
		width := l.unit.count(rest[:stop])
		if units <= width || stop < len(rest) || i+1 == len(l.chunks) {
			return at + l.unit.advance(rest[:stop], units)
		}
		units -= width
		for i, at = i+1, end; l.chunks[i].breaks == 0 && l.chunks[i].tail < units && i+1 < len(l.chunks); i++ {
			units -= l.chunks[i].tail
			at += l.chunks[i].size
		}
		end = at + l.chunks[i].size
	}
}

// cursor finds positions of a text in ascending order, each from the one before.
type cursor struct {
	*lines
	source []byte
	i      int      // a chunk
	at     int      // the byte where it begins
	start  position // the position there
}

func (l *lines) cursor(source []byte) cursor { return cursor{lines: l, source: source} }

// position is where the byte at offset is. Going back starts again.
func (c *cursor) position(offset int) position {
	if offset < c.at {
		c.i, c.at, c.start = 0, 0, position{}
	}
	for ; c.i+1 < len(c.chunks) && offset >= c.at+c.chunks[c.i].size; c.i++ {
		passed := c.chunks[c.i]
		c.at += passed.size
		if passed.breaks > 0 {
			c.start = position{Line: c.start.Line + passed.breaks}
		}
		c.start.Character += passed.tail
	}
	before := c.source[c.at:offset]
	breaks, last := countBreaks(before)
	if breaks == 0 {
		return position{c.start.Line, c.start.Character + c.unit.count(before)}
	}
	return position{c.start.Line + breaks, c.unit.count(before[last:])}
}
