package text

import "bytes"

// inline takes source[from:to] less its inline markup.
func (d *asciiDoc) inline(p *prose, from, to int) {
	start := from
	for from < to {
		i := bytes.IndexAny(d.source[from:to], "\\`*_#^~+{<[(:&\"'$")
		if i < 0 {
			break
		}
		i += from
		if d.source[i] == ':' {
			if name := macroName(d.source[from:i]); knownMacro(name) {
				if m, ok := macroAt(d.source, i, to); ok {
					p.folded(from, i-len(name), p.verbatim)
					from = d.macro(p, name, i-len(name), m)
					continue
				}
			}
		}
		p.folded(from, i, p.verbatim)
		from = d.construct(p, start, i, to)
	}
	if from < to {
		p.folded(from, to, p.verbatim)
	}
}

// construct takes the inline construct at i, or the character there, of the text
// from start to to, and returns the place behind it.
func (d *asciiDoc) construct(p *prose, start, i, to int) int {
	rest := d.source[i:to]
	before, after := byte(' '), byte(' ')
	if i > 0 {
		before = d.source[i-1]
	}
	if len(rest) > 1 {
		after = rest[1]
	}
	far := rest[:min(len(rest), farInline)]
	behind := wordBefore(d.source[:i])
	switch c := rest[0]; {
	case c == '\\' && bytes.IndexByte([]byte("`*_#^~+{<[:&|\"'("), after) >= 0:
		p.standIn(string(rune(after)), i, i+2)
		return i + 2
	case (c == '"' || c == '\'') && after == '`', c == '`' && (after == '"' || after == '\'') && (behind || bytes.IndexByte([]byte(".,!?"), before) >= 0):
		return d.curved(p, i)
	case c == '`' || c == '+' || c == '$' && after == '$':
		return d.verbatim(p, i, to)
	case c == '*' || c == '_':
		if after == c || before == c || !(behind && wordAt(rest[1:])) && !(isSpaceByte(before) && isSpaceByte(after)) {
			return i + 1
		}
	case c == '#' || c == '^' || c == '~':
		return d.paired(p, i, d.source[max(i-farInline, start):i], far)
	case c == '{':
		if n := bytes.IndexByte(far, '}'); n > 1 && !bytes.ContainsAny(far[:n], " \n") {
			p.standIn(attributeText(string(far[1:n])), i, i+n+1)
			return i + n + 1
		}
	case c == '<' && after == '<':
		if n := bytes.Index(far, []byte(">>")); n > 2 {
			return d.reference(p, i, i+n)
		}
	case c == '[':
		if n := bytes.IndexByte(far, ']'); n > 0 && (after == '[' || n+1 < len(far) && (after == '.' || after == '#') && bytes.IndexByte([]byte("#*_`"), far[n+1]) >= 0) {
			if after == '[' {
				n++
			}
			return min(i+n+1, to)
		}
	case c == '(' && after == '(':
		return d.indexTerm(p, i, far)
	case c == '&':
		if text, n := reference(rest); n > 1 {
			p.standIn(text, i, i+n)
			return i + n
		}
	}
	p.verbatim(i, i+1)
	return i + 1
}

// curved takes a sign and a back quote, which stand for a typographic quotation
// mark.
func (d *asciiDoc) curved(p *prose, i int) int {
	marks := map[string]string{"\"`": "\u201C", "`\"": "\u201D", "'`": "\u2018", "`'": "\u2019"}
	p.standIn(marks[string(d.source[i:i+2])], i, i+2)
	return i + 2
}

// verbatim takes code and passed-through text between equal signs.
func (d *asciiDoc) verbatim(p *prose, i, to int) int {
	c := d.source[i]
	n := 1
	for i+n < to && d.source[i+n] == c && n < 3 {
		n++
	}
	open := i+n < to && !isSpaceByte(d.source[i+n])
	if mark := d.source[i : i+n]; open && (n > 1 || !wordBefore(d.source[:i])) {
		if k := bytes.Index(d.source[i+n:to], mark); k > 0 && !isSpaceByte(d.source[i+n+k-1]) {
			end := i + n + k + n
			p.standIn(placeholder, i, end)
			return end
		}
	}
	p.verbatim(i, i+n)
	return i + n
}

// paired leaves out a sign that has a partner behind or before it: what is between
// begins and ends without a space and, unless it is marked text, has none.
func (d *asciiDoc) paired(p *prose, i int, earlier, far []byte) int {
	c := far[0]
	n := 1
	for n < len(far) && far[n] == c {
		n++
	}
	between := func(b []byte) bool {
		return len(b) > 0 && !isSpaceByte(b[0]) && !isSpaceByte(b[len(b)-1]) && (c == '#' || bytes.IndexByte(b, ' ') < 0)
	}
	next, last := bytes.IndexByte(far[n:], c), bytes.LastIndexByte(earlier, c)
	if (next < 0 || !between(far[n:n+next])) && (last < 0 || !between(earlier[last+1:])) {
		p.verbatim(i, i+n)
	}
	return i + n
}

// attributeText returns what a reference to an attribute stands for.
func attributeText(name string) string {
	switch name {
	case "sp", "nbsp":
		return " "
	case "apos", "rsquo":
		return "\u2019"
	case "lsquo":
		return "\u2018"
	case "ldquo":
		return "\u201C"
	case "rdquo":
		return "\u201D"
	case "plus":
		return "+"
	case "amp":
		return "&"
	}
	return placeholder
}

// reference takes a cross reference between << and the >> at end: its text, or a
// placeholder when it has none.
func (d *asciiDoc) reference(p *prose, i, end int) int {
	if n := bytes.IndexByte(d.source[i:end], ','); n > 0 {
		d.inline(p, i+n+1, end)
	} else {
		p.standIn(placeholder, i, end+2)
	}
	return end + 2
}

// indexTerm leaves out the marks of a term of the index, and one that is not shown
// altogether.
func (d *asciiDoc) indexTerm(p *prose, i int, far []byte) int {
	if n := bytes.Index(far, []byte(")))")); n > 0 && far[min(2, len(far)-1)] == '(' {
		return i + n + 3
	}
	if n := bytes.Index(far, []byte("))")); n > 0 {
		d.inline(p, i+2, i+n)
		return i + n + 2
	}
	p.verbatim(i, i+2)
	return i + 2
}
