package eval

import (
	_ "embed"
	"encoding/xml"
	"fmt"
	"strconv"
	"strings"
	"unicode/utf8"
)

// A Picture is a chart of a result. The same result gives the same bytes.
type Picture struct {
	Name  string // a name for a file, without its extension
	Title string
	Note  string // how it is to be read, in a sentence or two
	svg   string
}

// chartStyle gives the classes of the charts their colours, on light and on dark
// ground. They are those of Okabe & Ito (2008, "Color universal design"), which
// most readers can tell apart; dashes and shapes do the same on paper.
//
//go:embed chart.css
var chartStyle string

// SVG is the picture as a file by itself.
func (p Picture) SVG() string {
	head, body, _ := strings.Cut(p.svg, ">")
	return head + "><style>" + chartStyle + "</style>" + body + "\n"
}

// letterWidth is what a letter of a small text is taken to be wide, in user units.
const letterWidth = 6.2

// textWidth estimates how wide a small text is, in user units.
func textWidth(s string) float64 { return letterWidth * float64(utf8.RuneCountInString(s)) }

// canvas writes an SVG. Coordinates are user units, y downwards.
type canvas struct {
	b             strings.Builder
	width, height float64
}

// number writes a coordinate to a tenth of a unit.
func number(v float64) string {
	return strings.TrimSuffix(strconv.FormatFloat(v, 'f', 1, 64), ".0")
}

func escape(s string) string {
	var b strings.Builder
	_ = xml.EscapeText(&b, []byte(s)) // a Builder has no errors
	return b.String()
}

func (c *canvas) line(class string, x1, y1, x2, y2 float64) {
	fmt.Fprintf(&c.b, `<path class="%s" d="M%s %sL%s %s"/>`, class, number(x1), number(y1), number(x2), number(y2))
}

func (c *canvas) rect(class string, x, y, w, h float64) {
	fmt.Fprintf(&c.b, `<rect class="%s" x="%s" y="%s" width="%s" height="%s"/>`, class, number(x), number(y), number(w), number(h))
}

// text writes a text whose start, middle or end is at x, and whose base line is at y.
func (c *canvas) text(class, anchor string, x, y float64, s string) {
	fmt.Fprintf(&c.b, `<text class="%s" text-anchor="%s" x="%s" y="%s">%s</text>`, class, anchor, number(x), number(y), escape(s))
}

// path joins points. Those within half a unit of the one before are left out.
func (c *canvas) path(class string, points []point) {
	fmt.Fprintf(&c.b, `<path class="%s" d="`, class)
	var last point
	for i, p := range points {
		switch dx, dy := p.x-last.x, p.y-last.y; {
		case i == 0:
			c.b.WriteString("M")
		case dx*dx+dy*dy < .25 && i < len(points)-1:
			continue
		default:
			c.b.WriteString("L")
		}
		c.b.WriteString(number(p.x) + " " + number(p.y))
		last = p
	}
	c.b.WriteString(`"/>`)
}

type point struct{ x, y float64 }

// A shape is how a single value is drawn.
type shape uint8

const (
	disc shape = iota
	diamond
	ring
	square
)

// mark draws a shape around a point.
func (c *canvas) mark(s shape, class string, at point) {
	const r = 4.5
	switch s {
	case diamond:
		fmt.Fprintf(&c.b, `<path class="mark %s" d="M%s %sl%[4]s %[4]s -%[4]s %[4]s -%[4]s -%[4]sz"/>`,
			class, number(at.x), number(at.y-1.2*r), number(1.2*r))
	case ring:
		fmt.Fprintf(&c.b, `<circle class="ring %s" cx="%s" cy="%s" r="%s"/>`, class, number(at.x), number(at.y), number(r))
	case square:
		c.rect("bar "+class, at.x-6, at.y-6, 12, 12)
	default:
		fmt.Fprintf(&c.b, `<circle class="mark %s" cx="%s" cy="%s" r="%s"/>`, class, number(at.x), number(at.y), number(r))
	}
}

// picture closes the canvas.
func (c *canvas) picture(name, title, note string) Picture {
	head := fmt.Sprintf(`<svg xmlns="http://www.w3.org/2000/svg" class="chart" role="img" viewBox="0 0 %s %s" width="%s" height="%s">`,
		number(c.width), number(c.height), number(c.width), number(c.height))
	return Picture{name, title, note, head + "<title>" + escape(title) + "</title>" +
		fmt.Sprintf(`<rect class="paper" width="%s" height="%s"/>`, number(c.width), number(c.height)) +
		c.b.String() + "</svg>"}
}
