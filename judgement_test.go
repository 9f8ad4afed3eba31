package foulcase

import (
	"math"
	"testing"
)

func TestThresholdsFollowTheBudget(t *testing.T) {
	e := &Engine{judgement: &Judgement{
		Budgets: []BudgetRow{
			{0.5, KindTable{.9, .99, .9, .9, .9}},
			{2, KindTable{.5, .8, .5, .5, .5}},
		},
		DefaultBudget: 2,
		MarkShare:     0.25,
	}}
	at := e.thresholdsFor
	if got := at(0); got.query[Nonword] != 0.5 || got.mark[Nonword] != 0.9 {
		t.Errorf("default budget: query %v, mark %v; want .5, .9", got.query[Nonword], got.mark[Nonword])
	}
	if got := at(0.01).query[Realword]; got != 0.99 {
		t.Errorf("below the table: %v, want .99", got)
	}
	if got := at(100).query[Realword]; got != 0.8 {
		t.Errorf("beyond the table: %v, want .8", got)
	}
	// Halfway in the log of the budget is halfway in the log odds: odds 9 and 1
	// give 3.
	if got := at(1).query[Nonword]; math.Abs(got-0.75) > 1e-12 {
		t.Errorf("between the rows: %v, want .75", got)
	}
	for b := 0.6; b < 2; b += 0.1 {
		if at(b).query[Realword] > at(b - 0.1).query[Realword] {
			t.Errorf("a larger budget asks for more certainty at %v", b)
		}
	}
}

// share is a frequency that every word has.
type share float64

func (s share) Prior(uint32) float32 { return float32(math.Log(float64(s))) }

func TestRecurrenceComparesWithExpectation(t *testing.T) {
	var r recurrence
	r.init(3)
	for range 100 {
		r.addWord(0, 1)
	}
	r.addWord(1, 1)
	r.addForm([]byte("zilverbank"), false, 1)
	r.addForm([]byte("zilverbank"), false, 1)
	often, seldom := share(0.9), share(1e-7)
	if got := r.word(0, often, 1); got > math.Log(3) {
		t.Errorf("a word as frequent as everywhere has evidence %v", got)
	}
	if got := r.word(0, seldom, 1); got < math.Log(50) {
		t.Errorf("a rare word a hundred times has evidence %v", got)
	}
	if got := r.word(1, seldom, 1); got != 0 {
		t.Errorf("a word's only occurrence is evidence for itself: %v", got)
	}
	if got := r.form([]byte("zilverbank")); math.Abs(got-math.Log(2)) > 1e-12 {
		t.Errorf("a form seen twice has evidence %v, want log 2", got)
	}
	if got := r.form([]byte("once")); got != 0 {
		t.Errorf("a form not seen has evidence %v", got)
	}
	r.reset()
	if r.word(0, seldom, 0) != 0 || r.form([]byte("zilverbank")) != 0 {
		t.Error("counts outlive the document")
	}
}
