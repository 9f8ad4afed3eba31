package candidates

import (
	"unicode/utf8"

	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/channel"
)

// path is one beginning of a word in reading order: the letters from a root to
// here. The last of them is not yet explained by observed letters. Below the
// letters of a whole word there is a path that stands for its end.
type path struct {
	node   lexicon.Node
	base   uint32         // number of the first word below; of the word itself at an end
	letter channel.Letter // the last letter; its Sym is Edge at the end of a word
	before channel.Symbol // the letter read before
	tree   uint8          // index of the tree
	n      uint8          // number of children
	first  int32          // index of the first child, 0 when they are not known yet
	prior  float32        // the least weighted prior cost of any word below
	query  uint32         // the query that left is of
	left   int32          // index of the latest visit
}

// visit notes with what cost a path was left at a place of the observed word.
type visit struct {
	cost  float32
	i     int32
	older int32 // index of the visit before; 0 for none
}

// tree is one lexicon in one reading order.
type tree struct {
	lex    *lexicon.Lexicon
	mirror *Mirror // nil when read forwards
	words  uint32  // of the lexicon that ids count in
	house  bool
	read   *reading
	halved bool // searched only for words whose half read first is the cheaper
	root   int32
}

// id gives the id of a word from its number in the tree; false if the lexicon
// has none, which only damaged bytes or a foreign mirror bring about.
func (t *tree) id(number uint32) (uint32, bool) {
	if int(number) >= t.lex.Len() {
		return 0, false
	}
	if t.mirror != nil {
		number = t.mirror.id(number)
	}
	return number, number < t.words
}

const (
	mostPaths    = 1 << 17 // paths remembered from one query to the next
	mostChildren = 255
)

// forget empties the trees and plants their roots.
func (s *Searcher) forget() {
	s.paths = s.paths[:0]
	for i := range s.trees {
		t := &s.trees[i]
		t.root = int32(len(s.paths))
		s.paths = append(s.paths, path{node: t.lex.Root(), tree: uint8(i)})
	}
}

// children gives the indices of the children of a path, which lie side by side.
func (s *Searcher) children(at int32) (first, end int32) {
	if s.paths[at].first == 0 {
		s.grow(at)
	}
	p := &s.paths[at]
	return p.first, p.first + int32(p.n)
}

// grow finds the children of a path: its end first, if it spells a word, then
// its letters in byte order.
func (s *Searcher) grow(at int32) {
	p := s.paths[at]
	lex := s.trees[p.tree].lex
	first := int32(len(s.paths))
	if p.letter.Sym != channel.Edge && lex.Final(p.node) && s.allowed(lex, p.base) {
		s.paths = append(s.paths, path{
			base: p.base, before: p.letter.Sym, tree: p.tree,
			prior: s.priorCost(lex.Prior(p.base)),
		})
	}
	s.growLetters(lex, &p, p.node, p.base, letterBytes{})
	s.paths[at].first = first
	s.paths[at].n = uint8(min(len(s.paths)-int(first), mostChildren))
}

// letterBytes are the first bytes of a letter in UTF-8.
type letterBytes struct {
	bytes [utf8.UTFMax]byte
	n     int
}

// growLetters adds a child for every letter below a node. A letter of several
// bytes is followed through as many edges; start holds the bytes so far.
func (s *Searcher) growLetters(lex *lexicon.Lexicon, p *path, n lexicon.Node, base uint32, start letterBytes) {
	for e := lex.Edges(n); e.Next(); {
		letter := start
		letter.bytes[letter.n] = e.Label
		letter.n++
		from := base + e.Skip
		if r, ok := letter.rune(); ok {
			s.paths = append(s.paths, path{
				node: e.Target, base: from, letter: channel.LetterOf(r), before: p.letter.Sym, tree: p.tree,
				prior: s.priorCost(lex.BestPrior(from, from+lex.Count(e.Target))),
			})
		} else {
			s.growLetters(lex, p, e.Target, from, letter)
		}
	}
}

// rune decodes the letter; false while bytes are missing.
func (l *letterBytes) rune() (rune, bool) {
	if l.bytes[0] < utf8.RuneSelf {
		return rune(l.bytes[0]), true
	}
	if !utf8.FullRune(l.bytes[:l.n]) {
		return 0, false
	}
	r, _ := utf8.DecodeRune(l.bytes[:l.n])
	return r, true
}

func (s *Searcher) priorCost(prior float32) float32 { return -prior * s.weights.Prior }

// allowed reports whether a word belongs to the variety asked for.
func (s *Searcher) allowed(lex *lexicon.Lexicon, number uint32) bool {
	return s.variety == 0 || lex.Entry(number).Variety&s.variety != 0
}

// leftCheaper reports whether the path was left at i before at no greater cost.
func (s *Searcher) leftCheaper(p *path, i int32, cost float32) bool {
	if p.query != s.query {
		return false
	}
	for v := p.left; v != 0; v = s.visits[v].older {
		if s.visits[v].i == i && s.visits[v].cost <= cost {
			return true
		}
	}
	return false
}

// note records that the path is left at i.
func (s *Searcher) note(p *path, i int32, cost float32) {
	if p.query != s.query {
		p.query, p.left = s.query, 0
	}
	s.visits = append(s.visits, visit{cost, i, p.left})
	p.left = int32(len(s.visits) - 1)
}
