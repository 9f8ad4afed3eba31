package candidates

import (
	"slices"
	"unicode/utf8"

	"example.org/foulcase/candidates/lexicon"
	"example.org/foulcase/channel"
)

// path is one beginning of a word in reading order: the letters from a root to
// here. The last of them is not yet explained by observed letters. Below the
// letters of a whole word there is a path that stands for its end.
type path struct {
	node   lexicon.Node   // zero at the end of a word
	base   uint32         // number of the first word below; of the word itself at an end
	letter channel.Letter // the last letter; its Sym is Edge at the end of a word
	before channel.Symbol // the letter read before
	tree   uint8          // index of the tree
}

// tree is one lexicon in one reading order.
type tree struct {
	lex    *lexicon.Lexicon
	mirror *Mirror // nil when read forwards
	words  uint32  // of the lexicon that ids count in
	house  bool
	read   *reading
	halved bool // searched only for words whose half read first is the cheaper
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

// root is the path of no letters.
func (s *Searcher) root(tree int) path {
	return path{node: s.trees[tree].lex.Root(), tree: uint8(tree)}
}

// end gives the path that stands for the end of the word that p spells, if it
// is one and allowed.
func (s *Searcher) end(p *path) (path, bool) {
	lex := s.trees[p.tree].lex
	if p.letter.Sym == channel.Edge || !lex.Final(p.node) || !s.allowed(lex, p.base) {
		return path{}, false
	}
	return path{base: p.base, before: p.letter.Sym, tree: p.tree}, true
}

// child gives the path that branch i of p's node leads to, whose label is an
// ASCII letter.
func child(p *path, b *lexicon.Branches, i int) (path, bool) {
	node, skip, ok := b.Child(i)
	return path{
		node: node, base: p.base + skip, before: p.letter.Sym, tree: p.tree,
		letter: channel.LetterOf(rune(b.Labels[i])),
	}, ok
}

// appendChildren appends the children of a path that are wanted: its end, and a
// path for each next letter.
func (s *Searcher) appendChildren(dst []path, p path, wanted func(channel.Symbol) bool) []path {
	if wanted(channel.Edge) {
		if end, ok := s.end(&p); ok {
			dst = append(dst, end)
		}
	}
	b := s.trees[p.tree].lex.Branches(p.node)
	for i, label := range b.Labels {
		if label >= utf8.RuneSelf {
			long := len(dst)
			dst = s.appendLong(dst, p, &b, i)
			kept := slices.DeleteFunc(dst[long:], func(q path) bool { return !wanted(q.letter.Sym) })
			dst = dst[:long+len(kept)]
		} else if wanted(channel.LetterOf(rune(label)).Sym) {
			if c, ok := child(&p, &b, i); ok {
				dst = append(dst, c)
			}
		}
	}
	return dst
}

// appendLong appends a path for each letter of several bytes that begins with
// branch i of p's node.
func (s *Searcher) appendLong(dst []path, p path, b *lexicon.Branches, i int) []path {
	var bytes letterBytes
	if node, skip, ok := b.Child(i); ok {
		dst = bytes.follow(dst, s.trees[p.tree].lex, p, node, skip, b.Labels[i])
	}
	return dst
}

// letterBytes are the first bytes of a letter in UTF-8.
type letterBytes struct {
	bytes [utf8.UTFMax]byte
	n     int
}

// follow adds a label on the way from p to a node, and goes on until the letter
// is whole.
func (l letterBytes) follow(dst []path, lex *lexicon.Lexicon, p path, node lexicon.Node, skip uint32, label byte) []path {
	l.bytes[l.n] = label
	l.n++
	if utf8.FullRune(l.bytes[:l.n]) {
		r, _ := utf8.DecodeRune(l.bytes[:l.n])
		return append(dst, path{node: node, base: p.base + skip, before: p.letter.Sym, tree: p.tree, letter: channel.LetterOf(r)})
	}
	for e := lex.Edges(node); e.Next(); {
		dst = l.follow(dst, lex, p, e.Target, skip+e.Skip, e.Label)
	}
	return dst
}

// priorCost is the least weighted prior cost of any word below a path.
func (s *Searcher) priorCost(p *path) float32 {
	lex := s.trees[p.tree].lex
	if p.letter.Sym == channel.Edge {
		return -lex.Prior(p.base) * s.weights.Prior
	}
	return -lex.BestPrior(p.base, p.base+p.node.Words()) * s.weights.Prior
}

// allowed reports whether a word belongs to the variety asked for.
func (s *Searcher) allowed(lex *lexicon.Lexicon, number uint32) bool {
	return s.variety == 0 || lex.Entry(number).Variety&s.variety != 0
}
