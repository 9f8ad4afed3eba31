package text

import (
	"bytes"
	"slices"
	"unicode/utf8"
)

// Block is one run of prose freed of markup: a paragraph, a heading, a table
// cell. It belongs to whoever receives it and is not changed afterwards, so it
// may be read from several goroutines.
type Block struct {
	Text    []byte // the prose; line breaks inside are white space
	Heading bool   // the format says that it is a heading
	Part    string // the part of a packed document that it stands in; "" elsewhere
	Names   Names  // what the document names outside its prose, shared by its blocks; nil where its format does not tell

	source []byte                      // what the text came from: from its first source byte to its last
	offset int64                       // of source in the whole
	origin Position                    // of source[0]
	spans  []span                      // ascending; nil when Text is source
	escape func(string) (string, bool) // see Escape; nil: as it is
}

// span maps a stretch of Text to source: byte by byte, or, where whole, the text
// stands for the stretch as a whole (a decoded entity, the space for a line break,
// a placeholder).
type span struct {
	text, textEnd     int // in Block.Text
	source, sourceEnd int // in Block.source
	whole             bool
	fixed             bool // something else in the source goes by the text as it is spelled
}

// Source returns the byte offsets in the whole source of Text[start:end], the
// markup between included. An offset inside a decoded character widens to all
// of it. It wants 0 <= start <= end <= len(Text).
func (b *Block) Source(start, end int) (from, to int64) {
	f, t := b.local(start, end)
	return b.offset + int64(f), b.offset + int64(t)
}

// Raw returns the source bytes of Text[start:end]; where they differ from the
// text, markup or an entity stands between.
func (b *Block) Raw(start, end int) []byte {
	f, t := b.local(start, end)
	return b.source[f:t:t]
}

// Escape returns words as the source must spell them to have them in this block,
// and false when it cannot. A line break in a word is none of them.
func (b *Block) Escape(words string) (string, bool) {
	if b.escape == nil {
		return words, true
	}
	return b.escape(words)
}

// Interrupted reports whether markup that is no part of the text stands inside
// Text[start:end]: to replace that stretch of the source would remove it; or that
// something else goes by that text, as a link by the name of its target. A line
// break, with what the format wants around it, does not count.
func (b *Block) Interrupted(start, end int) bool {
	if b.spans == nil || start == end {
		return false
	}
	first, last := b.spanAt(start), b.spanAt(end-1)
	for i := first; i <= last; i++ {
		if b.spans[i].fixed || i > first && b.spans[i].source != b.spans[i-1].sourceEnd {
			return true
		}
	}
	return false
}

// Position returns the place of Text[start] in the source; in a part of a packed
// document, lines are its paragraphs and columns count their text. It counts from
// the start of the block: time grows with start. Who asks for many uses Places.
func (b *Block) Position(start int) Position {
	p := b.Places()
	return p.Position(start)
}

// Places begins a count of places from the start of the block.
func (b *Block) Places() Places { return Places{block: b, lines: NewLineMap(b.origin)} }

// Places tells the places of ascending offsets of a block's text, each counted
// from the one before.
type Places struct {
	block *Block
	lines LineMap
	at    int // in block.source, or in the text of a packed document
}

// Position returns the place of Text[start]; start must not go back.
func (p *Places) Position(start int) Position {
	if p.block.Part != "" {
		p.lines.column += utf8.RuneCount(p.block.Text[p.at:start])
		p.at = start
		return p.lines.Position()
	}
	from, _ := p.block.local(start, start)
	p.lines.Feed(p.block.source[p.at:from])
	p.at = from
	return p.lines.Position()
}

// Move notes that as many bytes and lines more, or fewer, stand before the
// block in the source than when it was read. It is for the block's owner,
// while nobody else reads it.
func (b *Block) Move(bytes int64, lines int) {
	b.offset += bytes
	b.origin.Line += lines
}

// Same reports whether two blocks have the same text, from the same source
// bytes, markup included; their places may differ.
func (b *Block) Same(o *Block) bool {
	return b.Heading == o.Heading && b.Part == o.Part && bytes.Equal(b.Text, o.Text) &&
		bytes.Equal(b.source, o.source) && slices.Equal(b.spans, o.spans)
}

// local is Source within b.source.
func (b *Block) local(start, end int) (from, to int) {
	if b.spans == nil {
		return start, end
	}
	from = b.spans[b.spanAt(start)].at(start)
	if start == end {
		return from, from
	}
	return from, b.spans[b.spanAt(end-1)].after(end)
}

// spanAt finds the span that holds the byte at i, the last for the end of text.
func (b *Block) spanAt(i int) int {
	lo, hi := 0, len(b.spans)-1
	for lo < hi {
		mid := (lo + hi + 1) / 2
		if b.spans[mid].text <= i {
			lo = mid
		} else {
			hi = mid - 1
		}
	}
	return lo
}

// at returns where the source of the text byte at i begins.
func (s span) at(i int) int {
	switch {
	case i >= s.textEnd:
		return s.sourceEnd
	case s.whole:
		return s.source
	}
	return s.source + i - s.text
}

// after returns where the source of the text before i, which ends inside the
// span or at its end, ends.
func (s span) after(i int) int {
	if s.whole {
		return s.sourceEnd
	}
	return s.source + i - s.text
}
