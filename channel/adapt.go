package channel

import (
	"math"
	"slices"
)

// AdaptReport says what Adapt saw and reached.
type AdaptReport struct {
	Pairs  int // single words used
	Spaced int // pairs that a space is involved in
	Rules  int // rules that the model did not have
	// Penalised is the penalised log likelihood after each round, from that of the
	// model as it was, nats a pair (weighted mean). It never falls.
	Penalised []float64
}

const (
	// adaptRounds is after how many rounds likelihoods have settled.
	adaptRounds = 5
	// reserve is how many edits a model counts for in every group at least, so that
	// one sight of a rare slip tells little. With 3, slips of a list that was left out
	// of a model are about as likely as with 1, and with none less than before.
	reserve = 3
)

// Adapt blends a model with pairs of its user by evidence: every kind of edit gets
// factors, for all letters, for these letters, for these with a neighbour, that say
// how much oftener the pairs have it than the model expects, and expectation-
// maximisation over all alignments of the pairs estimates them. The model counts
// for as much as strength pairs, above 0; at +Inf it stays as it is. Rules that the
// pairs suggest are added. The same input gives the same bytes.
func Adapt(m *Model, pairs []Pair, strength float64) (*Model, AdaptReport, error) {
	a := &adapter{fitter: new(fitter), tables: unpack(m)}
	a.take(pairs)
	report := AdaptReport{Pairs: a.report.Pairs, Spaced: a.report.Spaced}
	switch {
	case math.IsInf(strength, 1):
		return m, report, nil
	case len(a.pairs) == 0:
		return nil, report, ErrNoPairs
	}
	report.Rules = a.arrange(m, strength)
	for range adaptRounds {
		report.Penalised = append(report.Penalised, a.round())
	}
	_, after := a.expect()
	report.Penalised = append(report.Penalised, after)
	for _, f := range a.families() {
		f.spread()
	}
	a.blendPrices(m.prices, strength)
	adapted, err := a.tables.tilted(a).model()
	return adapted, report, err
}

// adapter tilts a model towards pairs.
type adapter struct {
	*fitter
	tables                              *tables // of the model as it was
	meant                               *counts // letters and places between them in the pairs
	keys                                []ruleKey
	fresh                               []bool // the model did not have the rule
	sub, drop, insert, swap, rewritings *family
}

// arrange sorts the edits of the model, and rules that the pairs suggest, into
// families. It returns the number of those rules.
func (a *adapter) arrange(m *Model, strength float64) (newRules int) {
	a.meant = a.lettersMeant()
	share := strength / a.weight
	t, n := a.tables, a.meant
	letters := func(i int) (x, l, c, r int) {
		return i / cube, i / square % symbols, i / symbols % symbols, i % symbols
	}
	all := func(int) int { return 0 }
	subChances := make([]float64, symbols*cube)
	for x := range symbols {
		copy(subChances[x*cube:], n.visits)
	}
	a.sub = newFamily(t.emit, subChances, share, trustSide, reserve, all,
		func(i int) int { x, _, c, _ := letters(i); return x*symbols + c },
		func(i int) int { x, l, c, _ := letters(i); return (x*symbols+l)*symbols + c },
		func(i int) int { x, _, c, r := letters(i); return (x*symbols+c)*symbols + r })
	a.drop = newFamily(t.drop, n.visits, share, trustSide, reserve, all,
		func(i int) int { _, _, c, _ := letters(i); return c },
		func(i int) int { return i / symbols },
		func(i int) int { return i % square },
		func(i int) int { return i })
	insertChances := make([]float64, cube)
	for x := 1; x < symbols; x++ {
		copy(insertChances[x*square:], n.slots)
	}
	a.insert = newFamily(t.insert, insertChances, share, trustSide, reserve, all,
		func(i int) int { return i / square },
		func(i int) int { return i / symbols },
		func(i int) int { return i/square*symbols + i%symbols },
		func(i int) int { return i })
	swapChances := make([]float64, square)
	for at, visits := range n.visits {
		swapChances[at%square] += visits
	}
	a.swap = newFamily(t.swap, swapChances, share, trustSide, reserve, all, func(i int) int { return i })
	return a.arrangeRules(m, share)
}

// arrangeRules makes the family of rules: those of the model, and those that the
// pairs suggest, which begin as likely as the steps they stand for.
func (a *adapter) arrangeRules(m *Model, share float64) (newRules int) {
	base := map[ruleKey]float64{}
	for key, s := range a.propose(m) {
		base[key] = math.Exp(-s.cost / s.sights)
	}
	had := map[ruleKey]bool{}
	for i := range m.rules.len() {
		r := m.rules.at(i)
		key := ruleKey{r.Intended, r.Observed, r.Place}
		base[key], had[key] = probability(r.Cost), true
	}
	for key := range base {
		a.keys = append(a.keys, key)
	}
	slices.SortFunc(a.keys, func(a, b ruleKey) int { return compareIntended(a.rule(), b.rule()) })
	p, chances := make([]float64, len(a.keys)), make([]float64, len(a.keys))
	for i, key := range a.keys {
		p[i], chances[i] = base[key], a.occurrences[occurrence{key.intended, key.place}]
		a.fresh = append(a.fresh, !had[key])
	}
	a.rewritings = newFamily(p, chances, share, strangeness, 0, func(i int) int { return i })
	return len(a.keys) - len(had)
}

func (a *adapter) families() []*family {
	return []*family{a.sub, a.drop, a.insert, a.swap, a.rewritings}
}

// round is one step of expectation-maximisation. It returns the penalised log
// likelihood before it.
func (a *adapter) round() float64 {
	n, before := a.expect()
	seen := make([]float64, len(a.keys))
	for i, key := range a.keys {
		seen[i] = n.rules[key]
	}
	a.sub.raise(n.emit)
	a.drop.raise(n.emit[:cube])
	a.insert.raise(n.insert)
	a.swap.raise(n.swap)
	a.rewritings.raise(seen)
	return before
}

// expect counts the expected edits of the pairs under the factors so far.
func (a *adapter) expect() (n *counts, penalised float64) {
	t := &lattice{likelihoods: a.likelihoods()}
	n = newCounts()
	for _, p := range a.pairs {
		if total := t.reset(p); total > 0 {
			n.count(t, total, p.Count)
			penalised += p.Count * math.Log(total)
		}
	}
	for _, f := range a.families() {
		penalised += f.penalty()
	}
	return n, penalised / a.weight
}

func (a *adapter) likelihoods() *likelihoods {
	d := *a.tables.draft
	d.drop, d.insert, d.swap = a.drop.tilted(), a.insert.tilted(), a.swap.tilted()
	like := &likelihoods{d: &d, emit: a.sub.tilted(), rules: map[[maxSide]Symbol][]weighted{}}
	for i, p := range a.rewritings.tilted() {
		key := a.keys[i]
		like.rules[key.observed] = append(like.rules[key.observed], weighted{key, key.rule(), p})
	}
	return like
}

// blendPrices prices spaces by the pairs and by the model, which counts for as much
// as strength pairs and a few more.
func (a *adapter) blendPrices(was Prices, strength float64) {
	blend := func(seen float64, cost float32) float32 {
		return float32(nats(interpolate(seen, a.weight+a.runOn+a.split, strength+trustNone, probability(cost))))
	}
	a.prices = was
	a.prices.RunOn, a.prices.Split = blend(a.runOn, was.RunOn), blend(a.split, was.Split)
}
