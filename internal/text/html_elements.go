package text

// What HTML elements are to a reader of prose. Source: HTML Living Standard,
// section 15.3 (rendering: what is displayed as a block), section 4 (what is
// code), section 13.1.2 (void elements, optional tags), from memory.

// htmlVoid reports elements without content and end tag.
func htmlVoid(name string) bool {
	switch name {
	case "area", "base", "br", "col", "embed", "hr", "img", "input", "link", "meta", "param", "source", "track", "wbr":
		return true
	}
	return false
}

// htmlBlock reports elements whose text is no part of the sentence around them:
// those displayed as blocks, and labels of controls.
func htmlBlock(name string) bool {
	switch name {
	case "html", "head", "body", "title", "meta", "link", "base", "script", "style", "template", "noscript", "slot",
		"address", "article", "aside", "blockquote", "center", "details", "dialog", "dd", "div", "dl", "dt", "fieldset",
		"figcaption", "figure", "footer", "form", "frameset", "h1", "h2", "h3", "h4", "h5", "h6", "header", "hgroup",
		"hr", "legend", "li", "listing", "main", "menu", "nav", "ol", "optgroup", "option", "p", "plaintext", "pre",
		"search", "section", "select", "datalist", "summary", "ul", "xmp", "button", "label", "textarea",
		"table", "caption", "colgroup", "col", "tbody", "thead", "tfoot", "tr", "td", "th",
		"iframe", "noframes", "noembed", "object", "video", "audio", "canvas", "map", "rt", "rp":
		return true
	}
	return false
}

// htmlHidden reports elements whose text is no prose.
func htmlHidden(name string) bool {
	switch name {
	case "script", "style", "template", "pre", "listing", "xmp", "plaintext", "textarea", "iframe", "noembed", "noframes",
		"code", "kbd", "samp", "var", "tt", "svg", "math", "del":
		return true
	}
	return false
}

// htmlHeading reports headings and titles.
func htmlHeading(name string) bool {
	switch name {
	case "h1", "h2", "h3", "h4", "h5", "h6", "title":
		return true
	}
	return false
}

// htmlEnds reports that the start tag of an element ends an open one, whose end
// tag may be left out.
func htmlEnds(start, open string) bool {
	switch open {
	case "p":
		return htmlEndsParagraph(start)
	case "li", "tr", "optgroup":
		return start == open
	case "dt", "dd":
		return start == "dt" || start == "dd"
	case "option":
		return start == "option" || start == "optgroup"
	case "rt", "rp":
		return start == "rt" || start == "rp"
	case "td", "th":
		return start == "td" || start == "th" || start == "tr" || htmlTablePart(start)
	case "thead", "tbody", "tfoot", "caption", "colgroup":
		return htmlTablePart(start) || start == "tr" && (open == "caption" || open == "colgroup")
	case "head":
		return start == "body"
	}
	return false
}

func htmlTablePart(name string) bool {
	return name == "thead" || name == "tbody" || name == "tfoot"
}

// htmlEndsParagraph reports elements that cannot stand inside a paragraph.
func htmlEndsParagraph(start string) bool {
	switch start {
	case "script", "style", "template", "noscript", "slot", "option", "optgroup", "select", "datalist", "button", "label",
		"textarea", "iframe", "noembed", "object", "video", "audio", "canvas", "map", "meta", "link", "rt", "rp":
		return false
	}
	return htmlBlock(start)
}

// htmlBars reports elements that keep what is open around them from being ended
// by a start tag inside them.
func htmlBars(start, open string) bool {
	switch open {
	case "table", "template", "object", "button", "select", "html", "body":
		return true
	case "ul", "ol", "menu":
		return start == "li"
	case "dl":
		return start == "dt" || start == "dd"
	case "ruby":
		return true
	}
	return false
}
