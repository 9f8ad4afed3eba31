package eval

import (
	"math"
	"slices"
)

// ScoreNoise measures a system on clean text that slips were put into (see
// [Inject]). The metrics are those of [ScoreText], where "correction.recall" is
// the share of slips corrected first; and, over all flags, by kind and by grade
// of the flag:
//
//   - "good.flagged", of 1,000 words without a slip, how many are flagged;
//   - "harmed", of as many, how many the first correction of a flag would change.
func (j *Judged) ScoreNoise(r Resampling) *Report {
	report := j.ScoreText(r)
	report.Task = TaskNoise
	classes := j.cleanClasses()
	report.Metrics = append(report.Metrics, bootstrap(j.noiseCounts(classes), noiseMeasures(classes), r)...)
	return report
}

// noiseCounts sums over texts, in words; the lists are parallel to the classes.
type noiseCounts struct {
	good            float64
	flagged, harmed []float64
}

func (c noiseCounts) plus(d noiseCounts) noiseCounts {
	sum := noiseCounts{c.good + d.good, slices.Clone(d.flagged), slices.Clone(d.harmed)}
	for k := range c.flagged {
		sum.flagged[k] += c.flagged[k]
		sum.harmed[k] += c.harmed[k]
	}
	return sum
}

// noiseCounts counts the words of each unit.
func (j *Judged) noiseCounts(classes []string) []noiseCounts {
	units := make([]noiseCounts, len(j.Units))
	for i, u := range j.Units {
		units[i] = noiseCounts{float64(u.Words), make([]float64, len(classes)), make([]float64, len(classes))}
	}
	for i := range j.Places {
		p := &j.Places[i]
		c, words := &units[p.Unit], float64(Words(p.Observed))
		if p.Error != nil {
			c.good -= words
		}
		if p.Outcome != PlaceWrong || !p.Reported() {
			continue
		}
		for k, class := range classes {
			if class == "" || class == string(p.Flag.Kind) || class == p.Flag.Grade {
				c.flagged[k] += words
				if p.changes() {
					c.harmed[k] += words
				}
			}
		}
	}
	return units
}

// changes says whether the flag's first correction is other words than stand
// there.
func (p *Place) changes() bool {
	return len(p.Flag.Corrections) > 0 && reading(p.Flag.Corrections[0]) != reading(p.Observed)
}

func noiseMeasures(classes []string) []measure[noiseCounts] {
	var measures []measure[noiseCounts]
	add := func(name, class string, of func(noiseCounts) float64) {
		measures = append(measures, measure[noiseCounts]{name, class, func(c noiseCounts) (float64, float64) {
			if c.good == 0 {
				return math.NaN(), 0
			}
			return 1000 * of(c) / c.good, c.good
		}})
	}
	for k, class := range classes {
		add("good.flagged", class, func(c noiseCounts) float64 { return c.flagged[k] })
		add("harmed", class, func(c noiseCounts) float64 { return c.harmed[k] })
	}
	return measures
}
