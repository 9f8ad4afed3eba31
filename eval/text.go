package eval

import (
	"fmt"
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
//   - "first.of.detected" and "listed.of.detected", the share of found errors
//     whose right correction is the flag's first, or among its corrections;
//   - "false.alarms", wrong flags per 1,000 words.
//
// Of one kind, precision is over the flags the system calls that kind, recall
// over the errors of that kind. Intervals draw whole documents where the data
// names them, and items where not.
func ScoreText(items []Item, flags [][]Flag, r Resampling) (*Report, error) {
	if len(items) != len(flags) {
		return nil, fmt.Errorf("%d items but flags for %d", len(items), len(flags))
	}
	each := make([]textCounts, len(items))
	total := textCounts{}
	for i, item := range items {
		var err error
		if each[i], err = countText(item, flags[i]); err != nil {
			return nil, err
		}
		total = total.plus(each[i])
	}
	groups := byDocument(items, each)
	report := &Report{
		Task: "text", Items: len(items), Documents: len(groups), Words: int(total.words),
		Resamples: r.resamples(), Seed: r.Seed,
	}
	measures := textMeasures("", 0)
	for i, kind := range Kinds {
		if k := i + 1; total.errors[k]+total.flags[k] > 0 {
			measures = append(measures, textMeasures(string(kind), k)...)
		}
	}
	report.Metrics = bootstrap(groups, measures, r)
	return report, nil
}

// kindCounts holds a sum for all kinds together, at 0, and for each of Kinds.
type kindCounts [1 + len(Kinds)]float64

func (c *kindCounts) add(k Kind) {
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
	}
	return c
}

func countText(item Item, flags []Flag) (textCounts, error) {
	c := textCounts{words: float64(Words(item.Source))}
	outcomes, verdicts, err := Judge(item, flags)
	if err != nil {
		return c, err
	}
	rank := make([]int, len(flags))
	for _, v := range verdicts {
		c.errors.add(v.Span.Kind)
		if v.Flag < 0 {
			continue
		}
		c.found.add(v.Span.Kind)
		if v.Rank > 0 {
			c.corrected.add(v.Span.Kind)
			rank[v.Flag] = v.Rank
		}
		if v.Rank == 1 {
			c.first.add(v.Span.Kind)
		}
	}
	for i, f := range flags {
		if outcomes[i] == Neither {
			continue
		}
		c.flags.add(f.Kind)
		if outcomes[i] == Right {
			c.right.add(f.Kind)
			if rank[i] == 1 {
				c.rightFirst.add(f.Kind)
			}
		}
	}
	return c, nil
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

// byDocument adds up the counts of each document. An item of no document is one
// by itself.
func byDocument[C counts[C]](items []Item, each []C) []C {
	var groups []C
	at := map[string]int{}
	for i, item := range items {
		if g, ok := at[item.Document]; ok && item.Document != "" {
			groups[g] = groups[g].plus(each[i])
			continue
		}
		at[item.Document] = len(groups)
		groups = append(groups, each[i])
	}
	return groups
}
