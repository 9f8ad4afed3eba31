package channel

// Cost is the cost in nats of the best way to come from the intended word to
// the observed one, both in normal form. It takes time in proportion to the
// product of their lengths.
func (m *Model) Cost(observed, intended string) float64 {
	var a Aligner
	return a.Cost(m, observed, intended)
}

// Aligner is room for pricing many pairs without allocation. Its zero value is
// ready; it serves one goroutine at a time.
type Aligner struct {
	observed []Letter
	intended []Letter
	rules    []Rule
	ruleEnd  []int // rules[ruleEnd[i-1]:ruleEnd[i]] match at observed[i:]
	cost     []float32
	from     []move
	text     []byte
}

// move is one step of an alignment, kept to find the way back.
type move struct {
	kind               Kind
	nIntended, nTyped  uint8
	cost               float32
	previous, position int32
}

// Cost is Model.Cost.
func (a *Aligner) Cost(m *Model, observed, intended string) float64 {
	a.text = append(a.text[:0], observed...)
	a.observed = AppendLetters(a.observed[:0], a.text)
	a.text = append(a.text[:0], intended...)
	a.intended = AppendLetters(a.intended[:0], a.text)
	a.match(m)
	return float64(a.align(m, false))
}

// match finds the rules that fit the observed word, place by place.
func (a *Aligner) match(m *Model) {
	a.rules, a.ruleEnd = a.rules[:0], a.ruleEnd[:0]
	for i := 0; i <= len(a.observed); i++ {
		a.rules = m.AppendRules(a.rules, a.observed[i:])
		a.ruleEnd = append(a.ruleEnd, len(a.rules))
	}
}

func (a *Aligner) rulesAt(i int) []Rule {
	if i == 0 {
		return a.rules[:a.ruleEnd[0]]
	}
	return a.rules[a.ruleEnd[i-1]:a.ruleEnd[i]]
}

// sym is the class of the intended letter at p, counted from 0; the edge
// beyond either end.
func (a *Aligner) sym(p int) Symbol {
	if p < 0 || p >= len(a.intended) {
		return Edge
	}
	return a.intended[p].Sym
}

// align fills the table cost[p][i]: the first p intended letters gave the first
// i observed ones, and letters may still be inserted before intended letter p.
func (a *Aligner) align(m *Model, trace bool) float32 {
	n, t := len(a.intended), len(a.observed)
	width := t + 1
	a.cost = a.cost[:0]
	a.from = a.from[:0]
	for range (n + 1) * width {
		a.cost = append(a.cost, impossible)
		if trace {
			a.from = append(a.from, move{})
		}
	}
	a.cost[0] = 0
	for p := 0; p <= n; p++ {
		for i := 0; i <= t; i++ {
			if a.cost[p*width+i] < impossible {
				a.leave(m, p, i, trace)
			}
		}
	}
	return a.cost[n*width+t] + m.Stop(a.sym(n-1))
}

// leave tries every step from one cell.
func (a *Aligner) leave(m *Model, p, i int, trace bool) {
	l, c, r := a.sym(p-1), a.sym(p), a.sym(p+1)
	left := len(a.observed) - i
	if left > 0 {
		a.reach(p, i, Inserted, 0, 1, m.Insert(a.observed[i].Sym, l, c), trace)
	}
	if p == len(a.intended) {
		return
	}
	a.reach(p, i, Dropped, 1, 0, m.Drop(l, c, r), trace)
	if left > 0 {
		kind := Kept
		if a.observed[i].Rune != a.intended[p].Rune {
			kind = Replaced
		}
		a.reach(p, i, kind, 1, 1, m.Emit(a.observed[i], l, a.intended[p], r), trace)
	}
	if left > 1 && p+1 < len(a.intended) && c != r &&
		a.observed[i] == a.intended[p+1] && a.observed[i+1] == a.intended[p] {
		a.reach(p, i, Swapped, 2, 2, m.Swap(c, r), trace)
	}
	for k := range a.rulesAt(i) {
		rule := &a.rulesAt(i)[k]
		if a.holds(rule, p) {
			a.reach(p, i, Rewritten, int(rule.NIntended), int(rule.NObserved), rule.Cost, trace)
		}
	}
}

// holds reports whether the intended word has the left side of a rule at p.
func (a *Aligner) holds(rule *Rule, p int) bool {
	n := int(rule.NIntended)
	if p+n > len(a.intended) || !rule.Fits(a.sym(p-1), a.sym(p+n)) {
		return false
	}
	for j := range n {
		if a.intended[p+j].Sym != rule.Intended[j] {
			return false
		}
	}
	return true
}

func (a *Aligner) reach(p, i int, kind Kind, nIntended, nTyped int, cost float32, trace bool) {
	width := len(a.observed) + 1
	here, there := p*width+i, (p+nIntended)*width+i+nTyped
	if total := a.cost[here] + cost; total < a.cost[there] {
		a.cost[there] = total
		if trace {
			a.from[there] = move{kind, uint8(nIntended), uint8(nTyped), cost, int32(here), int32(p)}
		}
	}
}
