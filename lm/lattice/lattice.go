// Package lattice weighs competing readings of a sentence under a language
// model.
//
// A lattice has nodes 0..last, the positions between tokens. An edge from one
// node to a later one carries the words of one reading of the tokens between
// them (none to [MaxWords]), a score in nats that is added beside the language
// model's, and a tag of the caller's. The end of the sentence is an edge like
// any other, usually of the one word </s>.
//
// [Lattice.Run] expands the nodes by language-model state, so that each edge
// is priced in every context it can follow, and sums over all paths by the
// forward-backward algorithm (Rabiner 1989). It then answers with
// the posterior probability of each edge, the best path (Viterbi 1967), the N
// best, and the total mass. Without a beam all of these are exact.
package lattice

import (
	"errors"
	"fmt"
	"hash/maphash"
	"math"
)

// MaxWords is the greatest number of words on an edge: a possessive has two, a
// run-on correction two or three.
const MaxWords = 4

var (
	// ErrEdge reports an edge that does not fit the lattice.
	ErrEdge = errors.New("lattice: bad edge")
	// ErrScore reports that the language model answered with NaN or +Inf.
	ErrScore = errors.New("lattice: language model score is not a log probability")
	// ErrNoPath reports that no path of positive probability joins the first
	// node to the last.
	ErrNoPath = errors.New("lattice: no path from the first node to the last")
)

// A Scorer is a language model with states of type S. Advance returns the log
// probability of a word after the state s, in nats, and writes the state that
// follows to next, which is never s. The answer must depend on nothing else.
type Scorer[S comparable] interface {
	Advance(s *S, word uint32, next *S) (logp float32)
}

// An Edge is one reading of the tokens between two nodes, From < To.
type Edge struct {
	From, To int
	Words    []uint32 // at most MaxWords; none when the reading deletes its tokens
	Score    float64  // log weight beside the language model, nats; -Inf forbids the edge
	Tag      int32    // the caller's own
}

// Options bound the expansion. The zero value bounds nothing and is exact.
type Options struct {
	// States is the most language-model states kept at a node, those of the
	// greatest forward mass; 0 keeps all.
	States int
	// Margin drops states whose forward mass is more than this many nats below
	// the node's best; 0 drops none.
	Margin float64
}

// A Lattice holds the edges of one sentence and, after [Lattice.Run], their
// weights. It keeps its arrays from sentence to sentence, so that no memory is
// allocated once they have grown; one goroutine may use it at a time.
type Lattice[S comparable] struct {
	options Options
	last    int
	edges   []edge
	words   []uint32
	bad     error // the first edge refused since Reset
	order   []int32
	counts  []int32
	scratch [2]S

	hyps   []hyp[S] // grouped by node
	first  []int32  // hyps[first[n]:first[n+1]] are node n's
	arcs   []arc    // grouped by the node they enter
	table  []int32
	seed   maphash.Seed
	masses []float64
	moved  []int32

	posterior []float64
	total     float64
	path      []int
	nbest     nbest
}

// edge is an Edge with its words in the lattice's own array.
type edge struct {
	from, to int32
	lo, hi   int32 // words[lo:hi]
	score    float64
	tag      int32
}

// New returns an empty lattice for language-model states of type S.
func New[S comparable](options Options) *Lattice[S] {
	return &Lattice[S]{options: options, seed: maphash.MakeSeed(), total: math.Inf(-1)}
}

// Reset empties the lattice and gives it nodes 0..last.
func (l *Lattice[S]) Reset(last int) {
	l.last = max(last, 0)
	l.edges = l.edges[:0]
	l.words = l.words[:0]
	l.bad = nil
	l.clear()
}

// Add appends an edge and returns its index, which counts from 0 after each
// Reset. The words are copied. Edges are best added in the order of the nodes
// they leave: then all words tried in one context are scored together. An edge
// that does not fit takes its place in the count and makes Run fail with
// [ErrEdge].
func (l *Lattice[S]) Add(e Edge) int {
	if err := l.check(e); err != nil {
		if l.bad == nil {
			l.bad = err
		}
		e = Edge{Tag: e.Tag}
	}
	lo := len(l.words)
	l.words = append(l.words, e.Words...)
	l.edges = append(l.edges, edge{int32(e.From), int32(e.To), int32(lo), int32(len(l.words)), e.Score, e.Tag})
	return len(l.edges) - 1
}

func (l *Lattice[S]) check(e Edge) error {
	switch {
	case e.From < 0 || e.From >= e.To || e.To > l.last:
		return fmt.Errorf("%w %d: from node %d to %d in a lattice of nodes 0 to %d", ErrEdge, len(l.edges), e.From, e.To, l.last)
	case len(e.Words) > MaxWords:
		return fmt.Errorf("%w %d: %d words, at most %d", ErrEdge, len(l.edges), len(e.Words), MaxWords)
	case math.IsNaN(e.Score) || math.IsInf(e.Score, 1):
		return fmt.Errorf("%w %d: score %v", ErrEdge, len(l.edges), e.Score)
	}
	return nil
}

// Len returns the number of edges.
func (l *Lattice[S]) Len() int { return len(l.edges) }

// Edge returns edge i. Its words belong to the lattice and hold until Reset.
func (l *Lattice[S]) Edge(i int) Edge {
	e := &l.edges[i]
	return Edge{int(e.from), int(e.to), l.words[e.lo:e.hi:e.hi], e.score, e.tag}
}

// Run prices the lattice: the first node has the state start, and the language
// model's log probabilities are multiplied by weight. On an error the lattice
// has no mass, no paths, and posteriors of zero.
func (l *Lattice[S]) Run(model Scorer[S], start S, weight float64) error {
	l.clear()
	if l.bad != nil {
		return l.bad
	}
	l.sort()
	if err := l.forward(model, start, weight); err != nil {
		l.clear()
		return err
	}
	l.backward()
	return nil
}

// clear forgets the results of the last Run.
func (l *Lattice[S]) clear() {
	l.hyps = l.hyps[:0]
	l.arcs = l.arcs[:0]
	l.posterior = l.posterior[:0]
	l.total = math.Inf(-1)
	l.nbest.ready = false
}
