package candidates

import (
	"math"

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

	paths             []path
	visits            []visit
	query             uint32
	queue             queue
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
	// budget is the number of states a query may leave before it gives up with
	// what it has found, some ten milliseconds of work; hardBudget if it has
	// found nothing yet.
	budget     = 40_000
	hardBudget = 160_000
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
	s.plant()
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
	s.forget()
}

// Search finds the best words by two searches in one queue, forwards and
// backwards. Of any word's best alignment either the half read first or the other
// costs no more than the rest; so each search may price a half it has read at
// twice its cost, and gives up early on words that the other will find.
//
// It appends the best k words for an observed form in normal form, best
// first, with scores of at most bound, and returns the extended slice. The
// observed form itself is among them if it is a word. An observed form of more than 62 letters has no candidates.
func (s *Searcher) Search(dst []Candidate, observed []byte, k int, bound float32) []Candidate {
	s.observed = channel.AppendLetters(s.observed[:0], observed[:min(len(observed), 4*longest+1)])
	if n := len(s.observed); n == 0 || n > longest || k <= 0 {
		return dst
	}
	s.begin(k, bound)
	for work := 0; work < budget || work < hardBudget && len(s.best) == 0; work++ {
		st, ok := s.queue.pop(s.limit)
		if !ok {
			break
		}
		p := &s.paths[st.path]
		if st.score > s.limit || s.leftCheaper(p, st.i, st.cost) {
			continue
		}
		s.note(p, st.i, st.cost)
		if p.letter.Sym != channel.Edge {
			s.leave(st)
		} else if int(st.i) < len(s.observed) {
			s.insert(st, p)
		}
	}
	for _, f := range s.best {
		if f.score <= s.limit {
			dst = append(dst, f.Candidate)
		}
	}
	return dst
}

// begin prepares the search and starts it at every first letter.
func (s *Searcher) begin(k int, bound float32) {
	if len(s.paths) > mostPaths || s.query == math.MaxUint32 {
		s.query = 0
		s.forget()
	}
	s.query++
	s.queue.reset()
	s.best, s.visits = s.best[:0], append(s.visits[:0], visit{})
	s.k, s.limit = k, bound
	half := (len(s.observed) + 1) / 2
	s.forwards.readForwards(s.channel, s.observed, half)
	if s.mirror != nil {
		s.reverse.readBackwards(s.channel, &s.forwards, len(s.observed)-half)
	}
	for i := range s.trees {
		t := &s.trees[i]
		for c, end := s.children(t.root); c < end; c++ {
			cost := float32(0)
			if t.read.back {
				cost = s.channel.Stop(s.paths[c].letter.Sym)
			}
			s.push(state{}, c, 0, cost)
		}
	}
}

// push queues a state that a step from another reached, unless it cannot matter.
func (s *Searcher) push(from state, at, i int32, cost float32) {
	p := &s.paths[at]
	t := &s.trees[p.tree]
	floor := cost + t.read.floor[i]
	half := from.half
	if t.halved {
		if int(from.i) < t.read.half {
			half = cost
			if int(i) > t.read.half {
				half = from.cost
			}
		}
		floor = max(floor, 2*(half+t.read.toHalf[i]))
	}
	score := s.weights.Channel*floor + p.prior
	if score > s.limit || s.leftCheaper(p, i, cost) {
		return
	}
	if p.letter.Sym == channel.Edge && int(i) == len(s.observed) {
		if id, ok := t.id(p.base); ok {
			s.tighten(found{Candidate{id, t.house, cost, t.lex.Prior(p.base)}, score})
		}
		return
	}
	s.queue.push(state{score: score, cost: cost, half: half, path: at, i: i})
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
