package text

import (
	"bytes"
	"strings"
)

// tagKind says what a piece of a document with tags is.
type tagKind uint8

const (
	charData tagKind = iota // text with character references
	cdata                   // the text of a CDATA section or of a raw text element, without references
	openTag
	closeTag
	aside // comment, declaration, processing instruction
)

// tag is a piece of a document with tags.
type tag struct {
	kind       tagKind
	start, end int    // of all of it in the source
	from, to   int    // of the text, or of the attributes
	name       string // of tags: in small letters in HTML, less the prefix in XML
	empty      bool   // the tag ends with "/>"
}

// tagScanner cuts HTML or XML into pieces that add up to the source. It takes
// whatever comes: what XML calls an error, and an end of the document inside a
// tag or comment, is read as HTML reads it. Time is linear: what has no end goes
// on to the end of the document.
//
// Syntax: HTML Living Standard, section 13.2.5 (tokenization), less the states of
// scripts inside comments; XML 1.0, sections 2.4 to 2.8.
type tagScanner struct {
	source []byte
	xml    bool
	pos    int
	raw    string // the open raw text element: only its end tag ends it
}

// next returns the next piece; ok is false at the end.
func (s *tagScanner) next() (t tag, ok bool) {
	if s.pos >= len(s.source) {
		return tag{}, false
	}
	switch {
	case s.raw != "":
		if t = s.rawText(); t.end > t.start {
			break
		}
		t = s.markup()
	case s.opens(s.pos):
		t = s.markup()
	default:
		t = s.text()
	}
	s.pos = t.end
	return t, true
}

// opens reports whether markup begins at i.
func (s *tagScanner) opens(i int) bool {
	if s.source[i] != '<' || i+1 >= len(s.source) {
		return false
	}
	c := s.source[i+1]
	return c == '!' || c == '?' || s.nameStart(c) ||
		c == '/' && i+2 < len(s.source) && s.nameStart(s.source[i+2])
}

func (s *tagScanner) nameStart(c byte) bool {
	return classes[c]&cLetter != 0 || s.xml && (c == '_' || c >= 0x80)
}

// text is what comes before the next markup.
func (s *tagScanner) text() tag {
	end := s.pos + 1
	for end < len(s.source) {
		i := bytes.IndexByte(s.source[end:], '<')
		if i < 0 {
			end = len(s.source)
			break
		}
		if end += i; s.opens(end) {
			break
		}
		end++
	}
	return tag{kind: charData, start: s.pos, end: end, from: s.pos, to: end}
}

// rawText is what comes before the end tag of the open raw text element.
func (s *tagScanner) rawText() tag {
	end := s.pos
	for end < len(s.source) {
		i := bytes.Index(s.source[end:], []byte("</"))
		if i < 0 {
			end = len(s.source)
			break
		}
		end += i
		name := s.source[end+2:]
		if len(name) >= len(s.raw) && strings.EqualFold(string(name[:len(s.raw)]), s.raw) {
			break
		}
		end += 2
	}
	kind := cdata
	if s.raw == "title" || s.raw == "textarea" { // RCDATA in the standard
		kind = charData
	}
	s.raw = ""
	return tag{kind: kind, start: s.pos, end: end, from: s.pos, to: end}
}

// markup is the tag, comment, section or declaration at pos.
func (s *tagScanner) markup() tag {
	rest := s.source[s.pos:]
	switch {
	case bytes.HasPrefix(rest, []byte("<!--")):
		return s.until(aside, len("<!--"), "-->")
	case bytes.HasPrefix(rest, []byte("<![CDATA[")):
		return s.until(cdata, len("<![CDATA["), "]]>")
	case len(rest) > 1 && rest[1] == '!':
		return s.declaration()
	case len(rest) > 1 && rest[1] == '?' && s.xml:
		return s.until(aside, len("<?"), "?>")
	case len(rest) > 1 && rest[1] == '?':
		return s.until(aside, len("<?"), ">")
	}
	return s.tag()
}

