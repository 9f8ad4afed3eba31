package candidates

import (
	"bytes"

	"example.org/foulcase/channel"
)

var possessive = []byte("'s")

// Possessives appends readings of an observed form as the possessive of a word:
// each candidate stands for its word followed by "'s". A form that ends in "'s"
// is the possessive of whatever its stem may have meant (harbur's), best first,
// at most k, with scores of at most bound. A form that ends in s alone is the
// possessive of its stem, if that is a word, with the apostrophe left out.
func (s *Searcher) Possessives(dst []Candidate, observed []byte, k int, bound float32) []Candidate {
	if stem, ok := bytes.CutSuffix(observed, possessive); ok {
		return s.Search(dst, stem, k, bound)
	}
	stem, ok := bytes.CutSuffix(observed, possessive[1:])
	if !ok || len(stem) < 2 || k <= 0 {
		return dst
	}
	id, ok := s.lex.ID(stem)
	if !ok || !s.allowed(s.lex, id) {
		return dst
	}
	c := Candidate{ID: id, Channel: s.missedApostrophe(stem), Prior: s.lex.Prior(id)}
	if c.Score(s.weights) > bound {
		return dst
	}
	return append(dst, c)
}

// missedApostrophe is the cost of leaving out the apostrophe of "'s" after a
// stem that is spelt right.
func (s *Searcher) missedApostrophe(stem []byte) float32 {
	letters := channel.AppendLetters(s.observed[:0], stem)
	s.observed = letters
	mark, plural := channel.LetterOf('\''), channel.LetterOf('s')
	last := letters[len(letters)-1].Sym
	cost := s.channel.Drop(last, mark.Sym, plural.Sym)
	cost += s.channel.Emit(plural, mark.Sym, plural, channel.Edge) + s.channel.Stop(plural.Sym)
	before := channel.Edge
	for i, c := range letters {
		next := mark.Sym
		if i+1 < len(letters) {
			next = letters[i+1].Sym
		}
		cost += s.channel.Emit(c, before, c, next)
		before = c.Sym
	}
	return cost
}
