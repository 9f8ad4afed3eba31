package text

import (
	"bytes"
	"html"
	"strings"
)

// placeholder stands in the text for code inside a sentence.
const placeholder = "\uFFFC"

// prose builds the text of a block and its map to the source, for formats whose
// markup stands between. Pieces must come in the order of the source; one that
// goes back is left out.
type prose struct {
	source []byte
	text   []byte
	spans  []span // absolute source offsets
	end    int    // where the source of the last piece ends
	broken bool   // a line break waits for the next piece
	fixed  bool   // of the pieces to come, as in span
	// leaders are what may stand between blanks before the text of a line and
	// belongs to the line break: a quotation's marks. Empty means anything.
	leaders string
}

// verbatim takes source[from:to] as it is.
func (p *prose) verbatim(from, to int) {
	if !p.follow(from, to) {
		return
	}
	p.add(p.source[from:to], from, to)
}

// standIn takes text in the place of source[from:to].
func (p *prose) standIn(text string, from, to int) {
	if !p.follow(from, to) {
		return
	}
	p.add([]byte(text), from, to)
}

// lineBreak notes that a line ends at the source offset at: white space, if more
// text follows in the block.
func (p *prose) lineBreak(at int) {
	p.broken = len(p.text) > 0
	p.end = max(p.end, at)
}

// follow reports whether a piece may be taken, and puts the waiting line break
// before it.
func (p *prose) follow(from, to int) bool {
	if from < p.end || to <= from {
		return false
	}
	if p.broken && from > p.end {
		p.broken = false
		p.add([]byte("\n"), p.end, p.led(p.end, from))
	}
	return true
}

// led returns where what belongs to the line break at source[from:to] ends.
func (p *prose) led(from, to int) int {
	if p.leaders == "" {
		return to
	}
	end := from
	for end < to && (isSpaceByte(p.source[end]) || strings.IndexByte(p.leaders, p.source[end]) >= 0) {
		end++
	}
	return max(end, from+1)
}

func (p *prose) add(text []byte, from, to int) {
	at := len(p.text)
	p.text = append(p.text, text...)
	p.end = to
	next := span{at, len(p.text), from, to, !bytes.Equal(text, p.source[from:to]), p.fixed}
	if n := len(p.spans); n > 0 && !next.whole && !p.spans[n-1].whole && p.spans[n-1].sourceEnd == from && p.spans[n-1].fixed == next.fixed {
		p.spans[n-1].textEnd, p.spans[n-1].sourceEnd = next.textEnd, to
		return
	}
	p.spans = append(p.spans, next)
}

// decodedBy takes source[from:to], where at each of the bytes marks read may tell
// what the bytes from there on stand for and how many they are, 1 when they stand
// for themselves. What stands for nothing is left out.
func (p *prose) decodedBy(from, to int, marks string, read func(b []byte) (text string, n int)) {
	for from < to {
		i := bytes.IndexAny(p.source[from:to], marks)
		if i < 0 {
			break
		}
		p.verbatim(from, from+i)
		from += i
		text, n := read(p.source[from:to])
		switch {
		case n == 1:
			p.verbatim(from, from+1)
		case text != "":
			p.standIn(text, from, from+n)
		}
		from += n
	}
	p.verbatim(from, to)
}

// folded takes source[from:to] by pieces, with white space that holds line ends
// as one of them, and none at the start of the text.
func (p *prose) folded(from, to int, take func(from, to int)) {
	for from < to {
		if len(p.text) == 0 {
			for from < to && isSpaceByte(p.source[from]) {
				from++
			}
		}
		i := bytes.IndexAny(p.source[from:to], "\r\n")
		if i < 0 {
			take(from, to)
			return
		}
		start, end := from+i, from+i
		for start > from && isSpaceByte(p.source[start-1]) {
			start--
		}
		for end < to && isSpaceByte(p.source[end]) {
			end++
		}
		take(from, start)
		if len(p.text) > 0 {
			p.standIn("\n", start, end)
		}
		from = end
	}
}

// resolve reads the escape or character reference at the start of b and returns
// what it stands for and its length, 1 when it is none.
func resolve(b []byte) (text string, n int) {
	if b[0] == '\\' {
		if len(b) > 1 && classes[b[1]]&(cPunct|cCode|cParen|cPoint|cHyphen|cApos) != 0 {
			return string(b[1:2]), 2
		}
		return "", 1
	}
	const longest = len("&CounterClockwiseContourIntegral;")
	end := bytes.IndexByte(b[:min(len(b), longest)], ';')
	if end < 2 {
		return "", 1
	}
	ref := string(b[:end+1])
	if text = html.UnescapeString(ref); text == ref {
		return "", 1
	}
	return text, end + 1
}

// block returns what was built less the white space at its end, nil when nothing
// is left.
func (p *prose) block() *Block {
	if len(bytes.TrimSpace(p.text)) == 0 {
		return nil
	}
	p.trim()
	base := p.spans[0].source
	for i := range p.spans {
		p.spans[i].source -= base
		p.spans[i].sourceEnd -= base
	}
	end := base + p.spans[len(p.spans)-1].sourceEnd
	return &Block{Text: p.text, source: p.source[base:end:end], offset: int64(base), spans: p.spans}
}

// trim takes ASCII white space off the end, as far as it is spans of its own or
// the end of a verbatim one.
func (p *prose) trim() {
	_, end := trimSpace(p.text, 0, len(p.text))
	n := len(p.spans)
	for p.spans[n-1].text >= end {
		n--
	}
	p.spans = p.spans[:n]
	last := &p.spans[n-1]
	if excess := last.textEnd - end; excess > 0 && !last.whole {
		last.textEnd -= excess
		last.sourceEnd -= excess
	}
	p.text = p.text[:last.textEnd]
}
