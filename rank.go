package foulcase

import (
	"cmp"
	"math"
	"slices"

	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/internal/text"
	"example.org/foulcase/lm"
)

// RankOptions says how Rank looks at a word.
type RankOptions struct {
	K           int    // how many candidates; 0 means 10
	Left, Right string // the text around the word; both empty: judged by itself
	Variety     Variety
	House       *House
}

// Ranking is what a word may stand for.
type Ranking struct {
	Word       string      `json:"word"`
	Known      bool        `json:"known"`      // the lexicon or the house has the word as it is
	Candidates []Candidate `json:"candidates"` // best first, the word itself left out; never nil
}

// Candidate is one form that may have been intended.
type Candidate struct {
	Text    string  `json:"text"`
	P       float64 `json:"p"`       // share among the candidates found
	Channel float64 `json:"channel"` // log P(observed | intended), nats
	LM      float64 `json:"lm"`      // log P(intended), in its context if there is one, nats
}

// rankDepth is how many candidates are weighed when fewer are asked for: what
// context or a second reading prefers need not be the channel's first choice.
const rankDepth = 24

// Rank lists what was probably meant by a word, or by several words that
// should be fewer. The word itself is not among the candidates: Known tells
// whether it can stand.
func (e *Engine) Rank(word string, o RankOptions) Ranking {
	j := e.take(Options{Variety: o.Variety, House: o.House})
	defer e.give(j)
	if o.K <= 0 {
		o.K = 10
	}
	form := text.Fold(nil, []byte(word))
	r := Ranking{Word: word, Known: e.knows(form) || j.house.has(form), Candidates: []Candidate{}}

	price := j.pricer(o)
	var scores []float64
	for _, p := range j.finder.rank(form, max(o.K, rankDepth)) {
		if !j.allSpelt(p.words()) {
			continue
		}
		c := Candidate{Text: j.writeRanked(&p, word), Channel: -float64(p.cost), LM: price.of(&p)}
		same := func(o Candidate) bool { return o.Text == c.Text }
		if string(text.Fold(nil, []byte(c.Text))) == string(form) || slices.ContainsFunc(r.Candidates, same) {
			continue
		}
		c.P = price.channel*c.Channel + price.lm*c.LM - price.handicap(&p)
		scores = append(scores, c.P)
		r.Candidates = append(r.Candidates, c)
	}
	total := logSum(scores)
	for i := range r.Candidates {
		r.Candidates[i].P = math.Exp(r.Candidates[i].P - total)
	}
	slices.SortStableFunc(r.Candidates, func(a, b Candidate) int { return cmp.Compare(b.P, a.P) })
	r.Candidates = j.preferFirst(r.Candidates, word)
	r.Candidates = r.Candidates[:min(o.K, len(r.Candidates))]
	return r
}

func (j *judge) allSpelt(words []uint32) bool {
	for _, id := range words {
		if int(id) < j.e.lexicon.Len() && !j.spelt(id) {
			return false
		}
	}
	return true
}

// writeRanked spells a proposal with the capitals of the word it is for.
func (j *judge) writeRanked(p *proposal, word string) string {
	form := p.house
	if form == "" {
		form = spell(j.e.lexicon, p.words())
	}
	return text.ApplyCase(text.CaseOf([]byte(word)), form)
}

// pricer gives log P of a proposal's words between the contexts of a ranking.
type pricer struct {
	e           *Engine
	inContext   bool
	state       lm.State
	right       []uint32
	channel, lm float64 // weights
}

func (j *judge) pricer(o RankOptions) pricer {
	w := j.e.judgement
	p := pricer{e: j.e, channel: w.RankChannel, lm: w.RankPrior}
	if o.Left == "" && o.Right == "" {
		return p
	}
	p.inContext, p.channel, p.lm = true, w.Channel, w.LanguageModel
	p.state = j.e.lm.Begin(j.e.lexicon.ClassID(lexicon.Begin))
	for _, id := range j.sentenceIDs(o.Left, true) {
		_, p.state = j.e.lm.Score(p.state, id)
	}
	p.right = j.sentenceIDs(o.Right, false)
	if len(p.right) >= j.e.lm.Order() {
		p.right = p.right[:j.e.lm.Order()-1]
	}
	return p
}

// sentenceIDs reads the last sentence of a context, or the first.
func (j *judge) sentenceIDs(context string, last bool) []uint32 {
	var ids []uint32
	for s := range j.segmenter.Sentences([]byte(context)) {
		ids = ids[:0]
		for _, t := range s.Tokens {
			ids = j.e.lexicon.Read(ids, t)
		}
		if !last {
			break
		}
	}
	return ids
}

// handicap is what a proposal has to be better by: in context the language
// model knows of words and clitics as of any other.
func (p *pricer) handicap(c *proposal) float64 {
	w := p.e.judgement
	switch {
	case p.inContext:
		return 0
	case c.spaced:
		return w.RankRunon
	case c.n > 1:
		return w.RankPossessive
	}
	return 0
}

// of is log P of a proposal's words, nats.
func (p *pricer) of(c *proposal) float64 {
	if !p.inContext && !c.spaced {
		return c.prior
	}
	sum, state := 0.0, p.state
	for _, ids := range [2][]uint32{c.words(), p.right} {
		for _, id := range ids {
			logp, next := p.e.lm.Score(state, id)
			sum += float64(logp)
			state = next
		}
	}
	return sum
}

// logSum is log Σ exp x.
func logSum(x []float64) float64 {
	if len(x) == 0 {
		return math.Inf(-1)
	}
	top, sum := slices.Max(x), 0.0
	for _, v := range x {
		sum += math.Exp(v - top)
	}
	return top + math.Log(sum)
}
