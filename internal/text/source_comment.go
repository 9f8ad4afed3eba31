package text

import "bytes"

// comment reads the lines of one comment. Blank lines, list marks, tags and what
// is no prose end a block.
func (c *codeReader) comment(lines []stretch, in *enclosure) {
	r := commentReader{codeReader: c, prose: prose{source: c.source}, in: in, margin: marginOf(c.source, lines)}
	for i, l := range lines {
		r.line(l, i == 0)
	}
	r.finish()
}

// commentReader holds the state between the lines of a comment.
type commentReader struct {
	*codeReader
	prose   prose
	in      *enclosure
	margin  int    // columns before most lines
	fence   []byte // what closes the code at hand, nil outside of code
	code    bool   // the last line was blank, or code by its indentation
	members bool   // names with what they mean follow: "Args:"
}

func (r *commentReader) finish() {
	r.add(&r.prose, r.in)
	r.prose = prose{source: r.source, end: r.prose.end}
}

// line reads a line of the comment.
func (r *commentReader) line(l stretch, first bool) {
	from, to := trimSpace(r.source, l.from, l.to)
	line := r.source[from:to]
	switch {
	case r.fence != nil:
		if bytes.HasPrefix(line, r.fence) {
			r.fence = nil
		}
		return
	case ruled(line):
		r.finish()
		r.fence = fenceOf(line)
		r.code = len(line) == 0 || r.code
		return
	case fenceOf(line) != nil:
		r.finish()
		r.fence = fenceOf(line)
		return
	case r.code && !first && columns(r.source[l.from:from]) >= r.margin+4:
		return
	}
	r.code = false
	if namesFollow(line) {
		r.finish()
		r.members = true
		return
	}
	if directive(line, from == l.from) || codeLine(line) {
		r.finish()
		return
	}
	r.members = r.members && columns(r.source[l.from:from]) > r.margin
	skipped, whole := docTag(line, r.members)
	if whole {
		r.finish()
		return
	}
	if skipped > 0 || listMark(line) {
		r.finish()
	}
	r.inline(from+skipped, to)
	r.prose.lineBreak(l.to)
}

// inline takes source[from:to], code in it as a placeholder.
func (r *commentReader) inline(from, to int) {
	r.prose.decodedBy(from, to, "`{\\@", func(b []byte) (string, int) {
		if n := inlineCode(b); n > 1 {
			return placeholder, n
		}
		return "", 1
	})
}

// inlineCode returns the length of code that begins a line: between back quotes, a
// tag in braces ({@code x}), or a word behind one of the tags for code (\c x, @p x).
func inlineCode(b []byte) int {
	const longest = 200 // bytes; bounds the search
	b = b[:min(len(b), longest)]
	switch b[0] {
	case '`':
		n := 1
		for n < len(b) && b[n] == '`' {
			n++
		}
		if i := bytes.Index(b[n:], b[:n]); i > 0 {
			return i + 2*n
		}
	case '{':
		if i := bytes.IndexByte(b, '}'); i > 2 && b[1] == '@' {
			return i + 1
		}
	case '\\', '@':
		word, rest, ok := bytes.Cut(b[1:], []byte(" "))
		switch string(word) {
		case "c", "p", "a", "ref", "link":
			if ok {
				return 2 + len(word) + wordLength(rest)
			}
		}
	}
	return 1
}

// wordLength is how many bytes stand before the next white space, punctuation that
// ends them aside.
func wordLength(b []byte) int {
	if i := bytes.IndexAny(b, " \t"); i >= 0 {
		b = b[:i]
	}
	return len(bytes.TrimRight(b, ".,;:!?)"))
}

// marginOf is the least indentation of lines that are not blank, the first
// aside when there are others.
func marginOf(source []byte, lines []stretch) int {
	least := -1
	for i, l := range lines {
		from, to := trimSpace(source, l.from, l.to)
		if from == to || i == 0 && len(lines) > 1 && least < 0 && l.from == from {
			continue
		}
		if n := columns(source[l.from:from]); least < 0 || n < least {
			least = n
		}
	}
	return max(0, least)
}

// columns is how wide white space is, with tabs to every eighth column.
func columns(space []byte) int {
	n := 0
	for _, c := range space {
		if n++; c == '\t' {
			n = (n + 7) &^ 7
		}
	}
	return n
}

// fenceOf returns the fence that opens code, three or more of ` or ~, nil for any
// other line.
func fenceOf(line []byte) []byte {
	for _, mark := range []string{"```", "~~~"} {
		if bytes.HasPrefix(line, []byte(mark)) {
			return []byte(mark)
		}
	}
	return nil
}
