package text

import (
	"bytes"
	"io"
	"unicode/utf8"
)

// readXML reads the whole document and yields a block for each element that has
// prose: two words with white space between them, or a title. An element whose
// parent has text of its own stands inside a sentence, any other apart from it.
// Elements that DocBook and DITA name for code, comments, declarations and
// processing instructions are left out; attributes are not read.
func readXML(r io.Reader, o Options, yield func(*Block, error) bool) {
	readWhole(r, o, yield, func(source []byte) ([]*Block, error) {
		x := xmlReader{tagged: newTagged(source, o), mixed: mixedContent(source)}
		x.parse()
		return x.inOrder(), nil
	})
}

type xmlReader struct {
	tagged
	mixed []bool // by the order of start tags: the element has text of its own
	count int    // start tags so far
	depth []bool // of the open elements, those beyond the bound too: they are mixed
}

// mixedContent tells of each element, in the order of the start tags, whether it
// has text beside its elements.
func mixedContent(source []byte) []bool {
	var mixed []bool
	open := []int{-1}
	s := tagScanner{source: source, xml: true, pos: bomLen(source)}
	for t, ok := s.next(); ok; t, ok = s.next() {
		last := len(open) - 1
		switch {
		case t.kind == openTag:
			mixed = append(mixed, false)
			if !t.empty {
				open = append(open, len(mixed)-1)
			}
		case t.kind == closeTag && last > 0:
			open = open[:last]
		case (t.kind == charData || t.kind == cdata) && last > 0 && len(bytes.TrimSpace(source[t.from:t.to])) > 0:
			mixed[open[last]] = true
		}
	}
	return mixed
}

func (x *xmlReader) parse() {
	s := tagScanner{source: x.source, xml: true, pos: bomLen(x.source)}
	for t, ok := s.next(); ok; t, ok = s.next() {
		switch t.kind {
		case charData, cdata:
			x.text(t, func(from, to int) { x.prose.decodedBy(from, to, "&", entity) })
		case openTag:
			x.start(t)
		case closeTag:
			if n := len(x.depth); n > 0 {
				x.depth = x.depth[:n-1]
			}
			x.end(t)
		}
	}
	x.flush()
	x.blocks = proseOnly(x.blocks)
}

// start takes a start tag.
func (x *xmlReader) start(t tag) {
	n := len(x.depth)
	inline := n > 0 && x.depth[n-1]
	mixed := x.mixed[x.count]
	x.count++
	switch {
	case !t.empty:
		x.depth = append(x.depth, mixed)
		x.push(element{name: t.name, block: !inline, hidden: xmlCode(t.name), heading: t.name == "title"}, t)
	case inline && len(x.prose.text) > 0 && x.top().read(): // a reference, an image
		x.prose.standIn(placeholder, t.start, t.end)
	}
}

// entity is reference, with a placeholder for entities that the document or its
// type defines.
func entity(b []byte) (text string, n int) {
	if text, n = reference(b); n > 1 {
		return text, n
	}
	for n < len(b) && (classes[b[n]]&(cAlnum|cPoint|cHyphen) != 0 || b[n] == '_') {
		n++
	}
	if n > 1 && n < len(b) && b[n] == ';' {
		return placeholder, n + 1
	}
	return "", 1
}

// proseOnly keeps the blocks that have two words with white space between them.
func proseOnly(blocks []*Block) []*Block {
	var kept []*Block
	for _, b := range blocks {
		if b.Heading || wordy(b.Text) {
			kept = append(kept, b)
		}
	}
	return kept
}

// wordy reports two fields that begin with a letter and have another one.
func wordy(b []byte) bool {
	words := 0
	for field := range bytes.FieldsSeq(b) {
		field = bytes.TrimLeft(field, "\"'(\u201C\u2018")
		r, n := utf8.DecodeRune(field)
		if c := classOf(r, n); (c == rLatin || c == rForeign) && letterAt(field, n, len(field)) {
			if words++; words == 2 {
				return true
			}
		}
	}
	return false
}

// xmlCode reports elements whose text is code or a name by the DocBook 5.1 and
// DITA 1.3 specifications (from memory), and those of HTML and SVG that are.
func xmlCode(name string) bool {
	switch name {
	case "programlisting", "screen", "synopsis", "cmdsynopsis", "funcsynopsis", "classsynopsis", "literallayout", "literal",
		"code", "command", "option", "userinput", "computeroutput", "filename", "systemitem", "varname", "envar", "constant",
		"classname", "interfacename", "methodname", "function", "parameter", "replaceable", "property", "returnvalue", "symbol",
		"type", "token", "markup", "tag", "sgmltag", "uri", "email", "keycap", "keycode", "keysym", "prompt", "productnumber",
		"releaseinfo", "isbn", "issn", "equation", "inlineequation", "informalequation", "mathphrase",
		"codeblock", "codeph", "filepath", "cmdname", "apiname", "parmname", "msgnum", "systemoutput", "synph", "syntaxdiagram",
		"xmlelement", "xmlatt", "xmlnsname", "xmlpi", "parameterentity", "textentity", "numcharref", "markupname",
		"pre", "kbd", "samp", "var", "script", "style", "math", "svg":
		return true
	}
	return false
}
