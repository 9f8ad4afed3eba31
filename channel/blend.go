package channel

// total is the number of intended letters.
func (n *counts) total() float64 { return sum(n.visits) }

// wrong is the number of single-letter edits.
func (n *counts) wrong() float64 {
	w := sum(n.swap) + sum(n.insert)
	for x := range n.emit {
		w += n.emit[x]
	}
	for c := Symbol(1); c < symbols; c++ {
		kept := sideOf(func(l, r Symbol) float64 { return n.emit[int(c)*cube+at3(l, c, r)] })
		w -= kept.all
	}
	return w
}

func sum(t []float64) float64 {
	s := 0.0
	for _, v := range t {
		s += v
	}
	return s
}

// blend adds edits whose neighbours are known on one side or not at all, spread
// over the missing neighbours as the intended letters are, until they are share
// of the letters. No letters are added: the edits only shift what becomes of them.
func (n *counts) blend(edits []Edit, share float64) {
	var all float64
	for _, e := range edits {
		all += e.Count
	}
	if all == 0 {
		return
	}
	scale := share * n.total() / all
	visits := sidesOf(func(l, c, r Symbol) float64 { return n.visits[at3(l, c, r)] })
	slots := sideOf(func(l, r Symbol) float64 { return n.slots[at2(l, r)] })
	for _, e := range edits {
		n.spread(e, e.Count*scale, visits, &slots)
	}
}

// spread adds one edit, shared out over the neighbours it does not name.
func (n *counts) spread(e Edit, count float64, visits *[symbols]side, slots *side) {
	switch e.Kind {
	case Swapped:
		n.swap[at2(e.Meant, e.Typed)] += count
	case Inserted:
		for r := Symbol(0); r < symbols && slots.left[e.Left] > 0; r++ {
			n.insert[at3(e.Typed, e.Left, r)] += count * n.slots[at2(e.Left, r)] / slots.left[e.Left]
		}
	case Dropped:
		for r := Symbol(0); r < symbols && visits[e.Meant].left[e.Left] > 0; r++ {
			at := at3(e.Left, e.Meant, r)
			n.emit[at] += count * n.visits[at] / visits[e.Meant].left[e.Left]
		}
	case Replaced:
		for l := Symbol(0); l < symbols && visits[e.Meant].all > 0; l++ {
			for r := Symbol(0); r < symbols; r++ {
				at := at3(l, e.Meant, r)
				n.emit[int(e.Typed)*cube+at] += count * n.visits[at] / visits[e.Meant].all
			}
		}
	}
}
