package text

import "strings"

// decoded returns the body of a part as one block, nil when it is empty or its
// encoding or charset is one that is left out.
func (m *mail) decoded(part mailPart) *Block {
	charset := strings.ToLower(part.params["charset"])
	ascii := charset == "" || charset == "us-ascii" || charset == "ascii"
	if !ascii && charset != "utf-8" && charset != "utf8" {
		return nil
	}
	p := prose{source: m.source}
	spell := func(words string) string { return words }
	switch part.encoding {
	case "", "7bit":
		ascii = true
		p.verbatim(part.body, part.end)
	case "8bit", "binary":
		p.verbatim(part.body, part.end)
	case "quoted-printable":
		p.quotedPrintable(part.body, part.end)
		spell = quotedSpelled
	}
	b := p.block()
	if b != nil {
		b.escape = func(words string) (string, bool) { return spell(words), !ascii || isASCII(words) }
	}
	return b
}

// html yields the blocks of a document of HTML that is the text of b.
func (m *mail) html(b *Block) {
	h := htmlReader{tagged: newTagged(b.Text, m.options)}
	h.parse()
	for _, inner := range h.inOrder() {
		m.emit(inner.inside(b))
	}
}

// inside returns b, which was read of the text of outer, as a block of the source
// of outer. It wants blocks that prose built.
func (b *Block) inside(outer *Block) *Block {
	base := int(b.offset)
	from, to := outer.local(base, base+len(b.source))
	moved := Block{
		Text: b.Text, Heading: b.Heading, Part: outer.Part,
		source: outer.source[from:to:to], offset: outer.offset + int64(from),
		escape: func(words string) (string, bool) {
			words, ok := b.Escape(words)
			if !ok {
				return "", false
			}
			return outer.Escape(words)
		},
	}
	for _, s := range b.spans {
		for at := s.source; at < s.sourceEnd; {
			o := outer.spans[outer.spanAt(base+at)]
			end := min(s.sourceEnd, o.textEnd-base)
			piece := span{text: s.text, textEnd: s.textEnd, whole: true, fixed: s.fixed}
			if s.whole {
				end = s.sourceEnd
			} else {
				piece.text, piece.textEnd, piece.whole = s.text+at-s.source, s.text+end-s.source, o.whole
			}
			piece.source, piece.sourceEnd = outer.local(base+at, base+end)
			piece.source -= from
			piece.sourceEnd -= from
			moved.spans = append(moved.spans, piece)
			at = end
		}
	}
	return &moved
}
