package eval

import (
	"math"
	"slices"
)

// ScoreClean measures a system on text that holds no errors, where every flag
// is a false alarm; flags[i] are those of items[i]. The one metric is
// "flags", per 1,000 words, over all flags, by kind (the class is the kind) and
// by grade (the class is the system's grade). Intervals draw documents.
func ScoreClean(items []Item, flags [][]Flag, r Resampling) (*Report, error) {
	j, err := JudgeAll(items, flags)
	if err != nil {
		return nil, err
	}
	return j.ScoreClean(r), nil
}

// ScoreClean is [ScoreClean] of flags that were judged before.
func (j *Judged) ScoreClean(r Resampling) *Report {
	classes := j.cleanClasses()
	report := j.report("clean", r)
	report.Metrics = bootstrap(j.cleanCounts(classes), cleanMeasures(classes), r)
	return report
}

// cleanClasses lists what the flags are to be counted by: all, each kind, and
// each grade that occurs.
func (j *Judged) cleanClasses() []string {
	classes := []string{""}
	for _, k := range Kinds {
		classes = append(classes, string(k))
	}
	var grades []string
	for _, p := range j.Places {
		if p.Reported() && p.Flag.Grade != "" && !slices.Contains(classes, p.Flag.Grade) && !slices.Contains(grades, p.Flag.Grade) {
			grades = append(grades, p.Flag.Grade)
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

// cleanCounts counts what was reported in each unit.
func (j *Judged) cleanCounts(classes []string) []cleanCounts {
	units := make([]cleanCounts, len(j.Units))
	for i, u := range j.Units {
		units[i] = cleanCounts{float64(u.Words), make([]float64, len(classes))}
	}
	for _, p := range j.Places {
		if !p.Reported() {
			continue
		}
		for k, class := range classes {
			if class == "" || class == string(p.Flag.Kind) || class == p.Flag.Grade {
				units[p.Unit].flags[k]++
			}
		}
	}
	return units
}

func cleanMeasures(classes []string) []measure[cleanCounts] {
	measures := make([]measure[cleanCounts], len(classes))
	for k, class := range classes {
		measures[k] = measure[cleanCounts]{"flags", class, func(c cleanCounts) (float64, float64) {
			if c.words == 0 {
				return math.NaN(), 0
			}
			return 1000 * c.flags[k] / c.words, c.words
		}}
	}
	return measures
}
