package foulcase

import (
	"bytes"
	"cmp"
	"encoding/json"
	"errors"
	"fmt"
	"math"
	"slices"
)

// Judgement is the handful of numbers between the models and a decision. All
// were fitted on development text; none is a matter of taste. Amounts are nats
// unless said otherwise.
//
// A reading of a sentence scores
//
//	LanguageModel × log P(words) + Σ over changed words (Slip[kind] − Channel × cost − penalties)
//	+ Σ over unknown words kept (−NewWord × character price + evidence)
//
// and the posterior of a change is the share of all readings' weight that
// passes through it. The calibration makes a probability of it.
type Judgement struct {
	LanguageModel float64 `json:"language_model"` // weight of the n-gram model's log-probability
	Channel       float64 `json:"channel"`        // weight of the channel's cost
	NewWord       float64 `json:"new_word"`       // weight of the character model's price of an unknown word

	// Slip is the log prior odds that a word is miswritten in each kind of way.
	Slip KindTable `json:"slip"`

	Recurrence    float64 `json:"recurrence"`     // times the log of how much oftener than expected the document has a word
	RecurrenceNew float64 `json:"recurrence_new"` // times the log of the document's count of a form the lexicon lacks
	Capital       float64 `json:"capital"`        // against changing a likely name (a capital inside a sentence) into a common word, or a piece of a compound
	Inflection    float64 `json:"inflection"`     // against changing a word into another inflection of it
	House         float64 `json:"house"`          // price of a house word as a candidate, the language model's class price aside
	Variety       float64 `json:"variety"`        // against a form that the asked-for variety does not spell so

	// RankChannel and RankPrior weigh channel cost against unigram prior where
	// there is no context.
	RankChannel float64 `json:"rank_channel"`
	RankPrior   float64 `json:"rank_prior"`
	// RankRunon and RankPossessive are what a reading as two words, or as a
	// possessive, has to be better by there.
	RankRunon      float64 `json:"rank_runon"`
	RankPossessive float64 `json:"rank_possessive"`

	// SlipRate says how a document's own rate of slips is estimated.
	SlipRate SlipRate `json:"slip_rate"`
	// LeastP is the least probability of a finding that is reported, whatever
	// the budget.
	LeastP float64 `json:"least_p"`
	// Budgets are thresholds for a model without a calibration, as there.
	Budgets []BudgetRow `json:"budgets,omitempty"`
	// DefaultBudget is the budget of queries and marks together when none is asked for.
	DefaultBudget float64 `json:"default_budget"`
	// MarkShare is the part of the budget that marks alone may use.
	MarkShare float64 `json:"mark_share"`
}

// KindTable holds a number for each kind.
type KindTable struct {
	Nonword  float64 `json:"nonword"`
	Realword float64 `json:"realword"`
	Runon    float64 `json:"runon"`
	Split    float64 `json:"split"`
	Repeat   float64 `json:"repeat"`
}

// Of returns the number for kind k.
func (t *KindTable) Of(k Kind) float64 {
	return [...]float64{t.Nonword, t.Realword, t.Runon, t.Split, t.Repeat}[k]
}

// BudgetRow tells the least probability of each kind of finding that goes with
// a budget of false alarms a 1,000 words.
type BudgetRow struct {
	Budget float64   `json:"budget"`
	P      KindTable `json:"p"`
}

// parseJudgement reads and checks the judgement section of a model.
func parseJudgement(section []byte) (*Judgement, error) {
	dec := json.NewDecoder(bytes.NewReader(section))
	dec.DisallowUnknownFields()
	j := new(Judgement)
	if err := dec.Decode(j); err != nil {
		return nil, fmt.Errorf("judgement: %w", err)
	}
	if !(j.LanguageModel > 0 && j.Channel > 0) {
		return nil, errors.New("judgement: language_model and channel want weights above 0")
	}
	if r := j.SlipRate; r != (SlipRate{}) && !(0 < r.Least && r.Least <= r.Prior && r.Prior <= r.Most && r.Most < 1 && r.Strength > 0) {
		return nil, fmt.Errorf("judgement: slip_rate wants strength > 0 and 0 < least <= prior <= most < 1, has %+v", r)
	}
	if j.LeastP < 0 || j.LeastP >= 1 {
		return nil, fmt.Errorf("judgement: least_p %v is no probability", j.LeastP)
	}
	if j.Budgets == nil {
		return j, nil
	}
	if err := checkBudgets(j.Budgets); err != nil {
		return nil, fmt.Errorf("judgement: %w", err)
	}
	return j, nil
}

