package text

import (
	"bytes"
	"cmp"
	"io"
	"slices"

	"github.com/yuin/goldmark"
	"github.com/yuin/goldmark/ast"
	"github.com/yuin/goldmark/extension"
	gtext "github.com/yuin/goldmark/text"
)

// readMarkdown reads the whole document and yields a block for each paragraph,
// heading, list item's text, table cell, footnote and defined term, in the order
// of the source. Link text, the alternative text of images and the text in HTML are
// prose; link destinations and titles, code blocks, attributes in braces, the
// fences of containers (":::") and front matter are left out. An inline code span,
// or what a template engine fills in, is one U+FFFC in the text, so that its
// sentence stays whole.
func readMarkdown(r io.Reader, o Options, yield func(*Block, error) bool) {
	readWhole(r, o, yield, func(source []byte) ([]*Block, error) {
		m := markdown{source: source, options: o}
		err := m.parse()
		return m.blocks, err
	})
}

// markdown gathers the blocks of one document.
type markdown struct {
	source  []byte
	options Options
	base    int // where what goldmark reads begins in source
	blocks  []*Block
	prose   prose
	fenced  bool // the line at hand begins with the fence of a container
}

// parse fills m.blocks. A fault inside the parser of the markup comes back as
// an error.
func (m *markdown) parse() (err error) {
	defer func() {
		if fault := recover(); fault != nil {
			err = unreadable("the document cannot be read as Markdown (%v); read it as plain text", fault)
		}
	}()
	m.base = bomLen(m.source)
	m.base += frontMatter(m.source[m.base:])
	parser := goldmark.New(goldmark.WithExtensions(extension.Table, extension.Strikethrough,
		extension.TaskList, extension.Footnote, extension.DefinitionList)).Parser()
	m.container(parser.Parse(gtext.NewReader(tamed(m.source[m.base:]))))
	slices.SortStableFunc(m.blocks, func(a, b *Block) int { return cmp.Compare(a.offset, b.offset) })
	return nil
}

// container takes the blocks inside a block.
func (m *markdown) container(n ast.Node) {
	if n.Kind() == ast.KindHTMLBlock {
		m.html(n.Lines())
		return
	}
	if c := n.FirstChild(); c != nil && c.Type() == ast.TypeInline {
		m.prose = prose{source: m.source, leaders: ">"}
		m.inlines(n)
		m.finish(n)
		return
	}
	for c := n.FirstChild(); c != nil; c = c.NextSibling() {
		m.container(c)
	}
}

// html takes the text of HTML between blank lines, unless other markup begins its
// lines.
func (m *markdown) html(lines *gtext.Segments) {
	if lines.Len() == 0 {
		return
	}
	from, to := m.base+lines.At(0).Start, m.base+lines.At(lines.Len()-1).Stop
	for i := 1; i < lines.Len(); i++ {
		between := m.source[m.base+lines.At(i-1).Stop : m.base+lines.At(i).Start]
		if len(bytes.TrimSpace(between)) > 0 {
			return
		}
	}
	h := htmlReader{tagged: newTagged(m.source[:to], m.options)}
	h.begin(from)
	h.parseFrom(from)
	m.blocks = append(m.blocks, h.blocks...)
}

// finish makes a block of the prose gathered so far.
func (m *markdown) finish(n ast.Node) {
	if b := m.prose.block(); b != nil {
		b.Heading = n.Kind() == ast.KindHeading
		m.blocks = append(m.blocks, b)
	}
	m.prose = prose{source: m.source, leaders: ">", end: m.prose.end, fixed: m.prose.fixed}
	m.fenced = false
}

// inlines takes the prose of the inline nodes of n.
func (m *markdown) inlines(n ast.Node) {
	for n := n.FirstChild(); n != nil; n = n.NextSibling() {
		switch c := n.(type) {
		case *ast.Text:
			n = m.text(c)
		case *ast.CodeSpan:
			m.codeSpan(c)
		case *ast.AutoLink:
			if from := m.base + c.Pos() + 1; c.Pos() >= 0 {
				m.prose.verbatim(from, from+len(c.Label(m.source[m.base:])))
			}
		case *ast.RawHTML:
			if at := c.Segments.At(0); bytes.HasPrefix(bytes.ToLower(at.Value(m.source[m.base:])), []byte("<br")) {
				m.prose.lineBreak(m.base + at.Start)
			}
		case *ast.Link:
			m.link(c, c.Reference)
		case *ast.Image:
			m.link(c, c.Reference)
		default: // emphasis
			m.inlines(c)
		}
	}
}

