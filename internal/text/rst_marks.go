package text

import "bytes"

// fieldMark returns the length of ":name:" at the start of a line, 0 when there
// is none.
func fieldMark(line []byte) int {
	if len(line) < 3 || line[0] != ':' || isSpaceByte(line[1]) || line[1] == ':' {
		return 0
	}
	for i := 1; i < len(line); i++ {
		switch line[i] {
		case '\\':
			i++
		case '`':
			return 0
		case ':':
			if i+1 == len(line) || isSpaceByte(line[i+1]) {
				return i + 1
			}
		}
	}
	return 0
}

// bulletMark returns the length of the mark of a list item, 0 when there is none.
func bulletMark(line []byte) int {
	if len(line) == 0 {
		return 0
	}
	switch line[0] {
	case '-', '*', '+':
		if len(line) > 1 && isSpaceByte(line[1]) {
			return 1
		}
		return 0
	}
	for _, bullet := range [...]string{"•", "‣", "⁃"} {
		if bytes.HasPrefix(line, []byte(bullet+" ")) {
			return len(bullet)
		}
	}
	return enumerator(line)
}

// enumerator returns the length of "1.", "(a)", "iv)" or "#." at the start of a
// line, 0 when there is none.
func enumerator(line []byte) int {
	i := 0
	if line[0] == '(' {
		i++
	}
	from := i
	for i < len(line) && classes[line[i]]&cDigit != 0 {
		i++
	}
	if i == from {
		for i < len(line) && bytes.IndexByte([]byte("ivxlcdmIVXLCDM"), line[i]) >= 0 {
			i++
		}
	}
	if i == from && i < len(line) && (line[i] == '#' || classes[line[i]]&cLetter != 0) {
		i++
	}
	if i == from || i-from > 9 || i+1 >= len(line) || !isSpaceByte(line[i+1]) {
		return 0
	}
	if line[i] == ')' || line[i] == '.' && from == 0 {
		return i + 1
	}
	return 0
}

// optionMark returns the length of the options of a program at the start of a
// line, before two spaces or the line's end; 0 when there are none.
func optionMark(line []byte) int {
	if len(line) < 2 || line[0] != '-' && line[0] != '/' || classes[line[1]]&cLetter == 0 && line[1] != '-' {
		return 0
	}
	if i := bytes.Index(line, []byte("  ")); i > 0 {
		return i
	}
	if bytes.IndexByte(line, ' ') < 0 && (len(line) == 2 || line[1] == '-') {
		return len(line)
	}
	return 0
}

// simpleBorder reports the border of a simple table: stretches of = with spaces
// between.
func simpleBorder(line []byte) bool {
	spaces := 0
	for _, c := range line {
		switch c {
		case '=':
		case ' ':
			spaces++
		default:
			return false
		}
	}
	return spaces > 0
}
