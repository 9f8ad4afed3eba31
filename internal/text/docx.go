package text

import (
	"bytes"
	"cmp"
	"strings"
)

// parseDocx reads a document of WordprocessingML (ECMA-376): its main part, then
// headers, footers, notes and comments. A word may be split over runs. What was
// deleted, codes of fields, runs in another language or not to be proofread, and
// paragraphs and runs in a style for code are left out.
func parseDocx(p *packed, o Options) ([]*Block, error) {
	parts, err := docxParts(p)
	if err != nil {
		return nil, err
	}
	table, err := docxStyles(p, parts["styles"])
	if err != nil {
		return nil, err
	}
	var blocks []*Block
	for _, kind := range []string{"main", "header", "footer", "footnotes", "endnotes", "comments"} {
		for _, name := range parts[kind] {
			source, err := p.part(name)
			if err != nil {
				return blocks, err
			}
			d := docx{paragraphs: paragraphs{part: name, source: source}, options: o, styles: table}
			if err := eachXML(name, source, d.take); err != nil {
				return blocks, err
			}
			blocks = append(blocks, d.blocks...)
		}
	}
	return blocks, nil
}

// docxParts finds the names of the parts by their content types: "main", "styles",
// "header" and the like.
func docxParts(p *packed) (map[string][]string, error) {
	const name = "[Content_Types].xml"
	source, err := p.part(name)
	if err != nil {
		return nil, err
	}
	parts := map[string][]string{}
	err = eachXML(name, source, func(e xmlEvent) {
		kind := e.attributes[":ContentType"]
		if e.kind != xmlOpen || e.name != ":Override" || !strings.HasSuffix(kind, "+xml") {
			return
		}
		kind = strings.TrimSuffix(kind, "+xml")
		kind = kind[strings.LastIndexByte(kind, '.')+1:]
		part := strings.TrimPrefix(e.attributes[":PartName"], "/")
		if strings.HasPrefix(e.attributes[":ContentType"], "application/vnd.openxmlformats-officedocument.wordprocessingml.") || kind == "main" {
			parts[kind] = append(parts[kind], part)
		}
	})
	if err == nil && len(parts["main"]) == 0 {
		_, err = p.part("word/document.xml")
		parts["main"] = []string{"word/document.xml"}
	}
	return parts, err
}

// docxStyles reads the languages of the styles.
func docxStyles(p *packed, names []string) (styles, error) {
	table := styles{}
	for _, name := range names {
		source, err := p.part(name)
		if err != nil {
			return nil, err
		}
		id := ""
		err = eachXML(name, source, func(e xmlEvent) {
			here := table[id]
			switch {
			case e.kind == xmlClose && e.name == "w:style":
				id = ""
				return
			case e.kind != xmlOpen:
				return
			case e.name == "w:style":
				id = e.attributes["w:styleId"]
				return
			case e.name == "w:basedOn":
				here.parent = e.attributes["w:val"]
			case e.name == "w:lang":
				here.language = e.attributes["w:val"]
			case e.name == "w:noProof" && isOn(e):
				here.language = noLanguage
			default:
				return
			}
			table[id] = here
		})
		if err != nil {
			return nil, err
		}
	}
	return table, nil
}

// noLanguage is the tag for no linguistic content (BCP 47).
const noLanguage = "zxx"

// isOn reads an element that is a switch: on, unless its value says otherwise.
func isOn(e xmlEvent) bool {
	switch e.attributes["w:val"] {
	case "0", "false", "off":
		return false
	}
	return true
}

// docx reads one part.
type docx struct {
	paragraphs
	options Options
	styles  styles
	depth   int
	skip    int   // the depth of an element that is left out, 0 for none
	runs    []run // the one at hand of each open paragraph
}

// run is a run of text with the same properties.
type run struct {
	style         string // of the paragraph
	properties    []byte // the source of them
	from          int    // where they begin, while they are read
	language      string
	code          bool
	tag           []byte // that opened the last text
	inText        bool
	after         int    // where the text before ended, 0 when more than tags of runs came since
	tagBefore     []byte // that opened it
	propertiesWas []byte // of its run
}

