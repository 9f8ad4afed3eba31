package text

import (
	"bytes"
	"regexp"
	"strconv"
	"strings"
)

// mostLabel is the most bytes of a string in which & or _ may mark the key that
// chooses a label of a dialogue: in longer ones it is a character.
const mostLabel = 40

// poText gathers the text of one string of a catalogue: lines joined, escapes
// and character references resolved, the mark of a label's key and tags left
// out, each placeholder of a format (%s, %(name)d, {name}) one U+FFFC.
type poText struct {
	prose
	key int // where the mark of a label's key stands, or -1
}

func newPOText(source []byte, s poString) *poText {
	t := &poText{prose: prose{source: source}, key: keyOf(source, s)}
	for _, p := range s {
		t.piece(p.from, p.to)
	}
	return t
}

// piece takes what stands between two quotes.
func (t *poText) piece(from, to int) {
	for from < to {
		i := bytes.IndexAny(t.source[from:to], `\&_<%{`)
		if i < 0 {
			break
		}
		t.verbatim(from, from+i)
		from += i
		n := t.special(from, to)
		if n == 0 {
			n = 1
			t.verbatim(from, from+n)
		}
		from += n
	}
	t.verbatim(from, to)
}

// special takes what a character with a meaning of its own begins and returns
// its length, 0 when it is a character like others.
func (t *poText) special(from, to int) (n int) {
	b := t.source[from:to]
	text := ""
	switch b[0] {
	case '\\':
		text, n = poEscape(b)
	case '<':
		text, n = poTag(b)
	case '%', '{':
		text, n = poPlaceholder(b)
	case '&':
		if text, n = resolve(b); n == 1 {
			n = 0
		}
	}
	if from == t.key {
		return 1
	}
	if text != "" {
		t.standIn(text, from, from+n)
	}
	return n
}

// poEscape reads an escape as in the language C.
func poEscape(b []byte) (text string, n int) {
	if len(b) == 1 {
		return "", 0
	}
	if i := strings.IndexByte("abfnrtv", b[1]); i >= 0 {
		return "\a\b\f\n\r\t\v"[i : i+1], 2
	}
	digits, base := b[1:min(4, len(b))], 8 // one to three octal digits
	if b[1] == 'x' {
		digits, base = b[2:min(4, len(b))], 16
	}
	for ; len(digits) > 0; digits = digits[:len(digits)-1] {
		if value, err := strconv.ParseUint(string(digits), base, 8); err == nil {
			n = 1 + len(digits) + base/16
			return string([]byte{byte(value)}), n
		}
	}
	return string(b[1:2]), 2
}

// breaking are the tags that part the text around them.
const breaking = " br p li ul ol div tr td th h1 h2 h3 h4 hr "

// poTag reads a tag of HTML: "" when the text goes on over it.
func poTag(b []byte) (text string, n int) {
	name := bytes.TrimPrefix(b[1:], []byte("/"))
	end := 0
	for end < len(name) && classes[name[end]]&cAlnum != 0 {
		end++
	}
	if end == 0 || classes[name[0]]&cLetter == 0 {
		return "", 0
	}
	if n = angled(b); n > 0 && strings.Contains(breaking, " "+strings.ToLower(string(name[:end]))+" ") {
		text = "\n"
	}
	return text, n
}

// Placeholders: of printf in C and Python, without the space flag, which text
// like "5 % of" would have; and names and numbers in braces.
var (
	percentHolder = regexp.MustCompile(`^%(?:\([A-Za-z0-9_.]{1,64}\))?(?:[0-9]{1,2}\$)?[-+#0]{0,4}(?:[0-9]{1,4}|\*)?(?:\.(?:[0-9]{1,4}|\*))?(?:hh|h|ll|l|L|q|j|z|t)?[diouxXeEfFgGcsaArp@]`)
	braceHolder   = regexp.MustCompile(`^\{\{?[A-Za-z0-9_.:,! -]{0,64}\}\}?`)
)

// poPlaceholder reads a placeholder.
func poPlaceholder(b []byte) (text string, n int) {
	if bytes.HasPrefix(b, []byte("%%")) {
		return "%", 2
	}
	holder := percentHolder
	if b[0] == '{' {
		holder = braceHolder
	}
	if n = len(holder.Find(b[:min(len(b), 100)])); n == 0 {
		return "", 0
	}
	return placeholder, n
}

// keyOf returns where the mark of a label's key stands: the only & or _ of a
// short string, with a letter behind it. The & of R&D is none.
func keyOf(source []byte, s poString) int {
	key := -1
	if s.len() > mostLabel {
		return key
	}
	for _, p := range s {
		for i := p.from; i+1 < p.to; i++ {
			if c := source[i]; c != '&' && c != '_' || classes[source[i+1]]&cLetter == 0 {
				continue
			}
			if _, n := resolve(source[i:p.to]); n > 1 || i > p.from && between(source[i-1:i+2]) {
				continue
			}
			if key >= 0 {
				return -1
			}
			key = i
		}
	}
	return key
}

// between reports that both the first and the last byte are capitals.
func between(b []byte) bool {
	return classes[b[0]]&classes[b[len(b)-1]]&cUpper != 0
}
