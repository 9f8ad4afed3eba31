package text

import (
	"bytes"
	"cmp"
	"io"
	"slices"
	"strings"
	"unicode/utf8"
)

// readAsciiDoc reads the whole document and yields a block for each paragraph,
// title, item, term, table cell, footnote and alternative text of an image.
// Attributes, comments, listings, literal and passthrough blocks and macros without
// text are left out; inline code and attribute references are one U+FFFC.
//
// Syntax: the AsciiDoc Language Documentation, from memory.
func readAsciiDoc(r io.Reader, o Options, yield func(*Block, error) bool) {
	readWhole(r, o, yield, func(source []byte) ([]*Block, error) {
		begin := bomLen(source)
		d := asciiDoc{source: source}
		for _, l := range splitLines(nil, source[begin:]) {
			l.start, l.end, l.next = l.start+begin, l.end+begin, l.next+begin
			d.lines = append(d.lines, l)
		}
		d.body(frontMatterLines(source[begin:]), false)
		slices.SortStableFunc(d.blocks, func(a, b *Block) int { return cmp.Compare(a.offset, b.offset) })
		return d.blocks, nil
	})
}

// frontMatterLines returns how many lines the front matter takes.
func frontMatterLines(source []byte) int {
	return len(splitLines(nil, source[:frontMatter(source)]))
}

type asciiDoc struct {
	source []byte
	lines  []textLine
	blocks []*Block
	style  string // of the next block, from its attribute line
}

// line returns the bytes of a line.
func (d *asciiDoc) line(i int) []byte { return d.source[d.lines[i].start:d.lines[i].end] }

// body reads the lines from i on; nested are those of a cell.
func (d *asciiDoc) body(i int, nested bool) {
	for i < len(d.lines) {
		if d.lines[i].blank() {
			d.style = ""
			i++
			continue
		}
		i = d.element(i, nested)
	}
}

// element reads what begins at line i and returns the line behind it.
func (d *asciiDoc) element(i int, nested bool) int {
	line := d.line(i)
	if end := d.delimited(i, nested); end > i {
		return end
	}
	switch {
	case bytes.HasPrefix(line, []byte("//")) && !bytes.HasPrefix(line, []byte("///")):
		return i + 1
	case attributeEntry(line):
		return d.attribute(i)
	case blockAttributes(line):
		d.style = blockStyle(line)
		return i + 1
	case line[0] == '.' && len(line) > 1 && line[1] != '.' && !isSpaceByte(line[1]):
		d.emit(false, [2]int{d.lines[i].start + 1, d.lines[i].end})
		return i + 1
	case pageBreak(line):
		return i + 1
	}
	if n := titleMark(line); n > 0 {
		return d.title(i, n)
	}
	if end := d.blockMacro(i); end > i {
		return end
	}
	return d.flow(i)
}

// flow reads an item, term or paragraph at line i.
func (d *asciiDoc) flow(i int) int {
	line := d.line(i)
	if verbatimStyle(d.style) {
		return d.stretch(i)
	}
	if n := asciiDocMark(line); n > 0 {
		return d.paragraph(i, n, true)
	}
	if from, to := termMark(line); to > 0 {
		d.emit(false, [2]int{d.lines[i].start, d.lines[i].start + from})
		if to < len(line) {
			return d.paragraph(i, to, true)
		}
		if i++; i < len(d.lines) && d.indented(i) && !d.interrupts(i, true) {
			return d.paragraph(i, 0, true)
		}
		return i
	}
	if d.indented(i) {
		return d.stretch(i)
	}
	if i+1 < len(d.lines) && underlined(line, d.line(i+1)) {
		d.emit(true, [2]int{d.lines[i].start, d.lines[i].end})
		return i + 2
	}
	return d.paragraph(i, admonitionMark(line), false)
}

// indented reports a line that begins with white space.
func (d *asciiDoc) indented(i int) bool {
	at := d.lines[i].start
	for at > 0 && (d.source[at-1] == ' ' || d.source[at-1] == '\t') {
		at--
	}
	return at < d.lines[i].start && (at == 0 || d.source[at-1] == '\n' || d.source[at-1] == '\r')
}

// stretch passes over the lines without a blank one.
func (d *asciiDoc) stretch(i int) int {
	for i < len(d.lines) && !d.lines[i].blank() {
		i++
	}
	return i
}

// delimited reads the line that opens a delimited block: one without prose is
// passed over, of one with prose the line alone. It returns i when there is none.
func (d *asciiDoc) delimited(i int, nested bool) int {
	line, style := d.line(i), d.style
	kind := delimiter(line)
	if kind == 0 {
		return i
	}
	d.style = ""
	switch {
	case kind == '|' && nested:
		return i + 1
	case kind == '|':
		end := d.closing(i)
		if line[0] == '|' {
			d.table(i+1, end)
		}
		return end + 1
	case kind == '/' || kind == '-' || kind == '.' || kind == '+' || kind == '`' || verbatimStyle(style):
		return d.closing(i) + 1
	}
	return i + 1
}

