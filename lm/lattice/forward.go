package lattice

import (
	"hash/maphash"
	"math"
	"slices"
)

// hyp is a node in one language-model state.
type hyp[S comparable] struct {
	state S
	alpha float64 // forward mass; nats, as are beta and best
	beta  float64
	best  float64 // score of the best path from the start
	back  int32   // the last arc of that path, -1 at the start
	sum   logSum
}

// arc is an edge between two hyps.
type arc struct {
	from, to int32 // hyps
	edge     int32
	weight   float64 // edge score and weighted language model, nats
}

// logSum accumulates log(sum of exp(x)) in one pass: rest is what the terms
// other than the greatest add, relative to it. A single term costs no exp.
type logSum struct{ max, rest float64 }

func (s *logSum) add(x float64) {
	switch {
	case x <= s.max:
		s.rest += math.Exp(x - s.max)
	case s.max < -math.MaxFloat64:
		s.max = x
	default:
		s.rest = (s.rest + 1) * math.Exp(s.max-x)
		s.max = x
	}
}

func (s *logSum) value() float64 {
	if s.rest == 0 {
		return s.max
	}
	return s.max + math.Log1p(s.rest)
}

// sort orders the edges by the node they enter, by a counting sort that keeps
// the order in which they were added otherwise.
func (l *Lattice[S]) sort() {
	l.counts = resize(l.counts, l.last+2)
	clear(l.counts)
	for i := range l.edges {
		l.counts[l.edges[i].to+1]++
	}
	for n := range l.last + 1 {
		l.counts[n+1] += l.counts[n]
	}
	l.order = resize(l.order, len(l.edges))
	for i := range l.edges {
		to := l.edges[i].to
		l.order[l.counts[to]] = int32(i)
		l.counts[to]++
	}
}

// forward fills hyps and arcs, node by node.
func (l *Lattice[S]) forward(model Scorer[S], start S, weight float64) error {
	l.hyps = append(l.hyps, hyp[S]{state: start, beta: math.Inf(-1), back: -1})
	l.first = append(l.first[:0], 0, 1)
	next := 0
	for node := 1; node <= l.last; node++ {
		begin := next
		for next < len(l.order) && int(l.edges[l.order[next]].to) == node {
			next++
		}
		arcs := len(l.arcs)
		if err := l.enter(model, l.order[begin:next], weight); err != nil {
			return err
		}
		l.finish(node, arcs)
		l.first = append(l.first, int32(len(l.hyps)))
	}
	if int(l.first[l.last]) == len(l.hyps) {
		return ErrNoPath
	}
	return nil
}

// enter expands the edges into one node from every state of the nodes they
// leave. Edges that leave one node and stand together are tried together in
// each of its states, so that what the model reads for a context is read once.
func (l *Lattice[S]) enter(model Scorer[S], edges []int32, weight float64) error {
	base := int32(len(l.hyps))
	hashed := false
	for len(edges) > 0 {
		from := l.edges[edges[0]].from
		group := 1
		for group < len(edges) && l.edges[edges[group]].from == from {
			group++
		}
		for h := l.first[from]; h < l.first[from+1]; h++ {
			for _, i := range edges[:group] {
				logp, state := l.score(model, h, &l.edges[i])
				w := l.edges[i].score + weight*logp
				if math.IsNaN(w) || w > math.MaxFloat64 {
					return ErrScore
				}
				if w < -math.MaxFloat64 {
					continue
				}
				to := l.reach(state, base, &hashed)
				l.link(arc{h, to, i, w})
			}
		}
		edges = edges[group:]
	}
	return nil
}

// score reads the words of an edge from a hyp's state. The state it returns
// lies in the hyps or in scratch.
func (l *Lattice[S]) score(model Scorer[S], h int32, e *edge) (logp float64, state *S) {
	state = &l.hyps[h].state
	for k, w := range l.words[e.lo:e.hi] {
		next := &l.scratch[k&1]
		logp += float64(model.Advance(state, w, next))
		state = next
	}
	return logp, state
}

// link appends an arc and counts it in the hyp it enters.
func (l *Lattice[S]) link(a arc) {
	from, to := &l.hyps[a.from], &l.hyps[a.to]
	to.sum.add(from.alpha + a.weight)
	if best := from.best + a.weight; best > to.best {
		to.best, to.back = best, int32(len(l.arcs))
	}
	l.arcs = append(l.arcs, a)
}

// linear is the number of states of a node up to which comparing them one by
// one is quicker than hashing.
const linear = 8

