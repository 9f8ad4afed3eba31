package text

import "bytes"

// Bounds on markup, per stretch of lines without a blank one and without a new
// list item. Real documents do
// not come near them; past them some parsing is quadratic (100 KB of "[a](b"
// take seconds) or multiplies memory (a short row of a wide table still gets
// every cell).
const (
	mostMarks   = 1000  // brackets, emphasis marks, back quotes and tags
	mostNesting = 16    // quotes and lists that open in one line
	mostCells   = 50000 // lines times columns of what may be a table
)

// tamed returns source, or a copy of the same length in which marks beyond the
// bounds are plain characters. Only the structure is read from the copy; the
// text always comes from the source. The fences of code blocks are never touched.
func tamed(source []byte) []byte {
	t := tamer{out: source, source: source}
	var stretch []textLine
	for _, l := range splitLines(nil, source) {
		fence := isFence(source[l.start:l.end])
		if l.blank() || fence {
			t.stretch(stretch)
			stretch = stretch[:0]
		}
		if !l.blank() && !fence {
			stretch = append(stretch, l)
		}
	}
	t.stretch(stretch)
	return t.out
}

func isFence(line []byte) bool {
	return bytes.HasPrefix(line, []byte("```")) || bytes.HasPrefix(line, []byte("~~~"))
}

type tamer struct{ source, out []byte }

// blunt replaces a mark in the copy.
func (t *tamer) blunt(i int) {
	if &t.out[0] == &t.source[0] {
		t.out = bytes.Clone(t.source)
	}
	t.out[i] = 'x'
}

func (t *tamer) stretch(lines []textLine) {
	columns, marks := 0, 0
	for _, l := range lines {
		columns = max(columns, bytes.Count(t.source[l.start:l.end], []byte("|")))
	}
	table := columns*len(lines) <= mostCells
	for _, l := range lines {
		t.nesting(l)
		if t.bullet(l) {
			marks = 0
		}
		for i := l.start; i < l.end; i++ {
			switch t.source[i] {
			case '[', '*', '_', '`', '<', '~':
				if marks++; marks > mostMarks {
					t.blunt(i)
				}
			case '|':
				if !table {
					t.blunt(i)
				}
			}
		}
	}
}

// bullet reports that a line begins a list item of the outermost list, and so
// ends any paragraph before it.
func (t *tamer) bullet(l textLine) bool {
	indent := l.start
	for indent > 0 && t.source[indent-1] == ' ' {
		indent--
	}
	edge := indent == 0 || t.source[indent-1] == '\n' || t.source[indent-1] == '\r'
	if !edge || l.start-indent > 3 || l.end-l.start < 3 || t.source[l.start+1] != ' ' {
		return false
	}
	c := t.source[l.start]
	return c == '-' || c == '+' || c == '*'
}

// nesting blunts the quote and list marks at the start of a line past the bound.
func (t *tamer) nesting(l textLine) {
	depth := 0
	for i := l.start; i < l.end; {
		c := t.source[i]
		digits := i
		for digits < l.end && classes[t.source[digits]]&cDigit != 0 {
			digits++
		}
		switch {
		case c == ' ' || c == '\t':
			i++
			continue
		case digits > i && digits < l.end && (t.source[digits] == '.' || t.source[digits] == ')'):
			i = digits
		case c != '>' && c != '-' && c != '+' && c != '*':
			return
		}
		if depth++; depth > mostNesting {
			t.blunt(i)
		}
		i++
	}
}