// closing returns the line that closes the block that line i opens, the end of the
// lines when there is none.
func (d *asciiDoc) closing(i int) int {
	mark := d.line(i)
	if mark[0] == '`' {
		mark = mark[:3]
	}
	for i++; i < len(d.lines); i++ {
		if bytes.Equal(d.line(i), mark) {
			return i
		}
	}
	return i
}

// title reads the section title at line i, whose mark takes n bytes. The lines of
// author and revision below the title of the document are passed over.
func (d *asciiDoc) title(i, n int) int {
	line := d.line(i)
	to := len(line)
	if mark := line[:n]; bytes.HasSuffix(line, append([]byte(" "), mark...)) {
		to -= n
	}
	d.emit(true, [2]int{d.lines[i].start + n, d.lines[i].start + max(to, n)})
	i++
	if n == 1 && len(d.blocks) == 1 {
		for i < len(d.lines) && !d.lines[i].blank() && !attributeEntry(d.line(i)) {
			i++
		}
	}
	return i
}

// attribute passes over an attribute entry, and reads the description of the
// document.
func (d *asciiDoc) attribute(i int) int {
	const description = ":description: "
	if bytes.HasPrefix(d.line(i), []byte(description)) {
		d.emit(false, [2]int{d.lines[i].start + len(description), d.lines[i].end})
	}
	for i < len(d.lines) && bytes.HasSuffix(d.line(i), []byte(` \`)) {
		i++
	}
	return i + 1
}

// blockMacro reads a macro that stands in a line of its own; it returns i when
// there is none.
func (d *asciiDoc) blockMacro(i int) int {
	line := d.line(i)
	n := bytes.Index(line, []byte("::"))
	if n <= 0 || line[len(line)-1] != ']' || bytes.ContainsAny(line[:n], " \t") {
		return i
	}
	open := bytes.IndexByte(line, '[')
	if open < n || bytes.ContainsAny(line[n+2:open], " \t") {
		return i
	}
	switch string(line[:n]) {
	case "image", "video", "audio":
		d.alternative(d.lines[i].start+open+1, d.lines[i].end-1)
	}
	return i + 1
}

// alternative reads the text in place of an image: the first of its attributes.
func (d *asciiDoc) alternative(from, to int) {
	text := d.source[from:to]
	if n := bytes.IndexByte(text, ','); n >= 0 && !bytes.HasPrefix(text, []byte(`"`)) {
		to = from + n
	}
	if !bytes.Contains(d.source[from:to], []byte("=")) {
		d.emit(false, [2]int{from, to})
	}
}

// paragraph reads a paragraph from line i, less the n bytes of a mark, to the next
// blank line or the line that begins another block.
func (d *asciiDoc) paragraph(i, n int, item bool) int {
	var stretches [][2]int
	flush := func() {
		d.emit(false, stretches...)
		stretches = nil
	}
	from := d.lines[i].start + n
	broken := false // the line before ended in a hard break
	for first := i; i < len(d.lines) && (i == first || !d.interrupts(i, item)); i++ {
		line := d.line(i)
		if i > first {
			from = d.lines[i].start
			if bytes.HasPrefix(line, []byte("//")) {
				continue
			}
		}
		if r, _ := utf8.DecodeRune(d.source[from:]); broken && !isLower(r) {
			flush()
		}
		to := d.lines[i].end
		if broken = bytes.HasSuffix(line, []byte(" +")); broken {
			to -= 2
		}
		if last := len(stretches) - 1; last >= 0 && blankBetween(d.source[stretches[last][1]:from]) {
			stretches[last][1] = to
		} else {
			stretches = append(stretches, [2]int{from, max(from, to)})
		}
	}
	flush()
	d.style = ""
	return i
}

func blankBetween(b []byte) bool { return len(bytes.TrimSpace(b)) == 0 }

// interrupts reports a line that ends the paragraph before it.
func (d *asciiDoc) interrupts(i int, item bool) bool {
	line := d.line(i)
	if len(line) == 0 || delimiter(line) != 0 || blockAttributes(line) || preprocessed(line) || string(line) == "+" {
		return true
	}
	if !item {
		return false
	}
	_, term := termMark(line)
	return asciiDocMark(line) > 0 || term > 0
}

// emit makes a block of stretches of the source.
func (d *asciiDoc) emit(heading bool, stretches ...[2]int) {
	if b := stretchesBlock(d.source, d.inline, stretches...); b != nil {
		b.Heading, b.escape = heading, escapeAsciiDoc
		d.blocks = append(d.blocks, b)
	}
}

// escapeAsciiDoc spells words without signs that could be markup: a backslash
// before one that is none would be shown.
func escapeAsciiDoc(words string) (string, bool) {
	return words, !strings.ContainsAny(words, "`*_#+{}<>[]^~\\|")
}