func (d *docx) take(e xmlEvent) {
	switch e.kind {
	case xmlOpen:
		if d.depth++; d.skip == 0 {
			d.opened(e)
		}
	case xmlClose:
		if d.skip == 0 {
			d.closed(e)
		} else if d.depth == d.skip {
			d.skip = 0
		}
		d.depth--
	case xmlText:
		if r := d.run(); d.skip == 0 && r != nil && r.inText {
			d.text(e, r)
		}
	default:
		d.between("")
	}
}

// run is the state of runs in the innermost paragraph, nil outside of any.
func (d *docx) run() *run {
	if len(d.runs) == 0 {
		return nil
	}
	return &d.runs[len(d.runs)-1]
}

// between notes that an element, or anything else, stands between two texts.
func (d *docx) between(name string) {
	r := d.run()
	if r == nil {
		return
	}
	switch name {
	case "w:r", "w:rPr", "w:t", "w:proofErr":
	default:
		if r.from == 0 {
			r.after = 0
		}
	}
}

func (d *docx) opened(e xmlEvent) {
	d.between(e.name)
	switch e.name {
	case "w:del", "w:moveFrom", "w:rPrChange", "w:pPrChange", "w:sectPr", "w:tabs", "w:rt", "mc:Fallback":
		d.skip = d.depth
	case "w:p":
		d.begin()
		d.runs = append(d.runs, run{})
	}
	top, r := d.top(), d.run()
	if top == nil {
		return
	}
	switch e.name {
	case "w:pStyle":
		r.style = e.attributes["w:val"]
		top.heading = strings.HasPrefix(r.style, "Heading") || r.style == "Title"
	case "w:r":
		r.properties, r.language, r.code = nil, "", isCodeStyle(r.style)
	case "w:rPr":
		r.from = e.end
	case "w:rStyle":
		r.code = r.code || isCodeStyle(e.attributes["w:val"])
		r.language = cmp.Or(r.language, d.styles.language(e.attributes["w:val"]))
	case "w:lang":
		r.language = cmp.Or(e.attributes["w:val"], r.language)
	case "w:noProof":
		if isOn(e) {
			r.language = noLanguage
			r.code = true
		}
	case "w:t":
		r.inText, r.tag = true, d.source[e.start:e.end]
	default:
		if s := standsFor(e.name); s != "" {
			top.prose.standIn(s, e.start, e.end)
		}
	}
}

// standsFor is the text that an empty element of a run stands for, "" for others.
func standsFor(name string) string {
	switch name {
	case "w:tab", "w:ptab":
		return "\t"
	case "w:br", "w:cr":
		return "\n"
	case "w:noBreakHyphen":
		return "\u2011"
	case "w:softHyphen":
		return "\u00AD"
	case "w:sym":
		return placeholder
	}
	return ""
}

func (d *docx) closed(e xmlEvent) {
	d.between(e.name)
	r := d.run()
	if r == nil {
		return
	}
	switch e.name {
	case "w:rPr":
		r.properties, r.from = d.source[r.from:e.start], 0
	case "w:t":
		r.inText = false
	case "w:p":
		d.end()
		d.runs = d.runs[:len(d.runs)-1]
	}
}

// text takes the text of a run. Runs are split by programs at will: between two of
// the same properties, with nothing else between, nothing is lost.
func (d *docx) text(e xmlEvent, r *run) {
	top := d.top()
	language := cmp.Or(r.language, d.styles.language(r.style), d.styles[""].language)
	if r.code || !d.options.reads(language) {
		r.after = 0
		top.leftOut(e)
		return
	}
	if r.after > 0 && bytes.Equal(r.tag, r.tagBefore) && bytes.Equal(r.properties, r.propertiesWas) {
		top.prose.bridge(r.after, e.start)
	}
	top.characters(e)
	r.after, r.tagBefore, r.propertiesWas = e.end, r.tag, r.properties
}

// bridge says that source[from:to] stands between two pieces of text and may be
// lost.
func (p *prose) bridge(from, to int) {
	if from == p.end && to > from && len(p.text) > 0 {
		p.spans = append(p.spans, span{len(p.text), len(p.text), from, to, true, p.fixed})
		p.end = to
	}
}

// isCodeStyle tells styles for code by their names.
func isCodeStyle(name string) bool {
	name = strings.ToLower(name)
	for _, part := range []string{"code", "verbatim", "preformatted", "source_text", "source_20_text"} {
		if strings.Contains(name, part) {
			return true
		}
	}
	return false
}