// link takes the text of a link or image. Where it is the name of its target too
// ("[text][]"), another spelling would lose the target.
func (m *markdown) link(n ast.Node, reference *ast.ReferenceLink) {
	outer := m.prose.fixed
	m.prose.fixed = outer || reference != nil && reference.Type != ast.ReferenceLinkFull
	m.inlines(n)
	m.prose.fixed = outer
}

// text takes a text node and those that it goes on in: their bytes less escapes
// and entities, then the line break after them. A hard break ends the block unless
// the next line goes on in lower case. It returns the last node.
func (m *markdown) text(t *ast.Text) ast.Node {
	from := m.base + t.Segment.Start
	t = lastOfRun(t)
	to := m.base + t.Segment.Stop
	if t.IsRaw() {
		m.prose.verbatim(from, to)
	} else {
		if n := m.fence(from, to); n > 0 {
			m.finish(t)
			m.fenced = true
			from += n
		}
		m.prose.decodedBy(from, to, "\\&{<", decode)
	}
	switch {
	case t.SoftLineBreak() && m.fenced, t.HardLineBreak() && !m.startsLower(t.NextSibling()):
		m.finish(t)
	case t.HardLineBreak() || t.SoftLineBreak():
		m.prose.lineBreak(to)
	}
	return t
}

// lastOfRun returns the last text node that follows t at once, on the same line:
// a mark that turned out to be no markup parts two.
func lastOfRun(t *ast.Text) *ast.Text {
	for !t.SoftLineBreak() && !t.HardLineBreak() {
		next, ok := t.NextSibling().(*ast.Text)
		if !ok || next.Segment.Start != t.Segment.Stop || next.IsRaw() != t.IsRaw() {
			break
		}
		t = next
	}
	return t
}

// decode is resolve, which also leaves out attributes and has a placeholder for
// what a template engine fills in.
func decode(b []byte) (text string, n int) {
	if n = filledIn(b); n > 0 {
		return placeholder, n
	}
	if n = attributeList(b); n > 0 {
		return "", n
	}
	if b[0] == '{' || b[0] == '<' {
		return "", 1
	}
	return resolve(b)
}

// fence returns the length of the fence of a container at source[from:to], the kind
// and attributes of the container included, 0 when none begins a line there. Behind
// it its title may stand.
func (m *markdown) fence(from, to int) int {
	line := m.source[from:to]
	before := bytes.TrimRight(m.source[:from], " \t")
	if !bytes.HasPrefix(line, []byte(":::")) || len(before) > 0 && !lineStart(m.source, len(before)) {
		return 0
	}
	rest := bytes.TrimLeft(bytes.TrimLeft(line, ":"), " \t")
	n := attributeList(rest)
	for n < len(rest) && (alnumByte(rest[n]) || rest[n] == '-') {
		n++
	}
	n += blanks(rest[n:])
	return len(line) - len(rest) + n
}

func (m *markdown) startsLower(n ast.Node) bool {
	t, ok := n.(*ast.Text)
	if !ok {
		return false
	}
	line := bytes.TrimLeft(t.Segment.Value(m.source[m.base:]), " \t")
	return len(line) > 0 && isLower(rune(line[0]))
}

// codeSpan takes code between back quotes as one placeholder.
func (m *markdown) codeSpan(c *ast.CodeSpan) {
	first, ok := c.FirstChild().(*ast.Text)
	last, ok2 := c.LastChild().(*ast.Text)
	if !ok || !ok2 {
		return
	}
	from, to := m.base+first.Segment.Start, m.base+last.Segment.Stop
	for from > m.base && m.source[from-1] != '`' {
		from--
	}
	for from > m.base && m.source[from-1] == '`' {
		from--
	}
	for to < len(m.source) && m.source[to] != '`' {
		to++
	}
	for to < len(m.source) && m.source[to] == '`' {
		to++
	}
	m.prose.standIn(placeholder, from, to)
}

// frontMatter returns the length of the settings that stand between lines of
// "---" or "+++" at the start of a document.
func frontMatter(source []byte) int {
	var lines []textLine
	lines = splitLines(lines, source)
	if len(lines) == 0 || lines[0].start != 0 {
		return 0
	}
	fence := string(source[:lines[0].end])
	if fence != "---" && fence != "+++" {
		return 0
	}
	for _, l := range lines[1:] {
		if mark := string(source[l.start:l.end]); mark == fence || mark == "..." && fence == "---" {
			return l.next
		}
	}
	return 0
}
