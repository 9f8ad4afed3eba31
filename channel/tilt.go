package channel

import "slices"

// tilted gives the model with the factors of a's families in it. What the edits of
// a place gain, keeping its letter loses.
func (t *tables) tilted(a *adapter) *draft {
	d := *t.draft
	d.keep, d.doubt = slices.Clone(t.keep), slices.Clone(t.doubt)
	d.drop, d.insert, d.swap = a.drop.tilted(), a.insert.tilted(), a.swap.tilted()
	d.subLeft, d.subNext = slices.Clone(t.subLeft), slices.Clone(t.subNext)
	d.prices = a.prices
	kind, letters, left, next := a.sub.levels[0], a.sub.levels[1], a.sub.levels[2], a.sub.levels[3]
	for i := range cube {
		x, l, c := i/square, i/symbols%symbols, i%symbols
		d.subLeft[i] *= kind.factor[0] * letters.factor[x*symbols+c] * left.factor[(x*symbols+l)*symbols+c]
		d.subNext[i] *= next.factor[i]
	}
	d.rules = nil
	for i, p := range a.rewritings.tilted() {
		rule := a.keys[i].rule()
		rule.Cost = float32(nats(p))
		d.rules = append(d.rules, rule)
	}
	added := t.closeSlots(&d)
	rewritten := a.rewrittenMore()
	for c := Symbol(1); c < symbols; c++ {
		for r := Symbol(0); r < symbols; r++ {
			for l := Symbol(0); l < symbols; l++ {
				t.settle(&d, a.sub, at3(l, c, r), added[at2(l, c)]+rewritten[at2(c, r)])
			}
		}
	}
	return &d
}

// closeSlots bounds what is inserted between two letters and returns how much
// more it is than before. At the end of a word, adding nothing is the loser.
func (t *tables) closeSlots(d *draft) (added []float64) {
	added = make([]float64, square)
	for at := range added {
		var before, after float64
		for x := 1; x < symbols; x++ {
			before += t.insert[x*square+at]
			after += d.insert[x*square+at]
		}
		if most := max(before, mostlyWrong); after > most {
			for x := 1; x < symbols; x++ {
				d.insert[x*square+at] *= most / after
			}
			after = most
		}
		added[at] = after - before
	}
	d.stop = slices.Clone(t.stop)
	for l := Symbol(0); l < symbols; l++ {
		d.stop[at2(l, Edge)] = max(1-mostlyWrong, t.stop[at2(l, Edge)]-added[at2(l, Edge)])
	}
	return added
}

// rewrittenMore estimates, by the letter that a rule begins at and the next one, how
// much likelier than before any rule is.
func (a *adapter) rewrittenMore() []float64 {
	more, visits := make([]float64, square), a.swap.chances
	var began [symbols]float64
	for at, v := range visits {
		began[at/symbols] += v
	}
	f := a.rewritings
	for i, key := range a.keys {
		gain := f.chances[i] * f.base[i] * (f.tilt[i] - 1)
		if a.fresh[i] {
			gain = f.chances[i] * f.base[i] * f.tilt[i]
		}
		c, r := key.intended[0], key.intended[1]
		switch {
		case gain == 0:
		case r != Edge && visits[at2(c, r)] > 0:
			more[at2(c, r)] += gain / visits[at2(c, r)]
		case r == Edge && began[c] > 0:
			for r := range Symbol(symbols) {
				more[at2(c, r)] += gain / began[c]
			}
		}
	}
	return more
}

// settle divides what a place had among keeping, dropping, replacing and swapping
// anew, lost aside, which went elsewhere.
func (t *tables) settle(d *draft, sub *family, at int, lost float64) {
	c, r := at/symbols%symbols, at%symbols
	var replaced, was float64
	for x := symbols - 1; x > 0; x-- {
		was += t.emit[x*cube+at]
		replaced += t.emit[x*cube+at] * sub.tilt[x*cube+at]
	}
	swapped := d.swap[c*symbols+r]
	had := t.keep[at] + t.drop[at] + was + t.swap[c*symbols+r]
	if replaced+d.drop[at]+swapped+lost == was+t.drop[at]+t.swap[c*symbols+r] {
		return // as it was
	}
	left := had - lost - swapped
	wrong := replaced + d.drop[at]
	scale := 1.0
	if wrong > left-leastKept {
		scale = max(0, left-leastKept) / wrong
	}
	d.drop[at] *= scale
	d.doubt[at] *= max(scale, 1e-9)
	d.keep[at] = max(leastKept, left-wrong*scale)
}
