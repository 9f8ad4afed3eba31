package text

import (
	"bytes"
	"cmp"
	"io"
	"slices"
	"strings"
)

// readLaTeX reads the whole document and yields a block for each paragraph, item,
// table cell, heading, caption and footnote. Commands, comments, code, drawings
// and what stands before the document but its title are left out; mathematics,
// references and inline code are one U+FFFC, so that the sentence stays whole.
// Accents and symbols written as commands are the characters they stand for.
func readLaTeX(r io.Reader, o Options, yield func(*Block, error) bool) {
	readWhole(r, o, yield, func(source []byte) ([]*Block, error) {
		l := latex{source: source, pos: bomLen(source)}
		l.preamble = bytes.Contains(source, []byte(`\begin{document}`))
		l.begin()
		l.parse()
		slices.SortStableFunc(l.blocks, func(a, b *Block) int { return cmp.Compare(a.offset, b.offset) })
		return l.blocks, nil
	})
}

// mostGroups bounds the groups that are told apart; deeper ones are only counted.
const mostGroups = 256

// group is an open brace, or an open bracket whose text is read.
type group struct {
	closer  byte
	apart   bool  // its text is no part of the sentence around it
	other   bool  // what follows is the same in other words, left out
	around  prose // what it interrupts, when apart
	heading bool  // of what it interrupts, when apart
}

type latex struct {
	source   []byte
	pos      int
	blocks   []*Block
	prose    prose
	groups   []group
	apart    int             // open groups that are apart
	deep     int             // open groups beyond the bound
	heading  bool            // the running block is one
	broken   int             // where a line break that waits for text begins; 0: none
	tables   int             // open tables
	preamble bool            // the document has not begun
	code     map[string]bool // the environments of code that the document defines
	found    map[string]stretchFound
}

// stretchFound remembers a search: from here on the first match is at.
type stretchFound struct{ from, at int }

func (l *latex) begin() {
	l.prose = prose{source: l.source, end: l.pos}
	l.broken = 0
}

// flush ends the running block.
func (l *latex) flush() {
	if b := l.prose.block(); b != nil {
		b.Heading, b.escape = l.heading, escapeLaTeX
		l.blocks = append(l.blocks, b)
	}
	l.begin()
}

func (l *latex) parse() {
	for l.pos < len(l.source) {
		c := l.source[l.pos]
		switch {
		case isSpaceByte(c):
			l.space()
		case c == '%':
			l.comment()
		case c == '\\':
			l.command()
		case c == '$':
			l.dollar()
		case c == '{':
			l.brace()
		case c == '}', c == ']' && len(l.groups) > 0 && l.groups[len(l.groups)-1].closer == ']':
			l.pos++
			l.close(c)
		case c == '&':
			l.pos++
			l.flush()
		default:
			l.characters()
		}
	}
	for len(l.groups) > 0 {
		l.close(l.groups[len(l.groups)-1].closer)
	}
	l.flush()
}

// take puts source[pos:to] into the running block as text, or as itself when text
// is "", and goes on behind it.
func (l *latex) take(text string, to int) {
	if !l.preamble || l.apart > 0 {
		l.resume()
		if text == "" {
			l.prose.verbatim(l.pos, to)
		} else {
			l.prose.standIn(text, l.pos, to)
		}
	}
	l.pos = to
}

// resume decides about a line break before text: it ends the block unless the
// text goes on in lower case.
func (l *latex) resume() {
	if l.broken == 0 {
		return
	}
	if len(l.prose.text) > 0 && isLower(rune(l.source[l.pos])) {
		l.prose.standIn("\n", l.broken, l.pos)
		l.broken = 0
		return
	}
	l.flush()
}

// space takes white space; a blank line ends a paragraph.
func (l *latex) space() {
	end, lines := l.pos, 0
	for end < len(l.source) && isSpaceByte(l.source[end]) {
		if l.source[end] == '\n' || l.source[end] == '\r' && (end+1 == len(l.source) || l.source[end+1] != '\n') {
			lines++
		}
		end++
	}
	switch {
	case lines > 1:
		l.pos = end
		l.flush()
	case len(l.prose.text) == 0 || l.broken > 0:
		l.pos = end
	case lines == 1:
		l.take("\n", end)
	default:
		l.take("", end)
	}
}

