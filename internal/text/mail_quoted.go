package text

import (
	"bytes"
	"encoding/hex"
	"fmt"
	"strings"
)

const quotedLen = len("=00")

// quotedPrintable takes source[from:to], which is in the encoding of that name
// (RFC 2045, 6.7). Where it broke a line the text goes on. An equals sign that
// begins nothing is a character like others.
func (p *prose) quotedPrintable(from, to int) {
	for from < to {
		i := bytes.IndexByte(p.source[from:to], '=')
		if i < 0 {
			break
		}
		p.verbatim(from, from+i)
		from += i
		b := p.source[from:to]
		if n := softBreak(b); n > 0 {
			from += n
		} else if c, err := hex.DecodeString(string(b[1:min(len(b), quotedLen)])); err == nil && len(c) == 1 {
			p.standIn(string(c), from, from+quotedLen)
			from += quotedLen
		} else {
			p.verbatim(from, from+1)
			from++
		}
	}
	p.verbatim(from, to)
}

// softBreak returns the length of the equals sign at the start of b with the
// line end behind it, 0 when none is there.
func softBreak(b []byte) int {
	n := 1 + len(b[1:]) - len(bytes.TrimLeft(b[1:], " \t"))
	switch {
	case bytes.HasPrefix(b[n:], []byte("\r\n")):
		return n + 2
	case bytes.HasPrefix(b[n:], []byte("\n")), bytes.HasPrefix(b[n:], []byte("\r")):
		return n + 1
	}
	return 0
}

// quotedSpelled writes words as quoted-printable has them.
func quotedSpelled(words string) string {
	var b strings.Builder
	for _, c := range []byte(words) {
		if c == '=' || c > '~' || c < ' ' {
			fmt.Fprintf(&b, "=%02X", c)
		} else {
			b.WriteByte(c)
		}
	}
	return b.String()
}
