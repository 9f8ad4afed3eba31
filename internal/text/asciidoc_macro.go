package text

import "bytes"

// farMacro bounds the target and the text of an inline macro, in bytes.
const farMacro = 2000

// inlineMacro is what stands behind the name of an inline macro.
type inlineMacro struct {
	target   bool
	from, to int // of the text in brackets
}

// macroName returns the letters at the end of b, "" when a letter of another kind
// stands before them. A footnote may stand at the end of a word.
func macroName(b []byte) string {
	for _, name := range []string{"footnote", "footnoteref"} {
		if bytes.HasSuffix(b, []byte(name)) {
			return name
		}
	}
	i := len(b)
	for i > 0 && len(b)-i < 16 && classes[b[i-1]]&cLower != 0 {
		i--
	}
	if wordBefore(b[:i]) {
		return ""
	}
	return string(b[i:])
}

// macroAt reads ":target[text]" at i.
func macroAt(source []byte, i, to int) (m inlineMacro, ok bool) {
	bound := min(to, i+farMacro)
	open := i + 1
	for open < bound && source[open] != '[' && !isSpaceByte(source[open]) {
		open++
	}
	if open >= bound || source[open] != '[' {
		return m, false
	}
	m = inlineMacro{target: open > i+1, from: open + 1}
	for m.to = m.from; m.to < bound; m.to++ {
		switch source[m.to] {
		case '\\':
			m.to++
		case ']':
			return m, true
		}
	}
	return m, false
}

// knownMacro reports the names of inline macros.
func knownMacro(name string) bool {
	switch name {
	case "link", "xref", "http", "https", "ftp", "irc", "mailto", "footnote", "footnoteref", "image", "icon", "kbd", "btn", "menu",
		"pass", "stem", "latexmath", "asciimath", "indexterm", "anchor", "include":
		return true
	}
	return false
}

// macro takes an inline macro whose name begins at start, and returns the place
// behind it.
func (d *asciiDoc) macro(p *prose, name string, start int, m inlineMacro) int {
	text := bytes.TrimSpace(d.source[m.from:m.to])
	switch name {
	case "footnote", "footnoteref":
		d.emit(false, [2]int{m.from, m.to})
	case "indexterm", "anchor":
	case "image":
		d.alternative(m.from, m.to)
		p.standIn(placeholder, start, m.to+1)
	case "link", "xref", "http", "https", "ftp", "irc", "mailto":
		if len(text) == 0 {
			p.standIn(placeholder, start, m.to+1)
			break
		}
		d.inline(p, m.from, m.from+linkText(d.source[m.from:m.to]))
	default:
		p.standIn(placeholder, start, m.to+1)
	}
	return m.to + 1
}

// linkText returns the length of the text of a link, less its attributes and the
// sign that asks for a new window.
func linkText(b []byte) int {
	n := len(b)
	if i := bytes.IndexByte(b, '='); i > 0 {
		if comma := bytes.LastIndexByte(b[:i], ','); comma >= 0 {
			n = comma
		}
	}
	if n > 0 && b[n-1] == '^' {
		n--
	}
	return n
}
