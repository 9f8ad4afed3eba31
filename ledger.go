package foulcase

import (
	"cmp"
	"fmt"
	"math"
	"slices"
	"strings"

	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/channel"
	"example.org/foulcase/internal/text"
)

// Ledger takes the judgement of a text apart, word by word.
type Ledger struct {
	Sentence string    `json:"sentence"`
	Weights  Judgement `json:"weights"`
	// Rate is how many slips a word the writer is taken to make, 0 if the model is
	// not calibrated, and Shift what that adds to every finding's log-odds, nats.
	Rate  float64        `json:"rate"`
	Shift float64        `json:"shift"`
	Words []LedgerColumn `json:"words"`
}

// LedgerColumn is one word and every reading of it that was weighed.
type LedgerColumn struct {
	Observed string          `json:"observed"`
	Offset   int             `json:"offset"`          // bytes into the sentence
	Status   string          `json:"status"`          // known, unknown, other-variety or closed
	P        float64         `json:"p"`               // probability that it is an error: of Base, Terms and the ledger's Shift added up
	Base     float64         `json:"base"`            // log-odds before any evidence, nats
	Terms    []LedgerTerm    `json:"terms,omitempty"` // what was known of it, weightiest first
	Query    float64         `json:"query"`           // least p for a query of the kind
	Mark     float64         `json:"mark"`            // least p for a mark of the kind
	Verdict  string          `json:"verdict"`
	Readings []LedgerReading `json:"readings"` // the typed one first, then best first

	kind Kind
	odds float64
}

// LedgerTerm is one feature of a finding and what it says.
type LedgerTerm struct {
	Feature string  `json:"feature"`
	Value   float64 `json:"value"`
	Nats    float64 `json:"nats"` // added to the log-odds of an error
}

// LedgerReading is the account of one reading. All amounts are nats, and
// Score = language_model × LM + Slip − channel × Channel + Evidence.
type LedgerReading struct {
	Text     string        `json:"text"`
	Kind     string        `json:"kind"` // "typed" or a kind of error
	Channel  float64       `json:"channel"`
	Steps    []string      `json:"steps,omitempty"` // the channel's cheapest way, word for word
	LM       float64       `json:"lm"`              // log P of the slot's words and of those they bear on
	NGrams   []LedgerNGram `json:"ngrams"`
	Slip     float64       `json:"slip"`     // log prior odds of the kind
	Evidence float64       `json:"evidence"` // of document, capitals, inflection, new-word price, what favours run-ons
	Score    float64       `json:"score"`
	P        float64       `json:"p"` // posterior in the lattice, what favours run-ons counted
}

// LedgerNGram is one language-model score.
type LedgerNGram struct {
	Word    string  `json:"word"`
	Order   int     `json:"order"`    // length of the n-gram found
	LogProb float64 `json:"log_prob"` // stored for it
	Backoff float64 `json:"backoff"`  // added for the contexts it was not found in
}

var statusNames = [...]string{closed: "closed", known: "known", unknown: "unknown", foreign: "other-variety"}

// Ledger accounts for every word of a plain text, readings too poor to be
// weighed in Proof included. What is said of findings is what Proof makes of them.
func (e *Engine) Ledger(sentence string, o Options) Ledger {
	d := e.newDocument(o)
	defer e.give(d.judge)

	l := Ledger{Sentence: sentence, Weights: *e.judgement, Words: []LedgerColumn{}}
	block := &text.Block{Text: []byte(sentence)}
	d.count([]*text.Block{block})
	for s := range d.segmenter.Sentences(block.Text) {
		found, err := d.findings(s, block.Text)
		if err != nil {
			continue // no reading has a probability: nothing to account for
		}
		d.words += wordsIn(s.Tokens)
		l.Words = append(l.Words, d.columns(s, found, block.Text)...)
	}
	l.settle(d)
	return l
}

// settle settles what becomes of every column now that the text is known.
func (l *Ledger) settle(d *document) {
	for i := range l.Words {
		d.odds = append(d.odds, l.Words[i].odds)
	}
	d.rate.settle(d.words, d.odds)
	l.Shift = d.rate.shift
	if d.e.calibration != nil {
		l.Rate = logistic(d.rate.base + d.rate.shift)
	}
	var reported []float64
	for i := range l.Words {
		c := &l.Words[i]
		if c.P = logistic(c.odds + l.Shift); c.found() && c.P >= d.limits.query[c.kind] {
			reported = append(reported, c.P)
		}
	}
	floor := d.limits.leastOf(d.words, reported)
	for i := range l.Words {
		l.Words[i].decide(&d.limits, floor)
	}
}

