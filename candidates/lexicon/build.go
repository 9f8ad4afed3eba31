package lexicon

import (
	"maps"
	"math"
	"slices"
)

// Build decides on every form of the lists and the corpus and enters those that
// are in, with their attributes, into a Builder. The same input gives the same
// section.
//
// Variety: a form in one list only is of that list's variety, but see names;
// one from the corpus alone is of both. Cases: those it is listed in, and those
// that make up caseShare of its occurrences amid sentences. Usual: the most
// frequent of them amid sentences; without occurrences the plainest listed.
// Prior: log(count/words); forms never seen share the mass that Good and Turing
// give to listed forms not seen (the listed forms seen once stand for it).
func Build(lists []WordList, counts *Counter) (*Builder, error) {
	e, err := NewEvidence(lists, counts)
	if err != nil {
		return nil, err
	}
	return e.Builder(), nil
}

// Builder enters every form that is in; see Build.
func (e *Evidence) Builder() *Builder {
	b := &Builder{}
	unseen := e.unseenCount()
	words := math.Log(max(float64(e.counts.Words), 1))
	spelled := e.spelled()
	for _, form := range e.forms() {
		v := e.Judge(form)
		if !v.In {
			continue
		}
		n := math.Max(float64(v.Count.Total()), unseen)
		entry := Entry{Variety: Both, Prior: float32(math.Min(math.Log(n)-words, 0))}
		entry.Cases, entry.Usual = usualCase(e.listed[form], &v.Count)
		if l := e.listed[form]; l != nil {
			entry.Listed, entry.Variety = true, l.of()
		}
		b.Add(form, entry, spelled[form])
	}
	return b
}

// forms lists every form of the lists and the corpus, sorted.
func (e *Evidence) forms() []string {
	all := slices.Collect(maps.Keys(e.listed))
	for form := range e.counts.index {
		if e.listed[form] == nil {
			all = append(all, form)
		}
	}
	slices.Sort(all)
	return all
}

// unseenCount is the count that stands for a listed form never seen: Good's
// and Turing's (0+1) N1/N0 over the listed forms, at most 1/2 (Good 1953).
func (e *Evidence) unseenCount() float64 {
	var seen [2]float64
	for form := range e.listed {
		if n := e.total(form); n < 2 {
			seen[n]++
		}
	}
	if seen[0] == 0 {
		return 0.5
	}
	return min(max(seen[1]/seen[0], 0.01), 0.5)
}

// caseShare is the share of a form's occurrences amid sentences that a pattern
// of capitals needs to count as one of its own, and caseCount the least number.
const (
	caseShare = 0.02
	caseCount = 3
)

func usualCase(l *listing, n *Count) (cases, usual Cases) {
	var amid, all uint32
	for i := range n.Amid {
		amid += n.Amid[i]
	}
	counts := n.Amid
	if amid == 0 { // capitals that say little are better than none
		counts = n.Lead
	}
	for _, k := range counts {
		all += k
	}
	if l != nil {
		cases = l.cases()
	}
	for i, k := range counts {
		if k >= caseCount && float64(k) >= caseShare*float64(all) {
			cases |= 1 << i
		}
	}
	best := uint32(0)
	for i, k := range counts {
		if (cases == 0 || cases&(1<<i) != 0) && k > best {
			best, usual = k, 1<<i
		}
	}
	if usual == 0 {
		usual = cases & -cases
	}
	if usual == 0 {
		usual = LowerCase
	}
	return cases | usual, usual
}

// spelled gives the most frequent spelling in mixed capitals of each form,
// that of the word lists where the corpus has none.
func (e *Evidence) spelled() map[string]string {
	best := map[string]string{}
	for form, l := range e.listed {
		if l.mixed != "" {
			best[form] = l.mixed
		}
	}
	for _, s := range slices.Sorted(maps.Keys(e.counts.spelled)) {
		form := foldString(s)
		old, ok := best[form]
		if !ok || e.counts.spelled[s] > e.counts.spelled[old] {
			best[form] = s
		}
	}
	return best
}
