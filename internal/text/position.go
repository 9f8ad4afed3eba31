package text

import "unicode/utf8"

// Position is a place in a source as people and tools count it: from one, the
// column in code points (a byte that is not UTF-8 counts as one).
type Position struct{ Line, Column int }

// LineMap turns ascending byte offsets into positions while the source streams
// by. Lines end with LF, CRLF or a lone CR. The zero value stands at the start
// of a source. One goroutine may use it at a time.
type LineMap struct {
	line, column int // from zero
	afterCR      bool
}

// NewLineMap returns a map that stands at p.
func NewLineMap(p Position) LineMap {
	return LineMap{line: p.Line - 1, column: p.Column - 1}
}

// Position returns the place of the next byte to be fed.
func (m *LineMap) Position() Position { return Position{m.line + 1, m.column + 1} }

// Feed moves over p, the next bytes of the source. The bytes may be cut
// anywhere: a code point counts where its first byte stands.
func (m *LineMap) Feed(p []byte) {
	for _, c := range p {
		switch {
		case c == '\n':
			if !m.afterCR {
				m.line++
			}
			m.column = 0
		case c == '\r':
			m.line++
			m.column = 0
		case utf8.RuneStart(c):
			m.column++
		}
		m.afterCR = c == '\r'
	}
}
