package text

import "bytes"

// table reads the cells of a table between lines i and end: each begins behind a
// bar and ends before the next one, or before the format that stands there.
func (d *asciiDoc) table(i, end int) {
	if i >= end {
		return
	}
	bound := d.lines[end-1].end
	at := nextBar(d.source, d.lines[i].start, bound)
	style := cellStyle(d.source[d.lines[i].start:min(at, bound)])
	for at < bound {
		next := nextBar(d.source, at+1, bound)
		to := next - len(cellFormat(d.source[at+1:next]))
		if next == bound {
			to = next
		}
		d.cell(at+1, to, style)
		style = cellStyle(d.source[to:next])
		at = next
	}
}

// nextBar returns the place of the next bar, bound when there is none.
func nextBar(source []byte, i, bound int) int {
	for i < bound {
		n := bytes.IndexByte(source[i:bound], '|')
		if n < 0 {
			return bound
		}
		if i += n; source[max(i-1, 0)] != '\\' {
			return i
		}
		i++
	}
	return bound
}

// cellFormat returns the format of the next cell at the end of what stands before
// its bar ("2+", ".3+^", "a"): digits, signs and the letter of a style.
func cellFormat(before []byte) []byte {
	i := len(before)
	if i > 0 && bytes.IndexByte([]byte("adehlmsv"), before[i-1]) >= 0 {
		i--
	}
	for i > 0 && len(before)-i < 16 && (classes[before[i-1]]&(cDigit|cPoint) != 0 || bytes.IndexByte([]byte("+*<>^"), before[i-1]) >= 0) {
		i--
	}
	if i > 0 && !isSpaceByte(before[i-1]) {
		return nil
	}
	return before[i:]
}

// cellStyle returns the letter of a format, 0 when it has none.
func cellStyle(format []byte) byte {
	if n := len(format); n > 0 && classes[format[n-1]]&cLower != 0 {
		return format[n-1]
	}
	return 0
}

// cell reads a cell: one with blocks of its own as a document is read, any other
// by its paragraphs.
func (d *asciiDoc) cell(from, to int, style byte) {
	if style == 'l' || style == 'm' {
		return
	}
	inner := asciiDoc{source: d.source, blocks: d.blocks}
	for _, l := range splitLines(nil, d.source[from:to]) {
		l.start, l.end, l.next = l.start+from, l.end+from, l.next+from
		inner.lines = append(inner.lines, l)
	}
	if style == 'a' {
		inner.body(0, true)
	} else {
		for i := 0; i < len(inner.lines); {
			end := inner.stretch(i)
			if end > i {
				inner.emit(style == 'h', [2]int{inner.lines[i].start, inner.lines[end-1].end})
			}
			i = end + 1
		}
	}
	d.blocks = inner.blocks
}
