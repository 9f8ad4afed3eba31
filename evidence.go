package foulcase

import (
	"math"
	"unicode/utf8"

	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/internal/text"
	"example.org/foulcase/lm"
)

// evidence is what is known of one finding when all is weighed, a number a
// feature. The calibration turns it into log-odds that the text is wrong there.
type evidence [features]float32

// The features. "Typed" is what stands there, "meant" the best change.
const (
	fOdds        = iota // log-odds of the lattice that the typed reading is wrong, nats
	fMargin             // log of how much likelier the best change is than the second
	fGain               // what the language model gains by the best change, nats
	fCost               // its channel cost, nats
	fKind               // Kind
	fChanges            // number of changes weighed
	fTypedPrior         // log relative frequency, nats; noPrior for a form that has none
	fMeantPrior         //
	fRarer              // the one less the other
	fTypedLeft          // longest n-gram attested that ends in the typed word
	fTypedRight         // in the word behind it
	fTypedSpan          // that holds it
	fMeantLeft          //
	fMeantRight         //
	fMeantSpan          //
	fTypedLogP          // log probability of the typed words, nats
	fTypedNext          // of the word behind them
	fMeantLogP          //
	fMeantNext          //
	fTypedCount         // log of 1 + how often else the document has the typed form
	fMeantCount         // and the meant
	fRecurrence         // recurrence.word of the typed word, nats
	fJargon             // log share of words of the document that are unknown and have a capital
	fStatus             // status; rare for a known word that is searched for like an unknown one
	fCase               // capitals of the typed form
	fTypedName          // the typed word is usually a name
	fMeantName          //
	fInflection         // the words are inflections of one word
	fSameFirst          // they begin alike
	fEdit               // editShape
	fLength             // letters typed
	fTypedListed        // in a word list, not of the corpus alone
	fMeantListed        //
	fDoubled            // a letter twice in a row
	fPrice              // character model's price of an unknown form, nats a letter
	fQuoted             // quotation marks at it
	fBracketed          // in brackets
	fForeigners         // rare and unknown words among the three to each side
	fCompound           // piece of a hyphened compound
	fBefore             // what kind of word stands before it
	fAfter              // and behind
	fStrange            // mean log probability of the sentence's words, nats
	fSentence           // log of their number
	features
)

var featureNames = [features]string{
	fOdds: "odds", fMargin: "margin", fGain: "gain", fCost: "cost", fKind: "kind", fChanges: "changes",
	fTypedPrior: "typed.prior", fMeantPrior: "meant.prior", fRarer: "rarer",
	fTypedLeft: "typed.left", fTypedRight: "typed.right", fTypedSpan: "typed.span",
	fMeantLeft: "meant.left", fMeantRight: "meant.right", fMeantSpan: "meant.span",
	fTypedLogP: "typed.logp", fTypedNext: "typed.next", fMeantLogP: "meant.logp", fMeantNext: "meant.next",
	fTypedCount: "typed.count", fMeantCount: "meant.count", fRecurrence: "recurrence", fJargon: "jargon",
	fStatus: "status", fCase: "case", fTypedName: "typed.name", fMeantName: "meant.name",
	fInflection: "inflection", fSameFirst: "same.first", fEdit: "edit", fLength: "length",
	fTypedListed: "typed.listed", fMeantListed: "meant.listed", fDoubled: "doubled", fPrice: "price",
	fQuoted: "quoted", fBracketed: "bracketed", fForeigners: "foreigners", fCompound: "compound",
	fBefore: "before", fAfter: "after", fStrange: "strange", fSentence: "sentence",
}

const (
	// noPrior stands for the log relative frequency of a form that has none.
	noPrior = -20
	// leastOdds bounds log-odds of the lattice, and rarestChange a change's
	// posterior, where the figures run out.
	leastOdds, rarestChange = -14, 1e-6
	// rareContext is the log relative frequency under which a word beside a
	// finding counts as foreign to the text.
	rareContext = -14
	// rare is the status of a known word under rareWord.
	rare = foreign + 1
)

// collect gathers what is known of a finding.
func (j *judge) collect(f *finding) *evidence {
	x := &j.seen
	*x = evidence{fKind: float32(f.kind), fChanges: float32(len(f.changes))}
	c := &f.changes[0]
	sl := &j.slots[f.from]
	x.weighed(f)
	j.frequencies(x, sl, j.words[c.lo])
	j.attested(x, f)
	j.recurs(x, sl, j.words[c.lo])
	j.shapes(x, f)
	j.surroundings(x, f)
	return x
}

