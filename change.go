package foulcase

import (
	"math"
	"slices"

	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/internal/text"
)

// change is one way to read some slots of a sentence otherwise than as typed.
type change struct {
	from, to int // slots it replaces
	kind     Kind
	cost     float64 // channel cost, nats
	score    float64 // log weight beside the language model, nats
	lo, hi   int     // its words in judge.words
	house    string  // the form, when it is a house word
	gain     float64 // what the language model gains by it in the typed sentence, nats
	edge     int     // in the lattice
	p        float64 // posterior
}

// propose collects the changes of the sentence that are worth weighing.
func (j *judge) propose() {
	j.changes, j.words = j.changes[:0], j.words[:0]
	for i := range j.slots {
		sl := &j.slots[i]
		switch sl.status {
		case known:
			j.proposeConfusables(i)
			if j.e.lexicon.Prior(sl.id) < rareWord && sl.to-sl.from == 1 {
				j.proposeCandidates(i)
			}
		case unknown, foreign:
			j.proposeCandidates(i)
		}
		if i+1 < len(j.slots) && j.apart(i) {
			j.proposeJoin(i)
			j.proposeRepeat(i)
		}
	}
}

// apart reports whether slots i and i+1 are two words with nothing but white
// space between them.
func (j *judge) apart(i int) bool {
	a, b := &j.slots[i], &j.slots[i+1]
	return a.status != closed && b.token.Kind == text.Word && !b.token.Glued &&
		b.place == a.place+1
}

// proposeConfusables weighs the words that a known word is taken for.
func (j *judge) proposeConfusables(i int) {
	sl := &j.slots[i]
	if sl.token.Case == text.Upper && !j.shouting {
		return
	}
	a := &j.alternatives
	a.reset()
	for n := j.e.confusables.Lookup(sl.id); n.Next(); {
		if j.spelt(n.ID) {
			a.add(n.ID, n.Cost)
		}
	}
	if sl.to-sl.from == 1 {
		j.weighAlternatives(sl)
		for k, id := range a.ids {
			lo := len(j.words)
			j.words = append(j.words, id)
			j.keepAlternative(change{from: i, to: i + 1, kind: Realword, cost: float64(a.costs[k]), gain: a.gains[k]}, lo)
		}
		return
	}
	rest := j.ids[sl.from+1 : sl.to]
	for k, id := range a.ids {
		j.weigh(change{from: i, to: i + 1, kind: Realword, cost: float64(a.costs[k])}, id, rest)
	}
}

// proposeCandidates weighs what a form that is no word, or a rare one, may
// stand for.
func (j *judge) proposeCandidates(i int) {
	sl := &j.slots[i]
	reach := float32(slipReach)
	switch {
	case sl.token.Case == text.Title && i > j.lead:
		reach = nameReach
	case sl.status == known:
		reach = rareReach
	}
	for _, c := range j.finder.find(sl.token.Norm, reach) {
		ch := change{from: i, to: i + 1, kind: Nonword, cost: float64(c.cost), house: c.house}
		switch {
		case c.spaced:
			ch.kind = Runon
		case sl.status == known && (c.ids[0] == sl.id || j.proposed(i, c.words())):
			continue
		case sl.status == known:
			ch.kind = Realword
		}
		lo := len(j.words)
		j.words = append(j.words, c.words()...)
		j.consider(ch, lo, nil)
	}
}

// proposed reports whether words are among the changes of slot i already, as a
// rare word's homophones are.
func (j *judge) proposed(i int, words []uint32) bool {
	return slices.ContainsFunc(j.changes, func(c change) bool {
		return c.from == i && c.to == i+1 && slices.Equal(j.words[c.lo:c.hi], words)
	})
}

// proposeJoin weighs the reading of two words as one.
func (j *judge) proposeJoin(i int) {
	a, b := &j.slots[i], &j.slots[i+1]
	if a.to-a.from != 1 {
		return
	}
	if c, ok := j.finder.join(a.token.Norm, b.token.Norm); ok {
		j.weigh(change{from: i, to: i + 2, kind: Split, cost: float64(c.Channel)}, c.ID, nil)
	}
}

// oftenDoubled are words that good prose has twice in a row (common practice):
// "he had had enough", "I know that that man". doubledCost is what that counts
// for, nats.
var oftenDoubled = []string{"that", "had", "is", "very", "no", "so", "bye"}

const doubledCost = 9

