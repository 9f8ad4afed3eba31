package eval

import (
	"fmt"
	"math"
	"slices"
)

// ScoreClean measures a system on text that holds no errors, where every flag
// is a false alarm; flags[i] are those of items[i]. The one metric is
// "flags", per 1,000 words, over all flags, by kind (the class is the kind) and
// by grade (the class is the system's grade). Intervals draw documents.
func ScoreClean(items []Item, flags [][]Flag, r Resampling) (*Report, error) {
	if len(items) != len(flags) {
		return nil, fmt.Errorf("%d items but flags for %d", len(items), len(flags))
	}
	classes := cleanClasses(flags)
	report := &Report{Task: "clean", Items: len(items), Resamples: r.resamples(), Seed: r.Seed}
	each := make([]cleanCounts, len(items))
	for i, item := range items {
		c := cleanCounts{words: float64(Words(item.Source)), flags: make([]float64, len(classes))}
		for _, f := range flags[i] {
			for k, class := range classes {
				if class == "" || class == string(f.Kind) || class == f.Grade {
					c.flags[k]++
				}
			}
		}
		each[i] = c
		report.Words += int(c.words)
	}
	groups := byDocument(items, each)
	report.Documents = len(groups)
	measures := make([]measure[cleanCounts], len(classes))
	for k, class := range classes {
		measures[k] = measure[cleanCounts]{"flags", class, func(c cleanCounts) (float64, float64) {
			if c.words == 0 {
				return math.NaN(), 0
			}
			return 1000 * c.flags[k] / c.words, c.words
		}}
	}
	report.Metrics = bootstrap(groups, measures, r)
	return report, nil
}

// cleanClasses lists what the flags are to be counted by: all, each kind, and
// each grade that occurs.
func cleanClasses(flags [][]Flag) []string {
	classes := []string{""}
	for _, k := range Kinds {
		classes = append(classes, string(k))
	}
	var grades []string
	for _, list := range flags {
		for _, f := range list {
			if f.Grade != "" && !slices.Contains(classes, f.Grade) && !slices.Contains(grades, f.Grade) {
				grades = append(grades, f.Grade)
			}
		}
	}
	slices.Sort(grades)
	return append(classes, grades...)
}

// cleanCounts sums over texts; flags is parallel to the classes.
type cleanCounts struct {
	words float64
	flags []float64
}

func (c cleanCounts) plus(d cleanCounts) cleanCounts {
	sum := cleanCounts{words: c.words + d.words, flags: slices.Clone(d.flags)}
	for k := range c.flags {
		sum.flags[k] += c.flags[k]
	}
	return sum
}
