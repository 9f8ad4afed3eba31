package text

// mailText reads the text of a part.
type mailText struct {
	*emitter
	flowed bool // a line that ends with a space goes on in the next (RFC 3676)
}

// read yields what the writer wrote in source[from:to], unless its encoding or
// charset is one that is left out.
func (t *mailText) read(encoding, charset string, from, to int) {
	ascii := charset == "" || charset == "us-ascii" || charset == "ascii"
	if !ascii && charset != "utf-8" && charset != "utf8" {
		return
	}
	p := prose{source: t.source}
	spell := func(words string) string { return words }
	switch encoding {
	case "", "7bit":
		ascii = true
		p.verbatim(from, to)
	case "8bit", "binary":
		p.verbatim(from, to)
	case "quoted-printable":
		p.quotedPrintable(from, to)
		spell = quotedSpelled
	}
	if b := p.block(); b != nil {
		b.escape = func(words string) (string, bool) { return spell(words), !ascii || isASCII(words) }
		t.lines(b)
	}
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