// comment leaves out the rest of the line, its end and what the next one is
// indented by.
func (l *latex) comment() {
	if i := bytes.IndexAny(l.source[l.pos:], "\r\n"); i >= 0 {
		l.pos += i + 1
	} else {
		l.pos = len(l.source)
	}
	if l.pos < len(l.source) && l.source[l.pos-1] == '\r' && l.source[l.pos] == '\n' {
		l.pos++
	}
	for l.pos < len(l.source) && (l.source[l.pos] == ' ' || l.source[l.pos] == '\t') {
		l.pos++
	}
	if l.pos < len(l.source) && (l.source[l.pos] == '\n' || l.source[l.pos] == '\r') {
		l.flush()
	}
}

// characters takes a run of characters, with the ligatures of quotes and dashes.
func (l *latex) characters() {
	for _, ligature := range [...][2]string{{"---", "\u2014"}, {"--", "\u2013"}, {"``", "\u201C"}, {"''", "\u201D"}, {"`", "\u2018"}, {"~", " "}} {
		if bytes.HasPrefix(l.source[l.pos:], []byte(ligature[0])) {
			l.take(ligature[1], l.pos+len(ligature[0]))
			return
		}
	}
	end := l.pos + 1
	for end < len(l.source) && !isSpaceByte(l.source[end]) && strings.IndexByte("%\\${}]&-`'~", l.source[end]) < 0 {
		end++
	}
	l.take("", end)
}

// brace opens a group, or takes one that holds an accent alone.
func (l *latex) brace() {
	if text, n := latexSymbol(l.source[l.pos+1:]); n > 0 && l.pos+1+n < len(l.source) && l.source[l.pos+1+n] == '}' {
		l.take(text, l.pos+n+2)
		return
	}
	l.pos++
	l.open(group{closer: '}'})
}

// open enters a group behind its brace.
func (l *latex) open(g group) {
	if len(l.groups) >= mostGroups {
		l.deep++
		return
	}
	if g.apart {
		l.apart++
		g.around = l.prose
		heading := g.heading
		g.heading, l.heading = l.heading, heading
		l.begin()
	}
	l.groups = append(l.groups, g)
}

// close leaves the innermost group, where it is closed so.
func (l *latex) close(closer byte) {
	if l.deep > 0 {
		l.deep--
		return
	}
	for n := len(l.groups); closer == '}' && n > 0 && l.groups[n-1].closer == ']'; n-- {
		l.close(']')
	}
	n := len(l.groups)
	if n == 0 {
		return
	}
	g := l.groups[n-1]
	l.groups = l.groups[:n-1]
	if g.other {
		l.pos = l.argument(l.pos)
	}
	if g.apart {
		l.flush()
		l.prose, l.heading = g.around, g.heading
		l.apart--
	}
}

// dollar takes mathematics between dollar signs; one without a partner in its
// paragraph is left out alone.
func (l *latex) dollar() {
	mark := "$"
	if bytes.HasPrefix(l.source[l.pos:], []byte("$$")) {
		mark = "$$"
	}
	from := l.pos + len(mark)
	for i := from; i < len(l.source); i++ {
		switch c := l.source[i]; {
		case c == '\\':
			i++
		case c == '$' && bytes.HasPrefix(l.source[i:], []byte(mark)):
			l.take(placeholder, i+len(mark))
			return
		case c == '\n' && blankLine(l.source, i+1):
			l.pos = from
			return
		}
	}
	l.pos = from
}

// blankLine reports that the line that begins at i has nothing but white space.
func blankLine(source []byte, i int) bool {
	for i < len(source) && (source[i] == ' ' || source[i] == '\t' || source[i] == '\r') {
		i++
	}
	return i < len(source) && source[i] == '\n'
}

// behind returns the place behind the next mark from a place on, the end of the
// document when there is none.
func (l *latex) behind(mark string, from int) int {
	f, ok := l.found[mark]
	if !ok || from < f.from || from > f.at {
		f = stretchFound{from, len(l.source)}
		if i := bytes.Index(l.source[from:], []byte(mark)); i >= 0 {
			f.at = from + i
		}
		if l.found == nil {
			l.found = map[string]stretchFound{}
		}
		l.found[mark] = f
	}
	return min(f.at+len(mark), len(l.source))
}
