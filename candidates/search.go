package candidates

import (
	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/channel"
)

// Weights say how much the two parts of a score count.
type Weights struct {
	Channel float32 // times the channel cost, nats
	Prior   float32 // times minus the log prior of the word, nats
}

// DefaultWeights are the weights that ranked isolated words best on the
// development lists (tuned in steps of 0.2).
var DefaultWeights = Weights{Channel: 1, Prior: 0.8}

// Candidate is a word that may have been meant.
type Candidate struct {
	ID      uint32  // in the lexicon, or in the house lexicon
	House   bool    // ID counts in the house lexicon
	Channel float32 // cost of the observed form if this is what was meant, nats
	Prior   float32 // log prior of the word, nats, at most 0
}

// Score is the weighted sum that candidates are ordered by, least first.
func (c Candidate) Score(w Weights) float32 { return w.Channel*c.Channel - w.Prior*c.Prior }

// Searcher finds candidates. It serves one goroutine at a time, and does not
// allocate once it has grown to the size its queries need.
type Searcher struct {
	channel *channel.Model
	weights Weights
	variety lexicon.Variety
	lex     *lexicon.Lexicon
	mirror  *Mirror
	house   *lexicon.Lexicon
	trees   []tree

	queue             queue
	reached           reached
	scratch           []path
	observed          []channel.Letter
	forwards, reverse reading
	best              []found // the best k words seen, ascending by score
	limit             float32
	joined            []byte
	k                 int
	spread            float32
}

// found is a whole word reached by the search.
type found struct {
	Candidate
	score float32
}

const (
	// budget is the number of states a search may leave before it gives up with
	// what it has found, some milliseconds of work; hardBudget if it has found
	// nothing yet.
	budget     = 28_000
	hardBudget = 100_000
	// A search goes so far at first, in nats, then further by quarters until it has
	// found a word, and then as far as the spread above the best. Else it would
	// queue all that lies within the bound before it knows what is worth it: a
	// reach of four nats less takes a third of the time. From lastReach on it goes
	// to the bound.
	firstReach, lastReach = 16, 200
	// spread is the default of SetSpread.
	spread = 8
	// longest is the number of letters of the longest observed word.
	longest = 62
)

// NewSearcher searches one lexicon by one error model.
func NewSearcher(lex *lexicon.Lexicon, ch *channel.Model, w Weights) *Searcher {
	s := &Searcher{lex: lex, channel: ch, weights: w, spread: spread}
	s.plant()
	return s
}

// SetMirror gives the searcher the lexicon spelled backwards, which makes it
// fast and does not change what it finds.
func (s *Searcher) SetMirror(m *Mirror) {
	s.mirror = m
	s.plant()
}

// SetHouse has a second, small lexicon searched along with the first; nil for none.
func (s *Searcher) SetHouse(house *lexicon.Lexicon) {
	s.house = house
	s.plant()
}

// SetSpread leaves out words whose scores are more than so much above the best.
// It bounds the work: words less likely by such a factor cost most of the time
// of an exact search for them.
func (s *Searcher) SetSpread(spread float32) { s.spread = spread }

// SetVariety leaves out words of other varieties than those named; 0 keeps all.
func (s *Searcher) SetVariety(v lexicon.Variety) {
	s.variety = v
}

// plant sets up the trees to search.
func (s *Searcher) plant() {
	words := uint32(s.lex.Len())
	s.trees = append(s.trees[:0], tree{lex: s.lex, words: words, read: &s.forwards, halved: s.mirror != nil})
	if s.mirror != nil {
		s.trees = append(s.trees, tree{lex: s.mirror.lex, mirror: s.mirror, words: words, read: &s.reverse, halved: true})
	}
	if s.house != nil {
		s.trees = append(s.trees, tree{lex: s.house, words: uint32(s.house.Len()), house: true, read: &s.forwards})
	}
}

// Search finds the best words by two searches in one queue, forwards and
// backwards. Of any word's best alignment either the half read first or the other
// costs no more than the rest; so each search may price a half it has read at
// twice its cost, and gives up early on words that the other will find.
//
// It appends the best k words for an observed form in normal form, best
// first, with scores of at most bound, and returns the extended slice. The
// observed form itself is among them if it is a word. An observed form of more
// than 62 letters has no candidates.
func (s *Searcher) Search(dst []Candidate, observed []byte, k int, bound float32) []Candidate {
	s.observed = channel.AppendLetters(s.observed[:0], observed[:min(len(observed), 4*longest+1)])
	if n := len(s.observed); n == 0 || n > longest || k <= 0 {
		return dst
	}
	s.begin(k)
	reach := float32(firstReach)
	for s.further(reach, bound) {
		reach *= 1.25
	}
	for _, f := range s.best {
		if f.score <= s.limit {
			dst = append(dst, f.Candidate)
		}
	}
	return dst
}

