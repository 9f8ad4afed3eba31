package channel

// cheapest finds the least cost of typing each symbol, by whatever single-letter
// step and wherever.
func (m *Model) cheapest() [symbols]float32 {
	var least [symbols]float32
	for x := Symbol(0); x < symbols; x++ {
		least[x] = impossible
		for c := Symbol(0); c < symbols; c++ {
			for l := Symbol(0); l < symbols; l++ {
				if x != Edge {
					least[x] = min(least[x], m.Insert(x, l, c))
				}
				for r := Symbol(0); r < symbols && c != Edge; r++ {
					least[x] = min(least[x], m.Emit(Letter{Sym: x}, l, Letter{Sym: c}, r))
				}
			}
		}
	}
	return least
}

// AppendFloors appends, for each place of an observed word from its start to
// its end, a cost that typing the rest of the word cannot undercut, whatever
// word was meant. rulesAt gives the rules that fit at each place, as
// AppendRules finds them. The floors are consistent: no step costs less than
// the difference between the floors of its two ends.
func (m *Model) AppendFloors(dst []float32, observed []Letter, rulesAt func(i int) []Rule) []float32 {
	n := len(observed)
	from := len(dst)
	for range n + 1 {
		dst = append(dst, 0)
	}
	floors := dst[from:]
	for i := n - 1; i >= 0; i-- {
		x := observed[i].Sym
		least := m.floor.at(int(x)) + floors[i+1]
		if i+1 < n {
			least = min(least, m.Swap(observed[i+1].Sym, x)+floors[i+2])
		}
		for k := range rulesAt(i) {
			if r := &rulesAt(i)[k]; r.NObserved > 0 {
				least = min(least, r.Cost+floors[i+int(r.NObserved)])
			}
		}
		floors[i] = least
	}
	return dst
}
