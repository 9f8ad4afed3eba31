package text

import (
	"bytes"
	"cmp"
	"strconv"
	"strings"
)

// parseOdt reads a text of OpenDocument (ISO/IEC 26300): the content, notes and
// comments in it, then the headers and footers, which are styles. What was deleted,
// text in another language by its style, in a style for code, and fields are left
// out.
func parseOdt(p *packed, o Options) ([]*Block, error) {
	const want = "application/vnd.oasis.opendocument.text"
	kind, err := p.part("mimetype")
	if err != nil {
		return nil, err
	}
	if !bytes.HasPrefix(kind, []byte(want)) {
		return nil, unreadable("is no ODT: it says that it is %.80q", kind)
	}
	if manifest, err := p.part("META-INF/manifest.xml"); err == nil && bytes.Contains(manifest, []byte("encryption-data")) {
		return nil, unreadable("the document is encrypted; save it without a password")
	}
	table := styles{}
	read := func(name string) ([]*Block, error) {
		source, err := p.part(name)
		if err != nil {
			return nil, err
		}
		d := odt{paragraphs: paragraphs{part: name, source: source}, options: o, styles: table}
		err = eachXML(name, source, d.take)
		return d.blocks, err
	}
	var around []*Block
	if p.entries["styles.xml"] != nil {
		if around, err = read("styles.xml"); err != nil {
			return nil, err
		}
	}
	blocks, err := read("content.xml")
	if err != nil {
		return blocks, err
	}
	return append(blocks, around...), nil
}

// odt reads one part.
type odt struct {
	paragraphs
	options Options
	styles  styles
	style   string // that is being defined
	stack   []odtElement
}

// odtElement is what holds inside an element.
type odtElement struct {
	skip     bool // all in it is left out
	text     bool // its character data is text
	code     bool
	language string
}

func (d *odt) take(e xmlEvent) {
	var in odtElement
	if n := len(d.stack); n > 0 {
		in = d.stack[n-1]
	}
	switch e.kind {
	case xmlOpen:
		in = d.opened(e, in)
		d.stack = append(d.stack, in)
	case xmlClose:
		d.stack = d.stack[:len(d.stack)-1]
		if e.name == "text:p" || e.name == "text:h" {
			if !in.skip {
				d.end()
			}
		}
	case xmlText:
		switch top := d.top(); {
		case !in.text || in.skip || top == nil:
		case in.code || !d.options.reads(in.language):
			top.leftOut(e)
		default:
			top.characters(e)
		}
	}
}

// opened reads an opening tag that stands in an element, and says what holds
// inside.
func (d *odt) opened(e xmlEvent, in odtElement) odtElement {
	if in.skip {
		return in
	}
	switch e.name {
	case "text:tracked-changes", "text:ruby-text", "text:note-citation", "text:script", "office:settings", "office:scripts":
		in.skip = true
	case "text:p", "text:h":
		d.begin().heading = e.name == "text:h"
		in = odtElement{text: true}
		d.styled(&in, e)
		in.language = cmp.Or(in.language, d.styles[""].language)
	case "text:span":
		d.styled(&in, e)
	case "text:s", "text:tab", "text:line-break", "text:soft-page-break":
		if top := d.top(); top != nil && in.text {
			d.space(top, e)
		}
	case "style:style", "style:default-style":
		d.style = e.attributes["style:name"]
		d.styles[d.style] = style{language: d.styles[d.style].language, parent: e.attributes["style:parent-style-name"]}
	case "style:text-properties":
		if language := e.attributes["fo:language"]; language != "" {
			d.styles[d.style] = style{language: language, parent: d.styles[d.style].parent}
		}
	case "text:page-number", "text:page-count", "text:date", "text:time", "text:sequence", "text:file-name", "text:author-name",
		"text:chapter", "text:title", "text:variable-get", "text:user-field-get", "text:database-display": // filled in by programs
		in.code = true
	default:
		in.text = in.text && strings.HasPrefix(e.name, "text:")
	}
	return in
}

// styled notes what the style of an element says.
func (d *odt) styled(in *odtElement, e xmlEvent) {
	name := e.attributes["text:style-name"]
	in.code = in.code || isCodeStyle(name) || isCodeStyle(d.styles[name].parent)
	in.language = cmp.Or(d.styles.language(name), in.language)
}

// space takes an element that stands for white space.
func (d *odt) space(top *paragraph, e xmlEvent) {
	white := " "
	switch e.name {
	case "text:tab":
		white = "\t"
	case "text:line-break":
		white = "\n"
	case "text:soft-page-break":
		return
	case "text:s":
		const most = 100
		if n, err := strconv.Atoi(e.attributes["text:c"]); err == nil && n > 0 {
			white = strings.Repeat(white, min(n, most))
		}
	}
	top.prose.standIn(white, e.start, e.end)
}
