package report

import (
	"html/template"
	"strings"
	"unicode"

	"example.org/foulcase"
)

// highlighted is the text of a document in HTML, a numbered element a line, with
// the marks in it as links to the list of marks.
func highlighted(d Document, items []item) (template.HTML, error) {
	h := highlighter{d: d}
	h.b.Grow(len(d.Source) * 5 / 4)
	h.b.WriteString(lineOpen)
	at := int64(0)
	for _, i := range items {
		if i.Offset < at {
			continue // it overlaps the one before: the list has it
		}
		h.text(at, i.Offset, nil)
		h.text(i.Offset, i.Offset+i.Length, &i)
		at = i.Offset + i.Length
	}
	h.text(at, int64(len(d.Source)), nil)
	text, ended := strings.CutSuffix(h.b.String(), lineOpen)
	if !ended { // the last line has no end of its own
		text += lineClose
	}
	return template.HTML(text), h.err
}

const (
	lineOpen  = "<span class=line>"
	lineClose = "</span>"
)

// highlighter writes the text. Its first error stays.
type highlighter struct {
	d       Document
	b       strings.Builder
	afterCR bool
	err     error
}

// text writes a stretch of the document, of a mark when there is one.
func (h *highlighter) text(from, to int64, mark *item) {
	s, err := foulcase.DecodeText(h.d.Source, h.d.Options, from, to)
	if err != nil {
		h.err = err
		return
	}
	h.open(mark, true)
	for _, r := range s {
		switch {
		case r == '\n' && h.afterCR: // the CR has ended the line
		case r == '\n' || r == '\r':
			h.close(mark)
			h.b.WriteString(lineClose + "\n" + lineOpen)
			h.open(mark, false)
		default:
			h.rune(seen(r))
		}
		h.afterCR = r == '\r'
	}
	h.tip(mark)
	h.close(mark)
}

// open begins the link of a mark; across lines it is several, of which the first
// is the one that is linked to.
func (h *highlighter) open(mark *item, first bool) {
	if mark == nil {
		return
	}
	h.b.WriteString(`<a class="` + mark.Class() + `" href="#` + mark.ID() + `l"`)
	if first {
		h.b.WriteString(` id="` + mark.ID() + `" aria-describedby="` + mark.ID() + `t"`)
	} else {
		h.b.WriteString(` tabindex=-1`)
	}
	h.b.WriteByte('>')
}

func (h *highlighter) close(mark *item) {
	if mark != nil {
		h.b.WriteString("</a>")
	}
}

// tip writes what is shown beside a mark that is pointed at.
func (h *highlighter) tip(mark *item) {
	if mark == nil {
		return
	}
	h.b.WriteString(`<span class=tip role=tooltip id="` + mark.ID() + `t">` + mark.Grade.String() + ", " + mark.Kind.String() + ": ")
	for i, c := range mark.Corrections[:min(len(mark.Corrections), shownCorrections)] {
		if i > 0 {
			h.b.WriteString(", ")
		}
		h.b.WriteString("<b>" + template.HTMLEscapeString(c.Text) + "</b>")
	}
	h.b.WriteString(" (p " + Probability(mark.P) + ")</span>")
}

// rune writes a character; -1 is none.
func (h *highlighter) rune(r rune) {
	switch r {
	case -1:
	case '<':
		h.b.WriteString("&lt;")
	case '>':
		h.b.WriteString("&gt;")
	case '&':
		h.b.WriteString("&amp;")
	default:
		h.b.WriteRune(r)
	}
}

// seen is a character, or a sign in its place where it would not be seen as what
// it is.
func seen(r rune) rune {
	switch {
	case r == '\uFEFF':
		return -1
	case r < ' ' && r != '\t':
		return '\u2400' + r // control pictures
	case unicode.Is(unicode.Bidi_Control, r) || r >= 0x7F && r < 0xA0:
		return unicode.ReplacementChar
	}
	return r
}
