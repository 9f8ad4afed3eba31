package eval

import (
	"fmt"
	"slices"
	"strings"
	"unicode/utf8"
)

// cutoffs are the list lengths at which accuracy is reported.
var cutoffs = [...]int{1, 3, 5, 10, 20}

// Ranks returns for each pair the place of the intended form among the
// candidates, from 1, or 0 where it is missing. Case and the kind of apostrophe
// do not count. The rankings must be of the same words in the same order.
func Ranks(pairs []Pair, rankings []Ranking) ([]int, error) {
	if len(pairs) != len(rankings) {
		return nil, fmt.Errorf("%d pairs but %d rankings", len(pairs), len(rankings))
	}
	ranks := make([]int, len(pairs))
	for i, p := range pairs {
		if rankings[i].Word != p.Observed {
			return nil, fmt.Errorf("ranking %d is of %q, the pair of %q", i+1, rankings[i].Word, p.Observed)
		}
		want := reading(p.Intended)
		ranks[i] = 1 + slices.IndexFunc(rankings[i].Candidates, func(c string) bool { return reading(c) == want })
	}
	return ranks, nil
}

// reading is a text reduced to what its words are.
func reading(text string) string {
	var b strings.Builder
	for _, t := range tokenize(text) {
		if b.Len() > 0 {
			b.WriteByte(' ')
		}
		b.WriteString(t.fold)
	}
	return b.String()
}

// ScoreList measures a system's candidates for isolated misspellings, each pair
// counting once. Metrics, over all pairs and for each class of [ListClasses]:
// "accuracy@k", the share whose intended form is among the first k; "coverage",
// the share that has it anywhere; "mrr", the mean of one over its place (0
// where it is missing). known may be nil; then no class tells whether the
// observed form is a word.
func ScoreList(pairs []Pair, rankings []Ranking, known func(string) bool, r Resampling) (*Report, error) {
	outcomes, err := PairOutcomes(pairs, rankings, known, nil)
	if err != nil {
		return nil, err
	}
	return ScorePairs(outcomes, r), nil
}

// PairOutcomes returns the outcome of each pair; known and fitted may be nil.
// The rankings must be of the same words in the same order.
func PairOutcomes(pairs []Pair, rankings []Ranking, known func(string) bool, fitted Fitted) ([]PairOutcome, error) {
	ranks, err := Ranks(pairs, rankings)
	if err != nil {
		return nil, err
	}
	outcomes := make([]PairOutcome, len(pairs))
	for i, p := range pairs {
		first := rankings[i].Candidates
		outcomes[i] = PairOutcome{
			Line: p.Line, Observed: p.Observed, Intended: p.Intended, Rank: ranks[i],
			Candidates: first[:min(len(first), 3)], Classes: pairClasses(p, known),
		}
		if seen, recorded := fitted.ask(p.Observed, p.Intended); seen {
			outcomes[i].Classes = append(outcomes[i].Classes, fittedClass)
		} else if recorded {
			outcomes[i].Classes = append(outcomes[i].Classes, notFittedClass)
		}
	}
	return outcomes, nil
}

// ScorePairs is [ScoreList] of outcomes that are known already.
func ScorePairs(outcomes []PairOutcome, r Resampling) *Report {
	all := make([]listCounts, len(outcomes))
	byClass := map[string][]listCounts{}
	for i, o := range outcomes {
		all[i] = countRank(o.Rank)
		for _, class := range o.Classes {
			byClass[class] = append(byClass[class], all[i])
		}
	}
	report := &Report{Task: "list", Items: len(outcomes), Resamples: r.resamples(), Seed: r.Seed}
	report.Metrics = bootstrap(all, listMeasures(""), r)
	for _, class := range ListClasses {
		if groups := byClass[class]; len(groups) > 0 {
			report.Metrics = append(report.Metrics, bootstrap(groups, listMeasures(class), r)...)
		}
	}
	return report
}

// ListClasses lists the classes of pairs, in the order in which they are
// reported. Single edits are named by what happened to the intended form.
var ListClasses = [...]string{
	"deletion", "insertion", "substitution", "transposition", "two edits", "three or more", "case only",
	"nonword", "realword", "space", "first letter wrong", "1-4 letters", "5-8 letters", "9+ letters",
	fittedClass, notFittedClass,
}

// Classes of pairs by whether the model was fitted on them.
const (
	fittedClass    = "fitted on"
	notFittedClass = "not fitted on"
)

func pairClasses(p Pair, known func(string) bool) []string {
	observed, intended := fold(p.Observed), fold(p.Intended)
	classes := []string{editClass(observed, intended)}
	if known != nil {
		if known(p.Observed) {
			classes = append(classes, "realword")
		} else {
			classes = append(classes, "nonword")
		}
	}
	if p.Spaces {
		classes = append(classes, "space")
	}
	x, _ := utf8.DecodeRuneInString(observed)
	if y, _ := utf8.DecodeRuneInString(intended); x != y {
		classes = append(classes, "first letter wrong")
	}
	switch n := utf8.RuneCountInString(strings.ReplaceAll(intended, " ", "")); {
	case n <= 4:
		return append(classes, "1-4 letters")
	case n <= 8:
		return append(classes, "5-8 letters")
	default:
		return append(classes, "9+ letters")
	}
}

// listCounts sums over pairs.
type listCounts struct {
	pairs, found, reciprocal float64
	within                   [len(cutoffs)]float64
}

func countRank(rank int) listCounts {
	c := listCounts{pairs: 1}
	if rank > 0 {
		c.found = 1
		c.reciprocal = 1 / float64(rank)
		for i, k := range cutoffs {
			if rank <= k {
				c.within[i] = 1
			}
		}
	}
	return c
}

func (c listCounts) plus(d listCounts) listCounts {
	c.pairs += d.pairs
	c.found += d.found
	c.reciprocal += d.reciprocal
	for i := range c.within {
		c.within[i] += d.within[i]
	}
	return c
}

func listMeasures(class string) []measure[listCounts] {
	share := func(name string, of func(listCounts) float64) measure[listCounts] {
		return measure[listCounts]{name, class, func(c listCounts) (float64, float64) { return of(c) / c.pairs, c.pairs }}
	}
	var measures []measure[listCounts]
	for i, k := range cutoffs {
		measures = append(measures, share(fmt.Sprintf("accuracy@%d", k), func(c listCounts) float64 { return c.within[i] }))
	}
	return append(measures,
		share("coverage", func(c listCounts) float64 { return c.found }),
		share("mrr", func(c listCounts) float64 { return c.reciprocal }))
}
