package eval

import "fmt"

// fewestPredictions is how many predictions are worth a reliability diagram.
const fewestPredictions = 10

// reliabilityPictures draws a reliability diagram for all flags and for those of
// the kinds whose calibration is reported.
func reliabilityPictures(places []Place) []Picture {
	var pictures []Picture
	for _, kind := range calibrationClasses {
		p, right := Predictions(places, kind)
		if len(p) < fewestPredictions {
			continue
		}
		name, title := "reliability", "Reliability, all kinds"
		if kind != "" {
			name, title = "reliability-"+string(kind), "Reliability, "+string(kind)
		}
		pictures = append(pictures, reliabilityPicture(name, title, p, right))
	}
	return pictures
}

func reliabilityPicture(name, title string, p []float64, right []bool) Picture {
	width, count := EqualWidthBins(p, right, calibrationBins), EqualCountBins(p, right, calibrationBins)
	below := []string{
		fmt.Sprintf("expected calibration error %.3f in bins of equal width,", BinnedError(width)),
		fmt.Sprintf("%.3f in bins of equal count; %d findings, those held back too", BinnedError(count), len(p)),
	}
	keys := []key{
		{label: "bins of equal width, 95 % interval", fill: fillClass(1)},
		{label: "of equal count", fill: "line2", shape: ring},
		{label: "as it should be", line: "even"},
	}
	x := shares("stated probability that it is an error", 0)
	plot := newPlot(title, below, keys, x, shares("share that was one", 0), plotHeight)
	plot.curve("even", []point{{0, 0}, {1, 1}})
	for _, b := range width {
		low, high := wilson(b.Right, b.N)
		plot.whisker(lineClass(1), b.P, low, high)
	}
	for _, b := range count {
		plot.mark(ring, "line2", plot.at(b.P, b.Right))
	}
	for _, b := range width {
		plot.mark(disc, fillClass(1), plot.at(b.P, b.Right))
	}
	plot.countStrip(width)
	return plot.picture(name, title, "Of the findings that are given a probability of 70 %, seven in ten should be errors: points below the line are too sure, those above not sure enough. The bars count the findings in each bin of equal width.")
}

// countStrip draws the counts of bins of equal width as bars below the plot.
func (p *plot) countStrip(bins []Bin) {
	const height = 44.0
	most := 0
	for _, b := range bins {
		most = max(most, b.N)
	}
	base := p.height + lineHeight + height
	for _, b := range bins {
		x1, x2 := p.at(b.Low, 0).x, p.at(b.High, 0).x
		h := max(height*float64(b.N)/float64(most), 1)
		p.rect("bar fill1", x1, base-h, x2-x1, h)
		p.text("small quiet", "middle", (x1+x2)/2, base-h-4, fmt.Sprint(b.N))
	}
	p.line("axis", p.left, base, p.right, base)
	p.text("small quiet", "end", p.left-6, base-2, "count")
	p.height = base + 12
}
