package foulcase

import (
	"bytes"
	"encoding/json"
	"fmt"
	"math"

	"example.org/foulcase/internal/additive"
)

// Calibration turns what is known of a finding into the probability that the
// text is wrong there, and budgets of false alarms into thresholds. It is
// learned from text with known slips by Engine.Calibrate.
type Calibration struct {
	// Rate is the number of findable slips a word in the text it was learned
	// from. The log-odds hold for text of this rate; for other text they are
	// shifted by the difference of the rates' log-odds (Saerens, Latinne &
	// Decaestecker 2002).
	Rate float64 `json:"rate"`
	// Nonword, Realword and Spaces give the log-odds, nats, of findings that are
	// no words, that are words, and of run-ons, splits and repeats.
	Nonword  additive.Model `json:"nonword"`
	Realword additive.Model `json:"realword"`
	Spaces   additive.Model `json:"spaces"`
	// Budgets gives, by false alarms a 1,000 words of good text (ascending), the
	// least probability at which a finding of each kind is reported.
	Budgets []BudgetRow `json:"budgets"`
}

// parts lists the additive models by group of kinds.
func (c *Calibration) parts() [groups]*additive.Model {
	return [groups]*additive.Model{&c.Nonword, &c.Realword, &c.Spaces}
}

// Groups of kinds that share an additive model.
const (
	groupNonword = iota
	groupRealword
	groupSpaces
	groups
)

func groupOf(k Kind) int { return min(int(k), groupSpaces) }

// calibrator is a Calibration made ready.
type calibrator struct {
	*Calibration
	models [groups]*additive.Bound
}

// parseCalibration reads and checks the calibration section of a model.
func parseCalibration(section []byte) (*calibrator, error) {
	dec := json.NewDecoder(bytes.NewReader(section))
	dec.DisallowUnknownFields()
	c := &calibrator{Calibration: new(Calibration)}
	if err := dec.Decode(c.Calibration); err != nil {
		return nil, fmt.Errorf("calibration: %w", err)
	}
	if !(c.Rate > 0 && c.Rate < 1) {
		return nil, fmt.Errorf("calibration: rate %v is not between 0 and 1", c.Rate)
	}
	if err := checkBudgets(c.Budgets); err != nil {
		return nil, fmt.Errorf("calibration: %w", err)
	}
	return c, c.bind()
}

func (c *calibrator) bind() error {
	for i, m := range c.parts() {
		var err error
		if c.models[i], err = m.Bind(featureNames[:]); err != nil {
			return fmt.Errorf("calibration: %w", err)
		}
	}
	return nil
}

// logOdds is the log-odds, nats, that a finding is right, at the calibration's
// own rate of slips.
func (c *calibrator) logOdds(k Kind, x *evidence) float64 {
	return c.models[groupOf(k)].LogOdds(x[:])
}

// SlipRate says how a document's own rate of slips is estimated: the mean of its
// findings' probabilities, to which Strength words at the rate of Prior are
// added, by expectation-maximisation. Rates are slips a word.
type SlipRate struct {
	Prior    float64 `json:"prior"` // of a document of which nothing is known yet
	Strength float64 `json:"strength"`
	Least    float64 `json:"least"`
	Most     float64 `json:"most"`
}

// slipRounds is how often the estimate is refined; it has settled by then to a
// hundredth of a nat on development text.
const slipRounds = 30

// slipRate follows the slips of one document.
type slipRate struct {
	SlipRate
	fixed bool
	base  float64 // log-odds of the rate that findings' log-odds hold for
	words float64 // read so far
	found float64 // sum of probabilities in earlier windows
	shift float64 // what is added to findings' log-odds, nats
	// against is scratch: the odds that each of a window's findings is none.
	against []float64
}

// newSlipRate begins a document whose findings' log-odds hold for text of the
// rate base. A rate that is asked for above 0 is taken as it is.
func newSlipRate(how SlipRate, base float64, o Options) slipRate {
	r := slipRate{SlipRate: how, base: logit(base)}
	if o.SlipRate > 0 {
		r.Prior = o.SlipRate
	}
	r.fixed = o.SlipRate > 0 || o.Without.has(SlipRateEvidence) || how == (SlipRate{})
	if r.Prior > 0 {
		r.shift = logit(r.Prior) - r.base
	}
	return r
}

// slipRate begins a document. Without a calibration there is nothing to shift.
func (e *Engine) slipRate(o Options) slipRate {
	if e.calibration == nil {
		return slipRate{fixed: true}
	}
	return newSlipRate(e.judgement.SlipRate, e.calibration.Rate, o)
}

// settle estimates the rate anew with a window of so many words, whose findings
// have these log-odds. Earlier windows count with what was found in them then.
func (r *slipRate) settle(words int, odds []float64) {
	if r.fixed {
		return
	}
	r.words += float64(words)
	r.against = r.against[:0]
	for _, o := range odds {
		r.against = append(r.against, math.Exp(-o))
	}
	found := 0.0
	for range slipRounds {
		found = 0
		shift := math.Exp(-r.shift)
		for _, a := range r.against {
			found += 1 / (1 + a*shift) // logistic(o + r.shift)
		}
		rate := (r.found + found + r.Strength*r.Prior) / (r.words + r.Strength)
		before := r.shift
		if r.shift = logit(min(max(rate, r.Least), r.Most)) - r.base; r.shift == before {
			break
		}
	}
	r.found += found
}

// mostShift is the most that settling may add to log-odds, nats.
func (r *slipRate) mostShift() float64 {
	if r.fixed {
		return r.shift
	}
	return logit(r.Most) - r.base
}
