package foulcase

import (
	"bytes"
	"slices"

	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/internal/text"
	"example.org/foulcase/lm"
	"example.org/foulcase/lm/lattice"
)

// Bounds of the lattice. They trade exactness for time; development text shows
// no difference beyond them.
const (
	latticeStates = 64  // language-model states kept at a node
	latticeMargin = 14  // nats below a node's best at which a state is dropped
	hopeless      = 8.0 // nats below the typed reading at which a change is not weighed
)

// judge weighs one sentence at a time. It owns every buffer that takes, so
// after warm-up a sentence costs no allocation until something is found in
// it. One goroutine uses it at a time; Engine.judges keeps idle ones.
type judge struct {
	e       *Engine
	house   *House
	variety Variety
	without Evidence
	names   text.Names // of the document at hand

	segmenter text.Segmenter
	finder    finder
	lattice   *lattice.Lattice[lm.State]
	recurring recurrence

	tokens []text.Token
	slots  []slot
	ids    []uint32   // the typed words of all slots, then </s>
	states []lm.State // before each of ids
	logp   []float32  // of each of ids, nats

	changes []change
	words   []uint32 // what the changes put in, end to end
	form    []byte   // scratch
	ahead   [2]lm.State
	tails   []tail // of each of ids
	// shortcut answers for the language model in long documents; nil in others.
	shortcut     *lm.Shortcut
	alternatives alternatives // to the word at hand

	seen evidence // of the finding at hand
	// shouting: the sentence is in capitals, so capitals say nothing of a word.
	shouting bool
	lead     int     // the slot of the first word, whose capital says nothing
	hopeless float64 // see the constant; the ledger lifts it
}

// slot is one token of a sentence as the language model reads it.
type slot struct {
	token    text.Token
	place    int // its token's place in the sentence
	from, to int // its words in judge.ids
	id       uint32
	status   status
	score    float64 // what the typed reading scores beside the language model
}

// status is what the lexicon knows of a slot.
type status uint8

const (
	closed  status = iota // number, punctuation, code: nothing to change
	known                 // in the lexicon; slot.id is its word, or its stem
	unknown               // a form the lexicon lacks
	foreign               // a word, but not in the variety asked for
)

func newJudge(e *Engine) *judge {
	j := &judge{
		finder:   newFinder(e),
		e:        e,
		hopeless: hopeless,
		lattice:  lattice.New[lm.State](lattice.Options{States: latticeStates, Margin: latticeMargin}),
	}
	j.recurring.init(e.lexicon.Len())
	return j
}

// take hands out an idle judge for a document under the given options.
func (e *Engine) take(o Options) *judge {
	j := e.judges.Get().(*judge)
	j.variety = o.Variety
	j.house = o.House
	j.without = o.Without
	j.names = nil
	j.finder.hold(o.Variety, o.House)
	j.recurring.reset()
	return j
}

func (e *Engine) give(j *judge) { e.judges.Put(j) }

// read lays a sentence of the block out in slots and scores it as it was typed.
func (j *judge) read(s text.Sentence, block []byte) {
	lex := j.e.lexicon
	j.slots, j.ids = j.slots[:0], j.ids[:0]
	j.tokens = s.Tokens
	j.shouting = inCapitals(s.Tokens)
	j.lead = -1
	for place, t := range s.Tokens {
		from := len(j.ids)
		j.ids = lex.Read(j.ids, t)
		if len(j.ids) == from {
			continue
		}
		sl := slot{token: t, place: place, from: from, to: len(j.ids)}
		if t.Kind == text.Word && !misdecoded(s.Tokens, place, block) {
			j.classify(&sl)
			if j.lead < 0 {
				j.lead = len(j.slots)
			}
			if sl.status == unknown && j.pluralPossessive(t, block) {
				sl.status, sl.score = closed, 0
			}
		}
		j.slots = append(j.slots, sl)
	}
	j.ids = append(j.ids, lex.ClassID(lexicon.End))
	j.scoreTyped()
}

// classify settles what the lexicon and the house know of a word, and what
// keeping it as typed scores.
func (j *judge) classify(sl *slot) {
	e, form := j.e, sl.token.Norm
	first := j.ids[sl.from]
	switch {
	case j.house.has(form), j.names.Has(form) && e.seldom(first):
		sl.status = closed
	case int(first) >= e.lexicon.Len():
		sl.status = unknown
		sl.score = -e.judgement.NewWord * float64(e.spelling.Price(form))
		if !j.without.has(RecurringEvidence) {
			sl.score += e.judgement.RecurrenceNew * j.recurring.form(form)
		}
	case !j.spelt(first):
		sl.status, sl.id = foreign, first
		sl.score = -e.judgement.Variety
	default:
		sl.status, sl.id = known, first
		if !j.without.has(CacheEvidence) {
			sl.score = e.judgement.Recurrence * j.recurring.word(first, e.lexicon, 1)
		}
	}
}

