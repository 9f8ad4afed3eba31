package text

import "bytes"

// filledIn returns the length of what a template engine fills in at the start of b:
// "{{ name }}", "{% include x %}", "<%= name %>"; 0 when there is none.
func filledIn(b []byte) int {
	for _, pair := range [...][2]string{{"{{", "}}"}, {"{%", "%}"}, {"<%", "%>"}} {
		if !bytes.HasPrefix(b, []byte(pair[0])) {
			continue
		}
		if i := bytes.Index(b[2:min(len(b), farInline)], []byte(pair[1])); i >= 0 {
			return i + 4
		}
	}
	return 0
}

// attributeList returns the length of a list of attributes in braces, as dialects
// of Markdown have it behind what it is about: "{#id .class key="value"}", with a
// colon behind the brace in some; 0 when there is none.
func attributeList(b []byte) int {
	b = b[:min(len(b), farInline)]
	end := bytes.IndexByte(b, '}')
	if end < 2 || b[0] != '{' {
		return 0
	}
	for item := range bytes.FieldsSeq(bytes.TrimPrefix(b[1:end], []byte(":"))) {
		switch i := bytes.IndexByte(item, '='); {
		case (item[0] == '#' || item[0] == '.') && len(item) > 1:
		case i > 0 && all(item[:i], cLetter|cHyphen):
		default:
			return 0
		}
	}
	return end + 1
}
