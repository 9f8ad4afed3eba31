package text

import (
	"bytes"
	"encoding/xml"
	"html"
	"io"
	"strings"
	"unicode/utf8"
)

// mostDepth is how many elements of a part may stand in each other.
const mostDepth = 1000

// xmlKind says what an xmlEvent is.
type xmlKind uint8

const (
	xmlOpen xmlKind = iota
	xmlClose
	xmlText
	xmlOther // a comment, declaration or processing instruction
)

// xmlEvent is a tag or a piece of text of a part, at source[start:end].
type xmlEvent struct {
	kind       xmlKind
	name       string // of tags, with the prefix that namespacePrefix gives
	start, end int
	attributes map[string]string
}

// eachXML gives the events of a part of a document to take, in order.
func eachXML(part string, source []byte, take func(xmlEvent)) error {
	d := xml.NewDecoder(bytes.NewReader(source))
	prefixes := map[string]string{}
	depth := 0
	for {
		start := int(d.InputOffset())
		t, err := d.RawToken()
		if err == io.EOF && depth == 0 {
			return nil
		}
		if err == nil && depth >= mostDepth {
			err = TooLarge("more than %d elements in each other", mostDepth)
		}
		if err != nil {
			return unreadable("the part %q cannot be read: %w", part, err)
		}
		e := xmlEvent{kind: xmlOther, start: start, end: int(d.InputOffset())}
		switch t := t.(type) {
		case xml.StartElement:
			depth++
			declare(prefixes, t.Attr)
			e.kind, e.name, e.attributes = xmlOpen, qualified(prefixes, t.Name), map[string]string{}
			for _, a := range t.Attr {
				e.attributes[qualified(prefixes, a.Name)] = a.Value
			}
		case xml.EndElement:
			depth--
			e.kind, e.name = xmlClose, qualified(prefixes, t.Name)
		case xml.CharData:
			e.kind = xmlText
		}
		if depth < 0 {
			return unreadable("the part %q cannot be read: </%s> closes nothing", part, e.name)
		}
		take(e)
	}
}

// declare notes the prefixes that an element declares. They hold for the rest of
// the part: programs declare each of them once, at the root.
func declare(prefixes map[string]string, attributes []xml.Attr) {
	for _, a := range attributes {
		prefix := a.Name.Local
		if a.Name.Space == "" && prefix == "xmlns" {
			prefix = ""
		} else if a.Name.Space != "xmlns" {
			continue
		}
		if known := namespacePrefix(a.Value); known != "" || prefixes[prefix] != "" {
			prefixes[prefix] = known
		}
	}
}

// namespacePrefix is the prefix by which we know a namespace of ECMA-376 (both
// editions of it, transitional and strict) and OpenDocument 1.3; "" for others.
func namespacePrefix(uri string) string {
	if of, ok := strings.CutPrefix(uri, "urn:oasis:names:tc:opendocument:xmlns:"); ok {
		switch name, _, _ := strings.Cut(of, ":"); name {
		case "xsl-fo-compatible":
			return "fo"
		case "drawing":
			return "draw"
		default:
			return name
		}
	}
	switch {
	case strings.HasSuffix(uri, "/wordprocessingml/2006/main"), strings.HasSuffix(uri, "/wordprocessingml/main"):
		return "w"
	case strings.HasSuffix(uri, "/markup-compatibility/2006"):
		return "mc"
	}
	return ""
}

func qualified(prefixes map[string]string, n xml.Name) string {
	prefix, ok := prefixes[n.Space]
	if !ok {
		prefix = n.Space
	}
	return prefix + ":" + n.Local
}

// paragraph gathers a paragraph of a part.
type paragraph struct {
	prose   prose
	number  int // of the part's paragraphs, from 1
	column  int // code points of it in blocks before
	heading bool
}

// paragraphs makes the blocks of one part. Paragraphs may stand in each other: a
// note or a text box cuts the one around it in two blocks, so that blocks do not
// overlap.
type paragraphs struct {
	part   string
	source []byte
	blocks []*Block
	open   []*paragraph
	count  int
}

// begin opens a paragraph.
func (p *paragraphs) begin() *paragraph {
	p.cut()
	p.count++
	next := &paragraph{number: p.count, prose: prose{source: p.source}}
	p.open = append(p.open, next)
	return next
}

// top is the innermost open paragraph, nil when none is.
func (p *paragraphs) top() *paragraph {
	if len(p.open) == 0 {
		return nil
	}
	return p.open[len(p.open)-1]
}

// end closes the innermost paragraph.
func (p *paragraphs) end() {
	if p.cut(); len(p.open) > 0 {
		p.open = p.open[:len(p.open)-1]
	}
}

// cut makes a block of what the innermost paragraph has so far.
func (p *paragraphs) cut() {
	top := p.top()
	if top == nil {
		return
	}
	column, end := top.column+utf8.RuneCount(top.prose.text), top.prose.end
	if b := top.prose.block(); b != nil {
		b.Part, b.Heading, b.escape = p.part, top.heading, escapeXML
		b.origin = Position{Line: top.number, Column: top.column + 1}
		p.blocks = append(p.blocks, b)
	}
	top.prose, top.column = prose{source: p.source, end: end}, column
}

// characters takes the text of an event.
func (p *paragraph) characters(e xmlEvent) {
	const cdata = "<![CDATA["
	if raw := p.prose.source[e.start:e.end]; bytes.HasPrefix(raw, []byte(cdata)) {
		p.prose.verbatim(e.start+len(cdata), e.end-len("]]>"))
		return
	}
	p.prose.decodedBy(e.start, e.end, "&", func(b []byte) (string, int) {
		end := bytes.IndexByte(b[:min(len(b), 16)], ';')
		if end < 0 {
			return "", 1
		}
		return html.UnescapeString(string(b[:end+1])), end + 1
	})
}

// leftOut takes the text of an event as a placeholder, and several in a row as one.
func (p *paragraph) leftOut(e xmlEvent) {
	if !bytes.HasSuffix(p.prose.text, []byte(placeholder)) {
		p.prose.standIn(placeholder, e.start, e.end)
	}
}

// escapeXML is Block.Escape in character data.
func escapeXML(words string) (string, bool) {
	return strings.NewReplacer("&", "&amp;", "<", "&lt;", ">", "&gt;").Replace(words), true
}

// styles are the named styles of a document, for their languages: the tag of each
// (BCP 47; "zxx" where nothing is to be proofread), and the style it is based on. The
// entry "" is of what has none.
type styles map[string]style

type style struct{ language, parent string }

// language is the tag of a style or of those it is based on, "" when none has any.
func (s styles) language(name string) string {
	const longest = 32 // styles in a row; bounds circles
	for i := 0; i < longest && name != ""; i++ {
		if language := s[name].language; language != "" {
			return language
		}
		name = s[name].parent
	}
	return ""
}