// seldomWord is the log relative frequency, nats, under which a word that the document
// has outside its prose too is taken for a name there (guessed; six in a million words).
const seldomWord = -12

// seldom reports a word that the lexicon lacks or that is seldom met.
func (e *Engine) seldom(id uint32) bool {
	return int(id) >= e.lexicon.Len() || e.lexicon.Prior(id) < seldomWord
}

// oftener is how much oftener than expected the document has a word that may have
// been meant, nats.
func (j *judge) oftener(id uint32) float64 {
	if j.without.has(CacheEvidence) {
		return 0
	}
	return float64(j.recurring.oftener[id])
}

// misdecoded reports whether the word at a place stands against a symbol beyond
// ASCII, as in "peace¡Xand": the remains of a dash or quotation mark read in
// the wrong encoding, with letters that are nobody's spelling.
func misdecoded(tokens []text.Token, place int, block []byte) bool {
	return place > 0 && tokens[place].Glued && tokens[place-1].Kind == text.Other &&
		block[tokens[place-1].Start] >= 0x80
}

// pluralPossessive reports whether a form is the regular plural of a word, in
// the possessive: "the Daves' boat". The apostrophe is no part of the token.
func (j *judge) pluralPossessive(t text.Token, block []byte) bool {
	stem, ok := bytes.CutSuffix(t.Norm, []byte("s"))
	rest := block[t.End:]
	if !ok || !bytes.HasPrefix(rest, []byte("'")) && !bytes.HasPrefix(rest, []byte("’")) {
		return false
	}
	_, ok = j.e.lexicon.ID(stem)
	return ok
}

// inCapitals reports whether most words of a sentence are written in capitals
// throughout.
func inCapitals(tokens []text.Token) bool {
	upper, words := 0, 0
	for _, t := range tokens {
		if t.Kind == text.Word {
			words++
			if t.Case == text.Upper {
				upper++
			}
		}
	}
	return words > 1 && 2*upper > words
}

// spelt reports whether the variety asked for has the word.
func (j *judge) spelt(id uint32) bool {
	v := j.variety.bits()
	return v == 0 || j.e.lexicon.Entry(id).Variety&v != 0
}

// scoreTyped runs the language model over the sentence as it stands.
func (j *judge) scoreTyped() {
	n := len(j.ids)
	j.states = slices.Grow(j.states[:0], n+1)[:n+1]
	j.logp = slices.Grow(j.logp[:0], n)[:n]
	j.tails = slices.Grow(j.tails[:0], n)[:n]
	clear(j.tails)
	j.states[0] = j.e.lm.Begin(j.e.lexicon.ClassID(lexicon.Begin))
	for i, id := range j.ids {
		j.logp[i] = j.e.lm.Advance(&j.states[i], id, &j.states[i+1])
	}
}

// advance asks the language model.
func (j *judge) advance(s *lm.State, w uint32, next *lm.State) float32 {
	if j.shortcut != nil {
		return j.shortcut.Advance(s, w, next)
	}
	return j.e.lm.Advance(s, w, next)
}

// gain is how much better, in nats of the language model, the sentence reads
// with words in place of the typed ids [from, to). It stops where the contexts
// fall together again. A gain that must stay under floor may be reported as
// any number under it.
func (j *judge) gain(from, to int, words []uint32, floor float64) float64 {
	state, next := &j.ahead[0], &j.ahead[1]
	*state = j.states[from]
	sum := 0.0
	for _, p := range j.logp[from:to] {
		sum -= float64(p)
	}
	// What follows can gain no more than its typed cost, for log p <= 0.
	reach := min(len(j.ids), to+j.e.lm.Order()-1)
	hope := 0.0
	for _, p := range j.logp[to:reach] {
		hope -= float64(p)
	}
	for _, w := range words {
		if sum+hope < floor {
			return sum + hope
		}
		sum += float64(j.advance(state, w, next))
		state, next = next, state
	}
	for i := to; i < reach && *state != j.states[i]; i++ {
		if sum+hope < floor {
			return sum + hope
		}
		sum += float64(j.advance(state, j.ids[i], next) - j.logp[i])
		hope += float64(j.logp[i])
		state, next = next, state
	}
	return sum
}
