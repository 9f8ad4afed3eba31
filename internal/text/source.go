package text

import (
	"bytes"
	"cmp"
	"slices"
	"strings"
)

// codeReader makes blocks of the comments and strings of source code. Comments
// that end with their lines and stand one below the other, with the same white
// space before them, are read as one.
type codeReader struct {
	source []byte
	blocks []*Block
	lines  []stretch // of the comment at hand
	last   codePiece // the last piece of it
}

// stretch is source[from:to].
type stretch struct{ from, to int }

// take reads the next piece of the source.
func (c *codeReader) take(p codePiece) {
	if p.line && c.continues(p) {
		c.lines, c.last = append(c.lines, c.afterLeader(p)), p
		return
	}
	c.finishComment()
	switch {
	case p.line:
		c.lines, c.last = append(c.lines, c.afterLeader(p)), p
	case p.in.role == remark:
		c.comment(c.starred(p.from, p.to), p.in)
	case p.in.role == docstring:
		c.comment(splitStretches(nil, c.source, p.from, p.to), p.in)
	case p.in.role == quoted:
		c.literal(p)
	}
}

// continues reports that p goes on where the comment at hand ended: on the next
// line, alone on it, in the same column.
func (c *codeReader) continues(p codePiece) bool {
	if len(c.lines) == 0 || !p.first {
		return false
	}
	between := c.source[c.last.end:p.start]
	if bytes.Count(between, []byte("\n"))+bytes.Count(between, []byte("\r"))-bytes.Count(between, []byte("\r\n")) != 1 {
		return false
	}
	margin := bytes.TrimLeft(between, "\r\n")
	start := c.last.start - len(margin)
	if c.last.first {
		return start >= 0 && bytes.Equal(c.source[start:c.last.start], margin) && lineStart(c.source, start)
	}
	return start >= 0 && lineStart(c.source, start) // below one that stands behind code
}

// afterLeader is a comment's line without the rest of its leader: more of the
// same sign ("///", ";;;"), then one of the signs by which tools know what they
// document.
func (c *codeReader) afterLeader(p codePiece) stretch {
	from := p.from
	sign := c.source[from-1]
	for from < p.to && c.source[from] == sign {
		from++
	}
	begin := from
	for _, signs := range []string{"!'|^<", "|^"} { // at once, or behind a blank
		if from < p.to && strings.IndexByte(signs, c.source[from]) >= 0 && (from+1 == p.to || isSpaceByte(c.source[from+1])) {
			return stretch{from + 1, p.to}
		}
		if from == p.to || c.source[from] != ' ' {
			break
		}
		from++
	}
	return stretch{begin, p.to}
}

// finishComment reads the comment at hand.
func (c *codeReader) finishComment() {
	if len(c.lines) > 0 {
		c.comment(c.lines, nil)
	}
	c.lines = c.lines[:0]
}

// starred is the lines of a block comment less the stars that they begin with,
// and those that end the comment.
func (c *codeReader) starred(from, to int) []stretch {
	for from < to && bytes.IndexByte([]byte("*!|"), c.source[from]) >= 0 {
		from++
	}
	if from < to && c.source[from] == '<' {
		from++
	}
	for to > from && c.source[to-1] == '*' {
		to--
	}
	lines := splitStretches(nil, c.source, from, to)
	for i, l := range lines {
		at, _ := trimSpace(c.source, l.from, l.to)
		if i > 0 && at < l.to && c.source[at] == '*' {
			lines[i].from = at + 1
		}
	}
	return lines
}

// splitStretches appends the lines of source[from:to], without their ends.
func splitStretches(dst []stretch, source []byte, from, to int) []stretch {
	for from <= to {
		n := lineLength(source[from:to])
		dst = append(dst, stretch{from, from + n})
		from += n + 1
		if from <= to && source[from-1] == '\r' && from < to && source[from] == '\n' {
			from++
		}
	}
	return dst
}

// add keeps what was built, if it is anything; in is the enclosure it stands in.
func (c *codeReader) add(p *prose, in *enclosure) {
	b := p.block()
	if b == nil {
		return
	}
	if in != nil {
		b.escape = in.spell
	}
	c.blocks = append(c.blocks, b)
}

// spell is Block.Escape within the enclosure. A comment has no way to spell what
// would end it, nor has a raw string; what might be read as a format verb,
// interpolation or escape is spelled in none.
func (e *enclosure) spell(words string) (string, bool) {
	if e.role == remark {
		return words, !strings.Contains(words, e.close) && !strings.Contains(words, e.open)
	}
	if e.role == docstring {
		return words, !strings.ContainsAny(words, e.close[:1]+`\`)
	}
	mark := e.close[:1]
	switch {
	case strings.ContainsAny(words, "%{}$#\\`\r\n") || e.tag != 0 && strings.Contains(words, mark):
		return "", false
	case !strings.Contains(words, mark):
		return words, true
	case e.escape != 0:
		return strings.ReplaceAll(words, mark, string(e.escape)+mark), true
	case e.doubled:
		return strings.ReplaceAll(words, mark, mark+mark), true
	}
	return "", false
}

// order sorts the blocks by their places.
func (c *codeReader) order() []*Block {
	slices.SortStableFunc(c.blocks, func(a, b *Block) int { return cmp.Compare(a.offset, b.offset) })
	return c.blocks
}
