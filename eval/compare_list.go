package eval

import (
	"fmt"
	"slices"
)

// lists compares the ranks of isolated misspellings.
func (c *Comparison) lists(a, b *Result, classes []string, r Resampling) error {
	for i, p := range a.Pairs {
		if q := b.Pairs[i]; p.Observed != q.Observed || p.Intended != q.Intended || p.Data != q.Data {
			return fmt.Errorf("%w: pair %d is %q in one and %q in the other", ErrIncomparable, i+1, p.Observed, q.Observed)
		}
		c.pair(a.Data[p.Data].Name, p, b.Pairs[i])
	}
	for _, class := range append([]string{""}, classes...) {
		x, y := rankCounts(a.Pairs, b.Pairs, class)
		if len(x) == 0 {
			return unknownClass(class, pairClassesOf(a.Pairs))
		}
		measures := chief(listMeasures(class), "accuracy@1", "accuracy@5", "accuracy@20", "mrr")
		compareCounts(c, x, y, measures, r)
	}
	c.Units = len(a.Pairs)
	for _, k := range []int{1, 5, 20} {
		within := func(pairs []PairOutcome) []bool {
			right := make([]bool, len(pairs))
			for i, p := range pairs {
				right[i] = p.Rank > 0 && p.Rank <= k
			}
			return right
		}
		question := fmt.Sprintf("intended form among the first %d", k)
		c.Tests = append(c.Tests, Test{question, len(a.Pairs), CompareOutcomes(within(a.Pairs), within(b.Pairs))})
	}
	return nil
}

func (c *Comparison) pair(data string, a, b PairOutcome) {
	item := Changed{data, a.Line, a.Observed, a.Intended, rankText(a.Rank), rankText(b.Rank)}
	c.note(item, rankWorth(a.Rank), rankWorth(b.Rank))
}

func rankText(rank int) string {
	if rank == 0 {
		return "missing"
	}
	return fmt.Sprintf("rank %d", rank)
}

// rankCounts counts the pairs that are of the class in either result.
func rankCounts(a, b []PairOutcome, class string) (x, y []listCounts) {
	for i, p := range a {
		if class == "" || slices.Contains(p.Classes, class) || slices.Contains(b[i].Classes, class) {
			x = append(x, countRank(p.Rank))
			y = append(y, countRank(b[i].Rank))
		}
	}
	return x, y
}

func pairClassesOf(pairs []PairOutcome) []string {
	var found []string
	for _, class := range ListClasses {
		if slices.ContainsFunc(pairs, func(p PairOutcome) bool { return slices.Contains(p.Classes, class) }) {
			found = append(found, class)
		}
	}
	return found
}
