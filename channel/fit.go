package channel

import (
	"errors"
	"math"
	"slices"
	"strings"
)

// FitOptions steers Fit. The zero value fits the pairs alone.
type FitOptions struct {
	// Edits are counts of single-letter edits from elsewhere, blended in with
	// EditShare of the weight of the pairs (0.3 when zero).
	Edits     []Edit
	EditShare float64
	// NoRules leaves out rules of several letters.
	NoRules bool
}

// FitReport says what a fit saw and reached.
type FitReport struct {
	Pairs         int       // single words used
	Spaced        int       // pairs that a space is involved in
	Rules         int       // rules kept
	LogLikelihood []float64 // nats a pair (weighted mean), after each round
}

// ErrNoPairs is returned by Fit when no pair can be used.
var ErrNoPairs = errors.New("channel: no usable pairs of words")

const (
	singleRounds = 4
	ruleRounds   = 3
	// countPower makes the hundredth sight of one slip tell less than the first.
	countPower = 0.25
	// longestPair is the most letters a word may have to be fitted on; longer
	// ones would need scaled probabilities.
	longestPair = 40
	// firstGuess is the share of letters taken to be wrong before anything is known.
	firstGuess = 0.12
)

// Fit estimates a model by expectation-maximisation over all alignments of the
// pairs: first with single-letter steps, then with the rules that the best
// alignments suggest. The same input gives the same bytes.
func Fit(pairs []Pair, options FitOptions) (*Model, FitReport, error) {
	f := &fitter{options: options}
	if options.EditShare == 0 {
		f.options.EditShare = 0.3
	}
	f.take(pairs)
	if len(f.pairs) == 0 {
		return nil, f.report, ErrNoPairs
	}
	n := f.firstCounts()
	for range singleRounds {
		n = f.round(n)
	}
	if !options.NoRules {
		m, err := f.draft(n).model()
		if err != nil {
			return nil, f.report, err
		}
		f.rules = map[ruleKey]float64{}
		for key, s := range f.propose(m) {
			f.rules[key] = f.occurrences.probability(key, s.sights)
		}
		for range ruleRounds {
			withRules := f.round(n)
			n.rewritten = withRules.rewritten
			f.rules = f.occurrences.estimate(withRules.rules)
		}
		f.report.Rules = len(f.rules)
	}
	m, err := f.draft(n).model()
	return m, f.report, err
}

type fitter struct {
	options      FitOptions
	pairs        []Pair // single words, Count raised to countPower
	weight       float64
	rules        map[ruleKey]float64 // probabilities
	occurrences  occurrences
	prices       Prices
	runOn, split float64 // weights of pairs that lack a space, and that have one too many
	report       FitReport
}

// take keeps the pairs of single words and prices spaces by the others.
func (f *fitter) take(pairs []Pair) {
	for _, p := range pairs {
		p.Count = math.Pow(p.Count, countPower)
		if p.Spaced {
			f.report.Spaced++
			if strings.Count(p.Intended, " ") > strings.Count(p.Observed, " ") {
				f.runOn += p.Count
			} else {
				f.split += p.Count
			}
			continue
		}
		if n := max(len(p.Observed), len(p.Intended)); p.Observed == "" || p.Intended == "" || n > longestPair {
			continue
		}
		f.pairs = append(f.pairs, p)
		f.weight += p.Count
	}
	f.report.Pairs = len(f.pairs)
	all := f.weight + f.runOn + f.split + 2
	f.prices = Prices{
		Accent:  accentCost,
		Foreign: foreignCost,
		RunOn:   float32(nats((f.runOn + 1) / all)),
		Split:   float32(nats((f.split + 1) / all)),
	}
}

// Guessed, for want of pairs: one writer in three leaves an accent out or puts
// a wrong one; a character outside the alphabet is any of some fifty.
const (
	accentCost  = 1
	foreignCost = 4
)

// firstCounts takes every letter of the intended words for typed right, some slips
// from elsewhere aside.
func (f *fitter) firstCounts() *counts {
	n := f.lettersMeant()
	n.blend(f.options.Edits, firstGuess)
	return n
}

// lettersMeant counts the intended letters and the places between them, every
// letter typed right.
func (f *fitter) lettersMeant() *counts {
	n := newCounts()
	var word []Letter
	for _, p := range f.pairs {
		word = AppendLetters(word[:0], []byte(p.Intended))
		l := Edge
		for i, c := range word {
			r := Edge
			if i+1 < len(word) {
				r = word[i+1].Sym
			}
			n.add(&event{kind: Kept, x: c.Sym, l: l, c: c.Sym, r: r}, p.Count)
			l = c.Sym
		}
		n.slots[at2(l, Edge)] += p.Count
	}
	return n
}

// draft turns counts into probabilities.
func (f *fitter) draft(n *counts) *draft {
	return compose(smooth(f.blend(n)), f.rules, f.prices)
}

// blend gives the counts with the edits from elsewhere added. They take the
// place of EditShare of the pairs' own slips.
func (f *fitter) blend(n *counts) *counts {
	if len(f.options.Edits) == 0 {
		return n
	}
	b := *n
	b.emit, b.swap, b.insert = slices.Clone(n.emit), slices.Clone(n.swap), slices.Clone(n.insert)
	b.blend(f.options.Edits, f.options.EditShare*n.wrong()/n.total())
	return &b
}

// round is one step of expectation-maximisation.
func (f *fitter) round(n *counts) *counts {
	e := smooth(f.blend(n))
	t := &lattice{likelihoods: newLikelihoods(compose(e, f.rules, f.prices), e)}
	next := newCounts()
	var sum float64
	for _, p := range f.pairs {
		total := t.reset(p)
		if total > 0 {
			next.count(t, total, p.Count)
			sum += p.Count * math.Log(total)
		}
	}
	f.report.LogLikelihood = append(f.report.LogLikelihood, sum/f.weight)
	return next
}
