package text

import (
	"bytes"
	"cmp"
	"io"
	"slices"
)

// readRST reads a whole reStructuredText document and yields a block for each
// paragraph, title, item, term, field, line of a line block, table cell, caption
// and footnote. Comments, literal and doctest blocks, names of fields and options,
// targets, and directives that hold no prose are left out; inline literals,
// substitutions and roles that are code are one U+FFFC.
//
// Syntax: the reStructuredText Markup Specification and Directives of docutils,
// from memory.
func readRST(r io.Reader, o Options, yield func(*Block, error) bool) {
	readWhole(r, o, yield, func(source []byte) ([]*Block, error) {
		d := rst{source: source, lines: indentedLines(source)}
		d.body(0, len(d.lines), 0)
		slices.SortStableFunc(d.blocks, func(a, b *Block) int { return cmp.Compare(a.offset, b.offset) })
		return d.blocks, nil
	})
}

// mostIndented bounds how deep lists, quotes and directives are told apart.
const mostIndented = 24

// tabStop is the width of a tab stop in columns.
const tabStop = 8

// indentedLine is a line less the white space around it, with the column at which
// it begins.
type indentedLine struct {
	start, end, indent int
}

func (l indentedLine) blank() bool { return l.start == l.end }

// indentedLines cuts a source into lines.
func indentedLines(source []byte) []indentedLine {
	var all []indentedLine
	begin := bomLen(source)
	for _, l := range splitLines(nil, source[begin:]) {
		indent, from := 0, begin+l.start
		for from > begin && (source[from-1] == ' ' || source[from-1] == '\t') {
			from--
		}
		for _, c := range source[from : begin+l.start] {
			if indent++; c == '\t' {
				indent = (indent + tabStop - 1) / tabStop * tabStop
			}
		}
		all = append(all, indentedLine{begin + l.start, begin + l.end, indent})
	}
	return all
}

type rst struct {
	source []byte
	lines  []indentedLine
	blocks []*Block
	depth  int
}

// line returns the bytes of a line.
func (d *rst) line(i int) []byte { return d.source[d.lines[i].start:d.lines[i].end] }

// inside returns the end of the lines from i on, before bound, that are blank or
// indented by more than indent.
func (d *rst) inside(i, bound, indent int) int {
	last := i
	for ; i < bound; i++ {
		switch l := d.lines[i]; {
		case l.blank():
			continue
		case l.indent <= indent:
			return last
		}
		last = i + 1
	}
	return last
}

// body reads the lines from i to bound, which begin at a column.
func (d *rst) body(i, bound, indent int) {
	if d.depth++; d.depth > mostIndented {
		d.depth--
		d.paragraph(i, bound)
		return
	}
	for i < bound {
		switch {
		case d.lines[i].blank():
			i++
		case d.lines[i].indent != indent:
			end := d.inside(i, bound, d.lines[i].indent-1)
			d.body(i, end, d.lines[i].indent)
			i = end
		default:
			i = d.element(i, bound, indent)
		}
	}
	d.depth--
}

// element reads what begins at line i and returns the line behind it.
func (d *rst) element(i, bound, indent int) int {
	line := d.line(i)
	if end := d.title(i, bound); end > i {
		return end
	}
	switch {
	case bytes.HasPrefix(line, []byte("..")) && (len(line) == 2 || isSpaceByte(line[2])):
		return d.explicit(i, bound, indent)
	case bytes.HasPrefix(line, []byte("__ ")):
		return i + 1
	case bytes.HasPrefix(line, []byte(">>> ")):
		return d.stretch(i, bound)
	case bytes.HasPrefix(line, []byte("+-")) && line[len(line)-1] == '+':
		return d.gridTable(i, bound)
	case simpleBorder(line):
		return d.simpleTable(i, bound)
	case bytes.HasPrefix(line, []byte("| ")):
		d.emit(false, [2]int{d.lines[i].start + 2, d.lines[i].end})
		return i + 1
	}
	if n := fieldMark(line); n > 0 {
		return d.marked(i, bound, indent, n)
	}
	if n := bulletMark(line); n > 0 {
		return d.item(i, bound, n)
	}
	if n := optionMark(line); n > 0 {
		return d.marked(i, bound, indent, n)
	}
	return d.text(i, bound, indent)
}

// stretch returns the end of the lines without a blank one.
func (d *rst) stretch(i, bound int) int {
	for i < bound && !d.lines[i].blank() {
		i++
	}
	return i
}

