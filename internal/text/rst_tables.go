package text

import "unicode/utf8"

// gridTable reads a table whose cells are drawn with + - and |, and returns the
// line behind it. The cells of a row are told apart by the bars of its lines.
func (d *rst) gridTable(i, bound int) int {
	var cells [][][2]int
	flush := func() {
		for _, c := range cells {
			d.cell(c)
		}
		cells = nil
	}
	for ; i < bound && !d.lines[i].blank(); i++ {
		line := d.line(i)
		if line[0] != '+' && line[0] != '|' {
			break
		}
		if line[0] == '+' {
			flush()
			continue
		}
		pieces := barred(line)
		if len(pieces) != len(cells) {
			flush()
			cells = make([][][2]int, len(pieces))
		}
		for n, p := range pieces {
			cells[n] = append(cells[n], [2]int{d.lines[i].start + p[0], d.lines[i].start + p[1]})
		}
	}
	flush()
	return i
}

// barred returns the stretches between the bars of a line, less white space.
func barred(line []byte) [][2]int {
	var pieces [][2]int
	start := 1
	for i := 1; i < len(line); i++ {
		if line[i] == '|' && (i+1 == len(line) || isSpaceByte(line[i-1]) && isSpaceByte(line[i+1])) {
			from, to := trimSpace(line, start, i)
			pieces = append(pieces, [2]int{from, to})
			start = i + 1
		}
	}
	return pieces
}

// cell makes blocks of the lines of a cell; an empty one parts paragraphs.
func (d *rst) cell(lines [][2]int) {
	start := 0
	for i, l := range lines {
		if l[0] < l[1] {
			continue
		}
		d.paragraphOfCell(lines[start:i])
		start = i + 1
	}
	d.paragraphOfCell(lines[start:])
}

func (d *rst) paragraphOfCell(lines [][2]int) {
	if len(lines) == 0 {
		return
	}
	first := lines[0]
	if n := bulletMark(d.source[first[0]:first[1]]); n > 0 {
		lines[0][0] += n
	}
	d.emit(false, lines...)
}

// simpleTable reads a table whose columns are shown by its borders, and returns
// the line behind it.
func (d *rst) simpleTable(i, bound int) int {
	columns := borderColumns(d.line(i))
	var cells [][][2]int
	flush := func() {
		for _, c := range cells {
			d.cell(c)
		}
		cells = nil
	}
	first := i
	for ; i < bound; i++ {
		line := d.line(i)
		switch {
		case simpleBorder(line):
			flush()
			if i > first && (i+1 == bound || d.lines[i+1].blank()) {
				return i + 1
			}
			continue
		case d.lines[i].blank() || adornment(line) > 0:
			flush()
			continue
		}
		from, to := d.fromColumn(i, d.lines[first].indent), d.lines[i].end
		for n, p := range cut(d.source[from:to], columns) {
			if n == 0 && p[0] < p[1] {
				flush()
			}
			if n >= len(cells) {
				cells = append(cells, nil)
			}
			if p[0] < p[1] {
				cells[n] = append(cells[n], [2]int{from + p[0], from + p[1]})
			}
		}
	}
	flush()
	return i
}

// fromColumn returns where line i has a column, or its start when that is later.
func (d *rst) fromColumn(i, column int) int {
	l := d.lines[i]
	return l.start - max(0, min(l.indent-column, l.start))
}

// borderColumns returns the columns at which the stretches of a border begin.
func borderColumns(line []byte) []int {
	var columns []int
	for i, c := range line {
		if c != ' ' && (i == 0 || line[i-1] == ' ') {
			columns = append(columns, i)
		}
	}
	return columns
}

// cut returns the stretches of a line that stand in columns, less white space.
func cut(line []byte, columns []int) [][2]int {
	var pieces [][2]int
	column, start := 0, 0
	for i := 0; i < len(line); {
		if next := len(pieces) + 1; next < len(columns) && column >= columns[next] {
			from, to := trimSpace(line, start, i)
			pieces = append(pieces, [2]int{from, to})
			start = i
		}
		_, size := utf8.DecodeRune(line[i:])
		i += size
		column++
	}
	from, to := trimSpace(line, start, len(line))
	return append(pieces, [2]int{from, to})
}
