package eval

import "fmt"

// accuracySeries is accuracy at k for every k up to the longest list measured.
type accuracySeries struct {
	name   string
	within []float64 // within[k-1]: share of the pairs whose intended form is among the first k
	report *Report   // for the intervals
}

func newAccuracySeries(name string, pairs []PairOutcome, report *Report) accuracySeries {
	s := accuracySeries{name: name, within: make([]float64, cutoffs[len(cutoffs)-1]), report: report}
	for _, p := range pairs {
		for k := range s.within {
			if p.Rank > 0 && p.Rank <= k+1 {
				s.within[k] += 1 / float64(len(pairs))
			}
		}
	}
	return s
}

// listSeries are the series of each file of pairs, after that of all together.
func listSeries(r *Result) []accuracySeries {
	series := []accuracySeries{newAccuracySeries(fmt.Sprintf("all (%d pairs)", len(r.Pairs)), r.Pairs, r.Report)}
	for i, d := range r.Data {
		if len(r.Data) == 1 {
			break
		}
		var pairs []PairOutcome
		for _, p := range r.Pairs {
			if p.Data == i {
				pairs = append(pairs, p)
			}
		}
		series = append(series, newAccuracySeries(fmt.Sprintf("%s (%d)", baseName(d.Name), len(pairs)), pairs, d.Report))
	}
	return series
}

// accuracyPicture draws accuracy at k.
func accuracyPicture(name, title string, series []accuracySeries) Picture {
	series, note := firstSeries(series)
	least := 1.0
	var keys []key
	for i, s := range series {
		least = min(least, s.within[0])
		if m, ok := s.report.Metric("accuracy@1", ""); ok && m.Low.Defined() {
			least = min(least, float64(m.Low))
		}
		keys = append(keys, key{label: s.name, line: lineClass(i), fill: fillClass(i)})
	}
	x := axis{label: "k: how many candidates are looked at", low: .5, high: 20.5, format: func(v float64) string { return fmt.Sprint(v) }}
	for _, k := range cutoffs {
		x.ticks = append(x.ticks, float64(k))
	}
	p := newPlot(title, nil, keys, x, shares("intended form among the first k", lowEnd(least)), plotHeight)
	for i, s := range series {
		p.accuracy(s, i)
	}
	return p.picture(name, title, "How often the form that was meant is among the first k candidates; 95 % bootstrap intervals."+note)
}

func (p *plot) accuracy(s accuracySeries, i int) {
	var points []point
	for k, share := range s.within {
		points = append(points, point{float64(k + 1), share})
	}
	p.curve(lineClass(i), points)
	for _, k := range cutoffs {
		at := float64(k) + .12*float64(i) // side by side
		if m, ok := s.report.Metric(fmt.Sprintf("accuracy@%d", k), ""); ok && m.Low.Defined() && m.High.Defined() {
			p.whisker(lineClass(i), at, float64(m.Low), float64(m.High))
		}
		p.mark(disc, fillClass(i), p.at(at, s.within[k-1]))
	}
}

// classPicture draws accuracy by class of pair.
func classPicture(r *Report) []Picture {
	const name, title = "accuracy-by-class", "Accuracy by class of misspelling"
	shown := []string{"accuracy@1", "accuracy@5", "accuracy@20"}
	var rows []barRow
	for _, class := range append([]string{""}, ListClasses[:]...) {
		if first, ok := r.Metric(shown[0], class); ok {
			rows = append(rows, barRow{label: className(class), n: int(first.N)})
			for _, metric := range shown {
				m, _ := r.Metric(metric, class)
				rows[len(rows)-1].values = append(rows[len(rows)-1].values, m)
			}
		}
	}
	if len(rows) < 2 {
		return nil
	}
	var keys []key
	for i, metric := range shown {
		keys = append(keys, key{label: metric, fill: fillClass(i), shape: shape(i % 2), line: lineClass(i)})
	}
	c := newRows(title, keys, rows)
	for i := range rows {
		for k, m := range rows[i].values {
			y := c.rowAt(i) + 6*float64(k-1)
			if m.Low.Defined() && m.High.Defined() {
				c.line("whisker "+lineClass(k), c.xAt(float64(m.Low)), y, c.xAt(float64(m.High)), y)
			}
			c.mark(shape(k%2), fillClass(k), point{c.xAt(float64(m.Value)), y})
		}
	}
	return []Picture{c.picture(name, title, "Shares of the pairs of each class, with 95 % bootstrap intervals. A pair is in several classes.")}
}

func className(class string) string {
	if class == "" {
		return "all"
	}
	return class
}
