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
	rest := bytes.TrimSpace(bytes.TrimPrefix(b[1:end], []byte(":")))
	for len(rest) > 0 {
		n := attributeItem(rest)
		if n == 0 {
			return 0
		}
		rest = bytes.TrimSpace(rest[n:])
	}
	return end + 1
}

// attributeItem returns the length of the first of a list of attributes, 0 when
// it is none.
func attributeItem(b []byte) int {
	n := bytes.IndexAny(b, " \t\n")
	if n < 0 {
		n = len(b)
	}
	switch i := bytes.IndexByte(b[:n], '='); {
	case (b[0] == '#' || b[0] == '.') && n > 1:
		return n
	case i <= 0 || !all(b[:i], cLetter|cHyphen):
		return 0
	case i+1 < n && b[i+1] == '"':
		if k := bytes.IndexByte(b[i+2:], '"'); k >= 0 {
			return i + 2 + k + 1
		}
	}
	return n
}
