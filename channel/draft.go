package channel

import "slices"

// draft is a model in floating point, on its way to a section. All tables hold
// probabilities, indexed as those of Model.
type draft struct {
	keep, drop, doubt, subLeft, subNext, insert, swap []float64
	stop                                              []float64 // [l][r]: nothing is inserted between l and r
	rules                                             []Rule    // with costs
	prices                                            Prices
}

// leastKept is the least probability of keeping a letter.
const leastKept = 0.02

// compose makes every place of the intended word a proper distribution: what is
// typed for a letter, after nothing more is inserted before it, sums to one.
func compose(e *estimates, rules map[ruleKey]float64, prices Prices) *draft {
	d := &draft{
		keep: make([]float64, cube), drop: make([]float64, cube), doubt: make([]float64, cube),
		subLeft: e.subLeft, subNext: e.subNext, insert: e.insert,
		swap: make([]float64, square), stop: make([]float64, square),
		prices: prices,
	}
	d.closeSlots()
	leastStop := d.leastStops()
	rewritten := d.addRules(rules, leastStop)
	for c := Symbol(1); c < symbols; c++ {
		for r := Symbol(0); r < symbols; r++ {
			d.swap[at2(c, r)] = e.swap[at2(c, r)] * leastStop[c]
			for l := Symbol(0); l < symbols; l++ {
				d.place(e, l, c, r, rewritten[at2(c, r)])
			}
		}
	}
	return d
}

// closeSlots finds the probability that nothing is inserted between two letters.
func (d *draft) closeSlots() {
	for l := Symbol(0); l < symbols; l++ {
		for r := Symbol(0); r < symbols; r++ {
			var sum float64
			for x := Symbol(1); x < symbols; x++ {
				sum += d.insert[at3(x, l, r)]
			}
			if sum > mostlyWrong {
				for x := Symbol(1); x < symbols; x++ {
					d.insert[at3(x, l, r)] *= mostlyWrong / sum
				}
				sum = mostlyWrong
			}
			d.stop[at2(l, r)] = 1 - sum
		}
	}
}

// leastStops gives, for each letter, the least of stop over its left neighbours:
// the share that prices without a left neighbour may count on.
func (d *draft) leastStops() (least [symbols]float64) {
	for r := range least {
		least[r] = 1
		for l := range symbols {
			least[r] = min(least[r], d.stop[l*symbols+r])
		}
	}
	return least
}

// mostRewritten is the greatest probability all rules may have at one place.
const mostRewritten = 0.5

// addRules prices the rules and gives for each first and second letter, the
// second being Edge at the end of a word, the probability they take at most.
func (d *draft) addRules(rules map[ruleKey]float64, leastStop [symbols]float64) *[square]float64 {
	var shares ruleShares
	for key, p := range rules {
		shares.add(key, p)
	}
	taken := shares.most()
	for key, p := range rules {
		scale := 1.0
		if most := shares.mostOf(key, taken); most > mostRewritten {
			scale = mostRewritten / most
		}
		rule := key.rule()
		rule.Cost = float32(nats(p * scale * leastStop[key.intended[0]]))
		d.rules = append(d.rules, rule)
	}
	slices.SortFunc(d.rules, compareIntended)
	for i, t := range taken {
		taken[i] = min(t, mostRewritten)
	}
	return taken
}

// ruleShares sums the probabilities of rules that can compete at one place: by
// their first two letters, and by the third where they have one.
type ruleShares struct {
	one   [symbols]float64
	two   [square]float64
	three [cube]float64
}

func (s *ruleShares) add(key ruleKey, p float64) {
	a := key.intended
	switch key.rule().NIntended {
	case 1:
		s.one[a[0]] += p
	case 2:
		s.two[at2(a[0], a[1])] += p
	default:
		s.three[at3(a[0], a[1], a[2])] += p
	}
}

// most gives the sum for the worst third letter.
func (s *ruleShares) most() *[square]float64 {
	var out [square]float64
	for c := Symbol(0); c < symbols; c++ {
		for r := Symbol(0); r < symbols; r++ {
			third := 0.0
			for t := Symbol(0); t < symbols; t++ {
				third = max(third, s.three[at3(c, r, t)])
			}
			out[at2(c, r)] = s.one[c] + s.two[at2(c, r)] + third
		}
	}
	return &out
}

// mostOf gives the greatest sum at any place where the rule can hold.
func (s *ruleShares) mostOf(key ruleKey, taken *[square]float64) float64 {
	c := key.intended[0]
	if key.rule().NIntended > 1 {
		return taken[at2(c, key.intended[1])]
	}
	most := 0.0
	for r := Symbol(0); r < symbols; r++ {
		most = max(most, taken[at2(c, r)])
	}
	return most
}

// place divides the probability of one place among keeping, dropping,
// replacing, swapping and the rules.
func (d *draft) place(e *estimates, l, c, r Symbol, rewritten float64) {
	at := at3(l, c, r)
	var replaced float64
	for x := Symbol(1); x < symbols; x++ {
		if x != c {
			replaced += e.emit[int(x)*cube+at]
		}
	}
	dropped := e.emit[at]
	wrong := replaced + dropped
	rest := 1 - e.swap[at2(c, r)] - rewritten
	scale := 1.0
	if wrong > rest-leastKept {
		scale = max(0, rest-leastKept) / wrong
	}
	stop := d.stop[at2(l, c)]
	d.drop[at] = dropped * scale * stop
	d.doubt[at] = e.doubt[at] * scale * stop
	d.keep[at] = max(leastKept, rest-wrong*scale) * stop
}
