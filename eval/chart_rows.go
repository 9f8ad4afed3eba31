package eval

import (
	"fmt"
	"strings"
)

// barRow is a line of a chart whose lines are classes.
type barRow struct {
	label  string
	n      int
	values []Metric  // for whiskers
	parts  []barPart // for bars
}

// barPart is one of the parts that a bar is made of.
type barPart struct {
	n    int
	fill string
	on   string // class of the number written on it
}

// rowsChart is a chart of rows over an axis of shares.
type rowsChart struct {
	canvas
	left, right, top float64
	rows             int
}

const rowHeight = 27.0

// newRows draws the title, the key, the axis and the names of the rows.
func newRows(title string, keys []key, rows []barRow) *rowsChart {
	c := &rowsChart{rows: len(rows)}
	c.width, c.right = plotWidth, plotWidth-24
	c.top = c.heading(title, nil, keys)
	for _, r := range rows {
		c.left = max(c.left, 16+textWidth(r.name()))
	}
	bottom := c.top + rowHeight*float64(len(rows))
	c.height = bottom + 28
	for _, tick := range shares("", 0).ticks {
		c.line("grid", c.xAt(tick), c.top, c.xAt(tick), bottom)
		c.text("small quiet", "middle", c.xAt(tick), bottom+17, percent(tick))
	}
	c.line("axis", c.left, c.top, c.left, bottom)
	for i, r := range rows {
		c.text("small", "end", c.left-8, c.rowAt(i)+4, r.name())
	}
	return c
}

func (r *barRow) name() string { return fmt.Sprintf("%s, %d", r.label, r.n) }

func (c *rowsChart) xAt(share float64) float64 { return c.left + share*(c.right-c.left) }

// rowAt is the middle of row i.
func (c *rowsChart) rowAt(i int) float64 { return c.top + rowHeight*(float64(i)+.5) }

// bars draws the parts of each row side by side, with their numbers where there
// is room.
func (c *rowsChart) bars(rows []barRow) {
	for i, r := range rows {
		x, y := c.left, c.rowAt(i)
		for _, part := range r.parts {
			width := (c.right - c.left) * float64(part.n) / float64(r.n)
			if part.n > 0 {
				c.rect("bar "+part.fill, x, y-.36*rowHeight, width, .72*rowHeight)
			}
			if number := fmt.Sprint(part.n); part.n > 0 && width > textWidth(number)+4 {
				c.text("small "+part.on, "middle", x+width/2, y+4, number)
			}
			x += width
		}
	}
}

// errorsPicture draws what became of the errors of each kind.
func errorsPicture(places []Place) []Picture {
	const name, title = "errors-by-kind", "Errors by kind, and what became of them"
	var rows []barRow
	for _, kind := range append([]Kind{""}, Kinds[:]...) {
		parts := []barPart{{fill: fillClass(3), on: "on"}, {fill: fillClass(5), on: "on-light"}, {fill: fillClass(2), on: "on"}}
		n := 0
		for i := range places {
			p := &places[i]
			if p.Error == nil || kind != "" && p.Error.Kind != kind {
				continue
			}
			n++
			switch {
			case p.Missed():
				parts[2].n++
			case p.Rank == 1:
				parts[0].n++
			default:
				parts[1].n++
			}
		}
		if n > 0 {
			rows = append(rows, barRow{label: className(string(kind)), n: n, parts: parts})
		}
	}
	if len(rows) == 0 {
		return nil
	}
	c := newRows(title, []key{
		{label: "corrected first", fill: fillClass(3), shape: square},
		{label: "found, right correction not first", fill: fillClass(5), shape: square},
		{label: "missed", fill: fillClass(2), shape: square},
	}, rows)
	c.bars(rows)
	return []Picture{c.picture(name, title, "Beside each kind the number of its errors; in the bars, how many.")}
}

// alarmsPicture draws false alarms in 1,000 words, by kind and grade of the flag.
func alarmsPicture(r *Report) []Picture {
	const name, title = "false-alarms", "False alarms in 1,000 words"
	metric := "false.alarms"
	if r.Task == TaskClean {
		metric = "flags"
	}
	var rows []barRow
	most := 0.0
	for _, m := range r.Metrics {
		if m.Name == metric && m.High.Defined() && m.Value > 0 {
			rows = append(rows, barRow{label: className(m.Class), values: []Metric{m}})
			most = max(most, float64(m.High))
		}
	}
	if len(rows) == 0 {
		return nil
	}
	c := &rowsChart{rows: len(rows), left: 90, right: plotWidth - 140}
	c.width = plotWidth
	c.top = c.heading(title, nil, nil)
	c.height = c.top + rowHeight*float64(len(rows)) + 10
	for i, row := range rows {
		m, y := row.values[0], c.rowAt(i)
		c.text("small", "end", c.left-8, y+4, row.label)
		c.rect("bar fill1", c.left, y-.3*rowHeight, c.xAt(float64(m.Value)/most)-c.left, .6*rowHeight)
		c.line("whisker line0", c.xAt(float64(m.Low)/most), y, c.xAt(float64(m.High)/most), y)
		c.text("small quiet", "start", c.right+10, y+4, fmt.Sprintf("%.2f [%.2f, %.2f]", m.Value, m.Low, m.High))
	}
	c.line("axis", c.left, c.top, c.left, c.height-10)
	return []Picture{c.picture(name, title, "Findings where nothing is wrong, with 95 % bootstrap intervals.")}
}

// baseName is the last part of a path, whichever way its slashes lean.
func baseName(path string) string { return path[strings.LastIndexAny(path, `/\`)+1:] }
