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

// Floor is a cost that typing x cannot undercut, by whatever single-letter step
// and wherever.
func (m *Model) Floor(x Symbol) float32 { return m.floor.at(int(x)) }
