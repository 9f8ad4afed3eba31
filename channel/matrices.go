package channel

// Matrices are published counts of single-letter slips by their left neighbour
// (Kernighan, Church & Gale 1990), with the counts of letters in the text they
// come from. Letters are numbered from 0; the left neighbour 26 is the start of
// the word.
type Matrices struct {
	Sub [26][26]float64 // [typed][meant]: typed for meant
	Del [27][26]float64 // [left][x]: x left out after left
	Add [27][26]float64 // [left][x]: x added after left
	Rev [26][26]float64 // [x][y]: xy typed as yx

	Letters [27]float64     // occurrences of each letter, and of words
	Pairs   [27][26]float64 // occurrences of each letter after each left neighbour
}

// half is added to every count, so that what was never seen is not impossible.
const half = 0.5

// unlisted is the count of a letter or pair without an occurrence on record.
const unlisted = 1e6

// FromCounts gives the model of the counts as they are, without rules:
// P(typed|meant) = SUB/count(meant), DEL/count(left meant), ADD/count(left),
// REV/count(pair), each count with half an occurrence added.
func FromCounts(m *Matrices) (*Model, error) {
	e := newEstimates()
	for i := range e.doubt {
		e.doubt[i], e.subNext[i], e.subLeft[i], e.insert[i] = 1, 1, rarest, rarest
	}
	for c := Symbol(1); c < Other; c++ {
		for x := Symbol(1); x < Other; x++ {
			if x != c {
				e.everywhere(x, c, share(m.Sub[x-1][c-1], m.Letters[c-1]))
				e.swap[at2(c, x)] = share(m.Rev[c-1][x-1], m.Pairs[c-1][x-1])
			}
		}
		for l := Symbol(0); l < Other; l++ {
			row := matrixRow(l)
			dropped := share(m.Del[row][c-1], m.Pairs[row][c-1])
			added := share(m.Add[row][c-1], m.Letters[row])
			for r := Symbol(0); r < symbols; r++ {
				e.emit[at3(l, c, r)] = dropped
				e.insert[at3(c, l, r)] = added
			}
		}
	}
	return compose(e, nil, Prices{Accent: accentCost, Foreign: foreignCost, RunOn: nearlyNever, Split: nearlyNever}).model()
}

// nearlyNever is the cost of what the matrices do not speak of.
const nearlyNever = 12

func matrixRow(l Symbol) int {
	if l == Edge {
		return 26
	}
	return int(l) - 1
}

func share(count, of float64) float64 {
	if of <= 0 {
		of = unlisted
	}
	return min(1, (count+half)/of)
}

// everywhere sets the probability of x for c whatever the neighbours.
func (e *estimates) everywhere(x, c Symbol, p float64) {
	for l := Symbol(0); l < symbols; l++ {
		e.subLeft[at3(x, l, c)] = p
		for r := Symbol(0); r < symbols; r++ {
			e.emit[int(x)*cube+at3(l, c, r)] = p
		}
	}
}
