package candidates

import (
	"slices"

	"example.org/foulcase/channel"
)

// reading is the observed word in the order in which a search takes its
// letters, forwards or backwards, with what can be known of it before any word
// is looked at.
type reading struct {
	back     bool
	observed []channel.Letter
	rules    []channel.Rule // both sides in reading order
	ruleEnd  []int          // rules[ruleEnd[i-1]:ruleEnd[i]] match at observed[i:]
	floor    []float32      // floor[i]: the least cost of observed[i:]
	half     int            // letters in the half read first
	toHalf   []float32      // the least cost from i to the half
}

func (r *reading) rulesAt(i int) []channel.Rule {
	from := 0
	if i > 0 {
		from = r.ruleEnd[i-1]
	}
	return r.rules[from:r.ruleEnd[i]]
}

// readForwards prepares the word in writing order.
func (r *reading) readForwards(m *channel.Model, observed []channel.Letter, half int) {
	r.observed = append(r.observed[:0], observed...)
	r.rules, r.ruleEnd = r.rules[:0], r.ruleEnd[:0]
	for i := range len(observed) + 1 {
		r.rules = m.AppendRules(r.rules, observed[i:])
		r.ruleEnd = append(r.ruleEnd, len(r.rules))
	}
	r.finish(m, half)
}

// readBackwards prepares the same word from its end.
func (r *reading) readBackwards(m *channel.Model, f *reading, half int) {
	n := len(f.observed)
	r.back = true
	r.observed = append(r.observed[:0], f.observed...)
	slices.Reverse(r.observed)
	r.rules, r.ruleEnd = r.rules[:0], r.ruleEnd[:0]
	for i := range n + 1 {
		for typed := 0; typed <= n-i; typed++ {
			for k := range f.rulesAt(n - i - typed) {
				if rule := &f.rulesAt(n - i - typed)[k]; int(rule.NObserved) == typed {
					r.rules = append(r.rules, mirrored(*rule))
				}
			}
		}
		r.ruleEnd = append(r.ruleEnd, len(r.rules))
	}
	r.finish(m, half)
}

// mirrored gives a rule read from its end.
func mirrored(r channel.Rule) channel.Rule {
	slices.Reverse(r.Intended[:r.NIntended])
	slices.Reverse(r.Observed[:r.NObserved])
	r.Place = r.Place>>1&channel.AtStart | r.Place<<1&channel.AtEnd
	return r
}

// finish finds the floors.
func (r *reading) finish(m *channel.Model, half int) {
	n := len(r.observed)
	r.half = half
	r.floor = append(r.floor[:0], make([]float32, n+1)...)
	r.toHalf = append(r.toHalf[:0], make([]float32, n+1)...)
	for i := n - 1; i >= 0; i-- {
		r.floor[i] = r.least(m, i, r.floor, n)
		if i < half {
			r.toHalf[i] = r.least(m, i, r.toHalf, half)
		}
	}
}

// least is the least cost from i to a goal, given that from the places behind
// i. A step that goes past the goal counts nothing.
func (r *reading) least(m *channel.Model, i int, behind []float32, goal int) float32 {
	x := r.observed[i].Sym
	least := m.Floor(x) + behind[i+1]
	if i+1 < len(r.observed) {
		y := r.observed[i+1].Sym
		if r.back {
			x, y = y, x
		}
		least = min(least, past(i+2, goal, m.Swap(y, x), behind))
	}
	for k := range r.rulesAt(i) {
		if rule := &r.rulesAt(i)[k]; rule.NObserved > 0 {
			least = min(least, past(i+int(rule.NObserved), goal, rule.Cost, behind))
		}
	}
	return least
}

func past(to, goal int, cost float32, behind []float32) float32 {
	if to > goal {
		return 0
	}
	return cost + behind[to]
}