func checkBudgets(rows []BudgetRow) error {
	if len(rows) == 0 {
		return errors.New("no budgets")
	}
	before := 0.0
	for _, r := range rows {
		if !(r.Budget > before) {
			return errors.New("budgets are not positive and ascending")
		}
		before = r.Budget
		for _, k := range Kinds() {
			if p := r.P.Of(k); !(p > 0 && p < 1) {
				return fmt.Errorf("budget %v: p %v of %s is not between 0 and 1", r.Budget, p, k)
			}
		}
	}
	return nil
}

// thresholds are the least probabilities at which each kind is reported.
type thresholds struct {
	query, mark [len(kindNames)]float64
	budget      float64 // false alarms a 1,000 words, queries and marks together
}

// grade tells what a finding of a kind and probability is reported as.
func (t *thresholds) grade(k Kind, p float64) Grade {
	switch {
	case p >= t.mark[k]:
		return GradeMark
	case p >= t.query[k]:
		return GradeQuery
	}
	return GradeDoubt
}

// spareFalse is how many false alarms a document is granted beside those of its
// length: in a short one, a doubtful finding is no sign that more are false there
// than elsewhere. falsePerRight is how many it is granted for each finding that is
// right: a text full of slips is not good text. Tuned on development text.
const spareFalse, falsePerRight = 1, .5

// leastOf returns the probability under which the findings of one document of so
// many words would be more false alarms than the budget grants it, if each is
// false with one minus its probability. That holds the budget where a text is
// full of what looks like slips and is none.
func (t *thresholds) leastOf(words int, p []float64) float64 {
	slices.SortFunc(p, func(a, b float64) int { return cmp.Compare(b, a) })
	granted := t.budget*float64(words)/1000 + spareFalse
	for _, v := range p {
		if granted += falsePerRight*v - (1 - v); granted < 0 {
			return math.Nextafter(v, 1)
		}
	}
	return 0
}

// likelier is the threshold of a model that was never measured: it reports what
// is likelier wrong than right.
var likelier = []BudgetRow{{Budget: 1, P: KindTable{.5, .5, .5, .5, .5}}}

// thresholdsFor returns what a budget of false alarms a 1,000 words allows.
func (e *Engine) thresholdsFor(budget float64) thresholds {
	j, rows := e.judgement, e.judgement.Budgets
	if e.calibration != nil {
		rows = e.calibration.Budgets
	}
	if rows == nil {
		rows = likelier
	}
	if budget <= 0 {
		budget = j.DefaultBudget
	}
	t := thresholds{budget: budget}
	for _, k := range Kinds() {
		t.query[k] = max(leastP(rows, k, budget), j.LeastP)
		t.mark[k] = max(leastP(rows, k, budget*j.MarkShare), t.query[k])
	}
	return t
}

// leastP interpolates the table in the logs of budget and odds, and holds the
// end rows beyond them.
func leastP(rows []BudgetRow, k Kind, budget float64) float64 {
	i, found := slices.BinarySearchFunc(rows, budget, func(r BudgetRow, b float64) int {
		if r.Budget < b {
			return -1
		} else if r.Budget > b {
			return 1
		}
		return 0
	})
	switch {
	case found, i == 0:
		return rows[i].P.Of(k)
	case i == len(rows):
		return rows[i-1].P.Of(k)
	}
	a, b := rows[i-1], rows[i]
	t := math.Log(budget/a.Budget) / math.Log(b.Budget/a.Budget)
	return logistic((1-t)*logit(a.P.Of(k)) + t*logit(b.P.Of(k)))
}

func logit(p float64) float64    { return math.Log(p / (1 - p)) }
func logistic(x float64) float64 { return 1 / (1 + math.Exp(-x)) }
