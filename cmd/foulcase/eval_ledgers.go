package main

import (
	"cmp"
	"slices"

	"example.org/foulcase"
	"example.org/foulcase/eval"
)

// ledgersEach is how many of the worst false alarms, and of the worst misses,
// of a file get their ledgers into the result.
const ledgersEach = 10

// addLedgers gives the surest false alarms and the errors that came nearest to
// being reported an account of their scores. It takes each item by itself, so
// that what the rest of its document tells is left out.
func (m *measurement) addLedgers(items []eval.Item, places []eval.Place, o foulcase.Options) {
	byLine := map[int]string{}
	for _, item := range items {
		byLine[item.Line] = item.Source
	}
	for _, p := range worst(places) {
		sentence := byLine[p.Line]
		start, end := extent(p)
		ledger := m.engine.Ledger(sentence, o)
		ledger.Sentence = p.Context
		ledger.Words = slices.DeleteFunc(ledger.Words, func(w foulcase.LedgerColumn) bool {
			return w.Offset >= end || w.Offset+len(w.Observed) <= start
		})
		p.Ledger = ledger.String()
	}
}

// worst picks the places to explain.
func worst(places []eval.Place) []*eval.Place {
	var alarms, misses []*eval.Place
	for i := range places {
		switch p := &places[i]; {
		case p.Missed():
			misses = append(misses, p)
		case p.Reported() && p.Outcome == eval.PlaceWrong:
			alarms = append(alarms, p)
		}
	}
	var picked []*eval.Place
	for _, list := range [][]*eval.Place{alarms, misses} {
		slices.SortStableFunc(list, func(a, b *eval.Place) int { return cmp.Compare(sureness(b), sureness(a)) })
		picked = append(picked, list[:min(len(list), ledgersEach)]...)
	}
	return picked
}

// extent is where the error stands, or the flag when there is none.
func extent(p *eval.Place) (start, end int) {
	if p.Error != nil {
		return p.Error.Start, p.Error.End
	}
	return p.Flag.Start, p.Flag.End
}

// sureness is the flag's probability, 0 without one.
func sureness(p *eval.Place) float64 {
	if p.Flag == nil {
		return 0
	}
	return p.Flag.P
}
