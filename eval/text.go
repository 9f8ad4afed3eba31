package eval

import (
	"math"
	"slices"
	"strconv"
)

// ScoreText measures a system's flags on texts with known errors; flags[i] are
// those of items[i]. Metrics, over all kinds and for each kind that occurs:
//
//   - "detection.precision", the share of flags that find an error (flags that
//     are neither right nor wrong are left out), "detection.recall", the share
//     of errors found, and "detection.f1" and "detection.f0.5" (van Rijsbergen
//     1979) of the two;
//   - "correction.…" likewise, where only a flag whose first correction is
//     right counts as right;
//   - "first.of.one.edit", the share of found errors a single edit from a
//     correction that the flag's first correction mends (all, nonword, realword);
//   - "first.of.detected" and "listed.of.detected", the share of found errors
//     whose right correction is the flag's first, or among its corrections;
//   - "false.alarms", wrong flags per 1,000 words;
//   - "calibration.error", see [Judged.Calibration].
//
// Of one kind, precision is over the flags the system calls that kind, recall
// over the errors of that kind. Intervals draw whole documents where the data
// names them, and items where not.
func ScoreText(items []Item, flags [][]Flag, r Resampling) (*Report, error) {
	j, err := JudgeAll(items, flags)
	if err != nil {
		return nil, err
	}
	return j.ScoreText(r), nil
}

// ScoreText is [ScoreText] of flags that were judged before.
func (j *Judged) ScoreText(r Resampling) *Report {
	units := j.textCounts()
	total := textCounts{}
	for _, u := range units {
		total = total.plus(u)
	}
	report := j.report("text", r)
	report.Metrics = append(bootstrap(units, allTextMeasures(total), r), j.Calibration(r)...)
	return report
}

// allTextMeasures are those of all kinds together and of each that occurs.
func allTextMeasures(total textCounts) []measure[textCounts] {
	measures := textMeasures("", 0)
	for i, kind := range Kinds {
		if k := i + 1; total.errors[k]+total.flags[k] > 0 {
			measures = append(measures, textMeasures(string(kind), k)...)
		}
	}
	return measures
}

// kindCounts holds a sum for all kinds together, at 0, and for each of Kinds.
type kindCounts [1 + len(Kinds)]float64

func (c *kindCounts) addIf(counts bool, k Kind) {
	if !counts {
		return
	}
	c[0]++
	if i := slices.Index(Kinds[:], k); i >= 0 {
		c[i+1]++
	}
}

// textCounts sums over texts. Errors are counted by their own kind, flags by
// the kind the system gives.
type textCounts struct {
	words                           float64
	errors, found, corrected, first kindCounts
	flags, right, rightFirst        kindCounts
	near, nearFirst                 kindCounts // of found: a single edit from a correction
}

func (c textCounts) plus(d textCounts) textCounts {
	c.words += d.words
	for i := range c.errors {
		c.errors[i] += d.errors[i]
		c.found[i] += d.found[i]
		c.corrected[i] += d.corrected[i]
		c.first[i] += d.first[i]
		c.flags[i] += d.flags[i]
		c.right[i] += d.right[i]
		c.rightFirst[i] += d.rightFirst[i]
		c.near[i] += d.near[i]
		c.nearFirst[i] += d.nearFirst[i]
	}
	return c
}

// textCounts counts what was reported in each unit.
func (j *Judged) textCounts() []textCounts {
	units := make([]textCounts, len(j.Units))
	for i, u := range j.Units {
		units[i].words = float64(u.Words)
	}
	for i := range j.Places {
		units[j.Places[i].Unit].count(&j.Places[i])
	}
	return units
}

func (c *textCounts) count(p *Place) {
	right := p.Outcome == PlaceRight && p.Reported()
	if p.Error != nil {
		c.errors.addIf(true, p.Error.Kind)
		c.found.addIf(right, p.Error.Kind)
		c.corrected.addIf(right && p.Rank > 0, p.Error.Kind)
		c.first.addIf(right && p.Rank == 1, p.Error.Kind)
		near := right && p.oneEdit()
		c.near.addIf(near, p.Error.Kind)
		c.nearFirst.addIf(near && p.Rank == 1, p.Error.Kind)
	}
	if p.Reported() && p.Outcome != PlaceNeither && !p.Again {
		c.flags.addIf(true, p.Flag.Kind)
		c.right.addIf(right, p.Flag.Kind)
		c.rightFirst.addIf(right && p.Rank == 1, p.Flag.Kind)
	}
}

func textMeasures(class string, k int) []measure[textCounts] {
	type value func(textCounts) float64
	ratio := func(name string, part, whole value) measure[textCounts] {
		return measure[textCounts]{name, class, func(c textCounts) (float64, float64) {
			return part(c) / whole(c), whole(c)
		}}
	}
	errors := func(c textCounts) float64 { return c.errors[k] }
	flags := func(c textCounts) float64 { return c.flags[k] }
	found := func(c textCounts) float64 { return c.found[k] }
	var measures []measure[textCounts]
	for _, side := range []struct {
		name        string
		right, done value
	}{
		{"detection", func(c textCounts) float64 { return c.right[k] }, found},
		{"correction", func(c textCounts) float64 { return c.rightFirst[k] }, func(c textCounts) float64 { return c.first[k] }},
	} {
		measures = append(measures,
			ratio(side.name+".precision", side.right, flags),
			ratio(side.name+".recall", side.done, errors))
		for _, beta := range []float64{1, .5} {
			name := side.name + ".f" + strconv.FormatFloat(beta, 'g', -1, 64)
			measures = append(measures, measure[textCounts]{name, class, func(c textCounts) (float64, float64) {
				return fScore(side.right(c)/flags(c), side.done(c)/errors(c), beta), errors(c)
			}})
		}
	}
	if class == "" || class == string(Nonword) || class == string(Realword) {
		measures = append(measures, ratio("first.of.one.edit",
			func(c textCounts) float64 { return c.nearFirst[k] }, func(c textCounts) float64 { return c.near[k] }))
	}
	return append(measures,
		ratio("first.of.detected", func(c textCounts) float64 { return c.first[k] }, found),
		ratio("listed.of.detected", func(c textCounts) float64 { return c.corrected[k] }, found),
		measure[textCounts]{"false.alarms", class, func(c textCounts) (float64, float64) {
			return 1000 * (c.flags[k] - c.right[k]) / c.words, c.words
		}})
}

// fScore is the weighted harmonic mean of precision and recall; recall weighs
// beta times as much. A system that flags nothing scores 0 where there are
// errors, and where there are none the score is not defined.
func fScore(precision, recall, beta float64) float64 {
	if math.IsNaN(recall) {
		return recall
	}
	if math.IsNaN(precision) || precision+recall == 0 {
		return 0
	}
	return (1 + beta*beta) * precision * recall / (beta*beta*precision + recall)
}

// oneEdit reports whether the error is a single edit from one of its corrections.
func (p *Place) oneEdit() bool {
	return slices.ContainsFunc(p.Error.Corrections, func(c string) bool {
		return editDistance(fold(p.Observed), fold(c)) == 1
	})
}
