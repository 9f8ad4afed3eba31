package text

import (
	"bytes"
	"cmp"
	"html"
	"slices"
	"strings"
)

// mostOpen bounds the elements that are kept open; deeper ones count as plain
// characters of their parent.
const mostOpen = 256

// element is an open element with what holds inside it.
type element struct {
	name    string
	block   bool // it parts its content from what is around it
	foreign bool // it is in a language that is not read, or not to be translated
	hidden  bool // its text is no prose
	heading bool
}

func (e *element) read() bool { return !e.foreign && !e.hidden }

// tagged gathers the blocks of a document with tags.
type tagged struct {
	source  []byte
	options Options
	blocks  []*Block
	prose   prose
	open    []element // open[0] is the document
	gap     int       // where in the running sentence something was left out, or -1
	literal bool      // the running block has text of a CDATA section
}

func newTagged(source []byte, o Options) tagged {
	t := tagged{source: source, options: o, open: []element{{}}}
	t.begin(bomLen(source))
	return t
}

func (t *tagged) top() *element { return &t.open[len(t.open)-1] }

// begin starts a new block.
func (t *tagged) begin(at int) {
	t.prose = prose{source: t.source, end: at}
	t.gap = -1
	t.literal = false
}

// flush ends the running block.
func (t *tagged) flush() {
	if b := t.prose.block(); b != nil {
		b.Heading = t.top().heading
		b.escape = escapeCharData
		if t.literal {
			b.escape = onlyPlain
		}
		t.blocks = append(t.blocks, b)
	}
	t.begin(t.prose.end)
}

// push opens an element whose tag is at; what holds in its parent holds in it.
func (t *tagged) push(e element, at tag) {
	parent := t.top()
	e.foreign = t.foreign(at, parent.foreign)
	e.hidden = e.hidden || parent.hidden
	e.heading = e.heading || parent.heading
	if len(t.open) >= mostOpen {
		return
	}
	if e.block {
		t.flush()
	}
	t.leave(parent.read(), e.read() || e.block, at)
	t.open = append(t.open, e)
}

// pop closes the elements from open[depth] on, by the tag at.
func (t *tagged) pop(depth int, at tag) {
	if slices.ContainsFunc(t.open[depth:], func(e element) bool { return e.block }) {
		t.flush()
	}
	before := t.top().read()
	t.open = t.open[:depth]
	t.leave(before, t.top().read(), at)
}

// leave notes that text is left out of the sentence from here on, or puts a
// placeholder for what was left out until here.
func (t *tagged) leave(before, after bool, at tag) {
	switch {
	case before && !after:
		t.gap = at.start
	case !before && after && t.gap >= 0:
		t.prose.standIn(placeholder, t.gap, at.end)
		t.gap = -1
	}
}

// foreign tells by the attributes of a tag whether its element is left out for
// its language. The attribute translate is HTML's and that of the
// Internationalization Tag Set 2.0 (its:translate, also on XML).
func (t *tagged) foreign(at tag, inherited bool) bool {
	language, translate := "", ""
	for a := range attributes(t.source, at.from, at.to) {
		switch value := string(t.source[a.from:a.to]); a.name {
		case "lang", "xml:lang":
			language = value
		case "translate", "its:translate":
			translate = strings.ToLower(value)
		}
	}
	if translate == "no" {
		return true
	}
	if strings.TrimSpace(language) == "" {
		return inherited
	}
	return !t.options.reads(language)
}

// find returns the depth of the innermost open element that is wanted, or 0 when
// there is none before one that bars the search.
func (t *tagged) find(wanted, bar func(name string) bool) int {
	for i := len(t.open) - 1; i > 0; i-- {
		switch name := t.open[i].name; {
		case wanted(name):
			return i
		case bar(name):
			return 0
		}
	}
	return 0
}

// end closes the innermost open element of the name of an end tag.
func (t *tagged) end(at tag) {
	if i := t.find(func(name string) bool { return name == at.name }, func(string) bool { return false }); i > 0 {
		t.pop(i, at)
	}
}

// text takes character data, where it is read.
func (t *tagged) text(at tag, take func(from, to int)) {
	if !t.top().read() {
		return
	}
	if at.kind == cdata {
		t.literal = true
		take = t.prose.verbatim
	}
	t.prose.folded(at.from, at.to, take)
}

// inOrder returns the blocks in the order of the source.
func (t *tagged) inOrder() []*Block {
	slices.SortStableFunc(t.blocks, func(a, b *Block) int { return cmp.Compare(a.offset, b.offset) })
	return t.blocks
}

// reference reads a character reference as resolve does, without escapes.
func reference(b []byte) (text string, n int) {
	if b[0] != '&' {
		return "", 1
	}
	return resolve(b)
}

var charDataEscapes = strings.NewReplacer("&", "&amp;", "<", "&lt;", ">", "&gt;")

func escapeCharData(words string) (string, bool) { return charDataEscapes.Replace(words), true }

// onlyPlain spells words that need no escapes.
func onlyPlain(words string) (string, bool) { return words, !strings.ContainsAny(words, "<>&") }

// attributeBlock makes a block of an attribute's value, nil when it has no text.
func attributeBlock(source []byte, a attribute) *Block {
	p := prose{source: source, end: a.from}
	p.folded(a.from, a.to, func(from, to int) { p.decodedBy(from, to, "&", reference) })
	b := p.block()
	if b != nil {
		b.escape = func(words string) (string, bool) {
			bare := a.quote == 0 && bytes.ContainsAny([]byte(words), " \t\r\n\f=`")
			return html.EscapeString(words), !bare
		}
		if a.quote == '"' { // the apostrophe needs no escape there
			b.escape = func(words string) (string, bool) {
				return strings.ReplaceAll(charDataEscapes.Replace(words), `"`, "&#34;"), true
			}
		}
	}
	return b
}