// found reports whether a finding begins at the column.
func (c *LedgerColumn) found() bool { return !math.IsInf(c.odds, -1) }

// decide gives the verdict; under the floor nothing is reported.
func (c *LedgerColumn) decide(limits *thresholds, floor float64) {
	if !c.found() {
		return
	}
	c.Query, c.Mark = max(limits.query[c.kind], floor), max(limits.mark[c.kind], floor)
	if g := limits.grade(c.kind, c.P); g != GradeDoubt && c.P >= floor {
		c.Verdict = g.String() + " " + c.kind.String()
	}
}

// columns accounts for the words of a sentence in which so much was found.
func (j *judge) columns(s text.Sentence, found []finding, block []byte) []LedgerColumn {
	columns := make([]LedgerColumn, len(j.slots))
	for i := range columns {
		columns[i].odds = math.Inf(-1)
	}
	for i := range found {
		if f := &found[i]; !math.IsInf(f.odds, -1) {
			c := &columns[f.from]
			c.odds = f.odds
			c.Base, c.Terms = j.terms(f)
			j.favourRunons(f)
			c.kind = f.kind
		}
	}
	j.hopeless = math.Inf(1)
	defer func() { j.hopeless = hopeless }()
	found, err := j.findings(s, block)
	if err != nil {
		return nil
	}
	for i := range found {
		j.favourRunons(&found[i])
	}
	words := columns[:0]
	for i, c := range columns {
		if j.slots[i].token.Kind == text.Word {
			j.fill(&c, i, block)
			words = append(words, c)
		}
	}
	return words
}

// fill accounts for the readings of slot i.
func (j *judge) fill(c *LedgerColumn, i int, block []byte) {
	sl := &j.slots[i]
	c.Observed = string(block[sl.token.Start:sl.token.End])
	c.Offset = sl.token.Start
	c.Status = statusNames[sl.status]
	c.Verdict = "let stand"
	c.Readings = []LedgerReading{j.typedReading(sl, block)}
	rest := 1.0
	for _, ch := range j.changes {
		if ch.from <= i && i < ch.to {
			rest -= ch.p
		}
		if ch.from == i {
			c.Readings = append(c.Readings, j.changedReading(&ch, block))
		}
	}
	c.Readings[0].P = max(rest, 0)
}

// terms accounts for the log-odds of a finding.
func (j *judge) terms(f *finding) (base float64, terms []LedgerTerm) {
	if j.e.calibration == nil || f.preferred != nil {
		return f.odds, nil
	}
	model := j.e.calibration.models[groupOf(f.kind)]
	model.Account(j.collect(f)[:], func(feature string, value float32, nats float64) {
		terms = append(terms, LedgerTerm{feature, float64(value), nats})
	})
	slices.SortStableFunc(terms, func(a, b LedgerTerm) int { return cmp.Compare(math.Abs(b.Nats), math.Abs(a.Nats)) })
	return model.Base(), terms
}

func (j *judge) typedReading(sl *slot, block []byte) LedgerReading {
	reach := min(len(j.ids), sl.to+j.e.lm.Order()-1)
	r := LedgerReading{
		Text:     string(block[sl.token.Start:sl.token.End]),
		Kind:     "typed",
		Evidence: sl.score,
		NGrams:   j.ngrams(sl.from, j.ids[sl.from:sl.to]),
	}
	for _, p := range j.logp[sl.from:reach] {
		r.LM += float64(p)
	}
	r.Score = j.e.judgement.LanguageModel*r.LM + r.Evidence
	return r
}

func (j *judge) changedReading(ch *change, block []byte) LedgerReading {
	w := j.e.judgement
	from, to := j.slots[ch.from].from, j.slots[ch.to-1].to
	reach := min(len(j.ids), to+j.e.lm.Order()-1)
	words := j.words[ch.lo:ch.hi]
	r := LedgerReading{
		Text:    j.write(ch, block),
		Kind:    ch.kind.String(),
		Channel: ch.cost,
		LM:      ch.gain,
		NGrams:  j.ngrams(from, words),
		Slip:    w.Slip.Of(ch.kind),
		P:       ch.p,
	}
	for _, p := range j.logp[from:reach] {
		r.LM += float64(p)
	}
	favour := 0.0
	if ch.kind == Runon && j.slots[ch.from].status == unknown {
		favour = runonFavour
	}
	r.Evidence = ch.score - r.Slip + w.Channel*ch.cost + favour
	r.Score = w.LanguageModel*r.LM + ch.score + favour
	if ch.kind == Nonword || ch.kind == Realword {
		r.Steps = j.steps(ch, words)
	}
	return r
}

