package channel

// likelihoods holds what the expectation step needs: the probability of every
// step, and the rules by their observed side.
type likelihoods struct {
	d     *draft
	emit  []float64
	rules map[[maxSide]Symbol][]weighted
}

type weighted struct {
	key ruleKey
	Rule
	p float64
}

func newLikelihoods(d *draft, e *estimates) *likelihoods {
	like := &likelihoods{d: d, emit: e.emit, rules: map[[maxSide]Symbol][]weighted{}}
	for _, r := range d.rules {
		key := ruleKey{r.Intended, r.Observed, r.Place}
		like.rules[r.Observed] = append(like.rules[r.Observed], weighted{key, r, probability(r.Cost)})
	}
	return like
}

// lattice is the table of alignments of one pair.
type lattice struct {
	*likelihoods
	observed, intended []Letter
	forward, backward  []float64
	rulesAt            [][]weighted
}

// reset prepares the lattice for a pair and runs forward and backward.
// It gives the probability of the observed word, summed over alignments.
func (t *lattice) reset(p Pair) float64 {
	t.observed = AppendLetters(t.observed[:0], []byte(p.Observed))
	t.intended = AppendLetters(t.intended[:0], []byte(p.Intended))
	t.rulesAt = t.rulesAt[:0]
	for i := range len(t.observed) + 1 {
		t.rulesAt = append(t.rulesAt, t.rulesFor(t.observed[i:]))
	}
	cells := (len(t.intended) + 1) * (len(t.observed) + 1)
	t.forward = append(t.forward[:0], make([]float64, cells)...)
	t.backward = append(t.backward[:0], make([]float64, cells)...)
	end := t.d.stop[at2(t.sym(len(t.intended)-1), Edge)]
	t.forward[0] = 1
	t.backward[cells-1] = end
	t.sweep(func(from, to int, p float64, _ *event) { t.forward[to] += t.forward[from] * p })
	t.sweepBack()
	return t.forward[cells-1] * end
}

func (like *likelihoods) rulesFor(observed []Letter) []weighted {
	var found []weighted
	var side [maxSide]Symbol
	for n := 0; n <= maxSide && n <= len(observed); n++ {
		if n > 0 {
			side[n-1] = observed[n-1].Sym
		}
		found = append(found, like.rules[side]...)
	}
	return found
}

func (t *lattice) sym(p int) Symbol {
	if p < 0 || p >= len(t.intended) {
		return Edge
	}
	return t.intended[p].Sym
}

// event names one step, for counting.
type event struct {
	kind    Kind
	x       Symbol // what was typed
	l, c, r Symbol
	rule    ruleKey
}

// sweep visits every step of the lattice in an order that suits the forward pass.
func (t *lattice) sweep(visit func(from, to int, p float64, e *event)) {
	for p := 0; p <= len(t.intended); p++ {
		for i := 0; i <= len(t.observed); i++ {
			t.steps(p, i, visit)
		}
	}
}

func (t *lattice) sweepBack() {
	for p := len(t.intended); p >= 0; p-- {
		for i := len(t.observed); i >= 0; i-- {
			t.steps(p, i, func(from, to int, p float64, _ *event) { t.backward[from] += p * t.backward[to] })
		}
	}
}

// steps visits the steps that leave one cell.
func (t *lattice) steps(p, i int, visit func(from, to int, p float64, e *event)) {
	width := len(t.observed) + 1
	from := p*width + i
	e := event{l: t.sym(p - 1), c: t.sym(p), r: t.sym(p + 1)}
	place := at3(e.l, e.c, e.r)
	left := len(t.observed) - i
	if left > 0 {
		e.x, e.kind = t.observed[i].Sym, Inserted
		visit(from, from+1, t.d.insert[at3(e.x, e.l, e.c)], &e)
	}
	if p == len(t.intended) {
		return
	}
	stop := t.d.stop[at2(e.l, e.c)]
	if left > 0 && e.x == e.c {
		e.kind = Kept
		visit(from, from+width+1, t.d.keep[place], &e)
	} else if left > 0 {
		e.kind = Replaced
		visit(from, from+width+1, t.emit[int(e.x)*cube+place]*stop, &e)
	}
	if left > 1 && e.r != Edge && e.c != e.r && e.x == e.r && t.observed[i+1].Sym == e.c {
		e.kind = Swapped
		visit(from, from+2*width+2, t.d.swap[at2(e.c, e.r)], &e)
	}
	e.x, e.kind = Edge, Dropped
	visit(from, from+width, t.d.drop[place], &e)
	for k := range t.rulesAt[i] {
		if r := &t.rulesAt[i][k]; t.holds(&r.Rule, p) {
			e.kind, e.rule = Rewritten, r.key
			visit(from, from+int(r.NIntended)*width+int(r.NObserved), r.p, &e)
		}
	}
}

func (t *lattice) holds(rule *Rule, p int) bool {
	n := int(rule.NIntended)
	if p+n > len(t.intended) || !rule.Fits(t.sym(p-1), t.sym(p+n)) {
		return false
	}
	for j := range n {
		if t.intended[p+j].Sym != rule.Intended[j] {
			return false
		}
	}
	return true
}

// count adds the expected events of the pair, whose probability is total.
func (n *counts) count(t *lattice, total, weight float64) {
	t.sweep(func(from, to int, p float64, e *event) {
		share := t.forward[from] * p * t.backward[to] / total * weight
		if share > 0 {
			n.add(e, share)
		}
	})
	n.slots[at2(t.sym(len(t.intended)-1), Edge)] += weight
}

func (n *counts) add(e *event, share float64) {
	if e.kind == Inserted {
		n.insert[at3(e.x, e.l, e.c)] += share
		return
	}
	n.visits[at3(e.l, e.c, e.r)] += share
	n.slots[at2(e.l, e.c)] += share
	switch e.kind {
	case Swapped:
		n.swap[at2(e.c, e.r)] += share
	case Rewritten:
		n.rules[e.rule] += share
		n.rewritten[at2(e.c, e.r)] += share
	default:
		n.emit[int(e.x)*cube+at3(e.l, e.c, e.r)] += share
	}
}
