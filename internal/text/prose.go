package text

import (
	"bytes"
	"html"
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
		p.add([]byte("\n"), p.end, from)
	}
	return true
}

func (p *prose) add(text []byte, from, to int) {
	at := len(p.text)
	p.text = append(p.text, text...)
	p.end = to
	next := span{at, len(p.text), from, to, !bytes.Equal(text, p.source[from:to])}
	if n := len(p.spans); n > 0 && !next.whole && !p.spans[n-1].whole && p.spans[n-1].sourceEnd == from {
		p.spans[n-1].textEnd, p.spans[n-1].sourceEnd = next.textEnd, to
		return
	}
	p.spans = append(p.spans, next)
}

// decoded takes source[from:to] with backslash escapes and character references
// resolved.
func (p *prose) decoded(from, to int) {
	for from < to {
		i := bytes.IndexAny(p.source[from:to], "\\&")
		if i < 0 {
			break
		}
		p.verbatim(from, from+i)
		from += i
		text, n := resolve(p.source[from:to])
		if n > 1 {
			p.standIn(text, from, from+n)
		} else {
			p.verbatim(from, from+n)
		}
		from += n
	}
	p.verbatim(from, to)
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

// block returns what was built, nil when it is nothing but white space.
func (p *prose) block() *Block {
	if len(bytes.TrimSpace(p.text)) == 0 {
		return nil
	}
	base := p.spans[0].source
	for i := range p.spans {
		p.spans[i].source -= base
		p.spans[i].sourceEnd -= base
	}
	end := base + p.spans[len(p.spans)-1].sourceEnd
	return &Block{Text: p.text, source: p.source[base:end:end], offset: int64(base), spans: p.spans}
}
