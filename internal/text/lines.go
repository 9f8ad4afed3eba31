package text

import (
	"unicode"
	"unicode/utf8"
)

// Widths of hand-broken lines, in code points: a line that was broken because
// it was full is hardly shorter than the first or longer than the second.
const (
	leastWrap = 40
	mostWrap  = 160
)

// textLine is a line of a window: its bytes less the white space around them,
// where the next one begins, and its width in code points.
type textLine struct {
	start, end, next, width int
}

func (l textLine) blank() bool { return l.start == l.end }

// splitLines appends the lines of w to dst. Lines end with LF, CRLF or CR; the
// last may lack an end.
func splitLines(dst []textLine, w []byte) []textLine {
	for pos := 0; pos < len(w); {
		end := pos
		for end < len(w) && w[end] != '\n' && w[end] != '\r' {
			end++
		}
		next := min(end+1, len(w))
		if end+1 < len(w) && w[end] == '\r' && w[end+1] == '\n' {
			next = end + 2
		}
		s, e := trimSpace(w, pos, end)
		dst = append(dst, textLine{s, e, next, utf8.RuneCount(w[s:e])})
		pos = next
	}
	return dst
}

// wrapWidth returns the width that the lines between two blank ones were broken
// at by hand: that of the widest. It is 0 when they were not: when the widest is
// beyond mostWrap, or when fewer than half of the lines that may join the next
// one (no short line, no list mark) do.
func wrapWidth(w []byte, lines []textLine) int {
	width := 0
	for _, l := range lines {
		width = max(width, l.width)
	}
	if width > mostWrap {
		return 0
	}
	may, joined := 0, 0
	for i := 1; i < len(lines); i++ {
		a, b := lines[i-1], lines[i]
		if a.width < leastWrap || listMark(w[b.start:b.end]) {
			continue
		}
		may++
		if joins(w, a, b, width) {
			joined++
		}
	}
	if 2*joined < may {
		return 0
	}
	return width
}

// joins reports whether a paragraph goes on from line a to the next line b, so
// that the line end between them is a mere space. Width is that of wrapWidth.
//
// It does when a was broken because it was full: the first word of b would not
// have fitted in the width; or when b goes on in lower case. But lists, headings,
// verse, addresses and text with one paragraph a line are not glued: a line that
// begins with a list mark begins a block, and nothing is joined to a line shorter
// than leastWrap.
func joins(w []byte, a, b textLine, width int) bool {
	if width == 0 || a.width < leastWrap || listMark(w[b.start:b.end]) {
		return false
	}
	if r, _ := utf8.DecodeRune(w[b.start:b.end]); isLower(r) {
		return true
	}
	first := b.start
	for first < b.end && !isSpaceByte(w[first]) {
		first++
	}
	return a.width+1+utf8.RuneCount(w[b.start:first]) > width
}

// listMark reports that a line begins like an item: a bullet, or a number or
// letter with a point or bracket, and a space after it.
func listMark(line []byte) bool {
	i := 0
	for i < len(line) && !isSpaceByte(line[i]) {
		i++
	}
	mark := line[:i]
	if i == len(line) || i == 0 || i > 6 {
		return false
	}
	switch string(mark) {
	case "-", "*", "+", "o", "•", "◦", "‣", "–", "—", "·", "#", ">":
		return true
	}
	if c := mark[len(mark)-1]; c != '.' && c != ')' && c != ']' {
		return false
	}
	letters := 0
	for _, r := range string(mark[:len(mark)-1]) {
		switch {
		case unicode.IsLetter(r):
			letters++
		case !unicode.IsDigit(r) && r != '(' && r != '[' && r != '.':
			return false
		}
	}
	return letters <= 1
}

// isSpaceByte reports ASCII white space.
func isSpaceByte(c byte) bool {
	return c == ' ' || '\t' <= c && c <= '\r'
}

// trimSpace narrows w[start:end] by the ASCII white space around it.
func trimSpace(w []byte, start, end int) (from, to int) {
	for start < end && isSpaceByte(w[start]) {
		start++
	}
	for start < end && isSpaceByte(w[end-1]) {
		end--
	}
	return start, end
}
