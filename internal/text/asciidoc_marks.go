package text

import (
	"bytes"
	"unicode/utf8"
)

// delimiter returns the sign of a line that opens or closes a delimited block, '|'
// for those of tables and 'o' for those of open blocks; 0 for others.
func delimiter(line []byte) byte {
	switch {
	case string(line) == "--":
		return 'o'
	case bytes.HasPrefix(line, []byte("```")) && bytes.IndexByte(line[3:], '`') < 0:
		return '`'
	case len(line) < 4:
		return 0
	case len(line) < 60 && bytes.IndexByte([]byte("|,:!"), line[0]) >= 0 && bytes.Count(line[1:], []byte("=")) == len(line)-1:
		return '|'
	case bytes.IndexByte([]byte("/-.+=*_"), line[0]) < 0 || bytes.Count(line, line[:1]) != len(line):
		return 0
	}
	return line[0]
}

// attributeEntry reports ":name: value".
func attributeEntry(line []byte) bool {
	if len(line) < 3 || line[0] != ':' || line[1] == ':' {
		return false
	}
	i := 1
	for i < len(line) && (classes[line[i]]&(cAlnum|cHyphen) != 0 || line[i] == '_' || line[i] == '!') {
		i++
	}
	return i > 1 && i < len(line) && line[i] == ':' && (i+1 == len(line) || isSpaceByte(line[i+1]))
}

// blockAttributes reports a line in brackets with the attributes or the anchor of
// the next block.
func blockAttributes(line []byte) bool {
	if len(line) < 2 || line[0] != '[' || line[len(line)-1] != ']' {
		return false
	}
	c := line[1]
	return c == '[' || c == '.' || c == '#' || c == '%' || c == ',' || c == '"' || c == ']' || c == '{' ||
		classes[c]&cAlnum != 0 && bytes.IndexByte(line[:len(line)-1], ']') < 0
}

// blockStyle returns the first attribute of such a line.
func blockStyle(line []byte) string {
	end := bytes.IndexAny(line, ",]#.%")
	return string(line[1:max(end, 1)])
}

// verbatimStyle reports styles of blocks that hold no prose.
func verbatimStyle(style string) bool {
	switch style {
	case "source", "listing", "literal", "pass", "stem", "latexmath", "asciimath", "comment", "diagram", "plantuml", "mermaid",
		"graphviz", "ditaa":
		return true
	}
	return false
}

// pageBreak reports a thematic break, a page break or the mark that continues an
// item.
func pageBreak(line []byte) bool {
	switch string(line) {
	case "'''", "---", "- - -", "***", "* * *", "<<<", "+":
		return true
	}
	return false
}

// preprocessed reports directives that may stand inside a paragraph.
func preprocessed(line []byte) bool {
	for _, name := range [...]string{"include::", "ifdef::", "ifndef::", "ifeval::", "endif::"} {
		if bytes.HasPrefix(line, []byte(name)) {
			return true
		}
	}
	return false
}

// titleMark returns the length of the mark of a section title, 0 when there is
// none.
func titleMark(line []byte) int {
	n := 0
	for n < len(line) && n < 7 && line[n] == line[0] && (line[0] == '=' || line[0] == '#') {
		n++
	}
	if n > 0 && n < 7 && n < len(line) && isSpaceByte(line[n]) {
		return n
	}
	return 0
}

// underlined reports a title with a line below it, in the older form.
func underlined(title, below []byte) bool {
	if len(below) < 3 || bytes.IndexByte([]byte("=-~^+"), below[0]) < 0 || bytes.Count(below, below[:1]) != len(below) {
		return false
	}
	difference := utf8.RuneCount(title) - len(below)
	return -2 < difference && difference < 2
}

// asciiDocMark returns the length of the mark of a list item, with the box of a
// task and the white space; 0 when there is none.
func asciiDocMark(line []byte) int {
	n := 0
	switch c := line[0]; {
	case c == '*' || c == '.' || c == '-':
		for n < len(line) && line[n] == c && n < 6 {
			n++
		}
		if c == '-' && n > 1 {
			return 0
		}
	case c == '<':
		n = bytes.IndexByte(line, '>') + 1
		if n < 3 || n > 5 || classes[line[1]]&(cDigit|cPoint) == 0 {
			return 0
		}
	default:
		n = enumerator(line)
	}
	if n == 0 || n >= len(line) || !isSpaceByte(line[n]) {
		return 0
	}
	for n < len(line) && isSpaceByte(line[n]) {
		n++
	}
	for _, box := range [...]string{"[ ] ", "[x] ", "[*] "} {
		if bytes.HasPrefix(line[n:], []byte(box)) {
			return n + len(box)
		}
	}
	return n
}

// termMark finds the mark behind a term: it returns where the term ends and where
// its description begins, 0 and 0 when there is none.
func termMark(line []byte) (from, to int) {
	for i := 1; i+1 < len(line); i++ {
		sign := line[i]
		if sign != ':' && sign != ';' || line[i+1] != sign {
			continue
		}
		end := i
		for end < len(line) && line[end] == sign && end-i < 4 {
			end++
		}
		if end == len(line) {
			return i, end
		}
		if isSpaceByte(line[end]) {
			for end < len(line) && isSpaceByte(line[end]) {
				end++
			}
			return i, end
		}
		i = end
	}
	return 0, 0
}

// admonitionMark returns the length of "NOTE: " and its like.
func admonitionMark(line []byte) int {
	for _, label := range [...]string{"NOTE: ", "TIP: ", "IMPORTANT: ", "WARNING: ", "CAUTION: "} {
		if bytes.HasPrefix(line, []byte(label)) {
			return len(label)
		}
	}
	return 0
}
