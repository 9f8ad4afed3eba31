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
	d.addRules(rules, leastStop)
	for c := Symbol(1); c < symbols; c++ {
		for r := Symbol(0); r < symbols; r++ {
			d.swap[at2(c, r)] = e.swap[at2(c, r)] * leastStop[c]
			for l := Symbol(0); l < symbols; l++ {
				d.place(e, l, c, r, e.rewritten[at2(c, r)])
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

// addRules prices the rules.
func (d *draft) addRules(rules map[ruleKey]float64, leastStop [symbols]float64) {
	for key, p := range rules {
		rule := key.rule()
		rule.Cost = float32(nats(p * leastStop[key.intended[0]]))
		d.rules = append(d.rules, rule)
	}
	slices.SortFunc(d.rules, compareIntended)
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
