package foulcase

import (
	"errors"
	"fmt"
	"math"
	"runtime"
	"slices"
	"sync"

	"example.org/foulcase/internal/additive"
	"example.org/foulcase/internal/text"
)

// Trial is one plain text whose slips are known.
type Trial struct {
	Text   string
	Slips  []Place // in order, disjoint; none in good text
	Source string  // where it comes from: texts of one source are measured together
}

// Place is the bytes [Start, End) of a text.
type Place struct{ Start, End int }

// budgets are the rows of a calibration, false alarms in 1,000 words.
var budgets = []float64{.1, .2, .5, 1, 2, 5, 10, 20}

// kept is the share of sources whose false alarms a threshold holds within its
// budget; the others may go beyond it.
const kept = .73

// Calibrate learns the calibration of a model: what is known of findings, and
// whether they were right, from texts with slips and without (they should hold
// each kind of slip as often as the writers do, some texts dense with slips and
// many with none); thresholds from good texts that are not among those. What a
// house writes may be used with what the model was shipped with. The trials are
// weighed on all processors; the result does not depend on how many.
//
// The log-odds of a finding are an additive model of its evidence, fitted by
// likelihood. A threshold is one probability for all kinds, which at given false
// alarms finds the most errors if the probabilities are true; it is chosen so
// that about three sources in four stay within the budget, every finding in good
// text counted as a false alarm.
func (e *Engine) Calibrate(learn, good []Trial, o Options) (*Calibration, error) {
	c := &calibrator{Calibration: new(Calibration)}
	if err := c.learn(e.observe(learn, o)); err != nil {
		return nil, err
	}
	if err := c.setBudgets(e.observe(good, o), newSlipRate(e.judgement.SlipRate, c.Rate, o)); err != nil {
		return nil, err
	}
	return c.Calibration, nil
}

// observed is what was found in a trial.
type observed struct {
	source   string
	words    int
	slips    int
	findings []observation
}

type observation struct {
	kind     Kind
	right    bool
	evidence evidence
}

// observe weighs trials and notes what is known of every finding.
func (e *Engine) observe(trials []Trial, o Options) []observed {
	out := make([]observed, len(trials))
	next := make(chan int)
	var workers sync.WaitGroup
	for range runtime.GOMAXPROCS(0) {
		workers.Go(func() {
			j := e.take(o)
			defer e.give(j)
			for i := range next {
				out[i] = j.observe(&trials[i])
			}
		})
	}
	for i := range trials {
		next <- i
	}
	close(next)
	workers.Wait()
	return out
}

func (j *judge) observe(t *Trial) observed {
	seen := observed{source: t.Source, slips: len(t.Slips)}
	block := &text.Block{Text: []byte(t.Text)}
	j.recurring.reset()
	j.count([]*text.Block{block})
	for s := range j.segmenter.Sentences(block.Text) {
		seen.words += wordsIn(s.Tokens)
		found, err := j.findings(s, block.Text)
		if err != nil {
			continue // a sentence that no reading fits has nothing to teach
		}
		for i := range found {
			f := &found[i]
			if f.p < leastWeighed || f.preferred != nil || len(j.corrections(*f, block.Text)) == 0 {
				continue
			}
			right := t.slipped(j.slots[f.from].token.Start, j.slots[f.to-1].token.End)
			seen.findings = append(seen.findings, observation{f.kind, right, *j.collect(f)})
		}
	}
	return seen
}

// slipped reports whether a slip overlaps [start, end).
func (t *Trial) slipped(start, end int) bool {
	return slices.ContainsFunc(t.Slips, func(p Place) bool { return start < p.End && end > p.Start })
}

// learn fits the log-odds and the rate of slips they hold for.
func (c *calibrator) learn(trials []observed) error {
	var examples [groups][]additive.Example
	words, slips := 0, 0
	for i := range trials {
		words += trials[i].words
		for k := range trials[i].findings {
			f := &trials[i].findings[k]
			if f.right {
				slips++
			}
			g := groupOf(f.kind)
			examples[g] = append(examples[g], additive.Example{X: f.evidence[:], Yes: f.right, Weight: 1})
		}
	}
	if slips == 0 || slips >= words {
		return fmt.Errorf("nothing to learn from: %d slips found in %d words", slips, words)
	}
	c.Rate = float64(slips) / float64(words)
	for i, m := range c.parts() {
		*m = *additive.Fit(featureNames[:], examples[i], additive.Options{})
	}
	return c.bind()
}

// setBudgets finds the thresholds that hold for good text.
func (c *calibrator) setBudgets(trials []observed, rate slipRate) error {
	bySource := map[string]*source{}
	var sources []*source
	for i := range trials {
		s, ok := bySource[trials[i].source]
		if !ok {
			s = new(source)
			bySource[trials[i].source] = s
			sources = append(sources, s)
		}
		s.add(c, &trials[i], rate)
	}
	if len(sources) == 0 {
		return errors.New("no good text to set thresholds on")
	}
	for _, budget := range budgets {
		p := thresholdFor(sources, budget)
		c.Budgets = append(c.Budgets, BudgetRow{budget, KindTable{p, p, p, p, p}})
	}
	return nil
}

// source is the good text of one origin and the probabilities found in it.
type source struct {
	words int
	p     []float64
}

// add takes a document of the source in, which begins with the rate given.
func (s *source) add(c *calibrator, t *observed, rate slipRate) {
	odds := make([]float64, len(t.findings))
	for i := range t.findings {
		odds[i] = c.logOdds(t.findings[i].kind, &t.findings[i].evidence)
	}
	rate.settle(t.words, odds)
	s.words += t.words
	for _, o := range odds {
		s.p = append(s.p, logistic(o+rate.shift))
	}
}

// thresholdFor returns the least probability at which all but a few sources
// stay within the budget.
func thresholdFor(sources []*source, budget float64) float64 {
	var p []float64
	for _, s := range sources {
		slices.SortFunc(s.p, func(a, b float64) int {
			switch {
			case a > b:
				return -1
			case a < b:
				return 1
			}
			return 0
		})
		allowed := int(budget * float64(s.words) / 1000)
		if allowed < len(s.p) {
			p = append(p, s.p[allowed])
		} else {
			p = append(p, 0)
		}
	}
	slices.Sort(p)
	at := kept * float64(len(p)-1)
	below, above := p[int(at)], p[int(math.Ceil(at))]
	part := at - math.Floor(at)
	odds := (1-part)*logit(bounded(below)) + part*logit(bounded(above))
	return bounded(math.Nextafter(logistic(odds), 1))
}

func bounded(p float64) float64 { return min(max(p, leastThreshold), 1-leastThreshold) }

// leastThreshold keeps thresholds between 0 and 1.
const leastThreshold = 1e-6
