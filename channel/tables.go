package channel

import "math"

// tables are a model in floating point again. What is left out of the place of a
// letter, that nothing more is inserted before it, is in its figures.
type tables struct {
	*draft
	emit []float64 // emit[x][l][c][r]: c replaced by x; 0 where x is c or nothing
}

// unpack reads a model into tables, so that encoding them gives the same model.
func unpack(m *Model) *tables {
	t := &tables{newUnpacked(m), make([]float64, symbols*cube)}
	for at := range cube {
		c := Symbol(at / symbols % symbols)
		l, r := Symbol(at/square), Symbol(at%symbols)
		for x := Symbol(1); x < symbols && c != Edge; x++ {
			if x != c {
				t.emit[int(x)*cube+at] = t.doubt[at] * t.subLeft[at3(x, l, c)] * t.subNext[at3(x, c, r)]
			}
		}
	}
	return t
}

func newUnpacked(m *Model) *draft {
	read := func(n int, at func(i int) float64) []float64 {
		t := make([]float64, n)
		for i := range t {
			t[i] = math.Exp(-at(i))
		}
		return t
	}
	cost := func(t table16) func(int) float64 { return func(i int) float64 { return float64(t.at(i)) } }
	d := &draft{
		keep: read(cube, cost(m.keep)), drop: read(cube, cost(m.drop)), swap: read(square, cost(m.swap)),
		doubt:   read(cube, func(i int) float64 { return float64(m.doubt.at(i)) - bias }),
		subNext: read(cube, func(i int) float64 { return float64(m.subNext.at(i)) - bias }),
		subLeft: read(cube, func(i int) float64 { return float64(m.subLeft.at(i)) }),
		insert:  read(cube, func(i int) float64 { return float64(m.insert.at(i)) }),
		stop:    read(square, func(int) float64 { return 0 }),
		prices:  m.prices,
	}
	for l := Symbol(0); l < symbols; l++ {
		d.stop[at2(l, Edge)] = probability(m.Stop(l))
	}
	for i := range m.rules.len() {
		d.rules = append(d.rules, m.rules.at(i))
	}
	return d
}