// title reads a section title or transition at line i; it returns i when there is
// none.
func (d *rst) title(i, bound int) int {
	line := d.line(i)
	over := adornment(line)
	switch {
	case over > 0 && i+2 < bound && !d.lines[i+1].blank() && adornment(d.line(i+2)) > 0 && d.line(i + 2)[0] == line[0]:
		d.heading(i + 1)
		return i + 3
	case over > 3 && (i+1 == bound || d.lines[i+1].blank()):
		return i + 1
	case over == 0 && i+1 < bound && d.lines[i+1].indent == d.lines[i].indent:
		under := adornment(d.line(i + 1))
		if under > 3 || under > 0 && under >= len([]rune(string(line))) {
			d.heading(i)
			return i + 2
		}
	}
	return i
}

func (d *rst) heading(i int) {
	d.emit(true, [2]int{d.lines[i].start, d.lines[i].end})
}

// adornment returns the length of a line of one repeated sign, 0 for others.
func adornment(line []byte) int {
	if len(line) < 2 || classes[line[0]]&(cAlnum|cSpace|cControl|cHigh) != 0 {
		return 0
	}
	for _, c := range line {
		if c != line[0] {
			return 0
		}
	}
	if string(line) == "::" || string(line) == ".." {
		return 0
	}
	return len(line)
}

// item reads a list item whose mark takes n bytes of line i.
func (d *rst) item(i, bound, n int) int {
	before := d.lines[i].indent
	d.advance(i, n)
	end := d.inside(i+1, bound, before)
	d.body(i, max(end, i+1), d.lines[i].indent)
	return max(end, i+1)
}

// advance lets line i begin n bytes and the white space after them further on.
func (d *rst) advance(i, n int) {
	l := &d.lines[i]
	for n < l.end-l.start && isSpaceByte(d.source[l.start+n]) {
		n++
	}
	l.start += n
	l.indent += n
}

// marked reads a field or option: what its mark of n bytes marks is a body.
func (d *rst) marked(i, bound, indent, n int) int {
	end := max(d.inside(i+1, bound, indent), i+1)
	d.advance(i, n)
	d.bodyBehind(i, end)
	return end
}

// bodyBehind reads a body whose first line stands behind a mark, and whose others
// have an indent of their own.
func (d *rst) bodyBehind(i, end int) {
	for j := i + 1; j < end; j++ {
		if !d.lines[j].blank() {
			d.lines[i].indent = d.lines[j].indent
			break
		}
	}
	if d.lines[i].blank() {
		i++
	}
	if i < end {
		d.body(i, end, d.lines[i].indent)
	}
}

// text reads a paragraph or defined term at line i, and passes over the literal
// block that it announces.
func (d *rst) text(i, bound, indent int) int {
	end := i + 1
	for end < bound && !d.lines[end].blank() && d.lines[end].indent == indent {
		end++
	}
	if end < bound && end == i+1 && d.lines[end].indent > indent && !d.lines[end].blank() { // a term
		l := d.lines[i]
		if n := bytes.Index(d.line(i), []byte(" : ")); n >= 0 {
			l.end = l.start + n
		}
		d.emit(false, [2]int{l.start, l.end})
		return end
	}
	d.paragraph(i, end)
	if bytes.HasSuffix(d.line(end-1), []byte("::")) {
		return d.literal(end, bound, indent)
	}
	return end
}

// paragraph takes lines as one block.
func (d *rst) paragraph(i, end int) {
	if i >= end {
		return
	}
	to := d.lines[end-1].end
	if bytes.HasSuffix(d.source[:to], []byte("::")) {
		to-- // one colon is shown
		if last := d.lines[end-1]; last.end-last.start == 2 {
			to--
		}
	}
	d.emit(false, [2]int{d.lines[i].start, to})
}

// literal passes over the literal block from line i on: the indented lines, or
// those that begin with the same sign.
func (d *rst) literal(i, bound, indent int) int {
	first := i
	for first < bound && d.lines[first].blank() {
		first++
	}
	if first == bound || d.lines[first].indent > indent {
		return d.inside(first, bound, indent)
	}
	sign := d.line(first)[0]
	if d.lines[first].indent < indent || classes[sign]&(cAlnum|cHigh) != 0 {
		return i
	}
	for first < bound && !d.lines[first].blank() && d.line(first)[0] == sign {
		first++
	}
	return first
}

// emit makes a block of stretches of the source.
func (d *rst) emit(heading bool, stretches ...[2]int) {
	if b := stretchesBlock(d.source, d.inline, stretches...); b != nil {
		b.Heading, b.escape = heading, escapeRST
		d.blocks = append(d.blocks, b)
	}
}