// begin prepares the readings of the observed word.
func (s *Searcher) begin(k int) {
	s.best, s.k = s.best[:0], k
	half := (len(s.observed) + 1) / 2
	s.forwards.readForwards(s.channel, s.observed, half)
	if s.mirror != nil {
		s.reverse.readBackwards(s.channel, &s.forwards, len(s.observed)-half)
	}
}

// further searches as far as reach, or, if a word is found already, as far as the
// spread allows. It is false when going further would find no better words, or
// be too much work.
func (s *Searcher) further(reach, bound float32) bool {
	known := len(s.best) > 0
	switch {
	case known:
		reach = s.best[0].score + s.spread
	case reach > lastReach:
		reach = bound
	}
	reach = min(reach, bound)
	s.limit = reach
	done := s.run()
	return done && !known && reach < bound && s.limit == reach
}

// run searches as far as the limit, which it lowers by what it finds. It is false
// if it gave up.
func (s *Searcher) run() bool {
	s.queue.reset()
	s.reached.reset()
	s.start()
	var st state
	for work := 0; work < budget || work < hardBudget && len(s.best) == 0; work++ {
		if !s.queue.pop(&st, s.limit) {
			return true
		}
		if st.score > s.limit || s.reached.stale(&st) {
			continue
		}
		if st.letter.Sym != channel.Edge {
			s.leave(&st)
		} else if int(st.i) < len(s.observed) {
			s.insert(&st, s.trees[st.tree].read)
		}
	}
	return false
}

// start queues every first letter.
func (s *Searcher) start() {
	for i := range s.trees {
		s.scratch = s.appendChildren(s.scratch[:0], s.root(i), func(channel.Symbol) bool { return true })
		for k := range s.scratch {
			first := &s.scratch[k]
			s.reach(&state{}, first, 0, s.trees[i].read.order.Begin(first.letter.Sym))
		}
	}
	s.scratch = s.scratch[:0]
}

// reach queues the state that a step from another reached, unless it cannot
// matter.
func (s *Searcher) reach(from *state, p *path, i int32, cost float32) {
	t := &s.trees[p.tree]
	before, c := p.before, p.letter.Sym
	floor := cost + t.read.toEnd.rest(t.read, int(i), before)[c]
	half := from.half
	if t.halved {
		if int(from.i) < t.read.half {
			half = cost
			if int(i) > t.read.half {
				half = from.cost
			}
		}
		floor = max(floor, 2*(half+t.read.toHalf.rest(t.read, int(i), before)[c]))
	}
	floor *= s.weights.Channel
	if floor+from.prior > s.limit {
		return
	}
	prior := from.prior
	if p.node.Words() != from.node.Words() { // otherwise the same words are below
		prior = s.priorCost(p)
	}
	score := floor + prior
	if score > s.limit || !s.reached.cheaper(key(p, i), cost, half) {
		return
	}
	if c == channel.Edge && int(i) == len(s.observed) {
		if id, ok := t.id(p.base); ok {
			s.tighten(found{Candidate{id, t.house, cost, t.lex.Prior(p.base)}, score})
		}
		return
	}
	to := s.queue.push(score)
	to.path, to.score, to.cost, to.half, to.prior, to.i = *p, score, cost, half, prior, i
}

// tighten lowers the limit to the k-th best score of the whole words seen.
func (s *Searcher) tighten(f found) {
	at := len(s.best)
	for i, b := range s.best {
		if b.ID == f.ID && b.House == f.House {
			if b.score <= f.score {
				return
			}
			at = i
			break
		}
	}
	if at == len(s.best) {
		if at < s.k {
			s.best = append(s.best, f)
		} else if at--; s.best[at].score <= f.score {
			return
		}
	}
	for at > 0 && s.best[at-1].score > f.score {
		s.best[at] = s.best[at-1]
		at--
	}
	s.best[at] = f
	s.limit = min(s.limit, s.best[0].score+s.spread)
	if len(s.best) == s.k {
		s.limit = min(s.limit, s.best[s.k-1].score)
	}
}
