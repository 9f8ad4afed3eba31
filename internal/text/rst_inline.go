package text

import (
	"bytes"
	"strings"
	"unicode/utf8"
)

// farInline is the length in bytes from which a short inline construct is taken
// for plain characters.
const farInline = 200

// inline takes source[from:to] less its inline markup.
func (d *rst) inline(p *prose, from, to int) {
	for from < to {
		i := bytes.IndexAny(d.source[from:to], "\\`*|[_:")
		if i < 0 {
			break
		}
		p.folded(from, from+i, p.verbatim)
		from = d.construct(p, from+i, to)
	}
	if from < to {
		p.folded(from, to, p.verbatim)
	}
}

// construct takes the inline construct at i, or the character there, and returns
// the place behind it.
func (d *rst) construct(p *prose, i, to int) int {
	rest := d.source[i:to]
	before, after := byte(' '), byte(' ')
	if i > 0 {
		before = d.source[i-1]
	}
	if len(rest) > 1 {
		after = rest[1]
	}
	behind, ahead := wordBefore(d.source[:i]), wordAt(rest[1:])
	switch c := rest[0]; {
	case c == '\\':
		return d.escaped(p, i, to)
	case c == '`' && behind: // markup begins behind white space or a sign
		n := len(rest) - len(bytes.TrimLeft(rest, "`"))
		p.verbatim(i, i+n)
		return i + n
	case c == '`':
		return d.quoted(p, i, to, "")
	case c == ':':
		if n := roleMark(rest); n > 0 {
			return d.quoted(p, i, to, string(rest[1:n-1]))
		}
	case c == '*' && !(behind && ahead) && !(isSpaceByte(before) && isSpaceByte(after)):
		return i + 1
	case c == '_' && !ahead && (behind || before == '_'), c == '_' && after == '`':
		return i + 1
	case c == '|' && !isSpaceByte(after) && !behind:
		if n := bytes.IndexByte(rest[1:min(len(rest), farInline)], '|'); n > 0 && !isSpaceByte(rest[n]) {
			p.standIn(placeholder, i, i+n+2)
			return i + n + 2
		}
	case c == '[':
		if n := bytes.Index(rest[:min(len(rest), farInline)], []byte("]_")); n > 0 && !bytes.ContainsAny(rest[1:n], " \n[") {
			return i + n + 2
		}
	}
	p.verbatim(i, i+1)
	return i + 1
}

// wordBefore reports that a letter, digit or part of one ends b.
func wordBefore(b []byte) bool {
	r, n := utf8.DecodeLastRune(b)
	return n > 0 && wordRune(r, n)
}

// wordAt reports that b begins with a letter, digit or part of one.
func wordAt(b []byte) bool {
	r, n := utf8.DecodeRune(b)
	return n > 0 && wordRune(r, n)
}

func wordRune(r rune, n int) bool {
	if r < utf8.RuneSelf {
		return classes[r]&cAlnum != 0
	}
	c := classOf(r, n)
	return c != rSpace && c != rSymbol
}

// escaped takes a backslash and the character that it makes plain.
func (d *rst) escaped(p *prose, i, to int) int {
	if i+1 >= to {
		return to
	}
	c := d.source[i+1]
	switch {
	case isSpaceByte(c):
		return i + 2
	case c >= 0x80:
		return i + 1
	}
	p.standIn(string(rune(c)), i, i+2)
	return i + 2
}

// roleMark returns the length of ":role:" before a back quote, 0 when there is
// none.
func roleMark(b []byte) int {
	for n := 1; n < min(len(b), 64); n++ {
		switch c := b[n]; {
		case c == '`' && n > 2 && b[n-1] == ':':
			return n
		case classes[c]&cAlnum == 0 && c != ':' && c != '-' && c != '+' && c != '.' && c != '_':
			return 0
		}
	}
	return 0
}

// quoted takes what stands in back quotes: a literal, a reference or interpreted
// text, whose role stands before it where there is one.
func (d *rst) quoted(p *prose, i, to int, role string) int {
	open := i
	if role != "" {
		open += len(role) + 2
	}
	if bytes.HasPrefix(d.source[open:to], []byte("``")) {
		if n := bytes.Index(d.source[open+2:to], []byte("``")); n > 0 {
			end := open + 2 + n + 2
			p.standIn(placeholder, i, end)
			return end
		}
		p.verbatim(i, open+2)
		return open + 2
	}
	n := bytes.IndexByte(d.source[open+1:to], '`')
	if n <= 0 {
		p.verbatim(i, open+1)
		return open + 1
	}
	from, end := open+1, open+1+n
	behind := end + 1
	reference := behind < to && d.source[behind] == '_'
	for behind < to && reference && d.source[behind] == '_' {
		behind++
	}
	text := d.source[from:end]
	target := targetIn(text)
	switch {
	case (reference || referringRole(role)) && target > 0:
		end = from + target
	case !reference && !proseRole(role) && !(role == "" && (wordy(text) || open > 0 && d.source[open-1] == '_')):
		p.standIn(placeholder, i, behind)
		return behind
	}
	outer := p.fixed
	p.fixed = outer || target <= 0 && (behind == end+2 || strings.EqualFold(role, "term")) // it names its target
	d.inline(p, from, end)
	p.fixed = outer
	return behind
}

// targetIn returns where the white space before a target in angle brackets begins,
// at the end of the text of a reference; 0 or less when there is none.
func targetIn(text []byte) int {
	n := bytes.LastIndexByte(text, '<')
	if n < 1 || !isSpaceByte(text[n-1]) {
		return 0
	}
	return len(bytes.TrimRight(text[:n], " \t\r\n"))
}

// proseRole reports roles whose text is prose.
func proseRole(role string) bool {
	switch strings.ToLower(role) {
	case "emphasis", "strong", "title-reference", "title", "t", "sub", "subscript", "sup", "superscript", "dfn", "guilabel",
		"menuselection", "abbr", "abbreviation", "term", "index", "small-caps":
		return true
	}
	return false
}

// referringRole reports roles that may have a text before their target.
func referringRole(role string) bool {
	switch strings.ToLower(role) {
	case "ref", "doc", "term", "any", "numref", "download", "std:ref", "std:doc", "std:term", "abbr", "index":
		return true
	}
	return false
}

var rstEscapes = strings.NewReplacer(`\`, `\\`, "*", `\*`, "`", "\\`", "|", `\|`, "_", `\_`)

// escapeRST spells words so that none of their characters is markup.
func escapeRST(words string) (string, bool) { return rstEscapes.Replace(words), true }
