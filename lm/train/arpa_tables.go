package train

import (
	"fmt"
	"math"
	"slices"

	"example.org/foulcase/lm"
)

// tables sorts the n-grams read into the levels of a model.
func (a *arpaReader) tables() (lm.Tables, error) {
	t := make(lm.Tables, len(a.grams))
	a.unigrams(&t[0])
	for k := len(t) - 1; k > 0; k-- {
		slices.SortStableFunc(a.grams[k], func(x, y arpaGram) int { return compareKeys(x.key, y.key) })
		for i := 1; i < len(a.grams[k]); i++ {
			if here := a.grams[k][i]; here.key == a.grams[k][i-1].key {
				return nil, fmt.Errorf("%w: line %d: the %d-gram was in line %d before", ErrARPA, here.line, k+1, a.grams[k][i-1].line)
			}
		}
		if k > 1 {
			a.complete(k)
		}
	}
	for k := 1; k < len(t); k++ {
		a.level(t, k)
	}
	return t, fill(t)
}

func compareKeys(x, y key) int {
	switch {
	case x == y:
		return 0
	case x.less(y):
		return -1
	}
	return 1
}

func (a *arpaReader) unigrams(t *lm.Table) {
	n := a.vocabulary.Len()
	t.LogProb, t.Backoff = make([]float32, n), make([]float32, n)
	for i := range t.LogProb {
		t.LogProb[i] = unknownNats
	}
	for _, g := range a.grams[0] {
		t.LogProb[g.key.lo], t.Backoff[g.key.lo] = g.prob, g.backoff
	}
	if len(a.grams) == 1 {
		t.Backoff = nil
	}
}

// complete adds to order k the parents and contexts that order k+1 needs. The
// n-grams of order k+1 are complete and sorted, those of order k as read.
func (a *arpaReader) complete(k int) {
	have := make(map[key]struct{}, len(a.grams[k-1]))
	for _, g := range a.grams[k-1] {
		have[g.key] = struct{}{}
	}
	need := func(wanted key) {
		if _, ok := have[wanted]; !ok {
			have[wanted] = struct{}{}
			a.grams[k-1] = append(a.grams[k-1], arpaGram{key: wanted, prob: float32(math.NaN())})
		}
	}
	for _, g := range a.grams[k] {
		need(g.key.shift(a.width))
		need(g.key.low(uint(k) * a.width))
	}
}

// shift drops the field of the leftmost word.
func (k key) shift(width uint) key {
	return key{k.hi >> width, k.lo>>width | k.hi<<(64-width)}
}

// low keeps the lowest n bits: all fields but the last word's.
func (k key) low(n uint) key {
	if n >= 64 {
		return key{k.hi & (1<<(n-64) - 1), k.lo}
	}
	return key{0, k.lo & (1<<n - 1)}
}

// level lays out order k+1 under the parents of order k.
func (a *arpaReader) level(t lm.Tables, k int) {
	grams, last := a.grams[k], k == len(t)-1
	l := &t[k]
	first := make([]uint32, 0, t.Len(k-1)+1)
	parent := -1
	for i, g := range grams {
		for parent < 0 || a.parentKey(k-1, parent) != g.key.shift(a.width) {
			first = append(first, uint32(i))
			parent++
		}
		l.Word = append(l.Word, uint32(g.key.lo&(1<<a.width-1))-1)
		l.LogProb = append(l.LogProb, g.prob)
		if !last {
			l.Backoff = append(l.Backoff, g.backoff)
		}
	}
	for len(first) <= t.Len(k-1) {
		first = append(first, uint32(len(grams)))
	}
	t[k-1].First = first
}

// parentKey returns the key of n-gram i of order k+1.
func (a *arpaReader) parentKey(k, i int) key {
	if k == 0 {
		return key{0, uint64(i) + 1}
	}
	return a.grams[k][i].key
}

// fill prices the n-grams that were added, shortest first.
func fill(t lm.Tables) error {
	var contexts []uint32
	for k := 1; k < len(t); k++ {
		var err error
		if contexts, err = t.Contexts(k, contexts); err != nil {
			return err
		}
		lower := &t[k-1]
		for parent := range lower.LogProb {
			for i := lower.First[parent]; i < lower.First[parent+1]; i++ {
				if p := &t[k].LogProb[i]; math.IsNaN(float64(*p)) {
					*p = min(0, lower.LogProb[parent]+lower.Backoff[contexts[i]])
				}
			}
		}
	}
	return nil
}
