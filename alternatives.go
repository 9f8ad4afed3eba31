package foulcase

import (
	"slices"

	"example.org/foulcase/lm"
)

// alternatives are the words that a known word may have been meant as. They are
// weighed together, in stages that each drop what has become hopeless; most never
// come to a query of the language model.
type alternatives struct {
	ids    []uint32
	costs  []float32 // channel costs, nats
	floors []float64 // least gain that is of interest, nats
	left   []bool    // the model may have the bigram with the word before
	right  []bool    // and with the word behind
	gains  []float64 // so far, nats
	states []lm.State
}

func (a *alternatives) reset() { a.ids, a.costs = a.ids[:0], a.costs[:0] }

func (a *alternatives) add(id uint32, cost float32) {
	a.ids, a.costs = append(a.ids, id), append(a.costs, cost)
}

// keep drops the alternatives of which ok is false. Gains and states of those
// kept move with them.
func (a *alternatives) keep(ok func(i int) bool) {
	n := 0
	for i := range a.ids {
		if !ok(i) {
			continue
		}
		a.ids[n], a.costs[n], a.floors[n] = a.ids[i], a.costs[i], a.floors[i]
		a.left[n], a.right[n] = a.left[i], a.right[i]
		a.gains[n], a.states[n] = a.gains[i], a.states[i]
		n++
	}
	a.ids, a.costs = a.ids[:n], a.costs[:n]
}

func (a *alternatives) grow() {
	n := len(a.ids)
	a.floors = slices.Grow(a.floors[:0], n)[:n]
	a.left = slices.Grow(a.left[:0], n)[:n]
	a.right = slices.Grow(a.right[:0], n)[:n]
	a.gains = slices.Grow(a.gains[:0], n)[:n]
	a.states = slices.Grow(a.states[:0], n)[:n]
}

// weighAlternatives drops the alternatives to the one word of a slot that cannot
// come within reach of the typed reading, and works out what the language model
// gains by the others.
func (j *judge) weighAlternatives(sl *slot) {
	a := &j.alternatives
	a.grow()
	w := j.e.judgement
	for i, id := range a.ids {
		score := w.Slip.Realword - w.Channel*float64(a.costs[i]) + w.Recurrence*j.oftener(id)
		a.floors[i] = (sl.score-score-j.hopeless)/w.LanguageModel - rounding
	}
	j.screen(sl)
	j.weighInPlace(sl)
	j.weighBehind(sl)
}

// rounding is more than sums can differ by for being added up in another order,
// nats.
const rounding = 1e-3

// screen drops alternatives by bounds that take two looks at the filter of
// bigrams each.
//
// A word of which the model has no bigram with its neighbours scores as a word
// in no context does, less what backing off costs, and so does what follows it.
// Most alternatives are such words, and most typed words are better than that.
func (j *judge) screen(sl *slot) {
	a := &j.alternatives
	if j.shortcut == nil {
		for i := range a.ids {
			a.left[i], a.right[i] = true, true
		}
		return
	}
	clear(a.left)
	if before, ok := j.states[sl.from].Nearest(); ok {
		j.shortcut.MayFollow(before, a.ids, a.left)
	}
	j.shortcut.MayLead(a.ids, j.ids[sl.to], a.right)
	behind := -j.followers(sl.to)
	blank := float64(j.shortcut.Unigram(j.ids[sl.to])-j.logp[sl.to]) + j.tail(sl.to) + float64(j.shortcut.MostBackoff())
	backoff := float64(j.states[sl.from].Backoff())
	a.keep(func(i int) bool {
		best := blank
		if a.right[i] {
			best = behind
		}
		if !a.left[i] {
			best += backoff + float64(j.shortcut.Unigram(a.ids[i]))
		}
		return best-float64(j.logp[sl.from]) >= a.floors[i]
	})
}

// weighInPlace scores the alternatives where the typed word stands.
func (j *judge) weighInPlace(sl *slot) {
	a := &j.alternatives
	typed, before := float64(j.logp[sl.from]), &j.states[sl.from]
	for i, id := range a.ids {
		a.gains[i] = float64(j.advance(before, id, &a.states[i])) - typed
	}
	behind := -j.followers(sl.to)
	a.keep(func(i int) bool { return a.gains[i]+behind >= a.floors[i] })
}

// weighBehind adds what the typed words behind gain.
func (j *judge) weighBehind(sl *slot) {
	a := &j.alternatives
	next, typed := j.ids[sl.to], float64(j.logp[sl.to])
	further := -j.followers(sl.to + 1)
	for i := range a.ids {
		a.gains[i] += float64(j.advance(&a.states[i], next, &j.ahead[0])) - typed
		if j.ahead[0].Only(next) {
			a.gains[i] += j.tail(sl.to)
		} else if a.gains[i]+further >= a.floors[i] {
			a.gains[i] += j.gainFrom(sl.to+1, sl.to+j.e.lm.Order()-1, j.ahead[0])
		}
	}
	a.keep(func(i int) bool { return a.gains[i] >= a.floors[i] })
}

// followers is the log probability of the typed words from i on that a change
// before i can bear on, nats.
func (j *judge) followers(i int) float64 {
	sum := 0.0
	for _, p := range j.logp[min(i, len(j.ids)):min(len(j.ids), i+j.e.lm.Order()-1)] {
		sum += float64(p)
	}
	return sum
}

// tail is what the typed words behind word i gain, nats, if nothing before i is
// known of their context. It is worked out when first asked for.
func (j *judge) tail(i int) float64 {
	t := &j.tails[i]
	if t.known {
		return t.gain
	}
	t.known = true
	var none, state, next lm.State
	j.e.lm.Advance(&none, j.ids[i], &state)
	if i++; i < len(j.ids) && state != j.states[i] {
		t.gain = float64(j.advance(&state, j.ids[i], &next)-j.logp[i]) + j.gainFrom(i+1, i+j.e.lm.Order()-2, next)
	}
	return t.gain
}

// tail is a remembered answer.
type tail struct {
	known bool
	gain  float64
}

// gainFrom is what the typed words [i, reach) gain after a state that knows at
// least the word before, nats.
func (j *judge) gainFrom(i, reach int, state lm.State) float64 {
	sum := 0.0
	for reach = min(reach, len(j.ids)); i < reach && state != j.states[i]; i++ {
		if state.Only(j.ids[i-1]) {
			return sum + j.tail(i-1)
		}
		sum += float64(j.advance(&state, j.ids[i], &j.ahead[1]) - j.logp[i])
		state = j.ahead[1]
	}
	return sum
}