// steps spells the channel's cheapest way from what was meant to what stands
// there; steps that keep a letter are left out.
func (j *judge) steps(ch *change, words []uint32) []string {
	intended := ch.house
	if intended == "" {
		intended = strings.ToLower(spell(j.e.lexicon, words))
	}
	var steps []string
	for _, s := range j.e.channel.Explain(string(j.slots[ch.from].token.Norm), intended) {
		if s.Kind != channel.Kept && s.Kind != channel.Ended {
			steps = append(steps, fmt.Sprintf("%s %q as %q after %q: %.2f", s.Kind, s.Intended, s.Observed, string(s.Left), s.Cost))
		}
	}
	return steps
}

// ngrams accounts for words in the place of the typed ids from `from` on.
func (j *judge) ngrams(from int, words []uint32) []LedgerNGram {
	state := j.states[from]
	var out []LedgerNGram
	for _, id := range words {
		x := j.e.lm.Explain(state, id)
		out = append(out, LedgerNGram{j.name(id), x.Order, float64(x.LogProb), float64(x.Total - x.LogProb)})
		_, state = j.e.lm.Score(state, id)
	}
	return out
}

// name is how a word id is shown: its form, or the name of its class.
func (j *judge) name(id uint32) string {
	if n := j.e.lexicon.Len(); int(id) >= n {
		return lexicon.Class(int(id) - n).String()
	}
	return string(j.e.lexicon.AppendForm(nil, id))
}

// String lays the ledger out for a terminal.
func (l Ledger) String() string {
	var b strings.Builder
	w := l.Weights
	fmt.Fprintf(&b, "%s\n", strings.TrimSpace(l.Sentence))
	fmt.Fprintf(&b, "score = %.3g × lm + slip - %.3g × channel + evidence   (nats)\n", w.LanguageModel, w.Channel)
	if l.Rate > 0 {
		fmt.Fprintf(&b, "the writer is taken to slip %.3g times in 1,000 words: %+.2f nats to every finding\n", 1000*l.Rate, l.Shift)
	}
	for _, c := range l.Words {
		fmt.Fprintf(&b, "\n%q  %s  p %.4f", c.Observed, c.Status, c.P)
		if c.Mark > 0 {
			fmt.Fprintf(&b, " (query from %.4f, mark from %.4f)", c.Query, c.Mark)
		}
		fmt.Fprintf(&b, "  %s\n", c.Verdict)
		for _, r := range c.Readings[:min(len(c.Readings), 8)] {
			r.write(&b)
		}
		c.writeTerms(&b)
	}
	return b.String()
}

// shownTerms is how many terms of a finding a terminal is shown.
const shownTerms = 8

func (c *LedgerColumn) writeTerms(b *strings.Builder) {
	if len(c.Terms) == 0 {
		return
	}
	rest := 0.0
	for i, t := range c.Terms {
		if i < shownTerms {
			fmt.Fprintf(b, "      evidence: %-12s %8.3g %+8.2f\n", t.Feature, t.Value, t.Nats)
		} else {
			rest += t.Nats
		}
	}
	fmt.Fprintf(b, "      evidence: all else and base     %+8.2f\n", rest+c.Base)
}

func (r *LedgerReading) write(b *strings.Builder) {
	fmt.Fprintf(b, "  %-16s %-8s p %.4f  score %8.2f = lm %8.2f  slip %6.2f  channel %6.2f  evidence %6.2f\n",
		r.Text, r.Kind, r.P, r.Score, r.LM, r.Slip, r.Channel, r.Evidence)
	for _, g := range r.NGrams {
		fmt.Fprintf(b, "      %-14s %d-gram %7.2f  back-off %6.2f\n", g.Word, g.Order, g.LogProb, g.Backoff)
	}
	for _, s := range r.Steps {
		fmt.Fprintf(b, "      channel: %s\n", s)
	}
}