// proposeRepeat weighs the reading of a word typed twice as typed once.
func (j *judge) proposeRepeat(i int) {
	a, b := &j.slots[i], &j.slots[i+1]
	if string(a.token.Norm) == string(b.token.Norm) {
		lo := len(j.words)
		j.words = append(j.words, j.ids[a.from:a.to]...)
		c := change{from: i, to: i + 2, kind: Repeat}
		if slices.Contains(oftenDoubled, string(a.token.Norm)) {
			c.cost = doubledCost
		}
		j.consider(c, lo, a)
	}
}

// weigh considers the change to one word and what follows it in the slot.
func (j *judge) weigh(c change, id uint32, rest []uint32) {
	lo := len(j.words)
	j.words = append(append(j.words, id), rest...)
	j.consider(c, lo, nil)
}

// consider keeps the change to judge.words[lo:] if it may come within reach of
// the typed reading, and takes the words back if not. The words of a repeat
// keep the score of the slot they came from.
func (j *judge) consider(c change, lo int, kept *slot) {
	c.score = j.scoreOf(&c, lo)
	if kept != nil {
		c.score += kept.score
	}
	floor := j.floor(&c)
	c.gain = j.gain(j.slots[c.from].from, j.slots[c.to-1].to, j.words[lo:], floor)
	j.keep(c, lo, floor)
}

// keepAlternative is consider for a change whose gain is known.
func (j *judge) keepAlternative(c change, lo int) {
	c.score = j.scoreOf(&c, lo)
	j.keep(c, lo, j.floor(&c))
}

// scoreOf is what the change to judge.words[lo:] scores beside the language
// model, inflections aside.
func (j *judge) scoreOf(c *change, lo int) float64 {
	w := j.e.judgement
	return w.Slip.Of(c.kind) - w.Channel*c.cost + j.hints(c, j.words[lo:])
}

// floor is the least gain that brings a change within reach of the typed reading.
// What is no word needs its candidates, however poor.
func (j *judge) floor(c *change) float64 {
	if j.slots[c.from].status != known {
		return math.Inf(-1)
	}
	typed := 0.0
	for _, sl := range j.slots[c.from:c.to] {
		typed += sl.score
	}
	return (typed - c.score - j.hopeless) / j.e.judgement.LanguageModel
}

// keep takes a change up if it gains enough.
func (j *judge) keep(c change, lo int, floor float64) {
	if c.gain < floor {
		j.words = j.words[:lo]
		return
	}
	if c.kind == Realword && j.inflections(j.slots[c.from].id, j.words[lo]) {
		c.score -= j.e.judgement.Inflection
	}
	c.lo, c.hi = lo, len(j.words)
	j.changes = append(j.changes, c)
}

// hints are what is known about a change that neither model holds: the
// document's own use of the word, and capitals.
func (j *judge) hints(c *change, words []uint32) float64 {
	w, lex := j.e.judgement, j.e.lexicon
	if c.house != "" {
		return -w.House
	}
	sl, sum := &j.slots[c.from], 0.0
	if int(words[0]) < lex.Len() {
		sum += w.Recurrence * j.oftener(words[0])
		name := sl.token.Case == text.Title && c.from > j.lead && lex.Entry(words[0]).Usual != lexicon.TitleCase
		if name || j.compounded(c.from) {
			sum -= w.Capital
		}
	}
	return sum
}

// compounded reports whether a slot is a piece of a hyphened compound, which
// the words beside it say little of.
func (j *judge) compounded(i int) bool {
	hyphen := func(k int) bool { return k >= 0 && k < len(j.slots) && j.slots[k].token.Kind == text.Hyphen }
	return hyphen(i-1) && j.slots[i].token.Glued || hyphen(i+1) && j.slots[i+1].token.Glued
}

// inflections reports whether two words differ in no more than an inflection's
// ending.
func (j *judge) inflections(a, b uint32) bool {
	lex := j.e.lexicon
	j.form = lex.AppendForm(j.form[:0], a)
	n := len(j.form)
	j.form = lex.AppendForm(j.form, b)
	x, y := j.form[:n], j.form[n:]
	same := 0
	for same < min(len(x), len(y)) && x[same] == y[same] {
		same++
	}
	return same >= 3 && isEnding(x[same:]) && isEnding(y[same:])
}

// endings are the inflections of English nouns and verbs, as they remain
// after the letters two forms share ("carr-y", "carr-ies").
var endings = []string{"", "s", "es", "d", "ed", "ing", "e", "y", "ies", "ied", "'s"}

func isEnding(tail []byte) bool { return slices.Contains(endings, string(tail)) }