func (x *evidence) set(feature int, v float64) { x[feature] = float32(v) }

func (x *evidence) when(feature int, v bool) {
	if v {
		x[feature] = 1
	}
}

// weighed is what the lattice made of the finding.
func (x *evidence) weighed(f *finding) {
	x.set(fOdds, clampOdds(logit(f.p)))
	c, second := &f.changes[0], rarestChange
	if len(f.changes) > 1 {
		second = max(second, f.changes[1].p)
	}
	x.set(fMargin, math.Log(max(c.p, rarestChange)/second))
	x.set(fGain, c.gain)
	x.set(fCost, c.cost)
}

// clampOdds bounds log-odds of the lattice, where a sum of shares may reach 1.
func clampOdds(odds float64) float64 { return min(max(odds, leastOdds), -leastOdds) }

// frequencies compares how common the words are.
func (j *judge) frequencies(x *evidence, sl *slot, meant uint32) {
	lex := j.e.lexicon
	typedPrior, meantPrior := float64(noPrior), float64(noPrior)
	if sl.status == known || sl.status == foreign {
		e := lex.Entry(sl.id)
		typedPrior = float64(e.Prior)
		x.when(fTypedName, e.Usual == lexicon.TitleCase)
		x.when(fTypedListed, e.Listed)
	}
	if int(meant) < lex.Len() {
		e := lex.Entry(meant)
		meantPrior = float64(e.Prior)
		x.when(fMeantName, e.Usual == lexicon.TitleCase)
		x.when(fMeantListed, e.Listed)
	}
	x.set(fTypedPrior, typedPrior)
	x.set(fMeantPrior, meantPrior)
	x.set(fRarer, typedPrior-meantPrior)
	x.set(fStatus, float64(sl.status))
	if sl.status == known && typedPrior < rareWord {
		x.set(fStatus, float64(rare))
	}
}

// attested looks at which n-grams the model has of either reading.
func (j *judge) attested(x *evidence, f *finding) {
	c := &f.changes[0]
	from, to := j.slots[f.from].from, j.slots[f.to-1].to
	typed := j.support(from, to, j.ids[from:to])
	meant := j.support(from, to, j.words[c.lo:c.hi])
	for i, s := range [2]support{typed, meant} {
		shift := i * (fMeantLeft - fTypedLeft)
		x.set(fTypedLeft+shift, float64(s.left))
		x.set(fTypedRight+shift, float64(s.right))
		x.set(fTypedSpan+shift, float64(s.span))
		shift = i * (fMeantLogP - fTypedLogP)
		x.set(fTypedLogP+shift, s.logp)
		x.set(fTypedNext+shift, s.next)
	}
}

// support is how well a reading is attested: orders of n-grams found, and log
// probabilities, nats.
type support struct {
	left, right, span int
	logp, next        float64
}

// support looks words up in place of the typed ids [from, to).
func (j *judge) support(from, to int, words []uint32) support {
	m, s := j.e.lm, support{right: 1}
	state := j.states[from]
	step := func(id uint32) lm.Explanation {
		e := m.Explain(state, id)
		_, state = m.Score(state, id)
		return e
	}
	for i, id := range words {
		e := step(id)
		if i == 0 {
			s.left = e.Order
		}
		s.span = max(s.span, e.Order)
		s.logp += float64(e.Total)
	}
	for i := to; i < min(len(j.ids), to+m.Order()-1); i++ {
		e := step(j.ids[i])
		if i == to {
			s.right, s.next = e.Order, float64(e.Total)
		}
		if reaches := e.Order > i-to+1; reaches {
			s.span = max(s.span, e.Order)
		}
	}
	return s
}

// recurs is what the document's own use of the words says.
func (j *judge) recurs(x *evidence, sl *slot, meant uint32) {
	r := &j.recurring
	if !j.without.has(RecurringEvidence) {
		if sl.status == unknown {
			x.set(fTypedCount, r.form(sl.token.Norm))
		}
		x.set(fJargon, r.jargon())
	}
	if j.without.has(CacheEvidence) {
		return
	}
	if sl.status == known || sl.status == foreign {
		x.set(fTypedCount, math.Log(float64(max(1, r.words[sl.id]))))
		x.set(fRecurrence, r.word(sl.id, j.e.lexicon, 1))
	}
	if int(meant) < j.e.lexicon.Len() {
		x.set(fMeantCount, math.Log1p(float64(r.words[meant])))
	}
}