// until is a piece that a mark ends.
func (s *tagScanner) until(kind tagKind, lead int, mark string) tag {
	from := s.pos + lead
	t := tag{kind: kind, start: s.pos, from: from, to: len(s.source), end: len(s.source)}
	if i := bytes.Index(s.source[from:], []byte(mark)); i >= 0 {
		t.to = from + i
		t.end = t.to + len(mark)
	}
	return t
}

// declaration is a document type, whose internal subset in XML may hold others.
func (s *tagScanner) declaration() tag {
	t := s.until(aside, len("<!"), ">")
	if !s.xml || !bytes.ContainsRune(s.source[t.from:t.to], '[') {
		return t
	}
	return s.until(aside, len("<!"), "]>")
}

// tag is a start or end tag.
func (s *tagScanner) tag() tag {
	t := tag{kind: openTag, start: s.pos}
	i := s.pos + 1
	if s.source[i] == '/' {
		t.kind = closeTag
		i++
	}
	nameFrom := i
	for i < len(s.source) && !isSpaceByte(s.source[i]) && s.source[i] != '>' && s.source[i] != '/' {
		i++
	}
	t.name = string(s.source[nameFrom:i])
	if s.xml {
		t.name = t.name[strings.IndexByte(t.name, ':')+1:]
	} else {
		t.name = strings.ToLower(t.name)
	}
	t.from = i
	t.to, t.end = len(s.source), len(s.source)
	for a := range attributes(s.source, i, len(s.source)) {
		i = a.end
	}
	if j := bytes.IndexByte(s.source[i:], '>'); j >= 0 {
		t.to, t.end = i+j, i+j+1
		t.empty = s.source[t.to-1] == '/'
	}
	if t.kind == openTag && !s.xml && rawElement(t.name) && !t.empty {
		s.raw = t.name
	}
	return t
}

// rawElement reports elements of HTML that hold no tags.
func rawElement(name string) bool {
	switch name {
	case "script", "style", "textarea", "title", "xmp", "iframe", "noembed", "noframes":
		return true
	}
	return false
}

// attribute is one of a tag, with the place of its value in the source.
type attribute struct {
	name     string // in small letters
	from, to int    // of the value; both 0 when it has none
	quote    byte   // around the value; 0: none
	end      int    // of all of it
}

// attributes yields the attributes from source[i] on until the tag ends or the
// bound is reached.
func attributes(source []byte, i, bound int) func(yield func(attribute) bool) {
	return func(yield func(attribute) bool) {
		for {
			for i < bound && (isSpaceByte(source[i]) || source[i] == '/') {
				i++
			}
			if i >= bound || source[i] == '>' {
				return
			}
			a := attributeAt(source, i, bound)
			if i = a.end; !yield(a) {
				return
			}
		}
	}
}

// attributeAt reads the attribute that begins at i, where there is one.
func attributeAt(source []byte, i, bound int) attribute {
	from := i
	for i++; i < bound && !isSpaceByte(source[i]) && source[i] != '=' && source[i] != '>' && source[i] != '/'; i++ {
	}
	a := attribute{name: strings.ToLower(string(source[from:i])), end: i}
	for i < bound && isSpaceByte(source[i]) {
		i++
	}
	if i >= bound || source[i] != '=' {
		return a
	}
	for i++; i < bound && isSpaceByte(source[i]); i++ {
	}
	switch {
	case i >= bound || source[i] == '>':
		a.end = i
		return a
	case source[i] == '"' || source[i] == '\'':
		a.quote = source[i]
		i++
		a.from, a.to, a.end = i, bound, bound
		if j := bytes.IndexByte(source[i:bound], a.quote); j >= 0 {
			a.to, a.end = i+j, i+j+1
		}
		return a
	}
	a.from = i
	for i < bound && !isSpaceByte(source[i]) && source[i] != '>' {
		i++
	}
	a.to, a.end = i, i
	return a
}
