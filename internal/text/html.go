package text

import (
	"io"
	"strings"
)

// readHTML reads the whole document and yields a block for the text of each
// element that is displayed as a block, and one for each attribute that is shown
// or read out (alt, title, aria-label, placeholder, the description of the page).
// Scripts, styles, preformatted text and comments are left out; inline code and
// words in another language are one U+FFFC, so that the sentence stays whole.
func readHTML(r io.Reader, o Options, yield func(*Block, error) bool) {
	readWhole(r, o, yield, func(source []byte) ([]*Block, error) {
		h := htmlReader{tagged: newTagged(source, o)}
		h.parse()
		return h.inOrder(), nil
	})
}

type htmlReader struct {
	tagged
	broken tag // a <br> that waits for what follows
}

func (h *htmlReader) parse() { h.parseFrom(bomLen(h.source)) }

// parseFrom reads what stands behind from.
func (h *htmlReader) parseFrom(from int) {
	s := tagScanner{source: h.source, pos: from}
	for t, ok := s.next(); ok; t, ok = s.next() {
		switch t.kind {
		case charData, cdata:
			h.lineBreak(t)
			h.text(t, func(from, to int) { h.prose.decodedBy(from, to, "&{<", shown) })
		case openTag:
			h.start(t)
		case closeTag:
			h.end(t)
		}
	}
	h.flush()
}

// shown is reference, with a placeholder for what a template engine fills in.
func shown(b []byte) (text string, n int) {
	if n = filledIn(b); n > 0 {
		return placeholder, n
	}
	return reference(b)
}

// start takes a start tag.
func (h *htmlReader) start(t tag) {
	ended := func(open string) bool { return htmlEnds(t.name, open) }
	for i := h.find(ended, func(open string) bool { return htmlBars(t.name, open) }); i > 0; {
		h.pop(i, t)
		i = h.find(ended, func(open string) bool { return htmlBars(t.name, open) })
	}
	h.attributes(t)
	e := element{name: t.name, block: htmlBlock(t.name), hidden: htmlHidden(t.name), heading: htmlHeading(t.name)}
	switch {
	case !htmlVoid(t.name) && !t.empty:
		h.push(e, t)
	case t.name == "br":
		h.broken = t
	case e.block && t.name != "meta" && t.name != "link":
		h.flush()
	case (t.name == "img" || t.name == "input") && len(h.prose.text) > 0 && h.top().read():
		h.prose.standIn(placeholder, t.start, t.end)
	}
}

// lineBreak decides about a line break before text: it ends the block unless the
// text goes on in lower case.
func (h *htmlReader) lineBreak(t tag) {
	from, to := trimSpace(h.source, t.from, t.to)
	if h.broken.end == 0 || from == to {
		return
	}
	if isLower(rune(h.source[from])) && len(h.prose.text) > 0 {
		h.prose.standIn("\n", h.broken.start, h.broken.end)
	} else {
		h.flush()
	}
	h.broken = tag{}
}

// attributes takes the prose in the attributes of a start tag.
func (h *htmlReader) attributes(t tag) {
	if e := h.top(); e.hidden || h.foreign(t, e.foreign) {
		return
	}
	described := t.name == "meta" && h.description(t)
	for a := range attributes(h.source, t.from, t.to) {
		switch a.name {
		case "alt", "title", "aria-label", "placeholder", "summary":
		case "label":
			if t.name != "option" && t.name != "optgroup" && t.name != "track" {
				continue
			}
		case "content":
			if !described {
				continue
			}
		default:
			continue
		}
		if b := attributeBlock(h.source, a); b != nil {
			h.blocks = append(h.blocks, b)
		}
	}
}

// description reports a meta element that holds a sentence about the page.
func (h *htmlReader) description(t tag) bool {
	for a := range attributes(h.source, t.from, t.to) {
		if a.name == "name" || a.name == "property" {
			switch strings.ToLower(string(h.source[a.from:a.to])) {
			case "description", "og:description", "og:title", "twitter:title", "twitter:description", "dc.title", "dc.description":
				return true
			}
		}
	}
	return false
}
