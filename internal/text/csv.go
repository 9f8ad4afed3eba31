package text

import (
	"bytes"
	"io"
	"slices"
	"strconv"
	"strings"
)

// readCSV reads the cells of comma-separated values, RFC 4180, also with
// semicolons, tabs or bars between: what the first record has most of. Without
// fields every cell that holds prose is read, the header among them. Fields are
// names in the first record, which then is the header and not read, or numbers
// of columns from one.
func readCSV(r io.Reader, o Options, yield func(*Block, error) bool) {
	readRecords(r, o, yield, func(e *emitter) error {
		c := csvScan{emitter: e, pos: e.at, quotes: true}
		c.delimiter = c.guess()
		return c.records(o.Fields)
	})
}

// readTSV is readCSV with tabs.
func readTSV(r io.Reader, o Options, yield func(*Block, error) bool) {
	readRecords(r, o, yield, func(e *emitter) error {
		c := csvScan{emitter: e, pos: e.at, quotes: true, delimiter: '\t'}
		return c.records(o.Fields)
	})
}

// csvScan walks over records and keeps the offset of each cell.
type csvScan struct {
	*emitter
	pos       int
	delimiter byte
	quotes    bool   // no quote without an end was met yet
	columns   []bool // which are read; nil: those that hold prose
	segmenter Segmenter
}

// csvCell is one cell: what stands in it is source[start:end].
type csvCell struct {
	start, end int
	quoted     bool
	last       bool // of its record
}

// guess returns the delimiter that the first record has most of, outside
// quotes.
func (c *csvScan) guess() byte {
	const delimiters = ",;\t|"
	var counts [len(delimiters)]int
	quoted := false
	for _, b := range c.source[c.pos:] {
		if b == '"' {
			quoted = !quoted
		}
		if quoted {
			continue
		}
		if b == '\n' || b == '\r' {
			break
		}
		if i := strings.IndexByte(delimiters, b); i >= 0 {
			counts[i]++
		}
	}
	return delimiters[slices.Index(counts[:], slices.Max(counts[:]))]
}

// records yields the cells that are asked for.
func (c *csvScan) records(fields []string) error {
	if len(fields) > 0 && c.pos < len(c.source) {
		first := c.pos
		byName, err := c.choose(fields, c.header())
		if err != nil {
			return err
		}
		if !byName {
			c.pos = first
		}
	}
	for column := 0; c.pos < len(c.source) && !c.stopped; column++ {
		cell := c.cell()
		c.text(cell, column)
		if cell.last {
			column = -1
		}
	}
	return nil
}

// header reads the first record.
func (c *csvScan) header() (names []string) {
	for {
		cell := c.cell()
		p := c.decoded(cell)
		names = append(names, string(bytes.TrimSpace(p.text)))
		if cell.last {
			return names
		}
	}
}

// choose notes the columns that the fields name and reports whether one does so
// by its name.
func (c *csvScan) choose(fields, header []string) (byName bool, err error) {
	c.columns = make([]bool, len(header))
	for _, f := range fields {
		column := slices.Index(header, f)
		byName = byName || column >= 0
		if n, err := strconv.Atoi(f); column < 0 && err == nil {
			column = n - 1
		}
		if column < 0 || column >= len(header) {
			return false, unreadable("line 1: there is no column %q; there are %s, or their numbers from 1 to %d", f, listed(header), len(header))
		}
		c.columns[column] = true
	}
	return byName, nil
}

// listed quotes the first few names, cut to a length that can be read.
func listed(names []string) string {
	const most, longest = 20, 40
	var quoted []string
	for _, name := range names[:min(len(names), most)] {
		if r := []rune(name); len(r) > longest {
			name = string(r[:longest]) + "…"
		}
		quoted = append(quoted, strconv.Quote(name))
	}
	if len(names) > most {
		quoted = append(quoted, "…")
	}
	return strings.Join(quoted, ", ")
}

// text yields a cell if it is wanted. Its lines are those of plain text.
func (c *csvScan) text(cell csvCell, column int) {
	if c.columns != nil && (column >= len(c.columns) || !c.columns[column]) {
		return
	}
	p := c.decoded(cell)
	if c.columns == nil && !holdsProse(&c.segmenter, p.text) {
		return
	}
	c.emitPlain(&p, func(words string) (string, bool) {
		if cell.quoted {
			return strings.ReplaceAll(words, `"`, `""`), true
		}
		return words, !strings.ContainsAny(words, "\"\r\n"+string(c.delimiter))
	})
}
