package channel

import "math"

// counts are (expected) numbers of events, by place in the intended word.
type counts struct {
	emit      []float64 // [x][l][c][r]: c between l and r typed as x; x = Edge: left out; x = c: kept
	swap      []float64 // [c][r]
	insert    []float64 // [x][l][r]
	rewritten []float64 // [c][r]: rules that began at c before r
	visits    []float64 // [l][c][r]: letters reached, whatever became of them
	slots     []float64 // [l][r]: places where a letter could be inserted
	rules     map[ruleKey]float64
}

func newCounts() *counts {
	return &counts{
		emit:      make([]float64, symbols*cube),
		swap:      make([]float64, square),
		insert:    make([]float64, cube),
		rewritten: make([]float64, square),
		visits:    make([]float64, cube),
		slots:     make([]float64, square),
		rules:     map[ruleKey]float64{},
	}
}

// estimates are the probabilities that follow from counts. What is left over at
// a place is the probability of keeping its letter.
type estimates struct {
	emit      []float64 // as counts, without the kept letters
	swap      []float64
	insert    []float64
	rewritten []float64 // [c][r]: all rules together, on average over the words
	doubt     []float64 // [l][c][r]: replacements at this place over what the two factors give
	subLeft   []float64 // [x][l][c]
	subNext   []float64 // [x][c][r], relative to no neighbour
}

// Smoothing strengths: how many events a less specific estimate is worth.
const (
	trustNone = 20 // no neighbour, against all edits alike
	trustSide = 25 // one neighbour, against none
	trustBoth = 25 // two neighbours, against one on each side

	rarest      = 2e-5 // probability of an edit before anything is known
	mostlyWrong = 0.9  // no edit is likelier than this anywhere
)

func newEstimates() *estimates {
	return &estimates{
		emit:      make([]float64, symbols*cube),
		swap:      make([]float64, square),
		insert:    make([]float64, cube),
		rewritten: make([]float64, square),
		doubt:     make([]float64, cube),
		subLeft:   make([]float64, cube),
		subNext:   make([]float64, cube),
	}
}

// smooth estimates probabilities from counts by interpolation: two neighbours,
// one neighbour on either side, none, and at last all edits alike.
func smooth(n *counts) *estimates {
	e := newEstimates()
	visits := sidesOf(func(l, c, r Symbol) float64 { return n.visits[at3(l, c, r)] })
	for c := Symbol(1); c < symbols; c++ {
		for x := Symbol(0); x < symbols; x++ {
			if x != c {
				e.smoothEmit(x, c, n, &visits[c])
			}
		}
		e.smoothSwap(c, n, &visits[c])
		e.shareOfRules(c, n, &visits[c])
	}
	e.weighReplacements()
	slots := sideOf(func(l, r Symbol) float64 { return n.slots[at2(l, r)] })
	for x := Symbol(1); x < symbols; x++ {
		e.smoothInsert(x, n, &slots)
	}
	return e
}

// side holds a table over both neighbours summed over each of them.
type side struct {
	all        float64
	left, next [symbols]float64
}

func sideOf(value func(l, r Symbol) float64) side {
	var s side
	for l := Symbol(0); l < symbols; l++ {
		for r := Symbol(0); r < symbols; r++ {
			v := value(l, r)
			s.all += v
			s.left[l] += v
			s.next[r] += v
		}
	}
	return s
}

func sidesOf(value func(l, c, r Symbol) float64) *[symbols]side {
	var sides [symbols]side
	for c := range sides {
		sides[c] = sideOf(func(l, r Symbol) float64 { return value(l, Symbol(c), r) })
	}
	return &sides
}

func interpolate(count, visits, trust, lower float64) float64 {
	return (count + trust*lower) / (visits + trust)
}

// rate estimates an event without neighbours and with one on either side.
func rate(events, visits *side) side {
	r := side{all: interpolate(events.all, visits.all, trustNone, rarest)}
	for s := range r.left {
		r.left[s] = interpolate(events.left[s], visits.left[s], trustSide, r.all)
		r.next[s] = interpolate(events.next[s], visits.next[s], trustSide, r.all)
	}
	return r
}

// product estimates an event between two neighbours as if they acted independently.
func (s *side) product(l, r Symbol) float64 {
	return math.Min(mostlyWrong, s.left[l]*s.next[r]/s.all)
}

// smoothEmit estimates c typed as x for all neighbours.
func (e *estimates) smoothEmit(x, c Symbol, n *counts, visits *side) {
	table := n.emit[int(x)*cube : (int(x)+1)*cube]
	events := sideOf(func(l, r Symbol) float64 { return table[at3(l, c, r)] })
	p := rate(&events, visits)
	for l := Symbol(0); l < symbols; l++ {
		for r := Symbol(0); r < symbols; r++ {
			at := at3(l, c, r)
			e.emit[int(x)*cube+at] = interpolate(table[at], n.visits[at], trustBoth, p.product(l, r))
		}
	}
	for s := Symbol(0); s < symbols && x != Edge; s++ {
		e.subLeft[at3(x, s, c)] = p.left[s]
		e.subNext[at3(x, c, s)] = p.next[s] / p.all
	}
}

// smoothSwap estimates c and the next letter changing places, for every next letter.
func (e *estimates) smoothSwap(c Symbol, n *counts, visits *side) {
	var events float64
	for r := Symbol(1); r < symbols; r++ {
		events += n.swap[at2(c, r)]
	}
	all := interpolate(events, visits.all, trustNone, rarest)
	for r := Symbol(1); r < symbols; r++ {
		if r != c {
			e.swap[at2(c, r)] = interpolate(n.swap[at2(c, r)], visits.next[r], trustSide, all)
		}
	}
}

// shareOfRules estimates how often c and the next letter begin a rewriting.
func (e *estimates) shareOfRules(c Symbol, n *counts, visits *side) {
	var all float64
	for r := Symbol(0); r < symbols; r++ {
		all += n.rewritten[at2(c, r)]
	}
	for r := Symbol(0); r < symbols; r++ {
		e.rewritten[at2(c, r)] = interpolate(n.rewritten[at2(c, r)], visits.next[r], trustSide, all/(visits.all+trustNone))
	}
}

// weighReplacements compares, place by place, the replacements estimated with
// both neighbours to the product of the factors that will stand for them.
func (e *estimates) weighReplacements() {
	for l := Symbol(0); l < symbols; l++ {
		for c := Symbol(1); c < symbols; c++ {
			for r := Symbol(0); r < symbols; r++ {
				var direct, product float64
				for x := Symbol(1); x < symbols; x++ {
					if x != c {
						direct += e.emit[int(x)*cube+at3(l, c, r)]
						product += e.subLeft[at3(x, l, c)] * e.subNext[at3(x, c, r)]
					}
				}
				e.doubt[at3(l, c, r)] = direct / product
			}
		}
	}
}

// smoothInsert estimates x added, for all neighbours.
func (e *estimates) smoothInsert(x Symbol, n *counts, slots *side) {
	events := sideOf(func(l, r Symbol) float64 { return n.insert[at3(x, l, r)] })
	p := rate(&events, slots)
	for l := Symbol(0); l < symbols; l++ {
		for r := Symbol(0); r < symbols; r++ {
			at := at3(x, l, r)
			e.insert[at] = interpolate(n.insert[at], n.slots[at2(l, r)], trustBoth, p.product(l, r))
		}
	}
}