// reach returns the hyp of the node that starts at base in the given state,
// adding it if it is new. *hashed tells whether the table holds the node.
func (l *Lattice[S]) reach(state *S, base int32, hashed *bool) int32 {
	if !*hashed {
		for h := base; h < int32(len(l.hyps)); h++ {
			if l.hyps[h].state == *state {
				return h
			}
		}
		if len(l.hyps)-int(base) < linear {
			return l.create(*state)
		}
		*hashed = true
		l.rehash(base, 8*linear)
	} else if 2*(len(l.hyps)-int(base)) >= len(l.table) {
		l.rehash(base, 2*len(l.table))
	}
	slot := l.probe(*state)
	if l.table[slot] < 0 {
		l.table[slot] = l.create(*state)
	}
	return l.table[slot]
}

func (l *Lattice[S]) create(state S) int32 {
	inf := math.Inf(-1)
	l.hyps = append(l.hyps, hyp[S]{state: state, beta: inf, best: inf, back: -1, sum: logSum{max: inf}})
	return int32(len(l.hyps) - 1)
}

// probe returns the slot of the open-addressing table where the state is or
// would go.
func (l *Lattice[S]) probe(state S) int {
	mask := len(l.table) - 1
	slot := int(maphash.Comparable(l.seed, state)) & mask
	for l.table[slot] >= 0 && l.hyps[l.table[slot]].state != state {
		slot = (slot + 1) & mask
	}
	return slot
}

// rehash gives the table a power of two of slots and the hyps from base on.
func (l *Lattice[S]) rehash(base int32, slots int) {
	l.table = resize(l.table, slots)
	for i := range l.table {
		l.table[i] = -1
	}
	for h := base; h < int32(len(l.hyps)); h++ {
		l.table[l.probe(l.hyps[h].state)] = h
	}
}

// finish closes a node, whose arcs begin at the given one: it sets the forward
// masses and drops the states outside the beam. The last node keeps all of its
// states, as nothing is expanded from them.
func (l *Lattice[S]) finish(node, arcs int) {
	base := int(l.first[node])
	for i := base; i < len(l.hyps); i++ {
		l.hyps[i].alpha = l.hyps[i].sum.value()
	}
	if node == l.last {
		return
	}
	if floor, ties := l.floor(l.hyps[base:]); floor > math.Inf(-1) {
		l.prune(base, arcs, floor, ties)
	}
}

// floor returns the least forward mass that stays in the beam, and how many
// states of just that mass stay (the cap may divide equals).
func (l *Lattice[S]) floor(node []hyp[S]) (floor float64, ties int) {
	floor, ties = math.Inf(-1), len(node)
	if len(node) < 2 {
		return floor, ties
	}
	if l.options.Margin > 0 {
		for i := range node {
			floor = max(floor, node[i].alpha-l.options.Margin)
		}
	}
	if most := l.options.States; most > 0 && len(node) > most {
		l.masses = l.masses[:0]
		for i := range node {
			l.masses = append(l.masses, node[i].alpha)
		}
		slices.Sort(l.masses)
		kept := l.masses[len(node)-most:]
		if kept[0] >= floor {
			floor = kept[0]
			above, _ := slices.BinarySearch(kept, math.Nextafter(floor, math.Inf(1)))
			ties = above
		}
	}
	return floor, ties
}

// prune drops the hyps from base on that lie below the floor, and the arcs
// into them, and closes the gaps in both arrays.
func (l *Lattice[S]) prune(base, arcs int, floor float64, ties int) {
	l.moved = resize(l.moved, len(l.hyps)-base)
	kept := base
	for h := base; h < len(l.hyps); h++ {
		l.moved[h-base] = -1
		alpha := l.hyps[h].alpha
		if alpha < floor || alpha == floor && ties == 0 {
			continue
		}
		if alpha == floor {
			ties--
		}
		l.moved[h-base] = int32(kept)
		l.hyps[kept] = l.hyps[h]
		kept++
	}
	l.hyps = l.hyps[:kept]
	end := arcs
	for i := arcs; i < len(l.arcs); i++ {
		a := l.arcs[i]
		a.to = l.moved[int(a.to)-base]
		if a.to < 0 {
			continue
		}
		if l.hyps[a.to].back == int32(i) {
			l.hyps[a.to].back = int32(end)
		}
		l.arcs[end] = a
		end++
	}
	l.arcs = l.arcs[:end]
}

// resize returns a slice of n elements, in the memory of s if it has room.
func resize[T any](s []T, n int) []T {
	return slices.Grow(s[:0], n)[:n]
}
