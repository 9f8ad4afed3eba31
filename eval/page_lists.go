package eval

import (
	"cmp"
	"slices"
	"strings"
)

// pageRows is how many rows a list on a page has, and pageSingles how many of them
// may be of pairs that met once.
const (
	pageRows    = 25
	pageSingles = 10
)

// pairTable counts pairs of words; a page shows the most frequent.
type pairTable struct {
	Rows []*pairCount
	More int // how many rows are left out
}

// pairCount is two words and how often they met.
type pairCount struct {
	A, B            string
	N, Found, First int
}

// pairCounter adds up a pairTable.
type pairCounter map[[2]string]*pairCount

func (c pairCounter) count(a, b string) *pairCount {
	k := [2]string{fold(a), fold(b)}
	if c[k] == nil {
		c[k] = &pairCount{A: k[0], B: k[1]}
	}
	c[k].N++
	return c[k]
}

func (c pairCounter) table() pairTable {
	var rows []*pairCount
	for _, p := range c {
		rows = append(rows, p)
	}
	slices.SortFunc(rows, func(a, b *pairCount) int {
		return cmp.Or(cmp.Compare(b.N, a.N), cmp.Compare(a.A, b.A), cmp.Compare(a.B, b.B))
	})
	n := min(len(rows), pageRows)
	for n > pageSingles && rows[n-1].N == 1 {
		n--
	}
	return pairTable{rows[:n], len(rows) - n}
}

// mistakes counts the errors of a text by what stands there and what was meant.
func mistakes(places []Place) pairTable {
	c := pairCounter{}
	for i := range places {
		p := &places[i]
		if p.Error == nil || len(p.Error.Corrections) == 0 {
			continue
		}
		row := c.count(p.Observed, p.Error.Corrections[0])
		if !p.Missed() {
			row.Found++
			if p.Rank == 1 {
				row.First++
			}
		}
	}
	return c.table()
}

// confusions counts what should stand against what was proposed first, where the
// two differ: in false alarms and on errors whose correction was another.
func confusions(places []Place) pairTable {
	c := pairCounter{}
	count := func(meant, proposed string) {
		if fold(meant) != fold(proposed) {
			c.count(meant, proposed)
		}
	}
	for i := range places {
		p := &places[i]
		if !p.Reported() || len(p.Flag.Corrections) == 0 {
			continue
		}
		switch {
		case p.Outcome == PlaceWrong:
			count(p.Observed, p.Flag.Corrections[0])
		case p.Outcome == PlaceRight && p.Rank != 1 && p.Error != nil && len(p.Error.Corrections) > 0:
			count(p.Error.Corrections[0], p.Flag.Corrections[0])
		}
	}
	return c.table()
}

// pairConfusions counts intended forms against the first candidate, where that
// is another.
func pairConfusions(pairs []PairOutcome) pairTable {
	c := pairCounter{}
	for _, p := range pairs {
		if p.Rank != 1 && len(p.Candidates) > 0 {
			c.count(p.Intended, p.Candidates[0])
		}
	}
	return c.table()
}

// pairList is the pairs that were ranked worst.
type pairList struct {
	Rows []PairOutcome
	More int
}

func worstPairs(pairs []PairOutcome) pairList {
	rows := slices.DeleteFunc(slices.Clone(pairs), func(p PairOutcome) bool { return p.Rank == 1 })
	slices.SortStableFunc(rows, func(a, b PairOutcome) int { return cmp.Compare(uint(b.Rank-1), uint(a.Rank-1)) })
	n := min(len(rows), pageRows)
	return pairList{rows[:n], len(rows) - n}
}

// placeList is places of a text, worst first.
type placeList struct {
	Rows []shownPlace
	More int
}

// shownPlace is a place with its context cut at what stands in question.
type shownPlace struct {
	*Place
	Data                    string // file
	Before, Observed, After string
}

// worstAlarms lists false alarms, the surest first.
func worstAlarms(r *Result) placeList {
	return worst(r, func(p *Place) bool { return p.Outcome == PlaceWrong && p.Reported() }, func(a, b *Place) int {
		return cmp.Compare(b.Flag.P, a.Flag.P)
	})
}

// worstMisses lists missed errors, those first that came nearest to being
// reported.
func worstMisses(r *Result) placeList {
	p := func(p *Place) float64 {
		if p.Flag == nil {
			return 0
		}
		return p.Flag.P
	}
	return worst(r, (*Place).Missed, func(a, b *Place) int { return cmp.Compare(p(b), p(a)) })
}

func worst(r *Result, of func(*Place) bool, order func(a, b *Place) int) placeList {
	var places []*Place
	for i := range r.Places {
		if of(&r.Places[i]) {
			places = append(places, &r.Places[i])
		}
	}
	slices.SortStableFunc(places, order)
	list := placeList{More: len(places)}
	for _, p := range places[:min(len(places), pageRows)] {
		shown := shownPlace{Place: p, Data: baseName(r.Data[r.Units[p.Unit].Data].Name)}
		shown.Before, shown.Observed, shown.After = p.cut()
		list.Rows = append(list.Rows, shown)
		list.More--
	}
	return list
}

// cut divides the context into what stands before, in and behind the place: of
// several equal stretches of words, the one nearest to where it must be.
func (p *Place) cut() (before, observed, after string) {
	observed = strings.Join(strings.Fields(p.Observed), " ")
	expected, _ := p.extent()
	if strings.HasPrefix(p.Context, "… ") {
		expected = contextBytes
	}
	best := -1
	for i := 0; i+len(observed) <= len(p.Context) && observed != ""; i++ {
		if !strings.HasPrefix(p.Context[i:], observed) {
			continue
		}
		if best < 0 || distance(i, expected) < distance(best, expected) {
			best = i
		}
	}
	if best < 0 {
		return p.Context + " ", observed, ""
	}
	return p.Context[:best], observed, p.Context[best+len(observed):]
}

func distance(a, b int) int { return max(a-b, b-a) }
