package candidates

import (
	"slices"

	"example.org/foulcase/channel"
)

// reading is the observed word in the order in which a search takes its
// letters, forwards or backwards, with what can be known of it before any word
// is looked at.
type reading struct {
	order    *channel.Order
	observed []channel.Letter
	rules    []channel.Rule // both sides in reading order
	ruleEnd  []int          // rules[ruleEnd[i-1]:ruleEnd[i]] match at observed[i:]
	half     int            // letters in the half read first
	toEnd    outlook
	toHalf   outlook
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
	r.order = m.Order(false)
	r.observed = append(r.observed[:0], observed...)
	r.rules, r.ruleEnd = r.rules[:0], r.ruleEnd[:0]
	for i := range len(observed) + 1 {
		r.rules = m.AppendRules(r.rules, observed[i:])
		r.ruleEnd = append(r.ruleEnd, len(r.rules))
	}
	r.lookAhead(half)
}

// readBackwards prepares the same word from its end.
func (r *reading) readBackwards(m *channel.Model, f *reading, half int) {
	n := len(f.observed)
	r.order = m.Order(true)
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
	r.lookAhead(half)
}

// mirrored gives a rule read from its end.
func mirrored(r channel.Rule) channel.Rule {
	slices.Reverse(r.Intended[:r.NIntended])
	slices.Reverse(r.Observed[:r.NObserved])
	r.Place = r.Place>>1&channel.AtStart | r.Place<<1&channel.AtEnd
	return r
}

func (r *reading) lookAhead(half int) {
	r.half = half
	r.toEnd.find(r, len(r.observed), true)
	r.toHalf.find(r, half, false)
}
