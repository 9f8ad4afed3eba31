package foulcase

import (
	"bytes"
	"cmp"
	"slices"

	"example.org/foulcase/candidates"
	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/lm/lattice"
)

const (
	// depth is how many candidates of a form that is no word are weighed in a
	// sentence.
	depth = 8
	// rareWord is the log relative frequency, nats, under which a word is looked
	// at as one that is none: the table of confusable words does not go so far.
	rareWord = -15
	// slipReach is the weighted cost, nats, up to which they are looked for:
	// beyond it a new word is the likelier reading of any form. rareReach and nameReach
	// are the same for forms that are likely meant: a rare word, and a name, with a
	// capital inside a sentence.
	slipReach, rareReach, nameReach = 22, 14.5, 12.5
	// rankReach is the same for a ranking, where no new word competes.
	rankReach = 60
	// findSpread and rankSpread are the weighted costs, nats, above the best at
	// which a word is left out.
	findSpread, rankSpread = 8, 13
	// maxCached bounds the remembered searches; all are forgotten when it is
	// reached.
	maxCached = 1 << 15
)

// proposal is one reading of a form by itself, before any context.
type proposal struct {
	ids    [lattice.MaxWords]uint32
	n      int
	house  string  // the form, when it is a house word
	cost   float32 // channel cost, nats
	prior  float64 // log relative frequency, nats
	spaced bool    // a run-on: more words than were typed
}

func (p *proposal) words() []uint32 { return p.ids[:p.n] }

// finder gives the readings of forms, by search or from the model's table, and
// remembers what it searched for. One goroutine uses it at a time.
type finder struct {
	e        *Engine
	searcher *candidates.Searcher
	house    *House
	variety  Variety
	cache    map[string]searched
	found    []candidates.Candidate
	runons   []candidates.RunOn
}

// searched is a remembered search and how far it reached.
type searched struct {
	found []proposal
	reach float32
}

func newFinder(e *Engine) finder {
	return finder{e: e, searcher: e.newSearcher(), cache: make(map[string]searched)}
}

// newSearcher returns a searcher that orders by the weights of isolated words.
func (e *Engine) newSearcher() *candidates.Searcher {
	s := candidates.NewSearcher(e.lexicon, e.channel, candidates.Weights{
		Channel: float32(e.judgement.RankChannel),
		Prior:   float32(e.judgement.RankPrior),
	})
	s.SetMirror(e.mirror)
	s.SetSpread(findSpread)
	return s
}

// hold prepares the finder for the words of a variety and a house.
func (f *finder) hold(v Variety, h *House) {
	if v == f.variety && h == f.house {
		return
	}
	f.variety, f.house = v, h
	clear(f.cache)
	f.searcher.SetVariety(v.bits())
	if h == nil {
		f.searcher.SetHouse(nil)
	} else {
		f.searcher.SetHouse(h.words)
	}
}

// find gives the readings of a form that is no word with weighted costs of at
// most reach, best first by themselves. What was looked for before does not
// change the answer. The slice is the finder's and must not be changed.
func (f *finder) find(form []byte, reach float32) []proposal {
	p, ok := f.cache[string(form)]
	if !ok || p.reach < reach {
		if len(f.cache) >= maxCached {
			clear(f.cache)
		}
		found := f.search(form, depth, reach)
		slices.SortStableFunc(found, func(a, b proposal) int { return cmp.Compare(f.score(&a), f.score(&b)) })
		p = searched{slices.Clip(found[:min(depth, len(found))]), reach}
		f.cache[string(form)] = p
	}
	within := len(p.found)
	for within > 0 && f.score(&p.found[within-1]) > float64(reach) {
		within--
	}
	return p.found[:within]
}

// score is the weighted cost of a proposal by itself, nats.
func (f *finder) score(p *proposal) float64 {
	w := f.e.judgement
	return w.RankChannel*float64(p.cost) - w.RankPrior*p.prior
}

// rank gives the readings of a form by itself. Words written apart are read as
// one with spaces too many.
func (f *finder) rank(form []byte, k int) []proposal {
	f.searcher.SetSpread(rankSpread)
	defer f.searcher.SetSpread(findSpread)
	pieces := bytes.Fields(form)
	found := f.search(bytes.Join(pieces, nil), k, rankReach)
	for i := range found {
		found[i].cost += float32(max(0, len(pieces)-1)) * f.e.channel.Prices().Split
	}
	return found
}

// search finds words, possessives and run-ons alike, at most k of each, with
// weighted costs of at most bound.
func (f *finder) search(form []byte, k int, bound float32) []proposal {
	var out []proposal
	f.found = f.searcher.Search(f.found[:0], form, k, bound)
	for _, c := range f.found {
		out = append(out, f.propose(c))
	}
	if clitic, ok := f.e.lexicon.ID([]byte("'s")); ok {
		f.found = f.searcher.Possessives(f.found[:0], form, k, bound)
		for _, c := range f.found {
			p := f.propose(c)
			p.ids[p.n] = clitic
			p.n++
			out = append(out, p)
		}
	}
	f.runons = f.searcher.RunOns(f.runons[:0], form, k/2, bound)
	for _, r := range f.runons {
		p := proposal{n: r.N, cost: r.Channel, prior: float64(r.Prior), spaced: true}
		copy(p.ids[:], r.IDs[:r.N])
		out = append(out, p)
	}
	return out
}

func (f *finder) propose(c candidates.Candidate) proposal {
	p := proposal{n: 1, cost: c.Channel, prior: float64(c.Prior)}
	p.ids[0] = c.ID
	if c.House {
		p.house = f.house.words.Canonical(c.ID)
		p.ids[0] = f.e.lexicon.ClassID(lexicon.Name)
	}
	return p
}

// join reads two forms as one word.
func (f *finder) join(first, second []byte) (candidates.Candidate, bool) {
	return f.searcher.Join(first, second)
}
