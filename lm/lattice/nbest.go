package lattice

import "math"

// A Path is one way through the lattice.
type Path struct {
	Score float64 // log weight, nats; less Mass it is the log posterior
	Edges []int   // in order
}

// nbest is the working memory of NBest.
type nbest struct {
	ready    bool    // incoming and starts describe the last Run
	starts   []int32 // incoming[starts[h]:starts[h+1]] are the arcs into hyp h
	incoming []int32
	tails    []tail
	heap     []int32 // of tails, the greatest bound first
	edges    []int
	paths    []Path
}

// tail is the end of a path: everything after a hyp.
type tail struct {
	hyp   int32
	edge  int32   // the first edge of the tail
	next  int32   // the tail after that edge, -1 at the end
	after float64 // weight of the tail
	bound float64 // after plus the best way to the hyp: exact for the best completion
}

// NBest returns the k best paths, best first, fewer when there are not so
// many. It searches best first from the end, with the Viterbi scores as exact
// completion costs (Nilsson 1971), so that the next path taken is always the
// next best. The paths hold until the next call of NBest.
func (l *Lattice[S]) NBest(k int) []Path {
	b := &l.nbest
	b.paths, b.edges, b.tails, b.heap = b.paths[:0], b.edges[:0], b.tails[:0], b.heap[:0]
	if math.IsInf(l.total, -1) {
		return b.paths
	}
	l.index()
	for h := l.first[l.last]; h < int32(len(l.hyps)); h++ {
		b.push(tail{hyp: h, edge: -1, next: -1, bound: l.hyps[h].best})
	}
	for len(b.heap) > 0 && len(b.paths) < k {
		i := b.pop()
		t := b.tails[i]
		if t.hyp == 0 {
			b.emit(i)
			continue
		}
		for _, in := range b.incoming[b.starts[t.hyp]:b.starts[t.hyp+1]] {
			a := &l.arcs[in]
			after := t.after + a.weight
			b.push(tail{hyp: a.from, edge: a.edge, next: i, after: after, bound: l.hyps[a.from].best + after})
		}
	}
	return b.paths
}

// index groups the arcs by the hyp they enter.
func (l *Lattice[S]) index() {
	b := &l.nbest
	if b.ready {
		return
	}
	b.starts = resize(b.starts, len(l.hyps)+2)
	clear(b.starts)
	for i := range l.arcs {
		b.starts[l.arcs[i].to+2]++
	}
	for h := range len(l.hyps) {
		b.starts[h+2] += b.starts[h+1]
	}
	b.incoming = resize(b.incoming, len(l.arcs))
	for i := range l.arcs {
		to := l.arcs[i].to
		b.incoming[b.starts[to+1]] = int32(i)
		b.starts[to+1]++
	}
	b.ready = true
}

// emit turns a whole path, a tail that begins at the start, into a Path.
func (b *nbest) emit(i int32) {
	lo, score := len(b.edges), b.tails[i].after
	for ; b.tails[i].next >= 0; i = b.tails[i].next {
		b.edges = append(b.edges, int(b.tails[i].edge))
	}
	b.paths = append(b.paths, Path{score, b.edges[lo:len(b.edges):len(b.edges)]})
}

// push adds a tail to the heap.
func (b *nbest) push(t tail) {
	b.tails = append(b.tails, t)
	b.heap = append(b.heap, int32(len(b.tails)-1))
	for i := len(b.heap) - 1; i > 0; {
		parent := (i - 1) / 2
		if !b.before(i, parent) {
			break
		}
		b.heap[i], b.heap[parent] = b.heap[parent], b.heap[i]
		i = parent
	}
}

// pop takes the tail of the greatest bound.
func (b *nbest) pop() int32 {
	top, end := b.heap[0], len(b.heap)-1
	b.heap[0] = b.heap[end]
	b.heap = b.heap[:end]
	for i := 0; ; {
		child := 2*i + 1
		if child >= end {
			break
		}
		if child+1 < end && b.before(child+1, child) {
			child++
		}
		if !b.before(child, i) {
			break
		}
		b.heap[i], b.heap[child] = b.heap[child], b.heap[i]
		i = child
	}
	return top
}

// before orders the heap: greater bounds first; of equals the newer tail,
// which is the longer, so that one path is finished before its equals.
func (b *nbest) before(i, j int) bool {
	x, y := b.heap[i], b.heap[j]
	if b.tails[x].bound != b.tails[y].bound {
		return b.tails[x].bound > b.tails[y].bound
	}
	return x > y
}
