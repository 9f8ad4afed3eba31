package lattice

import (
	"math"
	"slices"
)

// backward sums from the last node back and turns the masses into posteriors.
// Arcs are in order of the node they enter, so that going through them in
// reverse meets every hyp after all arcs that leave it.
func (l *Lattice[S]) backward() {
	l.posterior = resize(l.posterior, len(l.edges))
	clear(l.posterior)
	var total logSum
	total.max = math.Inf(-1)
	for h := int(l.first[l.last]); h < len(l.hyps); h++ {
		total.add(l.hyps[h].alpha)
	}
	l.total = total.value()
	for h := range l.hyps {
		l.hyps[h].sum = logSum{max: math.Inf(-1)}
	}
	end := len(l.arcs)
	for node := l.last; node > 0; node-- {
		for h := l.first[node]; h < l.first[node+1]; h++ {
			if node == l.last {
				l.hyps[h].beta = 0
			} else {
				l.hyps[h].beta = l.hyps[h].sum.value()
			}
		}
		for end > 0 && l.arcs[end-1].to >= l.first[node] {
			end--
			a := &l.arcs[end]
			if math.IsInf(l.hyps[a.to].beta, -1) {
				continue // a dead end
			}
			from, out := &l.hyps[a.from], a.weight+l.hyps[a.to].beta
			from.sum.add(out)
			l.posterior[a.edge] += share(from.alpha + out - l.total)
		}
	}
}

// share is exp(x), without its cost where there is one way only and x is nought
// but for rounding: there 1+x differs from it by less than a float64 can show.
func share(x float64) float64 {
	if math.Abs(x) < 1e-9 {
		return 1 + x
	}
	return math.Exp(x)
}

// Mass returns the log of the sum over all paths, nats; -Inf before a
// successful Run.
func (l *Lattice[S]) Mass() float64 { return l.total }

// Posterior returns the probability of edge i given the lattice: the share of
// the mass whose paths use it. The posteriors of the edges over any place
// between two nodes add up to one.
func (l *Lattice[S]) Posterior(i int) float64 {
	if i >= len(l.posterior) {
		return 0
	}
	return min(l.posterior[i], 1)
}

// Best returns the edges of the best path, in order, and nothing before a
// successful Run. The slice holds until the next call of Best.
func (l *Lattice[S]) Best() []int {
	l.path = l.path[:0]
	if math.IsInf(l.total, -1) {
		return l.path
	}
	best := l.first[l.last]
	for h := best; h < int32(len(l.hyps)); h++ {
		if l.hyps[h].best > l.hyps[best].best {
			best = h
		}
	}
	for a := l.hyps[best].back; a >= 0; a = l.hyps[l.arcs[a].from].back {
		l.path = append(l.path, int(l.arcs[a].edge))
	}
	slices.Reverse(l.path)
	return l.path
}