// shapes compares the forms.
func (j *judge) shapes(x *evidence, f *finding) {
	sl, meant := &j.slots[f.from], j.words[f.changes[0].lo]
	typed := sl.token.Norm
	var form []byte
	if int(meant) < j.e.lexicon.Len() {
		j.form = j.e.lexicon.AppendForm(j.form[:0], meant)
		form = j.form
	}
	x.when(fSameFirst, len(form) > 0 && typed[0] == form[0])
	x.set(fEdit, float64(editShape(typed, form)))
	x.set(fLength, float64(utf8.RuneCount(typed)))
	for i := 1; i < len(typed); i++ {
		x.when(fDoubled, typed[i] == typed[i-1])
	}
	x.when(fInflection, f.kind == Realword && int(meant) < j.e.lexicon.Len() && j.inflections(sl.id, meant))
	x.set(fCase, float64(sl.token.Case))
	if sl.token.Case == text.Title && f.from <= j.lead {
		x.set(fCase, leadCase)
	}
	if sl.status == unknown {
		x.set(fPrice, float64(j.e.spelling.Price(typed))/float64(len(typed)+1))
	}
}

// leadCase is the feature's value for a capital that the place alone explains.
const leadCase = -1

// Shapes of an edit, by what was done to the meant form.
const (
	otherEdit = iota
	endDropped
	letterDropped
	endAdded
	letterAdded
	lastReplaced
	firstReplaced
	letterReplaced
	lettersSwapped
)

// editShape tells in which way one form is a single edit away from the other.
func editShape(typed, meant []byte) int {
	short := min(len(typed), len(meant))
	i := 0
	for i < short && typed[i] == meant[i] {
		i++
	}
	rest := func(a, b int) bool {
		return a <= len(typed) && b <= len(meant) && string(typed[a:]) == string(meant[b:])
	}
	switch {
	case i == len(typed) && i == len(meant):
		return otherEdit
	case rest(i, i+1) && i == len(typed):
		return endDropped
	case rest(i, i+1):
		return letterDropped
	case rest(i+1, i) && i == len(meant):
		return endAdded
	case rest(i+1, i):
		return letterAdded
	case rest(i+1, i+1) && i == 0:
		return firstReplaced
	case rest(i+1, i+1) && i+1 == len(typed):
		return lastReplaced
	case rest(i+1, i+1):
		return letterReplaced
	case rest(i+2, i+2) && typed[i] == meant[i+1] && typed[i+1] == meant[i]:
		return lettersSwapped
	}
	return otherEdit
}

// surroundings looks at what stands around the finding.
func (j *judge) surroundings(x *evidence, f *finding) {
	x.when(fQuoted, j.quoted(f))
	x.when(fBracketed, j.bracketed(f))
	x.when(fCompound, j.compounded(f.from))
	x.set(fBefore, j.neighbour(f.from-1))
	x.set(fAfter, j.neighbour(f.to))
	for i := max(0, f.from-3); i < min(len(j.slots), f.to+3); i++ {
		outside := i < f.from || i >= f.to
		if s := &j.slots[i]; outside && (s.status == unknown || s.status == known && j.e.lexicon.Prior(s.id) < rareContext) {
			x[fForeigners]++
		}
	}
	sum := 0.0
	for _, p := range j.logp {
		sum += float64(p)
	}
	x.set(fStrange, sum/float64(len(j.logp)))
	x.set(fSentence, math.Log(float64(len(j.slots))))
}

// Values of fBefore and fAfter.
const (
	plainNeighbour = iota
	unknownNeighbour
	noWordNeighbour
	noNeighbour
	capitalNeighbour
)

func (j *judge) neighbour(i int) float64 {
	if i < 0 || i >= len(j.slots) {
		return noNeighbour
	}
	switch s := &j.slots[i]; {
	case s.token.Kind != text.Word:
		return noWordNeighbour
	case s.status == unknown:
		return unknownNeighbour
	case s.token.Case == text.Title:
		return capitalNeighbour
	}
	return plainNeighbour
}

// quoted reports whether a quotation mark stands at either end.
func (j *judge) quoted(f *finding) bool {
	quote := func(i int) bool { return i >= 0 && i < len(j.tokens) && j.tokens[i].Kind == text.Quote }
	return quote(j.slots[f.from].place-1) || quote(j.slots[f.to-1].place+1)
}

// bracketed reports whether a bracket opens shortly before and has not closed.
func (j *judge) bracketed(f *finding) bool {
	const reach = 8 // tokens
	place := j.slots[f.from].place
	for i := place - 1; i >= max(0, place-reach); i-- {
		switch j.tokens[i].Kind {
		case text.Open:
			return true
		case text.Close:
			return false
		}
	}
	return false
}
