package eval

import (
	"fmt"
	"math"
)

// axis is one side of a plot.
type axis struct {
	label     string
	low, high float64
	ticks     []float64
	format    func(float64) string
}

// shares is an axis of shares in per cent, from a low end up to 1.
func shares(label string, low float64) axis {
	step := .2
	if low >= .5 {
		step = .1
	}
	a := axis{label: label, low: low, high: 1, format: percent}
	for k := 0; ; k++ {
		tick := 1 - float64(k)*step
		if tick < low-1e-9 {
			return a
		}
		a.ticks = append(a.ticks, tick)
	}
}

func percent(v float64) string { return fmt.Sprintf("%.0f %%", 100*v) }

// lowEnd is where an axis of shares begins, at a tick a tenth or more below the
// least value.
func lowEnd(least float64) float64 {
	low := math.Floor(10*least-1) / 10
	if low < .5 {
		low = math.Floor(5*low+1e-9) / 5
	}
	return max(0, low)
}

// plot is a chart of two axes; the title and the key stand above it.
type plot struct {
	canvas
	x, y                     axis
	left, top, right, bottom float64 // edges of the field, user units
}

const (
	plotWidth  = 420.0
	plotHeight = 260.0 // of the field of a plot
	plotLeft   = 58.0
	lineHeight = 19.0
)

// key is an entry of the key: what a shape or a line of a class stands for.
type key struct {
	label string
	line  string // class of a line, or ""
	fill  string // class of a shape, when there is one
	shape shape
}

// newPlot draws the title, lines below it, the key and the axes.
func newPlot(title string, below []string, keys []key, x, y axis, height float64) *plot {
	p := &plot{x: x, y: y, left: plotLeft, right: plotWidth - 24}
	p.width = plotWidth
	p.top = p.heading(title, below, keys)
	p.bottom = p.top + height
	p.height = p.bottom + 44
	p.drawAxes()
	return p
}

// heading writes what stands above a field and returns where the field begins.
func (c *canvas) heading(title string, below []string, keys []key) float64 {
	y := 22.0
	c.text("head", "start", 12, y, title)
	for _, s := range below {
		y += lineHeight - 2
		c.text("small quiet", "start", 12, y, s)
	}
	if len(keys) == 0 {
		return y + 14
	}
	y += lineHeight + 2
	x := 12.0
	for _, k := range keys {
		if width := 34 + textWidth(k.label); x > 12 && x+width > c.width {
			x, y = 12, y+lineHeight
		}
		c.drawKey(k, x, y)
		x += 44 + textWidth(k.label)
	}
	return y + 14
}

func (c *canvas) drawKey(k key, x, y float64) {
	if k.line != "" {
		c.line("curve "+k.line, x, y-4, x+24, y-4)
	}
	if k.fill != "" {
		c.mark(k.shape, k.fill, point{x + 12, y - 4})
	}
	c.text("small", "start", x+30, y, k.label)
}

func (p *plot) drawAxes() {
	for _, t := range p.y.ticks {
		at := p.at(p.x.low, t)
		p.line("grid", p.left, at.y, p.right, at.y)
		p.text("small quiet", "end", p.left-6, at.y+4, p.y.format(t))
	}
	for _, t := range p.x.ticks {
		at := p.at(t, p.y.low)
		p.line("axis", at.x, p.bottom, at.x, p.bottom+4)
		p.text("small quiet", "middle", at.x, p.bottom+17, p.x.format(t))
	}
	p.line("axis", p.left, p.bottom, p.right, p.bottom)
	p.line("axis", p.left, p.top, p.left, p.bottom)
	p.text("small", "middle", (p.left+p.right)/2, p.bottom+35, p.x.label)
	middle := (p.top + p.bottom) / 2
	fmt.Fprintf(&p.b, `<text class="small" text-anchor="middle" transform="translate(14 %s) rotate(-90)">%s</text>`,
		number(middle), escape(p.y.label))
}

// at is where a pair of values lies.
func (p *plot) at(x, y float64) point {
	return point{
		p.left + (x-p.x.low)/(p.x.high-p.x.low)*(p.right-p.left),
		p.bottom - (y-p.y.low)/(p.y.high-p.y.low)*(p.bottom-p.top),
	}
}

// curve joins pairs of values.
func (p *plot) curve(class string, values []point) {
	points := make([]point, len(values))
	for i, v := range values {
		points[i] = p.at(v.x, v.y)
	}
	p.path("curve "+class, points)
}

// whisker draws an interval upright.
func (p *plot) whisker(class string, x, low, high float64) {
	a, b := p.at(x, max(low, p.y.low)), p.at(x, high)
	p.line("whisker "+class, a.x, a.y, b.x, b.y)
}

// wilson is the 95 % score interval of a share of n (Wilson 1927).
func wilson(share float64, n int) (low, high float64) {
	const z = 1.959964
	m := float64(n)
	middle := (share + z*z/(2*m)) / (1 + z*z/m)
	half := z / (1 + z*z/m) * math.Sqrt(share*(1-share)/m+z*z/(4*m*m))
	return middle - half, middle + half
}
