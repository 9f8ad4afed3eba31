package candidates_test

import (
	"context"
	"maps"
	"math"
	"slices"
	"testing"

	"example.org/foulcase/candidates"
	"example.org/foulcase/candidates/lexicon"
)

// nearPriors are words a single edit away from "pier" or one another, and one
// that is not, with log priors, nats.
var nearPriors = map[string]float32{
	"pier": -8, "peer": -9, "tier": -12, "piers": -8.5, "pie": -13.5, "sier": -15, "quay": -8,
}

// nearOnly builds a table of the words a single edit away alone: what the
// channel's search finds costs too much.
func nearOnly(t *testing.T, o candidates.ConfusableOptions) map[string]map[string]float32 {
	t.Helper()
	var b lexicon.Builder
	for _, w := range slices.Sorted(maps.Keys(nearPriors)) {
		b.Add(w, lexicon.Entry{Prior: nearPriors[w], Variety: lexicon.Both, Cases: lexicon.LowerCase, Usual: lexicon.LowerCase, Listed: true}, "")
	}
	body, err := b.Section()
	if err != nil {
		t.Fatal(err)
	}
	lex, err := lexicon.Open(body)
	if err != nil {
		t.Fatal(err)
	}
	m := fitSlips(t)
	o.MostCost = 1. / 1024
	section, err := candidates.BuildConfusables(context.Background(), lex, func() *candidates.Searcher {
		return candidates.NewSearcher(lex, m, candidates.DefaultWeights)
	}, o)
	if err != nil {
		t.Fatal(err)
	}
	table, err := candidates.OpenConfusables(section)
	if err != nil {
		t.Fatal(err)
	}
	found := map[string]map[string]float32{}
	for id := range uint32(lex.Len()) {
		of := map[string]float32{}
		for n := table.Lookup(id); n.Next(); {
			of[string(lex.AppendForm(nil, n.ID))] = n.Cost
		}
		found[string(lex.AppendForm(nil, id))] = of
	}
	return found
}

func TestNearWordsKeepToTheirBounds(t *testing.T) {
	for _, c := range []struct {
		name  string
		o     candidates.ConfusableOptions
		typed string
		want  []string
	}{
		{"as it comes", candidates.ConfusableOptions{}, "pier", []string{"peer", "piers", "tier"}},
		{"to a rarer word as well", candidates.ConfusableOptions{NearRarer: 6}, "pier", []string{"peer", "pie", "piers", "tier"}},
		{"to one hardly rarer", candidates.ConfusableOptions{NearRarer: .75}, "pier", []string{"piers"}},
		{"from a rare word to common ones", candidates.ConfusableOptions{NearRarer: .75}, "pie", []string{"pier"}},
		{"among all", candidates.ConfusableOptions{NearPrior: -16, NearRarer: 9}, "pier", []string{"peer", "pie", "piers", "sier", "tier"}},
		{"from a very rare word", candidates.ConfusableOptions{}, "sier", nil},
		{"from a very rare word, among all", candidates.ConfusableOptions{NearPrior: -16}, "sier", []string{"pier", "tier"}},
		{"among common words", candidates.ConfusableOptions{NearPrior: -10}, "pier", []string{"peer", "piers"}},
		{"from a word not common enough", candidates.ConfusableOptions{NearPrior: -10}, "tier", nil},
		{"from a word with nothing near", candidates.ConfusableOptions{NearPrior: -16, NearRarer: 9}, "quay", nil},
	} {
		if got := slices.Sorted(maps.Keys(nearOnly(t, c.o)[c.typed])); !slices.Equal(got, c.want) {
			t.Errorf("%s: %s is near %q, want %q", c.name, c.typed, got, c.want)
		}
	}
}

func TestNearWordsCostAtMost(t *testing.T) {
	m := fitSlips(t)
	for _, most := range []float32{3, 8.5, 15} {
		capped := 0
		for typed, list := range nearOnly(t, candidates.ConfusableOptions{NearPrior: -16, NearRarer: 9, NearCost: most}) {
			for meant, cost := range list {
				want := min(m.Cost(typed, meant), float64(most))
				if math.Abs(float64(cost)-want) > 1./32+1e-6 {
					t.Errorf("at most %v: %s for %s costs %v, want %v", most, typed, meant, cost, want)
				}
				if cost == most {
					capped++
				}
			}
		}
		if most == 3 && capped == 0 {
			t.Errorf("no word costs the most, %v", most)
		}
	}
	usual := nearOnly(t, candidates.ConfusableOptions{})["pier"]["peer"]
	if want := min(m.Cost("pier", "peer"), 8.5); math.Abs(float64(usual)-want) > 1./32+1e-6 {
		t.Errorf("pier for peer costs %v when nothing is said, want %v", usual, want)
	}
}
