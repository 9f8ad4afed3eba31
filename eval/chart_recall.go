package eval

import (
	"cmp"
	"fmt"
	"slices"
)

// recallCurve is precision against recall as the threshold falls.
type recallCurve struct {
	name   string
	errors int
	points []point // x recall, y precision; one a threshold
	marks  *point  // the reported flags of the grade "mark" alone
	all    *point  // all that are reported
}

// newRecallCurve follows the flags of a kind, or all when kind is "", from the
// surest on. Recall is of the errors of that kind; flags of one probability come
// together.
func newRecallCurve(name string, places []Place, kind Kind) recallCurve {
	c := recallCurve{name: name}
	var flagged []*Place
	for i := range places {
		p := &places[i]
		if p.Error != nil && (kind == "" || p.Error.Kind == kind) {
			c.errors++
		}
		if p.Flag != nil && p.Outcome != PlaceNeither {
			flagged = append(flagged, p)
		}
	}
	slices.SortStableFunc(flagged, func(a, b *Place) int { return cmp.Compare(b.Flag.P, a.Flag.P) })
	var sum recallSum
	for i, p := range flagged {
		sum.add(p, kind)
		if i+1 == len(flagged) || flagged[i+1].Flag.P != p.Flag.P {
			if at, ok := sum.point(c.errors); ok {
				c.points = append(c.points, at)
			}
		}
	}
	c.all = operatingPoint(flagged, kind, c.errors, func(f *Flag) bool { return !f.Held })
	c.marks = operatingPoint(flagged, kind, c.errors, func(f *Flag) bool { return !f.Held && f.Grade == "mark" })
	return c
}

// operatingPoint is the precision and recall of some of the flags.
func operatingPoint(flagged []*Place, kind Kind, errors int, of func(*Flag) bool) *point {
	var sum recallSum
	for _, p := range flagged {
		if of(p.Flag) {
			sum.add(p, kind)
		}
	}
	if at, ok := sum.point(errors); ok {
		return &at
	}
	return nil
}

// recallSum counts flags by their own kind and errors by theirs, as the metrics do.
type recallSum struct{ flags, right, found int }

func (s *recallSum) add(p *Place, kind Kind) {
	right := p.Outcome == PlaceRight && p.Error != nil
	if right && (kind == "" || p.Error.Kind == kind) {
		s.found++
	}
	if !p.Again && (kind == "" || p.Flag.Kind == kind) {
		s.flags++
		if right {
			s.right++
		}
	}
}

func (s *recallSum) point(errors int) (point, bool) {
	if s.flags == 0 || errors == 0 {
		return point{}, false
	}
	return point{float64(s.found) / float64(errors), float64(s.right) / float64(s.flags)}, true
}

// fewestErrors is how many errors of a kind are worth a curve.
const fewestErrors = 10

// kindCurves are the curves of all kinds together and of those that have errors
// enough.
func kindCurves(places []Place) []recallCurve {
	curves := []recallCurve{newRecallCurve("all kinds", places, "")}
	for _, kind := range Kinds {
		if c := newRecallCurve(string(kind), places, kind); c.errors >= fewestErrors {
			curves = append(curves, c)
		}
	}
	return slices.DeleteFunc(curves, func(c recallCurve) bool { return len(c.points) == 0 })
}

// recallPicture draws precision against recall, or nothing without curves.
func recallPicture(name, title string, curves []recallCurve) []Picture {
	if len(curves) == 0 {
		return nil
	}
	curves, note := firstSeries(curves)
	var keys []key
	least := 1.0
	for i, c := range curves {
		for _, p := range c.points {
			least = min(least, p.y)
		}
		keys = append(keys, key{label: fmt.Sprintf("%s (%d errors)", c.name, c.errors), line: lineClass(i)})
	}
	keys = append(keys, key{label: "marks and queries", fill: fillClass(0)}, key{label: "marks alone", fill: fillClass(0), shape: diamond})
	p := newPlot(title, nil, keys, shares("recall: share of the errors that are found", 0), shares("precision", lowEnd(least)), plotHeight)
	for i, c := range curves {
		p.curve(lineClass(i), c.points)
	}
	for i, c := range curves {
		if c.all != nil {
			p.mark(disc, fillClass(i), p.at(c.all.x, c.all.y))
		}
		if c.marks != nil {
			p.mark(diamond, fillClass(i), p.at(c.marks.x, c.marks.y))
		}
	}
	return []Picture{p.picture(name, title, "Each curve follows the findings from the surest to the least sure; the shapes are what was reported. Above and to the right is better."+note)}
}

// seriesClasses is how many series the style can tell apart.
const seriesClasses = 6

// firstSeries keeps as many series as can be told apart, and what is to be said
// of the others.
func firstSeries[S any](series []S) (kept []S, note string) {
	if len(series) <= seriesClasses {
		return series, ""
	}
	return series[:seriesClasses], fmt.Sprintf(" Only the first %d of %d are drawn.", seriesClasses, len(series))
}

func lineClass(i int) string { return fmt.Sprintf("line%d", i%seriesClasses) }
func fillClass(i int) string { return fmt.Sprintf("fill%d", i%seriesClasses) }
