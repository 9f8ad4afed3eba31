package text

import (
	"bytes"
	"strconv"
	"unicode/utf8"
)

// literal reads a string: paragraph by paragraph, those that are prose.
func (c *codeReader) literal(p codePiece) {
	if p.to-p.from < len("a b") || bytes.IndexByte(c.source[p.from:p.to], ' ') < 0 {
		return
	}
	text := prose{source: c.source}
	finish := func() {
		if prosy(text.text) {
			c.add(&text, p.in)
		}
		text = prose{source: c.source, end: text.end}
	}
	for _, l := range splitStretches(nil, c.source, p.from, p.to) {
		from, to := l.from, l.to
		if p.in.lines {
			from, to = trimSpace(c.source, from, to)
		}
		if from == to {
			finish()
			continue
		}
		text.decodedBy(from, to, "\\%{$#`\"'", p.in.unspell)
		text.lineBreak(l.to)
	}
	finish()
}

// unspell reads what begins at b inside a string: an escape, a doubled delimiter,
// or what is filled in when the program runs, for which a placeholder stands.
func (e *enclosure) unspell(b []byte) (text string, n int) {
	if e.inner != "" && bytes.HasPrefix(b, []byte(e.inner)) {
		return placeholder, innerLength(b, e.inner)
	}
	if e.escape != 0 && b[0] == e.escape && len(b) > 1 {
		return unescape(b)
	}
	if e.doubled && len(b) > 1 && b[0] == e.close[0] && b[1] == b[0] {
		return string(b[:1]), 2
	}
	switch b[0] {
	case '%':
		return formatVerb(b)
	case '{':
		if i := enclosed(b); i > 0 {
			return placeholder, i
		}
	case '$', '#':
		return variable(b)
	}
	return "", 1
}

// innerLength is the length of the code that inner opens, the closing bracket
// included; all that is left of the line where it closes on another.
func innerLength(b []byte, inner string) int {
	depth := 1
	for i := len(inner); i < len(b) && b[i] != '\n'; i++ {
		if depth += bracket(inner, b[i]); depth == 0 {
			return i + 1
		}
	}
	return lineLength(b)
}

// unescape reads an escape: the single letters that most languages share, and
// characters by number. Any other byte stands for itself.
func unescape(b []byte) (text string, n int) {
	switch c := b[1]; c {
	case 'n', 'r', 'v', 'f':
		return "\n", 2
	case 't':
		return "\t", 2
	case 'x':
		return numbered(b, 2, 2)
	case 'u':
		if len(b) > 3 && b[2] == '{' {
			if i := bytes.IndexByte(b[:min(len(b), len(`\u{10FFFF}`))], '}'); i > 3 {
				text, _ = numbered(b[:i], 3, i-3)
				return text, i + 1
			}
		}
		return numbered(b, 2, 4)
	case 'U':
		return numbered(b, 2, 8)
	case '\\':
		return `\`, 2
	default:
		_, n := utf8.DecodeRune(b[1:])
		return string(b[1 : 1+n]), 1 + n
	}
}

// numbered reads a character by its number of so many hexadecimal digits, and
// gives a placeholder for what is none.
func numbered(b []byte, from, digits int) (text string, n int) {
	if len(b) >= from+digits {
		if code, err := strconv.ParseUint(string(b[from:from+digits]), 16, 32); err == nil && utf8.ValidRune(rune(code)) && code > ' ' {
			return string(rune(code)), from + digits
		}
	}
	return placeholder, 2
}

// formatVerb reads "%s", "%-5.2f", "%(name)s", "%1$s"; "%%" is a per cent sign.
func formatVerb(b []byte) (text string, n int) {
	n = 1
	if len(b) > 1 && b[1] == '%' {
		return "%", 2
	}
	if len(b) > 1 && b[1] == '(' {
		const longest = 64
		i := bytes.IndexByte(b[:min(len(b), longest)], ')')
		if i < 0 {
			return "", 1
		}
		n = i + 1
	}
	for n < min(len(b), 80) && bytes.IndexByte([]byte("+-#*.$0123456789lhzjt[]"), b[n]) >= 0 {
		n++
	}
	if n < len(b) && classes[b[n]]&cLetter != 0 {
		return placeholder, n + 1
	}
	return "", 1
}

// variable reads "$name", "${...}", "#{...}", "$(...)".
func variable(b []byte) (text string, n int) {
	if len(b) > 1 && (b[1] == '{' || b[1] == '(' && b[0] == '$') {
		if n = innerLength(b[:min(len(b), 256)], string(b[:2])); n > 2 && n <= len(b) {
			return placeholder, n
		}
		return "", 1
	}
	n = 1
	for n < len(b) && b[0] == '$' && (alnumByte(b[n]) || b[n] == '_') {
		n++
	}
	if n > 1 && classes[b[1]]&cDigit == 0 {
		return placeholder, n
	}
	return "", 1
}
