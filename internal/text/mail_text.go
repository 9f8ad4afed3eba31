package text

// mailText reads the text of a part.
type mailText struct {
	*emitter
	flowed bool // a line that ends with a space goes on in the next (RFC 3676)
}

// lines yields the paragraphs of a text, but no quoted line and nothing from the
// line "-- " on, behind which stands the signature.
func (t *mailText) lines(b *Block) {
	var lines []textLine
	for l := range linesOf(b.Text, 0) {
		signature := string(b.Text[l.start:min(l.end+1, len(b.Text))]) == "-- "
		left := signature || l.blank() || b.Text[l.start] == '>'
		if !left {
			lines = append(lines, l)
		}
		if left || len(lines) == mostStretch {
			t.paragraphs(b, lines)
			lines = lines[:0]
		}
		if signature || t.stopped {
			return
		}
	}
	t.paragraphs(b, lines)
}

// paragraphs yields those among lines without a blank or quoted one.
func (t *mailText) paragraphs(b *Block, lines []textLine) {
	width := wrapWidth(b.Text, lines)
	b.cut(lines, t.emit, func(i int) bool {
		if end := lines[i].end; t.flowed && b.Text[end] == ' ' {
			return true
		}
		return !t.flowed && joins(b.Text, lines[i], lines[i+1], width)
	})
}
