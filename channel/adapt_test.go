package channel_test

import (
	"bytes"
	"errors"
	"fmt"
	"math"
	"strings"
	"testing"

	"example.org/foulcase/channel"
)

// houseSlips are invented, of a house whose writers put "ck" for "k" and drop "h".
var houseSlips = []channel.Pair{
	{Observed: "darck", Intended: "dark", Count: 3},
	{Observed: "marcked", Intended: "marked", Count: 2},
	{Observed: "docck", Intended: "dock", Count: 1},
	{Observed: "weigt", Intended: "weight", Count: 5},
	{Observed: "heigt", Intended: "height", Count: 2},
	{Observed: "lightous", Intended: "lighthouse", Count: 1},
	{Observed: "stashun", Intended: "station", Count: 1},
	{Observed: "anchor age", Intended: "anchorage", Count: 2, Spaced: true},
}

func TestAdaptClimbs(t *testing.T) {
	for _, strength := range []float64{1, 30, 3000} {
		m, report, err := channel.Adapt(fitSlips(t), houseSlips, strength)
		if err != nil {
			t.Fatal(err)
		}
		if report.Pairs != 7 || report.Spaced != 1 {
			t.Errorf("strength %v: report %+v", strength, report)
		}
		l := report.Penalised
		if len(l) < 3 || l[len(l)-1] <= l[0] {
			t.Errorf("strength %v: nothing was gained: %v", strength, l)
		}
		for i := 1; i < len(l); i++ {
			if l[i] < l[i-1]-1e-12 {
				t.Errorf("strength %v, round %d: fell from %v to %v", strength, i, l[i-1], l[i])
			}
		}
		again, _, err := channel.Adapt(fitSlips(t), houseSlips, strength)
		if err != nil || !bytes.Equal(m.Section(), again.Section()) {
			t.Errorf("strength %v: two runs differ (%v)", strength, err)
		}
	}
}

// A model that counts for ever so many pairs stays as it is; one that counts for
// few follows the pairs.
func TestAdaptWeighsTheModel(t *testing.T) {
	m := fitSlips(t)
	still, _, err := channel.Adapt(m, houseSlips, math.Inf(1))
	if err != nil || !bytes.Equal(still.Section(), m.Section()) {
		t.Errorf("at infinity the model changed (%v)", err)
	}
	before := m.Cost("parck", "park")
	last := math.Inf(-1)
	for _, strength := range []float64{1, 30, 1000, 1e9} {
		adapted, _, err := channel.Adapt(m, houseSlips, strength)
		if err != nil {
			t.Fatal(err)
		}
		cost := adapted.Cost("parck", "park")
		if cost < last || cost > before+.01 {
			t.Errorf("strength %v: parck for park costs %.3f nats, with less %.3f, at first %.3f", strength, cost, last, before)
		}
		last = cost
	}
	if last < before-.1 {
		t.Errorf("a model of 10^9 pairs moved from %.3f to %.3f nats", before, last)
	}
}

func TestAdaptRefusesNothing(t *testing.T) {
	if _, _, err := channel.Adapt(fitSlips(t), nil, 10); !errors.Is(err, channel.ErrNoPairs) {
		t.Errorf("no pairs: %v", err)
	}
}

// What could be observed for a word must share a probability of one, but for the
// rounding of figures in a section.
func TestAdaptedCostsAreNormalised(t *testing.T) {
	base, _, err := channel.Fit(invented(t), channel.FitOptions{NoRules: true})
	if err != nil {
		t.Fatal(err)
	}
	m, _, err := channel.Adapt(base, []channel.Pair{
		{Observed: "itt", Intended: "it", Count: 1},
		{Observed: "t", Intended: "it", Count: 1},
		{Observed: "ti", Intended: "it", Count: 1},
		{Observed: "et", Intended: "it", Count: 1},
		{Observed: "ette", Intended: "it", Count: 1},
	}, 1)
	if err != nil {
		t.Fatal(err)
	}
	sum := 0.0
	var spell func(prefix string)
	spell = func(prefix string) {
		sum += math.Exp(-m.Cost(prefix, "it"))
		if len(prefix) < 2 {
			for _, c := range "abcdefghijklmnopqrstuvwxyz'" {
				spell(prefix + string(c))
			}
		}
	}
	for _, c := range "abcdefghijklmnopqrstuvwxyz'" {
		spell(string(c))
	}
	if sum > 1.02 || sum < .4 {
		t.Errorf("the probabilities of forms of one or two letters sum to %v", sum)
	}
}

// A lone pair does not move the model; many of a habit do.
func TestChooseStrength(t *testing.T) {
	m := fitSlips(t)
	var habit []channel.Pair
	for _, stem := range []string{"ar", "ea", "oa", "ee", "oo", "ai", "or", "ou", "er", "ia"} {
		for _, first := range "bdlmprst" {
			habit = append(habit, channel.Pair{Observed: string(first) + stem + "ckt", Intended: string(first) + stem + "ct", Count: 1})
		}
	}
	for _, test := range []struct {
		pairs []channel.Pair
		moves bool
	}{{habit[:1], false}, {habit, true}} {
		strength, trials, err := channel.ChooseStrength(m, test.pairs, nil)
		if err != nil {
			t.Fatal(err)
		}
		if moves := !math.IsInf(strength, 1); moves != test.moves || len(trials) != len(channel.Strengths) {
			t.Errorf("%d pairs: strength %v of %+v", len(test.pairs), strength, trials)
		}
	}
}

func TestFoldsByWord(t *testing.T) {
	var dealt [channel.Folds]int
	for i := range 1000 {
		p := channel.Pair{Observed: "x", Intended: fmt.Sprintf("berth%d", i)}
		dealt[channel.Fold(p)]++
		if channel.Fold(p) != channel.Fold(channel.Pair{Observed: "y", Intended: strings.ToUpper(p.Intended)}) {
			t.Errorf("%q falls in two folds", p.Intended)
		}
	}
	for fold, n := range dealt {
		if n < 150 || n > 250 {
			t.Errorf("fold %d has %d of 1000 words", fold, n)
		}
	}
}
