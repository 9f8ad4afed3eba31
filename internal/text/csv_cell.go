package text

import "bytes"

// cell reads the cell at c.pos and moves behind it and its delimiter or line
// end. A quote that opens no sound cell is a character like others: so is any
// quote behind one that has no end.
func (c *csvScan) cell() csvCell {
	if c.quotes && c.pos < len(c.source) && c.source[c.pos] == '"' {
		if end := c.closing(c.pos + 1); end >= 0 && c.ends(end+1) {
			cell := csvCell{start: c.pos + 1, end: end, quoted: true}
			c.pos = end + 1
			cell.last = c.advance()
			return cell
		}
	}
	cell := csvCell{start: c.pos, end: c.pos}
	for !c.ends(cell.end) {
		cell.end++
	}
	c.pos = cell.end
	cell.last = c.advance()
	return cell
}

// closing returns where the quote stands that ends the cell which begins at
// pos; -1, and no more quotes count, when there is none.
func (c *csvScan) closing(pos int) int {
	for {
		i := bytes.IndexByte(c.source[pos:], '"')
		if i < 0 {
			c.quotes = false
			return -1
		}
		if pos += i; !bytes.HasPrefix(c.source[pos+1:], []byte(`"`)) {
			return pos
		}
		pos += 2
	}
}

// ends reports that a cell ends at pos.
func (c *csvScan) ends(pos int) bool {
	if pos >= len(c.source) {
		return true
	}
	b := c.source[pos]
	return b == c.delimiter || b == '\n' || b == '\r'
}

// advance moves over the delimiter or line end at c.pos and reports whether the
// record ends there.
func (c *csvScan) advance() (last bool) {
	if c.pos == len(c.source) {
		return true
	}
	b := c.source[c.pos]
	c.pos++
	if b == '\r' && c.pos < len(c.source) && c.source[c.pos] == '\n' {
		c.pos++
	}
	return b != c.delimiter
}

// decoded returns what stands in a cell, a doubled quote as one.
func (c *csvScan) decoded(cell csvCell) prose {
	p := prose{source: c.source}
	from := cell.start
	for cell.quoted {
		i := bytes.IndexByte(c.source[from:cell.end], '"')
		if i < 0 {
			break
		}
		p.verbatim(from, from+i)
		p.standIn(`"`, from+i, from+i+2)
		from += i + 2
	}
	p.verbatim(from, cell.end)
	return p
}
