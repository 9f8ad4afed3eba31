package eval

import (
	"cmp"
	"fmt"
	"slices"
	"strings"
	"unicode/utf8"
)

// Judged is what became of every flag and every error of some texts.
type Judged struct {
	Items  int
	Units  []Unit  // in the order of the texts
	Places []Place // likewise; Unit is an index into Units
}

// JudgeAll holds the flags of items against their errors, as [Judge] does;
// flags[i] are those of items[i]. Findings that are held back are judged after
// the others, against the errors that those leave over.
func JudgeAll(items []Item, flags [][]Flag) (*Judged, error) {
	if len(items) != len(flags) {
		return nil, fmt.Errorf("%d items but flags for %d", len(items), len(flags))
	}
	j := &Judged{Items: len(items)}
	units := map[string]int{}
	for i, item := range items {
		u, ok := units[item.Document]
		if !ok || item.Document == "" {
			u = len(j.Units)
			units[item.Document] = u
			j.Units = append(j.Units, Unit{Document: item.Document, Line: item.Line})
		}
		j.Units[u].Words += Words(item.Source)
		places, err := placesOf(item, flags[i])
		if err != nil {
			return nil, err
		}
		for k := range places {
			places[k].Unit = u
		}
		j.Places = append(j.Places, places...)
	}
	return j, nil
}

// report is a report without metrics.
func (j *Judged) report(task string, r Resampling) *Report {
	report := &Report{Task: task, Items: j.Items, Documents: len(j.Units), Resamples: r.resamples(), Seed: r.Seed}
	for _, u := range j.Units {
		report.Words += u.Words
	}
	return report
}

// placesOf lists the flags and errors of one item, in order.
func placesOf(item Item, flags []Flag) ([]Place, error) {
	reported := slices.DeleteFunc(slices.Clone(flags), func(f Flag) bool { return f.Held })
	held := slices.DeleteFunc(slices.Clone(flags), func(f Flag) bool { return !f.Held })
	places, left, err := judgePlaces(item, reported)
	if err != nil {
		return nil, err
	}
	if len(held) > 0 {
		rest := item
		rest.Spans = left
		more, still, err := judgePlaces(rest, held)
		if err != nil {
			return nil, err
		}
		places, left = append(places, more...), still
	}
	for _, span := range left {
		if !span.Neutral {
			places = append(places, newPlace(item, PlaceMissed, nil, &span))
		}
	}
	slices.SortStableFunc(places, func(a, b Place) int {
		x, _ := a.extent()
		y, _ := b.extent()
		return cmp.Compare(x, y)
	})
	return places, nil
}

// judgePlaces makes a place of each flag, and of each further error that a flag
// finds. The spans come back with those found made neutral.
func judgePlaces(item Item, flags []Flag) (places []Place, left []Span, err error) {
	outcomes, verdicts, err := Judge(item, flags)
	if err != nil {
		return nil, nil, err
	}
	slices.SortStableFunc(verdicts, func(a, b Verdict) int { // a flag's best correction first
		return cmp.Compare(uint(a.Rank-1), uint(b.Rank-1))
	})
	counted := make([]bool, len(flags))
	found := map[int]bool{} // starts of spans
	for _, v := range verdicts {
		if v.Flag < 0 {
			continue
		}
		p := newPlace(item, PlaceRight, &flags[v.Flag], &v.Span)
		p.Rank, p.Again = v.Rank, counted[v.Flag]
		places = append(places, p)
		counted[v.Flag], found[v.Span.Start] = true, true
	}
	for i := range flags {
		switch {
		case counted[i]:
		case outcomes[i] == Neither:
			places = append(places, newPlace(item, PlaceNeither, &flags[i], nil))
		default:
			places = append(places, newPlace(item, PlaceWrong, &flags[i], nil))
		}
	}
	left = slices.Clone(item.Spans)
	for i := range left {
		left[i].Neutral = left[i].Neutral || found[left[i].Start]
	}
	return places, left, nil
}

func newPlace(item Item, outcome string, flag *Flag, span *Span) Place {
	p := Place{Line: item.Line, Outcome: outcome, Flag: flag, Error: span}
	start, end := p.extent()
	p.Observed = item.Source[start:end]
	p.Context = around(item.Source, start, end)
	return p
}

// extent is where the error stands, or the flag when there is none.
func (p *Place) extent() (start, end int) {
	if p.Error != nil {
		return p.Error.Start, p.Error.End
	}
	return p.Flag.Start, p.Flag.End
}

// contextBytes is how much of a text is shown on either side of a place.
const contextBytes = 60

// around cuts a place with its surroundings out of a text, at spaces, and
// writes it on one line.
func around(text string, start, end int) string {
	from, to := start-contextBytes, end+contextBytes
	before, after := "", ""
	if from > 0 {
		before = "… "
		if space := strings.IndexByte(text[from:start], ' '); space >= 0 {
			from += space + 1
		}
		for from < start && !utf8.RuneStart(text[from]) {
			from++
		}
	}
	if to < len(text) {
		after = " …"
		if space := strings.LastIndexByte(text[end:to], ' '); space >= 0 {
			to = end + space
		}
		for to > end && !utf8.RuneStart(text[to]) {
			to--
		}
	}
	from, to = max(from, 0), min(to, len(text))
	return before + strings.Join(strings.Fields(text[from:to]), " ") + after
}
