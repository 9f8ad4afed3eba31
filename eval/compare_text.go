package eval

import (
	"cmp"
	"fmt"
	"maps"
	"math"
	"slices"
)

// chiefOfTexts are the metrics of text that a comparison shows.
var chiefOfTexts = []string{
	"detection.precision", "detection.recall", "detection.f1", "detection.f0.5",
	"correction.precision", "correction.recall", "correction.f1", "correction.f0.5", "false.alarms",
}

// texts compares flags on texts with known errors.
func (c *Comparison) texts(a, b *Result, classes []string, r Resampling) error {
	if err := sameUnits(a, b); err != nil {
		return err
	}
	measures := chief(textMeasures("", 0), chiefOfTexts...)
	for _, class := range classes {
		k := slices.Index(Kinds[:], Kind(class))
		if k < 0 {
			return unknownClass(class, kindNames())
		}
		measures = append(measures, chief(textMeasures(class, k+1), chiefOfTexts...)...)
	}
	compareCounts(c, a.Judged().textCounts(), b.Judged().textCounts(), measures, r)
	c.places(a, b)
	return nil
}

// cleans compares false alarms on texts without errors.
func (c *Comparison) cleans(a, b *Result, classes []string, r Resampling) error {
	if err := sameUnits(a, b); err != nil {
		return err
	}
	x, y := a.Judged(), b.Judged()
	known := slices.Compact(slices.Sorted(slices.Values(append(x.cleanClasses(), y.cleanClasses()...))))
	for _, class := range classes {
		if !slices.Contains(known, class) {
			return unknownClass(class, known[1:])
		}
	}
	shown := append([]string{""}, classes...)
	compareCounts(c, x.cleanCounts(shown), y.cleanCounts(shown), cleanMeasures(shown), r)
	c.places(a, b)
	return nil
}

func sameUnits(a, b *Result) error {
	for i, u := range a.Units {
		if v := b.Units[i]; u.Document != v.Document || u.Words != v.Words || u.Data != v.Data {
			return fmt.Errorf("%w: document %d has %d words in one and %d in the other", ErrIncomparable, i+1, u.Words, v.Words)
		}
	}
	return nil
}

func kindNames() []string {
	var names []string
	for _, k := range Kinds {
		names = append(names, string(k))
	}
	return names
}

// site is where a place is: what makes places of two results the same.
type site struct{ unit, line, start, end int }

func (p *Place) site() site {
	start, end := p.extent()
	return site{p.Unit, p.Line, start, end}
}

func compareSites(s, t site) int {
	return cmp.Or(cmp.Compare(s.unit, t.unit), cmp.Compare(s.line, t.line), cmp.Compare(s.start, t.start), cmp.Compare(s.end, t.end))
}

// places compares what became of each error and of each good word flagged.
// Errors that one result alone takes for such, since their models know other
// words, are left out.
func (c *Comparison) places(a, b *Result) {
	errorsA, alarmsA := a.sites()
	errorsB, alarmsB := b.sites()
	var found, corrected [2][]bool
	for _, s := range slices.SortedFunc(maps.Keys(errorsA), compareSites) {
		p, q := errorsA[s], errorsB[s]
		if q == nil {
			continue
		}
		for i, place := range []*Place{p, q} {
			found[i] = append(found[i], !place.Missed())
			corrected[i] = append(corrected[i], !place.Missed() && place.Rank == 1)
		}
		item := a.changed(p, p.state(), q.state())
		item.Wanted = first(p.Error.Corrections)
		c.note(item, p.worth(), q.worth())
	}
	if c.Task != TaskClean {
		c.Tests = append(c.Tests,
			Test{"error found", len(found[0]), CompareOutcomes(found[0], found[1])},
			Test{"error corrected first", len(corrected[0]), CompareOutcomes(corrected[0], corrected[1])})
	}
	for _, s := range slices.SortedFunc(maps.Keys(alarmsA), compareSites) {
		if alarmsB[s] == nil {
			c.Better = append(c.Better, a.changed(alarmsA[s], "false alarm", "let stand"))
		}
	}
	for _, s := range slices.SortedFunc(maps.Keys(alarmsB), compareSites) {
		if alarmsA[s] == nil {
			c.Worse = append(c.Worse, b.changed(alarmsB[s], "let stand", "false alarm"))
		}
	}
}

// sites indexes the errors and the reported false alarms.
func (r *Result) sites() (errors, alarms map[site]*Place) {
	errors, alarms = map[site]*Place{}, map[site]*Place{}
	for i := range r.Places {
		switch p := &r.Places[i]; {
		case p.Error != nil:
			errors[p.site()] = p
		case p.Reported() && p.Outcome == PlaceWrong:
			alarms[p.site()] = p
		}
	}
	return errors, alarms
}

// changed describes a place of r.
func (r *Result) changed(p *Place, a, b string) Changed {
	return Changed{Data: r.Data[r.Units[p.Unit].Data].Name, Line: p.Line, Observed: p.Observed, A: a, B: b}
}

// state words what became of an error.
func (p *Place) state() string {
	switch {
	case p.Missed():
		return "missed"
	case p.Rank == 0:
		return "found"
	}
	return fmt.Sprintf("found, right correction at %d", p.Rank)
}

// worth orders what may become of an error, best first.
func (p *Place) worth() float64 {
	switch {
	case p.Missed():
		return math.Inf(1)
	case p.Rank == 0:
		return math.MaxFloat64
	}
	return float64(p.Rank)
}

func first(list []string) string {
	if len(list) == 0 {
		return ""
	}
	return list[0]
}
