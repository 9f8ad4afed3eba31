package text

import (
	"bytes"
	"iter"
	"slices"
	"unicode/utf8"
)

// mostStretch is the most lines that are looked at together: a table of more
// would take a multiple of the memory of the text.
const mostStretch = 4096

// lineAt returns the line of w that begins at pos. Lines end as in splitLines.
func lineAt(w []byte, pos int) textLine {
	end, next := len(w), len(w)
	if i := bytes.IndexAny(w[pos:], "\r\n"); i >= 0 {
		end = pos + i
		next = end + 1
		if bytes.HasPrefix(w[end:], []byte("\r\n")) {
			next++
		}
	}
	s, e := trimSpace(w, pos, end)
	return textLine{s, e, next, utf8.RuneCount(w[s:e])}
}

// linesOf yields the lines of w from pos on.
func linesOf(w []byte, pos int) iter.Seq[textLine] {
	return func(yield func(textLine) bool) {
		for pos < len(w) {
			l := lineAt(w, pos)
			if !yield(l) {
				return
			}
			pos = l.next
		}
	}
}

// stretches yields the lines of w that no blank line parts, together; the slice
// is valid until the next ones.
func stretches(w []byte) iter.Seq[[]textLine] {
	return func(yield func([]textLine) bool) {
		var lines []textLine
		for l := range linesOf(w, 0) {
			if !l.blank() {
				lines = append(lines, l)
			}
			if (l.blank() || len(lines) == mostStretch) && len(lines) > 0 {
				if !yield(lines) {
					return
				}
				lines = lines[:0]
			}
		}
		if len(lines) > 0 {
			yield(lines)
		}
	}
}

// cut emits a block for each run of lines of b that go on in the next one:
// goesOn(i) tells it of lines[i], which is not the last.
func (b *Block) cut(lines []textLine, emit func(*Block), goesOn func(i int) bool) {
	first := 0
	for i := range lines {
		if i+1 < len(lines) && goesOn(i) {
			continue
		}
		emit(b.part(lines[first].start, lines[i].end))
		first = i + 1
	}
}

// part returns Text[start:end], which is not empty, as a block of its own. Its
// place is not yet known. It wants a block that prose built.
func (b *Block) part(start, end int) *Block {
	from, to := b.local(start, end)
	spans := slices.Clone(b.spans[b.spanAt(start) : b.spanAt(end-1)+1])
	for i, s := range spans {
		spans[i] = span{max(s.text, start) - start, min(s.textEnd, end) - start, s.source - from, s.sourceEnd - from, s.whole, s.fixed}
		if !s.whole {
			spans[i].source += max(s.text, start) - s.text
			spans[i].sourceEnd -= s.textEnd - min(s.textEnd, end)
		}
	}
	return &Block{
		Text: b.Text[start:end:end], Heading: b.Heading, Part: b.Part,
		source: b.source[from:to:to], offset: b.offset + int64(from),
		spans: spans, escape: b.escape,
	}
}

// mostLook is how many bytes of a text holdsProse judges by.
const mostLook = 4 << 10

// holdsProse reports that a cell or member without a name asked for is read:
// two words or more with white space between, and no fewer than it has numbers,
// codes, addresses and the like.
func holdsProse(s *Segmenter, text []byte) bool {
	words, others := 0, 0
	for sentence := range s.Sentences(text[:min(len(text), mostLook)]) {
		fresh := true
		for _, t := range sentence.Tokens {
			fresh = fresh || !t.Glued
			switch t.Kind {
			case Word:
				if fresh {
					words++
				}
				fresh = false
			case Number, Literal, Acronym:
				others++
			}
		}
	}
	return words >= 2 && words >= others
}
