package foulcase

import (
	"encoding/json"
	"math"
	"slices"
	"strings"
	"testing"

	"example.org/foulcase/internal/additive"
)

// soundCalibration is small and invented: what the lattice says, and no more for
// a long word.
func soundCalibration() *Calibration {
	step := additive.Model{Base: -1, Terms: []additive.Term{
		{Feature: featureNames[fOdds], Cuts: []float64{-6, 0}, Values: []float64{-2, 0, 2}},
		{Feature: featureNames[fLength], Cuts: []float64{5}, Values: []float64{-.5, .5}},
	}}
	return &Calibration{
		Rate: .02, Nonword: step, Realword: step, Spaces: step,
		Budgets: []BudgetRow{{1, KindTable{.8, .8, .8, .8, .8}}, {10, KindTable{.4, .4, .4, .4, .4}}},
	}
}

func TestParseCalibration(t *testing.T) {
	body, err := json.Marshal(soundCalibration())
	if err != nil {
		t.Fatal(err)
	}
	c, err := parseCalibration(body)
	if err != nil {
		t.Fatal(err)
	}
	x := &evidence{fOdds: -3, fLength: 7}
	if got := c.logOdds(Realword, x); got != -.5 {
		t.Errorf("log-odds %v, want base -1, odds 0 and length .5 added up", got)
	}
	x[fOdds] = 1
	if got := c.logOdds(Repeat, x); got != 1.5 {
		t.Errorf("log-odds %v, want base -1, odds 2 and length .5 added up", got)
	}
}

func TestParseCalibrationRefuses(t *testing.T) {
	for name, damage := range map[string]func(c *Calibration){
		"rate 0":           func(c *Calibration) { c.Rate = 0 },
		"rate 1":           func(c *Calibration) { c.Rate = 1 },
		"rate below 0":     func(c *Calibration) { c.Rate = -.1 },
		"unknown feature":  func(c *Calibration) { c.Spaces.Terms[0].Feature = "phase of the moon" },
		"a value missing":  func(c *Calibration) { c.Nonword.Terms[0].Values = []float64{1, 2} },
		"no budgets":       func(c *Calibration) { c.Budgets = nil },
		"budgets fall":     func(c *Calibration) { slices.Reverse(c.Budgets) },
		"budget 0":         func(c *Calibration) { c.Budgets[0].Budget = 0 },
		"certain":          func(c *Calibration) { c.Budgets[1].P.Split = 1 },
		"impossible":       func(c *Calibration) { c.Budgets[1].P.Realword = 0 },
		"cuts not in turn": func(c *Calibration) { c.Realword.Terms[0].Cuts = []float64{1, 0} },
	} {
		c := soundCalibration()
		for _, m := range []*additive.Model{&c.Nonword, &c.Realword, &c.Spaces} { // which share their terms
			m.Terms = slices.Clone(m.Terms)
		}
		damage(c)
		body, err := json.Marshal(c)
		if err != nil {
			t.Fatal(err)
		}
		refused(t, name, body)
	}
	body, err := json.Marshal(soundCalibration())
	if err != nil {
		t.Fatal(err)
	}
	for name, bad := range map[string]string{
		"empty":         "",
		"cut":           string(body[:len(body)/2]),
		"a list":        "[]",
		"nothing in it": "{}",
		"unknown field": strings.Replace(string(body), `"rate"`, `"tide":1,"rate"`, 1),
		"rate no figure": strings.Replace(string(body), `"rate":0.02`, `"rate":"often"`,
			1),
	} {
		refused(t, name, []byte(bad))
	}
}

func refused(t *testing.T, name string, body []byte) {
	t.Helper()
	if _, err := parseCalibration(body); err == nil || !strings.HasPrefix(err.Error(), "calibration: ") {
		t.Errorf("%s: %v", name, err)
	}
}

// Invented, in the order of what the model is shipped with.
var usualSlips = SlipRate{Prior: .004, Strength: 250, Least: .0005, Most: .08}

const (
	learnedRate = .02
	sure        = 40 // log-odds, nats
)

// settled is the rate of slips after windows of so many words each.
func settled(how SlipRate, o Options, words int, windows ...[]float64) float64 {
	r := newSlipRate(how, learnedRate, o)
	for _, odds := range windows {
		r.settle(words, odds)
	}
	return logistic(r.base + r.shift)
}

func surely(n int) []float64 { return slices.Repeat([]float64{sure}, n) }

// TestSlipRateOfSureFindings has a closed form: with k slips certain in n words
// the rate is (k + strength × prior) / (n + strength).
func TestSlipRateOfSureFindings(t *testing.T) {
	s := usualSlips
	for _, c := range []struct{ words, slips int }{{1, 0}, {500, 1}, {500, 0}, {1500, 0}, {500, 20}, {30, 1}, {100000, 900}} {
		got := settled(s, Options{}, c.words, surely(c.slips))
		want := (float64(c.slips) + s.Strength*s.Prior) / (float64(c.words) + s.Strength)
		if math.Abs(got-want) > 1e-9 {
			t.Errorf("%d slips in %d words: rate %v, want %v", c.slips, c.words, got, want)
		}
	}
}

