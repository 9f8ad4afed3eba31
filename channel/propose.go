package channel

// Rules are kept when they were seen often enough and say more than the
// single-letter steps they stand for.
const (
	leastSights = 2.5 // weighted pairs
	leastGain   = 0.6 // nats cheaper than the steps
	discount    = 0.8 // of every count, for rules seen by chance
	strangeness = 6   // sights of the intended side added to every denominator
)

// occurrences are weighted numbers of places in the intended words where the
// left side of a rule could hold.
type occurrences map[occurrence]float64

type occurrence struct {
	intended [maxSide]Symbol
	place    Place
}

// add counts every run of up to four letters of a word.
func (o occurrences) add(word []Letter, weight float64) {
	for from := range word {
		var side [maxSide]Symbol
		for n := 1; n <= maxSide && from+n <= len(word); n++ {
			side[n-1] = word[from+n-1].Sym
			eachPlace(from == 0, from+n == len(word), func(p Place) {
				o[occurrence{side, p}] += weight
			})
		}
	}
}

// eachPlace visits the places that hold for something at the start or end.
func eachPlace(start, end bool, visit func(Place)) {
	visit(Anywhere)
	if start {
		visit(AtStart)
	}
	if end {
		visit(AtEnd)
	}
}

// estimate gives the probability of each rule from its expected count; rules
// too rare are left out.
func (o occurrences) estimate(seen map[ruleKey]float64) map[ruleKey]float64 {
	rules := map[ruleKey]float64{}
	for key, n := range seen {
		if p := o.probability(key, n); n >= leastSights/2 && p > 0 {
			rules[key] = p
		}
	}
	return rules
}

func (o occurrences) probability(key ruleKey, n float64) float64 {
	return (n - discount) / (o[occurrence{key.intended, key.place}] + strangeness)
}

// proposal is a candidate for a rule: how often it was seen, and what the
// single-letter steps it stands for cost.
type proposal struct{ sights, cost float64 }

// propose finds rules in the best alignments under single-letter steps: runs
// from a slip to a later slip that touch up to four letters on either side. What
// stands around a run is left to the neighbours of the single-letter steps. It
// counts the occurrences too.
func (f *fitter) propose(m *Model) map[ruleKey]proposal {
	f.occurrences = occurrences{}
	seen := map[ruleKey]proposal{}
	for _, p := range f.pairs {
		f.occurrences.add(AppendLetters(nil, []byte(p.Intended)), p.Count)
		steps := m.Explain(p.Observed, p.Intended)
		collect(seen, steps[:len(steps)-1], p.Count)
	}
	kept := map[ruleKey]proposal{}
	for key, s := range seen {
		p := f.occurrences.probability(key, s.sights)
		if s.sights >= leastSights && nats(p) < s.cost/s.sights-leastGain && f.tellsMore(key, p, seen) {
			kept[key] = s
		}
	}
	return kept
}

// tellsMore reports whether a rule with a place is likelier there than anywhere,
// by enough to be worth having.
func (f *fitter) tellsMore(key ruleKey, p float64, seen map[ruleKey]proposal) bool {
	anywhere := ruleKey{key.intended, key.observed, Anywhere}
	return key.place == Anywhere || nats(p) < nats(f.occurrences.probability(anywhere, seen[anywhere].sights))-leastGain
}

// collect counts the runs of steps that could be rules.
func collect(seen map[ruleKey]proposal, steps []Step, weight float64) {
	for from := range steps {
		if steps[from].Kind == Kept {
			continue
		}
		var key ruleKey
		intended, observed, slips, cost := 0, 0, 0, 0.0
		for to := from; to < len(steps); to++ {
			s := steps[to]
			i, okI := extend(&key.intended, intended, s.Intended)
			o, okO := extend(&key.observed, observed, s.Observed)
			if !okI || !okO {
				break
			}
			intended, observed = i, o
			cost += s.Cost
			if s.Kind != Kept {
				slips++
			}
			if slips > 1 && s.Kind != Kept && intended > 0 {
				eachPlace(from == 0, to == len(steps)-1, func(p Place) {
					key.place = p
					seen[key] = proposal{seen[key].sights + weight, seen[key].cost + weight*cost}
				})
			}
		}
	}
}

// extend adds letters to one side of a rule, unless they do not fit.
func extend(side *[maxSide]Symbol, n int, letters string) (int, bool) {
	for _, r := range letters {
		if n == maxSide {
			return n, false
		}
		side[n] = LetterOf(r).Sym
		n++
	}
	return n, true
}