func TestSlipRateFollowsTheText(t *testing.T) {
	s := usualSlips
	doubtful := slices.Repeat([]float64{-3, -1, 0, 1}, 10)
	for _, c := range []struct {
		name     string
		got      float64
		from, to float64
	}{
		{"as yet unread", settled(s, Options{}, 0), s.Prior, s.Prior},
		{"dense with slips", settled(s, Options{}, 400, surely(16)), .02, .04},
		{"long and without any", settled(s, Options{}, 5000, nil), s.Least, .0006},
		{"long, findings all but surely wrong", settled(s, Options{}, 5000, slices.Repeat([]float64{-30}, 90)), s.Least, .0006},
		{"every word wrong", settled(s, Options{}, 1000, surely(1000)), s.Most, s.Most},
		{"endless and right", settled(s, Options{}, 1<<30, nil), s.Least, s.Least},
		{"doubtful findings", settled(s, Options{}, 800, doubtful), s.Prior, .03},
		{"few words say little", settled(s, Options{}, 10, nil), .95 * s.Prior, s.Prior},
	} {
		if c.got < c.from-1e-12 || c.got > c.to+1e-12 {
			t.Errorf("%s: rate %v, want %v to %v", c.name, c.got, c.from, c.to)
		}
	}
}

// A document in windows settles where the whole would: in the same place if its
// findings are sure, near it if not.
func TestSlipRateAddsWindowsUp(t *testing.T) {
	certain := surely(12)
	whole := settled(usualSlips, Options{}, 1200, certain)
	for n := range 4 {
		var windows [][]float64
		for w := range slices.Chunk(certain, len(certain)/(n+1)) {
			windows = append(windows, w)
		}
		if got := settled(usualSlips, Options{}, 1200/len(windows), windows...); math.Abs(whole-got) > 1e-9 {
			t.Errorf("rate %v in %d windows, %v in one", got, len(windows), whole)
		}
	}
	var odds []float64
	for i := range 60 {
		odds = append(odds, float64(i%9)-5)
	}
	whole = settled(usualSlips, Options{}, 2400, odds)
	halves := settled(usualSlips, Options{}, 1200, odds[:30], odds[30:])
	if d := math.Abs(logit(whole) - logit(halves)); d > .35 {
		t.Errorf("rate %v in halves, %v in one: %.2f nats apart", halves, whole, d)
	}
}

func TestSlipRateThatIsGiven(t *testing.T) {
	for _, c := range []struct {
		name string
		how  SlipRate
		o    Options
		want float64
	}{
		{"asked for", usualSlips, Options{SlipRate: .03}, .03},
		{"asked for beyond the bounds", usualSlips, Options{SlipRate: .3}, .3},
		{"asked for, evidence or not", usualSlips, Options{SlipRate: .03, Without: SlipRateEvidence}, .03},
		{"without the evidence", usualSlips, Options{Without: SlipRateEvidence}, usualSlips.Prior},
		{"a model that does not say", SlipRate{}, Options{}, learnedRate},
	} {
		for _, odds := range [][]float64{nil, surely(400)} {
			if got := settled(c.how, c.o, 2000, odds); math.Abs(got-c.want) > 1e-12 {
				t.Errorf("%s, %d findings: rate %v, want %v", c.name, len(odds), got, c.want)
			}
		}
	}
	if got := settled(usualSlips, Options{Without: CacheEvidence | RecurringEvidence}, 2000, surely(100)); got < 5*usualSlips.Prior {
		t.Errorf("without other evidence the rate stays at %v", got)
	}
}

func TestMostShiftIsNotExceeded(t *testing.T) {
	r := newSlipRate(usualSlips, learnedRate, Options{})
	for range 5 {
		r.settle(200, surely(200))
		if r.shift > r.mostShift() {
			t.Fatalf("shift %v, at most %v", r.shift, r.mostShift())
		}
	}
	if r.shift < r.mostShift()-1e-9 {
		t.Errorf("a text of nothing but slips shifts by %v, not by the most, %v", r.shift, r.mostShift())
	}
	given := newSlipRate(usualSlips, learnedRate, Options{SlipRate: .3})
	if given.mostShift() != given.shift {
		t.Errorf("a given rate shifts by %v, at most %v", given.shift, given.mostShift())
	}
}

func TestParseJudgementRefusesRates(t *testing.T) {
	sound := Judgement{LanguageModel: 1, Channel: 1, SlipRate: usualSlips, LeastP: .05}
	for name, damage := range map[string]func(j *Judgement){
		"sound":                 func(*Judgement) {},
		"no strength":           func(j *Judgement) { j.SlipRate.Strength = 0 },
		"least of 0":            func(j *Judgement) { j.SlipRate.Least = 0 },
		"prior under the least": func(j *Judgement) { j.SlipRate.Prior = j.SlipRate.Least / 2 },
		"prior over the most":   func(j *Judgement) { j.SlipRate.Prior = 2 * j.SlipRate.Most },
		"most of 1":             func(j *Judgement) { j.SlipRate.Most = 1 },
		"least p of 1":          func(j *Judgement) { j.LeastP = 1 },
		"least p below 0":       func(j *Judgement) { j.LeastP = -.1 },
	} {
		j := sound
		damage(&j)
		body, err := json.Marshal(j)
		if err != nil {
			t.Fatal(err)
		}
		if _, err := parseJudgement(body); (err == nil) != (name == "sound") {
			t.Errorf("%s: %v", name, err)
		}
	}
}

// Without a calibration there is no rate to shift to.
func TestNoSlipRateWithoutCalibration(t *testing.T) {
	e := &Engine{judgement: &Judgement{SlipRate: usualSlips}}
	r := e.slipRate(Options{SlipRate: .3})
	r.settle(1000, surely(100))
	if r.shift != 0 || r.mostShift() != 0 {
		t.Errorf("shift %v, at most %v", r.shift, r.mostShift())
	}
}
